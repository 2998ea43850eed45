/* prefix-sums.c - the running totals of prefix-sums.h. */
#include "core/prefix-sums.h"

#include <math.h>

void
ant_prefix_sums (size_t n, const float *value, double *sum)
{
  double total = 0;

  sum[0] = 0;
  for (size_t i = 0; i < n; i++)
    {
      total += isnan (value[i]) ? 0 : (double)value[i];
      sum[i + 1] = total;
    }
}

void
ant_prefix_sums_double (size_t n, const double *value, double *sum)
{
  double total = 0;

  sum[0] = 0;
  for (size_t i = 0; i < n; i++)
    {
      total += isnan (value[i]) ? 0 : value[i];
      sum[i + 1] = total;
    }
}

static size_t
clip_index (ptrdiff_t index, size_t n)
{
  if (index <= 0)
    return 0;
  return (size_t)index < n ? (size_t)index : n;
}

double
ant_window_sum (size_t n, const double *sum, ptrdiff_t first, ptrdiff_t last)
{
  const size_t from = clip_index (first, n);
  const size_t to = clip_index (last, n);

  return to > from ? sum[to] - sum[from] : 0;
}
