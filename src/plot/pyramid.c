/* pyramid.c - blocks of 16 samples, then blocks of 4 blocks. */
#include "plot/pyramid.h"
#include <glib.h>
#include <math.h>

#define BASE 16
#define RADIX 4
#define MOST_LEVELS 32

struct _AntPyramid
{
  size_t n;
  const float *value;
  size_t n_levels;
  size_t count[MOST_LEVELS]; /* full blocks only; what is left over is read from the level below */
  AntExtent *block[MOST_LEVELS];
};

static const AntExtent nothing = { INFINITY, -INFINITY };

/* Comparisons with NaN are false, so gaps fall out by themselves. */
static inline AntExtent
with_value (AntExtent extent, float value)
{
  extent.low = value < extent.low ? value : extent.low;
  extent.high = value > extent.high ? value : extent.high;
  return extent;
}

static inline AntExtent
with_extent (AntExtent extent, AntExtent other)
{
  extent.low = other.low < extent.low ? other.low : extent.low;
  extent.high = other.high > extent.high ? other.high : extent.high;
  return extent;
}

/* Four lanes, so that a comparison need not wait for the one before. */
static AntExtent
extent_of_base (const float *value)
{
  AntExtent lane[4] = { nothing, nothing, nothing, nothing };
  for (size_t i = 0; i < BASE; i += 4)
    for (size_t k = 0; k < 4; k++)
      lane[k] = with_value (lane[k], value[i + k]);
  return with_extent (with_extent (lane[0], lane[1]), with_extent (lane[2], lane[3]));
}

AntPyramid *
ant_pyramid_new (size_t n, const float *value)
{
  AntPyramid *pyramid = g_new0 (AntPyramid, 1);
  pyramid->n = n;
  pyramid->value = value;
  for (size_t count = n / BASE; count > 0; count /= RADIX)
    {
      size_t level = pyramid->n_levels++;
      AntExtent *block = pyramid->block[level] = g_new (AntExtent, count);
      pyramid->count[level] = count;
      for (size_t b = 0; b < count; b++)
        if (level == 0)
          block[b] = extent_of_base (value + b * BASE);
        else
          {
            const AntExtent *below = pyramid->block[level - 1] + b * RADIX;
            block[b] = with_extent (with_extent (below[0], below[1]), with_extent (below[2], below[3]));
          }
    }
  return pyramid;
}

void
ant_pyramid_free (AntPyramid *pyramid)
{
  if (!pyramid)
    return;
  for (size_t level = 0; level < pyramid->n_levels; level++)
    g_free (pyramid->block[level]);
  g_free (pyramid);
}

size_t
ant_pyramid_samples (const AntPyramid *pyramid)
{
  return pyramid->n;
}

const float *
ant_pyramid_values (const AntPyramid *pyramid)
{
  return pyramid->value;
}

size_t
ant_pyramid_bytes (const AntPyramid *pyramid)
{
  size_t bytes = sizeof *pyramid;
  for (size_t level = 0; level < pyramid->n_levels; level++)
    bytes += pyramid->count[level] * sizeof (AntExtent);
  return bytes;
}

static AntExtent
over_samples (const AntPyramid *pyramid, size_t first, size_t last, AntExtent extent)
{
  for (size_t i = first; i < last; i++)
    extent = with_value (extent, pyramid->value[i]);
  return extent;
}

static AntExtent
over_blocks (const AntPyramid *pyramid, size_t level, size_t first, size_t last, AntExtent extent)
{
  for (size_t b = first; b < last; b++)
    extent = with_extent (extent, pyramid->block[level][b]);
  return extent;
}

/* The two ragged ends of each level, then what lies between them one level up. */
AntExtent
ant_pyramid_extent (const AntPyramid *pyramid, size_t first, size_t last)
{
  last = MIN (last, pyramid->n);
  if (first >= last)
    return nothing;
  size_t a = (first + BASE - 1) / BASE, b = last / BASE;
  if (a >= b)
    return over_samples (pyramid, first, last, nothing);
  AntExtent extent = over_samples (pyramid, b * BASE, last, over_samples (pyramid, first, a * BASE, nothing));
  size_t level = 0;
  for (; level + 1 < pyramid->n_levels && b - a > 2 * RADIX; level++)
    {
      size_t inner_a = (a + RADIX - 1) / RADIX, inner_b = b / RADIX;
      extent = over_blocks (pyramid, level, a, inner_a * RADIX, extent);
      extent = over_blocks (pyramid, level, inner_b * RADIX, b, extent);
      a = inner_a;
      b = inner_b;
    }
  return over_blocks (pyramid, level, a, b, extent);
}

double
ant_pyramid_column_start (double from, double to, size_t n_columns, size_t c)
{
  return ceil (from + (to - from) * (double) c / (double) n_columns);
}

void
ant_pyramid_columns (const AntPyramid *pyramid, double from, double to, size_t n_columns, AntExtent *column)
{
  double n = (double) pyramid->n;
  size_t first = (size_t) CLAMP (ant_pyramid_column_start (from, to, n_columns, 0), 0, n);
  for (size_t c = 0; c < n_columns; c++)
    {
      size_t last = (size_t) CLAMP (ant_pyramid_column_start (from, to, n_columns, c + 1), 0, n);
      column[c] = ant_pyramid_extent (pyramid, first, last);
      first = last;
    }
}
