/* evidence-outside.c - what almanacs, other instruments, other bands and the orbit say of an event, weighed. */
#include <math.h>
#include "core/transit-curve.h"
#include "core/units.h"
#include "verdict/evidence.h"
#include "verdict/priors.h"

#define NEVER (-40.0)
#define ECLIPSE_TOLERANCE_D (1 / ANT_HOURS_PER_DAY)
#define PREDICTED_SPREAD 0.05 /* of depth and length of a predicted crossing, in ln */
#define DEPTH_SPREAD 0.1      /* of one event's depth in two instruments: shapes and noise models are fitted apart */
#define BAND_SPREAD 1.0       /* of the ratio that an instrument's fault may have, in ln */
#define SPOT_BAND_SPREAD 0.7
#define COLUMN_SHARE 0.3      /* of the instrument's faults show in housekeeping */
#define LEAST_ONSETS 4

static AntEvidence
begin (AntEvidenceKind kind)
{
  return (AntEvidence){ .kind = kind, .number = { NAN, NAN, NAN, NAN } };
}

static double
log_normal (double deviation, double sigma)
{
  return -0.5 * deviation * deviation / (sigma * sigma) - log (sqrt (ANT_TAU) * sigma);
}

static double
add_logs (double a, double b)
{
  double high = fmax (a, b);
  return high + log (exp (a - high) + exp (b - high));
}

/* What knowing a positive number to `spread` in ln is worth against a prior uniform in ln over `range`. */
static double
known_number (double measured, double sigma, double predicted, double spread, double range)
{
  if (!(measured > 0) || !(predicted > 0))
    return 0;
  double relative = fmin (1, fabs (sigma / measured)), total = sqrt (spread * spread + relative * relative);
  return fmax (NEVER, log_normal (log (measured / predicted), total) + log (range));
}

AntPredictedEvent
ant_predicted_nearest (int asked, size_t n, const AntPredictedEvent *event, const AntDip *dip)
{
  AntPredictedEvent nearest = { .asked = asked };
  double least_d = HUGE_VAL;
  for (size_t i = 0; i < n && asked; i++)
    {
      double away_d = fabs (event[i].mid_d - dip->mid_d);
      if (away_d > 1 + 0.5 * event[i].t14_d || away_d >= least_d)
        continue;
      nearest = event[i];
      nearest.asked = nearest.found = 1;
      least_d = away_d;
    }
  return nearest;
}

void
ant_evidence_predicted (const AntPredictedEvent *predicted, double rate_d, const AntDip *dip, AntEvidence *evidence)
{
  *evidence = begin (ANT_EVIDENCE_PREDICTED);
  evidence->number[3] = predicted->asked;
  evidence->weight[ANT_CAUSE_PLANET] = NEVER;
  if (!predicted->asked || !predicted->found)
    return;
  double off_d = dip->mid_d - predicted->mid_d, sigma_d = dip->mid_sigma_d > 0 ? dip->mid_sigma_d : 0;
  evidence->number[0] = off_d * ANT_MINUTES_PER_DAY;
  evidence->number[1] = predicted->depth_ppm;
  evidence->number[2] = predicted->t14_d * ANT_HOURS_PER_DAY;
  double excess_d = fmax (0, fabs (off_d) - predicted->tolerance_d), blur_d = fmax (sigma_d, 0.2 * predicted->tolerance_d);
  double depths = log (ANT_PRIOR_DEPTH_HIGH_PPM / ANT_PRIOR_DEPTH_LOW_PPM);
  const AntPriorRange *lengths = &ant_rival_prior (ANT_RIVAL_CROSSING)->range[0];
  double weight = -log (2 * predicted->tolerance_d * rate_d) - 0.5 * excess_d * excess_d / (blur_d * blur_d)
                  + known_number (dip->depth_ppm, dip->depth_sigma_ppm, predicted->depth_ppm, PREDICTED_SPREAD, depths)
                  + known_number (dip->duration_d, dip->duration_sigma_d > 0 ? dip->duration_sigma_d : 0.1 * dip->duration_d,
                                  predicted->t14_d, PREDICTED_SPREAD, log (lengths->high / lengths->low));
  evidence->weight[ANT_CAUSE_PLANET] = fmax (NEVER, weight);
}

void
ant_evidence_eclipsed (const AntPredictedEvent *predicted, double rate_d, const AntDip *dip, AntEvidence *evidence)
{
  *evidence = begin (ANT_EVIDENCE_ECLIPSED);
  evidence->number[3] = predicted->asked;
  if (!predicted->asked)
    return;
  evidence->weight[ANT_CAUSE_ECLIPSE] = NEVER;
  if (!predicted->found)
    return;
  double off_d = dip->mid_d - predicted->mid_d, reach_d = 0.5 * predicted->t14_d + ECLIPSE_TOLERANCE_D;
  evidence->number[0] = off_d * ANT_MINUTES_PER_DAY;
  if (fabs (off_d) <= reach_d)
    evidence->weight[ANT_CAUSE_ECLIPSE] = -log (2 * reach_d * rate_d);
}

void
ant_evidence_witness (const AntWitnessFact *fact, const AntDip *dip, AntEvidence *evidence)
{
  *evidence = begin (ANT_EVIDENCE_WITNESS);
  evidence->number[3] = fact->looking;
  if (!fact->looking || !(fact->sigma_ppm > 0))
    return;
  double own = dip->depth_sigma_ppm, other = fact->sigma_ppm, rho = fmax (-0.99, fmin (fact->correlation, 0.99));
  double shared = rho * other / own * dip->depth_ppm; /* what a chance excursion of the Sun leaves in the witness */
  double spread = DEPTH_SPREAD * dip->depth_ppm;
  double both = sqrt (fmax (own * own + other * other - 2 * rho * own * other, 1e-4 * other * other) + spread * spread);
  double seen = log_normal (fact->depth_ppm - dip->depth_ppm, both);
  double chance = log_normal (fact->depth_ppm - shared, hypot (other * sqrt (1 - rho * rho), spread));
  double alone = log_normal (fact->depth_ppm, other);
  evidence->number[0] = fact->depth_ppm;
  evidence->number[1] = other;
  evidence->number[2] = rho;
  for (int cause = 0; cause < ANT_N_CAUSES; cause++)
    evidence->weight[cause] = fmax (NEVER, seen - alone);
  evidence->weight[ANT_CAUSE_NOISE] = fmax (NEVER, chance - alone);
  evidence->weight[ANT_CAUSE_INSTRUMENT] = 0;
}

void
ant_evidence_bands (const AntBandFact *fact, double radius_ratio, double impact, AntEvidence *evidence)
{
  *evidence = begin (ANT_EVIDENCE_BANDS);
  double a = fact->depth_ppm[0], b = fact->depth_ppm[1];
  if (!(a > 0) || !(b > 0))
    return;
  double expected = ant_transit_loss (radius_ratio, impact, fact->limb_darkening[0])
                    / ant_transit_loss (radius_ratio, impact, fact->limb_darkening[1]);
  double relative = hypot (fact->sigma_ppm[0] / a, fact->sigma_ppm[1] / b), off = log (a / b / expected);
  evidence->number[0] = a / b;
  evidence->number[1] = a / b * relative;
  evidence->number[2] = expected;
  double crossing = log_normal (off, hypot (relative, 0.02));
  for (int cause = 0; cause < ANT_N_CAUSES; cause++)
    evidence->weight[cause] = log_normal (log (a / b), hypot (relative, BAND_SPREAD));
  evidence->weight[ANT_CAUSE_SPOT] = log_normal (log (a / b), hypot (relative, SPOT_BAND_SPREAD));
  evidence->weight[ANT_CAUSE_PLANET] = evidence->weight[ANT_CAUSE_PLANET_SHAPED] = fmax (NEVER, crossing);
  evidence->weight[ANT_CAUSE_ECLIPSE] = fmax (NEVER, log_normal (off, hypot (relative, 0.1)));
}

void
ant_evidence_column (double significance, size_t tried, size_t index, AntEvidence *evidence)
{
  *evidence = begin (ANT_EVIDENCE_COLUMN);
  evidence->number[0] = significance;
  evidence->number[1] = (double) index;
  double odds = fmin (0.5 * significance * significance, -NEVER) - log (fmax (1, (double) tried));
  evidence->weight[ANT_CAUSE_INSTRUMENT]
    = add_logs (log (1 - COLUMN_SHARE), log (COLUMN_SHARE) + odds - log1p (fabs (significance)));
}

void
ant_evidence_orbit (size_t n, const double *onset_d, double period_d, const AntDip *dip, AntEvidence *evidence)
{
  *evidence = begin (ANT_EVIDENCE_ORBIT);
  if (n < LEAST_ONSETS || !(period_d > 0))
    return;
  double x = 0, y = 0, own = ANT_TAU * (dip->mid_d - 0.5 * dip->duration_d) / period_d;
  for (size_t i = 0; i < n; i++)
    {
      x += cos (ANT_TAU * onset_d[i] / period_d);
      y += sin (ANT_TAU * onset_d[i] / period_d);
    }
  /* Chance that n phases crowd so (Rayleigh 1880), and how far this one is from where they do. */
  double length = hypot (x, y) / (double) n, chance = fmin (1, exp (-(double) n * length * length));
  double off = cos (own - atan2 (y, x));
  evidence->number[0] = own / ANT_TAU - floor (own / ANT_TAU);
  evidence->number[1] = chance;
  if (chance < 0.01)
    evidence->weight[ANT_CAUSE_INSTRUMENT] = off > 0.7 ? fmin (5, -0.5 * log (chance)) : -0.5;
}
