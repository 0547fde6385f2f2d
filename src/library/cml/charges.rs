//! What a CML molecule states about its atoms together: charges of molecules and fragments, numbers of hydrogen atoms.

use super::super::ctfile::Fault;
use super::super::xyz::LARGEST_COORDINATE_A;
use super::molecule::{Building, Total};
use crate::bonds::find::{find_bonds, given_bonds};
use crate::molecule::Molecule;
use crate::selectors::BONDS_ALTERNATING;

impl Building {
    /// An atom states more hydrogen atoms than are bonded to it, or all atoms more than there are.
    pub(super) fn hydrogens_left_out(&self) -> bool {
        let hydrogen = |atom: u32| self.record.atomic_number.get(atom as usize) == Some(&1);
        let Some(bonds) = &self.record.bonds else {
            let stated: i64 = self.hydrogens.iter().map(|&(_, count)| count).sum();
            let there = self.record.atomic_number.iter().filter(|&&z| z == 1).count();
            return usize::try_from(stated).is_ok_and(|stated| stated > there);
        };
        let mut there = vec![0_i64; self.record.atomic_number.len()];
        for bond in bonds {
            for (atom, other) in [(bond.a, bond.b), (bond.b, bond.a)] {
                if let Some(there) = there.get_mut(atom as usize).filter(|_| hydrogen(other)) {
                    *there += 1;
                }
            }
        }
        self.hydrogens.iter().any(|&(atom, count)| there.get(atom as usize).is_some_and(|&there| count > there))
    }

    /// Charges as the bonds ask for them. Of stated bonds a distant atom is witness: small ions by themselves would be
    /// taken as neutral radicals.
    fn derived_charges(&self) -> Vec<i32> {
        let atoms = self.record.atomic_number.len();
        let bonding = match &self.record.bonds {
            Some(bonds) => {
                let atomic_number = [&self.record.atomic_number[..], &[2]].concat();
                let xyz = [&self.record.xyz[..], &[[LARGEST_COORDINATE_A; 3]]].concat();
                let molecule = Molecule { atomic_number: &atomic_number, formal_charge: None, xyz: &xyz };
                given_bonds(molecule, bonds)
            }
            None => find_bonds(self.record.molecule(), BONDS_ALTERNATING),
        };
        let mut charges = bonding.map(|bonding| bonding.formal_charge).unwrap_or_default();
        charges.truncate(atoms);
        charges
    }

    /// Formal charges: those of the atoms, completed from what molecules and fragments state.
    pub(super) fn place_charges(&mut self, atoms: usize) -> Result<(), Fault> {
        let on_atoms = self.charges.iter().any(Option::is_some);
        for total in self.totals.iter().filter(|total| total.atoms.len() == 1) {
            let charge = i32::try_from(total.charge).ok().filter(|charge| charge.abs() <= 100);
            let Some(charge) = charge else {
                return Err((total.line, format!("the charge {} is beyond 100 e", total.charge)));
            };
            if let Some(slot) = self.charges.get_mut(total.atoms.start) {
                slot.get_or_insert(charge);
            }
        }
        let stated: Vec<i32> = self.charges.iter().map(|charge| charge.unwrap_or(0)).collect();
        let sum = |charges: &[i32], total: &Total| -> i64 {
            charges.get(total.atoms.clone()).unwrap_or(&[]).iter().map(|&charge| i64::from(charge)).sum()
        };
        let misses = |charges: &[i32]| {
            self.totals.iter().find(|total| sum(charges, total) != total.charge).map(|total| {
                let (found, stated) = (sum(charges, total), total.charge);
                (total.line, stated, found)
            })
        };
        let any = self.charges.iter().any(Option::is_some) || !self.totals.is_empty();
        let Some((line, charge, found)) = misses(&stated) else {
            if self.record.bonds.is_some() || atoms == 1 || any {
                self.record.formal_charge = Some(stated);
            }
            return Ok(());
        };
        if on_atoms {
            return Err((line, format!("the charge of the molecule is {charge}, that of its atoms {found}")));
        }
        let mut derived = self.derived_charges();
        for (slot, charge) in derived.iter_mut().zip(&self.charges) {
            *slot = charge.unwrap_or(*slot);
        }
        match misses(&derived) {
            None if derived.len() == atoms => {
                self.record.formal_charge = Some(derived);
                Ok(())
            }
            _ => {
                Err((line, format!("the charge {charge} of the molecule is on no atom, and the bonds do not place it")))
            }
        }
    }
}
