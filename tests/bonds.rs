//! The family bonds against published values: tests/published/bonds.csv; and what it refuses.

use std::path::Path;

use bondmoment::bonds::{bond_length, bond_polarity, ionic_character, is_metal};
use bondmoment::catalogue::evaluate::choice_of;
use bondmoment::catalogue::{Value, evaluate, function};
use bondmoment::quantity::Quantity;
use bondmoment::selectors::*;
use bondmoment::status::{Code, Failure};

fn pairs(text: &str) -> Vec<(&str, &str)> {
    text.split(';').filter_map(|pair| pair.split_once('=')).collect()
}

#[test]
fn published_values() {
    let file = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/published/bonds.csv");
    let mut checked = 0;
    for row in csv::Reader::from_path(file).unwrap().records() {
        let row = row.unwrap();
        let (name, given, tolerance) = (&row[0], pairs(&row[1]), row[3].parse::<f64>().unwrap());
        let results =
            evaluate(function(name).unwrap(), &given).unwrap_or_else(|words| panic!("{name} {given:?}: {words}"));
        for (wanted, expected) in pairs(&row[2]) {
            let found = results.iter().find_map(|(argument, value)| match value {
                Value::Number(q) if argument.name == wanted => Some((q.value, expected.parse().unwrap())),
                Value::Number(q) if argument.uncertainty == wanted => Some((q.u, expected.parse().unwrap())),
                Value::Choice(c) if argument.name == wanted => {
                    Some((f64::from(c.0), f64::from(choice_of(argument.group, expected).unwrap().0)))
                }
                _ => None,
            });
            let (found, expected): (f64, f64) = found.unwrap_or_else(|| panic!("{name}: no result {wanted}"));
            let agrees = (found - expected).abs() <= tolerance || (found.is_nan() && expected.is_nan());
            assert!(agrees, "{name} {given:?}: {wanted} {found}, {expected} within {tolerance} ({})", &row[4]);
            checked += 1;
        }
    }
    assert!(checked > 80, "{checked} values");
}

/// At order 1 every law is the sum; with growing order the expected length falls.
#[test]
fn length_falls_with_order() {
    let length = |order| {
        let (c, sp2) = (6, STATE_SP2);
        bond_length(RADII_CORDERO_2008, LENGTH_BY_ORDER, ELECTRONEGATIVITY_PAULING, c, sp2, c, sp2, order)
            .unwrap()
            .value
    };
    assert!(length(1.0) > length(1.5) && length(1.5) > length(2.0) && length(2.0) > length(3.0));
}

#[test]
fn laws_keep_to_their_ranges() {
    let length = |radii, law, a, b, order| {
        bond_length(radii, law, ELECTRONEGATIVITY_PAULING, a, STATE_AS_LISTED, b, STATE_AS_LISTED, order).unwrap_err()
    };
    let (cordero, own) = (RADII_CORDERO_2008, RADII_SCHOMAKER_STEVENSON_1941);
    for (found, code, argument) in [
        (length(cordero, LENGTH_SCHOMAKER_STEVENSON_1941, 6, 9, 1.0), Code::NotAllowed, 1),
        (length(own, LENGTH_SCHOMAKER_STEVENSON_1941, 6, 9, 2.0), Code::OutOfRange, 8),
        (length(own, LENGTH_SCHOMAKER_STEVENSON_1941, 6, 26, 1.0), Code::NoData, 6),
        (length(cordero, LENGTH_PAULING_ORDER_1960, 6, 26, 2.0), Code::OutOfRange, 6),
        (length(cordero, LENGTH_PAULING_ORDER_1960, 6, 6, 0.5), Code::OutOfRange, 8),
        (length(cordero, LENGTH_PAULING_ORDER_1947, 29, 6, 0.5), Code::OutOfRange, 6),
        (length(cordero, LENGTH_PAULING_ORDER_1947, 29, 29, 2.0), Code::OutOfRange, 8),
        (length(cordero, LENGTH_RADIUS_SUM, 6, 6, 2.0), Code::OutOfRange, 8),
        (length(RADII_PYYKKO_DOUBLE_2009, LENGTH_BY_ORDER, 6, 6, 2.0), Code::NotAllowed, 1),
        (length(cordero, LENGTH_BY_ORDER, 1, 6, 2.0), Code::NoData, 4),
        (length(cordero, LENGTH_BY_ORDER, 6, 6, f64::NAN), Code::Missing, 8),
        (length(cordero, LENGTH_BY_ORDER, 0, 6, 1.0), Code::UnknownElement, 4),
        (length(VDW_BONDI_1964, LENGTH_BY_ORDER, 6, 6, 1.0), Code::WrongSelector, 1),
        (length(cordero, Selector(0), 6, 6, 1.0), Code::UnknownSelector, 2),
    ] {
        assert_eq!((found.code, found.argument), (code, argument));
    }
}

#[test]
fn limits_of_polarity_are_checked() {
    let scale = ELECTRONEGATIVITY_PAULING;
    assert_eq!(bond_polarity(scale, 1.0, 0.5, 1, 9), Err(Failure::of(Code::OutOfRange, 3)));
    assert_eq!(bond_polarity(scale, -0.1, 0.5, 1, 9), Err(Failure::of(Code::OutOfRange, 2)));
    assert_eq!(bond_polarity(scale, 0.4, 1.7, 1, 2), Err(Failure::of(Code::NoData, 5)));
    assert_eq!(bond_polarity(RADII_CORDERO_2008, 0.4, 1.7, 1, 9), Err(Failure::of(Code::WrongSelector, 1)));
    let negative = Quantity::new(1.0, -0.1);
    assert_eq!(ionic_character(IONIC_PAULING_1960, negative), Err(Failure::of(Code::NegativeUncertainty, 2)));
}

/// Metalloids count as non-metals (common practice).
#[test]
fn metals() {
    assert!([3, 4, 11, 13, 26, 31, 50, 82, 83, 92].into_iter().all(is_metal));
    assert!(![1, 2, 5, 6, 9, 14, 17, 32, 33, 51, 52, 53, 85, 86, 0, 119].into_iter().any(is_metal));
}
