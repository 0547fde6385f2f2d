//! One reader for all formats: records one by one from any stream.

use std::io::BufRead;

use super::ctfile::CtfileReader;
use super::format::format_of;
use super::lines::Lines;
use super::record::{Entry, Problem};
use super::xyz::XyzReader;
use crate::selectors::{FORMAT_CTFILE, Selector};
use crate::status::Code;

/// Where reading goes on: the first byte of the next record, its line, and the number of records before it.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub(super) struct Spot {
    pub byte: u64,
    pub line: u64,
    pub records: u64,
}

impl Spot {
    pub const START: Self = Self { byte: 0, line: 1, records: 0 };
}

/// Records one by one.
#[derive(Debug)]
pub(super) enum Reader<R> {
    Xyz(XyzReader<R>),
    Ctfile(CtfileReader<R>),
}

impl<R: BufRead> Reader<R> {
    /// A reader of a stream from its beginning, in the format named or told by its content.
    ///
    /// # Errors
    /// `BadFormat`, `FileUnreadable`, `UnknownSelector`, `WrongSelector`.
    pub fn open(mut input: R, file: &str, format: Selector) -> Result<Self, Problem> {
        let format = {
            let head = loop {
                match input.fill_buf() {
                    Err(error) if error.kind() == std::io::ErrorKind::Interrupted => {}
                    Err(error) => return Err(unreadable(file, &error)),
                    Ok(_) => break input.fill_buf().map_err(|error| unreadable(file, &error))?,
                }
            };
            format_of(file, head, format)?
        };
        Ok(Self::at(input, file, format, Spot::START))
    }

    /// A reader that goes on at a spot of a stream whose format is known.
    pub fn at(input: R, file: &str, format: Selector, spot: Spot) -> Self {
        let lines = Lines::new(input, spot.byte, spot.line);
        if format == FORMAT_CTFILE {
            Reader::Ctfile(CtfileReader::new(lines, file, spot.records))
        } else {
            Reader::Xyz(XyzReader::new(lines, file, spot.records))
        }
    }

    /// The next record; `None` at the end.
    ///
    /// # Errors
    /// `FileUnreadable`.
    pub fn next(&mut self, file: &str) -> Result<Option<Entry>, Problem> {
        let entry = match self {
            Reader::Xyz(reader) => reader.next(),
            Reader::Ctfile(reader) => reader.next(),
        };
        entry.map_err(|error| unreadable(file, &error))
    }

    /// Where the next record begins.
    pub fn spot(&self) -> Spot {
        let (lines, records) = match self {
            Reader::Xyz(reader) => (reader.lines.place(), reader.number),
            Reader::Ctfile(reader) => (reader.lines.place(), reader.number),
        };
        Spot { byte: lines.0, line: lines.1, records }
    }
}

/// A file that the system does not let us read.
pub(super) fn unreadable(file: &str, error: &std::io::Error) -> Problem {
    let code = if error.kind() == std::io::ErrorKind::NotFound { Code::FileMissing } else { Code::FileUnreadable };
    Problem::new(code, format!("{file}: {error}"))
}
