//! Bonds from coordinates, against structures whose bonds are known.

#[path = "bonds_find/aromatic.rs"]
mod aromatic;
#[path = "bonds_find/hard.rs"]
mod hard;
#[path = "bonds_find/stated.rs"]
mod stated;
#[path = "bonds_find/structures.rs"]
mod structures;

use bondmoment::bonds::find::find_bonds;
use bondmoment::molecule::{Bonding, Molecule};
use bondmoment::selectors::BONDS_ALTERNATING;
use bondmoment::status::{Code, remark};
use std::collections::BTreeMap;
use structures::{Numbers, Structure, folder, found, open_set, pairs};

/// Bonds whose order differs, unless the two assignments are alternating structures of one another: equal sums of orders
/// at every atom, and differences on aromatic bonds only; or an atom has exchanged the orders of its bonds to two
/// terminal atoms of one element (nitro group).
fn differing(one: &Structure, bonding: &Bonding) -> Vec<(u32, u32, f64, f64)> {
    let mut sums = vec![0.0; one.z.len()];
    let mut differing = Vec::new();
    let mut only_aromatic = true;
    for (bond, &aromatic) in bonding.bonds.iter().zip(&bonding.aromatic) {
        let stated = one.bonds[&(bond.a, bond.b)];
        for atom in [bond.a, bond.b] {
            sums[atom as usize] += bond.order - stated;
        }
        if bond.order != stated {
            differing.push((bond.a, bond.b, stated, bond.order));
            only_aromatic &= aromatic;
        }
    }
    if let [(a, b, one_stated, one_ours), (c, d, other_stated, other_ours)] = *differing {
        let middle = if a == c || a == d { a } else { b };
        let (end, other) = (a + b - middle, (c + d).wrapping_sub(middle));
        let terminal = |atom: u32| bonding.bonds.iter().filter(|bond| bond.a == atom || bond.b == atom).count() == 1;
        let same = one.z[end as usize] == one.z.get(other as usize).copied().unwrap_or(0);
        if same && terminal(end) && terminal(other) && (one_stated, one_ours) == (other_ours, other_stated) {
            return Vec::new();
        }
    }
    if only_aromatic && sums.iter().all(|&sum| sum == 0.0) { Vec::new() } else { differing }
}

#[test]
fn open_set_connectivity_is_right() {
    let set = open_set();
    assert_eq!(set.len(), 158);
    let wrong: Vec<String> = set
        .iter()
        .filter(|(_, one)| pairs(&found(one)) != one.pairs())
        .map(|(stem, one)| format!("{stem}: {:?} instead of {:?}", pairs(&found(one)), one.pairs()))
        .collect();
    assert!(wrong.is_empty(), "{wrong:#?}");
}

#[test]
fn open_set_orders_differ_only_where_listed() {
    let mut lines = Vec::new();
    for (stem, one) in open_set() {
        for (a, b, stated, ours) in differing(&one, &found(&one)) {
            lines.push(format!("{stem},{}-{},{stated},{ours}", a + 1, b + 1));
        }
    }
    let listed = std::fs::read_to_string(folder("open_set").join("order_differences.csv")).unwrap();
    let listed: Vec<&str> =
        listed.lines().skip(1).map(|line| line.rsplit_once(',').map_or(line, |(cells, _)| cells)).collect();
    assert_eq!(lines, listed);
}

/// All molecules of the open set are closed-shell and need no remark about valence.
#[test]
fn open_set_valences_are_possible() {
    for (stem, one) in open_set() {
        let bonding = found(&one);
        assert_eq!(bonding.remarks & remark::IMPOSSIBLE_VALENCE, 0, "{stem}");
        assert_eq!(bonding.remarks & remark::OPEN_SHELL, 0, "{stem}");
        assert_eq!(bonding.formal_charge.iter().sum::<i32>(), 0, "{stem}");
    }
}

/// Gaussian noise of 0.05 Å on every coordinate, seeds 1 to 20: at least 99 % of the structures keep all their bonds.
#[test]
fn connectivity_survives_noise() {
    let (mut right, mut all) = (0, 0);
    let mut wrong: BTreeMap<String, usize> = BTreeMap::new();
    for (stem, one) in open_set() {
        for seed in 1..=20 {
            let mut numbers = Numbers(seed);
            let mut noisy = one.clone();
            for x in noisy.xyz.iter_mut().flatten() {
                *x += 0.05 * numbers.normal();
            }
            all += 1;
            if find_bonds(noisy.molecule(), BONDS_ALTERNATING).is_ok_and(|bonding| pairs(&bonding) == one.pairs()) {
                right += 1;
            } else {
                *wrong.entry(stem.clone()).or_default() += 1;
            }
        }
    }
    println!("{right} of {all} right; wrong: {wrong:?}");
    assert!(right * 100 >= all * 99, "{right} of {all}; {wrong:?}");
}

/// Renumbering the atoms renumbers the bonds: same pairs, same charges by element, same sums of orders, same rings.
#[test]
fn atom_order_does_not_matter() {
    let mut numbers = Numbers(5);
    for (stem, one) in open_set() {
        let n = one.z.len();
        let mut place: Vec<usize> = (0..n).collect();
        for i in (1..n).rev() {
            place.swap(i, (numbers.next() * (i as f64 + 1.0)) as usize);
        }
        let shuffled = Structure {
            z: place.iter().map(|&i| one.z[i]).collect(),
            xyz: place.iter().map(|&i| one.xyz[i]).collect(),
            bonds: BTreeMap::new(),
        };
        let (before, after) = (found(&one), found(&shuffled));
        let mut back: Vec<(u32, u32, bool)> = after
            .bonds
            .iter()
            .zip(&after.aromatic)
            .map(|(bond, &aromatic)| {
                let (a, b) = (place[bond.a as usize] as u32, place[bond.b as usize] as u32);
                (a.min(b), a.max(b), aromatic)
            })
            .collect();
        back.sort_unstable();
        let expected: Vec<(u32, u32, bool)> =
            before.bonds.iter().zip(&before.aromatic).map(|(bond, &aromatic)| (bond.a, bond.b, aromatic)).collect();
        assert_eq!(back, expected, "{stem}");
        let sum = |bonding: &Bonding| bonding.bonds.iter().map(|bond| bond.order).sum::<f64>();
        assert_eq!(sum(&before), sum(&after), "{stem}");
        let sorted = |bonding: &Bonding, z: &[i32]| {
            let mut charges: Vec<(i32, i32)> = z.iter().copied().zip(bonding.formal_charge.iter().copied()).collect();
            charges.sort_unstable();
            charges
        };
        assert_eq!(sorted(&before, &one.z), sorted(&after, &shuffled.z), "{stem}");
    }
}

#[test]
fn atoms_too_close_are_named() {
    let molecule = Molecule {
        atomic_number: &[6, 1, 1],
        formal_charge: None,
        xyz: &[[0.0, 0.0, 0.0], [1.1, 0.0, 0.0], [0.0, 0.3, 0.0]],
    };
    let failure = find_bonds(molecule, BONDS_ALTERNATING).unwrap_err();
    assert_eq!((failure.code, failure.item), (Code::AtomsTooClose, 2));
    let failure = find_bonds(molecule, bondmoment::selectors::RADII_CORDERO_2008).unwrap_err();
    assert_eq!((failure.code, failure.argument), (Code::WrongSelector, 1));
}

/// A graphene flake of forty hexagons a side is too wide for the exact search; its double bonds are still a perfect
/// matching, which a parallelogram of hexagons has.
#[test]
fn wide_flakes_alternate() {
    let (side, length) = (40, 1.42);
    let step = length * 3.0_f64.sqrt();
    // A parallelogram of hexagons, without the atoms of its rim that have one neighbour only.
    let mut xyz = Vec::new();
    for i in 0..=side {
        for j in 0..=side {
            let origin = [step * (f64::from(i) + 0.5 * f64::from(j)), 1.5 * length * f64::from(j), 0.0];
            if j > 0 && (i, j) != (side, side) {
                xyz.push(origin);
            }
            if j < side && (i, j) != (0, 0) {
                xyz.push([origin[0], origin[1] + length, 0.0]);
            }
        }
    }
    let carbons = xyz.len();
    for i in 0..carbons {
        let p = xyz[i];
        let near = |q: &&[f64; 3]| {
            let (x, y) = (q[0] - p[0], q[1] - p[1]);
            (0.1..2.2).contains(&(x * x + y * y))
        };
        let others: Vec<[f64; 3]> = xyz[..carbons].iter().filter(near).copied().collect();
        if let [one, other] = *others {
            let (x, y) = (2.0 * p[0] - one[0] - other[0], 2.0 * p[1] - one[1] - other[1]);
            xyz.push([p[0] + x * 1.09 / length, p[1] + y * 1.09 / length, 0.0]);
        }
    }
    let z: Vec<i32> = (0..xyz.len()).map(|i| if i < carbons { 6 } else { 1 }).collect();
    let bonding =
        find_bonds(Molecule { atomic_number: &z, formal_charge: None, xyz: &xyz }, BONDS_ALTERNATING).unwrap();
    let mut doubles = vec![0; z.len()];
    for bond in bonding.bonds.iter().filter(|bond| bond.order == 2.0) {
        doubles[bond.a as usize] += 1;
        doubles[bond.b as usize] += 1;
    }
    assert!(doubles[..carbons].iter().all(|&count| count == 1), "{doubles:?}");
    assert!(carbons > 3000 && xyz.len() > carbons + 100);
}
