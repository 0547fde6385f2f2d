//! A run through files of any size: records are read one after another, computed in batches on several threads, and come
//! out in the order of the files.

use std::io::{BufReader, Cursor, Read};
use std::path::PathBuf;
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, AtomicU64, Ordering};

pub use super::files::LeftOut;
use super::files::{Source, Stream, reader_at, sources};
use super::format::HEAD;
use super::polarity_table::{Tables, Task, Wanted, stopped, tables_of};
use super::reader::{Reader, Spot, unreadable};
use super::record::{Entry, Problem};
use super::settings::Settings;
use crate::parallel::Threads;
use crate::selectors::Selector;
use crate::status::Code;

/// A batch ends early when it holds this much, so that memory stays bounded whatever the records: an atom counts 1, and
/// so do 64 bytes of a file.
const MOST_A_BATCH: u64 = 4_000_000;

/// How far a run has come. It may be read by any thread at any time.
#[derive(Debug, Default)]
pub struct Progress {
    records: AtomicU64,
    bytes: AtomicU64,
    bytes_total: AtomicU64,
}

impl Progress {
    /// Records computed.
    pub fn records_done(&self) -> u64 {
        self.records.load(Ordering::Relaxed)
    }

    /// Bytes of the files whose records are computed; of a packed file the packed ones.
    pub fn bytes_done(&self) -> u64 {
        self.bytes.load(Ordering::Relaxed)
    }

    /// Bytes of all files; 0 where that is not known.
    pub fn bytes_total(&self) -> u64 {
        self.bytes_total.load(Ordering::Relaxed)
    }
}

/// The place in a run: records before it are done.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
struct Position {
    file: usize,
    spot: Spot,
    records: u64,
}

/// A run through files or through one stream.
pub struct Tabulation {
    sources: Vec<Source>,
    left_out: Vec<LeftOut>,
    settings: Settings,
    reader: Option<Reader<Stream>>,
    /// Name of what is being read.
    name: String,
    /// Place of the reader, and of the last batch handed out.
    file: usize,
    read: u64,
    done: Position,
    /// Records read for a batch that was stopped; the next call computes them.
    pending: Vec<Entry>,
    progress: Arc<Progress>,
}

impl Tabulation {
    /// Opens files and folders. `format` is `FORMAT_BY_CONTENT` or one that all files are in; `resume_from` is a text of
    /// [`Tabulation::position`] of a run through the same files.
    ///
    /// A file that cannot be read as structures does not end a run through others: one of several paths, or one of a
    /// folder whose name ends in .xyz, .sdf, .sd, .mol or .cml, with or without .gz, is a single broken record that says
    /// why. Other files of a folder are left out. A single path to such a file is an error.
    ///
    /// # Errors
    /// `FileMissing` · `FileUnreadable` (the only file, or a folder) · `BadFormat` (the only file, or no file to read),
    /// `UnknownSelector`, `WrongSelector`, `OutOfRange` (settings), `NotAllowed` (`resume_from` of another run).
    pub fn open(
        paths: &[PathBuf],
        format: Selector,
        settings: Settings,
        resume_from: Option<&str>,
    ) -> Result<Self, Problem> {
        settings.check().map_err(|failure| Problem::new(failure.code, "ionic_from must not be below polar_from"))?;
        let (sources, left_out) = sources(paths, format)?;
        if sources.is_empty() {
            let shown: Vec<String> = paths.iter().map(|path| path.display().to_string()).collect();
            let message = format!("{}: there is no file of structures", shown.join(", "));
            return Err(Problem::new(Code::BadFormat, message));
        }
        let start = match resume_from {
            Some(text) if !text.trim().is_empty() => position_read(text, &sources)?,
            _ => Position { file: 0, spot: Spot::START, records: 0 },
        };
        let progress = Arc::new(Progress::default());
        progress.bytes_total.store(sources.iter().map(|source| source.size).sum(), Ordering::Relaxed);
        let mut run = Self {
            sources,
            left_out,
            settings,
            reader: None,
            name: String::new(),
            file: start.file,
            read: start.records,
            done: start,
            pending: Vec::new(),
            progress,
        };
        if start.spot != Spot::START {
            run.reader = Some(run.open_file(start.spot)?);
        }
        run.finish_batch(start);
        Ok(run)
    }

    /// Runs through a stream that is not a file; `name` stands for the file in the tables.
    ///
    /// # Errors
    /// As [`Tabulation::open`].
    pub fn from_reader(
        name: &str,
        mut input: impl Read + Send + 'static,
        format: Selector,
        settings: Settings,
    ) -> Result<Self, Problem> {
        settings.check().map_err(|failure| Problem::new(failure.code, "ionic_from must not be below polar_from"))?;
        // A pipe may hand out a few bytes at a time; the format is told from all that it will take.
        let mut head = Vec::new();
        input.by_ref().take(HEAD as u64).read_to_end(&mut head).map_err(|error| unreadable(name, &error))?;
        let stream: Stream = Box::new(BufReader::with_capacity(HEAD, Cursor::new(head).chain(input)));
        let reader = Reader::open(stream, name, format)?;
        Ok(Self {
            sources: Vec::new(),
            left_out: Vec::new(),
            settings,
            reader: Some(reader),
            name: name.to_owned(),
            file: 0,
            read: 0,
            done: Position { file: 0, spot: Spot::START, records: 0 },
            pending: Vec::new(),
            progress: Arc::new(Progress::default()),
        })
    }

    /// Files of a folder that are no structures, or in a format that is not read.
    pub fn left_out(&self) -> &[LeftOut] {
        &self.left_out
    }

    /// The settings of the run.
    pub fn settings(&self) -> &Settings {
        &self.settings
    }

    /// How far the run has come; the handle may go to another thread.
    pub fn progress(&self) -> Arc<Progress> {
        Arc::clone(&self.progress)
    }

    /// The tables of the next records, at most `max_records` of them (at least one); `None` when none is left. After
    /// `Stopped` the next call goes on with the same records.
    ///
    /// # Errors
    /// `Stopped` · `FileMissing`, `FileUnreadable`, `BadFormat` where a file has changed since the run began.
    pub fn next_batch(
        &mut self,
        max_records: usize,
        wanted: Wanted,
        threads: Threads,
        stop: &AtomicBool,
    ) -> Result<Option<Tables>, Problem> {
        self.fill(max_records.max(1), stop)?;
        if self.pending.is_empty() {
            return Ok(None);
        }
        let take = self.pending.len().min(max_records.max(1));
        let tables = {
            let batch = self.pending.get(..take).unwrap_or(&self.pending);
            let tasks: Vec<Task<'_>> = batch.iter().map(|entry| (entry, None)).collect();
            tables_of(&tasks, &self.settings, wanted, threads, stop)?
        };
        if take < self.pending.len() {
            // A smaller batch than the one that was stopped: the place is not known, so it stays where it was.
            self.pending.drain(..take);
            self.progress.records.fetch_add(take as u64, Ordering::Relaxed);
            return Ok(Some(tables));
        }
        self.pending.clear();
        let spot = self.reader.as_ref().map_or(Spot::START, Reader::spot);
        self.finish_batch(Position { file: self.file, spot, records: self.read });
        Ok(Some(tables))
    }

    /// Where the run goes on after the last batch, as a text for `resume_from`; empty for a stream that is no file.
    pub fn position(&self) -> String {
        let Position { file, spot, records } = self.done;
        if self.sources.is_empty() {
            return String::new();
        }
        let name = self.sources.get(file).map_or("", |source| source.name.as_str());
        format!("1 {file} {} {} {} {records} {name}", spot.byte, spot.line, spot.records)
    }

    /// Reads records until the batch is full.
    fn fill(&mut self, max_records: usize, stop: &AtomicBool) -> Result<(), Problem> {
        let mut held: u64 = self.pending.iter().map(|entry| entry.atoms() as u64 + 1).sum();
        while self.pending.len() < max_records && held < MOST_A_BATCH {
            if stop.load(Ordering::Relaxed) {
                return Err(stopped());
            }
            if self.reader.is_none() {
                let Some(source) = self.sources.get(self.file) else { break };
                if let Some(entry) = source.broken_record() {
                    held += 1;
                    self.read += 1;
                    self.pending.push(entry);
                    self.file += 1;
                    continue;
                }
                self.reader = Some(self.open_file(Spot::START)?);
            }
            let Some(reader) = &mut self.reader else { break };
            let from = reader.text_bytes();
            match reader.next(&self.name)? {
                Some(entry) => {
                    held += entry.atoms() as u64 + 1 + reader.text_bytes().saturating_sub(from) / 64;
                    self.read += 1;
                    self.pending.push(entry);
                }
                None => {
                    self.reader = None;
                    self.file += 1;
                }
            }
        }
        Ok(())
    }

    fn open_file(&mut self, spot: Spot) -> Result<Reader<Stream>, Problem> {
        let Some(source) = self.sources.get(self.file) else {
            return Err(Problem::new(Code::Internal, Code::Internal.text()));
        };
        self.name = source.name.clone();
        reader_at(source, spot)
    }

    fn finish_batch(&mut self, position: Position) {
        self.done = position;
        let before: u64 = self.sources.iter().take(position.file).map(|source| source.size).sum();
        self.progress.records.store(position.records, Ordering::Relaxed);
        self.progress.bytes.store(before + position.spot.byte, Ordering::Relaxed);
    }
}

/// Reads a text of [`Tabulation::position`].
fn position_read(text: &str, sources: &[Source]) -> Result<Position, Problem> {
    let wrong = || Problem::new(Code::NotAllowed, "the place to go on from is not one of a run through these files");
    let mut words = text.trim().splitn(7, ' ');
    let mut number = || words.next().and_then(|word| word.parse::<u64>().ok()).ok_or_else(wrong);
    let (version, file, byte, line, records, all) = (number()?, number()?, number()?, number()?, number()?, number()?);
    let name = words.next().unwrap_or("");
    let file = usize::try_from(file).map_err(|_| wrong())?;
    let known = match sources.get(file) {
        Some(source) => source.name == name,
        None => file == sources.len() && byte == 0 && name.is_empty(),
    };
    if version != 1 || !known || line == 0 {
        return Err(wrong());
    }
    Ok(Position { file, spot: Spot { byte, line, records }, records: all })
}
