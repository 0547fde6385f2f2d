//! Answers for whole molecules: bonds, charges, dipoles.

use std::fmt::Display;
use std::ptr::{null, null_mut};

use bondmoment::c_api::{bonds, charges, library, moments};
use bondmoment::selectors as s;

use super::{Sheet, all_bits, bits, group};

fn all<T: Display>(values: &[T]) -> String {
    values.iter().map(T::to_string).collect::<Vec<_>>().join(",")
}

impl Sheet {
    pub fn molecule(&mut self, name: &str) {
        let m = Molecule::read(name);
        let n = m.z.len();
        let n_atoms = n as i64;
        self.0.push_str(&format!(
            "molecule name={name} atomic_number={} formal_charge={} xyz_A={} bond_atoms={} bond_order={}\n",
            all(&m.z),
            all(&m.formal),
            all_bits(&m.xyz),
            all(&m.pairs),
            all_bits(&m.order)
        ));
        for rule in group("bond_rule") {
            let room = 4 * n;
            let (mut pairs, mut order, mut length) = (vec![0; 2 * room], vec![0.0; room], vec![0.0; room]);
            let mut formal = vec![0; n];
            let (mut needed, mut remarks, mut item) = (0_i64, 0, 0);
            // SAFETY: as above.
            let status = unsafe {
                bonds::bmom_find_bonds(
                    rule,
                    n_atoms,
                    m.z.as_ptr(),
                    null(),
                    m.xyz.as_ptr(),
                    pairs.as_mut_ptr(),
                    order.as_mut_ptr(),
                    length.as_mut_ptr(),
                    formal.as_mut_ptr(),
                    room as i64,
                    &raw mut needed,
                    &raw mut remarks,
                    &raw mut item,
                )
            };
            let found = needed as usize;
            let results = format!(
                "found_atoms={} found_order={} found_length_A={} found_formal_charge={} remarks={remarks} item={item}",
                all(&pairs[..2 * found]),
                all_bits(&order[..found]),
                all_bits(&length[..found]),
                all(&formal)
            );
            self.line(&format!("find_bonds rule={rule} molecule={name}"), status, &results);
        }
        let model = s::CHARGES_PEOE_1980.0;
        let (mut charge, mut u) = (vec![0.0; n], vec![0.0; n]);
        let (mut remarks, mut item) = (0, 0);
        // SAFETY: as above.
        let status = unsafe {
            charges::bmom_partial_charges(
                model,
                n_atoms,
                m.z.as_ptr(),
                m.formal.as_ptr(),
                m.xyz.as_ptr(),
                m.order.len() as i64,
                m.pairs.as_ptr(),
                m.order.as_ptr(),
                charge.as_mut_ptr(),
                u.as_mut_ptr(),
                &raw mut remarks,
                &raw mut item,
            )
        };
        let results = format!("charge_e={} u_charge_e={} remarks={remarks}", all_bits(&charge), all_bits(&u));
        self.line(&format!("partial_charges model={model} molecule={name}"), status, &results);
        self.dipole(name, &m, model, None);
        if status == 0 {
            // The model's charges as the caller's own, with an invented uncertainty.
            self.dipole(name, &m, s::CHARGES_GIVEN.0, Some((&charge, &vec![0.012; n])));
            self.dipole_of_charges(&m, &charge);
        }
    }

    fn dipole(&mut self, name: &str, m: &Molecule, model: i32, given: Option<(&[f64], &[f64])>) {
        let frame = s::FRAME_AS_GIVEN.0;
        let (mut vector, mut covariance, mut origin) = ([0.0; 3], [0.0; 9], [0.0; 3]);
        let (mut value, mut u, mut remarks, mut item) = (0.0, 0.0, 0, 0);
        let (charge, u_charge) = given.map_or((null(), null()), |(charge, u)| (charge.as_ptr(), u.as_ptr()));
        // SAFETY: as above.
        let status = unsafe {
            moments::bmom_dipole(
                model,
                frame,
                m.z.len() as i64,
                m.z.as_ptr(),
                m.formal.as_ptr(),
                m.xyz.as_ptr(),
                m.order.len() as i64,
                m.pairs.as_ptr(),
                m.order.as_ptr(),
                charge,
                u_charge,
                vector.as_mut_ptr(),
                covariance.as_mut_ptr(),
                &raw mut value,
                &raw mut u,
                origin.as_mut_ptr(),
                &raw mut remarks,
                &raw mut item,
            )
        };
        let with = given
            .map_or(String::new(), |(charge, u)| format!(" charge_e={} u_charge_e={}", all_bits(charge), all_bits(u)));
        let results = format!(
            "dipole_D={} covariance_D2={} magnitude_D={} u_magnitude_D={} origin_A={} remarks={remarks}",
            all_bits(&vector),
            all_bits(&covariance),
            bits(value),
            bits(u),
            all_bits(&origin)
        );
        self.line(&format!("dipole model={model} frame={frame} molecule={name}{with}"), status, &results);
        if status == 0 && given.is_some() {
            let (limit, mut polarity) = (0.2, 0);
            // SAFETY: as above.
            let status = unsafe {
                moments::bmom_dipole_polarity(limit, vector.as_ptr(), covariance.as_ptr(), &raw mut polarity)
            };
            let (vector, covariance) = (all_bits(&vector), all_bits(&covariance));
            let given = format!("dipole_polarity limit_D={} dipole_D={vector} covariance_D2={covariance}", bits(limit));
            self.line(&given, status, &format!("polarity={polarity}"));
        }
    }

    fn dipole_of_charges(&mut self, m: &Molecule, charge: &[f64]) {
        let (u_charge, u_xyz) = (vec![0.012; charge.len()], vec![0.003; charge.len()]);
        let (mut vector, mut covariance, mut value, mut u) = ([0.0; 3], [0.0; 9], 0.0, 0.0);
        // SAFETY: as above.
        let status = unsafe {
            moments::bmom_dipole_of_charges(
                charge.len() as i64,
                charge.as_ptr(),
                u_charge.as_ptr(),
                m.xyz.as_ptr(),
                u_xyz.as_ptr(),
                vector.as_mut_ptr(),
                covariance.as_mut_ptr(),
                &raw mut value,
                &raw mut u,
            )
        };
        let given = format!(
            "dipole_of_charges charge_e={} u_charge_e={} xyz_A={} u_xyz_A={}",
            all_bits(charge),
            all_bits(&u_charge),
            all_bits(&m.xyz),
            all_bits(&u_xyz)
        );
        let results = format!(
            "dipole_D={} covariance_D2={} magnitude_D={} u_magnitude_D={}",
            all_bits(&vector),
            all_bits(&covariance),
            bits(value),
            bits(u)
        );
        self.line(&given, status, &results);
    }
}

/// A molecule of tests/published/molecules as arrays.
struct Molecule {
    z: Vec<i32>,
    formal: Vec<i32>,
    xyz: Vec<f64>,
    pairs: Vec<i32>,
    order: Vec<f64>,
}

impl Molecule {
    fn read(name: &str) -> Self {
        let path = format!("{}/tests/published/molecules/{name}.mol", env!("CARGO_MANIFEST_DIR"));
        let mut handle = null_mut();
        let (mut molecules, mut atoms, mut bonds) = (0, 0, 0);
        // SAFETY: as above; the library is freed once, after its last use.
        unsafe {
            let format = s::FORMAT_CTFILE.0;
            let status = library::bmom_library_read(
                format,
                null(),
                1,
                null(),
                path.as_ptr().cast(),
                path.len() as i64,
                &raw mut handle,
            );
            assert_eq!(status, 0, "{path}");
            library::bmom_library_size(handle, &raw mut molecules, &raw mut atoms, &raw mut bonds);
            let (atoms, bonds) = (atoms as usize, bonds as usize);
            let mut molecule = Self {
                z: vec![0; atoms],
                formal: vec![0; atoms],
                xyz: vec![0.0; 3 * atoms],
                pairs: vec![0; 2 * bonds],
                order: vec![0.0; bonds],
            };
            let status = library::bmom_library_arrays(
                handle,
                null_mut(),
                molecule.z.as_mut_ptr(),
                molecule.formal.as_mut_ptr(),
                molecule.xyz.as_mut_ptr(),
                null_mut(),
                molecule.pairs.as_mut_ptr(),
                molecule.order.as_mut_ptr(),
                null_mut(),
            );
            library::bmom_library_free(handle);
            assert_eq!((molecules, status), (1, 0), "{path}");
            molecule
        }
    }
}
