//! A CML molecule on its way from elements to a record.
//!
//! Atoms come one an element or as lists in the attributes of `atomArray`; so do bonds. Nested molecules are fragments of
//! the outer one. Coordinates in space (`x3 y3 z3`) make a geometry, those on paper (`x2 y2`) or none a drawing. Charges stand
//! on atoms; where only a molecule or fragment states one, it is that of its only atom, or the bonds say which atoms
//! carry it, or the record is refused. Fractional coordinates are not read.

use std::borrow::Cow;
use std::collections::BTreeMap;

use super::super::ctfile::Fault;
use super::super::lines::{decimal, integer, quoted};
use super::super::record::{Broken, Entry, Place, Record, bonded_twice};
use crate::molecule::Bond;

/// Attributes of an element as (name, value).
pub(super) type Attributes<'a> = Vec<(&'a str, Cow<'a, str>)>;

/// What an element is to a molecule, given the element that it stands in.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Kind {
    Molecule,
    AtomArray,
    Atom,
    BondArray,
    Bond,
    BondStereo,
    Name,
    PropertyList,
    Property,
    Scalar,
    Other,
}

impl Kind {
    pub fn of(name: &str, parent: Option<&Kind>) -> Self {
        match (name, parent) {
            ("molecule", _) => Kind::Molecule,
            ("atomArray", Some(Kind::Molecule)) => Kind::AtomArray,
            ("atom", Some(Kind::AtomArray | Kind::Molecule)) => Kind::Atom,
            ("bondArray", Some(Kind::Molecule)) => Kind::BondArray,
            ("bond", Some(Kind::BondArray | Kind::Molecule)) => Kind::Bond,
            ("bondStereo", Some(Kind::Bond)) => Kind::BondStereo,
            ("name", Some(Kind::Molecule)) => Kind::Name,
            ("propertyList", Some(Kind::Molecule | Kind::PropertyList)) => Kind::PropertyList,
            ("property", Some(Kind::Molecule | Kind::PropertyList)) => Kind::Property,
            ("scalar", Some(Kind::Molecule | Kind::Property)) => Kind::Scalar,
            _ => Kind::Other,
        }
    }
}

/// A molecule that is open: the outermost one or a fragment in it.
#[derive(Debug)]
pub(super) struct Fragment {
    pub(super) line: u64,
    /// Its first atom.
    first: usize,
    /// Atoms by their names; `None` for a name that several fragments use.
    pub(super) names: BTreeMap<String, Option<u32>>,
    pub(super) bonds: Vec<NamedBond>,
    pub(super) charge: Option<i64>,
}

#[derive(Debug)]
pub(super) struct NamedBond {
    pub(super) number: usize,
    pub(super) line: u64,
    pub(super) atoms: [String; 2],
    /// `None` for a hydrogen bond.
    pub(super) order: Option<f64>,
    pub(super) wedge: i32,
}

/// The charge that a molecule or fragment states for its atoms.
#[derive(Debug)]
pub(super) struct Total {
    pub(super) line: u64,
    pub(super) atoms: std::ops::Range<usize>,
    pub(super) charge: i64,
}

/// How an atom's coordinates are stated.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Coordinates {
    Space,
    Paper,
    Nowhere,
}

/// What is known of an open molecule.
#[derive(Debug)]
pub(super) struct Building {
    pub(super) record: Record,
    line: u64,
    titled: bool,
    reference: bool,
    pub(super) fragments: Vec<Fragment>,
    pub(super) totals: Vec<Total>,
    pub(super) charges: Vec<Option<i32>>,
    pub(super) hydrogens: Vec<(u32, i64)>,
    pub(super) coordinates: Option<Coordinates>,
    bonds: Vec<Bond>,
    /// Line and names of each bond.
    origin: Vec<(u64, [String; 2])>,
    pub(super) bonds_read: usize,
    bonds_stated: bool,
    text: String,
    /// Name of the property that is open, and of the data item in it.
    property: String,
    item: String,
    fault: Option<Fault>,
}

impl Building {
    pub fn new(line: u64) -> Self {
        Self {
            record: Record::default(),
            line,
            titled: false,
            reference: false,
            fragments: Vec::new(),
            totals: Vec::new(),
            charges: Vec::new(),
            hydrogens: Vec::new(),
            coordinates: None,
            bonds: Vec::new(),
            origin: Vec::new(),
            bonds_read: 0,
            bonds_stated: false,
            text: String::new(),
            property: String::new(),
            item: String::new(),
            fault: None,
        }
    }

    /// Line on which the molecule begins.
    pub fn line(&self) -> u64 {
        self.line
    }

    /// Its title, as far as it was read.
    pub fn title(&self) -> String {
        self.record.title.clone()
    }

    /// It only refers to a molecule that stands elsewhere.
    pub fn is_reference(&self) -> bool {
        self.reference && self.record.atomic_number.is_empty() && self.fault.is_none()
    }

    /// Notes what is wrong; the first fault counts.
    pub fn wrong(&mut self, line: u64, what: String) {
        self.fault.get_or_insert((line, what));
    }

    /// Refuses the molecule and lets go of what it holds.
    pub fn too_long(&mut self, what: String) {
        let line = self.line;
        self.wrong(line, what);
        self.record = Record { title: self.title(), ..Record::default() };
        self.bonds = Vec::new();
        for fragment in &mut self.fragments {
            fragment.names.clear();
            fragment.bonds = Vec::new();
        }
    }

    /// An element begins.
    pub fn start(&mut self, kind: Kind, attributes: &Attributes<'_>, line: u64) {
        let get = |name: &str| attributes.iter().find(|(known, _)| *known == name).map(|(_, value)| value.as_ref());
        match kind {
            Kind::Molecule => self.molecule(&get, line),
            Kind::Name | Kind::BondStereo => self.text.clear(),
            Kind::Property => self.property = item_name(&get).unwrap_or_default(),
            Kind::Scalar => {
                self.text.clear();
                let own = || item_name(&get).unwrap_or_else(|| "scalar".to_owned());
                self.item = if self.property.is_empty() { own() } else { self.property.clone() };
            }
            _ if self.fault.is_some() => {}
            Kind::Atom => {
                let read = self.atom(&get, line);
                self.note(read);
            }
            Kind::AtomArray => {
                let read = self.atoms(&get, line);
                self.note(read);
            }
            Kind::BondArray => {
                self.bonds_stated = true;
                let read = self.bonds(&get, line);
                self.note(read);
            }
            Kind::Bond => {
                self.bonds_stated = true;
                let (atoms, order) = (get("atomRefs2").map(|atoms| (atoms, "")), get("order"));
                let read = self.bond(atoms, order, line);
                self.note(read);
            }
            Kind::PropertyList | Kind::Other => {}
        }
    }

    /// Text of the innermost open element.
    pub fn text(&mut self, kind: Kind, text: &str) {
        if matches!(kind, Kind::Name | Kind::Scalar | Kind::BondStereo) {
            self.text.push_str(text);
        }
    }

    /// An element ends; true if it was the outermost molecule.
    pub fn end(&mut self, kind: Kind) -> bool {
        let outermost = self.fragments.len() == 1;
        match kind {
            Kind::Name if outermost => {
                let name = self.text.trim().to_owned();
                if !self.titled && self.record.title.is_empty() {
                    self.record.title = name;
                } else if name != self.record.title {
                    self.record.data.push(("name".to_owned(), name));
                }
            }
            Kind::Scalar if outermost => {
                self.record.data.push((std::mem::take(&mut self.item), self.text.trim().to_owned()));
            }
            Kind::Property => self.property.clear(),
            Kind::BondStereo => {
                let wedge = match self.text.trim() {
                    "W" => 1,
                    "H" => 6,
                    _ => 0,
                };
                if let Some(bond) = self.fragments.last_mut().and_then(|fragment| fragment.bonds.last_mut()) {
                    bond.wedge = wedge;
                }
            }
            Kind::Molecule => {
                let read = self.close();
                self.note(read);
                return self.fragments.is_empty();
            }
            _ => {}
        }
        false
    }

    fn note(&mut self, read: Result<(), Fault>) {
        if let Err((line, what)) = read {
            self.wrong(line, what);
        }
    }

    fn molecule<'a>(&mut self, get: &dyn Fn(&str) -> Option<&'a str>, line: u64) {
        if self.fragments.is_empty() {
            let title = get("title").map_or("", str::trim);
            self.titled = !title.is_empty();
            self.record.title = title.to_owned();
            self.reference = get("ref").is_some();
        } else if get("ref").is_some() {
            self.wrong(line, "a fragment refers to another molecule; expected its atoms".to_owned());
        }
        if let Some(count) = get("count").filter(|count| decimal(count) != Some(1.0)) {
            self.wrong(line, format!("the fragment is there {} times; expected all atoms", quoted(count)));
        }
        let charge = get("formalCharge").map(|charge| integer(charge).ok_or(charge));
        let charge = match charge {
            Some(Err(charge)) => {
                self.wrong(line, format!("expected a whole formalCharge, found {}", quoted(charge)));
                None
            }
            Some(Ok(charge)) => Some(charge),
            None => None,
        };
        let first = self.record.atomic_number.len();
        self.fragments.push(Fragment { line, first, names: BTreeMap::new(), bonds: Vec::new(), charge });
    }

    /// Closes the innermost molecule: its bonds find their atoms, its names join those around it.
    fn close(&mut self) -> Result<(), Fault> {
        let Some(mut fragment) = self.fragments.pop() else { return Ok(()) };
        let atoms = fragment.first..self.record.atomic_number.len();
        if let Some(charge) = fragment.charge {
            self.totals.push(Total { line: fragment.line, atoms, charge });
        }
        if self.fault.is_some() {
            return Ok(());
        }
        for bond in std::mem::take(&mut fragment.bonds) {
            let [a, b] = &bond.atoms;
            let fail = |what: String| (bond.line, format!("bond {}: {what}", bond.number));
            let atom = |name: &String| {
                let mut around = std::iter::once(&fragment).chain(self.fragments.iter().rev());
                match around.find_map(|fragment| fragment.names.get(name)) {
                    Some(Some(atom)) => Ok(*atom),
                    Some(None) => Err(fail(format!("several atoms have the id {}", quoted(name)))),
                    None => Err(fail(format!("there is no atom {}", quoted(name)))),
                }
            };
            let (from, to) = (atom(a)?, atom(b)?);
            if from == to {
                return Err(fail(format!("it joins atom {} with itself", quoted(a))));
            }
            let Some(order) = bond.order else { continue };
            if bond.wedge != 0 {
                let place = u32::try_from(self.bonds.len()).unwrap_or(u32::MAX);
                self.record.stereo.wedges.push((place, bond.wedge));
            }
            self.bonds.push(Bond { a: from, b: to, order });
            self.origin.push((bond.line, bond.atoms));
        }
        if let Some(outer) = self.fragments.last_mut() {
            for (name, atom) in fragment.names {
                outer.names.entry(name).and_modify(|known| *known = None).or_insert(atom);
            }
        }
        Ok(())
    }

    /// The record that the molecule makes.
    pub fn finish(mut self, file: &str, number: u64) -> Entry {
        let read = match self.fault.take() {
            Some(fault) => Err(fault),
            None => self.complete(),
        };
        let mut record = self.record;
        record.place = Place { file: file.to_owned(), number, line: self.line };
        match read {
            Ok(()) => Entry::Molecule(Box::new(record)),
            Err((line, message)) => Entry::Broken(Broken { place: record.place, title: record.title, line, message }),
        }
    }

    fn complete(&mut self) -> Result<(), Fault> {
        let atoms = self.record.atomic_number.len();
        if atoms == 0 {
            return Err((self.line, "the record has no atoms".to_owned()));
        }
        if let Some(later) = bonded_twice(&self.bonds) {
            let (line, names) = self.origin.get(later).cloned().unwrap_or_default();
            let [a, b] = names.map(|name| quoted(&name));
            return Err((line, format!("atoms {a} and {b} are bonded twice")));
        }
        self.record.drawing = self.coordinates != Some(Coordinates::Space);
        let charged = self.charges.iter().flatten().any(|&q| q != 0) || self.totals.iter().any(|t| t.charge != 0);
        // As in V2000: an empty list of bonds says something of one atom and of ions only.
        if atoms == 1 || self.bonds_read > 0 || self.bonds_stated && charged {
            self.record.bonds = Some(std::mem::take(&mut self.bonds));
        }
        self.record.hydrogens_left_out = self.hydrogens_left_out();
        self.place_charges(atoms)
    }
}

/// The name of a data item: its title, else what defines it.
fn item_name<'a>(get: &dyn Fn(&str) -> Option<&'a str>) -> Option<String> {
    ["title", "dictRef", "id"].iter().find_map(|name| get(name)).map(|name| name.trim().to_owned())
}
