//! The same bits everywhere: tests/published/answers.txt holds the answers of all plain functions of the C ABI, of a few
//! hundred inputs and of molecules, as hexadecimal bits. Every host's tests can read it; here it is computed anew.
//!
//! A line is a function, its arguments, `>`, and what it gives: `status`, and results where that is 0. Numbers are the 16
//! hexadecimal digits of their bits, integers and selectors decimal, texts as they are, arrays separated by commas. A line
//! `molecule` names arrays that later lines refer to. The first line holds the versions. After an intended change of a
//! number: `BMOM_UPDATE_ANSWERS=1 cargo test --test answers`.
#![allow(unsafe_code)]

use std::fmt::Display;
use std::path::{Path, PathBuf};
use std::process::Command;
use std::ptr::{null, null_mut};

use bondmoment::c_api::{about, bonds, charges, elements, library, moments};
use bondmoment::catalogue::DATA_VERSION;
use bondmoment::selectors as s;

const ELEMENTS: &[i32] = &[
    1, 2, 3, 4, 5, 6, 7, 8, 9, 11, 12, 13, 14, 15, 16, 17, 18, 20, 22, 25, 26, 29, 30, 34, 35, 47, 50, 53, 55, 78, 80, 82,
    92, 96, 104, 118, 119, i32::MIN,
];
const MOLECULES: &[&str] = &[
    "water", "methane", "fluoromethane", "trichloromethane", "formaldehyde", "acetonitrile", "nitromethane", "benzene",
    "acetate_ion", "ammonium_ion", "imidazolium_ion", "acetic_acid", "gauche-1_2-dichloroethane", "sulfur_hexafluoride",
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

fn all<T: Display>(values: &[T]) -> String {
    values.iter().map(T::to_string).collect::<Vec<_>>().join(",")
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
                ("electronegativity", "scale", "electronegativity", "electronegativity", elements::bmom_electronegativity),
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
            self.quantity(&given, "radius_A", |value, u| unsafe { elements::bmom_bohr_radius(shell, charge, value, u) });
        }
        for from in group("unit") {
            for to in group("unit") {
                let (mut value, mut u) = (0.0, 0.0);
                // SAFETY: as above.
                let status =
                    unsafe { elements::bmom_convert(from, to, 321.987, 0.123, &raw mut value, &raw mut u) };
                if status == 0 {
                    let given =
                        format!("convert from_unit={from} to_unit={to} value={} u_value={}", bits(321.987), bits(0.123));
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
                                radii, law, scale, a, listed, b, listed, order, &raw mut value, &raw mut u,
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
                        scale, 0.4, 1.7, a, b, &raw mut value, &raw mut u, &raw mut end, &raw mut class,
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

    fn molecule(&mut self, name: &str) {
        let m = Molecule::read(name);
        let n = m.z.len();
        let n_atoms = n as i64;
        self.0.push_str(&format!(
            "molecule name={name} atomic_number={} formal_charge={} xyz_A={} bond_atoms={} bond_order={}\n",
            all(&m.z),
            all(&m.formal),
            all_bits(&m.xyz),
            all(&m.pairs),
            all_bits(&m.order)
        ));
        for rule in group("bond_rule") {
            let room = 4 * n;
            let (mut pairs, mut order, mut length) = (vec![0; 2 * room], vec![0.0; room], vec![0.0; room]);
            let mut formal = vec![0; n];
            let (mut needed, mut remarks, mut item) = (0_i64, 0, 0);
            // SAFETY: as above.
            let status = unsafe {
                bonds::bmom_find_bonds(
                    rule, n_atoms, m.z.as_ptr(), null(), m.xyz.as_ptr(), pairs.as_mut_ptr(), order.as_mut_ptr(),
                    length.as_mut_ptr(), formal.as_mut_ptr(), room as i64, &raw mut needed, &raw mut remarks,
                    &raw mut item,
                )
            };
            let found = needed as usize;
            let results = format!(
                "found_atoms={} found_order={} found_length_A={} found_formal_charge={} remarks={remarks} item={item}",
                all(&pairs[..2 * found]),
                all_bits(&order[..found]),
                all_bits(&length[..found]),
                all(&formal)
            );
            self.line(&format!("find_bonds rule={rule} molecule={name}"), status, &results);
        }
        let model = s::CHARGES_PEOE_1980.0;
        let (mut charge, mut u) = (vec![0.0; n], vec![0.0; n]);
        let (mut remarks, mut item) = (0, 0);
        // SAFETY: as above.
        let status = unsafe {
            charges::bmom_partial_charges(
                model, n_atoms, m.z.as_ptr(), m.formal.as_ptr(), m.xyz.as_ptr(), m.order.len() as i64,
                m.pairs.as_ptr(), m.order.as_ptr(), charge.as_mut_ptr(), u.as_mut_ptr(), &raw mut remarks,
                &raw mut item,
            )
        };
        let results = format!("charge_e={} u_charge_e={} remarks={remarks}", all_bits(&charge), all_bits(&u));
        self.line(&format!("partial_charges model={model} molecule={name}"), status, &results);
        self.dipole(name, &m, model, None);
        if status == 0 {
            // The model's charges as the caller's own, with an invented uncertainty.
            self.dipole(name, &m, s::CHARGES_GIVEN.0, Some((&charge, &vec![0.012; n])));
            self.dipole_of_charges(&m, &charge);
        }
    }

    fn dipole(&mut self, name: &str, m: &Molecule, model: i32, given: Option<(&[f64], &[f64])>) {
        let frame = s::FRAME_AS_GIVEN.0;
        let (mut vector, mut covariance, mut origin) = ([0.0; 3], [0.0; 9], [0.0; 3]);
        let (mut value, mut u, mut remarks, mut item) = (0.0, 0.0, 0, 0);
        let (charge, u_charge) = given.map_or((null(), null()), |(charge, u)| (charge.as_ptr(), u.as_ptr()));
        // SAFETY: as above.
        let status = unsafe {
            moments::bmom_dipole(
                model, frame, m.z.len() as i64, m.z.as_ptr(), m.formal.as_ptr(), m.xyz.as_ptr(), m.order.len() as i64,
                m.pairs.as_ptr(), m.order.as_ptr(), charge, u_charge, vector.as_mut_ptr(), covariance.as_mut_ptr(),
                &raw mut value, &raw mut u, origin.as_mut_ptr(), &raw mut remarks, &raw mut item,
            )
        };
        let with = given.map_or(String::new(), |(charge, u)| {
            format!(" charge_e={} u_charge_e={}", all_bits(charge), all_bits(u))
        });
        let results = format!(
            "dipole_D={} covariance_D2={} magnitude_D={} u_magnitude_D={} origin_A={} remarks={remarks}",
            all_bits(&vector),
            all_bits(&covariance),
            bits(value),
            bits(u),
            all_bits(&origin)
        );
        self.line(&format!("dipole model={model} frame={frame} molecule={name}{with}"), status, &results);
        if status == 0 && given.is_some() {
            let (limit, mut polarity) = (0.2, 0);
            // SAFETY: as above.
            let status = unsafe {
                moments::bmom_dipole_polarity(limit, vector.as_ptr(), covariance.as_ptr(), &raw mut polarity)
            };
            let (vector, covariance) = (all_bits(&vector), all_bits(&covariance));
            let given = format!("dipole_polarity limit_D={} dipole_D={vector} covariance_D2={covariance}", bits(limit));
            self.line(&given, status, &format!("polarity={polarity}"));
        }
    }

    fn dipole_of_charges(&mut self, m: &Molecule, charge: &[f64]) {
        let (u_charge, u_xyz) = (vec![0.012; charge.len()], vec![0.003; charge.len()]);
        let (mut vector, mut covariance, mut value, mut u) = ([0.0; 3], [0.0; 9], 0.0, 0.0);
        // SAFETY: as above.
        let status = unsafe {
            moments::bmom_dipole_of_charges(
                charge.len() as i64, charge.as_ptr(), u_charge.as_ptr(), m.xyz.as_ptr(), u_xyz.as_ptr(),
                vector.as_mut_ptr(), covariance.as_mut_ptr(), &raw mut value, &raw mut u,
            )
        };
        let given = format!(
            "dipole_of_charges charge_e={} u_charge_e={} xyz_A={} u_xyz_A={}",
            all_bits(charge),
            all_bits(&u_charge),
            all_bits(&m.xyz),
            all_bits(&u_xyz)
        );
        let results = format!(
            "dipole_D={} covariance_D2={} magnitude_D={} u_magnitude_D={}",
            all_bits(&vector),
            all_bits(&covariance),
            bits(value),
            bits(u)
        );
        self.line(&given, status, &results);
    }
}

/// A molecule of tests/published/molecules as arrays.
struct Molecule {
    z: Vec<i32>,
    formal: Vec<i32>,
    xyz: Vec<f64>,
    pairs: Vec<i32>,
    order: Vec<f64>,
}

impl Molecule {
    fn read(name: &str) -> Self {
        let path = format!("{}/tests/published/molecules/{name}.mol", env!("CARGO_MANIFEST_DIR"));
        let mut handle = null_mut();
        let (mut molecules, mut atoms, mut bonds) = (0, 0, 0);
        // SAFETY: as above; the library is freed once, after its last use.
        unsafe {
            let format = s::FORMAT_CTFILE.0;
            let status = library::bmom_library_read(
                format, null(), 1, null(), path.as_ptr().cast(), path.len() as i64, &raw mut handle,
            );
            assert_eq!(status, 0, "{path}");
            library::bmom_library_size(handle, &raw mut molecules, &raw mut atoms, &raw mut bonds);
            let (atoms, bonds) = (atoms as usize, bonds as usize);
            let mut molecule = Self {
                z: vec![0; atoms],
                formal: vec![0; atoms],
                xyz: vec![0.0; 3 * atoms],
                pairs: vec![0; 2 * bonds],
                order: vec![0.0; bonds],
            };
            let status = library::bmom_library_arrays(
                handle, null_mut(), molecule.z.as_mut_ptr(), molecule.formal.as_mut_ptr(), molecule.xyz.as_mut_ptr(),
                null_mut(), molecule.pairs.as_mut_ptr(), molecule.order.as_mut_ptr(), null_mut(),
            );
            library::bmom_library_free(handle);
            assert_eq!((molecules, status), (1, 0), "{path}");
            molecule
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
    assert!(answered > 1500, "{answered} answers");
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
