use crate::random::{Random, turned};
use crate::structures::{Structure, structure};
use bondmoment::charges::{Charges, peoe::peoe_charges};
use bondmoment::moments::polarity::{SYMMETRY_WITHIN_A, verdict};
use bondmoment::moments::{DipoleSymmetry, PEOE_RMS_D, Verdict, dipole_symmetry};
use bondmoment::selectors::{POLARITY_CHARGED, POLARITY_NON_POLAR, POLARITY_POLAR, POLARITY_UNDECIDED};
use bondmoment::status::{Code, Failure, remark};
use proptest::prelude::*;

fn judge(found: &Structure) -> Result<Verdict, Failure> {
    let charges = peoe_charges(found.molecule(), &found.bonding);
    let charges = charges.as_ref().map_err(|failure| *failure);
    verdict(found.molecule(), &found.bonding, charges, 0.0, 0.2, PEOE_RMS_D)
}

/// Molecules without a dipole in any conformation (common knowledge of their point groups).
#[test]
fn non_polar_by_symmetry() {
    for name in [
        "tetrachloromethane",
        "carbon_dioxide",
        "sulfur_hexafluoride",
        "benzene",
        "1_4-benzoquinone",
        "trans-1_2-dichloroethene",
        "1_4-dichlorobenzene",
        "methane",
        "ethane",
        "ethyne",
        "2_2-dimethylpropane",
        "hexachloroethane",
        "hexane",
        "cyclohexane",
    ] {
        let found = judge(&structure(name)).unwrap();
        assert_eq!(found.polarity, POLARITY_NON_POLAR, "{name}: {found:?}");
        assert_eq!(found.remarks, remark::BY_SYMMETRY, "{name}");
        assert_eq!((found.dipole.vector, found.dipole.magnitude.u), ([0.0; 3], 0.0), "{name}");
    }
}

/// No dipole as drawn, but one in other conformations: measured 1.2 to 1.6 D (1,2-dichloroethane vapour, 305 to 544 K),
/// 1.4 D (1,4-dihydroxybenzene), 0.4 D (1,4-dioxane), from memory.
#[test]
fn one_conformer_is_not_the_molecule() {
    for name in ["anti-1_2-dichloroethane", "1_4-dihydroxybenzene", "1_4-dioxane"] {
        let found = judge(&structure(name)).unwrap();
        assert_eq!(found.polarity, POLARITY_UNDECIDED, "{name}: {found:?}");
        assert_eq!(found.remarks, remark::BY_SYMMETRY | remark::ONE_CONFORMER, "{name}");
        assert!(found.bound_D > 1.0);
    }
}

#[test]
fn symmetry_needs_no_parameters() {
    let none = Err(Failure::new(Code::NoData).item(0));
    for (name, polarity) in [
        ("sulfur_hexafluoride", Ok(POLARITY_NON_POLAR)),
        ("benzene", Ok(POLARITY_NON_POLAR)),
        ("2_2-dimethylpropane", Ok(POLARITY_NON_POLAR)),
        ("1_4-dioxane", Ok(POLARITY_UNDECIDED)),
        ("ammonium_ion", Ok(POLARITY_CHARGED)),
        ("water", Err(Failure::new(Code::NoData).item(0))),
    ] {
        let found = structure(name);
        let given = verdict(found.molecule(), &found.bonding, none, 0.0, 0.2, f64::NAN);
        assert_eq!(given.map(|verdict| verdict.polarity), polarity, "{name}");
    }
}

#[test]
fn polar_undecided_charged() {
    let acetone = judge(&structure("acetone")).unwrap();
    assert_eq!((acetone.polarity, acetone.remarks, acetone.by_rms), (POLARITY_POLAR, 0, true));
    // Propane's dipole is 0.08 D, but the model alone cannot know.
    assert_eq!(judge(&structure("propane")).unwrap().polarity, POLARITY_UNDECIDED);
    let acetate = judge(&structure("acetate_ion")).unwrap();
    assert_eq!((acetate.polarity, acetate.remarks), (POLARITY_CHARGED, remark::CHARGED));
    // Charges with an uncertainty of their own decide by it.
    let found = structure("propane");
    let charge = peoe_charges(found.molecule(), &found.bonding).unwrap().charge;
    let charges = Charges { u: Some(vec![0.002; charge.len()]), charge, along_bond: None };
    let sharp = verdict(found.molecule(), &found.bonding, Ok(&charges), 0.001, 0.2, f64::NAN).unwrap();
    assert_eq!((sharp.polarity, sharp.by_rms), (POLARITY_NON_POLAR, false));
    // Without one, and without the rms of a model, there is no verdict.
    let charges = Charges { u: None, ..charges };
    let blunt = verdict(found.molecule(), &found.bonding, Ok(&charges), 0.0, 0.2, f64::NAN);
    assert_eq!(blunt.unwrap_err().code, Code::Missing);
    let limit = verdict(found.molecule(), &found.bonding, Ok(&charges), 0.0, -0.2, 1.0);
    assert_eq!(limit.unwrap_err(), Failure::of(Code::OutOfRange, 1));
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(32))]

    /// Turned, shifted and renumbered, a molecule keeps its point group and its verdict.
    #[test]
    fn no_frame_is_preferred(seed in 1_u64..u64::MAX) {
        let mut random = Random(seed);
        for name in ["tetrachloromethane", "cyclohexane", "1_4-dioxane", "water", "acetone", "hexane", "benzene"] {
            let found = structure(name);
            let (m, shift) = (random.rotation(), random.vector());
            let order = random.permutation(found.xyz.len());
            let mut place = vec![0_u32; order.len()];
            order.iter().zip(0..).for_each(|(&old, new)| place[old] = new);
            let moved = |i: &usize| {
                let p = turned(&m, found.xyz[*i]);
                [0, 1, 2].map(|k| p[k] + 100.0 * shift[k])
            };
            let mut other = Structure {
                atomic_number: order.iter().map(|&i| found.atomic_number[i]).collect(),
                xyz: order.iter().map(moved).collect(),
                bonding: found.bonding.clone(),
            };
            for bond in &mut other.bonding.bonds {
                let (a, b) = (place[bond.a as usize], place[bond.b as usize]);
                (bond.a, bond.b) = (a.min(b), a.max(b));
            }
            other.bonding.bonds.sort_by_key(|bond| (bond.a, bond.b));
            let dimensions = |s: &Structure| match dipole_symmetry(s.molecule(), SYMMETRY_WITHIN_A).unwrap() {
                DipoleSymmetry::Forbidden => 0,
                DipoleSymmetry::Axis(_) => 1,
                DipoleSymmetry::Plane(_) => 2,
                DipoleSymmetry::Any => 3,
            };
            prop_assert_eq!(dimensions(&other), dimensions(&found), "{}", name);
            let (before, after) = (judge(&found).unwrap(), judge(&other).unwrap());
            prop_assert_eq!((after.polarity, after.remarks), (before.polarity, before.remarks), "{}", name);
            prop_assert!((after.dipole.magnitude.value - before.dipole.magnitude.value).abs() < 1e-10);
            // The bound is found by iteration, so that the order of the atoms shows in it, if little.
            prop_assert!(after.bound_D.is_nan() == before.bound_D.is_nan());
            prop_assert!(after.bound_D.is_nan() || (after.bound_D - before.bound_D).abs() < 1e-3);
        }
    }
}
