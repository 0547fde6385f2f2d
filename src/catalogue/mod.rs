//! The library describes itself: every worksheet function with its arguments, units, defaults, limits and sources.
//!
//! The text is JSON with the members `catalogue`, `version`, `data_version`, `blocks`, `functions`, `selectors`, `tables`,
//! `settings`, `statuses`, `remarks` and `units`. It is written from the declarations that the code checks its arguments
//! with. Readers ignore members that they do not know; none changes the meaning of another.

pub mod evaluate;
mod json;
mod message;

pub use evaluate::{Value, evaluate};
pub use json::text;
pub use message::message;

use crate::declare::Function;
use crate::status::{Code, Failure};
use crate::{bonds, charges, elements, moments};

/// Version of the schema of the catalogue.
pub const SCHEMA: i32 = 1;

/// Version of the embedded tables.
pub const DATA_VERSION: &str = include_str!("../tables/version.txt").trim_ascii();

/// All worksheet functions, a family after the other.
pub fn functions() -> impl Iterator<Item = &'static Function> {
    [elements::FUNCTIONS, bonds::FUNCTIONS, charges::FUNCTIONS, moments::FUNCTIONS].into_iter().flatten().copied()
}

/// The declaration of a function by its name.
///
/// # Errors
/// `UnknownName`.
pub fn function(name: &str) -> Result<&'static Function, Failure> {
    functions().find(|function| function.name == name).ok_or(Failure::new(Code::UnknownName))
}
