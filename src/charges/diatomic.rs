//! The point-charge picture of one bond: μ = q·d, and both inverses.
//!
//! The sign of the charge is that of the dipole: a bond dipole counted positive from its − to its + end gives the charge
//! of the + end. Reference: C. P. Smyth, Dielectric Behavior and Structure, McGraw-Hill 1955 (from memory).

use crate::constants::DEBYE_PER_E_ANGSTROM;
use crate::declare::{Argument, Example, Function, Kind, NUMBER};
use crate::quantity::Quantity;
use crate::status::{Code, Failure};

const DIPOLE: Argument = Argument {
    name: "dipole_D",
    label: "dipole",
    unit: "D",
    uncertainty: "u_dipole_D",
    help: "Dipole of the bond or diatomic molecule [D]",
    ..NUMBER
};
const LENGTH: Argument = Argument {
    name: "length_A",
    label: "length",
    unit: "Å",
    minimum: 0.0,
    above: true,
    uncertainty: "u_length_A",
    help: "Bond length [Å]",
    ..NUMBER
};
const CHARGE: Argument =
    Argument { name: "charge_e", label: "charge", unit: "e", uncertainty: "u_charge_e", help: "Charge [e]", ..NUMBER };
const CELL: &[Code] = &[Code::Missing, Code::NotFinite, Code::OutOfRange, Code::NegativeUncertainty];
const SOURCES: &[&str] = &["C. P. Smyth, Dielectric Behavior and Structure, McGraw-Hill 1955 (from memory)"];

/// Declaration of [`charge_from_dipole`].
pub static CHARGE_FROM_DIPOLE: Function = Function {
    name: "charge_from_dipole",
    family: "charges",
    kind: Kind::Scalar,
    since: 1,
    title: "Charge from a bond dipole",
    formula: "q = mu / (e d)",
    arguments: &[Argument { number: 1, ..DIPOLE }, Argument { number: 2, ..LENGTH }],
    results: &[Argument { number: 3, main: true, ..CHARGE }],
    statuses: CELL,
    remarks: 0,
    notes: &["Inputs count as independent.", "A point-charge picture: 100 q is often called the ionic percentage."],
    sources: SOURCES,
    examples: &[Example {
        given: "dipole_D=1.1086;length_A=1.27455",
        gives: "charge_e=0.18109",
        within: 1e-5,
        source: "HCl: Nelson, Lide, Maryott 1967; Huber, Herzberg 1979 (from memory)",
    }],
};

/// Declaration of [`dipole_from_charge`].
pub static DIPOLE_FROM_CHARGE: Function = Function {
    name: "dipole_from_charge",
    title: "Bond dipole from a charge",
    formula: "mu = e q d",
    arguments: &[Argument { number: 1, ..CHARGE }, Argument { number: 2, ..LENGTH }],
    results: &[Argument { number: 3, main: true, ..DIPOLE }],
    notes: &["Inputs count as independent."],
    examples: &[Example {
        given: "charge_e=1;length_A=1",
        gives: "dipole_D=4.803204712570264",
        within: 1e-12,
        source: "1 e Å in D, exact in the SI of 2019 (arithmetic)",
    }],
    ..CHARGE_FROM_DIPOLE
};

/// Declaration of [`length_from_dipole`].
pub static LENGTH_FROM_DIPOLE: Function = Function {
    name: "length_from_dipole",
    title: "Charge separation from a dipole and a charge",
    formula: "d = mu / (e q)",
    arguments: &[
        Argument { number: 1, ..DIPOLE },
        Argument {
            number: 2,
            range: "other than 0 and of the sign of the dipole",
            help: "Charge, not 0 and of the sign of the dipole [e]",
            ..CHARGE
        },
    ],
    results: &[Argument { number: 3, main: true, ..LENGTH }],
    notes: &["Inputs count as independent.", "A charge of 0 or of the other sign than the dipole is out of range."],
    examples: &[Example {
        given: "dipole_D=9.00117;charge_e=0.79380",
        gives: "length_A=2.3608",
        within: 1e-4,
        source: "NaCl: Nelson, Lide, Maryott 1967; Huber, Herzberg 1979 (from memory)",
    }],
    ..CHARGE_FROM_DIPOLE
};

/// Charge [e] that, at a distance `length` [Å] from its opposite, makes the dipole [D].
///
/// # Errors
/// `Missing`, `NotFinite`, `OutOfRange` (length not above 0), `NegativeUncertainty`.
pub fn charge_from_dipole(dipole: Quantity, length: Quantity) -> Result<Quantity, Failure> {
    let dipole = CHARGE_FROM_DIPOLE.quantity(1, dipole)?;
    let length = CHARGE_FROM_DIPOLE.quantity(2, length)?;
    finite(dipole.over(length).scaled(1.0 / DEBYE_PER_E_ANGSTROM))
}

/// Dipole [D] of two opposite charges [e] at a distance `length` [Å].
///
/// # Errors
/// `Missing`, `NotFinite`, `OutOfRange` (length not above 0), `NegativeUncertainty`.
pub fn dipole_from_charge(charge: Quantity, length: Quantity) -> Result<Quantity, Failure> {
    let charge = DIPOLE_FROM_CHARGE.quantity(1, charge)?;
    let length = DIPOLE_FROM_CHARGE.quantity(2, length)?;
    finite(charge.times(length).scaled(DEBYE_PER_E_ANGSTROM))
}

/// Distance [Å] at which two opposite charges [e] make the dipole [D].
///
/// # Errors
/// `Missing`, `NotFinite`, `NegativeUncertainty`, `OutOfRange` (charge 0, or of the other sign than the dipole).
pub fn length_from_dipole(dipole: Quantity, charge: Quantity) -> Result<Quantity, Failure> {
    let dipole = LENGTH_FROM_DIPOLE.quantity(1, dipole)?;
    let charge = LENGTH_FROM_DIPOLE.quantity(2, charge)?;
    if charge.value == 0.0 || dipole.value * charge.value < 0.0 {
        return Err(Failure::of(Code::OutOfRange, 2));
    }
    finite(dipole.over(charge).scaled(1.0 / DEBYE_PER_E_ANGSTROM))
}

/// A result beyond what a double holds has no value.
fn finite(quantity: Quantity) -> Result<Quantity, Failure> {
    if quantity.value.is_finite() { Ok(quantity) } else { Err(Failure::new(Code::OutOfRange)) }
}
