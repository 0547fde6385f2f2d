//! Which files a run reads, in which order, and what they are called in the tables.

use std::collections::BTreeSet;
use std::fs::File;
use std::io::{BufRead, BufReader, Seek, SeekFrom};
use std::path::{Path, PathBuf};

use super::format::{HEAD, format_of};
use super::packed::Input;
use super::reader::{Reader, Spot, head_of, unreadable};
use super::record::Problem;
use crate::selectors::{FORMAT_CML, Selector};
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
/// included, hidden ones not. What a folder holds besides structures is left out and reported; a file named by the
/// caller must be readable.
pub(super) fn sources(paths: &[PathBuf], format: Selector) -> Result<(Vec<Source>, Vec<LeftOut>), Problem> {
    let mut sources = Vec::new();
    let mut left_out = Vec::new();
    for path in paths {
        let shown = path.display().to_string();
        let about = std::fs::metadata(path).map_err(|error| unreadable(&shown, &error))?;
        if !about.is_dir() {
            let name = path.file_name().map_or(shown, |name| name.to_string_lossy().into_owned());
            sources.push(source(path, name, format)?);
            continue;
        }
        for file in files_of(path)? {
            let inside = file.strip_prefix(path).unwrap_or(&file);
            let parts: Vec<String> = inside.iter().map(|part| part.to_string_lossy().into_owned()).collect();
            match source(&file, parts.join("/"), format) {
                Ok(source) => sources.push(source),
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
    Ok(Source { path: path.to_owned(), name, format, packed, size })
}

/// A stream that other threads may take over.
pub(super) type Stream = Box<dyn BufRead + Send>;

/// A reader of a file that goes on at a spot.
pub(super) fn reader_at(source: &Source, spot: Spot) -> Result<Reader<Stream>, Problem> {
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
