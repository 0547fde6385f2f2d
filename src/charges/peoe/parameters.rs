//! The PEOE parameters: `tables/peoe_1980.csv`, parsed once.

use super::AtomType;
use crate::selectors::{MARK_CORROBORATED, MARK_FROM_MEMORY, Selector};
use crate::status::{Code, Failure};
use once_cell::race::OnceBox;
use serde::Deserialize;

/// Parameters of one atom type [eV], the charge being in e.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Parameters {
    /// Electronegativity of the neutral atom.
    pub a: f64,
    /// Linear coefficient.
    pub b: f64,
    /// Quadratic coefficient.
    pub c: f64,
    /// Electronegativity of the cation: a + b + c, but 20.02 eV for hydrogen.
    pub chi_plus: f64,
    /// How far the entry was checked.
    pub mark: Selector,
}

#[derive(Deserialize)]
struct Row {
    #[serde(rename = "type")]
    name: String,
    a: f64,
    b: f64,
    c: f64,
    chi_plus: f64,
    mark: String,
}

static TABLE: OnceBox<Vec<(AtomType, Parameters)>> = OnceBox::new();

/// The parameters of a type. That the embedded text is whole is proved by the tests.
pub(super) fn of(kind: AtomType) -> Result<Parameters, Failure> {
    let fault = Failure::new(Code::Internal);
    let table = TABLE.get_or_try_init(|| read().map(Box::new).ok_or(fault))?;
    table.iter().find(|(listed, _)| *listed == kind).map(|&(_, parameters)| parameters).ok_or(fault)
}

fn read() -> Option<Vec<(AtomType, Parameters)>> {
    let text = include_str!("../../tables/peoe_1980.csv");
    let mut table = Vec::new();
    for row in csv::Reader::from_reader(text.as_bytes()).deserialize::<Row>() {
        let row = row.ok()?;
        let kind = AtomType::ALL.iter().copied().find(|kind| kind.name() == row.name)?;
        let mark = match row.mark.as_str() {
            "corroborated" => MARK_CORROBORATED,
            "from_memory" => MARK_FROM_MEMORY,
            _ => return None,
        };
        table.push((kind, Parameters { a: row.a, b: row.b, c: row.c, chi_plus: row.chi_plus, mark }));
    }
    Some(table)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The cation's electronegativity is the sum of the row; hydrogen alone has a value of its own.
    #[test]
    fn every_type_has_parameters_that_add_up() {
        for &kind in AtomType::ALL {
            let own = of(kind).unwrap_or_else(|fault| panic!("{}: {fault:?}", kind.name()));
            let sum = own.a + own.b + own.c;
            if kind == AtomType::H {
                assert!((sum - 12.85).abs() < 1e-9 && own.chi_plus == 20.02);
            } else {
                assert!((sum - own.chi_plus).abs() < 0.005 + 1e-9, "{}", kind.name());
            }
        }
        assert_eq!(TABLE.get().map(Vec::len), Some(AtomType::ALL.len()));
    }
}
