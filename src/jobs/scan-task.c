/* scan-task.c - threads that scan and measure, and a timer that tells how far they are.
 *
 * The worker writes its progress under a lock; the main loop reads it ten times a second. However fast the worker is,
 * the loop is never flooded. */
#include "jobs/scan-task.h"

#include <math.h>

#include "jobs/scan-job.h"

#define REPORT_EVERY_MS 100

typedef struct
{
  AntLayers *layers;
  AntSettings settings;
  double mid_d, duration_d; /* of an asked dip */
  AntTaskProgressFunc progress;
  gpointer data;
  GMutex lock;
  AntTaskProgress now;      /* under the lock */
} Order;

static void
order_free (gpointer data)
{
  Order *order = data;
  ant_layers_unref (order->layers);
  g_mutex_clear (&order->lock);
  g_free (order);
}

static Order *
order_new (AntLayers *layers, const AntSettings *settings)
{
  Order *order = g_new0 (Order, 1);
  order->layers = ant_layers_ref (layers);
  order->settings = *settings;
  order->now.stage_left_s = NAN;
  g_mutex_init (&order->lock);
  return order;
}

void
ant_scan_outcome_free (AntScanOutcome *outcome)
{
  if (!outcome)
    return;
  ant_scan_results_unref (outcome->results);
  ant_layers_unref (outcome->layers);
  g_free (outcome);
}

/* On the worker. */
static void
note_progress (const AntProgress *progress, gpointer data)
{
  Order *order = data;
  double part = progress->count > 0 ? (double) progress->done / (double) progress->count : 0;
  g_mutex_lock (&order->lock);
  order->now = (AntTaskProgress) {
    .title = progress->title,
    .stage = progress->stage,
    .n_stages = progress->n_stages,
    .fraction = ((double) progress->stage + part) / (double) progress->n_stages,
    .stage_left_s = part > 0 ? progress->stage_s * (1 - part) / part : NAN,
  };
  g_mutex_unlock (&order->lock);
}

/* On the main loop. */
static gboolean
report (gpointer data)
{
  GTask *task = data;
  Order *order = g_task_get_task_data (task);
  if (g_task_get_completed (task))
    return G_SOURCE_REMOVE;
  g_mutex_lock (&order->lock);
  AntTaskProgress now = order->now;
  g_mutex_unlock (&order->lock);
  order->progress (&now, order->data);
  return G_SOURCE_CONTINUE;
}

static gpointer
run_scan (gpointer data)
{
  g_autoptr (GTask) task = data;
  Order *order = g_task_get_task_data (task);
  AntRecord *record = order->layers->record;
  GError *error = NULL;
  g_autoptr (AntScanOutcome) outcome = g_new0 (AntScanOutcome, 1);
  outcome->results =
      ant_scan_job_run_partly (record, &order->settings, g_task_get_cancellable (task), note_progress, order, &error);
  if (outcome->results && outcome->results->reach < ANT_SCAN_COMPLETE) /* who stops does not want to wait */
    outcome->layers = ant_layers_ref (order->layers);
  else if (outcome->results)
    outcome->layers = ant_layers_new (record, &order->settings, outcome->results, order->layers, &error);
  if (outcome->layers)
    g_task_return_pointer (task, g_steal_pointer (&outcome), (GDestroyNotify) ant_scan_outcome_free);
  else
    g_task_return_error (task, error);
  return NULL;
}

void
ant_scan_task_async (AntLayers *layers, const AntSettings *settings, GCancellable *cancellable,
                     AntTaskProgressFunc progress, GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, cancellable, callback, data);
  Order *order = order_new (layers, settings);
  g_task_set_source_tag (task, ant_scan_task_async);
  g_task_set_check_cancellable (task, FALSE); /* a stopped scan has results too */
  order->progress = progress;
  order->data = data;
  g_task_set_task_data (task, order, order_free);
  if (progress)
    g_timeout_add_full (G_PRIORITY_DEFAULT, REPORT_EVERY_MS, report, g_object_ref (task), g_object_unref);
  g_thread_unref (g_thread_new ("scan", run_scan, task));
}

AntScanOutcome *
ant_scan_task_finish (GAsyncResult *result, GError **error)
{
  return g_task_propagate_pointer (G_TASK (result), error);
}

static gpointer
run_ask (gpointer data)
{
  g_autoptr (GTask) task = data;
  Order *order = g_task_get_task_data (task);
  GError *error = NULL;
  g_autofree AntAskedDip *asked = g_new0 (AntAskedDip, 1);
  if (ant_scan_job_ask (order->layers->record, &order->settings, order->mid_d, order->duration_d, &asked->dip,
                        &asked->upper_limit_ppm, &error))
    g_task_return_pointer (task, g_steal_pointer (&asked), g_free);
  else
    g_task_return_error (task, error);
  return NULL;
}

void
ant_ask_task_async (AntLayers *layers, const AntSettings *settings, double mid_d, double duration_d,
                    GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, cancellable, callback, data);
  Order *order = order_new (layers, settings);
  g_task_set_source_tag (task, ant_ask_task_async);
  order->mid_d = mid_d;
  order->duration_d = duration_d;
  g_task_set_task_data (task, order, order_free);
  g_thread_unref (g_thread_new ("ask", run_ask, task));
}

AntAskedDip *
ant_ask_task_finish (GAsyncResult *result, GError **error)
{
  return g_task_propagate_pointer (G_TASK (result), error);
}
