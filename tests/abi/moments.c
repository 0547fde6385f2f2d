/* Moments: the dipole of a molecule and of point charges, and the verdict polar or non-polar, through the C ABI. */
#include "molecules.h"

#define GIVEN BMOM_CHARGES_GIVEN
#define PEOE BMOM_CHARGES_PEOE_1980
#define FRAME BMOM_FRAME_AS_GIVEN
/* 1 e A in D, exact in the SI of 2019. */
#define DEBYE 4.803204712570264

struct result {
  double dipole[3 * MOLECULE_ROWS], covariance[9 * MOLECULE_ROWS], magnitude[MOLECULE_ROWS], u_magnitude[MOLECULE_ROWS];
  double origin[3 * MOLECULE_ROWS];
  int32_t remarks[MOLECULE_ROWS], item[MOLECULE_ROWS], status[MOLECULE_ROWS];
};

static int32_t column(struct result *r, int32_t model, const bmom_settings *settings, int32_t threads, int64_t n,
                      const int64_t *offsets, const double *charge, const double *u)
{
  memset(r, 0x55, sizeof *r);
  return bmom_dipole_column(model, FRAME, settings, threads, n, offsets, MOLECULE_ATOMS, atomic_number, NULL, xyz_A, NULL, 0,
                            NULL, NULL, charge, u, r->dipole, r->covariance, r->magnitude, r->u_magnitude, r->origin,
                            r->remarks, r->item, r->status);
}

static void molecules(void)
{
  static const int64_t beyond[3] = {1, 4, 19};
  static const int32_t threads[5] = {2, 3, 7, 0, 1024};
  struct result given, other;
  bmom_settings *settings = NULL;

  STATUS(BMOM_SOME_ROWS, column(&given, GIVEN, NULL, 1, MOLECULE_ROWS, atom_offsets, charge_e, u_charge_e));
  /* Sum of q r by hand: x 0.33 (0.96 - 0.2404), y -0.33 x 0.9294. */
  NEAR(given.dipole[0], DEBYE * 0.33 * 0.7196, 1e-12);
  NEAR(given.dipole[1], DEBYE * -0.33 * 0.9294, 1e-12);
  SAME(given.dipole[2], 0.0);
  NEAR(given.magnitude[WATER] * given.magnitude[WATER],
       given.dipole[0] * given.dipole[0] + given.dipole[1] * given.dipole[1], 1e-12);
  CHECK(given.u_magnitude[WATER] > 0.0 && given.u_magnitude[WATER] < 1.0);
  SAME(given.covariance[1], given.covariance[3]); /* whole and symmetric */
  NEAR(given.magnitude[METHANE], 0.0, 1e-12);
  CHECK(given.status[NO_ELEMENT] == AT(3, BMOM_UNKNOWN_ELEMENT) && given.item[NO_ELEMENT] == 0);
  CHECK(given.status[NO_ATOM] == AT(3, BMOM_NO_ATOMS) && given.status[NO_PLACE] == AT(3, BMOM_MISSING));
  for (int i = 0; i < 3; ++i) {
    NO_VALUE(given.dipole[3 * NO_ELEMENT + i]);
    NO_VALUE(given.origin[3 * NO_ATOM + i]);
  }
  for (int i = 0; i < 9; ++i) NO_VALUE(given.covariance[9 * NO_PLACE + i]);
  NO_VALUE(given.magnitude[NO_ELEMENT]);
  NO_VALUE(given.u_magnitude[NO_ELEMENT]);
  for (int i = 0; i < 5; ++i) {
    STATUS(BMOM_SOME_ROWS, column(&other, GIVEN, NULL, threads[i], MOLECULE_ROWS, atom_offsets, charge_e, u_charge_e));
    SAME_BYTES(&other, &given, sizeof given);
  }
  STATUS(BMOM_SOME_ROWS, column(&other, GIVEN, NULL, 1, 3, atom_offsets, charge_e, u_charge_e));
  SAME_BYTES(other.covariance, given.covariance, 27 * sizeof(double));
  STATUS(BMOM_SOME_ROWS, column(&other, GIVEN, NULL, 1, 4, atom_offsets + 3, charge_e, u_charge_e));
  SAME_BYTES(other.covariance, given.covariance + 27, 36 * sizeof(double));
  SAME_BYTES(other.status, given.status + 3, 4 * sizeof(int32_t));

  /* Without known uncertainties there is none, and never 0 in silence. */
  STATUS(BMOM_SOME_ROWS, column(&other, GIVEN, NULL, 1, MOLECULE_ROWS, atom_offsets, charge_e, NULL));
  SAME(other.magnitude[WATER], given.magnitude[WATER]);
  NO_VALUE(other.u_magnitude[WATER]);
  NO_VALUE(other.covariance[0]);
  STATUS(BMOM_SOME_ROWS, column(&other, PEOE, NULL, 1, MOLECULE_ROWS, atom_offsets, NULL, NULL));
  NO_VALUE(other.u_magnitude[WATER]);
  CHECK(other.dipole[0] > 0.0 && other.dipole[1] < 0.0); /* from O to the hydrogens */
  CHECK((other.remarks[WATER] & BMOM_REMARK_BONDS_FOUND) != 0);
  CHECK(other.status[TOO_CLOSE] == AT(3, BMOM_ATOMS_TOO_CLOSE));

  /* A position uncertainty adds to that of the charges. */
  STATUS(BMOM_OK, bmom_settings_new(&settings));
  STATUS(BMOM_OK, bmom_settings_number(settings, "position_uncertainty_A", -1, 0.01));
  STATUS(BMOM_SOME_ROWS, column(&other, GIVEN, settings, 1, MOLECULE_ROWS, atom_offsets, charge_e, u_charge_e));
  CHECK(other.u_magnitude[WATER] > given.u_magnitude[WATER]);
  bmom_settings_free(settings);

  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), column(&other, 0, NULL, 1, MOLECULE_ROWS, atom_offsets, NULL, NULL));
  STATUS(AT(1, BMOM_WRONG_SELECTOR), column(&other, FRAME, NULL, 1, MOLECULE_ROWS, atom_offsets, NULL, NULL));
  STATUS(AT(5, BMOM_NOT_ALLOWED), column(&other, PEOE, NULL, 1, MOLECULE_ROWS, atom_offsets, charge_e, NULL));
  STATUS(AT(5, BMOM_NULL_POINTER), column(&other, GIVEN, NULL, 1, MOLECULE_ROWS, atom_offsets, NULL, NULL));
  STATUS(AT(5, BMOM_MISALIGNED), column(&other, GIVEN, NULL, 1, MOLECULE_ROWS, atom_offsets, odd_doubles(), NULL));
  STATUS(AT(5, BMOM_MISALIGNED), column(&other, GIVEN, NULL, 1, MOLECULE_ROWS, atom_offsets, charge_e, odd_doubles()));
  STATUS(AT(3, BMOM_NEGATIVE_COUNT), column(&other, PEOE, NULL, 1, -7, atom_offsets, NULL, NULL));
  STATUS(AT(3, BMOM_BAD_OFFSETS), column(&other, PEOE, NULL, 1, 2, beyond, NULL, NULL));
  STATUS(AT(3, BMOM_NULL_POINTER), column(&other, PEOE, NULL, 1, 2, NULL, NULL, NULL));
  STATUS(BMOM_OUT_OF_RANGE, column(&other, PEOE, NULL, 1025, 2, atom_offsets, NULL, NULL));
  STATUS(BMOM_OUT_OF_RANGE, column(&other, PEOE, NULL, INT32_MIN, 2, atom_offsets, NULL, NULL));
  CHECK(other.status[0] == 0x55555555);
  STATUS(BMOM_OK, bmom_dipole_column(PEOE, FRAME, NULL, 1, 0, NULL, 0, NULL, NULL, NULL, NULL, 0, NULL, NULL, NULL, NULL,
                                     NULL, NULL, NULL, NULL, NULL, NULL, NULL, NULL));
  STATUS(AT(8, BMOM_OVERLAP), bmom_dipole_column(PEOE, FRAME, NULL, 1, 1, atom_offsets, MOLECULE_ATOMS, atomic_number, NULL,
         xyz_A, NULL, 0, NULL, NULL, NULL, NULL, other.dipole, NULL, other.magnitude, NULL, other.dipole, NULL, NULL, NULL));
}

/* Slips that give a number all the same: they must not pass in silence. */
static void slips(void)
{
  static const int32_t waters_z[6] = {8, 1, 1, 8, 1, 1};
  static const double waters[18] = {0.0, 0.0, 0.0, 0.0, 0.7572, 0.5865, 0.0, -0.7572, 0.5865,
                                    5.0, 0.0, 0.0, 5.0, 0.7572, 0.5865, 5.0, -0.7572, 0.5865};
  static const double nanometres[9] = {0.0, 0.0, 0.0, 0.0, 0.07572, 0.05865, 0.0, -0.07572, 0.05865};
  static const int32_t pairs[4] = {0, 1, 0, 2};
  static const double single[2] = {1.0, 1.0};
  double dipole[3], magnitude, charge[6];
  int32_t remarks = -1, item = -2;

  /* Two molecules are no molecule: their dipole depends on how they lie. */
  STATUS(BMOM_OK, bmom_dipole(PEOE, FRAME, 6, waters_z, NULL, waters, 0, NULL, NULL, NULL, NULL, dipole, NULL, &magnitude,
                              NULL, NULL, &remarks, &item));
  CHECK((remarks & BMOM_REMARK_SEVERAL_FRAGMENTS) != 0);
  STATUS(BMOM_OK, bmom_partial_charges(PEOE, 6, waters_z, NULL, waters, 0, NULL, NULL, charge, NULL, &remarks, &item));
  CHECK((remarks & BMOM_REMARK_SEVERAL_FRAGMENTS) != 0);
  STATUS(BMOM_OK, bmom_dipole(PEOE, FRAME, 3, waters_z, NULL, waters, 0, NULL, NULL, NULL, NULL, dipole, NULL, &magnitude,
                              NULL, NULL, &remarks, &item));
  CHECK((remarks & BMOM_REMARK_SEVERAL_FRAGMENTS) == 0);
  /* Coordinates in nm, with and without stated bonds: no bond is that short. */
  STATUS(AT(3, BMOM_ATOMS_TOO_CLOSE), bmom_dipole(PEOE, FRAME, 3, waters_z, NULL, nanometres, 2, pairs, single, NULL, NULL,
                                                  dipole, NULL, &magnitude, NULL, NULL, &remarks, &item));
  CHECK(item == 1);
  STATUS(AT(3, BMOM_ATOMS_TOO_CLOSE), bmom_dipole(PEOE, FRAME, 3, waters_z, NULL, nanometres, 0, NULL, NULL, NULL, NULL,
                                                  dipole, NULL, &magnitude, NULL, NULL, &remarks, &item));
  /* Bonds without their pairs, uncertainties without their charges. */
  STATUS(AT(4, BMOM_NULL_POINTER), bmom_dipole(PEOE, FRAME, 3, waters_z, NULL, waters, 2, NULL, single, NULL, NULL, dipole,
                                               NULL, &magnitude, NULL, NULL, &remarks, &item));
  STATUS(AT(5, BMOM_NULL_POINTER), bmom_dipole(PEOE, FRAME, 3, waters_z, NULL, waters, 0, NULL, NULL, NULL, single, dipole,
                                               NULL, &magnitude, NULL, NULL, &remarks, &item));
}

/* The plain form of one molecule. */
static void one_molecule(void)
{
  static const int32_t ammonium_z[5] = {7, 1, 1, 1, 1};
  static const int32_t plus[5] = {1, 0, 0, 0, 0};
  static const int32_t missing[3] = {0, INT32_MIN, 0};
  double dipole[3], covariance[9], magnitude, u, origin[3], charge[3], negative[3] = {0.01, -0.01, 0.01};
  int32_t remarks = -1, item = -2;
  struct result all;

#define DIPOLE(model, n, z, formal, xyz, charge_, u_) \
  bmom_dipole((model), FRAME, (n), (z), (formal), (xyz), 0, NULL, NULL, (charge_), (u_), dipole, covariance, &magnitude, &u, \
              origin, &remarks, &item)
  STATUS(BMOM_SOME_ROWS, column(&all, PEOE, NULL, 1, MOLECULE_ROWS, atom_offsets, NULL, NULL));
  STATUS(BMOM_OK, DIPOLE(PEOE, 3, atomic_number + 1, NULL, xyz_A + 3, NULL, NULL));
  SAME_BYTES(dipole, all.dipole, sizeof dipole);
  SAME(magnitude, all.magnitude[WATER]);
  SAME_BYTES(origin, all.origin, sizeof origin);
  CHECK(remarks == all.remarks[WATER] && item == -1);
  STATUS(BMOM_OK, bmom_dipole(PEOE, FRAME, 3, atomic_number + 1, NULL, xyz_A + 3, 2, bond_atoms + 2, bond_order + 1, NULL,
                              NULL, dipole, NULL, &magnitude, NULL, NULL, NULL, NULL));
  SAME(magnitude, all.magnitude[WATER]);
  /* An ion's dipole depends on the origin, so the row says that it is about the centre of mass. */
  STATUS(BMOM_OK, DIPOLE(PEOE, 5, ammonium_z, plus, xyz_A + 30, NULL, NULL));
  CHECK((remarks & BMOM_REMARK_CHARGED) != 0);
  NEAR(magnitude, 0.0, 1e-12);

  charge[0] = -0.5, charge[1] = other_nan(), charge[2] = 0.25;
  STATUS(AT(5, BMOM_MISSING), DIPOLE(GIVEN, 3, atomic_number + 1, NULL, xyz_A + 3, charge, NULL));
  CHECK(item == 1 && remarks == 0);
  NO_VALUE(dipole[2]);
  NO_VALUE(covariance[8]);
  NO_VALUE(u);
  charge[1] = infinity();
  STATUS(AT(5, BMOM_NOT_FINITE), DIPOLE(GIVEN, 3, atomic_number + 1, NULL, xyz_A + 3, charge, NULL));
  STATUS(AT(5, BMOM_NEGATIVE_UNCERTAINTY), DIPOLE(GIVEN, 3, atomic_number + 1, NULL, xyz_A + 3, charge_e + 1, negative));
  STATUS(AT(3, BMOM_MISSING), DIPOLE(PEOE, 3, atomic_number + 1, missing, xyz_A + 3, NULL, NULL));
  CHECK(item == 1);
  STATUS(AT(3, BMOM_NO_ATOMS), DIPOLE(PEOE, 0, NULL, NULL, NULL, NULL, NULL));
  magnitude = UNTOUCHED;
  mark_doubles(covariance, 9);
  STATUS(AT(5, BMOM_NOT_ALLOWED), DIPOLE(PEOE, 3, atomic_number + 1, NULL, xyz_A + 3, charge, NULL));
  NO_VALUE(magnitude); /* the plain form leaves no stale number behind any failure */
  NO_VALUE(covariance[8]);
  STATUS(AT(2, BMOM_WRONG_SELECTOR), bmom_dipole(PEOE, PEOE, 3, atomic_number + 1, NULL, xyz_A + 3, 0, NULL, NULL, NULL,
                                                 NULL, dipole, NULL, &magnitude, NULL, NULL, NULL, NULL));
  STATUS(AT(3, BMOM_NEGATIVE_COUNT), DIPOLE(PEOE, -1, atomic_number + 1, NULL, xyz_A + 3, NULL, NULL));
  STATUS(AT(3, BMOM_NULL_POINTER), DIPOLE(PEOE, 3, atomic_number + 1, NULL, NULL, NULL, NULL));
  STATUS(AT(3, BMOM_MISALIGNED), DIPOLE(PEOE, 3, odd_integers(), NULL, xyz_A + 3, NULL, NULL));
  STATUS(AT(6, BMOM_NULL_POINTER), bmom_dipole(PEOE, FRAME, 3, atomic_number + 1, NULL, xyz_A + 3, 0, NULL, NULL, NULL, NULL,
                                               NULL, covariance, &magnitude, &u, NULL, NULL, NULL));
  STATUS(AT(7, BMOM_NULL_POINTER), bmom_dipole(PEOE, FRAME, 3, atomic_number + 1, NULL, xyz_A + 3, 0, NULL, NULL, NULL, NULL,
                                               dipole, covariance, NULL, &u, NULL, NULL, NULL));
}

/* Charges of +-1 e at +-0.5 A: 1 e A (exact), u_q 0.1 and u_x 0.01 by hand (JCGM 100:2008, equation 10). */
static void point_charges(void)
{
  static const double charge[2] = {1, -1}, u_charge[2] = {0.1, 0.1}, xyz[6] = {0, 0, 0.5, 0, 0, -0.5}, u_xyz[2] = {0.01, 0.01};
  static const double ends[3] = {0.5, -0.5, 0.5}, net[2] = {1, 1}, bad_u[2] = {0.1, -0.1};
  static const int64_t offsets[4] = {0, 2, 2, 3};
  double dipole[9], covariance[27], magnitude[3], u[3], one[3], one_covariance[9], one_magnitude, one_u;
  int32_t remarks[3], item[3], status[3];

#define CHARGES(n, q, u_q, x, u_x) \
  bmom_dipole_of_charges((n), (q), (u_q), (x), (u_x), one, one_covariance, &one_magnitude, &one_u)
  STATUS(BMOM_OK, CHARGES(2, charge, u_charge, xyz, u_xyz));
  NEAR(one[2], DEBYE, 1e-14);
  NEAR(one_magnitude, DEBYE, 1e-14);
  NEAR(one_covariance[0], 2e-4 * DEBYE * DEBYE, 1e-12);
  NEAR(one_covariance[8], (2 * 0.1 * 0.1 * 0.25 + 2e-4) * DEBYE * DEBYE, 1e-12);
  NEAR(one_u * one_u, one_covariance[8], 1e-12);
  STATUS(BMOM_OK, CHARGES(2, charge, NULL, xyz, u_xyz));
  NO_VALUE(one_u);
  NO_VALUE(one_covariance[0]);
  STATUS(BMOM_CHARGED, CHARGES(2, net, u_charge, xyz, u_xyz) % 1000);
  NO_VALUE(one[0]);
  NO_VALUE(one_magnitude);
  STATUS(AT(1, BMOM_NEGATIVE_UNCERTAINTY), CHARGES(2, charge, bad_u, xyz, u_xyz));
  STATUS(AT(2, BMOM_NEGATIVE_UNCERTAINTY), CHARGES(2, charge, u_charge, xyz, bad_u));
  STATUS(BMOM_NO_ATOMS, CHARGES(0, NULL, NULL, NULL, NULL) % 1000);
  one_magnitude = UNTOUCHED;
  STATUS(BMOM_NEGATIVE_COUNT, CHARGES(-1, charge, NULL, xyz, NULL) % 1000);
  NO_VALUE(one_magnitude);
  STATUS(AT(1, BMOM_NULL_POINTER), CHARGES(2, NULL, NULL, xyz, NULL));
  STATUS(AT(2, BMOM_NULL_POINTER), CHARGES(2, charge, NULL, NULL, NULL));
  STATUS(AT(2, BMOM_MISALIGNED), CHARGES(2, charge, NULL, odd_doubles(), NULL));
  STATUS(AT(3, BMOM_NULL_POINTER), bmom_dipole_of_charges(2, charge, NULL, xyz, NULL, NULL, NULL, &one_magnitude, NULL));
  STATUS(AT(4, BMOM_NULL_POINTER), bmom_dipole_of_charges(2, charge, NULL, xyz, NULL, one, NULL, NULL, NULL));

#define COLUMN(n, off, n_atoms, q, x, out) \
  bmom_dipole_of_charges_column(NULL, 1, (n), (off), (n_atoms), (q), NULL, (x), NULL, (out), covariance, magnitude, u, \
                                remarks, item, status)
  STATUS(BMOM_SOME_ROWS, COLUMN(3, offsets, 3, ends, xyz_A + 3, dipole));
  CHECK(status[0] == 0 && status[1] % 1000 == BMOM_NO_ATOMS && status[2] % 1000 == BMOM_CHARGED);
  NO_VALUE(dipole[3]);
  NO_VALUE(dipole[8]);
  STATUS(BMOM_NO_ROWS, bmom_dipole_of_charges_column(NULL, 0, 2, offsets + 1, 3, ends, NULL, xyz_A + 3, NULL, dipole, NULL,
                                                     magnitude, NULL, NULL, NULL, NULL));
  STATUS(BMOM_OK, COLUMN(1, offsets, 2, charge, xyz, dipole));
  STATUS(BMOM_OK, CHARGES(2, charge, NULL, xyz, NULL));
  SAME_BYTES(dipole, one, sizeof one);
  SAME(magnitude[0], one_magnitude);
  STATUS(BMOM_OK, COLUMN(0, NULL, 0, NULL, NULL, NULL));
  mark_doubles(dipole, 9);
  STATUS(AT(1, BMOM_BAD_OFFSETS), COLUMN(3, offsets, 2, charge, xyz, dipole));
  STATUS(BMOM_NEGATIVE_COUNT, COLUMN(-1, offsets, 2, charge, xyz, dipole));
  STATUS(AT(3, BMOM_OVERLAP), bmom_dipole_of_charges_column(NULL, 1, 1, offsets, 2, charge, NULL, xyz, NULL, dipole, dipole,
                                                            magnitude, NULL, NULL, NULL, NULL) % 1000 + 3000);
  CHECK(doubles_untouched(dipole, 9));
}

/* |mu| - 2u > L polar, |mu| + 2.8 u <= L non-polar, between them undecided (common practice: coverage factors of 95 %). */
static void polarities(void)
{
  double dipole[12] = {1, 0, 0, 0.01, 0, 0, 0.2, 0, 0, 0, 0, 0};
  double covariance[36] = {1e-4, 0, 0, 0, 1e-4, 0, 0, 0, 1e-4, 1e-4, 0, 0, 0, 1e-4, 0, 0, 0, 1e-4,
                           1e-4, 0, 0, 0, 1e-4, 0, 0, 0, 1e-4, -1, 0, 0, 0, 1e-4, 0, 0, 0, 1e-4};
  int32_t polarity[4], status[4], one;

  STATUS(BMOM_SOME_ROWS, bmom_dipole_polarity_column(0.2, 4, dipole, covariance, polarity, status));
  CHECK(polarity[0] == BMOM_POLARITY_POLAR && polarity[1] == BMOM_POLARITY_NON_POLAR);
  CHECK(polarity[2] == BMOM_POLARITY_UNDECIDED && polarity[3] == INT32_MIN);
  CHECK(status[3] == AT(2, BMOM_NEGATIVE_UNCERTAINTY));
  STATUS(BMOM_OK, bmom_dipole_polarity(0.2, dipole, covariance, &one));
  CHECK(one == polarity[0]);
  covariance[0] = no_number();
  STATUS(AT(2, BMOM_MISSING), bmom_dipole_polarity(0.2, dipole, covariance, &one));
  NO_INTEGER(one);
  dipole[0] = infinity();
  STATUS(AT(2, BMOM_NOT_FINITE), bmom_dipole_polarity(0.2, dipole, covariance + 9, &one));
  one = 1;
  STATUS(AT(1, BMOM_OUT_OF_RANGE), bmom_dipole_polarity(0.0, dipole + 3, covariance + 9, &one));
  NO_INTEGER(one);
  STATUS(AT(1, BMOM_MISSING), bmom_dipole_polarity(other_nan(), dipole + 3, covariance + 9, &one));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_dipole_polarity(0.2, NULL, covariance, &one));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_dipole_polarity(0.2, dipole, NULL, &one));
  STATUS(AT(3, BMOM_NULL_POINTER), bmom_dipole_polarity(0.2, dipole, covariance, NULL));
  STATUS(BMOM_OK, bmom_dipole_polarity_column(0.2, 0, NULL, NULL, NULL, NULL));
  STATUS(BMOM_NEGATIVE_COUNT, bmom_dipole_polarity_column(0.2, -1, dipole, covariance, polarity, status));
  STATUS(BMOM_OVERLAP, bmom_dipole_polarity_column(0.2, 4, dipole, covariance, polarity, polarity) % 1000);
}

int main(void)
{
  molecules_ready();
  molecules();
  slips();
  one_molecule();
  point_charges();
  polarities();
  return checks_end("moments");
}
