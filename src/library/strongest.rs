//! The bond of greatest difference of electronegativity.

use super::formula::atom_label;
use super::record::Record;
use super::settings::Settings;
use crate::bonds::{BondPolarity, bond_polarity};
use crate::elements::electronegativity;
use crate::molecule::{Bond, Bonding};
use crate::selectors;
use crate::status::{Code, Failure};

/// The bond of greatest |Δχ|.
pub(super) struct StrongestBond {
    /// Index of the bond.
    pub bond: usize,
    /// 0-based atoms, a < b.
    pub a: usize,
    pub b: usize,
    /// `C1=O2`; empty where no bond has a difference.
    pub label: String,
    /// |Δχ|.
    pub delta_chi: f64,
    /// The more electronegative atom, 0-based.
    pub negative: Option<usize>,
}

/// Bond order as the tables show it: aromatic bonds 1.5, not the alternating orders that the models need.
pub(super) fn shown_order(bond: Bond, aromatic: bool) -> f64 {
    if aromatic { 1.5 } else { bond.order }
}

fn order_sign(order: f64) -> &'static str {
    if order == 1.0 {
        "-"
    } else if order == 2.0 {
        "="
    } else if order == 3.0 {
        "≡"
    } else if order == 1.5 {
        "≈"
    } else {
        "~"
    }
}

/// `C1=O2`.
pub(super) fn bond_label(record: &Record, bond: Bond, order: f64) -> String {
    let atom = |atom: u32| atom_label(&record.atomic_number, atom as usize);
    format!("{}{}{}", atom(bond.a), order_sign(order), atom(bond.b))
}

/// The bond of greatest |Δχ|, of equal ones that with the lowest atom numbers.
///
/// With it the atomic numbers of bonded elements that the scale lacks, ascending: their bonds are left out.
///
/// # Errors
/// `NoBonds` · `NoData` where the scale has no value for any bond.
pub(super) fn strongest_bond(
    record: &Record,
    bonding: &Bonding,
    settings: &Settings,
) -> (Result<StrongestBond, Code>, Vec<i32>) {
    let mut lacking = Vec::new();
    let mut strongest: Option<(usize, Bond, BondPolarity)> = None;
    for (i, &bond) in bonding.bonds.iter().enumerate() {
        let Ok(polarity) = polarity_of(record, bond, settings) else {
            let ends = [bond.a, bond.b].map(|atom| record.atomic_number.get(atom as usize).copied());
            let lacks = |z: &i32| electronegativity(settings.electronegativity, *z).is_err() && !lacking.contains(z);
            let more: Vec<i32> = ends.into_iter().flatten().filter(lacks).collect();
            lacking.extend(more);
            continue;
        };
        let size = polarity.delta_chi.value.abs();
        if strongest.is_none_or(|(_, _, best)| size > best.delta_chi.value.abs()) {
            strongest = Some((i, bond, polarity));
        }
    }
    lacking.sort_unstable();
    lacking.dedup();
    let Some((i, bond, polarity)) = strongest else {
        return (Err(if bonding.bonds.is_empty() { Code::NoBonds } else { Code::NoData }), lacking);
    };
    let (a, b) = (bond.a as usize, bond.b as usize);
    let negative = match polarity.negative_end {
        selectors::END_A => Some(a),
        selectors::END_B => Some(b),
        _ => None,
    };
    let order = shown_order(bond, bonding.aromatic.get(i).copied().unwrap_or(false));
    let label = negative.map_or(String::new(), |_| bond_label(record, bond, order));
    (Ok(StrongestBond { bond: i, a, b, label, delta_chi: polarity.delta_chi.value.abs(), negative }), lacking)
}

/// Polarity of a bond by the scale and the limits of the settings.
pub(super) fn polarity_of(record: &Record, bond: Bond, settings: &Settings) -> Result<BondPolarity, Failure> {
    let z = |atom: u32| record.atomic_number.get(atom as usize).copied().unwrap_or(0);
    bond_polarity(settings.electronegativity, settings.polar_from, settings.ionic_from, z(bond.a), z(bond.b))
}
