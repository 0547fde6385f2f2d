//! The command line: `lookup` one cell, `tabulate` a library of structures, `sources` behind the numbers, `demo`.
//!
//! Exit status: 0 all rows good, 1 some rows failed, 2 the job could not be done. A closed pipe ends it quietly.

mod demo;
mod lookup;
mod show;
mod sources;
mod tabulate;

use std::process::ExitCode;

use clap::{Parser, Subcommand, ValueEnum};

/// Bond lengths, bond polarity, partial charges and dipole moments with standard uncertainties.
#[derive(Parser)]
#[command(name = "bondmoment", version, propagate_version = true, max_term_width = 110)]
struct Arguments {
    #[command(subcommand)]
    command: Command,
}

#[derive(Subcommand)]
enum Command {
    Lookup(lookup::Lookup),
    Tabulate(tabulate::Tabulate),
    Sources(sources::Sources),
    Demo(demo::Demo),
}

/// How results are printed.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
enum Layout {
    /// For people
    Plain,
    /// Comma-separated values with a header line
    Csv,
    /// One JSON object a line
    JsonLines,
}

/// How a command ended when it could do its job.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Outcome {
    AllGood,
    SomeFailed,
}

/// Why a command could not do its job.
enum Trouble {
    /// What to tell the user.
    Words(String),
    /// The reader of our output went away.
    ClosedPipe,
}

impl From<std::io::Error> for Trouble {
    fn from(error: std::io::Error) -> Self {
        match error.kind() {
            std::io::ErrorKind::BrokenPipe => Self::ClosedPipe,
            _ => Self::Words(error.to_string()),
        }
    }
}

impl From<String> for Trouble {
    fn from(words: String) -> Self {
        Self::Words(words)
    }
}

fn main() -> ExitCode {
    let outcome = match Arguments::parse().command {
        Command::Lookup(lookup) => lookup.run(),
        Command::Tabulate(tabulate) => tabulate.run(),
        Command::Sources(sources) => sources.run(),
        Command::Demo(demo) => demo.run(),
    };
    match outcome {
        Ok(Outcome::AllGood) | Err(Trouble::ClosedPipe) => ExitCode::SUCCESS,
        Ok(Outcome::SomeFailed) => ExitCode::from(1),
        Err(Trouble::Words(words)) => {
            eprintln!("bondmoment: {words}");
            ExitCode::from(2)
        }
    }
}
