/* column-strip.c - a thread that lays a further column on the grid. */
#include "jobs/column-strip.h"

AntColumnStrip *
ant_column_strip_ref (AntColumnStrip *strip)
{
  g_atomic_int_inc (&strip->ref_count);
  return strip;
}

void
ant_column_strip_unref (AntColumnStrip *strip)
{
  if (!strip || !g_atomic_int_dec_and_test (&strip->ref_count))
    return;
  ant_pyramid_free (strip->pyramid);
  g_free (strip->value);
  ant_record_unref (strip->record);
  g_free (strip);
}

static gpointer
run (gpointer data)
{
  g_autoptr (GTask) task = data;
  AntColumnStrip *strip = g_task_get_task_data (task);
  strip->value = ant_record_column_on_grid (strip->record, strip->column);
  strip->pyramid = ant_pyramid_new (strip->record->series.n, strip->value);
  g_task_return_pointer (task, ant_column_strip_ref (strip), (GDestroyNotify) ant_column_strip_unref);
  return NULL;
}

void
ant_column_strip_async (AntRecord *record, guint i, GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, cancellable, callback, data);
  AntColumnStrip *strip = g_new0 (AntColumnStrip, 1);
  *strip = (AntColumnStrip){ .record = ant_record_ref (record), .column = g_ptr_array_index (record->columns, i), .ref_count = 1 };
  g_task_set_source_tag (task, ant_column_strip_async);
  g_task_set_task_data (task, strip, (GDestroyNotify) ant_column_strip_unref);
  g_thread_unref (g_thread_new ("column", run, task));
}

AntColumnStrip *
ant_column_strip_finish (GAsyncResult *result)
{
  return g_task_propagate_pointer (G_TASK (result), NULL);
}
