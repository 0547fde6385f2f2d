//! Physical constants, CODATA 2022: P. J. Mohr, D. B. Newell, B. N. Taylor, E. Tiesinga, Rev. Mod. Phys. 2025, 97, 025002.
//!
//! Exact ones (by the definitions of the SI of 2019, or derived from such) are plain numbers; measured ones carry their
//! standard uncertainty. The table behind them is `tables/constants.csv`.

use crate::quantity::Quantity;

/// Elementary charge [C], exact.
pub const ELEMENTARY_CHARGE_C: f64 = 1.602176634e-19;
/// Planck constant [J s], exact.
pub const PLANCK_J_S: f64 = 6.62607015e-34;
/// Boltzmann constant [J/K], exact.
pub const BOLTZMANN_J_PER_K: f64 = 1.380649e-23;
/// Avogadro constant [1/mol], exact.
pub const AVOGADRO_PER_MOL: f64 = 6.02214076e23;
/// Speed of light in vacuum [m/s], exact.
pub const SPEED_OF_LIGHT_M_PER_S: f64 = 299792458.0;
/// Molar gas constant [J/(mol K)], exact.
pub const MOLAR_GAS_J_PER_MOL_K: f64 = 8.31446261815324;

/// Vacuum permittivity [F/m].
pub const VACUUM_PERMITTIVITY_F_PER_M: Quantity = Quantity::new(8.8541878188e-12, 1.4e-21);
/// Bohr radius [m].
pub const BOHR_RADIUS_M: Quantity = Quantity::new(5.29177210544e-11, 8.2e-21);
/// Bohr radius [Å].
pub const BOHR_RADIUS_A: Quantity = Quantity::new(0.529177210544, 8.2e-11);
/// Hartree energy [J].
pub const HARTREE_J: Quantity = Quantity::new(4.3597447222060e-18, 4.8e-30);
/// Hartree energy [eV].
pub const HARTREE_EV: Quantity = Quantity::new(27.211386245981, 3.0e-11);
/// Atomic mass constant [kg].
pub const ATOMIC_MASS_KG: Quantity = Quantity::new(1.66053906892e-27, 5.2e-37);
/// Electron mass [kg].
pub const ELECTRON_MASS_KG: Quantity = Quantity::new(9.1093837139e-31, 2.8e-40);
/// Electron mass [u].
pub const ELECTRON_MASS_U: Quantity = Quantity::new(5.485799090441e-4, 9.7e-15);

/// 1 D in C m, exact: 1e-21/c.
pub const C_M_PER_DEBYE: f64 = 3.335640951981521e-30;
/// 1 e·Å in D, exact since 2019.
pub const DEBYE_PER_E_ANGSTROM: f64 = 4.803204712570264;
/// 1 e·a0 in D.
pub const DEBYE_PER_E_BOHR: Quantity = Quantity::new(2.5417464714697, 3.9e-10);
/// 1 atomic unit of polarizability, a0³, in Å³.
pub const POLARIZABILITY_AU_A3: Quantity = Quantity::new(0.148184711171, 6.9e-11);
/// e²/(4πε0) [eV Å]: the hartree energy times the Bohr radius; the energy of two elementary charges at 1 Å.
pub const COULOMB_EV_A: Quantity = Quantity::new(14.3996454687, 2.2e-9);
/// h/(8π² u) [MHz u Å²]: a rotational constant times its moment of inertia.
pub const ROTATIONAL_MHZ_U_A2: Quantity = Quantity::new(505379.00844, 1.6e-4);

#[cfg(test)]
mod tests {
    use super::*;

    fn listed(name: &str) -> Quantity {
        let mut reader = csv::Reader::from_reader(include_str!("tables/constants.csv").as_bytes());
        for row in reader.records() {
            let row = row.unwrap_or_else(|fault| panic!("{fault}"));
            if row.get(0) == Some(name) {
                let number = |field| row.get(field).and_then(|text| text.parse().ok()).unwrap_or(f64::NAN);
                return Quantity::new(number(1), number(2));
            }
        }
        panic!("{name} is not in the table")
    }

    #[test]
    fn constants_are_those_of_the_table() {
        for (name, value) in [
            ("elementary_charge", ELEMENTARY_CHARGE_C),
            ("planck_constant", PLANCK_J_S),
            ("boltzmann_constant", BOLTZMANN_J_PER_K),
            ("avogadro_constant", AVOGADRO_PER_MOL),
            ("speed_of_light", SPEED_OF_LIGHT_M_PER_S),
            ("molar_gas_constant", MOLAR_GAS_J_PER_MOL_K),
            ("debye_C_m", C_M_PER_DEBYE),
            ("e_angstrom_debye", DEBYE_PER_E_ANGSTROM),
        ] {
            assert_eq!(listed(name), Quantity::exact(value), "{name}");
        }
        for (name, value) in [
            ("vacuum_permittivity", VACUUM_PERMITTIVITY_F_PER_M),
            ("bohr_radius", BOHR_RADIUS_M),
            ("bohr_angstrom", BOHR_RADIUS_A),
            ("hartree_energy", HARTREE_J),
            ("hartree_energy_ev", HARTREE_EV),
            ("atomic_mass_constant", ATOMIC_MASS_KG),
            ("electron_mass", ELECTRON_MASS_KG),
            ("electron_relative_atomic_mass", ELECTRON_MASS_U),
            ("e_a0_debye", DEBYE_PER_E_BOHR),
            ("polarizability_au_angstrom3", POLARIZABILITY_AU_A3),
            ("coulomb_ev_angstrom", COULOMB_EV_A),
            ("rotational_mhz_u_angstrom2", ROTATIONAL_MHZ_U_A2),
        ] {
            assert_eq!(listed(name), value, "{name}");
        }
    }

    /// Derived constants follow from the others, within the digits of their uncertainty.
    #[test]
    fn derived_constants_follow() {
        let near =
            |derived: f64, constant: Quantity| assert!((derived - constant.value).abs() < constant.u, "{derived}");
        near(HARTREE_EV.value * BOHR_RADIUS_A.value, COULOMB_EV_A);
        near(ELECTRON_MASS_KG.value / ATOMIC_MASS_KG.value, ELECTRON_MASS_U);
        near(DEBYE_PER_E_ANGSTROM * BOHR_RADIUS_A.value, DEBYE_PER_E_BOHR);
        let pi = core::f64::consts::PI;
        near(PLANCK_J_S / (8.0 * pi * pi * ATOMIC_MASS_KG.value * 1e-20) * 1e-6, ROTATIONAL_MHZ_U_A2);
        // 505379.008 is the number in common use (common practice; CODATA 2018).
        assert!((ROTATIONAL_MHZ_U_A2.value - 505379.008).abs() < 0.002);
        assert_eq!(MOLAR_GAS_J_PER_MOL_K, BOLTZMANN_J_PER_K * AVOGADRO_PER_MOL);
        assert!((1e-21 / SPEED_OF_LIGHT_M_PER_S / C_M_PER_DEBYE - 1.0).abs() < 1e-14);
        assert!((ELEMENTARY_CHARGE_C * 1e-10 / C_M_PER_DEBYE - DEBYE_PER_E_ANGSTROM).abs() < 1e-14);
        let coulomb = ELEMENTARY_CHARGE_C / (4.0 * pi * VACUUM_PERMITTIVITY_F_PER_M.value) * 1e10;
        near(coulomb, COULOMB_EV_A);
    }
}
