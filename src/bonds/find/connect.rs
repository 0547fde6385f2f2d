//! Who is bonded to whom: distances against radius sums, then pruning to what each element can hold.
//!
//! A pair is a candidate up to its radius sum and a tolerance. Candidates are then taken away, always the longest in
//! proportion to its radius sum first: at hydrogen, in triangles and four-rings whose other sides explain the short
//! distance, and where an atom has more partners than its element keeps. The tolerances are common practice.

use super::grid::for_pairs_within;
use super::kinds::{Kind, is_electron_poor, is_metallic, kind, most_partners};
use super::radii::radii;
use crate::molecule::{Bond, Molecule, Neighbours};
use crate::status::{Code, Failure};

/// Below this part of the radius sum no bond is known.
pub(super) const TOO_CLOSE: f64 = 0.5;
/// The largest of all tolerances [Å].
const LARGEST_TOLERANCE: f64 = 0.45;
/// A side of a triangle is no bond if its length over its radius sum is at least this, …
const TRIANGLE_RATIO: f64 = 1.18;
/// … and larger than that of both other sides by this.
const TRIANGLE_MARGIN: f64 = 0.15;
/// The same for the diagonal of a four-ring.
const DIAGONAL_RATIO: f64 = 1.02;
/// Margin for the diagonal of a four-ring.
const DIAGONAL_MARGIN: f64 = 0.08;
/// Margin for a metal and the carbon or nitrogen behind the oxygen, sulfur or halogen that it is bonded to.
const CHELATE_MARGIN: f64 = 0.08;

/// A pair near enough for a bond.
#[derive(Clone, Copy, Debug)]
struct Near {
    a: u32,
    b: u32,
    /// Length over radius sum.
    ratio: f64,
    kept: bool,
}

/// How far beyond the radius sum a bond of two elements may reach [Å]; `None`: these never bond.
fn tolerance(a: i32, b: i32) -> Option<f64> {
    use Kind::{Halogen, Hydrogen, NobleGas, NonMetal, SBlock};
    let (one, other) = (kind(a), kind(b));
    Some(match (one, other) {
        (NobleGas, NobleGas) => return None,
        (NobleGas, _) if !matches!(a, 36 | 54 | 86) || !matches!(b, 1 | 6..=9 | 17) => return None,
        (_, NobleGas) => return tolerance(b, a),
        (Hydrogen, Hydrogen) => 0.38,
        (SBlock, Hydrogen) | (Hydrogen, SBlock) => 0.20,
        (Hydrogen, _) | (_, Hydrogen) => {
            if is_electron_poor(a) || is_electron_poor(b) {
                0.42
            } else {
                0.35
            }
        }
        (SBlock, SBlock) => 0.30,
        (SBlock, _) if b == 6 => 0.15,
        (_, SBlock) if a == 6 => 0.15,
        (SBlock, NonMetal | Halogen) | (NonMetal | Halogen, SBlock) => 0.25,
        (Halogen, Halogen) => 0.40,
        _ => LARGEST_TOLERANCE,
    })
}

/// Bonds between the atoms, sorted by (a, b) with a < b, all of order 1; and the number of distances worked out.
///
/// # Errors
/// `AtomsTooClose` with the later atom of such a pair as item.
pub(super) fn connect(molecule: Molecule<'_>) -> Result<(Vec<Bond>, u64), Failure> {
    let z = molecule.atomic_number;
    let reach: Vec<f64> = z.iter().map(|&z| radii().reach(z)).collect();
    let farthest = reach.iter().fold(0.0_f64, |most, &r| most.max(r));
    let mut near = Vec::new();
    let mut clash = None;
    let evaluated = for_pairs_within(molecule.xyz, 2.0 * farthest + LARGEST_TOLERANCE, |i, j, squared| {
        let (a, b) = (i.min(j), i.max(j));
        let sum = reach[a as usize] + reach[b as usize];
        if squared < TOO_CLOSE * TOO_CLOSE * sum * sum {
            clash = Some(b);
            return false;
        }
        let widest = sum + LARGEST_TOLERANCE;
        if squared <= widest * widest {
            let length = squared.sqrt();
            if tolerance(z[a as usize], z[b as usize]).is_some_and(|tolerance| length <= sum + tolerance) {
                near.push(Near { a, b, ratio: length / sum, kept: true });
            }
        }
        true
    });
    if let Some(atom) = clash {
        return Err(Failure::new(Code::AtomsTooClose).item(atom as usize));
    }
    near.sort_unstable_by_key(|pair| (pair.a, pair.b));
    hydrogens(z, &mut near);
    shared_sides(z, &mut near);
    partners(z, &mut near);
    near.retain(|pair| pair.kept);
    Ok((near.iter().map(plain).collect(), evaluated))
}

fn plain(pair: &Near) -> Bond {
    Bond { a: pair.a, b: pair.b, order: 1.0 }
}

/// Neighbours along the pairs; drops those that are no longer kept, so that indices agree.
fn neighbours(atoms: usize, near: &mut Vec<Near>) -> Neighbours {
    near.retain(|pair| pair.kept);
    let bonds: Vec<Bond> = near.iter().map(plain).collect();
    Neighbours::new(atoms, &bonds)
}

/// Hydrogen keeps one partner; several only in a bridge between boron or metal atoms, or in the middle of a symmetric
/// hydrogen bond (F-H-F), where no end is nearer.
fn hydrogens(z: &[i32], near: &mut Vec<Near>) {
    let around = neighbours(z.len(), near);
    for (atom, _) in z.iter().enumerate().filter(|&(_, &z)| z == 1) {
        let mut own: Vec<(f64, u32, u32)> =
            around.of(atom).iter().map(|&(other, k)| (near[k as usize].ratio, other, k)).collect();
        if own.len() < 2 {
            continue;
        }
        // A non-metal at an ordinary distance owns the hydrogen, however near a large metal comes.
        let loose = |&(ratio, other, _): &(f64, u32, u32)| is_electron_poor(z[other as usize]) || ratio > 1.25;
        own.sort_unstable_by(|one, two| loose(one).cmp(&loose(two)).then(one.0.total_cmp(&two.0)));
        let Some(&(best, first, _)) = own.first() else { continue };
        for &(ratio, other, k) in own.iter().skip(1) {
            let (poor, too) = (is_electron_poor(z[first as usize]), is_electron_poor(z[other as usize]));
            let bridge = poor && too && ratio <= 1.25 * best;
            let middle = !poor && !too && z[other as usize] != 1 && best >= 1.12 && ratio <= 1.08 * best;
            if !bridge && !middle {
                near[k as usize].kept = false;
            }
        }
    }
}

/// Distances that are short only because two bonds, or two bridges, hold the atoms together.
fn shared_sides(z: &[i32], near: &mut Vec<Near>) {
    let around = neighbours(z.len(), near);
    let mut gone = Vec::new();
    // Of every atom: the atom whose partner it was seen as last (one up, so that 0 is nobody), and by which pair.
    let mut seen = vec![(0_u32, 0_u32); z.len()];
    for (k, pair) in near.iter().enumerate() {
        let (za, zb) = (z[pair.a as usize], z[pair.b as usize]);
        let (poor_a, poor_b) = (is_electron_poor(za), is_electron_poor(zb));
        let halogens = kind(za) == Kind::Halogen && kind(zb) == Kind::Halogen;
        if za == 1 || zb == 1 || (pair.ratio < 1.0 && !(poor_a && poor_b) && !halogens) {
            continue;
        }
        let mark = pair.a + 1;
        if around.of(pair.a as usize).iter().any(|&(other, _)| seen[other as usize].0 != mark) {
            for &(other, k) in around.of(pair.a as usize) {
                seen[other as usize] = (mark, k);
            }
        }
        let (mut bridges, mut hydrogen_bridges, mut shorter) = (0, 0, 0);
        for &(middle, second) in around.of(pair.b as usize) {
            let (of, first) = seen[middle as usize];
            if of != mark {
                continue;
            }
            let zm = z[middle as usize];
            let longest = near[first as usize].ratio.max(near[second as usize].ratio);
            bridges += i32::from(!is_metallic(zm));
            hydrogen_bridges += i32::from(zm == 1);
            shorter += i32::from(pair.ratio >= DIAGONAL_RATIO && pair.ratio >= longest + DIAGONAL_MARGIN);
            let triangle = !poor_a
                && !poor_b
                && !is_electron_poor(zm)
                && pair.ratio >= TRIANGLE_RATIO
                && pair.ratio >= longest + TRIANGLE_MARGIN;
            let behind = if is_metallic(za) { zb } else { za };
            let chelate = is_metallic(za) != is_metallic(zb)
                && matches!(behind, 6 | 7)
                && matches!(kind(zm), Kind::NonMetal | Kind::Halogen)
                && !matches!(zm, 5..=7)
                && pair.ratio >= 1.0
                && pair.ratio >= longest + CHELATE_MARGIN;
            // Two halogen atoms on one atom crowd each other; a three-ring with two of them is unknown.
            let crowded = halogens && pair.ratio > longest;
            if triangle || chelate || crowded {
                gone.push(k);
            }
        }
        let poor_main = |z: i32| is_electron_poor(z) && kind(z) != Kind::Transition;
        let has_ligand = |atom: u32| around.of(atom as usize).iter().any(|&(other, _)| !is_metallic(z[other as usize]));
        let salt = (kind(za) == Kind::SBlock && is_metallic(zb)) || (kind(zb) == Kind::SBlock && is_metallic(za));
        let both_poor = poor_main(za) && poor_main(zb);
        if (both_poor && hydrogen_bridges >= 2)
            || (both_poor && is_metallic(za) && is_metallic(zb) && bridges >= 2)
            || (salt && has_ligand(pair.a) && has_ligand(pair.b))
            || (!poor_a && !poor_b && shorter >= 2)
        {
            gone.push(k);
        }
    }
    for k in gone {
        near[k].kept = false;
    }
}

/// No atom keeps more partners than its element can hold; the longest in proportion goes first.
fn partners(z: &[i32], near: &mut Vec<Near>) {
    let around = neighbours(z.len(), near);
    let poor: Vec<bool> = z.iter().map(|&z| is_electron_poor(z)).collect();
    let mut count: Vec<(usize, usize)> = (0..z.len())
        .map(|atom| {
            let own = around.of(atom);
            (own.iter().filter(|&&(other, _)| !poor[other as usize]).count(), own.len())
        })
        .collect();
    let over = |atom: u32, partner: u32, count: &[(usize, usize)]| {
        let (most, most_of_all) = most_partners(z[atom as usize]);
        let (few, all) = count[atom as usize];
        all > most_of_all || (few > most && !poor[partner as usize])
    };
    let mut doubtful: Vec<usize> = near
        .iter()
        .enumerate()
        .filter(|(_, pair)| over(pair.a, pair.b, &count) || over(pair.b, pair.a, &count))
        .map(|(k, _)| k)
        .collect();
    doubtful.sort_by(|&k, &l| near[l].ratio.total_cmp(&near[k].ratio));
    for k in doubtful {
        let (a, b) = (near[k].a, near[k].b);
        if !over(a, b, &count) && !over(b, a, &count) {
            continue;
        }
        near[k].kept = false;
        for (atom, partner) in [(a, b), (b, a)] {
            let counted = &mut count[atom as usize];
            counted.1 -= 1;
            counted.0 -= usize::from(!poor[partner as usize]);
        }
    }
}
