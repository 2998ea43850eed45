/* prefix-sums.h - running totals in double, so that the sum over any window is one subtraction.
 * Gaps (NaN) count as 0. */
#pragma once

#include <stddef.h>

/* sum [n+1]: sum[0] = 0, sum[i+1] = sum[i] + value[i] (0 where NaN). */
void ant_prefix_sums (size_t n, const float *value, double *sum);
void ant_prefix_sums_double (size_t n, const double *value, double *sum);
/* The sum of value[first] .. value[last-1]; indices are clipped to 0..n; 0 if last <= first. */
double ant_window_sum (size_t n, const double *sum, ptrdiff_t first, ptrdiff_t last);
