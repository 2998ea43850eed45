/* desk-columns.c - further columns of the record that are shown as strips: which, and the quiet work that lays them on the grid. */
#include <glib/gi18n.h>

#include "gui/desk-private.h"

typedef struct
{
  char *name;            /* owned; a record that is read again has its columns by the same names */
  AntColumnStrip *strip; /* owned; NULL: not made yet */
  GCancellable *stop;    /* owned; NULL: nothing is being made */
} Shown;

static void
cancel (Shown *shown)
{
  if (shown->stop)
    g_cancellable_cancel (shown->stop);
  g_clear_object (&shown->stop);
}

void
ant_desk_shown_column_free (gpointer data)
{
  Shown *shown = data;
  cancel (shown);
  ant_column_strip_unref (shown->strip);
  g_free (shown->name);
  g_free (shown);
}

static Shown *
shown_at (AntDesk *self, guint i)
{
  return i < self->shown_columns->len ? g_ptr_array_index (self->shown_columns, i) : NULL;
}

guint
ant_desk_count_shown_columns (AntDesk *self)
{
  return self->shown_columns->len;
}

const char *
ant_desk_get_shown_column (AntDesk *self, guint i)
{
  Shown *shown = shown_at (self, i);
  return shown ? shown->name : NULL;
}

const AntColumnStrip *
ant_desk_get_column_strip (AntDesk *self, guint i)
{
  Shown *shown = shown_at (self, i);
  return shown ? shown->strip : NULL;
}

static const char *
column_name (AntDesk *self, guint column)
{
  const AntRecord *record = ant_desk_get_record (self);
  return record && column < record->columns->len ? ((const AntColumn *) g_ptr_array_index (record->columns, column))->name : NULL;
}

static int
find_shown (AntDesk *self, const char *name)
{
  for (guint i = 0; name && i < self->shown_columns->len; i++)
    if (g_str_equal (shown_at (self, i)->name, name))
      return (int) i;
  return -1;
}

gboolean
ant_desk_is_column_shown (AntDesk *self, guint column)
{
  return find_shown (self, column_name (self, column)) >= 0;
}

static void
made_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntDesk) self = data;
  AntColumnStrip *strip = ant_column_strip_finish (result);
  for (guint i = 0; strip && i < self->shown_columns->len; i++)
    {
      Shown *shown = shown_at (self, i);
      if (shown->stop != g_task_get_cancellable (G_TASK (result)))
        continue;
      g_clear_object (&shown->stop);
      ant_column_strip_unref (shown->strip);
      shown->strip = g_steal_pointer (&strip);
      ant_desk_tell (self, ANT_DESK_COLUMNS);
    }
  ant_column_strip_unref (strip); /* overtaken */
}

static void
start (AntDesk *self, Shown *shown, guint column)
{
  cancel (shown);
  shown->stop = g_cancellable_new ();
  ant_column_strip_async (self->layers->record, column, shown->stop, made_cb, g_object_ref (self));
}

void
ant_desk_show_column (AntDesk *self, guint column, gboolean wanted)
{
  const char *name = column_name (self, column);
  int at = find_shown (self, name);
  if (!name || (at >= 0) == !!wanted)
    return;
  if (!wanted)
    g_ptr_array_remove_index (self->shown_columns, (guint) at);
  else if (self->shown_columns->len < ANT_MOST_SHOWN_COLUMNS)
    {
      Shown *shown = g_new0 (Shown, 1);
      shown->name = g_strdup (name);
      g_ptr_array_add (self->shown_columns, shown);
      start (self, shown, column);
    }
  ant_desk_tell (self, ANT_DESK_COLUMNS);
  if (wanted && find_shown (self, name) < 0)
    {
      g_autofree char *sentence = g_strdup_printf (_("%d columns are shown, more cannot be: hide one first"), ANT_MOST_SHOWN_COLUMNS);
      ant_desk_fail (self, sentence);
    }
}

void
ant_desk_follow_columns (AntDesk *self)
{
  const AntRecord *record = ant_desk_get_record (self);
  for (guint i = self->shown_columns->len; i-- > 0;)
    {
      Shown *shown = shown_at (self, i);
      guint column = 0;
      while (column_name (self, column) && !g_str_equal (column_name (self, column), shown->name))
        column++;
      if (!column_name (self, column))
        g_ptr_array_remove_index (self->shown_columns, i);
      else if (!shown->strip || shown->strip->record != record)
        {
          if (shown->strip && g_strcmp0 (shown->strip->record->sha256, record->sha256) != 0)
            g_clear_pointer (&shown->strip, ant_column_strip_unref);
          start (self, shown, column);
        }
    }
}
