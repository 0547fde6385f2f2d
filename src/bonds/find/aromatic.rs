//! Aromatic rings by Hückel's rule (Z. Phys. 1931, 70, 204; from memory), from alternating orders.
//!
//! An atom counts 1 electron for a double bond within the ring system, 2 for a lone pair (N, O, S with single bonds only,
//! C−), 0 for an empty orbital (C+, B). A ring with an atom that can give none of these, or whose double bond leads out
//! of the ring system, is not aromatic. Rings of 5 to 7 atoms with 4n + 2 electrons are; so are two of them that share
//! a bond if together they have 4n + 2 (azulene).

use super::rings::Rings;
use crate::molecule::{Bond, Neighbours};

/// Per bond: part of an aromatic ring.
pub(super) fn aromatic_bonds(
    z: &[i32],
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
    let sized: Vec<&Vec<u32>> = candidates.iter().copied().filter(|ring| (5..=7).contains(&ring.len())).collect();
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
    let mut doubles = own.iter().filter(|&&(_, k)| bonds[k as usize].order >= 2.0);
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
