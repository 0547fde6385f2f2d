//! Readers: what a file says comes out as it says it, and a broken record costs itself only.

use bondmoment::library::Entry;
use bondmoment::molecule::Bond;
use bondmoment::status::Code;

use super::*;

#[test]
fn xyz_frames_of_every_manner() {
    let library = read("frames.xyz");
    let records: Vec<_> = library.entries().iter().map(good).collect();
    assert_eq!(records.len(), 5);
    // A comment that looks like an atom or a number, or that would be an instruction elsewhere, is no title.
    assert_eq!(records[0].title, "");
    assert_eq!(records[0].item("comment"), Some("C 0.0 0.0 0.0"));
    assert_eq!(records[0].atomic_number, [8, 1, 1]);
    assert_eq!(records[0].xyz[2], [0.0, -0.757, -0.470]);
    assert_eq!(records[1].item("comment"), Some("12"));
    assert_eq!(records[1].atomic_number, [17, 1]);
    assert_eq!(records[1].xyz[1], [0.0, 0.0, 1.2746]);
    assert_eq!(records[2].title, "");
    assert_eq!(records[2].atomic_number, [8, 1, 6]);
    assert_eq!(records[2].xyz[2], [-1.43, 0.0, 0.0]);
    assert_eq!(records[3].title, "a single atom");
    assert_eq!((records[4].title.as_str(), records[4].data.len()), ("", 0));
    assert_eq!(records[4].xyz[1], [0.0, 0.0, 1.0977]);
    assert_eq!(records[4].place.line, 20);
    assert!(records.iter().all(|record| record.formal_charge.is_none() && record.bonds.is_none()));
}

#[test]
fn a_bad_frame_costs_itself() {
    let told: Vec<String> = read("bad_frames.xyz").entries().iter().map(told).collect();
    let expected = [
        "bad_frames.xyz, record 1, line 5: atom 3 of 9: expected an element and three coordinates, found \"2\"",
        "hydrogen",
        "bad_frames.xyz, record 3, line 12: more atom lines follow than the 1 stated in line 9",
        "hydrogen fluoride",
        "bad_frames.xyz, record 5, line 21: atom 2 of 2: there is no element \"Qq\"",
        "bad_frames.xyz, record 6, line 25: atom 2 of 2: the coordinate \"zero\" is no decimal number",
        "nitrogen",
        "bad_frames.xyz, record 8, line 32: the file ends after 1 of the 3 atoms stated",
    ];
    assert_eq!(told, expected);
}

#[test]
fn a_bad_first_atom_costs_its_frame_only() {
    for (atom, words) in [
        ("C 0,0 0 0", "the coordinate \"0,0\" is no decimal number"),
        ("X 0 0 0", "there is no element \"X\""),
        ("C NaN 0 0", "the coordinate \"NaN\" is no decimal number"),
    ] {
        let alone = format!("2\nx\n{atom}\nO 0,0 0 1,1\n");
        let told_alone: Vec<String> = parse(alone.as_bytes()).entries().iter().map(told).collect();
        assert_eq!(told_alone, [format!("text, record 1, line 3: atom 1 of 2: {words}")]);
        let library = parse(format!("{alone}1\nhelium\nHe 0 0 0\n").as_bytes());
        assert_eq!((library.entries().len(), told(&library.entries()[1])), (2, "helium".to_owned()));
    }
}

#[test]
fn a_broken_record_never_eats_the_next() {
    let told: Vec<String> = read("among_good.sdf").entries().iter().map(told).collect();
    let wrong = [
        (1, "the counts are 1 atoms, the record has 0"),
        (2, "bond 1 of 1: its type 8 is for queries"),
        (4, "bond 1 of 1: it joins atoms 1 and 3; expected 1 to 2"),
        (5, "atoms 1 and 2 are bonded twice"),
        (6, "the record ends where atom 2 of 2 is expected"),
        (7, "the counts line must be the fourth of the record, here it is number 5"),
        (8, "the record ends before its counts line"),
        (9, "there is no element \"R#\""),
        (10, "expected a counts line (number of atoms, number of bonds), found \"many atoms\""),
    ];
    assert_eq!(told.len(), 12);
    for (record, words) in wrong {
        assert!(told[record].contains(words), "{}", told[record]);
        assert!(told[record].starts_with(&format!("among_good.sdf, record {}, line ", record + 1)));
    }
    assert_eq!((told[0].as_str(), told[3].as_str(), told[11].as_str()), ("first good", "second good", "third good"));
}

#[test]
fn the_property_block_says_what_the_specification_says() {
    let library = read("properties.sdf");
    let records: Vec<_> = library.entries().iter().map(good).collect();
    assert_eq!(records.len(), 9);
    // M CHG supersedes the atom block, where code 5 is −1.
    assert_eq!(records[0].formal_charge.as_deref(), Some(&[1, -1][..]));
    assert_eq!(records[0].bonds.as_deref(), Some(&[][..]));
    assert_eq!(records[1].formal_charge.as_deref(), Some(&[-1, 0][..]));
    assert_eq!(records[2].radicals, [(0, 2)]);
    assert_eq!((&records[3].isotopes[..], records[3].mass_differences.len()), (&[(0, 2)][..], 0));
    assert_eq!(records[4].formal_charge.as_deref(), Some(&[0, 0][..]));
    let aromatic = records[5].bonds.as_ref().unwrap();
    assert_eq!(aromatic[0], Bond { a: 0, b: 1, order: 1.5 });
    let free = records[6];
    assert_eq!((free.xyz[1], free.bonds.as_ref().unwrap().len()), ([0.0, 0.0, 0.9168], 1));
    let items = [("note", "first line\nsecond = line"), ("Note", "=1+1"), ("empty", "")];
    assert_eq!(free.data, items.map(|(name, value)| (name.to_owned(), value.to_owned())));
    // Atoms alone: bonds and charges are not stated.
    assert!(records[7].bonds.is_none() && records[7].formal_charge.is_none());
    assert_eq!(records[8].title, "no end of the table");
}

#[test]
fn newlines_byte_order_mark_and_latin_1() {
    let plain = std::fs::read_to_string(demo().join("library.sdf")).unwrap();
    let expected = parse(plain.as_bytes());
    let marked = format!("\u{FEFF}{plain}");
    for other in [plain.replace('\n', "\r\n"), plain.replace('\n', "\r"), marked] {
        let library = parse(other.as_bytes());
        assert_eq!(library.size(), expected.size());
        for (one, two) in library.entries().iter().map(good).zip(expected.entries().iter().map(good)) {
            assert_eq!((&one.title, &one.xyz, &one.bonds, &one.data), (&two.title, &two.xyz, &two.bonds, &two.data));
            assert_eq!(one.place, two.place);
        }
    }
    // "água" in Latin-1.
    let latin: Vec<u8> = plain.replacen("water", "#gua", 1).bytes().map(|b| if b == b'#' { 0xE1 } else { b }).collect();
    assert_eq!(good(&parse(&latin).entries()[0]).title, "água");
}

#[test]
fn counts_fill_their_three_columns() {
    let mut record = String::from("chain\n  byhand  01012620003D\n\n999998  0  0  0  0  0  0  0  0999 V2000\n");
    for i in 0..999 {
        record.push_str(&format!("{:10.4}{:10.4}{:10.4} C   0  0\n", 1.2 * f64::from(i), 0.8 * f64::from(i % 2), 0.0));
    }
    for i in 1..999 {
        record.push_str(&format!("{i:3}{:3}  1  0\n", i + 1));
    }
    record.push_str("M  END\n");
    let library = parse(record.as_bytes());
    assert_eq!(library.size(), (1, 999, 998));
    assert_eq!(good(&library.entries()[0]).bonds.as_ref().unwrap()[997], Bond { a: 997, b: 998, order: 1.0 });
}

#[test]
fn what_is_not_read_is_named_and_a_name_is_not_believed() {
    let parsed = |content: &[u8], format| MoleculeLibrary::parse(content, "f.xyz", format, Threads::new(1), &never());
    let zip = parsed(b"PK\x03\x04\x14\x00", FORMAT_BY_CONTENT).unwrap_err();
    assert_eq!(zip.code, Code::BadFormat);
    assert!(zip.message.starts_with("f.xyz: the file is a zip archive, which is not read"), "{}", zip.message);
    // An SD file by content, whatever it is called.
    let sd = std::fs::read(demo().join("library.sdf")).unwrap();
    assert_eq!(parsed(&sd, FORMAT_BY_CONTENT).unwrap().entries().len(), 15);
    let wrong = parsed(&sd, bondmoment::selectors::VDW_BONDI_1964).unwrap_err();
    assert_eq!(wrong.code, Code::WrongSelector);
    assert_eq!(parsed(&sd, bondmoment::selectors::Selector(0)).unwrap_err().code, Code::UnknownSelector);
    let missing = MoleculeLibrary::read(&file("none.xyz"), FORMAT_BY_CONTENT, Threads::new(1), &never());
    assert_eq!(missing.unwrap_err().code, Code::FileMissing);
}

#[test]
fn every_record_of_the_demo_is_read_as_it_is() {
    let library = MoleculeLibrary::read(&demo(), FORMAT_BY_CONTENT, Threads::new(1), &never()).unwrap();
    let broken = library.entries().iter().filter(|entry| matches!(entry, Entry::Broken(_))).count();
    assert_eq!((library.entries().len(), broken), (36, 1));
    let keys: Vec<String> = library.entries().iter().map(|entry| entry.place().key()).collect();
    assert_eq!((keys[0].as_str(), keys[1].as_str()), ("acetonitrile.mol:1", "ammonium_acetate.cml:1"));
}
