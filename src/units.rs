//! Conversion between units, with the uncertainty of the factor where a measured constant stands in it.
//!
//! The Bohr radius, the vacuum permittivity, the electron mass and the atomic mass constant owe their uncertainty almost
//! wholly to one number, the fine-structure constant α (a0 ∝ α, ε0 ∝ 1/α, m_e and m_u ∝ 1/α²). A factor's relative
//! uncertainty is therefore that of α times the difference of the powers of α in the two units, so that common parts
//! cancel; what is independent of α (electron mass in u, hartree) is added. Constants: CODATA 2022.

use crate::constants::{
    ATOMIC_MASS_KG, AVOGADRO_PER_MOL, BOHR_RADIUS_A, BOLTZMANN_J_PER_K, DEBYE_PER_E_ANGSTROM, ELECTRON_MASS_U,
    ELEMENTARY_CHARGE_C, HARTREE_J, PLANCK_J_S, POLARIZABILITY_AU_A3, SPEED_OF_LIGHT_M_PER_S,
    VACUUM_PERMITTIVITY_F_PER_M,
};
use crate::declare::{Argument, Example, Function, Kind, NUMBER, SELECTOR};
use crate::quantity::Quantity;
use crate::selectors::{
    Selector, UNIT_ANGSTROM, UNIT_ANGSTROM3, UNIT_BOHR, UNIT_BOHR3, UNIT_C_M, UNIT_C_M2, UNIT_C2_M2_PER_J,
    UNIT_CELSIUS, UNIT_CM3_PER_MOL, UNIT_COULOMB, UNIT_D_ANGSTROM, UNIT_DALTON, UNIT_DEBYE, UNIT_DEGREE, UNIT_E,
    UNIT_E_ANGSTROM, UNIT_E_BOHR, UNIT_E_BOHR2, UNIT_ELECTRON_MASS, UNIT_EV, UNIT_G_PER_CM3, UNIT_GHZ, UNIT_HARTREE,
    UNIT_JOULE, UNIT_KCAL_PER_MOL, UNIT_KELVIN, UNIT_KG, UNIT_KG_M2, UNIT_KG_PER_M3, UNIT_KJ_PER_MOL, UNIT_M, UNIT_MHZ,
    UNIT_NM, UNIT_NM3, UNIT_PER_CM, UNIT_PM, UNIT_RADIAN, UNIT_U_ANGSTROM2,
};
use crate::status::{Code, Failure};

/// What is measured in a unit. Some units measure two things: K and cm⁻¹ also stand for energies, Å³ for
/// polarizabilities and for volumes.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Dimension {
    Length,
    Dipole,
    Charge,
    Energy,
    Temperature,
    Polarizability,
    Volume,
    Quadrupole,
    Mass,
    Inertia,
    Rotation,
    Angle,
    Density,
}

/// A unit of one dimension: its size in the dimension's base unit.
struct Unit {
    selector: Selector,
    dimension: Dimension,
    size: f64,
    /// Zero of the scale in the base unit.
    zero: f64,
    /// Power of α in the size.
    alpha: f64,
    /// Relative uncertainty of the size that α does not explain.
    rest: f64,
}

const fn exact(selector: Selector, dimension: Dimension, size: f64) -> Unit {
    Unit { selector, dimension, size, zero: 0.0, alpha: 0.0, rest: 0.0 }
}

const fn measured(selector: Selector, dimension: Dimension, size: f64, alpha: f64, rest: f64) -> Unit {
    Unit { selector, dimension, size, zero: 0.0, alpha, rest }
}

/// Relative standard uncertainty of α, as the Bohr radius carries it.
const U_ALPHA: f64 = BOHR_RADIUS_A.u / BOHR_RADIUS_A.value;
/// 1 C m in D, exact.
const DEBYE_PER_C_M: f64 = 2.99792458e29;
/// 1 J in kJ/mol, exact.
const KJ_PER_MOL_PER_J: f64 = AVOGADRO_PER_MOL / 1000.0;
/// Å³ of one polarizability of 1 C² m²/J: 1e30/(4π ε0).
const A3_PER_C2_M2_PER_J: f64 = 1e30 / (4.0 * core::f64::consts::PI * VACUUM_PERMITTIVITY_F_PER_M.value);

/// All units. The base of each dimension is the one of size 1.
static UNITS: &[Unit] = &[
    exact(UNIT_PM, Dimension::Length, 1.0),
    exact(UNIT_ANGSTROM, Dimension::Length, 100.0),
    exact(UNIT_NM, Dimension::Length, 1000.0),
    exact(UNIT_M, Dimension::Length, 1e12),
    measured(UNIT_BOHR, Dimension::Length, 100.0 * BOHR_RADIUS_A.value, 1.0, 0.0),
    exact(UNIT_DEBYE, Dimension::Dipole, 1.0),
    exact(UNIT_E_ANGSTROM, Dimension::Dipole, DEBYE_PER_E_ANGSTROM),
    measured(UNIT_E_BOHR, Dimension::Dipole, DEBYE_PER_E_ANGSTROM * BOHR_RADIUS_A.value, 1.0, 0.0),
    exact(UNIT_C_M, Dimension::Dipole, DEBYE_PER_C_M),
    exact(UNIT_E, Dimension::Charge, 1.0),
    exact(UNIT_COULOMB, Dimension::Charge, 1.0 / ELEMENTARY_CHARGE_C),
    exact(UNIT_KJ_PER_MOL, Dimension::Energy, 1.0),
    exact(UNIT_KCAL_PER_MOL, Dimension::Energy, 4.184),
    exact(UNIT_EV, Dimension::Energy, ELEMENTARY_CHARGE_C * KJ_PER_MOL_PER_J),
    measured(UNIT_HARTREE, Dimension::Energy, HARTREE_J.value * KJ_PER_MOL_PER_J, 0.0, HARTREE_J.u / HARTREE_J.value),
    exact(UNIT_JOULE, Dimension::Energy, KJ_PER_MOL_PER_J),
    exact(UNIT_PER_CM, Dimension::Energy, PLANCK_J_S * SPEED_OF_LIGHT_M_PER_S * 100.0 * KJ_PER_MOL_PER_J),
    exact(UNIT_KELVIN, Dimension::Energy, BOLTZMANN_J_PER_K * KJ_PER_MOL_PER_J),
    exact(UNIT_KELVIN, Dimension::Temperature, 1.0),
    Unit { zero: 273.15, ..exact(UNIT_CELSIUS, Dimension::Temperature, 1.0) },
    exact(UNIT_ANGSTROM3, Dimension::Polarizability, 1.0),
    exact(UNIT_NM3, Dimension::Polarizability, 1000.0),
    measured(UNIT_BOHR3, Dimension::Polarizability, POLARIZABILITY_AU_A3.value, 3.0, 0.0),
    measured(UNIT_C2_M2_PER_J, Dimension::Polarizability, A3_PER_C2_M2_PER_J, 1.0, 0.0),
    exact(UNIT_ANGSTROM3, Dimension::Volume, 1.0),
    exact(UNIT_NM3, Dimension::Volume, 1000.0),
    measured(UNIT_BOHR3, Dimension::Volume, POLARIZABILITY_AU_A3.value, 3.0, 0.0),
    exact(UNIT_CM3_PER_MOL, Dimension::Volume, 1e24 / AVOGADRO_PER_MOL),
    exact(UNIT_D_ANGSTROM, Dimension::Quadrupole, 1.0),
    measured(
        UNIT_E_BOHR2,
        Dimension::Quadrupole,
        DEBYE_PER_E_ANGSTROM * BOHR_RADIUS_A.value * BOHR_RADIUS_A.value,
        2.0,
        0.0,
    ),
    exact(UNIT_C_M2, Dimension::Quadrupole, DEBYE_PER_C_M * 1e10),
    exact(UNIT_DALTON, Dimension::Mass, 1.0),
    measured(UNIT_KG, Dimension::Mass, 1.0 / ATOMIC_MASS_KG.value, 2.0, 0.0),
    measured(
        UNIT_ELECTRON_MASS,
        Dimension::Mass,
        ELECTRON_MASS_U.value,
        0.0,
        ELECTRON_MASS_U.u / ELECTRON_MASS_U.value,
    ),
    exact(UNIT_U_ANGSTROM2, Dimension::Inertia, 1.0),
    measured(UNIT_KG_M2, Dimension::Inertia, 1e20 / ATOMIC_MASS_KG.value, 2.0, 0.0),
    exact(UNIT_MHZ, Dimension::Rotation, 1.0),
    exact(UNIT_GHZ, Dimension::Rotation, 1000.0),
    exact(UNIT_PER_CM, Dimension::Rotation, SPEED_OF_LIGHT_M_PER_S / 10000.0),
    exact(UNIT_DEGREE, Dimension::Angle, 1.0),
    exact(UNIT_RADIAN, Dimension::Angle, 180.0 / core::f64::consts::PI),
    exact(UNIT_KG_PER_M3, Dimension::Density, 1.0),
    exact(UNIT_G_PER_CM3, Dimension::Density, 1000.0),
];

const FROM: Argument = Argument {
    number: 1,
    name: "from_unit",
    label: "from unit",
    group: "unit",
    help: "Unit that the value is in",
    ..SELECTOR
};
const VALUE: Argument = Argument {
    name: "value",
    label: "value",
    uncertainty: "u_value",
    help: "Value in the first unit; °C not below -273.15, K of a temperature not below 0",
    ..NUMBER
};

/// Declaration of [`convert`].
pub static CONVERT: Function = Function {
    name: "convert",
    family: "elements",
    kind: Kind::Scalar,
    since: 1,
    title: "Conversion between units",
    formula: "",
    arguments: &[
        FROM,
        Argument {
            number: 2,
            name: "to_unit",
            label: "to unit",
            range: "a unit of the same kind as from_unit",
            help: "Unit that the result is in",
            ..FROM
        },
        Argument { number: 3, ..VALUE },
    ],
    results: &[Argument {
        number: 4,
        name: "converted",
        label: "converted",
        uncertainty: "u_converted",
        main: true,
        help: "The value in the second unit",
        ..VALUE
    }],
    statuses: &[Code::Missing, Code::NotFinite, Code::OutOfRange, Code::NegativeUncertainty],
    remarks: 0,
    notes: &[
        "Units of different kinds are not allowed together: the second one is at fault.",
        "K and cm^-1 also stand for energies (divided by k and by h c), a volume of one particle for a polarizability.",
        "The uncertainty of measured constants in the factor is combined; constants that share one are not counted twice.",
        "kcal is the thermochemical one, 4.184 kJ exactly. An uncertainty in °C is one in K.",
    ],
    sources: &["P. J. Mohr, D. B. Newell, B. N. Taylor, E. Tiesinga, Rev. Mod. Phys. 2025, 97, 025002 (CODATA 2022)"],
    examples: &[
        Example {
            given: "from_unit=UNIT_E_BOHR;to_unit=UNIT_DEBYE;value=1",
            gives: "converted=2.5417464714697",
            within: 1e-12,
            source: "CODATA 2022: e a0 = 8.4783536198e-30 C m",
        },
        Example {
            given: "from_unit=UNIT_CELSIUS;to_unit=UNIT_KELVIN;value=25",
            gives: "converted=298.15",
            within: 1e-12,
            source: "exact by the definition of the degree Celsius",
        },
    ],
};

/// A value [from_unit] in another unit of the same kind. The same unit twice returns the value unchanged.
///
/// # Errors
/// `UnknownSelector`, `WrongSelector` (arguments 1, 2) · `NotAllowed` (argument 2: a unit of another kind) · `Missing`,
/// `NotFinite`, `NegativeUncertainty`, `OutOfRange` (argument 3: below absolute zero, or too large for a double).
pub fn convert(from_unit: Selector, to_unit: Selector, value: Quantity) -> Result<Quantity, Failure> {
    let from_unit = CONVERT.selector(1, from_unit)?;
    let to_unit = CONVERT.selector(2, to_unit)?;
    let Some((from, to)) = pair(from_unit, to_unit) else { return Err(Failure::of(Code::NotAllowed, 2)) };
    let value = CONVERT.quantity(3, value)?;
    let out_of_range = Failure::of(Code::OutOfRange, 3);
    if from.dimension == Dimension::Temperature && value.value + from.zero < 0.0 {
        return Err(out_of_range);
    }
    if from_unit == to_unit {
        return Ok(value);
    }
    // The quotient of two sizes is taken large over small: between decimal units it is then an exact integer and the
    // result is rounded once.
    let in_target = |x: f64| if from.size >= to.size { x * (from.size / to.size) } else { x / (to.size / from.size) };
    let converted = in_target(value.value) + (from.zero - to.zero);
    let factor_parts = [(from.alpha - to.alpha) * U_ALPHA, from.rest, to.rest];
    let parts = factor_parts.map(|relative| (converted, relative));
    let [alpha, first, second] = parts;
    let result = Quantity::propagate(converted, &[(1.0, in_target(value.u)), alpha, first, second]);
    if result.value.is_finite() && !result.u.is_infinite() { Ok(result) } else { Err(out_of_range) }
}

/// The two units in a dimension that both measure.
fn pair(from: Selector, to: Selector) -> Option<(&'static Unit, &'static Unit)> {
    UNITS.iter().filter(|unit| unit.selector == from).find_map(|first| {
        let same = |second: &&Unit| second.selector == to && second.dimension == first.dimension;
        UNITS.iter().find(same).map(|second| (first, second))
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::selectors;

    #[test]
    fn every_unit_selector_has_a_size() {
        for choice in selectors::ALL.iter().filter(|choice| choice.group == "unit") {
            assert!(pair(choice.selector, choice.selector).is_some(), "{}", choice.name);
        }
    }

    /// Every pair of one dimension converts, and back again to the same number. The sizes are checked in tests/elements.rs.
    #[test]
    fn conversions_close() {
        for a in UNITS {
            for b in UNITS.iter().filter(|b| b.dimension == a.dimension) {
                let there = convert(a.selector, b.selector, Quantity::exact(321.0));
                let back = there.and_then(|there| convert(b.selector, a.selector, there));
                let back = back.unwrap_or_else(|fault| panic!("{:?} {:?}: {fault:?}", a.selector, b.selector));
                assert!((back.value - 321.0).abs() < 1e-10, "{:?} {:?}", a.selector, b.selector);
            }
        }
    }
}
