//! Moments: the dipole of a molecule with its covariance, what its point group and its flexibility say of it, and the
//! verdict polar or non-polar.

mod algebra;
pub mod dipole;
pub mod flexibility;
mod hinges;
pub mod polarity;
mod rotors;
pub mod symmetry;

pub use dipole::{DIPOLE, DIPOLE_OF_CHARGES, Dipole, dipole, dipole_of_charges};
pub use flexibility::{Flexibility, greatest_dipole, may_change_by_turning};
pub use polarity::{DIPOLE_POLARITY, PEOE_RMS_D, Verdict, polarity, verdict};
pub use symmetry::{DipoleSymmetry, dipole_symmetry};

use crate::declare::Function;

/// The worksheet functions of this family, in the order of the catalogue.
pub static FUNCTIONS: &[&Function] = &[&DIPOLE, &DIPOLE_OF_CHARGES, &DIPOLE_POLARITY];
