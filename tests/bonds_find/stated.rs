//! Bonds and charges that the caller states.

use crate::structures::{found, open_set};
use bondmoment::bonds::find::{find_bonds, given_bonds};
use bondmoment::molecule::{Bond, Bonding, Molecule};
use bondmoment::selectors::{BONDS_ALTERNATING, BONDS_AROMATIC};
use bondmoment::status::{Code, remark};

/// Stated bonds come back unchanged and with the same charges as found ones.
#[test]
fn stated_bonds_are_kept() {
    for (stem, one) in open_set() {
        let found = found(&one);
        let mut stated: Vec<Bond> = found.bonds.iter().map(|bond| Bond { a: bond.b, b: bond.a, ..*bond }).collect();
        stated.reverse();
        let given = given_bonds(one.molecule(), &stated).unwrap();
        assert_eq!(given.bonds, found.bonds, "{stem}");
        assert_eq!(given.formal_charge, found.formal_charge, "{stem}");
        assert_eq!(given.aromatic, found.aromatic, "{stem}");
    }
}

/// Order 1.5 in, alternating orders out, with the same sums at every atom as found from the coordinates.
#[test]
fn stated_aromatic_bonds_alternate() {
    let mut checked = 0;
    for (stem, one) in open_set() {
        let aromatic = find_bonds(one.molecule(), BONDS_AROMATIC).unwrap();
        if !aromatic.bonds.iter().any(|bond| bond.order == 1.5) {
            continue;
        }
        checked += 1;
        let given = given_bonds(one.molecule(), &aromatic.bonds).unwrap();
        assert!(given.bonds.iter().all(|bond| bond.order != 1.5), "{stem}");
        assert_eq!(given.aromatic, aromatic.aromatic, "{stem}");
        let sums = |bonding: &Bonding| {
            let mut sums = vec![0.0; one.z.len()];
            for bond in &bonding.bonds {
                sums[bond.a as usize] += bond.order;
                sums[bond.b as usize] += bond.order;
            }
            sums
        };
        assert_eq!(sums(&given), sums(&found(&one)), "{stem}");
    }
    assert!(checked > 20, "{checked}");
}

#[test]
fn wrong_bonds_are_refused() {
    let xyz = [[0.0; 3], [0.0, 0.0, 1.0], [0.0, 1.0, 0.0]];
    let water = Molecule { atomic_number: &[8, 1, 1], formal_charge: None, xyz: &xyz };
    let bond = |a, b, order| Bond { a, b, order };
    let failure = |bonds: &[Bond]| given_bonds(water, bonds).map_err(|failure| (failure.code, failure.item));
    assert_eq!(failure(&[bond(0, 1, 1.0), bond(0, 3, 1.0)]).unwrap_err(), (Code::BadBond, 1));
    assert_eq!(failure(&[bond(1, 1, 1.0)]).unwrap_err(), (Code::BadBond, 0));
    assert_eq!(failure(&[bond(0, 1, 1.0), bond(0, 2, 1.0), bond(1, 0, 2.0)]).unwrap_err(), (Code::BadBond, 2));
    assert_eq!(failure(&[bond(0, 1, 4.0)]).unwrap_err(), (Code::OutOfRange, 0));
    assert_eq!(failure(&[bond(0, 1, f64::NAN)]).unwrap_err(), (Code::Missing, 0));
    assert!(failure(&[]).is_ok());
}

/// Charges that the caller states are kept and the orders fit them.
#[test]
fn stated_charges_rule_the_orders() {
    let set = open_set();
    let (_, nitro) = set.iter().find(|(stem, _)| stem == "nitromethane").unwrap();
    let nitrogen = nitro.z.iter().position(|&z| z == 7).unwrap();
    let about = |bonding: &Bonding| -> f64 {
        let own = bonding.bonds.iter().filter(|bond| bond.a as usize == nitrogen || bond.b as usize == nitrogen);
        own.map(|bond| bond.order).sum()
    };
    let mut charge = vec![0; nitro.z.len()];
    let found_with = |charge: &[i32]| {
        let stated = Molecule { formal_charge: Some(charge), atomic_number: &nitro.z, xyz: &nitro.xyz };
        find_bonds(stated, BONDS_ALTERNATING).unwrap()
    };
    let uncharged = found_with(&charge);
    assert_eq!((about(&uncharged), &uncharged.formal_charge), (5.0, &charge));
    let oxygen: Vec<usize> = (0..nitro.z.len()).filter(|&atom| nitro.z[atom] == 8).collect();
    (charge[nitrogen], charge[oxygen[1]]) = (1, -1);
    let charged = found_with(&charge);
    assert_eq!((about(&charged), &charged.formal_charge), (4.0, &charge));
    let ends = (oxygen[1].min(nitrogen) as u32, oxygen[1].max(nitrogen) as u32);
    assert!(charged.bonds.iter().any(|bond| (bond.a, bond.b) == ends && bond.order == 1.0));
    assert_eq!(charged.remarks & remark::CHARGES_FOUND, 0);
}

/// Aromatic bonds of a heavy-atom skeleton: pyridine alternates, and no charge is made up for missing hydrogens.
#[test]
fn stated_skeleton_without_hydrogens() {
    let z = [7, 6, 6, 6, 6, 6];
    let xyz: Vec<[f64; 3]> = (0..6).map(|k| [f64::from(k), 0.0, 0.0]).collect();
    let molecule = Molecule { atomic_number: &z, formal_charge: None, xyz: &xyz };
    let bonds: Vec<Bond> = (0..6).map(|a| Bond { a, b: (a + 1) % 6, order: 1.5 }).collect();
    let bonding = given_bonds(molecule, &bonds).unwrap();
    assert_eq!(bonding.bonds.iter().map(|bond| bond.order).sum::<f64>(), 9.0);
    assert_eq!(bonding.formal_charge, [0; 6]);
    assert!(bonding.aromatic.iter().all(|&aromatic| aromatic));
}

/// A carbon atom with five hydrogens is remarked, not refused.
#[test]
fn impossible_valence_is_a_remark() {
    let xyz =
        [[0.0, 0.0, 0.0], [0.0, 0.0, 1.1], [0.0, 0.0, -1.1], [1.1, 0.0, 0.0], [-0.55, 0.95, 0.0], [-0.55, -0.95, 0.0]];
    let molecule = Molecule { atomic_number: &[6, 1, 1, 1, 1, 1], formal_charge: None, xyz: &xyz };
    let bonds: Vec<Bond> = (1..6).map(|b| Bond { a: 0, b, order: 1.0 }).collect();
    let given = given_bonds(molecule, &bonds).unwrap();
    assert_eq!((given.remarks & remark::IMPOSSIBLE_VALENCE, given.item), (remark::IMPOSSIBLE_VALENCE, Some(0)));
    assert_eq!(given.bonds.len(), 5);
    // From the coordinates carbon keeps four, so one hydrogen is left alone.
    assert_eq!(find_bonds(molecule, BONDS_ALTERNATING).unwrap().bonds.len(), 4);
}
