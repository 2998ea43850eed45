/* open-task.c - a thread that opens a record. */
#include "jobs/open-task.h"

#include "jobs/record-open.h"

typedef struct
{
  char *path;
  AntSettings settings;
} Order;

static void
order_free (gpointer data)
{
  Order *order = data;
  g_free (order->path);
  g_free (order);
}

static AntLayers *
open_record (const Order *order, GCancellable *cancellable, GError **error)
{
  g_autoptr (AntRecord) record = ant_record_open (order->path, NULL, 0, cancellable, error);
  AntGridOptions grid = ant_settings_grid (&order->settings);
  if (!record || g_cancellable_set_error_if_cancelled (cancellable, error))
    return NULL;
  if (!ant_record_make_grid (record, &grid, error) || g_cancellable_set_error_if_cancelled (cancellable, error))
    return NULL;
  return ant_layers_new (record, &order->settings, NULL, NULL, error);
}

static gpointer
run (gpointer data)
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

void
ant_open_task_async (const char *path, const AntSettings *settings, GCancellable *cancellable,
                     GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, cancellable, callback, data);
  Order *order = g_new0 (Order, 1);
  *order = (Order) { g_strdup (path), *settings };
  g_task_set_source_tag (task, ant_open_task_async);
  g_task_set_task_data (task, order, order_free);
  g_thread_unref (g_thread_new ("open", run, task));
}

AntLayers *
ant_open_task_finish (GAsyncResult *result, GError **error)
{
  return g_task_propagate_pointer (G_TASK (result), error);
}
