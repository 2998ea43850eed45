/* fold.c - means by phase or by minutes since a gap. */
#include "data/fold.h"

#include <math.h>
#include <string.h>

#include "core/running-median.h"
#include "core/units.h"

#define FEWEST 5

typedef struct
{
  double shift, sum, square; /* about the first value: no digits are lost at a level of thousands */
} Sums;

/* Place on the clock as a fraction of its bins' span; NaN outside it. */
static double
place_of (const AntFoldOptions *options, double time_d, double gap_end_d)
{
  if (options->clock == ANT_FOLD_ORBIT)
    {
      double turns = time_d / options->period_d;
      return turns - floor (turns);
    }
  double since_d = time_d - gap_end_d;
  return since_d >= 0.0 && since_d < options->reach_d ? since_d / options->reach_d : (double) NAN;
}

static void
add (AntFoldBin *bin, Sums *sums, double value)
{
  if (bin->n++ == 0)
    sums->shift = value;
  sums->sum += value - sums->shift;
  sums->square += (value - sums->shift) * (value - sums->shift);
}

AntStatus
ant_fold_flatten (const AntSeries *series, const AntFoldOptions *options, float *value)
{
  double turn_d = options->clock == ANT_FOLD_ORBIT ? options->period_d : options->reach_d;
  gsize half_width = (gsize) fmin (0.5 * ANT_FOLD_DRIFT_TURNS * turn_d / series->step_d, (double) series->n);
  g_autofree float *slow = g_new (float, series->n);
  AntStatus status = ant_running_median (series->n, value, half_width, slow);
  for (gsize i = 0; status == ANT_OK && i < series->n; i++)
    value[i] -= slow[i];
  return status;
}

gboolean
ant_fold (const AntSeries *series, const float *value, const AntFoldOptions *options, AntFoldBin *bin)
{
  gboolean by_orbit = options->clock == ANT_FOLD_ORBIT;
  if (!((by_orbit ? options->period_d : options->reach_d) > 0.0) || options->n_bins == 0 || options->n_bins > ANT_MOST_FOLD_BINS)
    return FALSE;
  double span = by_orbit ? 1.0 : options->reach_d * ANT_MINUTES_PER_DAY, gap_end_d = (double) -INFINITY;
  Sums sums[ANT_MOST_FOLD_BINS];
  gsize last = 0;
  gboolean seen = FALSE;
  memset (sums, 0, sizeof sums);
  for (guint b = 0; b < options->n_bins; b++)
    bin[b] = (AntFoldBin){ .x = (b + 0.5) * span / options->n_bins };
  for (gsize i = 0; i < series->n; i++)
    {
      double time_d = ant_series_time (series, (double) i);
      if (!isnan (series->value_ppm[i]))
        {
          if (seen && (double) (i - last) > options->gap_steps)
            gap_end_d = time_d - 0.5 * series->step_d;
          seen = TRUE;
          last = i;
        }
      double place = place_of (options, time_d, gap_end_d);
      if (isnan (value[i]) || isnan (place))
        continue;
      guint b = MIN ((guint) (place * options->n_bins), options->n_bins - 1);
      add (&bin[b], &sums[b], (double) value[i]);
    }
  for (guint b = 0; b < options->n_bins; b++)
    {
      double n = (double) bin[b].n, mean = sums[b].sum / n;
      bin[b].mean = bin[b].n > 0 ? sums[b].shift + mean : (double) NAN;
      bin[b].sigma = bin[b].n > 1 ? sqrt (fmax (0.0, sums[b].square / n - mean * mean) / (n - 1.0)) : (double) NAN;
    }
  return TRUE;
}

double
ant_fold_swing (const AntFoldBin *bin, guint n_bins, double *swing)
{
  const AntFoldBin *low = NULL, *high = NULL;
  for (guint b = 0; b < n_bins; b++)
    {
      if (bin[b].n < FEWEST)
        continue;
      if (!low || bin[b].mean < low->mean)
        low = &bin[b];
      if (!high || bin[b].mean > high->mean)
        high = &bin[b];
    }
  *swing = low ? high->mean - low->mean : (double) NAN;
  return low && low != high ? *swing / hypot (low->sigma, high->sigma) : (double) NAN;
}
