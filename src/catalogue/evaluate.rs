//! Any scalar worksheet function by its name, with arguments as people write them.
//!
//! The command line's `lookup` and the test of the catalogue's examples call functions this way; hosts call the C ABI.

use crate::declare::{Argument, Function, Kind};
use crate::library::table::number_read;
use crate::quantity::Quantity;
use crate::selectors::{self, Selector};
use crate::status::{Code, Failure};
use crate::{bonds, charges, elements, units};

use super::message;

/// A value in a cell.
#[derive(Clone, Debug, PartialEq)]
pub enum Value {
    /// A number with its standard uncertainty.
    Number(Quantity),
    /// An integer.
    Integer(i32),
    /// A choice.
    Choice(Selector),
    /// A text.
    Text(String),
}

/// The results of a scalar function, in their order. `given` holds (name, text): numbers with a decimal point, choices by
/// name with or without the prefix of their group, elements by symbol, name or number, `u_name` for an uncertainty. What
/// is left out takes its declared default.
///
/// # Errors
/// A sentence that names the argument and what is wrong with it.
pub fn evaluate(
    function: &'static Function,
    given: &[(&str, &str)],
) -> Result<Vec<(&'static Argument, Value)>, String> {
    if function.kind != Kind::Scalar || function.arguments.iter().any(|argument| argument.shape.contains('×')) {
        return Err(format!("{} works on whole molecules; use tabulate", function.name));
    }
    for (name, _) in given {
        if !function.arguments.iter().any(|argument| argument.name == *name || argument.uncertainty == *name) {
            let names: Vec<&str> = function.arguments.iter().map(|argument| argument.name).collect();
            return Err(format!("{} has no argument {name}; it has {}", function.name, names.join(", ")));
        }
    }
    let arguments = Arguments { function, given };
    let values = call(&arguments).map_err(|refusal| match refusal {
        Refusal::Words(words) => words,
        Refusal::Status(failure) => message(Some(function), failure.status()),
    })?;
    Ok(function.results.iter().zip(values).collect())
}

enum Refusal {
    Words(String),
    Status(Failure),
}

impl From<Failure> for Refusal {
    fn from(failure: Failure) -> Self {
        Self::Status(failure)
    }
}

struct Arguments<'a> {
    function: &'static Function,
    given: &'a [(&'a str, &'a str)],
}

impl Arguments<'_> {
    fn text(&self, name: &str) -> Option<&str> {
        self.given.iter().find(|(given, _)| *given == name).map(|(_, text)| *text)
    }

    fn argument(&self, number: i32) -> Result<&'static Argument, Refusal> {
        self.function.argument(number).ok_or(Refusal::Status(Failure::new(Code::Internal)))
    }

    fn missing<T>(argument: &Argument) -> Result<T, Refusal> {
        Err(Refusal::Status(Failure::of(Code::Missing, argument.number)))
    }

    fn number(&self, number: i32) -> Result<f64, Refusal> {
        let argument = self.argument(number)?;
        match self.text(argument.name) {
            Some(text) => {
                number_read(text).map_err(|_| Refusal::Words(format!("{}: '{text}' is no number", argument.name)))
            }
            None if argument.default_number.is_finite() => Ok(argument.default_number),
            None => Self::missing(argument),
        }
    }

    fn quantity(&self, number: i32) -> Result<Quantity, Refusal> {
        let argument = self.argument(number)?;
        let value = self.number(number)?;
        let u = match self.text(argument.uncertainty) {
            Some(text) => number_read(text)
                .map_err(|_| Refusal::Words(format!("{}: '{text}' is no number", argument.uncertainty)))?,
            None => f64::NAN,
        };
        Ok(Quantity::new(value, u))
    }

    /// An integer; an element also by symbol or name.
    fn integer(&self, number: i32) -> Result<i32, Refusal> {
        let argument = self.argument(number)?;
        let Some(text) = self.text(argument.name) else { return Self::missing(argument) };
        if let Ok(integer) = text.trim().parse::<i32>() {
            return Ok(integer);
        }
        if argument.name.starts_with("atomic_number") {
            return elements::atomic_number(text)
                .map_err(|_| Refusal::Words(format!("{}: '{text}' is no element", argument.name)));
        }
        Err(Refusal::Words(format!("{}: '{text}' is no integer", argument.name)))
    }

    fn choice(&self, number: i32) -> Result<Selector, Refusal> {
        let argument = self.argument(number)?;
        let Some(text) = self.text(argument.name) else {
            return argument.default.map_or_else(|| Self::missing(argument), Ok);
        };
        choice_of(argument.group, text).ok_or_else(|| {
            let names: Vec<&str> = selectors::ALL
                .iter()
                .filter(|choice| choice.group == argument.group)
                .map(|choice| choice.name)
                .collect();
            Refusal::Words(format!("{}: '{text}' is none of {}", argument.name, names.join(" ")))
        })
    }
}

/// The choice of a group by its name, in any case, with or without the prefix that the group's names share; a unit also by
/// its symbol.
pub fn choice_of(group: &str, text: &str) -> Option<Selector> {
    let choices = || selectors::ALL.iter().filter(|choice| choice.group == group);
    if let Ok(selector) = Selector::by_name(text) {
        return selector.of_group(group).ok();
    }
    // Symbols as the titles have them: "Å", "kJ/mol", "e a0"; what follows in brackets explains them.
    if let Some(choice) = choices().find(|choice| choice.title.split(" (").next() == Some(text.trim())) {
        return Some(choice.selector);
    }
    let prefix = choices().next().map_or("", |choice| choice.name.split('_').next().unwrap_or(""));
    Selector::by_name(&format!("{prefix}_{}", text.trim())).ok().and_then(|selector| selector.of_group(group).ok())
}

fn call(a: &Arguments<'_>) -> Result<Vec<Value>, Refusal> {
    let number =
        |answer: Result<Quantity, Failure>| -> Result<Vec<Value>, Refusal> { Ok(vec![Value::Number(answer?)]) };
    match a.function.name {
        "atomic_number" => {
            let text = a.text("symbol").ok_or(Failure::of(Code::Missing, 1))?;
            Ok(vec![Value::Integer(elements::atomic_number(text)?)])
        }
        "symbol" => Ok(vec![Value::Text(elements::symbol(a.integer(1)?)?.to_owned())]),
        "covalent_radius" => number(elements::covalent_radius(a.choice(1)?, a.integer(2)?, a.choice(3)?)),
        "vdw_radius" => number(elements::vdw_radius(a.choice(1)?, a.integer(2)?)),
        "electronegativity" => number(elements::electronegativity(a.choice(1)?, a.integer(2)?)),
        "atomic_weight" => number(elements::atomic_weight(a.choice(1)?, a.integer(2)?)),
        "polarizability" => number(elements::polarizability(a.choice(1)?, a.integer(2)?)),
        "bohr_radius" => number(elements::bohr_radius(a.integer(1)?, a.integer(2)?)),
        "convert" => number(units::convert(a.choice(1)?, a.choice(2)?, a.quantity(3)?)),
        "bond_length" => number(bonds::bond_length(
            a.choice(1)?,
            a.choice(2)?,
            a.choice(3)?,
            a.integer(4)?,
            a.choice(5)?,
            a.integer(6)?,
            a.choice(7)?,
            a.number(8)?,
        )),
        "bond_polarity" => {
            let answer = bonds::bond_polarity(a.choice(1)?, a.number(2)?, a.number(3)?, a.integer(4)?, a.integer(5)?)?;
            Ok(vec![Value::Number(answer.delta_chi), Value::Choice(answer.negative_end), Value::Choice(answer.class)])
        }
        "ionic_character" => number(bonds::ionic_character(a.choice(1)?, a.quantity(2)?)),
        "charge_from_dipole" => number(charges::charge_from_dipole(a.quantity(1)?, a.quantity(2)?)),
        "dipole_from_charge" => number(charges::dipole_from_charge(a.quantity(1)?, a.quantity(2)?)),
        "length_from_dipole" => number(charges::length_from_dipole(a.quantity(1)?, a.quantity(2)?)),
        _ => Err(Failure::new(Code::Internal).into()),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::catalogue::functions;

    /// Every example in the catalogue gives its number.
    #[test]
    fn examples_hold() {
        let mut checked = 0;
        for function in functions() {
            for example in function.examples {
                let pairs = |text: &'static str| -> Vec<(&str, &str)> {
                    text.split(';').filter_map(|pair| pair.split_once('=')).map(|(n, v)| (n.trim(), v.trim())).collect()
                };
                if function.kind != Kind::Scalar || function.name == "dipole_polarity" {
                    continue;
                }
                let results = evaluate(function, &pairs(example.given));
                let results = results.unwrap_or_else(|words| panic!("{}: {words}", function.name));
                for (name, expected) in pairs(example.gives) {
                    let (found, wanted) = results
                        .iter()
                        .find_map(|(argument, value)| match value {
                            Value::Number(q) if argument.name == name => Some((q.value, number_read(expected).ok()?)),
                            Value::Number(q) if argument.uncertainty == name => {
                                Some((q.u, number_read(expected).ok()?))
                            }
                            Value::Integer(i) if argument.name == name => {
                                Some((f64::from(*i), number_read(expected).ok()?))
                            }
                            Value::Choice(c) if argument.name == name => {
                                Some((f64::from(c.0), f64::from(choice_of(argument.group, expected)?.0)))
                            }
                            Value::Text(t) if argument.name == name => Some((f64::from(u8::from(t == expected)), 1.0)),
                            _ => None,
                        })
                        .unwrap_or_else(|| panic!("{}: no result {name}", function.name));
                    assert!((found - wanted).abs() <= example.within, "{}: {name} {found} {wanted}", function.name);
                    checked += 1;
                }
            }
        }
        assert!(checked >= 15, "{checked} examples");
    }

    #[test]
    fn people_may_write_short_names() {
        assert_eq!(choice_of("radii", "cordero 2008"), Some(selectors::RADII_CORDERO_2008));
        assert_eq!(choice_of("radii", "VDW_BONDI_1964"), None);
    }
}
