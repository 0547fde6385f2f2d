//! Expected bond lengths from covalent radii, with the published laws of polarity and bond order.

use crate::bonds::metals::is_metal;
use crate::declare::{Argument, Example, Function, INTEGER, Kind, NUMBER, SELECTOR};
use crate::elements::{covalent_radius, electronegativity};
use crate::quantity::Quantity;
use crate::selectors::{self, Selector};
use crate::status::{Code, Failure};

/// Coefficient of Schomaker and Stevenson, J. Am. Chem. Soc. 1941, 63, 37 [Å] (from memory).
const POLAR_SHORTENING_A: f64 = 0.09;
/// Coefficient for covalent bonds, Pauling, The Nature of the Chemical Bond, 3rd ed. 1960 [Å] (from memory).
const COVALENT_ORDER_A: f64 = 0.71;
/// Coefficient for bonds between metals, Pauling, J. Am. Chem. Soc. 1947, 69, 542 [Å] (from memory).
const METAL_ORDER_A: f64 = 0.60;

const ATOM: Argument = Argument {
    label: "atomic number",
    minimum: 1.0,
    maximum: 118.0,
    range: "an element that the law is for",
    help: "Atomic number",
    ..INTEGER
};
const STATE: Argument = Argument {
    label: "state",
    holds: crate::declare::Holds::Selector,
    group: "state",
    default: Some(selectors::STATE_AS_LISTED),
    help: "Hybridization or spin state of this atom, where the table tells them apart",
    ..INTEGER
};

/// Declaration of [`bond_length`].
pub static BOND_LENGTH: Function = Function {
    name: "bond_length",
    family: "bonds",
    kind: Kind::Scalar,
    since: 1,
    title: "Expected bond length",
    formula: "d = r_a + r_b, less 0.09 |delta chi| or k log10 n by the law chosen",
    arguments: &[
        Argument {
            number: 1,
            name: "radii",
            label: "radii",
            group: "radii",
            default: Some(selectors::RADII_CORDERO_2008),
            range: "a table that the law is for",
            help: "Table of covalent radii",
            ..SELECTOR
        },
        Argument {
            number: 2,
            name: "law",
            label: "law",
            group: "length_law",
            default: Some(selectors::LENGTH_BY_ORDER),
            help: "Law that makes the length from the radii",
            ..SELECTOR
        },
        Argument {
            number: 3,
            name: "scale",
            label: "scale",
            group: "electronegativity",
            default: Some(selectors::ELECTRONEGATIVITY_PAULING),
            range: "a Pauling scale for this law",
            help: "Electronegativities, used by the Schomaker-Stevenson law only",
            ..SELECTOR
        },
        Argument { number: 4, name: "atomic_number_a", ..ATOM },
        Argument { number: 5, name: "state_a", ..STATE },
        Argument { number: 6, name: "atomic_number_b", ..ATOM },
        Argument { number: 7, name: "state_b", ..STATE },
        Argument {
            number: 8,
            name: "bond_order",
            label: "bond order",
            minimum: 0.0,
            above: true,
            maximum: 3.0,
            required: false,
            default_number: 1.0,
            range: "an order that the law and the radii are for, above 0 and at most 3",
            help: "Bond order; which orders are allowed depends on the law",
            ..NUMBER
        },
    ],
    results: &[Argument {
        number: 9,
        name: "length_A",
        label: "length",
        unit: "Å",
        uncertainty: "u_length_A",
        main: true,
        help: "Expected bond length [Å]",
        ..NUMBER
    }],
    statuses: &[Code::Missing, Code::NotFinite, Code::OutOfRange, Code::UnknownElement, Code::NoData, Code::NotAllowed],
    remarks: 0,
    notes: &[
        "LENGTH_RADIUS_SUM: order 1 with single-bond radii, 2 with double, 3 with triple; other orders are out of range.",
        "LENGTH_BY_ORDER: order 1 from the single-bond radii named, 2 and 3 from Pyykkö's double and triple radii, 1.5 the \
         mean of orders 1 and 2 (without uncertainty; benzene 1.40 Å with sp2 radii); other orders are out of range.",
        "LENGTH_SCHOMAKER_STEVENSON_1941: order 1, its own radii and a Pauling scale only; modern radii already hold the \
         shortening. Typically within 0.05 Å; fails for Si-F (1.69 against 1.56 Å).",
        "LENGTH_PAULING_ORDER_1960: orders 1 to 3 between non-metals; LENGTH_PAULING_ORDER_1947: orders 0.05 to 1 between \
         metals; both on single-bond radii.",
        "The uncertainty comes from the radii: the radius of one element used twice counts as fully correlated. The laws \
         have no published uncertainty, so their results have none (NaN) except at order 1 of the bond-order laws.",
    ],
    sources: &[
        "Cordero et al., Dalton Trans. 2008, 2832",
        "Pyykkö and Atsumi, Chem. Eur. J. 2009, 15, 186 and 12770; Pyykkö, Riedel and Patzschke, ibid. 2005, 11, 3511",
        "Schomaker and Stevenson, J. Am. Chem. Soc. 1941, 63, 37 (from memory)",
        "Pauling, J. Am. Chem. Soc. 1947, 69, 542; The Nature of the Chemical Bond, 3rd ed. 1960 (from memory)",
    ],
    examples: &[
        Example {
            given: "radii=RADII_CORDERO_2008;law=LENGTH_RADIUS_SUM;scale=ELECTRONEGATIVITY_PAULING;atomic_number_a=6;\
                    state_a=STATE_AS_LISTED;atomic_number_b=17;state_b=STATE_AS_LISTED;bond_order=1",
            gives: "length_A=1.78;u_length_A=0.0412310562561766",
            within: 1e-12,
            source: "0.76(1) + 1.02(4) Å: Cordero et al. 2008 (arithmetic)",
        },
        Example {
            given: "radii=RADII_SCHOMAKER_STEVENSON_1941;law=LENGTH_SCHOMAKER_STEVENSON_1941;scale=ELECTRONEGATIVITY_PAULING;\
                    atomic_number_a=6;state_a=STATE_AS_LISTED;atomic_number_b=9;state_b=STATE_AS_LISTED;bond_order=1",
            gives: "length_A=1.3613",
            within: 1e-10,
            source: "0.77 + 0.72 - 0.09 x 1.43 Å (arithmetic)",
        },
    ],
};

/// Expected length [Å] of a bond between two elements.
///
/// `radii` is a covalent table, `law` one of `LENGTH_…`, `scale` the electronegativities that the Schomaker–Stevenson law
/// uses; `state_a`, `state_b` choose an entry where a table tells states apart. Ranges: see [`BOND_LENGTH`].
///
/// # Errors
/// `UnknownSelector`, `WrongSelector`, `Missing`, `UnknownElement`, `OutOfRange` (order, or element outside the law),
/// `NotAllowed` (law with these radii or this scale), `NoData` (the table has no such entry).
#[allow(clippy::too_many_arguments)]
pub fn bond_length(
    radii: Selector,
    law: Selector,
    scale: Selector,
    atomic_number_a: i32,
    state_a: Selector,
    atomic_number_b: i32,
    state_b: Selector,
    bond_order: f64,
) -> Result<Quantity, Failure> {
    let f = &BOND_LENGTH;
    f.selector(1, radii)?;
    f.selector(2, law)?;
    f.selector(3, scale)?;
    let a = f.element(4, atomic_number_a)?;
    f.selector(5, state_a)?;
    let b = f.element(6, atomic_number_b)?;
    f.selector(7, state_b)?;
    let order = f.number(8, bond_order)?;
    let sum = |table: Selector| radius_sum(table, (a, state_a), (b, state_b));
    let out_of_range = Err(Failure::of(Code::OutOfRange, 8));
    match law {
        selectors::LENGTH_RADIUS_SUM => {
            if order == order_of(radii) {
                sum(radii)
            } else {
                out_of_range
            }
        }
        selectors::LENGTH_BY_ORDER => {
            single_bond_radii(radii)?;
            if order == 1.0 {
                sum(radii)
            } else if order == 1.5 {
                let (single, double) = (sum(radii)?, listed_sum(selectors::RADII_PYYKKO_DOUBLE_2009, a, b)?);
                Ok(Quantity::without_u(0.5 * (single.value + double.value)))
            } else if order == 2.0 {
                listed_sum(selectors::RADII_PYYKKO_DOUBLE_2009, a, b)
            } else if order == 3.0 {
                listed_sum(selectors::RADII_PYYKKO_TRIPLE_2005, a, b)
            } else {
                out_of_range
            }
        }
        selectors::LENGTH_SCHOMAKER_STEVENSON_1941 => {
            if radii != selectors::RADII_SCHOMAKER_STEVENSON_1941 {
                return Err(Failure::of(Code::NotAllowed, 1));
            }
            if scale != selectors::ELECTRONEGATIVITY_PAULING && scale != selectors::ELECTRONEGATIVITY_PAULING_ALLRED {
                return Err(Failure::of(Code::NotAllowed, 3));
            }
            if order != 1.0 {
                return out_of_range;
            }
            let chi_a = electronegativity(scale, a).map_err(|failure| failure.argument(4))?;
            let chi_b = electronegativity(scale, b).map_err(|failure| failure.argument(6))?;
            let length = sum(radii)?.value - POLAR_SHORTENING_A * (chi_a.value - chi_b.value).abs();
            Ok(Quantity::without_u(length))
        }
        selectors::LENGTH_PAULING_ORDER_1960 => {
            single_bond_radii(radii)?;
            partners(false, a, b)?;
            if order < 1.0 { out_of_range } else { ordered(sum(radii)?, COVALENT_ORDER_A, order) }
        }
        _ => {
            single_bond_radii(radii)?;
            partners(true, a, b)?;
            if !(0.05..=1.0).contains(&order) { out_of_range } else { ordered(sum(radii)?, METAL_ORDER_A, order) }
        }
    }
}

/// The bond order that a table of radii is for.
fn order_of(radii: Selector) -> f64 {
    match radii {
        selectors::RADII_PYYKKO_DOUBLE_2009 => 2.0,
        selectors::RADII_PYYKKO_TRIPLE_2005 => 3.0,
        _ => 1.0,
    }
}

/// The bond-order laws hold between metals or between non-metals.
fn partners(metals: bool, a: i32, b: i32) -> Result<(), Failure> {
    for (argument, element) in [(4, a), (6, b)] {
        if is_metal(element) != metals {
            return Err(Failure::of(Code::OutOfRange, argument));
        }
    }
    Ok(())
}

fn single_bond_radii(radii: Selector) -> Result<(), Failure> {
    if order_of(radii) == 1.0 { Ok(()) } else { Err(Failure::of(Code::NotAllowed, 1)) }
}

/// Sum from a table without states, whatever state was asked for.
fn listed_sum(table: Selector, a: i32, b: i32) -> Result<Quantity, Failure> {
    radius_sum(table, (a, selectors::STATE_AS_LISTED), (b, selectors::STATE_AS_LISTED))
}

fn radius_sum(table: Selector, a: (i32, Selector), b: (i32, Selector)) -> Result<Quantity, Failure> {
    let radius_a = covalent_radius(table, a.0, a.1).map_err(|failure| failure.argument(4))?;
    let radius_b = covalent_radius(table, b.0, b.1).map_err(|failure| failure.argument(6))?;
    // Millesimals of an ångström are exact in the tables; the sum is kept as clean as they are.
    let value = ((radius_a.value + radius_b.value) * 1e6).round() / 1e6;
    if a == b {
        // The same entry twice: its error is common to both ends.
        return Ok(Quantity::new(value, 2.0 * radius_a.u));
    }
    Ok(Quantity { value, ..radius_a.plus(radius_b) })
}

/// D(n) = D(1) − k log10 n; no uncertainty of the law is published.
fn ordered(single: Quantity, coefficient: f64, order: f64) -> Result<Quantity, Failure> {
    if order == 1.0 {
        return Ok(single);
    }
    Ok(Quantity::without_u(single.value - coefficient * libm::log10(order)))
}
