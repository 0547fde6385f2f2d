use crate::random::{Random, about_axis, difference, length, turned};
use crate::structures::structure;
use bondmoment::molecule::Molecule;
use bondmoment::moments::{DipoleSymmetry, dipole_symmetry};
use bondmoment::status::Code;

type Matrix = [[f64; 3]; 3];

fn turn(n: f64) -> Matrix {
    let angle = 2.0 * core::f64::consts::PI / n;
    let (c, s) = (libm::cos(angle), libm::sin(angle));
    [[c, -s, 0.0], [s, c, 0.0], [0.0, 0.0, 1.0]]
}

const INVERSION: Matrix = [[-1.0, 0.0, 0.0], [0.0, -1.0, 0.0], [0.0, 0.0, -1.0]];
const ACROSS: Matrix = [[1.0, 0.0, 0.0], [0.0, 1.0, 0.0], [0.0, 0.0, -1.0]];
const ALONG: Matrix = [[1.0, 0.0, 0.0], [0.0, -1.0, 0.0], [0.0, 0.0, 1.0]];
const C2X: Matrix = [[1.0, 0.0, 0.0], [0.0, -1.0, 0.0], [0.0, 0.0, -1.0]];
const C3: Matrix = [[0.0, 0.0, 1.0], [1.0, 0.0, 0.0], [0.0, 1.0, 0.0]];

fn improper(n: f64) -> Matrix {
    let mut m = turn(n);
    m[2][2] = -1.0;
    m
}

/// Fivefold rotation about (0, 1, φ), which with the twofold axes x, y, z and the threefold axis (1, 1, 1) makes the
/// icosahedral rotations.
fn c5() -> Matrix {
    let axis = [0.0, 1.0, (1.0 + 5.0_f64.sqrt()) / 2.0];
    let angle = 0.4 * core::f64::consts::PI;
    let columns = [[1.0, 0.0, 0.0], [0.0, 1.0, 0.0], [0.0, 0.0, 1.0]].map(|e| about_axis(e, [0.0; 3], axis, angle));
    [0, 1, 2].map(|row| columns.map(|column| column[row]))
}

/// The images of random points of five elements under the group that the generators make.
fn orbit(generators: &[Matrix], random: &mut Random, noise: f64) -> (Vec<i32>, Vec<[f64; 3]>) {
    let (mut z, mut xyz) = (Vec::new(), Vec::new());
    for element in [1, 6, 7, 8, 9] {
        let mut own = vec![random.vector().map(|x| 2.0 * x)];
        let mut head = 0;
        while head < own.len() {
            for m in generators {
                let image = turned(m, own[head]);
                if own.iter().all(|&p| length(difference(p, image)) > 1e-6) {
                    own.push(image);
                }
            }
            head += 1;
            assert!(own.len() <= 120, "the generators make no finite group");
        }
        z.extend(own.iter().map(|_| element));
        xyz.extend(own);
    }
    let (m, shift) = (random.rotation(), random.vector());
    let order = random.permutation(z.len());
    let moved = |i: usize, random: &mut Random| {
        let (p, e) = (turned(&m, xyz[i]), random.vector());
        [0, 1, 2].map(|k| p[k] + 5.0 * shift[k] + noise * e[k])
    };
    (order.iter().map(|&i| z[i]).collect(), order.iter().map(|&i| moved(i, random)).collect())
}

/// A dipole is allowed in C1, Cs, Cn and Cnv alone (J. H. Van Vleck's rule of the totally symmetric vector; F. A. Cotton,
/// Chemical Applications of Group Theory, 3rd edition, 1990: character tables; from memory).
#[test]
fn point_groups_allow_what_their_character_tables_say() {
    let mut random = Random(20240229);
    let mut groups: Vec<(String, Vec<Matrix>, usize)> = vec![
        ("C1".into(), vec![], 3),
        ("Cs".into(), vec![ALONG], 2),
        ("Ci".into(), vec![INVERSION], 0),
        ("S4".into(), vec![improper(4.0)], 0),
        ("S6".into(), vec![improper(6.0)], 0),
        ("S8".into(), vec![improper(8.0)], 0),
        ("T".into(), vec![turn(2.0), C3], 0),
        ("Td".into(), vec![improper(4.0), C3], 0),
        ("Th".into(), vec![turn(2.0), C3, INVERSION], 0),
        ("O".into(), vec![turn(4.0), C3], 0),
        ("Oh".into(), vec![turn(4.0), C3, INVERSION], 0),
        ("I".into(), vec![c5(), turn(2.0), C3], 0),
        ("Ih".into(), vec![c5(), turn(2.0), C3, INVERSION], 0),
    ];
    for n in [2, 3, 4, 5, 6, 7, 12] {
        let c = turn(f64::from(n));
        groups.push((format!("C{n}"), vec![c], 1));
        groups.push((format!("C{n}v"), vec![c, ALONG], 1));
        groups.push((format!("C{n}h"), vec![c, ACROSS], 0));
        groups.push((format!("D{n}"), vec![c, C2X], 0));
        groups.push((format!("D{n}h"), vec![c, C2X, ACROSS], 0));
        groups.push((format!("D{n}d"), vec![improper(2.0 * f64::from(n)), C2X], 0));
    }
    for (name, generators, dimensions) in groups {
        for noise in [0.0, 0.001] {
            let (z, xyz) = orbit(&generators, &mut random, noise);
            let molecule = Molecule { atomic_number: &z, formal_charge: None, xyz: &xyz };
            let found = match dipole_symmetry(molecule, 0.01).unwrap() {
                DipoleSymmetry::Forbidden => 0,
                DipoleSymmetry::Axis(_) => 1,
                DipoleSymmetry::Plane(_) => 2,
                DipoleSymmetry::Any => 3,
            };
            assert_eq!(found, dimensions, "{name}, noise {noise}");
        }
        // Distorted beyond the tolerance, nothing is left.
        let (z, xyz) = orbit(&generators, &mut random, 0.3);
        let molecule = Molecule { atomic_number: &z, formal_charge: None, xyz: &xyz };
        let distorted = dipole_symmetry(molecule, 0.01).unwrap();
        assert_eq!(distorted, DipoleSymmetry::Any, "{name}");
    }
}

#[test]
fn linear_molecules_and_single_atoms() {
    let symmetry = |z: &[i32], x: &[f64]| {
        let xyz: Vec<[f64; 3]> = x.iter().map(|&x| [1.0 + 0.6 * x, 2.0, 0.8 * x]).collect();
        dipole_symmetry(Molecule { atomic_number: z, formal_charge: None, xyz: &xyz }, 0.01).unwrap()
    };
    assert_eq!(symmetry(&[18], &[0.0]), DipoleSymmetry::Forbidden);
    assert_eq!(symmetry(&[1, 1], &[0.0, 0.74]), DipoleSymmetry::Forbidden);
    assert_eq!(symmetry(&[8, 6, 8], &[-1.16, 0.0, 1.16]), DipoleSymmetry::Forbidden);
    assert_eq!(symmetry(&[8, 6, 8], &[-1.16, 0.0, 1.155]), DipoleSymmetry::Forbidden);
    for (z, x) in
        [(&[1, 17][..], &[0.0, 1.27][..]), (&[8, 6, 16], &[-1.16, 0.0, 1.56]), (&[8, 6, 8], &[-1.16, 0.0, 1.2])]
    {
        let DipoleSymmetry::Axis(axis) = symmetry(z, x) else { panic!("{z:?}") };
        assert!(length(difference(axis, [0.6, 0.0, 0.8])) < 1e-12);
    }
}

#[test]
fn molecules_have_their_point_groups() {
    use DipoleSymmetry::Forbidden;
    for name in [
        "methane",
        "ethane",
        "ethene",
        "benzene",
        "tetrachloromethane",
        "sulfur_hexafluoride",
        "1_4-benzoquinone",
        "cyclohexane",
    ] {
        assert_eq!(dipole_symmetry(structure(name).molecule(), 0.01), Ok(Forbidden), "{name}");
    }
    for name in ["water", "ammonia", "propane", "1_2-dichlorobenzene", "norbornane", "cis-1_2-dichloroethene"] {
        let found = dipole_symmetry(structure(name).molecule(), 0.01);
        assert!(matches!(found, Ok(DipoleSymmetry::Axis(_))), "{name}: {found:?}");
    }
    for name in ["methanol", "acetic_acid", "fluoroethane"] {
        let found = dipole_symmetry(structure(name).molecule(), 0.01);
        assert!(matches!(found, Ok(DipoleSymmetry::Plane(_))), "{name}: {found:?}");
    }
    let found = structure("water");
    for tolerance in [0.0, -1.0, f64::NAN, 1.0] {
        assert_eq!(dipole_symmetry(found.molecule(), tolerance).unwrap_err().code, Code::OutOfRange);
    }
}

/// Buckminsterfullerene: the sixty even permutations of (0, ±1, ±3φ), (±1, ±(2+φ), ±2φ), (±φ, ±2, ±(2φ+1)), edge 2
/// (H. S. M. Coxeter's truncated icosahedron; from memory).
#[test]
fn sixty_carbon_atoms() {
    let golden = (1.0 + 5.0_f64.sqrt()) / 2.0;
    let mut xyz: Vec<[f64; 3]> = Vec::new();
    for corner in [[0.0, 1.0, 3.0 * golden], [1.0, 2.0 + golden, 2.0 * golden], [golden, 2.0, 2.0 * golden + 1.0]] {
        for signs in 0..8 {
            let sign = |bit: i32| if signs & bit == 0 { 0.72 } else { -0.72 };
            let p = [corner[0] * sign(1), corner[1] * sign(2), corner[2] * sign(4)];
            for image in [p, [p[1], p[2], p[0]], [p[2], p[0], p[1]]] {
                if xyz.iter().all(|&q| length(difference(q, image)) > 1e-6) {
                    xyz.push(image);
                }
            }
        }
    }
    assert_eq!(xyz.len(), 60);
    let of = |z: &[i32]| dipole_symmetry(Molecule { atomic_number: z, formal_charge: None, xyz: &xyz }, 0.01).unwrap();
    let mut z = [6; 60];
    assert_eq!(of(&z), DipoleSymmetry::Forbidden);
    // One nitrogen leaves a mirror plane.
    z[7] = 7;
    assert!(matches!(of(&z), DipoleSymmetry::Plane(_)));
}

/// Ten thousand atoms without symmetry, all in one point, and in a lattice with one corner gone.
#[test]
fn large_systems_end() {
    let mut random = Random(7);
    let xyz: Vec<_> = (0..10_000).map(|_| random.vector().map(|x| 25.0 * x)).collect();
    let z: Vec<i32> = (0..10_000).map(|i| [1, 1, 6, 8][i % 4]).collect();
    let of = |z: &[i32], xyz: &[[f64; 3]]| {
        dipole_symmetry(Molecule { atomic_number: z, formal_charge: None, xyz }, 0.01).unwrap()
    };
    assert_eq!(of(&z, &xyz), DipoleSymmetry::Any);
    assert_eq!(of(&vec![6; 10_000], &vec![[1.0; 3]; 10_000]), DipoleSymmetry::Forbidden);
    let mut lattice: Vec<[f64; 3]> =
        (0..8000).map(|i| [i % 20, i / 20 % 20, i / 400].map(|k: i32| 2.8 * f64::from(k))).collect();
    assert_eq!(of(&z[..1].repeat(8000), &lattice), DipoleSymmetry::Forbidden);
    lattice.remove(0);
    let DipoleSymmetry::Axis(axis) = of(&z[..1].repeat(7999), &lattice) else { panic!("C3v") };
    assert!(length(difference(axis, [1.0 / 3.0_f64.sqrt(); 3])) < 1e-6);
}
