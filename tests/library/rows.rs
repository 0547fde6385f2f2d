//! Kinds of record and the rows of the tables.

use bondmoment::library::Given;
use bondmoment::selectors::{CHARGES_GIVEN, CHARGES_PEOE_1980};
use bondmoment::status::Code;

use super::*;

fn demo_tables() -> Tables {
    let library = MoleculeLibrary::read(&demo(), FORMAT_BY_CONTENT, Threads::new(1), &never()).unwrap();
    tables(&library, &Settings::default())
}

fn row_of(table: &Table, record: &str) -> usize {
    (0..table.rows()).find(|&row| text(table, "record", row) == record).unwrap()
}

/// Formulas, charges and kinds are those that the README of the demo states for its records.
#[test]
fn the_demo_tells_kinds_apart() {
    let table = demo_tables().polarity;
    let expected = [
        ("broken/among_good.sdf:1", "cyclohexane", "C6H12", 0, 0, "molecule", "OK", "non-polar"),
        ("broken/among_good.sdf:2", "toluene", "C7H8", 0, 0, "flat drawing", "FLAT_DRAWING", ""),
        ("broken/among_good.sdf:3", "phenol", "C6O", 0, 0, "hydrogens missing", "HYDROGENS_MISSING", ""),
        ("broken/among_good.sdf:5", "hexane", "C6H14", 0, 0, "molecule", "OK", "non-polar"),
        ("carbon_dioxide.xyz:1", "carbon dioxide", "CO2", 0, 0, "molecule", "OK", "non-polar"),
        ("ammonium_acetate.cml:1", "ammonium acetate", "C2H7NO2", 0, 2, "several fragments", "SEVERAL_FRAGMENTS", ""),
        ("carriers.cml:1", "acetone", "C3H6O", 0, 0, "molecule", "OK", "polar"),
        ("carriers.cml:2", "dimethyl sulfoxide", "C2H6OS", 0, 0, "molecule", "NO_DATA", ""),
        ("extra_v3000.sdf:1", "1,4-benzoquinone", "C6H4O2", 0, 0, "molecule", "OK", "non-polar"),
        ("extra_v3000.sdf:2", "ammonium", "H4N", 1, 1, "ion", "OK", "charged"),
        ("extra_v3000.sdf:3", "acetate", "C2H3O2", -1, 1, "ion", "OK", "charged"),
        ("oxygenates.sdf.gz:2", "1,4-dioxane", "C4H8O2", 0, 0, "molecule", "OK", "undecided"),
        ("sulfur_hexafluoride.cml:1", "sulfur hexafluoride", "F6S", 0, 0, "molecule", "OK", "non-polar"),
        ("ions_and_pairs.xyz:1", "ammonium", "H4N", 1, 1, "ion", "OK", "charged"),
        ("ions_and_pairs.xyz:2", "acetate", "C2H3O2", -1, 1, "ion", "OK", "charged"),
        ("ions_and_pairs.xyz:3", "ammonium acetate", "C2H7NO2", 0, 2, "several fragments", "SEVERAL_FRAGMENTS", ""),
        ("ions_and_pairs.xyz:4", "sodium chloride", "ClNa", 0, 0, "molecule", "NO_DATA", ""),
        ("library.sdf:4", "tetrachloromethane", "CCl4", 0, 0, "molecule", "OK", "non-polar"),
        ("library.sdf:6", "nitrobenzene", "C6H5NO2", 0, 0, "molecule", "OK", "polar"),
        ("library.sdf:9", "p-dichlorobenzene", "C6H4Cl2", 0, 0, "molecule", "OK", "non-polar"),
        ("library.sdf:11", "trans-1,2-dichloroethene", "C2H2Cl2", 0, 0, "molecule", "OK", "non-polar"),
        ("library.sdf:12", "1,2-dichloroethane", "C2H4Cl2", 0, 0, "molecule", "OK", "undecided"),
        ("library.sdf:14", "glycine", "C2H5NO2", 0, 0, "molecule", "OK", "undecided"),
        ("library.sdf:15", "glycine", "C2H5NO2", 0, 2, "zwitterion", "OK", "polar"),
    ];
    for (record, compound, formula, charge, sites, kind, status, polarity) in expected {
        let row = row_of(&table, record);
        let integer = |name: &str| table.by_name(name).unwrap().integers().unwrap()[row];
        assert_eq!(text(&table, "compound", row), compound);
        assert_eq!(text(&table, "formula", row), formula);
        assert_eq!((integer("net_charge"), integer("charge_sites")), (charge, sites), "{compound}");
        assert_eq!(text(&table, "structure_kind", row), kind, "{compound}");
        assert_eq!(text(&table, "status", row), status, "{compound}");
        assert_eq!(text(&table, "polarity", row), polarity, "{compound}");
    }
}

#[test]
fn the_detail_says_what_a_careful_reader_should_know() {
    let table = demo_tables().polarity;
    for (record, words) in [
        (
            "broken/among_good.sdf:4",
            "broken/among_good.sdf, record 4, line 116: atom 2 of 5: there is no element \"Zz\"",
        ),
        ("library.sdf:4", "by symmetry"),
        ("library.sdf:12", "one conformer of a flexible molecule"),
        ("ions_and_pairs.xyz:1", "net charge derived, not stated"),
        ("ions_and_pairs.xyz:3", "fragment 2: H4N, charge +1"),
        ("ions_and_pairs.xyz:4", "CHARGES_PEOE_1980 has no parameters for Na1"),
        ("library.sdf:15", "separated charge sites"),
    ] {
        let detail = text(&table, "detail", row_of(&table, record));
        assert!(detail.contains(words), "{record}: {detail}");
    }
    for record in ["broken/among_good.sdf:1", "broken/among_good.sdf:5"] {
        assert!(!text(&table, "detail", row_of(&table, record)).contains("one conformer"), "{record}");
    }
}

#[test]
fn a_row_without_a_dipole_says_why_in_every_cell() {
    let table = demo_tables().polarity;
    let row = row_of(&table, "broken/among_good.sdf:2");
    for name in ["dipole_D", "u_dipole_D", "dipole_x_D", "cov_yz_D2", "polarity"] {
        assert_eq!(status(&table, name, row), Code::FlatDrawing as i32, "{name}");
        assert_eq!(text(&table, name, row), "");
    }
    // What needs no geometry is there: toluene's strongest bonds are C-H.
    assert_eq!(number(&table, "delta_chi", row), 0.35);
    assert_eq!(status(&table, "strongest_bond_charge_e", row), 0);
    let phenol = row_of(&table, "broken/among_good.sdf:3");
    assert_eq!(text(&table, "strongest_bond", phenol), "C5-O7");
    assert_eq!(text(&table, "negative_end", phenol), "O7");
    assert_eq!(number(&table, "delta_chi", phenol), 0.89);
    assert_eq!(status(&table, "strongest_bond_charge_e", phenol), Code::HydrogensMissing as i32);
    let broken = row_of(&table, "broken/among_good.sdf:4");
    assert_eq!((text(&table, "compound", broken).as_str(), status(&table, "atoms", broken)), ("unknown element", 800));
}

/// Lengths: Cordero 2008 sp3 C 0.76, sp2 C 0.73, Cl 1.02, N 0.71, H 0.31 Å; Pyykkö 2009 and 2005 double C 0.67, O 0.57,
/// triple C 0.60, N 0.54 Å. Electronegativities: C 2.55, O 3.44, Cl 3.16, N 3.04.
#[test]
fn the_table_of_bonds() {
    let table = demo_tables().bonds;
    let rows = |record: &str| -> Vec<usize> {
        (0..table.rows()).filter(|&row| text(&table, "record", row) == record).collect()
    };
    let dioxide = rows("carbon_dioxide.xyz:1");
    assert_eq!(dioxide.len(), 2);
    assert_eq!(number(&table, "order", dioxide[0]), 2.0);
    assert!((number(&table, "expected_A", dioxide[0]) - 1.24).abs() < 1e-9);
    assert!((number(&table, "length_A", dioxide[0]) - 1.16).abs() < 1e-9);
    assert!((number(&table, "deviation_A", dioxide[0]) + 0.08).abs() < 1e-9);
    assert_eq!((number(&table, "delta_chi", dioxide[0]), text(&table, "class", dioxide[0]).as_str()), (0.89, "polar"));
    let tetra = rows("library.sdf:4");
    assert_eq!(tetra.len(), 4);
    assert!((number(&table, "expected_A", tetra[0]) - 1.78).abs() < 1e-9);
    let salt = rows("ions_and_pairs.xyz:4");
    assert_eq!(
        (text(&table, "class", salt[0]).as_str(), text(&table, "negative_end", salt[0]).as_str()),
        ("ionic", "Cl2")
    );
    // Aromatic bonds are shown as such; C(sp2)-Cl 0.73 + 1.02.
    let chlorobenzene = rows("library.sdf:5");
    let orders: Vec<f64> = chlorobenzene.iter().map(|&row| number(&table, "order", row)).collect();
    assert_eq!(orders.iter().filter(|&&order| order == 1.5).count(), 6);
    let chlorine = chlorobenzene.iter().find(|&&row| text(&table, "element_b", row) == "Cl").unwrap();
    assert!((number(&table, "expected_A", *chlorine) - 1.75).abs() < 1e-9);
    // Drawn lengths are no lengths.
    let toluene = rows("broken/among_good.sdf:2");
    assert!(toluene.iter().all(|&row| status(&table, "length_A", row) == Code::FlatDrawing as i32));
    assert!(toluene.iter().all(|&row| status(&table, "expected_A", row) == 0));
}

#[test]
fn the_table_of_atoms() {
    let table = demo_tables().atoms;
    let water: Vec<usize> = (0..table.rows()).filter(|&row| text(&table, "record", row) == "library.sdf:1").collect();
    let sum: f64 = water.iter().map(|&row| number(&table, "charge_e", row)).sum();
    assert!(sum.abs() < 1e-12);
    assert_eq!(number(&table, "y_A", water[1]), 0.03);
    // Mantina et al. 2009: O 1.52 Å; Cordero et al. 2008: O 0.66 Å.
    assert_eq!((number(&table, "vdw_radius_A", water[1]), number(&table, "covalent_radius_A", water[1])), (1.52, 0.66));
}

pub fn sd(title: &str, code: &str, atoms: &[(f64, f64, f64, &str)], bonds: &[(usize, usize, i32)]) -> String {
    let mut record = format!("{title}\n  byhand  0101262000{code}\n\n{:3}{:3}  0  0 V2000\n", atoms.len(), bonds.len());
    for (x, y, z, symbol) in atoms {
        record.push_str(&format!("{x:10.4}{y:10.4}{z:10.4} {symbol:<3} 0  0\n"));
    }
    for (a, b, order) in bonds {
        record.push_str(&format!("{a:3}{b:3}{order:3}  0\n"));
    }
    record + "M  END\n$$$$\n"
}

#[test]
fn planar_molecules_are_no_drawings_and_drawings_are_no_molecules() {
    let kind = |record: &str| text(&tables_of(record).polarity, "structure_kind", 0);
    let water = [(0.0, 0.0, 0.0, "O"), (0.957, 0.0, 0.0, "H"), (-0.24, 0.927, 0.0, "H")];
    let bonds = [(1, 2, 1), (1, 3, 1)];
    assert_eq!(kind(&sd("planar", "3D", &water, &bonds)), "molecule");
    assert_eq!(kind(&sd("no code", "  ", &water, &bonds)), "molecule");
    assert_eq!(kind(&sd("drawing by its code", "2D", &water, &bonds)), "flat drawing");
    let drawn = [(0.0, 0.0, 0.0, "O"), (1.5, 0.0, 0.0, "H"), (-0.75, 1.3, 0.0, "H")];
    assert_eq!(kind(&sd("drawn lengths", "3D", &drawn, &bonds)), "flat drawing");
    let cross = [
        (0.0, 0.0, 0.0, "C"),
        (1.09, 0.0, 0.0, "H"),
        (-1.09, 0.0, 0.0, "H"),
        (0.0, 1.09, 0.0, "H"),
        (0.0, -1.09, 0.0, "H"),
    ];
    assert_eq!(
        kind(&sd("methane as a cross", "3D", &cross, &[(1, 2, 1), (1, 3, 1), (1, 4, 1), (1, 5, 1)])),
        "flat drawing"
    );
    let nowhere = [(0.0, 0.0, 0.0, "O"), (0.0, 0.0, 0.0, "H"), (0.0, 0.0, 0.0, "H")];
    let table = tables_of(&sd("nowhere", "3D", &nowhere, &bonds)).polarity;
    assert_eq!(text(&table, "detail", 0), "the record has no coordinates");
    // Code 2D with coordinates in space is no drawing.
    let space = [(0.0, 0.0, 0.0, "O"), (0.957, 0.0, 0.0, "H"), (-0.24, 0.9, 0.222, "H")];
    assert_eq!(kind(&sd("in space", "2D", &space, &bonds)), "molecule");
}

/// Textbook lengths and angles, from memory, rounded.
#[test]
fn molecules_without_hydrogen_by_nature_lack_none() {
    let kind = |frame: &str| text(&tables_of(frame).polarity, "structure_kind", 0);
    assert_eq!(
        kind("5\nCCl4\nC 0 0 0\nCl 1.02 1.02 1.02\nCl 1.02 -1.02 -1.02\nCl -1.02 1.02 -1.02\nCl -1.02 -1.02 1.02\n"),
        "molecule"
    );
    assert_eq!(kind("3\nCO2\nC 0 0 0\nO 0 0 1.16\nO 0 0 -1.16\n"), "molecule");
    assert_eq!(kind("2\nCO\nC 0 0 0\nO 0 0 1.128\n"), "molecule");
    assert_eq!(kind("4\nphosgene\nC 0 0 0\nO 0 0 1.18\nCl 1.45 0 -0.96\nCl -1.45 0 -0.96\n"), "molecule");
    assert_eq!(kind("4\ncyanogen\nN 0 0 0\nC 0 0 1.16\nC 0 0 2.54\nN 0 0 3.70\n"), "molecule");
    assert_eq!(kind("2\nhydroxyl\nO 0 0 0\nH 0 0 0.97\n"), "open shell");
    assert_eq!(kind("1\nneon\nNe 0 0 0\n"), "atom");
    // Ethanol, ethane and benzene without their hydrogens.
    assert_eq!(kind("3\nethanol\nC 0 0 0\nC 1.52 0 0\nO 2.03 1.33 0\n"), "hydrogens missing");
    assert_eq!(kind("2\nethane\nC 0 0 0\nC 1.54 0 0\n"), "hydrogens missing");
    assert_eq!(kind("2\nformaldehyde\nC 0 0 0\nO 0 0 1.21\n"), "hydrogens missing");
    assert_eq!(kind("4\nurea\nC 0 0 0\nO 0 0 1.22\nN 1.15 0 -0.67\nN -1.15 0 -0.67\n"), "hydrogens missing");
    let ring = "6\nbenzene\nC 1.39 0 0\nC 0.695 1.2038 0\nC -0.695 1.2038 0\nC -1.39 0 0\nC -0.695 -1.2038 0\nC 0.695 -1.2038 0\n";
    assert_eq!(kind(ring), "hydrogens missing");
}

#[test]
fn names_carried_items_and_given_charges() {
    let mut settings = Settings::default();
    settings.set_text("name_item", "id").unwrap();
    settings.set_text("carry_items", "note,Note,absent").unwrap();
    let free = tables(&read("properties.sdf"), &settings).polarity;
    assert_eq!(text(&free, "data_note", 6), "first line\nsecond = line");
    assert_eq!(text(&free, "data_Note_2", 6), "=1+1");
    assert_eq!(status(&free, "data_absent", 6), Code::Missing as i32);
    let frames = tables(&read("frames.xyz"), &settings).polarity;
    assert_eq!(text(&frames, "compound", 0), "frames 1");
    let named = "\n\n\n  1  0  0 V2000\n    0.0000    0.0000    0.0000 Ne  0  0\nM  END\n>  <id>\nX-7\n\n$$$$\n";
    assert_eq!(text(&tables(&parse(named.as_bytes()), &settings).polarity, "compound", 0), "X-7");

    // Charges ±0.5 e at 1 Å: 0.5 × 4.80320471 D, exact in the SI of 2019; u(q) = 0.01 e each.
    let given = Given {
        name: "pair",
        atomic_number: &[9, 1],
        xyz: &[[0.0; 3], [0.0, 0.0, 1.0]],
        charge_e: Some(&[-0.5, 0.5]),
        u_charge_e: Some(&[0.01, 0.01]),
        ..Given::default()
    };
    let library = MoleculeLibrary::from_given("arrays", &[given], Threads::new(1), &never()).unwrap();
    settings.set_choice("charge_model", CHARGES_GIVEN).unwrap();
    let table = tables(&library, &settings).polarity;
    assert!((number(&table, "dipole_z_D", 0) - 2.401_602_356).abs() < 1e-8);
    assert_eq!((text(&table, "record", 0).as_str(), text(&table, "polarity", 0).as_str()), ("arrays:1", "polar"));
    // The charges call hydrogen the negative end, Δχ fluorine.
    let reversed = Given { charge_e: Some(&[0.5, -0.5]), ..given };
    let reversed = MoleculeLibrary::from_given("arrays", &[reversed], Threads::new(1), &never()).unwrap();
    let detail = text(&tables(&reversed, &settings).polarity, "detail", 0);
    assert!(detail.contains("the charge model names another negative end"), "{detail}");
    assert!(!text(&table, "detail", 0).contains("another negative end"));
    // Without uncertainties nothing is decided; without charges there are none.
    let unsure =
        MoleculeLibrary::from_given("arrays", &[Given { u_charge_e: None, ..given }], Threads::new(1), &never());
    let table = tables(&unsure.unwrap(), &settings).polarity;
    assert_eq!(text(&table, "polarity", 0), "undecided");
    assert!(text(&table, "detail", 0).contains("the charges given have no uncertainty"));
    let none = MoleculeLibrary::from_given(
        "arrays",
        &[Given { charge_e: None, u_charge_e: None, ..given }],
        Threads::new(1),
        &never(),
    );
    assert_eq!(text(&tables(&none.unwrap(), &settings).polarity, "status", 0), "NO_DATA");
    settings.set_choice("charge_model", CHARGES_PEOE_1980).unwrap();
    assert_eq!(text(&tables(&library, &settings).polarity, "charge_model", 0), "CHARGES_PEOE_1980");
}

#[test]
fn atoms_on_top_of_one_another_are_named() {
    let table = tables_of("3\ntwice\nO 0 0 0\nH 0.96 0 0\nH 0.97 0 0\n").polarity;
    assert_eq!(text(&table, "status", 0), "ATOMS_TOO_CLOSE");
    assert!(text(&table, "detail", 0).contains("(H"), "{}", text(&table, "detail", 0));
    assert_eq!(text(&table, "formula", 0), "H2O");
}
