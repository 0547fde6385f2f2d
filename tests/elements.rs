//! The elements family against published values: tests/published/elements.csv and units.csv, and the provenance of values.

use bondmoment::declare::Function;
use bondmoment::elements::{self, value_source};
use bondmoment::quantity::Quantity;
use bondmoment::selectors::{self, Selector};
use bondmoment::status::{Code, Failure};
use bondmoment::tables;

/// What a function gave: numbers by name, or one text.
enum Given {
    Numbers(Vec<(&'static str, f64)>),
    Text(String),
}

/// The arguments of a check, `name=value;name=value`.
struct Arguments<'a>(&'a str);

impl Arguments<'_> {
    fn text(&self, name: &str) -> Option<&str> {
        self.0.split(';').filter_map(|pair| pair.split_once('=')).find(|pair| pair.0 == name).map(|pair| pair.1)
    }

    fn number(&self, name: &str) -> f64 {
        self.text(name).map_or(f64::NAN, |text| text.parse().unwrap_or_else(|_| panic!("{name}={text}")))
    }

    fn integer(&self, name: &str) -> i32 {
        self.text(name).and_then(|text| text.parse().ok()).unwrap_or_else(|| panic!("{name} in {}", self.0))
    }

    fn selector(&self, name: &str) -> Selector {
        let text = self.text(name).unwrap_or_else(|| panic!("{name} in {}", self.0));
        text.parse().map(Selector).or_else(|_| Selector::by_name(text)).unwrap_or_else(|_| panic!("{name}={text}"))
    }
}

fn call(function: &str, arguments: &Arguments) -> Result<Given, Failure> {
    let quantity = |name, u_name, q: Quantity| Given::Numbers(vec![(name, q.value), (u_name, q.u)]);
    let table = || arguments.selector("table");
    let z = || arguments.integer("atomic_number");
    Ok(match function {
        "atomic_number" => {
            let z = elements::atomic_number(arguments.text("symbol").unwrap_or_default())?;
            Given::Numbers(vec![("atomic_number", f64::from(z))])
        }
        "symbol" => Given::Text(elements::symbol(z())?.to_owned()),
        "covalent_radius" => {
            let radius = elements::covalent_radius(table(), z(), arguments.selector("state"))?;
            quantity("radius_A", "u_radius_A", radius)
        }
        "vdw_radius" => quantity("radius_A", "u_radius_A", elements::vdw_radius(table(), z())?),
        "electronegativity" => {
            let found = elements::electronegativity(arguments.selector("scale"), z())?;
            quantity("electronegativity", "u_electronegativity", found)
        }
        "atomic_weight" => quantity("atomic_weight_u", "u_atomic_weight_u", elements::atomic_weight(table(), z())?),
        "polarizability" => {
            quantity("polarizability_A3", "u_polarizability_A3", elements::polarizability(table(), z())?)
        }
        "bohr_radius" => {
            let radius = elements::bohr_radius(arguments.integer("shell"), arguments.integer("nuclear_charge"))?;
            quantity("radius_A", "u_radius_A", radius)
        }
        "convert" => {
            let value = Quantity::new(arguments.number("value"), arguments.number("u_value"));
            let converted = elements::convert(arguments.selector("from_unit"), arguments.selector("to_unit"), value)?;
            quantity("converted", "u_converted", converted)
        }
        _ => panic!("no function {function}"),
    })
}

/// Compares what was given with `name=value;name=value` or `status=number`; the complaint if it differs.
fn compare(given: Result<Given, Failure>, expected: &str, tolerance: f64) -> Result<(), String> {
    for pair in expected.split(';') {
        let (name, wanted) = pair.split_once('=').ok_or("an expectation without a name")?;
        match &given {
            Err(failure) if name == "status" && failure.status().to_string() == wanted => {}
            Err(failure) => return Err(format!("status {} ({})", failure.status(), failure.code.name())),
            Ok(Given::Text(text)) if text == wanted => {}
            Ok(Given::Text(text)) => return Err(text.clone()),
            Ok(Given::Numbers(numbers)) => {
                let found = numbers.iter().find(|number| number.0 == name).ok_or(format!("no result {name}"))?.1;
                let wanted: f64 = wanted.parse().map_err(|_| format!("no number: {wanted}"))?;
                let agrees = (found - wanted).abs() <= tolerance || (found.is_nan() && wanted.is_nan());
                if !agrees {
                    return Err(format!("{name}={found:e}"));
                }
            }
        }
    }
    Ok(())
}

fn check_file(text: &str, least: usize) {
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let headers = reader.headers().expect("a header").iter().collect::<Vec<_>>().join(",");
    assert_eq!(headers, "function,arguments,expected,tolerance,source,mark");
    let mut wrong = Vec::new();
    let mut count = 0;
    for row in reader.records() {
        let row = row.expect("six columns");
        let tolerance = row[3].parse().expect("a tolerance");
        assert!(!row[4].is_empty() && !row[5].is_empty(), "no source: {row:?}");
        if let Err(found) = compare(call(&row[0], &Arguments(&row[1])), &row[2], tolerance) {
            wrong.push(format!("{}({}): expected {}, found {found}", &row[0], &row[1], &row[2]));
        }
        count += 1;
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
    assert!(count >= least, "only {count} checks");
}

#[test]
fn published_values_of_elements() {
    check_file(include_str!("published/elements.csv"), 200);
}

#[test]
fn published_values_of_units() {
    check_file(include_str!("published/units.csv"), 60);
}

/// A check that cannot fail is none: a wrong number, a wrong status and an unknown uncertainty are all noticed.
#[test]
fn comparison_notices_differences() {
    let given = || Ok(Given::Numbers(vec![("x", 1.0), ("u_x", f64::NAN)]));
    assert!(compare(given(), "x=1", 0.0).is_ok());
    assert!(compare(given(), "x=1;u_x=nan", 0.0).is_ok());
    assert!(compare(given(), "x=1.1", 0.05).is_err());
    assert!(compare(given(), "x=nan", 0.05).is_err());
    assert!(compare(given(), "u_x=0", 1.0).is_err());
    assert!(compare(given(), "status=2101", 0.0).is_err());
    assert!(compare(Err(Failure::of(Code::NoData, 2)), "status=1101", 0.0).is_err());
    assert!(compare(Err(Failure::of(Code::NoData, 2)), "x=1", 0.0).is_err());
}

/// The examples in the catalogue are true.
#[test]
fn examples_hold() {
    for function in elements::FUNCTIONS.iter().copied() {
        let Function { name, examples, .. } = function;
        assert!(!examples.is_empty(), "{name}");
        for example in *examples {
            let given = call(name, &Arguments(example.given));
            assert_eq!(compare(given, example.gives, example.within), Ok(()), "{name}({})", example.given);
        }
    }
}

/// Arguments and results are numbered through from 1, help fits its place, and selectors have defaults of their group.
#[test]
fn declarations_are_in_order() {
    for function in elements::FUNCTIONS {
        let all = function.arguments.iter().chain(function.results);
        for (argument, number) in all.zip(1..) {
            assert_eq!(argument.number, number, "{}.{}", function.name, argument.name);
            assert!(!argument.help.is_empty() && argument.help.chars().count() <= 80, "{}", argument.name);
            if let Some(default) = argument.default {
                assert_eq!(default.of_group(argument.group), Ok(default), "{}", argument.name);
            }
        }
        assert_eq!(function.results.iter().filter(|result| result.main).count(), 1, "{}", function.name);
    }
}

/// Every element reads back from its symbol and from its name, in any case.
#[test]
fn symbols_and_names_read_back() {
    for z in 1..=118 {
        let element = tables::element(z).expect("118 elements");
        assert_eq!(elements::symbol(z), Ok(element.symbol.as_str()));
        for text in [&element.symbol, &element.name, &element.symbol.to_uppercase(), &element.name.to_uppercase()] {
            assert_eq!(elements::atomic_number(text), Ok(z), "{text}");
        }
    }
}

/// A standard atomic weight lies near the mass of the most abundant isotope, and the heaviest atom of a sum of two
/// covalent radii is not shorter than the bond of hydrogen: a slipped row shows.
#[test]
fn tables_agree_with_one_another_in_scale() {
    for z in 1..=118 {
        let isotope = elements::atomic_weight(selectors::MASSES_ABUNDANT_ISOTOPE_2020, z).expect("all elements");
        if let Ok(weight) = elements::atomic_weight(selectors::WEIGHTS_STANDARD_2021, z) {
            assert!((weight.value / isotope.value - 1.0).abs() < 0.03, "Z {z}");
            assert!(weight.u > 0.0 && isotope.u >= 0.0, "Z {z}");
        }
        let single = selectors::RADII_PYYKKO_SINGLE_2009;
        let of = |table| elements::covalent_radius(table, z, selectors::STATE_AS_LISTED).map(|radius| radius.value);
        if let (Ok(one), Ok(other)) = (of(selectors::RADII_CORDERO_2008), of(single)) {
            assert!((one - other).abs() < 0.45, "Z {z}: {one} and {other}");
        }
        let pauling = elements::electronegativity(selectors::ELECTRONEGATIVITY_PAULING, z);
        let allen = elements::electronegativity(selectors::ELECTRONEGATIVITY_ALLEN, z);
        if let (Ok(pauling), Ok(allen)) = (pauling, allen) {
            assert!((pauling.value - allen.value).abs() < 0.75, "Z {z}: {} and {}", pauling.value, allen.value);
        }
    }
}

#[test]
fn provenance_of_values() {
    let read = |table, z, state| -> (Selector, serde_json::Value) {
        let found = value_source(table, z, state).expect("a value");
        (found.mark, serde_json::from_str(&found.json).expect("JSON"))
    };
    let (mark, json) = read(selectors::RADII_CORDERO_2008, 6, selectors::STATE_AS_LISTED);
    assert_eq!(mark, selectors::MARK_CORROBORATED);
    assert_eq!(json["year"], 2008);
    assert_eq!(json["doi"], "10.1039/b801115j");
    assert_eq!(
        (json["value"].as_f64(), json["u"].as_f64(), json["unit"].as_str()),
        (Some(76.0), Some(1.0), Some("pm"))
    );
    assert_eq!(json["state"], "STATE_SP3");

    let (mark, json) = read(selectors::VDW_MANTINA_2009, 13, selectors::STATE_AS_LISTED);
    assert_eq!(mark, selectors::MARK_VERIFIED);
    assert!(json["u"].is_null());
    assert_eq!(read(selectors::VDW_MANTINA_2009, 1, selectors::STATE_AS_LISTED).0, selectors::MARK_FROM_MEMORY);
    let (_, json) = read(selectors::POLARIZABILITY_2018, 67, selectors::STATE_AS_LISTED);
    assert!(json["note"].as_str().is_some_and(|note| note.starts_with("disputed")), "{json}");

    let (mark, json) = read(selectors::ELECTRONEGATIVITY_MULLIKEN, 17, selectors::STATE_AS_LISTED);
    assert_eq!(mark, selectors::MARK_DERIVED);
    assert_eq!(json["parts"][0]["table"], "IONIZATION_ENERGY");
    assert_eq!(json["parts"][1]["value"], 3.612725);

    let refused = |table, z, state| value_source(table, z, state).expect_err("no value").status();
    assert_eq!(refused(selectors::RADII_CORDERO_2008, 97, selectors::STATE_AS_LISTED), 2101);
    assert_eq!(refused(selectors::RADII_CORDERO_2008, 7, selectors::STATE_SP2), 3101);
    assert_eq!(refused(selectors::ELECTRONEGATIVITY_MULLIKEN, 7, selectors::STATE_AS_LISTED), 2101);
    assert_eq!(refused(selectors::UNIT_PM, 7, selectors::STATE_AS_LISTED), 1017);
    assert_eq!(refused(selectors::IONIC_PAULING_1960, 7, selectors::STATE_AS_LISTED), 1017);
    assert_eq!(refused(selectors::RADII_CORDERO_2008, 0, selectors::STATE_AS_LISTED), 2100);
    assert_eq!(refused(Selector(0), 7, selectors::STATE_AS_LISTED), 1016);
}

/// Every table, scale, law and model that can be chosen names its source; a unit has none.
#[test]
fn sources_of_selectors() {
    let groups = ["radii", "vdw_radii", "electronegativity", "masses", "polarizability", "ionic_law", "length_law"];
    for choice in selectors::ALL.iter().filter(|choice| groups.contains(&choice.group)) {
        let source = tables::source(choice.selector).unwrap_or_else(|_| panic!("{}", choice.name));
        assert!(!source.title.is_empty() && !source.journal.is_empty() && !source.remark.is_empty(), "{}", choice.name);
        assert!(source.mark().is_ok(), "{}", choice.name);
    }
    let json = tables::source_json(selectors::VDW_BONDI_1964).expect("a source");
    let json: serde_json::Value = serde_json::from_str(&json).expect("JSON");
    assert_eq!(json["journal"], "J. Phys. Chem. 1964, 68, 441-451");
    assert_eq!(tables::source(selectors::UNIT_PM).expect_err("no source").code, Code::WrongSelector);
}
