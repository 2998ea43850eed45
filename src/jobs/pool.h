/* pool.h - drive a table of stages over a pool of threads. The only place that makes threads for numbers.
 * Slices are handed out in index order; finish runs on the calling thread; the digits do not depend on n_threads.
 * Workers run at a lower priority (nice) so that a main loop on the same cores stays awake. */
#pragma once

#include <gio/gio.h>
#include "core/stages.h"

typedef struct
{
  const char *title; /* of the stage */
  gsize stage, n_stages;
  gsize done, count; /* slices of this stage */
  double part;       /* of this stage, 0..1, where its slices tell how far they are; else 0 */
  double elapsed_s;  /* since the run began */
  double stage_s;    /* since this stage began */
} AntProgress;
/* How much of the stage is done, 0..1. */
double ant_progress_share (const AntProgress *progress);
/* Called on the thread that called ant_pool_run, at most about ten times a second, and once per stage's end. */
typedef void (*AntProgressFunc) (const AntProgress *progress, gpointer data);

/* n_threads 0 = as many as processors. A slice that returns anything but ANT_OK stops the rest; of several the lowest
 * slice's status is returned, as one thread would have. Cancelling gives ANT_STOPPED once running slices have ended.
 * cancellable and progress may be NULL. Blocks; may be called from any thread. */
AntStatus ant_pool_run (const AntStages *stages, gpointer work, guint n_threads, GCancellable *cancellable,
                        AntProgressFunc progress, gpointer data);
