//! The same bits everywhere: tests/published/answers.txt holds the answers of all plain functions of the C ABI, of a few
//! hundred inputs and of molecules, as hexadecimal bits. Every host's tests can read it; here it is computed anew.
//!
//! A line is a function, its arguments, `>`, and what it gives: `status`, and results where that is 0. Numbers are the 16
//! hexadecimal digits of their bits, integers and selectors decimal, texts as they are, arrays separated by commas. A line
//! `molecule` names arrays that later lines refer to. The first line holds the versions. After an intended change of a
//! number: `BMOM_UPDATE_ANSWERS=1 cargo test --test answers`.
#![allow(unsafe_code)]

#[path = "answers/molecules.rs"]
mod molecules;

use std::path::{Path, PathBuf};
use std::process::Command;

use bondmoment::c_api::{about, bonds, charges, elements};
use bondmoment::catalogue::DATA_VERSION;
use bondmoment::selectors as s;

const ELEMENTS: &[i32] = &[
    1,
    2,
    3,
    4,
    5,
    6,
    7,
    8,
    9,
    11,
    12,
    13,
    14,
    15,
    16,
    17,
    18,
    20,
    22,
    25,
    26,
    29,
    30,
    34,
    35,
    47,
    50,
    53,
    55,
    78,
    80,
    82,
    92,
    96,
    104,
    118,
    119,
    i32::MIN,
];
const MOLECULES: &[&str] = &[
    "water",
    "methane",
    "fluoromethane",
    "trichloromethane",
    "formaldehyde",
    "acetonitrile",
    "nitromethane",
    "benzene",
    "acetate_ion",
    "ammonium_ion",
    "imidazolium_ion",
    "acetic_acid",
    "gauche-1_2-dichloroethane",
    "sulfur_hexafluoride",
];
/// Numbers whose bits tell: no short binary fractions, both signs, wide exponents.
const NUMBERS: &[f64] = &[0.1, 1.0 / 3.0, 1.85, 2.541746, -0.7, 1e-7, 123456.789, 0.0];

fn committed() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/published/answers.txt")
}

fn bits(value: f64) -> String {
    format!("{:016x}", value.to_bits())
}

fn all_bits(values: &[f64]) -> String {
    values.iter().map(|&value| bits(value)).collect::<Vec<_>>().join(",")
}

fn group(name: &str) -> impl Iterator<Item = i32> {
    s::ALL.iter().filter(move |choice| choice.group == name).map(|choice| choice.selector.0)
}

/// The file as it is written, line by line.
struct Sheet(String);

impl Sheet {
    fn line(&mut self, given: &str, status: i32, results: &str) {
        let results = if status == 0 { format!(" {results}") } else { String::new() };
        self.0.push_str(&format!("{given} > status={status}{}\n", results.trim_end()));
    }

    /// A function that gives a value with its uncertainty.
    fn quantity(&mut self, given: &str, name: &str, call: impl FnOnce(*mut f64, *mut f64) -> i32) {
        let (mut value, mut u) = (0.0, 0.0);
        let status = call(&raw mut value, &raw mut u);
        self.line(given, status, &format!("{name}={} u_{name}={}", bits(value), bits(u)));
    }

    fn elements(&mut self) {
        let listed = s::STATE_AS_LISTED.0;
        for &z in ELEMENTS {
            let mut text = [0_i8; 8];
            let mut needed = 0;
            // SAFETY: here and below: pointers lead to local variables of the sizes stated.
            let status = unsafe { elements::bmom_symbol(z, text.as_mut_ptr().cast(), 8, &raw mut needed) };
            let symbol: String = text.iter().take(needed as usize).map(|&byte| char::from(byte as u8)).collect();
            self.line(&format!("symbol atomic_number={z}"), status, &format!("symbol={symbol}"));
            if status == 0 {
                let mut back = 0;
                // SAFETY: as above.
                let status =
                    unsafe { elements::bmom_atomic_number(symbol.as_ptr().cast(), symbol.len() as i64, &raw mut back) };
                self.line(&format!("atomic_number symbol={symbol}"), status, &format!("atomic_number={back}"));
            }
            for table in group("radii") {
                self.quantity(
                    &format!("covalent_radius table={table} atomic_number={z} state={listed}"),
                    "radius_A",
                    // SAFETY: as above.
                    |value, u| unsafe { elements::bmom_covalent_radius(table, z, listed, value, u) },
                );
            }
            type LookUp = unsafe extern "C" fn(i32, i32, *mut f64, *mut f64) -> i32;
            let look_ups: [(&str, &str, &str, &str, LookUp); 4] = [
                ("vdw_radius", "table", "vdw_radii", "radius_A", elements::bmom_vdw_radius),
                (
                    "electronegativity",
                    "scale",
                    "electronegativity",
                    "electronegativity",
                    elements::bmom_electronegativity,
                ),
                ("atomic_weight", "table", "masses", "atomic_weight_u", elements::bmom_atomic_weight),
                ("polarizability", "table", "polarizability", "polarizability_A3", elements::bmom_polarizability),
            ];
            for (name, argument, kind, result, call) in look_ups {
                for table in group(kind) {
                    let given = format!("{name} {argument}={table} atomic_number={z}");
                    // SAFETY: as above.
                    self.quantity(&given, result, |value, u| unsafe { call(table, z, value, u) });
                }
            }
        }
        for state in group("state") {
            for z in [6, 25, 26, 27] {
                let table = s::RADII_CORDERO_2008.0;
                let given = format!("covalent_radius table={table} atomic_number={z} state={state}");
                // SAFETY: as above.
                self.quantity(&given, "radius_A", |value, u| unsafe {
                    elements::bmom_covalent_radius(table, z, state, value, u)
                });
            }
        }
        for (shell, charge) in [(1, 1), (2, 1), (3, 7), (1000, 92), (0, 1)] {
            let given = format!("bohr_radius shell={shell} nuclear_charge={charge}");
            // SAFETY: as above.
            self.quantity(&given, "radius_A", |value, u| unsafe {
                elements::bmom_bohr_radius(shell, charge, value, u)
            });
        }
        for from in group("unit") {
            for to in group("unit") {
                let (mut value, mut u) = (0.0, 0.0);
                // SAFETY: as above.
                let status = unsafe { elements::bmom_convert(from, to, 321.987, 0.123, &raw mut value, &raw mut u) };
                if status == 0 {
                    let given = format!(
                        "convert from_unit={from} to_unit={to} value={} u_value={}",
                        bits(321.987),
                        bits(0.123)
                    );
                    self.line(&given, 0, &format!("converted={} u_converted={}", bits(value), bits(u)));
                }
            }
        }
    }

    fn bonds(&mut self) {
        let listed = s::STATE_AS_LISTED.0;
        let scale = s::ELECTRONEGATIVITY_PAULING.0;
        for law in group("length_law") {
            for radii in group("radii") {
                for (a, b) in [(1, 6), (6, 6), (6, 7), (6, 8), (6, 17), (14, 9), (26, 26)] {
                    for order in [0.5, 1.0, 1.5, 2.0, 3.0] {
                        let (mut value, mut u) = (0.0, 0.0);
                        // SAFETY: as above.
                        let status = unsafe {
                            bonds::bmom_bond_length(
                                radii,
                                law,
                                scale,
                                a,
                                listed,
                                b,
                                listed,
                                order,
                                &raw mut value,
                                &raw mut u,
                            )
                        };
                        if status == 0 {
                            let given = format!(
                                "bond_length radii={radii} law={law} scale={scale} atomic_number_a={a} state_a={listed} \
                                 atomic_number_b={b} state_b={listed} bond_order={}",
                                bits(order)
                            );
                            self.line(&given, 0, &format!("length_A={} u_length_A={}", bits(value), bits(u)));
                        }
                    }
                }
            }
        }
        for scale in group("electronegativity") {
            for (a, b) in [(1, 9), (9, 1), (6, 6), (6, 1), (11, 17), (8, 26), (6, 16), (2, 1)] {
                let (mut value, mut u, mut end, mut class) = (0.0, 0.0, 0, 0);
                // SAFETY: as above.
                let status = unsafe {
                    bonds::bmom_bond_polarity(
                        scale,
                        0.4,
                        1.7,
                        a,
                        b,
                        &raw mut value,
                        &raw mut u,
                        &raw mut end,
                        &raw mut class,
                    )
                };
                let given = format!(
                    "bond_polarity scale={scale} polar_from={} ionic_from={} atomic_number_a={a} atomic_number_b={b}",
                    bits(0.4),
                    bits(1.7)
                );
                let (value, u) = (bits(value), bits(u));
                let results = format!("delta_chi={value} u_delta_chi={u} negative_end={end} bond_class={class}");
                self.line(&given, status, &results);
            }
        }
        for law in group("ionic_law") {
            for &delta in NUMBERS {
                let given = format!("ionic_character law={law} delta_chi={} u_delta_chi={}", bits(delta), bits(0.05));
                // SAFETY: as above.
                self.quantity(&given, "ionic_percent", |value, u| unsafe {
                    bonds::bmom_ionic_character(law, delta, 0.05, value, u)
                });
            }
        }
    }

    fn diatomics(&mut self) {
        type Law = unsafe extern "C" fn(f64, f64, f64, f64, *mut f64, *mut f64) -> i32;
        let laws: [(&str, &str, &str, &str, Law); 3] = [
            ("charge_from_dipole", "dipole_D", "length_A", "charge_e", charges::bmom_charge_from_dipole),
            ("dipole_from_charge", "charge_e", "length_A", "dipole_D", charges::bmom_dipole_from_charge),
            ("length_from_dipole", "dipole_D", "charge_e", "length_A", charges::bmom_length_from_dipole),
        ];
        for (name, first, second, result, call) in laws {
            for &x in NUMBERS {
                for y in [0.0, 0.137, 1.27455] {
                    let (x_bits, y_bits) = (bits(x), bits(y));
                    let (u, v) = (bits(0.01), bits(0.002));
                    let given = format!("{name} {first}={x_bits} u_{first}={u} {second}={y_bits} u_{second}={v}");
                    // SAFETY: as above.
                    self.quantity(&given, result, |value, u| unsafe { call(x, 0.01, y, 0.002, value, u) });
                }
            }
        }
    }
}

fn computed() -> String {
    let abi = about::bmom_abi_version();
    let mut sheet =
        Sheet(format!("bondmoment answers version={} data={DATA_VERSION} abi={abi}\n", env!("CARGO_PKG_VERSION")));
    sheet.elements();
    sheet.bonds();
    sheet.diatomics();
    MOLECULES.iter().for_each(|name| sheet.molecule(name));
    sheet.0
}

#[test]
fn answers_are_the_committed_ones() {
    let found = computed();
    if std::env::var("BMOM_UPDATE_ANSWERS").as_deref() == Ok("1") {
        std::fs::write(committed(), &found).expect("tests/published can be written");
        return;
    }
    let expected = std::fs::read_to_string(committed()).expect("tests/published/answers.txt");
    for (number, (found, expected)) in found.lines().zip(expected.lines()).enumerate() {
        assert!(
            found == expected,
            "answers.txt:{}: other bits than committed; if that is meant, BMOM_UPDATE_ANSWERS=1 cargo test --test answers\n\
             {found}\n{expected}",
            number + 1
        );
    }
    assert_eq!(found.lines().count(), expected.lines().count());
    // A sheet of failures would compare as well.
    let answered = expected.lines().filter(|line| line.contains("> status=0 ")).count();
    assert!(answered > 1000, "{answered} answers");
}

/// The system's mathematics library chooses other code on processors without these; ours may not.
#[test]
fn answers_do_not_depend_on_the_processor() {
    let test = std::env::current_exe().expect("the test knows its own path");
    let output = Command::new(test)
        .args(["--exact", "answers_are_the_committed_ones"])
        .env("GLIBC_TUNABLES", "glibc.cpu.hwcaps=-FMA,-FMA4,-AVX2")
        .env_remove("BMOM_UPDATE_ANSWERS")
        .output()
        .expect("the test can be run again");
    let text = String::from_utf8_lossy(&output.stdout);
    assert!(output.status.success() && text.contains("1 passed"), "{text}{}", String::from_utf8_lossy(&output.stderr));
}
