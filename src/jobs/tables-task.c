/* tables-task.c - a thread that writes a folder of tables. */
#include "jobs/tables-task.h"

#include "data/analysis-text.h"
#include "writers/result-files.h"

typedef struct
{
  char *folder;
  AntAnalysis *analysis;
  GPtrArray *comparisons;
  gboolean replace;
} Order;

static void
order_free (gpointer data)
{
  Order *order = data;
  g_free (order->folder);
  ant_analysis_free (order->analysis);
  g_ptr_array_unref (order->comparisons);
  g_free (order);
}

static gboolean
write_all (const Order *order, GError **error)
{
  const AntResultChoice choice = { .witnesses = order->comparisons->len };
  g_auto (GStrv) names = ant_result_file_names (&choice);
  g_autoptr (AntOutputDir) dir = ant_output_dir_open (order->folder, (const char *const *) names, order->replace, error);
  g_autofree char *path = g_build_filename (order->folder, ANT_ANALYSIS_FILE_NAME, NULL);
  g_autofree char *text = dir ? ant_analysis_to_text (order->analysis, path) : NULL;
  AntFindings findings = { ant_analysis_get_results (order->analysis), ant_analysis_get_judgements (order->analysis), text,
                           order->comparisons };
  return dir && ant_result_files_add (dir, &findings, &choice, error) && ant_output_dir_commit (dir, error);
}

static gpointer
run (gpointer data)
{
  g_autoptr (GTask) task = data;
  GError *error = NULL;
  if (write_all (g_task_get_task_data (task), &error))
    g_task_return_boolean (task, TRUE);
  else
    g_task_return_error (task, error);
  return NULL;
}

void
ant_tables_task_async (const char *folder, AntAnalysis *snapshot, GPtrArray *comparisons, gboolean replace,
                       GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, NULL, callback, data);
  Order *order = g_new0 (Order, 1);
  *order = (Order) { g_canonicalize_filename (folder, NULL), snapshot, g_ptr_array_ref (comparisons), replace };
  g_task_set_source_tag (task, ant_tables_task_async);
  g_task_set_task_data (task, order, order_free);
  g_thread_unref (g_thread_new ("tables", run, task));
}

gboolean
ant_tables_task_finish (GAsyncResult *result, GError **error)
{
  return g_task_propagate_boolean (G_TASK (result), error);
}

gboolean
ant_tables_would_replace (const char *folder, guint n_witnesses)
{
  const AntResultChoice choice = { .witnesses = n_witnesses };
  g_auto (GStrv) names = ant_result_file_names (&choice);
  for (char **name = names; *name; name++)
    {
      g_autofree char *path = g_build_filename (folder, *name, NULL);
      if (g_file_test (path, G_FILE_TEST_EXISTS))
        return TRUE;
    }
  return FALSE;
}
