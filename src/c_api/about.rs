//! Entry points about the library itself.

use std::ffi::{CString, c_char};

use once_cell::race::OnceBox;

use super::arrays::Arrays;
use super::guard::guard;
use super::text::{TextOut, text_in};
use crate::library::table::{number_read, number_text};
use crate::selectors::{self, Selector};
use crate::status::{Code, Failure};
use crate::{catalogue, elements, tables};

/// Version of the ABI of the loaded library; a program built with another BMOM_ABI_VERSION must not go on.
#[unsafe(no_mangle)]
pub extern "C" fn bmom_abi_version() -> i32 {
    const { decimal(env!("BMOM_ABI_VERSION")) }
}

/// Version of the loaded library: static text.
#[unsafe(no_mangle)]
pub extern "C" fn bmom_version() -> *const c_char {
    concat!(env!("CARGO_PKG_VERSION"), "\0").as_ptr().cast()
}

/// Version of the embedded tables: static text.
#[unsafe(no_mangle)]
pub extern "C" fn bmom_data_version() -> *const c_char {
    static TEXT: OnceBox<CString> = OnceBox::new();
    fixed(&TEXT, || catalogue::DATA_VERSION.to_owned())
}

/// The catalogue of all worksheet functions, choices, statuses and columns: static JSON text (UTF-8).
#[unsafe(no_mangle)]
pub extern "C" fn bmom_catalogue() -> *const c_char {
    static TEXT: OnceBox<CString> = OnceBox::new();
    fixed(&TEXT, catalogue::text)
}

/// Name of the code in a status, such as OUT_OF_RANGE: static text, "UNKNOWN" for a number that is no code.
#[unsafe(no_mangle)]
pub extern "C" fn bmom_status_name(status: i32) -> *const c_char {
    static NAMES: OnceBox<Vec<CString>> = OnceBox::new();
    listed(&NAMES, code_index(status), || Code::ALL.iter().map(|code| code.name().to_owned()).collect())
}

/// The code in a status in one plain sentence: static text.
#[unsafe(no_mangle)]
pub extern "C" fn bmom_status_text(status: i32) -> *const c_char {
    static TEXTS: OnceBox<Vec<CString>> = OnceBox::new();
    listed(&TEXTS, code_index(status), || Code::ALL.iter().map(|code| code.text().to_owned()).collect())
}

/// Name of a selector without BMOM_: static text, "UNKNOWN" for a number that selects nothing.
#[unsafe(no_mangle)]
pub extern "C" fn bmom_selector_name(selector: i32) -> *const c_char {
    static NAMES: OnceBox<Vec<CString>> = OnceBox::new();
    let index = selectors::ALL.iter().position(|choice| choice.selector.0 == selector);
    listed(&NAMES, index, || selectors::ALL.iter().map(|choice| choice.name.to_owned()).collect())
}

/// The selector of a name, with or without BMOM_, in any case.
/// Given: 1 name [text]. Returned: 2 selector.
/// Status: UNKNOWN_NAME, NOT_UTF8, NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_selector(name: *const c_char, name_length: i64, selector: *mut i32) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (arrays, name) = unsafe { (Arrays::promised(), text_in(1, name, name_length)) };
        let out = arrays.cell(2, selector, i32::MIN)?;
        out.set(Selector::by_name(name?).map_err(|failure| failure.argument(1))?.0);
        Ok(Code::Ok)
    })
}

/// The words of a status of a function: which argument is at fault, and what is wrong with it.
/// Given: 1 function, its name with or without bmom_ and _column, or an empty text [text]; 2 status. Returned: 3 text
/// (UTF-8). Status: BUFFER_TOO_SMALL, NOT_UTF8, NULL_POINTER, NEGATIVE_COUNT.
/// Notes: the arguments of worksheet functions are named; those of other functions are numbered, as in their comments.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_status_message(
    function: *const c_char,
    function_length: i64,
    status: i32,
    text: *mut c_char,
    capacity: i64,
    needed: *mut i64,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (function, out) =
            unsafe { (text_in(1, function, function_length)?, TextOut::new(3, text, capacity, needed)?) };
        let name = function.strip_prefix("bmom_").unwrap_or(function);
        let name = name.strip_suffix("_column").unwrap_or(name);
        // Functions that are no worksheet functions have no declared arguments: their statuses are worded by number.
        let function = catalogue::function(name).ok();
        out.set(&catalogue::message(function, status))
    })
}

/// What stands behind a table, scale or law: a JSON object with title, author, year, journal, doi, unit, covers,
/// uncertainty, mark and remark.
/// Given: 1 selector. Returned: 2 text (UTF-8).
/// Status: UNKNOWN_SELECTOR, WRONG_SELECTOR (no table), BUFFER_TOO_SMALL, NULL_POINTER, NEGATIVE_COUNT.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_source(selector: i32, text: *mut c_char, capacity: i64, needed: *mut i64) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let out = unsafe { TextOut::new(2, text, capacity, needed)? };
        let selector = Selector(selector);
        selector.choice().map_err(|failure| failure.argument(1))?;
        out.set(&tables::source_json(selector).map_err(|failure| failure.argument(1))?)
    })
}

/// What stands behind one value of a table: how well it is verified, and its citation with any dispute, as a JSON object
/// with table, title, author, year, journal, doi, unit, value, u (in the unit that the publication prints), state, mark and
/// note.
/// Given: 1 table; 2 atomic_number; 3 state (BMOM_STATE_AS_LISTED where the table has none).
/// Returned: 4 mark (BMOM_MARK_...); 5 text (UTF-8).
/// Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, UNKNOWN_ELEMENT, MISSING, NO_DATA, BUFFER_TOO_SMALL, NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_value_source(
    table: i32,
    atomic_number: i32,
    state: i32,
    mark: *mut i32,
    text: *mut c_char,
    capacity: i64,
    needed: *mut i64,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (arrays, out) = unsafe { (Arrays::promised(), TextOut::new(5, text, capacity, needed)?) };
        let mark = arrays.cell(4, mark, i32::MIN)?;
        let found = elements::value_source(Selector(table), atomic_number, Selector(state))?;
        mark.set(found.mark.0);
        out.set(&found.json)
    })
}

/// Tests the guard of the library in the host: what = 1 panics inside and must return BMOM_INTERNAL; 0 returns BMOM_OK.
/// Status: INTERNAL, OUT_OF_RANGE for any other number.
#[unsafe(no_mangle)]
pub extern "C" fn bmom_self_test(what: i32) -> i32 {
    guard(|| match what {
        0 => Ok(Code::Ok),
        1 => panic!("forced by bmom_self_test"),
        _ => Err(Failure::of(Code::OutOfRange, 1)),
    })
}

/// A number as text: the fewest digits that read back to the same number, with an exponent below 1e-5 and from 1e16 on; an
/// empty text for NaN, 0 for minus zero, inf for infinity. Every host that prints with it prints the same digits.
/// Given: 1 value. Returned: 2 text (25 bytes are always enough, NUL included).
/// Status: BUFFER_TOO_SMALL, NULL_POINTER, NEGATIVE_COUNT.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_number_text(value: f64, text: *mut c_char, capacity: i64, needed: *mut i64) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        unsafe { TextOut::new(2, text, capacity, needed)? }.set(&number_text(value))
    })
}

/// The number in a text, with a decimal point in every locale, correctly rounded; Fortran's exponents (1.0D+02) are read.
/// Given: 1 text. Returned: 2 value.
/// Status: MISSING (blank or nan), NOT_FINITE (inf, or beyond all doubles), BAD_FORMAT (no number), NOT_UTF8, NULL_POINTER,
/// NEGATIVE_COUNT.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_number_read(text: *const c_char, text_length: i64, value: *mut f64) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (arrays, text) = unsafe { (Arrays::promised(), text_in(1, text, text_length)) };
        let out = arrays.cell(2, value, super::arrays::NAN)?;
        out.set(super::arrays::clean(number_read(text?).map_err(|failure| failure.argument(1))?));
        Ok(Code::Ok)
    })
}

const fn decimal(text: &str) -> i32 {
    let bytes = text.as_bytes();
    let (mut i, mut number) = (0, 0);
    while i < bytes.len() {
        number = number * 10 + (bytes[i] - b'0') as i32;
        i += 1;
    }
    number
}

fn code_index(status: i32) -> Option<usize> {
    let code = status.rem_euclid(1000);
    Code::ALL.iter().position(|&known| known as i32 == code)
}

/// A text that is made once and stays for the life of the process.
fn fixed(cell: &'static OnceBox<CString>, make: impl FnOnce() -> String) -> *const c_char {
    let mut text = c"".as_ptr();
    // Numbers are read and written on the way, which the host's rounding must not touch.
    guard(|| {
        text = cell.get_or_init(|| Box::new(CString::new(make()).unwrap_or_default())).as_ptr();
        Ok(Code::Ok)
    });
    text
}

fn listed(
    cell: &'static OnceBox<Vec<CString>>,
    index: Option<usize>,
    make: impl FnOnce() -> Vec<String>,
) -> *const c_char {
    let mut text = c"UNKNOWN".as_ptr();
    guard(|| {
        let texts = cell
            .get_or_init(|| Box::new(make().into_iter().map(|text| CString::new(text).unwrap_or_default()).collect()));
        if let Some(known) = index.and_then(|index| texts.get(index)) {
            text = known.as_ptr();
        }
        Ok(Code::Ok)
    });
    text
}
