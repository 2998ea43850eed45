/* verdict-job.c - the stages of verdicts over the pool, the almanac asked before. */
#include "jobs/verdict-job.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "data/error.h"
#include "jobs/sky-job.h"

/* How far a prediction for the Earth's centre may be off for who circles it: Venus's parallax at a low orbit is some 7 min. */
#define EARTH_TOLERANCE_D (10 / ANT_MINUTES_PER_DAY)
#define PLACED_TOLERANCE_D (1 / ANT_MINUTES_PER_DAY)

typedef struct
{
  gboolean asked;
  GArray *crossings, *eclipses; /* of AntPredictedEvent */
} Almanac;

/* Whether the observer's place is known over the whole record: only then does it mean something that nothing was predicted. */
static gboolean
is_placed (const AntRecord *record, const AntObserverChoice *choice)
{
  double first, last, origin = ant_time_reference_tt_origin (&record->time);
  if (!choice || choice->observer.kind == ANT_OBSERVER_L1)
    return FALSE;
  ant_observer_span (&choice->observer, &first, &last);
  return origin + record->series.start_d >= first
         && origin + ant_series_time (&record->series, (double) record->series.n - 1) <= last; /* also refuses NaN */
}

static gboolean
ask (const AntScanResults *results, const AntObserverChoice *choice, Almanac *almanac, GCancellable *cancellable, GError **error)
{
  almanac->crossings = g_array_new (FALSE, FALSE, sizeof (AntPredictedEvent));
  almanac->eclipses = g_array_new (FALSE, FALSE, sizeof (AntPredictedEvent));
  almanac->asked = is_placed (results->record, choice);
  if (!almanac->asked)
    return TRUE;
  g_autoptr (GArray) sightings = ant_sky_job_sightings (results->record, choice, &results->settings, cancellable, error);
  for (guint i = 0; sightings && i < sightings->len; i++)
    {
      const AntSighting *sighting = &g_array_index (sightings, AntSighting, i);
      AntPredictedEvent event = { .mid_d = (sighting->start_d + sighting->end_d) / 2,
                                  .t14_d = sighting->end_d - sighting->start_d, .depth_ppm = sighting->event.depth_ppm,
                                  .tolerance_d = choice->observer.kind == ANT_OBSERVER_EARTH ? EARTH_TOLERANCE_D
                                                                                            : PLACED_TOLERANCE_D };
      g_array_append_val (sighting->event.kind == ANT_SKY_CROSSING ? almanac->crossings : almanac->eclipses, event);
    }
  return sightings != NULL;
}

static void
almanac_clear (Almanac *almanac)
{
  g_array_unref (almanac->crossings);
  g_array_unref (almanac->eclipses);
}

gboolean
ant_verdict_job_run (AntScanResults *results, const AntObserverChoice *choice, GCancellable *cancellable,
                     AntProgressFunc progress, gpointer data, GError **error)
{
  AntStatus status;
  Almanac almanac = { 0 };
  if (!ask (results, choice, &almanac, cancellable, error))
    {
      almanac_clear (&almanac);
      return FALSE;
    }
  AntVerdictInput input = ant_scan_results_verdict_input (results);
  input.almanac = almanac.asked;
  input.n_crossings = almanac.crossings->len;
  input.crossing = (const AntPredictedEvent *) (gconstpointer) almanac.crossings->data;
  input.n_eclipses = almanac.eclipses->len;
  input.eclipse = (const AntPredictedEvent *) (gconstpointer) almanac.eclipses->data;
  AntVerdictWork *work = ant_verdict_work_new (&input, &status);
  if (work)
    status = ant_pool_run (ant_verdict_work_stages (), work, (guint) results->settings.threads, cancellable, progress, data);
  gboolean done = ant_status_to_error (status, _("judging dips"), error);
  if (done)
    ant_scan_results_add_verdicts (results, work);
  ant_verdict_work_free (work);
  almanac_clear (&almanac);
  return done;
}
