/* scan-task.c - threads that scan and measure. */
#include "jobs/scan-task.h"

#include "jobs/outside-job.h"
#include "jobs/scan-job.h"
#include "jobs/witness-job.h"

typedef struct
{
  AntLayers *layers;
  AntSettings settings;
  AntObserverChoice *choice; /* owned; NULL: nobody knows who took the record */
  GPtrArray *witnesses, *comparisons; /* of AntWitness, AntComparison; NULL: there are none */
  double mid_d, duration_d; /* of an asked dip */
  AntProgressRelay *relay;  /* of a scan */
} Order;

static void
order_free (gpointer data)
{
  Order *order = data;
  ant_layers_unref (order->layers);
  ant_observer_choice_unref (order->choice);
  g_clear_pointer (&order->witnesses, g_ptr_array_unref);
  g_clear_pointer (&order->comparisons, g_ptr_array_unref);
  g_clear_pointer (&order->relay, ant_progress_relay_free);
  g_free (order);
}

static Order *
order_new (AntLayers *layers, const AntSettings *settings)
{
  Order *order = g_new0 (Order, 1);
  order->layers = ant_layers_ref (layers);
  order->settings = *settings;
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

/* Beside the record as it is read now. */
static gboolean
compare_anew (Order *order, GCancellable *cancellable, GError **error)
{
  AntRecord *record = order->layers->record;
  for (guint i = 0; order->comparisons && i < order->comparisons->len; i++)
    {
      AntComparison *comparison = g_ptr_array_index (order->comparisons, i);
      if (comparison->record == record)
        continue;
      AntComparison *anew = ant_witness_job_open (record, g_ptr_array_index (order->witnesses, i), &order->settings, cancellable, error);
      if (!anew)
        return FALSE;
      order->comparisons->pdata[i] = anew;
      ant_comparison_unref (comparison);
    }
  return TRUE;
}

static gpointer
run_scan (gpointer data)
{
  g_autoptr (GTask) task = data;
  Order *order = g_task_get_task_data (task);
  AntRecord *record = order->layers->record;
  GError *error = NULL;
  g_autoptr (AntScanOutcome) outcome = g_new0 (AntScanOutcome, 1);
  if (compare_anew (order, g_task_get_cancellable (task), &error))
    outcome->results =
        ant_scan_job_run_partly (record, &order->settings, g_task_get_cancellable (task), ant_progress_relay_note,
                                 order->relay, &error);
  gboolean outside = order->choice || (order->comparisons && order->comparisons->len > 0);
  if (outcome->results && outside
      && !ant_outside_job_run (outcome->results, order->choice, order->comparisons, NULL, &error))
    g_clear_pointer (&outcome->results, ant_scan_results_unref);
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

static gpointer
copy_witness (gconstpointer witness, gpointer unused)
{
  return ant_witness_copy (witness);
}

static gpointer
ref_comparison (gconstpointer comparison, gpointer unused)
{
  return ant_comparison_ref ((AntComparison *) (gsize) comparison);
}

/* Who took the record, and what other instruments have of it. */
static void
take_outside (Order *order, AntObserverChoice *choice, const GPtrArray *witnesses, const GPtrArray *comparisons)
{
  order->choice = choice ? ant_observer_choice_ref (choice) : NULL;
  if (comparisons)
    {
      order->witnesses = g_ptr_array_copy ((GPtrArray *) (gsize) witnesses, (GCopyFunc) copy_witness, NULL);
      g_ptr_array_set_free_func (order->witnesses, (GDestroyNotify) ant_witness_free);
      order->comparisons = g_ptr_array_copy ((GPtrArray *) (gsize) comparisons, (GCopyFunc) ref_comparison, NULL);
      g_ptr_array_set_free_func (order->comparisons, (GDestroyNotify) ant_comparison_unref);
    }
}

void
ant_scan_task_async (AntLayers *layers, const AntSettings *settings, AntObserverChoice *choice, const GPtrArray *witnesses,
                     const GPtrArray *comparisons, GCancellable *cancellable, AntTaskProgressFunc progress, GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, cancellable, callback, data);
  Order *order = order_new (layers, settings);
  take_outside (order, choice, witnesses, comparisons);
  g_task_set_source_tag (task, ant_scan_task_async);
  g_task_set_check_cancellable (task, FALSE); /* a stopped scan has results too */
  order->relay = ant_progress_relay_new (task, progress, data);
  g_task_set_task_data (task, order, order_free);
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
                        &asked->upper_limit_ppm, &asked->verdict, &error)
      && compare_anew (order, NULL, &error)
      && ant_outside_job_ask (order->layers->record, &order->settings, order->choice, order->comparisons, &asked->dip, &asked->verdict,
                              NULL, &error))
    g_task_return_pointer (task, g_steal_pointer (&asked), g_free);
  else
    g_task_return_error (task, error);
  return NULL;
}

void
ant_ask_task_async (AntLayers *layers, const AntSettings *settings, AntObserverChoice *choice, const GPtrArray *witnesses,
                    const GPtrArray *comparisons, double mid_d, double duration_d, GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, cancellable, callback, data);
  Order *order = order_new (layers, settings);
  g_task_set_source_tag (task, ant_ask_task_async);
  take_outside (order, choice, witnesses, comparisons);
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
