/* A column of molecules that is large enough to be worth several threads. */
#ifndef BONDMOMENT_TESTS_MANY_H
#define BONDMOMENT_TESTS_MANY_H

#include "everything.h"

#define MANY 2000

struct many {
  int64_t offsets[MANY + 1];
  int32_t atomic_number[3 * MANY], status[MANY];
  double xyz_A[9 * MANY], dipole_D[3 * MANY], covariance_D2[9 * MANY], magnitude_D[MANY];
};

static inline struct many *many_waters(void)
{
  struct many *many = (struct many *)calloc(1, sizeof *many);
  if (many == NULL) abort();
  for (int row = 0; row < MANY; ++row) {
    many->offsets[row + 1] = 3 * (row + 1);
    memcpy(many->atomic_number + 3 * row, atomic_number + 1, 3 * sizeof(int32_t));
    memcpy(many->xyz_A + 9 * row, xyz_A + 3, 9 * sizeof(double));
    many->xyz_A[9 * row + 3] += 1e-6 * row; /* no two rows alike */
  }
  return many;
}

/* The digest of the dipoles of all rows. */
static inline uint64_t many_dipoles(struct many *many, int32_t threads)
{
  uint64_t digest = UINT64_C(0xCBF29CE484222325);
  STATUS(BMOM_OK, bmom_dipole_column(BMOM_CHARGES_PEOE_1980, BMOM_FRAME_AS_GIVEN, NULL, threads, MANY, many->offsets,
                                     3 * MANY, many->atomic_number, NULL, many->xyz_A, NULL, 0, NULL, NULL, NULL, NULL,
                                     many->dipole_D, many->covariance_D2, many->magnitude_D, NULL, NULL, NULL, NULL,
                                     many->status));
  digest = mixed(digest, many->dipole_D, sizeof many->dipole_D);
  return mixed(digest, many->magnitude_D, sizeof many->magnitude_D);
}

#endif
