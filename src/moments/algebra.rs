//! Vectors of three numbers and small symmetric matrices, by fixed sequences of + − × ÷ √ only.

pub(super) type Vec3 = [f64; 3];
pub(super) type Mat3 = [[f64; 3]; 3];

pub(super) fn add(a: Vec3, b: Vec3) -> Vec3 {
    [a[0] + b[0], a[1] + b[1], a[2] + b[2]]
}

pub(super) fn sub(a: Vec3, b: Vec3) -> Vec3 {
    [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
}

pub(super) fn scale(a: Vec3, factor: f64) -> Vec3 {
    [a[0] * factor, a[1] * factor, a[2] * factor]
}

pub(super) fn dot(a: Vec3, b: Vec3) -> f64 {
    a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}

pub(super) fn cross(a: Vec3, b: Vec3) -> Vec3 {
    [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]]
}

/// Length, free of overflow and underflow.
pub(super) fn norm(a: Vec3) -> f64 {
    let largest = a[0].abs().max(a[1].abs()).max(a[2].abs());
    if largest == 0.0 || !largest.is_finite() {
        return if a.iter().any(|x| x.is_nan()) { f64::NAN } else { largest };
    }
    if (1e-140..1e140).contains(&largest) {
        return dot(a, a).sqrt();
    }
    let unit = [a[0] / largest, a[1] / largest, a[2] / largest];
    largest * dot(unit, unit).sqrt()
}

/// The unit vector, or `None` of a vector without a direction.
pub(super) fn unit(a: Vec3) -> Option<Vec3> {
    let length = norm(a);
    (length > 0.0 && length.is_finite()).then(|| [a[0] / length, a[1] / length, a[2] / length])
}

pub(super) fn apply(m: &Mat3, v: Vec3) -> Vec3 {
    [dot(m[0], v), dot(m[1], v), dot(m[2], v)]
}

/// m += factor · a aᵀ
pub(super) fn add_outer(m: &mut Mat3, a: Vec3, factor: f64) {
    for (row, x) in m.iter_mut().zip(a) {
        for (cell, y) in row.iter_mut().zip(a) {
            *cell += factor * x * y;
        }
    }
}

/// Any unit vector at right angles to a unit vector.
pub(super) fn perpendicular(u: Vec3) -> Vec3 {
    let (x, y, z) = (u[0].abs(), u[1].abs(), u[2].abs());
    let other = if x <= y && x <= z {
        [1.0, 0.0, 0.0]
    } else if y <= z {
        [0.0, 1.0, 0.0]
    } else {
        [0.0, 0.0, 1.0]
    };
    unit(cross(u, other)).unwrap_or([0.0, 0.0, 1.0])
}

/// Eigenvalues in ascending order and eigenvectors (row k belongs to value k) of a symmetric matrix, by Jacobi
/// rotations; NaN throughout if an entry is not finite.
#[allow(clippy::needless_range_loop)] // Two rows and two columns change together.
pub(super) fn eigen<const N: usize>(matrix: &[[f64; N]; N]) -> ([f64; N], [[f64; N]; N]) {
    let mut a = *matrix;
    let mut vectors = [[0.0; N]; N];
    for k in 0..N {
        vectors[k][k] = 1.0;
    }
    if a.iter().flatten().any(|x| !x.is_finite()) {
        return ([f64::NAN; N], [[f64::NAN; N]; N]);
    }
    // Scaled, so that squares neither overflow nor vanish.
    let largest = a.iter().flatten().fold(0.0_f64, |most, x| most.max(x.abs()));
    if largest == 0.0 {
        return ([0.0; N], vectors);
    }
    a.iter_mut().flatten().for_each(|x| *x /= largest);
    // Convergence is quadratic: ten sweeps are plenty, the limit is for safety.
    for _ in 0..60 {
        let mut off = 0.0;
        for p in 0..N {
            for q in p + 1..N {
                off += a[p][q] * a[p][q];
            }
        }
        if off < 1e-40 {
            break;
        }
        for p in 0..N {
            for q in p + 1..N {
                if a[p][q] == 0.0 {
                    continue;
                }
                let theta = (a[q][q] - a[p][p]) / (2.0 * a[p][q]);
                let sign = if theta < 0.0 { -1.0 } else { 1.0 };
                let t =
                    if theta.abs() > 1e100 { 0.5 / theta } else { sign / (theta.abs() + (theta * theta + 1.0).sqrt()) };
                let c = 1.0 / (t * t + 1.0).sqrt();
                let s = t * c;
                for k in 0..N {
                    let (x, y) = (a[k][p], a[k][q]);
                    (a[k][p], a[k][q]) = (c * x - s * y, s * x + c * y);
                }
                for k in 0..N {
                    let (x, y) = (a[p][k], a[q][k]);
                    (a[p][k], a[q][k]) = (c * x - s * y, s * x + c * y);
                    let (x, y) = (vectors[p][k], vectors[q][k]);
                    (vectors[p][k], vectors[q][k]) = (c * x - s * y, s * x + c * y);
                }
            }
        }
    }
    let mut order = [0; N];
    for (k, slot) in order.iter_mut().enumerate() {
        *slot = k;
    }
    order.sort_by(|&i, &j| a[i][i].total_cmp(&a[j][j]).then(i.cmp(&j)));
    (order.map(|k| a[k][k] * largest), order.map(|k| vectors[k]))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Eigenvalues of the tridiagonal matrix (2, −1) of order n are 2 − 2 cos(kπ/(n + 1)): 2 − √2, 2, 2 + √2 for n = 3.
    #[test]
    fn eigenvalues_of_a_known_matrix() {
        let m = [[2.0, -1.0, 0.0], [-1.0, 2.0, -1.0], [0.0, -1.0, 2.0]];
        let (values, vectors) = eigen(&m);
        let root = 2.0_f64.sqrt();
        for (value, exact) in values.iter().zip([2.0 - root, 2.0, 2.0 + root]) {
            assert!((value - exact).abs() < 1e-14);
        }
        for (value, vector) in values.iter().zip(vectors) {
            assert!(norm(sub(apply(&m, vector), scale(vector, *value))) < 1e-14);
        }
    }

    #[test]
    fn extreme_and_broken_entries() {
        let (values, _) = eigen(&[[1e-200, 0.0], [0.0, 4e-200]]);
        assert!((values[1] / 4e-200 - 1.0).abs() < 1e-14);
        assert!(eigen(&[[f64::NAN, 0.0], [0.0, 1.0]]).0[0].is_nan());
        assert!((norm([3e200, 4e200, 0.0]) / 5e200 - 1.0).abs() < 1e-15);
        assert_eq!(norm([3.0, 4.0, 0.0]), 5.0);
    }
}
