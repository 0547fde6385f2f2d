/* Elements: symbols, radii, electronegativities, masses, polarizabilities, Bohr radius and units through the C ABI. */
#include "check.h"

#define ROWS 6

/* Symbols and names to atomic numbers (the periodic table of the elements, IUPAC). */
static void atomic_numbers(void)
{
  /* The texts of the column do not start at the first byte. */
  static const char bytes[] = "--H Clironqq\xff";
  static const int64_t offsets[6] = {2, 3, 6, 10, 12, 13};
  static const int32_t expected[5] = {1, 17, 26, INT32_MIN, INT32_MIN};
  static const int32_t expected_status[5] = {0, 0, 0, AT(1, BMOM_UNKNOWN_ELEMENT), AT(1, BMOM_UNKNOWN_ELEMENT)};
  static const int64_t falling[3] = {2, 1, 3};
  static const int64_t negative[3] = {-1, 1, 3};
  static const int64_t beyond[3] = {0, 1, 14};
  static const int64_t blank[3] = {0, 0, 0};
  int32_t z = 0, column[5], status[5];

  STATUS(BMOM_OK, bmom_atomic_number("Cl", -1, &z));
  CHECK(z == 17);
  STATUS(BMOM_OK, bmom_atomic_number(" fe \xff", 4, &z));
  CHECK(z == 26);
  STATUS(BMOM_OK, bmom_atomic_number("D", 1, &z));
  CHECK(z == 1);
  STATUS(AT(1, BMOM_UNKNOWN_ELEMENT), bmom_atomic_number("Xx", -1, &z));
  NO_INTEGER(z);
  STATUS(AT(1, BMOM_MISSING), bmom_atomic_number("", 0, &z));
  STATUS(AT(1, BMOM_MISSING), bmom_atomic_number(NULL, 0, &z));
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_atomic_number(NULL, -1, &z));
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_atomic_number(NULL, 1, &z));
  STATUS(AT(1, BMOM_NEGATIVE_COUNT), bmom_atomic_number("H", -2, &z));
  z = 1;
  STATUS(AT(1, BMOM_NOT_UTF8), bmom_atomic_number("\xc3\x28", 2, &z));
  NO_INTEGER(z);
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_atomic_number("H", 1, NULL));
  STATUS(AT(2, BMOM_MISALIGNED), bmom_atomic_number("H", 1, odd_integers()));

  STATUS(BMOM_SOME_ROWS, bmom_atomic_number_column(5, offsets, bytes, 13, column, status));
  SAME_BYTES(column, expected, sizeof expected);
  SAME_BYTES(status, expected_status, sizeof expected_status);
  STATUS(BMOM_NO_ROWS, bmom_atomic_number_column(2, blank, NULL, 0, column, status));
  CHECK(status[0] == AT(1, BMOM_MISSING));
  STATUS(BMOM_OK, bmom_atomic_number_column(0, NULL, NULL, 0, NULL, NULL));
  STATUS(BMOM_OK, bmom_atomic_number_column(3, offsets, bytes, 13, column, NULL));
  mark_integers(column, 5);
  STATUS(BMOM_NEGATIVE_COUNT, bmom_atomic_number_column(-1, offsets, bytes, 13, column, status));
  STATUS(BMOM_NEGATIVE_COUNT, bmom_atomic_number_column(5, offsets, bytes, -1, column, status));
  STATUS(BMOM_TOO_LARGE, bmom_atomic_number_column(INT64_MAX, offsets, bytes, 13, column, status));
  STATUS(AT(1, BMOM_BAD_OFFSETS), bmom_atomic_number_column(2, falling, bytes, 13, column, status));
  STATUS(AT(1, BMOM_BAD_OFFSETS), bmom_atomic_number_column(2, negative, bytes, 13, column, status));
  STATUS(AT(1, BMOM_BAD_OFFSETS), bmom_atomic_number_column(2, beyond, bytes, 13, column, status));
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_atomic_number_column(5, NULL, bytes, 13, column, status));
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_atomic_number_column(5, offsets, NULL, 13, column, status));
  STATUS(AT(1, BMOM_MISALIGNED), bmom_atomic_number_column(5, odd_offsets(), bytes, 13, column, status));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_atomic_number_column(5, offsets, bytes, 13, NULL, status));
  STATUS(BMOM_OVERLAP, bmom_atomic_number_column(5, offsets, bytes, 13, column, column));
  CHECK(integers_untouched(column, 5));
}

/* Atomic numbers to symbols (the periodic table of the elements, IUPAC). */
static void symbols(void)
{
  static const int32_t z[4] = {26, 0, 1, 118};
  static const int64_t expected[5] = {0, 2, 2, 3, 5};
  int64_t needed = -1, offsets[5];
  int32_t status[4];
  char text[8] = "xxxxxxx";

  STATUS(BMOM_OK, bmom_symbol(118, text, (int64_t)sizeof text, &needed));
  CHECK(strcmp(text, "Og") == 0 && needed == 2);
  STATUS(BMOM_OK, bmom_symbol(26, text, 2, NULL));
  CHECK(text[0] == 'F' && text[1] == 'e');
  STATUS(AT(2, BMOM_BUFFER_TOO_SMALL), bmom_symbol(26, text, 1, &needed));
  CHECK(needed == 2);
  STATUS(AT(2, BMOM_BUFFER_TOO_SMALL), bmom_symbol(26, NULL, 0, &needed));
  STATUS(AT(1, BMOM_UNKNOWN_ELEMENT), bmom_symbol(119, text, 8, &needed));
  CHECK(text[0] == '\0' && needed == 0);
  STATUS(AT(1, BMOM_MISSING), bmom_symbol(INT32_MIN, text, 8, NULL));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_symbol(26, NULL, 8, NULL));
  STATUS(AT(2, BMOM_NEGATIVE_COUNT), bmom_symbol(26, text, -1, NULL));
  STATUS(AT(2, BMOM_MISALIGNED), bmom_symbol(26, text, 8, odd_offsets()));

  STATUS(BMOM_SOME_ROWS, bmom_symbol_column(4, z, offsets, text, 8, &needed, status));
  SAME_BYTES(offsets, expected, sizeof expected);
  CHECK(memcmp(text, "FeHOg", 5) == 0 && needed == 5);
  CHECK(status[1] == AT(1, BMOM_UNKNOWN_ELEMENT) && status[3] == 0);
  memset(text, 'x', sizeof text);
  STATUS(AT(2, BMOM_BUFFER_TOO_SMALL), bmom_symbol_column(4, z, offsets, text, 4, &needed, status));
  CHECK(text[0] == 'x' && needed == 5 && offsets[4] == 5);
  STATUS(BMOM_OK, bmom_symbol_column(0, NULL, offsets, NULL, 0, &needed, NULL));
  CHECK(needed == 0 && offsets[0] == 0);
  STATUS(BMOM_NEGATIVE_COUNT, bmom_symbol_column(-4, z, offsets, text, 8, &needed, status));
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_symbol_column(4, NULL, offsets, text, 8, &needed, status));
  STATUS(AT(1, BMOM_MISALIGNED), bmom_symbol_column(4, odd_integers(), offsets, text, 8, &needed, status));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_symbol_column(4, z, NULL, text, 8, &needed, status));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_symbol_column(4, z, offsets, NULL, 8, &needed, status));
  STATUS(AT(2, BMOM_OVERLAP), bmom_symbol_column(4, z, offsets, (char *)offsets, 8, &needed, status));
}

/* Columns of look-ups share shape and faults; each row says what a good one gives. */
typedef int32_t (*look_up)(int32_t, int32_t, double *, double *);
typedef int32_t (*look_up_column)(int32_t, int64_t, const int32_t *, double *, double *, int32_t *);

struct table {
  const char *name;
  look_up one;
  look_up_column column;
  int32_t good_table;
  int32_t z;
  double value, within;
  int32_t without; /* an element that the table lacks */
};

static const struct table tables[] = {
  /* H: Bondi, J. Phys. Chem. 1964, 68, 441; no value for boron. */
  {"vdw_radius", bmom_vdw_radius, bmom_vdw_radius_column, BMOM_VDW_BONDI_1964, 1, 1.20, 1e-12, 5},
  /* F: CRC Handbook of Chemistry and Physics, section 9; no value for helium. */
  {"electronegativity", bmom_electronegativity, bmom_electronegativity_column, BMOM_ELECTRONEGATIVITY_PAULING, 9, 3.98,
   1e-12, 2},
  /* S: Prohaska et al., Pure Appl. Chem. 2022, 94, 573; none for technetium. */
  {"atomic_weight", bmom_atomic_weight, bmom_atomic_weight_column, BMOM_WEIGHTS_STANDARD_2021, 16, 32.06, 1e-12, 43},
  /* Na: 162.7(5) a.u., Schwerdtfeger and Nagle, Mol. Phys. 2019, 117, 1200; none for livermorium. */
  {"polarizability", bmom_polarizability, bmom_polarizability_column, BMOM_POLARIZABILITY_2018, 11, 24.10965, 6e-6, 116},
};

static void look_ups(void)
{
  for (size_t k = 0; k < sizeof tables / sizeof tables[0]; ++k) {
    const struct table *t = &tables[k];
    const int before = checks_failed;
    double value, u, column[ROWS], u_column[ROWS], part[ROWS], u_part[ROWS];
    int32_t status[ROWS];
    int32_t z[ROWS];
    z[0] = t->z, z[1] = 0, z[2] = INT32_MIN, z[3] = t->without, z[4] = -1, z[5] = t->z;

    STATUS(BMOM_OK, t->one(t->good_table, t->z, &value, &u));
    NEAR(value, t->value, t->within);
    STATUS(BMOM_OK, t->one(t->good_table, t->z, &value, NULL));
    STATUS(AT(2, BMOM_NO_DATA), t->one(t->good_table, t->without, &value, NULL));
    NO_VALUE(value);
    STATUS(AT(2, BMOM_UNKNOWN_ELEMENT), t->one(t->good_table, 119, &value, NULL));
    STATUS(AT(2, BMOM_MISSING), t->one(t->good_table, INT32_MIN, &value, NULL));
    STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), t->one(0, t->z, &value, NULL));
    STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), t->one(INT32_MIN, t->z, &value, NULL));
    STATUS(AT(1, BMOM_WRONG_SELECTOR), t->one(BMOM_UNIT_PM, t->z, &value, &u));
    NO_VALUE(value);
    NO_VALUE(u);
    STATUS(AT(3, BMOM_NULL_POINTER), t->one(t->good_table, t->z, NULL, &u));
    STATUS(AT(3, BMOM_MISALIGNED), t->one(t->good_table, t->z, odd_doubles(), &u));
    STATUS(AT(3, BMOM_MISALIGNED), t->one(t->good_table, t->z, &value, odd_doubles()));

    STATUS(BMOM_SOME_ROWS, t->column(t->good_table, ROWS, z, column, u_column, status));
    STATUS(BMOM_OK, t->one(t->good_table, t->z, &value, &u));
    SAME(column[0], value);
    SAME(u_column[0], u);
    SAME(column[5], value);
    for (int i = 1; i < 5; ++i) {
      NO_VALUE(column[i]);
      NO_VALUE(u_column[i]);
    }
    CHECK(status[0] == 0 && status[1] == AT(2, BMOM_UNKNOWN_ELEMENT) && status[2] == AT(2, BMOM_MISSING));
    CHECK(status[3] == AT(2, BMOM_NO_DATA) && status[4] == AT(2, BMOM_UNKNOWN_ELEMENT) && status[5] == 0);
    STATUS(BMOM_SOME_ROWS, t->column(t->good_table, 2, z, part, u_part, NULL));
    STATUS(BMOM_SOME_ROWS, t->column(t->good_table, ROWS - 2, z + 2, part + 2, u_part + 2, NULL));
    SAME_BYTES(part, column, sizeof part);
    SAME_BYTES(u_part, u_column, sizeof u_part);
    STATUS(BMOM_NO_ROWS, t->column(t->good_table, 4, z + 1, part, NULL, NULL));

    mark_doubles(column, ROWS);
    mark_integers(status, ROWS);
    STATUS(BMOM_OK, t->column(t->good_table, 0, NULL, NULL, NULL, NULL));
    STATUS(BMOM_NEGATIVE_COUNT, t->column(t->good_table, -1, z, column, u_column, status));
    STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), t->column(4711, ROWS, z, column, NULL, status));
    STATUS(AT(1, BMOM_WRONG_SELECTOR), t->column(BMOM_STATE_SP, ROWS, z, column, NULL, status));
    STATUS(AT(2, BMOM_NULL_POINTER), t->column(t->good_table, ROWS, NULL, column, NULL, status));
    STATUS(AT(2, BMOM_MISALIGNED), t->column(t->good_table, ROWS, odd_integers(), column, NULL, status));
    STATUS(AT(3, BMOM_NULL_POINTER), t->column(t->good_table, ROWS, z, NULL, NULL, status));
    STATUS(AT(3, BMOM_MISALIGNED), t->column(t->good_table, ROWS, z, odd_doubles(), NULL, status));
    STATUS(BMOM_MISALIGNED, t->column(t->good_table, ROWS, z, column, NULL, odd_integers()));
    STATUS(AT(3, BMOM_OVERLAP), t->column(t->good_table, ROWS, z, column, column, status));
    STATUS(AT(3, BMOM_OVERLAP), t->column(t->good_table, ROWS, z, column, column + ROWS - 1, status));
    STATUS(AT(3, BMOM_OVERLAP), t->column(t->good_table, 2, (const int32_t *)(const void *)column, column, NULL, status));
    CHECK(doubles_untouched(column, ROWS) && integers_untouched(status, ROWS));
    if (checks_failed > before) fprintf(stderr, "  in %s\n", t->name);
  }
}

/* Cordero et al., Dalton Trans. 2008, 2832: H 0.31(5), C sp3 0.76(1), sp2 0.73(2), sp 0.69(1), Mn 1.39(5) low spin. */
static void covalent_radii(void)
{
  static const int32_t z[ROWS] = {1, 6, 6, 6, 6, 96};
  static const int32_t state[ROWS] = {BMOM_STATE_AS_LISTED, BMOM_STATE_SP3, BMOM_STATE_SP2, BMOM_STATE_SP, 0, INT32_MIN};
  static const double radius_A[4] = {0.31, 0.76, 0.73, 0.69};
  static const double u_radius_A[4] = {0.05, 0.01, 0.02, 0.01};
  const int32_t table = BMOM_RADII_CORDERO_2008;
  double value, u, column[ROWS], u_column[ROWS];
  int32_t status[ROWS];

  STATUS(BMOM_SOME_ROWS, bmom_covalent_radius_column(table, ROWS, z, state, column, u_column, status));
  for (int i = 0; i < 4; ++i) {
    NEAR(column[i], radius_A[i], 1e-12);
    NEAR(u_column[i], u_radius_A[i], 1e-12);
    STATUS(BMOM_OK, bmom_covalent_radius(table, z[i], state[i], &value, &u));
    SAME(column[i], value);
    SAME(u_column[i], u);
  }
  CHECK(status[4] == AT(3, BMOM_OUT_OF_RANGE) && status[5] == AT(3, BMOM_MISSING));
  NO_VALUE(column[4]);
  NO_VALUE(u_column[5]);
  STATUS(AT(3, BMOM_UNKNOWN_SELECTOR), bmom_covalent_radius(table, 6, 0, &value, &u));
  STATUS(AT(3, BMOM_WRONG_SELECTOR), bmom_covalent_radius(table, 6, BMOM_UNIT_PM, &value, &u));
  NO_VALUE(value);
  NO_VALUE(u);
  STATUS(AT(2, BMOM_UNKNOWN_ELEMENT), bmom_covalent_radius(table, 0, BMOM_STATE_SP3, &value, &u));
  STATUS(AT(1, BMOM_WRONG_SELECTOR), bmom_covalent_radius(BMOM_VDW_BONDI_1964, 6, BMOM_STATE_SP3, &value, &u));
  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), bmom_covalent_radius(0, 6, BMOM_STATE_SP3, &value, &u));
  STATUS(AT(4, BMOM_NULL_POINTER), bmom_covalent_radius(table, 6, BMOM_STATE_SP3, NULL, &u));
  STATUS(BMOM_OK, bmom_covalent_radius_column(table, 0, NULL, NULL, NULL, NULL, NULL));
  mark_doubles(column, ROWS);
  STATUS(BMOM_NEGATIVE_COUNT, bmom_covalent_radius_column(table, -1, z, state, column, NULL, status));
  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), bmom_covalent_radius_column(9, ROWS, z, state, column, NULL, status));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_covalent_radius_column(table, ROWS, NULL, state, column, NULL, status));
  STATUS(AT(3, BMOM_NULL_POINTER), bmom_covalent_radius_column(table, ROWS, z, NULL, column, NULL, status));
  STATUS(AT(3, BMOM_MISALIGNED), bmom_covalent_radius_column(table, ROWS, z, odd_integers(), column, NULL, status));
  STATUS(AT(4, BMOM_NULL_POINTER), bmom_covalent_radius_column(table, ROWS, z, state, NULL, NULL, status));
  STATUS(AT(4, BMOM_OVERLAP), bmom_covalent_radius_column(table, ROWS, z, state, column, column, status));
  CHECK(doubles_untouched(column, ROWS));
  /* Two inputs may be one array. */
  STATUS(BMOM_NO_ROWS, bmom_covalent_radius_column(table, ROWS, z, z, column, NULL, status));
}

/* N. Bohr, Phil. Mag. 1913, 26, 1, with a0 = 0.529177210544(82) A (CODATA 2022). */
static void bohr_radii(void)
{
  static const int32_t shell[4] = {1, 2, 0, INT32_MIN};
  static const int32_t charge[4] = {1, 1, 1, 1};
  double value, u, column[4], u_column[4];
  int32_t status[4];

  STATUS(BMOM_OK, bmom_bohr_radius(1, 1, &value, &u));
  NEAR(value, 0.529177210544, 1e-15);
  NEAR(u, 8.2e-11, 1e-20);
  STATUS(AT(1, BMOM_OUT_OF_RANGE), bmom_bohr_radius(0, 1, &value, &u));
  NO_VALUE(value);
  STATUS(AT(2, BMOM_OUT_OF_RANGE), bmom_bohr_radius(1, 0, &value, &u));
  STATUS(AT(1, BMOM_MISSING), bmom_bohr_radius(INT32_MIN, 1, &value, &u));
  STATUS(AT(3, BMOM_NULL_POINTER), bmom_bohr_radius(1, 1, NULL, NULL));
  STATUS(BMOM_SOME_ROWS, bmom_bohr_radius_column(4, shell, charge, column, u_column, status));
  NEAR(column[1], 4 * 0.529177210544, 1e-14);
  CHECK(status[2] == AT(1, BMOM_OUT_OF_RANGE) && status[3] == AT(1, BMOM_MISSING));
  NO_VALUE(column[2]);
  STATUS(BMOM_OK, bmom_bohr_radius(1, 1, &value, &u));
  SAME(column[0], value);
  SAME(u_column[0], u);
  STATUS(BMOM_OK, bmom_bohr_radius_column(0, NULL, NULL, NULL, NULL, NULL));
  STATUS(BMOM_NEGATIVE_COUNT, bmom_bohr_radius_column(INT64_MIN, shell, charge, column, NULL, NULL));
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_bohr_radius_column(4, NULL, charge, column, NULL, NULL));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_bohr_radius_column(4, shell, NULL, column, NULL, NULL));
  STATUS(AT(3, BMOM_NULL_POINTER), bmom_bohr_radius_column(4, shell, charge, NULL, NULL, NULL));
}

/* Units: exact by definition, and e a0 = 8.4783536198(13)e-30 C m (CODATA 2022). */
static void units(void)
{
  double values[ROWS], u_values[ROWS], value, u, column[ROWS], u_column[ROWS];
  int32_t status[ROWS];
  const int32_t bohr = BMOM_UNIT_E_BOHR, si = BMOM_UNIT_C_M, debye = BMOM_UNIT_DEBYE;

  STATUS(BMOM_OK, bmom_convert(BMOM_UNIT_PM, BMOM_UNIT_ANGSTROM, 154.0, 1.0, &value, &u));
  SAME(value, 1.54);
  SAME(u, 0.01);
  STATUS(BMOM_OK, bmom_convert(bohr, si, 1.0, 0.0, &value, &u));
  NEAR(value, 8.4783536198e-30, 2e-40);
  NEAR(u, 1.3e-39, 1e-40);
  STATUS(BMOM_OK, bmom_convert(BMOM_UNIT_PM, BMOM_UNIT_ANGSTROM, 154.0, other_nan(), &value, &u));
  NO_VALUE(u);
  STATUS(BMOM_OK, bmom_convert(debye, si, -0.0, missing_of_r(), &value, &u));
  SAME(value, 0.0); /* no negative zero leaves the library */
  STATUS(AT(2, BMOM_NOT_ALLOWED), bmom_convert(BMOM_UNIT_ANGSTROM, debye, 1.0, 0.0, &value, &u));
  NO_VALUE(value);
  STATUS(AT(3, BMOM_OUT_OF_RANGE), bmom_convert(BMOM_UNIT_KELVIN, BMOM_UNIT_CELSIUS, -1.0, 0.0, &value, &u));
  STATUS(AT(3, BMOM_NEGATIVE_UNCERTAINTY), bmom_convert(debye, si, 1.0, -1e-300, &value, &u));
  STATUS(AT(3, BMOM_NOT_FINITE), bmom_convert(debye, si, infinity(), 0.0, &value, &u));
  STATUS(AT(3, BMOM_NOT_FINITE), bmom_convert(debye, si, 1.0, infinity(), &value, &u));
  STATUS(AT(3, BMOM_MISSING), bmom_convert(debye, si, missing_of_r(), 0.0, &value, &u));
  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), bmom_convert(0, si, 1.0, 0.0, &value, &u));
  STATUS(AT(2, BMOM_WRONG_SELECTOR), bmom_convert(debye, BMOM_STATE_SP, 1.0, 0.0, &value, &u));
  STATUS(AT(4, BMOM_NULL_POINTER), bmom_convert(debye, si, 1.0, 0.0, NULL, &u));

  values[0] = 1.0, values[1] = other_nan(), values[2] = infinity(), values[3] = missing_of_r(), values[4] = 1e300;
  values[5] = -2.0;
  for (int i = 0; i < ROWS; ++i) u_values[i] = 0.0;
  u_values[5] = -1.0;
  STATUS(BMOM_SOME_ROWS, bmom_convert_column(si, debye, ROWS, values, u_values, column, u_column, status));
  STATUS(BMOM_OK, bmom_convert(si, debye, 1.0, 0.0, &value, &u));
  SAME(column[0], value);
  SAME(u_column[0], u);
  CHECK(status[0] == 0 && status[1] == AT(3, BMOM_MISSING) && status[2] == AT(3, BMOM_NOT_FINITE));
  CHECK(status[3] == AT(3, BMOM_MISSING) && status[4] == AT(3, BMOM_OUT_OF_RANGE));
  CHECK(status[5] == AT(3, BMOM_NEGATIVE_UNCERTAINTY));
  for (int i = 1; i < ROWS; ++i) {
    NO_VALUE(column[i]);
    NO_VALUE(u_column[i]);
  }
  STATUS(BMOM_SOME_ROWS, bmom_convert_column(si, debye, ROWS, values, NULL, column, u_column, status));
  NO_VALUE(u_column[0]); /* not known is not exact */
  STATUS(BMOM_OK, bmom_convert_column(si, debye, 0, NULL, NULL, NULL, NULL, NULL));
  mark_doubles(column, ROWS);
  STATUS(AT(2, BMOM_NOT_ALLOWED), bmom_convert_column(si, BMOM_UNIT_PM, ROWS, values, NULL, column, NULL, NULL));
  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), bmom_convert_column(0, debye, ROWS, values, NULL, column, NULL, NULL));
  STATUS(BMOM_NEGATIVE_COUNT, bmom_convert_column(si, debye, -1, values, NULL, column, NULL, NULL));
  STATUS(AT(3, BMOM_NULL_POINTER), bmom_convert_column(si, debye, ROWS, NULL, NULL, column, NULL, NULL));
  STATUS(AT(3, BMOM_MISALIGNED), bmom_convert_column(si, debye, ROWS, values, odd_doubles(), column, NULL, NULL));
  STATUS(AT(4, BMOM_NULL_POINTER), bmom_convert_column(si, debye, ROWS, values, NULL, NULL, NULL, NULL));
  STATUS(AT(4, BMOM_OVERLAP), bmom_convert_column(si, debye, ROWS, column, NULL, column, NULL, NULL));
  CHECK(doubles_untouched(column, ROWS));
}

int main(void)
{
  atomic_numbers();
  symbols();
  look_ups();
  covalent_radii();
  bohr_radii();
  units();
  return checks_end("elements");
}
