/* verdict.c - rival shapes and evidence put together into probabilities. */
#include "verdict/verdict.h"

#include <math.h>
#include <string.h>

AntStatus
ant_verdict_compare (const AntRivalBench *bench, const AntDip *dip, const AntStop *stop, AntVerdict *verdict)
{
  verdict->sign = bench->sign;
  verdict->chi2_of_nothing = ant_rival_chi2_of_nothing (bench, dip);
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    {
      if (ant_stop_asked (stop))
        return ANT_STOPPED;
      AntStatus status = ant_rival_fit (bench, dip, (AntRivalKind) kind, &verdict->rival[kind]);
      if (status && status != ANT_NO_DATA)
        return status;
    }
  const AntRivalFit *crossing = &verdict->rival[ANT_RIVAL_CROSSING];
  if (crossing->fitted)
    {
      AntEvidence chord;
      ant_evidence_chord (crossing->mean[1], crossing->mean[2], crossing->mean[3], &chord);
      ant_verdict_add (verdict, &chord);
    }
  return ANT_OK;
}

void
ant_verdict_add (AntVerdict *verdict, const AntEvidence *evidence)
{
  for (size_t i = 0; i < verdict->n_evidence; i++)
    if (verdict->evidence[i].kind == evidence->kind)
      {
        verdict->evidence[i] = *evidence;
        return;
      }
  verdict->evidence[verdict->n_evidence++] = *evidence;
}

const AntEvidence *
ant_verdict_evidence (const AntVerdict *verdict, AntEvidenceKind kind)
{
  for (size_t i = 0; i < verdict->n_evidence; i++)
    if (verdict->evidence[i].kind == kind)
      return &verdict->evidence[i];
  return NULL;
}

/* ln odds of a rival with a rate of 1 a day and all of its cause's share. */
static double
log_evidence (const AntVerdict *verdict, AntRivalKind kind)
{
  const AntRivalFit *rival = &verdict->rival[kind];
  double share = ant_rival_prior (kind)->share[verdict->sign < 0];
  return rival->fitted && share > 0 ? rival->log_evidence + log (share) : -HUGE_VAL;
}

/* Noise: a dip like the best plain one of this SNR comes from a cause of rate r a day in r T p(snr) records, p the density
 * that depths uniform in ln have, and from noise in -dN/dsnr, N the expected number of false dips (a Gaussian's tail:
 * N snr). So noise stands to that cause's evidence as these two do. */
static double
log_noise (const AntVerdict *verdict, const AntDip *dip, double observed_d)
{
  const AntRivalFit *plain = &verdict->rival[ANT_RIVAL_TRAPEZOID];
  double snr = fabs (dip->snr), range = log (ANT_PRIOR_DEPTH_HIGH_PPM / ANT_PRIOR_DEPTH_LOW_PPM);
  if (!(dip->expected_false >= 0) || !plain->fitted || !(observed_d > 0))
    return 0; /* an asked dip: nothing, and no trials */
  double density = fmax (dip->expected_false, 1e-300) * snr;
  return plain->log_evidence + log (density) - log (observed_d / (snr * range));
}

/* exp (x - highest), made to add up to 1. */
static void
normalise (size_t n, double *x)
{
  double highest = -HUGE_VAL, sum = 0;
  for (size_t i = 0; i < n; i++)
    highest = fmax (highest, x[i]);
  for (size_t i = 0; i < n; i++)
    sum += x[i] = exp (x[i] - highest);
  for (size_t i = 0; i < n; i++)
    x[i] /= sum;
}

static AntCause
likeliest (const double probability[ANT_N_CAUSES])
{
  AntCause best = ANT_CAUSE_PLANET;
  for (int cause = 1; cause < ANT_N_CAUSES; cause++)
    if (probability[cause] > probability[best])
      best = (AntCause) cause;
  return best;
}

/* What the shape alone says; a crossing is a planet's, and its chord is part of its shape. */
static void
decide_shape (AntVerdict *verdict, const AntCauseRates *rates, double noise)
{
  double *p = verdict->rival_probability;
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    p[kind] = log_evidence (verdict, (AntRivalKind) kind)
              + log (rates->per_year[ant_rival_prior ((AntRivalKind) kind)->cause[verdict->sign < 0]] / 365.25);
  const AntEvidence *chord = ant_verdict_evidence (verdict, ANT_EVIDENCE_CHORD);
  p[ANT_RIVAL_CROSSING] += chord ? chord->weight[ANT_CAUSE_PLANET] : 0;
  p[ANT_N_RIVALS] = noise;
  normalise (ANT_N_RIVALS + 1, p);
  memset (verdict->shape_probability, 0, sizeof verdict->shape_probability);
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    verdict->shape_probability[ant_rival_prior ((AntRivalKind) kind)->cause[verdict->sign < 0]] += p[kind];
  verdict->shape_probability[ANT_CAUSE_NOISE] = p[ANT_N_RIVALS];
  verdict->shape = likeliest (verdict->shape_probability);
}

static double
add_logs (double a, double b)
{
  double high = fmax (a, b);
  return isfinite (high) ? high + log (exp (a - high) + exp (b - high)) : high;
}

/* All evidence: on the Sun a crossing is a planet's if it was predicted, else planet-shaped. */
static void
decide_cause (AntVerdict *verdict, const AntVerdictOptions *options, double noise)
{
  double *p = verdict->probability;
  const double *rate = options->rates.per_year;
  for (int cause = 0; cause < ANT_N_CAUSES; cause++)
    p[cause] = -HUGE_VAL;
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    {
      AntCause cause = ant_rival_prior ((AntRivalKind) kind)->cause[verdict->sign < 0];
      p[cause] = add_logs (p[cause], log_evidence (verdict, (AntRivalKind) kind) + log (rate[cause] / 365.25));
    }
  p[ANT_CAUSE_NOISE] = noise;
  if (!options->target_star)
    p[ANT_CAUSE_PLANET_SHAPED] = p[ANT_CAUSE_PLANET] + log (rate[ANT_CAUSE_PLANET_SHAPED] / rate[ANT_CAUSE_PLANET]);
  for (size_t i = 0; i < verdict->n_evidence; i++)
    for (int cause = 0; cause < ANT_N_CAUSES && verdict->evidence[i].kind != ANT_EVIDENCE_CHANCE; cause++)
      p[cause] += verdict->evidence[i].weight[cause];
  normalise (ANT_N_CAUSES, p);
  verdict->cause = likeliest (p);
}

void
ant_verdict_decide (AntVerdict *verdict, const AntDip *dip, const AntVerdictOptions *options)
{
  double noise = log_noise (verdict, dip, options->observed_d), best = -HUGE_VAL;
  AntEvidence chance = { .kind = ANT_EVIDENCE_CHANCE, .number = { dip->expected_false, NAN, NAN, NAN } };
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    best = fmax (best, log_evidence (verdict, (AntRivalKind) kind)
                         + log (options->rates.per_year[ant_rival_prior ((AntRivalKind) kind)->cause[verdict->sign < 0]]
                                / 365.25));
  chance.weight[ANT_CAUSE_NOISE] = isfinite (best) ? noise - best : 0;
  ant_verdict_add (verdict, &chance);
  decide_shape (verdict, &options->rates, noise);
  decide_cause (verdict, options, noise);
}

AntCause
ant_verdict_named (const AntVerdict *verdict, AntCause cause, double probability)
{
  const AntEvidence *edges = ant_verdict_evidence (verdict, ANT_EVIDENCE_EDGES);
  const AntEvidence *predicted = ant_verdict_evidence (verdict, ANT_EVIDENCE_PREDICTED);
  int whole = !edges || (edges->number[0] > 0 && edges->number[1] > 0);
  int expected = cause == ANT_CAUSE_PLANET && predicted && !isnan (predicted->number[0]);
  int crossing = cause == ANT_CAUSE_PLANET || cause == ANT_CAUSE_PLANET_SHAPED;
  double least = crossing && !whole && !expected ? ANT_VERDICT_LEAST_HALF_SEEN : ANT_VERDICT_LEAST;
  return probability >= least ? cause : ANT_N_CAUSES;
}
