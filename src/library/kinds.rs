//! What kind of record it is, told before any dipole is computed.
//!
//! Flat drawings and records without their hydrogen atoms have no geometry to compute from; salts, solvates and ion pairs
//! have several fragments; ions, zwitterions and open shells are molecules that need a word of caution.

use super::drawing::is_drawing;
use super::hydrogens::lacks_hydrogens;
use super::record::Record;
use crate::bonds::is_metal;
use crate::molecule::{Bonding, Neighbours};
use crate::status::remark;

/// The kind that a record is listed under; where several fit, the first of this order.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum StructureKind {
    /// A flat drawing, or a record without coordinates.
    FlatDrawing,
    /// Hydrogen atoms are missing.
    HydrogensMissing,
    /// Several fragments that are not bonded to one another: salt, solvate, ion pair.
    SeveralFragments,
    /// One fragment with a net charge.
    Ion,
    /// One neutral fragment with separated charge sites.
    Zwitterion,
    /// One neutral fragment with an odd number of electrons, or stated as a radical.
    OpenShell,
    /// One atom.
    Atom,
    /// Anything else: one neutral molecule.
    Molecule,
}

impl StructureKind {
    /// The word in the table.
    pub const fn name(self) -> &'static str {
        match self {
            StructureKind::FlatDrawing => "flat drawing",
            StructureKind::HydrogensMissing => "hydrogens missing",
            StructureKind::SeveralFragments => "several fragments",
            StructureKind::Ion => "ion",
            StructureKind::Zwitterion => "zwitterion",
            StructureKind::OpenShell => "open shell",
            StructureKind::Atom => "atom",
            StructureKind::Molecule => "molecule",
        }
    }
}

/// What was found out about a record.
#[derive(Clone, Debug, PartialEq)]
pub struct Kind {
    /// The kind it is listed under.
    pub structure: StructureKind,
    /// A flat drawing, or no coordinates.
    pub drawing: bool,
    /// Hydrogen atoms are missing.
    pub lacks_hydrogens: bool,
    /// The fragment of every atom, from 0 in the order of their first atoms.
    pub fragment: Vec<u32>,
    /// Number of fragments.
    pub fragments: usize,
    /// Sum of the formal charges [e].
    pub net_charge: i64,
    /// Charged groups that the atoms bonded to them do not make neutral: 0 for nitro groups and N-oxides, 2 for a
    /// zwitterion, 1 for an ion.
    pub charge_sites: usize,
    /// Remark bits: those of the bonds, and `CHARGE_SITES`, `OPEN_SHELL`, `SEVERAL_FRAGMENTS`.
    pub remarks: i32,
    /// The net charge is not 0 and was derived from the bonds, not stated.
    pub charge_derived: bool,
    /// The number of electrons is odd; false where the charge of a metal complex leaves that open.
    pub odd_electrons: bool,
    /// A transition metal with bonds, and no charges stated: coordinates do not tell the charge of such a complex.
    pub untold_complex: bool,
    /// Two or three atoms with an odd number of electrons and no charges stated: as well an ion as a radical.
    pub radical_or_ion: bool,
}

/// Tells the kind of a record from what it states and from its bonds.
pub fn kind_of(record: &Record, bonding: &Bonding) -> Kind {
    let atoms = record.atomic_number.len();
    let around = Neighbours::new(atoms, &bonding.bonds);
    let (fragment, fragments) = around.fragments();
    let charge = |atom: usize| bonding.formal_charge.get(atom).copied().map_or(0, i64::from);
    let net_charge: i64 = (0..atoms).map(charge).sum();
    let stated = record.formal_charge.is_some();
    let chosen = if stated { vec![false; atoms] } else { chosen_by_bonding(record, bonding) };
    let untold_complex = !stated && (0..atoms).any(|i| is_transition(record, i) && around.degree(i) > 0);
    let (charge_sites, separated) = charge_sites(atoms, &around, &charge, &chosen, &fragment, fragments);

    // Of the search's remarks this one is decided anew: it does not know what the record states.
    let mut remarks = bonding.remarks & !remark::OPEN_SHELL;
    if fragments > 1 {
        remarks |= remark::SEVERAL_FRAGMENTS;
    }
    if separated {
        remarks |= remark::CHARGE_SITES;
    }
    let protons: i64 = record.atomic_number.iter().map(|&z| i64::from(z)).sum();
    let odd_electrons = (protons - net_charge).rem_euclid(2) == 1 && !(untold_complex && net_charge != 0);
    let open_shell = odd_electrons || record.radicals.iter().any(|&(_, code)| code > 1);
    if open_shell {
        remarks |= remark::OPEN_SHELL;
    }
    let drawing = is_drawing(record, &around);
    let lacks_hydrogens = lacks_hydrogens(record, bonding, &around);
    let structure = if drawing {
        StructureKind::FlatDrawing
    } else if lacks_hydrogens {
        StructureKind::HydrogensMissing
    } else if fragments > 1 {
        StructureKind::SeveralFragments
    } else if net_charge != 0 {
        StructureKind::Ion
    } else if separated {
        StructureKind::Zwitterion
    } else if open_shell {
        StructureKind::OpenShell
    } else if atoms == 1 {
        StructureKind::Atom
    } else {
        StructureKind::Molecule
    };
    let small = (2..=3).contains(&atoms) && fragments == 1;
    Kind {
        structure,
        drawing,
        lacks_hydrogens,
        fragment,
        fragments,
        net_charge,
        charge_sites,
        remarks,
        charge_derived: net_charge != 0 && !stated,
        odd_electrons,
        untold_complex,
        radical_or_ion: small && !stated && odd_electrons && net_charge == 0 && !untold_complex,
    }
}

/// Transition metals, lanthanoids and actinoids: their bonds do not tell their charge.
fn is_transition(record: &Record, atom: usize) -> bool {
    matches!(record.atomic_number.get(atom), Some(21..=29 | 39..=47 | 57..=79 | 89..=112))
}

/// Atoms whose formal charges were chosen to balance a metal, not found: transition metals, and both ends of every bond
/// without order that a metal has (bridging halogen, dative bonds).
fn chosen_by_bonding(record: &Record, bonding: &Bonding) -> Vec<bool> {
    let atoms = record.atomic_number.len();
    let mut chosen: Vec<bool> = (0..atoms).map(|atom| is_transition(record, atom)).collect();
    let metal = |atom: u32| record.atomic_number.get(atom as usize).is_some_and(|&z| is_metal(z));
    for bond in bonding.bonds.iter().filter(|bond| bond.order == 0.0 && (metal(bond.a) || metal(bond.b))) {
        for atom in [bond.a, bond.b] {
            if let Some(slot) = chosen.get_mut(atom as usize) {
                *slot = true;
            }
        }
    }
    chosen
}

/// Number of charged groups with a net charge, a group being charged atoms bonded to one another; and whether some
/// neutral fragment has such groups. Groups with an atom whose charge was chosen for it do not count.
fn charge_sites(
    atoms: usize,
    around: &Neighbours,
    charge: &dyn Fn(usize) -> i64,
    chosen: &[bool],
    fragment: &[u32],
    fragments: usize,
) -> (usize, bool) {
    let mut seen = vec![false; atoms];
    let mut sites = 0;
    let mut of_fragment = vec![(0_usize, 0_i64); fragments];
    let mut stack = Vec::new();
    for first in 0..atoms {
        if charge(first) == 0 || seen.get(first).copied().unwrap_or(true) {
            continue;
        }
        let (mut sum, mut told) = (0, true);
        stack.push(first);
        while let Some(atom) = stack.pop() {
            match seen.get_mut(atom) {
                Some(seen) if !*seen => *seen = true,
                _ => continue,
            }
            sum += charge(atom);
            told &= chosen.get(atom) != Some(&true);
            stack.extend(around.of(atom).iter().map(|&(other, _)| other as usize).filter(|&other| charge(other) != 0));
        }
        if sum != 0 && told {
            sites += 1;
            if let Some((count, net)) = fragment.get(first).and_then(|&f| of_fragment.get_mut(f as usize)) {
                *count += 1;
                *net += sum;
            }
        }
    }
    (sites, of_fragment.iter().any(|&(count, net)| count > 1 && net == 0))
}
