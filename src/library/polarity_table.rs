//! The three tables of a run: polarity (one row a record), bonds, atoms; keyed by `record` and `compound`.
//!
//! Atoms are numbered from 1, as in the file. A cell without a value holds the status that says why. Every record has its
//! polarity row, broken ones with the status `BROKEN_RECORD` and the reason in `detail`.

use std::sync::atomic::{AtomicBool, Ordering};

use super::record::{Entry, Problem};
use super::rows::add_rows;
use super::settings::Settings;
use super::table::{ColumnKind, Table};
use crate::molecule::Bonding;
use crate::parallel::{Threads, map_rows};
use crate::selectors::{Selector, TYPE_INTEGER, TYPE_NUMBER, TYPE_TEXT};
use crate::status::{Code, Failure};

const fn column(name: &'static str, kind: Selector, unit: &'static str, help: &'static str) -> ColumnKind {
    ColumnKind { name, kind, unit, help }
}

/// Columns of the polarity table; the carried data items follow.
pub static POLARITY_COLUMNS: &[ColumnKind] = &[
    column("record", TYPE_TEXT, "", "File and number of the record, file:number"),
    column("compound", TYPE_TEXT, "", "Title, else the naming data item, else file stem and number"),
    column("formula", TYPE_TEXT, "", "Molecular formula by Hill's system; D and T count as H"),
    column("atoms", TYPE_INTEGER, "", "Number of atoms"),
    column("net_charge", TYPE_INTEGER, "e", "Sum of the formal charges [e]"),
    column("fragments", TYPE_INTEGER, "", "Number of fragments not bonded to one another"),
    column("charge_sites", TYPE_INTEGER, "", "Charged groups that their neighbours do not make neutral"),
    column("structure_kind", TYPE_TEXT, "", "Kind of record: molecule, ion, zwitterion, flat drawing, ..."),
    column("dipole_D", TYPE_NUMBER, "D", "Magnitude of the dipole [D]"),
    column("u_dipole_D", TYPE_NUMBER, "D", "Its standard uncertainty (k = 1) [D]"),
    column("dipole_x_D", TYPE_NUMBER, "D", "Dipole along x of the file, from - to + [D]"),
    column("dipole_y_D", TYPE_NUMBER, "D", "Dipole along y of the file, from - to + [D]"),
    column("dipole_z_D", TYPE_NUMBER, "D", "Dipole along z of the file, from - to + [D]"),
    column("cov_xx_D2", TYPE_NUMBER, "D²", "Covariance of the dipole vector, xx [D²]"),
    column("cov_yy_D2", TYPE_NUMBER, "D²", "Covariance of the dipole vector, yy [D²]"),
    column("cov_zz_D2", TYPE_NUMBER, "D²", "Covariance of the dipole vector, zz [D²]"),
    column("cov_xy_D2", TYPE_NUMBER, "D²", "Covariance of the dipole vector, xy [D²]"),
    column("cov_xz_D2", TYPE_NUMBER, "D²", "Covariance of the dipole vector, xz [D²]"),
    column("cov_yz_D2", TYPE_NUMBER, "D²", "Covariance of the dipole vector, yz [D²]"),
    column("polarity", TYPE_TEXT, "", "polar, non-polar, undecided or charged"),
    column(
        "strongest_bond",
        TYPE_TEXT,
        "",
        "Bond of greatest difference of electronegativity; - = ≡ order, ≈ aromatic, ~ none",
    ),
    column("delta_chi", TYPE_NUMBER, "", "Its difference of electronegativity, not negative"),
    column("negative_end", TYPE_TEXT, "", "Its more electronegative atom"),
    column(
        "strongest_bond_charge_e",
        TYPE_NUMBER,
        "e",
        "Charge that it has drawn along that bond by the charge model [e]",
    ),
    column("charge_model", TYPE_TEXT, "", "Model of the partial charges"),
    column("data_version", TYPE_TEXT, "", "Version of the embedded tables"),
    column("status", TYPE_TEXT, "", "OK, or why the row has no dipole"),
    column("detail", TYPE_TEXT, "", "Remarks in plain words, separated by semicolons"),
];

/// Columns of the table of bonds.
pub static BONDS_COLUMNS: &[ColumnKind] = &[
    column("record", TYPE_TEXT, "", "File and number of the record, file:number"),
    column("compound", TYPE_TEXT, "", "As in the polarity table"),
    column("atom_a", TYPE_INTEGER, "", "Number of the first atom, from 1"),
    column("atom_b", TYPE_INTEGER, "", "Number of the second atom, from 1"),
    column("element_a", TYPE_TEXT, "", "Symbol of the first atom"),
    column("element_b", TYPE_TEXT, "", "Symbol of the second atom"),
    column("order", TYPE_NUMBER, "", "Bond order; 1.5 aromatic, 0 not assigned"),
    column("length_A", TYPE_NUMBER, "Å", "Distance of the two atoms [Å]"),
    column("expected_A", TYPE_NUMBER, "Å", "Length expected from covalent radii and order; not for ionic bonds [Å]"),
    column("u_expected_A", TYPE_NUMBER, "Å", "Its standard uncertainty (k = 1) [Å]"),
    column("deviation_A", TYPE_NUMBER, "Å", "Length less expected length [Å]"),
    column("delta_chi", TYPE_NUMBER, "", "Electronegativity of atom b less that of atom a"),
    column("negative_end", TYPE_TEXT, "", "The more electronegative atom; empty for like atoms"),
    column("ionic_percent", TYPE_NUMBER, "%", "Ionic character by the law chosen [%]"),
    column(
        "bond_charge_e",
        TYPE_NUMBER,
        "e",
        "Charge of atom a drawn by atom b along the bond, by the charge model [e]",
    ),
    column("class", TYPE_TEXT, "", "non-polar, polar or ionic; expected_A is not for ionic bonds"),
];

/// Columns of the table of atoms.
pub static ATOMS_COLUMNS: &[ColumnKind] = &[
    column("record", TYPE_TEXT, "", "File and number of the record, file:number"),
    column("compound", TYPE_TEXT, "", "As in the polarity table"),
    column("atom", TYPE_INTEGER, "", "Number of the atom, from 1"),
    column("element", TYPE_TEXT, "", "Symbol"),
    column("x_A", TYPE_NUMBER, "Å", "Coordinate x [Å]"),
    column("y_A", TYPE_NUMBER, "Å", "Coordinate y [Å]"),
    column("z_A", TYPE_NUMBER, "Å", "Coordinate z [Å]"),
    column("charge_e", TYPE_NUMBER, "e", "Partial charge [e]"),
    column("u_charge_e", TYPE_NUMBER, "e", "Its standard uncertainty (k = 1) [e]"),
    column("covalent_radius_A", TYPE_NUMBER, "Å", "Covalent radius, single bond [Å]"),
    column("vdw_radius_A", TYPE_NUMBER, "Å", "Van der Waals radius [Å]"),
];

/// Which of the three tables are wanted.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Wanted {
    /// Rows of the polarity table.
    pub polarity: bool,
    /// Rows of the table of bonds.
    pub bonds: bool,
    /// Rows of the table of atoms.
    pub atoms: bool,
}

impl Wanted {
    /// All three.
    pub const ALL: Self = Self { polarity: true, bonds: true, atoms: true };
}

/// The three tables; one that is not wanted has no rows.
#[derive(Clone, Debug)]
pub struct Tables {
    /// One row a record.
    pub polarity: Table,
    /// One row a bond.
    pub bonds: Table,
    /// One row an atom.
    pub atoms: Table,
}

impl Tables {
    /// Three tables without rows.
    pub fn new(settings: &Settings) -> Self {
        let carried: Vec<String> = settings.carried().into_iter().map(|(_, column)| column).collect();
        Self {
            polarity: Table::new(POLARITY_COLUMNS, &carried),
            bonds: Table::new(BONDS_COLUMNS, &[]),
            atoms: Table::new(ATOMS_COLUMNS, &[]),
        }
    }

    /// Adds the rows of others with the same columns.
    pub fn append(&mut self, other: &Self) {
        self.polarity.append(&other.polarity);
        self.bonds.append(&other.bonds);
        self.atoms.append(&other.atoms);
    }
}

/// A record, with its bonds where they are known already.
pub(super) type Task<'a> = (&'a Entry, Option<&'a Result<Bonding, Failure>>);

/// Records computed by one thread at a time; they share their small tables.
const CHUNK: usize = 16;

/// The three tables of some records, in their order, the same for any number of threads.
///
/// # Errors
/// `OutOfRange` (settings that contradict one another), `Stopped`.
pub(super) fn tables_of(
    tasks: &[Task<'_>],
    settings: &Settings,
    wanted: Wanted,
    threads: Threads,
    stop: &AtomicBool,
) -> Result<Tables, Problem> {
    settings.check().map_err(|failure| Problem::new(failure.code, "ionic_from must not be below polar_from"))?;
    let chunks: Vec<&[Task<'_>]> = tasks.chunks(CHUNK).collect();
    let atoms: usize = tasks.iter().map(|(entry, _)| entry.atoms()).sum();
    let work = tasks.len().saturating_mul(20).saturating_add(atoms.saturating_mul(5));
    let parts = map_rows(chunks.len(), work, threads, |i| {
        let mut tables = Tables::new(settings);
        for &(entry, bonding) in chunks.get(i).copied().unwrap_or(&[]) {
            if stop.load(Ordering::Relaxed) {
                return None;
            }
            add_rows(entry, bonding, settings, wanted, &mut tables);
        }
        Some(tables)
    });
    let mut all = Tables::new(settings);
    for part in parts {
        match part {
            Some(part) => all.append(&part),
            None => return Err(stopped()),
        }
    }
    Ok(all)
}

/// The end of a call on request.
pub(super) fn stopped() -> Problem {
    Problem::new(Code::Stopped, Code::Stopped.text())
}
