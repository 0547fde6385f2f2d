//! The rows of one record: what is computed from it, and in which words it is told.

use super::expected::{expected_lengths, length_of, states_of};
use super::formula::{atom_label, hill_formula};
use super::fragments::{Computed, compute};
use super::kinds::{Kind, kind_of};
use super::polarity_table::{Tables, Wanted};
use super::record::{Broken, Entry, Record};
use super::remarks::Words;
use super::settings::Settings;
use super::strongest::{polarity_of, shown_order, strongest_bond};
use super::table::Cell;
use crate::bonds::find::{find_bonds, given_bonds};
use crate::bonds::ionic_character;
use crate::catalogue::DATA_VERSION;
use crate::elements::{covalent_radius, symbol, vdw_radius};
use crate::molecule::Bonding;
use crate::quantity::Quantity;
use crate::selectors;
use crate::status::{Code, Failure};

/// The bonds of a record: as stated, else found from the coordinates.
pub(super) fn bonding_of(record: &Record) -> Result<Bonding, Failure> {
    match &record.bonds {
        Some(bonds) => given_bonds(record.molecule(), bonds),
        None => find_bonds(record.molecule(), selectors::BONDS_ALTERNATING),
    }
}

/// Columns of the polarity table before `charge_model`.
const UP_TO_CHARGES: usize = 24;

/// Adds the rows of one record to the tables.
pub(super) fn add_rows(
    entry: &Entry,
    bonding: Option<&Result<Bonding, Failure>>,
    settings: &Settings,
    wanted: Wanted,
    tables: &mut Tables,
) {
    let key = entry.place().key();
    let compound = compound_of(entry, settings);
    match entry {
        Entry::Broken(broken) => {
            if wanted.polarity {
                broken_row(broken, &key, &compound, settings, tables);
            }
        }
        Entry::Molecule(record) => {
            let own;
            let bonding = match bonding {
                Some(bonding) => bonding,
                None => {
                    own = bonding_of(record);
                    &own
                }
            };
            let row = Row { key: &key, compound: &compound, record, settings };
            match bonding {
                Ok(bonding) => {
                    let kind = kind_of(record, bonding);
                    let computed = compute(record, bonding, &kind, settings);
                    if wanted.polarity {
                        row.polarity(bonding, &kind, &computed, tables);
                    }
                    if wanted.bonds {
                        row.bonds(bonding, &kind, &computed, tables);
                    }
                    if wanted.atoms {
                        row.atoms(Some((bonding, &kind, &computed)), tables);
                    }
                }
                Err(failure) => {
                    if wanted.polarity {
                        row.failed(*failure, tables);
                    }
                    if wanted.atoms {
                        row.atoms(None, tables);
                    }
                }
            }
        }
    }
}

/// The name of the compound: the title, else the data item that the settings name, else file stem and number.
fn compound_of(entry: &Entry, settings: &Settings) -> String {
    if !entry.title().is_empty() {
        return entry.title().to_owned();
    }
    if let Entry::Molecule(record) = entry {
        let named = record.item(&settings.name_item).map(str::trim).filter(|name| !name.is_empty());
        if let Some(name) = named {
            return name.lines().next().unwrap_or(name).to_owned();
        }
    }
    let place = entry.place();
    let file = place.file.rsplit(['/', '\\']).next().unwrap_or("");
    let stem = file.rsplit_once('.').map_or(file, |(stem, _)| if stem.is_empty() { file } else { stem });
    format!("{stem} {}", place.number)
}

fn broken_row(broken: &Broken, key: &str, compound: &str, settings: &Settings, tables: &mut Tables) {
    let code = Code::BrokenRecord;
    let text = broken.text();
    let mut cells = vec![Cell::Text(key), Cell::Text(compound)];
    cells.resize(UP_TO_CHARGES, Cell::None(code));
    cells.extend([
        Cell::Text(settings.charge_model.name()),
        Cell::Text(DATA_VERSION),
        Cell::Text(code.name()),
        Cell::Text(&text),
    ]);
    tables.polarity.push_row(&cells);
}

fn number(value: Result<f64, Code>) -> Cell<'static> {
    value.map_or_else(Cell::None, Cell::Number)
}

fn count(value: usize) -> Cell<'static> {
    i32::try_from(value).map_or(Cell::None(Code::TooLarge), Cell::Integer)
}

struct Row<'a> {
    key: &'a str,
    compound: &'a str,
    record: &'a Record,
    settings: &'a Settings,
}

impl Row<'_> {
    fn polarity(&self, bonding: &Bonding, kind: &Kind, computed: &Computed, tables: &mut Tables) {
        let record = self.record;
        let formula = hill_formula(&record.atomic_number);
        let (strongest, lacking) = strongest_bond(record, bonding, self.settings);
        let words = Words { record, bonding, kind, computed, settings: self.settings };
        let detail = words.detail(strongest.as_ref().ok(), &lacking);
        let net_charge = if kind.lacks_hydrogens && record.formal_charge.is_none() {
            Cell::None(Code::HydrogensMissing)
        } else {
            i32::try_from(kind.net_charge).map_or(Cell::None(Code::TooLarge), Cell::Integer)
        };
        let mut cells = vec![
            Cell::Text(self.key),
            Cell::Text(self.compound),
            Cell::Text(&formula),
            count(record.atomic_number.len()),
            net_charge,
            count(kind.fragments),
            count(kind.charge_sites),
            Cell::Text(kind.structure.name()),
        ];
        match &computed.verdict {
            Ok(verdict) => {
                let dipole = &verdict.dipole;
                let [[xx, xy, xz], [_, yy, yz], [_, _, zz]] = dipole.covariance;
                let not_known = |u: f64| if u.is_nan() { Cell::None(Code::NoData) } else { Cell::Number(u) };
                cells.push(Cell::Number(dipole.magnitude.value));
                cells.push(not_known(dipole.magnitude.u));
                cells.extend(dipole.vector.map(Cell::Number));
                cells.extend([xx, yy, zz, xy, xz, yz].map(not_known));
                cells.push(Cell::Text(verdict.polarity.title()));
            }
            Err(failure) => cells.resize(cells.len() + 12, Cell::None(failure.code)),
        }
        let negative;
        match &strongest {
            Ok(bond) => {
                negative = bond.negative.map_or(String::new(), |atom| atom_label(&record.atomic_number, atom));
                // Counted at the positive end, so that it is positive where the model agrees with the electronegativities.
                let charge = match bond.negative {
                    Some(atom) => {
                        let given = computed.bond_charge(bond.bond, bond.a);
                        given.map(|q| if atom == bond.a { -q } else { q })
                    }
                    None => Err(Code::NoData),
                };
                cells.extend([Cell::Text(&bond.label), Cell::Number(bond.delta_chi), Cell::Text(&negative)]);
                cells.push(number(charge));
            }
            Err(code) => cells.extend([Cell::None(*code); 4]),
        }
        self.finish(cells, computed.status(), &detail, tables);
    }

    /// The row of a record whose bonds cannot be had.
    fn failed(&self, failure: Failure, tables: &mut Tables) {
        let record = self.record;
        let formula = hill_formula(&record.atomic_number);
        let at = usize::try_from(failure.item).ok();
        let mut detail = failure.code.text().to_owned();
        if let Some(item) = at {
            match failure.code {
                Code::BadBond => detail.push_str(&format!(" (bond {})", item + 1)),
                _ => detail.push_str(&format!(" ({})", atom_label(&record.atomic_number, item))),
            }
        }
        let mut cells = vec![Cell::Text(self.key), Cell::Text(self.compound), Cell::Text(&formula)];
        cells.push(count(record.atomic_number.len()));
        cells.resize(UP_TO_CHARGES, Cell::None(failure.code));
        self.finish(cells, failure.code, &detail, tables);
    }

    /// The last columns: model, versions, status, detail, carried items.
    fn finish<'b>(&'b self, mut cells: Vec<Cell<'b>>, status: Code, detail: &'b str, tables: &mut Tables) {
        cells.extend([
            Cell::Text(self.settings.charge_model.name()),
            Cell::Text(DATA_VERSION),
            Cell::Text(status.name()),
            Cell::Text(detail),
        ]);
        let carried = self.settings.carried();
        cells.extend(carried.iter().map(|(item, _)| match self.record.item(item) {
            Some(value) => Cell::Text(value),
            None => Cell::None(Code::Missing),
        }));
        tables.polarity.push_row(&cells);
    }

    fn bonds(&self, bonding: &Bonding, kind: &Kind, computed: &Computed, tables: &mut Tables) {
        let record = self.record;
        let states = states_of(record, bonding, self.settings.covalent_radii);
        let expected_lengths = expected_lengths(record, bonding, &states, self.settings);
        for (i, &bond) in bonding.bonds.iter().enumerate() {
            let z = |atom: u32| record.atomic_number.get(atom as usize).copied().unwrap_or(0);
            let order = shown_order(bond, bonding.aromatic.get(i).copied().unwrap_or(false));
            let length = if kind.drawing { Err(Code::FlatDrawing) } else { length_of(record, bond) };
            let expected = expected_lengths.get(i).copied().unwrap_or(Err(Code::NoData));
            let deviation = match (length, expected) {
                (Ok(length), Ok(expected)) => Ok(length - expected.value),
                (Err(code), _) | (_, Err(code)) => Err(code),
            };
            let polarity = polarity_of(record, bond, self.settings).map_err(|failure| failure.code);
            let ionic = polarity.and_then(|p| {
                ionic_character(self.settings.ionic_law, p.delta_chi).map(|q| q.value).map_err(|failure| failure.code)
            });
            let negative = match polarity.map(|p| p.negative_end) {
                Ok(selectors::END_A) => atom_label(&record.atomic_number, bond.a as usize),
                Ok(selectors::END_B) => atom_label(&record.atomic_number, bond.b as usize),
                _ => String::new(),
            };
            let u = expected.and_then(|q| if q.u.is_nan() { Err(Code::NoData) } else { Ok(q.u) });
            tables.bonds.push_row(&[
                Cell::Text(self.key),
                Cell::Text(self.compound),
                count(bond.a as usize + 1),
                count(bond.b as usize + 1),
                Cell::Text(symbol(z(bond.a)).unwrap_or("")),
                Cell::Text(symbol(z(bond.b)).unwrap_or("")),
                Cell::Number(order),
                number(length),
                number(expected.map(|q| q.value)),
                number(u),
                number(deviation),
                number(polarity.map(|p| p.delta_chi.value)),
                polarity.map_or_else(Cell::None, |_| Cell::Text(&negative)),
                number(ionic),
                number(computed.bond_charge(i, bond.a as usize)),
                polarity.map_or_else(Cell::None, |p| Cell::Text(p.class.title())),
            ]);
        }
    }

    fn atoms(&self, found: Option<(&Bonding, &Kind, &Computed)>, tables: &mut Tables) {
        let record = self.record;
        let states = found.map(|(bonding, _, _)| states_of(record, bonding, self.settings.covalent_radii));
        for (atom, &z) in record.atomic_number.iter().enumerate() {
            let drawing = found.is_some_and(|(_, kind, _)| kind.drawing);
            let xyz = record.xyz.get(atom).copied().unwrap_or([f64::NAN; 3]);
            let xyz = xyz.map(|x| if drawing { Cell::None(Code::FlatDrawing) } else { Cell::Number(x) });
            let charge = found.map_or(Err(Code::NoBonds), |(_, _, computed)| computed.charge(atom));
            let u = charge.and_then(|q| if q.u.is_nan() { Err(Code::NoData) } else { Ok(q.u) });
            let state = states.as_ref().and_then(|states| states.get(atom)).copied();
            let state = state.unwrap_or(selectors::STATE_AS_LISTED);
            let value = |radius: Result<Quantity, Failure>| radius.map(|q| q.value).map_err(|failure| failure.code);
            tables.atoms.push_row(&[
                Cell::Text(self.key),
                Cell::Text(self.compound),
                count(atom + 1),
                Cell::Text(symbol(z).unwrap_or("")),
                xyz[0],
                xyz[1],
                xyz[2],
                number(charge.map(|q| q.value)),
                number(u),
                number(value(covalent_radius(self.settings.covalent_radii, z, state))),
                number(value(vdw_radius(self.settings.vdw_radii, z))),
            ]);
        }
    }
}
