//! The verdict: polar, non-polar, undecided or charged.

use super::algebra::{eigen, norm};
use super::dipole::{Dipole, NEUTRAL_WITHIN_E, centre_of_mass, dipole, magnitude};
use super::flexibility::{greatest_dipole, may_change_by_turning};
use super::rotors::forbidden_with_free_rotors;
use super::symmetry::{DipoleSymmetry, dipole_symmetry};
use crate::charges::Charges;
use crate::declare::{Argument, Function, Kind, NUMBER};
use crate::molecule::{Bonding, Molecule, Neighbours};
use crate::selectors::{POLARITY_CHARGED, POLARITY_NON_POLAR, POLARITY_POLAR, POLARITY_UNDECIDED, Selector};
use crate::status::{Code, Failure, remark};

/// Limit below which a dipole counts as none, unless the caller says otherwise [D].
pub const LIMIT_D: f64 = 0.2;

/// Tolerance within which a point group is recognised [Å].
pub const SYMMETRY_WITHIN_A: f64 = 0.01;

/// Root mean square difference [D] between |μ| from PEOE charges and the measured dipole over the 93 molecules of the open
/// set that the model has types for and whose point group allows a dipole. The model states no uncertainty; for the
/// verdict this number stands for the standard uncertainty of every component, C = u² 1. That is a convention: magnitudes
/// say nothing about errors of direction.
pub const PEOE_RMS_D: f64 = 0.77;

/// Radius, in standard deviations, of the sphere that holds 95 % of a three-dimensional normal distribution
/// (χ²(0.95; 3) = 7.815, whose root is 2.796).
const RADIUS_95: f64 = 2.8;

/// Declaration of [`polarity`].
pub static DIPOLE_POLARITY: Function = Function {
    name: "dipole_polarity",
    family: "moments",
    kind: Kind::Scalar,
    since: 1,
    title: "Polar or not, from a dipole vector and its covariance",
    formula: "polar: |mu| - 2 u > L; non-polar: |mu| + 2.8 sqrt(lambda_max(C)) <= L",
    arguments: &[
        Argument {
            number: 1,
            name: "limit_D",
            label: "limit",
            shape: "call",
            unit: "D",
            minimum: 0.0,
            above: true,
            default_number: LIMIT_D,
            help: "Dipole up to which a molecule counts as non-polar [D]",
            ..NUMBER
        },
        Argument {
            number: 2,
            name: "dipole_D",
            label: "dipole vector",
            shape: "row×3",
            unit: "D",
            uncertainty: "covariance_D2",
            help: "Dipole vector [D], with its 3 by 3 covariance [D²]",
            ..NUMBER
        },
    ],
    results: &[Argument {
        number: 3,
        name: "polarity",
        label: "polarity",
        holds: crate::declare::Holds::Selector,
        group: "polarity",
        main: true,
        help: "Polar, non-polar or undecided",
        ..NUMBER
    }],
    statuses: &[Code::Missing, Code::NotFinite, Code::OutOfRange, Code::NegativeUncertainty],
    remarks: 0,
    notes: &[
        "A vector without a known covariance cannot be judged: MISSING.",
        "2.8 is the 95 % radius of a three-dimensional normal distribution, so non-polar means: no direction hides a dipole above the limit.",
    ],
    sources: &[
        "common practice: JCGM 100:2008 with coverage factor 2; chi-squared distribution of three degrees of freedom",
    ],
    examples: &[],
};

/// Polar, non-polar or undecided: `polar` if |μ| − 2u > L; `non-polar` if |μ| + 2.8 √λmax(C) ≤ L; else `undecided`, with u the
/// standard uncertainty along μ, C the covariance [D²] and L the limit [D].
///
/// # Errors
/// Of argument 1: `Missing`, `NotFinite`, `OutOfRange` (limit not above 0). Of argument 2: `Missing` (no vector, or no
/// covariance: take the rms of the model), `NotFinite`, `NegativeUncertainty` (a negative variance), `OutOfRange` (a matrix
/// that is not symmetric or has a negative eigenvalue).
#[allow(non_snake_case)] // Units are part of names.
pub fn polarity(vector: [f64; 3], covariance: &[[f64; 3]; 3], limit_D: f64) -> Result<Selector, Failure> {
    let limit = DIPOLE_POLARITY.number(1, limit_D)?;
    for x in vector {
        DIPOLE_POLARITY.number(2, x)?;
    }
    for x in covariance.iter().flatten() {
        DIPOLE_POLARITY.number(2, *x)?;
    }
    let [[xx, xy, xz], [yx, yy, yz], [zx, zy, zz]] = *covariance;
    if xx < 0.0 || yy < 0.0 || zz < 0.0 {
        return Err(Failure::of(Code::NegativeUncertainty, 2));
    }
    let (values, _) = eigen(covariance);
    let slack = 1e-9 * (xx + yy + zz);
    let symmetric = (xy - yx).abs() <= slack && (xz - zx).abs() <= slack && (yz - zy).abs() <= slack;
    if !symmetric || values[0] < -slack {
        return Err(Failure::of(Code::OutOfRange, 2));
    }
    let length = magnitude(vector, covariance);
    if length.value - 2.0 * length.u > limit {
        Ok(POLARITY_POLAR)
    } else if norm(vector) + RADIUS_95 * values[2].max(0.0).sqrt() <= limit {
        Ok(POLARITY_NON_POLAR)
    } else {
        Ok(POLARITY_UNDECIDED)
    }
}

/// A dipole to report and what it says of the molecule.
#[derive(Clone, Copy, Debug, PartialEq)]
#[allow(non_snake_case)] // Units are part of names.
pub struct Verdict {
    /// The dipole: exactly 0 with no uncertainty where the point group forbids one.
    pub dipole: Dipole,
    /// A selector of the group `polarity`.
    pub polarity: Selector,
    /// Remark bits: `CHARGED`, `BY_SYMMETRY`, `ONE_CONFORMER`, `SEVERAL_FRAGMENTS`.
    pub remarks: i32,
    /// The greatest |μ| [D] that turning about bonds can reach; NaN where it was not needed.
    pub bound_D: f64,
    /// The model has no uncertainty of its own and was judged with its rms.
    pub by_rms: bool,
}

/// The dipole and the verdict of one molecule.
///
/// `charges` are those of the chosen model, or why there are none; `model_rms_D` stands for the uncertainty of a model
/// that states none ([`PEOE_RMS_D`]; NaN: judge only with an uncertainty). In this order:
/// - the point group forbids a dipole (within 0.01 Å): the dipole is exactly 0, with any charges or none, `BY_SYMMETRY`;
///   rotors XY3 such as methyl and CF3 count as turning freely, so that their setting does not matter (p-xylene);
/// - a net charge: `charged`, the dipole being about the centre of mass;
/// - else the rule of [`polarity`].
///
/// One conformer is not the molecule: what would be non-polar is `undecided` with `ONE_CONFORMER` if turning about bonds
/// or inverting rings may bring the dipole above the limit ([`greatest_dipole`]), or if without charges that is not known.
///
/// # Errors
/// Why there are no charges, if the point group allows a dipole · as [`dipole`] and [`polarity`].
#[allow(non_snake_case)] // Units are part of names.
pub fn verdict(
    molecule: Molecule<'_>,
    bonding: &Bonding,
    charges: Result<&Charges, Failure>,
    position_uncertainty_A: f64,
    limit_D: f64,
    model_rms_D: f64,
) -> Result<Verdict, Failure> {
    molecule.check()?;
    let limit = DIPOLE_POLARITY.number(1, limit_D)?;
    let around = Neighbours::new(molecule.len(), &bonding.bonds);
    let several = around.fragments().1 > 1;
    let mut remarks = if several { remark::SEVERAL_FRAGMENTS } else { 0 };
    let order = |bond: u32| bonding.bonds.get(bond as usize).map_or(0.0, |bond| bond.order);
    let forbidden = dipole_symmetry(molecule, SYMMETRY_WITHIN_A)? == DipoleSymmetry::Forbidden
        || forbidden_with_free_rotors(molecule, &around, &order, SYMMETRY_WITHIN_A)?;
    let reported = if forbidden {
        remarks |= remark::BY_SYMMETRY;
        let charged = match charges {
            Ok(charges) => charges.sum().abs() > NEUTRAL_WITHIN_E,
            Err(_) => formal_net(molecule, bonding) != 0,
        };
        Dipole::new([0.0; 3], [[0.0; 3]; 3], centre_of_mass(molecule)?, charged)
    } else {
        dipole(molecule, charges?, position_uncertainty_A)?
    };
    if reported.charged {
        remarks |= remark::CHARGED;
        let polarity = POLARITY_CHARGED;
        return Ok(Verdict { dipole: reported, polarity, remarks, bound_D: f64::NAN, by_rms: false });
    }
    let by_rms = reported.covariance.iter().flatten().any(|x| x.is_nan());
    let covariance = if by_rms { isotropic(model_rms_D) } else { reported.covariance };
    let decided = polarity(reported.vector, &covariance, limit)?;
    if decided != POLARITY_NON_POLAR {
        return Ok(Verdict { dipole: reported, polarity: decided, remarks, bound_D: f64::NAN, by_rms });
    }
    let bound_D = match charges {
        Ok(charges) => greatest_dipole(molecule, bonding, charges)?.bound_D,
        Err(_) if may_change_by_turning(molecule, bonding) => f64::INFINITY,
        Err(_) => 0.0,
    };
    let polarity = if bound_D > limit {
        remarks |= remark::ONE_CONFORMER;
        POLARITY_UNDECIDED
    } else {
        POLARITY_NON_POLAR
    };
    Ok(Verdict { dipole: reported, polarity, remarks, bound_D, by_rms })
}

/// u² 1: a standard uncertainty alike in every direction.
fn isotropic(u: f64) -> [[f64; 3]; 3] {
    let none = if u.is_nan() { f64::NAN } else { 0.0 };
    let v = u * u;
    [[v, none, none], [none, v, none], [none, none, v]]
}

fn formal_net(molecule: Molecule<'_>, bonding: &Bonding) -> i64 {
    let formal = if bonding.formal_charge.len() == molecule.len() {
        &bonding.formal_charge[..]
    } else {
        molecule.formal_charge.unwrap_or(&[])
    };
    formal.iter().map(|&q| i64::from(q)).sum()
}
