//! Numbers and columns for people.

use std::io::{self, Write};

use bondmoment::library::number_text;
use bondmoment::quantity::Quantity;

/// A value with its uncertainty: the uncertainty with two significant digits and the value to the same place (GUM 7.2.6);
/// without one, six significant digits.
pub(crate) fn quantity(quantity: Quantity) -> String {
    let Quantity { value, u } = quantity;
    if u == 0.0 {
        return format!("{} (exact)", number_text(value));
    }
    if !u.is_finite() || !value.is_finite() {
        return significant(value, 6);
    }
    let place = 1 - exponent(u);
    if !(0..=15).contains(&place) {
        return format!("{} ± {}", significant(value, 6), significant(u, 2));
    }
    format!("{value:.0$} ± {u:.0$}", place as usize)
}

/// A number with so many significant digits at most.
pub(crate) fn significant(value: f64, digits: i32) -> String {
    if value == 0.0 || !value.is_finite() {
        return number_text(value);
    }
    let place = digits - 1 - exponent(value);
    if !(0..=15).contains(&place) {
        return format!("{value:.0$e}", (digits - 1) as usize);
    }
    let text = format!("{value:.0$}", place as usize);
    if text.contains('.') { text.trim_end_matches('0').trim_end_matches('.').to_owned() } else { text }
}

/// Power of ten of the first digit.
fn exponent(value: f64) -> i32 {
    let text = format!("{:e}", value.abs());
    text.split_once('e').and_then(|(_, exponent)| exponent.parse().ok()).unwrap_or(0)
}

/// Lines of cells as columns; the first line is the head.
pub(crate) fn columns(out: &mut impl Write, lines: &[Vec<String>]) -> io::Result<()> {
    let count = lines.iter().map(Vec::len).max().unwrap_or(0);
    let width =
        |k: usize| lines.iter().filter_map(|line| line.get(k)).map(|cell| cell.chars().count()).max().unwrap_or(0);
    let widths: Vec<usize> = (0..count).map(width).collect();
    for line in lines {
        let mut text = String::new();
        for (cell, &width) in line.iter().zip(&widths) {
            text.push_str(cell);
            text.extend(std::iter::repeat_n(' ', width - cell.chars().count() + 2));
        }
        writeln!(out, "{}", text.trim_end())?;
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;

    /// GUM 7.2.6: at most two significant digits of u, and the estimate rounded to agree.
    #[test]
    fn values_are_rounded_to_their_uncertainty() {
        assert_eq!(quantity(Quantity::new(1.78, 0.041_231)), "1.780 ± 0.041");
        assert_eq!(quantity(Quantity::new(100.021_47, 0.000_35)), "100.02147 ± 0.00035");
        assert_eq!(quantity(Quantity::without_u(0.181_086_84)), "0.181087");
        assert_eq!(quantity(Quantity::exact(12.0)), "12 (exact)");
        assert_eq!(significant(78.3, 6), "78.3");
        assert_eq!(significant(-4.803_204_712_57, 6), "-4.8032");
    }
}
