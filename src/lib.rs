//! Bondmoment: bond lengths, bond polarity, partial charges and dipole moments with standard uncertainties.
//!
//! The house, from the ground up:
//! - ground: [`quantity`] (value ± u), [`status`] (why there is no value), [`selectors`] (tables, laws, units to choose
//!   from), [`declare`] (what the worksheet functions say of themselves), [`constants`], [`units`], [`tables`],
//!   [`molecule`], [`parallel`];
//! - families of science, pure functions without input or output: [`elements`], [`bonds`], [`charges`], [`moments`];
//! - [`library`]: files of structures in, the polarity table out;
//! - [`catalogue`]: the JSON text in which the library describes itself;
//! - [`c_api`]: the C ABI, the only unsafe code.
//!
//! Units and signs are the same everywhere: Å, e, D, K, kJ/mol; a dipole points from − to +.

pub mod bonds;
pub mod c_api;
pub mod catalogue;
pub mod charges;
pub mod constants;
pub mod declare;
pub mod elements;
pub mod library;
pub mod molecule;
pub mod moments;
pub mod parallel;
pub mod quantity;
pub mod selectors;
pub mod status;
pub mod tables;
pub mod units;
