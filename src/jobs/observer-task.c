/* observer-task.c - a thread that reads a table of positions. */
#include "jobs/observer-task.h"

#include "readers/observer-reader.h"

static void
run (GTask *task, gpointer source, gpointer text, GCancellable *cancellable)
{
  GError *error = NULL;
  AntObserverChoice *choice = ant_observer_open (text, &error);
  if (choice)
    g_task_return_pointer (task, choice, (GDestroyNotify) ant_observer_choice_unref);
  else
    g_task_return_error (task, error);
}

void
ant_observer_task_async (const char *text, GAsyncReadyCallback callback, gpointer data)
{
  g_autoptr (GTask) task = g_task_new (NULL, NULL, callback, data);
  g_task_set_source_tag (task, ant_observer_task_async);
  g_task_set_task_data (task, g_strdup (text), g_free);
  g_task_run_in_thread (task, run);
}

AntObserverChoice *
ant_observer_task_finish (GAsyncResult *result, GError **error)
{
  return g_task_propagate_pointer (G_TASK (result), error);
}
