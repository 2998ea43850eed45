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

typedef struct
{
  size_t n_stages;
  const char *(*title) (void *work, size_t stage); /* untranslated, static: "fitting the noise" */
  size_t (*count) (void *work, size_t stage);
  AntStatus (*run_slice) (void *work, size_t stage, size_t slice);
  AntStatus (*finish) (void *work, size_t stage);
  AntStop *(*stop) (void *work); /* where running slices look whether they should end early; NULL if slices are short */
} AntStages;
