//! Which elements count as metals: a bond is called ionic only where one partner is one.

/// True for metals; boron, silicon, germanium, arsenic, antimony, tellurium and astatine count as non-metals (common
/// practice: there is no standard). Numbers outside 1 to 118 are no metals.
pub fn is_metal(atomic_number: i32) -> bool {
    match atomic_number {
        1 | 2 | 5..=10 | 14..=18 | 32..=36 | 51..=54 | 85 | 86 | 117 | 118 => false,
        3..=118 => true,
        _ => false,
    }
}
