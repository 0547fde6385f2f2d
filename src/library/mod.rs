//! Libraries of compounds: files of structures in, the polarity table out.
//!
//! - [`record`] is what a file says; [`format`] tells formats by content, and the readers hand records out one by one: a
//!   broken record costs itself only;
//! - [`kinds`] tells kinds of record apart, [`polarity_table`] has the three tables that are computed from them;
//! - [`tabulation`] streams through files of any size, [`molecule_library`] holds records in memory;
//! - [`table`] is the typed table that leaves the library, [`write`] writes it as CSV or JSON lines, [`settings`] holds
//!   what a run can be told.

mod cml;
mod ctfile;
mod drawing;
mod expected;
mod files;
pub mod format;
pub mod formula;
mod fragments;
mod hydrogens;
pub mod kinds;
mod lines;
pub mod molecule_library;
mod packed;
pub mod polarity_table;
mod reader;
pub mod record;
mod remarks;
mod rows;
pub mod settings;
mod strongest;
pub mod table;
pub mod tabulation;
mod v2000;
mod v3000;
pub mod write;
mod xyz;

pub use molecule_library::{Given, MoleculeLibrary};
pub use polarity_table::{Tables, Wanted};
pub use record::{Broken, Entry, Place, Problem, Record};
pub use settings::Settings;
pub use table::{Cell, Column, ColumnKind, Table, number_read, number_text};
pub use tabulation::{Progress, Tabulation};
