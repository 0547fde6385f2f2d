//! Which atoms are bonded and with what order: found from the coordinates, or checked where they are stated.
//!
//! Connectivity comes from distances against covalent radii, then pruning (`connect`). Orders and formal charges are the
//! cheapest assignment of valences under a documented cost (`states`, `orders`), found exactly (`solve`) or, in very wide
//! ring systems, by matching (`matching`). Aromatic rings are those of Hückel's rule (`aromatic`).

mod aromatic;
mod charges;
mod connect;
mod given;
mod grid;
mod kinds;
mod lengths;
mod matching;
mod orders;
mod radii;
pub mod rings;
mod solve;
mod states;

use crate::declare::{Argument, Function, INTEGER, Kind, MOLECULES, NUMBER, SELECTOR};
use crate::molecule::{Bonding, Molecule, Neighbours};
use crate::selectors::{self, Selector};
use crate::status::{Code, Failure, remark};

pub use given::given_bonds;
pub use lengths::given_lengths;
pub use rings::Rings;

/// Declaration of [`find_bonds`].
pub static FIND_BONDS: Function = Function {
    name: "find_bonds",
    family: "bonds",
    kind: Kind::Molecules,
    since: 1,
    title: "Bonds from coordinates",
    formula: "bonded if d is at most r_a + r_b + tolerance, less what valence and geometry exclude",
    arguments: &[
        Argument {
            number: 1,
            name: "rule",
            label: "rule",
            group: "bond_rule",
            default: Some(selectors::BONDS_ALTERNATING),
            help: "How the bonds of aromatic rings are written",
            ..SELECTOR
        },
        Argument { number: 2, ..MOLECULES },
    ],
    results: &[
        Argument {
            number: 3,
            name: "found_atoms",
            label: "bonded atoms",
            shape: "found",
            index: true,
            main: true,
            help: "The two atoms of each bond, the lower first",
            ..INTEGER
        },
        Argument {
            number: 4,
            name: "found_order",
            label: "bond order",
            shape: "found",
            help: "Bond order 1, 2, 3; 1.5 aromatic; 0 bonded without an order",
            ..NUMBER
        },
        Argument {
            number: 5,
            name: "found_length_A",
            label: "length",
            shape: "found",
            unit: "Å",
            help: "Bond length [Å]",
            ..NUMBER
        },
        Argument {
            number: 6,
            name: "found_formal_charge",
            label: "formal charge",
            shape: "atom",
            unit: "e",
            required: false,
            help: "Formal charge of each atom [e], as stated or derived",
            ..INTEGER
        },
    ],
    statuses: &[
        Code::Missing,
        Code::NotFinite,
        Code::OutOfRange,
        Code::UnknownElement,
        Code::NoAtoms,
        Code::AtomsTooClose,
    ],
    remarks: remark::BONDS_FOUND
        | remark::CHARGES_FOUND
        | remark::IMPOSSIBLE_VALENCE
        | remark::ORDERS_NOT_ASSIGNED
        | remark::OPEN_SHELL,
    notes: &[
        "Hydrogen atoms must be there. Formal charges are kept where they are stated, else they follow from the bonds.",
        "Bonds to transition metals, lanthanoids and actinoids, dative bonds to other metals, and bridges of hydrogen or \
         halogen atoms have order 0.",
        "Sulfur, phosphorus and the halogens are written with double bonds to oxygen, without charges; nitrogen, carbon \
         and oxygen keep the octet (nitro N+ with O-, carbon monoxide C- with O+). SiO and GeO are double bonds, BF is a \
         single bond.",
        "Coordinates do not tell an ion from its radical: a molecule of two or three atoms counts as the neutral radical, \
         and so does a single nitroxide group (N-O 1.24 to 1.32 Å) if the number of electrons is odd.",
        "A ring with a double bond to an atom outside the ring system (quinone, pyridone), one of lone pairs only (S7) and one \
         that is not flat within 0.15 Å do not count as aromatic.",
    ],
    sources: &[
        "Cordero et al., Dalton Trans. 2008, 2832",
        "Pyykkö and Atsumi, Chem. Eur. J. 2009, 15, 186 and 12770; Pyykkö, Riedel and Patzschke, ibid. 2005, 11, 3511",
        "Edmonds, Can. J. Math. 1965, 17, 449 (matching; from memory)",
        "Hückel, Z. Phys. 1931, 70, 204 (from memory)",
    ],
    examples: &[],
};

/// Bonds from the coordinates [Å], sorted by (a, b) with a < b.
///
/// `rule` is `BONDS_ALTERNATING` (single and double bonds alternate in aromatic rings) or `BONDS_AROMATIC` (order 1.5
/// there). Remarks: `BONDS_FOUND` always; `CHARGES_FOUND` where derived formal charges are not all zero;
/// `IMPOSSIBLE_VALENCE` with the atom as item; `ORDERS_NOT_ASSIGNED` where a bond has order 0; `OPEN_SHELL` for an odd
/// number of electrons. Radii: Cordero et al. 2008; Pyykkö and Atsumi 2009; Pyykkö, Riedel and Patzschke 2005.
///
/// # Errors
/// `UnknownSelector`, `WrongSelector` (argument 1) · those of [`Molecule::check`] · `AtomsTooClose` with the later atom of
/// the pair as item · `TooLarge` (more atoms than 32-bit indices hold).
pub fn find_bonds(molecule: Molecule<'_>, rule: Selector) -> Result<Bonding, Failure> {
    FIND_BONDS.selector(1, rule)?;
    molecule.check()?;
    index_fits(molecule.len())?;
    let (bonds, _) = connect::connect(molecule)?;
    let around = Neighbours::new(molecule.len(), &bonds);
    let mut bonding = orders::assign(molecule, bonds, &around);
    bonding.remarks |= remark::BONDS_FOUND;
    if rule == selectors::BONDS_AROMATIC {
        for (bond, _) in bonding.bonds.iter_mut().zip(&bonding.aromatic).filter(|(_, aromatic)| **aromatic) {
            bond.order = 1.5;
        }
    }
    Ok(bonding)
}

/// Atoms and bonds are numbered with 32 bits; the highest numbers are kept as marks.
fn index_fits(atoms: usize) -> Result<(), Failure> {
    if i32::try_from(atoms).is_ok() { Ok(()) } else { Err(Failure::new(Code::TooLarge)) }
}

/// Distance of two atoms [Å].
fn distance(xyz: &[[f64; 3]], a: u32, b: u32) -> f64 {
    let (p, q) = (xyz[a as usize], xyz[b as usize]);
    let (x, y, z) = (p[0] - q[0], p[1] - q[1], p[2] - q[2]);
    (x * x + y * y + z * z).sqrt()
}
