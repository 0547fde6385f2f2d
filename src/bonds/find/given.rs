//! Bonds that a file or a caller states: checked, completed, never changed in who is bonded to whom.

use super::orders::{distribute, finish, shapes};
use super::rings::Rings;
use crate::molecule::{Bond, Bonding, Molecule, Neighbours};
use crate::status::{Code, Failure};

/// Bonds as stated, sorted by (a, b) with a < b.
///
/// Orders are 0, 1, 2, 3 or 1.5 (aromatic); aromatic ones become alternating single and double bonds. Rings are marked,
/// formal charges filled in where they are not stated, impossible valences remarked (`IMPOSSIBLE_VALENCE`, the atom as
/// item). Coordinates only tell whether a ring is flat enough to be aromatic, so a flat drawing serves.
///
/// # Errors
/// Those of [`Molecule::check`] · `BadBond` (an atom that is not there, an atom with itself, a pair stated twice),
/// `Missing` (order NaN), `OutOfRange` (another order) with the bond as item · `TooLarge`.
pub fn given_bonds(molecule: Molecule<'_>, bonds: &[Bond]) -> Result<Bonding, Failure> {
    molecule.check()?;
    super::index_fits(molecule.len())?;
    super::index_fits(bonds.len())?;
    let atoms = molecule.len() as u32;
    let mut sorted: Vec<(Bond, usize)> = Vec::with_capacity(bonds.len());
    for (index, bond) in bonds.iter().enumerate() {
        if bond.a >= atoms || bond.b >= atoms || bond.a == bond.b {
            return Err(Failure::new(Code::BadBond).item(index));
        }
        if bond.order.is_nan() {
            return Err(Failure::new(Code::Missing).item(index));
        }
        if ![0.0, 1.0, 1.5, 2.0, 3.0].contains(&bond.order) {
            return Err(Failure::new(Code::OutOfRange).item(index));
        }
        let (a, b) = (bond.a.min(bond.b), bond.a.max(bond.b));
        // Adding 0 turns −0 into 0.
        sorted.push((Bond { a, b, order: bond.order + 0.0 }, index));
    }
    sorted.sort_unstable_by_key(|&(bond, index)| (bond.a, bond.b, index));
    let twice = sorted.windows(2).filter(|pair| (pair[0].0.a, pair[0].0.b) == (pair[1].0.a, pair[1].0.b));
    if let Some(later) = twice.map(|pair| pair[1].1).min() {
        return Err(Failure::new(Code::BadBond).item(later));
    }
    let mut bonds: Vec<Bond> = sorted.into_iter().map(|(bond, _)| bond).collect();
    let around = Neighbours::new(molecule.len(), &bonds);
    let free: Vec<bool> = bonds.iter().map(|bond| bond.order == 1.5).collect();
    for (bond, _) in bonds.iter_mut().zip(&free).filter(|(_, free)| **free) {
        bond.order = 1.0;
    }
    let shapes = shapes(molecule, &bonds, &around, None);
    distribute(molecule, &shapes, &mut bonds, &around, &free, false);
    let rings = Rings::of(&around, molecule.len(), &bonds);
    let all_there = molecule.atomic_number.contains(&1) || !molecule.atomic_number.contains(&6);
    Ok(finish(molecule, bonds, &around, &shapes, &rings, all_there))
}
