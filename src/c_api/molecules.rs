//! Columns of molecules and of their bonds: offsets checked once, then one molecule after the other.

use super::arrays::{Arrays, In, InIf, Out, Quantities, clean, count};
use crate::bonds::find::{find_bonds, given_bonds, given_lengths};
use crate::molecule::{Bond, Bonding, Molecule, Neighbours};
use crate::selectors::{CHARGES_GIVEN, Selector};
use crate::status::{Code, Failure, remark};

/// Pointers of a column of molecules as they come from C.
pub(super) struct MoleculeArrays {
    pub(super) n: i64,
    pub(super) atom_offsets: *const i64,
    pub(super) n_atoms: i64,
    pub(super) atomic_number: *const i32,
    pub(super) formal_charge: *const i32,
    pub(super) xyz_A: *const f64,
}

/// Pointers of the bonds of a column of molecules as they come from C.
pub(super) struct BondArrays {
    pub(super) bond_offsets: *const i64,
    pub(super) n_bonds: i64,
    pub(super) bond_atoms: *const i32,
    pub(super) bond_order: *const f64,
}

/// A checked column of molecules. Use `view` after `Arrays::no_overlap`.
pub(super) struct Molecules {
    argument: i32,
    pub(super) rows: usize,
    pub(super) atoms: usize,
    offsets: In<i64>,
    atomic_number: In<i32>,
    formal_charge: InIf<i32>,
    xyz: In<f64>,
}

impl Molecules {
    /// Enters the arrays of the block that has this catalogue number.
    ///
    /// # Errors
    /// `NegativeCount`, `TooLarge`, `NullPointer`, `Misaligned` of the argument.
    pub(super) fn new(arrays: &mut Arrays, argument: i32, from: &MoleculeArrays) -> Result<Self, Failure> {
        let name = |failure: Failure| failure.argument(argument);
        let (rows, atoms) = (count(from.n).map_err(name)?, count(from.n_atoms).map_err(name)?);
        let offsets = if rows == 0 { 0 } else { rows + 1 };
        Ok(Self {
            argument,
            rows,
            atoms,
            offsets: arrays.input(argument, from.atom_offsets, offsets)?,
            atomic_number: arrays.input(argument, from.atomic_number, atoms)?,
            formal_charge: arrays.input_if(argument, from.formal_charge, atoms)?,
            xyz: arrays.input(argument, from.xyz_A, 3 * atoms)?,
        })
    }

    /// The column as slices.
    ///
    /// # Errors
    /// `BadOffsets` of the argument.
    pub(super) fn view<'a>(&self) -> Result<MoleculeView<'a>, Failure> {
        let offsets = checked_offsets(self.offsets.slice(), self.atoms, self.argument)?;
        Ok(MoleculeView {
            argument: self.argument,
            offsets,
            atomic_number: self.atomic_number.slice(),
            formal_charge: self.formal_charge.slice(),
            xyz: self.xyz.slice().as_chunks().0,
        })
    }
}

/// Offsets must not be negative, decrease or pass the end.
pub(super) fn checked_offsets(offsets: &[i64], end: usize, argument: i32) -> Result<&[i64], Failure> {
    let bad = Failure::of(Code::BadOffsets, argument);
    if offsets.first().is_some_and(|&first| first < 0) || offsets.windows(2).any(|pair| pair[0] > pair[1]) {
        return Err(bad);
    }
    match offsets.last() {
        Some(&last) if usize::try_from(last).is_ok_and(|last| last <= end) => Ok(offsets),
        None => Ok(offsets),
        Some(_) => Err(bad),
    }
}

/// A column of molecules as slices.
#[derive(Clone, Copy)]
pub(super) struct MoleculeView<'a> {
    argument: i32,
    offsets: &'a [i64],
    atomic_number: &'a [i32],
    formal_charge: Option<&'a [i32]>,
    xyz: &'a [[f64; 3]],
}

impl<'a> MoleculeView<'a> {
    /// Index range of the atoms of a row.
    pub(super) fn range(&self, row: usize) -> std::ops::Range<usize> {
        let at = |i: usize| self.offsets.get(i).map_or(0, |&offset| offset as usize);
        at(row)..at(row + 1)
    }

    /// The atoms of a row as they come.
    pub(super) fn raw(&self, row: usize) -> Molecule<'a> {
        let range = self.range(row);
        Molecule {
            atomic_number: &self.atomic_number[range.clone()],
            formal_charge: self.formal_charge.map(|charge| &charge[range.clone()]),
            xyz: &self.xyz[range],
        }
    }

    /// The atoms of a row, checked.
    ///
    /// # Errors
    /// As `Molecule::check`, of this block.
    pub(super) fn row(&self, row: usize) -> Result<Molecule<'a>, Failure> {
        let molecule = self.raw(row);
        molecule.check().map_err(|failure| failure.argument(self.argument))?;
        Ok(molecule)
    }
}

/// A checked column of bonds, or none: then they are found.
pub(super) struct Bonds {
    argument: i32,
    offsets: InIf<i64>,
    atoms: In<i32>,
    order: In<f64>,
    bonds: usize,
}

impl Bonds {
    /// Enters the arrays of the block that has this catalogue number.
    ///
    /// # Errors
    /// `NegativeCount`, `TooLarge`, `NullPointer`, `Misaligned` of the argument.
    pub(super) fn new(arrays: &mut Arrays, argument: i32, rows: usize, from: &BondArrays) -> Result<Self, Failure> {
        let bonds = count(from.n_bonds).map_err(|failure| failure.argument(argument))?;
        let found = from.bond_offsets.is_null();
        // Bonds without their offsets are a slip, not a wish to have them found.
        if found && (!from.bond_atoms.is_null() || bonds > 0) {
            return Err(Failure::of(Code::NullPointer, argument));
        }
        let offsets = arrays.input_if(argument, from.bond_offsets, if rows == 0 { 0 } else { rows + 1 })?;
        let atoms = arrays.input(argument, from.bond_atoms, 2 * bonds)?;
        let order = arrays.input(argument, from.bond_order, bonds)?;
        Ok(Self { argument, offsets, atoms, order, bonds })
    }

    /// The column as slices.
    ///
    /// # Errors
    /// `BadOffsets` of the argument.
    pub(super) fn view<'a>(&self) -> Result<BondView<'a>, Failure> {
        let given = match self.offsets.slice() {
            Some(offsets) => {
                let offsets = checked_offsets(offsets, self.bonds, self.argument)?;
                Some((offsets, self.atoms.slice(), self.order.slice()))
            }
            None => None,
        };
        Ok(BondView { argument: self.argument, given })
    }
}

/// A column of bonds as slices.
#[derive(Clone, Copy)]
pub(super) struct BondView<'a> {
    argument: i32,
    given: Option<(&'a [i64], &'a [i32], &'a [f64])>,
}

impl BondView<'_> {
    /// True where no bonds were given, so that they are found.
    pub(super) fn is_found(&self) -> bool {
        self.given.is_none()
    }

    /// The bonds of a row as they come, if they are given; an atom below 0 becomes one that is not there.
    pub(super) fn stated(&self, row: usize) -> Option<Vec<Bond>> {
        let (offsets, atoms, order) = self.given?;
        let atom = |a: i32| u32::try_from(a).unwrap_or(u32::MAX);
        let range = offsets[row] as usize..offsets[row + 1] as usize;
        Some(range.map(|i| Bond { a: atom(atoms[2 * i]), b: atom(atoms[2 * i + 1]), order: order[i] }).collect())
    }

    /// The bonding of a row: as given, else found by the rule.
    ///
    /// # Errors
    /// As `given_bonds` of this block, or as `find_bonds` of the block of molecules.
    pub(super) fn bonding(&self, row: usize, molecule: Molecule<'_>, rule: Selector) -> Result<Bonding, Failure> {
        let Some((offsets, atoms, order)) = self.given else {
            return find_bonds(molecule, rule).map_err(|failure| failure.argument(self.argument - 1));
        };
        let range = offsets[row] as usize..offsets[row + 1] as usize;
        let mut bonds = Vec::with_capacity(range.len());
        for (k, i) in range.enumerate() {
            let fail = |code| Failure::of(code, self.argument).item(k);
            let atom = |a: i32| match a {
                i32::MIN => Err(fail(Code::Missing)),
                a => u32::try_from(a).map_err(|_| fail(Code::BadBond)),
            };
            if order[i].is_nan() {
                return Err(fail(Code::Missing));
            }
            bonds.push(Bond { a: atom(atoms[2 * i])?, b: atom(atoms[2 * i + 1])?, order: order[i] });
        }
        let bonding = given_bonds(molecule, &bonds).map_err(|failure| failure.argument(self.argument))?;
        given_lengths(molecule, &bonding).map_err(|failure| failure.argument(self.argument - 1))?;
        Ok(bonding)
    }
}

/// The caller's charges, an atom each, where the model is the given charges.
pub(super) struct ChargeColumn(Option<Quantities>);

impl ChargeColumn {
    /// Enters the charges, which the model of given charges needs and every other model forbids.
    ///
    /// # Errors
    /// `NullPointer`, `NotAllowed`, `Misaligned`, `TooLarge` of the argument.
    pub(super) fn new(
        arrays: &mut Arrays,
        argument: i32,
        model: Selector,
        charge: *const f64,
        u: *const f64,
        atoms: usize,
    ) -> Result<Self, Failure> {
        match (model == CHARGES_GIVEN, charge.is_null()) {
            (false, true) if !u.is_null() => return Err(Failure::of(Code::NullPointer, argument)),
            (false, true) => return Ok(Self(None)),
            (false, false) => return Err(Failure::of(Code::NotAllowed, argument)),
            // A column without atoms needs no charges.
            (true, true) if atoms > 0 => return Err(Failure::of(Code::NullPointer, argument)),
            (true, _) => {}
        }
        arrays.quantities(argument, charge, u, atoms).map(|charges| Self(Some(charges)))
    }

    /// The charges as slices over all atoms.
    pub(super) fn view<'a>(&self) -> Option<(&'a [f64], Option<&'a [f64]>)> {
        self.0.map(Quantities::slices)
    }
}

/// Remarks, item at fault and status of every row, each where it is wanted.
#[derive(Clone, Copy)]
pub(super) struct Ends {
    remarks: Out<i32>,
    item: Out<i32>,
    status: Out<i32>,
}

impl Ends {
    /// Enters the three arrays.
    ///
    /// # Errors
    /// `Misaligned`, `TooLarge`.
    pub(super) fn new(
        arrays: &mut Arrays,
        rows: usize,
        remarks: *mut i32,
        item: *mut i32,
        status: *mut i32,
    ) -> Result<Self, Failure> {
        Ok(Self {
            remarks: arrays.output_if(0, remarks, rows)?,
            item: arrays.output_if(0, item, rows)?,
            status: arrays.output_if(0, status, rows)?,
        })
    }

    /// Writes the end of a row: remarks and the atom that they are about (−1: none), or the failure.
    pub(super) fn set(self, row: usize, end: Result<(i32, i32), Failure>) {
        let (remarks, item, status) = match end {
            Ok((remarks, item)) => (remarks, item, 0),
            Err(failure) => (0, failure.item, failure.status()),
        };
        for (out, value) in [(self.remarks, remarks), (self.item, item), (self.status, status)] {
            out.set(row, value);
        }
    }
}

/// Remarks of a row and the atom that they are about (−1: none).
pub(super) fn remarks_of(molecule: Molecule<'_>, bonding: &Bonding) -> (i32, i32) {
    let several = Neighbours::new(molecule.len(), &bonding.bonds).fragments().1 > 1;
    let several = if several { remark::SEVERAL_FRAGMENTS } else { 0 };
    (bonding.remarks | several, bonding.item.map_or(-1, |item| i32::try_from(item).unwrap_or(-1)))
}

/// Why a model has no charges: where no argument is named, the model is.
pub(super) fn of_model(failure: Failure) -> Failure {
    if failure.code == Code::NoData && failure.argument == 0 { failure.argument(1) } else { failure }
}

/// Writes numbers of a row side by side; the one NaN, no negative zero.
pub(super) fn set_numbers(out: Out<f64>, start: usize, values: &[f64]) {
    for (k, &value) in values.iter().enumerate() {
        out.set(start + k, clean(value));
    }
}

/// The end of a plain form, made of the column of one row: its status is that of the row. Where the call itself failed,
/// nothing was written; then the numbers (pointer and length) become NaN and the integers what stands beside them, so that
/// no stale result stays behind. Arrays that may not be written to at all are left alone.
///
/// # Safety
/// Each pointer is NULL or leads to as many elements as stands beside it.
pub(super) unsafe fn one_row(code: i32, status: i32, numbers: &[(*mut f64, i64)], integers: &[(*mut i32, i32)]) -> i32 {
    if code == Code::NoRows as i32 || code == Code::SomeRows as i32 {
        return status;
    }
    let unfit = [Code::Overlap, Code::Misaligned, Code::TooLarge, Code::BufferTooSmall].map(|code| code as i32);
    if code == Code::Ok as i32 || unfit.contains(&(code % 1000)) {
        return code;
    }
    for &(pointer, length) in numbers {
        for i in 0..usize::try_from(length).unwrap_or(0) {
            if !pointer.is_null() && pointer.is_aligned() {
                // SAFETY: the caller's promise; not NULL and aligned.
                unsafe { pointer.add(i).write(super::arrays::NAN) }
            }
        }
    }
    for &(pointer, blank) in integers {
        if !pointer.is_null() && pointer.is_aligned() {
            // SAFETY: as above.
            unsafe { pointer.write(blank) }
        }
    }
    code
}
