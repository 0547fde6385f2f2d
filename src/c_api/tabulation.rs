//! Entry points for runs through files of any size.

use std::cell::UnsafeCell;
use std::ffi::c_char;
use std::path::PathBuf;
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};

use super::arrays::Arrays;
use super::guard::{guard, pool};
use super::handles::{Handle, Kind, borrow, free, leak, magic};
use super::settings::{bmom_settings, bmom_stop, settings_of, stop_of};
use super::table::{NEVER, TablesOut, bmom_table, failure_of, none_measured};
use super::text::{TextOut, path_in, text_in};
use crate::library::{Progress, Tabulation};
use crate::parallel::Threads;
use crate::selectors::Selector;
use crate::status::{Code, Failure};

/// A run through files of structures that hands out the tables batch by batch. One thread uses it at a time.
pub struct bmom_tabulation {
    _opaque: [u8; 0],
}

/// A run: used by one thread at a time and in one process.
struct Run {
    busy: AtomicBool,
    process: u32,
    threads: Threads,
    progress: Arc<Progress>,
    tabulation: UnsafeCell<Tabulation>,
}

impl Kind for Run {
    const MAGIC: u64 = magic(4);
}

/// Opens a run through a file of structures or all files of a folder, in the order of their names; memory stays bounded
/// whatever their size.
/// Given: 1 measured (NULL: no measured dipoles are compared in this version); 2 format (BMOM_FORMAT_...); settings (NULL:
/// defaults); threads; 3 path [text]; 4 resume_from [text of bmom_tabulation_position, or empty].
/// Returned: 5 tabulation, NULL after any failure; free it with bmom_tabulation_free.
/// Status: NOT_ALLOWED (measured; or resume_from of another run, 4018), FILE_MISSING, FILE_UNREADABLE, BAD_FORMAT,
/// UNKNOWN_SELECTOR, WRONG_SELECTOR, OUT_OF_RANGE (threads or settings), NOT_UTF8, BAD_HANDLE, BUSY, NULL_POINTER.
/// Notes: of a folder, a file that cannot be read as structures is one broken record if its name ends in .xyz, .sdf, .sd,
/// .mol or .cml (also .gz), and is left out otherwise.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_tabulation_open(
    measured: *const bmom_table,
    format: i32,
    settings: *const bmom_settings,
    threads: i32,
    path: *const c_char,
    path_length: i64,
    resume_from: *const c_char,
    resume_from_length: i64,
    tabulation: *mut *mut bmom_tabulation,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let arrays = unsafe { Arrays::promised() };
        let out = arrays.cell(5, tabulation, std::ptr::null_mut())?;
        none_measured(measured, 1)?;
        let format = Selector(format).of_group("format").map_err(|failure| failure.argument(2))?;
        let pool = pool(threads)?;
        // SAFETY: as above. NULL for resume_from is an empty text.
        let (settings, path, resume): (_, PathBuf, &str) = unsafe {
            let resume = if resume_from.is_null() { "" } else { text_in(4, resume_from, resume_from_length)? };
            (settings_of(settings)?, path_in(3, path, path_length)?, resume)
        };
        let run = Tabulation::open(&[path], format, settings, Some(resume)).map_err(|problem| {
            failure_of(&problem).argument(match problem.code {
                Code::NotAllowed => 4,
                Code::OutOfRange => 0,
                _ => 3,
            })
        })?;
        let run = Run {
            busy: AtomicBool::new(false),
            process: std::process::id(),
            threads: pool,
            progress: run.progress(),
            tabulation: UnsafeCell::new(run),
        };
        out.set(leak(run).cast());
        Ok(Code::Ok)
    })
}

/// The tables of the next records of a run.
/// Given: 1 tabulation; stop (NULL: none); 2 max_molecules (from 1). Returned: 3 polarity; 4 bonds; 5 atoms: NULL where that
/// table is not wanted; NULL is written after any failure. Free each with bmom_table_free.
/// Status: END (no record is left), STOPPED (the next call, with another stop handle, goes on with the same records), FILE_MISSING, FILE_UNREADABLE,
/// BAD_FORMAT (a file has changed), OUT_OF_RANGE, BUSY, OTHER_PROCESS, BAD_HANDLE, NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_tabulation_next(
    tabulation: *mut bmom_tabulation,
    stop: *const bmom_stop,
    max_molecules: i64,
    polarity: *mut *mut bmom_table,
    bonds: *mut *mut bmom_table,
    atoms: *mut *mut bmom_table,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let out = TablesOut::new(&unsafe { Arrays::promised() }, 3, [polarity, bonds, atoms])?;
        if max_molecules < 1 {
            return Err(Failure::of(Code::OutOfRange, 2));
        }
        let most = usize::try_from(max_molecules).unwrap_or(usize::MAX);
        // SAFETY: as above.
        let (run, stop) = unsafe { (run_of(tabulation)?, stop_of(stop)?) };
        let batch =
            run.alone(|tabulation| tabulation.next_batch(most, out.wanted(), run.threads, stop.unwrap_or(&NEVER)))?;
        match batch.map_err(|problem| failure_of(&problem))? {
            Some(tables) => out.set(tables),
            None => return Ok(Code::End),
        }
        Ok(Code::Ok)
    })
}

/// How far a run has come, in whole batches; any thread may ask at any time, also while another is in
/// bmom_tabulation_next.
/// Given: 1 tabulation. Returned: 2 molecules_done; 3 bytes_done; 4 bytes_total (0: not known); each may be NULL.
/// Status: BAD_HANDLE, NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_tabulation_progress(
    tabulation: *const bmom_tabulation,
    molecules_done: *mut i64,
    bytes_done: *mut i64,
    bytes_total: *mut i64,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let arrays = unsafe { Arrays::promised() };
        let cells = [
            arrays.cell_if(2, molecules_done, i64::MIN)?,
            arrays.cell_if(3, bytes_done, i64::MIN)?,
            arrays.cell_if(4, bytes_total, i64::MIN)?,
        ];
        // SAFETY: as above.
        let progress = unsafe { &run_of(tabulation)?.progress };
        for (cell, done) in
            cells.into_iter().zip([progress.records_done(), progress.bytes_done(), progress.bytes_total()])
        {
            cell.set(i64::try_from(done).unwrap_or(i64::MAX));
        }
        Ok(Code::Ok)
    })
}

/// Where a run goes on after the last batch, as a text for resume_from of bmom_tabulation_open.
/// Given: 1 tabulation. Returned: 2 text. Status: BUFFER_TOO_SMALL, BUSY, OTHER_PROCESS, BAD_HANDLE, NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_tabulation_position(
    tabulation: *const bmom_tabulation,
    text: *mut c_char,
    capacity: i64,
    needed: *mut i64,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (out, run) = unsafe { (TextOut::new(2, text, capacity, needed)?, run_of(tabulation)?) };
        out.set(&run.alone(|tabulation| tabulation.position())?)
    })
}

/// Ends a run and frees it; NULL is allowed.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_tabulation_free(tabulation: *mut bmom_tabulation) {
    // SAFETY: the caller's promise goes on.
    unsafe { free(tabulation.cast::<Handle<Run>>()) }
}

impl Run {
    /// Lets one thread of the process that opened the run use it.
    fn alone<T>(&self, job: impl FnOnce(&mut Tabulation) -> T) -> Result<T, Failure> {
        if self.process != std::process::id() {
            return Err(Failure::of(Code::OtherProcess, 1));
        }
        if self.busy.swap(true, Ordering::Acquire) {
            return Err(Failure::of(Code::Busy, 1));
        }
        let _release = Release(&self.busy);
        // SAFETY: the flag lets one thread in at a time.
        Ok(job(unsafe { &mut *self.tabulation.get() }))
    }
}

/// Gives a run free, also after a panic.
struct Release<'a>(&'a AtomicBool);

impl Drop for Release<'_> {
    fn drop(&mut self) {
        self.0.store(false, Ordering::Release);
    }
}

/// # Safety
/// As `handles::borrow`.
unsafe fn run_of<'a>(tabulation: *const bmom_tabulation) -> Result<&'a Run, Failure> {
    // SAFETY: the caller's promise.
    unsafe { borrow(tabulation.cast::<Handle<Run>>()) }.map_err(|failure| failure.argument(1))
}
