/* stages.h - long work as a list of stages, each cut into slices that may run in any order and on any thread.
 *
 * Whoever drives it (jobs/) calls, for stage = 0 .. n_stages-1: count (work, stage); then run_slice for each
 * i < count, on any threads; then finish (work, stage) alone. Results land in slot i and are merged in index order by
 * finish, so the digits do not depend on the number of threads. Numeric rooms provide such tables and know no thread.
 * A stage may find at count() time that it has nothing to do and return 0. */
#pragma once

#include <stddef.h>
#include "core/status.h"

/* A wish that long slices look at now and then: once asked, they end soon with ANT_STOPPED. Zero-initialised. */
typedef struct
{
  int asked; /* only through the two functions below, which any thread may call */
} AntStop;

static inline void
ant_stop_ask (AntStop *stop)
{
  __atomic_store_n (&stop->asked, 1, __ATOMIC_RELAXED);
}

static inline int
ant_stop_asked (const AntStop *stop) /* NULL: never */
{
  return stop && __atomic_load_n (&stop->asked, __ATOMIC_RELAXED);
}

/* How far long passes over data are, and the wish that ends them early. What they have done is counted in units of about the
 * same time, of which a sample costs a few: each pass knows how many. Zero-initialised but for the borrowed stop. */
#define ANT_PACE_EVERY 4096 /* samples between two looks */

typedef struct
{
  const AntStop *stop;
  size_t passed; /* only through the functions below, which any thread may call */
} AntPace;

static inline int
ant_pace_stopped (const AntPace *pace) /* NULL: never */
{
  return pace && ant_stop_asked (pace->stop);
}

/* Count some more; whether to go on. */
static inline int
ant_pace_on (AntPace *pace, size_t units) /* NULL: always */
{
  if (pace)
    __atomic_fetch_add (&pace->passed, units, __ATOMIC_RELAXED);
  return !ant_pace_stopped (pace);
}

static inline size_t
ant_pace_passed (const AntPace *pace)
{
  return __atomic_load_n (&pace->passed, __ATOMIC_RELAXED);
}

/* The part of a slice that is done when it has passed so many units of about so many, for which the count is hardly ever exact:
 * it comes near 1 but does not reach it. */
static inline double
ant_pace_part (double passed, double about)
{
  double part = passed / about;
  return part <= 0.75 ? part : 1 - 0.25 / (1 + 4 * (part - 0.75));
}

typedef struct
{
  size_t n_stages;
  const char *(*title) (void *work, size_t stage); /* untranslated, static: "fitting the noise" */
  size_t (*count) (void *work, size_t stage);
  AntStatus (*run_slice) (void *work, size_t stage, size_t slice);
  AntStatus (*finish) (void *work, size_t stage);
  AntStop *(*stop) (void *work); /* where running slices look whether they should end early; NULL if slices are short */
  double (*part) (void *work, size_t stage); /* how much of a stage is done, about, 0..1, while its slices run; NULL: count those */
} AntStages;
