//! The cheapest distribution of double-bond increments over one connected unsaturated part, exactly.
//!
//! Atoms are taken in one by one; only those that still have partners to come (the front) are remembered, each with the
//! increments that it has so far. For every such memory the cheapest history is kept: dynamic programming over a path
//! decomposition. The work grows with the width of the front, not with the number of atoms: chains, trees and fused
//! rings stay narrow.

use super::states::{FORBIDDEN, MOST_PI};

/// An unsaturated part: costs of its atoms by increments and of its bonds by increments (0, 1, 2).
#[derive(Clone, Debug, Default)]
pub(super) struct Part {
    pub atoms: Vec<[i64; MOST_PI + 1]>,
    /// Charges that go with the costs of the atoms.
    pub charges: Vec<[i32; MOST_PI + 1]>,
    pub bonds: Vec<PartBond>,
}

/// A bond within a part.
#[derive(Clone, Copy, Debug)]
pub(super) struct PartBond {
    pub a: usize,
    pub b: usize,
    pub cost: [i64; 3],
}

/// Bits of one remembered count, and how many fit.
const BITS: u32 = 3;
const SLOTS: usize = 20;
/// Memories kept at one time; beyond this the part is too wide.
const MOST_STATES: usize = 1 << 14;
/// Memories made in one step before equal ones are put together.
const MOST_BRANCHES: usize = 8 * MOST_STATES;
/// Memories made in all: about the work of C60; wider parts go to the matching at once.
const MOST_WORK: usize = 1 << 21;

/// One memory: counts of the front packed in a key, the cost so far, where it came from and what was chosen.
#[derive(Clone, Copy, Debug)]
struct State {
    key: u64,
    cost: i64,
    from: u32,
    choice: u64,
}

/// What is kept of taking in one atom: its bonds to the front, and of every memory its origin and choice.
struct Step {
    bonds: Vec<usize>,
    states: Vec<(u32, u64)>,
}

impl Part {
    /// Neighbours of each atom as (atom, bond).
    pub(super) fn neighbours(&self) -> Vec<Vec<(usize, usize)>> {
        let mut around = vec![Vec::new(); self.atoms.len()];
        for (k, bond) in self.bonds.iter().enumerate() {
            around[bond.a].push((bond.b, k));
            around[bond.b].push((bond.a, k));
        }
        around
    }

    /// Increments of every bond at a low total of the costs and of `per_charge` for each elementary net charge of the
    /// part together with `others`, the charge of what hangs on it; `None` where the front is too wide.
    ///
    /// The sum over atoms alone is exact. Where it leaves charged atoms and a net charge, charges of that sign are made
    /// dearer by `per_charge` and the sum is minimized again; the better of the two stays.
    pub(super) fn settle(&self, per_charge: i64, others: impl FnOnce() -> i64) -> Option<Vec<u8>> {
        let first = self.solve()?;
        let (cost, charge, charged) = self.totals(&first);
        if !charged || per_charge == 0 {
            return Some(first);
        }
        let others = others();
        let net = charge + others;
        if net == 0 {
            return Some(first);
        }
        let mut shifted = self.clone();
        for (costs, charges) in shifted.atoms.iter_mut().zip(&self.charges) {
            for (cost, &q) in costs.iter_mut().zip(charges).filter(|(cost, _)| **cost < FORBIDDEN) {
                *cost += per_charge * net.signum() * i64::from(q);
            }
        }
        let second = shifted.solve()?;
        let (other_cost, other_charge, _) = self.totals(&second);
        let better = other_cost + per_charge * (other_charge + others).abs() < cost + per_charge * net.abs();
        Some(if better { second } else { first })
    }

    /// Cost and charge of the part with these increments, and whether any atom is charged.
    fn totals(&self, increments: &[u8]) -> (i64, i64, bool) {
        let mut held = vec![0_usize; self.atoms.len()];
        let mut cost = 0;
        for (bond, &pi) in self.bonds.iter().zip(increments) {
            held[bond.a] += usize::from(pi);
            held[bond.b] += usize::from(pi);
            cost += bond.cost.get(usize::from(pi)).copied().unwrap_or(FORBIDDEN);
        }
        let (mut charge, mut charged) = (0, false);
        for ((costs, charges), held) in self.atoms.iter().zip(&self.charges).zip(held) {
            cost += costs.get(held).copied().unwrap_or(FORBIDDEN);
            let q = charges.get(held).copied().unwrap_or(0);
            charge += i64::from(q);
            charged |= q != 0;
        }
        (cost, charge, charged)
    }

    /// Increments of every bond at the least total cost; `None` where the front is too wide.
    pub(super) fn solve(&self) -> Option<Vec<u8>> {
        if let [bond] = self.bonds.as_slice() {
            return Some(vec![self.pair(*bond)]);
        }
        let around = self.neighbours();
        let order = front_order(&around)?;
        let mut slot_of = vec![usize::MAX; self.atoms.len()];
        let mut left: Vec<usize> = around.iter().map(Vec::len).collect();
        let mut used = [false; SLOTS];
        let mut states = vec![State { key: 0, cost: 0, from: 0, choice: 0 }];
        let mut history: Vec<Step> = Vec::with_capacity(order.len());
        let mut next = Vec::new();
        let mut work = 0;
        for atom in order {
            let slot = used.iter().position(|used| !used)?;
            used[slot] = true;
            slot_of[atom] = slot;
            let back: Vec<usize> =
                around[atom].iter().filter(|&&(other, _)| slot_of[other] < SLOTS).map(|&(_, k)| k).collect();
            for (from, state) in states.iter_mut().enumerate() {
                (state.from, state.choice) = (from as u32, 0);
            }
            for (place, &k) in back.iter().enumerate() {
                let bond = self.bonds[k];
                let other = if bond.a == atom { bond.b } else { bond.a };
                next.clear();
                for state in &states {
                    for (pi, &cost) in (0_u64..).zip(&bond.cost) {
                        let (here, there) = (count(state.key, slot) + pi, count(state.key, slot_of[other]) + pi);
                        if cost >= FORBIDDEN || !self.can_hold(atom, here) || !self.can_hold(other, there) {
                            continue;
                        }
                        let key = state.key + (pi << shift(slot)) + (pi << shift(slot_of[other]));
                        let choice = state.choice | pi << (2 * place.min(31));
                        next.push(State { key, cost: state.cost + cost, from: state.from, choice });
                    }
                }
                std::mem::swap(&mut states, &mut next);
                work += states.len();
                if work > MOST_WORK || states.len() > MOST_BRANCHES {
                    return None;
                }
                left[atom] -= 1;
                left[other] -= 1;
            }
            for done in back.iter().flat_map(|&k| [self.bonds[k].a, self.bonds[k].b]).chain([atom]) {
                if left[done] > 0 || slot_of[done] >= SLOTS {
                    continue;
                }
                let slot = slot_of[done];
                for state in &mut states {
                    let held = count(state.key, slot);
                    state.cost += self.atoms[done].get(held as usize).copied().unwrap_or(FORBIDDEN);
                    state.key -= held << shift(slot);
                }
                used[slot] = false;
                slot_of[done] = usize::MAX;
            }
            states.sort_unstable_by_key(|state| (state.key, state.cost, state.from, state.choice));
            states.dedup_by_key(|state| state.key);
            if states.len() > MOST_STATES {
                return None;
            }
            history.push(Step { bonds: back, states: states.iter().map(|state| (state.from, state.choice)).collect() });
        }
        let mut at = 0;
        let mut increments = vec![0_u8; self.bonds.len()];
        for step in history.iter().rev() {
            let &(from, choice) = step.states.get(at)?;
            for (place, &k) in step.bonds.iter().enumerate() {
                increments[k] = (choice >> (2 * place.min(31)) & 3) as u8;
            }
            at = from as usize;
        }
        Some(increments)
    }

    fn pair(&self, bond: PartBond) -> u8 {
        let cost = |pi: usize| self.atoms[bond.a][pi] + self.atoms[bond.b][pi] + bond.cost[pi];
        (0..3_u8).min_by_key(|&pi| cost(usize::from(pi))).unwrap_or(0)
    }

    /// False once no valence of the atom has this many increments or more.
    fn can_hold(&self, atom: usize, pi: u64) -> bool {
        self.atoms[atom].iter().skip(pi as usize).any(|&cost| cost < FORBIDDEN)
    }
}

fn shift(slot: usize) -> u32 {
    BITS * slot as u32
}

fn count(key: u64, slot: usize) -> u64 {
    key >> shift(slot) & ((1 << BITS) - 1)
}

/// An order of the atoms of a connected part that keeps the front narrow: always the neighbour of the front that
/// widens it least, of equals the one next to the oldest atom. `None` where it gets too wide.
fn front_order(around: &[Vec<(usize, usize)>]) -> Option<Vec<usize>> {
    let mut left: Vec<usize> = around.iter().map(Vec::len).collect();
    let mut taken = vec![false; around.len()];
    let mut order = Vec::with_capacity(around.len());
    let mut front: Vec<usize> = Vec::new();
    let mut next = (0..around.len()).min_by_key(|&atom| around[atom].len());
    while let Some(atom) = next {
        taken[atom] = true;
        order.push(atom);
        front.push(atom);
        for &(other, _) in &around[atom] {
            left[other] -= 1;
        }
        front.retain(|&held| left[held] > 0);
        if front.len() >= SLOTS {
            return None;
        }
        let mut best: Option<(isize, usize)> = None;
        for &held in &front {
            for &(candidate, _) in around[held].iter().filter(|&&(other, _)| !taken[other]) {
                let closing = around[candidate].iter().filter(|&&(other, _)| taken[other] && left[other] == 1).count();
                let growth = isize::from(left[candidate] > 0) - isize::try_from(closing).unwrap_or(0);
                if best.is_none_or(|(least, _)| growth < least) {
                    best = Some((growth, candidate));
                }
            }
        }
        next = best.map(|(_, candidate)| candidate);
    }
    Some(order)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Carbon atoms of benzene as a part: one increment each is free, none costs 5.
    fn ring(n: usize) -> Part {
        Part {
            atoms: vec![[5, 0, 7, FORBIDDEN, FORBIDDEN]; n],
            charges: vec![[0; MOST_PI + 1]; n],
            bonds: (0..n).map(|a| PartBond { a, b: (a + 1) % n, cost: [0, 0, 50] }).collect(),
        }
    }

    #[test]
    fn a_ring_of_six_alternates() {
        let increments = ring(6).solve().unwrap_or_default();
        assert_eq!(increments.iter().map(|&pi| u32::from(pi)).sum::<u32>(), 3);
        assert!((0..6).all(|k| increments[k] + increments[(k + 1) % 6] == 1));
    }

    #[test]
    fn a_ring_of_a_thousand_is_as_easy() {
        let increments = ring(1000).solve().unwrap_or_default();
        assert_eq!(increments.iter().map(|&pi| u32::from(pi)).sum::<u32>(), 500);
    }

    /// Ozone: two single bonds with two anions cost less atom by atom, but the neutral formula less in all.
    #[test]
    fn a_net_charge_has_its_price() {
        let (end, middle) = ([23, 0, FORBIDDEN, FORBIDDEN, FORBIDDEN], [0, 25, FORBIDDEN, FORBIDDEN, FORBIDDEN]);
        let part = Part {
            atoms: vec![end, middle, end],
            charges: vec![[-1, 0, 1, 0, 0], [0, 1, 0, 0, 0], [-1, 0, 1, 0, 0]],
            bonds: vec![PartBond { a: 0, b: 1, cost: [0; 3] }, PartBond { a: 1, b: 2, cost: [0; 3] }],
        };
        assert_eq!(part.settle(0, || 0), Some(vec![0, 0]));
        assert_eq!(part.settle(10, || 0).map(|found| found.iter().sum::<u8>()), Some(1));
    }

    /// All distributions of a small irregular part tried one by one give the same least cost.
    #[test]
    fn agrees_with_trying_everything() {
        let bonds = [(0, 1), (1, 2), (2, 3), (3, 0), (2, 4), (4, 5), (5, 6), (6, 2), (1, 7)];
        let mut state = 7_u64;
        let mut next = |most: u64| {
            state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
            ((state >> 33) % most) as i64
        };
        for _ in 0..40 {
            let part = Part {
                atoms: (0..8).map(|_| [next(9), next(9), next(9), next(9), FORBIDDEN]).collect(),
                charges: vec![[0; MOST_PI + 1]; 8],
                bonds: bonds.iter().map(|&(a, b)| PartBond { a, b, cost: [next(5), next(5), next(5)] }).collect(),
            };
            let total = |increments: &[u8]| {
                let mut held = [0_usize; 8];
                let mut sum = 0;
                for (bond, &pi) in part.bonds.iter().zip(increments) {
                    held[bond.a] += usize::from(pi);
                    held[bond.b] += usize::from(pi);
                    sum += bond.cost[usize::from(pi)];
                }
                sum + (0..8).map(|i| part.atoms[i].get(held[i]).copied().unwrap_or(FORBIDDEN)).sum::<i64>()
            };
            let least = (0..3_usize.pow(9))
                .map(|code| {
                    let all: Vec<u8> = (0..9).map(|k| (code / 3_usize.pow(k) % 3) as u8).collect();
                    total(&all)
                })
                .min();
            assert_eq!(part.solve().map(|found| total(&found)), least);
        }
    }
}
