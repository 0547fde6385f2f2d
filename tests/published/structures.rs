//! Reading of the published checks: rows of `function,arguments,expected,tolerance,source,mark` and the molecules that
//! they name, V2000 molfiles in `tests/published/molecules`.

use bondmoment::molecule::{Bond, Bonding, Molecule};
use std::path::Path;

/// One molecule of the folder.
pub struct Structure {
    pub atomic_number: Vec<i32>,
    pub xyz: Vec<[f64; 3]>,
    pub bonding: Bonding,
}

impl Structure {
    pub fn molecule(&self) -> Molecule<'_> {
        Molecule {
            atomic_number: &self.atomic_number,
            formal_charge: Some(&self.bonding.formal_charge),
            xyz: &self.xyz,
        }
    }
}

pub fn structure(name: &str) -> Structure {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/published/molecules").join(format!("{name}.mol"));
    let text = std::fs::read_to_string(&path).unwrap_or_else(|fault| panic!("{}: {fault}", path.display()));
    let lines: Vec<&str> = text.lines().collect();
    let field = |line: usize, from: usize, to: usize| -> &str { lines[line][from..to].trim() };
    let count = |from: usize| field(3, from, from + 3).parse::<usize>().unwrap();
    let (atoms, bonds) = (count(0), count(3));
    let mut found = Structure { atomic_number: Vec::new(), xyz: Vec::new(), bonding: Bonding::default() };
    for line in 4..4 + atoms {
        found.xyz.push([0, 10, 20].map(|from| field(line, from, from + 10).parse().unwrap()));
        found.atomic_number.push(match field(line, 31, 34) {
            "H" => 1,
            "C" => 6,
            "N" => 7,
            "O" => 8,
            "F" => 9,
            "S" => 16,
            "Cl" => 17,
            "Br" => 35,
            "I" => 53,
            other => panic!("{name}: {other}"),
        });
    }
    for line in 4 + atoms..4 + atoms + bonds {
        let (i, j) = (field(line, 0, 3).parse::<u32>().unwrap() - 1, field(line, 3, 6).parse::<u32>().unwrap() - 1);
        found.bonding.bonds.push(Bond { a: i.min(j), b: i.max(j), order: field(line, 6, 9).parse().unwrap() });
    }
    found.bonding.bonds.sort_by_key(|bond| (bond.a, bond.b));
    found.bonding.aromatic = vec![false; bonds];
    found.bonding.formal_charge = vec![0; atoms];
    for line in lines.iter().filter(|line| line.starts_with("M  CHG")) {
        let numbers: Vec<i32> = line[9..].split_whitespace().map(|text| text.parse().unwrap()).collect();
        for pair in numbers.chunks(2) {
            found.bonding.formal_charge[pair[0] as usize - 1] = pair[1];
        }
    }
    found
}

/// One row of a file of checks.
pub struct Check {
    pub function: String,
    pub arguments: String,
    pub expected: String,
    pub tolerance: f64,
    pub mark: String,
}

pub fn checks(file: &str) -> Vec<Check> {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/published").join(file);
    let mut reader = csv::Reader::from_path(path).unwrap();
    let row = |row: Result<csv::StringRecord, csv::Error>| {
        let row = row.unwrap();
        assert!(!row[4].is_empty(), "no source: {row:?}");
        Check {
            function: row[0].into(),
            arguments: row[1].into(),
            expected: row[2].into(),
            tolerance: row[3].parse().unwrap(),
            mark: row[5].into(),
        }
    };
    reader.records().map(row).collect()
}

/// The value of a name in `name=value;name=value`.
pub fn value<'a>(pairs: &'a str, name: &str) -> Option<&'a str> {
    pairs.split(';').filter_map(|pair| pair.split_once('=')).find(|pair| pair.0 == name).map(|pair| pair.1)
}

/// Numbers parted by blanks.
pub fn numbers(text: &str) -> Vec<f64> {
    text.split_whitespace().map(|number| number.parse().unwrap_or_else(|_| panic!("{number}"))).collect()
}
