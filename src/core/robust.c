/* robust.c - the medians and scales of robust.h, by selection rather than sorting. */
#include "core/robust.h"

#include <math.h>
#include <stdint.h>
#include "core/units.h"

static size_t
gather_finite (size_t n, const double *value, double *work)
{
  size_t m = 0;

  for (size_t i = 0; i < n; i++)
    if (isfinite (value[i]))
      work[m++] = value[i];
  return m;
}

static double
middle_of_three (double a, double b, double c)
{
  return fmax (fmin (a, b), fmin (fmax (a, b), c));
}

/* Reorder so that a[rank] is what a sort would put there, nothing greater before it and nothing less after it
 * (Hoare 1961, CACM 4, 321). Pivots are drawn, so that no smooth or sawtooth record makes it quadratic. */
static double
select_rank (size_t n, double *a, size_t rank)
{
  ptrdiff_t low = 0, high = (ptrdiff_t)n - 1;
  const ptrdiff_t wanted = (ptrdiff_t)rank;
  uint64_t draw = 0x9e3779b97f4a7c15u;

  while (low < high)
    {
      const uint64_t width = (uint64_t)(high - low) + 1;
      ptrdiff_t i = low, j = high, at[3];
      double pivot;

      for (int p = 0; p < 3; p++)
        {
          draw = draw * 6364136223846793005u + 1442695040888963407u;
          at[p] = low + (ptrdiff_t)((draw >> 33) % width);
        }
      pivot = middle_of_three (a[at[0]], a[at[1]], a[at[2]]);
      while (i <= j)
        {
          while (a[i] < pivot)
            i++;
          while (a[j] > pivot)
            j--;
          if (i <= j)
            {
              const double swap = a[i];

              a[i++] = a[j];
              a[j--] = swap;
            }
        }
      if (wanted <= j)
        high = j;
      else if (wanted >= i)
        low = i;
      else
        break;
    }
  return a[rank];
}

/* The order statistics `rank` and `rank`+1 (the same one twice at the top). */
static void
select_pair (size_t n, double *a, size_t rank, double *lower, double *upper)
{
  *lower = select_rank (n, a, rank);
  *upper = rank + 1 < n ? a[rank + 1] : *lower;
  for (size_t i = rank + 2; i < n; i++)
    *upper = a[i] < *upper ? a[i] : *upper;
}

static double
median_in_place (size_t n, double *a)
{
  double lower, upper;

  if (n == 0)
    return NAN;
  select_pair (n, a, (n - 1) / 2, &lower, &upper);
  return n % 2 ? lower : 0.5 * lower + 0.5 * upper;
}

double
ant_median (size_t n, const double *value, double *work)
{
  return median_in_place (gather_finite (n, value, work), work);
}

/* The median and the raw median absolute deviation; returns how many values were finite. */
static size_t
median_and_mad (size_t n, const double *value, double *work, double *median, double *mad)
{
  const size_t m = gather_finite (n, value, work);

  *median = median_in_place (m, work);
  for (size_t i = 0; i < m; i++)
    work[i] = fabs (work[i] - *median);
  *mad = median_in_place (m, work);
  return m;
}

double
ant_mad_sigma (size_t n, const double *value, double *work)
{
  double median, mad;

  median_and_mad (n, value, work, &median, &mad);
  return ANT_MAD_TO_SIGMA * mad;
}

double
ant_quantile (size_t n, const double *value, double q, double *work)
{
  const size_t m = gather_finite (n, value, work);
  double at, lower, upper;

  if (m == 0 || !(q >= 0 && q <= 1))
    return NAN;
  at = q * (double)(m - 1);
  select_pair (m, work, (size_t)at, &lower, &upper);
  return lower + (at - floor (at)) * (upper - lower);
}

double
ant_biweight_location (size_t n, const double *value, double c, double *work)
{
  double median, mad, above = 0, below = 0;

  median_and_mad (n, value, work, &median, &mad);
  if (!(mad > 0)) /* more than half of the values are one number: that is the answer */
    return median;
  for (size_t i = 0; i < n; i++)
    {
      const double deviation = value[i] - median;
      const double u = deviation / (c * mad);
      const double weight = (1 - u * u) * (1 - u * u);

      if (fabs (u) < 1) /* false for gaps */
        {
          above += deviation * weight;
          below += weight;
        }
    }
  return median + above / below;
}

double
ant_biweight_midvariance (size_t n, const double *value, double c, double *work)
{
  double median, mad, above = 0, below = 0;
  const size_t m = median_and_mad (n, value, work, &median, &mad);

  if (!(mad > 0))
    return mad;
  for (size_t i = 0; i < n; i++)
    {
      const double deviation = value[i] - median;
      const double u = deviation / (c * mad);
      const double left = 1 - u * u;

      if (fabs (u) < 1)
        {
          above += deviation * deviation * left * left * left * left;
          below += left * (1 - 5 * u * u);
        }
    }
  return (double)m * above / (below * below);
}

double
ant_biweight_scale (size_t n, const double *value, double c, double *work)
{
  return sqrt (ant_biweight_midvariance (n, value, c, work));
}
