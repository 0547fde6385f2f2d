/* Charges: q = mu/(e d) with its inverses, and partial charges of molecules, through the C ABI. */
#include "molecules.h"

#define ROWS 8

typedef int32_t (*scalar)(double, double, double, double, double *, double *);
typedef int32_t (*column)(int64_t, const double *, const double *, const double *, const double *, double *, double *,
                          int32_t *);

struct law {
  const char *name;
  scalar one;
  column many;
  double first, u_first, second, u_second, value, within;
};

/* HCl: 1.1086(3) D (Nelson, Lide, Maryott 1967) at 1.27455 A (Huber, Herzberg 1979), both from memory: 0.18109 e.
   1 e A = 4.803204712570264 D (exact, SI of 2019). NaCl: 9.00117 D and 0.79380 e at 2.3608 A (same sources). */
static const struct law laws[] = {
  {"charge_from_dipole", bmom_charge_from_dipole, bmom_charge_from_dipole_column, 1.1086, 0.0003, 1.27455, 0.0, 0.18109,
   1e-5},
  {"dipole_from_charge", bmom_dipole_from_charge, bmom_dipole_from_charge_column, 1.0, 0.1, 1.0, 0.1, 4.803204712570264,
   1e-14},
  {"length_from_dipole", bmom_length_from_dipole, bmom_length_from_dipole_column, 9.00117, 0.0, 0.79380, 0.0, 2.3608, 1e-4},
};

static void one_law(const struct law *law)
{
  double first[ROWS], u_first[ROWS], second[ROWS], u_second[ROWS], value, u;
  double values[ROWS], us[ROWS], part[ROWS], u_part[ROWS];
  int32_t status[ROWS];

  STATUS(BMOM_OK, law->one(law->first, law->u_first, law->second, law->u_second, &value, &u));
  NEAR(value, law->value, law->within);
  STATUS(BMOM_OK, law->one(law->first, law->u_first, law->second, law->u_second, &value, NULL));
  for (int i = 0; i < ROWS; ++i) {
    first[i] = law->first, u_first[i] = law->u_first, second[i] = law->second, u_second[i] = law->u_second;
  }
  first[1] = missing_of_r();
  first[2] = infinity();
  second[3] = other_nan();
  second[4] = 0.0;
  u_first[5] = -1.0;
  u_second[6] = infinity();
  STATUS(BMOM_SOME_ROWS, law->many(ROWS, first, u_first, second, u_second, values, us, status));
  STATUS(BMOM_OK, law->one(law->first, law->u_first, law->second, law->u_second, &value, &u));
  SAME(values[0], value);
  SAME(us[0], u);
  SAME(values[7], value);
  CHECK(status[0] == 0 && status[1] == AT(1, BMOM_MISSING) && status[2] == AT(1, BMOM_NOT_FINITE));
  CHECK(status[3] == AT(2, BMOM_MISSING) && status[4] == AT(2, BMOM_OUT_OF_RANGE));
  CHECK(status[5] == AT(1, BMOM_NEGATIVE_UNCERTAINTY) && status[6] == AT(2, BMOM_NOT_FINITE) && status[7] == 0);
  for (int i = 1; i < 7; ++i) {
    NO_VALUE(values[i]);
    NO_VALUE(us[i]);
    STATUS(status[i], law->one(first[i], u_first[i], second[i], u_second[i], &value, &u));
    NO_VALUE(value);
    NO_VALUE(u);
  }
  STATUS(BMOM_SOME_ROWS, law->many(3, first, u_first, second, u_second, part, u_part, NULL));
  STATUS(BMOM_SOME_ROWS, law->many(ROWS - 3, first + 3, u_first + 3, second + 3, u_second + 3, part + 3, u_part + 3, NULL));
  SAME_BYTES(part, values, sizeof part);
  SAME_BYTES(u_part, us, sizeof u_part);
  STATUS(BMOM_SOME_ROWS, law->many(ROWS, first, NULL, second, u_second, part, u_part, status));
  SAME(part[0], values[0]);
  NO_VALUE(u_part[0]);
  CHECK(status[5] == 0);
  STATUS(BMOM_SOME_ROWS, law->many(ROWS, first, NULL, second, NULL, part, NULL, NULL));
  STATUS(BMOM_NO_ROWS, law->many(1, first + 1, NULL, second, NULL, part, NULL, NULL));
  STATUS(BMOM_OK, law->many(0, NULL, NULL, NULL, NULL, NULL, NULL, NULL));

  STATUS(AT(3, BMOM_NULL_POINTER), law->one(1.0, 0.0, 1.0, 0.0, NULL, &u));
  STATUS(AT(3, BMOM_MISALIGNED), law->one(1.0, 0.0, 1.0, 0.0, odd_doubles(), &u));
  mark_doubles(values, ROWS);
  mark_doubles(us, ROWS);
  mark_integers(status, ROWS);
  STATUS(BMOM_NEGATIVE_COUNT, law->many(-1, first, NULL, second, NULL, values, us, status));
  STATUS(BMOM_TOO_LARGE, law->many(INT64_MAX, first, NULL, second, NULL, values, us, status));
  STATUS(AT(1, BMOM_NULL_POINTER), law->many(ROWS, NULL, NULL, second, NULL, values, us, status));
  STATUS(AT(1, BMOM_MISALIGNED), law->many(ROWS, odd_doubles(), NULL, second, NULL, values, us, status));
  STATUS(AT(1, BMOM_MISALIGNED), law->many(ROWS, first, odd_doubles(), second, NULL, values, us, status));
  STATUS(AT(2, BMOM_NULL_POINTER), law->many(ROWS, first, NULL, NULL, NULL, values, us, status));
  STATUS(AT(2, BMOM_MISALIGNED), law->many(ROWS, first, NULL, second, odd_doubles(), values, us, status));
  STATUS(AT(3, BMOM_NULL_POINTER), law->many(ROWS, first, NULL, second, NULL, NULL, us, status));
  STATUS(AT(3, BMOM_MISALIGNED), law->many(ROWS, first, NULL, second, NULL, values, odd_doubles(), status));
  STATUS(BMOM_MISALIGNED, law->many(ROWS, first, NULL, second, NULL, values, us, odd_integers()));
  STATUS(AT(3, BMOM_OVERLAP), law->many(ROWS, first, NULL, second, NULL, first, us, status));
  STATUS(AT(3, BMOM_OVERLAP), law->many(ROWS - 1, values, NULL, second, NULL, values + 1, us, status));
  STATUS(AT(3, BMOM_OVERLAP), law->many(ROWS, first, NULL, second, NULL, values, values, status));
  STATUS(BMOM_OVERLAP, law->many(ROWS, first, NULL, second, NULL, values, us, (int32_t *)(void *)us));
  CHECK(doubles_untouched(values, ROWS) && doubles_untouched(us, ROWS) && integers_untouched(status, ROWS));
  SAME(first[0], law->first);
}

static void diatomics(void)
{
  double value, u;
  for (size_t k = 0; k < sizeof laws / sizeof laws[0]; ++k) {
    const int before = checks_failed;
    one_law(&laws[k]);
    if (checks_failed > before) fprintf(stderr, "  in %s\n", laws[k].name);
  }
  /* mu = q d: relative uncertainties of 0.1 each add to 0.1 sqrt(2) (JCGM 100:2008, equation 10). */
  STATUS(BMOM_OK, bmom_dipole_from_charge(1.0, 0.1, 1.0, 0.1, &value, &u));
  NEAR(u, 0.1414213562373095 * 4.803204712570264, 1e-14);
  STATUS(AT(2, BMOM_OUT_OF_RANGE), bmom_charge_from_dipole(1.0, 0.0, -1.0, 0.0, &value, &u));
  STATUS(AT(2, BMOM_OUT_OF_RANGE), bmom_length_from_dipole(1.0, 0.0, -1.0, 0.0, &value, &u));
  STATUS(BMOM_OUT_OF_RANGE, bmom_charge_from_dipole(1e300, 0.0, 1e-300, 0.0, &value, &u));
  NO_VALUE(value);
  STATUS(BMOM_OK, bmom_charge_from_dipole(-0.0, 0.0, 1.0, 0.0, &value, &u));
  SAME(value, 0.0);
}

struct result {
  double charge[MOLECULE_ATOMS], u[MOLECULE_ATOMS];
  int32_t remarks[MOLECULE_ROWS], item[MOLECULE_ROWS], status[MOLECULE_ROWS];
};

static int32_t partial(struct result *r, int32_t model, int32_t threads, int64_t n, const int64_t *offsets,
                       const int64_t *of_bonds)
{
  memset(r, 0x55, sizeof *r);
  return bmom_partial_charges_column(model, NULL, threads, n, offsets, MOLECULE_ATOMS, atomic_number, NULL, xyz_A, of_bonds,
                                     of_bonds ? MOLECULE_BONDS : 0, of_bonds ? bond_atoms : NULL,
                                     of_bonds ? bond_order : NULL, r->charge, r->u, r->remarks, r->item, r->status);
}

/* Charges printed by Gasteiger and Marsili, Tetrahedron 1980, 36, 3219 (from memory): CH3F C 0.079, F -0.253, H 0.058;
   CH4 C -0.078. */
static void partial_charges(void)
{
  static const int64_t beyond[MOLECULE_ROWS + 1] = {1, 3, 7, 7, 7, 11, 12, 13};
  static const int64_t falling[3] = {4, 1, 9};
  static const int32_t self[4] = {0, 0, 0, 2};
  static const int32_t outside[4] = {0, 1, 0, 3};
  static const int32_t twice[4] = {0, 1, 1, 0};
  const int32_t peoe = BMOM_CHARGES_PEOE_1980;
  struct result found, given, other;
  double charge[3], u[3];
  double order[2] = {1, 1};
  int32_t remarks = -1, item = -2;

  STATUS(BMOM_SOME_ROWS, partial(&found, peoe, 1, MOLECULE_ROWS, atom_offsets, NULL));
  NEAR(found.charge[4], 0.079, 0.0005);
  NEAR(found.charge[5], -0.253, 0.0005);
  NEAR(found.charge[6], 0.058, 0.0005);
  NEAR(found.charge[10], -0.078, 0.0005);
  NEAR(found.charge[1] + found.charge[2] + found.charge[3], 0.0, 1e-15);
  NO_VALUE(found.u[4]); /* the model states none */
  NO_VALUE(found.charge[9]);
  CHECK(bits_of(found.charge[0]) == UINT64_C(0x5555555555555555)); /* belongs to no row */
  CHECK(found.status[WATER] == 0 && found.status[FLUOROMETHANE] == 0 && found.status[METHANE] == 0);
  CHECK(found.status[NO_ELEMENT] == AT(2, BMOM_UNKNOWN_ELEMENT) && found.item[NO_ELEMENT] == 0);
  CHECK(found.status[NO_ATOM] == AT(2, BMOM_NO_ATOMS) && found.status[TOO_CLOSE] == AT(2, BMOM_ATOMS_TOO_CLOSE));
  CHECK(found.status[NO_PLACE] == AT(2, BMOM_MISSING) && found.item[NO_PLACE] == 0);
  CHECK((found.remarks[WATER] & BMOM_REMARK_BONDS_FOUND) != 0 && found.item[WATER] == -1);
  STATUS(BMOM_SOME_ROWS, partial(&given, peoe, 1, MOLECULE_ROWS, atom_offsets, bond_offsets));
  SAME_BYTES(given.charge + 1, found.charge + 1, 8 * sizeof(double));
  CHECK((given.remarks[WATER] & BMOM_REMARK_BONDS_FOUND) == 0);
  for (int32_t threads = 0; threads < 8; ++threads) {
    STATUS(BMOM_SOME_ROWS, partial(&other, peoe, threads, MOLECULE_ROWS, atom_offsets, NULL));
    SAME_BYTES(&other, &found, sizeof found);
  }
  /* A column cut in two. */
  STATUS(BMOM_SOME_ROWS, partial(&other, peoe, 1, 3, atom_offsets, NULL));
  SAME_BYTES(other.charge, found.charge, 9 * sizeof(double));
  STATUS(BMOM_SOME_ROWS, partial(&other, peoe, 1, 4, atom_offsets + 3, NULL));
  SAME_BYTES(other.charge + 10, found.charge + 10, 8 * sizeof(double));
  CHECK(other.status[1] == found.status[4] && other.remarks[1] == found.remarks[4]);

  STATUS(AT(1, BMOM_NOT_ALLOWED), partial(&other, BMOM_CHARGES_GIVEN, 1, MOLECULE_ROWS, atom_offsets, NULL));
  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), partial(&other, 0, 1, MOLECULE_ROWS, atom_offsets, NULL));
  STATUS(AT(1, BMOM_WRONG_SELECTOR), partial(&other, BMOM_UNIT_E, 1, MOLECULE_ROWS, atom_offsets, NULL));
  STATUS(BMOM_OUT_OF_RANGE, partial(&other, peoe, -1, MOLECULE_ROWS, atom_offsets, NULL));
  STATUS(AT(2, BMOM_NEGATIVE_COUNT), partial(&other, peoe, 1, -1, atom_offsets, NULL));
  STATUS(AT(2, BMOM_NULL_POINTER), partial(&other, peoe, 1, MOLECULE_ROWS, NULL, NULL));
  STATUS(AT(2, BMOM_MISALIGNED), partial(&other, peoe, 1, MOLECULE_ROWS, odd_offsets(), NULL));
  STATUS(AT(3, BMOM_BAD_OFFSETS), partial(&other, peoe, 1, MOLECULE_ROWS, atom_offsets, beyond));
  STATUS(AT(2, BMOM_BAD_OFFSETS), partial(&other, peoe, 1, 2, falling, NULL));
  STATUS(BMOM_OK, bmom_partial_charges_column(peoe, NULL, 1, 0, NULL, 0, NULL, NULL, NULL, NULL, 0, NULL, NULL, NULL, NULL,
                                              NULL, NULL, NULL));
  STATUS(AT(4, BMOM_NULL_POINTER), bmom_partial_charges_column(peoe, NULL, 1, 1, atom_offsets, MOLECULE_ATOMS,
         atomic_number, NULL, xyz_A, NULL, 0, NULL, NULL, NULL, NULL, NULL, NULL, NULL));
  STATUS(AT(4, BMOM_OVERLAP), bmom_partial_charges_column(peoe, NULL, 1, 1, atom_offsets, MOLECULE_ATOMS, atomic_number,
         NULL, xyz_A, NULL, 0, NULL, NULL, xyz_A, NULL, NULL, NULL, NULL));
  SAME(xyz_A[5], 0.0);

#define ONE(n, z, xyz, n_bonds, atoms, order_, out) \
  bmom_partial_charges(peoe, (n), (z), NULL, (xyz), (n_bonds), (atoms), (order_), (out), u, &remarks, &item)
#define ON_WATER(n_bonds, atoms, order_) ONE(3, atomic_number + 1, xyz_A + 3, n_bonds, atoms, order_, charge)
  STATUS(BMOM_OK, ON_WATER(0, NULL, NULL));
  SAME_BYTES(charge, found.charge + 1, sizeof charge);
  CHECK(remarks == found.remarks[WATER] && item == -1);
  STATUS(BMOM_OK, ON_WATER(2, bond_atoms + 2, bond_order + 1));
  SAME_BYTES(charge, found.charge + 1, sizeof charge);
  STATUS(AT(3, BMOM_BAD_BOND), ON_WATER(2, self, order));
  CHECK(item == 0);
  NO_VALUE(charge[0]);
  NO_VALUE(u[2]);
  STATUS(AT(3, BMOM_BAD_BOND), ON_WATER(2, outside, order));
  CHECK(item == 1);
  STATUS(AT(3, BMOM_BAD_BOND), ON_WATER(2, twice, order));
  order[1] = missing_of_r();
  STATUS(AT(3, BMOM_MISSING), ON_WATER(2, bond_atoms + 2, order));
  CHECK(item == 1);
  STATUS(AT(3, BMOM_NULL_POINTER), ON_WATER(2, bond_atoms + 2, NULL));
  STATUS(AT(3, BMOM_NEGATIVE_COUNT), ON_WATER(-1, bond_atoms + 2, order));
  STATUS(AT(2, BMOM_NEGATIVE_COUNT), ONE(-3, atomic_number + 1, xyz_A + 3, 0, NULL, NULL, charge));
  STATUS(AT(2, BMOM_NULL_POINTER), ONE(3, NULL, xyz_A + 3, 0, NULL, NULL, charge));
  STATUS(AT(4, BMOM_MISALIGNED), ONE(3, atomic_number + 1, xyz_A + 3, 0, NULL, NULL, odd_doubles()));
  mark_doubles(charge, 3);
  STATUS(AT(1, BMOM_NOT_ALLOWED), bmom_partial_charges(BMOM_CHARGES_GIVEN, 3, atomic_number + 1, NULL, xyz_A + 3, 0, NULL,
                                                       NULL, charge, u, &remarks, &item));
  NO_VALUE(charge[0]); /* the plain form leaves no stale number behind any failure */
  NO_VALUE(u[2]);
}

int main(void)
{
  molecules_ready();
  diatomics();
  partial_charges();
  return checks_end("charges");
}
