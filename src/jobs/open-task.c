/* open-task.c - threads that open a record, and an analysis. */
#include "jobs/open-task.h"

#include "data/analysis-text.h"
#include "jobs/record-open.h"
#include "readers/observer-reader.h"

typedef struct
{
  char *path, *sha256;
  AntTreatment *treatment; /* NULL: an analysis is read */
  AntScanResults *results;
} Order;

static void
order_free (gpointer data)
{
  Order *order = data;
  g_free (order->path);
  g_free (order->sha256);
  ant_treatment_free (order->treatment);
  ant_scan_results_unref (order->results);
  g_free (order);
}

static AntLayers *
open_record (const Order *order, GCancellable *cancellable, GError **error)
{
  g_autoptr (AntRecord) record = ant_record_open (order->path, &order->treatment->reading, 0, cancellable, error);
  gboolean converts = order->treatment->settings.grid.distance != (double) ANT_DISTANCE_AS_IS;
  const char *who = converts ? order->treatment->observer : NULL; /* nothing else of the grid is his */
  g_autoptr (AntObserverChoice) choice = NULL;
  AntGridOptions grid;
  if (!record || g_cancellable_set_error_if_cancelled (cancellable, error)
      || (who && !(choice = ant_observer_open (who, error))) || !ant_treatment_grid (order->treatment, &grid, error))
    return NULL;
  grid.observer = choice ? &choice->observer : NULL;
  gboolean good = ant_record_make_grid (record, &grid, error);
  ant_grid_options_clear (&grid);
  if (!good || g_cancellable_set_error_if_cancelled (cancellable, error))
    return NULL;
  AntScanResults *results = g_strcmp0 (record->sha256, order->sha256) == 0 ? order->results : NULL;
  return ant_layers_new (record, &order->treatment->settings, results, NULL, error);
}

static gpointer
run_open (gpointer data)
{
  g_autoptr (GTask) task = data;
  GError *error = NULL;
  AntLayers *layers = open_record (g_task_get_task_data (task), g_task_get_cancellable (task), &error);
  if (layers)
    g_task_return_pointer (task, layers, (GDestroyNotify) ant_layers_unref);
  else
    g_task_return_error (task, error);
  return NULL;
}

static GTask *
task_new (Order *order, GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, cancellable, callback, data);
  g_task_set_task_data (task, order, order_free);
  return task;
}

void
ant_open_task_async (const char *path, const AntTreatment *treatment, AntScanResults *results, const char *sha256,
                     GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data)
{
  Order *order = g_new0 (Order, 1);
  *order = (Order) { g_strdup (path), g_strdup (sha256), ant_treatment_copy (treatment),
                     results ? ant_scan_results_ref (results) : NULL };
  GTask *task = task_new (order, cancellable, callback, data);
  g_task_set_source_tag (task, ant_open_task_async);
  g_thread_unref (g_thread_new ("open", run_open, task));
}

AntLayers *
ant_open_task_finish (GAsyncResult *result, GError **error)
{
  return g_task_propagate_pointer (G_TASK (result), error);
}

typedef struct
{
  AntAnalysis *analysis;
  char *newer;
} Loaded;

static void
loaded_free (gpointer data)
{
  Loaded *loaded = data;
  ant_analysis_free (loaded->analysis);
  g_free (loaded->newer);
  g_free (loaded);
}

static gpointer
run_load (gpointer data)
{
  g_autoptr (GTask) task = data;
  const Order *order = g_task_get_task_data (task);
  GError *error = NULL;
  Loaded *loaded = g_new0 (Loaded, 1);
  loaded->analysis = ant_analysis_load (order->path, &loaded->newer, &error);
  if (loaded->analysis)
    g_task_return_pointer (task, loaded, loaded_free);
  else
    {
      loaded_free (loaded);
      g_task_return_error (task, error);
    }
  return NULL;
}

void
ant_load_task_async (const char *path, GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data)
{
  Order *order = g_new0 (Order, 1);
  order->path = g_strdup (path);
  GTask *task = task_new (order, cancellable, callback, data);
  g_task_set_source_tag (task, ant_load_task_async);
  g_thread_unref (g_thread_new ("load", run_load, task));
}

AntAnalysis *
ant_load_task_finish (GAsyncResult *result, char **newer, GError **error)
{
  Loaded *loaded = g_task_propagate_pointer (G_TASK (result), error);
  *newer = NULL;
  if (!loaded)
    return NULL;
  AntAnalysis *analysis = g_steal_pointer (&loaded->analysis);
  *newer = g_steal_pointer (&loaded->newer);
  loaded_free (loaded);
  return analysis;
}
