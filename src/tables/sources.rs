//! The published sources behind tables, scales and laws.

use super::{parse, tables};
use crate::selectors::Selector;
use crate::status::{Code, Failure};
use serde::{Deserialize, Serialize};

/// The published source of a table, scale, mass set, law or model.
#[derive(Clone, Debug, Deserialize, Serialize)]
pub struct Source {
    /// Name of the selector, or of a table that is used through another (`IONIZATION_ENERGY`).
    pub table: String,
    /// Title.
    pub title: String,
    /// Authors.
    pub author: String,
    /// Year; none for what is kept up without one.
    pub year: Option<i32>,
    /// Journal, volume and pages, or publisher; `common practice` where no one paper is meant.
    pub journal: String,
    /// Digital object identifier, or empty.
    pub doi: String,
    /// Unit of the values as printed, or of a law's result.
    pub unit: String,
    /// What it covers.
    pub covers: String,
    /// What the uncertainties are.
    pub uncertainty: String,
    /// The weakest mark of any entry: `verified`, `corroborated`, `transcribed`, `from_memory`.
    pub mark: String,
    /// How it was checked and what is in dispute.
    pub remark: String,
}

impl Source {
    /// The mark as a selector.
    ///
    /// # Errors
    /// `Internal` if the word is none of the marks, which the tests exclude.
    pub fn mark(&self) -> Result<Selector, Failure> {
        parse::mark(&self.mark).map_err(|_| Failure::new(Code::Internal))
    }
}

/// The source of a table, scale, mass set, law or model.
///
/// # Errors
/// `UnknownSelector` · `WrongSelector` where nothing published stands behind it (a unit, a state).
pub fn source(selector: Selector) -> Result<&'static Source, Failure> {
    let name = selector.choice()?.name;
    source_by_name(name).map_err(|_| Failure::new(Code::WrongSelector))
}

/// The source of a name in `sources.csv`, also of those that no selector has.
///
/// # Errors
/// `UnknownName`.
pub(crate) fn source_by_name(name: &str) -> Result<&'static Source, Failure> {
    tables()?.sources.iter().find(|source| source.table == name).ok_or(Failure::new(Code::UnknownName))
}

/// The source as a JSON object: the fields of [`Source`].
///
/// # Errors
/// As [`source`].
pub fn source_json(selector: Selector) -> Result<String, Failure> {
    serde_json::to_string(source(selector)?).map_err(|_| Failure::new(Code::Internal))
}
