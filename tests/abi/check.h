/* Checks for the C programs of this folder: each failure is printed with file and line, and the program goes on.

   Valid C99 to C17 and C++17. Numbers without a value are made and told by their bits, so that the checks also hold in
   programs built with -ffast-math, where isnan and x != x are folded away. */
#ifndef BONDMOMENT_TESTS_CHECK_H
#define BONDMOMENT_TESTS_CHECK_H

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "bondmoment.h"

static int checks_done = 0;
static int checks_failed = 0;

/* Counts one check and prints it where it failed. */
static inline int check_that(int holds, const char *file, int line, const char *what)
{
  ++checks_done;
  if (!holds) {
    ++checks_failed;
    fprintf(stderr, "%s:%d: %s\n", file, line, what);
  }
  return holds;
}

/* A call returns exactly this status. */
static inline int check_status(int32_t status, int32_t expected, const char *file, int line, const char *call)
{
  ++checks_done;
  if (status != expected) {
    ++checks_failed;
    fprintf(stderr, "%s:%d: status %d (%s), expected %d (%s): %s\n", file, line, (int)status, bmom_status_name(status),
            (int)expected, bmom_status_name(expected), call);
  }
  return status == expected;
}

static inline uint64_t bits_of(double value)
{
  uint64_t bits;
  memcpy(&bits, &value, sizeof bits);
  return bits;
}

static inline double from_bits(uint64_t bits)
{
  double value;
  memcpy(&value, &bits, sizeof value);
  return value;
}

/* The one NaN that leaves the library, another one, a signalling one (R's NA) and infinity. */
#define NO_NUMBER_BITS UINT64_C(0x7FF8000000000000)
static inline double no_number(void) { return from_bits(NO_NUMBER_BITS); }
static inline double other_nan(void) { return from_bits(UINT64_C(0xFFF8000000000123)); }
static inline double missing_of_r(void) { return from_bits(UINT64_C(0x7FF00000000007A2)); }
static inline double infinity(void) { return from_bits(UINT64_C(0x7FF0000000000000)); }

/* Within a tolerance; a value that is not finite is never near. */
static inline int check_near(double value, double expected, double within, const char *file, int line, const char *what)
{
  int finite = ((bits_of(value) >> 52) & 0x7FF) != 0x7FF;
  double difference = value > expected ? value - expected : expected - value;
  ++checks_done;
  if (!finite || !(difference <= within)) {
    ++checks_failed;
    fprintf(stderr, "%s:%d: %s is %.17g, expected %.17g within %g\n", file, line, what, value, expected, within);
    return 0;
  }
  return 1;
}

#define CHECK(condition) check_that((condition) ? 1 : 0, __FILE__, __LINE__, #condition)
#define STATUS(expected, call) check_status((call), (expected), __FILE__, __LINE__, #call)
#define NEAR(value, expected, within) check_near((value), (expected), (within), __FILE__, __LINE__, #value)
#define SAME(value, other) CHECK(bits_of(value) == bits_of(other))
#define SAME_BYTES(one, other, size) CHECK(memcmp((one), (other), (size)) == 0)
#define NO_VALUE(value) CHECK(bits_of(value) == NO_NUMBER_BITS)
#define NO_INTEGER(value) CHECK((value) == INT32_MIN)

/* code + 1000 x argument. */
#define AT(argument, code) ((code) + 1000 * (argument))

/* A mark that no function writes, to see that nothing was written. */
#define UNTOUCHED (-987654321.0)
#define UNTOUCHED_INTEGER (-987654)

static inline void mark_doubles(double *values, int n)
{
  for (int i = 0; i < n; ++i) values[i] = UNTOUCHED;
}

static inline void mark_integers(int32_t *values, int n)
{
  for (int i = 0; i < n; ++i) values[i] = UNTOUCHED_INTEGER;
}

static inline int doubles_untouched(const double *values, int n)
{
  for (int i = 0; i < n; ++i) {
    if (bits_of(values[i]) != bits_of(UNTOUCHED)) return 0;
  }
  return 1;
}

static inline int integers_untouched(const int32_t *values, int n)
{
  for (int i = 0; i < n; ++i) {
    if (values[i] != UNTOUCHED_INTEGER) return 0;
  }
  return 1;
}

/* An address one byte beside an aligned one, for arguments that must be refused before they are read. */
static double odd_room[64];
static inline double *odd_doubles(void) { return (double *)(void *)((char *)odd_room + 1); }
static inline int32_t *odd_integers(void) { return (int32_t *)(void *)((char *)odd_room + 1); }
static inline int64_t *odd_offsets(void) { return (int64_t *)(void *)((char *)odd_room + 1); }

/* The end of main. */
static inline int checks_end(const char *name)
{
  printf("%s: %d checks, %d failed\n", name, checks_done, checks_failed);
  return checks_failed == 0 && checks_done > 0 ? 0 : 1;
}

#endif
