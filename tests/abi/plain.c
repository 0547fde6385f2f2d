/* A program as a user writes it: names of statuses, a look-up, a charge from a dipole, the dipole of point charges. */
#include <stdio.h>
#include <string.h>

#include "bondmoment.h"

int main(void)
{
  /* Water: charges by choice, O at the origin, O-H 0.9584 A, H-O-H 104.45 degrees (Hoy and Bunker, J. Mol. Spectrosc.
     1979, 74, 1; from memory). The dipole lies along z: 2 x 0.32 e x 0.58697 A x 4.80320 D/(e A) = 1.8043 D. */
  const double charge_e[3] = {-0.64, 0.32, 0.32};
  const double xyz_A[9] = {0.0, 0.0, 0.0, 0.75762, 0.0, 0.58697, -0.75762, 0.0, 0.58697};
  double radius_A, u_radius_A, q_e, u_q_e, dipole_D[3], magnitude_D;
  int32_t status;
  char words[80];

  if (bmom_abi_version() != BMOM_ABI_VERSION) return 1;

  if (bmom_covalent_radius(BMOM_RADII_CORDERO_2008, 8, BMOM_STATE_AS_LISTED, &radius_A, &u_radius_A) != BMOM_OK) return 2;
  printf("oxygen: %.2f +- %.2f A\n", radius_A, u_radius_A);
  if (radius_A < 0.6599 || radius_A > 0.6601) return 3; /* 0.66(2) A: Cordero et al., Dalton Trans. 2008, 2832 */

  if (bmom_charge_from_dipole(1.1086, 0.0003, 1.27455, 0.0, &q_e, &u_q_e) != BMOM_OK) return 4;
  printf("hydrogen chloride: q = %.4f +- %.4f e\n", q_e, u_q_e);
  if (q_e < 0.18108 || q_e > 0.18110) return 5;

  if (bmom_dipole_of_charges(3, charge_e, NULL, xyz_A, NULL, dipole_D, NULL, &magnitude_D, NULL) != BMOM_OK) return 6;
  printf("water: (%.3f, %.3f, %.3f) D, from - to +\n", dipole_D[0], dipole_D[1], dipole_D[2]);
  if (magnitude_D < 1.8042 || magnitude_D > 1.8044 || dipole_D[2] <= 0.0) return 7;

  status = bmom_charge_from_dipole(1.1086, 0.0, -1.0, 0.0, &q_e, &u_q_e);
  if (bmom_status_message("charge_from_dipole", -1, status, words, (int64_t)sizeof words, NULL) != BMOM_OK) return 8;
  printf("%s: %s\n", bmom_status_name(status), words);
  return strcmp(bmom_status_name(status), "OUT_OF_RANGE") == 0 ? 0 : 9;
}
