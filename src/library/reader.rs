//! One reader for all formats: records one by one from any stream, packed or not.

use std::io::BufRead;

use super::cml::CmlReader;
use super::ctfile::CtfileReader;
use super::format::{HEAD, format_of};
use super::lines::Lines;
use super::packed::{Input, damage};
use super::record::{Broken, Entry, Place, Problem};
use super::xyz::XyzReader;
use crate::selectors::{FORMAT_CML, FORMAT_CTFILE, Selector};
use crate::status::Code;

/// Where reading goes on: the first byte of the next record, its line, and the number of records before it. In a packed
/// file the byte is that of the packed data, and in both it and CML one that was read up to: such a file is read again
/// from its beginning.
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
pub(super) struct Reader<R> {
    records: Records<Input<R>>,
    /// Records handed out.
    number: u64,
    /// A packed stream was found damaged: what is behind is not read.
    damaged: bool,
}

#[derive(Debug)]
enum Records<R> {
    Xyz(XyzReader<R>),
    Ctfile(CtfileReader<R>),
    Cml(Box<CmlReader<R>>),
}

impl<R: BufRead> Reader<R> {
    /// A reader of a stream from its beginning, in the format named or told by its content.
    ///
    /// # Errors
    /// `BadFormat`, `FileUnreadable`, `UnknownSelector`, `WrongSelector`.
    pub fn open(input: R, file: &str, format: Selector) -> Result<Self, Problem> {
        let mut input = Input::told(input).map_err(|error| unreadable(file, &error))?;
        let format = format_of(file, head_of(&mut input, file)?, format)?;
        Ok(Self::new(input, file, format, Spot::START))
    }

    /// A reader that goes on at a spot of a stream whose format is known. A packed stream and CML begin at
    /// [`Spot::START`].
    pub fn at(input: R, packed: bool, file: &str, format: Selector, spot: Spot) -> Self {
        Self::new(Input::new(input, packed), file, format, spot)
    }

    fn new(input: Input<R>, file: &str, format: Selector, spot: Spot) -> Self {
        let records = match format {
            FORMAT_CML => Records::Cml(Box::new(CmlReader::new(input, file))),
            FORMAT_CTFILE => {
                Records::Ctfile(CtfileReader::new(Lines::new(input, spot.byte, spot.line), file, spot.records))
            }
            _ => Records::Xyz(XyzReader::new(Lines::new(input, spot.byte, spot.line), file, spot.records)),
        };
        Self { records, number: spot.records, damaged: false }
    }

    /// The next record; `None` at the end. Damage in a packed stream is a broken record, the last one.
    ///
    /// # Errors
    /// `FileUnreadable`.
    pub fn next(&mut self, file: &str) -> Result<Option<Entry>, Problem> {
        if self.damaged {
            return Ok(None);
        }
        let entry = match &mut self.records {
            Records::Xyz(reader) => reader.next(),
            Records::Ctfile(reader) => reader.next(),
            Records::Cml(reader) => reader.next(),
        };
        let entry = match entry {
            Ok(entry) => entry,
            Err(error) => {
                let what = damage(&error).ok_or_else(|| unreadable(file, &error))?;
                self.damaged = true;
                let line = self.spot().line;
                let place = Place { file: file.to_owned(), number: self.number + 1, line };
                let message = format!("{what}; the file is read no further");
                Some(Entry::Broken(Broken { place, title: String::new(), line, message }))
            }
        };
        self.number += u64::from(entry.is_some());
        Ok(entry)
    }

    /// Where the next record begins.
    pub fn spot(&self) -> Spot {
        let (input, line) = match &self.records {
            Records::Xyz(reader) => (reader.lines.input(), reader.lines.place().1),
            Records::Ctfile(reader) => (reader.lines.input(), reader.lines.place().1),
            Records::Cml(reader) => (reader.markup().input(), reader.markup().line()),
        };
        let byte = input.packed_bytes().unwrap_or_else(|| self.text_bytes());
        Spot { byte, line, records: self.number }
    }

    /// Bytes of the stream, unpacked, up to the next record; for CML up to what was read.
    pub fn text_bytes(&self) -> u64 {
        match &self.records {
            Records::Xyz(reader) => reader.lines.place().0,
            Records::Ctfile(reader) => reader.lines.place().0,
            Records::Cml(reader) => reader.markup().taken(),
        }
    }
}

/// The first bytes of a stream, unpacked.
///
/// # Errors
/// `FileUnreadable` · `BadFormat` where packed data are damaged from the beginning.
pub(super) fn head_of<'a, R: BufRead>(input: &'a mut Input<R>, file: &str) -> Result<&'a [u8], Problem> {
    loop {
        match input.fill_buf() {
            Err(error) if error.kind() == std::io::ErrorKind::Interrupted => {}
            Err(error) => {
                return Err(match damage(&error) {
                    Some(what) => Problem::new(Code::BadFormat, format!("{file}: {what}, before any record")),
                    None => unreadable(file, &error),
                });
            }
            Ok(_) => break,
        }
    }
    let head = input.fill_buf().map_err(|error| unreadable(file, &error))?;
    Ok(head.get(..HEAD).unwrap_or(head))
}

/// A file that the system does not let us read.
pub(super) fn unreadable(file: &str, error: &std::io::Error) -> Problem {
    let code = if error.kind() == std::io::ErrorKind::NotFound { Code::FileMissing } else { Code::FileUnreadable };
    Problem::new(code, format!("{file}: {error}"))
}
