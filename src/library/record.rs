//! One record of a file of structures: what the file says, before anything is computed from it.

use crate::molecule::{Bond, Molecule};
use crate::status::{Code, Failure};

/// Where a record stands.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Place {
    /// Name of the file, or of what the text came from.
    pub file: String,
    /// Number of the record in its file, from 1.
    pub number: u64,
    /// Line on which the record begins, from 1; 0 where there are no lines.
    pub line: u64,
}

impl Place {
    /// The key of the record in the tables: `file:number`.
    pub fn key(&self) -> String {
        format!("{}:{}", self.file, self.number)
    }
}

/// Stereo as the file states it, kept unread.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct StatedStereo {
    /// (bond, wedge code) for every bond whose code is not 0; 0-based bonds in the order of the file. The code is that of
    /// V2000 tables whatever the format: 1 up, 6 down, 4 either, 3 cis or trans.
    pub wedges: Vec<(u32, i32)>,
    /// (atom, parity code) for every atom whose code is not 0; 0-based atoms.
    pub parities: Vec<(u32, i32)>,
    /// The record is marked chiral.
    pub chiral: bool,
}

/// Partial charges [e] and, if known, their standard uncertainties [e] (NaN: not known).
pub type GivenCharges = (Vec<f64>, Option<Vec<f64>>);

/// A structure as a file states it. All atom lists have one entry an atom, 0-based, in the order of the file.
#[derive(Clone, Debug, Default)]
pub struct Record {
    /// File, number and line.
    pub place: Place,
    /// Title without blanks around it, or empty.
    pub title: String,
    /// Atomic numbers.
    pub atomic_number: Vec<i32>,
    /// Coordinates [Å].
    pub xyz: Vec<[f64; 3]>,
    /// Formal charges [e]; `None` where the file cannot or does not state them.
    pub formal_charge: Option<Vec<i32>>,
    /// Bonds with 1.5 for aromatic ones; `None` where the file states none.
    pub bonds: Option<Vec<Bond>>,
    /// Partial charges, where the caller gives them.
    pub charge_e: Option<GivenCharges>,
    /// Data items as (name, value) in the order of the file; a value may have several lines.
    pub data: Vec<(String, String)>,
    /// The file calls the record two-dimensional or gives no coordinates in space, and all atoms lie in one plane
    /// z = constant.
    pub drawing: bool,
    /// Stereo, unread.
    pub stereo: StatedStereo,
    /// (atom, mass number) of stated isotopes.
    pub isotopes: Vec<(u32, i32)>,
    /// (atom, difference of the mass number from the element's own in the file's sense) where that is what is stated.
    pub mass_differences: Vec<(u32, i32)>,
    /// (atom, spin multiplicity: 1 singlet, 2 doublet, 3 triplet) of stated radicals.
    pub radicals: Vec<(u32, i32)>,
    /// (atom, valence) where the file states how many bonds an atom has, hydrogens left out included.
    pub valences: Vec<(u32, i32)>,
    /// The file states that atoms carry more hydrogen atoms than it lists.
    pub hydrogens_left_out: bool,
}

impl Record {
    /// The atoms as the families see them.
    pub fn molecule(&self) -> Molecule<'_> {
        Molecule { atomic_number: &self.atomic_number, formal_charge: self.formal_charge.as_deref(), xyz: &self.xyz }
    }

    /// The value of a data item; of several with one name the first.
    pub fn item(&self, name: &str) -> Option<&str> {
        self.data.iter().find(|(item, _)| item == name).map(|(_, value)| value.as_str())
    }
}

/// The later of two bonds that join the same atoms: of the first such pair of atoms.
pub(super) fn bonded_twice(bonds: &[Bond]) -> Option<usize> {
    let mut pairs: Vec<(u32, u32, usize)> =
        bonds.iter().enumerate().map(|(i, bond)| (bond.a.min(bond.b), bond.a.max(bond.b), i)).collect();
    pairs.sort_unstable();
    pairs.windows(2).find_map(|pair| match pair {
        [one, two] if (one.0, one.1) == (two.0, two.1) => Some(two.2),
        _ => None,
    })
}

/// A record that could not be read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Broken {
    /// File, number and first line of the record.
    pub place: Place,
    /// Title, as far as it was read.
    pub title: String,
    /// The line at fault, from 1; 0 where the file as a whole is.
    pub line: u64,
    /// What is wrong, and what was expected.
    pub message: String,
}

impl Broken {
    /// File, record, line and what is wrong, in one sentence.
    pub fn text(&self) -> String {
        let Place { file, number, .. } = &self.place;
        match self.line {
            0 => format!("{file}, record {number}: {}", self.message),
            line => format!("{file}, record {number}, line {line}: {}", self.message),
        }
    }
}

/// What a reader hands out: each record of the file once, in order.
#[derive(Clone, Debug)]
pub enum Entry {
    /// A structure.
    Molecule(Box<Record>),
    /// A record that could not be read.
    Broken(Broken),
}

impl Entry {
    /// Where the record stands.
    pub fn place(&self) -> &Place {
        match self {
            Entry::Molecule(record) => &record.place,
            Entry::Broken(broken) => &broken.place,
        }
    }

    /// The title of the record, or an empty text.
    pub fn title(&self) -> &str {
        match self {
            Entry::Molecule(record) => &record.title,
            Entry::Broken(broken) => &broken.title,
        }
    }

    /// Number of atoms read.
    pub fn atoms(&self) -> usize {
        match self {
            Entry::Molecule(record) => record.atomic_number.len(),
            Entry::Broken(_) => 0,
        }
    }
}

/// Why a file or a run cannot go on: the code for the caller, the words for a person.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Problem {
    /// The code.
    pub code: Code,
    /// What is wrong, naming the file.
    pub message: String,
}

impl Problem {
    /// A problem in plain words.
    pub fn new(code: Code, message: impl Into<String>) -> Self {
        Self { code, message: message.into() }
    }
}

impl From<Problem> for Failure {
    fn from(problem: Problem) -> Self {
        Failure::new(problem.code)
    }
}
