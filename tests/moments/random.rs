//! A small generator of repeatable numbers and the motions that no answer may depend on.

/// Xorshift of 64 bits (G. Marsaglia, J. Stat. Softw. 2003, 8, 14; from memory).
pub struct Random(pub u64);

impl Random {
    /// Between 0 and 1.
    pub fn unit(&mut self) -> f64 {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        (self.0 >> 11) as f64 / (1_u64 << 53) as f64
    }

    /// Between −1 and 1.
    pub fn sign(&mut self) -> f64 {
        2.0 * self.unit() - 1.0
    }

    pub fn vector(&mut self) -> [f64; 3] {
        [self.sign(), self.sign(), self.sign()]
    }

    /// A rotation matrix, from a unit quaternion.
    pub fn rotation(&mut self) -> [[f64; 3]; 3] {
        loop {
            let [x, y, z] = self.vector();
            let w = self.sign();
            let square = w * w + x * x + y * y + z * z;
            if (0.01..1.0).contains(&square) {
                let s = 2.0 / square;
                return [
                    [1.0 - s * (y * y + z * z), s * (x * y - w * z), s * (x * z + w * y)],
                    [s * (x * y + w * z), 1.0 - s * (x * x + z * z), s * (y * z - w * x)],
                    [s * (x * z - w * y), s * (y * z + w * x), 1.0 - s * (x * x + y * y)],
                ];
            }
        }
    }

    /// Numbers 0 to n − 1 in some order.
    pub fn permutation(&mut self, n: usize) -> Vec<usize> {
        let mut order: Vec<usize> = (0..n).collect();
        for i in (1..n).rev() {
            order.swap(i, (self.unit() * (i + 1) as f64) as usize);
        }
        order
    }
}

pub fn turned(m: &[[f64; 3]; 3], v: [f64; 3]) -> [f64; 3] {
    m.map(|row| row[0] * v[0] + row[1] * v[1] + row[2] * v[2])
}

pub fn length(v: [f64; 3]) -> f64 {
    (v[0] * v[0] + v[1] * v[1] + v[2] * v[2]).sqrt()
}

pub fn difference(a: [f64; 3], b: [f64; 3]) -> [f64; 3] {
    [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
}

/// The point turned by an angle about the axis from `a` to `b` (O. Rodrigues 1840).
pub fn about_axis(point: [f64; 3], a: [f64; 3], b: [f64; 3], angle: f64) -> [f64; 3] {
    let along = difference(b, a);
    let u = along.map(|x| x / length(along));
    let r = difference(point, a);
    let (c, s) = (libm::cos(angle), libm::sin(angle));
    let parallel = (u[0] * r[0] + u[1] * r[1] + u[2] * r[2]) * (1.0 - c);
    let cross = [u[1] * r[2] - u[2] * r[1], u[2] * r[0] - u[0] * r[2], u[0] * r[1] - u[1] * r[0]];
    [0, 1, 2].map(|k| a[k] + c * r[k] + s * cross[k] + parallel * u[k])
}
