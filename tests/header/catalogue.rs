//! The catalogue against the header, and against its own rules.

use std::collections::BTreeSet;

use bondmoment::catalogue::{self, Value as Cell, evaluate};
use bondmoment::library::table::{number_read, number_text};
use bondmoment::selectors::Selector;
use serde_json::Value;

use super::HEADER;
use super::parse::{Function, Parameter, functions, macros};

pub fn catalogue_of_the_library() -> Value {
    serde_json::from_str(&catalogue::text()).expect("the catalogue is JSON")
}

fn list<'a>(value: &'a Value, name: &str) -> &'a [Value] {
    value[name].as_array().map_or(&[], Vec::as_slice)
}

pub fn word<'a>(value: &'a Value, name: &str) -> &'a str {
    value[name].as_str().unwrap_or("")
}

fn is(value: &Value, name: &str) -> bool {
    value[name].as_bool().unwrap_or(false)
}

/// Parameters that the catalogue asks for.
fn parameters_of(function: &Value, blocks: &[Value], column: bool) -> Vec<Parameter> {
    let mut list_of = Vec::new();
    let mut add = |kind: &str, name: &str| list_of.push(Parameter::new(kind, name));
    let molecules = word(function, "kind") == "molecules";
    let row = |kind: &str| if column { format!("const {kind} *") } else { kind.to_owned() };
    let (calls, rows): (Vec<&Value>, Vec<&Value>) =
        list(function, "arguments").iter().partition(|argument| word(argument, "shape") == "call");
    for argument in calls {
        add(if word(argument, "kind") == "number" { "double" } else { "int32_t" }, word(argument, "name"));
    }
    if molecules && column {
        add("const bmom_settings *", "settings");
        add("int32_t", "threads");
    }
    if column {
        add("int64_t", "n");
    }
    let has_block = rows.iter().any(|argument| word(argument, "kind") == "block");
    if molecules && !has_block {
        if column {
            add("const int64_t *", "atom_offsets");
        }
        add("int64_t", "n_atoms");
    }
    for argument in rows {
        let name = word(argument, "name");
        match word(argument, "kind") {
            "block" => {
                let block = blocks.iter().find(|block| word(block, "name") == name).expect("a declared block");
                for array in list(block, "arrays") {
                    if word(array, "kind") == "integer64" {
                        if column {
                            add("const int64_t *", word(array, "name"));
                        }
                        add("int64_t", if name == "molecules" { "n_atoms" } else { "n_bonds" });
                    } else {
                        let number = word(array, "kind") == "number";
                        add(if number { "const double *" } else { "const int32_t *" }, word(array, "name"));
                    }
                }
            }
            "text" if column => {
                add("const int64_t *", &format!("{name}_offsets"));
                add("const char *", &format!("{name}_bytes"));
                add("int64_t", &format!("n_{name}_bytes"));
            }
            "text" => {
                add("const char *", name);
                add("int64_t", &format!("{name}_length"));
            }
            "number" => {
                let array = molecules || word(argument, "shape").contains('×');
                let kind = if array { "const double *".to_owned() } else { row("double") };
                add(&kind, name);
                if !word(argument, "uncertainty").is_empty() {
                    add(&kind, word(argument, "uncertainty"));
                }
            }
            _ => add(&row("int32_t"), name),
        }
    }
    let results = list(function, "results");
    let found = results.iter().any(|result| word(result, "shape") == "found");
    if found && column {
        add("int64_t *", "found_offsets");
    }
    for result in results {
        match word(result, "kind") {
            "number" => {
                add("double *", word(result, "name"));
                if !word(result, "uncertainty").is_empty() {
                    add("double *", word(result, "uncertainty"));
                }
            }
            "text" => {
                if column {
                    add("int64_t *", "text_offsets");
                }
                add("char *", "text");
                add("int64_t", "capacity");
                add("int64_t *", "needed");
            }
            _ => add("int32_t *", word(result, "name")),
        }
    }
    if found {
        add("int64_t", "capacity");
        add("int64_t *", "needed");
    }
    match (molecules, column) {
        (true, true) => ["row_remarks", "row_item"].iter().for_each(|name| add("int32_t *", name)),
        (true, false) if has_block => ["remarks", "item"].iter().for_each(|name| add("int32_t *", name)),
        _ => {}
    }
    if column {
        add("int32_t *", "row_status");
    }
    list_of
}

#[test]
fn catalogue_and_header_declare_the_same_functions() {
    let catalogue = catalogue_of_the_library();
    let header = functions(HEADER);
    let find = |name: &str| -> &Function {
        header.iter().find(|function| function.name == name).unwrap_or_else(|| panic!("{name} is not in the header"))
    };
    let names = |parameters: &[Parameter]| {
        let words: Vec<String> = parameters.iter().map(|one| format!("{} {}", one.kind, one.name)).collect();
        words.join(", ")
    };
    let mut problems = Vec::new();
    for function in list(&catalogue, "functions") {
        let name = word(function, "name");
        for (column, suffix) in [(false, ""), (true, "_column")] {
            let declared = find(&format!("bmom_{name}{suffix}"));
            let expected = parameters_of(function, list(&catalogue, "blocks"), column);
            if declared.parameters != expected {
                let (header, catalogue) = (names(&declared.parameters), names(&expected));
                problems.push(format!("{}\n  header: {header}\n  catalogue: {catalogue}", declared.name));
            }
        }
        let numbers: Vec<i64> = list(function, "arguments")
            .iter()
            .chain(list(function, "results"))
            .filter_map(|argument| argument["number"].as_i64())
            .collect();
        assert!(numbers.iter().copied().eq(1..=numbers.len() as i64), "{name}: {numbers:?}");
        assert_eq!(
            list(function, "results").iter().filter(|result| is(result, "main")).count(),
            1,
            "{name}: main result"
        );
    }
    assert!(problems.is_empty(), "the header and the catalogue differ:\n{}", problems.join("\n"));
}

#[test]
fn catalogue_and_header_name_the_same_numbers() {
    let catalogue = catalogue_of_the_library();
    let mut expected = BTreeSet::new();
    for (group, number, prefix) in
        [("statuses", "code", ""), ("remarks", "bit", "REMARK_"), ("selectors", "selector", "")]
    {
        for entry in list(&catalogue, group) {
            let number = entry[number].as_i64().unwrap_or_else(|| panic!("{entry} has no number"));
            assert!(expected.insert((format!("{prefix}{}", word(entry, "name")), number.to_string())), "{entry} twice");
        }
    }
    let versions = ["ABI_VERSION", "VERSION", "DATA_VERSION"];
    let found: BTreeSet<_> =
        macros(HEADER).into_iter().filter(|(name, _)| !versions.contains(&name.as_str())).collect();
    assert_eq!(found, expected);
    let numbers: Vec<i64> =
        list(&catalogue, "selectors").iter().filter_map(|entry| entry["selector"].as_i64()).collect();
    assert!(!numbers.contains(&0) && numbers.iter().all(|&number| number > 0 && number < i64::from(i32::MAX)));
    for unit in list(&catalogue, "units") {
        assert!(numbers.contains(&unit["selector"].as_i64().unwrap_or(0)), "{unit}");
    }
}

/// Names, groups, defaults and lengths of what people read.
#[test]
fn catalogue_keeps_its_own_rules() {
    let catalogue = catalogue_of_the_library();
    let group_of = |name: &str| {
        list(&catalogue, "selectors").iter().find(|entry| word(entry, "name") == name).map(|entry| word(entry, "group"))
    };
    let codes: Vec<&str> = list(&catalogue, "statuses").iter().map(|entry| word(entry, "name")).collect();
    for function in list(&catalogue, "functions") {
        let name = word(function, "name");
        for argument in list(function, "arguments").iter().chain(list(function, "results")) {
            let what = format!("{name}: {}", word(argument, "name"));
            let help = word(argument, "help");
            assert!(!help.is_empty() && help.chars().count() <= 80, "{what}: {help}");
            assert_eq!(help.is_ascii(), argument.get("help_ascii").is_none(), "{what}");
            assert!(word(argument, "help_ascii").is_ascii(), "{what}");
            assert_eq!(word(argument, "kind") == "selector", !word(argument, "group").is_empty(), "{what}: group");
            if let Some(default) = argument.get("default") {
                match default.as_str() {
                    Some(default) => assert_eq!(group_of(default), Some(word(argument, "group")), "{what}: {default}"),
                    None => {
                        let default = default.as_f64().unwrap_or(f64::NAN);
                        let limit = |name: &str, none: f64| argument[name].as_f64().unwrap_or(none);
                        assert!(default >= limit("minimum", f64::NEG_INFINITY), "{what}: {default}");
                        assert!(default <= limit("maximum", f64::INFINITY), "{what}: {default}");
                    }
                }
            }
        }
        for status in list(function, "statuses") {
            assert!(codes.contains(&status.as_str().unwrap_or("")), "{name}: {status}");
        }
        assert!(!list(function, "sources").is_empty(), "{name} names no source");
    }
    for setting in list(&catalogue, "settings") {
        assert!(word(setting, "help").chars().count() <= 80, "{setting}");
        if word(setting, "kind") == "selector" {
            assert_eq!(group_of(word(setting, "default")), Some(word(setting, "group")), "{setting}");
        }
    }
    for table in list(&catalogue, "tables") {
        let names: BTreeSet<String> =
            list(table, "columns").iter().map(|column| word(column, "name").to_lowercase()).collect();
        assert_eq!(names.len(), list(table, "columns").len(), "two columns of {} are alike", word(table, "name"));
    }
}

/// The examples as they stand in the JSON text, which every host's tests run, give their numbers.
#[test]
fn examples_of_the_catalogue_hold() {
    let catalogue = catalogue_of_the_library();
    let text_of =
        |value: &Value| value.as_str().map_or_else(|| number_text(value.as_f64().unwrap_or(f64::NAN)), str::to_owned);
    let mut checked = 0;
    for function in list(&catalogue, "functions") {
        let name = word(function, "name");
        let declared = catalogue::function(name).expect("a function of the catalogue");
        for example in list(function, "examples") {
            let given: Vec<(&str, String)> = example["given"]
                .as_object()
                .into_iter()
                .flatten()
                .map(|(name, value)| (name.as_str(), text_of(value)))
                .collect();
            let given: Vec<(&str, &str)> = given.iter().map(|(name, text)| (*name, text.as_str())).collect();
            let results = evaluate(declared, &given).unwrap_or_else(|words| panic!("{name}: {words}"));
            let within = example["within"].as_f64().unwrap_or(f64::NAN);
            for (result, expected) in example["gives"].as_object().into_iter().flatten() {
                let expected = text_of(expected);
                let near = |value: f64| number_read(&expected).is_ok_and(|expected| (value - expected).abs() <= within);
                let holds = results.iter().any(|(argument, cell)| match cell {
                    Cell::Number(quantity) if argument.name == result => near(quantity.value),
                    Cell::Number(quantity) if argument.uncertainty == result => near(quantity.u),
                    Cell::Integer(integer) if argument.name == result => expected == integer.to_string(),
                    Cell::Choice(choice) if argument.name == result => Selector::by_name(&expected) == Ok(*choice),
                    Cell::Text(text) if argument.name == result => *text == expected,
                    _ => false,
                });
                assert!(holds, "{name}: {result} is not {expected}: {results:?}");
                checked += 1;
            }
            assert!(!word(example, "source").is_empty(), "{name}: an example without a source");
        }
    }
    assert!(checked >= 15, "{checked} results");
}
