//! The command line as its users see it: what it prints, how it exits, what it leaves behind.
#![cfg(feature = "cli")]

use std::io::{Read, Write};
use std::path::Path;
use std::process::{Command, Output, Stdio};

fn bondmoment(arguments: &[&str]) -> Output {
    Command::new(env!("CARGO_BIN_EXE_bondmoment")).args(arguments).output().expect("the program starts")
}

fn text(bytes: &[u8]) -> String {
    String::from_utf8(bytes.to_vec()).expect("output is UTF-8")
}

const WATER: &str = "3\nwater\nO 0 0 0.1173\nH 0 0.7572 -0.4692\nH 0 -0.7572 -0.4692\n";

fn file(folder: &Path, name: &str, content: &str) -> String {
    let path = folder.join(name);
    std::fs::write(&path, content).expect("the file can be written");
    path.to_str().expect("the path is UTF-8").to_owned()
}

#[test]
fn lookup_answers_one_cell() {
    let plain = bondmoment(&["lookup", "covalent_radius", "fe", "state=high_spin"]);
    assert_eq!(plain.status.code(), Some(0));
    // Cordero et al., Dalton Trans. 2008, 2832: Fe, high spin, 1.52(6) Å.
    assert!(text(&plain.stdout).contains("radius_A = 1.520 ± 0.060 Å"), "{}", text(&plain.stdout));

    let csv = bondmoment(&["lookup", "charge_from_dipole", "1.1086", "1.27455", "--layout", "csv"]);
    let csv = text(&csv.stdout);
    let (head, row) = csv.trim_end().split_once('\n').expect("two lines");
    assert_eq!(head, "charge_e,u_charge_e");
    // HCl, 0.18109 e: Nelson, Lide, Maryott 1967; Huber, Herzberg 1979 (from memory).
    assert!(row.starts_with("0.18108"), "{row}");

    let json = bondmoment(&["lookup", "bond_polarity", "H", "F", "--layout", "json-lines"]);
    let json: serde_json::Value = serde_json::from_str(&text(&json.stdout)).expect("JSON");
    assert_eq!(json["bond_class"], "polar");
    assert_eq!(json["negative_end"], "atom b");
    assert_eq!(json["u_delta_chi"], serde_json::Value::Null);
}

#[test]
fn lookup_says_what_is_wrong() {
    for (arguments, words) in [
        (vec!["lookup", "vdw_radius", "Fe"], "atomic_number: the chosen table or model has no value for this"),
        (vec!["lookup", "charge_from_dipole", "1.1", "-1"], "length_A must be above 0 Å"),
        (vec!["lookup", "no_such"], "there is no function no_such"),
        (vec!["lookup", "symbol", "Zz"], "'Zz' is no element"),
        (vec!["sources", "RADII_NONE"], "there is no table, law or model RADII_NONE"),
    ] {
        let output = bondmoment(&arguments);
        assert_eq!(output.status.code(), Some(2), "{arguments:?}");
        assert!(text(&output.stderr).contains(words), "{arguments:?}: {}", text(&output.stderr));
        assert!(output.stdout.is_empty(), "{arguments:?}");
    }
}

#[test]
fn every_verb_has_help_with_an_example() {
    for verb in ["lookup", "tabulate", "sources", "demo"] {
        let help = bondmoment(&[verb, "--help"]);
        assert_eq!(help.status.code(), Some(0));
        assert!(text(&help.stdout).contains(&format!("\n  bondmoment {verb}")), "{verb}");
    }
}

#[test]
fn tabulate_exits_by_what_happened() {
    let folder = tempfile::tempdir().expect("a folder");
    let good = file(folder.path(), "good.xyz", WATER);
    let mixed = file(folder.path(), "mixed.xyz", &format!("{WATER}3\nbroken\nO 0 0 0\nQq 1 0 0\nH 0 1 0\n{WATER}"));
    assert_eq!(bondmoment(&["tabulate", &good]).status.code(), Some(0));

    let output = bondmoment(&["tabulate", &mixed, "--layout", "csv"]);
    assert_eq!(output.status.code(), Some(1));
    let table = text(&output.stdout);
    assert_eq!(table.lines().count(), 4, "{table}");
    let broken = table.lines().nth(2).expect("a third line");
    assert!(broken.contains("BROKEN_RECORD") && broken.contains("record 2, line 9"), "{broken}");

    let notes = file(folder.path(), "notes.txt", "name,value\na,1\n");
    let output = bondmoment(&["tabulate", &notes, &good, "--layout", "csv"]);
    assert_eq!(output.status.code(), Some(1), "{}", text(&output.stderr));
    let table = text(&output.stdout);
    assert_eq!(table.lines().count(), 3, "{table}");
    assert!(table.contains("BROKEN_RECORD") && table.contains("notes.txt, record 1: "), "{table}");
    assert_eq!(bondmoment(&["tabulate", &notes]).status.code(), Some(2));
    assert_eq!(bondmoment(&["tabulate", &good, "no_such_file.sdf"]).status.code(), Some(2));

    let missing = bondmoment(&["tabulate", "no_such_file.sdf"]);
    assert_eq!(missing.status.code(), Some(2));
    assert!(text(&missing.stderr).contains("no_such_file.sdf"));
    assert_eq!(bondmoment(&["tabulate", &good, "--set", "polarity_limit=0.3"]).status.code(), Some(2));
}

#[test]
fn tabulate_reads_standard_input() {
    let mut child = Command::new(env!("CARGO_BIN_EXE_bondmoment"))
        .args(["tabulate", "-", "--layout", "json-lines"])
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .spawn()
        .expect("the program starts");
    child.stdin.take().expect("input").write_all(WATER.as_bytes()).expect("input is taken");
    let output = child.wait_with_output().expect("the program ends");
    let row: serde_json::Value = serde_json::from_str(&text(&output.stdout)).expect("one JSON object");
    assert_eq!(row["formula"], "H2O");
    assert_eq!(row["compound"], "water");
}

#[test]
fn a_folder_of_results_is_whole_and_the_same_for_any_number_of_threads() {
    let folder = tempfile::tempdir().expect("a folder");
    let many: String = WATER.repeat(500);
    let input = file(folder.path(), "many.xyz", &many);
    let mut results = Vec::new();
    for threads in ["1", "2", "7"] {
        let into = folder.path().join(format!("results {threads}"));
        let into_text = into.to_str().expect("UTF-8");
        let output = bondmoment(&["tabulate", &input, "--into", into_text, "--threads", threads]);
        assert_eq!(output.status.code(), Some(0), "{}", text(&output.stderr));
        let mut names: Vec<String> = std::fs::read_dir(&into)
            .expect("the folder is there")
            .map(|entry| entry.expect("an entry").file_name().into_string().expect("UTF-8"))
            .collect();
        names.sort();
        assert_eq!(names, ["atoms.csv", "bonds.csv", "polarity.csv", "settings.txt"]);
        let read = |name: &str| std::fs::read(into.join(name)).expect("a file");
        results.push((read("polarity.csv"), read("bonds.csv"), read("atoms.csv")));
        let page = text(&read("settings.txt"));
        assert!(page.contains("polarity_limit_D") && page.contains(env!("CARGO_PKG_VERSION")), "{page}");
    }
    assert_eq!(text(&results[0].0).lines().count(), 501);
    assert_eq!(text(&results[0].1).lines().count(), 1001);
    assert!(results[0] == results[1] && results[0] == results[2]);
}

#[test]
fn nothing_half_written_stays_behind_a_failure() {
    let folder = tempfile::tempdir().expect("a folder");
    let into = folder.path().join("results");
    let output = bondmoment(&["tabulate", "no_such_file.sdf", "--into", into.to_str().expect("UTF-8")]);
    assert_eq!(output.status.code(), Some(2));
    assert!(!into.exists());
}

#[test]
fn a_closed_pipe_ends_it_quietly() {
    let folder = tempfile::tempdir().expect("a folder");
    let input = file(folder.path(), "many.xyz", &WATER.repeat(30_000));
    let mut child = Command::new(env!("CARGO_BIN_EXE_bondmoment"))
        .args(["tabulate", &input, "--layout", "csv"])
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .expect("the program starts");
    let mut first = [0; 64];
    child.stdout.take().expect("output").read_exact(&mut first).expect("some output");
    // The pipe is closed here, long before the table is through.
    let output = child.wait_with_output().expect("the program ends");
    assert_eq!(output.status.code(), Some(0));
    assert_eq!(text(&output.stderr), "");
}

#[test]
fn csv_can_have_a_decimal_comma() {
    let folder = tempfile::tempdir().expect("a folder");
    let input = file(folder.path(), "water.xyz", WATER);
    let table = text(&bondmoment(&["tabulate", &input, "--layout", "csv", "--decimal-comma"]).stdout);
    assert!(table.starts_with("record;compound;formula;"), "{table}");
    assert!(table.contains(";1,24;"), "{table}");
}

#[test]
fn the_demo_shows_what_it_says() {
    let output = bondmoment(&["demo"]);
    assert_eq!(output.status.code(), Some(0));
    let table = text(&output.stdout);
    let verdict = |compound: &str| -> Vec<String> {
        table
            .lines()
            .filter(|line| line.starts_with(&format!("{compound:<27}")))
            .map(|line| line.split_whitespace().collect::<Vec<_>>().join(" "))
            .collect()
    };
    for compound in [
        "tetrachloromethane",
        "p-dichlorobenzene",
        "trans-1,2-dichloroethene",
        "carbon dioxide",
        "hexane",
        "cyclohexane",
    ] {
        assert!(verdict(compound).iter().all(|line| line.contains("non-polar")), "{compound}");
    }
    assert!(verdict("1,2-dichloroethane")[0].contains("one conformer"));
    assert!(verdict("unknown element")[0].contains("BROKEN_RECORD"));
    assert!(verdict("phenol")[0].contains("HYDROGENS_MISSING"));
    assert!(verdict("toluene")[0].contains("FLAT_DRAWING"));
}
