/* rebin.h - a series averaged onto another grid in time, and how much of their noise two averaged series share. */
#pragma once

#include "core/status.h"
#include "noise/series.h"

/* Averages of the series over n bins of step_d whose middles are start_d + i step_d, in the series' own time plus shift_d. A
 * sample belongs to the bins its exposure of one step overlaps, by that share; mean[i] is NaN where less than half of a
 * bin is observed. step_d must not be shorter than the series' step (1e-6 of it aside). ANT_BAD_ARGUMENT. Allocates nothing. */
AntStatus ant_series_rebin (const AntSeries *series, double shift_d, double start_d, double step_d, size_t n, float *mean);

/* How alike the noise of two instruments is on the time scale of a dip: the correlation of the contrasts of neighbouring bins,
 * x[i] - (x[i-1] + x[i+1]) / 2, which is how a dip as long as a bin stands out. Slow changes of Sun and instrument drop out,
 * and of white noise all is left. */
typedef struct
{
  size_t n;            /* contrasts that both have; below 8 the rest is NaN */
  double correlation;  /* -1 .. 1, at lag 0 */
  double sigma;        /* of it: (1 - r^2) sqrt (1.94 / n), neighbouring contrasts of white noise being dependent */
  double rms_a_ppm, rms_b_ppm; /* of the contrasts, over sqrt (3/2): of a bin, if they are white */
} AntCommonNoise;

/* a, b [n]: two series on one grid, NaN where not observed. Contrasts beyond 5 robust sigma (dips, flares, steps) are left out.
 * work [2 n]. */
AntCommonNoise ant_common_noise (size_t n, const float *a, const float *b, double *work);
