//! Which bonds are polar, which end is negative, and how ionic a bond is.

use crate::bonds::metals::is_metal;
use crate::declare::{Argument, Example, Function, Holds, INTEGER, Kind, NUMBER, SELECTOR};
use crate::elements::electronegativity;
use crate::quantity::Quantity;
use crate::selectors::{self, Selector};
use crate::status::{Code, Failure};

const ATOM: Argument =
    Argument { label: "atomic number", minimum: 1.0, maximum: 118.0, help: "Atomic number", ..INTEGER };
const DELTA_CHI: Argument = Argument {
    name: "delta_chi",
    label: "difference of electronegativity",
    uncertainty: "u_delta_chi",
    help: "chi_b - chi_a in Pauling units; above 0 where b is the negative end",
    ..NUMBER
};

/// Declaration of [`bond_polarity`].
pub static BOND_POLARITY: Function = Function {
    name: "bond_polarity",
    family: "bonds",
    kind: Kind::Scalar,
    since: 1,
    title: "Polarity of a bond",
    formula: "delta chi = chi_b - chi_a",
    arguments: &[
        Argument {
            number: 1,
            name: "scale",
            label: "scale",
            group: "electronegativity",
            default: Some(selectors::ELECTRONEGATIVITY_PAULING),
            help: "Scale of electronegativity",
            ..SELECTOR
        },
        Argument {
            number: 2,
            name: "polar_from",
            label: "polar from",
            shape: "call",
            minimum: 0.0,
            required: false,
            default_number: 0.4,
            help: "|delta chi| from which a bond is called polar",
            ..NUMBER
        },
        Argument {
            number: 3,
            name: "ionic_from",
            label: "ionic from",
            shape: "call",
            minimum: 0.0,
            required: false,
            default_number: 1.7,
            range: "at least 0 and not below polar_from",
            help: "|delta chi| from which a bond with a metal is called ionic; not below polar_from",
            ..NUMBER
        },
        Argument { number: 4, name: "atomic_number_a", ..ATOM },
        Argument { number: 5, name: "atomic_number_b", ..ATOM },
    ],
    results: &[
        Argument { number: 6, main: true, ..DELTA_CHI },
        Argument {
            number: 7,
            name: "negative_end",
            label: "negative end",
            holds: Holds::Selector,
            group: "bond_end",
            help: "The more electronegative atom; neither where they are equal",
            ..NUMBER
        },
        Argument {
            number: 8,
            name: "bond_class",
            label: "class",
            holds: Holds::Selector,
            group: "bond_class",
            help: "Non-polar, polar or ionic",
            ..NUMBER
        },
    ],
    statuses: &[Code::Missing, Code::NotFinite, Code::OutOfRange, Code::UnknownElement, Code::NoData],
    remarks: 0,
    notes: &[
        "Classes by |delta chi|: below polar_from non-polar, from ionic_from on ionic where one partner is a metal, else \
         polar (HF, 1.78, is polar). The limits 0.4 and 1.7 are common practice; there is no standard.",
        "The difference is rounded to six decimals, so that 3.44 - 3.04 is 0.4.",
        "Pauling, Allen and Allred-Rochow values have no published uncertainty, so the difference has none (NaN).",
        "Electronegativities fail for some bonds: in carbon monoxide the measured negative end is carbon.",
    ],
    sources: &["Pauling, The Nature of the Chemical Bond, 3rd ed. 1960 (from memory)"],
    examples: &[Example {
        given: "scale=ELECTRONEGATIVITY_PAULING;polar_from=0.4;ionic_from=1.7;atomic_number_a=1;atomic_number_b=9",
        gives: "delta_chi=1.78;negative_end=END_B;bond_class=CLASS_POLAR",
        within: 1e-12,
        source: "HF: 3.98 - 2.20 (handbook column)",
    }],
};

/// What [`bond_polarity`] answers.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct BondPolarity {
    /// χ_b − χ_a in Pauling units.
    pub delta_chi: Quantity,
    /// `END_A`, `END_B` or `END_NEITHER`.
    pub negative_end: Selector,
    /// `CLASS_NON_POLAR`, `CLASS_POLAR` or `CLASS_IONIC`.
    pub class: Selector,
}

/// Difference of electronegativity, negative end and class of a bond between two elements.
///
/// # Errors
/// `UnknownSelector`, `WrongSelector`, `Missing`, `NotFinite`, `OutOfRange` (limits), `UnknownElement`, `NoData` with the
/// argument of the atom.
pub fn bond_polarity(
    scale: Selector,
    polar_from: f64,
    ionic_from: f64,
    atomic_number_a: i32,
    atomic_number_b: i32,
) -> Result<BondPolarity, Failure> {
    let f = &BOND_POLARITY;
    f.selector(1, scale)?;
    let polar_from = f.number(2, polar_from)?;
    let ionic_from = f.number(3, ionic_from)?;
    if ionic_from < polar_from {
        return Err(Failure::of(Code::OutOfRange, 3));
    }
    let a = f.element(4, atomic_number_a)?;
    let b = f.element(5, atomic_number_b)?;
    let chi_a = electronegativity(scale, a).map_err(|failure| failure.argument(4))?;
    let chi_b = electronegativity(scale, b).map_err(|failure| failure.argument(5))?;
    let delta_chi = if a == b {
        Quantity::exact(0.0)
    } else {
        let difference = chi_b.minus(chi_a);
        Quantity { value: (difference.value * 1e6).round() / 1e6, ..difference }
    };
    let negative_end = if delta_chi.value > 0.0 {
        selectors::END_B
    } else if delta_chi.value < 0.0 {
        selectors::END_A
    } else {
        selectors::END_NEITHER
    };
    let size = delta_chi.value.abs();
    let class = if size < polar_from {
        selectors::CLASS_NON_POLAR
    } else if size >= ionic_from && (is_metal(a) || is_metal(b)) {
        selectors::CLASS_IONIC
    } else {
        selectors::CLASS_POLAR
    };
    Ok(BondPolarity { delta_chi, negative_end, class })
}

/// Declaration of [`ionic_character`].
pub static IONIC_CHARACTER: Function = Function {
    name: "ionic_character",
    family: "bonds",
    kind: Kind::Scalar,
    since: 1,
    title: "Ionic character of a bond",
    formula: "100 (1 - exp(-dchi^2/4)) or 16 |dchi| + 3.5 dchi^2",
    arguments: &[
        Argument {
            number: 1,
            name: "law",
            label: "law",
            group: "ionic_law",
            default: Some(selectors::IONIC_PAULING_1960),
            help: "Law of ionic character",
            ..SELECTOR
        },
        Argument { number: 2, ..DELTA_CHI },
    ],
    results: &[Argument {
        number: 3,
        name: "ionic_percent",
        label: "ionic character",
        unit: "%",
        uncertainty: "u_ionic_percent",
        main: true,
        help: "Ionic character [%]",
        ..NUMBER
    }],
    statuses: &[Code::Missing, Code::NotFinite, Code::NegativeUncertainty],
    remarks: 0,
    notes: &[
        "The uncertainty is that of delta chi alone; the laws are fits to a few hydrogen halides and have none published.",
        "Hannay and Smyth's formula passes 100 % above |delta chi| = 3.53; there the answer is clamped to 100 and has no \
         uncertainty (NaN).",
    ],
    sources: &[
        "Pauling, The Nature of the Chemical Bond, 3rd ed. 1960 (from memory)",
        "Hannay and Smyth, J. Am. Chem. Soc. 1946, 68, 171",
    ],
    examples: &[
        Example {
            given: "law=IONIC_PAULING_1960;delta_chi=0.96",
            gives: "ionic_percent=20.6",
            within: 0.05,
            source: "HCl, calculator page seen",
        },
        Example {
            given: "law=IONIC_HANNAY_SMYTH_1946;delta_chi=2.0",
            gives: "ionic_percent=46",
            within: 1e-12,
            source: "HF at the 1946 difference, seen",
        },
    ],
};

/// Ionic character [%] of a bond from its difference of electronegativity.
///
/// # Errors
/// `UnknownSelector`, `WrongSelector`, `Missing`, `NotFinite`, `NegativeUncertainty`.
pub fn ionic_character(law: Selector, delta_chi: Quantity) -> Result<Quantity, Failure> {
    IONIC_CHARACTER.selector(1, law)?;
    let delta_chi = IONIC_CHARACTER.quantity(2, delta_chi)?;
    let size = delta_chi.value.abs();
    if law == selectors::IONIC_PAULING_1960 {
        let rest = libm::exp(-size * size / 4.0);
        return Ok(Quantity::propagate(100.0 * (1.0 - rest), &[(50.0 * size * rest, delta_chi.u)]));
    }
    let percent = 16.0 * size + 3.5 * size * size;
    if percent > 100.0 {
        return Ok(Quantity::without_u(100.0));
    }
    Ok(Quantity::propagate(percent, &[(16.0 + 7.0 * size, delta_chi.u)]))
}
