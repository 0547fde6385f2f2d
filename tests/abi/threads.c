/* Threads: many callers at once, callers with a small stack, any number of workers, and a run that another thread stops.
   Arguments: the folder of published molecules and a folder for scratch files. */
#ifndef _GNU_SOURCE
#define _GNU_SOURCE
#endif
#include <limits.h>
#include <pthread.h>
#include <signal.h>
#include <time.h>
#include <unistd.h>

#include "many.h"

#define CALLERS 8
#define SMALL_STACK 65536

static uint64_t expected;

static void nap(long milliseconds)
{
  struct timespec time;
  time.tv_sec = 0;
  time.tv_nsec = milliseconds * 1000000L;
  nanosleep(&time, NULL);
}

static void *caller(void *found)
{
  *(uint64_t *)found = everything(1);
  return NULL;
}

static void callers_at_once(void)
{
  pthread_t threads[CALLERS];
  uint64_t found[CALLERS];
  int started = 0;
  for (; started < CALLERS; ++started) {
    if (!CHECK(pthread_create(&threads[started], NULL, caller, &found[started]) == 0)) break;
  }
  for (int i = 0; i < started; ++i) {
    CHECK(pthread_join(threads[i], NULL) == 0);
    CHECK(found[i] == found[0]);
  }
  expected = everything(1);
  CHECK(found[0] == expected);
}

/* What the small stack does; nothing here keeps arrays on it. */
struct small {
  uint64_t all, parallel;
  struct many *many;
  int32_t panicked;
};

static void *with_small_stack(void *work)
{
  struct small *small = (struct small *)work;
  small->all = everything(2);
  small->parallel = many_dipoles(small->many, 3);
  small->panicked = bmom_self_test(1);
  return NULL;
}

static void small_stack(struct many *many)
{
  pthread_attr_t attributes;
  pthread_t thread;
  struct small small = {0, 0, NULL, 0};
  const size_t least = (size_t)PTHREAD_STACK_MIN;
  const uint64_t wanted = many_dipoles(many, 1);
  small.many = many;
  CHECK(pthread_attr_init(&attributes) == 0);
  CHECK(pthread_attr_setstacksize(&attributes, least > SMALL_STACK ? least : SMALL_STACK) == 0);
  if (CHECK(pthread_create(&thread, &attributes, with_small_stack, &small) == 0)) {
    CHECK(pthread_join(thread, NULL) == 0);
    CHECK(small.all == expected && small.parallel == wanted);
    STATUS(BMOM_INTERNAL, small.panicked);
  }
  pthread_attr_destroy(&attributes);
}

static void any_number_of_workers(struct many *many)
{
  static const int32_t workers[5] = {2, 3, 7, 0, 2};
  const uint64_t wanted = many_dipoles(many, 1);
  for (int i = 0; i < 5; ++i) {
    memset(many->dipole_D, 0, sizeof many->dipole_D);
    CHECK(many_dipoles(many, workers[i]) == wanted);
    CHECK(everything(workers[i]) == expected);
  }
}

/* A signal that arrives while workers run is handled on a thread of the host: theirs block all. */
static pthread_t host;
static volatile sig_atomic_t elsewhere = 0, handled = 0;

static void on_signal(int number)
{
  (void)number;
  handled = 1;
  if (!pthread_equal(pthread_self(), host)) elsewhere = 1;
}

static void signals(struct many *many)
{
  struct sigaction action;
  memset(&action, 0, sizeof action);
  action.sa_handler = on_signal;
  host = pthread_self();
  CHECK(sigaction(SIGALRM, &action, NULL) == 0);
  ualarm(1000, 1000);
  for (int i = 0; i < 20; ++i) many_dipoles(many, 4);
  ualarm(0, 0);
  CHECK(handled == 1);
  CHECK(elsewhere == 0);
  /* The handler stays: a last signal may still be on its way. */
}

struct stopper {
  bmom_tabulation *run;
  bmom_stop *stop;
  int32_t busy, progress;
};

static void *stops(void *work)
{
  struct stopper *stopper = (struct stopper *)work;
  char text[100];
  int64_t done;
  for (int i = 0; i < 2000 && stopper->busy % 1000 != BMOM_BUSY; ++i) {
    nap(1);
    stopper->busy = bmom_tabulation_position(stopper->run, text, (int64_t)sizeof text, NULL);
  }
  stopper->progress = bmom_tabulation_progress(stopper->run, &done, NULL, NULL);
  bmom_stop_request(stopper->stop);
  return NULL;
}

static void stopped_run(const char *folder)
{
  enum { RECORDS = 40000 };
  char path[4000];
  FILE *file;
  pthread_t thread;
  struct stopper stopper = {NULL, NULL, 0, 0};
  bmom_table *table = NULL;
  int32_t status;
  snprintf(path, sizeof path, "%s/many_frames.xyz", folder);
  file = fopen(path, "wb");
  if (!CHECK(file != NULL)) return;
  for (int i = 0; i < RECORDS; ++i) fputs("3\n\nO 0 0 0\nH 0.96 0 0\nH -0.2404 -0.9294 0\n", file);
  CHECK(fclose(file) == 0);
  STATUS(BMOM_OK, bmom_stop_new(&stopper.stop));
  STATUS(BMOM_OK, bmom_tabulation_open(NULL, BMOM_FORMAT_XYZ, NULL, 1, path, -1, NULL, 0, &stopper.run));
  if (CHECK(pthread_create(&thread, NULL, stops, &stopper) == 0)) {
    status = bmom_tabulation_next(stopper.run, stopper.stop, RECORDS, &table, NULL, NULL);
    CHECK(pthread_join(thread, NULL) == 0);
    STATUS(BMOM_STOPPED, status % 1000);
    STATUS(AT(1, BMOM_BUSY), stopper.busy);
    STATUS(BMOM_OK, stopper.progress);
    CHECK(table == NULL);
  }
  /* The next call goes on with the same records. */
  STATUS(BMOM_OK, bmom_tabulation_next(stopper.run, NULL, 1, &table, NULL, NULL));
  bmom_table_free(table);
  bmom_tabulation_free(stopper.run);
  bmom_stop_free(stopper.stop);
  remove(path);
}

int main(int argc, char **argv)
{
  struct many *many;
  if (argc < 3) return 2;
  molecules_ready();
  many = many_waters();
  callers_at_once(); /* before any other call: tables are parsed and texts made by whoever comes first */
  small_stack(many);
  any_number_of_workers(many);
  signals(many);
  stopped_run(argv[2]);
  free(many);
  return checks_end("threads");
}
