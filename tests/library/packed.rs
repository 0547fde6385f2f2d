//! Gzip-compressed files.

use bondmoment::library::Tabulation;
use bondmoment::library::write::{CsvStyle, write_csv};
use bondmoment::status::Code;

use super::*;

fn packed() -> Vec<u8> {
    std::fs::read(file("same_v2000.sdf.gz")).unwrap()
}

/// One gzip member that stores its content, made by hand: RFC 1952, RFC 1951 (stored blocks).
fn stored(content: &[u8]) -> Vec<u8> {
    let mut bytes = b"\x1F\x8B\x08\0\0\0\0\0\0\xFF".to_vec();
    let blocks: Vec<&[u8]> = if content.is_empty() { vec![content] } else { content.chunks(0xFFFF).collect() };
    for (at, block) in blocks.iter().enumerate() {
        let length = block.len() as u16;
        bytes.push(u8::from(at + 1 == blocks.len()));
        bytes.extend_from_slice(&length.to_le_bytes());
        bytes.extend_from_slice(&(!length).to_le_bytes());
        bytes.extend_from_slice(block);
    }
    let mut crc = !0_u32;
    for &byte in content {
        crc ^= u32::from(byte);
        for _ in 0..8 {
            crc = if crc & 1 == 1 { (crc >> 1) ^ 0xEDB8_8320 } else { crc >> 1 };
        }
    }
    bytes.extend_from_slice(&(!crc).to_le_bytes());
    bytes.extend_from_slice(&(content.len() as u32).to_le_bytes());
    bytes
}

fn all_told(content: &[u8]) -> Vec<String> {
    parse(content).entries().iter().map(told).collect()
}

#[test]
fn every_format_is_read_packed() {
    for name in ["frames.xyz", "bad_frames.xyz", "among_good.sdf", "v3000.sdf", "same.cml"] {
        let plain = std::fs::read(file(name)).unwrap();
        let expected = format!("{:?}", parse(&plain).entries());
        assert_eq!(format!("{:?}", parse(&stored(&plain)).entries()), expected, "{name}");
        let (one, two) = plain.split_at(plain.len() / 2);
        let members = [stored(one), stored(two)].concat();
        assert_eq!(format!("{:?}", parse(&members).entries()), expected, "{name}");
    }
}

#[test]
fn what_stands_before_damage_stands() {
    let names = ["nitromethane", "methyl radical", "bromochlorofluoromethane-d", "benzene"];
    assert_eq!(all_told(&packed()), names);
    let plain = std::fs::read(file("same_v2000.sdf")).unwrap();
    let whole = stored(&plain);
    let mut counts = Vec::new();
    for kept in 120..whole.len() {
        let told = all_told(&whole[..kept]);
        let (last, before) = told.split_last().unwrap();
        assert_eq!(before, &names[..before.len()], "{kept} bytes");
        let start = format!("text, record {}, line ", told.len());
        assert!(last.starts_with(&start) && last.contains("the gzip data end too early near byte"), "{last}");
        counts.push(before.len());
    }
    assert!(counts.is_sorted());
    assert_eq!((counts.first(), counts.last()), (Some(&0), Some(&4)));
    // The checksum comes last: all records stand, and one row says that they may be wrong.
    let mut wrong = whole.clone();
    let at = wrong.len() - 6;
    wrong[at] ^= 1;
    let told = all_told(&wrong);
    assert_eq!(told[..4], names);
    assert!(told.len() == 5 && told[4].contains("the gzip data are damaged"), "{told:?}");
    // The frames before the damage, and CML molecules.
    let frames = std::fs::read(file("frames.xyz")).unwrap();
    let expected = all_told(&frames);
    let cut = stored(&frames);
    let told = all_told(&cut[..cut.len() - 8]);
    assert_eq!((told.len(), &told[..5]), (6, &expected[..]));
    let cml = stored(&std::fs::read(file("same.cml")).unwrap());
    let told = all_told(&cml[..cml.len() * 3 / 4]);
    assert_eq!(told[..3], names[..3]);
    assert!(
        told.len() == 4 && told[3].contains("line ") && told[3].contains("the gzip data end too early"),
        "{told:?}"
    );
}

#[test]
fn damage_before_any_record_is_no_format() {
    let refused = |content: &[u8]| {
        MoleculeLibrary::parse(content, "f.gz", FORMAT_BY_CONTENT, Threads::new(1), &never()).unwrap_err()
    };
    for content in [&b"\x1F\x8B"[..], b"\x1F\x8B\x08\0\0", b"\x1F\x8B\x07\0\0\0\0\0\0\xFF\0\0\0\0\0\0\0\0\0\0"] {
        let problem = refused(content);
        assert_eq!(problem.code, Code::BadFormat);
        assert!(problem.message.starts_with("f.gz: the gzip data "), "{}", problem.message);
    }
    let twice = refused(&stored(&packed()));
    assert!(twice.message.contains("gzip-compressed a second time"), "{}", twice.message);
    assert!(refused(&stored(b"")).message.contains("empty"));
}

fn csv_of(tables: &Tables) -> String {
    let mut bytes = Vec::new();
    for table in [&tables.polarity, &tables.bonds, &tables.atoms] {
        write_csv(table, &mut bytes, CsvStyle::default()).unwrap();
    }
    String::from_utf8(bytes).unwrap()
}

#[test]
fn a_run_through_packed_files_and_cml_goes_on_where_it_ended() {
    let settings = Settings::default();
    let paths = [file("same_v2000.sdf.gz"), file("same.cml"), file("same_v3000.sdf")];
    let whole = {
        let mut run = Tabulation::open(&paths, FORMAT_BY_CONTENT, settings.clone(), None).unwrap();
        csv_of(&run.next_batch(1000, Wanted::ALL, Threads::new(1), &never()).unwrap().unwrap())
    };
    for batch in [1, 3, 5] {
        let mut all = Tables::new(&settings);
        let (mut position, mut bytes) = (String::new(), 0);
        loop {
            let mut run = Tabulation::open(&paths, FORMAT_BY_CONTENT, settings.clone(), Some(&position)).unwrap();
            let Some(tables) = run.next_batch(batch, Wanted::ALL, Threads::new(1), &never()).unwrap() else { break };
            all.append(&tables);
            position = run.position();
            let progress = run.progress();
            assert!((bytes..=progress.bytes_total()).contains(&progress.bytes_done()));
            bytes = progress.bytes_done();
        }
        assert_eq!(csv_of(&all), whole, "batch {batch}");
        let total: u64 = paths.iter().map(|path| std::fs::metadata(path).unwrap().len()).sum();
        assert_eq!(bytes, total);
    }
    let beyond = Tabulation::open(&paths, FORMAT_BY_CONTENT, settings, Some("1 0 9 9 99 99 same_v2000.sdf.gz"));
    assert_eq!(beyond.err().unwrap().code, Code::NotAllowed);
}

#[test]
fn same_bytes_for_any_number_of_threads() {
    let many = parse(&packed().repeat(60));
    let cml = std::fs::read_to_string(file("same.cml")).unwrap().repeat(60);
    for library in [many, parse(cml.as_bytes())] {
        assert_eq!(library.entries().len(), 240);
        let table = |threads| {
            csv_of(
                &library
                    .polarity_table(0, 240, &Settings::default(), Wanted::ALL, Threads::new(threads), &never())
                    .unwrap(),
            )
        };
        let expected = table(1);
        for threads in [2, 3, 7] {
            assert_eq!(table(threads), expected, "threads {threads}");
        }
    }
}
