//! Typed columns of equal length: the form in which every result with many columns leaves the library.
//!
//! A cell holds a value or the status that says why it has none. Without a value a number is NaN, an integer the smallest
//! one, a text empty: the status decides, never the value.

use std::borrow::Cow;

use crate::selectors::{Selector, TYPE_INTEGER, TYPE_NUMBER, TYPE_TEXT};
use crate::status::{Code, Failure};

/// What a column is, before it has rows.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct ColumnKind {
    /// Name, with the unit.
    pub name: &'static str,
    /// `TYPE_NUMBER`, `TYPE_INTEGER` or `TYPE_TEXT`.
    pub kind: Selector,
    /// Unit, empty for none.
    pub unit: &'static str,
    /// Meaning, at most 80 characters.
    pub help: &'static str,
}

/// One cell on its way into a table.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Cell<'a> {
    /// A number. NaN is stored without a value and with the status `Missing`.
    Number(f64),
    /// An integer.
    Integer(i32),
    /// A text.
    Text(&'a str),
    /// No value, and why.
    None(Code),
}

#[derive(Clone, Debug)]
enum Values {
    Numbers(Vec<f64>),
    Integers(Vec<i32>),
    /// All texts end to end, and where each one ends.
    Texts(String, Vec<usize>),
}

/// A named column of one type.
#[derive(Clone, Debug)]
pub struct Column {
    name: String,
    values: Values,
    status: Vec<i32>,
}

impl Column {
    fn new(name: &str, kind: Selector) -> Self {
        let values = match kind {
            TYPE_NUMBER => Values::Numbers(Vec::new()),
            TYPE_INTEGER => Values::Integers(Vec::new()),
            _ => Values::Texts(String::new(), Vec::new()),
        };
        Self { name: name.to_owned(), values, status: Vec::new() }
    }

    /// Name, with the unit.
    pub fn name(&self) -> &str {
        &self.name
    }

    /// `TYPE_NUMBER`, `TYPE_INTEGER` or `TYPE_TEXT`.
    pub fn kind(&self) -> Selector {
        match self.values {
            Values::Numbers(_) => TYPE_NUMBER,
            Values::Integers(_) => TYPE_INTEGER,
            Values::Texts(..) => TYPE_TEXT,
        }
    }

    /// One status a row: 0, or why the cell has no value.
    pub fn status(&self) -> &[i32] {
        &self.status
    }

    /// The numbers, NaN without a value.
    ///
    /// # Errors
    /// `WrongType`.
    pub fn numbers(&self) -> Result<&[f64], Failure> {
        match &self.values {
            Values::Numbers(values) => Ok(values),
            _ => Err(Failure::new(Code::WrongType)),
        }
    }

    /// The integers, `i32::MIN` without a value.
    ///
    /// # Errors
    /// `WrongType`.
    pub fn integers(&self) -> Result<&[i32], Failure> {
        match &self.values {
            Values::Integers(values) => Ok(values),
            _ => Err(Failure::new(Code::WrongType)),
        }
    }

    /// A cell of any type as text, numbers in the shortest digits that read back; empty without a value or beyond the
    /// last row.
    pub fn text(&self, row: usize) -> Cow<'_, str> {
        if self.status.get(row).is_none_or(|&status| status != 0) {
            return Cow::Borrowed("");
        }
        match &self.values {
            Values::Numbers(values) => Cow::Owned(values.get(row).map_or(String::new(), |&x| number_text(x))),
            Values::Integers(values) => Cow::Owned(values.get(row).map_or(String::new(), ToString::to_string)),
            Values::Texts(all, ends) => {
                let from = row.checked_sub(1).and_then(|before| ends.get(before)).copied().unwrap_or(0);
                let to = ends.get(row).copied().unwrap_or(from);
                Cow::Borrowed(all.get(from..to).unwrap_or(""))
            }
        }
    }

    fn append(&mut self, more: &Column) {
        match (&mut self.values, &more.values) {
            (Values::Numbers(values), Values::Numbers(more)) => values.extend_from_slice(more),
            (Values::Integers(values), Values::Integers(more)) => values.extend_from_slice(more),
            (Values::Texts(all, ends), Values::Texts(more, more_ends)) => {
                let before = all.len();
                all.push_str(more);
                ends.extend(more_ends.iter().map(|end| before + end));
            }
            _ => {
                (0..more.status.len()).for_each(|_| self.push(Cell::None(Code::WrongType)));
                return;
            }
        }
        self.status.extend_from_slice(&more.status);
    }

    fn push(&mut self, cell: Cell<'_>) {
        let mut status = match cell {
            Cell::None(code) => code as i32,
            _ => 0,
        };
        match (&mut self.values, cell) {
            // Adding 0 turns −0 into 0.
            (Values::Numbers(values), Cell::Number(x)) if !x.is_nan() => values.push(x + 0.0),
            (Values::Numbers(values), Cell::Integer(n)) => values.push(f64::from(n)),
            (Values::Integers(values), Cell::Integer(n)) => values.push(n),
            (Values::Texts(all, ends), Cell::Text(text)) => {
                all.push_str(text);
                ends.push(all.len());
            }
            (values, cell) => {
                if status == 0 {
                    status = if matches!(cell, Cell::Number(_)) { Code::Missing } else { Code::WrongType } as i32;
                }
                match values {
                    Values::Numbers(values) => values.push(f64::NAN),
                    Values::Integers(values) => values.push(i32::MIN),
                    Values::Texts(all, ends) => ends.push(all.len()),
                }
            }
        }
        self.status.push(status);
    }
}

/// Columns of equal length, each with a name of its own.
#[derive(Clone, Debug, Default)]
pub struct Table {
    columns: Vec<Column>,
    rows: usize,
}

impl Table {
    /// A table without rows: the fixed columns, then text columns with the further names.
    pub fn new(kinds: &[ColumnKind], texts: &[String]) -> Self {
        let fixed = kinds.iter().map(|kind| Column::new(kind.name, kind.kind));
        let further = texts.iter().map(|name| Column::new(name, TYPE_TEXT));
        Self { columns: fixed.chain(further).collect(), rows: 0 }
    }

    /// Number of rows.
    pub fn rows(&self) -> usize {
        self.rows
    }

    /// The columns in order.
    pub fn columns(&self) -> &[Column] {
        &self.columns
    }

    /// The column at an index.
    ///
    /// # Errors
    /// `OutOfRange`.
    pub fn column(&self, index: usize) -> Result<&Column, Failure> {
        self.columns.get(index).ok_or(Failure::new(Code::OutOfRange))
    }

    /// The index of a column.
    ///
    /// # Errors
    /// `UnknownName`.
    pub fn index_of(&self, name: &str) -> Result<usize, Failure> {
        self.columns.iter().position(|column| column.name == name).ok_or(Failure::new(Code::UnknownName))
    }

    /// The column of a name.
    ///
    /// # Errors
    /// `UnknownName`.
    pub fn by_name(&self, name: &str) -> Result<&Column, Failure> {
        self.index_of(name).and_then(|index| self.column(index))
    }

    /// Adds the rows of a table with the same columns; those of other columns are left out.
    pub fn append(&mut self, other: &Table) {
        for (i, column) in self.columns.iter_mut().enumerate() {
            match other.columns.get(i) {
                Some(more) if more.name == column.name => column.append(more),
                _ => (0..other.rows).for_each(|_| column.push(Cell::None(Code::Missing))),
            }
        }
        self.rows += other.rows;
    }

    /// Adds a row; columns without a cell get none, with the status `Missing`.
    pub fn push_row(&mut self, cells: &[Cell<'_>]) {
        for (i, column) in self.columns.iter_mut().enumerate() {
            column.push(cells.get(i).copied().unwrap_or(Cell::None(Code::Missing)));
        }
        self.rows += 1;
    }
}

/// The shortest digits that read back as the same number; with an exponent below 1e-5 and from 1e16. NaN gives no text.
pub fn number_text(value: f64) -> String {
    if value.is_nan() {
        return String::new();
    }
    let value = value + 0.0;
    let size = value.abs();
    if size.is_infinite() {
        return if value > 0.0 { "inf" } else { "-inf" }.to_owned();
    }
    if size == 0.0 || (1e-5..1e16).contains(&size) { format!("{value}") } else { format!("{value:e}") }
}

/// A decimal number as every reader of the library reads it: the nearest double, whatever the locale.
///
/// # Errors
/// `Missing` for a blank text · `NotFinite` for infinity or a number beyond all doubles · `BadFormat` for anything else
/// that is no decimal number.
pub fn number_read(text: &str) -> Result<f64, Failure> {
    let text = text.trim();
    if text.is_empty() {
        return Err(Failure::new(Code::Missing));
    }
    let bare = text.trim_start_matches(['+', '-']);
    if bare.eq_ignore_ascii_case("nan") {
        return Err(Failure::new(Code::Missing));
    }
    if bare.eq_ignore_ascii_case("inf") || bare.eq_ignore_ascii_case("infinity") {
        return Err(Failure::new(Code::NotFinite));
    }
    // Fortran's exponents; no other d can stand in a number.
    match text.replace(['d', 'D'], "e").parse::<f64>() {
        Ok(value) if value.is_finite() => Ok(value + 0.0),
        Ok(_) => Err(Failure::new(Code::NotFinite)),
        Err(_) => Err(Failure::new(Code::BadFormat)),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const KINDS: &[ColumnKind] = &[
        ColumnKind { name: "x_A", kind: TYPE_NUMBER, unit: "Å", help: "" },
        ColumnKind { name: "n", kind: TYPE_INTEGER, unit: "", help: "" },
        ColumnKind { name: "t", kind: TYPE_TEXT, unit: "", help: "" },
    ];

    #[test]
    fn cells_come_back_with_their_status() {
        let mut table = Table::new(KINDS, &["data_a".to_owned()]);
        table.push_row(&[Cell::Number(-0.0), Cell::Integer(7), Cell::Text("Ä"), Cell::Text("")]);
        table.push_row(&[Cell::None(Code::NoData), Cell::None(Code::Charged), Cell::None(Code::NoData)]);
        table.push_row(&[Cell::Number(f64::NAN), Cell::Text("7"), Cell::Text("z"), Cell::Text("q")]);
        assert_eq!(table.rows(), 3);
        let x = table.by_name("x_A").unwrap();
        assert_eq!(x.numbers().unwrap()[0].to_bits(), 0);
        assert_eq!(x.numbers().unwrap()[1].to_bits(), 0x7FF8_0000_0000_0000);
        assert_eq!(x.status(), [0, 101, 50]);
        let n = table.by_name("n").unwrap();
        assert_eq!(n.integers().unwrap(), [7, i32::MIN, i32::MIN]);
        assert_eq!(n.status(), [0, 110, 23]);
        let t = table.by_name("t").unwrap();
        assert_eq!((t.text(0), t.text(1), t.text(2), t.text(9)), ("Ä".into(), "".into(), "z".into(), "".into()));
        assert_eq!(t.numbers().unwrap_err().code, Code::WrongType);
        assert_eq!(table.by_name("data_a").unwrap().status(), [0, 50, 0]);
        assert_eq!(table.index_of("y").unwrap_err().code, Code::UnknownName);
    }

    #[test]
    fn digits_are_the_shortest_and_the_exponent_begins_where_stated() {
        let cases = [
            (0.1, "0.1"),
            (2.0, "2"),
            (-0.0, "0"),
            (1e-5, "0.00001"),
            (9.9e-6, "9.9e-6"),
            (9_999_999_999_999_998.0, "9999999999999998"),
            (1e16, "1e16"),
            (1e300, "1e300"),
            (0.1 + 0.2, "0.30000000000000004"),
            (5e-324, "5e-324"),
            (f64::NAN, ""),
        ];
        for (value, text) in cases {
            assert_eq!(number_text(value), text);
            if !text.is_empty() {
                assert_eq!(number_read(text).unwrap().to_bits(), (value + 0.0).to_bits());
            }
        }
    }

    #[test]
    fn what_is_no_number_is_refused_by_kind() {
        for (text, code) in [
            ("", Code::Missing),
            ("NaN", Code::Missing),
            ("-inf", Code::NotFinite),
            ("1e999", Code::NotFinite),
            ("1,5", Code::BadFormat),
            ("1.5 D", Code::BadFormat),
            ("0x10", Code::BadFormat),
        ] {
            assert_eq!(number_read(text).unwrap_err().code, code, "{text}");
        }
        assert_eq!(number_read(" 0.0145768 ").unwrap().to_bits(), 0.0145768_f64.to_bits());
    }
}
