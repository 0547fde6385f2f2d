//! Charges: q = μ/(e·d) and its inverses; partial charges of molecules.

pub mod diatomic;

pub use diatomic::{charge_from_dipole, dipole_from_charge, length_from_dipole};
