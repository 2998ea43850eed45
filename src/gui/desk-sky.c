/* desk-sky.c - the sky over the record: who watched, what crossed the Sun, what the record shows of it. Quiet work beside
 * whatever else the desk is doing; predicted at once, measured only when somebody looks at the page. */
#include <glib/gi18n.h>
#include <math.h>

#include "gui/desk-private.h"

#define SURROUNDINGS 3.0 /* lengths of an event in view around it */

const AntObserverChoice *
ant_desk_get_observer (AntDesk *self)
{
  return self->observer;
}

const AntSkyList *
ant_desk_get_sky (AntDesk *self)
{
  return self->sky;
}

const char *
ant_desk_get_sky_said (AntDesk *self)
{
  return self->sky_said;
}

gboolean
ant_desk_is_watching (AntDesk *self)
{
  return self->sky_stop != NULL;
}

gsize
ant_desk_get_ticks (AntDesk *self, const double **tick_d)
{
  *tick_d = &g_array_index (self->ticks, double, 0);
  return self->ticks->len;
}

void
ant_desk_drop_sky (AntDesk *self)
{
  if (self->sky_stop)
    g_cancellable_cancel (self->sky_stop);
  g_clear_object (&self->sky_stop);
  g_clear_pointer (&self->sky, ant_sky_list_unref);
  g_clear_pointer (&self->sky_said, g_free);
  g_array_set_size (self->ticks, 0);
  self->sky_selected = ANT_NO_EVENT;
}

/* Contacts, where the place of the observer is known well enough for them. */
static void
make_ticks (AntDesk *self)
{
  g_array_set_size (self->ticks, 0);
  for (gsize i = 0; i < self->sky->n; i++)
    for (int c = 0; c < ANT_N_CONTACTS; c++)
      if (isfinite (self->sky->sighting[i].contact_d[c]) && !self->sky->sighting[i].event.uncertain)
        g_array_append_val (self->ticks, self->sky->sighting[i].contact_d[c]);
}

static void
take_sky (AntDesk *self, AntSkyList *sky)
{
  gboolean first = !self->sky;
  ant_sky_list_unref (self->sky);
  self->sky = sky;
  make_ticks (self);
  if (first && sky->n > 0)
    self->sky_selected = 0;
}

static void start (AntDesk *self, gboolean measure);

static void
sky_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntDesk) self = data;
  g_autoptr (GError) error = NULL;
  AntSkyList *sky = ant_sky_list_finish (result, &error);
  if (g_task_get_cancellable (G_TASK (result)) != self->sky_stop)
    {
      ant_sky_list_unref (sky); /* overtaken */
      return;
    }
  g_clear_object (&self->sky_stop);
  if (sky)
    take_sky (self, sky);
  else
    self->sky_said = g_strdup (error->message);
  if (sky && self->sky_wanted && !sky->measured && sky->n > 0)
    start (self, TRUE);
  ant_desk_tell (self, ANT_DESK_SKY);
}

static void
start (AntDesk *self, gboolean measure)
{
  self->sky_stop = g_cancellable_new ();
  ant_sky_list_async (self->layers->record, self->observer, ant_desk_get_settings (self), measure, self->sky_stop, sky_cb, g_object_ref (self));
}

/* Whom the analysis names; where nobody was named, the sky is that of the Earth's centre. */
static const char *
wanted_observer (AntDesk *self)
{
  const char *named = ant_analysis_get_treatment (self->analysis)->observer;
  return named ? named : "earth";
}

gboolean
ant_desk_observer_differs (AntDesk *self)
{
  return !g_str_equal (wanted_observer (self), self->observer->text);
}

static void observer_cb (GObject *source, GAsyncResult *result, gpointer data);

void
ant_desk_follow_sky (AntDesk *self)
{
  ant_desk_drop_sky (self);
  if (!self->layers)
    return;
  if (ant_desk_observer_differs (self))
    ant_observer_task_async (wanted_observer (self), observer_cb, g_object_ref (self));
  else
    start (self, FALSE);
}

void
ant_desk_measure_sky (AntDesk *self)
{
  self->sky_wanted = TRUE;
  if (self->sky && !self->sky->measured && self->sky->n > 0 && !self->sky_stop)
    {
      start (self, TRUE);
      ant_desk_tell (self, ANT_DESK_SKY);
    }
}

/* A table was read, or could not be: then the sky stays that of who watched before. */
static void
observer_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntDesk) self = data;
  g_autoptr (GError) error = NULL;
  AntObserverChoice *choice = ant_observer_task_finish (result, &error);
  if (choice)
    {
      ant_observer_choice_unref (self->observer);
      self->observer = choice;
    }
  if (choice && ant_desk_observer_differs (self))
    {
      AntTreatment *treatment = ant_treatment_copy (ant_analysis_get_treatment (self->analysis));
      g_free (treatment->observer);
      treatment->observer = g_strdup (choice->text);
      ant_desk_change (self, _("Observer"), treatment);
    }
  ant_desk_drop_sky (self);
  if (self->layers)
    start (self, FALSE);
  ant_desk_tell (self, ANT_DESK_SKY);
  if (!choice)
    ant_desk_fail (self, error->message);
}

void
ant_desk_set_observer (AntDesk *self, const char *text)
{
  if (!g_str_equal (text, self->observer->text))
    ant_observer_task_async (text, observer_cb, g_object_ref (self));
}

gsize
ant_desk_get_sky_selected (AntDesk *self)
{
  return self->sky_selected;
}

void
ant_desk_select_sky (AntDesk *self, gsize index)
{
  if (!self->sky || index >= self->sky->n || index == self->sky_selected)
    return;
  const AntSighting *sighting = &self->sky->sighting[index];
  double middle_d = (sighting->start_d + sighting->end_d) / 2, half_d = SURROUNDINGS * (sighting->end_d - sighting->start_d);
  self->sky_selected = index;
  ant_desk_set_view (self, middle_d - half_d, middle_d + half_d);
  ant_desk_tell (self, ANT_DESK_SKY);
}
