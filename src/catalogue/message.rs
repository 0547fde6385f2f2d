//! Statuses in words: which argument, which limit.

use crate::declare::{Argument, Function, Holds};
use crate::selectors;
use crate::status::Code;

/// The words of a status of a function, such as `length_A must be above 0 Å`. Without a function, or with a status that
/// names no argument of it, the words of the code alone.
pub fn message(function: Option<&Function>, status: i32) -> String {
    let code = status.rem_euclid(1000);
    let Some(code) = Code::from_number(code) else { return format!("unknown status {status}") };
    let number = status.div_euclid(1000);
    match function.and_then(|function| function.argument(number)) {
        Some(argument) => with_argument(argument, code),
        None if number > 0 => format!("argument {number}: {}", code.text()),
        None => code.text().to_owned(),
    }
}

fn with_argument(argument: &Argument, code: Code) -> String {
    let name = &match argument.uncertainty {
        // A vector and its matrix are checked together.
        u if argument.shape.contains('×') && !u.is_empty() => format!("{} or {u}", argument.name),
        _ => argument.name.to_owned(),
    };
    match code {
        _ if argument.holds == Holds::Block => format!("{name}: {}; the item tells which", code.text()),
        Code::OutOfRange | Code::NotAllowed if !argument.range.is_empty() => {
            format!("{name} must be {}", argument.range)
        }
        Code::OutOfRange => match limits(argument) {
            Some(limits) => format!("{name} must be {limits}"),
            None => format!("{name} is outside its range"),
        },
        Code::Missing => format!("{name} is missing"),
        Code::NotFinite => format!("{name} or its uncertainty is infinite"),
        Code::NegativeUncertainty => format!("{} must not be negative", argument.uncertainty),
        Code::UnknownSelector | Code::WrongSelector => {
            format!("{name}: {}; it takes one of BMOM_{}_...", code.text(), prefix_of(argument.group))
        }
        Code::UnknownElement => format!("{name}: there is no such element (1 to 118)"),
        _ => format!("{name}: {}", code.text()),
    }
}

/// What the names of a group begin with.
fn prefix_of(group: &str) -> &'static str {
    let first = selectors::ALL.iter().find(|choice| choice.group == group);
    first.map_or("", |choice| choice.name.split('_').next().unwrap_or(""))
}

/// The declared limits in words, with the unit.
fn limits(argument: &Argument) -> Option<String> {
    let unit = if argument.unit.is_empty() { String::new() } else { format!(" {}", argument.unit) };
    let low = argument
        .minimum
        .is_finite()
        .then(|| format!("{} {}", if argument.above { "above" } else { "at least" }, argument.minimum));
    let high = argument
        .maximum
        .is_finite()
        .then(|| format!("{} {}", if argument.below { "below" } else { "at most" }, argument.maximum));
    match (low, high) {
        (Some(low), Some(high)) => Some(format!("{low} and {high}{unit}")),
        (Some(one), None) | (None, Some(one)) => Some(format!("{one}{unit}")),
        (None, None) => None,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::charges::diatomic::CHARGE_FROM_DIPOLE;

    #[test]
    fn words_name_argument_limit_and_unit() {
        assert_eq!(message(Some(&CHARGE_FROM_DIPOLE), 2052), "length_A must be above 0 Å");
        assert_eq!(message(Some(&CHARGE_FROM_DIPOLE), 1053), "u_dipole_D must not be negative");
        assert_eq!(message(Some(&CHARGE_FROM_DIPOLE), 0), "all is well");
        assert_eq!(message(None, 2052), "argument 2: a value is outside its range");
        assert_eq!(message(None, 77), "unknown status 77");
    }
}
