//! `lookup`: one cell.

use std::io::{Write, stdout};

use bondmoment::catalogue::evaluate::choice_of;
use bondmoment::catalogue::{Value, evaluate, functions};
use bondmoment::declare::{Argument, Function, Holds, Kind};
use bondmoment::elements;
use bondmoment::library::number_text;
use bondmoment::selectors;
use clap::Args;

use crate::{Layout, Outcome, Trouble, show};

/// One worksheet function for one row
///
/// Without a function it lists them; with a function alone it shows its arguments, defaults and sources. Values come in
/// the order of the arguments that have no default, or as name=value; an element may be a symbol or a name; u_… gives a
/// standard uncertainty.
#[derive(Args)]
#[command(after_help = "Examples:\n  bondmoment lookup covalent_radius Fe state=low_spin\n  \
    bondmoment lookup bond_polarity C Cl\n  bondmoment lookup charge_from_dipole 1.1086 1.27455 u_dipole_D=0.0003\n  \
    bondmoment lookup convert \"e a0\" D 1")]
pub(crate) struct Lookup {
    /// Name of the function
    function: Option<String>,
    /// Values, or name=value
    #[arg(allow_negative_numbers = true)]
    values: Vec<String>,
    /// How to print the result
    #[arg(long, value_enum, default_value = "plain")]
    layout: Layout,
}

impl Lookup {
    pub(crate) fn run(&self) -> Result<Outcome, Trouble> {
        let Some(name) = &self.function else { return list() };
        let name = name.replace('-', "_");
        let function = functions()
            .find(|function| function.name == name)
            .ok_or_else(|| format!("there is no function {name}; bondmoment lookup lists them"))?;
        if self.values.is_empty() {
            return describe(function);
        }
        let mut given: Vec<(&str, &str)> = Vec::new();
        let mut places = function.arguments.iter().filter(|argument| takes_place(argument));
        for value in &self.values {
            match value.split_once('=') {
                Some(pair) => given.push(pair),
                None => {
                    let place = places.next().ok_or_else(|| {
                        let names: Vec<&str> =
                            function.arguments.iter().filter(|a| takes_place(a)).map(|a| a.name).collect();
                        format!("{name} takes {} ({}); {value} is one too many", names.len(), names.join(", "))
                    })?;
                    given.push((place.name, value));
                }
            }
        }
        let results = evaluate(function, &given)?;
        match self.layout {
            Layout::Plain => plain(function, &given, &results)?,
            Layout::Csv => {
                let mut writer = csv::Writer::from_writer(stdout().lock());
                let cells = cells(&results);
                let record = |writer: &mut csv::Writer<_>, pick: fn(&(String, Cell)) -> String| {
                    writer.write_record(cells.iter().map(pick)).map_err(|error| match error.into_kind() {
                        csv::ErrorKind::Io(error) => Trouble::from(error),
                        other => Trouble::Words(format!("{other:?}")),
                    })
                };
                record(&mut writer, |(name, _)| name.clone())?;
                record(&mut writer, |(_, cell)| cell.text())?;
                writer.flush()?;
            }
            Layout::JsonLines => {
                let object: serde_json::Map<String, serde_json::Value> =
                    cells(&results).into_iter().map(|(name, cell)| (name, cell.json())).collect();
                writeln!(stdout().lock(), "{}", serde_json::Value::from(object))?;
            }
        }
        Ok(Outcome::AllGood)
    }
}

/// Arguments without a default take values by their place.
fn takes_place(argument: &Argument) -> bool {
    argument.default.is_none() && argument.required
}

enum Cell {
    Number(f64),
    Integer(i32),
    Text(String),
}

impl Cell {
    fn text(&self) -> String {
        match self {
            Self::Number(x) => number_text(*x),
            Self::Integer(i) => i.to_string(),
            Self::Text(text) => text.clone(),
        }
    }

    fn json(self) -> serde_json::Value {
        match self {
            Self::Number(x) => serde_json::Number::from_f64(x).map_or(serde_json::Value::Null, Into::into),
            Self::Integer(i) => i.into(),
            Self::Text(text) => text.into(),
        }
    }
}

/// Results with their uncertainties side by side.
fn cells(results: &[(&'static Argument, Value)]) -> Vec<(String, Cell)> {
    let mut cells = Vec::new();
    for (argument, value) in results {
        let name = argument.name.to_owned();
        match value {
            Value::Number(q) => {
                cells.push((name, Cell::Number(q.value)));
                if !argument.uncertainty.is_empty() {
                    cells.push((argument.uncertainty.to_owned(), Cell::Number(q.u)));
                }
            }
            Value::Integer(i) => cells.push((name, Cell::Integer(*i))),
            Value::Choice(choice) => cells.push((name, Cell::Text(choice.title().to_owned()))),
            Value::Text(text) => cells.push((name, Cell::Text(text.clone()))),
        }
    }
    cells
}

fn plain(function: &Function, given: &[(&str, &str)], results: &[(&'static Argument, Value)]) -> Result<(), Trouble> {
    let mut out = stdout().lock();
    for (argument, value) in results {
        let unit = if argument.unit.is_empty() { String::new() } else { format!(" {}", argument.unit) };
        match value {
            Value::Number(q) if q.u.is_nan() => {
                writeln!(out, "{} = {}{unit}  ({})", argument.name, show::quantity(*q), without_u(function, given))?;
            }
            Value::Number(q) => writeln!(out, "{} = {}{unit}", argument.name, show::quantity(*q))?,
            Value::Integer(i) => writeln!(out, "{} = {i}", argument.name)?,
            Value::Choice(choice) => writeln!(out, "{} = {}", argument.name, choice.title())?,
            Value::Text(text) => writeln!(out, "{} = {text}", argument.name)?,
        }
    }
    let choices = function.arguments.iter().filter_map(|argument| {
        let default = argument.default?;
        let text = given.iter().find(|(name, _)| *name == argument.name).map(|(_, text)| *text);
        let chosen = match text {
            Some(text) => choice_of(argument.group, text)?,
            None => default,
        };
        Some((argument, chosen))
    });
    for (argument, chosen) in choices {
        if !enters(function, argument, given) {
            continue;
        }
        writeln!(out, "  {}: {} ({})", argument.name, chosen.title(), chosen.name())?;
        if let Some(source) = value_source(function, given, chosen) {
            writeln!(out, "  value: {source}")?;
        }
    }
    Ok(())
}

/// False for a choice that the law of a bond length does not use.
fn enters(function: &Function, argument: &Argument, given: &[(&str, &str)]) -> bool {
    let text = |name: &str| given.iter().find(|(given, _)| *given == name).map_or("", |(_, text)| *text);
    let law = choice_of("length_law", text("law")).unwrap_or(selectors::LENGTH_BY_ORDER);
    let order: f64 = text("bond_order").parse().unwrap_or(1.0);
    match argument.name {
        _ if function.name != "bond_length" => true,
        "scale" => law == selectors::LENGTH_SCHOMAKER_STEVENSON_1941,
        "radii" | "state_a" | "state_b" => law != selectors::LENGTH_BY_ORDER || order < 2.0,
        _ => true,
    }
}

/// Why a result has no uncertainty: inputs without one, or nothing published.
fn without_u(function: &Function, given: &[(&str, &str)]) -> String {
    let missing: Vec<&str> = function
        .arguments
        .iter()
        .map(|argument| argument.uncertainty)
        .filter(|u| !u.is_empty() && !given.iter().any(|(name, _)| name == u))
        .collect();
    if missing.is_empty() {
        "no uncertainty published".to_owned()
    } else {
        format!("no uncertainty without {}", missing.join(", "))
    }
}

/// What stands behind the very value, for a look-up in a table.
fn value_source(function: &Function, given: &[(&str, &str)], table: selectors::Selector) -> Option<String> {
    let text = |name: &str| given.iter().find(|(given, _)| *given == name).map(|(_, text)| *text);
    let argument = function.arguments.iter().find(|argument| argument.name == "atomic_number")?;
    let element = text(argument.name)?;
    let z = element.parse().or_else(|_| elements::atomic_number(element)).ok()?;
    let state = match text("state") {
        Some(state) => choice_of("state", state)?,
        None => selectors::STATE_AS_LISTED,
    };
    let source = elements::value_source(table, z, state).ok()?;
    let json: serde_json::Value = serde_json::from_str(&source.json).ok()?;
    let member = |name: &str| json.get(name).and_then(serde_json::Value::as_str).unwrap_or("").to_owned();
    let mut words = format!("{}: {}", source.mark.title(), member("journal"));
    let note = member("note");
    if !note.is_empty() {
        words.push_str("; ");
        words.push_str(&note);
    }
    Some(words)
}

/// All functions, a line each.
fn list() -> Result<Outcome, Trouble> {
    let mut lines = vec![vec!["function".to_owned(), "answers".to_owned(), "formula".to_owned()]];
    for function in functions() {
        let note = if function.kind == Kind::Molecules { " (of molecules: see tabulate)" } else { "" };
        lines.push(vec![function.name.to_owned(), format!("{}{note}", function.title), function.formula.to_owned()]);
    }
    show::columns(&mut stdout().lock(), &lines)?;
    Ok(Outcome::AllGood)
}

/// One function with its arguments, defaults, notes and sources.
fn describe(function: &Function) -> Result<Outcome, Trouble> {
    let mut out = stdout().lock();
    writeln!(out, "{}: {}", function.name, function.title)?;
    if !function.formula.is_empty() {
        writeln!(out, "  {}", function.formula)?;
    }
    for (title, arguments) in [("given", function.arguments), ("returned", function.results)] {
        writeln!(out, "{title}")?;
        let mut lines = Vec::new();
        for argument in arguments {
            let default = match argument.default {
                Some(choice) => format!("default {}", choice.name()),
                None if argument.default_number.is_finite() => {
                    format!("default {}", number_text(argument.default_number))
                }
                None => String::new(),
            };
            let name = match argument.uncertainty {
                "" => argument.name.to_owned(),
                u => format!("{}, {u}", argument.name),
            };
            lines.push(vec![format!("  {name}"), argument.help.to_owned(), default]);
            if argument.holds == Holds::Selector && title == "given" {
                for choice in selectors::ALL.iter().filter(|choice| choice.group == argument.group) {
                    lines.push(vec![format!("    {}", choice.name), choice.title.to_owned()]);
                }
            }
        }
        show::columns(&mut out, &lines)?;
    }
    for (title, texts) in [("notes", function.notes), ("sources", function.sources)] {
        if !texts.is_empty() {
            writeln!(out, "{title}")?;
        }
        for text in texts {
            writeln!(out, "  {text}")?;
        }
    }
    Ok(Outcome::AllGood)
}
