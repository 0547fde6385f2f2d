//! Small rings: which bonds lie in one, how large the smallest is, which rings hang together.

use crate::molecule::{Bond, Neighbours};

/// Rings with more atoms than this are counted, not listed.
pub const LARGEST_LISTED: usize = 8;
/// Ring sizes beyond this are not told apart.
pub const LARGEST_SIZE: usize = 30;
/// Shortest rings listed through one bond.
const MOST_THROUGH_A_BOND: usize = 12;

/// The rings of a molecule.
#[derive(Clone, Debug, Default)]
pub struct Rings {
    /// One entry a bond: 0 in no ring; else the number of atoms in its smallest ring, `LARGEST_SIZE + 1` beyond that.
    pub smallest: Vec<usize>,
    /// One entry a bond: number of its ring system (rings that share bonds), `None` in no ring. Numbered in the order of
    /// their first bonds. Rings that share one atom only are two systems.
    pub system: Vec<Option<usize>>,
    /// The rings of up to `LARGEST_LISTED` atoms that are the smallest ring of one of their bonds, each as its atoms in
    /// order around the ring, starting at the lowest number towards the lower neighbour. Sorted by size, then atoms.
    pub small: Vec<Vec<u32>>,
}

impl Rings {
    /// Finds the rings of bonds among `atoms` atoms. Bonds with an atom out of range count as in no ring.
    pub fn new(atoms: usize, bonds: &[Bond]) -> Self {
        Self::of(&Neighbours::new(atoms, bonds), atoms, bonds)
    }

    /// The same where the neighbours are known already.
    pub fn of(around: &Neighbours, atoms: usize, bonds: &[Bond]) -> Self {
        let system = systems(around, atoms, bonds.len());
        let in_ring: Vec<bool> = system.iter().map(Option::is_some).collect();
        let mut search = Search { level: vec![(u32::MAX, 0); atoms], queue: Vec::new() };
        let mut rings = Self { smallest: vec![0; bonds.len()], system, small: Vec::new() };
        for (k, bond) in bonds.iter().enumerate().filter(|&(k, _)| in_ring[k]) {
            rings.smallest[k] = search.smallest(around, &in_ring, k, *bond, &mut rings.small);
        }
        rings.small.sort_unstable_by(|one, two| one.len().cmp(&two.len()).then_with(|| one.cmp(two)));
        rings.small.dedup();
        rings
    }

    /// True where the bond lies in a ring.
    pub fn in_ring(&self, bond: usize) -> bool {
        self.smallest.get(bond).is_some_and(|&size| size > 0)
    }

    /// Atoms in the smallest ring of the bond, `None` in no ring.
    pub fn smallest_ring(&self, bond: usize) -> Option<usize> {
        self.smallest.get(bond).copied().filter(|&size| size > 0)
    }
}

/// Ring systems as the biconnected components of more than one bond (Hopcroft and Tarjan, Commun. ACM 1973, 16, 372;
/// the walk is kept on the heap), numbered in the order of their first bonds.
fn systems(around: &Neighbours, atoms: usize, bonds: usize) -> Vec<Option<usize>> {
    let mut block = vec![usize::MAX; bonds];
    let mut bonds_in = Vec::new();
    let (mut entered, mut lowest) = (vec![0_u32; atoms], vec![0_u32; atoms]);
    let mut clock = 0_u32;
    let mut walk: Vec<(u32, u32, usize)> = Vec::new();
    let mut open: Vec<u32> = Vec::new();
    for root in 0..atoms {
        if entered[root] != 0 {
            continue;
        }
        clock += 1;
        (entered[root], lowest[root]) = (clock, clock);
        walk.push((root as u32, u32::MAX, 0));
        while let Some((atom, via, next)) = walk.last_mut() {
            let (here, via) = (*atom as usize, *via);
            if let Some(&(other, k)) = around.of(here).get(*next) {
                *next += 1;
                let there = other as usize;
                if k == via {
                    continue;
                }
                if entered[there] == 0 {
                    clock += 1;
                    (entered[there], lowest[there]) = (clock, clock);
                    open.push(k);
                    walk.push((other, k, 0));
                } else if entered[there] < entered[here] {
                    open.push(k);
                    lowest[here] = lowest[here].min(entered[there]);
                }
            } else {
                walk.pop();
                if let Some(&(parent, _, _)) = walk.last() {
                    let parent = parent as usize;
                    lowest[parent] = lowest[parent].min(lowest[here]);
                    if lowest[here] >= entered[parent] {
                        let mut held = 0;
                        while let Some(k) = open.pop() {
                            block[k as usize] = bonds_in.len();
                            held += 1;
                            if k == via {
                                break;
                            }
                        }
                        bonds_in.push(held);
                    }
                }
            }
        }
    }
    let mut number = vec![None; bonds_in.len()];
    let mut count = 0;
    let mut system = vec![None; bonds];
    for (own, block) in system.iter_mut().zip(block) {
        if bonds_in.get(block).is_some_and(|&held| held > 1) {
            let number = number[block].get_or_insert_with(|| {
                count += 1;
                count - 1
            });
            *own = Some(*number);
        }
    }
    system
}

/// Breadth-first search from one end of a bond to the other.
struct Search {
    /// Of every atom: the bond whose search touched it last, and its distance from the start.
    level: Vec<(u32, u32)>,
    queue: Vec<u32>,
}

impl Search {
    fn distance(&self, stamp: u32, atom: u32) -> Option<u32> {
        let (mark, distance) = self.level[atom as usize];
        (mark == stamp).then_some(distance)
    }

    /// Size of the smallest ring through bond `k`; small ones are added to `list`.
    fn smallest(
        &mut self,
        around: &Neighbours,
        in_ring: &[bool],
        k: usize,
        bond: Bond,
        list: &mut Vec<Vec<u32>>,
    ) -> usize {
        let stamp = k as u32;
        self.queue.clear();
        self.queue.push(bond.a);
        self.level[bond.a as usize] = (stamp, 0);
        let mut head = 0;
        let mut found = None;
        while let Some(&atom) = self.queue.get(head) {
            head += 1;
            let distance = self.level[atom as usize].1;
            if found.is_some_and(|far| distance + 1 > far) || distance as usize + 2 > LARGEST_SIZE {
                break;
            }
            for &(other, l) in around.of(atom as usize) {
                if !in_ring[l as usize] || l == stamp || self.distance(stamp, other).is_some() {
                    continue;
                }
                self.level[other as usize] = (stamp, distance + 1);
                self.queue.push(other);
                if other == bond.b {
                    found = Some(distance + 1);
                }
            }
        }
        let Some(far) = found else { return LARGEST_SIZE + 1 };
        let size = far as usize + 1;
        if size <= LARGEST_LISTED {
            self.shortest_paths(around, in_ring, stamp, bond.b, list);
        }
        size
    }

    /// All shortest ways back from `end`, up to a limit, as rings in standard form.
    fn shortest_paths(&self, around: &Neighbours, in_ring: &[bool], stamp: u32, end: u32, list: &mut Vec<Vec<u32>>) {
        let mut ways = vec![vec![end]];
        let mut found = 0;
        while let Some(way) = ways.pop() {
            let Some(&last) = way.last() else { continue };
            let Some(distance) = self.distance(stamp, last) else { continue };
            if distance == 0 {
                list.push(standard(way));
                found += 1;
                if found == MOST_THROUGH_A_BOND {
                    return;
                }
                continue;
            }
            for &(other, l) in around.of(last as usize) {
                if l != stamp && in_ring[l as usize] && self.distance(stamp, other) == Some(distance - 1) {
                    let mut longer = way.clone();
                    longer.push(other);
                    ways.push(longer);
                }
            }
        }
    }
}

/// The same ring from its lowest atom on, towards the lower of its neighbours.
fn standard(mut ring: Vec<u32>) -> Vec<u32> {
    let lowest = ring.iter().enumerate().min_by_key(|&(_, &atom)| atom).map_or(0, |(place, _)| place);
    ring.rotate_left(lowest);
    if ring.len() > 2 && ring.get(1) > ring.last() {
        ring.reverse();
        ring.rotate_right(1);
    }
    ring
}

#[cfg(test)]
mod tests {
    use super::*;

    fn rings(atoms: usize, pairs: &[(u32, u32)]) -> Rings {
        let bonds: Vec<Bond> = pairs.iter().map(|&(a, b)| Bond { a, b, order: 1.0 }).collect();
        Rings::new(atoms, &bonds)
    }

    /// Norbornane's carbon skeleton: two five-rings through every bond but those of the six-ring only.
    #[test]
    fn norbornane_has_two_five_rings() {
        let found = rings(8, &[(0, 1), (1, 2), (2, 3), (3, 4), (4, 5), (5, 0), (0, 6), (6, 3), (1, 7)]);
        assert_eq!(found.small, [vec![0, 1, 2, 3, 6], vec![0, 5, 4, 3, 6]]);
        assert_eq!(found.smallest, [5, 5, 5, 5, 5, 5, 5, 5, 0]);
        assert_eq!(found.system[0], Some(0));
        assert_eq!(found.system[8], None);
    }

    /// Two three-rings that share one atom, and one far away.
    #[test]
    fn spiro_rings_are_two_systems() {
        let found = rings(8, &[(0, 1), (1, 2), (0, 2), (2, 3), (3, 4), (2, 4), (5, 6), (6, 7), (5, 7)]);
        assert_eq!(found.small.len(), 3);
        let system = |k: usize| found.system[k];
        assert_eq!(system(0), system(2));
        assert_ne!(system(0), system(3));
        assert_ne!(system(0), system(6));
    }

    /// Cubane has six faces.
    #[test]
    fn cube_has_six_faces() {
        let pairs: Vec<(u32, u32)> =
            (0..8_u32).flat_map(|i| [1, 2, 4].map(|bit| (i, i ^ bit))).filter(|&(i, j)| i < j).collect();
        let found = rings(8, &pairs);
        assert_eq!(found.small.len(), 6);
        assert!(found.smallest.iter().all(|&size| size == 4));
    }

    #[test]
    fn large_rings_are_counted_not_listed() {
        let ring = |n: u32| rings(n as usize, &(0..n).map(|i| (i, (i + 1) % n)).collect::<Vec<_>>());
        assert_eq!(ring(8).small.len(), 1);
        assert_eq!((ring(9).small.len(), ring(9).smallest[0]), (0, 9));
        assert_eq!(ring(30).smallest[0], 30);
        assert_eq!(ring(31).smallest[0], LARGEST_SIZE + 1);
        assert_eq!(ring(5000).smallest[17], LARGEST_SIZE + 1);
    }
}
