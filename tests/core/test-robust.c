/* test-robust.c - medians, quantiles and biweights against sorting, published values and symmetry. */
#include <glib.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/random.h"
#include "core/robust.h"
#include "core/units.h"

enum
{
  MOST = 600
};

static int
compare_doubles (const void *a, const void *b)
{
  const double x = *(const double *)a, y = *(const double *)b;

  return (x > y) - (x < y);
}

/* The slow twin: the type 7 quantile of a sorted copy of the finite values. */
static double
slow_quantile (size_t n, const double *value, double q)
{
  double sorted[MOST];
  size_t m = 0, below;
  double at;

  for (size_t i = 0; i < n; i++)
    if (isfinite (value[i]))
      sorted[m++] = value[i];
  if (m == 0)
    return NAN;
  qsort (sorted, m, sizeof *sorted, compare_doubles);
  at = q * (double)(m - 1);
  below = (size_t)at;
  return below + 1 < m ? sorted[below] + (at - (double)below) * (sorted[below + 1] - sorted[below]) : sorted[below];
}

static void
assert_close (double got, double expected, double tolerance)
{
  g_assert_cmpfloat (fabs (got - expected), <=, tolerance * fmax (1, fabs (expected)));
}

/* Source of the six numbers: astropy.stats (median_absolute_deviation, mad_std, biweight_location with c = 6,
 * biweight_scale and biweight_midvariance with c = 9). */
static void
one_to_nine_and_a_hundred_as_astropy_has_it (void)
{
  static const double x[] = { 1, 2, 3, 4, 5, 6, 7, 8, 9, 100 };
  double work[10];

  g_assert_cmpfloat (ant_median (10, x, work), ==, 5.5);
  assert_close (ant_mad_sigma (10, x, work) / ANT_MAD_TO_SIGMA, 2.5, 1e-14);
  assert_close (ant_mad_sigma (10, x, work), 3.706505546264005, 1e-14);
  assert_close (ant_biweight_location (10, x, 6, work), 5.0596483196556115, 1e-14);
  assert_close (ant_biweight_scale (10, x, 9, work), 2.86453645722942, 1e-14);
  assert_close (ant_biweight_midvariance (10, x, 9, work), 8.205569114796477, 1e-14);
}

/* Source: astropy.stats, as above. */
static void
eleven_unsorted_values_as_astropy_has_it (void)
{
  static const double y[] = { -3.2, -1.1, -0.4, 0, 0.3, 0.5, 0.9, 1.4, 2.2, 14, -22 };
  double work[11];

  g_assert_cmpfloat (ant_median (11, y, work), ==, 0.3);
  assert_close (ant_mad_sigma (11, y, work), 1.630862440356162, 1e-14);
  assert_close (ant_biweight_location (11, y, 6, work), 0.2215960502905967, 1e-14);
  assert_close (ant_biweight_scale (11, y, 9, work), 1.590153388737754, 1e-14);
}

/* Ties, gaps and infinities, all lengths up to 60 and some longer. */
static void
quantiles_equal_those_of_a_sorted_copy (void)
{
  double value[MOST], work[MOST];
  AntRandom random;

  ant_random_seed (&random, 3, 0);
  for (size_t n = 1; n <= MOST; n += n < 60 ? 1 : 90)
    for (int kind = 0; kind < 3; kind++)
      {
        for (size_t i = 0; i < n; i++)
          {
            const double x = ant_random_normal (&random);

            value[i] = kind == 1 ? floor (2 * x) : x;
            if (kind == 2 && fabs (x) > 0.7)
              value[i] = (double)(x < 0 ? NAN : INFINITY);
          }
        for (double q = 0; q <= 1; q += 0.125)
          {
            const double expected = slow_quantile (n, value, q);

            if (isnan (expected))
              g_assert_true (isnan (ant_quantile (n, value, q, work)));
            else
              g_assert_cmpfloat (ant_quantile (n, value, q, work), ==, expected);
          }
      }
}

static void
median_ignores_gaps (void)
{
  static const double with_gaps[] = { NAN, 4, NAN, 1, INFINITY, 9, -INFINITY, 2, NAN };
  double work[9];

  g_assert_cmpfloat (ant_median (9, with_gaps, work), ==, 3);
  assert_close (ant_mad_sigma (9, with_gaps, work), 1.5 * ANT_MAD_TO_SIGMA, 1e-15);
}

static void
gaps_change_no_biweight (void)
{
  double plain[MOST], gappy[2 * MOST], work[2 * MOST];
  AntRandom random;

  ant_random_seed (&random, 4, 0);
  for (int i = 0; i < MOST; i++)
    {
      plain[i] = gappy[2 * i] = ant_random_normal (&random) / ant_random_uniform (&random);
      gappy[2 * i + 1] = i % 3 ? NAN : INFINITY;
    }
  g_assert_cmpfloat (ant_biweight_location (2 * MOST, gappy, 6, work), ==,
                     ant_biweight_location (MOST, plain, 6, work));
  g_assert_cmpfloat (ant_biweight_scale (2 * MOST, gappy, 9, work), ==, ant_biweight_scale (MOST, plain, 9, work));
}

static void
nothing_finite_gives_nan (void)
{
  static const double gap[] = { NAN, INFINITY };
  double work[2];

  for (size_t n = 0; n <= 2; n++)
    {
      g_assert_true (isnan (ant_median (n, gap, work)));
      g_assert_true (isnan (ant_mad_sigma (n, gap, work)));
      g_assert_true (isnan (ant_quantile (n, gap, 0.5, work)));
      g_assert_true (isnan (ant_biweight_location (n, gap, 6, work)));
      g_assert_true (isnan (ant_biweight_scale (n, gap, 9, work)));
    }
}

static void
median_of_huge_values_does_not_overflow (void)
{
  static const double huge[] = { 1.7e308, 1.5e308 };
  double work[2];

  assert_close (ant_median (2, huge, work) / 1.6e308, 1, 1e-15);
}

static void
half_the_values_alike_give_that_value_and_no_scale (void)
{
  static const double value[] = { 3, 3, 3, 3, 50, -8 };
  double work[6];

  g_assert_cmpfloat (ant_biweight_location (6, value, 6, work), ==, 3);
  g_assert_cmpfloat (ant_biweight_scale (6, value, 9, work), ==, 0);
  g_assert_cmpfloat (ant_mad_sigma (6, value, work), ==, 0);
}

/* The mirrored search turns records over: nothing may prefer one side. */
static void
turning_the_record_over_turns_every_answer_over (void)
{
  double value[MOST], mirror[MOST], work[MOST];
  AntRandom random;

  ant_random_seed (&random, 6, 0);
  for (int i = 0; i < MOST; i++)
    {
      value[i] = 1361 + 0.3 * ant_random_normal (&random);
      mirror[i] = -value[i];
    }
  g_assert_cmpfloat (ant_median (MOST, mirror, work), ==, -ant_median (MOST, value, work));
  g_assert_cmpfloat (ant_mad_sigma (MOST, mirror, work), ==, ant_mad_sigma (MOST, value, work));
  g_assert_cmpfloat (ant_biweight_location (MOST, mirror, 6, work), ==, -ant_biweight_location (MOST, value, 6, work));
  g_assert_cmpfloat (ant_biweight_scale (MOST, mirror, 9, work), ==, ant_biweight_scale (MOST, value, 9, work));
}

static void
scratch_may_be_the_record_itself (void)
{
  double value[MOST], copy[MOST], work[MOST];
  AntRandom random;

  ant_random_seed (&random, 8, 0);
  for (int i = 0; i < MOST; i++)
    value[i] = i % 7 ? ant_random_normal (&random) : (double)NAN;
  memcpy (copy, value, sizeof value);
  g_assert_cmpfloat (ant_median (MOST, copy, copy), ==, ant_median (MOST, value, work));
  memcpy (copy, value, sizeof value);
  g_assert_cmpfloat (ant_mad_sigma (MOST, copy, copy), ==, ant_mad_sigma (MOST, value, work));
}

/* A quadratic selection would need hours here: steps, ramps, sawtooths and organ pipes of a million samples. */
static void
ordered_records_are_no_slower_than_random_ones (void)
{
  const size_t n = 1000001;
  g_autofree double *value = g_new (double, n);

  for (int kind = 0; kind < 4; kind++)
    {
      for (size_t i = 0; i < n; i++)
        value[i] = kind == 0   ? (double)i
                   : kind == 1 ? (double)(i % 1000)
                   : kind == 2 ? fabs ((double)i - 500000)
                               : (double)(i > 700000);
      g_assert_cmpfloat (ant_median (n, value, value), ==,
                         kind == 0   ? 500000
                         : kind == 1 ? 499
                         : kind == 2 ? 250000
                                     : 0);
    }
}

/* Both scales are consistent with sigma; at 100 values a bias of order 1/n and 0.2 % of sampling error remain. */
static void
gaussian_scale_is_sigma_on_average (void)
{
  enum
  {
    DRAWS = 4000,
    N = 100
  };
  double value[N], work[N], mean_scale = 0, mean_mad = 0;
  AntRandom random;

  ant_random_seed (&random, 9, 0);
  for (int d = 0; d < DRAWS; d++)
    {
      for (int i = 0; i < N; i++)
        value[i] = 2.5 * ant_random_normal (&random);
      mean_scale += ant_biweight_scale (N, value, 9, work) / 2.5 / DRAWS;
      mean_mad += ant_mad_sigma (N, value, work) / 2.5 / DRAWS;
    }
  g_assert_cmpfloat (fabs (mean_scale - 1), <, 0.02);
  g_assert_cmpfloat (fabs (mean_mad - 1), <, 0.02);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/core/robust/one-to-nine-and-a-hundred-as-astropy-has-it",
                   one_to_nine_and_a_hundred_as_astropy_has_it);
  g_test_add_func ("/core/robust/eleven-unsorted-values-as-astropy-has-it", eleven_unsorted_values_as_astropy_has_it);
  g_test_add_func ("/core/robust/quantiles-equal-those-of-a-sorted-copy", quantiles_equal_those_of_a_sorted_copy);
  g_test_add_func ("/core/robust/median-ignores-gaps", median_ignores_gaps);
  g_test_add_func ("/core/robust/gaps-change-no-biweight", gaps_change_no_biweight);
  g_test_add_func ("/core/robust/nothing-finite-gives-nan", nothing_finite_gives_nan);
  g_test_add_func ("/core/robust/median-of-huge-values-does-not-overflow", median_of_huge_values_does_not_overflow);
  g_test_add_func ("/core/robust/half-the-values-alike-give-that-value-and-no-scale",
                   half_the_values_alike_give_that_value_and_no_scale);
  g_test_add_func ("/core/robust/turning-the-record-over-turns-every-answer-over",
                   turning_the_record_over_turns_every_answer_over);
  g_test_add_func ("/core/robust/scratch-may-be-the-record-itself", scratch_may_be_the_record_itself);
  g_test_add_func ("/core/robust/ordered-records-are-no-slower-than-random-ones",
                   ordered_records_are_no_slower_than_random_ones);
  g_test_add_func ("/core/robust/gaussian-scale-is-sigma-on-average", gaussian_scale_is_sigma_on_average);
  return g_test_run ();
}
