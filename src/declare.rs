//! Declarations of the worksheet functions: names, units, limits, defaults, meaning and sources.
//!
//! Each family declares its functions beside the code. The catalogue is written from these declarations, and the checks
//! of arguments are made from them, so that what is said and what is done cannot differ.

use crate::quantity::Quantity;
use crate::selectors::Selector;
use crate::status::{Code, Failure};

/// How the function is called from C.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Kind {
    /// One row, and a column form with `_column`.
    Scalar,
    /// One molecule, and a column of molecules with `_column`.
    Molecules,
}

/// What an argument holds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Holds {
    /// A floating-point number.
    Number,
    /// An integer.
    Integer,
    /// A choice from a group of selectors.
    Selector,
    /// A text.
    Text,
    /// The arrays of a column of molecules, or of their bonds.
    Block,
}

/// An argument or a result of a worksheet function.
#[derive(Clone, Copy, Debug)]
pub struct Argument {
    /// Catalogue number; results go on where the arguments end.
    pub number: i32,
    /// Name in every host.
    pub name: &'static str,
    /// Name for people.
    pub label: &'static str,
    /// What it holds.
    pub holds: Holds,
    /// Group of selectors that it chooses from, or that it returns.
    pub group: &'static str,
    /// `call`, `row`, `atom`, `bond`, `row×3`, `row×3×3`, `found`.
    pub shape: &'static str,
    /// Unit; empty for a pure number or no number.
    pub unit: &'static str,
    /// Smallest value.
    pub minimum: f64,
    /// Largest value.
    pub maximum: f64,
    /// The smallest value itself is not allowed.
    pub above: bool,
    /// The largest value itself is not allowed.
    pub below: bool,
    /// The range in words, after "must be", where limits alone do not tell it.
    pub range: &'static str,
    /// It must be given.
    pub required: bool,
    /// Default of a selector, which every host passes where the caller names none.
    pub default: Option<Selector>,
    /// Default of a number.
    pub default_number: f64,
    /// Name of the standard uncertainty that stands beside it; empty: none.
    pub uncertainty: &'static str,
    /// A 0-based index (hosts that count from 1 add 1).
    pub index: bool,
    /// The main result of the function.
    pub main: bool,
    /// At most 80 characters.
    pub help: &'static str,
}

/// A number in one row, required; fill in number, name, label, unit and help.
pub const NUMBER: Argument = Argument {
    number: 0,
    name: "",
    label: "",
    holds: Holds::Number,
    group: "",
    shape: "row",
    unit: "",
    minimum: f64::NEG_INFINITY,
    maximum: f64::INFINITY,
    above: false,
    below: false,
    range: "",
    required: true,
    default: None,
    default_number: f64::NAN,
    uncertainty: "",
    index: false,
    main: false,
    help: "",
};

/// An integer in one row.
pub const INTEGER: Argument = Argument { holds: Holds::Integer, ..NUMBER };

/// A choice for the whole call.
pub const SELECTOR: Argument = Argument { holds: Holds::Selector, shape: "call", ..NUMBER };

/// A text in one row.
pub const TEXT: Argument = Argument { holds: Holds::Text, ..NUMBER };

/// The arrays of a column of molecules.
pub const MOLECULES: Argument = Argument {
    holds: Holds::Block,
    name: "molecules",
    label: "molecules",
    shape: "row",
    help: "Atoms of each molecule: atomic numbers, formal charges, coordinates [Å]",
    ..NUMBER
};

/// The bonds of a column of molecules.
pub const BONDS: Argument = Argument {
    holds: Holds::Block,
    name: "bonds",
    label: "bonds",
    shape: "row",
    required: false,
    help: "Bonds of each molecule: pairs of atoms and orders; left out: found",
    ..NUMBER
};

/// A worked example that every host's tests run.
#[derive(Clone, Copy, Debug)]
pub struct Example {
    /// Arguments as `name=value;name=value`; selectors by name.
    pub given: &'static str,
    /// Results as `name=value;name=value`; selectors by name.
    pub gives: &'static str,
    /// Largest difference of a number.
    pub within: f64,
    /// Where the numbers come from.
    pub source: &'static str,
}

/// A worksheet function.
#[derive(Clone, Copy, Debug)]
pub struct Function {
    /// Name in every host; the C functions have `bmom_` before it.
    pub name: &'static str,
    /// Family of science.
    pub family: &'static str,
    /// How it is called.
    pub kind: Kind,
    /// ABI version that brought it.
    pub since: i32,
    /// Title.
    pub title: &'static str,
    /// Formula in plain characters.
    pub formula: &'static str,
    /// Arguments in order; their numbers count from 1.
    pub arguments: &'static [Argument],
    /// Results in order; their numbers go on.
    pub results: &'static [Argument],
    /// What a row or a call may end with besides `Ok` and the codes of any call.
    pub statuses: &'static [Code],
    /// Remark bits that a row may carry.
    pub remarks: i32,
    /// Range of validity, accuracy, conventions.
    pub notes: &'static [&'static str],
    /// Published sources as author, journal, year.
    pub sources: &'static [&'static str],
    /// Worked examples.
    pub examples: &'static [Example],
}

impl Function {
    /// The argument or result of a number.
    pub fn argument(&self, number: i32) -> Option<&'static Argument> {
        self.arguments.iter().chain(self.results).find(|argument| argument.number == number)
    }

    /// Checks a number against the declared limits.
    ///
    /// # Errors
    /// `Missing`, `NotFinite`, `OutOfRange` of this argument.
    pub fn number(&self, number: i32, value: f64) -> Result<f64, Failure> {
        let fail = |code| Err(Failure::of(code, number));
        if value.is_nan() {
            return fail(Code::Missing);
        }
        if value.is_infinite() {
            return fail(Code::NotFinite);
        }
        match self.argument(number) {
            Some(a) if value < a.minimum || value > a.maximum => fail(Code::OutOfRange),
            Some(a) if (a.above && value == a.minimum) || (a.below && value == a.maximum) => fail(Code::OutOfRange),
            Some(_) => Ok(value),
            None => fail(Code::Internal),
        }
    }

    /// Checks a number and its uncertainty (NaN: not known).
    ///
    /// # Errors
    /// As `number`, and `NegativeUncertainty`, `NotFinite` for the uncertainty.
    pub fn quantity(&self, number: i32, quantity: Quantity) -> Result<Quantity, Failure> {
        self.number(number, quantity.value)?;
        self.uncertainty(number, quantity.u)?;
        Ok(quantity)
    }

    /// Checks an uncertainty (NaN: not known).
    ///
    /// # Errors
    /// `NegativeUncertainty`, `NotFinite` of this argument.
    pub fn uncertainty(&self, number: i32, u: f64) -> Result<f64, Failure> {
        if u < 0.0 {
            return Err(Failure::of(Code::NegativeUncertainty, number));
        }
        if u.is_infinite() {
            return Err(Failure::of(Code::NotFinite, number));
        }
        Ok(u)
    }

    /// Checks an integer against the declared limits.
    ///
    /// # Errors
    /// `Missing`, `OutOfRange` of this argument.
    pub fn integer(&self, number: i32, value: i32) -> Result<i32, Failure> {
        if value == i32::MIN {
            return Err(Failure::of(Code::Missing, number));
        }
        self.number(number, f64::from(value)).map(|_| value)
    }

    /// Checks an atomic number.
    ///
    /// # Errors
    /// `Missing`, `UnknownElement` of this argument.
    pub fn element(&self, number: i32, atomic_number: i32) -> Result<i32, Failure> {
        match atomic_number {
            i32::MIN => Err(Failure::of(Code::Missing, number)),
            1..=118 => Ok(atomic_number),
            _ => Err(Failure::of(Code::UnknownElement, number)),
        }
    }

    /// Checks a choice against the declared group.
    ///
    /// # Errors
    /// `UnknownSelector`, `WrongSelector` of this argument.
    pub fn selector(&self, number: i32, selector: Selector) -> Result<Selector, Failure> {
        let group = self.argument(number).map_or("", |argument| argument.group);
        selector.of_group(group).map_err(|failure| failure.argument(number))
    }
}
