/* record-open.c - the pool as the runner of a reader's slices. */
#include "jobs/record-open.h"

#include "jobs/pool.h"

static AntStatus
run_on_pool (const AntStages *stages, gpointer work, GCancellable *cancellable, gpointer data)
{
  return ant_pool_run (stages, work, GPOINTER_TO_UINT (data), cancellable, NULL, NULL);
}

AntRecord *
ant_record_open (const char *path, const AntReadingChoices *choices, guint n_threads, GCancellable *cancellable, GError **error)
{
  const AntSliceRunner runner = { .run = run_on_pool, .data = GUINT_TO_POINTER (n_threads) };
  return ant_reader_open_with (path, choices, &runner, cancellable, error);
}
