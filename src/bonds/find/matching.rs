//! Double bonds of very wide ring systems by matching of greatest cardinality.
//!
//! Every atom stands for as many vertices as it prefers increments (a carbon atom of graphene one, of an alkyne two); a
//! matched pair of vertices is one increment. Vertices left over may then take an increment from an atom that can bear
//! it at little cost (the nitrogen of a nitro group). Bond lengths are not looked at: of several arrangements with the
//! same number of double bonds any may come. Algorithm: Edmonds, Can. J. Math. 1965, 17, 449 (from memory), started
//! from a greedy matching that serves the atoms with the fewest choices first.

use super::solve::Part;
use super::states::{MOST_PI, UNIT};
use std::collections::BTreeSet;

/// Extra cost at which an atom still lends an increment to an open neighbour.
const BEARABLE: i64 = 2 * UNIT;
const NONE: u32 = u32::MAX;

/// Increments of every bond of the part.
pub(super) fn increments(part: &Part) -> Vec<u8> {
    let mut owner = Vec::new();
    let mut copies: Vec<Vec<u32>> = vec![Vec::new(); part.atoms.len()];
    let mut lenders = Vec::new();
    for (atom, costs) in part.atoms.iter().enumerate() {
        let wanted = (0..=MOST_PI).min_by_key(|&pi| costs[pi]).unwrap_or(0);
        for _ in 0..wanted {
            copies[atom].push(owner.len() as u32);
            owner.push(atom);
        }
        if costs.get(wanted + 1).is_some_and(|&more| more <= costs[wanted] + BEARABLE) {
            lenders.push(atom);
        }
    }
    let eager = owner.len();
    for atom in lenders {
        copies[atom].push(owner.len() as u32);
        owner.push(atom);
    }
    let mut around: Vec<Vec<u32>> = vec![Vec::new(); owner.len()];
    for bond in &part.bonds {
        for &one in &copies[bond.a] {
            for &other in &copies[bond.b] {
                around[one as usize].push(other);
                around[other as usize].push(one);
            }
        }
    }
    let mut search = Matching::new(around, eager);
    search.greedy();
    search.augment_all();
    // Now the lenders too; a pair of lenders never marries, as only eager vertices start a search.
    search.active = owner.len();
    search.augment_all();
    let mut found = vec![0_u8; part.bonds.len()];
    let place: Vec<Vec<(usize, usize)>> = part.neighbours();
    for (vertex, &partner) in search.partner.iter().enumerate() {
        if partner == NONE || partner as usize <= vertex {
            continue;
        }
        let (a, b) = (owner[vertex], owner[partner as usize]);
        if let Some(&(_, k)) = place[a].iter().find(|&&(other, _)| other == b) {
            found[k] = (found[k] + 1).min(2);
        }
    }
    found
}

struct Matching {
    around: Vec<Vec<u32>>,
    partner: Vec<u32>,
    /// Vertices below this number take part.
    active: usize,
    /// Vertices below this number start searches.
    eager: usize,
    base: Vec<u32>,
    parent: Vec<u32>,
    outer: Vec<bool>,
    touched: Vec<u32>,
    mark: Vec<u32>,
    stamp: u32,
}

impl Matching {
    fn new(around: Vec<Vec<u32>>, eager: usize) -> Self {
        let n = around.len();
        Self {
            around,
            partner: vec![NONE; n],
            active: eager,
            eager,
            base: (0..n as u32).collect(),
            parent: vec![NONE; n],
            outer: vec![false; n],
            touched: Vec::new(),
            mark: vec![0; n],
            stamp: 0,
        }
    }

    fn is_free(&self, vertex: u32) -> bool {
        self.partner[vertex as usize] == NONE
    }

    /// Marries the vertex with the fewest free neighbours first.
    fn greedy(&mut self) {
        let mut free: Vec<usize> =
            (0..self.eager).map(|v| self.around[v].iter().filter(|&&w| (w as usize) < self.eager).count()).collect();
        let mut queue: BTreeSet<(usize, u32)> = (0..self.eager as u32).map(|v| (free[v as usize], v)).collect();
        while let Some((_, vertex)) = queue.pop_first() {
            let choice = self.around[vertex as usize]
                .iter()
                .copied()
                .filter(|&w| (w as usize) < self.eager && self.is_free(w))
                .min_by_key(|&w| (free[w as usize], w));
            let Some(other) = choice else { continue };
            queue.remove(&(free[other as usize], other));
            (self.partner[vertex as usize], self.partner[other as usize]) = (other, vertex);
            for taken in [vertex, other] {
                for k in 0..self.around[taken as usize].len() {
                    let w = self.around[taken as usize][k];
                    if (w as usize) < self.eager && queue.remove(&(free[w as usize], w)) {
                        free[w as usize] = free[w as usize].saturating_sub(1);
                        queue.insert((free[w as usize], w));
                    }
                }
            }
        }
    }

    fn augment_all(&mut self) {
        for root in 0..self.eager as u32 {
            if !self.is_free(root) {
                continue;
            }
            let end = self.search(root);
            let mut vertex = end;
            while vertex != NONE {
                let before = self.parent[vertex as usize];
                let next = self.partner[before as usize];
                (self.partner[vertex as usize], self.partner[before as usize]) = (before, vertex);
                vertex = next;
            }
            for &vertex in &self.touched {
                self.base[vertex as usize] = vertex;
                self.parent[vertex as usize] = NONE;
                self.outer[vertex as usize] = false;
            }
            self.touched.clear();
        }
    }

    /// A free vertex at the end of an alternating path from the root, or `NONE`.
    fn search(&mut self, root: u32) -> u32 {
        let mut queue = vec![root];
        self.outer[root as usize] = true;
        self.touched.push(root);
        let mut head = 0;
        while let Some(&vertex) = queue.get(head) {
            head += 1;
            for k in 0..self.around[vertex as usize].len() {
                let other = self.around[vertex as usize][k];
                if other as usize >= self.active
                    || self.base[vertex as usize] == self.base[other as usize]
                    || self.partner[vertex as usize] == other
                {
                    continue;
                }
                let mate = self.partner[other as usize];
                if other == root || (mate != NONE && self.parent[mate as usize] != NONE) {
                    self.shrink(vertex, other, &mut queue);
                } else if self.parent[other as usize] == NONE {
                    self.parent[other as usize] = vertex;
                    self.touched.push(other);
                    if mate == NONE {
                        return other;
                    }
                    self.outer[mate as usize] = true;
                    self.touched.push(mate);
                    queue.push(mate);
                }
            }
        }
        NONE
    }

    /// Makes one vertex of an odd cycle.
    fn shrink(&mut self, one: u32, other: u32, queue: &mut Vec<u32>) {
        let common = self.common_base(one, other);
        self.stamp += 1;
        let blossom = self.stamp;
        for (mut vertex, mut child) in [(one, other), (other, one)] {
            while self.base[vertex as usize] != common {
                let mate = self.partner[vertex as usize];
                for inner in [vertex, mate] {
                    let base = self.base[inner as usize];
                    self.mark[base as usize] = blossom;
                }
                self.parent[vertex as usize] = child;
                self.touched.push(vertex);
                child = mate;
                vertex = self.parent[mate as usize];
            }
        }
        for k in 0..self.touched.len() {
            let vertex = self.touched[k];
            if self.mark[self.base[vertex as usize] as usize] == blossom {
                self.base[vertex as usize] = common;
                if !self.outer[vertex as usize] {
                    self.outer[vertex as usize] = true;
                    queue.push(vertex);
                }
            }
        }
    }

    fn common_base(&mut self, one: u32, other: u32) -> u32 {
        self.stamp += 1;
        let mut vertex = one;
        loop {
            vertex = self.base[vertex as usize];
            self.mark[vertex as usize] = self.stamp;
            let mate = self.partner[vertex as usize];
            if mate == NONE {
                break;
            }
            vertex = self.parent[mate as usize];
        }
        let mut vertex = self.base[other as usize];
        while self.mark[vertex as usize] != self.stamp {
            let mate = self.partner[vertex as usize];
            if mate == NONE {
                break;
            }
            vertex = self.base[self.parent[mate as usize] as usize];
        }
        vertex
    }
}

#[cfg(test)]
mod tests {
    use super::super::solve::PartBond;
    use super::super::states::FORBIDDEN;
    use super::*;

    fn part(n: usize, pairs: &[(usize, usize)]) -> Part {
        Part {
            atoms: vec![[5 * UNIT, 0, 7 * UNIT, FORBIDDEN, FORBIDDEN]; n],
            charges: vec![[0; MOST_PI + 1]; n],
            bonds: pairs.iter().map(|&(a, b)| PartBond { a, b, cost: [0; 3] }).collect(),
        }
    }

    /// Greatest matchings of small graphs by trying everything.
    #[test]
    fn greatest_matchings_of_small_graphs() {
        let mut state = 11_u64;
        for _ in 0..300 {
            let mut pairs = Vec::new();
            for a in 0..8 {
                for b in a + 1..8 {
                    state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
                    if state >> 61 < 2 && pairs.len() < 14 {
                        pairs.push((a, b));
                    }
                }
            }
            let greatest = (0..1_u32 << pairs.len())
                .filter(|set| {
                    let mut degree = [0; 8];
                    for (k, &(a, b)) in pairs.iter().enumerate().filter(|(k, _)| set >> k & 1 == 1) {
                        let _ = k;
                        degree[a] += 1;
                        degree[b] += 1;
                    }
                    degree.iter().all(|&d| d < 2)
                })
                .map(u32::count_ones)
                .max();
            let found: u32 = increments(&part(8, &pairs)).iter().map(|&pi| u32::from(pi)).sum();
            assert_eq!(Some(found), greatest, "{pairs:?}");
        }
    }
}
