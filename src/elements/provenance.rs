//! What stands behind one value: the table it is from, how far it was checked, and what is in dispute.

use crate::selectors::{ELECTRONEGATIVITY_MULLIKEN, MARK_DERIVED, STATE_AS_LISTED, Selector};
use crate::status::{Code, Failure};
use crate::tables::{self, Entry, Source};
use serde::Serialize;

/// The provenance of one value.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct ValueSource {
    /// `MARK_VERIFIED`, `MARK_CORROBORATED`, `MARK_TRANSCRIBED`, `MARK_FROM_MEMORY`, `MARK_DERIVED`.
    pub mark: Selector,
    /// A JSON object: `table title author year journal doi unit value u state mark note`, for a derived value
    /// `table title author year journal doi mark remark parts`.
    pub json: String,
}

#[derive(Serialize)]
struct Citation {
    table: &'static str,
    title: &'static str,
    author: &'static str,
    year: Option<i32>,
    journal: &'static str,
    doi: &'static str,
}

#[derive(Serialize)]
struct Printed {
    #[serde(flatten)]
    citation: Citation,
    unit: &'static str,
    value: f64,
    u: Option<f64>,
    state: &'static str,
    mark: String,
    note: &'static str,
}

#[derive(Serialize)]
struct Derived {
    #[serde(flatten)]
    citation: Citation,
    mark: String,
    remark: &'static str,
    parts: [Printed; 2],
}

/// A mark as the tables write it, such as `from_memory`.
fn word(mark: Selector) -> String {
    mark.name().trim_start_matches("MARK_").to_ascii_lowercase()
}

/// The mark and the citation of the value that a table has for an element, as printed there. Mulliken's electronegativity
/// is derived from two values, which stand in `parts`.
///
/// # Errors
/// `UnknownSelector`, `WrongSelector` (arguments 1, 3: no table of values, no state) · `Missing`, `UnknownElement` (2) ·
/// `NoData` (2, or 3 where the element is there but not in this state).
pub fn value_source(table: Selector, atomic_number: i32, state: Selector) -> Result<ValueSource, Failure> {
    let source = tables::source(table).map_err(|failure| failure.argument(1))?;
    let state = state.of_group("state").map_err(|failure| failure.argument(3))?;
    if atomic_number == i32::MIN {
        return Err(Failure::of(Code::Missing, 2));
    }
    if table == ELECTRONEGATIVITY_MULLIKEN {
        return mulliken(source, atomic_number, state);
    }
    let entry = tables::entry(table, atomic_number, state).map_err(|failure| match failure.code {
        Code::WrongSelector => failure.argument(1),
        Code::NoData if tables::entry(table, atomic_number, STATE_AS_LISTED).is_ok() => failure.argument(3),
        _ => failure.argument(2),
    })?;
    written(entry.mark, &printed(source, entry))
}

fn mulliken(source: &'static Source, atomic_number: i32, state: Selector) -> Result<ValueSource, Failure> {
    let at_fault = |failure: Failure| failure.argument(2);
    let ionization = tables::ionization_energy(atomic_number).map_err(at_fault)?;
    let affinity = tables::electron_affinity(atomic_number).map_err(at_fault)?;
    if state != STATE_AS_LISTED {
        return Err(Failure::of(Code::NoData, 3));
    }
    let parts = [
        printed(tables::source_by_name("IONIZATION_ENERGY")?, ionization),
        printed(tables::source_by_name("ELECTRON_AFFINITY")?, affinity),
    ];
    let derived =
        Derived { citation: citation(source), mark: word(MARK_DERIVED), remark: source.remark.as_str(), parts };
    written(MARK_DERIVED, &derived)
}

fn citation(source: &'static Source) -> Citation {
    Citation {
        table: source.table.as_str(),
        title: source.title.as_str(),
        author: source.author.as_str(),
        year: source.year,
        journal: source.journal.as_str(),
        doi: source.doi.as_str(),
    }
}

fn printed(source: &'static Source, entry: &'static Entry) -> Printed {
    Printed {
        citation: citation(source),
        unit: source.unit.as_str(),
        value: entry.value,
        u: (!entry.u.is_nan()).then_some(entry.u),
        state: entry.state.name(),
        mark: word(entry.mark),
        note: entry.note.as_str(),
    }
}

fn written(mark: Selector, content: &impl Serialize) -> Result<ValueSource, Failure> {
    let json = serde_json::to_string(content).map_err(|_| Failure::new(Code::Internal))?;
    Ok(ValueSource { mark, json })
}
