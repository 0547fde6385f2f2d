//! Atom types of PEOE and the charges that its sweeps start from.

use crate::bonds::find::Rings;
use crate::molecule::{Bond, Bonding, Molecule, Neighbours};
use crate::status::{Code, Failure};

macro_rules! atom_types {
    ($($(#[doc = $doc:literal])* $kind:ident = $name:literal;)*) => {
        /// The atom types: element and hybridization, told by the bond orders alone.
        ///
        /// Conventions, where the paper's σ scheme leaves them open:
        /// - A triple bond or two double bonds make an atom digonal, one double bond makes it trigonal, single bonds
        ///   alone tetragonal; a trivalent carbocation is trigonal. Aromatic rings count with their alternating double
        ///   bonds. So the nitrogen of amides, anilines and pyrroles, the oxygen of furans and esters (the one with two
        ///   single bonds) and ammonium nitrogen are tetragonal, nitro nitrogen and pyridine nitrogen are trigonal,
        ///   thiophene sulfur is the one type of sulfur.
        /// - Resonance-equivalent atoms share their formal charge and the type of the one with the double bond: N or O
        ///   (or C-bound S) on one centre, of which one has a double bond to the centre, where the others carry −1
        ///   (carboxylate, nitro, nitrate, carbonate: −1/2 or −2/3 each) or where the one with the double bond
        ///   carries +1 and the others have a lone pair (amidinium, guanidinium, imidazolium about its C2); or, in a
        ///   molecule with an odd number of electrons, terminal O on one centre without charges (nitrogen dioxide).
        /// - The charge of an ion in a ring that is unsaturated throughout is shared over the ring atoms of its element with as
        ///   many neighbours, all trigonal (cyclopentadienide −1/5, tropylium +1/7, imidazolide −1/2 each).
        /// - Neutral nitrogen with five bonds (nitro, N-oxide, azide, diazo) counts as written with charges: one bond to a
        ///   terminal atom less, + on the nitrogen, − there.
        /// - Opposite formal charges on bonded atoms (nitro, N-oxide, azide, isocyanide, carbon monoxide) are a way of
        ///   writing the bond and cancel before the first sweep: the σ scheme starts neutral groups from zero. What
        ///   remains, as the −1/3 of each nitrate oxygen, is the net charge of the group.
        #[derive(Clone, Copy, Debug, PartialEq, Eq)]
        pub enum AtomType { $($(#[doc = $doc])* $kind,)* }

        impl AtomType {
            /// All types.
            pub const ALL: &'static [AtomType] = &[$(AtomType::$kind,)*];

            /// The name in the table.
            pub const fn name(self) -> &'static str {
                match self { $(AtomType::$kind => $name,)* }
            }
        }
    };
}

atom_types! {
    /// Hydrogen.
    H = "H";
    /// Carbon, sp3.
    Cte = "Cte";
    /// Carbon, sp2.
    Ctr = "Ctr";
    /// Carbon, sp.
    Cdi = "Cdi";
    /// Nitrogen, sp3.
    Nte = "Nte";
    /// Nitrogen, sp2.
    Ntr = "Ntr";
    /// Nitrogen, sp.
    Ndi = "Ndi";
    /// Oxygen, sp3.
    Ote = "Ote";
    /// Oxygen, sp2.
    Otr = "Otr";
    /// Fluorine.
    F = "F";
    /// Chlorine.
    Cl = "Cl";
    /// Bromine.
    Br = "Br";
    /// Iodine.
    I = "I";
    /// Sulfur with single bonds.
    S = "S";
}

/// Types and starting charges, one an atom.
pub(super) struct Start {
    pub(super) types: Vec<AtomType>,
    pub(super) charge: Vec<f64>,
}

/// The bonds of one atom, counted.
#[derive(Clone, Copy, Default)]
struct Around {
    single: u32,
    double: u32,
    triple: u32,
    other: u32,
}

pub(super) fn start(molecule: Molecule<'_>, bonding: &Bonding) -> Result<Start, Failure> {
    let atoms = molecule.len();
    let mut around = vec![Around::default(); atoms];
    if let Some(index) = bonding.bonds.iter().position(|bond| bond.a == bond.b || bond.a.max(bond.b) as usize >= atoms)
    {
        return Err(Failure::new(Code::BadBond).item(index));
    }
    let formal: Vec<i32> = if bonding.formal_charge.len() == atoms {
        bonding.formal_charge.clone()
    } else {
        molecule.formal_charge.map_or_else(|| vec![0; atoms], <[i32]>::to_vec)
    };
    let neighbours = Neighbours::new(atoms, &bonding.bonds);
    let (bonds, formal) = with_charges_apart(molecule, &bonding.bonds, &neighbours, formal);
    for (index, bond) in bonds.iter().enumerate() {
        for end in [bond.a, bond.b] {
            let own = around.get_mut(end as usize).ok_or(Failure::new(Code::BadBond).item(index))?;
            if bond.order == 1.0 {
                own.single += 1;
            } else if bond.order == 2.0 {
                own.double += 1;
            } else if bond.order == 3.0 {
                own.triple += 1;
            } else {
                own.other += 1;
            }
        }
    }
    let mut types = Vec::with_capacity(atoms);
    for (atom, ((&element, own), &charge)) in molecule.atomic_number.iter().zip(&around).zip(&formal).enumerate() {
        types.push(kind(element, *own, charge).ok_or(Failure::new(Code::NoData).item(atom))?);
    }
    let mut charge: Vec<f64> = formal.iter().map(|&q| f64::from(q)).collect();
    let scene = Scene { molecule, bonds: &bonds, neighbours: &neighbours, around: &around, formal: &formal };
    share(&scene, &mut types, &mut charge);
    share_in_rings(&scene, &bonding.aromatic, &mut types, &mut charge);
    cancel(&neighbours, &mut charge);
    Ok(Start { types, charge })
}

/// What the starting charges are told from.
struct Scene<'a> {
    molecule: Molecule<'a>,
    bonds: &'a [Bond],
    neighbours: &'a Neighbours,
    around: &'a [Around],
    formal: &'a [i32],
}

impl Scene<'_> {
    fn element(&self, atom: usize) -> i32 {
        self.molecule.atomic_number.get(atom).copied().unwrap_or(0)
    }

    fn order(&self, bond: u32) -> f64 {
        self.bonds.get(bond as usize).map_or(0.0, |bond| bond.order)
    }

    fn charge_of(&self, atom: u32) -> i32 {
        self.formal.get(atom as usize).copied().unwrap_or(0)
    }

    fn all_single(&self, atom: u32) -> bool {
        self.around.get(atom as usize).is_some_and(|own| own.double + own.triple == 0)
    }
}

/// Bonds and formal charges with neutral nitrogen of five bonds written as N+ beside an anion: of its terminal partners
/// by a multiple bond oxygen comes first, then the one of the highest order, then the lowest number.
fn with_charges_apart(
    molecule: Molecule<'_>,
    bonds: &[Bond],
    neighbours: &Neighbours,
    mut formal: Vec<i32>,
) -> (Vec<Bond>, Vec<i32>) {
    let mut bonds = bonds.to_vec();
    let element = |atom: usize| molecule.atomic_number.get(atom).copied().unwrap_or(0);
    for nitrogen in (0..molecule.len()).filter(|&atom| element(atom) == 7) {
        let own = neighbours.of(nitrogen);
        let order = |k: u32| bonds.get(k as usize).map_or(0.0, |bond| bond.order);
        if formal.get(nitrogen) != Some(&0) || own.iter().map(|&(_, k)| order(k)).sum::<f64>() != 5.0 {
            continue;
        }
        let terminal = own.iter().filter(|&&(other, k)| {
            let there = other as usize;
            neighbours.degree(there) == 1
                && matches!(element(there), 7 | 8)
                && formal.get(there) == Some(&0)
                && matches!(order(k), 2.0 | 3.0)
        });
        let least = terminal.min_by(|&&(a, k), &&(b, l)| {
            let oxygen = |atom: u32| element(atom as usize) == 8;
            oxygen(b).cmp(&oxygen(a)).then(order(l).total_cmp(&order(k))).then(a.cmp(&b))
        });
        let Some(&(other, k)) = least else { continue };
        if let Some(bond) = bonds.get_mut(k as usize) {
            bond.order -= 1.0;
        }
        for (atom, charge) in [(nitrogen, 1), (other as usize, -1)] {
            if let Some(slot) = formal.get_mut(atom) {
                *slot = charge;
            }
        }
    }
    (bonds, formal)
}

/// Shares the charge of ring ions (C+, C−, N−) over the like atoms of their ring.
fn share_in_rings(scene: &Scene<'_>, aromatic: &[bool], types: &mut [AtomType], charge: &mut [f64]) {
    let is_ion = |atom: usize| {
        let own = (scene.element(atom), scene.formal.get(atom).copied().unwrap_or(0));
        matches!(own, (6, 1 | -1) | (7, -1)) && scene.all_single(u32::try_from(atom).unwrap_or(u32::MAX))
    };
    if !(0..scene.molecule.len()).any(is_ion) {
        return;
    }
    let rings = Rings::of(scene.neighbours, scene.molecule.len(), scene.bonds);
    let mut shared = vec![false; scene.molecule.len()];
    for ring in &rings.small {
        // Every other atom has a double bond in the ring or along its aromatic system, or a lone pair.
        let takes_part = |&atom: &u32| {
            is_ion(atom as usize)
                || scene.neighbours.of(atom as usize).iter().any(|&(other, k)| {
                    scene.order(k) == 2.0 && (ring.contains(&other) || aromatic.get(k as usize) == Some(&true))
                })
                || (matches!(scene.element(atom as usize), 7 | 8 | 16) && scene.all_single(atom))
        };
        if !ring.iter().all(takes_part) {
            continue;
        }
        for &ion in ring.iter().filter(|&&atom| is_ion(atom as usize)) {
            let (element, degree) = (scene.element(ion as usize), scene.neighbours.degree(ion as usize));
            let alike: Vec<usize> = ring
                .iter()
                .map(|&atom| atom as usize)
                .filter(|&atom| scene.element(atom) == element && scene.neighbours.degree(atom) == degree)
                .filter(|&atom| shared.get(atom) == Some(&false))
                .collect();
            let total: f64 = alike.iter().filter_map(|&atom| charge.get(atom)).sum();
            let kind = if element == 6 { AtomType::Ctr } else { AtomType::Ntr };
            for &atom in alike.iter().filter(|_| alike.len() > 1) {
                if let (Some(own), Some(q), Some(taken)) =
                    (types.get_mut(atom), charge.get_mut(atom), shared.get_mut(atom))
                {
                    (*own, *q, *taken) = (kind, total / alike.len() as f64, true);
                }
            }
        }
    }
}

fn kind(element: i32, around: Around, charge: i32) -> Option<AtomType> {
    let Around { single, double, triple, other } = around;
    if other > 0 {
        return None;
    }
    let only_single = |most: u32| double + triple == 0 && single <= most;
    let by_hybridization = |te, tr, di| match (double, triple) {
        (0, 0) => te,
        (1, 0) => Some(tr),
        _ => di,
    };
    match element {
        1 if only_single(1) => Some(AtomType::H),
        6 if charge == 1 && only_single(3) => Some(AtomType::Ctr),
        6 => by_hybridization(Some(AtomType::Cte), AtomType::Ctr, Some(AtomType::Cdi)),
        7 => by_hybridization(Some(AtomType::Nte), AtomType::Ntr, Some(AtomType::Ndi)),
        // There is no digonal oxygen: carbon monoxide written with a triple bond takes the trigonal one.
        8 => by_hybridization(Some(AtomType::Ote), AtomType::Otr, Some(AtomType::Otr)),
        9 if only_single(1) => Some(AtomType::F),
        16 if only_single(2) => Some(AtomType::S),
        17 if only_single(1) => Some(AtomType::Cl),
        35 if only_single(1) => Some(AtomType::Br),
        53 if only_single(1) => Some(AtomType::I),
        _ => None,
    }
}

/// Shares delocalised formal charge over the resonance-equivalent neighbours of one centre.
fn share(scene: &Scene<'_>, types: &mut [AtomType], charge: &mut [f64]) {
    let Scene { molecule, neighbours, formal, .. } = *scene;
    let electrons: i64 = molecule.atomic_number.iter().zip(formal).map(|(&z, &q)| i64::from(z) - i64::from(q)).sum();
    let odd = electrons % 2 != 0;
    if formal.iter().all(|&q| q == 0) && !odd {
        return;
    }
    let order = |bond: u32| scene.order(bond);
    // An atom joins one group only: the first centre takes it.
    let mut shared = vec![false; molecule.len()];
    for centre in 0..molecule.len() {
        for element in [7, 8] {
            let alike = |&&(atom, _): &&(u32, u32)| {
                let at = atom as usize;
                molecule.atomic_number.get(at) == Some(&element) && shared.get(at) == Some(&false)
            };
            let of_element: Vec<(u32, u32)> = neighbours.of(centre).iter().filter(alike).copied().collect();
            let charge_of = |atom: u32| scene.charge_of(atom);
            let all_single = |atom: u32| scene.all_single(atom);
            let doubles = |wanted: i32| -> Vec<u32> {
                let fits = |&&(atom, bond): &&(u32, u32)| order(bond) == 2.0 && charge_of(atom) == wanted;
                of_element.iter().filter(fits).map(|&(atom, _)| atom).collect()
            };
            let singles = |wanted: i32| -> Vec<u32> {
                let fits =
                    |&&(atom, bond): &&(u32, u32)| order(bond) == 1.0 && charge_of(atom) == wanted && all_single(atom);
                of_element.iter().filter(fits).map(|&(atom, _)| atom).collect()
            };
            let (anion, cation) = ((doubles(0), singles(-1)), (doubles(1), singles(0)));
            let (mut double, mut single) = if anion.0.is_empty() || anion.1.is_empty() { cation } else { anion };
            if odd && element == 8 && (double.is_empty() || single.is_empty()) {
                // The radical's electron is shared, too.
                let terminal = |atom: &u32| neighbours.degree(*atom as usize) == 1;
                double = doubles(0).into_iter().filter(terminal).collect();
                single = singles(0).into_iter().filter(terminal).collect();
            }
            if double.is_empty() || single.is_empty() {
                continue;
            }
            let total: i32 = double.iter().chain(&single).map(|&atom| charge_of(atom)).sum();
            let each = f64::from(total) / (double.len() + single.len()) as f64;
            let like = double.first().and_then(|&atom| types.get(atom as usize)).copied();
            for &atom in double.iter().chain(&single) {
                let at = atom as usize;
                if let (Some(own), Some(q), Some(taken), Some(like)) =
                    (types.get_mut(at), charge.get_mut(at), shared.get_mut(at), like)
                {
                    (*own, *q, *taken) = (like, each, true);
                }
            }
        }
    }
}

/// Cancels opposite charges of bonded atoms: a positive atom against all its negative neighbours in proportion, so that
/// equivalent neighbours stay alike.
fn cancel(neighbours: &Neighbours, charge: &mut [f64]) {
    if charge.iter().all(|&q| q <= 0.0) {
        return;
    }
    for centre in 0..charge.len() {
        let own = charge.get(centre).copied().unwrap_or(0.0);
        if own <= 0.0 {
            continue;
        }
        let around = neighbours.of(centre);
        let negative = |charge: &[f64], atom: u32| charge.get(atom as usize).copied().unwrap_or(0.0).min(0.0);
        let against: f64 = around.iter().map(|&(atom, _)| negative(charge, atom)).sum();
        if against == 0.0 {
            continue;
        }
        let rest = (1.0 + own / against).max(0.0);
        for &(atom, _) in around {
            if let Some(q) = charge.get_mut(atom as usize).filter(|q| **q < 0.0) {
                *q *= rest;
            }
        }
        if let Some(q) = charge.get_mut(centre) {
            *q = (own + against).max(0.0);
        }
    }
}
