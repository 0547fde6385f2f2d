//! Entry points of the family elements.

use std::ffi::c_char;

use super::arrays::{Arrays, InIf, NO_QUANTITY, count, run_rows};
use super::guard::guard;
use super::text::{TextOut, text_in};
use crate::declare::Function;
use crate::elements::{self, ATOMIC_WEIGHT, COVALENT_RADIUS, ELECTRONEGATIVITY, POLARIZABILITY, VDW_RADIUS};
use crate::quantity::Quantity;
use crate::selectors::Selector;
use crate::status::{Code, Failure};
use crate::units;

/// Atomic number of a symbol or English name, in any case, blanks around it ignored; D and T are hydrogen.
/// Given: 1 symbol [text]. Returned: 2 atomic_number.
/// Status: MISSING (blank), UNKNOWN_ELEMENT, NOT_UTF8, NULL_POINTER, NEGATIVE_COUNT.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_atomic_number(symbol: *const c_char, symbol_length: i64, atomic_number: *mut i32) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (arrays, symbol) = unsafe { (Arrays::promised(), text_in(1, symbol, symbol_length)) };
        let out = arrays.cell(2, atomic_number, i32::MIN)?;
        out.set(elements::atomic_number(symbol?)?);
        Ok(Code::Ok)
    })
}

/// Column form of bmom_atomic_number: the text of row r is bytes symbol_offsets[r] to symbol_offsets[r + 1] - 1 of
/// symbol_bytes. A text that is not UTF-8 is an UNKNOWN_ELEMENT of its row. Status of the call: BAD_OFFSETS.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_atomic_number_column(
    n: i64,
    symbol_offsets: *const i64,
    symbol_bytes: *const c_char,
    n_symbol_bytes: i64,
    atomic_number: *mut i32,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let (n, bytes) = (count(n)?, count(n_symbol_bytes)?);
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let mut arrays = unsafe { Arrays::promised() };
        let offsets = arrays.input(1, symbol_offsets, if n == 0 { 0 } else { n + 1 })?;
        let text = arrays.input(1, symbol_bytes.cast::<u8>(), bytes)?;
        let out = arrays.output(2, atomic_number, n)?;
        let status = arrays.output_if(0, row_status, n)?;
        arrays.no_overlap()?;
        let offsets = super::molecules::checked_offsets(offsets.slice(), bytes, 1)?;
        let text = text.slice();
        run_rows(
            n,
            status,
            |i| {
                let symbol = std::str::from_utf8(&text[offsets[i] as usize..offsets[i + 1] as usize])
                    .map_err(|_| Failure::of(Code::UnknownElement, 1))?;
                out.set(i, elements::atomic_number(symbol)?);
                Ok(())
            },
            |i| out.set(i, i32::MIN),
        )
    })
}

/// Symbol of an element.
/// Given: 1 atomic_number (1 to 118). Returned: 2 text (at most 2 bytes).
/// Status: MISSING, UNKNOWN_ELEMENT, BUFFER_TOO_SMALL, NULL_POINTER, NEGATIVE_COUNT.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_symbol(atomic_number: i32, text: *mut c_char, capacity: i64, needed: *mut i64) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        unsafe { TextOut::new(2, text, capacity, needed)? }.set(elements::symbol(atomic_number)?)
    })
}

/// Column form of bmom_symbol: the symbols follow one another in text, that of row r from text_offsets[r] on;
/// text_offsets has n + 1 entries. Where the room is too small offsets and needed are right and no text is written.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_symbol_column(
    n: i64,
    atomic_number: *const i32,
    text_offsets: *mut i64,
    text: *mut c_char,
    capacity: i64,
    needed: *mut i64,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let (n, room) = (count(n)?, count(capacity)?);
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let mut arrays = unsafe { Arrays::promised() };
        let atomic_number = arrays.input(1, atomic_number, n)?;
        let offsets = arrays.output(2, text_offsets, n + 1)?;
        let text = arrays.output(2, text.cast::<u8>(), room)?;
        let needed = arrays.output_if(2, needed, 1)?;
        let status = arrays.output_if(0, row_status, n)?;
        arrays.no_overlap()?;
        let atomic_number = atomic_number.slice();
        let mut all = String::new();
        offsets.set(0, 0);
        let code =
            run_rows(n, status, |i| elements::symbol(atomic_number[i]).map(|symbol| all.push_str(symbol)), |_| {})?;
        let mut end = 0;
        for (i, &z) in atomic_number.iter().enumerate() {
            end += elements::symbol(z).map_or(0, str::len) as i64;
            offsets.set(i + 1, end);
        }
        needed.set(0, end);
        if all.len() > room {
            return Err(Failure::of(Code::BufferTooSmall, 2));
        }
        text.set_all(0, all.as_bytes());
        Ok(code)
    })
}

/// A look-up by element: (table, atomic number, state) to a quantity.
type LookUp = fn(Selector, i32, Selector) -> Result<Quantity, Failure>;

unsafe fn one(look_up: LookUp, table: i32, z: i32, state: i32, result: i32, value: *mut f64, u: *mut f64) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let out = unsafe { Arrays::promised() }.quantity_cell(result, value, u)?;
        out.set(look_up(Selector(table), z, Selector(state))?);
        Ok(Code::Ok)
    })
}

/// Arrays of a column look-up; `state` is `None` where the function has no such argument.
struct LookUpColumn {
    n: i64,
    atomic_number: *const i32,
    state: Option<*const i32>,
    value: *mut f64,
    u: *mut f64,
    row_status: *mut i32,
}

unsafe fn column(function: &'static Function, look_up: LookUp, table: i32, from: LookUpColumn) -> i32 {
    guard(|| {
        let n = count(from.n)?;
        let table = function.selector(1, Selector(table))?;
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let mut arrays = unsafe { Arrays::promised() };
        let atomic_number = arrays.input(2, from.atomic_number, n)?;
        let state = match from.state {
            Some(state) => InIf::from(arrays.input(3, state, n)?),
            None => arrays.input_if(3, std::ptr::null(), 0)?,
        };
        let result = function.results.first().map_or(0, |result| result.number);
        let out = arrays.quantities_out(result, from.value, from.u, n)?;
        let status = arrays.output_if(0, from.row_status, n)?;
        arrays.no_overlap()?;
        let (atomic_number, state) = (atomic_number.slice(), state.slice());
        run_rows(
            n,
            status,
            |i| {
                let state = Selector(state.map_or(0, |state| state[i]));
                // A state that selects nothing is a fault of its row, not of the call.
                let answer = look_up(table, atomic_number[i], state).map_err(|failure| match failure.code {
                    Code::UnknownSelector if state.0 == i32::MIN => Failure::of(Code::Missing, failure.argument),
                    Code::UnknownSelector | Code::WrongSelector => Failure::of(Code::OutOfRange, failure.argument),
                    _ => failure,
                })?;
                out.set(i, answer);
                Ok(())
            },
            |i| out.set(i, NO_QUANTITY),
        )
    })
}

/// Covalent radius of an element.
/// Given: 1 table (BMOM_RADII_...); 2 atomic_number; 3 state (BMOM_STATE_AS_LISTED, or SP3 SP2 SP, LOW_SPIN HIGH_SPIN).
/// Returned: 4 radius_A, u_radius_A [A]; u is NaN where none is published.
/// Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, UNKNOWN_ELEMENT, NO_DATA, NULL_POINTER.
/// Reference: Cordero et al., Dalton Trans. 2008, 2832; Pyykko and Atsumi, Chem. Eur. J. 2009, 15, 186 and 12770;
/// Pyykko, Riedel, Patzschke, Chem. Eur. J. 2005, 11, 3511; Schomaker and Stevenson, J. Am. Chem. Soc. 1941, 63, 37.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_covalent_radius(
    table: i32,
    atomic_number: i32,
    state: i32,
    radius_A: *mut f64,
    u_radius_A: *mut f64,
) -> i32 {
    // SAFETY: the caller's promise goes on.
    unsafe { one(elements::covalent_radius, table, atomic_number, state, 4, radius_A, u_radius_A) }
}

/// Column form of bmom_covalent_radius. A state that selects nothing is OUT_OF_RANGE (3052) of its row.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_covalent_radius_column(
    table: i32,
    n: i64,
    atomic_number: *const i32,
    state: *const i32,
    radius_A: *mut f64,
    u_radius_A: *mut f64,
    row_status: *mut i32,
) -> i32 {
    let from = LookUpColumn { n, atomic_number, state: Some(state), value: radius_A, u: u_radius_A, row_status };
    // SAFETY: the caller's promise goes on.
    unsafe { column(&COVALENT_RADIUS, elements::covalent_radius, table, from) }
}

/// Van der Waals radius of an element.
/// Given: 1 table (BMOM_VDW_...); 2 atomic_number. Returned: 3 radius_A, u_radius_A [A]; no table prints u (NaN).
/// Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, UNKNOWN_ELEMENT, NO_DATA, NULL_POINTER.
/// Reference: Bondi, J. Phys. Chem. 1964, 68, 441; Rowland and Taylor, J. Phys. Chem. 1996, 100, 7384; Mantina et al.,
/// J. Phys. Chem. A 2009, 113, 5806; Alvarez, Dalton Trans. 2013, 42, 8617; Vogt and Alvarez, Inorg. Chem. 2014, 53, 9260.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_vdw_radius(
    table: i32,
    atomic_number: i32,
    radius_A: *mut f64,
    u_radius_A: *mut f64,
) -> i32 {
    // SAFETY: the caller's promise goes on.
    unsafe { one(|t, z, _| elements::vdw_radius(t, z), table, atomic_number, 0, 3, radius_A, u_radius_A) }
}

/// Column form of bmom_vdw_radius.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_vdw_radius_column(
    table: i32,
    n: i64,
    atomic_number: *const i32,
    radius_A: *mut f64,
    u_radius_A: *mut f64,
    row_status: *mut i32,
) -> i32 {
    let from = LookUpColumn { n, atomic_number, state: None, value: radius_A, u: u_radius_A, row_status };
    // SAFETY: the caller's promise goes on.
    unsafe { column(&VDW_RADIUS, |t, z, _| elements::vdw_radius(t, z), table, from) }
}

/// Electronegativity of an element, in Pauling units on every scale.
/// Given: 1 scale (BMOM_ELECTRONEGATIVITY_...); 2 atomic_number. Returned: 3 electronegativity, u_electronegativity.
/// Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, UNKNOWN_ELEMENT, NO_DATA, NULL_POINTER.
/// Notes: only Mulliken's scale has u, from ionization energy and electron affinity.
/// Reference: see bmom_source for each scale.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_electronegativity(
    scale: i32,
    atomic_number: i32,
    electronegativity: *mut f64,
    u_electronegativity: *mut f64,
) -> i32 {
    let look_up: LookUp = |t, z, _| elements::electronegativity(t, z);
    // SAFETY: the caller's promise goes on.
    unsafe { one(look_up, scale, atomic_number, 0, 3, electronegativity, u_electronegativity) }
}

/// Column form of bmom_electronegativity.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_electronegativity_column(
    scale: i32,
    n: i64,
    atomic_number: *const i32,
    electronegativity: *mut f64,
    u_electronegativity: *mut f64,
    row_status: *mut i32,
) -> i32 {
    let (value, u) = (electronegativity, u_electronegativity);
    let from = LookUpColumn { n, atomic_number, state: None, value, u, row_status };
    // SAFETY: the caller's promise goes on.
    unsafe { column(&ELECTRONEGATIVITY, |t, z, _| elements::electronegativity(t, z), scale, from) }
}

/// Atomic weight, or mass of the most abundant isotope.
/// Given: 1 table (BMOM_WEIGHTS_STANDARD_2021 for amounts, BMOM_MASSES_ABUNDANT_ISOTOPE_2020 for inertia);
/// 2 atomic_number. Returned: 3 atomic_weight_u, u_atomic_weight_u [u].
/// Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, UNKNOWN_ELEMENT, NO_DATA (no standard weight), NULL_POINTER.
/// Reference: Prohaska et al., Pure Appl. Chem. 2022, 94, 573; Wang et al., Chinese Phys. C 2021, 45, 030003.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_atomic_weight(
    table: i32,
    atomic_number: i32,
    atomic_weight_u: *mut f64,
    u_atomic_weight_u: *mut f64,
) -> i32 {
    let look_up: LookUp = |t, z, _| elements::atomic_weight(t, z);
    // SAFETY: the caller's promise goes on.
    unsafe { one(look_up, table, atomic_number, 0, 3, atomic_weight_u, u_atomic_weight_u) }
}

/// Column form of bmom_atomic_weight.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_atomic_weight_column(
    table: i32,
    n: i64,
    atomic_number: *const i32,
    atomic_weight_u: *mut f64,
    u_atomic_weight_u: *mut f64,
    row_status: *mut i32,
) -> i32 {
    let (value, u) = (atomic_weight_u, u_atomic_weight_u);
    let from = LookUpColumn { n, atomic_number, state: None, value, u, row_status };
    // SAFETY: the caller's promise goes on.
    unsafe { column(&ATOMIC_WEIGHT, |t, z, _| elements::atomic_weight(t, z), table, from) }
}

/// Static dipole polarizability of a free atom.
/// Given: 1 table (BMOM_POLARIZABILITY_...); 2 atomic_number. Returned: 3 polarizability_A3, u_polarizability_A3 [A3].
/// Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, UNKNOWN_ELEMENT, NO_DATA, NULL_POINTER.
/// Reference: Schwerdtfeger and Nagle, Mol. Phys. 2019, 117, 1200, and the authors' 2023 update.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_polarizability(
    table: i32,
    atomic_number: i32,
    polarizability_A3: *mut f64,
    u_polarizability_A3: *mut f64,
) -> i32 {
    let look_up: LookUp = |t, z, _| elements::polarizability(t, z);
    // SAFETY: the caller's promise goes on.
    unsafe { one(look_up, table, atomic_number, 0, 3, polarizability_A3, u_polarizability_A3) }
}

/// Column form of bmom_polarizability.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_polarizability_column(
    table: i32,
    n: i64,
    atomic_number: *const i32,
    polarizability_A3: *mut f64,
    u_polarizability_A3: *mut f64,
    row_status: *mut i32,
) -> i32 {
    let (value, u) = (polarizability_A3, u_polarizability_A3);
    let from = LookUpColumn { n, atomic_number, state: None, value, u, row_status };
    // SAFETY: the caller's promise goes on.
    unsafe { column(&POLARIZABILITY, |t, z, _| elements::polarizability(t, z), table, from) }
}

/// Radius of a Bohr orbit, n^2 a0 / Z; shell 1 and nuclear charge 1 give the Bohr radius a0.
/// Given: 1 shell (from 1); 2 nuclear_charge (from 1). Returned: 3 radius_A, u_radius_A [A].
/// Status: MISSING, OUT_OF_RANGE, NULL_POINTER. Reference: N. Bohr, Phil. Mag. 1913, 26, 1; CODATA 2022.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_bohr_radius(
    shell: i32,
    nuclear_charge: i32,
    radius_A: *mut f64,
    u_radius_A: *mut f64,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let out = unsafe { Arrays::promised() }.quantity_cell(3, radius_A, u_radius_A)?;
        out.set(elements::bohr_radius(shell, nuclear_charge)?);
        Ok(Code::Ok)
    })
}

/// Column form of bmom_bohr_radius.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_bohr_radius_column(
    n: i64,
    shell: *const i32,
    nuclear_charge: *const i32,
    radius_A: *mut f64,
    u_radius_A: *mut f64,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let n = count(n)?;
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let mut arrays = unsafe { Arrays::promised() };
        let shell = arrays.input(1, shell, n)?;
        let charge = arrays.input(2, nuclear_charge, n)?;
        let out = arrays.quantities_out(3, radius_A, u_radius_A, n)?;
        let status = arrays.output_if(0, row_status, n)?;
        arrays.no_overlap()?;
        let (shell, charge) = (shell.slice(), charge.slice());
        run_rows(
            n,
            status,
            |i| elements::bohr_radius(shell[i], charge[i]).map(|radius| out.set(i, radius)),
            |i| out.set(i, NO_QUANTITY),
        )
    })
}

/// A value in another unit of the same kind.
/// Given: 1 from_unit; 2 to_unit (BMOM_UNIT_...); 3 value, u_value [from_unit]. Returned: 4 converted, u_converted.
/// Status: NOT_ALLOWED (2018: the units are of different kinds), UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, NOT_FINITE,
/// NEGATIVE_UNCERTAINTY, OUT_OF_RANGE, NULL_POINTER.
/// Notes: the uncertainty of measured constants in the factor is combined. Reference: CODATA 2022.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_convert(
    from_unit: i32,
    to_unit: i32,
    value: f64,
    u_value: f64,
    converted: *mut f64,
    u_converted: *mut f64,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let out = unsafe { Arrays::promised() }.quantity_cell(4, converted, u_converted)?;
        out.set(units::convert(Selector(from_unit), Selector(to_unit), Quantity::new(value, u_value))?);
        Ok(Code::Ok)
    })
}

/// Column form of bmom_convert.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_convert_column(
    from_unit: i32,
    to_unit: i32,
    n: i64,
    value: *const f64,
    u_value: *const f64,
    converted: *mut f64,
    u_converted: *mut f64,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let n = count(n)?;
        let (from, to) = (Selector(from_unit), Selector(to_unit));
        // A wrong pair is a fault of the call: it must show before any row is touched.
        units::convert(from, to, Quantity::exact(300.0))?;
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let mut arrays = unsafe { Arrays::promised() };
        let value = arrays.quantities(3, value, u_value, n)?;
        let out = arrays.quantities_out(4, converted, u_converted, n)?;
        let status = arrays.output_if(0, row_status, n)?;
        arrays.no_overlap()?;
        let value = value.rows();
        run_rows(
            n,
            status,
            |i| units::convert(from, to, value(i)).map(|converted| out.set(i, converted)),
            |i| out.set(i, NO_QUANTITY),
        )
    })
}
