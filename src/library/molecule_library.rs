//! Records held in memory: read from a file or a text, or made from arrays.

use std::path::Path;
use std::sync::atomic::{AtomicBool, Ordering};

use super::files::{reader_at, sources};
use super::polarity_table::{Tables, Task, Wanted, stopped, tables_of};
use super::reader::{Reader, Spot};
use super::record::{Entry, Place, Problem, Record};
use super::rows::bonding_of;
use super::settings::Settings;
use crate::molecule::{Bond, Bonding};
use crate::parallel::{Threads, map_rows};
use crate::selectors::Selector;
use crate::status::{Code, Failure};

/// Records with their bonds. It never changes once it is made, and may be shared by threads.
#[derive(Clone, Debug, Default)]
pub struct MoleculeLibrary {
    entries: Vec<Entry>,
    bonding: Vec<Result<Bonding, Failure>>,
}

/// One molecule as a caller gives it.
#[derive(Clone, Copy, Debug, Default)]
pub struct Given<'a> {
    /// Name, or empty.
    pub name: &'a str,
    /// Atomic numbers.
    pub atomic_number: &'a [i32],
    /// Formal charges [e]; `None`: not stated.
    pub formal_charge: Option<&'a [i32]>,
    /// Coordinates [Å].
    pub xyz: &'a [[f64; 3]],
    /// Bonds; `None`: found from the coordinates.
    pub bonds: Option<&'a [Bond]>,
    /// Partial charges [e].
    pub charge_e: Option<&'a [f64]>,
    /// Their standard uncertainties [e]; NaN: not known.
    pub u_charge_e: Option<&'a [f64]>,
}

impl MoleculeLibrary {
    /// Reads a file, or all files of a folder. A file of the folder that cannot be read as structures is one broken record
    /// if its name ends as [`super::Tabulation::open`] says, and is left out otherwise.
    ///
    /// # Errors
    /// `FileMissing`, `FileUnreadable`, `BadFormat`, `UnknownSelector`, `WrongSelector`, `Stopped`.
    pub fn read(path: &Path, format: Selector, threads: Threads, stop: &AtomicBool) -> Result<Self, Problem> {
        let (sources, _) = sources(&[path.to_owned()], format)?;
        if sources.is_empty() {
            let message = format!("{}: there is no file of structures", path.display());
            return Err(Problem::new(Code::BadFormat, message));
        }
        let mut entries = Vec::new();
        for source in &sources {
            if let Some(entry) = source.broken_record() {
                entries.push(entry);
                continue;
            }
            take_all(reader_at(source, Spot::START)?, &source.name, stop, &mut entries)?;
        }
        Self::with_bonds(entries, threads, stop)
    }

    /// Reads a text; `name` stands for the file in the tables.
    ///
    /// # Errors
    /// `BadFormat`, `UnknownSelector`, `WrongSelector`, `Stopped`.
    pub fn parse(
        content: &[u8],
        name: &str,
        format: Selector,
        threads: Threads,
        stop: &AtomicBool,
    ) -> Result<Self, Problem> {
        let mut entries = Vec::new();
        take_all(Reader::open(content, name, format)?, name, stop, &mut entries)?;
        Self::with_bonds(entries, threads, stop)
    }

    /// Takes molecules as a caller has them; `source` stands for the file in the tables. What is wrong with one of them
    /// is told in its row.
    ///
    /// # Errors
    /// `Stopped`.
    pub fn from_given(source: &str, given: &[Given<'_>], threads: Threads, stop: &AtomicBool) -> Result<Self, Problem> {
        let entry = |(i, given): (usize, &Given<'_>)| {
            let place = Place { file: source.to_owned(), number: i as u64 + 1, line: 0 };
            Entry::Molecule(Box::new(Record {
                place,
                title: given.name.trim().to_owned(),
                atomic_number: given.atomic_number.to_vec(),
                xyz: given.xyz.to_vec(),
                formal_charge: given.formal_charge.map(<[i32]>::to_vec),
                bonds: given.bonds.map(<[Bond]>::to_vec),
                charge_e: given.charge_e.map(|charge| (charge.to_vec(), given.u_charge_e.map(<[f64]>::to_vec))),
                ..Record::default()
            }))
        };
        Self::with_bonds(given.iter().enumerate().map(entry).collect(), threads, stop)
    }

    fn with_bonds(entries: Vec<Entry>, threads: Threads, stop: &AtomicBool) -> Result<Self, Problem> {
        let atoms: usize = entries.iter().map(Entry::atoms).sum();
        let work = entries.len().saturating_mul(5).saturating_add(atoms.saturating_mul(2));
        let bonding = map_rows(entries.len(), work, threads, |i| {
            if stop.load(Ordering::Relaxed) {
                return Err(Failure::new(Code::Stopped));
            }
            match entries.get(i) {
                Some(Entry::Molecule(record)) => bonding_of(record),
                _ => Err(Failure::new(Code::BrokenRecord)),
            }
        });
        if stop.load(Ordering::Relaxed) {
            return Err(stopped());
        }
        Ok(Self { entries, bonding })
    }

    /// The records in order.
    pub fn entries(&self) -> &[Entry] {
        &self.entries
    }

    /// The bonds of each record, or why there are none.
    pub fn bonding(&self) -> &[Result<Bonding, Failure>] {
        &self.bonding
    }

    /// Number of records, of atoms and of bonds. A broken record has no atoms, a record whose bonds cannot be had no bonds.
    pub fn size(&self) -> (usize, usize, usize) {
        let atoms = self.entries.iter().map(Entry::atoms).sum();
        let bonds = self.bonding.iter().flatten().map(|bonding| bonding.bonds.len()).sum();
        (self.entries.len(), atoms, bonds)
    }

    /// The three tables of the records from `first` on, at most `n` of them.
    ///
    /// # Errors
    /// `OutOfRange` (beyond the last record, or settings that contradict one another), `Stopped`.
    pub fn polarity_table(
        &self,
        first: usize,
        n: usize,
        settings: &Settings,
        wanted: Wanted,
        threads: Threads,
        stop: &AtomicBool,
    ) -> Result<Tables, Problem> {
        let range = first.checked_add(n).map(|end| first..end);
        let entries = range.clone().and_then(|range| self.entries.get(range));
        let bonding = range.and_then(|range| self.bonding.get(range));
        let (Some(entries), Some(bonding)) = (entries, bonding) else {
            let message = format!("the library has {} records", self.entries.len());
            return Err(Problem::new(Code::OutOfRange, message));
        };
        let tasks: Vec<Task<'_>> = entries.iter().zip(bonding.iter().map(Some)).collect();
        tables_of(&tasks, settings, wanted, threads, stop)
    }
}

fn take_all<R: std::io::BufRead>(
    mut reader: Reader<R>,
    name: &str,
    stop: &AtomicBool,
    entries: &mut Vec<Entry>,
) -> Result<(), Problem> {
    while let Some(entry) = reader.next(name)? {
        if stop.load(Ordering::Relaxed) {
            return Err(stopped());
        }
        entries.push(entry);
    }
    Ok(())
}
