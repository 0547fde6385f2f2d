//! The remarks of a row in plain words.

use super::formula::atom_label;
use super::fragments::{Computed, MOST_TOLD};
use super::kinds::Kind;
use super::record::Record;
use super::settings::Settings;
use super::strongest::StrongestBond;
use crate::molecule::Bonding;
use crate::moments::PEOE_RMS_D;
use crate::status::{Code, Failure, remark};

/// Charges closer than this are taken as equal [e].
const SAME_CHARGE_E: f64 = 1e-6;

/// All that a careful reader should know about a row, separated by `; `.
pub(super) fn detail(
    record: &Record,
    bonding: &Bonding,
    kind: &Kind,
    computed: &Computed,
    strongest: Option<&StrongestBond>,
    settings: &Settings,
) -> String {
    let mut words: Vec<String> = Vec::new();
    let label = |item: usize| atom_label(&record.atomic_number, item);
    if kind.drawing {
        words.push(drawing(record).to_owned());
    }
    if kind.lacks_hydrogens {
        words.push("hydrogen atoms are missing".to_owned());
    }
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
    for &(bit, _, text) in remark::ALL {
        if remarks & bit == 0 {
            continue;
        }
        match bit {
            remark::BY_SYMMETRY => words.push(format!("by symmetry: {text}")),
            remark::IMPOSSIBLE_VALENCE => {
                let atom = bonding.item.map_or(String::new(), |item| format!(" ({})", label(item)));
                words.push(format!("{text}{atom}"));
            }
            remark::ONE_CONFORMER => words.push(one_conformer(computed)),
            _ => words.push(text.to_owned()),
        }
    }
    if kind.charge_derived && !kind.lacks_hydrogens {
        words.push("net charge derived, not stated".to_owned());
    }
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
        words.push(no_charges(record, failure, settings));
    } else if let Err(failure) = &computed.verdict {
        let told = [Code::FlatDrawing, Code::HydrogensMissing, Code::SeveralFragments];
        if !told.contains(&failure.code) {
            let item = usize::try_from(failure.item).map_or(String::new(), |item| format!(" ({})", label(item)));
            words.push(format!("{}{item}", failure.code.text()));
        }
    }
    words.join("; ")
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

fn no_charges(record: &Record, failure: Failure, settings: &Settings) -> String {
    let model = settings.charge_model.name();
    match (failure.code, usize::try_from(failure.item)) {
        (Code::NoData, Ok(item)) => {
            format!("{model} has no parameters for {}", atom_label(&record.atomic_number, item))
        }
        (Code::NoData, Err(_)) => format!("{model}: no charges"),
        (code, Ok(item)) => format!("{model}: {} ({})", code.text(), atom_label(&record.atomic_number, item)),
        (code, Err(_)) => format!("{model}: {}", code.text()),
    }
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
