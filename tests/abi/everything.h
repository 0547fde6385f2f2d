/* One number made of the bits of every answer: it must be the same in every thread, process and floating-point state. */
#ifndef BONDMOMENT_TESTS_EVERYTHING_H
#define BONDMOMENT_TESTS_EVERYTHING_H

#include "molecules.h"

/* FNV-1a (G. Fowler, L. C. Noll, K.-P. Vo). */
static inline uint64_t mixed(uint64_t digest, const void *bytes, size_t size)
{
  const unsigned char *byte = (const unsigned char *)bytes;
  for (size_t i = 0; i < size; ++i) digest = (digest ^ byte[i]) * UINT64_C(0x100000001B3);
  return digest;
}

/* Numbers in on the heap, so that a small stack is the library's alone. */
struct answers {
  double values[3 * MOLECULE_ATOMS], u[MOLECULE_ATOMS], dipole[3 * MOLECULE_ROWS], covariance[9 * MOLECULE_ROWS];
  double magnitude[MOLECULE_ROWS], u_magnitude[MOLECULE_ROWS], origin[3 * MOLECULE_ROWS], order[20], length_A[20];
  int64_t offsets[MOLECULE_ROWS + 1], needed;
  int32_t atoms[40], charge[MOLECULE_ATOMS], remarks[MOLECULE_ROWS], item[MOLECULE_ROWS], status[MOLECULE_ROWS];
  int32_t ends[8], kinds[8];
  char text[2000];
};

#define MIX(call) (clear->status[0] = (call), digest = mixed(digest, clear, sizeof *clear))

static inline uint64_t scalars(struct answers *clear, uint64_t digest)
{
  static const int32_t elements[9] = {1, 6, 7, 8, 9, 11, 17, 26, 0};
  static const int32_t units[6] = {BMOM_UNIT_DEBYE, BMOM_UNIT_C_M, BMOM_UNIT_E_BOHR, BMOM_UNIT_KELVIN, BMOM_UNIT_HARTREE,
                                   BMOM_UNIT_CELSIUS};
  static const double doubles[9] = {0.1, 0.4, 0.7, 1.0, 1.3, 1.6, 1.9, 2.2, 0.30000000000000004};
  double *x = clear->values, *u = clear->u;
  for (int i = 0; i < 9; ++i) {
    const int32_t z = elements[i], listed = BMOM_STATE_AS_LISTED;
    const double d = doubles[i];
    for (int32_t table = BMOM_RADII_CORDERO_2008; table <= BMOM_POLARIZABILITY_2023; ++table) {
      MIX(bmom_covalent_radius(table, z, listed, x, u));
      MIX(bmom_vdw_radius(table, z, x, u));
      MIX(bmom_electronegativity(table, z, x, u));
      MIX(bmom_atomic_weight(table, z, x, u));
      MIX(bmom_polarizability(table, z, x, u));
      MIX(bmom_value_source(table, z, listed, clear->kinds, clear->text, 2000, &clear->needed));
    }
    MIX(bmom_bohr_radius(i, z, x, u));
    MIX(bmom_symbol(z, clear->text, 2000, &clear->needed));
    for (int k = 0; k < 36; ++k) MIX(bmom_convert(units[k / 6], units[k % 6], d, 0.01, x, u));
    for (int32_t law = BMOM_LENGTH_RADIUS_SUM; law <= BMOM_LENGTH_BY_ORDER; ++law) {
      MIX(bmom_bond_length(BMOM_RADII_CORDERO_2008, law, BMOM_ELECTRONEGATIVITY_PAULING, 6, listed, z, listed, 1.5, x, u));
      MIX(bmom_bond_length(BMOM_RADII_SCHOMAKER_STEVENSON_1941, law, BMOM_ELECTRONEGATIVITY_PAULING, 6, listed, z, listed,
                           1.0, x, u));
    }
    MIX(bmom_bond_polarity(BMOM_ELECTRONEGATIVITY_MULLIKEN, 0.4, 1.7, 1, z, x, u, clear->ends, clear->kinds));
    MIX(bmom_ionic_character(BMOM_IONIC_PAULING_1960, d, 0.1, x, u));
    MIX(bmom_ionic_character(BMOM_IONIC_HANNAY_SMYTH_1946, d, 0.1, x, u));
    MIX(bmom_charge_from_dipole(d, 0.01, 1.3, 0.001, x, u));
    MIX(bmom_dipole_from_charge(d, 0.01, 1.3, 0.001, x, u));
    MIX(bmom_length_from_dipole(d, 0.01, 0.7, 0.001, x, u));
    MIX(bmom_dipole_from_charge(from_bits(UINT64_C(0x0010000000000000)), 0.0, 0.1, 0.0, x, u)); /* subnormal */
    MIX(bmom_number_text(d, clear->text, 2000, &clear->needed));
    MIX(bmom_number_read("1.0145768e-3", -1, x));
    MIX(bmom_number_read("5e-324", -1, x));
    MIX(bmom_status_message("bond_length", -1, 1000 * i + BMOM_OUT_OF_RANGE, clear->text, 2000, &clear->needed));
  }
  return digest;
}

static inline uint64_t columns(struct answers *clear, uint64_t digest, int32_t threads)
{
  MIX(bmom_find_bonds_column(BMOM_BONDS_ALTERNATING, NULL, threads, MOLECULE_ROWS, atom_offsets, MOLECULE_ATOMS,
                             atomic_number, NULL, xyz_A, clear->offsets, clear->atoms, clear->order, clear->length_A,
                             clear->charge, 20, &clear->needed, clear->remarks, clear->item, clear->status));
  MIX(bmom_partial_charges_column(BMOM_CHARGES_PEOE_1980, NULL, threads, MOLECULE_ROWS, atom_offsets, MOLECULE_ATOMS,
                                  atomic_number, NULL, xyz_A, NULL, 0, NULL, NULL, clear->values, clear->u, clear->remarks,
                                  clear->item, clear->status));
  for (int k = 0; k < 2; ++k) {
    MIX(bmom_dipole_column(k ? BMOM_CHARGES_GIVEN : BMOM_CHARGES_PEOE_1980, BMOM_FRAME_AS_GIVEN, NULL, threads,
                           MOLECULE_ROWS, atom_offsets, MOLECULE_ATOMS, atomic_number, NULL, xyz_A, NULL, 0, NULL, NULL,
                           k ? charge_e : NULL, k ? u_charge_e : NULL, clear->dipole, clear->covariance, clear->magnitude,
                           clear->u_magnitude, clear->origin, clear->remarks, clear->item, clear->status));
  }
  MIX(bmom_dipole_polarity_column(0.2, MOLECULE_ROWS, clear->dipole, clear->covariance, clear->ends, clear->status));
  MIX(bmom_dipole_of_charges_column(NULL, threads, MOLECULE_ROWS, atom_offsets, MOLECULE_ATOMS, charge_e, u_charge_e, xyz_A,
                                    u_charge_e, clear->dipole, clear->covariance, clear->magnitude, clear->u_magnitude,
                                    clear->remarks, clear->item, clear->status));
  return digest;
}

/* Every number and text of the three tables of two molecules. */
static inline uint64_t tables_of(struct answers *clear, uint64_t digest, int32_t threads)
{
  static const char frames[] = "3\nwater\nO 0 0 0\nH 0.96 0 0\nH -0.2404 -0.9294 0\n"
                               "4\nformaldehyde\nC 0 0 0\nO 0 0 1.21\nH 0.94 0 -0.54\nH -0.94 0 -0.54\n";
  bmom_library *library = NULL;
  bmom_table *tables[3] = {NULL, NULL, NULL};
  clear->kinds[0] = bmom_library_parse(BMOM_FORMAT_BY_CONTENT, NULL, threads, NULL, frames, -1, &library);
  clear->kinds[1] = bmom_polarity_table(library, NULL, NULL, threads, NULL, 0, 2, &tables[0], &tables[1], &tables[2]);
  for (int k = 0; k < 3; ++k) {
    int64_t rows = 0, offset[2];
    int32_t count = 0, status = 0;
    bmom_table_size(tables[k], &rows, &count);
    for (int32_t column = 0; column < count; ++column) {
      for (int64_t row = 0; row < rows; ++row) {
        MIX(bmom_table_texts(tables[k], column, row, 1, offset, clear->text, 2000, &clear->needed, &status));
        MIX(bmom_table_numbers(tables[k], column, row, 1, clear->values, &status));
      }
    }
    bmom_table_free(tables[k]);
  }
  bmom_library_free(library);
  return digest;
}

/* The digest of everything. The host's arithmetic has no part in it but for the inputs, which are the same constants. */
static inline uint64_t everything(int32_t threads)
{
  uint64_t digest = UINT64_C(0xCBF29CE484222325);
  struct answers *clear = (struct answers *)calloc(1, sizeof *clear);
  if (clear == NULL) abort();
  digest = scalars(clear, digest);
  digest = columns(clear, digest, threads);
  digest = tables_of(clear, digest, threads);
  digest = mixed(digest, bmom_catalogue(), strlen(bmom_catalogue()));
  free(clear);
  return digest;
}

#endif
