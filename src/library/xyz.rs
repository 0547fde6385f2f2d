//! XYZ files: any number of frames, each a count, a comment and that many atom lines.
//!
//! There is no written standard; what is read here is common practice. An atom line is an element (symbol in any case,
//! symbol with a label number, or atomic number; D and T are hydrogen) and three coordinates in Å; further columns are
//! left unread. Blank lines may stand between frames. A comment is never an instruction: it is the title, unless it holds
//! nothing but numbers and key=value pairs; such a one is kept as the data item `comment`. Charges and bonds are not stated.
//!
//! A frame that cannot be read costs itself: reading goes on at the next place that looks like a frame.

use std::io::{BufRead, Result};

use super::lines::{Line, Lines, decimal, integer, quoted};
use super::record::{Broken, Entry, Place, Record};
use crate::tables::element_by_text;

/// Most atoms of one frame.
pub const MOST_ATOMS: i64 = 50_000_000;
/// Largest coordinate [Å].
pub(super) const LARGEST_COORDINATE_A: f64 = 1e9;
/// Longest title [characters]; of a longer comment the beginning is the title and the whole a data item.
const LONGEST_TITLE: usize = 200;

/// Reads frames one by one.
#[derive(Debug)]
pub(super) struct XyzReader<R> {
    pub lines: Lines<R>,
    file: String,
    /// Frames handed out.
    number: u64,
}

impl<R: BufRead> XyzReader<R> {
    pub fn new(lines: Lines<R>, file: &str, number: u64) -> Self {
        Self { lines, file: file.to_owned(), number }
    }

    /// The next frame, read or broken; `None` at the end.
    pub fn next(&mut self) -> Result<Option<Entry>> {
        let count_line = loop {
            match self.lines.take()? {
                None => return Ok(None),
                Some(line) if line.text.trim().is_empty() => {}
                Some(line) => break line,
            }
        };
        self.number += 1;
        let place = Place { file: self.file.clone(), number: self.number, line: count_line.number };
        let mut record = Record { place, ..Record::default() };
        match self.frame(&count_line, &mut record)? {
            Ok(()) => Ok(Some(Entry::Molecule(Box::new(record)))),
            Err((line, message)) => {
                self.go_to_next_frame()?;
                Ok(Some(Entry::Broken(Broken { place: record.place, title: record.title, line, message })))
            }
        }
    }

    fn frame(&mut self, count_line: &Line, record: &mut Record) -> Result<std::result::Result<(), (u64, String)>> {
        let count = match count_of(&count_line.text) {
            Some(count) => count,
            None => {
                let said = quoted(&count_line.text);
                return Ok(Err((count_line.number, format!("expected the number of atoms, found {said}"))));
            }
        };
        if !(1..=MOST_ATOMS).contains(&count) {
            let message = format!("the number of atoms is {count}; expected 1 to {MOST_ATOMS}");
            return Ok(Err((count_line.number, message)));
        }
        let Some(comment) = self.lines.take()? else {
            return Ok(Err((count_line.number, format!("the file ends before the {count} atoms stated"))));
        };
        take_comment(&comment, record);
        for read in 0..count {
            let Some(line) = self.lines.take()? else {
                let message = format!("the file ends after {read} of the {count} atoms stated");
                return Ok(Err((comment.number + u64::try_from(read).unwrap_or(0), message)));
            };
            match atom_line(&line.text) {
                Ok((z, xyz)) => {
                    record.atomic_number.push(z);
                    record.xyz.push(xyz);
                }
                Err(wrong) => {
                    let number = line.number;
                    self.lines.put_back(line);
                    return Ok(Err((number, format!("atom {} of {count}: {wrong}", read + 1))));
                }
            }
        }
        // One atom line more: the count is wrong, and nobody can say which atoms are meant.
        let more = |line: &&Line| count_of(&line.text).is_none() && atom_line(&line.text).is_ok();
        if let Some(line) = self.lines.peek(0).filter(more) {
            let message = format!("more atom lines follow than the {count} stated in line {}", count_line.number);
            return Ok(Err((line.number, message)));
        }
        Ok(Ok(()))
    }

    /// Leaves lines out up to a count that is followed, after its comment, by an atom.
    fn go_to_next_frame(&mut self) -> Result<()> {
        while let Some(line) = self.lines.peek(0) {
            let counts = count_of(&line.text).is_some_and(|count| (1..=MOST_ATOMS).contains(&count));
            if counts && self.lines.peek(2).is_some_and(|third| atom_line(&third.text).is_ok()) {
                return Ok(());
            }
            self.lines.take()?;
        }
        Ok(())
    }
}

/// The count of a count line: one whole number and nothing else.
pub(super) fn count_of(text: &str) -> Option<i64> {
    let mut words = text.split_whitespace();
    let count = integer(words.next()?)?;
    words.next().is_none().then_some(count)
}

/// Atomic number and coordinates of an atom line, or what is wrong with it.
pub(super) fn atom_line(text: &str) -> std::result::Result<(i32, [f64; 3]), String> {
    let mut words = text.split_whitespace();
    let Some(element) = words.next() else {
        return Err("expected an element and three coordinates, found a blank line".to_owned());
    };
    let mut xyz = [0.0; 3];
    for slot in &mut xyz {
        let Some(word) = words.next() else {
            return Err(format!("expected an element and three coordinates, found {}", quoted(text)));
        };
        match decimal(word) {
            Some(x) if x.abs() <= LARGEST_COORDINATE_A => *slot = x,
            Some(_) => return Err(format!("the coordinate {} is beyond 1e9 Å", quoted(word))),
            None => return Err(format!("the coordinate {} is no decimal number", quoted(word))),
        }
    }
    let z = element_of(element).ok_or_else(|| format!("there is no element {}", quoted(element)))?;
    Ok((z, xyz))
}

/// Atomic number of a symbol in any case, of a symbol with a label number (`C12`), or of a number from 1 to 118.
fn element_of(word: &str) -> Option<i32> {
    if word.bytes().all(|byte| byte.is_ascii_digit()) {
        let z: i32 = word.parse().ok()?;
        return (1..=118).contains(&z).then_some(z);
    }
    let symbol = word.trim_end_matches(|c: char| c.is_ascii_digit());
    if symbol.len() > 2 {
        return None;
    }
    element_by_text(symbol).ok()
}

fn take_comment(comment: &Line, record: &mut Record) {
    let text = comment.text.trim();
    if text.is_empty() {
        return;
    }
    let controls = text.chars().any(|c| c.is_control() && c != '\t');
    let title = !controls && !values_only(text) && atom_line(text).is_err();
    if title {
        let plain = text.replace('\t', " ");
        match plain.char_indices().nth(LONGEST_TITLE - 1) {
            Some((at, last)) if at + last.len_utf8() < plain.len() => {
                record.title = plain.get(..at).unwrap_or("").trim_end().to_owned() + "…";
            }
            _ => record.title = plain,
        }
    }
    if !title || record.title.ends_with('…') {
        record.data.push(("comment".to_owned(), text.to_owned()));
    }
}

/// Nothing but numbers and key=value pairs, a value standing in quotes where it has blanks.
fn values_only(text: &str) -> bool {
    let mut words: Vec<String> = Vec::new();
    let mut quote = None;
    let mut open = false;
    for c in text.chars() {
        match quote {
            Some(end) if c == end => quote = None,
            Some(_) => {}
            None if matches!(c, '"' | '\'') => quote = Some(c),
            None if c.is_whitespace() || matches!(c, ',' | ';') => {
                open = false;
                continue;
            }
            None => {}
        }
        if !open {
            words.push(String::new());
            open = true;
        }
        if let Some(word) = words.last_mut() {
            word.push(c);
        }
    }
    let mut rest = &words[..];
    while let Some((word, after)) = rest.split_first() {
        rest = match (word.split_once('='), after) {
            (None, _) if decimal(word).is_some() => after,
            // `key = value`, `key =value`
            (None, [sign, _, after @ ..]) if sign == "=" => after,
            (None, [value, after @ ..]) if value.starts_with('=') && value.len() > 1 => after,
            // `key= value`
            (Some((key, "")), [_, after @ ..]) if is_key(key) => after,
            (Some((key, value)), _) if is_key(key) && !value.is_empty() => after,
            _ => return false,
        };
    }
    true
}

/// A name, not a formula with a double bond that opens a bracket before the sign.
fn is_key(text: &str) -> bool {
    text.chars().next().is_some_and(char::is_alphabetic) && !text.contains(['(', '"', '\''])
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn elements_as_programs_write_them() {
        for (word, z) in [("CL", 17), ("cl", 17), ("Cl", 17), ("6", 6), ("D", 1), ("t", 1), ("C12", 6), ("He1", 2)] {
            assert_eq!(element_of(word), Some(z), "{word}");
        }
        for word in ["X", "Zz", "0", "119", "1C", "Bq", "-6", "", "12a"] {
            assert_eq!(element_of(word), None, "{word}");
        }
    }

    /// Comments as programs write them: energies, lattices and counts are values; a name is a name.
    #[test]
    fn a_comment_is_a_title_unless_it_is_all_values() {
        for values in [
            "energy=-76.4",
            "E = -76.4",
            "i = 5, time = 2.0, E = -3.4",
            "Lattice=\"5 0 0 0 5 0 0 0 5\" Properties=species:S:1:pos:R:3 pbc=\"T T T\"",
            "-76.4 0.003",
            "17",
            "E= -3",
        ] {
            assert!(values_only(values), "{values}");
        }
        for title in [
            "ethanol (E = -154.1)",
            "2 methyl propane",
            "1,2-dichloroethane",
            "\"water\"",
            "3',5'-cyclic phosphate",
            "frame 3 energy=-1.0",
            "E =",
            "=",
        ] {
            assert!(!values_only(title), "{title}");
        }
    }

    #[test]
    fn long_titles_are_kept_up_to_their_limit() {
        let mut record = Record::default();
        let take = |text: &str, record: &mut Record| {
            let line = Line { text: text.to_owned(), number: 2, start: 0, end: 0, cut: false };
            take_comment(&line, record);
        };
        take(&"ä".repeat(200), &mut record);
        assert_eq!((record.title.chars().count(), record.data.len()), (200, 0));
        take(&"ä".repeat(201), &mut record);
        assert_eq!((record.title.chars().count(), record.title.ends_with('…')), (200, true));
        assert_eq!(record.item("comment"), Some("ä".repeat(201).as_str()));
    }

    #[test]
    fn further_columns_are_left_unread() {
        assert_eq!(atom_line(" O 0. -.5 1.0D0 -0.834 text"), Ok((8, [0.0, -0.5, 1.0])));
        assert!(atom_line("O 0 0").unwrap_err().contains("three coordinates"));
        assert!(atom_line("O 0 0 nan").unwrap_err().contains("\"nan\""));
        assert!(atom_line("O 0 0 2e9").unwrap_err().contains("1e9"));
    }
}
