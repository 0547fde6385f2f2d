//! Bonds: expected length, polarity, ionic character; which atoms are bonded.

pub mod find;
pub mod length;
pub mod metals;
pub mod polarity;

pub use length::bond_length;
pub use metals::is_metal;
pub use polarity::{BondPolarity, bond_polarity, ionic_character};

use crate::declare::Function;

/// The worksheet functions of this family, in the order of the catalogue.
pub static FUNCTIONS: &[&Function] =
    &[&length::BOND_LENGTH, &polarity::BOND_POLARITY, &polarity::IONIC_CHARACTER, &find::FIND_BONDS];
