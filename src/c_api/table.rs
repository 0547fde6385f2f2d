//! Entry points for result tables: columns by name, cells with a status each.

use std::ffi::c_char;
use std::sync::atomic::AtomicBool;

use super::arrays::{Arrays, Cell, Out, clean, count};
use super::guard::guard;
use super::handles::{Handle, Kind, borrow, free, leak, magic};
use super::text::{TextOut, text_in};
use crate::library::table::{Column, Table};
use crate::library::{Problem, Tables, Wanted};
use crate::status::{Code, Failure};

/// A table of results: columns with names and types that never change; it may be shared by threads.
pub struct bmom_table {
    _opaque: [u8; 0],
}

impl Kind for Table {
    const MAGIC: u64 = magic(5);
}

/// A table handle for C.
pub(super) fn table_handle(table: Table) -> *mut bmom_table {
    leak(table).cast()
}

/// The table behind a handle.
///
/// # Errors
/// `NullPointer`, `BadHandle`.
///
/// # Safety
/// As `handles::borrow`.
unsafe fn table_of<'a>(table: *const bmom_table) -> Result<&'a Table, Failure> {
    // SAFETY: the caller's promise.
    unsafe { borrow(table.cast::<Handle<Table>>()) }.map_err(|failure| failure.argument(1))
}

/// Number of rows and columns.
/// Given: 1 table. Returned: 2 rows; 3 columns. Status: BAD_HANDLE, NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_table_size(table: *const bmom_table, rows: *mut i64, columns: *mut i32) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let arrays = unsafe { Arrays::promised() };
        let (rows, columns) = (arrays.cell(2, rows, i64::MIN)?, arrays.cell(3, columns, i32::MIN)?);
        // SAFETY: as above.
        let table = unsafe { table_of(table)? };
        rows.set(i64::try_from(table.rows()).unwrap_or(i64::MAX));
        columns.set(i32::try_from(table.columns().len()).unwrap_or(i32::MAX));
        Ok(Code::Ok)
    })
}

/// Name of a column, with its unit.
/// Given: 1 table; 2 column (from 0). Returned: 3 text. Status: OUT_OF_RANGE, BUFFER_TOO_SMALL, BAD_HANDLE, NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_table_name(
    table: *const bmom_table,
    column: i32,
    text: *mut c_char,
    capacity: i64,
    needed: *mut i64,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (table, out) = unsafe { (table_of(table), TextOut::new(3, text, capacity, needed)?) };
        out.set(column_at(table?, column)?.name())
    })
}

/// Index and type of the column of a name.
/// Given: 1 table; 2 name [text]. Returned: 3 column (from 0, good for this table); 4 type (BMOM_TYPE_...).
/// Status: UNKNOWN_NAME, NOT_UTF8, BAD_HANDLE, NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_table_column(
    table: *const bmom_table,
    name: *const c_char,
    name_length: i64,
    column: *mut i32,
    type_: *mut i32,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (arrays, table, name) = unsafe { (Arrays::promised(), table_of(table), text_in(2, name, name_length)) };
        let (index, kind) = (arrays.cell(3, column, i32::MIN)?, arrays.cell(4, type_, i32::MIN)?);
        let (table, name) = (table?, name?);
        let found = table.index_of(name).map_err(|failure| failure.argument(2))?;
        index.set(i32::try_from(found).unwrap_or(i32::MAX));
        kind.set(table.column(found)?.kind().0);
        Ok(Code::Ok)
    })
}

fn column_at(table: &Table, column: i32) -> Result<&Column, Failure> {
    let out_of_range = Failure::of(Code::OutOfRange, 2);
    table.column(usize::try_from(column).map_err(|_| out_of_range)?).map_err(|_| out_of_range)
}

/// Rows `first` to `first + n − 1` of a table, checked.
fn rows_of(table: &Table, first: i64, n: i64) -> Result<std::ops::Range<usize>, Failure> {
    let (first, n) = (count(first).map_err(|f| f.argument(3))?, count(n).map_err(|f| f.argument(4))?);
    let end = first.checked_add(n).filter(|&end| end <= table.rows());
    end.map(|end| first..end).ok_or(Failure::of(Code::OutOfRange, 4))
}

/// Copies cells of one type and their statuses.
fn copy<T: Copy>(
    rows: std::ops::Range<usize>,
    values: &[T],
    status: &[i32],
    out: Out<T>,
    status_out: Out<i32>,
    put: impl Fn(T) -> T,
) {
    for (k, row) in rows.enumerate() {
        out.set(k, put(values[row]));
        status_out.set(k, status[row]);
    }
}

/// Numbers of a column of type NUMBER, NaN where a cell has no value. The call is OK though every cell be without one:
/// cell_status says why.
/// Given: 1 table; 2 column (from 0); 3 first (row, from 0); 4 n. Returned: 5 values (n); 6 cell_status (n; NULL: not
/// wanted). Status: WRONG_TYPE, OUT_OF_RANGE, NEGATIVE_COUNT, BAD_HANDLE, NULL_POINTER, OVERLAP.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_table_numbers(
    table: *const bmom_table,
    column: i32,
    first: i64,
    n: i64,
    values: *mut f64,
    cell_status: *mut i32,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (mut arrays, table) = unsafe { (Arrays::promised(), table_of(table)?) };
        let (column, rows) = (column_at(table, column)?, rows_of(table, first, n)?);
        let out = arrays.output(5, values, rows.len())?;
        let status = arrays.output_if(6, cell_status, rows.len())?;
        arrays.no_overlap()?;
        copy(rows, column.numbers().map_err(|failure| failure.argument(2))?, column.status(), out, status, clean);
        Ok(Code::Ok)
    })
}

/// Integers of a column of type INTEGER, INT32_MIN where a cell has no value. Otherwise as bmom_table_numbers.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_table_integers(
    table: *const bmom_table,
    column: i32,
    first: i64,
    n: i64,
    values: *mut i32,
    cell_status: *mut i32,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (mut arrays, table) = unsafe { (Arrays::promised(), table_of(table)?) };
        let (column, rows) = (column_at(table, column)?, rows_of(table, first, n)?);
        let out = arrays.output(5, values, rows.len())?;
        let status = arrays.output_if(6, cell_status, rows.len())?;
        arrays.no_overlap()?;
        copy(rows, column.integers().map_err(|failure| failure.argument(2))?, column.status(), out, status, |x| x);
        Ok(Code::Ok)
    })
}

/// Cells of a column of any type as text, numbers in the library's digits, empty where a cell has no value.
/// Given: 1 table; 2 column (from 0); 3 first (row, from 0); 4 n. Returned: 5 text_offsets (n + 1), text (UTF-8, no NUL);
/// 6 cell_status (n; NULL: not wanted). Where the room is too small offsets and needed are right and no text is written.
/// Status: BUFFER_TOO_SMALL, OUT_OF_RANGE, NEGATIVE_COUNT, BAD_HANDLE, NULL_POINTER, OVERLAP.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_table_texts(
    table: *const bmom_table,
    column: i32,
    first: i64,
    n: i64,
    text_offsets: *mut i64,
    text: *mut c_char,
    capacity: i64,
    needed: *mut i64,
    cell_status: *mut i32,
) -> i32 {
    guard(|| {
        let room = count(capacity).map_err(|failure| failure.argument(5))?;
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (mut arrays, table) = unsafe { (Arrays::promised(), table_of(table)?) };
        let (column, rows) = (column_at(table, column)?, rows_of(table, first, n)?);
        let offsets = arrays.output(5, text_offsets, rows.len() + 1)?;
        let out = arrays.output(5, text.cast::<u8>(), room)?;
        let needed = arrays.output_if(5, needed, 1)?;
        let status = arrays.output_if(6, cell_status, rows.len())?;
        arrays.no_overlap()?;
        let mut end = 0_usize;
        offsets.set(0, 0);
        for (k, row) in rows.clone().enumerate() {
            end += column.text(row).len();
            offsets.set(k + 1, end as i64);
            status.set(k, column.status()[row]);
        }
        needed.set(0, end as i64);
        if end > room {
            return Err(Failure::of(Code::BufferTooSmall, 5));
        }
        let mut start = 0;
        for row in rows {
            let text = column.text(row);
            out.set_all(start, text.as_bytes());
            start += text.len();
        }
        Ok(Code::Ok)
    })
}

/// Frees a table; NULL is allowed.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_table_free(table: *mut bmom_table) {
    // SAFETY: the caller's promise goes on.
    unsafe { free(table.cast::<Handle<Table>>()) }
}

/// Room for the three tables, each where it is wanted.
pub(super) struct TablesOut([(bool, Cell<*mut bmom_table>); 3]);

impl TablesOut {
    pub(super) fn new(arrays: &Arrays, first: i32, pointers: [*mut *mut bmom_table; 3]) -> Result<Self, Failure> {
        let room = |k: usize| -> Result<_, Failure> {
            let argument = first + k as i32;
            Ok((!pointers[k].is_null(), arrays.cell_if(argument, pointers[k], std::ptr::null_mut())?))
        };
        let out = [room(0)?, room(1)?, room(2)?];
        let same = |a: usize, b: usize| !pointers[a].is_null() && pointers[a] == pointers[b];
        if same(0, 1) || same(0, 2) || same(1, 2) {
            return Err(Failure::of(Code::Overlap, first));
        }
        Ok(Self(out))
    }

    pub(super) fn wanted(&self) -> Wanted {
        let [polarity, bonds, atoms] = &self.0;
        Wanted { polarity: polarity.0, bonds: bonds.0, atoms: atoms.0 }
    }

    pub(super) fn set(&self, tables: Tables) {
        for ((wanted, cell), table) in self.0.iter().zip([tables.polarity, tables.bonds, tables.atoms]) {
            if *wanted {
                cell.set(table_handle(table));
            }
        }
    }
}

/// The stop flag of a call without one.
pub(super) static NEVER: AtomicBool = AtomicBool::new(false);

/// A problem with a file has a code; its words stand in the rows, or are those of the code.
pub(super) fn failure_of(problem: &Problem) -> Failure {
    Failure::new(problem.code)
}

/// Measured dipoles are not compared in this version of the library: the argument keeps its place.
pub(super) fn none_measured(measured: *const bmom_table, argument: i32) -> Result<(), Failure> {
    if measured.is_null() { Ok(()) } else { Err(Failure::of(Code::NotAllowed, argument)) }
}
