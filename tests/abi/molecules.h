/* A column of molecules for the checks: good rows, one row with each fault, and offsets that do not start at 0. */
#ifndef BONDMOMENT_TESTS_MOLECULES_H
#define BONDMOMENT_TESTS_MOLECULES_H

#include "check.h"

#define MOLECULE_ROWS 7
#define MOLECULE_ATOMS 18
#define MOLECULE_BONDS 12

enum row { WATER, FLUOROMETHANE, NO_ELEMENT, NO_ATOM, METHANE, TOO_CLOSE, NO_PLACE };

/* Atom 0 and bond 0 belong to no row. */
static const int64_t atom_offsets[MOLECULE_ROWS + 1] = {1, 4, 9, 10, 10, 15, 17, 18};
static const int64_t bond_offsets[MOLECULE_ROWS + 1] = {1, 3, 7, 7, 7, 11, 12, 12};
static const int32_t atomic_number[MOLECULE_ATOMS] = {-7, 8, 1, 1, 6, 9, 1, 1, 1, 0, 6, 1, 1, 1, 1, 6, 6, 1};
static const int32_t bond_atoms[2 * MOLECULE_BONDS] = {7, 7, 0, 1, 0, 2, 0, 1, 0, 2, 0, 3, 0, 4,
                                                       0, 1, 0, 2, 0, 3, 0, 4, 0, 1};
static const double bond_order[MOLECULE_BONDS] = {9, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1};

/* Geometries made up of textbook lengths and angles (from memory). */
static double xyz_A[3 * MOLECULE_ATOMS] = {
  0, 0, 0, /* belongs to no row */
  0, 0, 0, 0.96, 0, 0, -0.2404, -0.9294, 0,
  0, 0, 0, 0, 0, 1.383, 1.0302, 0, -0.3637, -0.5151, 0.8922, -0.3637, -0.5151, -0.8922, -0.3637,
  0, 0, 0,
  0, 0, 0, 0.63, 0.63, 0.63, -0.63, -0.63, 0.63, -0.63, 0.63, -0.63, 0.63, -0.63, -0.63,
  0, 0, 0, 0.1, 0, 0,
  0, 0, 0, /* NaN, see molecules_ready */
};

/* Point charges whose sum is 0 in every good row. */
static const double charge_e[MOLECULE_ATOMS] = {0,   -0.66, 0.33, 0.33, 0.09, -0.24, 0.05, 0.05, 0.05,
                                                0,   -0.4,  0.1,  0.1,  0.1,  0.1,   0.25, -0.25, 0};
static const double u_charge_e[MOLECULE_ATOMS] = {0, 0.02, 0.01, 0.01, 0.01, 0.01, 0.01, 0.01, 0.01,
                                                  0, 0.01, 0.01, 0.01, 0.01, 0.01, 0.02, 0.02, 0};

/* Constants cannot hold a NaN in every standard, so the last row gets its missing coordinate here. */
static inline void molecules_ready(void) { xyz_A[3 * 17 + 1] = other_nan(); }

#endif
