//! The one place where pointers become arrays: NULL, alignment, size and overlap are checked before anything is read.
//!
//! What cannot be checked is the caller's promise, stated in the header: a pointer that is not NULL leads to as many
//! elements as the call says.

use crate::quantity::Quantity;
use crate::status::{Code, Failure};

/// The arrays of one call, so that outputs can be held against all others.
pub(super) struct Arrays {
    ranges: Vec<Range>,
}

struct Range {
    start: usize,
    end: usize,
    output: bool,
    argument: i32,
}

/// A checked input array.
#[derive(Clone, Copy)]
pub(super) struct In<T> {
    pointer: *const T,
    len: usize,
}

/// A checked input array that may be left out: its pointer is then NULL. No `Option<In>`: its unset half would be read
/// before its mark by optimised code, which memory checkers rightly ask about.
#[derive(Clone, Copy)]
pub(super) struct InIf<T>(In<T>);

/// A checked output array.
#[derive(Clone, Copy)]
pub(super) struct Out<T> {
    pointer: *mut T,
    len: usize,
}

/// A count from C.
///
/// # Errors
/// `NegativeCount`, `TooLarge`.
pub(super) fn count(n: i64) -> Result<usize, Failure> {
    if n < 0 {
        return Err(Failure::new(Code::NegativeCount));
    }
    // 2^56 elements of any kind lie beyond every address space.
    if n > 1 << 56 {
        return Err(Failure::new(Code::TooLarge));
    }
    usize::try_from(n).map_err(|_| Failure::new(Code::TooLarge))
}

impl Arrays {
    /// The arrays and single results of one call.
    ///
    /// # Safety
    /// Every pointer handed to this value is NULL or leads to as many elements as is said with it, valid for the time of
    /// the call, and nobody else writes them meanwhile: the promise of every caller, stated in the header.
    pub(super) unsafe fn promised() -> Self {
        Self { ranges: Vec::new() }
    }

    fn enter<T>(&mut self, argument: i32, pointer: *const T, len: usize, output: bool) -> Result<(), Failure> {
        let fail = |code| Err(Failure::of(code, argument));
        if len == 0 {
            return Ok(());
        }
        if pointer.is_null() {
            return fail(Code::NullPointer);
        }
        if !pointer.is_aligned() {
            return fail(Code::Misaligned);
        }
        let bytes = len.checked_mul(size_of::<T>()).filter(|&bytes| bytes <= isize::MAX as usize);
        let end = bytes.and_then(|bytes| pointer.addr().checked_add(bytes));
        let Some(end) = end else { return fail(Code::TooLarge) };
        self.ranges.push(Range { start: pointer.addr(), end, output, argument });
        Ok(())
    }

    /// An array that must be there.
    ///
    /// # Errors
    /// `NullPointer`, `Misaligned`, `TooLarge` of the argument.
    pub(super) fn input<T: Copy>(&mut self, argument: i32, pointer: *const T, len: usize) -> Result<In<T>, Failure> {
        self.enter(argument, pointer, len, false)?;
        Ok(In { pointer, len })
    }

    /// An array that may be left out.
    ///
    /// # Errors
    /// `Misaligned`, `TooLarge` of the argument.
    pub(super) fn input_if<T: Copy>(
        &mut self,
        argument: i32,
        pointer: *const T,
        len: usize,
    ) -> Result<InIf<T>, Failure> {
        if pointer.is_null() { Ok(InIf(In { pointer, len: 0 })) } else { self.input(argument, pointer, len).map(InIf) }
    }

    /// An output array that must be there.
    ///
    /// # Errors
    /// `NullPointer`, `Misaligned`, `TooLarge` of the argument.
    pub(super) fn output<T: Copy>(&mut self, argument: i32, pointer: *mut T, len: usize) -> Result<Out<T>, Failure> {
        self.enter(argument, pointer.cast_const(), len, true)?;
        Ok(Out { pointer, len })
    }

    /// An output array that the caller may not want; writing to it then does nothing.
    ///
    /// # Errors
    /// `Misaligned`, `TooLarge` of the argument.
    pub(super) fn output_if<T: Copy>(&mut self, argument: i32, pointer: *mut T, len: usize) -> Result<Out<T>, Failure> {
        if pointer.is_null() { Ok(Out { pointer, len: 0 }) } else { self.output(argument, pointer, len) }
    }

    /// Values with their uncertainties, a row each.
    ///
    /// # Errors
    /// As `input`.
    pub(super) fn quantities(
        &mut self,
        argument: i32,
        value: *const f64,
        u: *const f64,
        len: usize,
    ) -> Result<Quantities, Failure> {
        Ok(Quantities { value: self.input(argument, value, len)?, u: self.input_if(argument, u, len)? })
    }

    /// Room for values and, where wanted, their uncertainties.
    ///
    /// # Errors
    /// As `output`.
    pub(super) fn quantities_out(
        &mut self,
        argument: i32,
        value: *mut f64,
        u: *mut f64,
        len: usize,
    ) -> Result<QuantitiesOut, Failure> {
        Ok(QuantitiesOut { value: self.output(argument, value, len)?, u: self.output_if(argument, u, len)? })
    }

    /// No output may share memory with another array.
    ///
    /// # Errors
    /// `Overlap` with the argument of the output.
    pub(super) fn no_overlap(&self) -> Result<(), Failure> {
        for (i, one) in self.ranges.iter().enumerate() {
            for other in &self.ranges[i + 1..] {
                if (one.output || other.output) && one.start < other.end && other.start < one.end {
                    let argument = if other.output { other.argument } else { one.argument };
                    return Err(Failure::of(Code::Overlap, argument));
                }
            }
        }
        Ok(())
    }
}

impl<T: Copy> In<T> {
    /// The array as a slice. Called after `no_overlap` only.
    pub(super) fn slice<'a>(self) -> &'a [T] {
        if self.len == 0 {
            return &[];
        }
        // SAFETY: not NULL, aligned and of a size that fits (`Arrays::enter`); that it leads to `len` elements which
        // nobody writes during the call is the caller's promise, and no output of this call overlaps it.
        unsafe { std::slice::from_raw_parts(self.pointer, self.len) }
    }
}

impl<T: Copy> InIf<T> {
    /// The array as a slice, if it is there. Called after `no_overlap` only.
    pub(super) fn slice<'a>(self) -> Option<&'a [T]> {
        if self.0.pointer.is_null() { None } else { Some(self.0.slice()) }
    }
}

impl<T> From<In<T>> for InIf<T> {
    fn from(there: In<T>) -> Self {
        Self(there)
    }
}

impl<T: Copy> Out<T> {
    /// Writes one element; out of range does nothing.
    pub(super) fn set(self, i: usize, value: T) {
        if i < self.len {
            // SAFETY: not NULL, aligned, inside (`Arrays::enter` and the line above).
            unsafe { self.pointer.add(i).write(value) }
        }
    }

    /// Writes elements from `start` on.
    pub(super) fn set_all(self, start: usize, values: &[T]) {
        for (k, &value) in values.iter().enumerate() {
            self.set(start + k, value);
        }
    }
}

/// Input column of values with uncertainties (NaN where the column of uncertainties is left out).
#[derive(Clone, Copy)]
pub(super) struct Quantities {
    value: In<f64>,
    u: InIf<f64>,
}

impl Quantities {
    /// The rows, in order.
    pub(super) fn rows(self) -> impl Fn(usize) -> Quantity {
        let value = self.value.slice();
        let u = self.u.slice();
        move |i| Quantity::new(value[i], u.map_or(f64::NAN, |u| u[i]))
    }

    /// The two slices.
    pub(super) fn slices<'a>(self) -> (&'a [f64], Option<&'a [f64]>) {
        (self.value.slice(), self.u.slice())
    }
}

/// Output column of values with uncertainties.
#[derive(Clone, Copy)]
pub(super) struct QuantitiesOut {
    value: Out<f64>,
    u: Out<f64>,
}

impl QuantitiesOut {
    /// Writes a row.
    pub(super) fn set(self, i: usize, quantity: Quantity) {
        self.value.set(i, clean(quantity.value));
        self.u.set(i, clean(quantity.u));
    }
}

/// The one NaN that leaves the library, and no negative zero.
pub(super) fn clean(value: f64) -> f64 {
    if value.is_nan() { NAN } else { value + 0.0 }
}

/// The NaN of a cell without a value: 0x7FF8000000000000.
pub(super) const NAN: f64 = f64::from_bits(0x7FF8_0000_0000_0000);

/// Quantity of a cell without a value.
pub(super) const NO_QUANTITY: Quantity = Quantity { value: NAN, u: NAN };

/// A single result of a scalar form; NULL where it is not wanted.
#[derive(Clone, Copy)]
pub(super) struct Cell<T>(*mut T);

impl<T: Copy> Cell<T> {
    /// Writes the result, if it is wanted.
    pub(super) fn set(self, value: T) {
        if !self.0.is_null() {
            // SAFETY: not NULL and aligned (`Arrays::cell`); that it leads to room for one value is the caller's promise.
            unsafe { self.0.write(value) }
        }
    }
}

/// A value with its uncertainty as two single results.
#[derive(Clone, Copy)]
pub(super) struct QuantityCell {
    value: Cell<f64>,
    u: Cell<f64>,
}

impl QuantityCell {
    /// Writes value and uncertainty.
    pub(super) fn set(self, quantity: Quantity) {
        self.value.set(clean(quantity.value));
        self.u.set(clean(quantity.u));
    }
}

impl Arrays {
    /// A single result that must have room, blanked at once so that no stale value stays behind a failure.
    ///
    /// # Errors
    /// `NullPointer`, `Misaligned` of the argument.
    pub(super) fn cell<T: Copy>(&self, argument: i32, pointer: *mut T, blank: T) -> Result<Cell<T>, Failure> {
        if pointer.is_null() {
            return Err(Failure::of(Code::NullPointer, argument));
        }
        self.cell_if(argument, pointer, blank)
    }

    /// A single result that may be left out, blanked at once.
    ///
    /// # Errors
    /// `Misaligned` of the argument.
    pub(super) fn cell_if<T: Copy>(&self, argument: i32, pointer: *mut T, blank: T) -> Result<Cell<T>, Failure> {
        if !pointer.is_null() && !pointer.is_aligned() {
            return Err(Failure::of(Code::Misaligned, argument));
        }
        let cell = Cell(pointer);
        cell.set(blank);
        Ok(cell)
    }

    /// A value with its uncertainty, which may be left out; both blanked at once.
    ///
    /// # Errors
    /// `NullPointer`, `Misaligned` of the argument.
    pub(super) fn quantity_cell(&self, argument: i32, value: *mut f64, u: *mut f64) -> Result<QuantityCell, Failure> {
        Ok(QuantityCell { value: self.cell(argument, value, NAN)?, u: self.cell_if(argument, u, NAN)? })
    }
}

/// Runs the rows of a column: a row that fails gets its status and `blank`, and the others go on. A failure of the call
/// itself (codes 10 to 49) ends it.
///
/// # Errors
/// The failure of the call.
pub(super) fn run_rows(
    n: usize,
    row_status: Out<i32>,
    mut row: impl FnMut(usize) -> Result<(), Failure>,
    mut blank: impl FnMut(usize),
) -> Result<Code, Failure> {
    let mut failed = 0;
    for i in 0..n {
        let status = match row(i) {
            Ok(()) => 0,
            Err(failure) if (10..50).contains(&(failure.code as i32)) => return Err(failure),
            Err(failure) => {
                blank(i);
                failed += 1;
                failure.status()
            }
        };
        row_status.set(i, status);
    }
    Ok(rows_code(n, failed))
}

/// What a column ends with.
pub(super) fn rows_code(n: usize, failed: usize) -> Code {
    match failed {
        0 => Code::Ok,
        failed if failed == n => Code::NoRows,
        _ => Code::SomeRows,
    }
}
