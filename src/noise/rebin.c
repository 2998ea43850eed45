/* rebin.c - averages by overlap, and the correlation of contrasts. */
#include "noise/rebin.h"

#include <math.h>
#include "core/robust.h"

#define LEAST_COVERAGE 0.5
#define FAR_SIGMA 5.0
#define FEWEST 8
#define CONTRAST_GAIN 1.5      /* variance of a contrast over that of a bin, white */
#define DEPENDENCE 1.944444444 /* 1 + 2 (4/9 + 1/36): the squared autocorrelations of contrasts of white noise */

AntStatus
ant_series_rebin (const AntSeries *series, double shift_d, double start_d, double step_d, size_t n, float *mean)
{
  if (!(step_d >= series->step_d * (1.0 - 1e-6)) || !isfinite (shift_d) || !isfinite (start_d))
    return ANT_BAD_ARGUMENT;
  double share = series->step_d / step_d;
  for (size_t i = 0; i < n; i++)
    {
      /* The bin's edges in places of the series, whose samples reach half a place to both sides. */
      double middle = ant_series_place (series, start_d + (double) i * step_d - shift_d);
      double low = middle - 0.5 / share, high = middle + 0.5 / share, sum = 0.0, weight = 0.0;
      double first = floor (low + 0.5), last = ceil (high - 0.5);
      mean[i] = NAN;
      if (last < 0.0 || first >= (double) series->n)
        continue;
      for (double k = fmax (first, 0.0); k <= last && k < (double) series->n; k += 1.0)
        {
          float value = series->value_ppm[(size_t) k];
          double overlap = fmin (high, k + 0.5) - fmax (low, k - 0.5);
          if (isnan (value) || !(overlap > 0.0))
            continue;
          sum += overlap * (double) value;
          weight += overlap;
        }
      if (weight * share >= LEAST_COVERAGE)
        mean[i] = (float) (sum / weight);
    }
  return ANT_OK;
}

static double
contrast (const float *x, size_t i)
{
  return (double) x[i] - 0.5 * ((double) x[i - 1] + (double) x[i + 1]);
}

/* Contrasts that both have and that are not far out, packed into work: a's first, b's behind. Returns how many. */
static size_t
gather (size_t n, const float *a, const float *b, double far_a, double far_b, double *work)
{
  size_t kept = 0;
  for (size_t i = 1; i + 1 < n; i++)
    {
      double of_a = contrast (a, i), of_b = contrast (b, i);
      if (!(fabs (of_a) <= far_a) || !(fabs (of_b) <= far_b))
        continue;
      work[kept] = of_a;
      work[n + kept] = of_b;
      kept++;
    }
  return kept;
}

AntCommonNoise
ant_common_noise (size_t n, const float *a, const float *b, double *work)
{
  AntCommonNoise common = { 0, (double) NAN, (double) NAN, (double) NAN, (double) NAN };
  size_t kept = gather (n, a, b, HUGE_VAL, HUGE_VAL, work);
  if (kept < FEWEST)
    return common;
  double far_a = FAR_SIGMA * ant_mad_sigma (kept, work, work), far_b = FAR_SIGMA * ant_mad_sigma (kept, work + n, work + n);
  kept = gather (n, a, b, far_a, far_b, work);
  common.n = kept;
  if (kept < FEWEST)
    return common;
  double aa = 0.0, bb = 0.0, ab = 0.0;
  for (size_t i = 0; i < kept; i++)
    {
      aa += work[i] * work[i];
      bb += work[n + i] * work[n + i];
      ab += work[i] * work[n + i];
    }
  if (aa > 0.0 && bb > 0.0)
    {
      common.correlation = ab / sqrt (aa * bb);
      common.sigma = (1.0 - common.correlation * common.correlation) * sqrt (DEPENDENCE / (double) kept);
    }
  common.rms_a_ppm = sqrt (aa / (double) kept / CONTRAST_GAIN);
  common.rms_b_ppm = sqrt (bb / (double) kept / CONTRAST_GAIN);
  return common;
}
