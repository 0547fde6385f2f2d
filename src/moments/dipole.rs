//! The dipole vector of a set of charges with its covariance.
//!
//! μ = Σ qᵢ rᵢ points from − to + (E. R. Cohen et al., Quantities, Units and Symbols in Physical Chemistry, 3rd edition,
//! IUPAC and RSC 2007; from memory). Uncertainties follow the law of propagation (JCGM 100:2008).

use super::algebra::{Mat3, Vec3, add, add_outer, apply, dot, eigen, norm, scale, sub};
use crate::charges::Charges;
use crate::constants::DEBYE_PER_E_ANGSTROM;
use crate::declare::{Argument, BONDS, Function, Kind, MOLECULES, NUMBER, SELECTOR};
use crate::molecule::Molecule;
use crate::quantity::Quantity;
use crate::selectors::{CHARGES_PEOE_1980, FRAME_AS_GIVEN, MASSES_ABUNDANT_ISOTOPE_2020, STATE_AS_LISTED};
use crate::status::{Code, Failure, remark};
use crate::tables;

/// Charges whose sum is within this of zero [e] count as neutral: the rounding of printed charges.
pub const NEUTRAL_WITHIN_E: f64 = 1e-6;

const CHARGE: Argument = Argument {
    name: "charge_e",
    label: "charge",
    shape: "atom",
    unit: "e",
    uncertainty: "u_charge_e",
    help: "Charge of each atom [e]",
    ..NUMBER
};
const VECTOR: Argument = Argument {
    name: "dipole_D",
    label: "dipole vector",
    shape: "row×3",
    unit: "D",
    uncertainty: "covariance_D2",
    help: "Dipole vector from - to + [D], with its 3 by 3 covariance [D²]",
    ..NUMBER
};
const MAGNITUDE: Argument = Argument {
    name: "magnitude_D",
    label: "dipole",
    unit: "D",
    minimum: 0.0,
    uncertainty: "u_magnitude_D",
    main: true,
    help: "Magnitude of the dipole [D]",
    ..NUMBER
};

/// Declaration of [`dipole`].
pub static DIPOLE: Function = Function {
    name: "dipole",
    family: "moments",
    kind: Kind::Molecules,
    since: 1,
    title: "Dipole vector of a molecule",
    formula: "mu = sum q r",
    arguments: &[
        Argument {
            number: 1,
            name: "model",
            label: "charge model",
            group: "charges",
            default: Some(CHARGES_PEOE_1980),
            help: "Charge model",
            ..SELECTOR
        },
        Argument {
            number: 2,
            name: "frame",
            label: "axes",
            group: "frame",
            default: Some(FRAME_AS_GIVEN),
            help: "Axes of the vector",
            ..SELECTOR
        },
        Argument { number: 3, ..MOLECULES },
        Argument { number: 4, ..BONDS },
        Argument {
            number: 5,
            required: false,
            help: "Charge of each atom [e], with CHARGES_GIVEN and only with it",
            ..CHARGE
        },
    ],
    results: &[
        Argument { number: 6, ..VECTOR },
        Argument { number: 7, ..MAGNITUDE },
        Argument {
            number: 8,
            name: "origin_A",
            label: "origin",
            shape: "row×3",
            unit: "Å",
            help: "Point about which the dipole is taken: the centre of mass [Å]",
            ..NUMBER
        },
    ],
    statuses: &[
        Code::NotAllowed,
        Code::Missing,
        Code::NotFinite,
        Code::OutOfRange,
        Code::NegativeUncertainty,
        Code::UnknownElement,
        Code::NoData,
        Code::BadBond,
        Code::AtomsTooClose,
        Code::NoAtoms,
    ],
    remarks: remark::CHARGED
        | remark::BONDS_FOUND
        | remark::CHARGES_FOUND
        | remark::IMPOSSIBLE_VALENCE
        | remark::ORDERS_NOT_ASSIGNED
        | remark::SEVERAL_FRAGMENTS
        | remark::CHARGE_SITES
        | remark::OPEN_SHELL,
    notes: &[
        "The dipole of a neutral molecule does not depend on the origin; that of an ion is taken about the centre of mass.",
        "Charges within 1e-6 e of neutral count as neutral.",
        "The net charge is known exactly: the uncertainties of the charges are conditioned on it, so that the covariance does not depend on the origin either.",
        "Where charges or positions have no known uncertainty, neither has the dipole.",
        "At a dipole of exactly 0 its uncertainty is the largest of any direction.",
    ],
    sources: &[
        "E. R. Cohen et al., Quantities, Units and Symbols in Physical Chemistry, 3rd ed., IUPAC and RSC 2007 (from memory)",
        "JCGM 100:2008, Guide to the expression of uncertainty in measurement",
        "M. Wang et al., Chinese Phys. C 2021, 45, 030003 (masses)",
    ],
    examples: &[],
};

/// Declaration of [`dipole_of_charges`].
pub static DIPOLE_OF_CHARGES: Function = Function {
    name: "dipole_of_charges",
    title: "Dipole vector of point charges",
    arguments: &[
        Argument { number: 1, ..CHARGE },
        Argument {
            number: 2,
            name: "xyz_A",
            label: "positions",
            shape: "atom",
            unit: "Å",
            minimum: -1e9,
            maximum: 1e9,
            uncertainty: "u_xyz_A",
            help: "Position of each charge [Å]; its uncertainty is alike in all directions",
            ..NUMBER
        },
    ],
    results: &[Argument { number: 3, ..VECTOR }, Argument { number: 4, ..MAGNITUDE }],
    statuses: &[
        Code::Missing,
        Code::NotFinite,
        Code::OutOfRange,
        Code::NegativeUncertainty,
        Code::NoAtoms,
        Code::Charged,
    ],
    remarks: 0,
    notes: &[
        "The charges must sum to zero within 1e-6 e.",
        "All charges and positions count as independent, so the covariance is about the given origin and grows with the distance from it.",
        "Where charges or positions have no known uncertainty, neither has the dipole.",
        "At a dipole of exactly 0 its uncertainty is the largest of any direction.",
    ],
    sources: &[
        "E. R. Cohen et al., Quantities, Units and Symbols in Physical Chemistry, 3rd ed., IUPAC and RSC 2007 (from memory)",
        "JCGM 100:2008, Guide to the expression of uncertainty in measurement",
    ],
    ..DIPOLE
};

/// A dipole vector, from − to +, with its covariance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Dipole {
    /// The vector [D].
    pub vector: [f64; 3],
    /// Its covariance [D²]; NaN throughout if not known.
    pub covariance: [[f64; 3]; 3],
    /// |μ| [D] with u = √(gᵀCg), g = μ/|μ|; at μ = 0 exactly u = √λmax(C).
    pub magnitude: Quantity,
    /// The point about which it is taken [Å].
    pub origin: [f64; 3],
    /// The charges do not sum to zero, so the vector depends on the origin.
    pub charged: bool,
}

impl Dipole {
    /// A dipole from its vector [D] and covariance [D²].
    pub fn new(vector: [f64; 3], covariance: [[f64; 3]; 3], origin: [f64; 3], charged: bool) -> Self {
        Self { vector, covariance, magnitude: magnitude(vector, &covariance), origin, charged }
    }
}

/// |μ| with its standard uncertainty; at μ = 0 exactly, where no direction is singled out, the largest of any direction.
pub(super) fn magnitude(vector: Vec3, covariance: &Mat3) -> Quantity {
    let length = norm(vector);
    if covariance.iter().flatten().any(|x| x.is_nan()) {
        return Quantity::without_u(length);
    }
    let variance = if length == 0.0 {
        let (values, _) = eigen(covariance);
        values[2]
    } else {
        let g = [vector[0] / length, vector[1] / length, vector[2] / length];
        dot(g, apply(covariance, g))
    };
    // Rounding may leave a variance a hair below zero.
    Quantity::new(length, variance.max(0.0).sqrt())
}

const UNKNOWN: Mat3 = [[f64::NAN; 3]; 3];

/// Dipole of point charges about the given origin: charges [e], positions [Å], one isotropic standard uncertainty of
/// position a charge [Å].
///
/// All inputs count as independent: C = k² (Σ u(qᵢ)² rᵢ rᵢᵀ + Σ qᵢ² u(rᵢ)² 1). `None`, or NaN of one charge, is an
/// uncertainty that is not known, and so is then the covariance; 0 is exact. The sum is taken about the centre of the
/// positions, so that charges far from the origin keep their digits; a net charge within 1e-6 e counts as none.
///
/// # Errors
/// `NoAtoms` · `Missing` (arrays of other lengths, NaN), `NotFinite`, `OutOfRange` (beyond 1e9 Å; a dipole too large for
/// a double), `NegativeUncertainty` of argument 1 (charges) or 2 (positions), the charge being the item · `Charged`.
pub fn dipole_of_charges(
    charge: &[f64],
    u_charge: Option<&[f64]>,
    xyz: &[[f64; 3]],
    u_xyz: Option<&[f64]>,
) -> Result<Dipole, Failure> {
    let n = charge.len();
    if n == 0 {
        return Err(Failure::new(Code::NoAtoms));
    }
    if u_charge.is_some_and(|u| u.len() != n) {
        return Err(Failure::of(Code::Missing, 1));
    }
    if xyz.len() != n || u_xyz.is_some_and(|u| u.len() != n) {
        return Err(Failure::of(Code::Missing, 2));
    }
    let own = &DIPOLE_OF_CHARGES;
    for (i, (&q, r)) in charge.iter().zip(xyz).enumerate() {
        own.number(1, q).map_err(|failure| failure.item(i))?;
        for &x in r {
            own.number(2, x).map_err(|failure| failure.item(i))?;
        }
    }
    for (argument, list) in [(1, u_charge), (2, u_xyz)] {
        for (i, &u) in list.unwrap_or(&[]).iter().enumerate() {
            own.uncertainty(argument, u).map_err(|failure| failure.item(i))?;
        }
    }
    let net: f64 = charge.iter().sum();
    if net.is_nan() || net.abs() > NEUTRAL_WITHIN_E {
        return Err(Failure::new(if net.is_finite() { Code::Charged } else { Code::OutOfRange }));
    }
    let vector = moment(charge, xyz, centre_of_positions(xyz));
    let covariance = match (u_charge, u_xyz) {
        (Some(u_charge), Some(u_xyz)) => {
            let mut c = [[0.0; 3]; 3];
            for (((&q, &r), &u_q), &u_r) in charge.iter().zip(xyz).zip(u_charge).zip(u_xyz) {
                add_outer(&mut c, r, u_q * u_q);
                let along = q * u_r;
                c.iter_mut().enumerate().for_each(|(k, row)| row[k] += along * along);
            }
            in_debye_squared(c)
        }
        _ => UNKNOWN,
    };
    finite(Dipole::new(vector, covariance, [0.0; 3], false))
}

/// Dipole of a molecule about its centre of mass (masses of the most abundant isotopes) with the covariance that
/// follows from the uncertainties of the charges and of the positions (one isotropic standard uncertainty for every
/// atom [Å]; NaN: not known).
///
/// A neutral molecule has the same vector about any origin. That the charges sum to the net charge is known exactly:
/// their independent variances D = diag(u²) are conditioned on it, Σ = D − D11ᵀD/(1ᵀD1), and the charges' part of the
/// covariance, k² Σᵢ uᵢ² (rᵢ − r̄)(rᵢ − r̄)ᵀ with r̄ = Σ u² r/Σ u², no longer depends on the origin. The positions' part is
/// k² u_x² Σ (qᵢ − Q mᵢ/M)² 1, because the centre of mass of an ion moves with its atoms.
///
/// # Errors
/// As [`Molecule::check`] · `Missing` (charges of another number) · `NegativeUncertainty`, `NotFinite` (the uncertainty of
/// position) · `OutOfRange` (a dipole too large for a double).
#[allow(non_snake_case)] // Units are part of names.
pub fn dipole(molecule: Molecule<'_>, charges: &Charges, position_uncertainty_A: f64) -> Result<Dipole, Failure> {
    let masses = masses(molecule)?;
    let n = molecule.len();
    if charges.charge.len() != n || charges.u.as_ref().is_some_and(|u| u.len() != n) {
        return Err(Failure::of(Code::Missing, 5));
    }
    DIPOLE.uncertainty(0, position_uncertainty_A)?;
    let total: f64 = masses.iter().sum();
    let origin = centre(molecule.xyz, &masses, total);
    let net = charges.sum();
    let charged = net.is_nan() || net.abs() > NEUTRAL_WITHIN_E;
    let vector = moment(&charges.charge, molecule.xyz, origin);
    let covariance = match &charges.u {
        Some(u) if !position_uncertainty_A.is_nan() => {
            let mut c = [[0.0; 3]; 3];
            let weights: Vec<f64> = u.iter().map(|u| u * u).collect();
            let weight: f64 = weights.iter().sum();
            if weight > 0.0 {
                let mean = centre(molecule.xyz, &weights, weight);
                for (&r, &w) in molecule.xyz.iter().zip(&weights) {
                    add_outer(&mut c, sub(r, mean), w);
                }
            } else if weight.is_nan() {
                c = UNKNOWN;
            }
            let q_net = if charged { net } else { 0.0 };
            let mut along = 0.0;
            for (&q, &m) in charges.charge.iter().zip(&masses) {
                let lever = (q - q_net * (m / total)) * position_uncertainty_A;
                along += lever * lever;
            }
            c.iter_mut().enumerate().for_each(|(k, row)| row[k] += along);
            in_debye_squared(c)
        }
        _ => UNKNOWN,
    };
    finite(Dipole::new(vector, covariance, origin, charged))
}

/// The centre of mass [Å], with the masses of the most abundant isotopes.
pub(super) fn centre_of_mass(molecule: Molecule<'_>) -> Result<Vec3, Failure> {
    let masses = masses(molecule)?;
    Ok(centre(molecule.xyz, &masses, masses.iter().sum()))
}

fn masses(molecule: Molecule<'_>) -> Result<Vec<f64>, Failure> {
    molecule.check()?;
    let mut masses = Vec::with_capacity(molecule.len());
    for (i, &z) in molecule.atomic_number.iter().enumerate() {
        let entry = tables::entry(MASSES_ABUNDANT_ISOTOPE_2020, z, STATE_AS_LISTED);
        masses.push(entry.map_err(|failure| failure.item(i))?.value);
    }
    Ok(masses)
}

/// Σ w r/Σ w, summed about the first point so that a molecule far from the origin keeps its digits.
fn centre(xyz: &[Vec3], weights: &[f64], total: f64) -> Vec3 {
    let first = xyz.first().copied().unwrap_or_default();
    let mut sum = [0.0; 3];
    for (&r, &w) in xyz.iter().zip(weights) {
        sum = add(sum, scale(sub(r, first), w / total));
    }
    add(first, sum)
}

pub(super) fn centre_of_positions(xyz: &[Vec3]) -> Vec3 {
    centre(xyz, &vec![1.0; xyz.len()], xyz.len() as f64)
}

/// Σ q (r − centre) in D.
fn moment(charge: &[f64], xyz: &[Vec3], centre: Vec3) -> Vec3 {
    let mut sum = [0.0; 3];
    for (&q, &r) in charge.iter().zip(xyz) {
        sum = add(sum, scale(sub(r, centre), q));
    }
    // Adding 0 turns −0 into 0.
    add(scale(sum, DEBYE_PER_E_ANGSTROM), [0.0; 3])
}

fn in_debye_squared(c: Mat3) -> Mat3 {
    let k = DEBYE_PER_E_ANGSTROM;
    c.map(|row| row.map(|x| x * k * k + 0.0))
}

fn finite(dipole: Dipole) -> Result<Dipole, Failure> {
    let whole = dipole.magnitude.value.is_finite() && !dipole.covariance.iter().flatten().any(|x| x.is_infinite());
    if whole { Ok(dipole) } else { Err(Failure::new(Code::OutOfRange)) }
}
