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

static void
judge_again (AntScanResults *results, const Almanac *almanac, const GPtrArray *witnesses, gsize n, const AntDip *dip, AntVerdict *verdict)
{
  AntVerdictInput input = ant_scan_results_verdict_input (results);
  AntSurroundings around;
  ant_surroundings_measure (input.series, &around);
  input.options.observed_d = around.observed_d;
  for (gsize i = 0; i < n; i++)
    {
      if (almanac->sightings && !input.options.target_star && verdict[i].sign > 0)
        add_predictions (almanac, &input.options.rates, &dip[i], &verdict[i]);
      if (witnesses && witnesses->len)
        add_witnesses (witnesses, &results->settings, &dip[i], &verdict[i]);
      ant_verdict_decide (&verdict[i], &dip[i], &input.options);
    }
}

gboolean
ant_outside_job_run (AntScanResults *results, const AntObserverChoice *observer, const GPtrArray *witnesses, GCancellable *cancellable,
                     GError **error)
{
  g_autoptr (GArray) sightings = NULL;
  if (!results->dip_verdict && !results->brightening_verdict)
    return TRUE;
  if (observer)
    sightings = ant_sky_job_sightings (results->record, observer, &results->settings, cancellable, error);
  if (observer && !sightings)
    return FALSE;
  Almanac almanac = { observer, sightings };
  judge_again (results, &almanac, witnesses, results->dip_verdict ? results->n_dips : 0, results->dip, results->dip_verdict);
  judge_again (results, &almanac, witnesses, results->brightening_verdict ? results->n_brightenings : 0, results->brightening,
               results->brightening_verdict);
  return TRUE;
}
