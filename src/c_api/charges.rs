//! Entry points of the family charges.

use super::arrays::{Arrays, NO_QUANTITY, count, rows_code, run_rows};
use super::guard::{guard, pool};
use super::molecules::{BondArrays, Bonds, Ends, MoleculeArrays, Molecules, of_model, one_row, remarks_of};
use super::settings::{bmom_settings, settings_of};
use crate::charges::{self, PARTIAL_CHARGES};
use crate::parallel::map_rows;
use crate::quantity::Quantity;
use crate::selectors::{BONDS_ALTERNATING, CHARGES_GIVEN, Selector};
use crate::status::{Code, Failure};

/// Two quantities in, one out: the shape of the three functions of q = mu/(e d).
type Diatomic = fn(Quantity, Quantity) -> Result<Quantity, Failure>;

unsafe fn one(f: Diatomic, first: Quantity, second: Quantity, value: *mut f64, u: *mut f64) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let out = unsafe { Arrays::promised() }.quantity_cell(3, value, u)?;
        out.set(f(first, second)?);
        Ok(Code::Ok)
    })
}

unsafe fn column(
    f: Diatomic,
    n: i64,
    first: (*const f64, *const f64),
    second: (*const f64, *const f64),
    out: (*mut f64, *mut f64),
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let n = count(n)?;
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let mut arrays = unsafe { Arrays::promised() };
        let first = arrays.quantities(1, first.0, first.1, n)?;
        let second = arrays.quantities(2, second.0, second.1, n)?;
        let out = arrays.quantities_out(3, out.0, out.1, n)?;
        let status = arrays.output_if(0, row_status, n)?;
        arrays.no_overlap()?;
        let (first, second) = (first.rows(), second.rows());
        run_rows(
            n,
            status,
            |i| {
                out.set(i, f(first(i), second(i))?);
                Ok(())
            },
            |i| out.set(i, NO_QUANTITY),
        )
    })
}

/// Charge from a bond dipole: q = mu / (e d).
/// Given: 1 dipole_D, u_dipole_D [D]; 2 length_A, u_length_A [A], above 0. Returned: 3 charge_e, u_charge_e [e].
/// Status: MISSING, NOT_FINITE, OUT_OF_RANGE, NEGATIVE_UNCERTAINTY, NULL_POINTER.
/// Notes: inputs count as independent; the charge has the sign of the dipole.
/// Reference: C. P. Smyth, Dielectric Behavior and Structure, 1955 (from memory).
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_charge_from_dipole(
    dipole_D: f64,
    u_dipole_D: f64,
    length_A: f64,
    u_length_A: f64,
    charge_e: *mut f64,
    u_charge_e: *mut f64,
) -> i32 {
    let (dipole, length) = (Quantity::new(dipole_D, u_dipole_D), Quantity::new(length_A, u_length_A));
    // SAFETY: the caller's promise goes on.
    unsafe { one(charges::charge_from_dipole, dipole, length, charge_e, u_charge_e) }
}

/// Column form of bmom_charge_from_dipole; one entry a row in every array.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_charge_from_dipole_column(
    n: i64,
    dipole_D: *const f64,
    u_dipole_D: *const f64,
    length_A: *const f64,
    u_length_A: *const f64,
    charge_e: *mut f64,
    u_charge_e: *mut f64,
    row_status: *mut i32,
) -> i32 {
    let (dipole, length) = ((dipole_D, u_dipole_D), (length_A, u_length_A));
    // SAFETY: the caller's promise goes on.
    unsafe { column(charges::charge_from_dipole, n, dipole, length, (charge_e, u_charge_e), row_status) }
}

/// Bond dipole from a charge: mu = e q d.
/// Given: 1 charge_e, u_charge_e [e]; 2 length_A, u_length_A [A], above 0. Returned: 3 dipole_D, u_dipole_D [D].
/// Status: MISSING, NOT_FINITE, OUT_OF_RANGE, NEGATIVE_UNCERTAINTY, NULL_POINTER.
/// Notes: inputs count as independent. Reference: as bmom_charge_from_dipole.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_dipole_from_charge(
    charge_e: f64,
    u_charge_e: f64,
    length_A: f64,
    u_length_A: f64,
    dipole_D: *mut f64,
    u_dipole_D: *mut f64,
) -> i32 {
    let (charge, length) = (Quantity::new(charge_e, u_charge_e), Quantity::new(length_A, u_length_A));
    // SAFETY: the caller's promise goes on.
    unsafe { one(charges::dipole_from_charge, charge, length, dipole_D, u_dipole_D) }
}

/// Column form of bmom_dipole_from_charge; one entry a row in every array.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_dipole_from_charge_column(
    n: i64,
    charge_e: *const f64,
    u_charge_e: *const f64,
    length_A: *const f64,
    u_length_A: *const f64,
    dipole_D: *mut f64,
    u_dipole_D: *mut f64,
    row_status: *mut i32,
) -> i32 {
    let (charge, length) = ((charge_e, u_charge_e), (length_A, u_length_A));
    // SAFETY: the caller's promise goes on.
    unsafe { column(charges::dipole_from_charge, n, charge, length, (dipole_D, u_dipole_D), row_status) }
}

/// Distance of two opposite charges from a dipole: d = mu / (e q).
/// Given: 1 dipole_D, u_dipole_D [D]; 2 charge_e, u_charge_e [e], not 0 and of the sign of the dipole.
/// Returned: 3 length_A, u_length_A [A].
/// Status: MISSING, NOT_FINITE, OUT_OF_RANGE, NEGATIVE_UNCERTAINTY, NULL_POINTER.
/// Notes: inputs count as independent. Reference: as bmom_charge_from_dipole.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_length_from_dipole(
    dipole_D: f64,
    u_dipole_D: f64,
    charge_e: f64,
    u_charge_e: f64,
    length_A: *mut f64,
    u_length_A: *mut f64,
) -> i32 {
    let (dipole, charge) = (Quantity::new(dipole_D, u_dipole_D), Quantity::new(charge_e, u_charge_e));
    // SAFETY: the caller's promise goes on.
    unsafe { one(charges::length_from_dipole, dipole, charge, length_A, u_length_A) }
}

/// Column form of bmom_length_from_dipole; one entry a row in every array.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_length_from_dipole_column(
    n: i64,
    dipole_D: *const f64,
    u_dipole_D: *const f64,
    charge_e: *const f64,
    u_charge_e: *const f64,
    length_A: *mut f64,
    u_length_A: *mut f64,
    row_status: *mut i32,
) -> i32 {
    let (dipole, charge) = ((dipole_D, u_dipole_D), (charge_e, u_charge_e));
    // SAFETY: the caller's promise goes on.
    unsafe { column(charges::length_from_dipole, n, dipole, charge, (length_A, u_length_A), row_status) }
}

/// Partial charges of the atoms of each molecule.
/// Given: 1 model (BMOM_CHARGES_..., not GIVEN); settings (NULL: defaults); threads (1: the caller's, 0: all);
/// 2 molecules: n, atom_offsets (n + 1), n_atoms, atomic_number, formal_charge [e] (NULL: derived), xyz_A [A] (3 an atom);
/// 3 bonds: bond_offsets (n + 1; NULL: found), n_bonds, bond_atoms (2 a bond, counted from 0 within the molecule),
/// bond_order. Returned: 4 charge_e, u_charge_e [e], an atom each at the index of its atom; u is NaN for a model without.
/// row_item: the bond at fault where the status names argument 3, else the atom; -1: none.
/// Status of a row: NO_DATA (1101: the model has no parameters for an atom as it is bonded), BAD_BOND, ATOMS_TOO_CLOSE, NO_ATOMS,
/// UNKNOWN_ELEMENT, MISSING, NOT_FINITE, OUT_OF_RANGE. Of the call: NOT_ALLOWED (GIVEN), BAD_OFFSETS, ...
/// Remarks: BONDS_FOUND, CHARGES_FOUND, IMPOSSIBLE_VALENCE, ORDERS_NOT_ASSIGNED, SEVERAL_FRAGMENTS.
/// Notes: PEOE is a sigma model with six sweeps; delocalised formal charge (carboxylate) is shared first, and opposite
/// formal charges of bonded atoms (nitro) cancel. It fails
/// for pi systems (C=O, NO2 and CN come out far too small) and for the sign of carbon monoxide.
/// Reference: Gasteiger and Marsili, Tetrahedron 1980, 36, 3219 (parameters from memory, partly corroborated).
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_partial_charges_column(
    model: i32,
    settings: *const bmom_settings,
    threads: i32,
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
    charge_e: *mut f64,
    u_charge_e: *mut f64,
    row_remarks: *mut i32,
    row_item: *mut i32,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let model = PARTIAL_CHARGES.selector(1, Selector(model))?;
        if model == CHARGES_GIVEN {
            return Err(Failure::of(Code::NotAllowed, 1));
        }
        let pool = pool(threads)?;
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (mut arrays, _) = unsafe { (Arrays::promised(), settings_of(settings)?) };
        let from = MoleculeArrays { n, atom_offsets, n_atoms, atomic_number, formal_charge, xyz_A };
        let molecules = Molecules::new(&mut arrays, 2, &from)?;
        let rows = molecules.rows;
        let bonds = Bonds::new(&mut arrays, 3, rows, &BondArrays { bond_offsets, n_bonds, bond_atoms, bond_order })?;
        let out = arrays.quantities_out(4, charge_e, u_charge_e, molecules.atoms)?;
        let ends = Ends::new(&mut arrays, rows, row_remarks, row_item, row_status)?;
        arrays.no_overlap()?;
        let (view, bonds) = (molecules.view()?, bonds.view()?);

        let answers = map_rows(rows, 2 * molecules.atoms, pool, |row| -> Result<_, Failure> {
            let molecule = view.row(row)?;
            let bonding = bonds.bonding(row, molecule, BONDS_ALTERNATING)?;
            let charges = charges::partial_charges(model, molecule, &bonding, None).map_err(of_model)?;
            Ok((charges, remarks_of(molecule, &bonding)))
        });
        let mut failed = 0;
        for (row, answer) in answers.into_iter().enumerate() {
            let end = match answer {
                Ok((charges, end)) => {
                    for (k, atom) in view.range(row).enumerate() {
                        let u = charges.u.as_ref().map_or(f64::NAN, |u| u[k]);
                        out.set(atom, Quantity::new(charges.charge[k], u));
                    }
                    Ok(end)
                }
                Err(failure) => {
                    failed += 1;
                    view.range(row).for_each(|atom| out.set(atom, NO_QUANTITY));
                    Err(failure)
                }
            };
            ends.set(row, end);
        }
        Ok(rows_code(rows, failed))
    })
}

/// One molecule: as bmom_partial_charges_column with one row, default settings and the caller's thread. bond_atoms NULL
/// with n_bonds 0: bonds are found.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_partial_charges(
    model: i32,
    n_atoms: i64,
    atomic_number: *const i32,
    formal_charge: *const i32,
    xyz_A: *const f64,
    n_bonds: i64,
    bond_atoms: *const i32,
    bond_order: *const f64,
    charge_e: *mut f64,
    u_charge_e: *mut f64,
    remarks: *mut i32,
    item: *mut i32,
) -> i32 {
    let (atoms, bonds, mut status) = ([0, n_atoms], [0, n_bonds], 0);
    let bond_offsets = if bond_atoms.is_null() { std::ptr::null() } else { bonds.as_ptr() };
    // SAFETY: the caller's promise goes on; the arrays of one row are ours.
    let code = unsafe {
        bmom_partial_charges_column(
            model,
            std::ptr::null(),
            1,
            1,
            atoms.as_ptr(),
            n_atoms,
            atomic_number,
            formal_charge,
            xyz_A,
            bond_offsets,
            n_bonds,
            bond_atoms,
            bond_order,
            charge_e,
            u_charge_e,
            remarks,
            item,
            &raw mut status,
        )
    };
    let numbers = [(charge_e, n_atoms), (u_charge_e, n_atoms)];
    // SAFETY: the caller's promise goes on.
    unsafe { one_row(code, status, &numbers, &[(remarks, 0), (item, -1)]) }
}
