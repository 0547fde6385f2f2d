//! Entry points of the family moments.

use super::arrays::{Arrays, NAN, NO_QUANTITY, count, rows_code, run_rows};
use super::guard::{guard, pool};
use super::molecules::{
    BondArrays, Bonds, ChargeColumn, Ends, MoleculeArrays, Molecules, checked_offsets, of_model, one_row, remarks_of,
    set_numbers,
};
use super::settings::{bmom_settings, settings_of};
use crate::charges::partial_charges;
use crate::moments::{self, DIPOLE, DIPOLE_POLARITY, Dipole};
use crate::parallel::map_rows;
use crate::selectors::{BONDS_ALTERNATING, CHARGES_GIVEN, Selector};
use crate::status::{Code, Failure, remark};

/// Dipole vector of each molecule, from - to +, about the centre of mass.
/// Given: 1 model (BMOM_CHARGES_...); 2 frame (BMOM_FRAME_AS_GIVEN); settings (NULL: defaults; position_uncertainty_A);
/// threads (1: the caller's, 0: all); 3 molecules: n, atom_offsets (n + 1), n_atoms, atomic_number, formal_charge [e]
/// (NULL: derived), xyz_A [A] (3 an atom); 4 bonds: bond_offsets (n + 1; NULL: found), n_bonds, bond_atoms (2 a bond),
/// bond_order; 5 charge_e, u_charge_e [e] (an atom each, with BMOM_CHARGES_GIVEN and only with it).
/// Returned: 6 dipole_D [D] (3 a row), covariance_D2 [D^2] (9 a row; NaN where not known; NULL: not wanted);
/// 7 magnitude_D, u_magnitude_D [D]; 8 origin_A [A] (3 a row; NULL: not wanted). row_item:
/// the bond at fault where the status names argument 4, else the atom; -1: none.
/// Status of a row: NO_DATA (1101: the model has no parameters for an atom as it is bonded), BAD_BOND, ATOMS_TOO_CLOSE, NO_ATOMS, UNKNOWN_ELEMENT, MISSING,
/// NOT_FINITE, OUT_OF_RANGE, NEGATIVE_UNCERTAINTY. Of the call: NOT_ALLOWED (charge_e and model), BAD_OFFSETS, ...
/// Remarks: CHARGED (the dipole depends on the origin), BONDS_FOUND, CHARGES_FOUND, IMPOSSIBLE_VALENCE, ...
/// Notes: the net charge is exact, so the uncertainties of the charges are conditioned on it. PEOE states no uncertainty:
/// its covariance_D2 and u_magnitude_D are NaN; given charges have them where u_charge_e is given. PEOE fails for pi systems; see bmom_partial_charges_column.
/// Reference: E. R. Cohen et al., Quantities, Units and Symbols in Physical Chemistry, 3rd ed., IUPAC 2007 (from memory).
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_dipole_column(
    model: i32,
    frame: i32,
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
    charge_e: *const f64,
    u_charge_e: *const f64,
    dipole_D: *mut f64,
    covariance_D2: *mut f64,
    magnitude_D: *mut f64,
    u_magnitude_D: *mut f64,
    origin_A: *mut f64,
    row_remarks: *mut i32,
    row_item: *mut i32,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let model = DIPOLE.selector(1, Selector(model))?;
        DIPOLE.selector(2, Selector(frame))?;
        let pool = pool(threads)?;
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (mut arrays, settings) = unsafe { (Arrays::promised(), settings_of(settings)?) };
        let from = MoleculeArrays { n, atom_offsets, n_atoms, atomic_number, formal_charge, xyz_A };
        let molecules = Molecules::new(&mut arrays, 3, &from)?;
        let rows = molecules.rows;
        let bonds = Bonds::new(&mut arrays, 4, rows, &BondArrays { bond_offsets, n_bonds, bond_atoms, bond_order })?;
        let charges = ChargeColumn::new(&mut arrays, 5, model, charge_e, u_charge_e, molecules.atoms)?;
        let vector_out = arrays.output(6, dipole_D, 3 * rows)?;
        let covariance_out = arrays.output_if(6, covariance_D2, 9 * rows)?;
        let magnitude_out = arrays.quantities_out(7, magnitude_D, u_magnitude_D, rows)?;
        let origin_out = arrays.output_if(8, origin_A, 3 * rows)?;
        let ends = Ends::new(&mut arrays, rows, row_remarks, row_item, row_status)?;
        arrays.no_overlap()?;
        let (view, bonds, charges) = (molecules.view()?, bonds.view()?, charges.view());

        let answers = map_rows(rows, 3 * molecules.atoms, pool, |row| -> Result<_, Failure> {
            let molecule = view.row(row)?;
            // Given charges need no bonds: a molecule whose bonds cannot be told has a dipole all the same.
            let bonding = match bonds.bonding(row, molecule, BONDS_ALTERNATING) {
                Err(_) if model == CHARGES_GIVEN && bonds.is_found() => Default::default(),
                bonding => bonding?,
            };
            let given = charges.map(|(charge, u)| (&charge[view.range(row)], u.map(|u| &u[view.range(row)])));
            let charges = partial_charges(model, molecule, &bonding, given).map_err(of_model)?;
            let dipole = moments::dipole(molecule, &charges, settings.position_uncertainty_a)?;
            let charged = if dipole.charged { remark::CHARGED } else { 0 };
            let (remarks, item) = if bonding.bonds.is_empty() && molecule.len() > 1 && model == CHARGES_GIVEN {
                (bonding.remarks, -1)
            } else {
                remarks_of(molecule, &bonding)
            };
            Ok((dipole, (remarks | charged, item)))
        });
        let mut failed = 0;
        for (row, answer) in answers.into_iter().enumerate() {
            let (dipole, end) = match answer {
                Ok((dipole, end)) => (dipole, Ok(end)),
                Err(failure) => {
                    failed += 1;
                    (
                        Dipole { magnitude: NO_QUANTITY, ..Dipole::new([NAN; 3], [[NAN; 3]; 3], [NAN; 3], false) },
                        Err(failure),
                    )
                }
            };
            set_numbers(vector_out, 3 * row, &dipole.vector);
            set_numbers(covariance_out, 9 * row, dipole.covariance.as_flattened());
            magnitude_out.set(row, dipole.magnitude);
            set_numbers(origin_out, 3 * row, &dipole.origin);
            ends.set(row, end);
        }
        Ok(rows_code(rows, failed))
    })
}

/// One molecule: as bmom_dipole_column with one row, default settings and the caller's thread. bond_atoms NULL with n_bonds
/// 0: bonds are found.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_dipole(
    model: i32,
    frame: i32,
    n_atoms: i64,
    atomic_number: *const i32,
    formal_charge: *const i32,
    xyz_A: *const f64,
    n_bonds: i64,
    bond_atoms: *const i32,
    bond_order: *const f64,
    charge_e: *const f64,
    u_charge_e: *const f64,
    dipole_D: *mut f64,
    covariance_D2: *mut f64,
    magnitude_D: *mut f64,
    u_magnitude_D: *mut f64,
    origin_A: *mut f64,
    remarks: *mut i32,
    item: *mut i32,
) -> i32 {
    let (atoms, bonds, mut status) = ([0, n_atoms], [0, n_bonds], 0);
    let bond_offsets = if bond_atoms.is_null() { std::ptr::null() } else { bonds.as_ptr() };
    // SAFETY: the caller's promise goes on; the arrays of one row are ours.
    let code = unsafe {
        bmom_dipole_column(
            model,
            frame,
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
            dipole_D,
            covariance_D2,
            magnitude_D,
            u_magnitude_D,
            origin_A,
            remarks,
            item,
            &raw mut status,
        )
    };
    let numbers = [(dipole_D, 3), (covariance_D2, 9), (magnitude_D, 1), (u_magnitude_D, 1), (origin_A, 3)];
    // SAFETY: the caller's promise goes on.
    unsafe { one_row(code, status, &numbers, &[(remarks, 0), (item, -1)]) }
}

/// Dipole vector of point charges about the given origin, from - to +.
/// Given: 1 n_atoms, charge_e, u_charge_e [e] (NULL: not known); 2 xyz_A [A] (3 a charge), u_xyz_A [A] (one a charge, alike
/// in all directions; NULL: not known). Returned: 3 dipole_D [D] (3), covariance_D2 [D^2] (9; NULL: not wanted);
/// 4 magnitude_D, u_magnitude_D [D].
/// Status: CHARGED (the charges do not sum to zero within 1e-6 e), NO_ATOMS, MISSING, NOT_FINITE, OUT_OF_RANGE,
/// NEGATIVE_UNCERTAINTY, NULL_POINTER, NEGATIVE_COUNT.
/// Notes: all inputs count as independent, C = k^2 (sum u_q^2 r r' + sum q^2 u_x^2 1) with k = 4.80320471 D/(e A).
/// Reference: JCGM 100:2008; E. R. Cohen et al., IUPAC 2007 (from memory).
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_dipole_of_charges(
    n_atoms: i64,
    charge_e: *const f64,
    u_charge_e: *const f64,
    xyz_A: *const f64,
    u_xyz_A: *const f64,
    dipole_D: *mut f64,
    covariance_D2: *mut f64,
    magnitude_D: *mut f64,
    u_magnitude_D: *mut f64,
) -> i32 {
    let (offsets, mut status) = ([0, n_atoms], 0);
    // SAFETY: the caller's promise goes on; the arrays of one row are ours.
    let code = unsafe {
        bmom_dipole_of_charges_column(
            std::ptr::null(),
            1,
            1,
            offsets.as_ptr(),
            n_atoms,
            charge_e,
            u_charge_e,
            xyz_A,
            u_xyz_A,
            dipole_D,
            covariance_D2,
            magnitude_D,
            u_magnitude_D,
            std::ptr::null_mut(),
            std::ptr::null_mut(),
            &raw mut status,
        )
    };
    let numbers = [(dipole_D, 3), (covariance_D2, 9), (magnitude_D, 1), (u_magnitude_D, 1)];
    // SAFETY: the caller's promise goes on.
    unsafe { one_row(code, status, &numbers, &[]) }
}

/// Column form of bmom_dipole_of_charges: settings (NULL; none applies); threads; n; the charges of row r are
/// atom_offsets[r] to atom_offsets[r + 1] - 1 of charge_e, u_charge_e, u_xyz_A (one each) and xyz_A (three each).
/// row_item: the charge at fault.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_dipole_of_charges_column(
    settings: *const bmom_settings,
    threads: i32,
    n: i64,
    atom_offsets: *const i64,
    n_atoms: i64,
    charge_e: *const f64,
    u_charge_e: *const f64,
    xyz_A: *const f64,
    u_xyz_A: *const f64,
    dipole_D: *mut f64,
    covariance_D2: *mut f64,
    magnitude_D: *mut f64,
    u_magnitude_D: *mut f64,
    row_remarks: *mut i32,
    row_item: *mut i32,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let pool = pool(threads)?;
        let (rows, atoms) = (count(n)?, count(n_atoms)?);
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (mut arrays, _) = unsafe { (Arrays::promised(), settings_of(settings)?) };
        let offsets = arrays.input(1, atom_offsets, if rows == 0 { 0 } else { rows + 1 })?;
        let charge = arrays.quantities(1, charge_e, u_charge_e, atoms)?;
        let xyz = arrays.input(2, xyz_A, 3 * atoms)?;
        let u_xyz = arrays.input_if(2, u_xyz_A, atoms)?;
        let vector_out = arrays.output(3, dipole_D, 3 * rows)?;
        let covariance_out = arrays.output_if(3, covariance_D2, 9 * rows)?;
        let magnitude_out = arrays.quantities_out(4, magnitude_D, u_magnitude_D, rows)?;
        let ends = Ends::new(&mut arrays, rows, row_remarks, row_item, row_status)?;
        arrays.no_overlap()?;
        let offsets = checked_offsets(offsets.slice(), atoms, 1)?;
        let (charge, u_charge) = charge.slices();
        let (xyz, u_xyz) = (xyz.slice().as_chunks().0, u_xyz.slice());
        let answers = map_rows(rows, atoms / 50, pool, |row| {
            let range = offsets[row] as usize..offsets[row + 1] as usize;
            moments::dipole_of_charges(
                &charge[range.clone()],
                u_charge.map(|u| &u[range.clone()]),
                &xyz[range.clone()],
                u_xyz.map(|u| &u[range.clone()]),
            )
        });
        let mut failed = 0;
        for (row, answer) in answers.into_iter().enumerate() {
            failed += usize::from(answer.is_err());
            let blank = Dipole { magnitude: NO_QUANTITY, ..Dipole::new([NAN; 3], [[NAN; 3]; 3], [NAN; 3], false) };
            let dipole = answer.unwrap_or(blank);
            set_numbers(vector_out, 3 * row, &dipole.vector);
            set_numbers(covariance_out, 9 * row, dipole.covariance.as_flattened());
            magnitude_out.set(row, dipole.magnitude);
            ends.set(row, answer.map(|_| (0, -1)));
        }
        Ok(rows_code(rows, failed))
    })
}

/// Polar, non-polar or undecided, from a dipole vector and its covariance.
/// Given: 1 limit_D [D] (usually 0.2); 2 dipole_D [D] (3), covariance_D2 [D^2] (9).
/// Returned: 3 polarity (BMOM_POLARITY_...).
/// Status: MISSING (also for a covariance that is NaN, as that of PEOE dipoles is), NOT_FINITE, OUT_OF_RANGE (limit; or a
/// matrix that is no covariance), NULL_POINTER (covariance_D2 must be given).
/// Notes: polar where |mu| - 2 u > limit; non-polar where |mu| + 2.8 sqrt(largest eigenvalue of the covariance) <= limit
/// (2.8 is the 95 % radius of a normal distribution in three dimensions); else undecided. One conformer is not the
/// molecule: the polarity table also bounds what turning about bonds can do.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_dipole_polarity(
    limit_D: f64,
    dipole_D: *const f64,
    covariance_D2: *const f64,
    polarity: *mut i32,
) -> i32 {
    let mut status = 0;
    let code = guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        unsafe { Arrays::promised() }.cell(3, polarity, i32::MIN)?;
        Ok(Code::Ok)
    });
    if code != 0 {
        return code;
    }
    // SAFETY: the caller's promise goes on.
    let code = unsafe { bmom_dipole_polarity_column(limit_D, 1, dipole_D, covariance_D2, polarity, &raw mut status) };
    // SAFETY: the caller's promise goes on.
    unsafe { one_row(code, status, &[], &[(polarity, i32::MIN)]) }
}

/// Column form of bmom_dipole_polarity: dipole_D has 3 numbers a row, covariance_D2 9.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_dipole_polarity_column(
    limit_D: f64,
    n: i64,
    dipole_D: *const f64,
    covariance_D2: *const f64,
    polarity: *mut i32,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let n = count(n)?;
        let limit = DIPOLE_POLARITY.number(1, limit_D)?;
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let mut arrays = unsafe { Arrays::promised() };
        let dipole = arrays.input(2, dipole_D, 3 * n)?;
        let covariance = arrays.input(2, covariance_D2, 9 * n)?;
        let out = arrays.output(3, polarity, n)?;
        let status = arrays.output_if(0, row_status, n)?;
        arrays.no_overlap()?;
        let vectors: &[[f64; 3]] = dipole.slice().as_chunks().0;
        let matrices: &[[[f64; 3]; 3]] = covariance.slice().as_chunks().0.as_chunks().0;
        run_rows(
            n,
            status,
            |i| moments::polarity(vectors[i], &matrices[i], limit).map(|polarity| out.set(i, polarity.0)),
            |i| out.set(i, i32::MIN),
        )
    })
}
