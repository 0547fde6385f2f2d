//! Bond orders: which bonds get none, what each atom can hold, and the cheapest assignment over each unsaturated part.

use super::aromatic::aromatic_bonds;
use super::charges;
use super::distance;
use super::kinds::{Kind, group, is_electron_poor, is_metallic, kind, ordinary_valence};
use super::matching;
use super::radii::radii;
use super::rings::Rings;
use super::solve::{Part, PartBond};
use super::states::{FORBIDDEN, MOST_PI, Shape, UNIT, angle_cost, charge_and_cost};
use crate::molecule::{Bond, Bonding, Molecule, Neighbours};

/// Weight of a bond length that is off by `LENGTH_SCALE` [units of cost].
const LENGTH_WEIGHT: f64 = 0.3;
/// Length [Å] at which the weight is reached; the cost grows with the square, …
const LENGTH_SCALE: f64 = 0.10;
/// … up to this many weights.
const LENGTH_MOST: f64 = 9.0;
/// Below this length [Å] nitrogen monoxide is the cation (1.06 Å), above it the radical (1.15 Å).
const SHORT_NITROSYL: f64 = 1.10;
/// N-O lengths [Å] of nitroxide radicals (common practice).
const NITROXIDE: core::ops::RangeInclusive<f64> = 1.24..=1.32;
/// Cost of each net elementary charge of an unsaturated part, in molecules of more than three atoms.
const PER_CHARGE: i64 = 2 * UNIT;
/// Cost of an atom of a ring stated as aromatic that gets no double bond, for carbon.
const AROMATIC_CARBON: i64 = 10 * UNIT;

/// Orders, charges and aromatic rings for bonds that were found. The orders of `bonds` are not read.
pub(super) fn assign(molecule: Molecule<'_>, mut bonds: Vec<Bond>, around: &Neighbours) -> Bonding {
    let z = molecule.atomic_number;
    let unordered = without_order(z, &bonds, around);
    for (bond, &unordered) in bonds.iter_mut().zip(&unordered) {
        bond.order = if unordered { 0.0 } else { 1.0 };
    }
    let rings = Rings::of(around, z.len(), &bonds);
    let shapes = shapes(molecule, &bonds, around, Some(&rings));
    let free: Vec<bool> = unordered.iter().map(|unordered| !unordered).collect();
    distribute(molecule, &shapes, &mut bonds, around, &free, true);
    finish(molecule, bonds, around, &shapes, &rings, true)
}

/// Charges, remarks and aromatic rings once all orders are whole numbers.
pub(super) fn finish(
    molecule: Molecule<'_>,
    bonds: Vec<Bond>,
    around: &Neighbours,
    shapes: &[Shape],
    rings: &Rings,
    all_there: bool,
) -> Bonding {
    let (formal_charge, remarks, item) = charges::derive(molecule, &bonds, around, shapes, all_there);
    let aromatic = aromatic_bonds(molecule.atomic_number, molecule.xyz, &formal_charge, &bonds, around, rings);
    Bonding { bonds, aromatic, formal_charge, remarks, item }
}

/// Bonds that get no order: to transition metals and the f block, bridges of hydrogen and halogens, bonds within boron
/// clusters, dative bonds to metals, and bonds of metals whose number fits no ordinary valence.
fn without_order(z: &[i32], bonds: &[Bond], around: &Neighbours) -> Vec<bool> {
    let element = |atom: u32| z[atom as usize];
    let mut none: Vec<bool> = bonds
        .iter()
        .map(|bond| {
            let bridge = |atom: u32| {
                let own = around.of(atom as usize);
                own.len() > 1
                    && match element(atom) {
                        1 | 9 => true,
                        _ => {
                            kind(element(atom)) == Kind::Halogen
                                && own.iter().all(|&(other, _)| is_electron_poor(element(other)))
                        }
                    }
            };
            let transition = |atom: u32| kind(element(atom)) == Kind::Transition;
            let crowded = |atom: u32| match element(atom) {
                5 | 6 => around.degree(atom as usize) > 4,
                _ => false,
            };
            let within_cluster = (element(bond.a) == 5 && crowded(bond.a) && (element(bond.b) == 5 || crowded(bond.b)))
                || (element(bond.b) == 5 && crowded(bond.b) && (element(bond.a) == 5 || crowded(bond.a)));
            bridge(bond.a) || bridge(bond.b) || transition(bond.a) || transition(bond.b) || within_cluster
        })
        .collect();
    for (atom, &metal) in z.iter().enumerate() {
        if !matches!(kind(metal), Kind::SBlock | Kind::MainMetal) {
            continue;
        }
        let ordered = |atom: usize, none: &[bool]| around.of(atom).iter().filter(|&&(_, k)| !none[k as usize]).count();
        for &(other, k) in around.of(atom) {
            let donor = element(other);
            let room = usize::try_from(ordinary_valence(donor)).unwrap_or(0);
            if !is_metallic(donor) && ordered(other as usize, &none) > room {
                none[k as usize] = true;
            }
        }
        let bridged = around.degree(atom) > ordered(atom, &none);
        let fits = match (group(metal), ordered(atom, &none)) {
            (_, 0) | (_, 1) => true,
            (2 | 12, n) => n == 2,
            (13, n) => n == 3 || n == 4 || (n == 2 && bridged),
            (14, n) => n == 2 || n == 4 || (n == 3 && bridged),
            (15, n) => n == 3 || n == 5 || (n == 2 && bridged),
            (16, n) => n == 2 || n == 4,
            _ => false,
        };
        if !fits {
            for &(_, k) in around.of(atom) {
                none[k as usize] = true;
            }
        }
    }
    none
}

/// The surroundings of every atom. Without rings the coordinates are not looked at (they may be a flat drawing).
pub(super) fn shapes(molecule: Molecule<'_>, bonds: &[Bond], around: &Neighbours, rings: Option<&Rings>) -> Vec<Shape> {
    let z = molecule.atomic_number;
    let crowded_boron = |atom: u32| z[atom as usize] == 5 && around.degree(atom as usize) > 4;
    let mut shapes: Vec<Shape> = (0..z.len())
        .map(|atom| {
            let own = around.of(atom);
            let partners: Vec<u32> =
                own.iter().filter(|&&(_, k)| bonds[k as usize].order > 0.0).map(|&(other, _)| other).collect();
            let shared = partners.len() < own.len();
            let mut shape = Shape {
                partners: partners.len(),
                shared,
                cluster: crowded_boron(atom as u32)
                    || (shared && matches!(z[atom], 1 | 6) && own.iter().any(|&(other, _)| crowded_boron(other))),
                stated: molecule.formal_charge.and_then(|charge| charge.get(atom).copied()),
                ..Shape::default()
            };
            if rings.is_some() {
                look(molecule, atom, &partners, &mut shape);
            }
            shape
        })
        .collect();
    for (atom, &element) in z.iter().enumerate().filter(|&(_, &element)| group(element) == 16) {
        let [(other, _)] = *around.of(atom) else { continue };
        let partner = shapes[other as usize];
        shapes[atom].triple = match z[other as usize] {
            6 => partner.partners == 1 || (partner.partners == 2 && partner.linear) || rings.is_none(),
            7 => partner.partners == 1 && distance(molecule.xyz, atom as u32, other) < SHORT_NITROSYL && element == 8,
            _ => false,
        };
    }
    if rings.is_some() {
        for atom in radicals(molecule, around) {
            shapes[atom].radical = true;
        }
    }
    // Rings of three, five and seven unsaturated carbon atoms carry the charge that makes Hückel's rule hold.
    for ring in rings.iter().flat_map(|rings| &rings.small) {
        let charge = match ring.len() {
            5 => -1,
            3 | 7 => 1,
            _ => continue,
        };
        if ring.iter().all(|&atom| z[atom as usize] == 6 && around.degree(atom as usize) <= 3) {
            for &atom in ring {
                shapes[atom as usize].trivalent_charge = charge;
            }
        }
    }
    shapes
}

/// Atoms that hold unpaired or unshared electrons without a charge: both of dicarbon, and the oxygen of a nitroxide, a
/// terminal one at a nitrogen with two other partners, if it is the only one and the number of electrons is odd.
fn radicals(molecule: Molecule<'_>, around: &Neighbours) -> Vec<usize> {
    let z = molecule.atomic_number;
    if z == [6, 6] {
        return vec![0, 1];
    }
    if z.iter().map(|&z| i64::from(z)).sum::<i64>() % 2 == 0 {
        return Vec::new();
    }
    let oxygen = |atom: usize| z[atom] == 8 && around.degree(atom) == 1;
    let nitroxide = |atom: usize| match *around.of(atom) {
        [(nitrogen, _)] if oxygen(atom) && z[nitrogen as usize] == 7 && around.degree(nitrogen as usize) == 3 => {
            let oxygens = around.of(nitrogen as usize).iter().filter(|entry| z[entry.0 as usize] == 8).count();
            oxygens == 1 && NITROXIDE.contains(&distance(molecule.xyz, atom as u32, nitrogen))
        }
        _ => false,
    };
    let found: Vec<usize> = (0..z.len()).filter(|&atom| nitroxide(atom)).collect();
    if found.len() == 1 { found } else { Vec::new() }
}

/// Angles about one atom.
fn look(molecule: Molecule<'_>, atom: usize, partners: &[u32], shape: &mut Shape) {
    let z = molecule.atomic_number;
    let unit = |other: u32| {
        let (p, q) = (molecule.xyz[atom], molecule.xyz[other as usize]);
        let length = distance(molecule.xyz, atom as u32, other).max(1e-9);
        [(q[0] - p[0]) / length, (q[1] - p[1]) / length, (q[2] - p[2]) / length]
    };
    let dot = |u: [f64; 3], v: [f64; 3]| u[0] * v[0] + u[1] * v[1] + u[2] * v[2];
    match *partners {
        [one, other] => {
            let cosine = dot(unit(one), unit(other));
            shape.linear = cosine < -0.866;
            // An angle below 115° belongs to a lone pair.
            shape.trivalent_charge = if shape.linear {
                1
            } else if cosine > -0.42 {
                -1
            } else {
                0
            };
        }
        [one, two, three] => {
            let (u, v, w) = (unit(one), unit(two), unit(three));
            let cross = [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
            // Volume of the three unit vectors: 0 in a plane, 0.77 at tetrahedral angles, 0.62 at 113.6°.
            let volume = dot(cross, w).abs();
            shape.pyramidal = volume > 0.62;
            let carbons = partners.iter().filter(|&&other| z[other as usize] == 6).count();
            let mean = partners.iter().map(|&other| distance(molecule.xyz, atom as u32, other)).sum::<f64>() / 3.0;
            shape.trivalent_charge = match (volume > 0.5, carbons) {
                (true, _) => -1,
                // Hyperconjugation draws the bonds of a carbocation together.
                (false, 3) if mean < 1.475 => 1,
                _ => 0,
            };
        }
        [..] if partners.len() == 4 => {
            let u: Vec<[f64; 3]> = partners.iter().map(|&other| unit(other)).collect();
            let opposite =
                (0..4).flat_map(|i| (i + 1..4).map(move |j| (i, j))).filter(|&(i, j)| dot(u[i], u[j]) < -0.9).count();
            shape.square = opposite == 2;
        }
        _ => {}
    }
}

/// Adds double-bond increments to the free bonds, whose orders are 1 before. With `geometry` bond lengths and angles
/// count; without, every carbon atom of a free bond should get a double bond.
pub(super) fn distribute(
    molecule: Molecule<'_>,
    shapes: &[Shape],
    bonds: &mut [Bond],
    around: &Neighbours,
    free: &[bool],
    geometry: bool,
) {
    let z = molecule.atomic_number;
    let costs = |atom: usize, bonds: &[Bond]| -> Option<([i64; MOST_PI + 1], [i32; MOST_PI + 1])> {
        let own = around.of(atom);
        let choices = own.iter().filter(|&&(_, k)| free[k as usize]).count();
        let terminal_halogen = kind(z[atom]) == Kind::Halogen && own.len() == 1;
        if choices == 0 || z[atom] == 1 || z[atom] == 9 || terminal_halogen || is_metallic(z[atom]) {
            return None;
        }
        let base: f64 = own.iter().map(|&(_, k)| bonds[k as usize].order).sum();
        let mut costs = [FORBIDDEN; MOST_PI + 1];
        let mut charges = [0; MOST_PI + 1];
        for (pi, (cost, charge)) in costs.iter_mut().zip(&mut charges).enumerate().take(2 * choices + 1) {
            (*charge, *cost) = charge_and_cost(z[atom], &shapes[atom], base as i32 + pi as i32);
            if geometry {
                *cost += angle_cost(z[atom], &shapes[atom], pi);
            } else if pi > 1 {
                // One double bond an atom, even where missing hydrogens leave room for two.
                *cost = FORBIDDEN;
            } else if pi == 0 && z[atom] == 6 {
                *cost += AROMATIC_CARBON;
            }
        }
        costs.iter().skip(1).any(|&cost| cost < FORBIDDEN).then_some((costs, charges))
    };
    let per_charge = if z.len() > 3 { PER_CHARGE } else { 0 };
    // Net charge of the saturated atoms of each fragment, looked up only once a part is charged.
    let saturated = |bonds: &[Bond]| -> (Vec<u32>, Vec<i64>) {
        let (fragment, count) = around.fragments();
        let mut net = vec![0; count];
        for (atom, &of) in fragment.iter().enumerate().filter(|&(atom, _)| costs(atom, bonds).is_none()) {
            let valence: f64 = around.of(atom).iter().map(|&(_, k)| bonds[k as usize].order).sum();
            let alone = around.degree(atom) == 0 || z[atom] == 1;
            net[of as usize] +=
                if alone { 0 } else { i64::from(charge_and_cost(z[atom], &shapes[atom], valence as i32).0) };
        }
        (fragment, net)
    };
    let before = bonds.to_vec();
    let mut rest = None;
    let mut place = vec![u32::MAX; z.len()];
    let mut stack = Vec::new();
    for first in 0..z.len() {
        if place[first] != u32::MAX {
            continue;
        }
        let Some(own) = costs(first, bonds) else { continue };
        let mut part = Part { atoms: vec![own.0], charges: vec![own.1], bonds: Vec::new() };
        let mut whole = Vec::new();
        place[first] = 0;
        stack.push(first);
        while let Some(atom) = stack.pop() {
            for &(other, k) in around.of(atom) {
                let there = other as usize;
                if !free[k as usize] {
                    continue;
                }
                if place[there] == u32::MAX {
                    let Some(own) = costs(there, bonds) else { continue };
                    place[there] = part.atoms.len() as u32;
                    part.atoms.push(own.0);
                    part.charges.push(own.1);
                    stack.push(there);
                }
                if atom < there {
                    whole.push(k);
                }
            }
        }
        if whole.is_empty() {
            continue;
        }
        // Within a part in the order of the bonds, so that the walk leaves no trace.
        whole.sort_unstable();
        part.bonds = whole
            .iter()
            .map(|&k| {
                let bond = bonds[k as usize];
                let cost = if geometry { length_costs(molecule, bond) } else { [0, 0, UNIT] };
                PartBond { a: place[bond.a as usize] as usize, b: place[bond.b as usize] as usize, cost }
            })
            .collect();
        let others = || {
            let (fragment, net) = rest.get_or_insert_with(|| saturated(&before));
            net[fragment[first] as usize]
        };
        let increments = part.settle(per_charge, others).unwrap_or_else(|| matching::increments(&part));
        for (&k, increment) in whole.iter().zip(increments) {
            bonds[k as usize].order += f64::from(increment);
        }
    }
}

/// Cost of orders 1, 2, 3 at the length of the bond, from Pyykkö's radii.
fn length_costs(molecule: Molecule<'_>, bond: Bond) -> [i64; 3] {
    let z = molecule.atomic_number;
    let length = distance(molecule.xyz, bond.a, bond.b);
    [1, 2, 3].map(|order| {
        let off = (length - radii().sum(order, z[bond.a as usize], z[bond.b as usize])) / LENGTH_SCALE;
        // An order without a radius counts as far off; f64::min passes over the NaN.
        let weights = (off * off).min(LENGTH_MOST);
        (weights * LENGTH_WEIGHT * UNIT as f64).round() as i64
    })
}
