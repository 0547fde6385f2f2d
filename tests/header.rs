//! The C header against its own rules, against the built library and against the catalogue.
#![allow(unsafe_code)]

#[path = "header/catalogue.rs"]
mod catalogue;
#[path = "header/parse.rs"]
mod parse;

use std::collections::BTreeSet;
use std::ffi::CStr;
use std::path::Path;
use std::process::Command;

use bondmoment::c_api::about;
use bondmoment::selectors;
use catalogue::{catalogue_of_the_library, word};
use parse::{Parameter, functions, macros};

const HEADER: &str = include_str!("../include/bondmoment.h");

#[test]
fn the_committed_header_is_the_generated_one() {
    let generated = std::fs::read_to_string(env!("BMOM_GENERATED_HEADER")).expect("build.rs writes the header");
    assert!(
        generated == HEADER,
        "include/bondmoment.h differs from the source: refresh it with `BMOM_UPDATE_HEADER=1 cargo build` and commit it"
    );
}

fn output_of(command: &mut Command) -> String {
    let output = command.output().unwrap_or_else(|error| panic!("{command:?}: {error} (install binutils)"));
    assert!(output.status.success(), "{command:?}: {}", String::from_utf8_lossy(&output.stderr));
    String::from_utf8_lossy(&output.stdout).into_owned()
}

fn shared_library() -> std::path::PathBuf {
    std::env::current_exe().ok().and_then(|test| Some(test.parent()?.join("libbondmoment.so"))).expect("a folder")
}

/// Nothing is exported that the header does not declare, and the other way round.
#[test]
fn exported_are_the_functions_of_the_header() {
    let listed = output_of(Command::new("nm").args(["-D", "--defined-only"]).arg(shared_library()));
    let exported: BTreeSet<&str> = listed.lines().filter_map(|line| line.split_whitespace().nth(2)).collect();
    let functions = functions(HEADER);
    let declared: BTreeSet<&str> = functions.iter().map(|function| function.name.as_str()).collect();
    assert_eq!(exported, declared);
    assert!(declared.len() >= 80, "{} functions", declared.len());
}

/// Numbers without a unit.
const PURE: &[&str] = &[
    "electronegativity",
    "delta_chi",
    "polar_from",
    "ionic_from",
    "bond_order",
    "found_order",
    "value",
    "values",
    "converted",
];
const UNITS: &[&str] = &["A", "A2", "A3", "D", "D2", "e", "u", "K", "percent", "MHz"];

fn has_unit(name: &str) -> bool {
    let value = name.strip_prefix("u_").unwrap_or(name);
    PURE.contains(&value) || value.rsplit('_').next().is_some_and(|unit| unit != value && UNITS.contains(&unit))
}

/// Only types that every language has, passed by value or by pointer.
#[test]
fn types_are_plain() {
    for function in functions(HEADER) {
        let name = &function.name;
        let returns = function.returns.as_str();
        let handles_go = name.ends_with("_free") || name == "bmom_stop_request";
        assert_eq!(returns == "void", handles_go, "{name} returns {returns}");
        assert!(["int32_t", "void", "const char *"].contains(&returns), "{name} returns {returns}");
        for parameter in &function.parameters {
            let plain = ["int32_t", "int64_t", "double", "char"].contains(&parameter.base());
            assert!(plain || (parameter.is_handle() && parameter.is_pointer()), "{name}: {parameter:?}");
            assert!(parameter.kind != "char" && !parameter.kind.contains("***"), "{name}: {parameter:?}");
        }
    }
}

#[test]
fn names_carry_units_and_differ_in_lower_case() {
    for function in functions(HEADER) {
        let name = &function.name;
        assert!(name.starts_with("bmom_") && name.len() <= 63, "{name}");
        let mut seen = BTreeSet::new();
        for (i, parameter) in function.parameters.iter().enumerate() {
            assert!(parameter.name.len() <= 63, "{name}: {}", parameter.name);
            assert!(seen.insert(parameter.name.to_lowercase()), "{name}: {} twice", parameter.name);
            if parameter.base() == "double" {
                assert!(has_unit(&parameter.name), "{name}: {} has no unit", parameter.name);
            }
            if let Some(value) = parameter.name.strip_prefix("u_") {
                let before = i.checked_sub(1).map(|i| function.parameters[i].clone());
                assert_eq!(before, Some(Parameter::new(&parameter.kind, value)), "{name}: u_{value}");
            }
        }
    }
    for (name, _) in macros(HEADER) {
        assert!(name.len() + "BMOM_".len() <= 63, "{name}");
    }
    assert!(HEADER.is_ascii(), "old compilers read nothing else");
}

/// Handle, choices, settings, threads, stop, n, inputs, outputs, status of the rows.
#[test]
fn parameters_stand_in_one_order() {
    for function in functions(HEADER) {
        let name = &function.name;
        let at = |wanted: &str| function.parameters.iter().position(|parameter| parameter.name == wanted);
        if let (Some(settings), Some(threads)) = (at("settings"), at("threads")) {
            assert_eq!(settings + 1, threads, "{name}");
            assert!(at("stop").is_none_or(|stop| stop == threads + 1), "{name}");
            assert!(at("n").is_none_or(|n| n > threads), "{name}");
        }
        if let Some(status) = at("row_status") {
            assert_eq!(status + 1, function.parameters.len(), "{name}");
            assert!(at("row_item").is_none_or(|item| item + 1 == status), "{name}");
        }
        let first_output = function.parameters.iter().position(Parameter::is_output);
        let last_input = function.parameters.iter().rposition(Parameter::is_input_array);
        if let (Some(output), Some(input)) = (first_output, last_input) {
            assert!(
                input < output,
                "{name}: {} after {}",
                function.parameters[input].name,
                function.parameters[output].name
            );
        }
    }
}

/// A column form is the plain form with n, const pointers for its inputs and the status of the rows; nothing else differs.
#[test]
fn column_forms_follow_from_plain_forms() {
    let all = functions(HEADER);
    let mut pairs = 0;
    for column in
        all.iter().filter(|function| function.name.ends_with("_column") && function.name != "bmom_table_column")
    {
        let plain_name = column.name.trim_end_matches("_column");
        let plain = all.iter().find(|function| function.name == plain_name);
        let plain = plain.unwrap_or_else(|| panic!("{} has no plain form", column.name));
        let added =
            ["settings", "threads", "n", "atom_offsets", "bond_offsets", "found_offsets", "text_offsets", "row_status"];
        let mut kept = Vec::new();
        for parameter in column.parameters.iter().filter(|parameter| !added.contains(&parameter.name.as_str())) {
            kept.push(parameter.name.trim_start_matches("row_").to_owned());
        }
        let mut expected = Vec::new();
        for parameter in &plain.parameters {
            match parameter.name.strip_suffix("_length") {
                Some(text) if parameter.kind == "int64_t" => {
                    expected.pop();
                    expected.extend([format!("{text}_offsets"), format!("{text}_bytes"), format!("n_{text}_bytes")]);
                }
                _ => expected.push(parameter.name.clone()),
            }
        }
        if plain_name == "bmom_dipole_of_charges" {
            // Point charges have nothing to remark.
            expected.extend(["remarks".to_owned(), "item".to_owned()]);
        }
        assert_eq!(kept, expected, "{}", column.name);
        for parameter in &column.parameters {
            let Some(one) = plain.parameters.iter().find(|one| one.name == parameter.name) else { continue };
            let pointer = format!("const {} *", one.kind);
            assert!(parameter.kind == one.kind || parameter.kind == pointer, "{}: {parameter:?}", column.name);
        }
        pairs += 1;
    }
    assert!(pairs >= 20, "{pairs} pairs");
}

#[test]
fn every_function_says_what_it_takes_and_gives() {
    for function in functions(HEADER) {
        let comment = &function.comment;
        let says = ["Given:", "Returned", "Status"].iter().any(|part| comment.contains(part));
        let refers = comment.contains("bmom_");
        let short = function.returns != "int32_t" || function.parameters.is_empty();
        assert!(comment.len() > 20 && (says || refers || short), "{}: {comment}", function.name);
    }
}

#[test]
fn versions_agree() {
    let value = |wanted: &str| {
        let found = macros(HEADER).into_iter().find(|(name, _)| name == wanted);
        found.unwrap_or_else(|| panic!("BMOM_{wanted} is not in the header")).1.trim_matches('"').to_owned()
    };
    // SAFETY: both functions return static NUL-terminated texts.
    let (version, data) =
        unsafe { (CStr::from_ptr(about::bmom_version()), CStr::from_ptr(about::bmom_data_version())) };
    let manifest =
        std::fs::read_to_string(Path::new(env!("CARGO_MANIFEST_DIR")).join("Cargo.toml")).expect("Cargo.toml");
    assert!(manifest.contains(&format!("\nversion = \"{}\"\n", value("VERSION"))), "Cargo.toml");
    assert_eq!(version.to_str(), Ok(value("VERSION").as_str()));
    assert_eq!(data.to_str(), Ok(value("DATA_VERSION").as_str()));
    assert_eq!(about::bmom_abi_version().to_string(), value("ABI_VERSION"));
    let catalogue = catalogue_of_the_library();
    assert_eq!(word(&catalogue, "version"), value("VERSION"));
    assert_eq!(word(&catalogue, "data_version"), value("DATA_VERSION"));
    let soname = format!("libbondmoment.so.{}", value("ABI_VERSION"));
    assert_eq!(env!("BMOM_SONAME"), soname);
    let dynamic = output_of(Command::new("readelf").arg("-d").arg(shared_library()));
    assert!(dynamic.contains(&format!("[{soname}]")), "{dynamic}");
    assert!(selectors::ALL.iter().all(|choice| choice.selector.0 > 0));
}

/// Programs in C read the names of settings and columns in the header, not in the catalogue.
#[test]
fn the_header_names_every_setting_and_column() {
    let header = std::fs::read_to_string(concat!(env!("CARGO_MANIFEST_DIR"), "/include/bondmoment.h")).unwrap();
    let words: std::collections::BTreeSet<&str> =
        header.split(|c: char| !c.is_ascii_alphanumeric() && c != '_').collect();
    for setting in bondmoment::library::settings::SETTINGS {
        assert!(words.contains(setting.name), "setting {}", setting.name);
    }
    use bondmoment::library::polarity_table::{ATOMS_COLUMNS, BONDS_COLUMNS, POLARITY_COLUMNS};
    for column in [POLARITY_COLUMNS, BONDS_COLUMNS, ATOMS_COLUMNS].into_iter().flatten() {
        assert!(words.contains(column.name), "column {}", column.name);
    }
}
