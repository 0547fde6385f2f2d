use crate::random::{Random, length, turned};
use crate::structures::{checks, numbers, structure, value};
use bondmoment::charges::{Charges, peoe::peoe_charges};
use bondmoment::constants::DEBYE_PER_E_ANGSTROM as K;
use bondmoment::molecule::Molecule;
use bondmoment::moments::{dipole, dipole_of_charges, polarity};
use bondmoment::selectors::Selector;
use bondmoment::status::{Code, Failure};
use proptest::prelude::*;

fn triples(numbers: &[f64]) -> Vec<[f64; 3]> {
    numbers.chunks(3).map(|p| [p[0], p[1], p[2]]).collect()
}

#[test]
fn published_resultants_and_verdicts() {
    let mut rows = 0;
    for check in checks("moments.csv") {
        let given = |name| numbers(value(&check.arguments, name).unwrap());
        rows += 1;
        assert_ne!(check.mark, "");
        match check.function.as_str() {
            "dipole_of_charges" => {
                let found = dipole_of_charges(&given("charge_e"), None, &triples(&given("xyz_A")), None).unwrap();
                let expected = numbers(value(&check.expected, "magnitude_D").unwrap())[0];
                assert!((found.magnitude.value - expected).abs() <= check.tolerance, "{}: {found:?}", check.arguments);
                for (x, wanted) in found.vector.iter().zip(numbers(value(&check.expected, "dipole_D").unwrap_or(""))) {
                    assert!((x - wanted).abs() <= check.tolerance, "{}: {found:?}", check.arguments);
                }
                assert!(found.magnitude.u.is_nan() && found.covariance[0][0].is_nan());
            }
            "dipole_polarity" => {
                let c = triples(&given("covariance_D2"));
                let found = polarity(triples(&given("dipole_D"))[0], &[c[0], c[1], c[2]], given("limit_D")[0]);
                let expected = Selector::by_name(value(&check.expected, "polarity").unwrap());
                assert_eq!(found, expected, "{}", check.arguments);
            }
            other => panic!("{other}"),
        }
    }
    assert_eq!(rows, 24);
}

/// Two charges ±q at a distance d: u(μ)² = k² (q² 2 u_x² + d² u(q₁)² …). About the midpoint, both positions d/2 away:
/// k² (d²/4 (u₁² + u₂²) + 2 q² u_x²) along the axis, 2 k² q² u_x² across.
#[test]
fn independent_inputs_propagate() {
    let xyz = [[0.0, 0.0, 1.0], [0.0, 0.0, -1.0]];
    let found = dipole_of_charges(&[0.3, -0.3], Some(&[0.03, 0.04]), &xyz, Some(&[0.01, 0.01])).unwrap();
    let across = 2.0 * 0.09 * 1e-4 * K * K;
    let along = 0.0025 * K * K + across;
    for (k, expected) in [across, across, along].iter().enumerate() {
        assert!((found.covariance[k][k] - expected).abs() < 1e-15);
    }
    assert!((found.magnitude.value - 0.6 * K).abs() < 1e-15);
    assert!((found.magnitude.u - along.sqrt()).abs() < 1e-15);
    // At a dipole of exactly zero the uncertainty is the largest of any direction, here along z.
    let none = dipole_of_charges(&[0.0, 0.0], Some(&[0.03, 0.04]), &xyz, Some(&[0.0, 0.0])).unwrap();
    assert_eq!(none.magnitude.value, 0.0);
    assert!((none.magnitude.u - 0.05 * K).abs() < 1e-15);
}

#[test]
fn a_net_charge_or_a_broken_number_is_refused() {
    let xyz = [[0.0; 3], [0.0, 0.0, 1.0]];
    let status = |q: [f64; 2], u: Option<&[f64]>, xyz: &[[f64; 3]]| {
        dipole_of_charges(&q, u, xyz, Some(&[0.0, 0.0])).map_err(|failure| failure.status())
    };
    assert_eq!(status([0.1, -0.1001], None, &xyz), Err(Code::Charged as i32));
    assert!(status([0.1, -0.1 + 9e-7], None, &xyz).is_ok());
    assert_eq!(status([f64::NAN, 0.1], None, &xyz), Err(Failure::of(Code::Missing, 1).status()));
    assert_eq!(status([0.1, -0.1], Some(&[-0.1, 0.0]), &xyz), Err(Failure::of(Code::NegativeUncertainty, 1).status()));
    assert_eq!(status([0.1, -0.1], None, &xyz[..1]), Err(Failure::of(Code::Missing, 2).status()));
    let far = [[0.0; 3], [0.0, 0.0, f64::INFINITY]];
    assert_eq!(status([0.1, -0.1], None, &far), Err(Failure::of(Code::NotFinite, 2).status()));
    assert_eq!(status([1e308, -1e308], None, &[[0.0; 3], [0.0, 0.0, 1e9]]), Err(Code::OutOfRange as i32));
    assert_eq!(dipole_of_charges(&[], None, &[], None), Err(Failure::new(Code::NoAtoms)));
    let [c, none] = [[[0.01, 0.0, 0.0], [0.0; 3], [0.0; 3]], [[f64::NAN; 3]; 3]];
    assert_eq!(polarity([1.0, 0.0, 0.0], &none, 0.2), Err(Failure::of(Code::Missing, 2)));
    assert_eq!(polarity([1.0, 0.0, 0.0], &c, 0.0), Err(Failure::of(Code::OutOfRange, 1)));
    let lopsided = [[0.01, 0.005, 0.0], [0.0, 0.01, 0.0], [0.0; 3]];
    assert_eq!(polarity([1.0, 0.0, 0.0], &lopsided, 0.2), Err(Failure::of(Code::OutOfRange, 2)));
    let negative = [[0.0, 0.01, 0.0], [0.01, 0.0, 0.0], [0.0; 3]];
    assert_eq!(polarity([1.0, 0.0, 0.0], &negative, 0.2), Err(Failure::of(Code::OutOfRange, 2)));
}

/// A molecule 1e6 Å away loses no digits beyond those of its coordinates: 0.25, 0.5, 0.75 are exact there.
#[test]
fn far_from_the_origin() {
    let near = [[0.25, 0.0, 0.5], [0.0, 0.75, 0.0], [-0.5, -0.25, 0.25]];
    let far = near.map(|p| p.map(|x| x + 1048576.0));
    let q = [0.7, -0.3, -0.4];
    let a = dipole_of_charges(&q, None, &near, None).unwrap().vector;
    let b = dipole_of_charges(&q, None, &far, None).unwrap().vector;
    let z = [8, 1, 1];
    let charges = Charges { charge: q.to_vec(), u: None, along_bond: None };
    let c = dipole(Molecule { atomic_number: &z, formal_charge: None, xyz: &far }, &charges, 0.0).unwrap().vector;
    for k in 0..3 {
        assert!((a[k] - b[k]).abs() < 1e-14 && (a[k] - c[k]).abs() < 1e-14);
    }
}

/// Charges of two atoms known to sum to zero: u(q) of each is u/√2, both of one mind: u(μ) = k d u/√2, about any origin.
#[test]
fn charges_are_conditioned_on_the_net_charge() {
    let charges = Charges { charge: vec![0.4, -0.4], u: Some(vec![0.02, 0.02]), along_bond: None };
    for shift in [0.0, 1e3] {
        let xyz = [[shift, 0.0, 0.0], [shift, 0.0, 1.25]];
        let molecule = Molecule { atomic_number: &[1, 9], formal_charge: None, xyz: &xyz };
        let found = dipole(molecule, &charges, 0.0).unwrap();
        assert!((found.magnitude.u - K * 1.25 * 0.02 / 2.0_f64.sqrt()).abs() < 1e-12);
        assert_eq!(found.covariance[0][0], 0.0);
    }
    let xyz = [[0.0; 3], [0.0, 0.0, 1.25]];
    let molecule = Molecule { atomic_number: &[1, 9], formal_charge: None, xyz: &xyz };
    // Positions alone: √2 q u_x in every direction.
    let exact = Charges { u: Some(vec![0.0; 2]), ..charges.clone() };
    let moved = dipole(molecule, &exact, 0.01).unwrap();
    for k in 0..3 {
        assert!((moved.covariance[k][k].sqrt() - K * 0.4 * 0.01 * 2.0_f64.sqrt()).abs() < 1e-15);
    }
    let unknown = dipole(molecule, &Charges { u: None, ..charges.clone() }, 0.0).unwrap();
    assert!(unknown.magnitude.u.is_nan() && unknown.magnitude.value > 0.0);
    assert!(dipole(molecule, &charges, f64::NAN).unwrap().magnitude.u.is_nan());
    assert_eq!(dipole(molecule, &charges, -1.0).unwrap_err().code, Code::NegativeUncertainty);
}

/// Of an ion the dipole is taken about the centre of mass. For OH⁻ with all its charge on the oxygen, that is the
/// distance of the oxygen from the centre: 0.97 Å · m(H)/(m(O) + m(H)), masses 1.00782503190 and 15.99491461926 u
/// (AME2020). An ion of one negative charge 1 Å from the centre has 4.8032 D.
#[test]
fn ions_are_taken_about_the_centre_of_mass() {
    let xyz = [[5.0, 0.0, 0.0], [5.0, 0.0, 0.97]];
    let molecule = Molecule { atomic_number: &[8, 1], formal_charge: Some(&[-1, 0]), xyz: &xyz };
    let charges = Charges { charge: vec![-1.0, 0.0], u: None, along_bond: None };
    let found = dipole(molecule, &charges, 0.0).unwrap();
    let part = 1.00782503190 / (15.99491461926 + 1.00782503190);
    assert!(found.charged);
    assert!((found.vector[2] - K * 0.97 * part).abs() < 1e-9);
    assert!((found.origin[2] - 0.97 * part).abs() < 1e-9 && found.origin[0] == 5.0);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(64))]

    /// Turning turns vector and covariance; shifting and renumbering change nothing.
    #[test]
    fn no_frame_is_preferred(seed in 1_u64..u64::MAX) {
        let mut random = Random(seed);
        let found = structure("acetic_acid");
        let charge = peoe_charges(found.molecule(), &found.bonding).unwrap().charge;
        let u: Vec<f64> = charge.iter().map(|_| 0.05 * random.unit()).collect();
        let before = dipole(found.molecule(), &Charges { charge: charge.clone(), u: Some(u.clone()), along_bond: None }, 0.01).unwrap();
        let (m, shift) = (random.rotation(), random.vector());
        let order = random.permutation(charge.len());
        let moved = |p| { let q = turned(&m, p); [0, 1, 2].map(|k| q[k] + 10.0 * shift[k]) };
        let xyz: Vec<_> = order.iter().map(|&i| moved(found.xyz[i])).collect();
        let z: Vec<_> = order.iter().map(|&i| found.atomic_number[i]).collect();
        let charges = Charges {
            charge: order.iter().map(|&i| charge[i]).collect(),
            u: Some(order.iter().map(|&i| u[i]).collect()),
            along_bond: None,
        };
        let after = dipole(Molecule { atomic_number: &z, formal_charge: None, xyz: &xyz }, &charges, 0.01).unwrap();
        let expected = turned(&m, before.vector);
        prop_assert!((0..3).all(|k| (after.vector[k] - expected[k]).abs() < 1e-12));
        prop_assert!((after.magnitude.u - before.magnitude.u).abs() < 1e-12);
        let probe = random.vector();
        let along = |c: &[[f64; 3]; 3], v| { let w = turned(c, v); v[0] * w[0] + v[1] * w[1] + v[2] * w[2] };
        let difference = along(&after.covariance, turned(&m, probe)) - along(&before.covariance, probe);
        prop_assert!(difference.abs() < 1e-12 && length(before.vector) > 1.0);
    }
}
