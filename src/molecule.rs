//! One molecule as the families see it: borrowed arrays of atoms, a list of bonds, and who is bonded to whom.

use crate::status::{Code, Failure};

/// Atoms of one molecule: `atomic_number` and `xyz` have one entry an atom; coordinates in Å.
#[derive(Clone, Copy, Debug)]
pub struct Molecule<'a> {
    /// Atomic numbers, 1 to 118.
    pub atomic_number: &'a [i32],
    /// Formal charges [e]; `None`: not stated.
    pub formal_charge: Option<&'a [i32]>,
    /// Coordinates [Å].
    pub xyz: &'a [[f64; 3]],
}

impl Molecule<'_> {
    /// Number of atoms.
    pub fn len(&self) -> usize {
        self.atomic_number.len()
    }

    /// True without atoms.
    pub fn is_empty(&self) -> bool {
        self.atomic_number.is_empty()
    }

    /// Checks that the arrays agree, atomic numbers are elements and coordinates are finite.
    ///
    /// # Errors
    /// `NoAtoms` · `UnknownElement`, `Missing`, `NotFinite` with the atom as item.
    pub fn check(&self) -> Result<(), Failure> {
        if self.is_empty() {
            return Err(Failure::new(Code::NoAtoms));
        }
        if self.xyz.len() != self.len() || self.formal_charge.is_some_and(|charge| charge.len() != self.len()) {
            return Err(Failure::new(Code::Missing));
        }
        for (i, &z) in self.atomic_number.iter().enumerate() {
            if z == i32::MIN {
                return Err(Failure::new(Code::Missing).item(i));
            }
            if !(1..=118).contains(&z) {
                return Err(Failure::new(Code::UnknownElement).item(i));
            }
        }
        if let Some(charge) = self.formal_charge {
            for (i, &q) in charge.iter().enumerate() {
                if q == i32::MIN {
                    return Err(Failure::new(Code::Missing).item(i));
                }
                if q.abs() > 100 {
                    return Err(Failure::new(Code::OutOfRange).item(i));
                }
            }
        }
        for (i, point) in self.xyz.iter().enumerate() {
            if point.iter().any(|x| x.is_nan()) {
                return Err(Failure::new(Code::Missing).item(i));
            }
            if point.iter().any(|x| x.is_infinite()) {
                return Err(Failure::new(Code::NotFinite).item(i));
            }
            // Beyond this, squares of distances lose the Å.
            if point.iter().any(|x| x.abs() > 1e9) {
                return Err(Failure::new(Code::OutOfRange).item(i));
            }
        }
        Ok(())
    }
}

/// A bond between two atoms of one molecule (0-based indices).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bond {
    /// First atom.
    pub a: u32,
    /// Second atom.
    pub b: u32,
    /// Bond order: 1, 2, 3; 1.5 in an aromatic ring where no single and double are told apart; 0 bonded, order not assigned.
    pub order: f64,
}

/// The bonds of a molecule with what was derived from them.
#[derive(Clone, Debug, Default)]
pub struct Bonding {
    /// Bonds sorted by (a, b) with a < b; aromatic rings as alternating single and double bonds.
    pub bonds: Vec<Bond>,
    /// One entry a bond: part of an aromatic ring.
    pub aromatic: Vec<bool>,
    /// Formal charge of every atom [e]: as stated, else as the bonds ask for.
    pub formal_charge: Vec<i32>,
    /// Remark bits (`status::remark`).
    pub remarks: i32,
    /// The first atom that a remark is about.
    pub item: Option<usize>,
}

/// Who is bonded to whom, as one flat array (compressed sparse rows).
#[derive(Clone, Debug)]
pub struct Neighbours {
    starts: Vec<u32>,
    entries: Vec<(u32, u32)>,
}

impl Neighbours {
    /// Adjacency of `atoms` atoms. Bonds with an atom out of range are left out.
    pub fn new(atoms: usize, bonds: &[Bond]) -> Self {
        let inside = |bond: &&Bond| (bond.a as usize) < atoms && (bond.b as usize) < atoms;
        let mut starts = vec![0_u32; atoms + 1];
        for bond in bonds.iter().filter(inside) {
            starts[bond.a as usize + 1] += 1;
            starts[bond.b as usize + 1] += 1;
        }
        for i in 0..atoms {
            starts[i + 1] += starts[i];
        }
        let mut next: Vec<u32> = starts.clone();
        let mut entries = vec![(0_u32, 0_u32); starts.last().map_or(0, |&n| n as usize)];
        for (k, bond) in bonds.iter().enumerate().filter(|(_, bond)| inside(bond)) {
            for (from, to) in [(bond.a, bond.b), (bond.b, bond.a)] {
                let slot = &mut next[from as usize];
                entries[*slot as usize] = (to, k as u32);
                *slot += 1;
            }
        }
        Self { starts, entries }
    }

    /// Neighbours of an atom as (atom, index of the bond).
    pub fn of(&self, atom: usize) -> &[(u32, u32)] {
        match (self.starts.get(atom), self.starts.get(atom + 1)) {
            (Some(&from), Some(&to)) => &self.entries[from as usize..to as usize],
            _ => &[],
        }
    }

    /// Number of neighbours.
    pub fn degree(&self, atom: usize) -> usize {
        self.of(atom).len()
    }

    /// The fragment of every atom (numbered from 0 in the order of their first atoms) and the number of fragments.
    pub fn fragments(&self) -> (Vec<u32>, usize) {
        let atoms = self.starts.len().saturating_sub(1);
        let mut fragment = vec![u32::MAX; atoms];
        let mut count = 0;
        let mut stack = Vec::new();
        for first in 0..atoms {
            if fragment[first] != u32::MAX {
                continue;
            }
            fragment[first] = count;
            stack.push(first);
            while let Some(atom) = stack.pop() {
                for &(other, _) in self.of(atom) {
                    if fragment[other as usize] == u32::MAX {
                        fragment[other as usize] = count;
                        stack.push(other as usize);
                    }
                }
            }
            count += 1;
        }
        (fragment, count as usize)
    }
}
