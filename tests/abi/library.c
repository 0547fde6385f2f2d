/* Libraries of compounds, runs through files, and tables through the C ABI. Arguments: the folder of published molecules
   and a folder for scratch files. */
#include "molecules.h"

#define CTFILE BMOM_FORMAT_CTFILE
#define ANY BMOM_FORMAT_BY_CONTENT

static uint64_t foreign_room[16];
#define FOREIGN(type) ((type *)(void *)foreign_room)
static char molecule_path[4000], scratch_path[4000];

/* Carbon dioxide and water: textbook lengths and angle (from memory); their formulae and signs are exact. */
static const char two_frames[] =
  "3\ncarbon dioxide\nC 0 0 0\nO 0 0 1.16\nO 0 0 -1.16\n3\nwater\nO 0 0 0\nH 0.96 0 0\nH -0.2404 -0.9294 0\n";

static bmom_library *parsed(const char *text, int32_t format, int32_t status)
{
  bmom_library *library = FOREIGN(bmom_library);
  STATUS(status, bmom_library_parse(format, NULL, 1, NULL, text, -1, &library));
  CHECK((library != NULL) == (status == BMOM_OK));
  return library;
}

static int32_t column_of(const bmom_table *table, const char *name, int32_t type)
{
  int32_t column = -1, found = -1;
  STATUS(BMOM_OK, bmom_table_column(table, name, -1, &column, &found));
  if (!CHECK(found == type)) fprintf(stderr, "  %s\n", name);
  return column;
}

static double number(const bmom_table *table, const char *name, int64_t row)
{
  double value = UNTOUCHED;
  STATUS(BMOM_OK, bmom_table_numbers(table, column_of(table, name, BMOM_TYPE_NUMBER), row, 1, &value, NULL));
  return value;
}

static int is_text(const bmom_table *table, const char *name, int64_t row, const char *expected)
{
  char text[400];
  int64_t offsets[2], needed;
  int32_t column = -1, type = -1;
  STATUS(BMOM_OK, bmom_table_column(table, name, -1, &column, &type));
  STATUS(BMOM_OK, bmom_table_texts(table, column, row, 1, offsets, text, (int64_t)sizeof text - 1, &needed, NULL));
  text[needed] = '\0';
  if (strcmp(text, expected) != 0) fprintf(stderr, "  %s is %s, expected %s\n", name, text, expected);
  return strcmp(text, expected) == 0;
}

static void tables(void)
{
  bmom_library *library = parsed(two_frames, ANY, BMOM_OK);
  bmom_table *polarity = NULL, *bonds = NULL, *atoms = NULL, *other = NULL;
  int64_t molecules = -1, n_atoms = -1, n_bonds = -1, rows = -1, needed = -1, offsets[4];
  int32_t columns = -1, type = -1, column = -1, integers[2], cells[2], count;
  double values[4];
  char name[64];

  STATUS(BMOM_OK, bmom_library_size(library, &molecules, &n_atoms, &n_bonds));
  CHECK(molecules == 2 && n_atoms == 6 && n_bonds == 4);
#define POLARITY(l, m, threads, first, n, p, b, a) bmom_polarity_table((l), (m), NULL, (threads), NULL, (first), (n), (p), (b), (a))
  STATUS(BMOM_OK, POLARITY(library, NULL, 1, 0, 2, &polarity, &bonds, &atoms));
  CHECK(is_text(polarity, "formula", 0, "CO2") && is_text(polarity, "formula", 1, "H2O"));
  CHECK(is_text(polarity, "compound", 1, "water") && is_text(polarity, "status", 1, "OK"));
  /* A centre of symmetry forbids a dipole; delta chi of O-H is 3.44 - 2.20 (CRC Handbook, section 9). */
  CHECK(is_text(polarity, "polarity", 0, "non-polar"));
  SAME(number(polarity, "dipole_D", 0), 0.0);
  NEAR(number(polarity, "delta_chi", 1), 1.24, 1e-12);
  CHECK(is_text(polarity, "negative_end", 1, "O1"));
  CHECK(is_text(polarity, "atoms", 0, "3"));
  NEAR(number(bonds, "length_A", 0), 1.16, 1e-12);
  NEAR(number(atoms, "z_A", 1), 1.16, 0.0);
  STATUS(BMOM_OK, bmom_table_size(atoms, &rows, &columns));
  CHECK(rows == 6);
  STATUS(BMOM_OK, bmom_table_size(polarity, &rows, &columns));
  CHECK(rows == 2 && columns > 20);

  /* Every column has a name that leads back to it, and one getter. */
  for (int32_t k = 0; k < columns; ++k) {
    STATUS(BMOM_OK, bmom_table_name(polarity, k, name, (int64_t)sizeof name, &needed));
    STATUS(BMOM_OK, bmom_table_column(polarity, name, needed, &column, &type));
    CHECK(column == k);
    STATUS(type == BMOM_TYPE_NUMBER ? BMOM_OK : AT(2, BMOM_WRONG_TYPE), bmom_table_numbers(polarity, k, 0, 2, values, cells));
    STATUS(type == BMOM_TYPE_INTEGER ? BMOM_OK : AT(2, BMOM_WRONG_TYPE),
           bmom_table_integers(polarity, k, 0, 2, integers, cells));
  }
  count = column_of(polarity, "atoms", BMOM_TYPE_INTEGER);
  STATUS(BMOM_OK, bmom_table_integers(polarity, count, 0, 2, integers, cells));
  CHECK(integers[0] == 3 && integers[1] == 3 && cells[0] == 0);
  column = column_of(polarity, "u_dipole_D", BMOM_TYPE_NUMBER);
  STATUS(BMOM_OK, bmom_table_texts(polarity, column_of(polarity, "formula", BMOM_TYPE_TEXT), 0, 2, offsets, name, 6, &needed,
                                   cells));
  CHECK(offsets[0] == 0 && offsets[1] == 3 && offsets[2] == 6 && needed == 6 && memcmp(name, "CO2H2O", 6) == 0);
  memset(name, 'x', sizeof name);
  STATUS(AT(5, BMOM_BUFFER_TOO_SMALL), bmom_table_texts(polarity, 2, 0, 2, offsets, name, 5, &needed, cells));
  CHECK(name[0] == 'x' && needed == 6 && offsets[2] == 6);

  STATUS(AT(1, BMOM_NULL_POINTER), bmom_table_size(NULL, &rows, &columns));
  CHECK(rows == INT64_MIN && columns == INT32_MIN);
  STATUS(AT(1, BMOM_BAD_HANDLE), bmom_table_size(FOREIGN(bmom_table), &rows, &columns));
  STATUS(AT(1, BMOM_BAD_HANDLE), bmom_table_size((bmom_table *)(void *)library, &rows, &columns));
  STATUS(AT(1, BMOM_BAD_HANDLE), bmom_table_size((bmom_table *)(void *)odd_doubles(), &rows, &columns));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_table_size(polarity, NULL, &columns));
  STATUS(AT(3, BMOM_NULL_POINTER), bmom_table_size(polarity, &rows, NULL));
  STATUS(AT(2, BMOM_OUT_OF_RANGE), bmom_table_name(polarity, columns < 0 ? 1000 : columns, name, 9, &needed));
  STATUS(AT(2, BMOM_OUT_OF_RANGE), bmom_table_name(polarity, -1, name, 9, &needed));
  STATUS(AT(3, BMOM_BUFFER_TOO_SMALL), bmom_table_name(polarity, 0, name, 2, &needed));
  CHECK(needed == 6);
  STATUS(AT(2, BMOM_UNKNOWN_NAME), bmom_table_column(polarity, "dipole", -1, &column, &type));
  CHECK(column == INT32_MIN && type == INT32_MIN);
  STATUS(AT(2, BMOM_NOT_UTF8), bmom_table_column(polarity, "\xff", -1, &column, &type));
  STATUS(AT(3, BMOM_NULL_POINTER), bmom_table_column(polarity, "dipole_D", -1, NULL, &type));
  values[0] = UNTOUCHED;
#define NUMBERS(c, first, n, out, status) bmom_table_numbers(polarity, (c), (first), (n), (out), (status))
  column = column_of(polarity, "dipole_D", BMOM_TYPE_NUMBER);
  STATUS(AT(2, BMOM_OUT_OF_RANGE), NUMBERS(-1, 0, 2, values, cells));
  STATUS(AT(3, BMOM_NEGATIVE_COUNT), NUMBERS(column, -1, 2, values, cells));
  STATUS(AT(4, BMOM_NEGATIVE_COUNT), NUMBERS(column, 0, -2, values, cells));
  STATUS(AT(4, BMOM_OUT_OF_RANGE), NUMBERS(column, 1, 2, values, cells));
  STATUS(AT(4, BMOM_OUT_OF_RANGE), NUMBERS(column, INT64_C(1) << 56, INT64_C(1) << 56, values, cells));
  STATUS(AT(5, BMOM_NULL_POINTER), NUMBERS(column, 0, 2, NULL, cells));
  STATUS(AT(5, BMOM_MISALIGNED), NUMBERS(column, 0, 2, odd_doubles(), cells));
  STATUS(AT(6, BMOM_OVERLAP), NUMBERS(column, 0, 2, values, (int32_t *)(void *)values));
  STATUS(BMOM_OK, NUMBERS(column, 2, 0, NULL, NULL));
  SAME(values[0], UNTOUCHED);

  STATUS(AT(1, BMOM_BAD_HANDLE), POLARITY(FOREIGN(bmom_library), NULL, 1, 0, 1, &other, NULL, NULL));
  STATUS(AT(1, BMOM_NULL_POINTER), POLARITY(NULL, NULL, 1, 0, 1, &other, NULL, NULL));
  STATUS(AT(2, BMOM_NOT_ALLOWED), POLARITY(library, polarity, 1, 0, 1, &other, NULL, NULL));
  STATUS(AT(3, BMOM_NEGATIVE_COUNT), POLARITY(library, NULL, 1, -1, 1, &other, NULL, NULL));
  STATUS(AT(4, BMOM_OUT_OF_RANGE), POLARITY(library, NULL, 1, 1, 2, &other, NULL, NULL));
  STATUS(AT(3, BMOM_OUT_OF_RANGE), POLARITY(library, NULL, 1, 3, 0, &other, NULL, NULL));
  STATUS(BMOM_OUT_OF_RANGE, POLARITY(library, NULL, -1, 0, 1, &other, NULL, NULL));
  STATUS(AT(5, BMOM_OVERLAP), POLARITY(library, NULL, 1, 0, 1, &other, &other, NULL));
  CHECK(other == NULL);
  STATUS(BMOM_OK, POLARITY(library, NULL, 1, 1, 1, &other, NULL, NULL));
  CHECK(is_text(other, "compound", 0, "water"));
  STATUS(BMOM_OK, POLARITY(library, NULL, 1, 0, 2, NULL, NULL, NULL));
  bmom_table_free(other);
  bmom_library_free(library); /* tables live on */
  CHECK(is_text(polarity, "formula", 1, "H2O"));
  bmom_table_free(polarity);
  bmom_table_free(bonds);
  bmom_table_free(atoms);
  bmom_table_free(NULL);
  bmom_table_free(FOREIGN(bmom_table));
  bmom_library_free(NULL);
  bmom_library_free(FOREIGN(bmom_library));
}

/* Structures in and out again. */
static void arrays(void)
{
  static const char names[] = "..waterfluoromethane";
  static const int64_t name_offsets[3] = {2, 7, 20}, beyond[3] = {2, 7, 21};
  bmom_library *library = NULL;
  bmom_table *table = NULL;
  int64_t atoms_out[8], bonds_out[8], n, n_atoms, n_bonds;
  int32_t z[17], formal[17], pairs[20], status[7];
  double xyz[51], order[10];

#define FROM(rows, offsets, z_, charge, u, named, bytes, out) \
  bmom_library_from_arrays((rows), (offsets), MOLECULE_ATOMS, (z_), NULL, xyz_A, NULL, 0, NULL, NULL, (charge), (u), (named), \
                           names, (bytes), (out))
  STATUS(BMOM_OK, FROM(2, atom_offsets, atomic_number, NULL, NULL, name_offsets, 20, &library));
  STATUS(BMOM_OK, bmom_library_size(library, &n, &n_atoms, &n_bonds));
  CHECK(n == 2 && n_atoms == 8 && n_bonds == 6);
  STATUS(BMOM_OK, bmom_library_arrays(library, atoms_out, z, formal, xyz, bonds_out, pairs, order, status));
  SAME_BYTES(z, atomic_number + 1, 8 * sizeof(int32_t));
  SAME_BYTES(xyz, xyz_A + 3, 24 * sizeof(double));
  SAME_BYTES(pairs, bond_atoms + 2, 12 * sizeof(int32_t));
  CHECK(atoms_out[0] == 0 && atoms_out[1] == 3 && atoms_out[2] == 8 && bonds_out[2] == 6 && formal[0] == 0);
  STATUS(BMOM_OK, bmom_library_arrays(library, NULL, NULL, NULL, NULL, NULL, NULL, NULL, NULL));
  STATUS(AT(5, BMOM_MISALIGNED), bmom_library_arrays(library, NULL, NULL, NULL, odd_doubles(), NULL, NULL, NULL, NULL));
  STATUS(AT(4, BMOM_OVERLAP), bmom_library_arrays(library, NULL, z, z, NULL, NULL, NULL, NULL, NULL));
  STATUS(AT(1, BMOM_BAD_HANDLE), bmom_library_arrays(FOREIGN(bmom_library), NULL, z, NULL, NULL, NULL, NULL, NULL, NULL));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_library_size(library, NULL, &n_atoms, &n_bonds));
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_library_size(NULL, &n, &n_atoms, &n_bonds));
  CHECK(n == INT64_MIN);
  STATUS(BMOM_OK, bmom_polarity_table(library, NULL, NULL, 1, NULL, 0, 2, &table, NULL, NULL));
  CHECK(is_text(table, "compound", 1, "fluoromethane") && is_text(table, "formula", 1, "CH3F"));
  bmom_table_free(table);
  bmom_library_free(library);

  /* Faulty molecules keep their place. */
  STATUS(BMOM_OK, FROM(MOLECULE_ROWS, atom_offsets, atomic_number, charge_e, u_charge_e, NULL, 0, &library));
  STATUS(BMOM_SOME_ROWS, bmom_library_arrays(library, NULL, NULL, NULL, NULL, NULL, NULL, NULL, status));
  CHECK(status[WATER] == 0 && status[METHANE] == 0 && status[NO_ELEMENT] != 0 && status[TOO_CLOSE] != 0);
  bmom_library_free(library);
  library = FOREIGN(bmom_library);
  STATUS(AT(1, BMOM_NULL_POINTER), FROM(2, NULL, atomic_number, NULL, NULL, NULL, 0, &library));
  CHECK(library == NULL);
  STATUS(AT(1, BMOM_NEGATIVE_COUNT), FROM(-2, atom_offsets, atomic_number, NULL, NULL, NULL, 0, &library));
  STATUS(AT(1, BMOM_NULL_POINTER), FROM(2, atom_offsets, NULL, NULL, NULL, NULL, 0, &library));
  STATUS(AT(3, BMOM_MISALIGNED), FROM(2, atom_offsets, atomic_number, odd_doubles(), NULL, NULL, 0, &library));
  STATUS(AT(4, BMOM_BAD_OFFSETS), FROM(2, atom_offsets, atomic_number, NULL, NULL, beyond, 20, &library));
  STATUS(AT(5, BMOM_NULL_POINTER), FROM(2, atom_offsets, atomic_number, NULL, NULL, NULL, 0, NULL));
}

static void reading(void)
{
  bmom_library *library = NULL;
  bmom_stop *stop = NULL;
  int64_t n, n_atoms, n_bonds;
#define READ(format, threads, stop_, path, out) bmom_library_read((format), NULL, (threads), (stop_), (path), -1, (out))
  STATUS(BMOM_OK, READ(CTFILE, 1, NULL, molecule_path, &library));
  STATUS(BMOM_OK, bmom_library_size(library, &n, &n_atoms, &n_bonds));
  CHECK(n == 1 && n_atoms == 3 && n_bonds == 2);
  bmom_library_free(library);
  STATUS(AT(1, BMOM_WRONG_SELECTOR), READ(BMOM_UNIT_PM, 1, NULL, molecule_path, &library));
  CHECK(library == NULL);
  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), READ(0, 1, NULL, molecule_path, &library));
  STATUS(BMOM_OUT_OF_RANGE, READ(ANY, -1, NULL, molecule_path, &library));
  STATUS(AT(2, BMOM_FILE_MISSING), READ(ANY, 1, NULL, "/no/such/folder/file.mol", &library));
  STATUS(AT(2, BMOM_NULL_POINTER), READ(ANY, 1, NULL, NULL, &library));
  STATUS(AT(3, BMOM_NULL_POINTER), READ(ANY, 1, NULL, molecule_path, NULL));
  STATUS(BMOM_BAD_HANDLE, READ(ANY, 1, FOREIGN(bmom_stop), molecule_path, &library));
  STATUS(BMOM_OK, bmom_stop_new(&stop));
  bmom_stop_request(stop);
  STATUS(BMOM_STOPPED, READ(ANY, 1, stop, molecule_path, &library) % 1000);
  CHECK(library == NULL);
  bmom_stop_free(stop);
  parsed("no structure at all", ANY, AT(2, BMOM_BAD_FORMAT));
  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), bmom_library_parse(CTFILE + 1000, NULL, 1, NULL, two_frames, -1, &library));
  STATUS(AT(1, BMOM_WRONG_SELECTOR), bmom_library_parse(BMOM_UNIT_PM, NULL, 1, NULL, two_frames, -1, &library));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_library_parse(ANY, NULL, 1, NULL, NULL, -1, &library));
}

/* A run through a file: batches, progress, and going on from a position give the same rows as one batch. */
static void runs(void)
{
  bmom_tabulation *run = NULL, *again = NULL;
  bmom_table *whole = NULL, *first = NULL, *second = NULL;
  bmom_stop *stop = NULL;
  int64_t done = -1, bytes = -1, total = -1, needed = -1;
  char position[1000];
  FILE *file = fopen(scratch_path, "wb");

  if (!CHECK(file != NULL)) return;
  CHECK(fwrite(two_frames, 1, sizeof two_frames - 1, file) == sizeof two_frames - 1);
  CHECK(fclose(file) == 0);
#define OPEN(measured, format, threads, path, from, out) \
  bmom_tabulation_open((measured), (format), NULL, (threads), (path), -1, (from), -1, (out))
  STATUS(BMOM_OK, OPEN(NULL, ANY, 1, scratch_path, NULL, &run));
  STATUS(BMOM_OK, bmom_stop_new(&stop));
  bmom_stop_request(stop);
  STATUS(BMOM_STOPPED, bmom_tabulation_next(run, stop, 10, &whole, NULL, NULL) % 1000);
  CHECK(whole == NULL);
  bmom_stop_free(stop);
  STATUS(BMOM_OK, bmom_tabulation_next(run, NULL, 10, &whole, NULL, NULL)); /* the same records again */
  CHECK(is_text(whole, "compound", 1, "water"));
  STATUS(BMOM_END, bmom_tabulation_next(run, NULL, 10, &first, NULL, NULL));
  CHECK(first == NULL);
  STATUS(BMOM_OK, bmom_tabulation_progress(run, &done, &bytes, &total));
  CHECK(done == 2 && bytes == (int64_t)sizeof two_frames - 1 && total == bytes);
  STATUS(BMOM_OK, bmom_tabulation_progress(run, NULL, NULL, NULL));
  bmom_tabulation_free(run);

  STATUS(BMOM_OK, OPEN(NULL, BMOM_FORMAT_XYZ, 0, scratch_path, "", &run));
  STATUS(BMOM_OK, bmom_tabulation_next(run, NULL, 1, &first, NULL, NULL));
  STATUS(BMOM_OK, bmom_tabulation_position(run, position, (int64_t)sizeof position, &needed));
  STATUS(AT(2, BMOM_BUFFER_TOO_SMALL), bmom_tabulation_position(run, position, 1, &needed));
  STATUS(BMOM_OK, bmom_tabulation_position(run, position, (int64_t)sizeof position, &needed));
  bmom_tabulation_free(run);
  STATUS(BMOM_OK, OPEN(NULL, BMOM_FORMAT_XYZ, 1, scratch_path, position, &again));
  STATUS(BMOM_OK, bmom_tabulation_next(again, NULL, INT64_MAX, &second, NULL, NULL));
  CHECK(is_text(second, "compound", 0, "water"));
  SAME(number(second, "dipole_x_D", 0), number(whole, "dipole_x_D", 1));
  SAME(number(second, "cov_xx_D2", 0), number(whole, "cov_xx_D2", 1));
  CHECK(is_text(first, "polarity", 0, "non-polar"));

  bmom_table_free(first);
  STATUS(AT(2, BMOM_OUT_OF_RANGE), bmom_tabulation_next(again, NULL, 0, &first, NULL, NULL));
  CHECK(first == NULL); /* no stale handle stays behind */
  STATUS(BMOM_BAD_HANDLE, bmom_tabulation_next(again, FOREIGN(bmom_stop), 1, &first, NULL, NULL));
  STATUS(AT(1, BMOM_BAD_HANDLE), bmom_tabulation_next(FOREIGN(bmom_tabulation), NULL, 1, &first, NULL, NULL));
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_tabulation_next(NULL, NULL, 1, &first, NULL, NULL));
  STATUS(AT(3, BMOM_OVERLAP), bmom_tabulation_next(again, NULL, 1, &first, &first, NULL));
  STATUS(AT(1, BMOM_BAD_HANDLE), bmom_tabulation_progress(FOREIGN(bmom_tabulation), &done, NULL, NULL));
  CHECK(done == INT64_MIN);
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_tabulation_position(NULL, position, 9, &needed));
  STATUS(AT(1, BMOM_NOT_ALLOWED), OPEN(whole, ANY, 1, scratch_path, NULL, &run));
  CHECK(run == NULL);
  STATUS(AT(2, BMOM_WRONG_SELECTOR), OPEN(NULL, BMOM_UNIT_PM, 1, scratch_path, NULL, &run));
  STATUS(AT(3, BMOM_FILE_MISSING), OPEN(NULL, ANY, 1, "/no/such/folder/file.xyz", NULL, &run));
  STATUS(AT(3, BMOM_NULL_POINTER), OPEN(NULL, ANY, 1, NULL, NULL, &run));
  STATUS(AT(4, BMOM_NOT_ALLOWED), OPEN(NULL, ANY, 1, scratch_path, "elsewhere", &run));
  STATUS(AT(4, BMOM_NOT_UTF8), OPEN(NULL, ANY, 1, scratch_path, "\xff", &run));
  STATUS(AT(5, BMOM_NULL_POINTER), OPEN(NULL, ANY, 1, scratch_path, NULL, NULL));
  STATUS(BMOM_OUT_OF_RANGE, OPEN(NULL, ANY, 2000, scratch_path, NULL, &run));
  bmom_table_free(whole);
  bmom_table_free(second);
  bmom_tabulation_free(again);
  bmom_tabulation_free(NULL);
  bmom_tabulation_free(FOREIGN(bmom_tabulation));
}

int main(int argc, char **argv)
{
  if (argc < 3) return 2;
  snprintf(molecule_path, sizeof molecule_path, "%s/water.mol", argv[1]);
  snprintf(scratch_path, sizeof scratch_path, "%s/two_frames.xyz", argv[2]);
  molecules_ready();
  tables();
  arrays();
  reading();
  runs();
  return checks_end("library");
}
