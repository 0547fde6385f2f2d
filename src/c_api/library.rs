//! Entry points for libraries of compounds in memory.

use std::ffi::c_char;

use super::arrays::{Arrays, In};
use super::guard::{guard, pool};
use super::handles::{Handle, Kind, borrow, free, leak, magic};
use super::molecules::{BondArrays, Bonds, ChargeColumn, MoleculeArrays, Molecules, checked_offsets};
use super::settings::{bmom_settings, bmom_stop, settings_of, stop_of};
use super::table::{NEVER, TablesOut, bmom_table, failure_of, none_measured};
use super::text::{bytes_in, path_in};
use crate::library::{Given, MoleculeLibrary};
use crate::parallel::Threads;
use crate::selectors::{CHARGES_GIVEN, CHARGES_PEOE_1980, Selector};
use crate::status::{Code, Failure};

/// Structures in memory with their bonds. It never changes once it is made and may be shared by threads.
pub struct bmom_library {
    _opaque: [u8; 0],
}

impl Kind for MoleculeLibrary {
    const MAGIC: u64 = magic(3);
}

/// Reads a file of structures, or all files of a folder, into memory, and tells their bonds.
/// Given: 1 format (BMOM_FORMAT_...); settings (NULL: defaults); threads (1: the caller's, 0: all); stop (NULL: none);
/// 2 path [text; raw bytes on Unix]. Returned: 3 library, NULL after any failure; free it with bmom_library_free.
/// Status: FILE_MISSING, FILE_UNREADABLE, BAD_FORMAT, UNKNOWN_SELECTOR, WRONG_SELECTOR, STOPPED, BAD_HANDLE, BUSY,
/// NULL_POINTER. Notes: a broken record keeps its place; its row says what is wrong. Of a folder, a file that cannot be read
/// as structures is one broken record if its name ends in .xyz, .sdf, .sd, .mol or .cml (also .gz), and is left out otherwise.
/// Reference: CTfile Formats, the published specification (molfiles and SD files, V2000 and V3000); Chemical Markup Language,
/// Murray-Rust, Rzepa 1999; gzip (any of them, told by the content), RFC 1952; XYZ is common practice.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_library_read(
    format: i32,
    settings: *const bmom_settings,
    threads: i32,
    stop: *const bmom_stop,
    path: *const c_char,
    path_length: i64,
    library: *mut *mut bmom_library,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let arrays = unsafe { Arrays::promised() };
        let out = arrays.cell(3, library, std::ptr::null_mut())?;
        let format = Selector(format).of_group("format").map_err(|failure| failure.argument(1))?;
        let pool = pool(threads)?;
        // SAFETY: as above.
        let (_, stop, path) = unsafe { (settings_of(settings)?, stop_of(stop)?, path_in(2, path, path_length)?) };
        let read = MoleculeLibrary::read(&path, format, pool, stop.unwrap_or(&NEVER));
        out.set(leak(read.map_err(|problem| failure_of(&problem).argument(2))?).cast());
        Ok(Code::Ok)
    })
}

/// Reads structures from a text in memory, as bmom_library_read does from a file; the rows call it "text".
/// Given: 1 format; settings; threads; stop; 2 content [bytes]. Returned: 3 library.
/// Status: as bmom_library_read, without those of files.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_library_parse(
    format: i32,
    settings: *const bmom_settings,
    threads: i32,
    stop: *const bmom_stop,
    content: *const c_char,
    content_length: i64,
    library: *mut *mut bmom_library,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let arrays = unsafe { Arrays::promised() };
        let out = arrays.cell(3, library, std::ptr::null_mut())?;
        let format = Selector(format).of_group("format").map_err(|failure| failure.argument(1))?;
        let pool = pool(threads)?;
        // SAFETY: as above.
        let (_, stop, content) =
            unsafe { (settings_of(settings)?, stop_of(stop)?, bytes_in(2, content, content_length)?) };
        let read = MoleculeLibrary::parse(content, "text", format, pool, stop.unwrap_or(&NEVER));
        out.set(leak(read.map_err(|problem| failure_of(&problem).argument(2))?).cast());
        Ok(Code::Ok)
    })
}

/// Takes structures as the caller holds them.
/// Given: 1 molecules: n, atom_offsets (n + 1), n_atoms, atomic_number, formal_charge [e] (NULL: derived), xyz_A [A]
/// (3 an atom); 2 bonds: bond_offsets (n + 1; NULL: found), n_bonds, bond_atoms (2 a bond), bond_order; 3 charge_e,
/// u_charge_e [e] (an atom each; NULL: none; used where the setting charge_model is CHARGES_GIVEN); 4 names: name_offsets
/// (n + 1; NULL: none), name_bytes (UTF-8), n_name_bytes. Returned: 5 library, NULL after any failure.
/// Status: NULL_POINTER, NEGATIVE_COUNT, TOO_LARGE, MISALIGNED, BAD_OFFSETS, NOT_UTF8. What is wrong with one molecule is
/// told in its row of the tables.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_library_from_arrays(
    n: i64,
    atom_offsets: *const i64,
    n_atoms: i64,
    atomic_number: *const i32,
    formal_charge: *const i32,
    xyz_A: *const f64,
    bond_offsets: *const i64,
    n_bonds: i64,
    bond_atoms: *const i32,
    bond_order: *const f64,
    charge_e: *const f64,
    u_charge_e: *const f64,
    name_offsets: *const i64,
    name_bytes: *const c_char,
    n_name_bytes: i64,
    library: *mut *mut bmom_library,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let mut arrays = unsafe { Arrays::promised() };
        let out = arrays.cell(5, library, std::ptr::null_mut())?;
        let from = MoleculeArrays { n, atom_offsets, n_atoms, atomic_number, formal_charge, xyz_A };
        let molecules = Molecules::new(&mut arrays, 1, &from)?;
        let rows = molecules.rows;
        let bonds = Bonds::new(&mut arrays, 2, rows, &BondArrays { bond_offsets, n_bonds, bond_atoms, bond_order })?;
        let model = if charge_e.is_null() { CHARGES_PEOE_1980 } else { CHARGES_GIVEN };
        let charges = ChargeColumn::new(&mut arrays, 3, model, charge_e, u_charge_e, molecules.atoms)?;
        let names = if name_offsets.is_null() || rows == 0 {
            None
        } else {
            let bytes = super::arrays::count(n_name_bytes).map_err(|failure| failure.argument(4))?;
            Some((arrays.input(4, name_offsets, rows + 1)?, arrays.input(4, name_bytes.cast::<u8>(), bytes)?, bytes))
        };
        let (view, bonds, charges) = (molecules.view()?, bonds.view()?, charges.view());
        let names = match names {
            Some((offsets, bytes, n)) => Some((checked_offsets(offsets.slice(), n, 4)?, In::slice(bytes))),
            None => None,
        };
        let stated = (0..rows).map(|row| bonds.stated(row)).collect::<Vec<_>>();
        let mut given = Vec::new();
        for row in 0..rows {
            let raw = view.raw(row);
            let range = view.range(row);
            let name = match names {
                Some((offsets, bytes)) => std::str::from_utf8(&bytes[offsets[row] as usize..offsets[row + 1] as usize])
                    .map_err(|_| Failure::of(Code::NotUtf8, 4))?,
                None => "",
            };
            given.push(Given {
                name,
                atomic_number: raw.atomic_number,
                formal_charge: raw.formal_charge,
                xyz: raw.xyz,
                bonds: stated[row].as_deref(),
                charge_e: charges.map(|(charge, _)| &charge[range.clone()]),
                u_charge_e: charges.and_then(|(_, u)| u).map(|u| &u[range]),
            });
        }
        let made = MoleculeLibrary::from_given("arrays", &given, Threads::new(1), &NEVER);
        out.set(leak(made.map_err(|problem| failure_of(&problem))?).cast());
        Ok(Code::Ok)
    })
}

/// Number of records, atoms and bonds. A broken record has no atoms; one whose bonds cannot be told has no bonds.
/// Given: 1 library. Returned: 2 molecules; 3 atoms; 4 bonds. Status: BAD_HANDLE, NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_library_size(
    library: *const bmom_library,
    molecules: *mut i64,
    atoms: *mut i64,
    bonds: *mut i64,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let arrays = unsafe { Arrays::promised() };
        let out =
            [arrays.cell(2, molecules, i64::MIN)?, arrays.cell(3, atoms, i64::MIN)?, arrays.cell(4, bonds, i64::MIN)?];
        // SAFETY: as above.
        let library = unsafe { library_of(library)? };
        let (molecules, atoms, bonds) = library.size();
        for (cell, size) in out.into_iter().zip([molecules, atoms, bonds]) {
            cell.set(i64::try_from(size).unwrap_or(i64::MAX));
        }
        Ok(Code::Ok)
    })
}

/// Copies the structures out in the layout of a column of molecules; sizes by bmom_library_size; each array may be NULL.
/// Given: 1 library. Returned: 2 atom_offsets (molecules + 1); 3 atomic_number; 4 formal_charge [e] (stated or derived);
/// 5 xyz_A [A] (3 an atom); 6 bond_offsets (molecules + 1); 7 bond_atoms (2 a bond); 8 bond_order; row_status (a record
/// that is broken or whose bonds cannot be told).
/// Status: SOME_ROWS, NO_ROWS, MISALIGNED, OVERLAP, BAD_HANDLE, NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_library_arrays(
    library: *const bmom_library,
    atom_offsets: *mut i64,
    atomic_number: *mut i32,
    formal_charge: *mut i32,
    xyz_A: *mut f64,
    bond_offsets: *mut i64,
    bond_atoms: *mut i32,
    bond_order: *mut f64,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (mut arrays, library) = unsafe { (Arrays::promised(), library_of(library)?) };
        let (rows, atoms, bonds) = library.size();
        let offsets_out = arrays.output_if(2, atom_offsets, rows + 1)?;
        let number_out = arrays.output_if(3, atomic_number, atoms)?;
        let charge_out = arrays.output_if(4, formal_charge, atoms)?;
        let xyz_out = arrays.output_if(5, xyz_A, 3 * atoms)?;
        let bond_offsets_out = arrays.output_if(6, bond_offsets, rows + 1)?;
        let bond_atoms_out = arrays.output_if(7, bond_atoms, 2 * bonds)?;
        let order_out = arrays.output_if(8, bond_order, bonds)?;
        let status_out = arrays.output_if(0, row_status, rows)?;
        arrays.no_overlap()?;
        let (mut atom, mut bond, mut failed) = (0, 0, 0);
        offsets_out.set(0, 0);
        bond_offsets_out.set(0, 0);
        for (row, (entry, bonding)) in library.entries().iter().zip(library.bonding()).enumerate() {
            if let crate::library::Entry::Molecule(record) = entry {
                for (k, &z) in record.atomic_number.iter().enumerate() {
                    let charge = match bonding {
                        Ok(bonding) => bonding.formal_charge.get(k).copied(),
                        Err(_) => record.formal_charge.as_ref().and_then(|charge| charge.get(k).copied()),
                    };
                    number_out.set(atom + k, z);
                    charge_out.set(atom + k, charge.unwrap_or(i32::MIN));
                    super::molecules::set_numbers(xyz_out, 3 * (atom + k), &record.xyz[k]);
                }
                atom += record.atomic_number.len();
            }
            let status = match bonding {
                Ok(bonding) => {
                    for one in &bonding.bonds {
                        bond_atoms_out.set_all(2 * bond, &[one.a as i32, one.b as i32]);
                        super::molecules::set_numbers(order_out, bond, &[one.order]);
                        bond += 1;
                    }
                    0
                }
                Err(failure) => {
                    failed += 1;
                    failure.status()
                }
            };
            offsets_out.set(row + 1, atom as i64);
            bond_offsets_out.set(row + 1, bond as i64);
            status_out.set(row, status);
        }
        Ok(super::arrays::rows_code(rows, failed))
    })
}

/// The three tables of some records of a library. Columns, by name (types, units and meanings stand in the catalogue under
/// "tables"):
/// polarity: record, compound, formula, atoms, net_charge, fragments, charge_sites, structure_kind, dipole_D, u_dipole_D,
/// dipole_x_D, dipole_y_D, dipole_z_D, cov_xx_D2, cov_yy_D2, cov_zz_D2, cov_xy_D2, cov_xz_D2, cov_yz_D2, polarity,
/// strongest_bond, delta_chi, negative_end, strongest_bond_charge_e, charge_model, data_version, status, detail, then data_...;
/// bonds: record, compound, atom_a, atom_b, element_a, element_b, order, length_A, expected_A, u_expected_A, deviation_A,
/// delta_chi, negative_end, ionic_percent, bond_charge_e, class;
/// atoms: record, compound, atom, element, x_A, y_A, z_A, charge_e, u_charge_e, covalent_radius_A, vdw_radius_A.
/// Given: 1 library; 2 measured (NULL: no measured dipoles are compared in this version); settings (NULL: defaults);
/// threads; stop (NULL: none); 3 first (from 0); 4 n. Returned: 5 polarity; 6 bonds; 7 atoms: NULL where that table is not
/// wanted; NULL is written after any failure. Free each with bmom_table_free.
/// Status: NOT_ALLOWED (measured is not NULL), OUT_OF_RANGE, STOPPED, BAD_HANDLE, BUSY, NULL_POINTER.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_polarity_table(
    library: *const bmom_library,
    measured: *const bmom_table,
    settings: *const bmom_settings,
    threads: i32,
    stop: *const bmom_stop,
    first: i64,
    n: i64,
    polarity: *mut *mut bmom_table,
    bonds: *mut *mut bmom_table,
    atoms: *mut *mut bmom_table,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let out = TablesOut::new(&unsafe { Arrays::promised() }, 5, [polarity, bonds, atoms])?;
        none_measured(measured, 2)?;
        let pool = pool(threads)?;
        let (first, n) = (
            super::arrays::count(first).map_err(|failure| failure.argument(3))?,
            super::arrays::count(n).map_err(|failure| failure.argument(4))?,
        );
        // SAFETY: as above.
        let (library, settings, stop) = unsafe { (library_of(library)?, settings_of(settings)?, stop_of(stop)?) };
        let rows = library.size().0;
        if first > rows || n > rows - first {
            return Err(Failure::of(Code::OutOfRange, if first > rows { 3 } else { 4 }));
        }
        let tables = library.polarity_table(first, n, &settings, out.wanted(), pool, stop.unwrap_or(&NEVER));
        out.set(tables.map_err(|problem| failure_of(&problem))?);
        Ok(Code::Ok)
    })
}

/// Frees a library; NULL is allowed.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_library_free(library: *mut bmom_library) {
    // SAFETY: the caller's promise goes on.
    unsafe { free(library.cast::<Handle<MoleculeLibrary>>()) }
}

/// # Safety
/// As `handles::borrow`.
unsafe fn library_of<'a>(library: *const bmom_library) -> Result<&'a MoleculeLibrary, Failure> {
    // SAFETY: the caller's promise.
    unsafe { borrow(library.cast::<Handle<MoleculeLibrary>>()) }.map_err(|failure| failure.argument(1))
}
