//! Bonds from coordinates, against structures whose bonds are known.

use bondmoment::bonds::find::{find_bonds, given_bonds};
use bondmoment::molecule::{Bond, Bonding, Molecule};
use bondmoment::selectors::{BONDS_ALTERNATING, BONDS_AROMATIC};
use bondmoment::status::{Code, remark};
use std::collections::BTreeMap;
use std::path::PathBuf;

/// Symbols of the elements that the structures here contain, by atomic number.
const SYMBOLS: &[(&str, i32)] = &[
    ("H", 1), ("He", 2), ("Li", 3), ("Be", 4), ("B", 5), ("C", 6), ("N", 7), ("O", 8), ("F", 9), ("Na", 11), ("Mg", 12),
    ("Al", 13), ("Si", 14), ("P", 15), ("S", 16), ("Cl", 17), ("Ar", 18), ("K", 19), ("Ti", 22), ("Mn", 25), ("Fe", 26), ("Ni", 28),
    ("Cu", 29), ("Zn", 30), ("Ga", 31), ("Ge", 32), ("As", 33), ("Se", 34), ("Br", 35), ("I", 53), ("Xe", 54),
];

#[derive(Clone, Debug, Default)]
struct Structure {
    z: Vec<i32>,
    xyz: Vec<[f64; 3]>,
    /// Atoms counted from 0, the lower first.
    bonds: BTreeMap<(u32, u32), f64>,
}

impl Structure {
    fn molecule(&self) -> Molecule<'_> {
        Molecule { atomic_number: &self.z, formal_charge: None, xyz: &self.xyz }
    }

    fn pairs(&self) -> Vec<(u32, u32)> {
        self.bonds.keys().copied().collect()
    }
}

fn folder(name: &str) -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("tests").join(name)
}

fn atomic_number(symbol: &str) -> i32 {
    SYMBOLS.iter().find(|entry| entry.0 == symbol).map(|entry| entry.1).unwrap_or_else(|| panic!("{symbol}"))
}

fn atom(line: &str) -> (i32, [f64; 3]) {
    let mut words = line.split_whitespace();
    let z = atomic_number(words.next().unwrap());
    let mut number = || words.next().unwrap().parse().unwrap();
    (z, [number(), number(), number()])
}

/// The open set in the order of its table.
fn open_set() -> Vec<(String, Structure)> {
    let folder = folder("open_set");
    let table = std::fs::read_to_string(folder.join("open.csv")).unwrap();
    let mut set = Vec::new();
    for stem in table.lines().skip(1).filter_map(|line| line.split(',').next()) {
        let mut one = Structure::default();
        let xyz = std::fs::read_to_string(folder.join(format!("molecules/{stem}.xyz"))).unwrap();
        for line in xyz.lines().skip(2).filter(|line| !line.trim().is_empty()) {
            let (z, point) = atom(line);
            one.z.push(z);
            one.xyz.push(point);
        }
        let bonds = std::fs::read_to_string(folder.join(format!("molecules/{stem}.bonds.csv"))).unwrap();
        for line in bonds.lines().skip(1) {
            let mut cells = line.split(',').map(|cell| cell.trim().parse::<f64>().unwrap());
            let (i, j) = (cells.next().unwrap() as u32 - 1, cells.next().unwrap() as u32 - 1);
            one.bonds.insert((i.min(j), i.max(j)), cells.next().unwrap());
        }
        set.push((stem.to_string(), one));
    }
    set
}

fn pairs(bonding: &Bonding) -> Vec<(u32, u32)> {
    bonding.bonds.iter().map(|bond| (bond.a, bond.b)).collect()
}

fn found(one: &Structure) -> Bonding {
    find_bonds(one.molecule(), BONDS_ALTERNATING).unwrap()
}

/// Bonds whose order differs, unless the two assignments are alternating structures of one another: equal sums of orders
/// at every atom, and differences on aromatic bonds only; or an atom has exchanged the orders of its bonds to two
/// terminal atoms of one element (nitro group).
fn differing(one: &Structure, bonding: &Bonding) -> Vec<(u32, u32, f64, f64)> {
    let mut sums = vec![0.0; one.z.len()];
    let mut differing = Vec::new();
    let mut only_aromatic = true;
    for (bond, &aromatic) in bonding.bonds.iter().zip(&bonding.aromatic) {
        let stated = one.bonds[&(bond.a, bond.b)];
        for atom in [bond.a, bond.b] {
            sums[atom as usize] += bond.order - stated;
        }
        if bond.order != stated {
            differing.push((bond.a, bond.b, stated, bond.order));
            only_aromatic &= aromatic;
        }
    }
    if let [(a, b, one_stated, one_ours), (c, d, other_stated, other_ours)] = *differing {
        let middle = if a == c || a == d { a } else { b };
        let (end, other) = (a + b - middle, (c + d).wrapping_sub(middle));
        let terminal = |atom: u32| bonding.bonds.iter().filter(|bond| bond.a == atom || bond.b == atom).count() == 1;
        let same = one.z[end as usize] == one.z.get(other as usize).copied().unwrap_or(0);
        if same && terminal(end) && terminal(other) && (one_stated, one_ours) == (other_ours, other_stated) {
            return Vec::new();
        }
    }
    if only_aromatic && sums.iter().all(|&sum| sum == 0.0) { Vec::new() } else { differing }
}

#[test]
fn open_set_connectivity_is_right() {
    let set = open_set();
    assert_eq!(set.len(), 158);
    let wrong: Vec<String> = set
        .iter()
        .filter(|(_, one)| pairs(&found(one)) != one.pairs())
        .map(|(stem, one)| format!("{stem}: {:?} instead of {:?}", pairs(&found(one)), one.pairs()))
        .collect();
    assert!(wrong.is_empty(), "{wrong:#?}");
}

#[test]
fn open_set_orders_differ_only_where_listed() {
    let mut lines = Vec::new();
    for (stem, one) in open_set() {
        for (a, b, stated, ours) in differing(&one, &found(&one)) {
            lines.push(format!("{stem},{}-{},{stated},{ours}", a + 1, b + 1));
        }
    }
    let listed = std::fs::read_to_string(folder("open_set").join("order_differences.csv")).unwrap();
    let listed: Vec<&str> =
        listed.lines().skip(1).map(|line| line.rsplit_once(',').map_or(line, |(cells, _)| cells)).collect();
    assert_eq!(lines, listed);
}

/// All molecules of the open set are closed-shell and need no remark about valence.
#[test]
fn open_set_valences_are_possible() {
    for (stem, one) in open_set() {
        let bonding = found(&one);
        assert_eq!(bonding.remarks & remark::IMPOSSIBLE_VALENCE, 0, "{stem}");
        assert_eq!(bonding.remarks & remark::OPEN_SHELL, 0, "{stem}");
        assert_eq!(bonding.formal_charge.iter().sum::<i32>(), 0, "{stem}");
    }
}

/// Numbers between 0 and 1 by SplitMix64 (Steele, Lea and Flood, Proc. OOPSLA 2014, 453; from memory), upper 53 bits.
struct Numbers(u64);

impl Numbers {
    fn next(&mut self) -> f64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mixed = (self.0 ^ (self.0 >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        let mixed = (mixed ^ (mixed >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        ((mixed ^ (mixed >> 31)) >> 11) as f64 / (1_u64 << 53) as f64
    }

    /// Normal with standard deviation 1 (sum of twelve uniform numbers less 6).
    fn normal(&mut self) -> f64 {
        (0..12).map(|_| self.next()).sum::<f64>() - 6.0
    }
}

/// Gaussian noise of 0.05 Å on every coordinate, seeds 1 to 20: at least 99 % of the structures keep all their bonds.
#[test]
fn connectivity_survives_noise() {
    let (mut right, mut all) = (0, 0);
    let mut wrong: BTreeMap<String, usize> = BTreeMap::new();
    for (stem, one) in open_set() {
        for seed in 1..=20 {
            let mut numbers = Numbers(seed);
            let mut noisy = one.clone();
            for x in noisy.xyz.iter_mut().flatten() {
                *x += 0.05 * numbers.normal();
            }
            all += 1;
            if find_bonds(noisy.molecule(), BONDS_ALTERNATING).is_ok_and(|bonding| pairs(&bonding) == one.pairs()) {
                right += 1;
            } else {
                *wrong.entry(stem.clone()).or_default() += 1;
            }
        }
    }
    println!("{right} of {all} right; wrong: {wrong:?}");
    assert!(right * 100 >= all * 99, "{right} of {all}; {wrong:?}");
}

/// Renumbering the atoms renumbers the bonds: same pairs, same charges by element, same sums of orders, same rings.
#[test]
fn atom_order_does_not_matter() {
    let mut numbers = Numbers(5);
    for (stem, one) in open_set() {
        let n = one.z.len();
        let mut place: Vec<usize> = (0..n).collect();
        for i in (1..n).rev() {
            place.swap(i, (numbers.next() * (i as f64 + 1.0)) as usize);
        }
        let shuffled = Structure {
            z: place.iter().map(|&i| one.z[i]).collect(),
            xyz: place.iter().map(|&i| one.xyz[i]).collect(),
            bonds: BTreeMap::new(),
        };
        let (before, after) = (found(&one), found(&shuffled));
        let mut back: Vec<(u32, u32, bool)> = after
            .bonds
            .iter()
            .zip(&after.aromatic)
            .map(|(bond, &aromatic)| {
                let (a, b) = (place[bond.a as usize] as u32, place[bond.b as usize] as u32);
                (a.min(b), a.max(b), aromatic)
            })
            .collect();
        back.sort_unstable();
        let expected: Vec<(u32, u32, bool)> =
            before.bonds.iter().zip(&before.aromatic).map(|(bond, &aromatic)| (bond.a, bond.b, aromatic)).collect();
        assert_eq!(back, expected, "{stem}");
        let sum = |bonding: &Bonding| bonding.bonds.iter().map(|bond| bond.order).sum::<f64>();
        assert_eq!(sum(&before), sum(&after), "{stem}");
        let sorted = |bonding: &Bonding, z: &[i32]| {
            let mut charges: Vec<(i32, i32)> = z.iter().copied().zip(bonding.formal_charge.iter().copied()).collect();
            charges.sort_unstable();
            charges
        };
        assert_eq!(sorted(&before, &one.z), sorted(&after, &shuffled.z), "{stem}");
    }
}

/// Stated bonds come back unchanged and with the same charges as found ones.
#[test]
fn stated_bonds_are_kept() {
    for (stem, one) in open_set() {
        let found = found(&one);
        let mut stated: Vec<Bond> = found.bonds.iter().map(|bond| Bond { a: bond.b, b: bond.a, ..*bond }).collect();
        stated.reverse();
        let given = given_bonds(one.molecule(), &stated).unwrap();
        assert_eq!(given.bonds, found.bonds, "{stem}");
        assert_eq!(given.formal_charge, found.formal_charge, "{stem}");
        assert_eq!(given.aromatic, found.aromatic, "{stem}");
    }
}

/// Order 1.5 in, alternating orders out, with the same sums at every atom as found from the coordinates.
#[test]
fn stated_aromatic_bonds_alternate() {
    let mut checked = 0;
    for (stem, one) in open_set() {
        let aromatic = find_bonds(one.molecule(), BONDS_AROMATIC).unwrap();
        if !aromatic.bonds.iter().any(|bond| bond.order == 1.5) {
            continue;
        }
        checked += 1;
        let given = given_bonds(one.molecule(), &aromatic.bonds).unwrap();
        assert!(given.bonds.iter().all(|bond| bond.order != 1.5), "{stem}");
        assert_eq!(given.aromatic, aromatic.aromatic, "{stem}");
        let sums = |bonding: &Bonding| {
            let mut sums = vec![0.0; one.z.len()];
            for bond in &bonding.bonds {
                sums[bond.a as usize] += bond.order;
                sums[bond.b as usize] += bond.order;
            }
            sums
        };
        assert_eq!(sums(&given), sums(&found(&one)), "{stem}");
    }
    assert!(checked > 20, "{checked}");
}

#[test]
fn wrong_bonds_are_refused() {
    let xyz = [[0.0; 3], [0.0, 0.0, 1.0], [0.0, 1.0, 0.0]];
    let water = Molecule { atomic_number: &[8, 1, 1], formal_charge: None, xyz: &xyz };
    let bond = |a, b, order| Bond { a, b, order };
    let failure = |bonds: &[Bond]| given_bonds(water, bonds).map_err(|failure| (failure.code, failure.item));
    assert_eq!(failure(&[bond(0, 1, 1.0), bond(0, 3, 1.0)]).unwrap_err(), (Code::BadBond, 1));
    assert_eq!(failure(&[bond(1, 1, 1.0)]).unwrap_err(), (Code::BadBond, 0));
    assert_eq!(failure(&[bond(0, 1, 1.0), bond(0, 2, 1.0), bond(1, 0, 2.0)]).unwrap_err(), (Code::BadBond, 2));
    assert_eq!(failure(&[bond(0, 1, 4.0)]).unwrap_err(), (Code::OutOfRange, 0));
    assert_eq!(failure(&[bond(0, 1, f64::NAN)]).unwrap_err(), (Code::Missing, 0));
    assert!(failure(&[]).is_ok());
}

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
