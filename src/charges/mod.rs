//! Charges: q = μ/(e·d) and its inverses; partial charges of molecules.

pub mod diatomic;
mod partial;
pub mod peoe;

pub use diatomic::{charge_from_dipole, dipole_from_charge, length_from_dipole};
pub use partial::{Charges, PARTIAL_CHARGES, partial_charges};

use crate::declare::Function;

/// The worksheet functions of this family, in the order of the catalogue.
pub static FUNCTIONS: &[&Function] = &[
    &diatomic::CHARGE_FROM_DIPOLE,
    &diatomic::DIPOLE_FROM_CHARGE,
    &diatomic::LENGTH_FROM_DIPOLE,
    &partial::PARTIAL_CHARGES,
];
