//! Which files a run reads, in which order, and what they are called in the tables.

use std::collections::BTreeSet;
use std::fs::File;
use std::io::{BufRead, BufReader, Seek, SeekFrom};
use std::path::{Path, PathBuf};

use super::format::{HEAD, format_of, known_format};
use super::packed::Input;
use super::reader::{Reader, Spot, head_of, unreadable};
use super::record::{Broken, Entry, Place, Problem};
use crate::selectors::{FORMAT_BY_CONTENT, FORMAT_CML, Selector};
use crate::status::Code;

/// Deepest nesting of folders that is followed.
const DEEPEST: usize = 32;

/// A file to read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct Source {
    pub path: PathBuf,
    /// Its name in the tables.
    pub name: String,
    /// `FORMAT_XYZ`, `FORMAT_CTFILE` or `FORMAT_CML`.
    pub format: Selector,
    /// It is gzip-compressed.
    pub packed: bool,
    /// Its size when the run began [bytes].
    pub size: u64,
    /// Why it cannot be read as structures: such a file is one broken record.
    pub broken: Option<String>,
}

impl Source {
    /// The one record of a file that cannot be read as structures; `None` for one that can.
    pub fn broken_record(&self) -> Option<Entry> {
        let message = self.broken.clone()?;
        let place = Place { file: self.name.clone(), number: 1, line: 0 };
        Some(Entry::Broken(Broken { place, title: String::new(), line: 0, message }))
    }
}

/// A file of a folder that is left out, and why.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct LeftOut {
    /// The file.
    pub path: PathBuf,
    /// Why, naming the file.
    pub message: String,
}

/// The files behind some paths: a file as it is, a folder as its files in the order of their names, folders within
/// included, hidden ones not.
///
/// A file that cannot be read as structures is an error where it is the only path, and a source with its reason in
/// `broken` where it is one of several paths, or one of a folder whose name ends as those of structures do. What a folder
/// holds besides is left out and reported.
///
/// # Errors
/// `FileMissing`, `UnknownSelector`, `WrongSelector` · `FileUnreadable` (a folder, or the only file) · `BadFormat` (the
/// only file).
pub(super) fn sources(paths: &[PathBuf], format: Selector) -> Result<(Vec<Source>, Vec<LeftOut>), Problem> {
    let only = matches!(paths, [_]);
    let mut sources = Vec::new();
    let mut left_out = Vec::new();
    for path in paths {
        let shown = path.display().to_string();
        let about = std::fs::metadata(path).map_err(|error| unreadable(&shown, &error))?;
        known_format(&shown, format)?;
        if !about.is_dir() {
            let name = path.file_name().map_or(shown, |name| name.to_string_lossy().into_owned());
            sources.push(match source(path, name.clone(), format) {
                Err(problem) if !only && problem.code != Code::FileMissing => broken(path, name, &problem),
                source => source?,
            });
            continue;
        }
        for file in files_of(path)? {
            let inside = file.strip_prefix(path).unwrap_or(&file);
            let parts: Vec<String> = inside.iter().map(|part| part.to_string_lossy().into_owned()).collect();
            let name = parts.join("/");
            match source(&file, name.clone(), format) {
                Ok(source) => sources.push(source),
                Err(problem) if ends_as_structures(&name) => sources.push(broken(&file, name, &problem)),
                Err(problem) => left_out.push(LeftOut { path: file, message: problem.message }),
            }
        }
    }
    // Two files of one name from different places go by their paths, so that no two records share a key.
    let mut names: Vec<String> = sources.iter().map(|source| source.name.clone()).collect();
    names.sort_unstable();
    let repeated: BTreeSet<String> =
        names.windows(2).filter_map(|pair| pair.first().filter(|name| pair.last() == Some(name)).cloned()).collect();
    for source in sources.iter_mut().filter(|source| repeated.contains(&source.name)) {
        source.name = source.path.display().to_string();
    }
    Ok((sources, left_out))
}

/// All files of a folder and its folders, in the order of their paths. Links to folders are not followed.
fn files_of(folder: &Path) -> Result<Vec<PathBuf>, Problem> {
    let mut files = Vec::new();
    let mut folders = vec![(folder.to_owned(), 0)];
    while let Some((folder, depth)) = folders.pop() {
        let shown = folder.display().to_string();
        for entry in std::fs::read_dir(&folder).map_err(|error| unreadable(&shown, &error))? {
            let entry = entry.map_err(|error| unreadable(&shown, &error))?;
            if entry.file_name().to_string_lossy().starts_with('.') {
                continue;
            }
            let kind = entry.file_type().map_err(|error| unreadable(&shown, &error))?;
            if kind.is_dir() {
                if depth < DEEPEST {
                    folders.push((entry.path(), depth + 1));
                }
            } else if entry.path().is_file() {
                files.push(entry.path());
            }
        }
    }
    files.sort();
    Ok(files)
}

fn source(path: &Path, name: String, format: Selector) -> Result<Source, Problem> {
    let shown = path.display().to_string();
    let file = File::open(path).map_err(|error| unreadable(&shown, &error))?;
    let size = file.metadata().map_err(|error| unreadable(&shown, &error))?.len();
    let stream = BufReader::with_capacity(HEAD, file);
    let mut input = Input::told(stream).map_err(|error| unreadable(&shown, &error))?;
    let packed = input.packed_bytes().is_some();
    let format = format_of(&name, head_of(&mut input, &name)?, format)?;
    Ok(Source { path: path.to_owned(), name, format, packed, size, broken: None })
}

/// A file that cannot be read as structures, and why. The reason goes without the name, which the record has.
fn broken(path: &Path, name: String, problem: &Problem) -> Source {
    let shown = path.display().to_string();
    let words = [&shown, &name].iter().find_map(|name| problem.message.strip_prefix(name.as_str())?.strip_prefix(": "));
    let broken = Some(words.unwrap_or(&problem.message).to_owned());
    let size = std::fs::metadata(path).map_or(0, |about| about.len());
    Source { path: path.to_owned(), name, format: FORMAT_BY_CONTENT, packed: false, size, broken }
}

/// Whether a name ends as the names of structure files do, packed or not, in any case.
fn ends_as_structures(name: &str) -> bool {
    let name = name.to_ascii_lowercase();
    let name = name.strip_suffix(".gz").unwrap_or(&name);
    [".xyz", ".sdf", ".mol", ".sd", ".cml"].iter().any(|end| name.ends_with(end))
}

/// A stream that other threads may take over.
pub(super) type Stream = Box<dyn BufRead + Send>;

/// A reader of a file that goes on at a spot.
///
/// # Errors
/// `FileMissing`, `FileUnreadable`, `NotAllowed` (no such spot) · `BadFormat` for a file with a broken record only.
pub(super) fn reader_at(source: &Source, spot: Spot) -> Result<Reader<Stream>, Problem> {
    if let Some(words) = &source.broken {
        return Err(Problem::new(Code::BadFormat, format!("{}: {words}", source.name)));
    }
    let stream =
        |byte| -> Result<Stream, Problem> { Ok(Box::new(BufReader::with_capacity(HEAD, open_at(source, byte)?))) };
    let again = source.packed || source.format == FORMAT_CML;
    if !again || spot == Spot::START {
        return Ok(Reader::at(stream(spot.byte)?, source.packed, &source.name, source.format, spot));
    }
    // No place within such a file can be gone to: its records are read again.
    let mut reader = Reader::at(stream(0)?, source.packed, &source.name, source.format, Spot::START);
    for _ in 0..spot.records {
        if reader.next(&source.name)?.is_none() {
            let message = format!("{}: the file has fewer records than the place to go on from", source.name);
            return Err(Problem::new(Code::NotAllowed, message));
        }
    }
    Ok(reader)
}

/// Opens a file at an offset.
fn open_at(source: &Source, byte: u64) -> Result<File, Problem> {
    let mut file = File::open(&source.path).map_err(|error| unreadable(&source.name, &error))?;
    if byte > 0 {
        let size = file.metadata().map_err(|error| unreadable(&source.name, &error))?.len();
        if size < byte {
            let message = format!("{}: the file is shorter than the place to go on from", source.name);
            return Err(Problem::new(Code::NotAllowed, message));
        }
        file.seek(SeekFrom::Start(byte)).map_err(|error| unreadable(&source.name, &error))?;
    }
    Ok(file)
}
