/* column-tie.c - one regression against many of the same column shifted. */
#include "verdict/column-tie.h"

#include <math.h>

#define AROUND 1.5     /* durations on either side of the middle, and */
#define LEAST_D (2 / 24.0)
#define MOST_SHIFTS 400
#define LEAST_SHIFTS 20
#define LEAST_PLACES 8

/* Sum of y times a column over the n places where both are there, each less its straight line (reference: about the column's level);
 * divided by what is there, so that gaps do not count. NaN with too few. */
static double
moment (size_t n, const float *y, const float *column, double reference)
{
  double m = 0, t = 0, tt = 0, sy = 0, sty = 0, sc = 0, stc = 0, syc = 0;
  for (size_t i = 0; i < n; i++)
    {
      if (isnan (y[i]) || isnan (column[i]))
        continue;
      double x = (double) i - 0.5 * (double) n, a = (double) y[i], b = (double) column[i] - reference;
      m++;
      t += x;
      tt += x * x;
      sy += a;
      sty += x * a;
      sc += b;
      stc += x * b;
      syc += a * b;
    }
  if (m < LEAST_PLACES || m < 0.5 * (double) n)
    return NAN;
  double spread = tt - t * t / m, slope_y = (sty - t * sy / m) / spread, slope_c = (stc - t * sc / m) / spread;
  return (syc - sy * sc / m - slope_y * slope_c * spread) / m;
}

double
ant_column_tie (const AntSeries *series, const float *column, const AntDip *dip)
{
  double half_d = fmax (AROUND * dip->duration_d, 0.5 * dip->duration_d + LEAST_D);
  double from = floor (ant_series_place (series, dip->mid_d - half_d)), to = ceil (ant_series_place (series, dip->mid_d + half_d));
  size_t first = (size_t) fmax (0, from), last = (size_t) fmin ((double) series->n - 1, fmax (0, to)), n, shifts = 0;
  if (last < first + LEAST_PLACES)
    return NAN;
  n = last - first + 1;
  size_t some = first;
  while (some < last && isnan (column[some]))
    some++;
  double reference = (double) column[some];
  double own = moment (n, series->value_ppm + first, column + first, reference), squares = 0;
  size_t stronger = 0, stride = (series->n - n) / MOST_SHIFTS + 1;
  for (size_t at = 0; at + n <= series->n && isfinite (own); at += stride)
    {
      if (at + n > first && at < first + n)
        continue;
      double other = moment (n, series->value_ppm + first, column + at, reference);
      if (!isfinite (other))
        continue;
      squares += other * other;
      stronger += fabs (other) >= fabs (own);
      shifts++;
    }
  if (shifts < LEAST_SHIFTS || !(squares > 0))
    return NAN;
  double tie = own / sqrt (squares / (double) shifts);
  if (stronger > 0) /* what so many of them reach cannot be rarer than that, however long their tail */
    tie = copysign (fmin (fabs (tie), sqrt (2 * log ((double) shifts / (double) stronger))), tie);
  return tie;
}
