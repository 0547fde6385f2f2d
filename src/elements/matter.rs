//! Masses and polarizabilities of atoms.

use super::{ELEMENT, LOOK_UP};
use crate::constants::POLARIZABILITY_AU_A3;
use crate::declare::{Argument, Example, Function, Kind, NUMBER, SELECTOR};
use crate::quantity::Quantity;
use crate::selectors::{POLARIZABILITY_2018, STATE_AS_LISTED, Selector, WEIGHTS_STANDARD_2021};
use crate::status::Failure;
use crate::tables;

/// Declaration of [`atomic_weight`].
pub static ATOMIC_WEIGHT: Function = Function {
    name: "atomic_weight",
    family: "elements",
    kind: Kind::Scalar,
    since: 1,
    title: "Atomic weight, or mass of the most abundant isotope",
    formula: "",
    arguments: &[
        Argument {
            number: 1,
            name: "table",
            label: "table",
            group: "masses",
            default: Some(WEIGHTS_STANDARD_2021),
            help: "Standard atomic weights, or isotopic masses",
            ..SELECTOR
        },
        ELEMENT,
    ],
    results: &[Argument {
        number: 3,
        name: "atomic_weight_u",
        label: "atomic weight",
        unit: "u",
        minimum: 0.0,
        above: true,
        uncertainty: "u_atomic_weight_u",
        main: true,
        help: "Atomic weight or isotopic mass [u]",
        ..NUMBER
    }],
    statuses: LOOK_UP,
    remarks: 0,
    notes: &[
        "Standard weights are the abridged ones; the printed bounds (from memory) count as rectangular: bound/sqrt(3).",
        "An element without a standard atomic weight (Tc, Pm, Po and on, save Th, Pa, U) has no data there.",
        "Isotopic masses: the most abundant isotope, else the longest-lived; 12C is exact.",
    ],
    sources: &[
        "T. Prohaska et al., Pure Appl. Chem. 2022, 94, 573-600",
        "A. Possolo et al., Pure Appl. Chem. 2018, 90, 395-424 (from memory)",
        "M. Wang et al., Chinese Phys. C 2021, 45, 030003 (AME2020)",
    ],
    examples: &[Example {
        given: "table=MASSES_ABUNDANT_ISOTOPE_2020;atomic_number=17",
        gives: "atomic_weight_u=34.968852694",
        within: 1e-9,
        source: "AME2020: 35Cl (two open transcriptions agree)",
    }],
};

/// Declaration of [`polarizability`].
pub static POLARIZABILITY: Function = Function {
    name: "polarizability",
    title: "Static dipole polarizability of a free atom",
    arguments: &[
        Argument {
            number: 1,
            name: "table",
            label: "table",
            group: "polarizability",
            default: Some(POLARIZABILITY_2018),
            help: "Table of atomic polarizabilities",
            ..SELECTOR
        },
        ELEMENT,
    ],
    results: &[Argument {
        number: 3,
        name: "polarizability_A3",
        label: "polarizability",
        unit: "Å³",
        minimum: 0.0,
        above: true,
        uncertainty: "u_polarizability_A3",
        main: true,
        help: "Static dipole polarizability of the free atom [Å³]",
        ..NUMBER
    }],
    notes: &[
        "Of the free neutral atom, scalar; the sum over a molecule's atoms is not the molecule's polarizability.",
        "Printed in atomic units; the uncertainty combines the printed one and that of a0³.",
    ],
    sources: &["P. Schwerdtfeger, J. K. Nagle, Mol. Phys. 2019, 117, 1200-1225, and the authors' update of 2023"],
    examples: &[Example {
        given: "table=POLARIZABILITY_2018;atomic_number=2",
        gives: "polarizability_A3=0.205051;u_polarizability_A3=0.000003",
        within: 1e-6,
        source: "1.38375(2) a.u., Schwerdtfeger, Nagle 2019, times a0³ = 0.1481847 Å³ (CODATA 2022)",
    }],
    ..ATOMIC_WEIGHT
};

/// Standard atomic weight or isotopic mass [u] of an element.
///
/// # Errors
/// `UnknownSelector`, `WrongSelector` (argument 1) · `Missing`, `UnknownElement`, `NoData` (2).
pub fn atomic_weight(table: Selector, atomic_number: i32) -> Result<Quantity, Failure> {
    let table = ATOMIC_WEIGHT.selector(1, table)?;
    let z = ATOMIC_WEIGHT.element(2, atomic_number)?;
    let entry = tables::entry(table, z, STATE_AS_LISTED).map_err(|failure| failure.argument(2))?;
    // The printed bounds of a standard weight enclose it with equal likelihood all over (GUM, 4.3.7).
    let u = if table == WEIGHTS_STANDARD_2021 { entry.u / 3.0_f64.sqrt() } else { entry.u };
    Ok(Quantity::new(entry.value, u))
}

/// Static dipole polarizability [Å³] of the free atom.
///
/// # Errors
/// `UnknownSelector`, `WrongSelector` (argument 1) · `Missing`, `UnknownElement`, `NoData` (2).
pub fn polarizability(table: Selector, atomic_number: i32) -> Result<Quantity, Failure> {
    let table = POLARIZABILITY.selector(1, table)?;
    let z = POLARIZABILITY.element(2, atomic_number)?;
    let entry = tables::entry(table, z, STATE_AS_LISTED).map_err(|failure| failure.argument(2))?;
    Ok(Quantity::new(entry.value, entry.u).times(POLARIZABILITY_AU_A3))
}
