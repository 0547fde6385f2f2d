//! Formal charges as the bonds ask for them, and the remarks that follow.

use super::kinds::{Kind, group, highest_charge, kind};
use super::states::{Shape, charge_and_cost, is_possible};
use crate::molecule::{Bond, Molecule, Neighbours};
use crate::status::remark;

/// An O-N-O angle at or above this cosine (125°) is that of the anion, below it that of the radical.
const RADICAL_COSINE: f64 = -0.574;

/// Charges, remark bits and the first atom that a remark is about. Without `all_there` the hydrogens may be missing, and
/// an atom with free valences counts as neutral.
pub(super) fn derive(
    molecule: Molecule<'_>,
    bonds: &[Bond],
    around: &Neighbours,
    shapes: &[Shape],
    all_there: bool,
) -> (Vec<i32>, i32, Option<usize>) {
    let z = molecule.atomic_number;
    let valence: Vec<i32> = (0..z.len())
        .map(|atom| around.of(atom).iter().map(|&(_, k)| bonds[k as usize].order).sum::<f64>() as i32)
        .collect();
    let mut charge: Vec<i32> =
        (0..z.len()).map(|atom| charge_and_cost(z[atom], &shapes[atom], valence[atom]).0).collect();
    let mut remarks = 0;
    if molecule.formal_charge.is_none() {
        for atom in 0..z.len() {
            if around.degree(atom) == 0 {
                charge[atom] = alone(z[atom], z.len());
            } else if z[atom] == 1 && shapes[atom].shared && !shapes[atom].cluster {
                // A hydride between metals, a proton between non-metals.
                let poor = around.of(atom).iter().all(|&(other, _)| super::kinds::is_electron_poor(z[other as usize]));
                charge[atom] = if poor { -1 } else { 1 };
            } else if !all_there && charge[atom] < 0 && valence[atom] < 4 && !shapes[atom].shared {
                charge[atom] = 0;
            }
        }
        balance(z, around, &mut charge);
        cancel(bonds, &mut charge);
        neutral_radical(molecule, around, &mut charge);
        if charge.iter().any(|&q| q != 0) {
            remarks |= remark::CHARGES_FOUND;
        }
    }
    if bonds.iter().any(|bond| bond.order == 0.0) {
        remarks |= remark::ORDERS_NOT_ASSIGNED;
    }
    let electrons: i64 = z.iter().zip(&charge).map(|(&z, &q)| i64::from(z) - i64::from(q)).sum();
    if electrons % 2 != 0 {
        remarks |= remark::OPEN_SHELL;
    }
    let stated = |atom: usize| shapes[atom].stated.unwrap_or(charge[atom]);
    let item = (0..z.len())
        .find(|&atom| around.degree(atom) > 0 && !is_possible(z[atom], &shapes[atom], valence[atom], stated(atom)));
    if item.is_some() {
        remarks |= remark::IMPOSSIBLE_VALENCE;
    }
    (charge, remarks, item)
}

/// Charge of an atom without bonds: an ion among others, neutral by itself.
fn alone(z: i32, atoms: usize) -> i32 {
    match (kind(z), group(z)) {
        _ if atoms == 1 => 0,
        (Kind::SBlock, charge) => charge,
        (Kind::Halogen, _) => -1,
        _ => 0,
    }
}

/// Transition metals take the charge that makes their fragment neutral, or the whole where only one fragment has any;
/// never below 0 nor above what the element is known for.
fn balance(z: &[i32], around: &Neighbours, charge: &mut [i32]) {
    let metals: Vec<usize> = (0..z.len()).filter(|&atom| kind(z[atom]) == Kind::Transition).collect();
    if metals.is_empty() {
        return;
    }
    let (fragment, count) = around.fragments();
    let mut owed = vec![0_i64; count];
    for (&of, &q) in fragment.iter().zip(charge.iter()) {
        owed[of as usize] -= i64::from(q);
    }
    let first = metals.first().map(|&atom| fragment[atom]);
    if metals.iter().all(|&atom| Some(fragment[atom]) == first) {
        let whole = owed.iter().sum();
        owed.iter_mut().for_each(|owed| *owed = whole);
    }
    // Turn by turn, so that equal metals differ by one at most.
    let mut progress = true;
    while progress {
        progress = false;
        for &atom in &metals {
            let owed = &mut owed[fragment[atom] as usize];
            if *owed > 0 && charge[atom] < highest_charge(z[atom]) {
                charge[atom] += 1;
                *owed -= 1;
                progress = true;
            }
        }
    }
}

/// Opposite charges at the two ends of a bond without order are the bond itself.
fn cancel(bonds: &[Bond], charge: &mut [i32]) {
    let mut progress = true;
    while progress {
        progress = false;
        for bond in bonds.iter().filter(|bond| bond.order == 0.0) {
            let (a, b) = (bond.a as usize, bond.b as usize);
            if charge[a] > 0 && charge[b] < 0 {
                (charge[a], charge[b]) = (charge[a] - 1, charge[b] + 1);
                progress = true;
            } else if charge[a] < 0 && charge[b] > 0 {
                (charge[a], charge[b]) = (charge[a] + 1, charge[b] - 1);
                progress = true;
            }
        }
    }
}

/// A lone molecule of two or three atoms with one charge of −1 counts as the neutral radical (OH, NO, CN, ClO, NO2):
/// coordinates hardly tell them apart, and neutral molecules are what is asked about. Bent NO2 with an angle below 125°
/// stays nitrite.
fn neutral_radical(molecule: Molecule<'_>, around: &Neighbours, charge: &mut [i32]) {
    let atoms = molecule.len();
    if !(2..=3).contains(&atoms) || around.fragments().1 != 1 {
        return;
    }
    if molecule.atomic_number.iter().any(|&z| matches!(kind(z), Kind::Transition)) || charge.iter().sum::<i32>() != -1 {
        return;
    }
    if atoms == 3 {
        let middle = (0..3).find(|&atom| around.degree(atom) == 2).unwrap_or(0);
        if let [(one, _), (other, _)] = *around.of(middle) {
            let ends = [one, other].iter().filter(|&&end| molecule.atomic_number[end as usize] == 8).count();
            if molecule.atomic_number[middle] == 7
                && ends == 2
                && cosine(molecule.xyz, middle, one, other) > RADICAL_COSINE
            {
                return;
            }
            // Trihalides and the bihalides of hydrogen are ions for certain.
            if matches!(kind(molecule.atomic_number[middle]), Kind::Halogen | Kind::Hydrogen) && ends < 2 {
                return;
            }
        }
    }
    for q in charge.iter_mut().filter(|q| **q < 0).take(1) {
        *q += 1;
    }
}

fn cosine(xyz: &[[f64; 3]], middle: usize, one: u32, other: u32) -> f64 {
    let (p, q, r) = (xyz[middle], xyz[one as usize], xyz[other as usize]);
    let dot: f64 = (0..3).map(|k| (q[k] - p[k]) * (r[k] - p[k])).sum();
    let lengths = super::distance(xyz, middle as u32, one) * super::distance(xyz, middle as u32, other);
    dot / lengths.max(1e-18)
}
