//! A value with its standard uncertainty, and the law of propagation.
//!
//! Uncertainties are standard uncertainties (k = 1) in the sense of the GUM (JCGM 100:2008, Evaluation of measurement
//! data: Guide to the expression of uncertainty in measurement). `u` is NaN where none can be given: an unknown
//! uncertainty makes every result that depends on it unknown too, and is never taken as 0.

/// A value and its standard uncertainty (k = 1), in one unit that the context names.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Quantity {
    /// The best estimate.
    pub value: f64,
    /// Standard uncertainty: 0 exact, NaN not known.
    pub u: f64,
}

impl Quantity {
    /// A value with its standard uncertainty.
    pub const fn new(value: f64, u: f64) -> Self {
        Self { value, u }
    }

    /// A value that is exact by definition.
    pub const fn exact(value: f64) -> Self {
        Self { value, u: 0.0 }
    }

    /// A value whose uncertainty is not known.
    pub const fn without_u(value: f64) -> Self {
        Self { value, u: f64::NAN }
    }

    /// Law of propagation for independent inputs (GUM, equation 10): `parts` are (sensitivity coefficient, standard
    /// uncertainty) of each input.
    pub fn propagate(value: f64, parts: &[(f64, f64)]) -> Self {
        Self { value, u: root_sum_of_squares(parts) }
    }

    /// Multiplication by an exact factor.
    pub fn scaled(self, factor: f64) -> Self {
        Self { value: self.value * factor, u: self.u * factor.abs() }
    }

    /// Sum of two independent quantities.
    pub fn plus(self, other: Self) -> Self {
        Self::propagate(self.value + other.value, &[(1.0, self.u), (1.0, other.u)])
    }

    /// Difference of two independent quantities.
    pub fn minus(self, other: Self) -> Self {
        Self::propagate(self.value - other.value, &[(1.0, self.u), (-1.0, other.u)])
    }

    /// Product of two independent quantities.
    pub fn times(self, other: Self) -> Self {
        Self::propagate(self.value * other.value, &[(other.value, self.u), (self.value, other.u)])
    }

    /// Quotient of two independent quantities.
    pub fn over(self, other: Self) -> Self {
        let value = self.value / other.value;
        Self::propagate(value, &[(1.0 / other.value, self.u), (value / other.value, other.u)])
    }
}

/// Square root of the sum of squared products (sensitivity × uncertainty), free of overflow and underflow.
fn root_sum_of_squares(parts: &[(f64, f64)]) -> f64 {
    let mut largest = 0.0_f64;
    for &(sensitivity, u) in parts {
        let part = (sensitivity * u).abs();
        if part.is_nan() {
            return f64::NAN;
        }
        largest = largest.max(part);
    }
    if largest == 0.0 || largest.is_infinite() {
        return largest;
    }
    let mut sum = 0.0;
    for &(sensitivity, u) in parts {
        let part = sensitivity * u / largest;
        sum += part * part;
    }
    largest * sum.sqrt()
}

#[cfg(test)]
mod tests {
    use super::*;

    /// GUM, example H.1.7 has sums of squares; the simplest exact case is the 3-4-5 triangle.
    #[test]
    fn sum_of_independent_quantities() {
        let sum = Quantity::new(1.0, 3.0).plus(Quantity::new(2.0, 4.0));
        assert_eq!(sum, Quantity::new(3.0, 5.0));
    }

    #[test]
    fn relative_uncertainties_add_in_a_quotient() {
        let q = Quantity::new(6.0, 0.06).over(Quantity::new(3.0, 0.0));
        assert_eq!(q.value, 2.0);
        assert!((q.u - 0.02).abs() < 1e-15);
    }

    #[test]
    fn unknown_uncertainty_stays_unknown() {
        assert!(Quantity::without_u(1.0).times(Quantity::exact(2.0)).u.is_nan());
        assert!(Quantity::without_u(1.0).plus(Quantity::new(2.0, 0.1)).u.is_nan());
    }

    #[test]
    fn no_overflow_in_squares() {
        assert!((Quantity::new(0.0, 3e200).plus(Quantity::new(0.0, 4e200)).u / 5e200 - 1.0).abs() < 1e-15);
        assert!(Quantity::new(0.0, 3e-200).plus(Quantity::new(0.0, 4e-200)).u > 4.9e-200);
    }
}
