//! Entry points of the family bonds.

use super::arrays::{Arrays, NO_QUANTITY, clean, count, rows_code, run_rows};
use super::guard::{guard, pool};
use super::molecules::{Ends, MoleculeArrays, Molecules, remarks_of};
use super::settings::{bmom_settings, settings_of};
use crate::bonds::find::{FIND_BONDS, find_bonds};
use crate::bonds::length::BOND_LENGTH;
use crate::bonds::polarity::{BOND_POLARITY, IONIC_CHARACTER};
use crate::bonds::{bond_length, bond_polarity, ionic_character};
use crate::parallel::map_rows;
use crate::quantity::Quantity;
use crate::selectors::Selector;
use crate::status::{Code, Failure};

/// Expected length of a bond between two elements.
/// Given: 1 radii (BMOM_RADII_...); 2 law (BMOM_LENGTH_...); 3 scale (BMOM_ELECTRONEGATIVITY_...; only the
/// Schomaker-Stevenson law uses it, but it must be one); 4 atomic_number_a; 5 state_a; 6 atomic_number_b; 7 state_b (BMOM_STATE_...); 8 bond_order.
/// Returned: 9 length_A, u_length_A [A].
/// Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, NOT_ALLOWED (law with these radii or this scale), MISSING, NOT_FINITE,
/// UNKNOWN_ELEMENT, OUT_OF_RANGE (order, or element outside the law), NO_DATA, NULL_POINTER.
/// Notes: LENGTH_RADIUS_SUM takes the order that the table is for; LENGTH_BY_ORDER 1, 1.5, 2, 3; the Schomaker-Stevenson
/// law its own radii, a Pauling scale and order 1 (within about 0.05 A; fails for Si-F); Pauling's laws orders 1 to 3
/// (1960, non-metals) and 0.05 to 1 (1947, metals). u comes from the radii; laws without a published one give NaN.
/// Reference: Schomaker and Stevenson, J. Am. Chem. Soc. 1941, 63, 37; Pauling, ibid. 1947, 69, 542, and The Nature of
/// the Chemical Bond, 3rd ed. 1960 (from memory); radii as bmom_covalent_radius.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_bond_length(
    radii: i32,
    law: i32,
    scale: i32,
    atomic_number_a: i32,
    state_a: i32,
    atomic_number_b: i32,
    state_b: i32,
    bond_order: f64,
    length_A: *mut f64,
    u_length_A: *mut f64,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let out = unsafe { Arrays::promised() }.quantity_cell(9, length_A, u_length_A)?;
        out.set(bond_length(
            Selector(radii),
            Selector(law),
            Selector(scale),
            atomic_number_a,
            Selector(state_a),
            atomic_number_b,
            Selector(state_b),
            bond_order,
        )?);
        Ok(Code::Ok)
    })
}

/// Column form of bmom_bond_length. A state that selects nothing is OUT_OF_RANGE of its row.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_bond_length_column(
    radii: i32,
    law: i32,
    scale: i32,
    n: i64,
    atomic_number_a: *const i32,
    state_a: *const i32,
    atomic_number_b: *const i32,
    state_b: *const i32,
    bond_order: *const f64,
    length_A: *mut f64,
    u_length_A: *mut f64,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let n = count(n)?;
        let radii = BOND_LENGTH.selector(1, Selector(radii))?;
        let law = BOND_LENGTH.selector(2, Selector(law))?;
        let scale = BOND_LENGTH.selector(3, Selector(scale))?;
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let mut arrays = unsafe { Arrays::promised() };
        let a = arrays.input(4, atomic_number_a, n)?;
        let state_a = arrays.input(5, state_a, n)?;
        let b = arrays.input(6, atomic_number_b, n)?;
        let state_b = arrays.input(7, state_b, n)?;
        let order = arrays.input(8, bond_order, n)?;
        let out = arrays.quantities_out(9, length_A, u_length_A, n)?;
        let status = arrays.output_if(0, row_status, n)?;
        arrays.no_overlap()?;
        let (a, state_a, b, state_b, order) = (a.slice(), state_a.slice(), b.slice(), state_b.slice(), order.slice());
        run_rows(
            n,
            status,
            |i| {
                let (state_a, state_b) = (Selector(state_a[i]), Selector(state_b[i]));
                let length = bond_length(radii, law, scale, a[i], state_a, b[i], state_b, order[i]);
                // A state that selects nothing is a fault of its row, not of the call.
                let length = length.map_err(|failure| match failure {
                    Failure { code: Code::UnknownSelector | Code::WrongSelector, argument, .. } => {
                        Failure::of(Code::OutOfRange, argument)
                    }
                    failure => failure,
                })?;
                out.set(i, length);
                Ok(())
            },
            |i| out.set(i, NO_QUANTITY),
        )
    })
}

/// Polarity of a bond: difference of electronegativity, negative end and class.
/// Given: 1 scale (BMOM_ELECTRONEGATIVITY_...); 2 polar_from (usually 0.4); 3 ionic_from (usually 1.7, not below
/// polar_from); 4 atomic_number_a; 5 atomic_number_b.
/// Returned: 6 delta_chi, u_delta_chi (chi_b - chi_a, above 0 where b is the negative end, Pauling units);
/// 7 negative_end (BMOM_END_...); 8 bond_class (BMOM_CLASS_...).
/// Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, NOT_FINITE, OUT_OF_RANGE, UNKNOWN_ELEMENT, NO_DATA, NULL_POINTER.
/// Notes: below polar_from non-polar; from ionic_from on ionic where one partner is a metal, else polar (HF is polar).
/// The limits are common practice, not a standard. The difference is rounded to six decimals.
/// Reference: Pauling, The Nature of the Chemical Bond, 3rd ed. 1960 (from memory).
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_bond_polarity(
    scale: i32,
    polar_from: f64,
    ionic_from: f64,
    atomic_number_a: i32,
    atomic_number_b: i32,
    delta_chi: *mut f64,
    u_delta_chi: *mut f64,
    negative_end: *mut i32,
    bond_class: *mut i32,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let arrays = unsafe { Arrays::promised() };
        let delta = arrays.quantity_cell(6, delta_chi, u_delta_chi)?;
        let end = arrays.cell(7, negative_end, i32::MIN)?;
        let class = arrays.cell(8, bond_class, i32::MIN)?;
        let answer = bond_polarity(Selector(scale), polar_from, ionic_from, atomic_number_a, atomic_number_b)?;
        delta.set(answer.delta_chi);
        end.set(answer.negative_end.0);
        class.set(answer.class.0);
        Ok(Code::Ok)
    })
}

/// Column form of bmom_bond_polarity.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_bond_polarity_column(
    scale: i32,
    polar_from: f64,
    ionic_from: f64,
    n: i64,
    atomic_number_a: *const i32,
    atomic_number_b: *const i32,
    delta_chi: *mut f64,
    u_delta_chi: *mut f64,
    negative_end: *mut i32,
    bond_class: *mut i32,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let n = count(n)?;
        let scale = BOND_POLARITY.selector(1, Selector(scale))?;
        // The limits are the call's: hydrogen with itself shows whether they are sound.
        bond_polarity(scale, polar_from, ionic_from, 1, 1)?;
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let mut arrays = unsafe { Arrays::promised() };
        let a = arrays.input(4, atomic_number_a, n)?;
        let b = arrays.input(5, atomic_number_b, n)?;
        let delta = arrays.quantities_out(6, delta_chi, u_delta_chi, n)?;
        let end = arrays.output(7, negative_end, n)?;
        let class = arrays.output(8, bond_class, n)?;
        let status = arrays.output_if(0, row_status, n)?;
        arrays.no_overlap()?;
        let (a, b) = (a.slice(), b.slice());
        run_rows(
            n,
            status,
            |i| {
                let answer = bond_polarity(scale, polar_from, ionic_from, a[i], b[i])?;
                delta.set(i, answer.delta_chi);
                end.set(i, answer.negative_end.0);
                class.set(i, answer.class.0);
                Ok(())
            },
            |i| {
                delta.set(i, NO_QUANTITY);
                end.set(i, i32::MIN);
                class.set(i, i32::MIN);
            },
        )
    })
}

/// Ionic character of a bond from its difference of electronegativity.
/// Given: 1 law (BMOM_IONIC_PAULING_1960 or BMOM_IONIC_HANNAY_SMYTH_1946); 2 delta_chi, u_delta_chi (Pauling units).
/// Returned: 3 ionic_percent, u_ionic_percent [%].
/// Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, NOT_FINITE, NEGATIVE_UNCERTAINTY, NULL_POINTER.
/// Notes: Hannay and Smyth's formula passes 100 % above |delta_chi| = 3.53; there the answer is clamped to 100 and its u
/// is NaN. u is that of delta_chi alone. Reference: Pauling 1960 (from memory); Hannay and Smyth, J. Am. Chem. Soc.
/// 1946, 68, 171.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_ionic_character(
    law: i32,
    delta_chi: f64,
    u_delta_chi: f64,
    ionic_percent: *mut f64,
    u_ionic_percent: *mut f64,
) -> i32 {
    guard(|| {
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let out = unsafe { Arrays::promised() }.quantity_cell(3, ionic_percent, u_ionic_percent)?;
        out.set(ionic_character(Selector(law), Quantity::new(delta_chi, u_delta_chi))?);
        Ok(Code::Ok)
    })
}

/// Column form of bmom_ionic_character.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_ionic_character_column(
    law: i32,
    n: i64,
    delta_chi: *const f64,
    u_delta_chi: *const f64,
    ionic_percent: *mut f64,
    u_ionic_percent: *mut f64,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let n = count(n)?;
        let law = IONIC_CHARACTER.selector(1, Selector(law))?;
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let mut arrays = unsafe { Arrays::promised() };
        let delta = arrays.quantities(2, delta_chi, u_delta_chi, n)?;
        let out = arrays.quantities_out(3, ionic_percent, u_ionic_percent, n)?;
        let status = arrays.output_if(0, row_status, n)?;
        arrays.no_overlap()?;
        let delta = delta.rows();
        run_rows(
            n,
            status,
            |i| ionic_character(law, delta(i)).map(|percent| out.set(i, percent)),
            |i| out.set(i, NO_QUANTITY),
        )
    })
}

/// Which atoms of each molecule are bonded, and with what order, from elements and coordinates.
/// Given: 1 rule (BMOM_BONDS_ALTERNATING or BMOM_BONDS_AROMATIC); settings (NULL: defaults); threads (1: the caller's, 0:
/// all); 2 molecules: n, atom_offsets (n + 1), n_atoms, atomic_number, formal_charge [e] (NULL: derived), xyz_A [A] (3 an
/// atom). Returned, ragged: found_offsets (n + 1: first bond of each row, and the end); 3 found_atoms (2 a bond, counted
/// from 0 within the molecule); 4 found_order (0 where none is assigned: metals, bridging hydrogen); 5 found_length_A
/// [A]; 6 found_formal_charge [e] (an atom each, at the index of its atom; NULL: not wanted).
/// capacity: room in bonds; needed: bonds found. Where the room is too small (BUFFER_TOO_SMALL) found_offsets, needed and
/// the rows' ends are right and no bond is written. row_item: the atom at fault or that a remark is about.
/// Status of a row: MISSING, NOT_FINITE, OUT_OF_RANGE, UNKNOWN_ELEMENT, NO_ATOMS, ATOMS_TOO_CLOSE.
/// Remarks: IMPOSSIBLE_VALENCE, ORDERS_NOT_ASSIGNED, CHARGES_FOUND, OPEN_SHELL, BONDS_FOUND, SEVERAL_FRAGMENTS.
/// capacity 0 with NULL arrays asks for the number alone.
/// Notes: time is linear in the atoms, up to 10^6 in one molecule. The method is our own; radii as bmom_covalent_radius.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_find_bonds_column(
    rule: i32,
    settings: *const bmom_settings,
    threads: i32,
    n: i64,
    atom_offsets: *const i64,
    n_atoms: i64,
    atomic_number: *const i32,
    formal_charge: *const i32,
    xyz_A: *const f64,
    found_offsets: *mut i64,
    found_atoms: *mut i32,
    found_order: *mut f64,
    found_length_A: *mut f64,
    found_formal_charge: *mut i32,
    capacity: i64,
    needed: *mut i64,
    row_remarks: *mut i32,
    row_item: *mut i32,
    row_status: *mut i32,
) -> i32 {
    guard(|| {
        let rule = FIND_BONDS.selector(1, Selector(rule))?;
        let pool = pool(threads)?;
        let room = count(capacity)?;
        // SAFETY: the caller's promise about every pointer, stated in the header.
        let (mut arrays, _) = unsafe { (Arrays::promised(), settings_of(settings)?) };
        let from = MoleculeArrays { n, atom_offsets, n_atoms, atomic_number, formal_charge, xyz_A };
        let molecules = Molecules::new(&mut arrays, 2, &from)?;
        let rows = molecules.rows;
        let offsets = arrays.output(0, found_offsets, rows + 1)?;
        let atoms_out = arrays.output(3, found_atoms, 2 * room)?;
        let order_out = arrays.output(4, found_order, room)?;
        let length_out = arrays.output(5, found_length_A, room)?;
        let charge_out = arrays.output_if(6, found_formal_charge, molecules.atoms)?;
        let needed = arrays.output_if(0, needed, 1)?;
        let ends = Ends::new(&mut arrays, rows, row_remarks, row_item, row_status)?;
        arrays.no_overlap()?;
        let view = molecules.view()?;

        let found = map_rows(rows, 2 * molecules.atoms, pool, |row| {
            view.row(row).and_then(|molecule| {
                find_bonds(molecule, rule).map_err(|failure| failure.argument(2)).map(|bonding| (molecule, bonding))
            })
        });
        let (mut end, mut failed) = (0_usize, 0);
        offsets.set(0, 0);
        for (row, answer) in found.iter().enumerate() {
            match answer {
                Ok((molecule, bonding)) => {
                    end += bonding.bonds.len();
                    ends.set(row, Ok(remarks_of(*molecule, bonding)));
                }
                Err(failure) => {
                    failed += 1;
                    ends.set(row, Err(*failure));
                }
            }
            offsets.set(row + 1, end as i64);
            for (k, atom) in view.range(row).enumerate() {
                let charge = answer.as_ref().ok().and_then(|(_, bonding)| bonding.formal_charge.get(k).copied());
                charge_out.set(atom, charge.unwrap_or(i32::MIN));
            }
        }
        needed.set(0, end as i64);
        if end > room {
            return Err(Failure::new(Code::BufferTooSmall));
        }
        let mut k = 0;
        for (molecule, bonding) in found.iter().flatten() {
            for bond in &bonding.bonds {
                let (p, q) = (molecule.xyz[bond.a as usize], molecule.xyz[bond.b as usize]);
                let square: f64 = p.iter().zip(q).map(|(x, y)| (x - y) * (x - y)).sum();
                atoms_out.set_all(2 * k, &[bond.a as i32, bond.b as i32]);
                order_out.set(k, bond.order);
                length_out.set(k, clean(square.sqrt()));
                k += 1;
            }
        }
        Ok(rows_code(rows, failed))
    })
}

/// One molecule: as bmom_find_bonds_column with one row, default settings and the caller's thread. found_atoms has room for 2 x capacity integers, found_order and
/// found_length_A for capacity numbers; needed is the number of bonds.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn bmom_find_bonds(
    rule: i32,
    n_atoms: i64,
    atomic_number: *const i32,
    formal_charge: *const i32,
    xyz_A: *const f64,
    found_atoms: *mut i32,
    found_order: *mut f64,
    found_length_A: *mut f64,
    found_formal_charge: *mut i32,
    capacity: i64,
    needed: *mut i64,
    remarks: *mut i32,
    item: *mut i32,
) -> i32 {
    let (offsets, mut found_offsets, mut status) = ([0, n_atoms], [0_i64; 2], 0);
    // SAFETY: the caller's promise goes on; the arrays of one row are ours.
    let code = unsafe {
        bmom_find_bonds_column(
            rule,
            std::ptr::null(),
            1,
            1,
            offsets.as_ptr(),
            n_atoms,
            atomic_number,
            formal_charge,
            xyz_A,
            found_offsets.as_mut_ptr(),
            found_atoms,
            found_order,
            found_length_A,
            found_formal_charge,
            capacity,
            needed,
            remarks,
            item,
            &raw mut status,
        )
    };
    // SAFETY: the caller's promise goes on.
    unsafe { super::molecules::one_row(code, status, &[], &[(remarks, 0), (item, -1)]) }
}
