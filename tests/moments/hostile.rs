use crate::random::Random;
use bondmoment::charges::{Charges, peoe::peoe_charges};
use bondmoment::molecule::{Bond, Bonding, Molecule};
use bondmoment::moments::{dipole, dipole_symmetry, greatest_dipole, may_change_by_turning, verdict};
use proptest::prelude::*;

/// On a thread with as little stack as a caller may have.
fn on_a_small_stack(work: impl FnOnce() + Send + 'static) {
    std::thread::Builder::new().stack_size(64 * 1024).spawn(work).unwrap().join().unwrap();
}

fn all(molecule: Molecule<'_>, bonding: &Bonding, charges: &Charges) {
    let _ = dipole_symmetry(molecule, 0.01);
    let _ = dipole(molecule, charges, 0.01);
    let _ = peoe_charges(molecule, bonding);
    let _ = may_change_by_turning(molecule, bonding);
    if let Ok(found) = greatest_dipole(molecule, bonding, charges) {
        assert!(found.bound_D >= 0.0 || charges.charge.iter().any(|q| !q.is_finite()), "{found:?}");
    }
    let _ = verdict(molecule, bonding, Ok(charges), 0.0, 0.2, 1.0);
    let _ = verdict(molecule, bonding, Ok(charges), 0.0, f64::NAN, f64::NAN);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(200))]

    /// Atoms in one place or far out, bonds to nowhere, to itself, twice, with any order: an answer or a failure, no panic.
    #[test]
    fn any_input_is_answered(seed in 1_u64..u64::MAX, atoms in 0_usize..24, bonds in 0_usize..40) {
        on_a_small_stack(move || {
            let mut random = Random(seed);
            let mut pick = |from: &[f64]| from[(random.unit() * from.len() as f64) as usize];
            let near = [0.0, 0.0, 1.0, 1.5, -1.2, 0.3, 1e-9];
            let far = [0.0, 1e9, -1e9, 1e-300, 1.0];
            let strange = [0.0, f64::NAN, f64::INFINITY, 1.0];
            let kind = pick(&[0.0, 0.0, 0.0, 0.0, 1.0, 2.0]);
            let places = if kind == 0.0 { &near[..] } else if kind == 1.0 { &far[..] } else { &strange[..] };
            let xyz: Vec<[f64; 3]> = (0..atoms).map(|_| [pick(places), pick(places), pick(places)]).collect();
            let elements = [1.0, 6.0, 7.0, 8.0, 9.0, 16.0, 17.0, 26.0];
            let z: Vec<i32> = (0..atoms).map(|_| pick(&elements) as i32).collect();
            let size = atoms as f64;
            let ends = [0.0, 1.0, 2.0, 3.0, 0.5 * size, size - 1.0, size, 4e9];
            let orders = [1.0, 1.0, 1.0, 2.0, 3.0, 1.5, 0.0, f64::NAN];
            let bonding = Bonding {
                bonds: (0..bonds)
                    .map(|_| Bond { a: pick(&ends) as u32, b: pick(&ends) as u32, order: pick(&orders) })
                    .collect(),
                formal_charge: (0..atoms).map(|_| pick(&[0.0, 0.0, 1.0, -1.0]) as i32).collect(),
                ..Bonding::default()
            };
            let mut charge: Vec<f64> = (0..atoms).map(|_| pick(&[0.1, -0.1, 0.3, 0.0])).collect();
            let sum: f64 = charge.iter().sum();
            charge.iter_mut().take(1).for_each(|q| *q -= sum);
            let molecule = Molecule { atomic_number: &z, formal_charge: None, xyz: &xyz };
            all(molecule, &bonding, &Charges { charge: charge.clone(), u: Some(vec![pick(&[0.0, 0.1, f64::NAN]); atoms]), along_bond: None });
            all(molecule, &bonding, &Charges { charge: vec![pick(&[f64::NAN, 1e308, 1.0]); atoms], u: None, along_bond: None });
            all(molecule, &bonding, &Charges { charge: charge[..atoms / 2].to_vec(), u: None, along_bond: None });
        });
    }
}

/// Nothing recurses over the atoms: a chain and a ring of 30000 on 64 KiB of stack.
#[test]
fn long_chains_and_rings_need_no_stack() {
    on_a_small_stack(|| {
        let n = 30_000_u32;
        let z = vec![16; n as usize];
        let xyz: Vec<[f64; 3]> = (0..n).map(|i| [1.5 * f64::from(i), f64::from(i % 3), f64::from(i % 2)]).collect();
        let molecule = Molecule { atomic_number: &z, formal_charge: None, xyz: &xyz };
        let mut bonds: Vec<Bond> = (1..n).map(|i| Bond { a: i - 1, b: i, order: 1.0 }).collect();
        let charges = Charges { charge: vec![0.0; n as usize], u: None, along_bond: None };
        all(molecule, &Bonding { bonds: bonds.clone(), ..Bonding::default() }, &charges);
        bonds.push(Bond { a: 0, b: n - 1, order: 1.0 });
        all(molecule, &Bonding { bonds, ..Bonding::default() }, &charges);
    });
}
