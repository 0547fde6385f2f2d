//! Electronegativity of the elements on the published scales.

use super::{ELEMENT, LOOK_UP};
use crate::declare::{Argument, Example, Function, Kind, NUMBER, SELECTOR};
use crate::quantity::Quantity;
use crate::selectors::{ELECTRONEGATIVITY_MULLIKEN, ELECTRONEGATIVITY_PAULING, STATE_AS_LISTED, Selector};
use crate::status::Failure;
use crate::tables::{self, Entry};

/// Declaration of [`electronegativity`].
pub static ELECTRONEGATIVITY: Function = Function {
    name: "electronegativity",
    family: "elements",
    kind: Kind::Scalar,
    since: 1,
    title: "Electronegativity of an element",
    formula: "Mulliken: chi = 0.336 ((IE + EA)/(2 eV) - 0.615)",
    arguments: &[
        Argument {
            number: 1,
            name: "scale",
            label: "scale",
            group: "electronegativity",
            default: Some(ELECTRONEGATIVITY_PAULING),
            help: "Scale of electronegativity",
            ..SELECTOR
        },
        ELEMENT,
    ],
    results: &[Argument {
        number: 3,
        name: "electronegativity",
        label: "electronegativity",
        unit: "Pauling units",
        uncertainty: "u_electronegativity",
        main: true,
        help: "Electronegativity in Pauling units",
        ..NUMBER
    }],
    statuses: LOOK_UP,
    remarks: 0,
    notes: &[
        "All scales are given in Pauling units; differences between scales are larger than their digits suggest.",
        "Mulliken's is of the ground state of the atom; where the atom binds no electron it has no data.",
        "Mulliken: a measured affinity counts with its last digit over the root of 12, an estimated one without.",
        "The conversion of Mulliken's scale counts as exact and is from memory; other scales print no uncertainty.",
    ],
    sources: &[
        "CRC Handbook of Chemistry and Physics, section 9, after L. Pauling, The Nature of the Chemical Bond, 1960",
        "A. L. Allred, J. Inorg. Nucl. Chem. 1961, 17, 215-221",
        "L. C. Allen, J. Am. Chem. Soc. 1989, 111, 9003; J. B. Mann et al., ibid. 2000, 122, 2780; 2000, 122, 5132",
        "A. L. Allred, E. G. Rochow, J. Inorg. Nucl. Chem. 1958, 5, 264-268",
        "R. S. Mulliken, J. Chem. Phys. 1934, 2, 782-793; S. G. Bratsch, J. Chem. Educ. 1988, 65, 34-41",
    ],
    examples: &[Example {
        given: "scale=ELECTRONEGATIVITY_PAULING;atomic_number=9",
        gives: "electronegativity=3.98",
        within: 1e-12,
        source: "CRC Handbook of Chemistry and Physics, section 9 (seen in print)",
    }],
};

/// Electronegativity of an element, in Pauling units on every scale; u is NaN where none is published.
///
/// # Errors
/// `UnknownSelector`, `WrongSelector` (argument 1) · `Missing`, `UnknownElement`, `NoData` (2).
pub fn electronegativity(scale: Selector, atomic_number: i32) -> Result<Quantity, Failure> {
    let scale = ELECTRONEGATIVITY.selector(1, scale)?;
    let z = ELECTRONEGATIVITY.element(2, atomic_number)?;
    let found = if scale == ELECTRONEGATIVITY_MULLIKEN {
        mulliken(z)
    } else {
        tables::entry(scale, z, STATE_AS_LISTED).map(|entry| Quantity::new(entry.value, entry.u))
    };
    found.map_err(|failure| failure.argument(2))
}

/// Mean of ionization energy and electron affinity (R. S. Mulliken, J. Chem. Phys. 1934, 2, 782), in Pauling units by
/// the straight line of S. G. Bratsch, J. Chem. Educ. 1988, 65, 34 (from memory).
fn mulliken(z: i32) -> Result<Quantity, Failure> {
    let ionization = tables::ionization_energy(z)?;
    let affinity = tables::electron_affinity(z)?;
    let slope = 0.336;
    let mean = 0.5 * (ionization.value + affinity.value);
    let half_slope = 0.5 * slope;
    let parts = [(half_slope, ionization.u), (half_slope, affinity_u(affinity))];
    Ok(Quantity::propagate(slope * (mean - 0.615), &parts))
}

/// A measured affinity printed without uncertainty takes that of rounding, one last digit/√12 (GUM, F.2.2.1): a lower
/// bound. An estimated or computed affinity has no known uncertainty.
fn affinity_u(affinity: &Entry) -> f64 {
    if affinity.u.is_nan() && !affinity.estimated { affinity.last_digit / 12.0_f64.sqrt() } else { affinity.u }
}
