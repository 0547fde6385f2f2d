//! How large can the dipole become when parts of the molecule turn about bonds?
//!
//! Bond lengths and angles are kept; the molecule is cut at its hinges (see `hinges`) into rigid fragments, and in
//! every conformation μ = Σ R_k m_k with one rotation (or, where nitrogen inverts, rotoinversion) a fragment. So
//! |μ| ≤ Σ |m_k|, once two freedoms are used that do not change the sum:
//! - a charge f on a point of the hinge axis, taken from one fragment and given to the other, makes fragments neutral and
//!   their moments independent of the origin: the point belongs to both;
//! - a vector c u along the axis may pass from one fragment to the other: the axis, too, belongs to both.
//!
//! Every choice of the c (and of charges circulating around rings of hinges) gives a valid bound; the best is found by
//! least squares (M. R. Hestenes, E. Stiefel, J. Res. Natl. Bur. Stand. 1952, 49, 409: conjugate gradients) and a few
//! reweighted steps (E. Weiszfeld, Tohoku Math. J. 1937, 43, 355: the least sum of distances); both from memory. Stopping
//! early only leaves the bound wider.

use super::algebra::{Vec3, add, dot, norm, scale, sub};
use super::dipole::{NEUTRAL_WITHIN_E, centre_of_positions};
use super::hinges::{Hinges, find};
use crate::charges::Charges;
use crate::constants::DEBYE_PER_E_ANGSTROM;
use crate::molecule::{Bonding, Molecule};
use crate::status::{Code, Failure};

pub use super::hinges::may_change_by_turning;

/// Reweighted steps after the least-squares one.
const STEPS: usize = 12;
/// Conjugate-gradient iterations a step.
const ITERATIONS: usize = 60;
/// Fragment moments below this [D] weigh no more than this one.
const LEAST_MOMENT_D: f64 = 1e-3;
/// Entries of all circulation columns together, a fragment: beyond this, further circulations stay zero.
const CIRCULATION_ENTRIES: usize = 16;

/// How far the dipole may grow by turning about bonds.
#[derive(Clone, Copy, Debug, PartialEq)]
#[allow(non_snake_case)] // Units are part of names.
pub struct Flexibility {
    /// An upper bound of |μ| [D] over all conformations; without hinges |μ| itself; infinite where there are hinges and the
    /// molecule, or a part of it that is not bonded to the rest, has a net charge.
    pub bound_D: f64,
    /// Number of bonds about which parts turn.
    pub hinges: usize,
}

/// Upper bound of |μ| over all conformations that keep bond lengths and angles and differ by turns about rotatable bonds,
/// by inversion of flexible rings and by inversion of amine nitrogen. Fragments that are not bonded to one another count as
/// turning freely, if there is any hinge.
///
/// # Errors
/// As [`Molecule::check`] · `Missing` (charges of another number).
pub fn greatest_dipole(molecule: Molecule<'_>, bonding: &Bonding, charges: &Charges) -> Result<Flexibility, Failure> {
    molecule.check()?;
    if charges.charge.len() != molecule.len() {
        return Err(Failure::of(Code::Missing, 5));
    }
    let hinges = find(molecule, bonding);
    let centre = centre_of_positions(molecule.xyz);
    let points: Vec<Vec3> = molecule.xyz.iter().map(|&r| sub(r, centre)).collect();
    let count = hinges.bonds.len();
    if count == 0 {
        let mut sum = [0.0; 3];
        for (&r, &q) in points.iter().zip(&charges.charge) {
            sum = add(sum, scale(r, q * DEBYE_PER_E_ANGSTROM));
        }
        let net = charges.sum().abs() > NEUTRAL_WITHIN_E;
        return Ok(Flexibility { bound_D: if net { f64::INFINITY } else { norm(sum) }, hinges: 0 });
    }
    let Some((moments, tree)) = neutral_moments(&hinges, &points, &charges.charge) else {
        return Ok(Flexibility { bound_D: f64::INFINITY, hinges: count });
    };
    let problem = Problem::new(&hinges, &tree, &points, moments);
    Ok(Flexibility { bound_D: problem.least_sum(), hinges: count })
}

/// How the fragments hang together: a spanning forest over the hinges.
struct Tree {
    /// Hinge towards the root and the fragment there, of every fragment.
    up: Vec<Option<(usize, usize)>>,
    depth: Vec<usize>,
    in_tree: Vec<bool>,
}

/// A point of a hinge axis: the middle of its bond, or between a metal and the centre of its ring.
fn middle(hinges: &Hinges, hinge: usize, points: &[Vec3]) -> Vec3 {
    let (from, to) = hinges.axis(hinge, points);
    scale(add(from, to), 0.5)
}

/// Moments [D] of the fragments, made neutral by charges on the hinges; `None` if a part has a net charge.
fn neutral_moments(hinges: &Hinges, points: &[Vec3], charge: &[f64]) -> Option<(Vec<Vec3>, Tree)> {
    let n = hinges.fragments;
    let mut net = vec![0.0; n];
    let mut moment = vec![[0.0; 3]; n];
    for ((&r, &q), &k) in points.iter().zip(charge).zip(&hinges.fragment) {
        *net.get_mut(k as usize)? += q;
        let own = moment.get_mut(k as usize)?;
        *own = add(*own, scale(r, q));
    }
    let (order, tree) = spanning_forest(hinges);
    for &k in order.iter().rev() {
        let surplus = *net.get(k)?;
        match *tree.up.get(k)? {
            Some((hinge, parent)) => {
                let carried = scale(middle(hinges, hinge, points), surplus);
                let own = moment.get_mut(k)?;
                *own = sub(*own, carried);
                let above = moment.get_mut(parent)?;
                *above = add(*above, carried);
                *net.get_mut(parent)? += surplus;
            }
            None if surplus.is_nan() || surplus.abs() > NEUTRAL_WITHIN_E => return None,
            None => {}
        }
    }
    moment.iter_mut().for_each(|m| *m = scale(*m, DEBYE_PER_E_ANGSTROM));
    Some((moment, tree))
}

fn spanning_forest(hinges: &Hinges) -> (Vec<usize>, Tree) {
    let n = hinges.fragments;
    let mut around: Vec<Vec<(usize, usize)>> = vec![Vec::new(); n];
    for (h, &(a, b)) in hinges.ends.iter().enumerate() {
        for (from, to) in [(a, b), (b, a)] {
            if let Some(list) = around.get_mut(from) {
                list.push((h, to));
            }
        }
    }
    let mut tree = Tree { up: vec![None; n], depth: vec![0; n], in_tree: vec![false; hinges.ends.len()] };
    let mut seen = vec![false; n];
    let mut order = Vec::with_capacity(n);
    for root in 0..n {
        if seen.get(root) != Some(&false) {
            continue;
        }
        if let Some(slot) = seen.get_mut(root) {
            *slot = true;
        }
        let mut head = order.len();
        order.push(root);
        while let Some(&k) = order.get(head) {
            head += 1;
            for &(h, other) in around.get(k).map_or(&[][..], Vec::as_slice) {
                let below = tree.depth.get(k).copied().unwrap_or(0) + 1;
                if let (Some(seen), Some(up), Some(depth), Some(used)) =
                    (seen.get_mut(other), tree.up.get_mut(other), tree.depth.get_mut(other), tree.in_tree.get_mut(h))
                    && !*seen
                {
                    (*seen, *up, *depth, *used) = (true, Some((h, k)), below, true);
                    order.push(other);
                }
            }
        }
    }
    (order, tree)
}

/// Minimise Σ_k |m_k + Σ_j x_j a_jk| over x.
struct Problem {
    moments: Vec<Vec3>,
    /// What one unit of each unknown adds to which fragments; all entries in one list, and where each unknown's begin.
    entries: Vec<(u32, Vec3)>,
    starts: Vec<usize>,
}

impl Problem {
    fn new(hinges: &Hinges, tree: &Tree, points: &[Vec3], moments: Vec<Vec3>) -> Self {
        let mut own = Self { entries: Vec::new(), starts: vec![0], moments };
        let index = |k: usize| u32::try_from(k).unwrap_or(u32::MAX);
        for (h, &(a, b)) in hinges.ends.iter().enumerate() {
            let (from, to) = hinges.axis(h, points);
            if let Some(axis) = super::algebra::unit(sub(to, from)) {
                own.entries.push((index(a), axis));
                own.entries.push((index(b), scale(axis, -1.0)));
                own.starts.push(own.entries.len());
            }
        }
        let most = own.entries.len() + CIRCULATION_ENTRIES * own.moments.len();
        for (h, &(a, b)) in hinges.ends.iter().enumerate() {
            if tree.in_tree.get(h) == Some(&true) {
                continue;
            }
            // A charge runs once around the ring that this hinge closes, from b up and down to a, and back through h.
            let closing = middle(hinges, h, points);
            let mut cycle: Vec<(u32, Vec3)> = vec![(index(b), closing), (index(a), scale(closing, -1.0))];
            let (mut low, mut high) = ((b, 1.0), (a, -1.0));
            let depth = |k: usize| tree.depth.get(k).copied().unwrap_or(0);
            while low.0 != high.0 && own.entries.len() + cycle.len() < most {
                if depth(low.0) < depth(high.0) {
                    (low, high) = (high, low);
                }
                let Some(Some((hinge, parent))) = tree.up.get(low.0) else { break };
                let place = scale(middle(hinges, *hinge, points), low.1);
                cycle.push((index(low.0), scale(place, -1.0)));
                cycle.push((index(*parent), place));
                low.0 = *parent;
            }
            if low.0 == high.0 {
                own.entries.extend(cycle);
                own.starts.push(own.entries.len());
            }
        }
        own
    }

    fn columns(&self) -> impl Iterator<Item = &[(u32, Vec3)]> {
        self.starts.windows(2).map(|range| match range {
            [from, to] => self.entries.get(*from..*to).unwrap_or(&[]),
            _ => &[],
        })
    }

    /// target += A x
    fn add_product(&self, x: &[f64], target: &mut [Vec3]) {
        for (column, &x) in self.columns().zip(x) {
            for &(k, a) in column {
                if let Some(v) = target.get_mut(k as usize) {
                    *v = add(*v, scale(a, x));
                }
            }
        }
    }

    /// Aᵀ W v
    fn gradient(&self, weights: &[f64], v: &[Vec3]) -> Vec<f64> {
        let part = |&(k, a): &(u32, Vec3)| match (weights.get(k as usize), v.get(k as usize)) {
            (Some(w), Some(&v)) => w * dot(a, v),
            _ => 0.0,
        };
        self.columns().map(|column| column.iter().map(part).sum()).collect()
    }

    /// The least Σ |m_k + (A x)_k| met on the way.
    fn least_sum(&self) -> f64 {
        let mut v = self.moments.clone();
        let sum = |v: &[Vec3]| v.iter().map(|&v| norm(v)).sum::<f64>();
        let mut best = sum(&v);
        let mut weights = vec![1.0; v.len()];
        // The first, unweighted step may lie above the start: each step is held against the one before it.
        let mut last = f64::INFINITY;
        for _ in 0..=STEPS {
            self.least_squares(&weights, &mut v);
            let now = sum(&v);
            best = best.min(now);
            if last - now < 1e-4 * now || best < LEAST_MOMENT_D {
                break;
            }
            last = now;
            for (w, &v) in weights.iter_mut().zip(&v) {
                *w = 1.0 / norm(v).max(LEAST_MOMENT_D);
            }
        }
        best
    }

    /// Moves v = m + A x to the least Σ w |v|², by conjugate gradients with the diagonal as preconditioner.
    fn least_squares(&self, weights: &[f64], v: &mut [Vec3]) {
        let square = |&(k, a): &(u32, Vec3)| weights.get(k as usize).map_or(0.0, |w| w * dot(a, a));
        let diagonal: Vec<f64> = self.columns().map(|column| column.iter().map(square).sum()).collect();
        let inner = |a: &[f64], b: &[f64]| a.iter().zip(b).map(|(a, b)| a * b).sum::<f64>();
        let conditioned = |r: &[f64]| -> Vec<f64> {
            r.iter().zip(&diagonal).map(|(r, d)| if *d > 0.0 { -r / d } else { 0.0 }).collect()
        };
        let mut r = self.gradient(weights, v);
        let mut z = conditioned(&r);
        let mut p = z.clone();
        let mut rz = -inner(&r, &z);
        let first = rz;
        for _ in 0..ITERATIONS {
            if rz.is_nan() || rz <= 1e-10 * first || first <= 0.0 {
                break;
            }
            let mut along = vec![[0.0; 3]; v.len()];
            self.add_product(&p, &mut along);
            let curvature: f64 = along.iter().zip(weights).map(|(&a, w)| w * dot(a, a)).sum();
            if curvature.is_nan() || curvature <= 0.0 {
                break;
            }
            let step = rz / curvature;
            for (v, a) in v.iter_mut().zip(along) {
                *v = add(*v, scale(a, step));
            }
            r = self.gradient(weights, v);
            z = conditioned(&r);
            let next = -inner(&r, &z);
            let beta = next / rz;
            rz = next;
            p.iter_mut().zip(&z).for_each(|(p, z)| *p = z + beta * *p);
        }
    }
}
