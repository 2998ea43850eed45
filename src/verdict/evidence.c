/* evidence.c - what stands around an event in its own record, weighed. */
#include "verdict/evidence.h"

#include <math.h>
#include "core/units.h"

#define GAP_LEAST_D (5 / ANT_MINUTES_PER_DAY)  /* shorter ones are dropped samples */
#define GAP_AFTER_D (15 / ANT_MINUTES_PER_DAY) /* onsets this soon after a gap belong to it */
#define GAP_SHARE 0.3      /* of the instrument's faults begin with a gap */
#define TWIN_SHARE 0.2     /* of the instrument's faults leave an event of the other sign within reach */
#define TWIN_REACH_D 1.0
#define NEAR_D 2.0         /* local noise is that of this many days on either side */
#define LOUD 1.1           /* scatter from which the noise is called unlike its model */
#define FASTEST_KM_S 437.0 /* escape over root 2: a circular orbit that touches the Sun */

static AntEvidence
begin (AntEvidenceKind kind)
{
  return (AntEvidence){ .kind = kind, .number = { NAN, NAN, NAN, NAN } };
}

/* ln of the odds that a coincidence gives a cause that brings it about in `share` of its cases, when others meet it by
 * `chance`. */
static double
coincidence (int met, double share, double chance)
{
  return met ? log (1 - share + share / fmax (chance, 1e-4)) : log (1 - share);
}

static size_t
gap_places (const AntSeries *series)
{
  double places = ceil (GAP_LEAST_D / series->step_d);
  return places < 2 ? 2 : (size_t) places;
}

void
ant_surroundings_measure (const AntSeries *series, AntSurroundings *facts)
{
  size_t least = gap_places (series), after = (size_t) ceil (GAP_AFTER_D / series->step_d), near = 0, run = 0, follow = 0;
  size_t observed = 0;
  for (size_t i = 0; i < series->n; i++)
    if (isnan (series->value_ppm[i]))
      {
        run++;
        near += run == least ? least : run > least;
      }
    else
      {
        observed++;
        follow = run >= least ? after : follow;
        run = 0;
        near += follow > 0;
        follow -= follow > 0;
      }
  facts->near_gap = series->n ? (double) near / (double) series->n : 0;
  facts->observed_d = (double) observed * series->step_d;
}

void
ant_evidence_gap (const AntSeries *series, const AntSurroundings *facts, const AntDip *dip, AntEvidence *evidence)
{
  *evidence = begin (ANT_EVIDENCE_GAP);
  size_t least = gap_places (series), run = 0;
  double onset = ant_series_place (series, dip->mid_d - 0.5 * dip->duration_d + 0.5 * dip->edge_d);
  double back = ceil (GAP_AFTER_D / series->step_d) + 1;
  double from = fmin (fmax (onset, 0), (double) series->n - 1);
  size_t start = (size_t) from;
  for (size_t i = start; i < series->n && isnan (series->value_ppm[i]) && run < least; i++)
    run++; /* the part of a gap that lies after the onset */
  double since = 0;
  for (size_t i = start; i > 0 && run < least && since <= back; i--, since++)
    run = isnan (series->value_ppm[i - 1]) ? run + 1 : 0;
  int met = run >= least;
  if (met)
    evidence->number[0] = fmax (0, since - (double) least) * series->step_d * ANT_MINUTES_PER_DAY;
  evidence->number[1] = facts->near_gap;
  evidence->weight[ANT_CAUSE_INSTRUMENT] = coincidence (met, GAP_SHARE, facts->near_gap);
}

void
ant_evidence_edges (const AntDip *dip, AntEvidence *evidence)
{
  *evidence = begin (ANT_EVIDENCE_EDGES);
  evidence->number[0] = dip->edges == ANT_EDGES_BOTH || dip->edges == ANT_EDGES_INGRESS;
  evidence->number[1] = dip->edges == ANT_EDGES_BOTH || dip->edges == ANT_EDGES_EGRESS;
}

void
ant_evidence_local_noise (const AntWhitener *whitener, const AntSeries *window, const double *innovation,
                          const AntDip *dip, AntEvidence *evidence)
{
  size_t m = ant_whitener_observed (whitener), n = 0;
  double sum = 0;
  *evidence = begin (ANT_EVIDENCE_LOCAL_NOISE);
  for (size_t i = 0; i < m; i++)
    {
      double away = fabs (ant_series_time (window, ant_whitener_places (whitener)[i]) - dip->mid_d);
      if (away < 0.6 * dip->duration_d || away > 0.5 * dip->duration_d + NEAR_D)
        continue;
      sum += innovation[i] * innovation[i] / ant_whitener_variance (whitener)[i];
      n++;
    }
  if (n < 50)
    return;
  double loud = sqrt (sum / (double) n);
  evidence->number[0] = loud;
  if (loud > LOUD) /* the SNR is that much too high: noise reaches it more easily */
    evidence->weight[ANT_CAUSE_NOISE] = fmin (20, 0.5 * dip->snr * dip->snr * (1 - 1 / (loud * loud)));
}

void
ant_evidence_twin (size_t n, const AntDip *other, const AntSurroundings *facts, const AntDip *dip, AntEvidence *evidence)
{
  double nearest = HUGE_VAL, reach_d = 0.5 * dip->duration_d + TWIN_REACH_D;
  size_t twin = 0;
  *evidence = begin (ANT_EVIDENCE_TWIN);
  for (size_t i = 0; i < n; i++)
    if (fabs (other[i].mid_d - dip->mid_d) < nearest)
      {
        nearest = fabs (other[i].mid_d - dip->mid_d);
        twin = i;
      }
  int met = nearest <= reach_d;
  double chance = fmin (1, ((double) n + 0.5) * 2 * reach_d / fmax (facts->observed_d, 2 * reach_d));
  if (met)
    {
      evidence->number[0] = nearest * ANT_HOURS_PER_DAY;
      evidence->number[1] = other[twin].snr;
    }
  evidence->number[2] = chance;
  evidence->weight[ANT_CAUSE_INSTRUMENT] = coincidence (met, TWIN_SHARE, chance);
}

void
ant_evidence_chord (double t14_d, double impact, double radius_ratio, AntEvidence *evidence)
{
  *evidence = begin (ANT_EVIDENCE_CHORD);
  double along = 2 * sqrt (fmax (0, (1 + radius_ratio) * (1 + radius_ratio) - impact * impact));
  double speed = along * ANT_SUN_RADIUS_KM / (t14_d * ANT_SECONDS_PER_DAY);
  evidence->number[0] = speed;
  evidence->number[1] = radius_ratio;
  if (speed > FASTEST_KM_S)
    {
      double excess = log (speed / FASTEST_KM_S) / 0.25; /* chord and length are known to about a quarter */
      evidence->weight[ANT_CAUSE_PLANET] = evidence->weight[ANT_CAUSE_PLANET_SHAPED] = -fmin (20, 0.5 * excess * excess);
    }
}
