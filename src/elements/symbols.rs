//! Symbols and names of the elements, and their atomic numbers.

use super::ELEMENT;
use crate::declare::{Argument, Example, Function, Kind, TEXT};
use crate::status::{Code, Failure};
use crate::tables;

const SOURCE: &str =
    "Nomenclature of Inorganic Chemistry, IUPAC Recommendations 2005, Table I; 2016 for Nh, Mc, Ts, Og";

/// Declaration of [`atomic_number`].
pub static ATOMIC_NUMBER: Function = Function {
    name: "atomic_number",
    family: "elements",
    kind: Kind::Scalar,
    since: 1,
    title: "Atomic number of an element",
    formula: "",
    arguments: &[Argument {
        number: 1,
        name: "symbol",
        label: "element",
        help: "Symbol or English name of an element, in any case",
        ..TEXT
    }],
    results: &[Argument { number: 2, main: true, ..ELEMENT }],
    statuses: &[Code::Missing, Code::UnknownElement],
    remarks: 0,
    notes: &[
        "Blanks around the text do not count.",
        "D and T are hydrogen. A symbol with a mass number is not an element's symbol and is refused.",
        "Aluminum, cesium and sulphur are read too.",
    ],
    sources: &[SOURCE],
    examples: &[Example {
        given: "symbol=Cl",
        gives: "atomic_number=17",
        within: 0.0,
        source: "the periodic table of the elements",
    }],
};

/// Declaration of [`symbol`].
pub static SYMBOL: Function = Function {
    name: "symbol",
    title: "Symbol of an element",
    arguments: &[Argument { number: 1, ..ELEMENT }],
    results: &[Argument {
        number: 2,
        name: "symbol",
        label: "symbol",
        main: true,
        help: "Symbol of the element",
        ..TEXT
    }],
    notes: &[],
    examples: &[Example {
        given: "atomic_number=26",
        gives: "symbol=Fe",
        within: 0.0,
        source: "the periodic table of the elements",
    }],
    ..ATOMIC_NUMBER
};

/// Atomic number of a symbol or an English name, in any case and with blanks around it; D and T are hydrogen.
///
/// # Errors
/// `Missing` (an empty text), `UnknownElement` of argument 1.
pub fn atomic_number(text: &str) -> Result<i32, Failure> {
    let text = text.trim();
    if text.is_empty() {
        return Err(Failure::of(Code::Missing, 1));
    }
    tables::element_by_text(text).map_err(|failure| failure.argument(1))
}

/// Symbol of an element.
///
/// # Errors
/// `Missing`, `UnknownElement` of argument 1.
pub fn symbol(atomic_number: i32) -> Result<&'static str, Failure> {
    let z = SYMBOL.element(1, atomic_number)?;
    tables::element(z).map(|element| element.symbol.as_str()).map_err(|failure| failure.argument(1))
}
