/* The host's floating-point state neither changes an answer nor kills the process, and it is the host's again afterwards.

   A program that is built with -ffast-math, or that loads such a library, flushes small numbers to zero; others round
   upward or trap invalid operations. Built twice by the tests: plainly and with -ffast-math. Not for valgrind, which
   emulates neither rounding modes nor traps. */
#ifndef _GNU_SOURCE
#define _GNU_SOURCE
#endif
#include <fenv.h>
#include <sys/wait.h>
#include <unistd.h>

#include "everything.h"

#if defined(__x86_64__)
#include <xmmintrin.h>
#endif

/* The whole control and status word, with its sticky flags. */
static uint64_t state(void)
{
#if defined(__x86_64__)
  return _mm_getcsr();
#elif defined(__aarch64__)
  uint64_t control, flags;
  __asm__ __volatile__("mrs %0, fpcr\n\tmrs %1, fpsr" : "=r"(control), "=r"(flags));
  return control << 32 | flags;
#else
  return 0;
#endif
}

static void flush_to_zero(void)
{
#if defined(__x86_64__)
  _mm_setcsr(_mm_getcsr() | 0x8040u); /* FTZ and DAZ */
#elif defined(__aarch64__)
  __asm__ __volatile__("msr fpcr, %0" : : "r"(UINT64_C(1) << 24));
#endif
}

static void upward(void) { fesetround(FE_UPWARD); }

static void trapping(void)
{
#if defined(__GLIBC__)
  feclearexcept(FE_ALL_EXCEPT);
  feenableexcept(FE_INVALID | FE_DIVBYZERO | FE_OVERFLOW);
#endif
}

static void all_of_them(void)
{
  flush_to_zero();
  trapping();
  upward();
}

/* The digest in a state that is set before the library is first called, from a child process: tables are parsed and texts
   are made at first use, and that must not depend on the state either. */
static uint64_t in_a_child(void (*set)(void))
{
  int ends[2];
  uint64_t digest = 0;
  pid_t child;
  fflush(NULL);
  if (!CHECK(pipe(ends) == 0)) return 0;
  child = fork();
  if (child == 0) {
    uint64_t before, after, found;
    alarm(60);
    if (set != NULL) set();
    before = state();
    found = everything(1);
    after = state();
    fesetenv(FE_DFL_ENV);
    if (write(ends[1], &found, sizeof found) != (ssize_t)sizeof found) _exit(1);
    _exit(before == after ? 0 : 2);
  }
  close(ends[1]);
  CHECK(read(ends[0], &digest, sizeof digest) == (ssize_t)sizeof digest);
  close(ends[0]);
  {
    int end = -1;
    CHECK(waitpid(child, &end, 0) == child && WIFEXITED(end) && WEXITSTATUS(end) == 0);
  }
  return digest;
}

int main(void)
{
  static void (*const states[])(void) = {flush_to_zero, upward, trapping, all_of_them};
  static const char *const names[] = {"flush to zero", "rounding upward", "trapping", "all of them"};
  uint64_t expected, first_of_all;
  double tiny = 0.0;

  molecules_ready();
  first_of_all = in_a_child(NULL);
  for (int i = 0; i < 4; ++i) {
    if (!CHECK(in_a_child(states[i]) == first_of_all)) fprintf(stderr, "  %s, from the first call on\n", names[i]);
  }

  fesetenv(FE_DFL_ENV);
  expected = everything(1);
  CHECK(expected == first_of_all);
  for (int i = 0; i < 4; ++i) {
    uint64_t before, after, found, parallel;
    states[i]();
    before = state();
    found = everything(1);
    parallel = everything(3);
    after = state();
    fesetenv(FE_DFL_ENV);
    if (!CHECK(found == expected && parallel == expected && before == after)) {
      fprintf(stderr, "  %s: state %llx, then %llx\n", names[i], (unsigned long long)before, (unsigned long long)after);
    }
  }

  /* A number that the host's state would flush to zero comes through whole. */
  flush_to_zero();
  STATUS(BMOM_OK, bmom_number_read("5e-324", -1, &tiny));
  CHECK(bits_of(tiny) == 1);
  STATUS(BMOM_OK, bmom_dipole_from_charge(from_bits(UINT64_C(0x0010000000000000)), 0.0, 0.125, 0.0, &tiny, NULL));
  CHECK(bits_of(tiny) > 1 && bits_of(tiny) < UINT64_C(0x0010000000000000)); /* subnormal, 0.6 of the smallest normal */
  /* R's NA is a signalling NaN: comparing it under a trap would end the process. */
  trapping();
  STATUS(AT(1, BMOM_MISSING), bmom_charge_from_dipole(missing_of_r(), 0.0, 1.0, 0.0, &tiny, NULL));
  NO_VALUE(tiny);
  STATUS(AT(2, BMOM_NOT_FINITE), bmom_charge_from_dipole(1.0, 0.0, infinity(), 0.0, &tiny, NULL));
  fesetenv(FE_DFL_ENV);
  return checks_end("host_state");
}
