/* desk-track.c - the dip SNR of one duration against time: which duration, and the quiet work that computes it beside
 * whatever else the desk is doing. */
#include "gui/desk-private.h"

#include <math.h>

#define SAME 0.02 /* durations nearer than this are one */

const AntSnrStrip *
ant_desk_get_snr (AntDesk *self)
{
  return self->snr;
}

double
ant_desk_get_snr_progress (AntDesk *self)
{
  return self->snr_stop ? self->snr_done : -1;
}

gboolean
ant_desk_get_snr_shown (AntDesk *self)
{
  return self->snr_shown;
}

void
ant_desk_set_snr_shown (AntDesk *self, gboolean shown)
{
  self->snr_shown = shown;
  ant_desk_follow_snr (self);
  ant_desk_tell (self, ANT_DESK_SNR);
}

void
ant_desk_set_snr_duration (AntDesk *self, double duration_d)
{
  self->snr_choice_d = duration_d;
  ant_desk_follow_snr (self);
  ant_desk_tell (self, ANT_DESK_SNR);
}

double
ant_desk_get_snr_duration (AntDesk *self)
{
  return self->snr ? self->snr->duration_d : self->snr_wanted_d;
}

void
ant_desk_drop_snr (AntDesk *self)
{
  if (self->snr_stop)
    g_cancellable_cancel (self->snr_stop);
  g_clear_object (&self->snr_stop);
  g_clear_pointer (&self->snr, ant_snr_strip_unref);
}

static void
snr_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntDesk) self = data;
  g_autoptr (GError) error = NULL;
  AntSnrStrip *strip = ant_snr_task_finish (result, &error);
  if (g_task_get_cancellable (G_TASK (result)) != self->snr_stop)
    {
      ant_snr_strip_unref (strip); /* overtaken */
      return;
    }
  g_clear_object (&self->snr_stop);
  if (strip)
    {
      ant_snr_strip_unref (self->snr);
      self->snr = strip;
    }
  ant_desk_tell (self, ANT_DESK_SNR | ANT_DESK_POINTER);
  if (!strip)
    ant_desk_fail (self, error->message);
}

static void
progress_cb (const AntTaskProgress *progress, gpointer data)
{
  AntDesk *self = data;
  self->snr_done = progress->fraction;
  ant_desk_tell (self, ANT_DESK_SNR);
}

static double
wanted_d (AntDesk *self)
{
  if (self->snr_choice_d > 0)
    return self->snr_choice_d;
  gboolean dip = self->selected && ant_dip_item_get_kind (self->selected) != ANT_KIND_PASSAGE;
  return dip ? ant_dip_item_get_dip (self->selected)->duration_d : self->snr_wanted_d;
}

void
ant_desk_follow_snr (AntDesk *self)
{
  double duration_d = wanted_d (self);
  gboolean same = fabs (duration_d / self->snr_wanted_d - 1) < SAME;
  if (self->snr && self->snr->results != self->results)
    ant_desk_drop_snr (self);
  if (!self->snr_shown || !self->results || (same && (self->snr || self->snr_stop)))
    {
      if (!self->snr_shown || !self->results)
        ant_desk_drop_snr (self);
      return;
    }
  if (self->snr_stop)
    g_cancellable_cancel (self->snr_stop);
  g_clear_object (&self->snr_stop);
  self->snr_stop = g_cancellable_new ();
  self->snr_wanted_d = duration_d;
  self->snr_done = 0;
  ant_snr_task_async (self->results, duration_d, self->snr_stop, progress_cb, snr_cb, g_object_ref (self));
}
