/* preview-task.c - a thread that reads the first part of a file. */
#include "jobs/preview-task.h"

#include <string.h>

#include "jobs/record-open.h"
#include "readers/byte-source.h"

#define FIRST_PART (2 * 1024 * 1024) /* of a text: read in an instant */

typedef struct
{
  char *path;
  AntReadingChoices choices;
} Order;

static void
order_free (gpointer data)
{
  Order *order = data;
  g_free (order->path);
  ant_reading_choices_clear (&order->choices);
  g_free (order);
}

void
ant_preview_free (AntPreview *preview)
{
  if (!preview)
    return;
  ant_file_look_free (preview->look);
  ant_record_unref (preview->record);
  g_free (preview->refusal);
  g_free (preview);
}

/* The first whole lines of a text, unpacked. */
static AntRecord *
read_first_part (const Order *order, gboolean *partial, GCancellable *cancellable, GError **error)
{
  g_autoptr (AntByteSource) source = ant_byte_source_open (order->path, error);
  g_autofree char *bytes = g_malloc (FIRST_PART);
  gsize n = 0;
  gssize got = source ? 1 : -1;
  while (got > 0 && n < FIRST_PART)
    {
      got = g_cancellable_set_error_if_cancelled (cancellable, error) ? -1 : ant_byte_source_read (source, bytes + n, FIRST_PART - n, error);
      n += (gsize) MAX (got, 0);
    }
  if (got < 0)
    return NULL;
  const char *last = n == FIRST_PART ? memrchr (bytes, '\n', n) : NULL;
  *partial = last != NULL;
  return ant_reader_read_bytes (order->path, bytes, last ? (gsize) (last + 1 - bytes) : n, &order->choices, error);
}

static AntPreview *
make_preview (const Order *order, GCancellable *cancellable, GError **error)
{
  g_autoptr (AntPreview) preview = g_new0 (AntPreview, 1);
  g_autoptr (GError) refusal = NULL;
  preview->look = ant_file_look_new (order->path, error);
  if (!preview->look)
    return NULL;
  preview->record = g_strcmp0 (preview->look->format, "text") == 0
                        ? read_first_part (order, &preview->partial, cancellable, &refusal)
                        : ant_record_open (order->path, &order->choices, 1, cancellable, &refusal);
  if (g_cancellable_set_error_if_cancelled (cancellable, error))
    return NULL;
  if (refusal)
    preview->refusal = g_strdup (refusal->message);
  return g_steal_pointer (&preview);
}

static gpointer
run (gpointer data)
{
  g_autoptr (GTask) task = data;
  GError *error = NULL;
  AntPreview *preview = make_preview (g_task_get_task_data (task), g_task_get_cancellable (task), &error);
  if (preview)
    g_task_return_pointer (task, preview, (GDestroyNotify) ant_preview_free);
  else
    g_task_return_error (task, error);
  return NULL;
}

void
ant_preview_task_async (const char *path, const AntReadingChoices *choices, GCancellable *cancellable,
                        GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, cancellable, callback, data);
  Order *order = g_new0 (Order, 1);
  order->path = g_strdup (path);
  ant_reading_choices_copy (choices, &order->choices);
  g_task_set_source_tag (task, ant_preview_task_async);
  g_task_set_task_data (task, order, order_free);
  g_thread_unref (g_thread_new ("preview", run, task));
}

AntPreview *
ant_preview_task_finish (GAsyncResult *result, GError **error)
{
  return g_task_propagate_pointer (G_TASK (result), error);
}
