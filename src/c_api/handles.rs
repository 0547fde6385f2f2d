//! Handles: what must live between calls. The first word of each tells the kind and the ABI, and is cleared when it is
//! freed, so that a foreign or stale pointer is met with a status as far as can be told.

use std::sync::atomic::{AtomicU64, Ordering};

use crate::status::{Code, Failure};

/// A value behind an opaque pointer.
#[repr(C)]
pub(super) struct Handle<T> {
    magic: AtomicU64,
    value: T,
}

/// A kind of handle: its mark, distinct for each.
pub(super) trait Kind {
    const MAGIC: u64;
}

/// "bmom", the ABI version and a number of the kind.
pub(super) const fn magic(kind: u64) -> u64 {
    0x626D_6F6D_0001_0000 | kind
}

/// A new handle for C.
pub(super) fn leak<T: Kind>(value: T) -> *mut Handle<T> {
    Box::into_raw(Box::new(Handle { magic: AtomicU64::new(T::MAGIC), value }))
}

/// The value behind a handle.
///
/// # Errors
/// `NullPointer`; `BadHandle` for what is not, or no longer, such a handle.
///
/// # Safety
/// The pointer is NULL or leads to at least eight readable bytes; a live handle is not freed during the call.
pub(super) unsafe fn borrow<'a, T: Kind>(handle: *const Handle<T>) -> Result<&'a T, Failure> {
    if handle.is_null() {
        return Err(Failure::new(Code::NullPointer));
    }
    if !handle.is_aligned() {
        return Err(Failure::new(Code::BadHandle));
    }
    // SAFETY: not NULL and aligned; readable by the caller's promise. The value is touched only where the mark is right.
    unsafe {
        if (*handle).magic.load(Ordering::Acquire) != T::MAGIC {
            return Err(Failure::new(Code::BadHandle));
        }
        Ok(&(*handle).value)
    }
}

/// Frees a handle; NULL and what is no such handle are left alone.
///
/// # Safety
/// As `borrow`, and no other thread uses the handle.
pub(super) unsafe fn free<T: Kind>(handle: *mut Handle<T>) {
    if handle.is_null() || !handle.is_aligned() {
        return;
    }
    // SAFETY: as in `borrow`; the exchange lets only one call free it.
    unsafe {
        if (*handle).magic.compare_exchange(T::MAGIC, 0, Ordering::AcqRel, Ordering::Acquire).is_ok() {
            drop(Box::from_raw(handle));
        }
    }
}
