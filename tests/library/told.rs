//! The remarks of a row: what they say, and what they leave unsaid.

use bondmoment::library::Given;
use bondmoment::selectors::CHARGES_GIVEN;

use super::rows::sd;
use super::*;

fn polarity(content: &str) -> Table {
    tables_of(content).polarity
}

fn detail(content: &str) -> String {
    text(&polarity(content), "detail", 0)
}

/// Europium has no value in Pauling's scale as the handbooks print it.
#[test]
fn bonds_without_electronegativity_are_named() {
    let atoms = [(0.0, 0.0, 0.0, "Eu"), (2.4, 0.0, 0.1, "O"), (3.0, 0.76, 0.0, "H"), (3.0, -0.76, 0.0, "H")];
    let table = polarity(&sd("hydrate", "3D", &atoms, &[(1, 2, 1), (2, 3, 1), (2, 4, 1)]));
    let words = text(&table, "detail", 0);
    assert!(words.contains("no electronegativity for Eu: bonds to it are left out of the strongest bond"), "{words}");
    assert_eq!(text(&table, "strongest_bond", 0), "O2-H3");
    let words = detail("4\nEuCl3\nEu 0 0 0.3\nCl 2.5 0 0\nCl -1.25 2.165 0\nCl -1.25 -2.165 0\n");
    assert!(words.contains("no electronegativity for Eu, so there is no strongest bond"), "{words}");
}

#[test]
fn without_hydrogens_the_strongest_bond_is_one_of_the_atoms_given() {
    let words = detail("3\nethanol\nC 0 0 0\nC 1.52 0 0\nO 2.03 1.33 0\n");
    assert!(words.contains("hydrogen atoms are missing; strongest bond among the atoms given"), "{words}");
}

#[test]
fn radicals_by_parity_or_as_stated() {
    let methylene = [(0.0, 0.0, 0.1, "C"), (1.0, 0.4, 0.0, "H"), (-1.0, 0.4, 0.0, "H")];
    let stated =
        sd("methylene", "3D", &methylene, &[(1, 2, 1), (1, 3, 1)]).replace("M  END", "M  RAD  1   1   3\nM  END");
    let table = polarity(&stated);
    let words = text(&table, "detail", 0);
    assert_eq!(text(&table, "structure_kind", 0), "open shell");
    assert!(words.contains("stated as a radical") && !words.contains("odd number"), "{words}");
    let words = detail("2\nhydroxyl\nO 0 0 0\nH 0 0 0.97\n");
    assert!(words.contains("an odd number of electrons; radical or ion: coordinates do not tell"), "{words}");
    let methyl = detail("4\nmethyl\nC 0 0 0\nH 1.08 0 0\nH -0.54 0.9353 0\nH -0.54 -0.9353 0\n");
    assert!(methyl.contains("an odd number of electrons") && !methyl.contains("radical or ion"), "{methyl}");
}

/// Fe2Cl6: D2h, rounded lengths from memory.
#[test]
fn coordinates_do_not_tell_the_charge_of_a_complex() {
    let dimer = "8\nFe2Cl6\nFe 0 0 1.6\nFe 0 0 -1.6\nCl 1.65 0 0\nCl -1.65 0 0\nCl 0 1.9 2.6\nCl 0 -1.9 2.6\nCl 0 1.9 -2.6\nCl 0 -1.9 -2.6\n";
    let table = polarity(dimer);
    let words = text(&table, "detail", 0);
    assert!(words.contains("charge of a metal complex is not told by coordinates; taken as neutral"), "{words}");
    assert!(!words.contains("odd number") && !words.contains("charge sites") && !words.contains("derived"), "{words}");
    assert_eq!(text(&table, "structure_kind", 0), "molecule");
    assert_eq!(table.by_name("charge_sites").unwrap().integers().unwrap()[0], 0);
}

#[test]
fn charges_that_only_write_a_bond_are_not_told() {
    let ozone = detail("3\nozone\nO 0 0 0\nO 1.08 0.67 0\nO -1.08 0.67 0\n");
    let monoxide = detail("2\ncarbon monoxide\nC 0 0 0\nO 0 0 1.128\n");
    for words in [ozone, monoxide] {
        assert!(!words.contains("derived"), "{words}");
    }
    let nitrate = detail("4\nnitrate\nN 0 0 0\nO 1.24 0 0\nO -0.62 1.0739 0\nO -0.62 -1.0739 0\n");
    assert!(nitrate.contains("net charge derived, not stated") && !nitrate.contains("formal charges"), "{nitrate}");
}

#[test]
fn the_atom_without_parameters_is_the_one_at_fault() {
    let lopsided = "7\nSF6\nS 0 0 0\nF 1.56 0 0\nF -1.56 0 0\nF 0 1.56 0\nF 0 -1.56 0\nF 0 0 1.56\nF 0 0 -1.50\n";
    let words = detail(lopsided);
    assert!(words.contains("CHARGES_PEOE_1980 has no parameters for S1 as bonded here"), "{words}");
    let acetate = "8\nsodium acetate\nC 0 0 0\nC 0 0 -1.52\nO -1.117634 0 0.581803\nO 1.117634 0 0.581803\nH 0 1.027662 -1.883333\nH -0.889981 -0.513831 -1.883333\nH 0.889981 -0.513831 -1.883333\nNa 0 0 2.6\n";
    let words = detail(acetate);
    assert!(words.ends_with("CHARGES_PEOE_1980 has no parameters for Na8"), "{words}");
}

/// Hydrogen peroxide is greater syn than gauche; the methyl group of methanol, a regular pyramid, has no moment across
/// its axis, so turning it changes nothing.
#[test]
fn a_polar_row_of_a_flexible_molecule_is_one_conformer() {
    let settings = {
        let mut settings = Settings::default();
        settings.set_choice("charge_model", CHARGES_GIVEN).unwrap();
        settings
    };
    let row = |atomic_number: &[i32], xyz: &[[f64; 3]], charge: &[f64]| {
        let u = vec![0.001; charge.len()];
        let given = Given {
            name: "given",
            atomic_number,
            xyz,
            charge_e: Some(charge),
            u_charge_e: Some(&u),
            ..Given::default()
        };
        let library = MoleculeLibrary::from_given("arrays", &[given], Threads::new(1), &never()).unwrap();
        let table = tables(&library, &settings).polarity;
        (text(&table, "polarity", 0), text(&table, "detail", 0))
    };
    let peroxide = [[0.0, 0.0, 0.73], [0.0, 0.0, -0.73], [0.95, 0.0, 0.9], [0.0, 0.95, -0.9]];
    let (verdict, words) = row(&[8, 8, 1, 1], &peroxide, &[-0.4, -0.4, 0.4, 0.4]);
    assert_eq!(verdict, "polar");
    assert!(words.contains("one conformer of a flexible molecule (by turning about bonds at most 3.6"), "{words}");
    let half = 0.75_f64.sqrt();
    let methanol = [
        [0.0; 3],
        [1.42, 0.0, 0.0],
        [-0.36, 1.03, 0.0],
        [-0.36, -0.515, 1.03 * half],
        [-0.36, -0.515, -1.03 * half],
        [1.72, 0.91, 0.0],
    ];
    let (verdict, words) = row(&[6, 8, 1, 1, 1, 1], &methanol, &[-0.1, -0.6, 0.1, 0.1, 0.1, 0.4]);
    assert_eq!(verdict, "polar");
    assert!(!words.contains("one conformer"), "{words}");
}

/// Cordero et al. 2008: C 0.76 + O 0.66 = 1.42 Å; 5.00 / 1.42 = 3.5.
#[test]
fn distances_that_no_molecule_has_are_told() {
    let methanol = [
        (0.0, 0.0, 0.0, "C"),
        (5.0, 0.0, 0.0, "O"),
        (-0.36, 1.03, 0.0, "H"),
        (-0.36, -0.515, 0.892, "H"),
        (-0.36, -0.515, -0.892, "H"),
        (5.3, 0.91, 0.0, "H"),
    ];
    let bonds = [(1, 2, 1), (1, 3, 1), (1, 4, 1), (1, 5, 1), (2, 6, 1)];
    let words = detail(&sd("methanol", "3D", &methanol, &bonds));
    assert!(words.contains("bond C1-O2 is 5.00 Å long, 3.5 times its expected length"), "{words}");
    let apart = detail("3\nwater in pm\nO 0 0 0\nH 95.7 0 0\nH -24 92.7 0\n");
    assert!(apart.contains("no two atoms are bonded: are the coordinates in Å?"), "{apart}");
    let noble = detail("2\nneon and argon\nNe 0 0 0\nAr 0 0 4\n");
    assert!(!noble.contains("in Å?"), "{noble}");
}

/// Single N-O: Cordero et al. 2008, 0.71 + 0.66 Å; double: Pyykkö and Atsumi 2009, 0.60 + 0.57 Å. Mean of one of each in
/// the nitro group 1.27 Å, of two single and one double in nitrate (2 × 1.37 + 1.17) / 3 Å.
#[test]
fn equivalent_bonds_have_one_expected_length() {
    let expected = |content: &str| -> Vec<(f64, f64)> {
        let table = tables_of(content).bonds;
        let outer = |&row: &usize| text(&table, "element_a", row) == "N" && text(&table, "element_b", row) == "O";
        (0..table.rows())
            .filter(outer)
            .map(|row| (number(&table, "order", row), number(&table, "expected_A", row)))
            .collect()
    };
    let mut nitrate = expected("4\nnitrate\nN 0 0 0\nO 1.24 0 0\nO -0.62 1.0739 0\nO -0.62 -1.0739 0\n");
    nitrate.sort_by(|one, other| one.0.total_cmp(&other.0));
    assert_eq!(nitrate.iter().map(|one| one.0).collect::<Vec<_>>(), [1.0, 1.0, 2.0]);
    assert!(nitrate.iter().all(|one| (one.1 - 3.91 / 3.0).abs() < 1e-9), "{nitrate:?}");
    let nitromethane = expected(
        "7\nnitromethane\nN 0 0 0\nO 1.08 0 0.55\nO -1.08 0 0.55\nC 0 0 -1.49\nH 1.03 0 -1.85\nH -0.515 0.892 -1.85\nH -0.515 -0.892 -1.85\n",
    );
    assert_eq!(nitromethane.len(), 2);
    assert!(nitromethane.iter().all(|one| (one.1 - 1.27).abs() < 1e-9), "{nitromethane:?}");
    assert_ne!(nitromethane[0].0, nitromethane[1].0);
}

#[test]
fn a_comment_names_the_compound_unless_it_is_all_values() {
    let compound = |comment: &str| text(&polarity(&format!("1\n{comment}\nNe 0 0 0\n")), "compound", 0);
    assert_eq!(compound("neon (E = -128.5)"), "neon (E = -128.5)");
    assert_eq!(compound("1 neon atom"), "1 neon atom");
    assert_eq!(compound("\"neon\""), "\"neon\"");
    assert_eq!(compound(&"n".repeat(150)), "n".repeat(150));
    assert_eq!(compound("E = -128.5, step = 3"), "text 1");
}
