//! Bonds: expected length, polarity, ionic character; which atoms are bonded.

pub mod length;
pub mod metals;
pub mod polarity;

pub use length::bond_length;
pub use metals::is_metal;
pub use polarity::{BondPolarity, bond_polarity, ionic_character};
