//! The bonds about which parts of a molecule turn, and the rigid fragments between them.
//!
//! A hinge is a bond of order below 1.5 that is not aromatic and
//! - lies in no ring, both its atoms having a further neighbour (so methyl turns, hydrogen does not), and is no
//!   C-N bond of an amide or thioamide; or
//! - lies in rings that are all flexible: of four or more atoms with sp3 members (two of them in rings up to five,
//!   one in larger ones), where a member with single bonds only counts as sp3 if it has four neighbours or the ring is
//!   not flat; rings of more than eight atoms need one such member in their ring system; or
//! - joins a pyramidal amine nitrogen to an atom with a further neighbour, outside rigid cages: nitrogen inversion is then
//!   a reflection of the nitrogen's own fragment, which the bound allows for.
//!
//! A ring with a bond of order 0 (hydrogen and halogen bridges, chelates) is stiff. A ring of which three or more atoms are
//! bonded to one metal by order 0 turns as a whole about the axis from the metal to the centre of those atoms.
//!
//! Cages are rigid: rings up to seven of which two share more than two atoms (norbornane, adamantane), and three
//! rings up to five around one atom that pairwise share a bond (cubane). Turning about a bond to a linear group is
//! a hinge that changes nothing.

use super::algebra::{Vec3, cross, dot, eigen, norm, sub, unit};
use super::symmetry::symmetric_about;
use crate::bonds::find::Rings;
use crate::bonds::is_metal;
use crate::molecule::{Bonding, Molecule, Neighbours};

/// A part with more atoms than this is not searched for symmetry about its hinge.
const LARGEST_ROTOR: usize = 64;
/// Tolerance of that symmetry [Å].
const ROTOR_WITHIN_A: f64 = 0.05;
/// A ring is flat, a nitrogen planar, within this distance [Å].
const FLAT_WITHIN_A: f64 = 0.1;

/// Hinges and fragments of a molecule.
pub(super) struct Hinges {
    /// The two atoms of every hinge; of a ring on a metal, the metal and its first ring atom.
    pub(super) bonds: Vec<(u32, u32)>,
    /// Of a ring on a metal, the ring atoms bonded to it, through whose centre the axis passes; else empty.
    bound: Vec<Vec<u32>>,
    /// The fragments of those atoms.
    pub(super) ends: Vec<(usize, usize)>,
    /// The fragment of every atom.
    pub(super) fragment: Vec<u32>,
    /// Number of fragments.
    pub(super) fragments: usize,
    /// One entry a hinge: it lies in a ring.
    in_ring: Vec<bool>,
}

pub(super) fn find(molecule: Molecule<'_>, bonding: &Bonding) -> Hinges {
    let atoms = molecule.len();
    let around = Neighbours::new(atoms, &bonding.bonds);
    let rings = Rings::new(atoms, &bonding.bonds);
    let scene = Scene { molecule, bonding, around: &around };
    let ring_bonds = flexible_ring_bonds(&scene, &rings);
    let mut is_hinge = vec![false; bonding.bonds.len()];
    for (k, (bond, slot)) in bonding.bonds.iter().zip(&mut is_hinge).enumerate() {
        let (i, j) = (bond.a as usize, bond.b as usize);
        if i >= atoms || j >= atoms || i == j || !scene.is_single(k) || scene.is_amide(i, j) || scene.is_amide(j, i) {
            continue;
        }
        *slot = if rings.in_ring(k) {
            match ring_bonds.get(k) {
                Some(RingBond::Flexible) => true,
                Some(RingBond::Stiff) => scene.is_pyramidal_amine(i) || scene.is_pyramidal_amine(j),
                _ => false,
            }
        } else {
            around.degree(i) > 1 && around.degree(j) > 1
        };
    }
    let turning = turning_rings(&scene);
    let mut cut = is_hinge.clone();
    for slot in turning.iter().flat_map(|ring| &ring.bonds).map(|&k| k as usize) {
        cut.iter_mut().skip(slot).take(1).for_each(|cut| *cut = true);
    }
    let kept: Vec<_> = bonding.bonds.iter().zip(&cut).filter(|(_, cut)| !**cut).map(|(bond, _)| *bond).collect();
    let (fragment, fragments) = Neighbours::new(atoms, &kept).fragments();
    let mut hinges =
        Hinges { bonds: Vec::new(), bound: Vec::new(), ends: Vec::new(), fragment, fragments, in_ring: Vec::new() };
    for (k, (bond, _)) in bonding.bonds.iter().zip(&is_hinge).enumerate().filter(|(_, (_, hinge))| **hinge) {
        let of = |atom: u32| hinges.fragment.get(atom as usize).map_or(0, |&fragment| fragment as usize);
        let ends = (of(bond.a), of(bond.b));
        // Around a ring with a single hinge nothing turns.
        if ends.0 != ends.1 {
            hinges.bonds.push((bond.a, bond.b));
            hinges.bound.push(Vec::new());
            hinges.ends.push(ends);
            hinges.in_ring.push(rings.in_ring(k));
        }
    }
    for ring in turning {
        let of = |atom: u32| hinges.fragment.get(atom as usize).map_or(0, |&fragment| fragment as usize);
        let Some(&first) = ring.atoms.first() else { continue };
        let ends = (of(ring.metal), of(first));
        if ends.0 != ends.1 {
            hinges.bonds.push((ring.metal, first));
            hinges.bound.push(ring.atoms);
            hinges.ends.push(ends);
            hinges.in_ring.push(false);
        }
    }
    hinges
}

impl Hinges {
    /// Two points of the axis of a hinge; `points` holds one point an atom.
    pub(super) fn axis(&self, hinge: usize, points: &[Vec3]) -> (Vec3, Vec3) {
        let at = |atom: u32| points.get(atom as usize).copied().unwrap_or_default();
        let (i, j) = self.bonds.get(hinge).copied().unwrap_or_default();
        match self.bound.get(hinge) {
            Some(bound) if !bound.is_empty() => {
                let places: Vec<Vec3> = bound.iter().map(|&atom| at(atom)).collect();
                (at(i), super::dipole::centre_of_positions(&places))
            }
            _ => (at(i), at(j)),
        }
    }
}

/// A ring on a metal.
struct TurningRing {
    metal: u32,
    /// The ring atoms bonded to it and the bonds.
    atoms: Vec<u32>,
    bonds: Vec<u32>,
}

/// Rings of non-metals with ordered bonds of which three or more atoms are bonded to one metal by order 0. Of rings that
/// share such atoms the first counts; the others then hold it.
fn turning_rings(scene: &Scene<'_>) -> Vec<TurningRing> {
    let mut found: Vec<TurningRing> = Vec::new();
    // With the metal, two neighbours in the ring make a smaller ring of three; without it the ring itself is listed.
    let ordered: Vec<_> = scene.bonding.bonds.iter().filter(|bond| bond.order > 0.0).copied().collect();
    if ordered.len() == scene.bonding.bonds.len() {
        return found;
    }
    let rings = Rings::new(scene.molecule.len(), &ordered);
    for ring in &rings.small {
        let order_to = |k: u32| scene.bonding.bonds.get(k as usize).map_or(0.0, |bond| bond.order);
        let whole = ring.iter().all(|&atom| {
            let inside = |&&(other, k): &&(u32, u32)| ring.contains(&other) && order_to(k) > 0.0;
            !is_metal(scene.element(atom as usize)) && scene.around.of(atom as usize).iter().filter(inside).count() == 2
        });
        if !whole {
            continue;
        }
        let mut to_metals: Vec<(u32, u32, u32)> = Vec::new();
        for &atom in ring {
            for &(other, k) in scene.around.of(atom as usize) {
                if order_to(k) == 0.0 && is_metal(scene.element(other as usize)) && !ring.contains(&other) {
                    to_metals.push((other, atom, k));
                }
            }
        }
        to_metals.sort_unstable();
        for own in to_metals.chunk_by(|one, other| one.0 == other.0).filter(|own| own.len() >= 3) {
            let Some(&(metal, ..)) = own.first() else { continue };
            let atoms: Vec<u32> = own.iter().map(|entry| entry.1).collect();
            let shares = |known: &TurningRing| known.metal == metal && known.atoms.iter().any(|a| atoms.contains(a));
            if !found.iter().any(shares) {
                found.push(TurningRing { metal, atoms, bonds: own.iter().map(|entry| entry.2).collect() });
            }
        }
    }
    found
}

/// True if turning about some bond may change the dipole of a molecule whose charges are not known. Harmless are turns of
/// a part that is its own image under a rotation about the bond (methyl, phenyl, trifluoromethyl) or lies on its axis: such
/// a part, of up to 64 atoms, has no moment across the bond. Rings with hinges are taken to matter.
pub fn may_change_by_turning(molecule: Molecule<'_>, bonding: &Bonding) -> bool {
    let hinges = find(molecule, bonding);
    if hinges.in_ring.iter().any(|&ring| ring) {
        return true;
    }
    let around = Neighbours::new(molecule.len(), &bonding.bonds);
    let at = |atom: u32| molecule.xyz.get(atom as usize).copied().unwrap_or_default();
    let harmless = |hinge: usize| {
        let (Some(&(i, j)), (from, to)) = (hinges.bonds.get(hinge), hinges.axis(hinge, molecule.xyz)) else {
            return false;
        };
        let Some(axis) = unit(sub(to, from)) else { return false };
        let single = [j];
        let far = hinges.bound.get(hinge).filter(|bound| !bound.is_empty()).map_or(&single[..], Vec::as_slice);
        [true, false].iter().any(|&beyond| match part(&around, i, far, beyond) {
            Some(atoms) => {
                let places: Vec<(i32, Vec3)> = atoms
                    .iter()
                    .map(|&atom| (molecule.atomic_number.get(atom as usize).copied().unwrap_or(0), at(atom)))
                    .collect();
                symmetric_about(&places, from, axis, ROTOR_WITHIN_A)
            }
            None => false,
        })
    };
    !(0..hinges.bonds.len()).all(harmless)
}

/// The atoms on the far side of the bonds from `root` to the atoms `far`, which lie in no ring with others, or those on
/// the side of `root`; `None` if there are too many.
fn part(around: &Neighbours, root: u32, far: &[u32], beyond: bool) -> Option<Vec<u32>> {
    let mut atoms = if beyond { far.to_vec() } else { vec![root] };
    let mut head = 0;
    while let Some(&atom) = atoms.get(head) {
        head += 1;
        for &(other, _) in around.of(atom as usize) {
            let back = (other == root && far.contains(&atom)) || (atom == root && far.contains(&other));
            if !back && !atoms.contains(&other) {
                atoms.push(other);
            }
        }
        if atoms.len() > LARGEST_ROTOR {
            return None;
        }
    }
    Some(atoms)
}

struct Scene<'a> {
    molecule: Molecule<'a>,
    bonding: &'a Bonding,
    around: &'a Neighbours,
}

impl Scene<'_> {
    fn order(&self, bond: usize) -> f64 {
        self.bonding.bonds.get(bond).map_or(0.0, |bond| bond.order)
    }

    fn is_single(&self, bond: usize) -> bool {
        self.order(bond) < 1.5 && self.bonding.aromatic.get(bond) != Some(&true)
    }

    fn element(&self, atom: usize) -> i32 {
        self.molecule.atomic_number.get(atom).copied().unwrap_or(0)
    }

    fn place(&self, atom: u32) -> Vec3 {
        self.molecule.xyz.get(atom as usize).copied().unwrap_or_default()
    }

    fn only_single(&self, atom: usize) -> bool {
        self.around.of(atom).iter().all(|&(_, k)| self.is_single(k as usize))
    }

    /// The nitrogen and the carbon of an amide or thioamide: N with single bonds beside C=O, C=S or C=Se.
    fn is_amide(&self, nitrogen: usize, carbon: usize) -> bool {
        let carbonyl = |&(other, k): &(u32, u32)| {
            self.order(k as usize) == 2.0 && matches!(self.element(other as usize), 8 | 16 | 34)
        };
        self.element(nitrogen) == 7
            && self.element(carbon) == 6
            && self.only_single(nitrogen)
            && self.around.of(carbon).iter().any(carbonyl)
    }

    /// A nitrogen with three single bonds that stands out of the plane of its neighbours.
    fn is_pyramidal_amine(&self, atom: usize) -> bool {
        match *self.around.of(atom) {
            [(a, _), (b, _), (c, _)] if self.element(atom) == 7 && self.only_single(atom) => {
                let origin = self.place(a);
                let normal = unit(cross(sub(self.place(b), origin), sub(self.place(c), origin)));
                let from = u32::try_from(atom).map_or([0.0; 3], |atom| sub(self.place(atom), origin));
                normal.is_some_and(|normal| dot(normal, from).abs() > FLAT_WITHIN_A)
            }
            _ => false,
        }
    }
}

/// What the rings through a bond let it do.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
enum RingBond {
    /// Turn: all of them are flexible.
    Flexible,
    /// Not turn, but a pyramidal nitrogen in it may invert.
    Stiff,
    /// Neither: part of a cage.
    Caged,
}

/// One entry a bond; entries of bonds in no ring mean nothing.
fn flexible_ring_bonds(scene: &Scene<'_>, rings: &Rings) -> Vec<RingBond> {
    let bonds = scene.bonding.bonds.len();
    let caged = cages(scene.molecule.len(), rings);
    let mut found = vec![RingBond::Flexible; bonds];
    let mut listed = vec![false; bonds];
    for (ring, caged) in rings.small.iter().zip(caged) {
        let state = match (caged, is_flexible(scene, ring)) {
            (true, _) => RingBond::Caged,
            (false, true) => RingBond::Flexible,
            (false, false) => RingBond::Stiff,
        };
        for (place, &atom) in ring.iter().enumerate() {
            let next = ring.get(place + 1).or(ring.first()).copied().unwrap_or(atom);
            for &(other, k) in scene.around.of(atom as usize) {
                if let (true, Some(slot), Some(seen)) =
                    (other == next, found.get_mut(k as usize), listed.get_mut(k as usize))
                {
                    *slot = (*slot).max(state);
                    *seen = true;
                }
            }
        }
    }
    // Large rings: one sp3 member anywhere in the ring system.
    let systems = rings.system.iter().flatten().max().map_or(0, |&last| last + 1);
    let mut soft = vec![false; systems];
    for (bond, system) in scene.bonding.bonds.iter().zip(&rings.system) {
        if let Some(slot) = system.and_then(|system| soft.get_mut(system)) {
            *slot |= [bond.a, bond.b].iter().any(|&atom| is_saturated(scene, atom as usize, true));
        }
    }
    let orders: Vec<f64> = scene.bonding.bonds.iter().map(|bond| bond.order).collect();
    let large = found.iter_mut().zip(&rings.system).zip(&orders).zip(&listed).filter(|(_, listed)| !**listed);
    for (((slot, system), order), _) in large {
        let soft = system.and_then(|system| soft.get(system)).copied().unwrap_or(false);
        *slot = if soft && *order > 0.0 { RingBond::Flexible } else { RingBond::Stiff };
    }
    found
}

/// An atom with single bonds only: with four neighbours, or in a ring that is not flat with two or three.
fn is_saturated(scene: &Scene<'_>, atom: usize, not_flat: bool) -> bool {
    let neighbours = scene.around.degree(atom);
    scene.only_single(atom) && (neighbours == 4 || (not_flat && (neighbours == 2 || neighbours == 3)))
}

fn is_flexible(scene: &Scene<'_>, ring: &[u32]) -> bool {
    let bridged = || {
        ring.iter().any(|&atom| {
            let inside = |&(other, k): &(u32, u32)| ring.contains(&other) && scene.order(k as usize) == 0.0;
            scene.around.of(atom as usize).iter().any(inside)
        })
    };
    if ring.len() < 4 || bridged() {
        return false;
    }
    let not_flat = !is_flat(scene, ring);
    let saturated = ring.iter().filter(|&&atom| is_saturated(scene, atom as usize, not_flat)).count();
    saturated >= if ring.len() <= 5 { 2 } else { 1 }
}

fn is_flat(scene: &Scene<'_>, ring: &[u32]) -> bool {
    let points: Vec<Vec3> = ring.iter().map(|&atom| scene.place(atom)).collect();
    let centre = super::dipole::centre_of_positions(&points);
    let mut spread = [[0.0; 3]; 3];
    for &p in &points {
        super::algebra::add_outer(&mut spread, sub(p, centre), 1.0);
    }
    let (_, vectors) = eigen(&spread);
    let normal = vectors[0];
    norm(normal).is_finite() && points.iter().all(|&p| dot(normal, sub(p, centre)).abs() <= FLAT_WITHIN_A)
}

/// One entry a small ring: part of a rigid cage.
fn cages(atoms: usize, rings: &Rings) -> Vec<bool> {
    let mut caged = vec![false; rings.small.len()];
    let mut of_atom: Vec<Vec<usize>> = vec![Vec::new(); atoms];
    for (r, ring) in rings.small.iter().enumerate().filter(|(_, ring)| ring.len() <= 7) {
        for &atom in ring {
            if let Some(list) = of_atom.get_mut(atom as usize) {
                list.push(r);
            }
        }
    }
    let ring = |r: usize| rings.small.get(r).map_or(&[][..], Vec::as_slice);
    let common =
        |a: usize, b: usize| -> Vec<u32> { ring(a).iter().copied().filter(|atom| ring(b).contains(atom)).collect() };
    let mut mark =
        |which: &[usize]| which.iter().for_each(|&r| caged.iter_mut().skip(r).take(1).for_each(|c| *c = true));
    for list in &of_atom {
        // Around one atom; a metal among many rings is left alone.
        let list = list.get(..list.len().min(24)).unwrap_or(&[]);
        for (place, &a) in list.iter().enumerate() {
            for (further, &b) in list.iter().enumerate().skip(place + 1) {
                let shared = common(a, b);
                if shared.len() > 2 {
                    mark(&[a, b]);
                    continue;
                }
                if shared.len() < 2 || ring(a).len() > 5 || ring(b).len() > 5 {
                    continue;
                }
                for &c in list.iter().skip(further + 1).filter(|&&c| ring(c).len() <= 5) {
                    let (second, third) = (common(b, c), common(a, c));
                    let distinct = shared != second && second != third && third != shared;
                    if second.len() == 2 && third.len() == 2 && distinct {
                        mark(&[a, b, c]);
                    }
                }
            }
        }
    }
    caged
}
