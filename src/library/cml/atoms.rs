//! Atoms and bonds of a CML molecule, one an element or as lists.

use super::super::ctfile::Fault;
use super::super::lines::{decimal, integer, quoted};
use super::super::xyz::LARGEST_COORDINATE_A;
use super::molecule::{Building, Coordinates, NamedBond};
use crate::tables::element_by_text;

impl Building {
    /// Atoms as lists in the attributes of `atomArray`.
    pub(super) fn atoms<'a>(&mut self, get: &dyn Fn(&str) -> Option<&'a str>, line: u64) -> Result<(), Fault> {
        const LISTS: [&str; 13] = [
            "atomID",
            "elementType",
            "x3",
            "y3",
            "z3",
            "x2",
            "y2",
            "formalCharge",
            "isotope",
            "isotopeNumber",
            "spinMultiplicity",
            "hydrogenCount",
            "xFract",
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

    pub(super) fn atom<'a>(&mut self, get: &dyn Fn(&str) -> Option<&'a str>, line: u64) -> Result<(), Fault> {
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
            let mass =
                mass.ok_or_else(|| fail(format!("expected a mass number as isotope, found {}", quoted(text))))?;
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
    pub(super) fn bonds<'a>(&mut self, get: &dyn Fn(&str) -> Option<&'a str>, line: u64) -> Result<(), Fault> {
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
    pub(super) fn bond(&mut self, atoms: Option<(&str, &str)>, order: Option<&str>, line: u64) -> Result<(), Fault> {
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
}
