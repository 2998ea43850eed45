/* clock-fold.c - a thread that flattens and folds. */
#include "jobs/clock-fold.h"

#include <glib/gi18n.h>

#include "data/error.h"

static void
wish_free (gpointer data)
{
  AntClockWish *wish = data;
  ant_layers_unref (wish->layers);
  ant_comparison_unref (wish->comparison);
  g_free (wish);
}

/* The values and the grid they are on; on a witness's grid gaps are those of the record's averages. */
static float *
values_of (const AntClockWish *wish, AntSeries *series)
{
  const AntRecord *record = wish->layers->record;
  const AntComparison *comparison = wish->comparison;
  *series = record->series;
  switch (wish->source)
    {
    case ANT_CLOCK_RESIDUAL:
      return g_memdup2 (wish->layers->residual_ppm, series->n * sizeof (float));
    case ANT_CLOCK_COLUMN:
      return ant_record_column_on_grid (record, g_ptr_array_index (record->columns, wish->column));
    case ANT_CLOCK_WITNESS:
      *series = (AntSeries){ .n = comparison->n, .start_d = comparison->start_d, .step_d = comparison->step_d,
                             .value_ppm = comparison->record_ppm };
      return g_memdup2 (wish->look == ANT_WITNESS_ITSELF  ? comparison->witness_ppm
                        : wish->look == ANT_WITNESS_RATIO ? comparison->ratio_ppm
                                                          : comparison->difference_ppm, series->n * sizeof (float));
    case ANT_CLOCK_IRRADIANCE:
    default:
      return g_memdup2 (series->value_ppm, series->n * sizeof (float));
    }
}

static gpointer
run (gpointer data)
{
  g_autoptr (GTask) task = data;
  const AntClockWish *wish = g_task_get_task_data (task);
  AntSeries series;
  GError *error = NULL;
  g_autofree AntClockFold *fold = g_new0 (AntClockFold, 1);
  g_autofree float *value = values_of (wish, &series);
  fold->options = wish->options;
  if (!ant_status_to_error (ant_fold_flatten (&series, &fold->options, value), _("the running median"), &error))
    {
      g_task_return_error (task, error);
      return NULL;
    }
  ant_fold (&series, value, &fold->options, fold->bin);
  fold->significance = ant_fold_swing (fold->bin, fold->options.n_bins, &fold->swing);
  g_task_return_pointer (task, g_steal_pointer (&fold), g_free);
  return NULL;
}

void
ant_clock_fold_async (const AntClockWish *wish, GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, cancellable, callback, data);
  AntClockWish *own = g_memdup2 (wish, sizeof *wish);
  ant_layers_ref (own->layers);
  if (own->comparison)
    ant_comparison_ref (own->comparison);
  g_task_set_source_tag (task, ant_clock_fold_async);
  g_task_set_task_data (task, own, wish_free);
  g_thread_unref (g_thread_new ("fold", run, task));
}

AntClockFold *
ant_clock_fold_finish (GAsyncResult *result, GError **error)
{
  return g_task_propagate_pointer (G_TASK (result), error);
}
