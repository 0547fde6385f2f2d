//! Hard cases: text files with the bonds, charges and remarks that must come out.

use crate::structures::{Structure, atom, folder, found, pairs};
use bondmoment::molecule::Bonding;
use bondmoment::status::remark;
use std::collections::BTreeMap;
use std::path::PathBuf;

/// A hard case: the structure, and what is expected of it line by line.
struct HardCase {
    name: String,
    structure: Structure,
    /// Allowed orders of each bond.
    orders: BTreeMap<(u32, u32), Vec<f64>>,
    charges: Vec<(usize, i32)>,
    sums: Vec<(usize, f64)>,
    remarks: Vec<String>,
}

fn hard_cases() -> Vec<HardCase> {
    let mut files: Vec<PathBuf> =
        std::fs::read_dir(folder("hard_cases")).unwrap().map(|entry| entry.unwrap().path()).collect();
    files.retain(|file| file.extension().is_some_and(|extension| extension == "txt"));
    files.sort();
    files.iter().map(|file| hard_case(&std::fs::read_to_string(file).unwrap())).collect()
}

fn hard_case(text: &str) -> HardCase {
    let mut case = HardCase {
        name: String::new(),
        structure: Structure::default(),
        orders: BTreeMap::new(),
        charges: Vec::new(),
        sums: Vec::new(),
        remarks: Vec::new(),
    };
    let mut section = "";
    for line in text.lines().map(str::trim).filter(|line| !line.is_empty()) {
        let words: Vec<&str> = line.split_whitespace().collect();
        let index = |k: usize| words[k].parse::<usize>().unwrap() - 1;
        match (section, words.as_slice()) {
            (_, ["name:", ..]) => case.name = line.replace("name: ", ""),
            (_, ["reason:" | "geometry:", ..]) => {}
            (_, [name @ ("atoms" | "bonds" | "charges" | "sums" | "remarks")]) => {
                section = ["atoms", "bonds", "charges", "sums", "remarks"].into_iter().find(|one| one == name).unwrap();
            }
            ("atoms", _) => {
                let (z, point) = atom(line);
                case.structure.z.push(z);
                case.structure.xyz.push(point);
            }
            ("bonds", _) => {
                let (a, b) = (index(0) as u32, index(1) as u32);
                let orders = words[2].split('|').map(|order| order.parse().unwrap()).collect();
                case.orders.insert((a.min(b), a.max(b)), orders);
            }
            ("charges", _) => case.charges.push((index(0), words[1].parse().unwrap())),
            ("sums", _) => case.sums.push((index(0), words[1].parse().unwrap())),
            ("remarks", _) => case.remarks.push(line.to_string()),
            _ => panic!("{line}"),
        }
    }
    case
}

/// What is wrong with the bonds of a hard case.
fn complaints(case: &HardCase, bonding: &Bonding) -> Vec<String> {
    let mut wrong = Vec::new();
    let mut say = |what: String| wrong.push(format!("{}: {what}", case.name));
    if pairs(bonding) != case.orders.keys().copied().collect::<Vec<_>>() {
        say(format!("bonds {:?}", pairs(bonding)));
        return wrong;
    }
    for bond in &bonding.bonds {
        if !case.orders[&(bond.a, bond.b)].contains(&bond.order) {
            say(format!("order {} of {}-{}", bond.order, bond.a + 1, bond.b + 1));
        }
    }
    for &(atom, charge) in &case.charges {
        if bonding.formal_charge[atom] != charge {
            say(format!("charge {} at {}", bonding.formal_charge[atom], atom + 1));
        }
    }
    for &(atom, expected) in &case.sums {
        let own = bonding.bonds.iter().filter(|bond| bond.a as usize == atom || bond.b as usize == atom);
        let sum: f64 = own.map(|bond| bond.order).sum();
        if sum != expected {
            say(format!("orders {sum} about {}", atom + 1));
        }
    }
    let (mut net, mut aromatic) = (case.charges.iter().map(|entry| entry.1).sum::<i32>(), None);
    let mut bits = 0;
    for line in &case.remarks {
        match line.split_once(' ') {
            Some(("net", number)) => net = number.parse().unwrap(),
            Some((_, number)) => aromatic = Some(number.parse::<usize>().unwrap()),
            None => bits |= remark::ALL.iter().find(|entry| entry.1 == line).unwrap().0,
        }
    }
    let watched = remark::OPEN_SHELL | remark::IMPOSSIBLE_VALENCE | remark::ORDERS_NOT_ASSIGNED;
    if bonding.remarks & watched != bits & watched {
        say(format!("remarks {:b}", bonding.remarks));
    }
    if bonding.formal_charge.iter().sum::<i32>() != net {
        say(format!("charges {:?}", bonding.formal_charge));
    }
    if aromatic.is_some_and(|number| bonding.aromatic.iter().filter(|&&flag| flag).count() != number) {
        say(format!("aromatic {:?}", bonding.aromatic));
    }
    wrong
}

#[test]
fn hard_cases_come_out_as_stated() {
    let cases = hard_cases();
    assert!(cases.len() >= 15, "{}", cases.len());
    let wrong: Vec<String> = cases.iter().flat_map(|case| complaints(case, &found(&case.structure))).collect();
    assert!(wrong.is_empty(), "{wrong:#?}");
}
