//! `sources`: what stands behind the numbers.

use std::io::{Write, stdout};

use bondmoment::catalogue::evaluate::choice_of;
use bondmoment::elements;
use bondmoment::selectors::{self, Choice, STATE_AS_LISTED, Selector};
use bondmoment::tables::{self, Source};
use clap::Args;

use crate::{Layout, Outcome, Trouble, show};

/// What stands behind each table, law and model, and how well it is verified
#[derive(Args)]
#[command(after_help = "Examples:\n  bondmoment sources\n  bondmoment sources RADII_CORDERO_2008\n  \
    bondmoment sources ELECTRONEGATIVITY_PAULING Pt")]
pub(crate) struct Sources {
    /// Name of a table, law or model
    name: Option<String>,
    /// An element: what stands behind its value in this table
    element: Option<String>,
    /// State of the element, such as sp2 or high_spin
    #[arg(long)]
    state: Option<String>,
    /// How to print the list
    #[arg(long, value_enum, default_value = "plain")]
    layout: Layout,
}

const MARKS: [(Selector, &str); 4] = [
    (selectors::MARK_VERIFIED, "verified"),
    (selectors::MARK_CORROBORATED, "corroborated"),
    (selectors::MARK_TRANSCRIBED, "transcribed"),
    (selectors::MARK_FROM_MEMORY, "from memory"),
];

impl Sources {
    pub(crate) fn run(&self) -> Result<Outcome, Trouble> {
        match (&self.name, &self.element) {
            (None, _) => self.list(),
            (Some(name), None) => one(named(name)?),
            (Some(name), Some(element)) => value(named(name)?, element, self.state.as_deref()),
        }
    }

    fn list(&self) -> Result<Outcome, Trouble> {
        let sources =
            || selectors::ALL.iter().filter_map(|choice| Some((choice, tables::source(choice.selector).ok()?)));
        let mut out = stdout().lock();
        match self.layout {
            Layout::Plain => {
                let mut head = vec!["name".to_owned(), "source".to_owned(), "mark".to_owned()];
                head.extend(MARKS.iter().map(|(_, word)| (*word).to_owned()));
                let mut lines = vec![head];
                for (choice, source) in sources() {
                    let year = source.year.map_or(String::new(), |year| year.to_string());
                    let mut line = vec![
                        choice.name.to_owned(),
                        format!("{} {year}", first_author(source)).trim().to_owned(),
                        source.mark.replace('_', " "),
                    ];
                    let counts = counts(choice.selector);
                    if counts.iter().any(|&count| count > 0) {
                        line.extend(
                            counts.iter().map(|&count| if count > 0 { count.to_string() } else { String::new() }),
                        );
                    }
                    lines.push(line);
                }
                show::columns(&mut out, &lines)?;
                writeln!(out, "\nThe last four columns count the values of a table by how well each is verified:")?;
                for (mark, word) in MARKS {
                    writeln!(out, "  {word}: {}", mark.title())?;
                }
                writeln!(out, "bondmoment sources NAME tells more, bondmoment sources NAME ELEMENT about one value.")?;
            }
            Layout::Csv => {
                writeln!(out, "name,author,year,journal,doi,mark,verified,corroborated,transcribed,from_memory")?;
                for (choice, source) in sources() {
                    let counts: Vec<String> = counts(choice.selector).iter().map(ToString::to_string).collect();
                    let year = source.year.map_or(String::new(), |year| year.to_string());
                    let texts = [choice.name, &source.author, &year, &source.journal, &source.doi, &source.mark];
                    let texts: Vec<String> =
                        texts.iter().map(|text| format!("\"{}\"", text.replace('"', "\"\""))).collect();
                    writeln!(out, "{},{}", texts.join(","), counts.join(","))?;
                }
            }
            Layout::JsonLines => {
                for (choice, _) in sources() {
                    writeln!(out, "{}", tables::source_json(choice.selector).unwrap_or_default())?;
                }
            }
        }
        Ok(Outcome::AllGood)
    }
}

/// Family names: one, two, or the first with "et al."; of several works the first.
fn first_author(source: &Source) -> String {
    let work = source.author.split(';').next().unwrap_or("");
    let family = |name: &str| name.rsplit(' ').next().unwrap_or(name).to_owned();
    let names: Vec<String> = work.split(", ").map(family).collect();
    match names.as_slice() {
        [one, two] => format!("{one} and {two}"),
        [first, _, ..] => format!("{first} et al."),
        _ => names.concat(),
    }
}

/// How many values of a table have each mark; states of one element count one each.
fn counts(table: Selector) -> [usize; 4] {
    let mut counts = [0; 4];
    let states = selectors::ALL.iter().filter(|choice| choice.group == "state").map(|choice| choice.selector);
    for state in states {
        for z in 1..=118 {
            let Ok(entry) = tables::entry(table, z, state) else { continue };
            // The first entry of an element with states is found under its own state too.
            if state == STATE_AS_LISTED && entry.state != STATE_AS_LISTED {
                continue;
            }
            if let Some(k) = MARKS.iter().position(|(mark, _)| *mark == entry.mark) {
                counts[k] += 1;
            }
        }
    }
    counts
}

fn named(name: &str) -> Result<&'static Choice, Trouble> {
    Selector::by_name(name)
        .and_then(Selector::choice)
        .map_err(|_| Trouble::Words(format!("there is no table, law or model {name}; bondmoment sources lists them")))
}

fn one(choice: &Choice) -> Result<Outcome, Trouble> {
    let source = tables::source(choice.selector)
        .map_err(|_| format!("{} has no source of its own: {}", choice.name, choice.title))?;
    let mut out = stdout().lock();
    writeln!(out, "{}", choice.name)?;
    let year = source.year.map_or(String::new(), |year| year.to_string());
    for (label, text) in [
        ("title", source.title.as_str()),
        ("author", &source.author),
        ("year", &year),
        ("published", &source.journal),
        ("doi", &source.doi),
        ("unit as printed", &source.unit),
        ("covers", &source.covers),
        ("uncertainty", &source.uncertainty),
        ("mark", &source.mark.replace('_', " ")),
        ("checked", &source.remark),
    ] {
        if !text.is_empty() {
            writeln!(out, "  {label}: {text}")?;
        }
    }
    for ((_, word), count) in MARKS.iter().zip(counts(choice.selector)) {
        if count > 0 {
            writeln!(out, "  {count} values {word}")?;
        }
    }
    Ok(Outcome::AllGood)
}

fn value(choice: &Choice, element: &str, state: Option<&str>) -> Result<Outcome, Trouble> {
    let z = element
        .parse()
        .or_else(|_| elements::atomic_number(element))
        .map_err(|_| format!("'{element}' is no element"))?;
    let state = match state {
        Some(state) => choice_of("state", state).ok_or_else(|| format!("'{state}' is no state"))?,
        None => STATE_AS_LISTED,
    };
    let source = elements::value_source(choice.selector, z, state)
        .map_err(|failure| format!("{} for {element}: {}", choice.name, failure.code.text()))?;
    let json: serde_json::Map<String, serde_json::Value> =
        serde_json::from_str(&source.json).map_err(|error| Trouble::Words(error.to_string()))?;
    let mut out = stdout().lock();
    writeln!(out, "{} for {}: {}", choice.name, elements::symbol(z).unwrap_or(element), source.mark.title())?;
    for (name, member) in json.iter().filter(|(name, _)| *name != "table" && *name != "mark") {
        match member {
            serde_json::Value::Null => {}
            serde_json::Value::String(text) if text.is_empty() => {}
            serde_json::Value::String(text) => writeln!(out, "  {name}: {text}")?,
            // What a derived value is made of.
            serde_json::Value::Array(parts) => {
                for part in parts {
                    let words: Vec<String> = part
                        .as_object()
                        .into_iter()
                        .flatten()
                        .filter(|(_, value)| !value.is_null() && value.as_str() != Some(""))
                        .map(|(name, value)| {
                            format!("{name} {}", value.as_str().map_or(value.to_string(), str::to_owned))
                        })
                        .collect();
                    writeln!(out, "  from: {}", words.join("; "))?;
                }
            }
            other => writeln!(out, "  {name}: {other}")?,
        }
    }
    Ok(Outcome::AllGood)
}
