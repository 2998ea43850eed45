/* robust.h - medians and scales that a few wild values do not move. NaN and infinities are skipped everywhere;
 * with nothing finite left every answer is NaN. Allocates nothing; safe from any thread.
 * Sources: Tukey's biweight as in Beers, Flynn & Gebhardt 1990, AJ 100, 32; MAD as in Hampel 1974, JASA 69, 383. */
#pragma once

#include <stddef.h>

/* Median of the finite values. O(n). `work` is scratch of n doubles and may be `value` itself,
 * which is then reordered. Even counts give the mean of the middle two. */
double ant_median (size_t n, const double *value, double *work);
/* 1.4826 times the median absolute deviation from the median. `work` as for ant_median. */
double ant_mad_sigma (size_t n, const double *value, double *work);
/* The q-quantile, 0 <= q <= 1, linear between order statistics (Hyndman & Fan 1996, type 7). NaN for another q.
 * `work` as for ant_median. */
double ant_quantile (size_t n, const double *value, double q, double *work);
/* Biweight location with cut c (usual: 6) and scale (usual: 9) in units of the raw MAD; one step from the median.
 * `work` is scratch of n doubles, not the same array as `value`. If the MAD is 0: the median, and 0 for the scales. */
double ant_biweight_location (size_t n, const double *value, double c, double *work);
double ant_biweight_scale (size_t n, const double *value, double c, double *work);
double ant_biweight_midvariance (size_t n, const double *value, double c, double *work);
