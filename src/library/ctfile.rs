//! Molfiles and SD files after the published CTfile specification.
//!
//! The stream is first split at `$$$$`, so that a broken record never eats the next; then the header (title, program
//! line with the dimensional code, comment), the connection table by its version, and the data items are read. A molfile
//! is a record without `$$$$`.
//!
//! Reference: Dalby, Nourse, Hounshell, Gushurst, Grier, Leland, Laufer, J. Chem. Inf. Comput. Sci. 1992, 32, 244 (from
//! memory), and the CTfile specification that its authors' company has published since.

use std::io::{BufRead, Result};

use super::lines::{Line, Lines, quoted};
use super::record::{Broken, Entry, Place, Record};
use super::{v2000, v3000};

/// Most bytes of one record that are held in memory.
const LONGEST_RECORD: usize = 256 << 20;

/// What is wrong with a record: the line and the words.
pub(super) type Fault = (u64, String);

/// Reads records one by one.
#[derive(Debug)]
pub(super) struct CtfileReader<R> {
    pub lines: Lines<R>,
    file: String,
    /// Records handed out.
    number: u64,
}

impl<R: BufRead> CtfileReader<R> {
    pub fn new(lines: Lines<R>, file: &str, number: u64) -> Self {
        Self { lines, file: file.to_owned(), number }
    }

    /// The next record, read or broken; `None` at the end.
    pub fn next(&mut self) -> Result<Option<Entry>> {
        let first_line = self.lines.place().1;
        let (lines, too_long, terminated) = self.record_lines()?;
        if !terminated && lines.iter().all(|line| line.text.trim().is_empty()) {
            return Ok(None);
        }
        self.number += 1;
        let place = Place { file: self.file.clone(), number: self.number, line: first_line };
        let mut record = Record { place, ..Record::default() };
        let read = if too_long {
            Err((first_line, format!("the record is longer than {LONGEST_RECORD} bytes")))
        } else {
            read_record(&lines, first_line, &mut record)
        };
        Ok(Some(match read {
            Ok(()) => Entry::Molecule(Box::new(record)),
            Err((line, message)) => Entry::Broken(Broken { place: record.place, title: record.title, line, message }),
        }))
    }

    /// Lines up to `$$$$` or the end; whether they were too many to hold; whether `$$$$` was there.
    fn record_lines(&mut self) -> Result<(Vec<Line>, bool, bool)> {
        let mut lines = Vec::new();
        let mut size = 0;
        let mut too_long = false;
        while let Some(line) = self.lines.take()? {
            if line.text.trim_end() == "$$$$" {
                return Ok((lines, too_long, true));
            }
            size += line.text.len() + size_of::<Line>();
            too_long |= size > LONGEST_RECORD;
            if too_long {
                lines.clear();
            } else {
                lines.push(line);
            }
        }
        Ok((lines, too_long, false))
    }
}

/// Reads the lines of one record.
fn read_record(lines: &[Line], first_line: u64, record: &mut Record) -> std::result::Result<(), Fault> {
    if let Some(title) = lines.first() {
        record.title = title.text.trim().to_owned();
    }
    let version = |line: &Line| line.text.contains("V2000") || line.text.contains("V3000");
    let Some(counts) = lines.get(3) else {
        let after = first_line + lines.len() as u64;
        return Err((after, "the record ends before its counts line, the fourth".to_owned()));
    };
    let elsewhere = lines.iter().take(8).position(version).filter(|_| !version(counts));
    if let Some(at) = elsewhere {
        let line = lines.get(at).map_or(first_line, |line| line.number);
        let message = format!("the counts line must be the fourth of the record, here it is number {}", at + 1);
        return Err((line, message));
    }
    if let Some(line) = lines.iter().find(|line| line.cut) {
        return Err((line.number, "the line is longer than 1 MiB".to_owned()));
    }
    let two_dimensional = lines.get(1).is_some_and(|line| dimension(&line.text) == Some("2D"));
    let table = lines.get(3..).unwrap_or(&[]);
    let after = if counts.text.contains("V3000") { v3000::read(table, record)? } else { v2000::read(table, record)? };
    record.drawing = two_dimensional && flat(&record.xyz);
    record.data = data_items(lines.get(3 + after..).unwrap_or(&[]));
    Ok(())
}

/// The dimensional code of the program line: columns 21 and 22, else a word of its own.
fn dimension(line: &str) -> Option<&'static str> {
    let code = |text: &str| match text {
        "2D" => Some("2D"),
        "3D" => Some("3D"),
        _ => None,
    };
    line.get(20..22).and_then(code).or_else(|| line.split_whitespace().find_map(code))
}

/// All atoms have one and the same z.
fn flat(xyz: &[[f64; 3]]) -> bool {
    xyz.first().is_none_or(|first| xyz.iter().all(|point| point[2] == first[2]))
}

/// Data items: `>  <name>`, lines of the value, a blank line. A header without a name in `<>` gives its field number.
fn data_items(lines: &[Line]) -> Vec<(String, String)> {
    let mut items: Vec<(String, String)> = Vec::new();
    let mut blank = true;
    for line in lines {
        let text = line.text.trim_end();
        if text.is_empty() {
            if let Some((_, value)) = items.last_mut() {
                value.push('\n');
            }
            blank = true;
            continue;
        }
        if let Some(name) = header(text, blank) {
            items.push((name, String::new()));
        } else if let Some((_, value)) = items.last_mut() {
            if !value.is_empty() && (!value.ends_with('\n') || blank) {
                value.push('\n');
            }
            value.push_str(text);
        }
        blank = false;
    }
    for (_, value) in &mut items {
        let length = value.trim_end_matches('\n').len();
        value.truncate(length);
    }
    items
}

/// The name in a data header. After a blank line any line that begins with `>` is one; within a value only one that
/// has a name in `<>`.
fn header(text: &str, blank: bool) -> Option<String> {
    let rest = text.strip_prefix('>')?;
    if let Some((name, _)) = rest.split_once('<').and_then(|(_, named)| named.split_once('>')) {
        return Some(name.trim().to_owned());
    }
    if !blank {
        return None;
    }
    let number = rest.split_whitespace().find(|word| word.starts_with("DT"));
    Some(number.unwrap_or("").to_owned())
}

/// A line as it is quoted in a message about what was expected there.
pub(super) fn expected(what: &str, found: Option<&Line>) -> String {
    match found {
        Some(line) => format!("expected {what}, found {}", quoted(&line.text)),
        None => format!("the record ends where {what} is expected"),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn items(text: &str) -> Vec<(String, String)> {
        let mut lines = Lines::new(text.as_bytes(), 0, 1);
        let mut all = Vec::new();
        while let Some(line) = lines.take().unwrap() {
            all.push(line);
        }
        data_items(&all)
    }

    fn pair(name: &str, value: &str) -> (String, String) {
        (name.to_owned(), value.to_owned())
    }

    #[test]
    fn data_items_of_several_lines() {
        let text = "> 25 <a> (REG-1)\n1\n\n>  <b>\n\n> <c d>\nx\n  y\n> z\n\n> DT12\nq\n";
        assert_eq!(items(text), [pair("a", "1"), pair("b", ""), pair("c d", "x\n  y\n> z"), pair("DT12", "q")]);
        assert_eq!(items("> <a>\n1\n> <b>\n2\n"), [pair("a", "1"), pair("b", "2")]);
        assert_eq!(items("> <a>\n1\n\n2\n\n"), [pair("a", "1\n\n2")]);
    }

    #[test]
    fn the_dimension_stands_in_its_columns_or_alone() {
        assert_eq!(dimension("  someprog03042409002D"), Some("2D"));
        assert_eq!(dimension("  someprog 2D 1.0"), Some("2D"));
        assert_eq!(dimension("  2Dprog  "), None);
    }
}
