//! Molecular formulas and atom labels.

use std::collections::BTreeMap;

use crate::elements::symbol;

/// The formula by Hill's system: carbon first, hydrogen second, the rest by the alphabet; without carbon all by the
/// alphabet. Deuterium and tritium count as hydrogen. Numbers that are no elements are left out.
///
/// Reference: E. A. Hill, J. Am. Chem. Soc. 1900, 22, 478.
pub fn hill_formula(atomic_number: &[i32]) -> String {
    let mut counts: BTreeMap<(u8, &str), u64> = BTreeMap::new();
    let carbon = atomic_number.contains(&6);
    for &z in atomic_number {
        if let Ok(symbol) = symbol(z) {
            let rank = match z {
                6 => 0,
                1 if carbon => 1,
                _ => 2,
            };
            *counts.entry((rank, symbol)).or_insert(0) += 1;
        }
    }
    let mut formula = String::new();
    for ((_, symbol), count) in counts {
        formula.push_str(symbol);
        if count > 1 {
            formula.push_str(&count.to_string());
        }
    }
    formula
}

/// An atom as its symbol and its number in the file, from 1: `C1`.
pub fn atom_label(atomic_number: &[i32], atom: usize) -> String {
    let symbol = atomic_number.get(atom).and_then(|&z| symbol(z).ok()).unwrap_or("?");
    format!("{symbol}{}", atom + 1)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Hill 1900 orders these so; sulfuric acid and carbon tetrachloride are textbook examples.
    #[test]
    fn hill_order() {
        assert_eq!(hill_formula(&[1, 8, 1, 16, 8, 8, 8]), "H2O4S");
        assert_eq!(hill_formula(&[17, 6, 17, 17, 17]), "CCl4");
        assert_eq!(hill_formula(&[17, 11]), "ClNa");
        assert_eq!(hill_formula(&[8, 6, 6, 1, 1, 1, 1, 1, 1]), "C2H6O");
        assert_eq!(hill_formula(&[35, 1]), "BrH");
        assert_eq!(hill_formula(&[]), "");
    }
}
