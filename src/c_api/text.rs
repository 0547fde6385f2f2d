//! Texts in and out: pointer and length, UTF-8.

use std::ffi::c_char;

use crate::status::{Code, Failure};

/// Bytes of a text from C: `length` bytes, or up to the NUL where `length` is −1.
///
/// # Errors
/// `NullPointer`, `NegativeCount`, `TooLarge` of the argument.
///
/// # Safety
/// `pointer` leads to `length` bytes, or to a NUL-terminated text, that nobody writes during the call.
pub(super) unsafe fn bytes_in<'a>(argument: i32, pointer: *const c_char, length: i64) -> Result<&'a [u8], Failure> {
    if pointer.is_null() {
        // An empty text needs no address.
        return if length == 0 { Ok(&[]) } else { Err(Failure::of(Code::NullPointer, argument)) };
    }
    let length = match length {
        // SAFETY: the caller promises a NUL-terminated text.
        -1 => unsafe { libc::strlen(pointer) },
        length if length < 0 => return Err(Failure::of(Code::NegativeCount, argument)),
        length => usize::try_from(length)
            .ok()
            .filter(|&length| length <= isize::MAX as usize)
            .ok_or(Failure::of(Code::TooLarge, argument))?,
    };
    // SAFETY: not NULL, of a size that fits; the rest is the caller's promise.
    Ok(unsafe { std::slice::from_raw_parts(pointer.cast::<u8>(), length) })
}

/// A text from C.
///
/// # Errors
/// As `bytes_in`, and `NotUtf8`.
///
/// # Safety
/// As `bytes_in`.
pub(super) unsafe fn text_in<'a>(argument: i32, pointer: *const c_char, length: i64) -> Result<&'a str, Failure> {
    // SAFETY: the same promise.
    let bytes = unsafe { bytes_in(argument, pointer, length)? };
    std::str::from_utf8(bytes).map_err(|_| Failure::of(Code::NotUtf8, argument))
}

/// A path from C: raw bytes on Unix, UTF-8 elsewhere.
///
/// # Errors
/// As `text_in`.
///
/// # Safety
/// As `bytes_in`.
pub(super) unsafe fn path_in(
    argument: i32,
    pointer: *const c_char,
    length: i64,
) -> Result<std::path::PathBuf, Failure> {
    // SAFETY: the same promise.
    let bytes = unsafe { bytes_in(argument, pointer, length)? };
    #[cfg(unix)]
    {
        use std::os::unix::ffi::OsStrExt;
        Ok(std::path::PathBuf::from(std::ffi::OsStr::from_bytes(bytes)))
    }
    #[cfg(not(unix))]
    {
        let text = std::str::from_utf8(bytes).map_err(|_| Failure::of(Code::NotUtf8, argument))?;
        Ok(std::path::PathBuf::from(text))
    }
}

/// Room for a text: at most `capacity` bytes, cut at a character, a NUL where it fits; `needed` counts no NUL.
pub(super) struct TextOut {
    text: *mut c_char,
    capacity: usize,
    needed: *mut i64,
    argument: i32,
}

impl TextOut {
    /// Checks the room and empties it.
    ///
    /// # Errors
    /// `NegativeCount`, `NullPointer`, `Misaligned` of the argument.
    ///
    /// # Safety
    /// `text` has room for `capacity` bytes; `needed` is NULL or leads to one integer.
    pub(super) unsafe fn new(
        argument: i32,
        text: *mut c_char,
        capacity: i64,
        needed: *mut i64,
    ) -> Result<Self, Failure> {
        let fail = |code| Err(Failure::of(code, argument));
        if capacity < 0 {
            return fail(Code::NegativeCount);
        }
        if text.is_null() && capacity > 0 {
            return fail(Code::NullPointer);
        }
        if !needed.is_null() && !needed.is_aligned() {
            return fail(Code::Misaligned);
        }
        let Ok(capacity) = usize::try_from(capacity) else { return fail(Code::TooLarge) };
        let out = Self { text, capacity, needed, argument };
        out.copy("");
        Ok(out)
    }

    fn copy(&self, text: &str) -> usize {
        let mut end = text.len().min(self.capacity);
        while !text.is_char_boundary(end) {
            end -= 1;
        }
        // SAFETY: `capacity` bytes of room are the caller's promise, and `end` is at most that; where the text is
        // shorter one byte is left for the NUL. `needed` was checked by `new`.
        unsafe {
            if self.capacity > 0 {
                std::ptr::copy_nonoverlapping(text.as_ptr().cast::<c_char>(), self.text, end);
            }
            if end < self.capacity {
                self.text.add(end).write(0);
            }
            if !self.needed.is_null() {
                self.needed.write(i64::try_from(text.len()).unwrap_or(i64::MAX));
            }
        }
        end
    }

    /// Writes the text, cut where the room ends.
    ///
    /// # Errors
    /// `BufferTooSmall` where it was cut.
    pub(super) fn set(&self, text: &str) -> Result<Code, Failure> {
        if self.copy(text) < text.len() {
            return Err(Failure::of(Code::BufferTooSmall, self.argument));
        }
        Ok(Code::Ok)
    }
}
