//! Rotors XY3 whose setting the verdict does not depend on.

use super::algebra::{Vec3, add, cross, dot, norm, perpendicular, scale, sub, unit};
use super::symmetry::{DipoleSymmetry, left_by_operations};
use crate::molecule::{Molecule, Neighbours};
use crate::status::Failure;

/// How far the atoms of a rotor may be from threefold places [Å].
const ROTOR_WITHIN_A: f64 = 0.05;

/// True if the operations forbid a dipole once every rotor XY3 (methyl, CF3) that turns about a single bond counts as its
/// axis: with three like terminal atoms at threefold places it has no moment across the axis in any position, so that the
/// symmetry of the non-rigid molecule decides (H. C. Longuet-Higgins, Mol. Phys. 1963, 6, 445-460; from memory).
///
/// # Errors
/// `NoAtoms`.
pub(super) fn forbidden_with_free_rotors(
    molecule: Molecule<'_>,
    around: &Neighbours,
    order: &dyn Fn(u32) -> f64,
    tolerance: f64,
) -> Result<bool, Failure> {
    let element = |atom: u32| molecule.atomic_number.get(atom as usize).copied().unwrap_or(0);
    let at = |atom: u32| molecule.xyz.get(atom as usize).copied().unwrap_or_default();
    let mut kept = vec![true; molecule.len()];
    let mut added: Vec<(i32, Vec3)> = Vec::new();
    for centre in 0..molecule.len() {
        let own = around.of(centre);
        if own.len() != 4 || own.iter().any(|&(_, k)| order(k) != 1.0) {
            continue;
        }
        let (ends, roots): (Vec<u32>, Vec<u32>) =
            own.iter().map(|entry| entry.0).partition(|&atom| around.degree(atom as usize) == 1);
        let (&[p, q, r], &[root]) = (&ends[..], &roots[..]) else { continue };
        let origin = molecule.xyz.get(centre).copied().unwrap_or_default();
        let Some(axis) = unit(sub(origin, at(root))) else { continue };
        let places = [p, q, r].map(|atom| (element(atom), at(atom)));
        if element(p) != element(q) || element(q) != element(r) || !threefold(&places, origin, axis) {
            continue;
        }
        for atom in [p, q, r] {
            kept.iter_mut().skip(atom as usize).take(1).for_each(|kept| *kept = false);
        }
        let height = places.iter().map(|(_, place)| dot(sub(*place, origin), axis)).sum::<f64>() / 3.0;
        // A number that no atom has: three atoms of this element.
        added.push((1000 + element(p), add(origin, scale(axis, height))));
    }
    if added.is_empty() {
        return Ok(false);
    }
    let rest = molecule.atomic_number.iter().copied().zip(molecule.xyz.iter().copied()).zip(kept);
    let all = rest.filter(|(_, kept)| *kept).map(|(atom, _)| atom).chain(added);
    let (elements, xyz): (Vec<i32>, Vec<Vec3>) = all.unzip();
    Ok(left_by_operations(&elements, &xyz, tolerance)? == DipoleSymmetry::Forbidden)
}

/// True if a third of a turn about the axis takes the atoms to one another.
fn threefold(atoms: &[(i32, Vec3)], origin: Vec3, axis: Vec3) -> bool {
    let e1 = perpendicular(axis);
    let e2 = cross(axis, e1);
    let places: Vec<Vec3> = atoms
        .iter()
        .map(|(_, r)| {
            let from = sub(*r, origin);
            [dot(from, e1), dot(from, e2), dot(from, axis)]
        })
        .collect();
    let half = 0.5 * 3.0_f64.sqrt();
    places.iter().all(|&[x, y, z]| {
        let image = [-0.5 * x - half * y, half * x - 0.5 * y, z];
        norm([x, y, 0.0]) > 2.0 * ROTOR_WITHIN_A && places.iter().any(|&p| norm(sub(p, image)) <= ROTOR_WITHIN_A)
    })
}
