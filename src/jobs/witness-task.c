/* witness-task.c - a thread that opens a witness. */
#include "jobs/witness-task.h"

#include "jobs/witness-job.h"

typedef struct
{
  AntRecord *record;
  AntWitness *witness;
  AntSettings settings;
} Order;

static void
order_free (gpointer data)
{
  Order *order = data;
  ant_record_unref (order->record);
  ant_witness_free (order->witness);
  g_free (order);
}

AntWitnessStrips *
ant_witness_strips_ref (AntWitnessStrips *strips)
{
  g_atomic_int_inc (&strips->ref_count);
  return strips;
}

void
ant_witness_strips_unref (AntWitnessStrips *strips)
{
  if (!strips || !g_atomic_int_dec_and_test (&strips->ref_count))
    return;
  for (int look = 0; look < ANT_N_WITNESS_LOOKS; look++)
    ant_pyramid_free (strips->pyramid[look]);
  ant_comparison_unref (strips->comparison);
  g_free (strips);
}

static gpointer
run (gpointer data)
{
  g_autoptr (GTask) task = data;
  const Order *order = g_task_get_task_data (task);
  GError *error = NULL;
  AntComparison *comparison
      = ant_witness_job_open (order->record, order->witness, &order->settings, g_task_get_cancellable (task), &error);
  if (!comparison)
    {
      g_task_return_error (task, error);
      return NULL;
    }
  const float *const values[] = { comparison->witness_ppm, comparison->ratio_ppm, comparison->difference_ppm };
  AntWitnessStrips *strips = g_new0 (AntWitnessStrips, 1);
  strips->ref_count = 1;
  strips->comparison = comparison;
  for (int look = 0; look < ANT_N_WITNESS_LOOKS; look++)
    strips->pyramid[look] = ant_pyramid_new (comparison->n, values[look]);
  g_task_return_pointer (task, strips, (GDestroyNotify) ant_witness_strips_unref);
  return NULL;
}

void
ant_witness_task_async (AntRecord *record, const AntWitness *witness, const AntSettings *settings, GCancellable *cancellable,
                        GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, cancellable, callback, data);
  Order *order = g_new0 (Order, 1);
  *order = (Order){ ant_record_ref (record), ant_witness_copy (witness), *settings };
  g_task_set_source_tag (task, ant_witness_task_async);
  g_task_set_task_data (task, order, order_free);
  g_thread_unref (g_thread_new ("witness", run, task));
}

AntWitnessStrips *
ant_witness_task_finish (GAsyncResult *result, GError **error)
{
  return g_task_propagate_pointer (G_TASK (result), error);
}
