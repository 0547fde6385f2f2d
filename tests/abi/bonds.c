/* Bonds: expected length, polarity, ionic character, and bonds found from coordinates, through the C ABI. */
#include "molecules.h"

#define LISTED BMOM_STATE_AS_LISTED
#define CORDERO BMOM_RADII_CORDERO_2008
#define PAULING BMOM_ELECTRONEGATIVITY_PAULING
#define ROWS 7

/* C-Cl 0.76(1) + 1.02(4) A (Cordero et al., Dalton Trans. 2008, 2832); C=O and C=-N from Pyykko's radii of 2009 and 2005. */
static void lengths(void)
{
  static const int32_t a[ROWS] = {6, 6, 0, 6, 6, INT32_MIN, 6};
  static const int32_t b[ROWS] = {17, 8, 6, 6, 6, 6, 119};
  static const int32_t state[ROWS] = {LISTED, LISTED, LISTED, 0, LISTED, LISTED, LISTED};
  static const int32_t listed[ROWS] = {LISTED, LISTED, LISTED, LISTED, LISTED, LISTED, LISTED};
  double order[ROWS] = {1, 2, 1, 1, 9, 1, 1};
  double length, u, column[ROWS], u_column[ROWS], part[ROWS], u_part[ROWS];
  int32_t status[ROWS];
  const int32_t law = BMOM_LENGTH_BY_ORDER;

  STATUS(BMOM_OK, bmom_bond_length(CORDERO, BMOM_LENGTH_RADIUS_SUM, PAULING, 6, LISTED, 17, LISTED, 1.0, &length, &u));
  NEAR(length, 1.78, 1e-12);
  NEAR(u, 0.0412310562561766, 1e-12);
  /* 0.77 + 0.72 - 0.09 x 1.43 A: Schomaker and Stevenson, J. Am. Chem. Soc. 1941, 63, 37 (from memory). */
  STATUS(BMOM_OK, bmom_bond_length(BMOM_RADII_SCHOMAKER_STEVENSON_1941, BMOM_LENGTH_SCHOMAKER_STEVENSON_1941, PAULING, 6,
                                   LISTED, 9, LISTED, 1.0, &length, &u));
  NEAR(length, 1.3613, 1e-10);
  NO_VALUE(u);

  STATUS(BMOM_SOME_ROWS, bmom_bond_length_column(CORDERO, law, PAULING, ROWS, a, state, b, listed, order, column, u_column,
                                                 status));
  NEAR(column[0], 1.78, 1e-12);
  STATUS(BMOM_OK, bmom_bond_length(CORDERO, law, PAULING, 6, LISTED, 8, LISTED, 2.0, &length, &u));
  SAME(column[1], length);
  SAME(u_column[1], u);
  CHECK(status[0] == 0 && status[1] == 0 && status[2] == AT(4, BMOM_UNKNOWN_ELEMENT));
  CHECK(status[3] == AT(5, BMOM_OUT_OF_RANGE) && status[4] == AT(8, BMOM_OUT_OF_RANGE));
  CHECK(status[5] == AT(4, BMOM_MISSING) && status[6] == AT(6, BMOM_UNKNOWN_ELEMENT));
  for (int i = 2; i < ROWS; ++i) {
    NO_VALUE(column[i]);
    NO_VALUE(u_column[i]);
  }
  STATUS(BMOM_OK, bmom_bond_length_column(CORDERO, law, PAULING, 2, a, state, b, listed, order, part, u_part, NULL));
  STATUS(BMOM_NO_ROWS, bmom_bond_length_column(CORDERO, law, PAULING, ROWS - 2, a + 2, state + 2, b + 2, listed + 2,
                                               order + 2, part + 2, u_part + 2, NULL));
  SAME_BYTES(part, column, sizeof part);
  SAME_BYTES(u_part, u_column, sizeof u_part);

#define LENGTH(radii, law_, scale, a_, sa, b_, sb, n) \
  bmom_bond_length((radii), (law_), (scale), (a_), (sa), (b_), (sb), (n), &length, &u)
  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), LENGTH(0, law, PAULING, 6, LISTED, 6, LISTED, 1.0));
  STATUS(AT(1, BMOM_WRONG_SELECTOR), LENGTH(PAULING, law, PAULING, 6, LISTED, 6, LISTED, 1.0));
  STATUS(AT(2, BMOM_WRONG_SELECTOR), LENGTH(CORDERO, CORDERO, PAULING, 6, LISTED, 6, LISTED, 1.0));
  STATUS(AT(3, BMOM_UNKNOWN_SELECTOR), LENGTH(CORDERO, law, INT32_MIN, 6, LISTED, 6, LISTED, 1.0));
  STATUS(AT(4, BMOM_UNKNOWN_ELEMENT), LENGTH(CORDERO, law, PAULING, -1, LISTED, 6, LISTED, 1.0));
  STATUS(AT(5, BMOM_UNKNOWN_SELECTOR), LENGTH(CORDERO, law, PAULING, 6, 0, 6, LISTED, 1.0));
  STATUS(AT(6, BMOM_MISSING), LENGTH(CORDERO, law, PAULING, 6, LISTED, INT32_MIN, LISTED, 1.0));
  STATUS(AT(7, BMOM_WRONG_SELECTOR), LENGTH(CORDERO, law, PAULING, 6, LISTED, 6, PAULING, 1.0));
  STATUS(AT(8, BMOM_MISSING), LENGTH(CORDERO, law, PAULING, 6, LISTED, 6, LISTED, missing_of_r()));
  STATUS(AT(8, BMOM_NOT_FINITE), LENGTH(CORDERO, law, PAULING, 6, LISTED, 6, LISTED, infinity()));
  STATUS(AT(8, BMOM_OUT_OF_RANGE), LENGTH(CORDERO, law, PAULING, 6, LISTED, 6, LISTED, 0.0));
  NO_VALUE(length);
  NO_VALUE(u);
  STATUS(AT(1, BMOM_NOT_ALLOWED), LENGTH(CORDERO, BMOM_LENGTH_SCHOMAKER_STEVENSON_1941, PAULING, 6, LISTED, 9, LISTED, 1.0));
  STATUS(AT(9, BMOM_NULL_POINTER), bmom_bond_length(CORDERO, law, PAULING, 6, LISTED, 6, LISTED, 1.0, NULL, &u));

  mark_doubles(column, ROWS);
#define LENGTHS(radii, n, a_, sa, b_, sb, n_, out, u_out) \
  bmom_bond_length_column((radii), law, PAULING, (n), (a_), (sa), (b_), (sb), (n_), (out), (u_out), status)
  STATUS(BMOM_OK, bmom_bond_length_column(CORDERO, law, PAULING, 0, NULL, NULL, NULL, NULL, NULL, NULL, NULL, NULL));
  STATUS(BMOM_NEGATIVE_COUNT, LENGTHS(CORDERO, -1, a, state, b, listed, order, column, NULL));
  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), LENGTHS(4711, ROWS, a, state, b, listed, order, column, NULL));
  STATUS(AT(4, BMOM_NULL_POINTER), LENGTHS(CORDERO, ROWS, NULL, state, b, listed, order, column, NULL));
  STATUS(AT(5, BMOM_MISALIGNED), LENGTHS(CORDERO, ROWS, a, odd_integers(), b, listed, order, column, NULL));
  STATUS(AT(6, BMOM_NULL_POINTER), LENGTHS(CORDERO, ROWS, a, state, NULL, listed, order, column, NULL));
  STATUS(AT(7, BMOM_NULL_POINTER), LENGTHS(CORDERO, ROWS, a, state, b, NULL, order, column, NULL));
  STATUS(AT(8, BMOM_NULL_POINTER), LENGTHS(CORDERO, ROWS, a, state, b, listed, NULL, column, NULL));
  STATUS(AT(9, BMOM_NULL_POINTER), LENGTHS(CORDERO, ROWS, a, state, b, listed, order, NULL, NULL));
  STATUS(AT(9, BMOM_OVERLAP), LENGTHS(CORDERO, ROWS, a, state, b, listed, order, order, NULL));
  CHECK(doubles_untouched(column, ROWS) && order[4] > 8);
}

/* Differences of the handbook column: HF 3.98 - 2.20, NaCl 3.16 - 0.93 (CRC Handbook, section 9; limits: common practice). */
static void polarities(void)
{
  static const int32_t a[4] = {1, 17, 2, 6};
  static const int32_t b[4] = {9, 11, 1, 6};
  double delta, u, column[4], u_column[4];
  int32_t end, kind, ends[4], kinds[4], status[4];

  STATUS(BMOM_OK, bmom_bond_polarity(PAULING, 0.4, 1.7, 1, 9, &delta, &u, &end, &kind));
  NEAR(delta, 1.78, 1e-12);
  CHECK(end == BMOM_END_B && kind == BMOM_CLASS_POLAR);
  STATUS(BMOM_SOME_ROWS, bmom_bond_polarity_column(PAULING, 0.4, 1.7, 4, a, b, column, u_column, ends, kinds, status));
  SAME(column[0], delta);
  SAME(u_column[0], u);
  NEAR(column[1], -2.23, 1e-12);
  CHECK(ends[1] == BMOM_END_A && kinds[1] == BMOM_CLASS_IONIC);
  CHECK(status[2] == AT(4, BMOM_NO_DATA)); /* helium has no value on Pauling's scale */
  NO_VALUE(column[2]);
  NO_INTEGER(ends[2]);
  NO_INTEGER(kinds[2]);
  SAME(column[3], 0.0);
  CHECK(ends[3] == BMOM_END_NEITHER && kinds[3] == BMOM_CLASS_NON_POLAR);

#define POLARITY(scale, from, ionic, a_, b_) bmom_bond_polarity((scale), (from), (ionic), (a_), (b_), &delta, &u, &end, &kind)
  STATUS(AT(1, BMOM_WRONG_SELECTOR), POLARITY(CORDERO, 0.4, 1.7, 1, 9));
  STATUS(AT(2, BMOM_MISSING), POLARITY(PAULING, other_nan(), 1.7, 1, 9));
  STATUS(AT(2, BMOM_OUT_OF_RANGE), POLARITY(PAULING, -0.1, 1.7, 1, 9));
  STATUS(AT(3, BMOM_OUT_OF_RANGE), POLARITY(PAULING, 0.4, 0.3, 1, 9));
  STATUS(AT(3, BMOM_NOT_FINITE), POLARITY(PAULING, 0.4, infinity(), 1, 9));
  STATUS(AT(4, BMOM_MISSING), POLARITY(PAULING, 0.4, 1.7, INT32_MIN, 9));
  STATUS(AT(5, BMOM_UNKNOWN_ELEMENT), POLARITY(PAULING, 0.4, 1.7, 1, 119));
  NO_VALUE(delta);
  NO_INTEGER(end);
  NO_INTEGER(kind);
  STATUS(AT(6, BMOM_NULL_POINTER), bmom_bond_polarity(PAULING, 0.4, 1.7, 1, 9, NULL, &u, &end, &kind));
  STATUS(AT(7, BMOM_NULL_POINTER), bmom_bond_polarity(PAULING, 0.4, 1.7, 1, 9, &delta, &u, NULL, &kind));
  STATUS(AT(8, BMOM_NULL_POINTER), bmom_bond_polarity(PAULING, 0.4, 1.7, 1, 9, &delta, &u, &end, NULL));
  STATUS(BMOM_OK, bmom_bond_polarity_column(PAULING, 0.4, 1.7, 0, NULL, NULL, NULL, NULL, NULL, NULL, NULL));
  mark_doubles(column, 4);
  STATUS(AT(2, BMOM_OUT_OF_RANGE), bmom_bond_polarity_column(PAULING, -1, 1.7, 4, a, b, column, NULL, ends, kinds, status));
  STATUS(AT(5, BMOM_NULL_POINTER), bmom_bond_polarity_column(PAULING, 0.4, 1.7, 4, a, NULL, column, NULL, ends, kinds, NULL));
  STATUS(AT(8, BMOM_OVERLAP), bmom_bond_polarity_column(PAULING, 0.4, 1.7, 4, a, b, column, NULL, ends, ends, status));
  CHECK(doubles_untouched(column, 4));
}

/* HF at a difference of 2.0: 46 % (Hannay and Smyth, J. Am. Chem. Soc. 1946, 68, 171); Pauling 1960: 2.0 is 63 % (from
   memory, to the whole percent). */
static void ionic_characters(void)
{
  const int32_t law = BMOM_IONIC_PAULING_1960, other = BMOM_IONIC_HANNAY_SMYTH_1946;
  double delta[4], u_delta[4], percent, u, column[4], u_column[4];
  int32_t status[4];
  delta[0] = 2.0, delta[1] = -2.0, delta[2] = other_nan(), delta[3] = 1.0;
  u_delta[0] = 0.0, u_delta[1] = 0.0, u_delta[2] = 0.0, u_delta[3] = -1.0;

  STATUS(BMOM_OK, bmom_ionic_character(other, 2.0, 0.0, &percent, &u));
  NEAR(percent, 46.0, 1e-12);
  SAME(u, 0.0);
  STATUS(BMOM_OK, bmom_ionic_character(law, 2.0, 0.0, &percent, &u));
  NEAR(percent, 63.0, 0.5);
  STATUS(BMOM_OK, bmom_ionic_character(other, 4.0, 0.1, &percent, &u));
  SAME(percent, 100.0);
  NO_VALUE(u);
  STATUS(BMOM_SOME_ROWS, bmom_ionic_character_column(law, 4, delta, u_delta, column, u_column, status));
  STATUS(BMOM_OK, bmom_ionic_character(law, 2.0, 0.0, &percent, &u));
  SAME(column[0], percent);
  SAME(column[1], percent);
  SAME(u_column[0], u);
  CHECK(status[2] == AT(2, BMOM_MISSING) && status[3] == AT(2, BMOM_NEGATIVE_UNCERTAINTY));
  NO_VALUE(column[2]);
  NO_VALUE(u_column[3]);
  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), bmom_ionic_character(0, 1.0, 0.0, &percent, &u));
  STATUS(AT(2, BMOM_NOT_FINITE), bmom_ionic_character(law, infinity(), 0.0, &percent, &u));
  STATUS(AT(3, BMOM_NULL_POINTER), bmom_ionic_character(law, 1.0, 0.0, NULL, &u));
  STATUS(BMOM_OK, bmom_ionic_character_column(law, 0, NULL, NULL, NULL, NULL, NULL));
  mark_doubles(column, 4);
  STATUS(AT(1, BMOM_WRONG_SELECTOR), bmom_ionic_character_column(CORDERO, 4, delta, NULL, column, NULL, NULL));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_ionic_character_column(law, 4, NULL, NULL, column, NULL, NULL));
  STATUS(AT(3, BMOM_OVERLAP), bmom_ionic_character_column(law, 4, delta, NULL, delta, NULL, NULL));
  CHECK(doubles_untouched(column, 4));
}

struct found {
  int64_t offsets[MOLECULE_ROWS + 1], needed;
  int32_t atoms[2 * MOLECULE_BONDS], charge[MOLECULE_ATOMS];
  double order[MOLECULE_BONDS], length_A[MOLECULE_BONDS];
  int32_t remarks[MOLECULE_ROWS], item[MOLECULE_ROWS], status[MOLECULE_ROWS];
};

static int32_t find(struct found *f, int32_t threads, int64_t n, const int64_t *offsets, int64_t capacity)
{
  memset(f, 0x55, sizeof *f);
  return bmom_find_bonds_column(BMOM_BONDS_ALTERNATING, NULL, threads, n, offsets, MOLECULE_ATOMS, atomic_number, NULL,
                                xyz_A, f->offsets, f->atoms, f->order, f->length_A, f->charge, capacity, &f->needed,
                                f->remarks, f->item, f->status);
}

static void found_bonds(void)
{
  static const int64_t falling[MOLECULE_ROWS + 1] = {1, 4, 3, 10, 10, 15, 17, 18};
  static const int64_t beyond[MOLECULE_ROWS + 1] = {1, 4, 9, 10, 10, 15, 17, 19};
  static const int32_t threads[5] = {1, 2, 3, 7, 0};
  struct found all, other;
  int32_t atoms[4], remarks = -1, item = -2, charge[3];
  double order[2], length[2];
  int64_t needed = -1;

  STATUS(BMOM_SOME_ROWS, find(&all, 1, MOLECULE_ROWS, atom_offsets, MOLECULE_BONDS));
  CHECK(all.needed == 10 && all.offsets[0] == 0 && all.offsets[1] == 2 && all.offsets[2] == 6 && all.offsets[7] == 10);
  SAME_BYTES(all.atoms, bond_atoms + 2, 12 * sizeof(int32_t));
  NEAR(all.length_A[0], 0.96, 1e-12);
  NEAR(all.length_A[2], 1.383, 1e-12);
  NEAR(all.order[0], 1.0, 0.0);
  CHECK(all.status[WATER] == 0 && all.status[METHANE] == 0);
  CHECK((all.remarks[WATER] & BMOM_REMARK_BONDS_FOUND) != 0 && all.item[WATER] == -1);
  CHECK(all.status[NO_ELEMENT] == AT(2, BMOM_UNKNOWN_ELEMENT) && all.item[NO_ELEMENT] == 0);
  CHECK(all.status[NO_ATOM] == AT(2, BMOM_NO_ATOMS) && all.item[NO_ATOM] == -1);
  CHECK(all.status[TOO_CLOSE] == AT(2, BMOM_ATOMS_TOO_CLOSE) && all.status[NO_PLACE] == AT(2, BMOM_MISSING));
  CHECK(all.charge[1] == 0 && all.charge[9] == INT32_MIN && all.charge[0] == 0x55555555);
  for (int i = 1; i < 5; ++i) {
    STATUS(BMOM_SOME_ROWS, find(&other, threads[i], MOLECULE_ROWS, atom_offsets, MOLECULE_BONDS));
    SAME_BYTES(&other, &all, sizeof all);
  }
  STATUS(BMOM_BUFFER_TOO_SMALL, find(&other, 1, MOLECULE_ROWS, atom_offsets, 9));
  CHECK(other.needed == 10 && other.atoms[0] == 0x55555555);
  SAME_BYTES(other.offsets, all.offsets, sizeof all.offsets);
  SAME_BYTES(other.status, all.status, sizeof all.status);
  STATUS(AT(2, BMOM_BAD_OFFSETS), find(&other, 1, MOLECULE_ROWS, falling, MOLECULE_BONDS));
  STATUS(AT(2, BMOM_BAD_OFFSETS), find(&other, 1, MOLECULE_ROWS, beyond, MOLECULE_BONDS));
  STATUS(AT(2, BMOM_NULL_POINTER), find(&other, 1, MOLECULE_ROWS, NULL, MOLECULE_BONDS));
  STATUS(AT(2, BMOM_NEGATIVE_COUNT), find(&other, 1, -1, atom_offsets, MOLECULE_BONDS));
  STATUS(BMOM_NEGATIVE_COUNT, find(&other, 1, MOLECULE_ROWS, atom_offsets, -1));
  STATUS(BMOM_OUT_OF_RANGE, find(&other, -1, MOLECULE_ROWS, atom_offsets, MOLECULE_BONDS));
  CHECK(other.needed == 0x5555555555555555 && other.status[0] == 0x55555555);

#define ONE(rule, n, z, xyz, found, room) \
  bmom_find_bonds((rule), (n), (z), NULL, (xyz), (found), order, length, charge, (room), &needed, &remarks, &item)
  STATUS(BMOM_OK, ONE(BMOM_BONDS_ALTERNATING, 3, atomic_number + 1, xyz_A + 3, atoms, 2));
  CHECK(needed == 2 && item == -1);
  SAME_BYTES(atoms, all.atoms, sizeof atoms);
  SAME_BYTES(length, all.length_A, sizeof length);
  CHECK(remarks == all.remarks[WATER]);
  STATUS(BMOM_BUFFER_TOO_SMALL, ONE(BMOM_BONDS_AROMATIC, 3, atomic_number + 1, xyz_A + 3, atoms, 1));
  CHECK(needed == 2);
  STATUS(AT(1, BMOM_WRONG_SELECTOR), ONE(BMOM_CHARGES_PEOE_1980, 3, atomic_number + 1, xyz_A + 3, atoms, 2));
  STATUS(AT(2, BMOM_NO_ATOMS), ONE(BMOM_BONDS_ALTERNATING, 0, NULL, NULL, atoms, 2));
  STATUS(AT(2, BMOM_NEGATIVE_COUNT), ONE(BMOM_BONDS_ALTERNATING, -1, atomic_number + 1, xyz_A + 3, atoms, 2));
  STATUS(AT(2, BMOM_NULL_POINTER), ONE(BMOM_BONDS_ALTERNATING, 3, NULL, xyz_A + 3, atoms, 2));
  STATUS(AT(2, BMOM_MISALIGNED), ONE(BMOM_BONDS_ALTERNATING, 3, atomic_number + 1, odd_doubles(), atoms, 2));
  STATUS(AT(3, BMOM_NULL_POINTER), ONE(BMOM_BONDS_ALTERNATING, 3, atomic_number + 1, xyz_A + 3, NULL, 2));
  STATUS(AT(3, BMOM_MISALIGNED), ONE(BMOM_BONDS_ALTERNATING, 3, atomic_number + 1, xyz_A + 3, odd_integers(), 2));
  STATUS(AT(2, BMOM_UNKNOWN_ELEMENT), ONE(BMOM_BONDS_ALTERNATING, 1, atomic_number + 9, xyz_A + 27, atoms, 2));
  CHECK(item == 0 && remarks == 0 && needed == 0);
}

int main(void)
{
  molecules_ready();
  lengths();
  polarities();
  ionic_characters();
  found_bonds();
  return checks_end("bonds");
}
