//! What it costs an atom to have a valence and a charge.
//!
//! Costs are integers, so that sums are exact and do not depend on the order of atoms. One unit is about the cost of a
//! separated elementary charge; the numbers are a convention that puts the structural formulas of common practice
//! first: octets before open shells, few charges, expanded valence of the third row (S, P, Cl) before charged octets.

use super::kinds::{Kind, group, is_electron_poor, kind, valence_electrons};

/// One unit of cost.
pub(super) const UNIT: i64 = 1_000_000;
/// Cost of what no formula shows; sums of many stay within 64 bits.
pub(super) const FORBIDDEN: i64 = 10_000 * UNIT;
/// Most double-bond increments that an atom can have (XeO4).
pub(super) const MOST_PI: usize = 4;
/// Cost where the charge stated belongs to another valence.
const MISMATCH: i64 = 20 * UNIT;

/// What the surroundings of an atom say about its state.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Shape {
    /// Partners by bonds that get an order.
    pub partners: usize,
    /// Two partners on opposite sides (angle above 150°).
    pub linear: bool,
    /// Three partners in a clear pyramid.
    pub pyramidal: bool,
    /// A terminal oxygen or sulfur atom that may have a triple bond: on the carbon of CO, CS or of a linear acylium ion,
    /// or at the short distance of NO+.
    pub triple: bool,
    /// Four partners in a square.
    pub square: bool,
    /// There is also a partner by a bond without order.
    pub shared: bool,
    /// Boron (and its partners in bridges) in a cluster, where bonds without order leave no charge behind.
    pub cluster: bool,
    /// Neutral with one bond less than usual: oxygen of a nitroxide, carbon of dicarbon.
    pub radical: bool,
    /// Charge of this atom if it is carbon (or silicon …) of valence 3.
    pub trivalent_charge: i32,
    /// Charge that the caller states.
    pub stated: Option<i32>,
}

/// Charges possible at a valence with their costs in hundredths of a unit, the usual one first.
fn options(z: i32, shape: &Shape, valence: i32) -> &'static [(i32, i64)] {
    const TRIVALENT: [&[(i32, i64)]; 3] =
        [&[(-1, 500), (0, 500), (1, 500)], &[(0, 500), (-1, 500), (1, 500)], &[(1, 500), (0, 500), (-1, 500)]];
    let trivalent = || match shape.trivalent_charge {
        ..=-1 => TRIVALENT[0],
        0 => TRIVALENT[1],
        _ => TRIVALENT[2],
    };
    match (kind(z), group(z), z, valence) {
        (Kind::Hydrogen, _, _, 1) => &[(0, 0)],
        (Kind::Hydrogen, _, _, 0) => &[(1, 200), (-1, 300), (0, 300)],
        (Kind::SBlock, 1, _, 1) => &[(0, 0)],
        (Kind::SBlock, 1, _, 0) => &[(1, 0), (0, 100)],
        (_, 2 | 12, _, 2) => &[(0, 0)],
        (_, 2 | 12, _, 1) => &[(0, 300), (1, 100)],
        (_, 2 | 12, _, 0) => &[(2, 0), (0, 100)],
        (_, 13, _, 3) => &[(0, 0)],
        (_, 13, _, 4) => {
            if shape.partners >= 4 {
                &[(-1, 150)]
            } else {
                &[(-1, 300)]
            }
        }
        (_, 13, _, 2) => &[(0, 500), (1, 500), (-1, 500)],
        (_, 13, _, 1) => &[(0, 300), (2, 600)],
        (_, 13, _, 0) => &[(3, 0), (1, 0), (0, 300)],
        (_, 14, _, 4) => &[(0, 0)],
        (_, 14, 6, 2) if shape.radical => &[(0, 0)],
        (_, 14, 6, 3) => {
            if shape.partners == 1 {
                &[(-1, 250), (0, 500), (1, 500)]
            } else {
                trivalent()
            }
        }
        (_, 14, 6, 2) => &[(0, 700), (-2, 900), (2, 900)],
        (_, 14, 6, 1) => &[(0, 1600), (-3, 1600), (-1, 1600)],
        (_, 14, 6, 0) => &[(0, 2000), (-4, 2000)],
        (_, 14, 6, _) => &[],
        (_, 14, _, 3) => trivalent(),
        (_, 14, 50 | 82, 2) => &[(0, 100)],
        (_, 14, _, 2) => &[(0, 300)],
        (_, 14, _, 1) => &[(0, 800), (1, 800)],
        (_, 14, _, 5 | 6) if (shape.partners as i32) < valence => &[],
        (_, 14, _, 5) => &[(-1, 300)],
        (_, 14, _, 6) => &[(-2, 300)],
        (_, 14, _, 0) => &[(0, 1000), (4, 0), (2, 0)],
        (_, 15, _, 3) => &[(0, 0)],
        (_, 15, 7, 4) => &[(1, 150), (0, 700)],
        (_, 15, 7, 2) if shape.partners == 1 => &[(-1, 150), (0, 400), (1, 500)],
        (_, 15, 7, 2) => &[(-1, 250), (0, 400), (1, 500)],
        (_, 15, 7, 1) => &[(0, 700), (-2, 800)],
        (_, 15, 7, 5) if shape.partners <= 3 => &[(0, 800)],
        (_, 15, 7, 0) => &[(-3, 900), (0, 900)],
        (_, 15, 7, _) => &[],
        (_, 15, _, 5) => &[(0, 30)],
        (_, 15, _, 4) => &[(1, 200), (-1, 300), (0, 600)],
        (_, 15, _, 2) => &[(-1, 250), (0, 500), (1, 500)],
        (_, 15, _, 6) => {
            if shape.partners >= 6 {
                &[(-1, 200)]
            } else {
                &[]
            }
        }
        (_, 15, _, 1) => &[(0, 700), (-2, 800)],
        (_, 15, _, 0) => &[(-3, 900), (3, 600), (0, 900)],
        (_, 16, _, 2) => &[(0, 0)],
        (_, 16, _, 0) => &[(-2, 400), (0, 500)],
        (_, 16, 8, 1) if shape.radical => &[(0, 0)],
        (_, 16, 8, 1) => &[(-1, 230), (0, 900), (1, 900)],
        (_, 16, _, 3) if shape.partners == 1 => {
            if shape.triple {
                &[(1, 150)]
            } else {
                &[]
            }
        }
        (_, 16, 8, 3) => &[(1, 150)],
        (_, 16, 8, _) => &[],
        (_, 16, _, 1) => &[(-1, 180), (0, 900), (1, 900)],
        (_, 16, _, 3) => &[(1, 300), (-1, 400), (0, 600)],
        (_, 16, _, 4) => &[(0, 50)],
        (_, 16, _, 5) => {
            if shape.partners >= 5 {
                &[(1, 400), (-1, 400), (0, 600)]
            } else {
                &[(1, 800)]
            }
        }
        (_, 16, _, 6) => &[(0, 70)],
        (_, 17, _, 1) => &[(0, 0)],
        (_, 17, _, 0) => &[(-1, 150), (0, 300), (1, 900)],
        (_, 17, 9, 2) => &[(1, 800)],
        (_, 17, 9, _) => &[],
        (_, 17, _, 2) => {
            if shape.linear {
                &[(-1, 300), (1, 300), (0, 600)]
            } else {
                &[(1, 300), (-1, 300), (0, 600)]
            }
        }
        (_, 17, _, 3) => &[(0, 50)],
        (_, 17, _, 4) if shape.partners < 4 => &[(1, 600), (0, 900)],
        (_, 17, _, 4) => {
            if shape.square {
                &[(-1, 300), (1, 300), (0, 600)]
            } else {
                &[(1, 300), (-1, 300), (0, 600)]
            }
        }
        (_, 17, _, 5) => &[(0, 60)],
        (_, 17, _, 6) => {
            if shape.partners >= 6 {
                &[(1, 300), (-1, 300)]
            } else {
                &[(1, 600)]
            }
        }
        (_, 17, _, 7) => &[(0, 70)],
        (Kind::NobleGas, _, _, 0) => &[(0, 0)],
        (Kind::NobleGas, _, 36 | 54 | 86, 2 | 4 | 6 | 8) => &[(0, 50)],
        (Kind::NobleGas, _, _, 1) => &[(1, 300)],
        (Kind::Transition, _, _, 0) => &[(0, 0)],
        _ => &[],
    }
}

/// Charge and cost of an atom of this valence (sum of its bond orders, bonds without order left out).
///
/// A charge that the caller states is kept; where it fits no listed state of this valence the cost says so. Electron-poor
/// atoms with bonds without order count as ions there: boron with two terminal hydrogens is B+ before its bridges count.
pub(super) fn charge_and_cost(z: i32, shape: &Shape, valence: i32) -> (i32, i64) {
    let options = options(z, shape, valence);
    if let Some(stated) = shape.stated {
        let cost = match options.iter().find(|option| option.0 == stated) {
            Some(&(_, cost)) => cost * (UNIT / 100),
            None if shape.shared || kind(z) == Kind::Transition => UNIT,
            None => MISMATCH + if options.is_empty() { MISMATCH * i64::from(valence.max(0)) } else { 0 },
        };
        return (stated, cost);
    }
    if shape.cluster {
        return (0, 0);
    }
    if shape.shared {
        if is_electron_poor(z) {
            return (valence_electrons(z) - valence, 0);
        }
        if group(z) == 14 && valence == 3 {
            return (-1, UNIT);
        }
    }
    options.first().map_or((0, FORBIDDEN), |&(charge, cost)| (charge, cost * (UNIT / 100)))
}

/// True if some formula shows this element with this valence and charge.
pub(super) fn is_possible(z: i32, shape: &Shape, valence: i32, charge: i32) -> bool {
    match kind(z) {
        Kind::Transition => return true,
        _ if shape.shared || shape.cluster => return valence <= 6,
        _ => {}
    }
    let bare = matches!((z, valence), (6, 0 | 1) | (7, 0));
    !bare && options(z, shape, valence).iter().any(|option| option.0 == charge)
}

/// Cost of `pi` double-bond increments at the angles of this atom.
pub(super) fn angle_cost(z: i32, shape: &Shape, pi: usize) -> i64 {
    if matches!(z, 16 | 34 | 52) && shape.partners == 3 && pi == 3 && shape.pyramidal {
        // SO3 is flat, sulfite is a pyramid.
        return 20 * UNIT;
    }
    if !matches!(z, 6 | 7) {
        return 0;
    }
    let hundredths = match (shape.partners, pi) {
        (2, 0 | 1) if shape.linear => 300,
        (2, 2..) if !shape.linear => {
            if z == 6 {
                150
            } else {
                300
            }
        }
        (3, 1..) if shape.pyramidal => 300,
        _ => 0,
    };
    hundredths * (UNIT / 100)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Formal charges of textbook octets: N 4 bonds +1, O 1 bond −1, C 3 bonds with a lone pair −1, B 4 bonds −1.
    #[test]
    fn octets_have_their_charges() {
        let shape = Shape { partners: 1, ..Shape::default() };
        assert_eq!(charge_and_cost(7, &shape, 4).0, 1);
        assert_eq!(charge_and_cost(8, &shape, 1).0, -1);
        assert_eq!(charge_and_cost(6, &shape, 3).0, -1);
        assert_eq!(charge_and_cost(5, &shape, 4).0, -1);
        assert_eq!(charge_and_cost(6, &shape, 5).1, FORBIDDEN);
    }

    #[test]
    fn a_stated_charge_is_kept() {
        let shape = Shape { stated: Some(1), ..Shape::default() };
        assert_eq!(charge_and_cost(7, &shape, 3).0, 1);
        assert!(charge_and_cost(7, &shape, 3).1 > charge_and_cost(7, &shape, 4).1);
    }
}
