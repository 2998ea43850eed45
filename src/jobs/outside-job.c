/* outside-job.c - predictions and witnesses for every dip, and the verdicts decided anew. */
#include "jobs/outside-job.h"

#include <math.h>

#include "core/units.h"
#include "jobs/sky-job.h"
#include "jobs/witness-job.h"

#define GEOCENTRE_TOLERANCE_D (10 / ANT_MINUTES_PER_DAY) /* a low orbit sees contacts up to 7 min apart from it */
#define KNOWN_TOLERANCE_D (1 / ANT_MINUTES_PER_DAY)

typedef struct
{
  const AntObserverChoice *observer;
  GArray *sightings; /* of AntSighting; NULL: nobody was asked */
} Almanac;

/* The events of a kind. *unsure: one that may or may not happen overlaps the dip. */
static AntPredictedEvent
nearest (const Almanac *almanac, AntSkyKind kind, const AntDip *dip, gboolean *unsure)
{
  AntPredictedEvent best = { .asked = 1 };
  gboolean geocentre = almanac->observer->observer.kind == ANT_OBSERVER_EARTH;
  for (guint i = 0; i < almanac->sightings->len; i++)
    {
      const AntSighting *s = &g_array_index (almanac->sightings, AntSighting, i);
      AntPredictedEvent one = { .asked = 1, .found = 1, .mid_d = 0.5 * (s->start_d + s->end_d), .t14_d = s->end_d - s->start_d,
                                .depth_ppm = s->event.depth_ppm,
                                .tolerance_d = geocentre ? GEOCENTRE_TOLERANCE_D : KNOWN_TOLERANCE_D };
      if (s->event.kind != kind)
        continue;
      if (s->event.possible || s->event.uncertain)
        *unsure = *unsure || (dip->mid_d > s->start_d - 0.5 * dip->duration_d && dip->mid_d < s->end_d + 0.5 * dip->duration_d);
      else
        {
          AntPredictedEvent near = ant_predicted_nearest (1, 1, &one, dip);
          if (near.found && (!best.found || fabs (near.mid_d - dip->mid_d) < fabs (best.mid_d - dip->mid_d)))
            best = near;
        }
    }
  return best;
}

static void
add_predictions (const Almanac *almanac, const AntCauseRates *rates, const AntDip *dip, AntVerdict *verdict)
{
  AntEvidence evidence;
  gboolean unsure = FALSE, unsure_eclipse = FALSE;
  AntPredictedEvent crossing = nearest (almanac, ANT_SKY_CROSSING, dip, &unsure);
  AntPredictedEvent eclipse = nearest (almanac, ANT_SKY_ECLIPSE, dip, &unsure_eclipse);
  crossing.asked = !unsure;
  ant_evidence_predicted (&crossing, rates->per_year[ANT_CAUSE_PLANET] / 365.25, dip, &evidence);
  ant_verdict_add (verdict, &evidence);
  /* The Moon is so near that an eclipse missing at the Earth's centre says nothing of one elsewhere. */
  eclipse.asked = !unsure_eclipse && (eclipse.found || almanac->observer->observer.kind != ANT_OBSERVER_EARTH);
  ant_evidence_eclipsed (&eclipse, rates->per_year[ANT_CAUSE_ECLIPSE] / 365.25, dip, &evidence);
  ant_verdict_add (verdict, &evidence);
}

static void
add_witnesses (const GPtrArray *witnesses, const AntSettings *settings, const AntDip *dip, AntVerdict *verdict)
{
  AntWitnessFact best = { 0 };
  for (guint i = 0; i < witnesses->len; i++)
    {
      AntWitnessFact fact = { 0 };
      ant_witness_job_fact (g_ptr_array_index (witnesses, i), settings, dip, &fact);
      if (fact.looking && (!best.looking || fact.sigma_ppm < best.sigma_ppm))
        best = fact;
    }
  AntEvidence evidence;
  ant_evidence_witness (&best, dip, &evidence);
  ant_verdict_add (verdict, &evidence);
}

/* What is asked, and under which settings the answers count. */
typedef struct
{
  Almanac almanac;
  const GPtrArray *witnesses; /* of AntComparison; NULL: none */
  const AntSettings *settings;
  AntVerdictOptions options;
} Outside;

static gboolean
outside_init (Outside *outside, AntRecord *record, const AntSettings *settings, const AntObserverChoice *observer,
              const GPtrArray *witnesses, GCancellable *cancellable, GError **error)
{
  AntSurroundings around;
  ant_surroundings_measure (&record->series, &around);
  *outside = (Outside) { .almanac = { observer, NULL }, .witnesses = witnesses, .settings = settings,
                         .options = ant_verdict_input_of (record, settings).options };
  outside->options.observed_d = around.observed_d;
  if (observer)
    outside->almanac.sightings = ant_sky_job_sightings (record, observer, settings, cancellable, error);
  return !observer || outside->almanac.sightings;
}

static void
judge_again (const Outside *outside, gsize n, const AntDip *dip, AntVerdict *verdict)
{
  for (gsize i = 0; i < n && verdict; i++)
    {
      if (outside->almanac.sightings && !outside->options.target_star && verdict[i].sign > 0)
        add_predictions (&outside->almanac, &outside->options.rates, &dip[i], &verdict[i]);
      if (outside->witnesses && outside->witnesses->len)
        add_witnesses (outside->witnesses, outside->settings, &dip[i], &verdict[i]);
      ant_verdict_decide (&verdict[i], &dip[i], &outside->options);
    }
}

gboolean
ant_outside_job_run (AntScanResults *results, const AntObserverChoice *observer, const GPtrArray *witnesses, GCancellable *cancellable,
                     GError **error)
{
  Outside outside;
  if (!results->dip_verdict && !results->brightening_verdict)
    return TRUE;
  if (!outside_init (&outside, results->record, &results->settings, observer, witnesses, cancellable, error))
    return FALSE;
  judge_again (&outside, results->n_dips, results->dip, results->dip_verdict);
  judge_again (&outside, results->n_brightenings, results->brightening, results->brightening_verdict);
  g_clear_pointer (&outside.almanac.sightings, g_array_unref);
  return TRUE;
}

gboolean
ant_outside_job_ask (AntRecord *record, const AntSettings *settings, const AntObserverChoice *observer, const GPtrArray *witnesses,
                     const AntDip *dip, AntVerdict *verdict, GCancellable *cancellable, GError **error)
{
  Outside outside;
  if (!outside_init (&outside, record, settings, observer, witnesses, cancellable, error))
    return FALSE;
  judge_again (&outside, 1, dip, verdict);
  g_clear_pointer (&outside.almanac.sightings, g_array_unref);
  return TRUE;
}
