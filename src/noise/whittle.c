/* whittle.c - fit a noise model to the binned spectrum: the debiased Whittle likelihood by a matrix of hats.
 *
 * Between knots, 8 to the octave, the model's spectrum is taken as piecewise linear: a sum of hats whose values are the
 * spectrum at the knots. What each hat puts into each bin through this mask is computed once; then a likelihood costs
 * one small matrix product. Narrow parts (and all whose time is held) would fall between the knots: each of them gets a
 * column of its own from its exact covariance, with its time as it stands.
 *
 * Each bin is taken from the values or from the differences of neighbours, whichever the gaps spoil less: steep slow
 * noise leaks through gaps into all of the fast bins of the values (as f^-2, from the edges), white noise leaks into
 * the slow bins of the differences. The differences of stationary noise are stationary, so both are predicted exactly
 * (differencing before a Whittle fit: Sykulski et al. 2019, section 6). */
#include <math.h>
#include <stdlib.h>
#include "core/units.h"
#include "noise/noise-fit.h"
#include "noise/spectrum-private.h"

#define KNOTS_PER_OCTAVE 8
#define LOWEST_KNOT 0.25        /* in units of 1/length of the record */
#define HIGHEST_KNOT 8.0        /* in units of Nyquist's frequency */
#define MEAN_MATTERS_BELOW 16.0 /* in units of 1/length: the removed mean took nothing from faster hats */
#define BROAD_QUALITY 2.0
#define CLEARLY_LESS 0.5        /* the start is rough: in doubt the values themselves */
#define BLOCK 128
#define FIRST_STEP_LN 0.3
#define DIFFERENCE_LN 1e-4
#define MAX_STEPS 200
#define SETTLED 1e-5

typedef struct
{
  const AntSpectrum *spectrum;
  AntNoiseModel model;
  unsigned char *stepwise; /* [bins] nonzero: the bin is taken from the differences */
  double *power, *ordinates; /* [bins] of the kind taken */
  size_t knots;
  double *knot_cd;   /* [knots] */
  double *hat;       /* [knots][bins] */
  double *column;    /* [n_parts][bins], of parts that own a column, for an rms of 1 ppm */
  double *flat;      /* [bins], of white noise of 1 ppm^2 */
  double *expected;  /* [bins] scratch */
} Whittle;

static int
owns_column (const AntNoisePart *part)
{
  return !(part->time_width_ln > 0) || (part->kind == ANT_OSCILLATOR && part->quality > BROAD_QUALITY);
}

/* sin (turn i) for i < n, from a block of angles and their offsets: no error builds up and the loop vectorises. */
static void
fill_sine (double turn, size_t n, double *out)
{
  double s[BLOCK], c[BLOCK];
  for (int j = 0; j < BLOCK; j++)
    {
      s[j] = sin (turn * j);
      c[j] = cos (turn * j);
    }
  for (size_t base = 0; base < n; base += BLOCK)
    {
      double sine = sin (turn * (double) base), cosine = cos (turn * (double) base);
      size_t count = n - base < BLOCK ? n - base : BLOCK;
      for (size_t j = 0; j < count; j++)
        out[base + j] = sine * c[j] + cosine * s[j];
    }
}

/* sin (2 pi f t)/(2 pi t) at lags t of i steps, f the middle of low..high, times sin x/x with x = pi (high - low) t: the
 * transform of a spectrum that is 1 up to low and falls straight to 0 at high. work [n]. */
static void
fill_ramp (double low_cd, double high_cd, double step_d, size_t n, double *work, double *out)
{
  double middle = (low_cd + high_cd) / 2, half = ANT_PI * (high_cd - low_cd) * step_d;
  fill_sine (ANT_TAU * middle * step_d, n, out);
  fill_sine (half, n, work);
  for (size_t i = 1; i < n; i++)
    {
      double lag = (double) i;
      out[i] *= work[i] / (half * lag * ANT_TAU * step_d * lag);
    }
  out[0] = middle;
}

/* The covariance of the differences of neighbours from that of the values, in place; the last lag, beyond the reach of
 * n-1 differences, is left at 0. */
static void
difference_covariance (size_t n, double *covariance)
{
  double before = covariance[1];
  for (size_t i = 0; i + 1 < n; i++)
    {
      double here = covariance[i];
      covariance[i] = 2 * here - before - covariance[i + 1];
      before = here;
    }
  covariance[n - 1] = 0;
}

/* Expected power of noise with work->covariance (which is lost) in the bins as taken. */
static void
expect_as_taken (Whittle *whittle, AntSpectrumWork *work, int mean, double *out)
{
  const AntSpectrum *spectrum = whittle->spectrum;
  ant_spectrum_expect (spectrum, work, mean, out);
  if (!spectrum->steps)
    return;
  difference_covariance (spectrum->n, work->covariance);
  ant_spectrum_expect (spectrum->steps, work, mean, whittle->expected);
  for (size_t b = 0; b < spectrum->bins; b++)
    if (whittle->stepwise[b])
      out[b] = whittle->expected[b];
}

/* Judged by the model at the start: where the differences' expected power, over the gain of differencing, is less than
 * that of the values, less of it has leaked in from elsewhere. */
static void
take_bins (Whittle *whittle, AntSpectrumWork *work)
{
  const AntSpectrum *spectrum = whittle->spectrum, *steps = spectrum->steps;
  for (size_t i = 0; steps && i < spectrum->n; i++)
    work->covariance[i] = ant_noise_model_covariance (&whittle->model, (double) i * spectrum->step_d);
  work->covariance[0] += ant_spectrum_white (spectrum, &whittle->model);
  if (steps)
    {
      ant_spectrum_expect (spectrum, work, 1, whittle->flat);
      difference_covariance (spectrum->n, work->covariance);
      ant_spectrum_expect (steps, work, 1, whittle->expected);
    }
  for (size_t b = 0; b < spectrum->bins; b++)
    {
      double s = 2 * sin (ANT_PI * spectrum->frequency_cd[b] * spectrum->step_d);
      whittle->stepwise[b] = steps && whittle->expected[b] < CLEARLY_LESS * s * s * whittle->flat[b];
      const AntSpectrum *taken = whittle->stepwise[b] ? steps : spectrum;
      whittle->power[b] = taken->power[b];
      whittle->ordinates[b] = taken->ordinates[b];
    }
}

/* A hat is the difference of two ramps; the first reaches down to f = 0, the last ends at its knot (what the model has
 * beyond is folded in as white noise). */
static AntStatus
build_hats (Whittle *whittle, AntSpectrumWork *work)
{
  const AntSpectrum *spectrum = whittle->spectrum;
  size_t n = spectrum->n;
  double *below = malloc (n * sizeof (double)), *above = malloc (n * sizeof (double));
  AntStatus status = below && above ? ANT_OK : ANT_NO_MEMORY;
  double mean_matters = MEAN_MATTERS_BELOW / ((double) n * spectrum->step_d);
  for (size_t g = 0; status == ANT_OK && g < whittle->knots; g++)
    {
      double knot = whittle->knot_cd[g];
      if (ant_pace_stopped (spectrum->pace))
        status = ANT_STOPPED;
      if (g + 1 < whittle->knots)
        fill_ramp (knot, whittle->knot_cd[g + 1], spectrum->step_d, n, work->covariance, above);
      else
        {
          fill_sine (ANT_TAU * knot * spectrum->step_d, n, above);
          for (size_t i = 1; i < n; i++)
            above[i] /= ANT_TAU * spectrum->step_d * (double) i;
          above[0] = knot;
        }
      for (size_t i = 0; i < n; i++)
        work->covariance[i] = g ? above[i] - below[i] : above[i];
      expect_as_taken (whittle, work, knot < mean_matters, whittle->hat + g * spectrum->bins);
      double *swap = below;
      below = above;
      above = swap;
    }
  free (below);
  free (above);
  return status;
}

static void
build_columns (Whittle *whittle, AntSpectrumWork *work)
{
  const AntSpectrum *spectrum = whittle->spectrum;
  for (size_t i = 0; i < spectrum->n; i++)
    work->covariance[i] = i == 0;
  expect_as_taken (whittle, work, 1, whittle->flat);
  for (size_t p = 0; p < whittle->model.n_parts; p++)
    {
      AntNoisePart part = whittle->model.part[p];
      if (!owns_column (&part))
        continue;
      part.rms_ppm = 1;
      for (size_t i = 0; i < spectrum->n; i++)
        work->covariance[i] = ant_noise_part_covariance (&part, (double) i * spectrum->step_d);
      expect_as_taken (whittle, work, 1, whittle->column + p * spectrum->bins);
    }
}

static void
add_scaled (size_t n, double factor, const double *column, double *sum)
{
  for (size_t i = 0; i < n; i++)
    sum[i] += factor * column[i];
}

/* Expected power in the bins by the matrix; only the broad parts go through the hats. */
static void
expect_by_hats (Whittle *whittle, const AntNoiseModel *model)
{
  size_t bins = whittle->spectrum->bins;
  AntNoiseModel broad = { .n_parts = 0 };
  double highest = whittle->knot_cd[whittle->knots - 1];
  double variance = ant_spectrum_white (whittle->spectrum, model);
  for (size_t b = 0; b < bins; b++)
    whittle->expected[b] = 0;
  for (size_t p = 0; p < model->n_parts; p++)
    {
      const AntNoisePart *part = &model->part[p];
      if (owns_column (part))
        {
          add_scaled (bins, part->rms_ppm * part->rms_ppm, whittle->column + p * bins, whittle->expected);
          continue;
        }
      broad.part[broad.n_parts++] = *part;
      /* The power beyond the last knot, where the spectrum falls as f^-2 or f^-4, folds into the band about evenly. */
      variance += ant_noise_part_psd (part, highest) * highest / (part->kind == ANT_EXPONENTIAL ? 1 : 3);
    }
  add_scaled (bins, variance, whittle->flat, whittle->expected);
  for (size_t g = 0; g < whittle->knots; g++)
    add_scaled (bins, ant_noise_model_psd (&broad, whittle->knot_cd[g]), whittle->hat + g * bins, whittle->expected);
}

static double
objective_at (Whittle *whittle, const double *theta_ln)
{
  AntNoiseModel model = whittle->model;
  ant_noise_model_set (&model, theta_ln);
  if (ant_noise_model_check (&model) != ANT_OK)
    return HUGE_VAL;
  expect_by_hats (whittle, &model);
  double sum = ant_noise_model_penalty (&model);
  for (size_t b = 0; b < whittle->spectrum->bins; b++)
    sum += whittle->ordinates[b] * (log (whittle->expected[b]) + whittle->power[b] / whittle->expected[b]);
  return isfinite (sum) ? sum : HUGE_VAL;
}

static void
objective (void *data, size_t n_points, const double *theta_ln, double *value)
{
  Whittle *whittle = data;
  size_t n = ant_noise_model_get (&whittle->model, NULL);
  for (size_t p = 0; p < n_points; p++)
    value[p] = objective_at (whittle, theta_ln + p * n);
}

static AntStatus
prepare (Whittle *whittle)
{
  const AntSpectrum *spectrum = whittle->spectrum;
  double lowest = LOWEST_KNOT / ((double) spectrum->n * spectrum->step_d);
  double highest = HIGHEST_KNOT * 0.5 / spectrum->step_d;
  whittle->knots = 2 + (size_t) (KNOTS_PER_OCTAVE * log2 (highest / lowest));
  size_t bins = spectrum->bins;
  whittle->knot_cd = malloc ((whittle->knots + (whittle->knots + whittle->model.n_parts + 4) * bins) * sizeof (double));
  whittle->stepwise = malloc (bins);
  if (!whittle->knot_cd || !whittle->stepwise)
    return ANT_NO_MEMORY;
  whittle->hat = whittle->knot_cd + whittle->knots;
  whittle->column = whittle->hat + whittle->knots * bins;
  whittle->flat = whittle->column + whittle->model.n_parts * bins;
  whittle->expected = whittle->flat + bins;
  whittle->power = whittle->expected + bins;
  whittle->ordinates = whittle->power + bins;
  for (size_t g = 0; g < whittle->knots; g++)
    whittle->knot_cd[g] = lowest * pow (highest / lowest, (double) g / (double) (whittle->knots - 1));
  AntSpectrumWork work;
  AntStatus status = ant_spectrum_work_init (&work, spectrum);
  if (status != ANT_OK)
    return status;
  take_bins (whittle, &work);
  build_columns (whittle, &work);
  status = build_hats (whittle, &work);
  ant_spectrum_work_clear (&work);
  return status;
}

AntStatus
ant_spectrum_whittle_fit (const AntSpectrum *spectrum, AntNoiseModel *model)
{
  double theta[ANT_MAX_FREE];
  if (ant_noise_model_check (model) != ANT_OK)
    return ANT_BAD_ARGUMENT;
  Whittle whittle = { .spectrum = spectrum, .model = *model };
  /* A narrow part's column stands for its present time, so that time is held here. */
  for (size_t p = 0; p < model->n_parts; p++)
    if (owns_column (&model->part[p]))
      whittle.model.part[p].time_width_ln = 0;
  size_t n = ant_noise_model_get (&whittle.model, theta);
  AntStatus status = n ? prepare (&whittle) : ANT_OK;
  if (n && status == ANT_OK)
    {
      AntFitOptions options = { .max_steps = MAX_STEPS, .settled_lnl = SETTLED };
      status = ant_minimise (n, theta, objective, &whittle, FIRST_STEP_LN, DIFFERENCE_LN, &options, NULL);
      ant_noise_model_set (&whittle.model, theta);
      for (size_t p = 0; p < model->n_parts; p++)
        {
          model->part[p].rms_ppm = whittle.model.part[p].rms_ppm;
          model->part[p].time_d = whittle.model.part[p].time_d;
        }
      model->white_ppm = whittle.model.white_ppm;
      model->error_scale = whittle.model.error_scale;
    }
  free (whittle.knot_cd);
  free (whittle.stepwise);
  return status;
}
