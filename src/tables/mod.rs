//! The embedded tables: values as printed, each with its uncertainty, its mark and a note, and the sources behind them.
//!
//! One CSV file a kind, compiled in and parsed once. A table is never patched from another: where it has no entry the
//! answer is `NoData`. Values stand in the unit of the published table, which `sources.csv` states; the families convert.

mod parse;
mod sources;

use crate::selectors::{STATE_AS_LISTED, Selector};
use crate::status::{Code, Failure};
use once_cell::race::OnceBox;
use parse::Tables;

pub(crate) use sources::source_by_name;
pub use sources::{Source, source, source_json};

/// One value of a published table.
#[derive(Clone, Debug, PartialEq)]
pub struct Entry {
    /// The value in the table's own unit.
    pub value: f64,
    /// The uncertainty as printed; NaN where none is published, 0 where the value is exact.
    pub u: f64,
    /// One unit of the last digit printed.
    pub last_digit: f64,
    /// What the entry is for: a hybridization or a spin state, else `STATE_AS_LISTED`.
    pub state: Selector,
    /// How far it was checked: `MARK_VERIFIED`, `MARK_CORROBORATED`, `MARK_TRANSCRIBED`, `MARK_FROM_MEMORY`.
    pub mark: Selector,
    /// An estimate or a computed number in a table of measured ones.
    pub estimated: bool,
    /// Disputes and conditions in a few words, or empty.
    pub note: String,
}

/// A chemical element.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Element {
    /// Symbol.
    pub symbol: String,
    /// English name (IUPAC).
    pub name: String,
    /// Other symbols and names of it.
    pub other_names: Vec<String>,
}

static TABLES: OnceBox<Tables> = OnceBox::new();

/// The parsed tables. That the embedded text is sound is proved by the tests, so the failure never reaches a caller.
fn tables() -> Result<&'static Tables, Failure> {
    TABLES.get_or_try_init(|| parse::read_all().map(Box::new).map_err(|_| Failure::new(Code::Internal)))
}

/// The entry of a table for an element, in the table's own unit; `STATE_AS_LISTED` takes the first one listed.
///
/// # Errors
/// `UnknownSelector`, `WrongSelector` (no table of values by element) · `UnknownElement` · `NoData` (no such element or
/// no such state in this table).
pub fn entry(table: Selector, atomic_number: i32, state: Selector) -> Result<&'static Entry, Failure> {
    match tables()?.by_selector(table) {
        Some(found) => found.entry(atomic_number, state),
        None => Err(match table.choice() {
            Ok(_) => Failure::new(Code::WrongSelector),
            Err(failure) => failure,
        }),
    }
}

/// First ionization energy of an atom [eV].
///
/// # Errors
/// `UnknownElement`, `NoData`.
pub fn ionization_energy(atomic_number: i32) -> Result<&'static Entry, Failure> {
    named("IONIZATION_ENERGY", atomic_number)
}

/// Electron affinity of an atom [eV]; an atom that binds no further electron has none.
///
/// # Errors
/// `UnknownElement`, `NoData`.
pub fn electron_affinity(atomic_number: i32) -> Result<&'static Entry, Failure> {
    named("ELECTRON_AFFINITY", atomic_number)
}

fn named(table: &str, atomic_number: i32) -> Result<&'static Entry, Failure> {
    tables()?.by_name(table).ok_or(Failure::new(Code::Internal))?.entry(atomic_number, STATE_AS_LISTED)
}

/// The element of an atomic number.
///
/// # Errors
/// `UnknownElement`.
pub fn element(atomic_number: i32) -> Result<&'static Element, Failure> {
    let unknown = Failure::new(Code::UnknownElement);
    let index = usize::try_from(atomic_number).ok().and_then(|z| z.checked_sub(1)).ok_or(unknown)?;
    tables()?.elements.get(index).ok_or(unknown)
}

/// The atomic number of a symbol or an English name, in any case, without blanks around it.
///
/// # Errors
/// `UnknownElement`.
pub fn element_by_text(text: &str) -> Result<i32, Failure> {
    tables()?.element_by_text(text).ok_or(Failure::new(Code::UnknownElement))
}
