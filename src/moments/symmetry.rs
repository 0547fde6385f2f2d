//! Does the point group forbid a dipole?
//!
//! A dipole is a vector that every operation of the point group leaves as it is. So the operations are sought, proper and
//! improper, and the space of the vectors that all of them leave unchanged is cut down by each one found, until nothing
//! is left or no operation is left untried. (F. A. Cotton, Chemical Applications of Group Theory, 3rd edition, Wiley 1990;
//! from memory.)

use super::algebra::{Mat3, Vec3, apply, cross, dot, eigen, norm, perpendicular, scale, sub, unit};
use super::dipole::centre_of_positions;
use crate::molecule::Molecule;
use crate::status::{Code, Failure};

/// What the point group leaves of a dipole.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum DipoleSymmetry {
    /// Nothing: the dipole is zero.
    Forbidden,
    /// It lies along this unit vector, in either sense.
    Axis([f64; 3]),
    /// It lies in the plane with this unit normal.
    Plane([f64; 3]),
    /// It may point anywhere.
    Any,
}

/// Greatest number of looks at an atom in one search; what was found until then counts.
const WORK: u64 = 20_000_000;

/// A vector that an operation moves by less than this part of its length counts as left where it is: less than any
/// rotation of order up to 120 moves one across its axis, and more than the tolerance turns an operation.
const UNMOVED: f64 = 0.05;

/// What the point group, found within a tolerance, leaves of the dipole.
///
/// An operation counts if it takes every atom to within `tolerance_A` of an atom of the same element, one to one; isotopes
/// and charges are not looked at. Operations are built from the images of two reference atoms, chosen where they have the
/// fewest, fitted to all atoms by least squares, and then tested. After twenty million looks at an atom the search ends with
/// what it has found: what those operations forbid is forbidden, but others may have been missed, so that the
/// answer errs towards allowing a dipole.
///
/// # Errors
/// As [`Molecule::check`] · `OutOfRange` (tolerance not above 0 and below 1 Å).
#[allow(non_snake_case)] // Units are part of names.
pub fn dipole_symmetry(molecule: Molecule<'_>, tolerance_A: f64) -> Result<DipoleSymmetry, Failure> {
    molecule.check()?;
    if !(tolerance_A > 0.0 && tolerance_A < 1.0) {
        return Err(Failure::new(Code::OutOfRange));
    }
    left_by_operations(molecule.atomic_number, molecule.xyz, tolerance_A)
}

/// What the operations that take these atoms to one another leave of a dipole.
pub(super) fn left_by_operations(elements: &[i32], xyz: &[Vec3], tolerance: f64) -> Result<DipoleSymmetry, Failure> {
    let centre = centre_of_positions(xyz);
    let points: Vec<Vec3> = xyz.iter().map(|&r| sub(r, centre)).collect();
    let Some(longest) = points.iter().copied().max_by(|a, b| norm(*a).total_cmp(&norm(*b))) else {
        return Err(Failure::new(Code::NoAtoms));
    };
    let mut search = Search::new(elements, &points, tolerance);
    let inversion = [[-1.0, 0.0, 0.0], [0.0, -1.0, 0.0], [0.0, 0.0, -1.0]];
    if norm(longest) <= 0.5 * tolerance || search.holds(&inversion) {
        return Ok(DipoleSymmetry::Forbidden);
    }
    let axis = principal_axis(&points).or(unit(longest)).unwrap_or([0.0, 0.0, 1.0]);
    // Turning about the axis moves no atom of a linear molecule by more than the tolerance.
    if points.iter().all(|&p| norm(cross(axis, p)) <= 0.5 * tolerance) {
        return Ok(DipoleSymmetry::Axis(with_sense(axis)));
    }
    search.run();
    Ok(match search.kept[..] {
        [] => DipoleSymmetry::Forbidden,
        [axis] => DipoleSymmetry::Axis(with_sense(axis)),
        [a, b] => DipoleSymmetry::Plane(with_sense(unit(cross(a, b)).unwrap_or([0.0, 0.0, 1.0]))),
        _ => DipoleSymmetry::Any,
    })
}

/// The direction of greatest spread.
fn principal_axis(points: &[Vec3]) -> Option<Vec3> {
    let mut spread = [[0.0; 3]; 3];
    for &p in points {
        super::algebra::add_outer(&mut spread, p, 1.0);
    }
    let (_, vectors) = eigen(&spread);
    unit(vectors[2])
}

/// Of the two senses of a direction, the one whose largest component (the first of equals) is positive.
fn with_sense(v: Vec3) -> Vec3 {
    let mut largest = 0.0_f64;
    for x in v {
        if x.abs() > largest.abs() + 1e-9 {
            largest = x;
        }
    }
    if largest < 0.0 { scale(v, -1.0).map(|x| x + 0.0) } else { v }
}

struct Search<'a> {
    elements: &'a [i32],
    points: &'a [Vec3],
    tolerance: f64,
    /// How far from its image an atom is looked for before the operation is fitted.
    reach: f64,
    /// Atoms by cell.
    cells: Vec<([i64; 3], u32)>,
    work: u64,
    /// Orthonormal vectors that span what no operation found so far changes.
    kept: Vec<Vec3>,
    /// The atom at whose place the image of another one was found, by number of the trial.
    taken: Vec<u32>,
    trial: u32,
}

/// Edge of a cell [Å].
const CELL: f64 = 1.5;

fn cell_of(x: f64) -> i64 {
    // Coordinates are at most 1e9 Å, so the cast cannot overflow.
    libm::floor(x / CELL) as i64
}

impl<'a> Search<'a> {
    fn new(elements: &'a [i32], points: &'a [Vec3], tolerance: f64) -> Self {
        let mut cells: Vec<_> =
            points.iter().enumerate().map(|(i, p)| (p.map(cell_of), u32::try_from(i).unwrap_or(u32::MAX))).collect();
        cells.sort_unstable();
        Self {
            elements,
            points,
            tolerance,
            reach: (10.0 * tolerance).min(tolerance.max(0.35)),
            cells,
            work: WORK.max(4 * points.len() as u64),
            kept: vec![[1.0, 0.0, 0.0], [0.0, 1.0, 0.0], [0.0, 0.0, 1.0]],
            taken: vec![0; points.len()],
            trial: 0,
        }
    }

    /// Tries the operations that take a pair of reference atoms to any other such pair.
    fn run(&mut self) {
        let radius: Vec<f64> = self.points.iter().map(|&p| norm(p)).collect();
        let (order, images) = self.images(&radius);
        let largest = radius.iter().copied().fold(0.0, f64::max);
        let fewest = |fits: &dyn Fn(usize) -> bool| -> Option<usize> {
            let candidates = (0..radius.len()).filter(|&i| fits(i));
            candidates.min_by(|&i, &j| {
                let count = |i: usize| images.get(i).map_or(usize::MAX, |&(from, to)| to - from);
                let far = |i: usize| radius.get(i).copied().unwrap_or(0.0);
                count(i).cmp(&count(j)).then(far(j).total_cmp(&far(i))).then(i.cmp(&j))
            })
        };
        let far_enough = |i: usize| radius.get(i).is_some_and(|&r| r >= 0.25 * largest);
        let Some(first) = fewest(&far_enough) else { return };
        let a = self.point(first);
        let across: Vec<f64> = match unit(a) {
            Some(along) => self.points.iter().map(|&p| norm(cross(along, p))).collect(),
            None => return,
        };
        let widest = across.iter().copied().fold(0.0, f64::max);
        let wide_enough = |i: usize| across.get(i).is_some_and(|&h| h > 0.0 && h >= 0.5 * widest);
        let Some(second) = fewest(&wide_enough) else { return };
        let b = self.point(second);
        let separation = norm(sub(a, b));
        let of = |i: usize| {
            let (from, to) = images.get(i).copied().unwrap_or((0, 0));
            order.get(from..to).unwrap_or(&[])
        };
        for &image_a in of(first) {
            let a_new = self.point(image_a);
            for &image_b in of(second) {
                if self.kept.is_empty() || self.work == 0 {
                    return;
                }
                self.work = self.work.saturating_sub(1);
                let b_new = self.point(image_b);
                if (norm(sub(a_new, b_new)) - separation).abs() > 2.0 * self.tolerance {
                    continue;
                }
                for sign in [1.0, -1.0] {
                    let Some(trial) = onto(a, b, scale(a_new, sign), scale(b_new, sign)) else { continue };
                    let trial = trial.map(|row| row.map(|x| x * sign));
                    if self.would_cut(&trial)
                        && let Some(operation) = self.fitted(&trial, sign)
                    {
                        self.cut(&operation);
                    }
                }
            }
        }
    }

    fn point(&self, i: usize) -> Vec3 {
        self.points.get(i).copied().unwrap_or_default()
    }

    /// Atoms ordered by element and radius, and for every atom the part of that order that holds its possible images.
    fn images(&self, radius: &[f64]) -> (Vec<usize>, Vec<(usize, usize)>) {
        let key = |i: usize| (self.elements.get(i).copied().unwrap_or(0), radius.get(i).copied().unwrap_or(0.0));
        let mut order: Vec<usize> = (0..radius.len()).collect();
        order.sort_by(|&i, &j| key(i).0.cmp(&key(j).0).then(key(i).1.total_cmp(&key(j).1)).then(i.cmp(&j)));
        let window = 2.0 * self.tolerance;
        let mut images = vec![(0, 0); radius.len()];
        for i in 0..radius.len() {
            let (element, r) = key(i);
            let before = |&j: &usize| key(j).0 < element || (key(j).0 == element && key(j).1 < r - window);
            let until = |&j: &usize| key(j).0 < element || (key(j).0 == element && key(j).1 <= r + window);
            if let Some(slot) = images.get_mut(i) {
                *slot = (order.partition_point(before), order.partition_point(until));
            }
        }
        (order, images)
    }

    /// True if the operation would change some vector that is still kept.
    fn would_cut(&self, operation: &Mat3) -> bool {
        self.kept.iter().any(|&v| norm(sub(apply(operation, v), v)) > 0.5 * UNMOVED)
    }

    /// Keeps only those vectors that the operation leaves as they are.
    fn cut(&mut self, operation: &Mat3) {
        // Outside the space kept so far every vector is given a change of 2, so that only inner ones can pass.
        let mut change = [[0.0; 3]; 3];
        let moved: Vec<Vec3> = self.kept.iter().map(|&v| sub(apply(operation, v), v)).collect();
        for (v, moved_v) in self.kept.iter().zip(&moved) {
            for (w, moved_w) in self.kept.iter().zip(&moved) {
                let overlap = dot(*moved_v, *moved_w);
                for (row, x) in change.iter_mut().zip(v) {
                    for (cell, y) in row.iter_mut().zip(w) {
                        *cell += overlap * x * y;
                    }
                }
            }
        }
        for (k, row) in change.iter_mut().enumerate() {
            for (l, cell) in row.iter_mut().enumerate() {
                let inside: f64 = self.kept.iter().map(|v| v[k] * v[l]).sum();
                *cell += 4.0 * (if k == l { 1.0 } else { 0.0 } - inside);
            }
        }
        let (values, vectors) = eigen(&change);
        self.kept = values.iter().zip(vectors).filter(|(x, _)| **x <= UNMOVED * UNMOVED).map(|(_, v)| v).collect();
    }

    /// The operation fitted to all atoms, if it then holds within the tolerance. `sign`: −1 improper.
    fn fitted(&mut self, trial: &Mat3, sign: f64) -> Option<Mat3> {
        let image = self.mapping(trial)?;
        let mut product = [[0.0; 3]; 3];
        for (&p, &j) in self.points.iter().zip(&image) {
            let target = self.point(j as usize);
            for (row, x) in product.iter_mut().zip(p) {
                for (cell, y) in row.iter_mut().zip(target) {
                    *cell += sign * x * y;
                }
            }
        }
        let operation = rotation_from(&product).map(|row| row.map(|x| x * sign));
        let within =
            |(&p, &j): (&Vec3, &u32)| norm(sub(apply(&operation, p), self.point(j as usize))) <= self.tolerance;
        self.points.iter().zip(&image).all(within).then_some(operation)
    }

    /// True if the operation holds as it is.
    fn holds(&mut self, operation: &Mat3) -> bool {
        let Some(image) = self.mapping(operation) else { return false };
        let within = |(&p, &j): (&Vec3, &u32)| norm(sub(apply(operation, p), self.point(j as usize))) <= self.tolerance;
        self.points.iter().zip(&image).all(within)
    }

    /// The atom near whose place each atom's image falls, if they map one to one.
    fn mapping(&mut self, operation: &Mat3) -> Option<Vec<u32>> {
        self.trial += 1;
        let mut image = Vec::with_capacity(self.points.len());
        for (&p, &element) in self.points.iter().zip(self.elements) {
            let j = self.nearest(apply(operation, p), element)?;
            let taken = self.taken.get_mut(j as usize)?;
            *taken = self.trial;
            image.push(j);
        }
        Some(image)
    }

    /// The nearest atom of an element within reach that no other atom has taken in this trial.
    fn nearest(&mut self, place: Vec3, element: i32) -> Option<u32> {
        let low = place.map(|x| cell_of(x - self.reach));
        let high = place.map(|x| cell_of(x + self.reach));
        let mut best: Option<(f64, u32)> = None;
        for x in low[0]..=high[0] {
            for y in low[1]..=high[1] {
                for z in low[2]..=high[2] {
                    let cell = [x, y, z];
                    let from = self.cells.partition_point(|(other, _)| *other < cell);
                    for &(other, j) in self.cells.get(from..).unwrap_or(&[]) {
                        if other != cell {
                            break;
                        }
                        self.work = self.work.checked_sub(1)?;
                        let at = j as usize;
                        let free = self.taken.get(at).is_some_and(|&trial| trial != self.trial);
                        if !free || self.elements.get(at) != Some(&element) {
                            continue;
                        }
                        let distance = norm(sub(self.point(at), place));
                        if distance <= self.reach && best.is_none_or(|(least, _)| distance < least) {
                            best = Some((distance, j));
                        }
                    }
                }
            }
        }
        best.map(|(_, j)| j)
    }
}

/// The rotation that takes the direction of `a` to that of `a_new`, and the half-plane of `b` to that of `b_new`.
fn onto(a: Vec3, b: Vec3, a_new: Vec3, b_new: Vec3) -> Option<Mat3> {
    let frame = |a: Vec3, b: Vec3| -> Option<[Vec3; 3]> {
        let e1 = unit(a)?;
        let e3 = unit(cross(e1, b))?;
        Some([e1, cross(e3, e1), e3])
    };
    let (old, new) = (frame(a, b)?, frame(a_new, b_new)?);
    let mut rotation = [[0.0; 3]; 3];
    for (from, to) in old.iter().zip(&new) {
        for (row, x) in rotation.iter_mut().zip(to) {
            for (cell, y) in row.iter_mut().zip(from) {
                *cell += x * y;
            }
        }
    }
    Some(rotation)
}

/// The rotation that best takes one set of points to another, from the sum of products S of their components (row: from,
/// column: to), by the unit quaternion of B. K. P. Horn, J. Opt. Soc. Am. A 1987, 4, 629-642 (from memory).
fn rotation_from(s: &Mat3) -> Mat3 {
    let [[xx, xy, xz], [yx, yy, yz], [zx, zy, zz]] = *s;
    let matrix = [
        [xx + yy + zz, yz - zy, zx - xz, xy - yx],
        [yz - zy, xx - yy - zz, xy + yx, zx + xz],
        [zx - xz, xy + yx, yy - xx - zz, yz + zy],
        [xy - yx, zx + xz, yz + zy, zz - xx - yy],
    ];
    let (_, vectors) = eigen(&matrix);
    let [w, x, y, z] = vectors[3];
    [
        [w * w + x * x - y * y - z * z, 2.0 * (x * y - w * z), 2.0 * (x * z + w * y)],
        [2.0 * (x * y + w * z), w * w - x * x + y * y - z * z, 2.0 * (y * z - w * x)],
        [2.0 * (x * z - w * y), 2.0 * (y * z + w * x), w * w - x * x - y * y + z * z],
    ]
}

/// True if a set of atoms is its own image under some rotation by 2π/n, n = 2 … 6, about an axis through `origin`, or
/// lies on the axis: then it has no moment across the axis, whatever its charges.
pub(super) fn symmetric_about(atoms: &[(i32, Vec3)], origin: Vec3, axis: Vec3, tolerance: f64) -> bool {
    let e1 = perpendicular(axis);
    let e2 = cross(axis, e1);
    let places: Vec<(i32, Vec3)> = atoms
        .iter()
        .map(|&(element, r)| {
            let from = sub(r, origin);
            (element, [dot(from, e1), dot(from, e2), dot(from, axis)])
        })
        .collect();
    let half = 0.5 * 3.0_f64.sqrt();
    // Cosine and sine of 2π/n for n = 2, 3, 4, 5, 6.
    let root5 = 5.0_f64.sqrt();
    let turns = [
        (-1.0, 0.0),
        (-0.5, half),
        (0.0, 1.0),
        (0.25 * (root5 - 1.0), 0.25 * (10.0 + 2.0 * root5).sqrt()),
        (0.5, half),
    ];
    turns.iter().any(|&(c, s)| {
        places.iter().all(|&(element, [x, y, z])| {
            let image = [c * x - s * y, s * x + c * y, z];
            places.iter().any(|&(other, place)| other == element && norm(sub(place, image)) <= tolerance)
        })
    })
}
