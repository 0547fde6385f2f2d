//! What counts as an aromatic ring, how long its bonds should be, and radicals that look like ions.

use bondmoment::bonds::bond_length;
use bondmoment::bonds::find::{find_bonds, given_bonds};
use bondmoment::molecule::{Bond, Bonding, Molecule};
use bondmoment::selectors::{
    BONDS_ALTERNATING, ELECTRONEGATIVITY_PAULING, LENGTH_BY_ORDER, RADII_CORDERO_2008, STATE_AS_LISTED, STATE_SP2,
};
use bondmoment::status::remark;

fn polygon(n: usize, side: f64, height: f64) -> Vec<[f64; 3]> {
    let step = 2.0 * core::f64::consts::PI / n as f64;
    let radius = 0.5 * side / libm::sin(0.5 * step);
    let at = |k: usize| {
        let up = if k.is_multiple_of(2) { height } else { -height };
        [radius * libm::cos(step * k as f64), radius * libm::sin(step * k as f64), up]
    };
    (0..n).map(at).collect()
}

fn ring(z: &[i32], xyz: &[[f64; 3]], orders: &[f64]) -> Bonding {
    let n = z.len() as u32;
    let bonds: Vec<Bond> =
        (0..n).zip(orders.iter().cycle()).map(|(a, &order)| Bond { a, b: (a + 1) % n, order }).collect();
    given_bonds(Molecule { atomic_number: z, formal_charge: None, xyz }, &bonds).unwrap()
}

/// Lone pairs alone make no aromatic ring, whatever their number (5 S: 10 electrons, 7 S: 14), not even in a flat drawing.
#[test]
fn saturated_rings_are_not_aromatic() {
    for z in [16, 15, 34] {
        for n in [5, 7] {
            let found = ring(&vec![z; n], &polygon(n, 2.06, 0.0), &[1.0]);
            assert!(!found.aromatic.contains(&true), "{n} atoms of element {z}");
        }
    }
    // P4O6: P-O 1.638 Å, O-P-O 99.8° (from memory).
    let (p, o) = (1.0338, 1.7724);
    let mut xyz = vec![[p, p, p], [p, -p, -p], [-p, p, -p], [-p, -p, p]];
    xyz.extend((0..6).map(|k| [0, 1, 2].map(|axis| if axis == k / 2 { [o, -o][k % 2] } else { 0.0 })));
    let z = [15, 15, 15, 15, 8, 8, 8, 8, 8, 8];
    let cage = find_bonds(Molecule { atomic_number: &z, formal_charge: None, xyz: &xyz }, BONDS_ALTERNATING).unwrap();
    assert_eq!(cage.bonds.len(), 12);
    assert!(!cage.aromatic.contains(&true));
}

/// Thiophene and borazine's ring are aromatic by count, a six-ring of alternating bonds only while it is flat.
#[test]
fn aromatic_rings_are_flat() {
    let six = |height: f64| ring(&[6; 6], &polygon(6, 1.4, height), &[1.0, 2.0]).aromatic;
    assert!(six(0.0).iter().all(|&aromatic| aromatic) && six(0.1).iter().all(|&aromatic| aromatic));
    assert!(!six(0.2).contains(&true));
    let thiophene = ring(&[16, 6, 6, 6, 6], &polygon(5, 1.5, 0.0), &[1.0, 2.0, 1.0, 2.0, 1.0]);
    assert!(thiophene.aromatic.iter().all(|&aromatic| aromatic));
    assert!(ring(&[5, 7, 5, 7, 5, 7], &polygon(6, 1.43, 0.0), &[1.0]).aromatic.iter().all(|&aromatic| aromatic));
}

/// Lengths fall with the order; C-C of benzene 1.397, C-N of pyridine 1.338, C-C of ethene 1.339, of ethyne 1.203 Å (from
/// memory).
#[test]
fn lengths_fall_with_the_order() {
    let length = |z: i32, state, order| {
        let radii = (RADII_CORDERO_2008, LENGTH_BY_ORDER, ELECTRONEGATIVITY_PAULING);
        bond_length(radii.0, radii.1, radii.2, 6, STATE_SP2, z, state, order).unwrap()
    };
    for (z, state) in [(6, STATE_SP2), (7, STATE_AS_LISTED), (8, STATE_AS_LISTED), (16, STATE_AS_LISTED)] {
        let lengths = [1.0, 1.5, 2.0, 3.0].map(|order| length(z, state, order).value);
        assert!(lengths.windows(2).all(|pair| pair[0] > pair[1]), "{z}: {lengths:?}");
    }
    assert!((length(6, STATE_SP2, 1.5).value - 1.397).abs() < 0.02);
    assert!((length(7, STATE_AS_LISTED, 1.5).value - 1.338).abs() < 0.02);
    assert!(length(6, STATE_SP2, 1.5).u.is_nan());
}

/// (CH3)2NO, N-O 1.28, N-C 1.46 Å, C-N-C 117° in a plane (common practice), is a neutral radical; so is dicarbon at its
/// 1.243 Å (Huber and Herzberg 1979, from memory) no ion.
#[test]
fn nitroxide_and_dicarbon_are_neutral() {
    let (c, s) = (1.46 * 0.5225, 1.46 * 0.8526);
    let mut atoms = vec![(7, [0.0; 3]), (8, [1.28, 0.0, 0.0])];
    for sign in [1.0, -1.0] {
        let carbon = [-c, sign * s, 0.0];
        atoms.push((6, carbon));
        // The N-C axis, and two directions across it.
        let (e1, e2, e3) = ([-0.5225, sign * 0.8526, 0.0], [0.8526, sign * 0.5225, 0.0], [0.0, 0.0, 1.0]);
        for k in 0..3 {
            let angle = 2.0 * core::f64::consts::PI * f64::from(k) / 3.0;
            let (x, y) = (1.0277 * libm::cos(angle), 1.0277 * libm::sin(angle));
            atoms.push((1, [0, 1, 2].map(|i| carbon[i] + 0.3633 * e1[i] + x * e2[i] + y * e3[i])));
        }
    }
    let (z, xyz): (Vec<i32>, Vec<[f64; 3]>) = atoms.into_iter().unzip();
    let found = find_bonds(Molecule { atomic_number: &z, formal_charge: None, xyz: &xyz }, BONDS_ALTERNATING).unwrap();
    assert_eq!(found.formal_charge, vec![0; z.len()]);
    assert_eq!(found.remarks & (remark::OPEN_SHELL | remark::CHARGES_FOUND), remark::OPEN_SHELL);
    assert!(found.bonds.iter().all(|bond| bond.order == 1.0));
    let xyz = [[0.0; 3], [0.0, 0.0, 1.243]];
    let molecule = Molecule { atomic_number: &[6, 6], formal_charge: None, xyz: &xyz };
    let dicarbon = find_bonds(molecule, BONDS_ALTERNATING).unwrap();
    assert_eq!((dicarbon.formal_charge, dicarbon.bonds[0].order), (vec![0, 0], 2.0));
}
