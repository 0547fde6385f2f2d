//! The README says what is: its example, its list of functions and its figures are checked against the project.

#[path = "open_set/compare/main.rs"]
mod compare;

use std::fs::read_to_string;
use std::path::Path;

use bondmoment::catalogue::functions;

fn file(name: &str) -> String {
    read_to_string(Path::new(env!("CARGO_MANIFEST_DIR")).join(name)).expect("the file is there")
}

#[test]
fn the_c_example_is_the_one_that_is_tested() {
    let example = file("bindings/c/first.c");
    assert!(file("README.md").contains(&format!("```c\n{example}```")), "README.md: put bindings/c/first.c in again");
}

#[test]
fn every_worksheet_function_is_listed() {
    let readme = file("README.md");
    for function in functions() {
        assert!(readme.contains(&format!("| `{}` | {}", function.name, function.title)), "{}", function.name);
    }
}

#[test]
fn the_accuracy_is_as_measured() {
    let rows = compare::rows(&Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/open_set")).expect("the open set");
    let report = compare::report(&rows);
    assert!(file("README.md").contains(&report), "README.md: put in what the example accuracy prints:\n{report}");
}
