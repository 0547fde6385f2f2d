//! The catalogue as JSON.

use serde::Serialize;

use super::{DATA_VERSION, SCHEMA, functions};
use crate::declare::{Argument, Example, Function, Holds, Kind};
use crate::library::polarity_table;
use crate::library::settings::{self, Holds as SettingHolds, Setting};
use crate::library::table::ColumnKind;
use crate::selectors;
use crate::status::{Code, remark};
use crate::tables;

#[derive(Serialize)]
struct Catalogue {
    catalogue: i32,
    version: &'static str,
    data_version: &'static str,
    blocks: Vec<Block>,
    functions: Vec<FunctionText>,
    selectors: Vec<SelectorText>,
    tables: Vec<TableText>,
    settings: Vec<SettingText>,
    statuses: Vec<StatusText>,
    remarks: Vec<RemarkText>,
    units: Vec<UnitText>,
}

/// Arrays that belong together and are one argument for people.
#[derive(Serialize)]
struct Block {
    name: &'static str,
    help: &'static str,
    arrays: Vec<BlockArray>,
}

#[derive(Serialize)]
struct BlockArray {
    name: &'static str,
    kind: &'static str,
    shape: &'static str,
    unit: &'static str,
    required: bool,
    index: bool,
    help: &'static str,
}

#[derive(Serialize)]
struct FunctionText {
    name: &'static str,
    family: &'static str,
    kind: &'static str,
    since: i32,
    title: &'static str,
    formula: &'static str,
    arguments: Vec<ArgumentText>,
    results: Vec<ArgumentText>,
    statuses: Vec<&'static str>,
    remarks: Vec<&'static str>,
    notes: &'static [&'static str],
    sources: &'static [&'static str],
    examples: Vec<ExampleText>,
}

#[derive(Serialize)]
struct ArgumentText {
    number: i32,
    name: &'static str,
    label: &'static str,
    kind: &'static str,
    #[serde(skip_serializing_if = "str::is_empty")]
    group: &'static str,
    shape: &'static str,
    unit: &'static str,
    #[serde(skip_serializing_if = "Option::is_none")]
    minimum: Option<f64>,
    #[serde(skip_serializing_if = "Option::is_none")]
    maximum: Option<f64>,
    #[serde(skip_serializing_if = "Vec::is_empty")]
    open: Vec<&'static str>,
    #[serde(skip_serializing_if = "str::is_empty")]
    range: &'static str,
    required: bool,
    #[serde(skip_serializing_if = "Option::is_none")]
    default: Option<serde_json::Value>,
    #[serde(skip_serializing_if = "str::is_empty")]
    uncertainty: &'static str,
    #[serde(skip_serializing_if = "std::ops::Not::not")]
    index: bool,
    #[serde(skip_serializing_if = "std::ops::Not::not")]
    main: bool,
    help: &'static str,
    #[serde(skip_serializing_if = "Option::is_none")]
    help_ascii: Option<String>,
}

#[derive(Serialize)]
struct ExampleText {
    given: serde_json::Map<String, serde_json::Value>,
    gives: serde_json::Map<String, serde_json::Value>,
    within: f64,
    source: &'static str,
}

#[derive(Serialize)]
struct SelectorText {
    selector: i32,
    name: &'static str,
    group: &'static str,
    title: &'static str,
    #[serde(skip_serializing_if = "Option::is_none")]
    source: Option<serde_json::Value>,
}

#[derive(Serialize)]
struct TableText {
    name: &'static str,
    columns: Vec<ColumnText>,
}

#[derive(Serialize)]
struct ColumnText {
    name: &'static str,
    #[serde(rename = "type")]
    kind: &'static str,
    unit: &'static str,
    help: &'static str,
}

#[derive(Serialize)]
struct SettingText {
    name: &'static str,
    kind: &'static str,
    #[serde(skip_serializing_if = "str::is_empty")]
    group: &'static str,
    unit: &'static str,
    #[serde(skip_serializing_if = "Option::is_none")]
    minimum: Option<f64>,
    #[serde(skip_serializing_if = "Option::is_none")]
    maximum: Option<f64>,
    #[serde(skip_serializing_if = "Vec::is_empty")]
    choices: Vec<&'static str>,
    default: serde_json::Value,
    help: &'static str,
}

#[derive(Serialize)]
struct StatusText {
    code: i32,
    name: &'static str,
    text: &'static str,
}

#[derive(Serialize)]
struct RemarkText {
    bit: i32,
    name: &'static str,
    text: &'static str,
}

#[derive(Serialize)]
struct UnitText {
    selector: i32,
    name: &'static str,
    text: &'static str,
}

/// The whole catalogue.
pub fn text() -> String {
    let catalogue = Catalogue {
        catalogue: SCHEMA,
        version: env!("CARGO_PKG_VERSION"),
        data_version: DATA_VERSION,
        blocks: blocks(),
        functions: functions().map(function_text).collect(),
        selectors: selectors::ALL.iter().map(selector_text).collect(),
        tables: tables(),
        settings: settings::SETTINGS.iter().map(setting_text).collect(),
        statuses: Code::ALL
            .iter()
            .map(|&code| StatusText { code: code as i32, name: code.name(), text: code.text() })
            .collect(),
        remarks: remark::ALL.iter().map(|&(bit, name, text)| RemarkText { bit, name, text }).collect(),
        units: selectors::ALL
            .iter()
            .filter(|choice| choice.group == "unit")
            .map(|choice| UnitText { selector: choice.selector.0, name: choice.name, text: choice.title })
            .collect(),
    };
    serde_json::to_string(&catalogue).unwrap_or_default()
}

fn blocks() -> Vec<Block> {
    let array =
        |name, kind, shape, unit, required, index, help| BlockArray { name, kind, shape, unit, required, index, help };
    vec![
        Block {
            name: "molecules",
            help: "A column of molecules; the atoms of row r are atom_offsets[r] to atom_offsets[r + 1] - 1",
            arrays: vec![
                array("atom_offsets", "integer64", "row+1", "", true, false, "First atom of each row, and the end"),
                array("atomic_number", "integer", "atom", "", true, false, "Atomic number"),
                array("formal_charge", "integer", "atom", "e", false, false, "Formal charge; left out: derived"),
                array("xyz_A", "number", "atom×3", "Å", true, false, "Coordinates"),
            ],
        },
        Block {
            name: "bonds",
            help: "Bonds of a column of molecules; left out: found from the coordinates",
            arrays: vec![
                array("bond_offsets", "integer64", "row+1", "", false, false, "First bond of each row, and the end"),
                array("bond_atoms", "integer", "bond×2", "", true, true, "The two atoms, counted within the molecule"),
                array("bond_order", "number", "bond", "", true, false, "1, 2, 3, 1.5 aromatic, 0 not assigned"),
            ],
        },
    ]
}

fn function_text(function: &'static Function) -> FunctionText {
    FunctionText {
        name: function.name,
        family: function.family,
        kind: match function.kind {
            Kind::Scalar => "scalar",
            Kind::Molecules => "molecules",
        },
        since: function.since,
        title: function.title,
        formula: function.formula,
        arguments: function.arguments.iter().map(argument_text).collect(),
        results: function.results.iter().map(argument_text).collect(),
        statuses: function.statuses.iter().map(|code| code.name()).collect(),
        remarks: remark::ALL.iter().filter(|(bit, ..)| function.remarks & bit != 0).map(|&(_, name, _)| name).collect(),
        notes: function.notes,
        sources: function.sources,
        examples: function.examples.iter().map(example_text).collect(),
    }
}

fn argument_text(argument: &Argument) -> ArgumentText {
    let mut open = Vec::new();
    if argument.above {
        open.push("minimum");
    }
    if argument.below {
        open.push("maximum");
    }
    let default = match argument.default {
        Some(selector) => Some(selector.name().into()),
        None if argument.default_number.is_finite() => Some(argument.default_number.into()),
        None => None,
    };
    ArgumentText {
        number: argument.number,
        name: argument.name,
        label: argument.label,
        kind: match argument.holds {
            Holds::Number => "number",
            Holds::Integer => "integer",
            Holds::Selector => "selector",
            Holds::Text => "text",
            Holds::Block => "block",
        },
        group: argument.group,
        shape: argument.shape,
        unit: argument.unit,
        minimum: argument.minimum.is_finite().then_some(argument.minimum),
        maximum: argument.maximum.is_finite().then_some(argument.maximum),
        open,
        range: argument.range,
        required: argument.required,
        default,
        uncertainty: argument.uncertainty,
        index: argument.index,
        main: argument.main,
        help: argument.help,
        help_ascii: ascii(argument.help),
    }
}

/// The ASCII twin of a help text, for hosts whose help takes nothing else.
fn ascii(text: &str) -> Option<String> {
    if text.is_ascii() {
        return None;
    }
    let plain = text
        .replace('Å', "angstrom")
        .replace('³', "3")
        .replace('²', "2")
        .replace('°', "deg ")
        .replace('·', " ")
        .replace('×', "x")
        .replace('−', "-")
        .replace('μ', "mu")
        .replace('χ', "chi")
        .replace('Δ', "delta ")
        .replace('ö', "o")
        .replace('é', "e");
    Some(plain.chars().filter(char::is_ascii).collect())
}

fn example_text(example: &Example) -> ExampleText {
    ExampleText {
        given: pairs(example.given),
        gives: pairs(example.gives),
        within: example.within,
        source: example.source,
    }
}

/// `name=value;name=value` as a JSON object, numbers as numbers.
fn pairs(text: &str) -> serde_json::Map<String, serde_json::Value> {
    let mut map = serde_json::Map::new();
    for (name, value) in text.split(';').filter_map(|pair| pair.split_once('=')) {
        let value = match value.trim().parse::<i64>() {
            Ok(integer) => integer.into(),
            Err(_) => value.trim().parse::<f64>().map_or_else(|_| value.into(), Into::into),
        };
        map.insert(name.trim().to_owned(), value);
    }
    map
}

fn selector_text(choice: &selectors::Choice) -> SelectorText {
    SelectorText {
        selector: choice.selector.0,
        name: choice.name,
        group: choice.group,
        title: choice.title,
        source: tables::source_json(choice.selector).ok().and_then(|text| serde_json::from_str(&text).ok()),
    }
}

fn tables() -> Vec<TableText> {
    vec![
        table_text("polarity", polarity_table::POLARITY_COLUMNS),
        table_text("bonds", polarity_table::BONDS_COLUMNS),
        table_text("atoms", polarity_table::ATOMS_COLUMNS),
    ]
}

fn table_text(name: &'static str, columns: &'static [ColumnKind]) -> TableText {
    TableText {
        name,
        columns: columns
            .iter()
            .map(|column| ColumnText {
                name: column.name,
                kind: column.kind.title(),
                unit: column.unit,
                help: column.help,
            })
            .collect(),
    }
}

fn setting_text(setting: &'static Setting) -> SettingText {
    let mut text = SettingText {
        name: setting.name,
        kind: "text",
        group: "",
        unit: setting.unit,
        minimum: None,
        maximum: None,
        choices: Vec::new(),
        default: serde_json::Value::Null,
        help: setting.help,
    };
    match setting.holds {
        SettingHolds::Number(default, minimum, maximum) => {
            text.kind = "number";
            text.default = default.into();
            (text.minimum, text.maximum) = (Some(minimum), Some(maximum));
        }
        SettingHolds::Choice(group, default, allowed) => {
            text.kind = "selector";
            text.group = group;
            text.default = default.name().into();
            text.choices = allowed.iter().map(|choice| choice.name()).collect();
        }
        SettingHolds::Text(default) => text.default = default.into(),
    }
    text
}
