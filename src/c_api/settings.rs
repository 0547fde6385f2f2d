//! Entry points for the settings of a run and the stop handle.

use std::cell::UnsafeCell;
use std::ffi::c_char;
use std::sync::atomic::{AtomicBool, AtomicI32, Ordering};

use super::arrays::Arrays;
use super::guard::guard;
use super::handles::{Handle, Kind, borrow, free, leak, magic};
use super::text::text_in;
use crate::library::settings::Settings;
use crate::selectors::Selector;
use crate::status::{Code, Failure};

/// Settings of a run. They freeze at first use and may then be shared by threads. By name (exactly as here; ranges and
/// defaults stand in the catalogue under "settings"):
/// choices: charge_model, electronegativity, ionic_law, covalent_radii, vdw_radii;
/// numbers: polar_from, ionic_from (not below polar_from, checked at first use), polarity_limit_D [D],
/// position_uncertainty_A [A];
/// texts: name_item, carry_items.
pub struct bmom_settings {
    _opaque: [u8; 0],
}

/// A request to stop a long call, from any thread or from a signal handler. Once requested it stays so.
pub struct bmom_stop {
    _opaque: [u8; 0],
}

const OPEN: i32 = 0;
const WRITING: i32 = 1;
const FROZEN: i32 = 2;

/// Settings that are written by one thread at a time until they are first read.
struct Shared {
    state: AtomicI32,
    settings: UnsafeCell<Settings>,
}

impl Kind for Shared {
    const MAGIC: u64 = magic(1);
}

struct Stop(AtomicBool);

impl Kind for Stop {
    const MAGIC: u64 = magic(2);
}

/// The settings behind a handle, frozen from now on; the defaults for NULL.
///
/// # Errors
/// `BadHandle`, `Busy`.
///
/// # Safety
/// As `handles::borrow`.
pub(super) unsafe fn settings_of(settings: *const bmom_settings) -> Result<Settings, Failure> {
    if settings.is_null() {
        return Ok(Settings::default());
    }
    // SAFETY: the caller's promise.
    let shared = unsafe { borrow(settings.cast::<Handle<Shared>>())? };
    match shared.state.compare_exchange(OPEN, FROZEN, Ordering::AcqRel, Ordering::Acquire) {
        // SAFETY: frozen settings are never written again.
        Ok(_) | Err(FROZEN) => Ok(unsafe { (*shared.settings.get()).clone() }),
        Err(_) => Err(Failure::new(Code::Busy)),
    }
}

/// The flag behind a stop handle; `None` for NULL.
///
/// # Errors
/// `BadHandle`.
///
/// # Safety
/// As `handles::borrow`.
pub(super) unsafe fn stop_of<'a>(stop: *const bmom_stop) -> Result<Option<&'a AtomicBool>, Failure> {
    if stop.is_null() {
        return Ok(None);
    }
    // SAFETY: the caller's promise.
    Ok(Some(&unsafe { borrow(stop.cast::<Handle<Stop>>())? }.0))
}

/// New settings with the defaults. Free them with bmom_settings_free.
/// Status: NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_settings_new(settings: *mut *mut bmom_settings) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let out = unsafe { Arrays::promised() }.cell(1, settings, std::ptr::null_mut())?;
        let shared = Shared { state: AtomicI32::new(OPEN), settings: UnsafeCell::new(Settings::default()) };
        out.set(leak(shared).cast());
        Ok(Code::Ok)
    })
}

unsafe fn change(
    settings: *mut bmom_settings,
    name: *const c_char,
    name_length: i64,
    change: impl FnOnce(&mut Settings, &str) -> Result<(), Failure>,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let shared = unsafe { borrow(settings.cast::<Handle<Shared>>()) }.map_err(|failure| failure.argument(1))?;
        // SAFETY: as above.
        let name = unsafe { text_in(2, name, name_length)? };
        match shared.state.compare_exchange(OPEN, WRITING, Ordering::AcqRel, Ordering::Acquire) {
            Ok(_) => {}
            Err(FROZEN) => return Err(Failure::of(Code::NotAllowed, 1)),
            Err(_) => return Err(Failure::of(Code::Busy, 1)),
        }
        // SAFETY: the state lets one thread in at a time, and none once it is frozen.
        let result = change(unsafe { &mut *shared.settings.get() }, name);
        shared.state.store(OPEN, Ordering::Release);
        result.map(|()| Code::Ok).map_err(|failure| match failure.code {
            Code::UnknownName | Code::WrongType => failure.argument(2),
            _ => failure.argument(3),
        })
    })
}

/// Sets a number.
/// Given: 1 settings; 2 name [text]; 3 value [unit of the setting].
/// Status: UNKNOWN_NAME, WRONG_TYPE, OUT_OF_RANGE, MISSING, NOT_ALLOWED (already in use), BUSY, BAD_HANDLE, NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_settings_number(
    settings: *mut bmom_settings,
    name: *const c_char,
    name_length: i64,
    value: f64,
) -> i32 {
    // SAFETY: the caller's promise goes on.
    unsafe { change(settings, name, name_length, |settings, name| settings.set_number(name, value)) }
}

/// Makes a choice.
/// Given: 1 settings; 2 name [text]; 3 selector.
/// Status: as bmom_settings_number, and UNKNOWN_SELECTOR, WRONG_SELECTOR.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_settings_choice(
    settings: *mut bmom_settings,
    name: *const c_char,
    name_length: i64,
    selector: i32,
) -> i32 {
    // SAFETY: the caller's promise goes on.
    unsafe { change(settings, name, name_length, |settings, name| settings.set_choice(name, Selector(selector))) }
}

/// Sets a text.
/// Given: 1 settings; 2 name [text]; 3 value [text].
/// Status: as bmom_settings_number, and NOT_UTF8.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_settings_text(
    settings: *mut bmom_settings,
    name: *const c_char,
    name_length: i64,
    value: *const c_char,
    value_length: i64,
) -> i32 {
    // SAFETY: the caller's promise goes on.
    unsafe {
        change(settings, name, name_length, |settings, name| settings.set_text(name, text_in(3, value, value_length)?))
    }
}

/// Frees settings; NULL is allowed. Jobs that use them keep their own copy.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_settings_free(settings: *mut bmom_settings) {
    // SAFETY: the caller's promise goes on.
    unsafe { free(settings.cast::<Handle<Shared>>()) }
}

/// A new stop handle, not yet requested. Free it with bmom_stop_free when no call uses it any more.
/// Status: NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_stop_new(stop: *mut *mut bmom_stop) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let out = unsafe { Arrays::promised() }.cell(1, stop, std::ptr::null_mut())?;
        out.set(leak(Stop(AtomicBool::new(false))).cast());
        Ok(Code::Ok)
    })
}

/// Asks every call that holds this handle to end with STOPPED. One atomic store: fit for a signal handler.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_stop_request(stop: *mut bmom_stop) {
    // SAFETY: the caller's promise goes on.
    if let Ok(Some(flag)) = unsafe { stop_of(stop) } {
        flag.store(true, Ordering::Release);
    }
}

/// Frees a stop handle; NULL is allowed.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_stop_free(stop: *mut bmom_stop) {
    // SAFETY: the caller's promise goes on.
    unsafe { free(stop.cast::<Handle<Stop>>()) }
}
