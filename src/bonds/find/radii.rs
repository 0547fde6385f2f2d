//! The lengths that connectivity and bond orders are judged by, by element.

use crate::elements::covalent_radius;
use crate::selectors::{
    RADII_CORDERO_2008, RADII_PYYKKO_DOUBLE_2009, RADII_PYYKKO_SINGLE_2009, RADII_PYYKKO_TRIPLE_2005, STATE_AS_LISTED,
    STATE_HIGH_SPIN, Selector,
};
use once_cell::race::OnceBox;

const SLOTS: usize = 119;

/// Radii [Å] by atomic number; NaN where the published table has none.
pub(super) struct Radii {
    reach: [f64; SLOTS],
    by_order: [[f64; SLOTS]; 3],
}

static RADII: OnceBox<Radii> = OnceBox::new();

/// The radii, read from the tables once.
pub(super) fn radii() -> &'static Radii {
    RADII.get_or_init(|| Box::new(Radii::read()))
}

fn listed(table: Selector, atomic_number: usize, state: Selector) -> f64 {
    let z = i32::try_from(atomic_number).unwrap_or(0);
    covalent_radius(table, z, state).map_or(f64::NAN, |radius| radius.value)
}

impl Radii {
    fn read() -> Self {
        let column = |table: Selector| {
            let mut values = [f64::NAN; SLOTS];
            for (z, value) in values.iter_mut().enumerate().skip(1) {
                *value = listed(table, z, STATE_AS_LISTED);
            }
            values
        };
        let single = column(RADII_PYYKKO_SINGLE_2009);
        let mut reach = column(RADII_CORDERO_2008);
        for (z, value) in reach.iter_mut().enumerate().skip(1) {
            // f64::max passes over a NaN, so an element that only one table has keeps that value.
            let high_spin = listed(RADII_CORDERO_2008, z, STATE_HIGH_SPIN);
            *value = value.max(high_spin).max(single.get(z).copied().unwrap_or(f64::NAN));
        }
        Self { reach, by_order: [single, column(RADII_PYYKKO_DOUBLE_2009), column(RADII_PYYKKO_TRIPLE_2005)] }
    }

    /// How far an atom reaches in a single bond [Å]: the larger of the radii of Cordero et al. 2008 (high spin where
    /// spin states are told apart) and of Pyykkö and Atsumi 2009. A limit of search, not an expected length.
    pub(super) fn reach(&self, atomic_number: i32) -> f64 {
        slot(&self.reach, atomic_number)
    }

    /// Sum of Pyykkö's radii for bond order 1, 2 or 3 [Å]; NaN where the table has no entry.
    pub(super) fn sum(&self, order: usize, a: i32, b: i32) -> f64 {
        match order.checked_sub(1).and_then(|k| self.by_order.get(k)) {
            Some(table) => slot(table, a) + slot(table, b),
            None => f64::NAN,
        }
    }
}

fn slot(values: &[f64; SLOTS], atomic_number: i32) -> f64 {
    usize::try_from(atomic_number).ok().and_then(|z| values.get(z)).copied().unwrap_or(f64::NAN)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Cordero et al. 2008: H 0.31, Mn high spin 1.61 Å; Pyykkö and Atsumi 2009: H 0.32, C=O 0.67 + 0.57 Å.
    #[test]
    fn the_larger_radius_counts() {
        assert_eq!(radii().reach(1), 0.32);
        assert_eq!(radii().reach(25), 1.61);
        assert!((radii().sum(2, 6, 8) - 1.24).abs() < 1e-12);
        assert!((1..=118).all(|z| radii().reach(z) > 0.2 && radii().reach(z) < 3.0));
    }
}
