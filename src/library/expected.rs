//! Lengths of bonds: those of the record, those that covalent radii lead one to expect, and bonds that are far too long.

use super::record::Record;
use super::settings::Settings;
use super::strongest::{bond_label, shown_order};
use crate::bonds::bond_length;
use crate::molecule::{Bond, Bonding, Neighbours};
use crate::quantity::Quantity;
use crate::selectors::{self, Selector};
use crate::status::{Code, Failure};

/// A stated bond longer than this times its expected length is told.
const TOO_LONG: f64 = 1.5;

/// Length of a bond from the coordinates [Å].
///
/// # Errors
/// `Missing`.
pub(super) fn length_of(record: &Record, bond: Bond) -> Result<f64, Code> {
    let point = |atom: u32| record.xyz.get(atom as usize).ok_or(Code::Missing);
    let (a, b) = (point(bond.a)?, point(bond.b)?);
    let d = [a[0] - b[0], a[1] - b[1], a[2] - b[2]];
    Ok((d[0] * d[0] + d[1] * d[1] + d[2] * d[2]).sqrt())
}

/// Expected lengths [Å], one entry a bond, or why there is none.
///
/// Resonance-equivalent bonds (see [`equivalent_bonds`]) are alike in nature, though one is written double: each of them
/// gets the mean over all of them, and the mean of their uncertainties, since their radii are the same.
pub(super) fn expected_lengths(
    record: &Record,
    bonding: &Bonding,
    states: &[Selector],
    settings: &Settings,
) -> Vec<Result<Quantity, Code>> {
    let mut expected: Vec<Result<Quantity, Code>> = bonding
        .bonds
        .iter()
        .enumerate()
        .map(|(i, &bond)| {
            let order = shown_order(bond, bonding.aromatic.get(i).copied().unwrap_or(false));
            expected_length(record, states, bond, order, settings).map_err(|failure| failure.code)
        })
        .collect();
    for group in equivalent_bonds(record, bonding) {
        let known: Vec<Quantity> = group.iter().filter_map(|&i| expected.get(i).copied()?.ok()).collect();
        if known.len() != group.len() {
            continue;
        }
        let n = known.len() as f64;
        let value = known.iter().map(|q| q.value).sum::<f64>() / n;
        let u = known.iter().map(|q| q.u).sum::<f64>() / n;
        for i in group {
            if let Some(slot) = expected.get_mut(i) {
                *slot = Ok(Quantity::new(value, u));
            }
        }
    }
    expected
}

/// Groups of bonds from one centre to atoms of one element that have no other neighbour, some of order 2 and some of
/// order 1 with a charge of -1 on the outer atom: nitro, nitrate, carboxylate, carbonate, sulfonate, ozone.
fn equivalent_bonds(record: &Record, bonding: &Bonding) -> Vec<Vec<usize>> {
    let charge = |atom: u32| bonding.formal_charge.get(atom as usize).copied().unwrap_or(0);
    if !bonding.formal_charge.contains(&-1) {
        return Vec::new();
    }
    let around = Neighbours::new(record.atomic_number.len(), &bonding.bonds);
    let mut outer: Vec<(u32, i32, bool, usize)> = Vec::new();
    for (i, bond) in bonding.bonds.iter().enumerate() {
        for (centre, end) in [(bond.a, bond.b), (bond.b, bond.a)] {
            let lone = around.degree(end as usize) == 1 && around.degree(centre as usize) > 1;
            let double = bond.order == 2.0 && charge(end) == 0;
            let single = bond.order == 1.0 && charge(end) == -1;
            if let (true, Some(&z)) = (lone && (double || single), record.atomic_number.get(end as usize)) {
                outer.push((centre, z, double, i));
            }
        }
    }
    outer.sort_unstable();
    outer
        .chunk_by(|one, other| (one.0, one.1) == (other.0, other.1))
        .filter(|group| group.first().map(|one| one.2) != group.last().map(|one| one.2))
        .map(|group| group.iter().map(|one| one.3).collect())
        .collect()
}

/// Of the bonds that are far longer than expected the worst, in words.
pub(super) fn too_long(record: &Record, bonding: &Bonding, settings: &Settings) -> Option<String> {
    let states = states_of(record, bonding, settings.covalent_radii);
    let mut worst: Option<(f64, f64, usize, Bond)> = None;
    let mut count = 0_usize;
    for (i, &bond) in bonding.bonds.iter().enumerate() {
        let Ok(length) = length_of(record, bond) else { continue };
        let order = shown_order(bond, bonding.aromatic.get(i).copied().unwrap_or(false));
        let Ok(expected) = expected_length(record, &states, bond, order, settings) else { continue };
        let ratio = length / expected.value;
        if ratio > TOO_LONG {
            count += 1;
            if worst.is_none_or(|(most, ..)| ratio > most) {
                worst = Some((ratio, length, i, bond));
            }
        }
    }
    let (ratio, length, i, bond) = worst?;
    let label = bond_label(record, bond, shown_order(bond, bonding.aromatic.get(i).copied().unwrap_or(false)));
    let more = if count > 1 { format!(" ({} more bonds are too long)", count - 1) } else { String::new() };
    Some(format!("bond {label} is {length:.2} Å long, {ratio:.1} times its expected length{more}"))
}

fn expected_length(
    record: &Record,
    states: &[Selector],
    bond: Bond,
    order: f64,
    settings: &Settings,
) -> Result<Quantity, Failure> {
    if order == 0.0 {
        return Err(Failure::new(Code::NoData));
    }
    let z = |atom: u32| record.atomic_number.get(atom as usize).copied().unwrap_or(0);
    let state = |atom: u32| states.get(atom as usize).copied().unwrap_or(selectors::STATE_AS_LISTED);
    bond_length(
        settings.covalent_radii,
        selectors::LENGTH_BY_ORDER,
        settings.electronegativity,
        z(bond.a),
        state(bond.a),
        z(bond.b),
        state(bond.b),
        order,
    )
}

/// The hybridization that picks a carbon radius from Cordero's table: sp with a triple or two double bonds, sp2 with one
/// double or aromatic bond, else sp3. Other tables and elements have one radius.
pub(super) fn states_of(record: &Record, bonding: &Bonding, radii: Selector) -> Vec<Selector> {
    if radii != selectors::RADII_CORDERO_2008 {
        return vec![selectors::STATE_AS_LISTED; record.atomic_number.len()];
    }
    let mut unsaturation = vec![0_u32; record.atomic_number.len()];
    for bond in &bonding.bonds {
        let more = match bond.order {
            order if order >= 3.0 => 2,
            order if order > 1.0 => 1,
            _ => 0,
        };
        for atom in [bond.a, bond.b] {
            if let Some(sum) = unsaturation.get_mut(atom as usize) {
                *sum += more;
            }
        }
    }
    let state = |(&z, &sum): (&i32, &u32)| match (z, sum) {
        (6, 0) => selectors::STATE_SP3,
        (6, 1) => selectors::STATE_SP2,
        (6, _) => selectors::STATE_SP,
        _ => selectors::STATE_AS_LISTED,
    };
    record.atomic_number.iter().zip(&unsaturation).map(state).collect()
}
