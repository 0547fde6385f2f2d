//! The remarks of a row in plain words.

use super::expected::too_long;
use super::formula::atom_label;
use super::fragments::{Computed, MOST_TOLD};
use super::kinds::Kind;
use super::record::Record;
use super::settings::Settings;
use super::strongest::StrongestBond;
use crate::elements::symbol;
use crate::molecule::Bonding;
use crate::moments::PEOE_RMS_D;
use crate::status::{Code, Failure, remark};

/// Charges closer than this are taken as equal [e].
const SAME_CHARGE_E: f64 = 1e-6;

/// Elements that `CHARGES_PEOE_1980` has types for: H, C, N, O, F, S, Cl, Br, I.
const PEOE_ELEMENTS: [i32; 9] = [1, 6, 7, 8, 9, 16, 17, 35, 53];

/// What the remarks of a row are told from.
pub(super) struct Words<'a> {
    pub record: &'a Record,
    pub bonding: &'a Bonding,
    pub kind: &'a Kind,
    pub computed: &'a Computed,
    pub settings: &'a Settings,
}

impl Words<'_> {
    /// All that a careful reader should know about a row, separated by `; `. `lacking` are the bonded elements that the
    /// scale of electronegativity lacks.
    pub fn detail(&self, strongest: Option<&StrongestBond>, lacking: &[i32]) -> String {
        let &Words { record, bonding, kind, computed, settings } = self;
        let mut words: Vec<String> = Vec::new();
        if kind.drawing {
            words.push(drawing(record).to_owned());
        }
        if kind.lacks_hydrogens {
            words.push("hydrogen atoms are missing".to_owned());
            if strongest.is_some() {
                words.push("strongest bond among the atoms given".to_owned());
            }
        }
        self.add_remarks(strongest, &mut words);
        if kind.untold_complex && !kind.lacks_hydrogens {
            let neutral = if kind.net_charge == 0 { "; taken as neutral" } else { "" };
            words.push(format!("charge of a metal complex is not told by coordinates{neutral}"));
        }
        if kind.charge_derived && !kind.lacks_hydrogens {
            words.push("net charge derived, not stated".to_owned());
        }
        words.extend(without_electronegativity(lacking, strongest.is_some()));
        words.extend(self.implausible());
        words.extend(computed.told.iter().cloned());
        if kind.fragments > MOST_TOLD && !computed.told.is_empty() {
            words.push(format!("{} more fragments", kind.fragments - MOST_TOLD));
        }
        if computed.verdict.as_ref().is_ok_and(|verdict| verdict.by_rms && !verdict.dipole.charged) {
            words.push(format!("judged with the rms of the model, {PEOE_RMS_D:.2} D"));
        }
        if computed.not_judged {
            words.push("the charges given have no uncertainty, so the polarity is not decided".to_owned());
        }
        if let Some(failure) = computed.charge_failure().filter(|_| !kind.lacks_hydrogens) {
            words.push(no_charges(record, bonding, failure, settings));
        } else if let Err(failure) = &computed.verdict {
            let told = [Code::FlatDrawing, Code::HydrogensMissing, Code::SeveralFragments];
            if !told.contains(&failure.code) {
                let item =
                    usize::try_from(failure.item).map_or(String::new(), |item| format!(" ({})", self.label(item)));
                words.push(format!("{}{item}", failure.code.text()));
            }
        }
        words.join("; ")
    }

    fn label(&self, atom: usize) -> String {
        atom_label(&self.record.atomic_number, atom)
    }

    /// The remark bits in words.
    fn add_remarks(&self, strongest: Option<&StrongestBond>, words: &mut Vec<String>) {
        let &Words { bonding, kind, computed, .. } = self;
        let mut remarks = kind.remarks;
        if let Ok(verdict) = &computed.verdict {
            remarks |= verdict.remarks;
        }
        if strongest.is_some_and(|bond| disagrees(bond, bonding, computed)) {
            remarks |= remark::MODEL_DISAGREES;
        }
        if kind.lacks_hydrogens {
            // What the search made of atoms without their hydrogens is no finding.
            let misled = remark::CHARGES_FOUND | remark::IMPOSSIBLE_VALENCE | remark::OPEN_SHELL | remark::CHARGE_SITES;
            remarks &= !misled;
        }
        if kind.charge_derived || kind.charge_sites == 0 {
            // A net charge is told as such; opposite charges on bonded atoms are a way of writing the bond.
            remarks &= !remark::CHARGES_FOUND;
        }
        for &(bit, _, text) in remark::ALL {
            if remarks & bit == 0 {
                continue;
            }
            match bit {
                remark::BY_SYMMETRY => words.push(format!("by symmetry: {text}")),
                remark::IMPOSSIBLE_VALENCE => {
                    let atom = bonding.item.map_or(String::new(), |item| format!(" ({})", self.label(item)));
                    words.push(format!("{text}{atom}"));
                }
                remark::ONE_CONFORMER => words.push(one_conformer(computed)),
                remark::OPEN_SHELL if !kind.odd_electrons => words.push("stated as a radical".to_owned()),
                remark::OPEN_SHELL if kind.radical_or_ion => {
                    words.push(text.to_owned());
                    words.push("radical or ion: coordinates do not tell, so state the charge".to_owned());
                }
                _ => words.push(text.to_owned()),
            }
        }
    }

    /// Distances that no molecule has: a wrong unit, or atoms in disorder.
    fn implausible(&self) -> Option<String> {
        let &Words { record, bonding, kind, settings, .. } = self;
        if kind.drawing {
            return None;
        }
        let atoms = record.atomic_number.len();
        let noble = record.atomic_number.iter().any(|z| matches!(z, 2 | 10 | 18 | 36 | 54 | 86));
        let ions = record.formal_charge.as_ref().is_some_and(|charge| charge.iter().any(|&q| q != 0));
        if atoms > 1 && kind.fragments == atoms && !noble && !ions {
            return Some("no two atoms are bonded: are the coordinates in Å?".to_owned());
        }
        record.bonds.as_ref().and_then(|_| too_long(record, bonding, settings))
    }
}

/// `no electronegativity for Eu: bonds to it are left out of the strongest bond`.
fn without_electronegativity(lacking: &[i32], some_left: bool) -> Option<String> {
    let symbols: Vec<&str> = lacking.iter().map(|&z| symbol(z).unwrap_or("")).collect();
    let them = match lacking.len() {
        0 => return None,
        1 => "it",
        _ => "them",
    };
    let symbols = symbols.join(", ");
    Some(if some_left {
        format!("no electronegativity for {symbols}: bonds to {them} are left out of the strongest bond")
    } else {
        format!("no electronegativity for {symbols}, so there is no strongest bond")
    })
}

fn drawing(record: &Record) -> &'static str {
    let same = record.xyz.first().is_some_and(|first| record.xyz.iter().all(|point| point == first));
    if same { "the record has no coordinates" } else { "a flat drawing, not a geometry" }
}

fn one_conformer(computed: &Computed) -> String {
    let text = "one conformer of a flexible molecule";
    match &computed.verdict {
        Ok(verdict) if verdict.bound_D.is_finite() => {
            format!("{text} (by turning about bonds at most {:.2} D)", verdict.bound_D)
        }
        _ => text.to_owned(),
    }
}

fn no_charges(record: &Record, bonding: &Bonding, failure: Failure, settings: &Settings) -> String {
    let model = settings.charge_model.name();
    match (failure.code, usize::try_from(failure.item)) {
        (Code::NoData, Ok(item)) => {
            let (item, element) = at_fault(record, bonding, item);
            let bonded = if element { "" } else { " as bonded here" };
            format!("{model} has no parameters for {}{bonded}", atom_label(&record.atomic_number, item))
        }
        (Code::NoData, Err(_)) => format!("{model}: no charges"),
        (code, Ok(item)) => format!("{model}: {} ({})", code.text(), atom_label(&record.atomic_number, item)),
        (code, Err(_)) => format!("{model}: {}", code.text()),
    }
}

/// The atom that the model really lacks: an element without any type before one that only has none as it is bonded,
/// which may be the doing of such a neighbour; and whether it is the element that is lacking.
fn at_fault(record: &Record, bonding: &Bonding, atom: usize) -> (usize, bool) {
    let lacks = |atom: usize| record.atomic_number.get(atom).is_some_and(|z| !PEOE_ELEMENTS.contains(z));
    if lacks(atom) {
        return (atom, true);
    }
    let ends = bonding.bonds.iter().map(|bond| (bond.a as usize, bond.b as usize));
    let others = ends.filter_map(|(a, b)| match (a == atom, b == atom) {
        (true, _) => Some(b),
        (_, true) => Some(a),
        _ => None,
    });
    others.filter(|&other| lacks(other)).min().map_or((atom, false), |other| (other, true))
}

/// True where the charge model finds the other atom of the bond more negative. Formal charges on either one say nothing
/// of the bond, so such bonds are left out.
fn disagrees(bond: &StrongestBond, bonding: &Bonding, computed: &Computed) -> bool {
    let charged = |atom: usize| bonding.formal_charge.get(atom).is_some_and(|&q| q != 0);
    if charged(bond.a) || charged(bond.b) {
        return false;
    }
    let Some(negative) = bond.negative else { return false };
    let positive = if negative == bond.a { bond.b } else { bond.a };
    match (computed.charge(negative), computed.charge(positive)) {
        (Ok(negative), Ok(positive)) => negative.value > positive.value + SAME_CHARGE_E,
        _ => false,
    }
}
