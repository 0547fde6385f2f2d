use crate::random::{Random, about_axis, difference, length};
use crate::structures::{Structure, structure};
use bondmoment::charges::{Charges, peoe::peoe_charges};
use bondmoment::constants::DEBYE_PER_E_ANGSTROM as K;
use bondmoment::molecule::{Bond, Bonding, Molecule, Neighbours};
use bondmoment::moments::{Flexibility, dipole, greatest_dipole, may_change_by_turning};
use proptest::prelude::*;

fn peoe(found: &Structure) -> Charges {
    peoe_charges(found.molecule(), &found.bonding).unwrap()
}

fn bound(name: &str) -> Flexibility {
    let found = structure(name);
    greatest_dipole(found.molecule(), &found.bonding, &peoe(&found)).unwrap()
}

fn magnitude(charge: &[f64], xyz: &[[f64; 3]]) -> f64 {
    length([0, 1, 2].map(|k| charge.iter().zip(xyz).map(|(q, r)| q * r[k]).sum::<f64>() * K))
}

/// Neutral random charges.
fn random_charges(random: &mut Random, n: usize) -> Vec<f64> {
    let mut charge: Vec<f64> = (0..n).map(|_| random.sign()).collect();
    let mean = charge.iter().sum::<f64>() / n as f64;
    charge.iter_mut().for_each(|q| *q -= mean);
    charge
}

/// Everything beyond bond i-j, on the side of j, turned about it.
fn turn(found: &Structure, xyz: &mut [[f64; 3]], i: u32, j: u32, angle: f64) {
    let around = Neighbours::new(xyz.len(), &found.bonding.bonds);
    let mut moving = vec![j];
    let mut head = 0;
    while head < moving.len() {
        let atom = moving[head];
        head += 1;
        for &(other, _) in around.of(atom as usize) {
            let back = atom == j && other == i;
            if !back && !moving.contains(&other) {
                moving.push(other);
            }
        }
    }
    let (a, b) = (xyz[i as usize], xyz[j as usize]);
    moving.iter().for_each(|&atom| xyz[atom as usize] = about_axis(xyz[atom as usize], a, b, angle));
}

/// Alkanes stay far below 0.2 D in every conformation, and so do methyl, chlorophenyl and the like on their axes.
#[test]
fn little_can_come_of_alkanes() {
    for (name, hinges) in [
        ("hexane", 5),
        ("cyclohexane", 6),
        ("2_2-dimethylpropane", 4),
        ("ethane", 1),
        ("hexachloroethane", 1),
        ("norbornane", 0),
        ("benzene", 0),
        ("1_4-benzoquinone", 0),
        ("trans-1_2-dichloroethene", 0),
        ("methane", 0),
    ] {
        let found = bound(name);
        assert_eq!(found.hinges, hinges, "{name}");
        assert!(found.bound_D < 0.06, "{name}: {found:?}");
    }
    assert!(bound("norbornane").bound_D < 0.06);
}

/// Syn-1,2-dichloroethane is the worst conformer, and the bound is no more than a little above it.
#[test]
fn much_can_come_of_dichloroethane() {
    let found = structure("anti-1_2-dichloroethane");
    let charges = peoe(&found);
    let mut worst = 0.0_f64;
    for step in 0..72 {
        let mut xyz = found.xyz.clone();
        turn(&found, &mut xyz, 1, 2, f64::from(step) * core::f64::consts::PI / 36.0);
        worst = worst.max(magnitude(&charges.charge, &xyz));
    }
    let anti = bound("anti-1_2-dichloroethane");
    assert!(magnitude(&charges.charge, &found.xyz) < 1e-3 && worst > 1.5);
    assert!(anti.bound_D >= worst - 1e-9 && anti.bound_D < 1.001 * worst, "{anti:?} {worst}");
    // Any conformer has the same bound.
    assert!((bound("gauche-1_2-dichloroethane").bound_D - anti.bound_D).abs() < 2e-3);
    assert!(bound("1_4-dihydroxybenzene").bound_D > 1.5);
    assert!(bound("1_4-dioxane").bound_D > 1.5);
    assert_eq!(bound("1_4-dioxane").hinges, 6);
}

#[test]
fn without_hinges_the_bound_is_the_dipole() {
    for name in ["water", "1_2-dichlorobenzene", "fluoromethane"] {
        let found = structure(name);
        let here = dipole(found.molecule(), &peoe(&found), 0.0).unwrap().magnitude.value;
        assert!((bound(name).bound_D - here).abs() < 1e-12 && here > 0.5, "{name}");
    }
    // Acetate: a net charge and a hinge.
    assert_eq!(bound("acetate_ion"), Flexibility { bound_D: f64::INFINITY, hinges: 1 });
}

#[test]
fn harmless_turns_are_told_without_charges() {
    let matters = |name| {
        let found = structure(name);
        may_change_by_turning(found.molecule(), &found.bonding)
    };
    for name in ["ethane", "2_2-dimethylpropane", "hexachloroethane", "sulfur_hexafluoride", "benzene", "acetonitrile"]
    {
        assert!(!matters(name), "{name}");
    }
    for name in ["anti-1_2-dichloroethane", "1_4-dihydroxybenzene", "1_4-dioxane", "hexane", "cyclohexane"] {
        assert!(matters(name), "{name}");
    }
}

/// Amide C-N bonds, cages and aromatic or flat rings do not turn; ring and chain bonds between sp3 atoms do.
#[test]
fn what_is_a_hinge() {
    let hinges = |z: &[i32], pairs: &[(u32, u32, f64)], seed: u64| {
        let mut random = Random(seed);
        let xyz: Vec<_> = z.iter().map(|_| random.vector().map(|x| 3.0 * x)).collect();
        let bonds = pairs.iter().map(|&(a, b, order)| Bond { a, b, order }).collect();
        let bonding = Bonding { bonds, ..Bonding::default() };
        let molecule = Molecule { atomic_number: z, formal_charge: None, xyz: &xyz };
        greatest_dipole(molecule, &bonding, &Charges { charge: vec![0.0; z.len()], u: None, along_bond: None })
            .unwrap()
            .hinges
    };
    // N-methylformamide without hydrogens on carbon: O=C-N(H)-C-H: only N-CH turns.
    let amide = [(0, 1, 2.0), (1, 2, 1.0), (2, 3, 1.0), (2, 4, 1.0), (4, 5, 1.0)];
    assert_eq!(hinges(&[8, 6, 7, 1, 6, 1], &amide, 3), 1);
    // The same with an ester oxygen turns twice.
    let ester = [(0, 1, 2.0), (1, 2, 1.0), (2, 3, 1.0), (3, 4, 1.0)];
    assert_eq!(hinges(&[8, 6, 8, 6, 1], &ester, 3), 2);
    let ring =
        |n: u32| -> Vec<(u32, u32, f64)> { (0..n).map(|i| (i.min((i + 1) % n), i.max((i + 1) % n), 1.0)).collect() };
    // Rings of sulfur, which are not flat here: S8 turns, a three-ring does not.
    assert_eq!(hinges(&[16; 8], &ring(8), 5), 8);
    assert_eq!(hinges(&[16; 3], &ring(3), 5), 0);
    assert_eq!(hinges(&[16; 12], &ring(12), 5), 12);
    // Cubane's carbons.
    let cube: Vec<_> =
        (0..8_u32).flat_map(|i| [1, 2, 4].map(|bit| (i, i ^ bit, 1.0))).filter(|&(i, j, _)| i < j).collect();
    assert_eq!(hinges(&[6; 8], &cube, 5), 0);
    // Adamantane's carbons: four bridgeheads 0 to 3, six bridges 4 to 9.
    let pairs = [(0, 1), (0, 2), (0, 3), (1, 2), (1, 3), (2, 3)];
    let adamantane: Vec<_> =
        pairs.iter().zip(4..).flat_map(|(&(a, b), bridge)| [(a, bridge, 1.0), (b, bridge, 1.0)]).collect();
    assert_eq!(hinges(&[6; 10], &adamantane, 5), 0);
}

/// Chain and bound are linear in the atoms: ten thousand CH2 in a row, deep below one debye.
#[test]
fn a_long_chain_is_bounded() {
    let mut found = Structure { atomic_number: Vec::new(), xyz: Vec::new(), bonding: Bonding::default() };
    let n = 10_000_u32;
    for i in 0..n {
        let (x, up) = (1.26 * f64::from(i), i % 2 == 1);
        let (y, side) = if up { (0.87, 0.63) } else { (0.0, -0.63) };
        let carbon = 3 * i;
        found.atomic_number.extend([6, 1, 1]);
        found.xyz.extend([[x, y, 0.0], [x, y + side, 0.89], [x, y + side, -0.89]]);
        for other in [carbon + 1, carbon + 2, carbon + 3] {
            // The two ends are left open: their charges differ, no more.
            if other < 3 * n {
                found.bonding.bonds.push(Bond { a: carbon, b: other, order: 1.0 });
            }
        }
    }
    found.bonding.formal_charge = vec![0; found.xyz.len()];
    let result = greatest_dipole(found.molecule(), &found.bonding, &peoe(&found)).unwrap();
    assert_eq!(result.hinges, n as usize - 1);
    assert!(result.bound_D < 1.0, "{result:?}");
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(100))]

    /// No conformation passes the bound, whatever the charges.
    #[test]
    fn chains_never_pass_the_bound(seed in 1_u64..u64::MAX) {
        let mut random = Random(seed);
        for (name, bonds) in [
            ("hexane", &[(0, 1), (1, 2), (2, 3), (3, 4), (4, 5)][..]),
            ("ethanol", &[(0, 1), (1, 2)]),
            ("1_4-dihydroxybenzene", &[(0, 6), (3, 10)]),
        ] {
            let found = structure(name);
            let n = found.xyz.len();
            let charges = Charges { charge: random_charges(&mut random, n), u: None, along_bond: None };
            let result = greatest_dipole(found.molecule(), &found.bonding, &charges).unwrap();
            for _ in 0..20 {
                let mut xyz = found.xyz.clone();
                for &(i, j) in bonds {
                    let j = if name == "1_4-dihydroxybenzene" { oxygen(&found, i) } else { j };
                    turn(&found, &mut xyz, i, j, 7.0 * random.unit());
                }
                prop_assert!(magnitude(&charges.charge, &xyz) <= result.bound_D * (1.0 + 1e-12), "{name}");
            }
        }
    }

    /// Nitrogen inversion: the amino group reflected in a plane through the C-N axis, and turned.
    #[test]
    fn nitrogen_inversion_never_passes_the_bound(seed in 1_u64..u64::MAX) {
        let mut random = Random(seed);
        let found = structure("methylamine");
        let charges = Charges { charge: random_charges(&mut random, 7), u: None, along_bond: None };
        let result = greatest_dipole(found.molecule(), &found.bonding, &charges).unwrap();
        prop_assert_eq!(result.hinges, 1);
        let mut xyz = found.xyz.clone();
        // The axis is x through the carbon at the origin, so that the plane y = 0 holds it.
        prop_assert!(length(xyz[0]) == 0.0 && xyz[1][1] == 0.0 && xyz[1][2] == 0.0);
        for hydrogen in [5, 6] {
            xyz[hydrogen][1] *= -1.0;
        }
        turn(&found, &mut xyz, 0, 1, 7.0 * random.unit());
        prop_assert!(magnitude(&charges.charge, &xyz) <= result.bound_D * (1.0 + 1e-12));
    }

    /// The other chair of cyclohexane: the mirror image with the two hydrogens of every carbon exchanged, which keeps all
    /// bond lengths and angles but swaps axial and equatorial.
    #[test]
    fn ring_inversion_never_passes_the_bound(seed in 1_u64..u64::MAX) {
        let mut random = Random(seed);
        let found = structure("cyclohexane");
        let charges = Charges { charge: random_charges(&mut random, 18), u: None, along_bond: None };
        let result = greatest_dipole(found.molecule(), &found.bonding, &charges).unwrap();
        let mut other: Vec<[f64; 3]> = found.xyz.iter().map(|p| [p[0], p[1], -p[2]]).collect();
        for carbon in 0..6 {
            other.swap(6 + 2 * carbon, 7 + 2 * carbon);
        }
        for bond in &found.bonding.bonds {
            let apart = |xyz: &[[f64; 3]]| length(difference(xyz[bond.a as usize], xyz[bond.b as usize]));
            prop_assert!((apart(&other) - apart(&found.xyz)).abs() < 1e-3);
        }
        prop_assert!(magnitude(&charges.charge, &found.xyz) <= result.bound_D * (1.0 + 1e-12));
        prop_assert!(magnitude(&charges.charge, &other) <= result.bound_D * (1.0 + 1e-3));
    }
}

/// The oxygen on a ring carbon.
fn oxygen(found: &Structure, carbon: u32) -> u32 {
    let around = Neighbours::new(found.xyz.len(), &found.bonding.bonds);
    around
        .of(carbon as usize)
        .iter()
        .map(|&(atom, _)| atom)
        .find(|&atom| found.atomic_number[atom as usize] == 8)
        .unwrap()
}
