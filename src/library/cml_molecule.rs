//! A CML molecule on its way from elements to a record.
//!
//! Atoms come one an element or as lists in the attributes of `atomArray`; so do bonds. Nested molecules are fragments of
//! the outer one. Coordinates in space (`x3 y3 z3`) make a geometry, those on paper (`x2 y2`) or none a drawing. Charges stand
//! on atoms; where only a molecule or fragment states one, it is that of its only atom, or the bonds say which atoms
//! carry it, or the record is refused. Fractional coordinates are not read.

use std::borrow::Cow;
use std::collections::BTreeMap;

use super::ctfile::Fault;
use super::lines::{decimal, integer, quoted};
use super::record::{Broken, Entry, Place, Record, bonded_twice};
use super::rows::bonding_of;
use super::xyz::LARGEST_COORDINATE_A;
use crate::molecule::Bond;
use crate::tables::element_by_text;

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
struct Fragment {
    line: u64,
    /// Its first atom.
    first: usize,
    /// Atoms by their names; `None` for a name that several fragments use.
    names: BTreeMap<String, Option<u32>>,
    bonds: Vec<NamedBond>,
    charge: Option<i64>,
}

#[derive(Debug)]
struct NamedBond {
    number: usize,
    line: u64,
    atoms: [String; 2],
    /// `None` for a hydrogen bond.
    order: Option<f64>,
    wedge: i32,
}

/// The charge that a molecule or fragment states for its atoms.
#[derive(Debug)]
struct Total {
    line: u64,
    atoms: std::ops::Range<usize>,
    charge: i64,
}

/// How an atom's coordinates are stated.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Coordinates {
    Space,
    Paper,
    Nowhere,
}

/// What is known of an open molecule.
#[derive(Debug)]
pub(super) struct Building {
    record: Record,
    line: u64,
    titled: bool,
    reference: bool,
    fragments: Vec<Fragment>,
    totals: Vec<Total>,
    charges: Vec<Option<i32>>,
    hydrogens: Vec<(u32, i64)>,
    coordinates: Option<Coordinates>,
    bonds: Vec<Bond>,
    /// Line and names of each bond.
    origin: Vec<(u64, [String; 2])>,
    bonds_read: usize,
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

    /// Atoms as lists in the attributes of `atomArray`.
    fn atoms<'a>(&mut self, get: &dyn Fn(&str) -> Option<&'a str>, line: u64) -> Result<(), Fault> {
        const LISTS: [&str; 13] = [
            "atomID", "elementType", "x3", "y3", "z3", "x2", "y2", "formalCharge", "isotope", "isotopeNumber",
            "spinMultiplicity", "hydrogenCount", "xFract",
        ];
        let lists: Vec<(&str, Vec<&str>)> =
            LISTS.iter().filter_map(|&name| Some((name, get(name)?.split_whitespace().collect()))).collect();
        let Some(count) = lists.first().map(|(_, list)| list.len()) else { return Ok(()) };
        if let Some((name, list)) = lists.iter().find(|(_, list)| list.len() != count) {
            let what = format!("the list {name} of atomArray has {} entries; expected {count}", list.len());
            return Err((line, what));
        }
        for n in 0..count {
            let one = |name: &str| {
                let name = if name == "id" { "atomID" } else { name };
                lists.iter().find(|(known, _)| *known == name).and_then(|(_, list)| list.get(n).copied())
            };
            self.atom(&one, line)?;
        }
        Ok(())
    }

    fn atom<'a>(&mut self, get: &dyn Fn(&str) -> Option<&'a str>, line: u64) -> Result<(), Fault> {
        let number = self.record.atomic_number.len() + 1;
        let fail = |what: String| (line, format!("atom {number}: {what}"));
        let atom = u32::try_from(number - 1).map_err(|_| fail("there are too many atoms".to_owned()))?;
        let symbol = get("elementType").ok_or_else(|| fail("it states no elementType".to_owned()))?.trim();
        let z = element_by_text(symbol).map_err(|_| fail(format!("there is no element {}", quoted(symbol))))?;
        let coordinate = |name: &str| -> Result<Option<f64>, Fault> {
            let Some(text) = get(name) else { return Ok(None) };
            match decimal(text) {
                Some(x) if x.abs() <= LARGEST_COORDINATE_A => Ok(Some(x)),
                Some(_) => Err(fail(format!("{name} is beyond 1e9 Å"))),
                None => Err(fail(format!("expected a decimal number as {name}, found {}", quoted(text)))),
            }
        };
        let whole = |name: &str, least: i64, most: i64| -> Result<Option<i32>, Fault> {
            let Some(text) = get(name) else { return Ok(None) };
            let value = integer(text).filter(|value| (least..=most).contains(value));
            match value.and_then(|value| i32::try_from(value).ok()) {
                Some(value) => Ok(Some(value)),
                None => Err(fail(format!("expected {name} from {least} to {most}, found {}", quoted(text)))),
            }
        };
        let (stated, xyz) = match (coordinate("x3")?, coordinate("y3")?, coordinate("z3")?) {
            (Some(x), Some(y), Some(z)) => (Coordinates::Space, [x, y, z]),
            (None, None, None) if get("xFract").is_some() => {
                return Err(fail("its coordinates are fractions of a unit cell; expected x3, y3 and z3".to_owned()));
            }
            (None, None, None) => match (coordinate("x2")?, coordinate("y2")?) {
                (Some(x), Some(y)) => (Coordinates::Paper, [x, y, 0.0]),
                _ => (Coordinates::Nowhere, [0.0; 3]),
            },
            _ => return Err(fail("it states some of x3, y3 and z3; expected all three".to_owned())),
        };
        if *self.coordinates.get_or_insert(stated) != stated {
            return Err(fail("its coordinates are not of the kind that the atoms before it have".to_owned()));
        }
        let isotope = get("isotopeNumber").or_else(|| get("isotope"));
        if let Some(text) = isotope {
            let mass = decimal(text).map(f64::round).filter(|mass| (1.0..1000.0).contains(mass));
            let mass = mass.ok_or_else(|| fail(format!("expected a mass number as isotope, found {}", quoted(text))))?;
            self.record.isotopes.push((atom, mass as i32));
        }
        // 1 is what every atom of a closed shell may state.
        if let Some(spin) = whole("spinMultiplicity", 1, 20)?.filter(|&spin| spin > 1) {
            self.record.radicals.push((atom, spin));
        }
        if let Some(count) = whole("hydrogenCount", 0, 20)? {
            self.hydrogens.push((atom, i64::from(count)));
        }
        self.charges.push(whole("formalCharge", -100, 100)?);
        self.record.atomic_number.push(z);
        self.record.xyz.push(xyz);
        if let (Some(id), Some(fragment)) = (get("id"), self.fragments.last_mut())
            && fragment.names.insert(id.trim().to_owned(), Some(atom)).is_some()
        {
            return Err(fail(format!("its id {} is that of another atom", quoted(id))));
        }
        Ok(())
    }

    /// Bonds as lists in the attributes of `bondArray`.
    fn bonds<'a>(&mut self, get: &dyn Fn(&str) -> Option<&'a str>, line: u64) -> Result<(), Fault> {
        let list = |name: &str| get(name).map(|list| list.split_whitespace().collect::<Vec<&str>>());
        let (a, b) = match (list("atomRef1"), list("atomRef2")) {
            (None, None) => return Ok(()),
            (a, b) => (a.unwrap_or_default(), b.unwrap_or_default()),
        };
        let order = list("order").unwrap_or_default();
        if a.len() != b.len() || a.len() != order.len() {
            let (a, b, order) = (a.len(), b.len(), order.len());
            let what = format!("the lists of bondArray have {a}, {b} and {order} entries; expected as many of each");
            return Err((line, what));
        }
        for ((&a, &b), &order) in a.iter().zip(&b).zip(&order) {
            self.bond(Some((a, b)), Some(order), line)?;
        }
        Ok(())
    }

    /// A bond between two atoms, by their names in two texts or in one.
    fn bond(&mut self, atoms: Option<(&str, &str)>, order: Option<&str>, line: u64) -> Result<(), Fault> {
        self.bonds_read += 1;
        let number = self.bonds_read;
        let fail = |what: String| (line, format!("bond {number}: {what}"));
        let (one, two) = atoms.ok_or_else(|| fail("it states no atomRefs2".to_owned()))?;
        let mut names = one.split_whitespace().chain(two.split_whitespace());
        let (Some(a), Some(b), None) = (names.next(), names.next(), names.next()) else {
            return Err(fail(format!("expected two atoms, found {}", quoted(one))));
        };
        let order = match order.map(str::trim) {
            Some("1" | "S" | "1.0") => Some(1.0),
            Some("2" | "D" | "2.0") => Some(2.0),
            Some("3" | "T" | "3.0") => Some(3.0),
            Some("A" | "1.5") => Some(1.5),
            Some("hbond") => None,
            Some(other) => {
                let found = quoted(other);
                return Err(fail(format!("its order is {found}; expected 1, 2, 3, S, D, T, A or 1.5")));
            }
            None => return Err(fail("it states no order; expected 1, 2, 3, S, D, T, A or 1.5".to_owned())),
        };
        let atoms = [a.to_owned(), b.to_owned()];
        if let Some(fragment) = self.fragments.last_mut() {
            fragment.bonds.push(NamedBond { number, line, atoms, order, wedge: 0 });
        }
        Ok(())
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

    /// An atom states more hydrogen atoms than are bonded to it, or all atoms more than there are.
    fn hydrogens_left_out(&self) -> bool {
        let hydrogen = |atom: u32| self.record.atomic_number.get(atom as usize) == Some(&1);
        let Some(bonds) = &self.record.bonds else {
            let stated: i64 = self.hydrogens.iter().map(|&(_, count)| count).sum();
            let there = self.record.atomic_number.iter().filter(|&&z| z == 1).count();
            return usize::try_from(stated).is_ok_and(|stated| stated > there);
        };
        let mut there = vec![0_i64; self.record.atomic_number.len()];
        for bond in bonds {
            for (atom, other) in [(bond.a, bond.b), (bond.b, bond.a)] {
                if let Some(there) = there.get_mut(atom as usize).filter(|_| hydrogen(other)) {
                    *there += 1;
                }
            }
        }
        self.hydrogens.iter().any(|&(atom, count)| there.get(atom as usize).is_some_and(|&there| count > there))
    }

    /// Formal charges: those of the atoms, completed from what molecules and fragments state.
    fn place_charges(&mut self, atoms: usize) -> Result<(), Fault> {
        let on_atoms = self.charges.iter().any(Option::is_some);
        for total in self.totals.iter().filter(|total| total.atoms.len() == 1) {
            let charge = i32::try_from(total.charge).ok().filter(|charge| charge.abs() <= 100);
            let Some(charge) = charge else {
                return Err((total.line, format!("the charge {} is beyond 100 e", total.charge)));
            };
            if let Some(slot) = self.charges.get_mut(total.atoms.start) {
                slot.get_or_insert(charge);
            }
        }
        let stated: Vec<i32> = self.charges.iter().map(|charge| charge.unwrap_or(0)).collect();
        let sum = |charges: &[i32], total: &Total| -> i64 {
            charges.get(total.atoms.clone()).unwrap_or(&[]).iter().map(|&charge| i64::from(charge)).sum()
        };
        let misses = |charges: &[i32]| {
            self.totals.iter().find(|total| sum(charges, total) != total.charge).map(|total| {
                let (found, stated) = (sum(charges, total), total.charge);
                (total.line, stated, found)
            })
        };
        let any = self.charges.iter().any(Option::is_some) || !self.totals.is_empty();
        let Some((line, charge, found)) = misses(&stated) else {
            if self.record.bonds.is_some() || atoms == 1 || any {
                self.record.formal_charge = Some(stated);
            }
            return Ok(());
        };
        if on_atoms {
            return Err((line, format!("the charge of the molecule is {charge}, that of its atoms {found}")));
        }
        let mut derived = bonding_of(&self.record).map(|bonding| bonding.formal_charge).unwrap_or_default();
        for (slot, charge) in derived.iter_mut().zip(&self.charges) {
            *slot = charge.unwrap_or(*slot);
        }
        match misses(&derived) {
            None if derived.len() == atoms => {
                self.record.formal_charge = Some(derived);
                Ok(())
            }
            _ => Err((line, format!("the charge {charge} of the molecule is on no atom, and the bonds do not place it"))),
        }
    }
}

/// The name of a data item: its title, else what defines it.
fn item_name<'a>(get: &dyn Fn(&str) -> Option<&'a str>) -> Option<String> {
    ["title", "dictRef", "id"].iter().find_map(|name| get(name)).map(|name| name.trim().to_owned())
}
