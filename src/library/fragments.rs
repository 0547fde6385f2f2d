//! Charges and dipoles of a record, fragment by fragment.
//!
//! One fragment gives the row. Of several the dipole of the whole depends on how they happen to lie, so each is computed
//! by itself and told in words; the row has none.

use super::formula::hill_formula;
use super::kinds::Kind;
use super::record::Record;
use super::settings::Settings;
use crate::charges::{Charges, partial_charges};
use crate::molecule::{Bond, Bonding, Molecule};
use crate::moments::{PEOE_RMS_D, Verdict, dipole, greatest_dipole, verdict};
use crate::quantity::Quantity;
use crate::selectors::{CHARGES_GIVEN, CHARGES_PEOE_1980, POLARITY_POLAR, POLARITY_UNDECIDED};
use crate::status::{Code, Failure, remark};

/// Fragments whose dipole is told; further ones are counted.
pub(super) const MOST_TOLD: usize = 8;

/// A polar molecule that may gain more than this by turning about bonds is one conformer of several [D].
const CHANGE_BY_TURNING_D: f64 = 0.2;

/// What the models say of a record.
pub(super) struct Computed {
    charge: Vec<Quantity>,
    /// Charge given along each bond from its atom a to its atom b [e]; NaN where the model has none.
    along_bond: Vec<f64>,
    /// Why the atoms of a fragment have no charge.
    missing: Vec<Option<Failure>>,
    fragment: Vec<u32>,
    /// The verdict of the row, or why there is none.
    pub verdict: Result<Verdict, Failure>,
    /// Of several fragments the first ones, in words.
    pub told: Vec<String>,
    /// The caller's charges have no uncertainty, so the dipole could not be judged.
    pub not_judged: bool,
}

impl Computed {
    /// Partial charge of an atom [e]; u is NaN where it is not known.
    pub fn charge(&self, atom: usize) -> Result<Quantity, Code> {
        let fragment = self.fragment.get(atom).map_or(0, |&f| f as usize);
        match (self.missing.get(fragment), self.charge.get(atom)) {
            (Some(Some(failure)), _) => Err(failure.code),
            (_, Some(&charge)) => Ok(charge),
            _ => Err(Code::NoData),
        }
    }

    /// Charge that atom a of a bond has given to atom b along it [e].
    pub fn bond_charge(&self, bond: usize, a: usize) -> Result<f64, Code> {
        self.charge(a)?;
        self.along_bond.get(bond).copied().filter(|q| !q.is_nan()).ok_or(Code::NoData)
    }

    /// The first fault of the charge model.
    pub fn charge_failure(&self) -> Option<Failure> {
        self.missing.iter().flatten().next().copied()
    }

    /// How the row ended.
    pub fn status(&self) -> Code {
        self.verdict.as_ref().map_or_else(|failure| failure.code, |_| Code::Ok)
    }
}

/// A part of a record as a molecule of its own.
struct Part {
    /// Its atoms by their index in the record.
    atoms: Vec<usize>,
    /// Its bonds by their index in the record.
    bonds: Vec<usize>,
    atomic_number: Vec<i32>,
    formal_charge: Option<Vec<i32>>,
    xyz: Vec<[f64; 3]>,
    bonding: Bonding,
}

/// Charges of all fragments, and the verdict.
pub(super) fn compute(record: &Record, bonding: &Bonding, kind: &Kind, settings: &Settings) -> Computed {
    let no_charge = Quantity::without_u(f64::NAN);
    let mut computed = Computed {
        charge: vec![no_charge; record.atomic_number.len()],
        along_bond: vec![f64::NAN; bonding.bonds.len()],
        missing: vec![None; kind.fragments],
        fragment: kind.fragment.clone(),
        verdict: Err(Failure::new(Code::SeveralFragments)),
        told: Vec::new(),
        not_judged: false,
    };
    let geometry = if kind.drawing {
        Err(Failure::new(Code::FlatDrawing))
    } else if kind.lacks_hydrogens {
        Err(Failure::new(Code::HydrogensMissing))
    } else {
        Ok(())
    };
    if kind.lacks_hydrogens {
        computed.missing.fill(Some(Failure::new(Code::HydrogensMissing)));
        computed.verdict = Err(geometry.err().unwrap_or(Failure::new(Code::HydrogensMissing)));
        return computed;
    }
    if kind.fragments == 1 {
        let all: Vec<usize> = (0..record.atomic_number.len()).collect();
        let charges = charges_of(record, &all, record.molecule(), bonding, settings);
        keep(&mut computed, 0, &all, None, &charges);
        computed.verdict = geometry.and_then(|()| {
            let (verdict, judged) = judge(record.molecule(), bonding, &charges, settings)?;
            computed.not_judged = !judged;
            Ok(verdict)
        });
        return computed;
    }
    for (number, part) in parts(record, bonding, kind).iter().enumerate() {
        let molecule = Molecule {
            atomic_number: &part.atomic_number,
            formal_charge: part.formal_charge.as_deref(),
            xyz: &part.xyz,
        };
        let charges = charges_of(record, &part.atoms, molecule, &part.bonding, settings);
        keep(&mut computed, number, &part.atoms, Some(&part.bonds), &charges);
        if number < MOST_TOLD {
            let judged = geometry.and_then(|()| judge(molecule, &part.bonding, &charges, settings));
            computed.told.push(words(number, part, judged.map(|(verdict, _)| verdict)));
        }
    }
    if let Err(failure) = geometry {
        computed.verdict = Err(failure);
    }
    computed
}

fn charges_of(
    record: &Record,
    atoms: &[usize],
    molecule: Molecule<'_>,
    bonding: &Bonding,
    settings: &Settings,
) -> Result<Charges, Failure> {
    let pick =
        |all: &Vec<f64>| -> Vec<f64> { atoms.iter().map(|&i| all.get(i).copied().unwrap_or(f64::NAN)).collect() };
    let given = match &record.charge_e {
        Some((charge, u)) if settings.charge_model == CHARGES_GIVEN => Some((pick(charge), u.as_ref().map(pick))),
        _ => None,
    };
    let given = given.as_ref().map(|(charge, u)| (charge.as_slice(), u.as_deref()));
    if settings.charge_model == CHARGES_GIVEN && given.is_none() {
        return Err(Failure::new(Code::NoData));
    }
    partial_charges(settings.charge_model, molecule, bonding, given)
}

/// Puts the charges of a fragment where its atoms and bonds are; `bonds` are those of the record, all without it.
fn keep(
    computed: &mut Computed,
    fragment: usize,
    atoms: &[usize],
    bonds: Option<&[usize]>,
    charges: &Result<Charges, Failure>,
) {
    match charges {
        Ok(charges) => {
            for (k, &q) in charges.along_bond.iter().flatten().enumerate() {
                let bond = bonds.map_or(Some(k), |bonds| bonds.get(k).copied());
                if let Some(slot) = bond.and_then(|bond| computed.along_bond.get_mut(bond)) {
                    *slot = q;
                }
            }
            for (k, &atom) in atoms.iter().enumerate() {
                let u = charges.u.as_ref().and_then(|u| u.get(k)).copied().unwrap_or(f64::NAN);
                if let (Some(slot), Some(&q)) = (computed.charge.get_mut(atom), charges.charge.get(k)) {
                    *slot = Quantity::new(q, u);
                }
            }
        }
        Err(failure) => {
            let item = usize::try_from(failure.item).ok().and_then(|item| atoms.get(item));
            if let Some(slot) = computed.missing.get_mut(fragment) {
                *slot = Some(item.map_or(*failure, |&atom| failure.item(atom)));
            }
        }
    }
}

/// The verdict of one molecule, and whether it could be judged: charges of the caller's without uncertainty give a
/// dipole that is neither polar nor non-polar.
fn judge(
    molecule: Molecule<'_>,
    bonding: &Bonding,
    charges: &Result<Charges, Failure>,
    settings: &Settings,
) -> Result<(Verdict, bool), Failure> {
    let rms = if settings.charge_model == CHARGES_PEOE_1980 { PEOE_RMS_D } else { f64::NAN };
    let u = settings.position_uncertainty_a;
    let known = charges.as_ref().map_err(|failure| *failure);
    match verdict(molecule, bonding, known, u, settings.polarity_limit_d, rms) {
        Err(failure) if rms.is_nan() && failure.code == Code::Missing => {
            let dipole = dipole(molecule, known?, u)?;
            let polarity = POLARITY_UNDECIDED;
            Ok((Verdict { dipole, polarity, remarks: 0, bound_D: f64::NAN, by_rms: false }, false))
        }
        judged => judged.map(|verdict| (of_one_conformer(verdict, molecule, bonding, known), true)),
    }
}

/// A polar verdict stands whatever the conformer, but its dipole is that of one: said where turning may change it.
fn of_one_conformer(
    mut verdict: Verdict,
    molecule: Molecule<'_>,
    bonding: &Bonding,
    charges: Result<&Charges, Failure>,
) -> Verdict {
    if verdict.polarity != POLARITY_POLAR {
        return verdict;
    }
    if let Ok(reach) = charges.and_then(|charges| greatest_dipole(molecule, bonding, charges))
        && reach.hinges > 0
        && reach.bound_D > verdict.dipole.magnitude.value + CHANGE_BY_TURNING_D
    {
        verdict.bound_D = reach.bound_D;
        verdict.remarks |= remark::ONE_CONFORMER;
    }
    verdict
}

/// The fragments in the order of their first atoms.
fn parts(record: &Record, bonding: &Bonding, kind: &Kind) -> Vec<Part> {
    let empty = || Part {
        atoms: Vec::new(),
        bonds: Vec::new(),
        atomic_number: Vec::new(),
        formal_charge: record.formal_charge.as_ref().map(|_| Vec::new()),
        xyz: Vec::new(),
        bonding: Bonding::default(),
    };
    let mut parts: Vec<Part> = (0..kind.fragments).map(|_| empty()).collect();
    let mut place = Vec::with_capacity(kind.fragment.len());
    for (atom, &fragment) in kind.fragment.iter().enumerate() {
        let Some(part) = parts.get_mut(fragment as usize) else { continue };
        place.push(u32::try_from(part.atoms.len()).unwrap_or(u32::MAX));
        part.atoms.push(atom);
        part.atomic_number.push(record.atomic_number.get(atom).copied().unwrap_or(0));
        part.xyz.push(record.xyz.get(atom).copied().unwrap_or([f64::NAN; 3]));
        part.bonding.formal_charge.push(bonding.formal_charge.get(atom).copied().unwrap_or(0));
        if let (Some(charges), Some(stated)) = (&mut part.formal_charge, &record.formal_charge) {
            charges.push(stated.get(atom).copied().unwrap_or(0));
        }
    }
    for (i, bond) in bonding.bonds.iter().enumerate() {
        let at = |atom: u32| place.get(atom as usize).copied();
        let fragment = kind.fragment.get(bond.a as usize).map_or(usize::MAX, |&f| f as usize);
        if let (Some(part), Some(a), Some(b)) = (parts.get_mut(fragment), at(bond.a), at(bond.b)) {
            part.bonds.push(i);
            part.bonding.bonds.push(Bond { a, b, order: bond.order });
            part.bonding.aromatic.push(bonding.aromatic.get(i).copied().unwrap_or(false));
        }
    }
    parts
}

/// `fragment 1: C2H3O2, charge -1, 5.34 D, charged`.
fn words(number: usize, part: &Part, verdict: Result<Verdict, Failure>) -> String {
    let mut text = format!("fragment {}: {}", number + 1, hill_formula(&part.atomic_number));
    let charge: i64 = part.bonding.formal_charge.iter().map(|&q| i64::from(q)).sum();
    if charge != 0 {
        text.push_str(&format!(", charge {charge:+}"));
    }
    match verdict {
        Ok(verdict) if verdict.dipole.charged => {
            text.push_str(&format!(", {:.2} D about its centre of mass", verdict.dipole.magnitude.value));
        }
        Ok(verdict) => {
            text.push_str(&format!(", {:.2} D, {}", verdict.dipole.magnitude.value, verdict.polarity.title()));
        }
        Err(failure) => text.push_str(&format!(", no dipole ({})", failure.code.text())),
    }
    text
}
