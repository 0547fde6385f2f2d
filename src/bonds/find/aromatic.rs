//! Aromatic rings by Hückel's rule (Z. Phys. 1931, 70, 204; from memory), from alternating orders.
//!
//! An atom counts 1 electron for a double bond within the ring system, 2 for a lone pair (N, O, S with single bonds only,
//! C−), 0 for an empty orbital (C+, B). A ring with an atom that can give none of these, or whose double bond leads out
//! of the ring system, is not aromatic. Rings of 5 to 7 atoms with 4n + 2 electrons are; so are two of them that share
//! a bond if together they have 4n + 2 (azulene). Lone pairs alone make no ring aromatic (S7): at least one atom must have
//! a double bond, an empty orbital or a charge, and all atoms must lie in a plane.

use super::rings::Rings;
use crate::molecule::{Bond, Neighbours};

/// A ring is flat if no atom is farther than this from its plane [Å] (common practice).
const FLAT_WITHIN_A: f64 = 0.15;

/// Per bond: part of an aromatic ring. A flat drawing passes for flat rings.
pub(super) fn aromatic_bonds(
    z: &[i32],
    xyz: &[[f64; 3]],
    charge: &[i32],
    bonds: &[Bond],
    around: &Neighbours,
    rings: &Rings,
) -> Vec<bool> {
    let mut candidates: Vec<&Vec<u32>> = rings.small.iter().filter(|ring| ring.len() >= 3).collect();
    let bond_of = |a: u32, b: u32| around.of(a as usize).iter().find(|entry| entry.0 == b).map(|entry| entry.1);
    let edges = |ring: &[u32]| -> Vec<u32> {
        (0..ring.len()).filter_map(|k| bond_of(ring[k], ring[(k + 1) % ring.len()])).collect()
    };
    let mut of_candidate = vec![0_u32; bonds.len()];
    for ring in &candidates {
        for k in edges(ring) {
            of_candidate[k as usize] += 1;
        }
    }
    // A ring that falls out may take the double bonds of its neighbours with it.
    let mut changed = true;
    while changed {
        changed = false;
        candidates.retain(|ring| {
            let fits = ring.iter().all(|&atom| electrons(z, charge, bonds, around, &of_candidate, atom).is_some());
            if !fits {
                for k in edges(ring) {
                    of_candidate[k as usize] -= 1;
                }
                changed = true;
            }
            fits
        });
    }
    let count = |atoms: &[u32]| -> u32 {
        atoms.iter().filter_map(|&atom| electrons(z, charge, bonds, around, &of_candidate, atom)).sum()
    };
    let mut aromatic = vec![false; bonds.len()];
    let sized: Vec<&Vec<u32>> = candidates
        .iter()
        .copied()
        .filter(|ring| (5..=7).contains(&ring.len()) && is_flat(xyz, ring))
        .filter(|ring| {
            ring.iter().any(|&atom| {
                let own = electrons(z, charge, bonds, around, &of_candidate, atom);
                own.is_some_and(|count| count < 2) || charge[atom as usize] != 0
            })
        })
        .collect();
    let mut single = vec![false; sized.len()];
    let mut through: Vec<Vec<u32>> = vec![Vec::new(); bonds.len()];
    for ((ring, single), number) in sized.iter().zip(&mut single).zip(0_u32..) {
        *single = count(ring) % 4 == 2;
        for k in edges(ring) {
            aromatic[k as usize] |= *single;
            through[k as usize].push(number);
        }
    }
    for sharing in &through {
        for (place, &one) in sharing.iter().enumerate() {
            for &other in &sharing[place + 1..] {
                let (one, other) = (one as usize, other as usize);
                if single[one] && single[other] {
                    continue;
                }
                let mut atoms: Vec<u32> = sized[one].iter().chain(sized[other]).copied().collect();
                atoms.sort_unstable();
                atoms.dedup();
                if count(&atoms) % 4 == 2 {
                    for k in edges(sized[one]).into_iter().chain(edges(sized[other])) {
                        aromatic[k as usize] = true;
                    }
                }
            }
        }
    }
    aromatic
}

/// True if all atoms lie in the plane through the centre of the ring, across the sum of the areas that its sides span
/// with the centre.
fn is_flat(xyz: &[[f64; 3]], ring: &[u32]) -> bool {
    let sub = |p: [f64; 3], q: [f64; 3]| [p[0] - q[0], p[1] - q[1], p[2] - q[2]];
    let points: Vec<[f64; 3]> = ring.iter().filter_map(|&atom| xyz.get(atom as usize).copied()).collect();
    let centre = [0, 1, 2].map(|k| points.iter().map(|p| p[k]).sum::<f64>() / points.len().max(1) as f64);
    let mut area = [0.0; 3];
    for (p, q) in points.iter().zip(points.iter().cycle().skip(1)) {
        let (u, v) = (sub(*p, centre), sub(*q, centre));
        area[0] += u[1] * v[2] - u[2] * v[1];
        area[1] += u[2] * v[0] - u[0] * v[2];
        area[2] += u[0] * v[1] - u[1] * v[0];
    }
    let size = (area[0] * area[0] + area[1] * area[1] + area[2] * area[2]).sqrt();
    points.iter().all(|&p| {
        let from = sub(p, centre);
        (from[0] * area[0] + from[1] * area[1] + from[2] * area[2]).abs() <= FLAT_WITHIN_A * size
    })
}

/// π electrons of an atom in a ring system, `None` if it cannot take part.
fn electrons(
    z: &[i32],
    charge: &[i32],
    bonds: &[Bond],
    around: &Neighbours,
    of_candidate: &[u32],
    atom: u32,
) -> Option<u32> {
    let atom = atom as usize;
    let own = around.of(atom);
    let valence: f64 = own.iter().map(|&(_, k)| bonds[k as usize].order).sum();
    // An N-oxide may be stated with five bonds; its double bond to oxygen is then no part of the π system.
    let oxide =
        |other: u32| z[atom] == 7 && valence == 5.0 && z[other as usize] == 8 && around.degree(other as usize) == 1;
    let mut doubles = own.iter().filter(|&&(other, k)| bonds[k as usize].order >= 2.0 && !oxide(other));
    if let Some(&(_, k)) = doubles.next() {
        let plain = bonds[k as usize].order == 2.0 && doubles.next().is_none();
        return (plain && of_candidate[k as usize] > 0).then_some(1);
    }
    let ordered = own.iter().filter(|&&(_, k)| bonds[k as usize].order > 0.0).count();
    match (z[atom], charge[atom], ordered) {
        (6, -1, 2 | 3) => Some(2),
        (6, 0, 3) if ordered < own.len() => Some(1),
        (6, 1, 2 | 3) | (5, 0, 2 | 3) => Some(0),
        (7 | 15 | 33, 0, 2 | 3) | (7, -1, 2) => Some(2),
        (8 | 16 | 34 | 52, 0, 2) => Some(2),
        _ => None,
    }
}
