/* smoother.c - conditional means of a model's parts by one pass forwards and one backwards. */
#include "noise/smoother.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/simd.h"
#include "noise/state-space.h"

/* Sums of z over one side of a place, each damped and turned by its distance: for a wave with covariance
 * e^(-c lag) (a cos w lag + b sin w lag), re + i im = sum of e^((-c + i w) distance) z, and K z = a re + b im.
 * One step away from the samples multiplies by e^((-c + i w) step). An exponential is a wave that does not turn. */
typedef struct
{
  size_t n;
  double a[ANT_MAX_TERMS], b[ANT_MAX_TERMS];
  double cosine[ANT_MAX_TERMS], sine[ANT_MAX_TERMS]; /* of one step, damped */
  double re[ANT_MAX_TERMS], im[ANT_MAX_TERMS];
} Sums;

static AntStatus
sums_start (Sums *sums, const AntNoiseModel *model, const unsigned char *chosen, double step_d)
{
  AntNoiseModel part = { .error_scale = 1 };
  AntTerms terms;
  for (size_t p = 0; p < model->n_parts; p++)
    if (chosen[p])
      part.part[part.n_parts++] = model->part[p];
  AntStatus status = ant_terms_from_model (&terms, &part, step_d);
  memset (sums, 0, sizeof *sums);
  for (size_t w = 0; w < terms.waves && !status; w++, sums->n++)
    {
      sums->a[w] = terms.a[w];
      sums->b[w] = terms.b[w];
      sums->cosine[w] = terms.decay_step[2 * w] * terms.turn_cos[w];
      sums->sine[w] = terms.decay_step[2 * w] * terms.turn_sin[w];
    }
  for (size_t e = 0; e < terms.singles && !status; e++, sums->n++)
    {
      sums->a[sums->n] = terms.single[e];
      sums->cosine[sums->n] = terms.decay_step[2 * terms.waves + e];
    }
  return status;
}

static inline __attribute__ ((always_inline)) void
sums_step (Sums *sums)
{
  for (size_t k = 0; k < sums->n; k++)
    {
      double re = sums->re[k], im = sums->im[k];
      sums->re[k] = re * sums->cosine[k] - im * sums->sine[k];
      sums->im[k] = re * sums->sine[k] + im * sums->cosine[k];
    }
}

static inline __attribute__ ((always_inline)) double
sums_read (const Sums *sums)
{
  double sum = 0;
  for (size_t k = 0; k < sums->n; k++)
    sum += sums->a[k] * sums->re[k] + sums->b[k] * sums->im[k];
  return sum;
}

static inline __attribute__ ((always_inline)) void
sums_add (Sums *sums, double z)
{
  for (size_t k = 0; k < sums->n; k++)
    sums->re[k] += z;
}

ANT_SIMD static void
smooth_both_ways (const Sums *fresh, size_t n, const double *z, double *mean_ppm)
{
  Sums sums = *fresh;
  for (size_t p = 0; p < n; p++) /* samples up to and at the place */
    {
      sums_step (&sums);
      sums_add (&sums, z[p]);
      mean_ppm[p] = sums_read (&sums);
    }
  sums = *fresh;
  for (size_t p = n; p-- > 0;) /* samples after it */
    {
      sums_step (&sums);
      mean_ppm[p] += sums_read (&sums);
      sums_add (&sums, z[p]);
    }
}

AntStatus
ant_smooth (const AntNoiseModel *model, const unsigned char *chosen, double step_d, size_t n, const double *z,
            double *mean_ppm)
{
  Sums sums;
  AntStatus status = sums_start (&sums, model, chosen, step_d);
  if (!status)
    smooth_both_ways (&sums, n, z, mean_ppm);
  return status;
}

AntStatus
ant_smooth_contrast_sigma (const AntWhitener *whitener, const AntNoiseModel *model, const unsigned char *chosen,
                           double step_d, size_t n_places, const size_t *place, const double *weight, double *sigma_ppm)
{
  size_t n = ant_whitener_n (whitener), m = ant_whitener_observed (whitener);
  double *contrast = calloc (n, sizeof *contrast), *mean = malloc (n * sizeof *mean);
  double *innovation = malloc (m * sizeof *innovation);
  float *covariance = malloc (n * sizeof *covariance);
  AntStatus status = contrast && mean && innovation && covariance ? ANT_OK : ANT_NO_MEMORY;
  for (size_t k = 0; k < n_places && !status; k++)
    contrast[place[k]] += weight[k];
  if (!status)
    status = ant_smooth (model, chosen, step_d, n, contrast, mean);
  if (!status)
    {
      double variance = 0;
      for (size_t k = 0; k < n_places; k++)
        variance += weight[k] * mean[place[k]];
      for (size_t p = 0; p < n; p++)
        covariance[p] = (float) mean[p];
      ant_whitener_innovations (whitener, covariance, innovation);
      for (size_t i = 0; i < m; i++)
        variance -= innovation[i] * innovation[i] / ant_whitener_variance (whitener)[i];
      *sigma_ppm = sqrt (fmax (variance, 0));
    }
  free (contrast);
  free (mean);
  free (innovation);
  free (covariance);
  return status;
}
