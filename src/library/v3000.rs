//! The V3000 connection table: `M  V30` lines in blocks.
//!
//! A line that ends with `-` goes on in the next one. Atoms go by the index that their line states, which need not count
//! up from 1. Bond types 1 to 3 are orders, 4 (aromatic) is 1.5, 9 (coordination) is a bond without order, 10 (hydrogen
//! bond) is no bond and left out; query types are refused, and so is what stands for many molecules: R groups, templates,
//! lists of elements. Collections, sgroups, link nodes and three-dimensional objects say nothing about the atoms and are
//! skipped. Wedges are kept in the code of V2000.

use std::collections::BTreeMap;

use super::ctfile::{Fault, expected};
use super::lines::{Line, decimal, integer, quoted};
use super::record::{Record, bonded_twice};
use super::xyz::LARGEST_COORDINATE_A;
use crate::molecule::Bond;
use crate::tables::element_by_text;

const MARK: &str = "M  V30";

/// Reads a connection table that begins with its counts line; returns the number of lines that belong to it.
pub(super) fn read(lines: &[Line], record: &mut Record) -> Result<usize, Fault> {
    let mut statements = Statements { lines, at: 1, number: lines.first().map_or(0, |line| line.number) };
    let mut table = Table::default();
    let begin = statements.expect("M  V30 BEGIN CTAB")?;
    if !is(&begin, &["BEGIN", "CTAB"]) {
        return Err((begin.line, format!("expected M  V30 BEGIN CTAB, found {}", quoted(&begin.text))));
    }
    let (atoms, bonds) = counts(&statements.expect("M  V30 COUNTS")?, record)?;
    let mut inside = true;
    while let Some(statement) = statements.next()? {
        let word = |n: usize| statement.words.get(n).map_or("", String::as_str);
        match (word(0), word(1)) {
            ("BEGIN", "ATOM") if inside && record.atomic_number.is_empty() => {
                block(&mut statements, "ATOM", |line| table.atom(line, atoms, record))?;
            }
            ("BEGIN", "BOND") if inside && table.bonds_read == 0 => {
                block(&mut statements, "BOND", |line| table.bond(line, bonds, record))?;
            }
            ("BEGIN", kind @ ("SGROUP" | "OBJ3D" | "COLLECTION")) => block(&mut statements, kind, |_| Ok(()))?,
            ("BEGIN", "RGROUP") => {
                return Err((statement.line, "the record has R groups and stands for many molecules".to_owned()));
            }
            ("BEGIN", "TEMPLATE") => {
                return Err((statement.line, "the record has templates, whose atoms are not read".to_owned()));
            }
            ("BEGIN", _) => {
                let found = quoted(&statement.text);
                return Err((
                    statement.line,
                    format!("expected the block of atoms, of bonds or of extras, found {found}"),
                ));
            }
            ("END", "CTAB") => inside = false,
            _ => {}
        }
    }
    let end = statements.number;
    if inside {
        return Err((end, expected("M  V30 END CTAB", None)));
    }
    for (what, found, stated) in [("atoms", record.atomic_number.len(), atoms), ("bonds", table.bonds_read, bonds)] {
        if found != stated {
            return Err((end, format!("the counts are {stated} {what}, the record has {found}")));
        }
    }
    if let Some(later) = bonded_twice(&table.bonds) {
        let (line, a, b) = table.origin.get(later).copied().unwrap_or_default();
        return Err((line, format!("atoms {a} and {b} are bonded twice")));
    }
    let charged = table.charges.iter().any(|&charge| charge != 0);
    // As in V2000: several atoms, no bond, no charge state neither.
    if atoms == 1 || bonds > 0 || charged {
        record.formal_charge = Some(table.charges);
        record.bonds = Some(table.bonds);
    }
    Ok(statements.at)
}

/// A line with its continuations, in words.
struct Statement {
    /// The first of its lines.
    line: u64,
    text: String,
    words: Vec<String>,
}

fn is(statement: &Statement, words: &[&str]) -> bool {
    words.iter().enumerate().all(|(at, word)| statement.words.get(at).is_some_and(|found| found == word))
}

struct Statements<'a> {
    lines: &'a [Line],
    at: usize,
    /// Number of the last line taken.
    number: u64,
}

impl Statements<'_> {
    /// The next statement; `None` after `M  END`, where data items begin, and at the end of the record.
    fn next(&mut self) -> Result<Option<Statement>, Fault> {
        let line = loop {
            let Some(line) = self.lines.get(self.at) else { return Ok(None) };
            if line.text.starts_with('>') {
                return Ok(None);
            }
            self.at += 1;
            self.number = line.number;
            if line.text.trim_end() == "M  END" {
                return Ok(None);
            }
            if !line.text.trim().is_empty() {
                break line;
            }
        };
        let mut text = rest(line)?.to_owned();
        while let Some(open) = text.trim_end().strip_suffix('-') {
            let kept = open.len();
            text.truncate(kept);
            let Some(next) = self.lines.get(self.at) else {
                return Err((self.number, "the line goes on in a next one, which is not there".to_owned()));
            };
            self.at += 1;
            self.number = next.number;
            text.push_str(rest(next)?);
        }
        let words = words(&text);
        Ok(Some(Statement { line: line.number, text, words }))
    }

    fn expect(&mut self, what: &str) -> Result<Statement, Fault> {
        let end = self.lines.last().map_or(self.number, |line| line.number);
        self.next()?.ok_or_else(|| (end, expected(what, None)))
    }
}

/// What follows `M  V30 ` in a line.
fn rest(line: &Line) -> Result<&str, Fault> {
    match line.text.strip_prefix(MARK) {
        Some(rest) if rest.is_empty() || rest.starts_with(' ') => Ok(rest.get(1..).unwrap_or("")),
        _ => Err((line.number, expected("a line that begins with M  V30", Some(line)))),
    }
}

/// Words between blanks. Quotes (`""` within them is one quote) and brackets keep blanks in a word.
fn words(text: &str) -> Vec<String> {
    let mut words = Vec::new();
    let mut word = String::new();
    let (mut quotes, mut depth, mut any) = (false, 0_u32, false);
    let mut letters = text.chars().peekable();
    while let Some(letter) = letters.next() {
        match letter {
            '"' if quotes && letters.peek() == Some(&'"') => {
                letters.next();
                word.push('"');
            }
            '"' => {
                quotes = !quotes;
                any = true;
            }
            blank if !quotes && depth == 0 && blank.is_whitespace() => {
                if any {
                    words.push(std::mem::take(&mut word));
                }
                any = false;
            }
            other => {
                match other {
                    '(' | '[' if !quotes => depth = depth.saturating_add(1),
                    ')' | ']' if !quotes => depth = depth.saturating_sub(1),
                    _ => {}
                }
                word.push(other);
                any = true;
            }
        }
    }
    if any {
        words.push(word);
    }
    words
}

/// Numbers of atoms and bonds; the chiral flag goes into the record.
fn counts(line: &Statement, record: &mut Record) -> Result<(usize, usize), Fault> {
    let number = |at: usize| line.words.get(at).and_then(|word| integer(word));
    if !is(line, &["COUNTS"]) {
        return Err((line.line, format!("expected M  V30 COUNTS, found {}", quoted(&line.text))));
    }
    let size = |at: usize| number(at).and_then(|n| usize::try_from(n).ok());
    let (Some(atoms), Some(bonds)) = (size(1), size(2)) else {
        return Err((line.line, format!("expected the numbers of atoms and of bonds, found {}", quoted(&line.text))));
    };
    if atoms == 0 {
        return Err((line.line, "the record has no atoms".to_owned()));
    }
    record.stereo.chiral = number(5) == Some(1);
    Ok((atoms, bonds))
}

/// Reads the lines of a block up to its end.
fn block(
    statements: &mut Statements<'_>,
    kind: &str,
    mut read: impl FnMut(&Statement) -> Result<(), Fault>,
) -> Result<(), Fault> {
    loop {
        let Some(line) = statements.next()? else {
            return Err((statements.number, expected(&format!("M  V30 END {kind}"), None)));
        };
        if is(&line, &["END", kind]) {
            return Ok(());
        }
        read(&line)?;
    }
}

/// What the blocks of atoms and bonds hold besides the record.
#[derive(Default)]
struct Table {
    /// 0-based atom of each stated index.
    index: BTreeMap<i64, u32>,
    charges: Vec<i32>,
    bonds: Vec<Bond>,
    /// Line and stated atoms of each bond.
    origin: Vec<(u64, i64, i64)>,
    /// Bonds of the file, those left out included.
    bonds_read: usize,
}

impl Table {
    fn atom(&mut self, line: &Statement, atoms: usize, record: &mut Record) -> Result<(), Fault> {
        let number = record.atomic_number.len() + 1;
        let fail = |what: String| (line.line, format!("atom {number} of {atoms}: {what}"));
        if number > atoms {
            return Err((line.line, format!("expected {atoms} atoms, found another one: {}", quoted(&line.text))));
        }
        let word = |at: usize| line.words.get(at).map_or("", String::as_str);
        let Some(index) = integer(word(0)).filter(|&index| index > 0) else {
            return Err(fail(format!("expected its index, found {}", quoted(&line.text))));
        };
        let z = element(word(1)).map_err(fail)?;
        let (Some(x), Some(y), Some(height)) = (decimal(word(2)), decimal(word(3)), decimal(word(4))) else {
            return Err(fail(format!(
                "expected an index, an element and three coordinates, found {}",
                quoted(&line.text)
            )));
        };
        let xyz = [x, y, height];
        if xyz.iter().any(|x| x.abs() > LARGEST_COORDINATE_A) {
            return Err(fail("a coordinate is beyond 1e9 Å".to_owned()));
        }
        let atom = u32::try_from(number - 1).map_err(|_| fail("there are too many atoms".to_owned()))?;
        if self.index.insert(index, atom).is_some() {
            return Err(fail(format!("its index {index} is that of another atom")));
        }
        let mut charge = 0;
        for (key, value) in values(line, 5) {
            let whole = |least: i64, most: i64| -> Result<i32, Fault> {
                let value = integer(value).filter(|value| (least..=most).contains(value));
                let value = value.and_then(|value| i32::try_from(value).ok());
                value.ok_or_else(|| {
                    fail(format!("expected {key} from {least} to {most}, found {}", quoted(value_of(line, key))))
                })
            };
            match key {
                "CHG" => charge = whole(-15, 15)?,
                "RAD" => keep(&mut record.radicals, atom, whole(0, 3)?),
                "CFG" => keep(&mut record.stereo.parities, atom, whole(0, 3)?),
                "MASS" => {
                    let mass = decimal(value).map(f64::round).filter(|mass| (1.0..1000.0).contains(mass));
                    let Some(mass) = mass else {
                        return Err(fail(format!("expected MASS as a mass number, found {}", quoted(value))));
                    };
                    record.isotopes.push((atom, mass as i32));
                }
                "VAL" => match whole(-1, 14)? {
                    -1 => record.valences.push((atom, 0)),
                    valence => keep(&mut record.valences, atom, valence),
                },
                "RGROUPS" => return Err(fail("it stands for an R group; expected an element".to_owned())),
                _ => {}
            }
        }
        record.atomic_number.push(z);
        record.xyz.push(xyz);
        self.charges.push(charge);
        Ok(())
    }

    fn bond(&mut self, line: &Statement, bonds: usize, record: &mut Record) -> Result<(), Fault> {
        let number = self.bonds_read + 1;
        let fail = |what: String| (line.line, format!("bond {number} of {bonds}: {what}"));
        if number > bonds {
            return Err((line.line, format!("expected {bonds} bonds, found another one: {}", quoted(&line.text))));
        }
        let word = |at: usize| line.words.get(at).and_then(|word| integer(word));
        let (Some(_), Some(kind), Some(a), Some(b)) = (word(0), word(1), word(2), word(3)) else {
            return Err(fail(format!("expected an index, a bond type and two atoms, found {}", quoted(&line.text))));
        };
        let order = match kind {
            1 => Some(1.0),
            2 => Some(2.0),
            3 => Some(3.0),
            4 => Some(1.5),
            9 => Some(0.0),
            10 => None,
            5..=8 => return Err(fail(format!("its type {kind} is for queries; expected 1 to 4, 9 or 10"))),
            _ => return Err(fail(format!("its type is {kind}; expected 1 to 4, 9 or 10"))),
        };
        let atom = |index: i64| {
            let atom = self.index.get(&index).copied();
            atom.ok_or_else(|| fail(format!("it joins atoms {a} and {b}; there is no atom {index}")))
        };
        let (from, to) = (atom(a)?, atom(b)?);
        if from == to {
            return Err(fail(format!("it joins atom {a} with itself")));
        }
        self.bonds_read = number;
        let Some(order) = order else { return Ok(()) };
        let place = u32::try_from(self.bonds.len()).unwrap_or(u32::MAX);
        for (key, value) in values(line, 4) {
            match key {
                "CFG" => {
                    let wedge = match (integer(value), kind) {
                        (Some(0), _) => 0,
                        (Some(1), _) => 1,
                        (Some(2), 2) => 3,
                        (Some(2), _) => 4,
                        (Some(3), _) => 6,
                        _ => return Err(fail(format!("expected CFG from 0 to 3, found {}", quoted(value)))),
                    };
                    keep(&mut record.stereo.wedges, place, wedge);
                }
                "ENDPTS" => return Err(fail("it ends at several atoms; expected two atoms".to_owned())),
                _ => {}
            }
        }
        self.bonds.push(Bond { a: from, b: to, order });
        self.origin.push((line.line, a, b));
        Ok(())
    }
}

/// The `KEY=value` words of a line, from a word on.
fn values(line: &Statement, from: usize) -> impl Iterator<Item = (&str, &str)> {
    line.words.iter().skip(from).filter_map(|word| word.split_once('='))
}

fn value_of<'a>(line: &'a Statement, key: &str) -> &'a str {
    values(line, 0).find(|(known, _)| *known == key).map_or("", |(_, value)| value)
}

fn keep(list: &mut Vec<(u32, i32)>, item: u32, value: i32) {
    if value != 0 {
        list.push((item, value));
    }
}

fn element(word: &str) -> Result<i32, String> {
    if word.starts_with('[') || matches!(word, "NOT" | "A" | "Q" | "X" | "M" | "AH" | "QH" | "XH" | "MH" | "*") {
        return Err(format!("its type {} is for queries; expected an element", quoted(word)));
    }
    if word == "R#" {
        return Err("it stands for an R group; expected an element".to_owned());
    }
    element_by_text(word).map_err(|_| format!("there is no element {}", quoted(word)))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn quotes_and_brackets_keep_words_together() {
        assert_eq!(
            words("1 C  0 CLASS=\"a \"\"b\"\" c\" X=(2 1 2) [C, N]"),
            ["1", "C", "0", "CLASS=a \"b\" c", "X=(2 1 2)", "[C, N]"]
        );
        assert_eq!(words("\"\" \"open"), ["", "open"]);
        assert!(words("  ").is_empty());
    }
}
