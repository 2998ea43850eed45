/* pool.c - workers that take slices in turn, and a caller that watches them. */
#include "jobs/pool.h"

#include <sys/resource.h>
#include <unistd.h>

#define REPORT_EVERY_US (G_USEC_PER_SEC / 10)
#define WORKER_NICE 10

/* One run; everything from `lock` down to `status` is shared by its threads. */
typedef struct
{
  const AntStages *stages;
  gpointer work;
  guint n_threads;
  GCancellable *cancellable;
  AntProgressFunc progress;
  gpointer data;
  gint64 began_us, stage_began_us;
  gsize stage, count;

  GMutex lock;
  GCond changed;      /* a worker has ended */
  gsize next, done;   /* slice to hand out; slices that have ended */
  guint working;      /* workers that have not ended */
  gsize failed_slice; /* lowest slice that failed; meaningless while status is ANT_OK */
  AntStatus status;
} Run;

static gboolean
take_slice (Run *run, gsize *slice)
{
  g_mutex_lock (&run->lock);
  gboolean taken = run->status == ANT_OK && run->next < run->count && !g_cancellable_is_cancelled (run->cancellable);
  if (taken)
    *slice = run->next++;
  g_mutex_unlock (&run->lock);
  return taken;
}

static void
give_back (Run *run, gsize slice, AntStatus status)
{
  g_mutex_lock (&run->lock);
  run->done++;
  /* Slices go out in order, so the lowest one that fails has always been handed out: the status does not depend on who
   * came first. */
  if (status != ANT_OK && (run->status == ANT_OK || slice < run->failed_slice))
    {
      run->status = status;
      run->failed_slice = slice;
    }
  g_mutex_unlock (&run->lock);
}

static void
work_through (Run *run)
{
  gsize slice;
  while (take_slice (run, &slice))
    give_back (run, slice, run->stages->run_slice (run->work, run->stage, slice));
}

static gpointer
worker (gpointer data)
{
  Run *run = data;
  /* On Linux a thread has a priority of its own; where that fails the work is still right. */
  (void) setpriority (PRIO_PROCESS, (id_t) gettid (), WORKER_NICE);
  work_through (run);
  g_mutex_lock (&run->lock);
  run->working--;
  g_cond_signal (&run->changed);
  g_mutex_unlock (&run->lock);
  return NULL;
}

double
ant_progress_share (const AntProgress *progress)
{
  double share = progress->count > 0 ? (double) progress->done / (double) progress->count : 1;
  return MAX (share, progress->part);
}

static void
report (Run *run, gsize done)
{
  if (!run->progress)
    return;
  gint64 now_us = g_get_monotonic_time ();
  AntProgress progress = {
    .title = run->stages->title (run->work, run->stage),
    .stage = run->stage,
    .n_stages = run->stages->n_stages,
    .done = done,
    .count = run->count,
    .part = run->stages->part && run->count > 0 ? run->stages->part (run->work, run->stage) : 0,
    .elapsed_s = (double) (now_us - run->began_us) / G_USEC_PER_SEC,
    .stage_s = (double) (now_us - run->stage_began_us) / G_USEC_PER_SEC,
  };
  run->progress (&progress, run->data);
}

/* Until every worker has ended, look ten times a second how far they are. */
static void
watch_workers (Run *run)
{
  g_mutex_lock (&run->lock);
  gint64 wake_us = g_get_monotonic_time () + REPORT_EVERY_US;
  while (run->working > 0)
    if (!g_cond_wait_until (&run->changed, &run->lock, wake_us))
      {
        gsize done = run->done;
        g_mutex_unlock (&run->lock);
        if (run->stages->stop && g_cancellable_is_cancelled (run->cancellable))
          ant_stop_ask (run->stages->stop (run->work));
        report (run, done);
        g_mutex_lock (&run->lock);
        wake_us = g_get_monotonic_time () + REPORT_EVERY_US;
      }
  g_mutex_unlock (&run->lock);
}

static void
run_slices (Run *run)
{
  guint n_workers = (guint) MIN (run->n_threads, run->count);
  g_autofree GThread **thread = g_new0 (GThread *, n_workers);
  guint n_started = 0;
  run->working = n_workers;
  while (n_started < n_workers && (thread[n_started] = g_thread_try_new ("slices", worker, run, NULL)))
    n_started++;
  g_mutex_lock (&run->lock);
  run->working -= n_workers - n_started;
  g_mutex_unlock (&run->lock);
  if (n_started == 0)
    work_through (run); /* no thread to be had: slower, same digits */
  watch_workers (run);
  for (guint i = 0; i < n_started; i++)
    g_thread_join (thread[i]);
}

static AntStatus
run_stage (Run *run)
{
  run->stage_began_us = g_get_monotonic_time ();
  run->count = run->stages->count (run->work, run->stage);
  run->next = run->done = 0;
  report (run, 0);
  if (run->count > 0)
    run_slices (run);
  if (run->status == ANT_OK && g_cancellable_is_cancelled (run->cancellable))
    run->status = ANT_STOPPED;
  if (run->status == ANT_OK)
    run->status = run->stages->finish (run->work, run->stage);
  if (run->status == ANT_OK)
    report (run, run->count);
  return run->status;
}

AntStatus
ant_pool_run (const AntStages *stages, gpointer work, guint n_threads, GCancellable *cancellable,
              AntProgressFunc progress, gpointer data)
{
  Run run = {
    .stages = stages,
    .work = work,
    .n_threads = n_threads ? n_threads : g_get_num_processors (),
    .cancellable = cancellable,
    .progress = progress,
    .data = data,
    .began_us = g_get_monotonic_time (),
    .status = ANT_OK,
  };
  g_mutex_init (&run.lock);
  g_cond_init (&run.changed);
  for (run.stage = 0; run.stage < stages->n_stages; run.stage++)
    if (run_stage (&run) != ANT_OK)
      break;
  g_cond_clear (&run.changed);
  g_mutex_clear (&run.lock);
  return run.status;
}
