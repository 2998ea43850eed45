/* whittle.c - fit a noise model to the binned spectrum: the debiased Whittle likelihood by a matrix of hats.
 *
 * Between knots, 6 to the octave, the model's spectrum is taken as piecewise linear: a sum of hats whose values are the
 * spectrum at the knots. What each hat puts into each bin through this mask is computed once; then a likelihood costs
 * one small matrix product. Narrow parts (and all whose time is held) would fall between the knots: each of them gets a
 * column of its own from its exact covariance, with its time as it stands. */
#include <math.h>
#include <stdlib.h>
#include "core/units.h"
#include "noise/noise-fit.h"
#include "noise/spectrum-private.h"

#define KNOTS_PER_OCTAVE 6
#define LOWEST_KNOT 0.25        /* in units of 1/length of the record */
#define HIGHEST_KNOT 8.0        /* in units of Nyquist's frequency */
#define MEAN_MATTERS_BELOW 16.0 /* in units of 1/length: the removed mean took nothing from faster hats */
#define BROAD_QUALITY 2.0
#define BLOCK 128
#define FIRST_STEP_LN 0.3
#define DIFFERENCE_LN 1e-4
#define MAX_STEPS 200
#define SETTLED 1e-3

typedef struct
{
  const AntSpectrum *spectrum;
  AntNoiseModel model;
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
      ant_spectrum_expect (spectrum, work, knot < mean_matters, whittle->hat + g * spectrum->bins);
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
  ant_spectrum_expect (spectrum, work, 1, whittle->flat);
  for (size_t p = 0; p < whittle->model.n_parts; p++)
    {
      AntNoisePart part = whittle->model.part[p];
      if (!owns_column (&part))
        continue;
      part.rms_ppm = 1;
      for (size_t i = 0; i < spectrum->n; i++)
        work->covariance[i] = ant_noise_part_covariance (&part, (double) i * spectrum->step_d);
      ant_spectrum_expect (spectrum, work, 1, whittle->column + p * spectrum->bins);
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
objective (void *data, const double *theta_ln)
{
  Whittle *whittle = data;
  const AntSpectrum *spectrum = whittle->spectrum;
  AntNoiseModel model = whittle->model;
  ant_noise_model_set (&model, theta_ln);
  if (ant_noise_model_check (&model) != ANT_OK)
    return INFINITY;
  expect_by_hats (whittle, &model);
  double sum = ant_noise_model_penalty (&model);
  for (size_t b = 0; b < spectrum->bins; b++)
    sum += spectrum->ordinates[b] * (log (whittle->expected[b]) + spectrum->power[b] / whittle->expected[b]);
  return isfinite (sum) ? sum : HUGE_VAL;
}

static AntStatus
prepare (Whittle *whittle)
{
  const AntSpectrum *spectrum = whittle->spectrum;
  double lowest = LOWEST_KNOT / ((double) spectrum->n * spectrum->step_d);
  double highest = HIGHEST_KNOT * 0.5 / spectrum->step_d;
  whittle->knots = 2 + (size_t) (KNOTS_PER_OCTAVE * log2 (highest / lowest));
  whittle->knot_cd = malloc (whittle->knots * sizeof (double));
  whittle->hat = malloc (whittle->knots * spectrum->bins * sizeof (double));
  whittle->column = malloc ((whittle->model.n_parts + 1) * spectrum->bins * sizeof (double));
  whittle->flat = malloc (spectrum->bins * sizeof (double));
  whittle->expected = malloc (spectrum->bins * sizeof (double));
  if (!whittle->knot_cd || !whittle->hat || !whittle->column || !whittle->flat || !whittle->expected)
    return ANT_NO_MEMORY;
  for (size_t g = 0; g < whittle->knots; g++)
    whittle->knot_cd[g] = lowest * pow (highest / lowest, (double) g / (double) (whittle->knots - 1));
  AntSpectrumWork work;
  AntStatus status = ant_spectrum_work_init (&work, spectrum);
  if (status != ANT_OK)
    return status;
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
      status = ant_minimise (n, theta, objective, &whittle, FIRST_STEP_LN, DIFFERENCE_LN, MAX_STEPS, SETTLED, NULL);
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
  free (whittle.hat);
  free (whittle.column);
  free (whittle.flat);
  free (whittle.expected);
  return status;
}
