/* save-task.c - a thread that saves a file. */
#include "jobs/save-task.h"

#include "writers/whole-file.h"

typedef struct
{
  char *path;
  AntSaveMake make;
  gpointer order;
  GDestroyNotify free_order;
} Save;

static void
save_free (gpointer data)
{
  Save *save = data;
  if (save->free_order)
    save->free_order (save->order);
  g_free (save->path);
  g_free (save);
}

static gboolean
write_bytes (const Save *save, GBytes *bytes, GError **error)
{
  gsize size;
  const void *contents = g_bytes_get_data (bytes, &size);
  AntWholeFile *file = ant_whole_file_open (save->path, TRUE, error);
  if (!file)
    return FALSE;
  fwrite (contents, 1, size, ant_whole_file_stream (file));
  return ant_whole_file_commit (file, error);
}

static gpointer
run (gpointer data)
{
  g_autoptr (GTask) task = data;
  const Save *save = g_task_get_task_data (task);
  GError *error = NULL;
  g_autoptr (GBytes) bytes = save->make (save->order, &error);
  if (bytes && write_bytes (save, bytes, &error))
    g_task_return_boolean (task, TRUE);
  else
    g_task_return_error (task, error);
  return NULL;
}

void
ant_save_task_async (const char *path, AntSaveMake make, gpointer order, GDestroyNotify free_order, GAsyncReadyCallback callback,
                     gpointer data)
{
  GTask *task = g_task_new (NULL, NULL, callback, data);
  Save *save = g_new0 (Save, 1);
  *save = (Save) { g_strdup (path), make, order, free_order };
  g_task_set_source_tag (task, ant_save_task_async);
  g_task_set_task_data (task, save, save_free);
  g_thread_unref (g_thread_new ("save", run, task));
}

gboolean
ant_save_task_finish (GAsyncResult *result, GError **error)
{
  return g_task_propagate_boolean (G_TASK (result), error);
}
