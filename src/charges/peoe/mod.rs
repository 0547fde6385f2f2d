//! Partial equalization of orbital electronegativity (PEOE).
//!
//! J. Gasteiger, M. Marsili, Tetrahedron 1980, 36, 3219-3228 (formulas and parameters from memory). The orbital
//! electronegativity of an atom is χ(q) = a + b q + c q². In sweep n charge flows along every bond from the less to the
//! more electronegative atom, (χ_B − χ_A)/χ_A⁺ · (1/2)ⁿ, where χ_A⁺ = a + b + c is that of the donor's cation (20.02 eV
//! for hydrogen). All flows of a sweep are found from the charges before it; there are six sweeps. The number of sweeps
//! matters: after six, CF4 and CH3F have their published charges; at convergence they do not.
//!
//! What the model cannot do: only the σ bonds count. The dipole of C≡N comes out far too small (acetonitrile 2.3 D for
//! 3.9 D measured), that of C=O too small, those of C-Cl and C-Br by a third or more. Started from formal charges, the
//! nitro group comes out too large (nitromethane 5.7 D for 3.5 D), and so do N2O and NO2Cl. Carbon monoxide gets its
//! negative end at oxygen, while it is at carbon.
//!
//! In dispute: a of sp3 oxygen, 14.18 here; 14.12 is also in circulation. The row's sum (28.49) and the carbon of dimethyl
//! ether favour 14.18; methanol's oxygen would change by 0.0035 e.

mod parameters;
mod types;

pub use parameters::Parameters;
pub use types::AtomType;

use super::Charges;
use crate::molecule::{Bonding, Molecule};
use crate::status::{Code, Failure};
use types::Start;

/// Number of sweeps, as published.
const SWEEPS: usize = 6;

/// PEOE charges [e], one an atom, without uncertainties; they sum to the net formal charge and do not depend on the
/// coordinates. `along_bond` holds the sum of the six flows along each bond.
///
/// The sweeps start from the formal charges of the bonding (or, if it carries none, of the molecule), the delocalised
/// ones shared first and opposite ones of bonded atoms cancelled: see [`AtomType`] for the types and the sharing.
///
/// # Errors
/// As [`Molecule::check`] · `BadBond` with the bond as item · `NoData` with the atom as item, where the model has no type
/// for it: other elements, sulfur with double bonds, hypervalent halogens, bonds without an order.
pub fn peoe_charges(molecule: Molecule<'_>, bonding: &Bonding) -> Result<Charges, Failure> {
    molecule.check()?;
    let Start { types, mut charge } = types::start(molecule, bonding)?;
    let parameters: Vec<Parameters> = types.iter().map(|&kind| parameters::of(kind)).collect::<Result<_, _>>()?;
    let mut damping = 1.0;
    let mut flow = vec![0.0; charge.len()];
    let mut along_bond = vec![0.0; bonding.bonds.len()];
    for _ in 0..SWEEPS {
        damping *= 0.5;
        let chi: Vec<f64> = parameters.iter().zip(&charge).map(|(own, &q)| own.a + q * (own.b + q * own.c)).collect();
        flow.fill(0.0);
        for (index, bond) in bonding.bonds.iter().enumerate() {
            let (i, j) = (bond.a as usize, bond.b as usize);
            let ends = (chi.get(i), chi.get(j), parameters.get(i), parameters.get(j));
            let (Some(&chi_i), Some(&chi_j), Some(at_i), Some(at_j)) = ends else {
                return Err(Failure::new(Code::BadBond).item(index));
            };
            // Positive: from i to j, i being the donor.
            let cation = if chi_i <= chi_j { at_i.chi_plus } else { at_j.chi_plus };
            let moved = (chi_j - chi_i) / cation * damping;
            add(&mut flow, i, moved);
            add(&mut flow, j, -moved);
            add(&mut along_bond, index, moved);
        }
        for (own, moved) in charge.iter_mut().zip(&flow) {
            *own += moved;
        }
    }
    Ok(Charges { charge, u: None, along_bond: Some(along_bond) })
}

fn add(values: &mut [f64], index: usize, amount: f64) {
    if let Some(value) = values.get_mut(index) {
        *value += amount;
    }
}
