//! Physical constants, CODATA 2022.

/// 1 e·Å in D, exact since 2019.
pub const DEBYE_PER_E_ANGSTROM: f64 = 4.8032047125702642;
