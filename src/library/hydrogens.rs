//! Records whose hydrogen atoms were left out.
//!
//! Where bonds are stated, an atom with fewer bonds than its valence lacks hydrogens: that is how molfiles without
//! hydrogens are meant. Where bonds were found from coordinates, the geometry tells: a bent carbon with two neighbours, a
//! pyramidal one with three, one neighbour at the distance of a single bond. Molecules without hydrogen by nature (CCl4,
//! C6F6, CO2, C60) lack none. A single missing valence in a record that has hydrogens is a radical, not an omission.
//!
//! Some cannot be told: HCN without its hydrogen is CN, CHF3 without it CF3 (taken as lacking), H2O without them O.

use super::record::Record;
use crate::bonds::is_metal;
use crate::molecule::{Bonding, Neighbours};

/// True where hydrogen atoms are missing.
pub(super) fn lacks_hydrogens(record: &Record, bonding: &Bonding, around: &Neighbours) -> bool {
    if record.hydrogens_left_out {
        return true;
    }
    // One atom says nothing of its neighbours.
    if record.atomic_number.len() < 2 {
        return false;
    }
    let has_hydrogen = record.atomic_number.contains(&1);
    if record.bonds.is_some() {
        by_valence(record, bonding, around, has_hydrogen)
    } else {
        by_geometry(record, around, has_hydrogen)
    }
}

fn by_valence(record: &Record, bonding: &Bonding, around: &Neighbours, has_hydrogen: bool) -> bool {
    let atoms = record.atomic_number.len();
    let mut missing = 0_usize;
    let mut carbon = false;
    for atom in 0..atoms {
        let here = missing_bonds(record, bonding, around, atom);
        missing += here;
        carbon |= here > 0 && record.atomic_number.get(atom) == Some(&6);
    }
    match missing {
        0 => false,
        // NO and ClO2 are radicals; a lone carbon valence without any hydrogen is a stripped CH.
        1 => !has_hydrogen && carbon,
        // O2 and SO are written with too few bonds by some; two atoms are no skeleton unless carbon is one.
        _ => atoms > 2 || carbon,
    }
}

/// Bonds that an atom lacks to its usual valence. An atom beside a nitrogen or oxygen atom with a bond too many lacks
/// none: that is how some write carbon monoxide and isocyanides.
fn missing_bonds(record: &Record, bonding: &Bonding, around: &Neighbours, atom: usize) -> usize {
    let Some(valence) = valence(record, bonding, atom) else { return 0 };
    let Some(used) = used_bonds(record, bonding, around, atom) else { return 0 };
    let gap = valence - used;
    if gap < 0.75 {
        return 0;
    }
    let too_many = around.of(atom).iter().any(|&(other, _)| {
        let other = other as usize;
        let light = matches!(record.atomic_number.get(other), Some(7 | 8));
        let more = || Some(used_bonds(record, bonding, around, other)? > self::valence(record, bonding, other)? + 0.25);
        light && more().unwrap_or(false)
    });
    if too_many {
        return 0;
    }
    match gap {
        gap if gap >= 3.5 => 4,
        gap if gap >= 2.5 => 3,
        gap if gap >= 1.5 => 2,
        _ => 1,
    }
}

/// Sum of the bond orders and unpaired electrons of an atom; `None` where a metal, a bond without order or a stated
/// valence leaves nothing to say.
fn used_bonds(record: &Record, bonding: &Bonding, around: &Neighbours, atom: usize) -> Option<f64> {
    let index = u32::try_from(atom).ok()?;
    if record.valences.iter().any(|&(stated, _)| stated == index) {
        return None;
    }
    let mut sum = 0.0;
    for &(other, bond) in around.of(atom) {
        let order = bonding.bonds.get(bond as usize).map_or(0.0, |bond| bond.order);
        let metal = record.atomic_number.get(other as usize).is_some_and(|&z| is_metal(z));
        if order == 0.0 || metal {
            return None;
        }
        sum += order;
    }
    let code = record.radicals.iter().find(|&&(stated, _)| stated == index).map_or(0, |&(_, code)| code);
    let unpaired = match code {
        0 => 0.0,
        2 => 1.0,
        _ => 2.0,
    };
    Some(sum + unpaired)
}

/// Usual valence of the elements that carry hydrogen in organic molecules (common practice): the lowest one.
fn valence(record: &Record, bonding: &Bonding, atom: usize) -> Option<f64> {
    let charge = bonding.formal_charge.get(atom).copied().unwrap_or(0);
    Some(match (*record.atomic_number.get(atom)?, charge) {
        (6 | 14, 0) | (7 | 15, 1) | (5, -1) => 4.0,
        (6, 1 | -1) | (7 | 15, 0) | (8 | 16 | 34, 1) => 3.0,
        (7 | 15, -1) | (8 | 16 | 34, 0) => 2.0,
        (8 | 16 | 34, -1) => 1.0,
        _ => return None,
    })
}

fn by_geometry(record: &Record, around: &Neighbours, has_hydrogen: bool) -> bool {
    let mut carbons = 0_usize;
    let mut bare = 0_usize;
    for (atom, &z) in record.atomic_number.iter().enumerate() {
        match z {
            6 => {
                carbons += 1;
                bare += usize::from(bare_carbon(record, around, atom));
            }
            7 if !has_hydrogen && bare_nitrogen(record, around, atom) => return true,
            _ => {}
        }
    }
    // Carbenes and biradicals have one or two bare carbons among others; a stripped molecule has them everywhere.
    if has_hydrogen { bare >= 2 && 2 * bare >= carbons } else { bare >= 1 }
}

/// A nitrogen atom that ends a molecule at more than the length of a triple bond to carbon (1.16 Å).
fn bare_nitrogen(record: &Record, around: &Neighbours, atom: usize) -> bool {
    let [(other, _)] = around.of(atom) else { return false };
    let other = *other as usize;
    match (record.atomic_number.get(other), record.xyz.get(atom), record.xyz.get(other)) {
        (Some(6), Some(a), Some(b)) => norm([a[0] - b[0], a[1] - b[1], a[2] - b[2]]) > 1.22,
        _ => false,
    }
}

/// A carbon atom whose neighbours leave room for hydrogen.
fn bare_carbon(record: &Record, around: &Neighbours, atom: usize) -> bool {
    let Some(&centre) = record.xyz.get(atom) else { return false };
    let mut others = Vec::new();
    for &(other, _) in around.of(atom) {
        let (Some(&z), Some(&xyz)) = (record.atomic_number.get(other as usize), record.xyz.get(other as usize)) else {
            continue;
        };
        if is_metal(z) {
            return false;
        }
        others.push((other, z, [xyz[0] - centre[0], xyz[1] - centre[1], xyz[2] - centre[2]]));
    }
    let halogens = others.iter().filter(|(_, z, _)| matches!(z, 9 | 17 | 35 | 53)).count();
    match others[..] {
        // Longer than in C3 1.28, HNC and CN 1.17, CO 1.13, CS 1.54 Å, where a carbon atom ends a molecule by nature.
        [(_, z, u)] => {
            let longest = match z {
                6 => 1.31,
                7 => 1.22,
                8 => 1.17,
                15 | 16 => 1.58,
                _ => return halogens == 1,
            };
            norm(u) > longest
        }
        [(_, _, u), (_, _, v)] => halogens < 2 && cosine(u, v) > -0.87,
        [(a, za, u), (b, zb, v), (c, zc, w)] => {
            let cosines = cosine(u, v) + cosine(v, w) + cosine(w, u);
            // In C60 and its like every neighbour is such a carbon too: angles down to 108° on all sides (C20, −0.93).
            let cage = [(a, za), (b, zb), (c, zc)].iter().all(|&(n, z)| z == 6 && around.degree(n as usize) == 3);
            // 120° on all sides: −1.5; 109.5°: −1.0.
            if cage { cosines > -0.8 } else { cosines > -1.25 }
        }
        _ => false,
    }
}

fn norm(u: [f64; 3]) -> f64 {
    (u[0] * u[0] + u[1] * u[1] + u[2] * u[2]).sqrt()
}

fn cosine(u: [f64; 3], v: [f64; 3]) -> f64 {
    let lengths = norm(u) * norm(v);
    if lengths == 0.0 { 0.0 } else { (u[0] * v[0] + u[1] * v[1] + u[2] * v[2]) / lengths }
}
