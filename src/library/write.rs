//! Tables as CSV or JSON lines.
//!
//! CSV is safe to open in a spreadsheet: a text that would begin a formula there gets an apostrophe before it. Numbers
//! are written in the shortest digits that read back; a cell without a value is empty in CSV and null in JSON.

use std::borrow::Cow;
use std::io::{Error, Result, Write};

use serde_json::{Number, Value};

use super::table::{Column, Table};
use crate::selectors::TYPE_TEXT;

/// How CSV is written.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct CsvStyle {
    /// Decimal comma, with semicolons between the cells.
    pub decimal_comma: bool,
    /// Leave out the line of names, to go on with a file.
    pub without_names: bool,
}

/// Writes a table as CSV: a line of names, then one line a row.
///
/// # Errors
/// Those of the output.
pub fn write_csv(table: &Table, output: &mut dyn Write, style: CsvStyle) -> Result<()> {
    let delimiter = if style.decimal_comma { b';' } else { b',' };
    let mut writer = csv::WriterBuilder::new().delimiter(delimiter).from_writer(output);
    if !style.without_names {
        writer
            .write_record(table.columns().iter().map(|column| harmless(column.name().into()).into_owned()))
            .map_err(of_output)?;
    }
    for row in 0..table.rows() {
        for column in table.columns() {
            let text = column.text(row);
            let text = if column.kind() == TYPE_TEXT {
                harmless(text)
            } else if style.decimal_comma {
                Cow::Owned(text.replace('.', ","))
            } else {
                text
            };
            writer.write_field(text.as_bytes()).map_err(of_output)?;
        }
        writer.write_record(None::<&[u8]>).map_err(of_output)?;
    }
    writer.flush()
}

/// The output's own error, so that a closed pipe can be told from a full disk.
fn of_output(error: csv::Error) -> Error {
    match error.into_kind() {
        csv::ErrorKind::Io(error) => error,
        other => Error::other(format!("{other:?}")),
    }
}

/// A text that no spreadsheet takes for a formula: an apostrophe goes before one that begins, after blanks, with `=`,
/// `+`, `-`, `@` or their full-width forms, or with a tab or a carriage return.
fn harmless(text: Cow<'_, str>) -> Cow<'_, str> {
    let first = text.trim_start_matches(' ').chars().next();
    match first {
        Some('=' | '+' | '-' | '@' | '＝' | '＋' | '－' | '＠' | '\t' | '\r' | '\n') => {
            Cow::Owned(format!("'{text}"))
        }
        _ => text,
    }
}

/// Writes a table as JSON lines: one object a row, with the names of the columns in order.
///
/// # Errors
/// Those of the output.
pub fn write_json_lines(table: &Table, output: &mut dyn Write) -> Result<()> {
    let names: Vec<String> = table
        .columns()
        .iter()
        .map(|column| serde_json::to_string(column.name()))
        .collect::<std::result::Result<_, _>>()
        .map_err(Error::other)?;
    for row in 0..table.rows() {
        output.write_all(b"{")?;
        for (i, (column, name)) in table.columns().iter().zip(&names).enumerate() {
            if i > 0 {
                output.write_all(b",")?;
            }
            output.write_all(name.as_bytes())?;
            output.write_all(b":")?;
            serde_json::to_writer(&mut *output, &json_cell(column, row)).map_err(Error::from)?;
        }
        output.write_all(b"}\n")?;
    }
    Ok(())
}

fn json_cell(column: &Column, row: usize) -> Value {
    if column.status().get(row).is_none_or(|&status| status != 0) {
        return Value::Null;
    }
    if let Some(number) = column.numbers().ok().and_then(|numbers| numbers.get(row)) {
        return Number::from_f64(*number).map_or(Value::Null, Value::Number);
    }
    if let Some(&number) = column.integers().ok().and_then(|numbers| numbers.get(row)) {
        return Value::Number(number.into());
    }
    Value::String(column.text(row).into_owned())
}
