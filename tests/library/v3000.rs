//! V3000 connection tables.

use bondmoment::library::Entry;
use bondmoment::molecule::Bond;

use super::*;

#[test]
fn the_same_molecules_give_the_same_records_in_every_format() {
    let plain = read("same_v2000.sdf");
    let expected: Vec<&Record> = plain.entries().iter().map(good).collect();
    assert_eq!(expected.len(), 4);
    for other in ["same_v3000.sdf", "same.cml", "same_v2000.sdf.gz"] {
        let library = read(other);
        assert_eq!(library.size(), plain.size(), "{other}");
        for (one, two) in library.entries().iter().map(good).zip(&expected) {
            let bare = |record: &Record| format!("{:?}", Record { place: Default::default(), ..record.clone() });
            assert_eq!(bare(one), bare(two), "{other}");
            assert_eq!((&one.place.file[..], one.place.number), (other, two.place.number));
        }
        let table = |library| tables(library, &Settings::default());
        let (one, two) = (table(&library), table(&plain));
        for row in 0..4 {
            let dipole = |tables: &Tables| text(&tables.polarity, "dipole_D", row);
            assert_eq!((dipole(&one), dipole(&two).is_empty()), (dipole(&two), false), "{other}");
        }
    }
    // And the records say something.
    assert_eq!(expected[0].formal_charge.as_deref(), Some(&[0, 1, 0, -1, 0, 0, 0][..]));
    assert_eq!(expected[1].radicals, [(0, 2)]);
    assert_eq!(expected[2].isotopes, [(4, 2)]);
    assert_eq!(expected[2].stereo.wedges, [(2, 1), (3, 6)]);
    assert_eq!(expected[3].bonds.as_ref().unwrap()[5], Bond { a: 5, b: 0, order: 1.5 });
    assert_eq!(expected[3].item("sample"), Some("B-1 <&>"));
}

#[test]
fn lines_go_on_and_indices_come_in_any_order() {
    let library = read("v3000.sdf");
    let record = good(&library.entries()[0]);
    assert_eq!(record.title, "any index, chiral");
    assert_eq!(record.atomic_number, [9, 1]);
    assert_eq!(record.xyz, [[0.0, 0.0, 0.9168], [0.0, 0.0, 0.0]]);
    assert_eq!(record.bonds.as_deref(), Some(&[Bond { a: 1, b: 0, order: 1.0 }][..]));
    assert_eq!((&record.valences[..], &record.isotopes[..]), (&[(0, 1), (1, 0)][..], &[(1, 2)][..]));
    assert_eq!((&record.stereo.parities[..], &record.stereo.wedges[..]), (&[(0, 1)][..], &[(0, 4)][..]));
    assert!(record.stereo.chiral);
    assert_eq!(record.data, [("note".to_owned(), "one".to_owned())]);
}

#[test]
fn coordination_is_a_bond_and_a_hydrogen_bond_is_none() {
    let library = read("v3000.sdf");
    let bonds = good(&library.entries()[3]).bonds.as_deref();
    let expected = [Bond { a: 0, b: 1, order: 0.0 }, Bond { a: 0, b: 3, order: 1.0 }, Bond { a: 2, b: 4, order: 1.0 }];
    assert_eq!(bonds, Some(&expected[..]));
}

#[test]
fn a_broken_table_costs_itself() {
    let library = read("v3000.sdf");
    let told: Vec<String> = library.entries().iter().map(told).collect();
    let broken = [
        (1, 46, "bond 1 of 1: its type 6 is for queries; expected 1 to 4, 9 or 10"),
        (4, 0, "atom 1 of 2: it stands for an R group; expected an element"),
        (5, 0, "the record has R groups"),
        (6, 0, "the record has templates"),
        (7, 0, "atom 1 of 1: its type \"NOT\" is for queries"),
        (8, 0, "bond 1 of 1: it joins atoms 1 and 3; there is no atom 3"),
        (9, 0, "atoms 2 and 1 are bonded twice"),
        (10, 0, "atom 2 of 2: its index 5 is that of another atom"),
        (11, 0, "the counts are 3 atoms, the record has 2"),
        (12, 0, "expected a line that begins with M  V30, found \"END BOND\""),
        (13, 0, "atom 2 of 2: expected CHG from -15 to 15, found \"x\""),
        (14, 0, "bond 1 of 1: it ends at several atoms"),
        (15, 0, "the record ends where M  V30 END BOND is expected"),
    ];
    for (record, line, words) in broken {
        assert!(told[record].contains(words), "{}", told[record]);
        let start = format!("v3000.sdf, record {}, line ", record + 1);
        assert!(told[record].starts_with(&start), "{}", told[record]);
        assert!(line == 0 || told[record].starts_with(&format!("{start}{line}:")), "{}", told[record]);
    }
    assert_eq!(told.len(), 18);
    let right: Vec<&str> = [0, 2, 3, 16, 17].map(|record| told[record].as_str()).to_vec();
    assert_eq!(right, ["any index, chiral", "methyl radical", "ammonia borane and water", "drawing", "last"]);
    assert!(good(&library.entries()[16]).drawing);
}

#[test]
fn newlines_of_other_systems() {
    let plain = std::fs::read_to_string(file("v3000.sdf")).unwrap();
    let told =
        |content: String| -> Vec<String> { parse(content.as_bytes()).entries().iter().map(super::told).collect() };
    let expected = told(plain.clone());
    assert_eq!(told(plain.replace('\n', "\r\n")), expected);
    assert_eq!(told(plain.replace('\n', "\r")), expected);
}

/// The specification leaves the last line of a molfile to its writer; some end without `M  END`.
#[test]
fn a_table_without_its_last_line() {
    let plain = std::fs::read_to_string(file("same_v3000.sdf")).unwrap().replace("M  END\n", "");
    let library = parse(plain.as_bytes());
    let items: Vec<Option<&str>> = library.entries().iter().map(|entry| good(entry).item("sample")).collect();
    assert_eq!(items, [Some("N-1"), Some("R-1"), Some("S-1"), Some("B-1 <&>")]);
    assert!(library.entries().iter().all(|entry| matches!(entry, Entry::Molecule(_))));
}
