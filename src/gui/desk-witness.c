/* desk-witness.c - the witness on the desk: which file, which look at it, and the quiet work that reads and compares it. */
#include "gui/desk-private.h"

#include <string.h>

const AntWitnessStrips *
ant_desk_get_witness (AntDesk *self)
{
  return self->witness;
}

const char *
ant_desk_get_witness_path (AntDesk *self)
{
  return self->witness_path;
}

AntWitnessLook
ant_desk_get_witness_look (AntDesk *self)
{
  return self->witness_look;
}

void
ant_desk_set_witness_look (AntDesk *self, AntWitnessLook look)
{
  self->witness_look = look;
  ant_desk_tell (self, ANT_DESK_WITNESS);
}

static void
cancel (AntDesk *self)
{
  if (self->witness_stop)
    g_cancellable_cancel (self->witness_stop);
  g_clear_object (&self->witness_stop);
}

void
ant_desk_close_witness (AntDesk *self)
{
  cancel (self);
  g_clear_pointer (&self->witness, ant_witness_strips_unref);
  g_clear_pointer (&self->witness_path, g_free);
  g_clear_pointer (&self->witness_of, g_free);
  ant_desk_tell (self, ANT_DESK_WITNESS);
}

static void
opened_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntDesk) self = data;
  g_autoptr (GError) error = NULL;
  AntWitnessStrips *strips = ant_witness_task_finish (result, &error);
  if (g_task_get_cancellable (G_TASK (result)) != self->witness_stop)
    {
      ant_witness_strips_unref (strips); /* overtaken */
      return;
    }
  g_clear_object (&self->witness_stop);
  if (!strips)
    {
      ant_desk_close_witness (self);
      ant_desk_fail (self, error->message);
      return;
    }
  ant_witness_strips_unref (self->witness);
  self->witness = strips;
  ant_desk_tell (self, ANT_DESK_WITNESS);
}

static void
start (AntDesk *self)
{
  cancel (self);
  self->witness_stop = g_cancellable_new ();
  ant_witness_task_async (self->layers->record, self->witness_path, ant_desk_get_settings (self), self->witness_stop, opened_cb, g_object_ref (self));
}

void
ant_desk_open_witness (AntDesk *self, const char *path)
{
  if (!self->layers)
    return;
  char *copy = g_strdup (path);
  g_free (self->witness_path);
  self->witness_path = copy;
  g_free (self->witness_of);
  self->witness_of = g_strdup (self->layers->record->path);
  start (self);
  ant_desk_tell (self, ANT_DESK_WITNESS);
}

void
ant_desk_follow_witness (AntDesk *self)
{
  const AntRecord *record = ant_desk_get_record (self);
  if (!self->witness_path)
    return;
  if (!record || strcmp (record->path, self->witness_of) != 0)
    ant_desk_close_witness (self);
  else if (self->witness && !self->witness_stop
           && (self->witness->comparison->record != record
               || self->witness->comparison->drift_d != ant_desk_get_settings (self)->witness_drift_d))
    start (self); /* the record was read anew, or another drift is to be taken out */
}
