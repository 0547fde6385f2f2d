//! Elements: symbols and atomic numbers, radii, electronegativities, masses, polarizabilities; units.
//!
//! Every value comes from one published table that the caller names. Where that table has none the answer is `NoData`,
//! never another table's value.

pub mod electronegativity;
pub mod matter;
pub mod provenance;
pub mod radii;
pub mod symbols;

pub use crate::units::{CONVERT, convert};
pub use electronegativity::{ELECTRONEGATIVITY, electronegativity};
pub use matter::{ATOMIC_WEIGHT, POLARIZABILITY, atomic_weight, polarizability};
pub use provenance::{ValueSource, value_source};
pub use radii::{BOHR_RADIUS, COVALENT_RADIUS, VDW_RADIUS, bohr_radius, covalent_radius, vdw_radius};
pub use symbols::{ATOMIC_NUMBER, SYMBOL, atomic_number, symbol};

use crate::declare::{Argument, Function, INTEGER};
use crate::status::Code;

/// The worksheet functions of this family, in the order of the catalogue.
pub static FUNCTIONS: &[&Function] = &[
    &ATOMIC_NUMBER,
    &SYMBOL,
    &COVALENT_RADIUS,
    &VDW_RADIUS,
    &ELECTRONEGATIVITY,
    &ATOMIC_WEIGHT,
    &POLARIZABILITY,
    &BOHR_RADIUS,
    &CONVERT,
];

/// The atomic number, second argument of every table look-up.
const ELEMENT: Argument = Argument {
    number: 2,
    name: "atomic_number",
    label: "atomic number",
    minimum: 1.0,
    maximum: 118.0,
    help: "Atomic number",
    ..INTEGER
};

/// What a table look-up may end with.
const LOOK_UP: &[Code] = &[Code::Missing, Code::UnknownElement, Code::NoData];
