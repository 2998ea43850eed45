/* pyramid.h - the least and greatest value of any stretch of a long series, found in a few steps.
 *
 * Extents of blocks of 16 samples, then of 4 blocks, and so on: 17 % of the data. Gaps (NaN) are left out of every
 * extent. Immutable once built, so several threads may ask it; building is pure work that belongs off the main loop. */
#pragma once

#include <stddef.h>

typedef struct _AntPyramid AntPyramid;

typedef struct
{
  float low, high; /* low > high: nothing was observed */
} AntExtent;

/* value [n] is borrowed and must outlive the pyramid unchanged. n may be 0. */
AntPyramid *ant_pyramid_new (size_t n, const float *value);
void ant_pyramid_free (AntPyramid *pyramid); /* NULL is fine */
size_t ant_pyramid_samples (const AntPyramid *pyramid);
const float *ant_pyramid_values (const AntPyramid *pyramid);
size_t ant_pyramid_bytes (const AntPyramid *pyramid); /* beyond the data */

/* Of value[first] .. value[last-1]; last is clipped to n. */
AntExtent ant_pyramid_extent (const AntPyramid *pyramid, size_t first, size_t last);

/* Extents of n_columns equal stretches: column c holds the samples i with from <= i - c*width < from + width, where
 * width = (to - from)/n_columns places. Neighbours share no sample. from < to; either may lie outside the series. */
void ant_pyramid_columns (const AntPyramid *pyramid, double from, double to, size_t n_columns, AntExtent *column);
/* First sample of column c, not clipped: the very rule that ant_pyramid_columns goes by. */
double ant_pyramid_column_start (double from, double to, size_t n_columns, size_t c);
