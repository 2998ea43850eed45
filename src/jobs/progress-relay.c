/* progress-relay.c - a lock and a timer. */
#include "jobs/progress-relay.h"

#include <math.h>

#define REPORT_EVERY_MS 100

struct _AntProgressRelay
{
  AntTaskProgressFunc func;
  gpointer data;
  GMutex lock;
  AntTaskProgress now; /* under the lock */
};

typedef struct
{
  GTask *task; /* owned, and with it the relay */
  AntProgressRelay *relay;
} Watch;

static void
watch_free (gpointer data)
{
  Watch *watch = data;
  g_object_unref (watch->task);
  g_free (watch);
}

static gboolean
report (gpointer data)
{
  Watch *watch = data;
  AntProgressRelay *relay = watch->relay;
  if (g_task_get_completed (watch->task))
    return G_SOURCE_REMOVE;
  g_mutex_lock (&relay->lock);
  AntTaskProgress now = relay->now;
  g_mutex_unlock (&relay->lock);
  relay->func (&now, relay->data);
  return G_SOURCE_CONTINUE;
}

AntProgressRelay *
ant_progress_relay_new (GTask *task, AntTaskProgressFunc func, gpointer data)
{
  AntProgressRelay *relay = g_new0 (AntProgressRelay, 1);
  relay->func = func;
  relay->data = data;
  relay->now.stage_left_s = NAN;
  g_mutex_init (&relay->lock);
  if (func)
    {
      Watch *watch = g_new (Watch, 1);
      *watch = (Watch) { g_object_ref (task), relay };
      g_timeout_add_full (G_PRIORITY_DEFAULT, REPORT_EVERY_MS, report, watch, watch_free);
    }
  return relay;
}

void
ant_progress_relay_free (AntProgressRelay *relay)
{
  g_mutex_clear (&relay->lock);
  g_free (relay);
}

void
ant_progress_relay_note (const AntProgress *progress, gpointer data)
{
  AntProgressRelay *relay = data;
  double part = progress->count > 0 ? ant_progress_share (progress) : 0;
  g_mutex_lock (&relay->lock);
  relay->now = (AntTaskProgress) {
    .title = progress->title,
    .stage = progress->stage,
    .n_stages = progress->n_stages,
    .fraction = ((double) progress->stage + part) / (double) progress->n_stages,
    .stage_left_s = part > 0 ? progress->stage_s * (1 - part) / part : NAN,
  };
  g_mutex_unlock (&relay->lock);
}
