//! The structures of the open set, and a generator of random numbers.

use bondmoment::bonds::find::find_bonds;
use bondmoment::molecule::{Bonding, Molecule};
use bondmoment::selectors::BONDS_ALTERNATING;
use std::collections::BTreeMap;
use std::path::PathBuf;

/// Symbols of the elements that the structures here contain, by atomic number.
const SYMBOLS: &[(&str, i32)] = &[
    ("H", 1),
    ("He", 2),
    ("Li", 3),
    ("Be", 4),
    ("B", 5),
    ("C", 6),
    ("N", 7),
    ("O", 8),
    ("F", 9),
    ("Na", 11),
    ("Mg", 12),
    ("Al", 13),
    ("Si", 14),
    ("P", 15),
    ("S", 16),
    ("Cl", 17),
    ("Ar", 18),
    ("K", 19),
    ("Ti", 22),
    ("Mn", 25),
    ("Fe", 26),
    ("Ni", 28),
    ("Cu", 29),
    ("Zn", 30),
    ("Ga", 31),
    ("Ge", 32),
    ("As", 33),
    ("Se", 34),
    ("Br", 35),
    ("I", 53),
    ("Xe", 54),
];

#[derive(Clone, Debug, Default)]
pub struct Structure {
    pub z: Vec<i32>,
    pub xyz: Vec<[f64; 3]>,
    /// Atoms counted from 0, the lower first.
    pub bonds: BTreeMap<(u32, u32), f64>,
}

impl Structure {
    pub fn molecule(&self) -> Molecule<'_> {
        Molecule { atomic_number: &self.z, formal_charge: None, xyz: &self.xyz }
    }

    pub fn pairs(&self) -> Vec<(u32, u32)> {
        self.bonds.keys().copied().collect()
    }
}

pub fn folder(name: &str) -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("tests").join(name)
}

pub fn atomic_number(symbol: &str) -> i32 {
    SYMBOLS.iter().find(|entry| entry.0 == symbol).map(|entry| entry.1).unwrap_or_else(|| panic!("{symbol}"))
}

pub fn atom(line: &str) -> (i32, [f64; 3]) {
    let mut words = line.split_whitespace();
    let z = atomic_number(words.next().unwrap());
    let mut number = || words.next().unwrap().parse().unwrap();
    (z, [number(), number(), number()])
}

/// The open set in the order of its table.
pub fn open_set() -> Vec<(String, Structure)> {
    let folder = folder("open_set");
    let table = std::fs::read_to_string(folder.join("open.csv")).unwrap();
    let mut set = Vec::new();
    for stem in table.lines().skip(1).filter_map(|line| line.split(',').next()) {
        let mut one = Structure::default();
        let xyz = std::fs::read_to_string(folder.join(format!("molecules/{stem}.xyz"))).unwrap();
        for line in xyz.lines().skip(2).filter(|line| !line.trim().is_empty()) {
            let (z, point) = atom(line);
            one.z.push(z);
            one.xyz.push(point);
        }
        let bonds = std::fs::read_to_string(folder.join(format!("molecules/{stem}.bonds.csv"))).unwrap();
        for line in bonds.lines().skip(1) {
            let mut cells = line.split(',').map(|cell| cell.trim().parse::<f64>().unwrap());
            let (i, j) = (cells.next().unwrap() as u32 - 1, cells.next().unwrap() as u32 - 1);
            one.bonds.insert((i.min(j), i.max(j)), cells.next().unwrap());
        }
        set.push((stem.to_string(), one));
    }
    set
}

pub fn pairs(bonding: &Bonding) -> Vec<(u32, u32)> {
    bonding.bonds.iter().map(|bond| (bond.a, bond.b)).collect()
}

pub fn found(one: &Structure) -> Bonding {
    find_bonds(one.molecule(), BONDS_ALTERNATING).unwrap()
}

/// Numbers between 0 and 1 by SplitMix64 (Steele, Lea and Flood, Proc. OOPSLA 2014, 453; from memory), upper 53 bits.
pub struct Numbers(pub u64);

impl Numbers {
    pub fn next(&mut self) -> f64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mixed = (self.0 ^ (self.0 >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        let mixed = (mixed ^ (mixed >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        ((mixed ^ (mixed >> 31)) >> 11) as f64 / (1_u64 << 53) as f64
    }

    /// Normal with standard deviation 1 (sum of twelve uniform numbers less 6).
    pub fn normal(&mut self) -> f64 {
        (0..12).map(|_| self.next()).sum::<f64>() - 6.0
    }
}
