//! Pairs of atoms within a distance, in time linear in the atoms.
//!
//! Atoms are sorted by the cell that they lie in; only occupied cells exist, so an empty box costs nothing. Neighbouring
//! cells are met by walking the sorted list with one finger a row of cells.

/// Cell coordinates: the row (x, y) and the place z in it.
type Cell = (u32, u32, u32);

/// Half of the rows around a cell as (x, y) steps; the other half meets this one when its own turn comes.
const ROWS: [(i64, i64); 5] = [(0, 0), (0, 1), (1, -1), (1, 0), (1, 1)];

/// Calls `visit(i, j, squared distance)` once for every pair not farther apart than `reach` [Å]. A visit that returns
/// false ends the walk. Returns the number of distances worked out.
///
/// Coordinates must be finite and within ±1e9 Å, `reach` at least 0.5 Å.
pub(super) fn for_pairs_within(xyz: &[[f64; 3]], reach: f64, mut visit: impl FnMut(u32, u32, f64) -> bool) -> u64 {
    let mut low = [f64::INFINITY; 3];
    for point in xyz {
        for (least, &x) in low.iter_mut().zip(point) {
            *least = least.min(x);
        }
    }
    let place = |x: f64, least: f64| ((x - least) / reach) as u32;
    let mut order: Vec<(Cell, u32)> = xyz
        .iter()
        .zip(0_u32..)
        .map(|(p, i)| ((place(p[0], low[0]), place(p[1], low[1]), place(p[2], low[2])), i))
        .collect();
    order.sort_unstable();
    // Points in the sorted order lie together in memory.
    let points: Vec<[f64; 3]> = order.iter().map(|&(_, i)| xyz[i as usize]).collect();
    let limit = reach * reach;
    let mut evaluated = 0;
    let mut fingers = [0_usize; ROWS.len()];
    let mut first = 0;
    while first < order.len() {
        let cell = order[first].0;
        let end = first + order[first..].iter().take_while(|entry| entry.0 == cell).count();
        for ((dx, dy), finger) in ROWS.into_iter().zip(&mut fingers) {
            let own = (dx, dy) == (0, 0);
            let (Ok(x), Ok(y)) = (u32::try_from(i64::from(cell.0) + dx), u32::try_from(i64::from(cell.1) + dy)) else {
                continue;
            };
            let from = if own { cell } else { (x, y, cell.2.saturating_sub(1)) };
            let to = (x, y, cell.2.saturating_add(1));
            while *finger < order.len() && order[*finger].0 < from {
                *finger += 1;
            }
            for i in first..end {
                let start = if own { i + 1 } else { *finger };
                for j in start..order.len() {
                    if order[j].0 > to {
                        break;
                    }
                    evaluated += 1;
                    let (p, q) = (points[i], points[j]);
                    let (dx, dy, dz) = (p[0] - q[0], p[1] - q[1], p[2] - q[2]);
                    let squared = dx * dx + dy * dy + dz * dz;
                    if squared <= limit && !visit(order[i].1, order[j].1, squared) {
                        return evaluated;
                    }
                }
            }
        }
        first = end;
    }
    evaluated
}

#[cfg(test)]
mod tests {
    use super::*;

    fn pairs(xyz: &[[f64; 3]], reach: f64) -> Vec<(u32, u32)> {
        let mut found = Vec::new();
        for_pairs_within(xyz, reach, |i, j, _| {
            found.push((i.min(j), i.max(j)));
            true
        });
        found.sort_unstable();
        found
    }

    /// Numbers from 0 to 1 by the linear congruential rule of Knuth's MMIX, seed stated by the caller.
    fn numbers(mut state: u64) -> impl FnMut() -> f64 {
        move || {
            state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
            (state >> 11) as f64 / (1_u64 << 53) as f64
        }
    }

    #[test]
    fn all_pairs_once() {
        let mut next = numbers(1);
        let xyz: Vec<[f64; 3]> = (0..300).map(|_| [8.0 * next(), 3.0 * next() - 5.0, 12.0 * next()]).collect();
        let mut expected = Vec::new();
        for i in 0..300 {
            for j in i + 1..300 {
                let d: f64 = (0..3).map(|k| (xyz[i][k] - xyz[j][k]) * (xyz[i][k] - xyz[j][k])).sum();
                if d <= 1.7 * 1.7 {
                    expected.push((i as u32, j as u32));
                }
            }
        }
        assert!(expected.len() > 500);
        assert_eq!(pairs(&xyz, 1.7), expected);
    }

    #[test]
    fn a_huge_empty_box_costs_nothing() {
        let xyz = [[-1e9, -1e9, -1e9], [1e9, 1e9, 1e9], [1e9, 1e9, 1e9 - 1.0], [0.0, 0.0, 0.0]];
        assert_eq!(pairs(&xyz, 1.5), [(1, 2)]);
    }

    /// Distances an atom stay the same from 10^3 to 10^5 atoms at equal density.
    #[test]
    fn work_is_linear() {
        let per_atom = |side: usize| {
            let xyz: Vec<[f64; 3]> = (0..side * side * side)
                .map(|i| [(i % side) as f64 * 1.5, (i / side % side) as f64 * 1.5, (i / side / side) as f64 * 1.5])
                .collect();
            for_pairs_within(&xyz, 2.0, |_, _, _| true) as f64 / xyz.len() as f64
        };
        let (few, many) = (per_atom(10), per_atom(46));
        assert!(many < 60.0 && many < 1.5 * few, "{few} {many}");
    }
}
