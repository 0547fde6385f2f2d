//! Flat drawings: records whose coordinates are ink on paper, not a geometry.
//!
//! A molecule that happens to be planar is none. A drawing is: what its file calls two-dimensional and is flat; more than
//! one atom and all at one point (no coordinates were written); what is flat though an atom with four neighbours cannot
//! be; and what is flat with bond lengths that no molecule has, drawn to one scale whatever the elements.

use super::record::Record;
use crate::elements::covalent_radius;
use crate::molecule::Neighbours;
use crate::selectors::{RADII_CORDERO_2008, STATE_AS_LISTED};

/// Bonds may be this much longer or shorter than the radius sum, in the mean, before a flat record is a drawing.
const LONGEST_RATIO: f64 = 1.25;
const SHORTEST_RATIO: f64 = 0.75;

/// True for a flat drawing or a record without coordinates; the neighbours are those of its bonds.
pub(super) fn is_drawing(record: &Record, around: &Neighbours) -> bool {
    let Some(first) = record.xyz.first() else { return false };
    if record.xyz.len() < 2 {
        return false;
    }
    if record.drawing || record.xyz.iter().all(|point| point == first) {
        return true;
    }
    // Frames without stated bonds come from coordinates in space, however flat.
    if record.bonds.is_none() || record.xyz.iter().any(|point| point[2] != first[2]) {
        return false;
    }
    four_around_a_main_group_atom(record, around) || lengths_of_ink(record)
}

/// Carbon, nitrogen, silicon or phosphorus with four neighbours is never planar.
fn four_around_a_main_group_atom(record: &Record, around: &Neighbours) -> bool {
    let tetrahedral = |&(atom, &z): &(usize, &i32)| matches!(z, 6 | 7 | 14 | 15) && around.degree(atom) == 4;
    record.atomic_number.iter().enumerate().any(|pair| tetrahedral(&pair))
}

/// The bonds to hydrogen, or else all bonds, are off by more than any chemistry explains, in the mean of the ratio of
/// their length to the sum of the covalent radii.
fn lengths_of_ink(record: &Record) -> bool {
    let (mut hydrogen, mut hydrogens) = (0.0, 0_u32);
    let (mut all, mut count) = (0.0, 0_u32);
    for bond in record.bonds.iter().flatten() {
        let atom = |i: u32| Some((*record.atomic_number.get(i as usize)?, *record.xyz.get(i as usize)?));
        let (Some((za, a)), Some((zb, b))) = (atom(bond.a), atom(bond.b)) else { continue };
        let radius = |z| covalent_radius(RADII_CORDERO_2008, z, STATE_AS_LISTED).map(|radius| radius.value);
        let (Ok(ra), Ok(rb)) = (radius(za), radius(zb)) else { continue };
        let (x, y) = (a[0] - b[0], a[1] - b[1]);
        let ratio = (x * x + y * y).sqrt() / (ra + rb);
        all += ratio;
        count += 1;
        if (za == 1) != (zb == 1) {
            hydrogen += ratio;
            hydrogens += 1;
        }
    }
    let off = |sum: f64, count: u32| count > 0 && !(SHORTEST_RATIO..=LONGEST_RATIO).contains(&(sum / f64::from(count)));
    off(hydrogen, hydrogens) || off(all, count)
}
