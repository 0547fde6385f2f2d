//! Which files a run reads, in which order, and what they are called in the tables.

use std::collections::BTreeSet;
use std::fs::File;
use std::io::{Read, Seek, SeekFrom};
use std::path::{Path, PathBuf};

use super::format::{HEAD, format_of};
use super::reader::unreadable;
use super::record::Problem;
use crate::selectors::Selector;
use crate::status::Code;

/// Deepest nesting of folders that is followed.
const DEEPEST: usize = 32;

/// A file to read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct Source {
    pub path: PathBuf,
    /// Its name in the tables.
    pub name: String,
    /// `FORMAT_XYZ` or `FORMAT_CTFILE`.
    pub format: Selector,
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
    let mut head = Vec::new();
    let file = File::open(path).map_err(|error| unreadable(&shown, &error))?;
    let size = file.metadata().map_err(|error| unreadable(&shown, &error))?.len();
    file.take(HEAD as u64).read_to_end(&mut head).map_err(|error| unreadable(&shown, &error))?;
    let format = format_of(&name, &head, format)?;
    Ok(Source { path: path.to_owned(), name, format, size })
}

/// Opens a file at an offset.
pub(super) fn open_at(source: &Source, byte: u64) -> Result<File, Problem> {
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
