/* A panic inside ends as a status, prints nothing and leaves the library working; no signal handler is ever changed. */
#ifndef _GNU_SOURCE
#define _GNU_SOURCE
#endif
#include <fcntl.h>
#include <signal.h>
#include <unistd.h>

#include "many.h"

#define SIGNALS 64

/* Handlers and masks, field by field: padding may differ. */
static void handlers(struct sigaction *actions)
{
  memset(actions, 0, SIGNALS * sizeof *actions);
  for (int number = 1; number <= SIGNALS; ++number) sigaction(number, NULL, &actions[number - 1]);
}

static int same_handlers(const struct sigaction *one, const struct sigaction *other)
{
  for (int i = 0; i < SIGNALS; ++i) {
    if (one[i].sa_handler != other[i].sa_handler || one[i].sa_flags != other[i].sa_flags) return 0;
    for (int number = 1; number <= SIGNALS; ++number) {
      if (sigismember(&one[i].sa_mask, number) != sigismember(&other[i].sa_mask, number)) return 0;
    }
  }
  return 1;
}

int main(void)
{
  static struct sigaction before[SIGNALS], after[SIGNALS];
  sigset_t mask_before, mask_after;
  FILE *captured;
  int error_output, standard_output;
  int32_t status[3];
  uint64_t expected, found;
  long printed;
  struct many *many;

  molecules_ready();
  handlers(before);
  sigprocmask(SIG_SETMASK, NULL, &mask_before);
  many = many_waters();
  expected = everything(1);

  /* Both outputs into a file for the time of the panics, also of one on a thread that has just worked in a pool. */
  captured = tmpfile();
  if (!CHECK(captured != NULL)) return 1;
  fflush(NULL);
  error_output = dup(2);
  standard_output = dup(1);
  dup2(fileno(captured), 2);
  dup2(fileno(captured), 1);
  status[0] = bmom_self_test(1);
  many_dipoles(many, 2);
  status[1] = bmom_self_test(1);
  found = everything(2);
  status[2] = bmom_self_test(0);
  fflush(NULL);
  dup2(error_output, 2);
  dup2(standard_output, 1);
  close(error_output);
  close(standard_output);

  fseek(captured, 0, SEEK_END);
  printed = ftell(captured);
  CHECK(printed == 0);
  fclose(captured);
  STATUS(BMOM_INTERNAL, status[0]);
  STATUS(BMOM_INTERNAL, status[1]);
  STATUS(BMOM_OK, status[2]);
  CHECK(found == expected);
  handlers(after);
  sigprocmask(SIG_SETMASK, NULL, &mask_after);
  CHECK(same_handlers(before, after));
  for (int number = 1; number <= SIGNALS; ++number) {
    if (sigismember(&mask_before, number) != sigismember(&mask_after, number)) CHECK(number == 0);
  }
  free(many);
  return checks_end("panic");
}
