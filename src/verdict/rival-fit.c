/* rival-fit.c - the likelihood of a rival shape on its prior's unit cube, where to start on it, and what comes out. */
#include "verdict/rival-fit.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/units.h"
#include "verdict/crossing-fit.h"
#include "verdict/evidence-integral.h"
#include "verdict/rival-start.h"

#define CROSSING_SAMPLES 1024 /* what is quoted of a crossing rests on them */
#define MOST_WIDER 1.5        /* the posterior than the likelihood's peak, or off it in its sigma */

typedef struct
{
  const AntRivalBench *bench;
  const AntRivalPrior *prior;
  AntRivalKind kind;
  double epoch_low_d, epoch_high_d;
} Cube;

/* Share of a crossing's or trapezoid's length that one edge takes; 0 for the others. */
static double
edge_share (AntRivalKind kind, const double *parameter)
{
  AntCrossing crossing = { .radius_ratio = parameter[3], .impact = parameter[2], .t14_d = 1 };
  return kind == ANT_RIVAL_CROSSING ? ant_crossing_ingress_d (&crossing) : kind == ANT_RIVAL_TRAPEZOID ? parameter[2] : 0;
}

static void
from_cube (const Cube *cube, const double *u, double *parameter)
{
  parameter[0] = cube->epoch_low_d + u[0] * (cube->epoch_high_d - cube->epoch_low_d);
  for (size_t i = 0; i < cube->prior->n; i++)
    {
      const AntPriorRange *range = &cube->prior->range[i];
      parameter[i + 1] = range->logarithmic ? range->low * pow (range->high / range->low, u[i + 1])
                                            : range->low + u[i + 1] * (range->high - range->low);
    }
  if (cube->prior->n > 1)
    parameter[1] /= 1 - edge_share (cube->kind, parameter);
}

/* Kept off the faces, so that a start is always inside. */
static void
to_cube (const Cube *cube, const double *parameter, double *u)
{
  u[0] = (parameter[0] - cube->epoch_low_d) / (cube->epoch_high_d - cube->epoch_low_d);
  for (size_t i = 0; i < cube->prior->n; i++)
    {
      const AntPriorRange *range = &cube->prior->range[i];
      double value = i == 0 ? parameter[1] * (1 - edge_share (cube->kind, parameter)) : parameter[i + 1];
      u[i + 1] = range->logarithmic ? log (value / range->low) / log (range->high / range->low)
                                    : (value - range->low) / (range->high - range->low);
    }
  for (size_t i = 0; i <= cube->prior->n; i++)
    u[i] = fmax (0.002, fmin (u[i], 0.998));
}

static int
inside (size_t n, const double *u)
{
  for (size_t i = 0; i < n; i++)
    if (!(u[i] > 0 && u[i] < 1))
      return 0;
  return 1;
}

/* Samples of a curve as the shape that an event of this sign adds to the record, into one lane. */
static void
draw (const AntRivalBench *bench, const AntRivalCurve *curve, ptrdiff_t base, ptrdiff_t first, ptrdiff_t last,
      size_t lane)
{
  if (first <= last)
    ant_rival_curve_sample (curve, ant_series_time (&bench->window, (double) first), bench->window.step_d,
                            bench->exposure_d, -bench->sign, (size_t) (last - first) + 1, ANT_LANES,
                            bench->buffer + (size_t) (first - base) * ANT_LANES + lane);
}

/* Moments s'z and energies s'Cinv s of up to ANT_LANES curves; energy 0 where a curve is not drawn (`drawn` 0). */
static void
project (const AntRivalBench *bench, size_t n, const AntRivalCurve *curve, const int *drawn, double *energy,
         double *moment)
{
  double weight[ANT_LANES];
  ptrdiff_t first[ANT_LANES], last[ANT_LANES], base = PTRDIFF_MAX, end = -1, places = (ptrdiff_t) bench->window.n;
  for (size_t i = 0; i < n; i++)
    if (drawn[i])
      {
        double from = ant_series_place (&bench->window, curve[i].from_d - 0.5 * bench->exposure_d);
        double to = ant_series_place (&bench->window, curve[i].to_d + 0.5 * bench->exposure_d);
        first[i] = (ptrdiff_t) fmax (0, fmin (ceil (from), (double) places));
        last[i] = (ptrdiff_t) fmax (-1, fmin (floor (to), (double) places - 1));
        base = first[i] < base ? first[i] : base;
        end = last[i] > end ? last[i] : end;
      }
  memset (energy, 0, ANT_LANES * sizeof *energy);
  memset (moment, 0, ANT_LANES * sizeof *moment);
  if (end < base)
    return;
  memset (bench->buffer, 0, (size_t) (end - base + 1) * ANT_LANES * sizeof *bench->buffer);
  for (size_t i = 0; i < n; i++)
    if (drawn[i])
      draw (bench, &curve[i], base, first[i], last[i], i);
  ant_whitener_energies (bench->whitener, bench->z, base, (size_t) (end - base + 1), bench->buffer, energy, moment,
                         weight);
}

/* ln of the likelihood gain with a free depth integrated out under its prior. */
static double
log_free_depth (double moment, double energy, int either_sign)
{
  double depth = moment / energy, sigma = 1 / sqrt (energy);
  if (depth <= 0 && !either_sign)
    return -HUGE_VAL;
  double range = log (ANT_PRIOR_DEPTH_HIGH_PPM / ANT_PRIOR_DEPTH_LOW_PPM) * (either_sign ? 2 : 1);
  return 0.5 * moment * depth + log (sqrt (ANT_TAU) * sigma / (fmax (fabs (depth), sigma) * range));
}

static double
log_tied_depth (double moment, double energy, double depth)
{
  return depth * moment - 0.5 * depth * depth * energy;
}

static void
log_likelihoods (void *data, size_t n, const double *u, double *value)
{
  const Cube *cube = data;
  const AntRivalBench *bench = cube->bench;
  size_t dimensions = cube->prior->n + 1;
  AntRivalCurve curve[ANT_LANES];
  double parameter[ANT_RIVAL_PARAMETERS] = { 0 }, energy[ANT_LANES], moment[ANT_LANES];
  int drawn[ANT_LANES] = { 0 };
  for (size_t i = 0; i < n; i++)
    if (inside (dimensions, u + i * dimensions))
      {
        from_cube (cube, u + i * dimensions, parameter);
        ant_rival_curve_init (&curve[i], cube->kind, parameter, bench->limb_darkening, &bench->eclipse);
        drawn[i] = 1;
      }
  project (bench, n, curve, drawn, energy, moment);
  for (size_t i = 0; i < n; i++)
    value[i] = !drawn[i] || !(energy[i] > 0) ? -HUGE_VAL
               : cube->kind == ANT_RIVAL_CROSSING
                 ? log_tied_depth (moment[i], energy[i], curve[i].tied_depth_ppm)
                 : log_free_depth (moment[i], energy[i], cube->prior->either_sign);
}

/* Innovations of the window less depth times the curve (NULL: nothing), squared over their variance, per sample around the dip. */
static double
chi2_around (const AntRivalBench *bench, const AntDip *dip, const AntRivalCurve *curve, double depth_ppm)
{
  size_t m = ant_whitener_observed (bench->whitener), n = 0;
  const unsigned *place = ant_whitener_places (bench->whitener);
  const double *variance = ant_whitener_variance (bench->whitener);
  float *value = malloc (bench->window.n * sizeof *value);
  double *innovation = malloc (m * sizeof *innovation), sum = 0;
  if (!value || !innovation)
    n = 0, m = 0;
  else
    memcpy (value, bench->window.value_ppm, bench->window.n * sizeof *value);
  for (size_t i = 0; i < m && curve; i++)
    value[place[i]] += (float) (depth_ppm * ant_rival_curve_mean (curve, ant_series_time (&bench->window, (double) place[i]),
                                                                  bench->exposure_d));
  if (m)
    {
      double level = ant_whitener_level (bench->whitener, value);
      for (size_t i = 0; i < m; i++)
        value[place[i]] -= (float) level;
      ant_whitener_innovations (bench->whitener, value, innovation);
    }
  for (size_t i = 0; i < m; i++)
    if (fabs (ant_series_time (&bench->window, (double) place[i]) - dip->mid_d) <= 1.5 * dip->duration_d)
      {
        sum += innovation[i] * innovation[i] / variance[i];
        n++;
      }
  free (value);
  free (innovation);
  return n ? sum / (double) n : NAN;
}

double
ant_rival_chi2_of_nothing (const AntRivalBench *bench, const AntDip *dip)
{
  return chi2_around (bench, dip, NULL, 0);
}

/* What is quoted: the parameters, logarithms where the prior has them, and a crossing's depth, whose prior is flat here: one
 * uniform in ln pulls a depth of few sigma down. */
static double
tell_quantities (void *data, const double *u, double *quantity)
{
  const Cube *cube = data;
  double parameter[ANT_RIVAL_PARAMETERS] = { 0 };
  from_cube (cube, u, parameter);
  for (size_t i = 0; i <= cube->prior->n; i++)
    quantity[i] = i > 0 && cube->prior->range[i - 1].logarithmic ? log (parameter[i]) : parameter[i];
  if (cube->kind != ANT_RIVAL_CROSSING)
    return 0;
  quantity[4] = ant_transit_loss (parameter[3], parameter[2], cube->bench->limb_darkening) / ANT_PPM;
  return log (quantity[4]);
}

/* A crossing measured so well that its likelihood alone tells its numbers is quoted by that; not where the posterior of the impact has
 * room elsewhere, for there the peak's curvature says too little. */
static void
quote_likeliest (const AntRivalBench *bench, AntRivalFit *fit)
{
  double value[ANT_CROSSING_QUANTITIES], sigma[ANT_CROSSING_QUANTITIES];
  if (ant_crossing_fit (bench, fit->parameter, value, sigma))
    return;
  if (fit->sigma[2] > MOST_WIDER * sigma[ANT_CROSSING_IMPACT]
      || fabs (fit->mean[2] - value[ANT_CROSSING_IMPACT]) > MOST_WIDER * sigma[ANT_CROSSING_IMPACT])
    return;
  for (size_t i = 0; i < ANT_RIVAL_PARAMETERS; i++)
    {
      fit->mean[i] = i == ANT_CROSSING_T14 || i == ANT_CROSSING_RADIUS ? exp (value[i]) : value[i];
      fit->sigma[i] = sigma[i];
    }
  fit->depth_ppm = bench->sign * value[ANT_CROSSING_DEPTH];
  fit->depth_sigma_ppm = sigma[ANT_CROSSING_DEPTH];
}

/* The best parameters, their spread, and the depth there. */
static void
describe (const Cube *cube, const AntDip *dip, const AntIntegral *integral, AntRivalFit *fit)
{
  const AntRivalBench *bench = cube->bench;
  AntRivalCurve curve;
  double energy[ANT_LANES], moment[ANT_LANES], unit_d = cube->epoch_high_d - cube->epoch_low_d;
  int drawn = 1;
  from_cube (cube, integral->best, fit->parameter);
  for (size_t i = 0; i <= cube->prior->n; i++)
    {
      fit->mean[i] = i > 0 && cube->prior->range[i - 1].logarithmic ? exp (integral->median[i]) : integral->median[i];
      fit->sigma[i] = integral->half_width[i];
    }
  ant_rival_curve_init (&curve, fit->kind, fit->parameter, bench->limb_darkening, &bench->eclipse);
  project (bench, 1, &curve, &drawn, energy, moment);
  int tied = fit->kind == ANT_RIVAL_CROSSING;
  double best = tied ? curve.tied_depth_ppm : moment[0] / energy[0];
  fit->depth_ppm = bench->sign * (tied ? integral->median[4] : best);
  fit->depth_sigma_ppm = tied ? integral->half_width[4] : 1 / sqrt (energy[0]);
  fit->log_gain = log_tied_depth (moment[0], energy[0], best);
  fit->chi2 = chi2_around (bench, dip, &curve, bench->sign * best);
  fit->log_evidence = integral->log_integral + log (unit_d);
  if (tied)
    quote_likeliest (bench, fit);
}

AntStatus
ant_rival_fit (const AntRivalBench *bench, const AntDip *dip, AntRivalKind kind, AntRivalFit *fit)
{
  const AntRivalPrior *prior = ant_rival_prior (kind);
  /* A spot that makes a dip of hours is at its darkest in it: one that passes days away explains another part of the record. */
  double reach_d = kind == ANT_RIVAL_SPOT ? 0.6 * dip->duration_d + 0.3 : 1.5 * dip->duration_d + 0.2;
  Cube cube = { .bench = bench, .prior = prior, .kind = kind, .epoch_low_d = dip->mid_d - reach_d,
                .epoch_high_d = dip->mid_d + reach_d };
  double parameter[ANT_RIVAL_STARTS][ANT_RIVAL_PARAMETERS], start[ANT_RIVAL_STARTS * ANT_RIVAL_PARAMETERS];
  AntIntegral integral;
  *fit = (AntRivalFit){ .kind = kind };
  if (!(prior->share[bench->sign < 0] > 0))
    return ANT_OK;
  size_t n_starts = ant_rival_starts (kind, dip, bench->limb_darkening, parameter);
  for (size_t i = 0; i < n_starts; i++)
    to_cube (&cube, parameter[i], start + i * (prior->n + 1));
  AntQuantities quantities = { kind == ANT_RIVAL_CROSSING ? 5 : prior->n + 1, tell_quantities,
                               kind == ANT_RIVAL_CROSSING ? CROSSING_SAMPLES : 0 };
  AntStatus status = ant_evidence_integral (prior->n + 1, log_likelihoods, quantities, &cube, n_starts, start, &integral);
  if (status)
    return status;
  describe (&cube, dip, &integral, fit);
  fit->fitted = 1;
  return ANT_OK;
}
