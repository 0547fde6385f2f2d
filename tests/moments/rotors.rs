//! Rotors whose setting does not matter, bridges that hold, rings that turn on a metal.

use bondmoment::bonds::find::find_bonds;
use bondmoment::charges::peoe::peoe_charges;
use bondmoment::molecule::Molecule;
use bondmoment::moments::polarity::verdict;
use bondmoment::moments::{PEOE_RMS_D, Verdict};
use bondmoment::selectors::{BONDS_ALTERNATING, POLARITY_NON_POLAR, POLARITY_POLAR, POLARITY_UNDECIDED};
use bondmoment::status::remark;

type Atoms = Vec<(i32, [f64; 3])>;

fn judge(atoms: &Atoms) -> Verdict {
    let (z, xyz): (Vec<i32>, Vec<[f64; 3]>) = atoms.iter().copied().unzip();
    let molecule = Molecule { atomic_number: &z, formal_charge: None, xyz: &xyz };
    let bonding = find_bonds(molecule, BONDS_ALTERNATING).unwrap();
    let charges = peoe_charges(molecule, &bonding);
    verdict(molecule, &bonding, charges.as_ref().map_err(|failure| *failure), 0.0, 0.2, PEOE_RMS_D).unwrap()
}

/// A point on a circle about the x axis.
fn about_x(x: f64, radius: f64, degrees: f64) -> [f64; 3] {
    let angle = degrees.to_radians();
    [x, radius * libm::cos(angle), radius * libm::sin(angle)]
}

/// Benzene with XY3 groups at 1 and 4, each turned by its own angle from a textbook tetrahedron.
fn para(end: [i32; 2], length: [f64; 2], setting: [f64; 2]) -> Atoms {
    let mut atoms = Atoms::new();
    for k in 0..6 {
        let angle = f64::from(k) * core::f64::consts::FRAC_PI_3;
        let (c, s) = (libm::cos(angle), libm::sin(angle));
        atoms.push((6, [1.397 * c, 1.397 * s, 0.0]));
        if k % 3 != 0 {
            atoms.push((1, [2.48 * c, 2.48 * s, 0.0]));
        }
    }
    for side in 0..2 {
        let sign = if side == 0 { 1.0 } else { -1.0 };
        atoms.push((6, [sign * (1.397 + 1.51), 0.0, 0.0]));
        for k in 0..3 {
            // Cosine and sine of 70.53°.
            let x = 1.397 + 1.51 + length[side] / 3.0;
            atoms.push((end[side], about_x(sign * x, length[side] * 0.9428, setting[side] + 120.0 * f64::from(k))));
        }
    }
    atoms
}

/// 1,4-Dimethylbenzene and 1,4-bis(trifluoromethyl)benzene have no dipole (common knowledge), however their groups are set;
/// 4-methylbenzotrifluoride has one, 2.8 D (from memory).
#[test]
fn the_setting_of_a_methyl_group_does_not_matter() {
    for setting in [[0.0, 0.0], [0.0, 90.0], [7.0, 31.0], [13.0, -40.0]] {
        for (end, length) in [(1, 1.09), (9, 1.345)] {
            let found = judge(&para([end; 2], [length; 2], setting));
            assert_eq!(found.polarity, POLARITY_NON_POLAR, "{end} {setting:?}: {found:?}");
            assert_eq!(found.remarks, remark::BY_SYMMETRY);
            assert_eq!(found.dipole.vector, [0.0; 3]);
        }
        let mixed = judge(&para([1, 9], [1.09, 1.345], setting));
        assert_eq!((mixed.polarity, mixed.remarks), (POLARITY_POLAR, 0), "{mixed:?}");
    }
}

/// Hydrogen and halogen bridges are rigid: B2H6, Ga2H6 and Al2Cl6 (D2h; lengths from memory) are non-polar with no
/// charges at all.
#[test]
fn bridges_do_not_turn() {
    for (metal, end, half, bridge, y, z) in
        [(5, 1, 0.8815, 0.9825, 1.0453, 1.4729), (31, 1, 1.29, 1.13, 1.33, 2.04), (13, 17, 1.60, 1.58, 1.79, 2.68)]
    {
        let mut atoms = Atoms::new();
        for sign in [1.0, -1.0] {
            atoms.push((metal, [0.0, 0.0, sign * half]));
            atoms.push((end, [0.0, sign * bridge, 0.0]));
            atoms.push((end, [y, 0.0, sign * z]));
            atoms.push((end, [-y, 0.0, sign * z]));
        }
        let found = judge(&atoms);
        assert_eq!(found.polarity, POLARITY_NON_POLAR, "{metal}: {found:?}");
        assert_eq!(found.remarks, remark::BY_SYMMETRY);
    }
}

/// Staggered ferrocene, Fe-C 2.064, C-C 1.440 Å (from memory), with substituents at one place of each ring, opposite one
/// another.
fn ferrocene(substituent: Option<(i32, f64)>) -> Atoms {
    let mut atoms: Atoms = vec![(26, [0.0; 3])];
    for sign in [1.0, -1.0] {
        for k in 0..5 {
            let angle = 0.4 * core::f64::consts::PI * f64::from(k);
            let at = |radius: f64| [sign * radius * libm::cos(angle), sign * radius * libm::sin(angle), sign * 1.66121];
            atoms.push((6, at(1.22494)));
            let (z, beyond) = substituent.filter(|_| k == 0).unwrap_or((1, 1.08));
            atoms.push((z, at(1.22494 + beyond)));
        }
    }
    atoms
}

/// The rings turn (barrier 3.8 kJ/mol, from memory): ferrocene stays without a dipole, 1,1'-dichloroferrocene does not.
#[test]
fn rings_turn_on_a_metal() {
    let plain = judge(&ferrocene(None));
    assert_eq!((plain.polarity, plain.remarks), (POLARITY_NON_POLAR, remark::BY_SYMMETRY));
    let anti = judge(&ferrocene(Some((17, 1.72))));
    assert_eq!((anti.polarity, anti.remarks), (POLARITY_UNDECIDED, remark::BY_SYMMETRY | remark::ONE_CONFORMER));
}
