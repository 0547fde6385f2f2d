//! Partial charges of a molecule by the model of the caller's choice.

use super::peoe::peoe_charges;
use crate::declare::{Argument, BONDS, Function, Kind, MOLECULES, NUMBER, SELECTOR};
use crate::molecule::{Bonding, Molecule};
use crate::selectors::{CHARGES_GIVEN, CHARGES_PEOE_1980, Selector};
use crate::status::{Code, Failure, remark};

/// Number of the caller's charges among the arguments of the functions that take them (`dipole`).
const GIVEN: i32 = 5;

/// Partial charges of the atoms of one molecule [e].
#[derive(Clone, Debug, PartialEq)]
pub struct Charges {
    /// One charge an atom [e].
    pub charge: Vec<f64>,
    /// Their standard uncertainties [e]; `None`, or NaN for one atom: not known.
    pub u: Option<Vec<f64>>,
    /// One number a bond [e]: the charge that its atom a has given to its atom b along the bond, above 0 where a is the
    /// positive end; `None` for charges that are not made up of bonds.
    pub along_bond: Option<Vec<f64>>,
}

impl Charges {
    /// Sum of all charges [e], in the order of the atoms.
    pub fn sum(&self) -> f64 {
        self.charge.iter().sum()
    }
}

/// Declaration of [`partial_charges`].
pub static PARTIAL_CHARGES: Function = Function {
    name: "partial_charges",
    family: "charges",
    kind: Kind::Molecules,
    since: 1,
    title: "Partial charges of the atoms",
    formula: "chi = a + b q + c q^2; six damped sweeps of charge along the bonds",
    arguments: &[
        Argument {
            number: 1,
            name: "model",
            label: "charge model",
            group: "charges",
            default: Some(CHARGES_PEOE_1980),
            help: "Charge model",
            ..SELECTOR
        },
        Argument { number: 2, ..MOLECULES },
        Argument { number: 3, ..BONDS },
    ],
    results: &[Argument {
        number: 4,
        name: "charge_e",
        label: "charge",
        shape: "atom",
        unit: "e",
        uncertainty: "u_charge_e",
        main: true,
        help: "Partial charge of each atom [e]",
        ..NUMBER
    }],
    statuses: &[
        Code::NotAllowed,
        Code::Missing,
        Code::NotFinite,
        Code::OutOfRange,
        Code::UnknownElement,
        Code::NoData,
        Code::BadBond,
        Code::AtomsTooClose,
        Code::NoAtoms,
    ],
    remarks: remark::BONDS_FOUND
        | remark::CHARGES_FOUND
        | remark::IMPOSSIBLE_VALENCE
        | remark::ORDERS_NOT_ASSIGNED
        | remark::CHARGED
        | remark::OPEN_SHELL,
    notes: &[
        "The charges sum to the net charge; they do not depend on the geometry.",
        "PEOE 1980 has types for H, C, N, O, F, Cl, Br, I and for S with single bonds; any other atom is NO_DATA.",
        "PEOE 1980 describes the sigma bonds only: C=O, NO2 and cyano groups come out far too little polar, and CO with the wrong sign.",
        "Delocalised formal charge is shared first (carboxylate -1/2 each); opposite formal charges on bonded atoms (nitro, N-oxide) cancel first.",
        "The model states no uncertainty.",
        "CHARGES_GIVEN is not allowed here: there is nothing to compute.",
    ],
    sources: &["J. Gasteiger, M. Marsili, Tetrahedron 1980, 36, 3219-3228 (from memory)"],
    examples: &[],
};

/// Partial charges of a molecule [e] by a model, or the caller's own ones with `CHARGES_GIVEN`.
///
/// `given` holds one charge an atom and, if known, one standard uncertainty an atom (NaN: not known).
///
/// # Errors
/// Of argument 1, the model: `UnknownSelector`, `WrongSelector`, `NotAllowed` (`CHARGES_GIVEN` without charges). Of
/// argument 5, the caller's charges: `NotAllowed` (with any other model), `Missing`, `NotFinite`,
/// `NegativeUncertainty`. Of the model: as [`peoe_charges`].
pub fn partial_charges(
    model: Selector,
    molecule: Molecule<'_>,
    bonding: &Bonding,
    given: Option<(&[f64], Option<&[f64]>)>,
) -> Result<Charges, Failure> {
    PARTIAL_CHARGES.selector(1, model)?;
    match (model, given) {
        (CHARGES_GIVEN, Some((charge, u))) => given_charges(molecule, charge, u),
        (CHARGES_GIVEN, None) => Err(Failure::of(Code::NotAllowed, 1)),
        (_, Some(_)) => Err(Failure::of(Code::NotAllowed, GIVEN)),
        (CHARGES_PEOE_1980, None) => peoe_charges(molecule, bonding),
        (_, None) => Err(Failure::of(Code::WrongSelector, 1)),
    }
}

fn given_charges(molecule: Molecule<'_>, charge: &[f64], u: Option<&[f64]>) -> Result<Charges, Failure> {
    molecule.check()?;
    if charge.len() != molecule.len() || u.is_some_and(|u| u.len() != molecule.len()) {
        return Err(Failure::of(Code::Missing, GIVEN));
    }
    let fault = |code, atom| Err(Failure::of(code, GIVEN).item(atom));
    for (atom, q) in charge.iter().enumerate() {
        if q.is_nan() {
            return fault(Code::Missing, atom);
        }
        if q.is_infinite() {
            return fault(Code::NotFinite, atom);
        }
    }
    for (atom, &u) in u.unwrap_or(&[]).iter().enumerate() {
        if u < 0.0 {
            return fault(Code::NegativeUncertainty, atom);
        }
        if u.is_infinite() {
            return fault(Code::NotFinite, atom);
        }
    }
    Ok(Charges { charge: charge.to_vec(), u: u.map(<[f64]>::to_vec), along_bond: None })
}
