/* Fork: after a call on several threads a child calls again and returns, and a run opened by the parent is refused there.
   Arguments: the folder of published molecules and a folder for scratch files. */
#ifndef _GNU_SOURCE
#define _GNU_SOURCE
#endif
#include <pthread.h>
#include <sys/wait.h>
#include <unistd.h>

#include "many.h"

static bmom_tabulation *run;

/* The child's part; its checks make its exit code. A child that hangs is ended by the alarm. */
static int in_child(struct many *many, uint64_t expected)
{
  char text[200];
  int64_t done = -1;
  bmom_table *table = NULL;
  checks_failed = 0;
  CHECK(many_dipoles(many, 2) == expected);
  CHECK(many_dipoles(many, 0) == expected);
  if (run != NULL) {
    STATUS(AT(1, BMOM_OTHER_PROCESS), bmom_tabulation_next(run, NULL, 1, &table, NULL, NULL));
    STATUS(AT(1, BMOM_OTHER_PROCESS), bmom_tabulation_position(run, text, (int64_t)sizeof text, NULL));
    STATUS(BMOM_OK, bmom_tabulation_progress(run, &done, NULL, NULL));
    CHECK(table == NULL && done == 0);
    bmom_tabulation_free(run);
  }
  STATUS(BMOM_INTERNAL, bmom_self_test(1));
  return checks_failed;
}

static void child_returns(struct many *many, uint64_t expected)
{
  int end = -1;
  pid_t child;
  fflush(NULL);
  child = fork();
  if (child == 0) {
    alarm(100);
    _exit(in_child(many, expected) == 0 ? 0 : 1);
  }
  CHECK(child > 0 && waitpid(child, &end, 0) == child);
  if (!CHECK(WIFEXITED(end) && WEXITSTATUS(end) == 0)) fprintf(stderr, "  the child ended with %#x\n", (unsigned)end);
}

static void *first_calls(void *unused)
{
  (void)unused;
  everything(2);
  return NULL;
}

int main(int argc, char **argv)
{
  char path[4000];
  struct many *many;
  pthread_t thread;
  uint64_t expected;
  int started;
  if (argc < 3) return 2;
  molecules_ready();
  many = many_waters();
  expected = many_dipoles(many, 2);

  /* A fork while another thread makes the library's first calls, so that nothing half made hangs the child. */
  started = pthread_create(&thread, NULL, first_calls, NULL) == 0;
  child_returns(many, expected);
  if (CHECK(started)) CHECK(pthread_join(thread, NULL) == 0);

  snprintf(path, sizeof path, "%s/water.mol", argv[1]);
  STATUS(BMOM_OK, bmom_tabulation_open(NULL, BMOM_FORMAT_CTFILE, NULL, 1, path, -1, NULL, 0, &run));
  child_returns(many, expected);
  /* The parent's own run goes on. */
  {
    bmom_table *table = NULL;
    STATUS(BMOM_OK, bmom_tabulation_next(run, NULL, 1, &table, NULL, NULL));
    bmom_table_free(table);
    bmom_tabulation_free(run);
  }
  CHECK(many_dipoles(many, 2) == expected);
  free(many);
  return checks_end("fork");
}
