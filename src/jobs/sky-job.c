/* sky-job.c - one lane to the sky, and what a record shows of its events. */
#include "jobs/sky-job.h"

#include <glib/gi18n.h>
#include <math.h>
#include <stdlib.h>

#include "data/error.h"
#include "data/scan-results.h"
#include "data/sky-words.h"

G_LOCK_DEFINE_STATIC (lane);

static AntSkyOptions
options_of (const AntObserverChoice *choice, const AntSettings *settings, const AntStop *stop)
{
  return (AntSkyOptions) { &choice->observer, (AntRadiiSet) settings->radii, settings->bank.limb_darkening, stop };
}

static void
ask_stop (GCancellable *cancellable, gpointer stop)
{
  ant_stop_ask (stop);
}

GArray *
ant_sky_job_predict (const AntObserverChoice *choice, const AntSettings *settings, double from_tt_d, double to_tt_d,
                     GCancellable *cancellable, GError **error)
{
  AntStop stop = { 0 };
  AntSkyOptions options = options_of (choice, settings, &stop);
  AntSkyEvent *event = NULL;
  gsize n = 0;
  if (!ant_sky_span_check (choice, from_tt_d, to_tt_d, error))
    return NULL;
  gulong handler = cancellable ? g_cancellable_connect (cancellable, G_CALLBACK (ask_stop), &stop, NULL) : 0;
  G_LOCK (lane);
  AntStatus status = ant_sky_events (&options, from_tt_d, to_tt_d, &n, &event);
  G_UNLOCK (lane);
  if (cancellable)
    g_cancellable_disconnect (cancellable, handler);
  if (!ant_status_to_error (status, _("predicting crossings"), error))
    return NULL;
  GArray *events = g_array_sized_new (FALSE, FALSE, sizeof (AntSkyEvent), (guint) n);
  if (n > 0)
    g_array_append_vals (events, event, (guint) n);
  free (event);
  return events;
}

/* The record's time 0 in TT, told apart from every way of not having it. */
static gboolean
origin_of (const AntRecord *record, double *origin_tt_d, GError **error)
{
  *origin_tt_d = ant_time_reference_tt_origin (&record->time);
  if (isfinite (*origin_tt_d))
    return TRUE;
  g_set_error (error, ANT_ERROR, ANT_ERROR_NUMERIC,
               _("%s: the origin of its times is not known, so the sky over it is not"), record->path);
  return FALSE;
}

GArray *
ant_sky_job_sightings (const AntRecord *record, const AntObserverChoice *choice, const AntSettings *settings,
                       GCancellable *cancellable, GError **error)
{
  double origin, first, last;
  if (!origin_of (record, &origin, error))
    return NULL;
  const AntSeries *series = &record->series;
  double from = origin + series->start_d, to = from + ((double) series->n - 1) * series->step_d;
  ant_observer_span (&choice->observer, &first, &last);
  if (MAX (from, first) <= MIN (to, last))
    {
      from = MAX (from, first);
      to = MIN (to, last);
    }
  g_autoptr (GArray) events = ant_sky_job_predict (choice, settings, from, to, cancellable, error);
  if (!events)
    return NULL;
  GArray *sightings = g_array_sized_new (FALSE, FALSE, sizeof (AntSighting), events->len);
  for (guint i = 0; i < events->len; i++)
    {
      AntSighting sighting = ant_sighting_new (&g_array_index (events, AntSkyEvent, i), origin);
      g_array_append_val (sightings, sighting);
    }
  return sightings;
}

gboolean
ant_sky_job_curve (const AntObserverChoice *choice, const AntSettings *settings, const AntSkyEvent *event, AntSkyCurve *curve,
                   GError **error)
{
  AntSkyOptions options = options_of (choice, settings, NULL);
  G_LOCK (lane);
  AntStatus status = ant_sky_curve_init (curve, &options, event);
  G_UNLOCK (lane);
  return ant_status_to_error (status, _("predicting a crossing's light"), error);
}

gboolean
ant_sky_job_path (const AntObserverChoice *choice, const AntSettings *settings, const AntSkyEvent *event, gsize n,
                  double *east, double *north, GError **error)
{
  AntWatch watch;
  AntLook look;
  AntStatus status = ANT_OK;
  double step_d = (event->end_tt_d - event->start_tt_d) / (double) (n - 1);
  ant_watch_init (&watch, event->body, &choice->observer, (AntRadiiSet) settings->radii);
  G_LOCK (lane);
  for (gsize i = 0; i < n && !status; i++)
    {
      status = ant_watch_look (&watch, MIN (event->start_tt_d + (double) i * step_d, event->end_tt_d), &look);
      if (status)
        break;
      east[i] = look.east / look.sun_radius;
      north[i] = look.north / look.sun_radius;
    }
  G_UNLOCK (lane);
  return ant_status_to_error (status, _("following a body before the Sun"), error);
}

gboolean
ant_sky_job_measure (const AntRecord *record, const AntObserverChoice *choice, const AntSettings *settings,
                     AntSighting *sighting, GError **error)
{
  AntSkyCurve curve;
  double origin;
  gssize first;
  if (!(sighting->event.depth_ppm > 0))
    {
      sighting->shown = ANT_SHOWN_UNPLACED;
      return TRUE;
    }
  if (!origin_of (record, &origin, error) || !ant_sky_job_curve (choice, settings, &sighting->event, &curve, error))
    return FALSE;
  g_autoptr (GArray) shape = ant_sighting_shape (record, &curve, origin, &first);
  sighting->expected_ppm = 1e6 * curve.greatest;
  ant_sky_curve_clear (&curve);
  sighting->expected_sample_ppm = 0;
  for (guint i = 0; i < shape->len; i++)
    sighting->expected_sample_ppm = MAX (sighting->expected_sample_ppm, sighting->expected_ppm * g_array_index (shape, double, i));
  AntShown unseen = ant_sighting_is_dark (record, sighting) ? ANT_SHOWN_DARK : ANT_SHOWN_GAP;
  if (sighting->event.kind == ANT_SKY_SHADOW || shape->len == 0)
    {
      sighting->shown = unseen;
      return TRUE;
    }
  AntScanOptions options = ant_scan_results_options (record, settings);
  AntStatus status = ant_scan_asked_shape (&record->series, &options, first, shape->len, (const double *) (gconstpointer) shape->data,
                                           &sighting->measured);
  if (status == ANT_NO_DATA)
    {
      sighting->shown = unseen;
      return TRUE;
    }
  if (!ant_status_to_error (status, _("measuring a predicted crossing"), error))
    return FALSE;
  sighting->shown = sighting->event.uncertain ? ANT_SHOWN_UNPLACED : ant_sighting_judge (sighting);
  return TRUE;
}
