//! Whether stated bonds can be bonds at all: a slip of units shows here.

use super::radii::radii;
use super::{connect::TOO_CLOSE, distance};
use crate::molecule::{Bonding, Molecule};
use crate::status::{Code, Failure};

/// Checks that no stated bond is shorter than any bond of its elements, as it is in coordinates given in nanometres.
///
/// # Errors
/// `AtomsTooClose` with the later atom of the bond as item.
pub fn given_lengths(molecule: Molecule<'_>, bonding: &Bonding) -> Result<(), Failure> {
    for bond in &bonding.bonds {
        let (a, b) = (bond.a as usize, bond.b as usize);
        let (Some(&za), Some(&zb)) = (molecule.atomic_number.get(a), molecule.atomic_number.get(b)) else { continue };
        if a >= molecule.xyz.len() || b >= molecule.xyz.len() {
            continue;
        }
        if distance(molecule.xyz, bond.a, bond.b) < TOO_CLOSE * (radii().reach(za) + radii().reach(zb)) {
            return Err(Failure::new(Code::AtomsTooClose).item(b));
        }
    }
    Ok(())
}
