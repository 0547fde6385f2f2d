//! Runs through files: the same rows for any batch and any number of threads, stopped and resumed, written and read.

use std::sync::atomic::Ordering;

use bondmoment::library::Tabulation;
use bondmoment::library::write::{CsvStyle, write_csv, write_json_lines};
use bondmoment::status::Code;

use super::*;

fn csv_of(tables: &Tables) -> String {
    let mut bytes = Vec::new();
    for table in [&tables.polarity, &tables.bonds, &tables.atoms] {
        write_csv(table, &mut bytes, CsvStyle::default()).unwrap();
    }
    String::from_utf8(bytes).unwrap()
}

fn run(batch: usize, threads: i32) -> String {
    let settings = Settings::default();
    let mut all = Tables::new(&settings);
    let paths = [demo(), file("")];
    let mut run = Tabulation::open(&paths, FORMAT_BY_CONTENT, settings, None).unwrap();
    while let Some(tables) = run.next_batch(batch, Wanted::ALL, Threads::new(threads), &never()).unwrap() {
        assert!(tables.polarity.rows() <= batch);
        all.append(&tables);
    }
    assert_eq!(run.progress().bytes_done(), run.progress().bytes_total());
    assert_eq!(run.progress().records_done(), all.polarity.rows() as u64);
    csv_of(&all)
}

#[test]
fn same_bytes_for_any_batch_and_any_threads() {
    let expected = run(1000, 1);
    assert!(expected.lines().count() > 200);
    for (batch, threads) in [(1, 1), (2, 3), (7, 2), (16, 7), (17, 1), (1000, 2), (1000, 3), (1000, 7)] {
        assert_eq!(run(batch, threads), expected, "batch {batch}, threads {threads}");
    }
}

/// Enough records that threads are really used.
#[test]
fn same_bytes_on_several_threads() {
    let many = std::fs::read_to_string(demo().join("library.sdf")).unwrap().repeat(40);
    let library = parse(many.as_bytes());
    let table = |threads| {
        let n = library.entries().len();
        csv_of(
            &library.polarity_table(0, n, &Settings::default(), Wanted::ALL, Threads::new(threads), &never()).unwrap(),
        )
    };
    let expected = table(1);
    for threads in [2, 3, 7] {
        assert_eq!(table(threads), expected, "threads {threads}");
    }
}

#[test]
fn a_run_goes_on_where_it_ended() {
    let settings = Settings::default();
    let paths = [demo(), file("bad_frames.xyz"), file("among_good.sdf")];
    let whole = {
        let mut run = Tabulation::open(&paths, FORMAT_BY_CONTENT, settings.clone(), None).unwrap();
        csv_of(&run.next_batch(1000, Wanted::ALL, Threads::new(1), &never()).unwrap().unwrap())
    };
    for batch in [1, 3, 5, 11] {
        let mut all = Tables::new(&settings);
        let mut position = String::new();
        loop {
            let mut run = Tabulation::open(&paths, FORMAT_BY_CONTENT, settings.clone(), Some(&position)).unwrap();
            match run.next_batch(batch, Wanted::ALL, Threads::new(1), &never()).unwrap() {
                Some(tables) => all.append(&tables),
                None => break,
            }
            position = run.position();
        }
        assert_eq!(csv_of(&all), whole, "batch {batch}");
    }
    for wrong in ["2 0 0 1 0 0 acetonitrile.mol", "1 0 0 1 0 0 other.mol", "1 99 0 1 0 0 x", "nonsense"] {
        let problem = Tabulation::open(&paths, FORMAT_BY_CONTENT, settings.clone(), Some(wrong)).err().unwrap();
        assert_eq!(problem.code, Code::NotAllowed, "{wrong}");
    }
}

#[test]
fn a_stopped_batch_is_not_lost() {
    let settings = Settings::default();
    let mut run = Tabulation::open(&[demo()], FORMAT_BY_CONTENT, settings, None).unwrap();
    let stop = never();
    stop.store(true, Ordering::Relaxed);
    assert_eq!(run.next_batch(5, Wanted::ALL, Threads::new(1), &stop).unwrap_err().code, Code::Stopped);
    stop.store(false, Ordering::Relaxed);
    let tables = run.next_batch(5, Wanted::ALL, Threads::new(1), &stop).unwrap().unwrap();
    assert_eq!((tables.polarity.rows(), text(&tables.polarity, "record", 0).as_str()), (5, "acetonitrile.mol:1"));
}

#[test]
fn a_folder_reports_what_it_leaves_out() {
    let run = Tabulation::open(&[demo()], FORMAT_BY_CONTENT, Settings::default(), None).unwrap();
    let left_out: Vec<String> =
        run.left_out().iter().map(|file| file.path.file_name().unwrap().to_string_lossy().into_owned()).collect();
    assert_eq!(left_out, ["NOTICE.txt", "README.md"]);
    let problem = Tabulation::open(&[demo().join("README.md")], FORMAT_BY_CONTENT, Settings::default(), None).err();
    assert_eq!(problem.unwrap().code, Code::BadFormat);
}

/// A folder with the files given, and their paths.
fn folder_of(files: &[(&str, &[u8])]) -> (tempfile::TempDir, Vec<PathBuf>) {
    let folder = tempfile::tempdir().unwrap();
    let paths = files.iter().map(|(name, content)| {
        let path = folder.path().join(name);
        std::fs::write(&path, content).unwrap();
        path
    });
    let paths = paths.collect();
    (folder, paths)
}

/// Record, status and detail of every row of a run.
fn rows_of(run: &mut Tabulation, batch: usize) -> Vec<(String, String, String)> {
    let mut rows = Vec::new();
    while let Some(tables) = run.next_batch(batch, Wanted::ALL, Threads::new(1), &never()).unwrap() {
        let table = &tables.polarity;
        for row in 0..table.rows() {
            rows.push((text(table, "record", row), text(table, "status", row), text(table, "detail", row)));
        }
    }
    rows
}

const FLUORIDE: &[u8] = b"2\nhydrogen fluoride\nH 0 0 0\nF 0 0 0.9168\n";

#[test]
fn a_bad_file_among_several_is_a_broken_record() {
    let zip: &[u8] = b"PK\x03\x04\x14\x00";
    let (_folder, paths) =
        folder_of(&[("a.xyz", FLUORIDE), ("b.dat", b"name,value\na,1\n"), ("c.sdf", zip), ("d.xyz", FLUORIDE)]);
    let open =
        |paths: &[PathBuf], format, from: Option<&str>| Tabulation::open(paths, format, Settings::default(), from);
    let expected = [
        ("a.xyz:1", None),
        ("b.dat:1", Some("b.dat, record 1: the content is in no format that is read here")),
        ("c.sdf:1", Some("c.sdf, record 1: the file is a zip archive, which is not read")),
        ("d.xyz:1", None),
    ];
    for batch in [1, 2, 3, 10] {
        let mut run = open(&paths, FORMAT_BY_CONTENT, None).unwrap();
        let rows = rows_of(&mut run, batch);
        assert!(run.left_out().is_empty());
        assert_eq!(run.progress().bytes_done(), run.progress().bytes_total());
        assert_eq!(rows.len(), expected.len());
        for ((record, status, detail), (key, words)) in rows.iter().zip(expected) {
            assert_eq!(record, key);
            match words {
                Some(words) => assert!(status == "BROKEN_RECORD" && detail.starts_with(words), "{detail}"),
                None => assert_eq!(status, "OK"),
            }
        }
    }
    // Resumed before, between and behind the bad ones.
    let mut position = String::new();
    let mut keys = Vec::new();
    loop {
        let mut run = open(&paths, FORMAT_BY_CONTENT, Some(&position)).unwrap();
        let Some(tables) = run.next_batch(1, Wanted::ALL, Threads::new(1), &never()).unwrap() else { break };
        keys.push(text(&tables.polarity, "record", 0));
        position = run.position();
    }
    assert_eq!(keys, expected.map(|(key, _)| key));
    // Bad ones only: their rows are the result. One alone, a path to nothing and an unknown format are errors.
    assert_eq!(rows_of(&mut open(&paths[1..3], FORMAT_BY_CONTENT, None).unwrap(), 5).len(), 2);
    let refused = |paths: &[PathBuf], format| open(paths, format, None).err().unwrap().code;
    assert_eq!(refused(&paths[2..3], FORMAT_BY_CONTENT), Code::BadFormat);
    assert_eq!(refused(&[paths[0].clone(), file("none.xyz")], FORMAT_BY_CONTENT), Code::FileMissing);
    assert_eq!(refused(&paths[1..3], bondmoment::selectors::Selector(0)), Code::UnknownSelector);
    assert_eq!(refused(&paths[1..3], bondmoment::selectors::VDW_BONDI_1964), Code::WrongSelector);
}

#[test]
fn a_bad_file_of_a_folder_is_told_by_its_ending() {
    let (folder, _) = folder_of(&[
        ("1.XYZ", b"name,value\na,1\n"),
        ("2.sdf.gz", b"\x1F\x8B\x08\0\0"),
        ("3.Mol", b""),
        ("4.xyz", FLUORIDE),
        ("5.txt", b"2024\n\nNotes of the year, 12 of them.\n"),
        ("6.gz", b"\x1F\x8B\x08\0\0"),
        ("7.xyz", b"2\nlight\nC 0,0 0 0\nO 1.1 0 0\n"),
    ]);
    let paths = [folder.path().to_owned()];
    let mut run = Tabulation::open(&paths, FORMAT_BY_CONTENT, Settings::default(), None).unwrap();
    let left_out: Vec<_> = run.left_out().iter().map(|file| file.path.file_name().unwrap().to_owned()).collect();
    assert_eq!(left_out, ["5.txt", "6.gz"]);
    let rows = rows_of(&mut run, 4);
    let expected = [
        ("1.XYZ:1", "1.XYZ, record 1: the content is in no format"),
        ("2.sdf.gz:1", "2.sdf.gz, record 1: the gzip data "),
        ("3.Mol:1", "3.Mol, record 1: the file is empty"),
        ("4.xyz:1", ""),
        ("7.xyz:1", "7.xyz, record 1, line 3: atom 1 of 2: the coordinate \"0,0\" is no decimal number"),
    ];
    assert_eq!(rows.len(), expected.len());
    for ((record, status, detail), (key, words)) in rows.iter().zip(expected) {
        assert!(record == key && detail.starts_with(words), "{record}: {detail}");
        assert_eq!(status == "BROKEN_RECORD", !words.is_empty(), "{record}");
    }
    // The same records in memory.
    let library = MoleculeLibrary::read(folder.path(), FORMAT_BY_CONTENT, Threads::new(1), &never()).unwrap();
    let keys: Vec<String> = library.entries().iter().map(|entry| entry.place().key()).collect();
    assert_eq!(keys, expected.map(|(key, _)| key));
}

/// A stream that hands out one byte at a time, as a slow pipe may.
struct Drops(Vec<u8>, usize);

impl std::io::Read for Drops {
    fn read(&mut self, buffer: &mut [u8]) -> std::io::Result<usize> {
        match (buffer.first_mut(), self.0.get(self.1)) {
            (Some(slot), Some(&byte)) => {
                *slot = byte;
                self.1 += 1;
                Ok(1)
            }
            _ => Ok(0),
        }
    }
}

#[test]
fn a_stream_is_read_like_a_file() {
    let bytes = std::fs::read(demo().join("library.sdf")).unwrap();
    let mut run =
        Tabulation::from_reader("library.sdf", Drops(bytes, 0), FORMAT_BY_CONTENT, Settings::default()).unwrap();
    let streamed = run.next_batch(100, Wanted::ALL, Threads::new(1), &never()).unwrap().unwrap();
    let paths = [demo().join("library.sdf")];
    let mut run = Tabulation::open(&paths, FORMAT_BY_CONTENT, Settings::default(), None).unwrap();
    assert_eq!(
        csv_of(&run.next_batch(100, Wanted::ALL, Threads::new(1), &never()).unwrap().unwrap()),
        csv_of(&streamed)
    );
    assert!(run.next_batch(100, Wanted::ALL, Threads::new(1), &never()).unwrap().is_none());
}

#[test]
fn tables_that_are_not_wanted_stay_empty() {
    let library = read("frames.xyz");
    let wanted = Wanted { polarity: true, bonds: false, atoms: false };
    let tables = library.polarity_table(1, 2, &Settings::default(), wanted, Threads::new(1), &never()).unwrap();
    assert_eq!((tables.polarity.rows(), tables.bonds.rows(), tables.atoms.rows()), (2, 0, 0));
    let beyond = library.polarity_table(3, 9, &Settings::default(), wanted, Threads::new(1), &never());
    assert_eq!(beyond.unwrap_err().code, Code::OutOfRange);
}

#[test]
fn csv_is_harmless_and_json_lines_are_json() {
    let mut settings = Settings::default();
    settings.set_text("carry_items", "Note").unwrap();
    let table = tables(&read("properties.sdf"), &settings).polarity;
    let mut bytes = Vec::new();
    write_csv(&table, &mut bytes, CsvStyle { decimal_comma: true, without_names: false }).unwrap();
    let mut reader = csv::ReaderBuilder::new().delimiter(b';').from_reader(&bytes[..]);
    let names = reader.headers().unwrap().clone();
    let column = |name: &str| names.iter().position(|known| known == name).unwrap();
    let rows: Vec<csv::StringRecord> = reader.records().map(Result::unwrap).collect();
    assert_eq!(rows.len(), 9);
    assert_eq!(&rows[6][column("data_Note")], "'=1+1");
    // HF: 3.98 - 2.20 (handbook column).
    assert_eq!(&rows[3][column("delta_chi")], "1,78");
    // The fluorine of HF lies on the positive z axis of the file, so the dipole, from - to +, points down.
    let dipole = &rows[3][column("dipole_z_D")];
    assert!(dipole.starts_with('-') && dipole.contains(','), "numbers stay numbers: {dipole}");
    let charge = &rows[3][column("strongest_bond_charge_e")];
    assert!(charge.starts_with("0,"), "fluorine has drawn charge along the bond: {charge}");

    let mut bytes = Vec::new();
    write_json_lines(&table, &mut bytes).unwrap();
    let lines: Vec<serde_json::Value> =
        String::from_utf8(bytes).unwrap().lines().map(|line| serde_json::from_str(line).unwrap()).collect();
    assert_eq!(lines[6]["data_Note"], "=1+1");
    assert_eq!(lines[3]["delta_chi"], 1.78);
    assert!(lines[0]["dipole_D"].is_null());
    let bits = table.by_name("dipole_D").unwrap().numbers().unwrap()[3].to_bits();
    assert_eq!(lines[3]["dipole_D"].as_f64().unwrap().to_bits(), bits);
}
