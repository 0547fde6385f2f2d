/* The library about itself: versions, names, words of statuses, sources, numbers as text, and settings. */
#include "check.h"

static void versions(void)
{
  CHECK(bmom_abi_version() == BMOM_ABI_VERSION);
  CHECK(strcmp(bmom_version(), BMOM_VERSION) == 0);
  CHECK(strcmp(bmom_data_version(), BMOM_DATA_VERSION) == 0);
  CHECK(bmom_version() == bmom_version()); /* static text */
}

static void names(void)
{
  int32_t selector = 1;
  CHECK(strcmp(bmom_status_name(2052), "OUT_OF_RANGE") == 0);
  CHECK(strcmp(bmom_status_name(BMOM_OK), "OK") == 0);
  CHECK(strcmp(bmom_status_name(999), "UNKNOWN") == 0);
  CHECK(strcmp(bmom_status_name(INT32_MIN), "UNKNOWN") == 0);
  CHECK(strcmp(bmom_status_name(-1), "UNKNOWN") == 0);
  CHECK(strcmp(bmom_status_text(AT(3, BMOM_MISSING)), "a value is missing") == 0);
  CHECK(strcmp(bmom_status_text(INT32_MAX), "UNKNOWN") == 0);
  CHECK(strcmp(bmom_selector_name(BMOM_RADII_CORDERO_2008), "RADII_CORDERO_2008") == 0);
  CHECK(strcmp(bmom_selector_name(0), "UNKNOWN") == 0);
  STATUS(BMOM_OK, bmom_selector("radii_cordero_2008", -1, &selector));
  CHECK(selector == BMOM_RADII_CORDERO_2008);
  STATUS(BMOM_OK, bmom_selector("BMOM_UNIT_PM and more", 12, &selector));
  CHECK(selector == BMOM_UNIT_PM);
  STATUS(AT(1, BMOM_UNKNOWN_NAME), bmom_selector("RADII", -1, &selector));
  NO_INTEGER(selector);
  STATUS(AT(1, BMOM_UNKNOWN_NAME), bmom_selector("", 0, &selector));
  STATUS(AT(1, BMOM_NOT_UTF8), bmom_selector("\xff", 1, &selector));
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_selector(NULL, -1, &selector));
  STATUS(AT(1, BMOM_NEGATIVE_COUNT), bmom_selector("X", -5, &selector));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_selector("UNIT_PM", -1, NULL));
  STATUS(AT(2, BMOM_MISALIGNED), bmom_selector("UNIT_PM", -1, odd_integers()));
}

static void words(void)
{
  char text[100];
  int64_t needed = -1;
  STATUS(BMOM_OK, bmom_status_message("charge_from_dipole", -1, 2052, text, (int64_t)sizeof text, &needed));
  CHECK(strcmp(text, "length_A must be above 0 \xc3\x85") == 0 && needed == 27);
  /* Cut at a character: the two bytes of the angstrom sign stay together. */
  memset(text, 'x', sizeof text);
  STATUS(AT(3, BMOM_BUFFER_TOO_SMALL), bmom_status_message("charge_from_dipole", -1, 2052, text, 26, &needed));
  CHECK(strcmp(text, "length_A must be above 0 ") == 0 && needed == 27);
  STATUS(BMOM_OK, bmom_status_message("", 0, BMOM_MISSING, text, (int64_t)sizeof text, NULL));
  CHECK(strcmp(text, "a value is missing") == 0);
  STATUS(BMOM_OK, bmom_status_message(NULL, 0, 77, text, (int64_t)sizeof text, NULL));
  STATUS(BMOM_OK, bmom_status_message("bmom_charge_from_dipole_column", -1, 2052, text, (int64_t)sizeof text, &needed));
  CHECK(needed == 27);
  STATUS(BMOM_OK, bmom_status_message("bmom_library_read", -1, 2028, text, (int64_t)sizeof text, &needed));
  CHECK(strcmp(text, "argument 2: there is no such file") == 0);
  STATUS(AT(1, BMOM_NOT_UTF8), bmom_status_message("\xff", 1, 2052, text, (int64_t)sizeof text, &needed));
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_status_message(NULL, -1, 2052, text, (int64_t)sizeof text, &needed));
  STATUS(AT(3, BMOM_NULL_POINTER), bmom_status_message("symbol", -1, 2052, NULL, 10, &needed));
  STATUS(AT(3, BMOM_NEGATIVE_COUNT), bmom_status_message("symbol", -1, 2052, text, -1, &needed));
}

static void sources(void)
{
  char *text = (char *)malloc(5000);
  int64_t needed = -1;
  int32_t mark = -1;
  STATUS(BMOM_OK, bmom_source(BMOM_RADII_CORDERO_2008, text, 5000, &needed));
  CHECK(text[0] == '{' && text[needed - 1] == '}' && strstr(text, "Cordero") != NULL && strstr(text, "2008") != NULL);
  STATUS(AT(2, BMOM_BUFFER_TOO_SMALL), bmom_source(BMOM_RADII_CORDERO_2008, text, 10, &needed));
  STATUS(AT(2, BMOM_BUFFER_TOO_SMALL), bmom_source(BMOM_RADII_CORDERO_2008, NULL, 0, &needed));
  CHECK(needed > 10);
  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), bmom_source(0, text, 5000, &needed));
  STATUS(AT(1, BMOM_WRONG_SELECTOR), bmom_source(BMOM_STATE_SP, text, 5000, &needed));
  CHECK(text[0] == '\0' && needed == 0);
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_source(BMOM_RADII_CORDERO_2008, NULL, 1, &needed));
  STATUS(AT(2, BMOM_NEGATIVE_COUNT), bmom_source(BMOM_RADII_CORDERO_2008, text, INT64_MIN, &needed));

#define VALUE_SOURCE(table, z, state, out) bmom_value_source((table), (z), (state), (out), text, 5000, &needed)
  STATUS(BMOM_OK, VALUE_SOURCE(BMOM_RADII_CORDERO_2008, 6, BMOM_STATE_SP2, &mark));
  CHECK(mark >= BMOM_MARK_VERIFIED && mark <= BMOM_MARK_DERIVED && text[0] == '{' && text[needed - 1] == '}');
  STATUS(AT(1, BMOM_UNKNOWN_SELECTOR), VALUE_SOURCE(0, 6, BMOM_STATE_SP2, &mark));
  NO_INTEGER(mark);
  STATUS(AT(1, BMOM_WRONG_SELECTOR), VALUE_SOURCE(BMOM_UNIT_PM, 6, BMOM_STATE_AS_LISTED, &mark));
  STATUS(AT(2, BMOM_UNKNOWN_ELEMENT), VALUE_SOURCE(BMOM_VDW_BONDI_1964, 0, BMOM_STATE_AS_LISTED, &mark));
  STATUS(AT(2, BMOM_MISSING), VALUE_SOURCE(BMOM_VDW_BONDI_1964, INT32_MIN, BMOM_STATE_AS_LISTED, &mark));
  STATUS(BMOM_NO_DATA, VALUE_SOURCE(BMOM_VDW_BONDI_1964, 5, BMOM_STATE_AS_LISTED, &mark) % 1000);
  STATUS(AT(3, BMOM_UNKNOWN_SELECTOR), VALUE_SOURCE(BMOM_RADII_CORDERO_2008, 6, 0, &mark));
  STATUS(AT(4, BMOM_NULL_POINTER), VALUE_SOURCE(BMOM_RADII_CORDERO_2008, 6, BMOM_STATE_SP2, NULL));
  STATUS(AT(5, BMOM_NULL_POINTER), bmom_value_source(BMOM_RADII_CORDERO_2008, 6, BMOM_STATE_SP2, &mark, NULL, 9, NULL));
  STATUS(AT(5, BMOM_BUFFER_TOO_SMALL), bmom_value_source(BMOM_RADII_CORDERO_2008, 6, BMOM_STATE_SP2, &mark, text, 3, NULL));
  free(text);
}

/* The fewest digits that read back; exponents below 1e-5 and from 1e16 on. */
static void numbers(void)
{
  static const struct { const char *text; double value; } pairs[] = {
    {"0.1", 0.1}, {"2", 2.0}, {"0.00001", 1e-5}, {"9.9e-6", 9.9e-6}, {"1e16", 1e16}, {"1e300", 1e300},
    {"0.30000000000000004", 0.30000000000000004}, {"-273.15", -273.15}, {"0.0145768", 0.0145768}, {"5e-324", 5e-324},
    {"-2.2250738585072014e-308", -2.2250738585072014e-308},
  };
  char text[25];
  double value;
  int64_t needed = -1;
  for (size_t i = 0; i < sizeof pairs / sizeof pairs[0]; ++i) {
    STATUS(BMOM_OK, bmom_number_text(pairs[i].value, text, (int64_t)sizeof text, &needed));
    if (!CHECK(strcmp(text, pairs[i].text) == 0)) fprintf(stderr, "  %s, expected %s\n", text, pairs[i].text);
    CHECK(needed == (int64_t)strlen(text) && needed <= 24);
    STATUS(BMOM_OK, bmom_number_read(pairs[i].text, -1, &value));
    SAME(value, pairs[i].value);
  }
  STATUS(BMOM_OK, bmom_number_text(-0.0, text, (int64_t)sizeof text, NULL));
  CHECK(strcmp(text, "0") == 0);
  STATUS(BMOM_OK, bmom_number_text(missing_of_r(), text, (int64_t)sizeof text, &needed));
  CHECK(text[0] == '\0' && needed == 0);
  STATUS(AT(2, BMOM_BUFFER_TOO_SMALL), bmom_number_text(0.25, text, 3, &needed));
  CHECK(needed == 4 && memcmp(text, "0.2", 3) == 0);
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_number_text(0.25, NULL, 3, &needed));
  STATUS(AT(2, BMOM_NEGATIVE_COUNT), bmom_number_text(0.25, text, -3, &needed));
  STATUS(BMOM_OK, bmom_number_read(" 1.5 x", 5, &value));
  SAME(value, 1.5);
  STATUS(BMOM_OK, bmom_number_read("-0", -1, &value));
  SAME(value, 0.0);
  STATUS(AT(1, BMOM_MISSING), bmom_number_read("  ", -1, &value));
  NO_VALUE(value);
  STATUS(AT(1, BMOM_MISSING), bmom_number_read("nan", -1, &value));
  STATUS(AT(1, BMOM_NOT_FINITE), bmom_number_read("1e999", -1, &value));
  STATUS(AT(1, BMOM_BAD_FORMAT), bmom_number_read("1,5", -1, &value));
  STATUS(AT(1, BMOM_NOT_UTF8), bmom_number_read("1\xff", -1, &value));
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_number_read(NULL, 1, &value));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_number_read("1", -1, NULL));
}

/* The catalogue is one JSON object that names what the header declares. */
static void catalogue(void)
{
  static const char *const parts[] = {
    "\"functions\":", "\"selectors\":", "\"settings\":", "\"statuses\":", "\"remarks\":", "\"units\":", "\"blocks\":",
    "\"name\":\"charge_from_dipole\"", "\"name\":\"dipole_of_charges\"", "\"data_version\":\"" BMOM_DATA_VERSION "\"",
  };
  const char *text = bmom_catalogue();
  CHECK(text[0] == '{' && text[strlen(text) - 1] == '}');
  for (size_t i = 0; i < sizeof parts / sizeof parts[0]; ++i) {
    if (!CHECK(strstr(text, parts[i]) != NULL)) fprintf(stderr, "  %s\n", parts[i]);
  }
  CHECK(bmom_catalogue() == text);
}

static void settings(void)
{
  static uint64_t foreign[8];
  bmom_settings *s = NULL, *not_ours = (bmom_settings *)(void *)foreign;
  const double value = 0.01;

  STATUS(AT(1, BMOM_NULL_POINTER), bmom_settings_new(NULL));
  STATUS(BMOM_OK, bmom_settings_new(&s));
  CHECK(s != NULL);
  STATUS(BMOM_OK, bmom_settings_number(s, "polar_from", -1, 0.5));
  STATUS(BMOM_OK, bmom_settings_choice(s, "ionic_law", -1, BMOM_IONIC_HANNAY_SMYTH_1946));
  STATUS(BMOM_OK, bmom_settings_text(s, "carry_items", -1, "ID, CAS", -1));
  STATUS(AT(2, BMOM_UNKNOWN_NAME), bmom_settings_number(s, "colour", -1, value));
  STATUS(AT(2, BMOM_WRONG_TYPE), bmom_settings_number(s, "ionic_law", -1, value));
  STATUS(AT(3, BMOM_MISSING), bmom_settings_number(s, "polar_from", -1, other_nan()));
  STATUS(AT(3, BMOM_NOT_FINITE), bmom_settings_number(s, "polar_from", -1, infinity()));
  STATUS(AT(3, BMOM_OUT_OF_RANGE), bmom_settings_number(s, "polar_from", -1, -1.0));
  STATUS(AT(2, BMOM_NOT_UTF8), bmom_settings_number(s, "\xff", -1, value));
  STATUS(AT(2, BMOM_NULL_POINTER), bmom_settings_number(s, NULL, -1, value));
  STATUS(AT(2, BMOM_NEGATIVE_COUNT), bmom_settings_number(s, "polar_from", -2, value));
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_settings_number(NULL, "polar_from", -1, value));
  STATUS(AT(1, BMOM_BAD_HANDLE), bmom_settings_number(not_ours, "polar_from", -1, value));
  STATUS(AT(1, BMOM_BAD_HANDLE), bmom_settings_number((bmom_settings *)(void *)odd_doubles(), "polar_from", -1, value));
  STATUS(AT(2, BMOM_WRONG_TYPE), bmom_settings_choice(s, "polar_from", -1, BMOM_IONIC_PAULING_1960));
  STATUS(AT(2, BMOM_UNKNOWN_NAME), bmom_settings_choice(s, "", 0, BMOM_IONIC_PAULING_1960));
  STATUS(AT(3, BMOM_WRONG_SELECTOR), bmom_settings_choice(s, "ionic_law", -1, BMOM_UNIT_PM));
  STATUS(AT(3, BMOM_UNKNOWN_SELECTOR), bmom_settings_choice(s, "ionic_law", -1, 0));
  STATUS(AT(3, BMOM_NOT_ALLOWED), bmom_settings_choice(s, "covalent_radii", -1, BMOM_RADII_PYYKKO_TRIPLE_2005));
  STATUS(AT(2, BMOM_WRONG_TYPE), bmom_settings_text(s, "polar_from", -1, "1", -1));
  STATUS(AT(3, BMOM_NOT_UTF8), bmom_settings_text(s, "name_item", -1, "\xff", -1));
  STATUS(AT(3, BMOM_NULL_POINTER), bmom_settings_text(s, "name_item", -1, NULL, -1));
  /* A foreign handle in a call; then the settings freeze at their first use. */
  STATUS(BMOM_BAD_HANDLE, bmom_dipole_column(BMOM_CHARGES_GIVEN, BMOM_FRAME_AS_GIVEN, not_ours, 1, 0, NULL, 0, NULL, NULL,
         NULL, NULL, 0, NULL, NULL, NULL, NULL, NULL, NULL, NULL, NULL, NULL, NULL, NULL, NULL));
  STATUS(BMOM_OK, bmom_partial_charges_column(BMOM_CHARGES_PEOE_1980, s, 1, 0, NULL, 0, NULL, NULL, NULL, NULL, 0, NULL,
                                              NULL, NULL, NULL, NULL, NULL, NULL));
  STATUS(AT(1, BMOM_NOT_ALLOWED), bmom_settings_number(s, "polar_from", -1, 0.5));
  STATUS(AT(1, BMOM_NOT_ALLOWED), bmom_settings_text(s, "name_item", -1, "x", -1));
  bmom_settings_free(s);
  bmom_settings_free(NULL);
  bmom_settings_free(not_ours);
}

static void stops(void)
{
  static uint64_t foreign[8];
  bmom_stop *stop = NULL;
  STATUS(AT(1, BMOM_NULL_POINTER), bmom_stop_new(NULL));
  STATUS(BMOM_OK, bmom_stop_new(&stop));
  bmom_stop_request(stop);
  bmom_stop_request(stop);
  bmom_stop_request(NULL);
  bmom_stop_request((bmom_stop *)(void *)foreign);
  CHECK(foreign[0] == 0 && foreign[1] == 0);
  bmom_stop_free(stop);
  bmom_stop_free(NULL);
  bmom_stop_free((bmom_stop *)(void *)foreign);
}

int main(void)
{
  versions();
  names();
  words();
  sources();
  numbers();
  catalogue();
  settings();
  stops();
  STATUS(BMOM_OK, bmom_self_test(0));
  STATUS(AT(1, BMOM_OUT_OF_RANGE), bmom_self_test(2));
  return checks_end("about");
}
