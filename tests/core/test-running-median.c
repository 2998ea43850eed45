/* test-running-median.c - the sliding median against sorting each window. */
#include <glib.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/random.h"
#include "core/running-median.h"

enum
{
  MOST = 700
};

typedef enum
{
  PLAIN,
  TIES,
  GAPPY,     /* single samples missing, some infinite */
  LONG_GAPS, /* windows that are all gap */
  RISING,
  FALLING,
  N_KINDS
} Kind;

static void
fill (AntRandom *random, Kind kind, size_t n, float *value)
{
  gboolean in_gap = FALSE;

  for (size_t i = 0; i < n; i++)
    {
      const float x = (float)ant_random_normal (random);
      const double u = ant_random_uniform (random);

      value[i] = x;
      if (kind == TIES)
        value[i] = floorf (2 * x);
      else if (kind == GAPPY && u < 0.3)
        value[i] = u < 0.02 ? INFINITY : u < 0.04 ? -INFINITY : NAN;
      else if (kind == LONG_GAPS)
        {
          in_gap = u < (in_gap ? 0.97 : 0.03);
          value[i] = in_gap ? NAN : x;
        }
      else if (kind == RISING)
        value[i] = (float)i;
      else if (kind == FALLING)
        value[i] = -(float)i;
    }
}

static int
compare_floats (const void *a, const void *b)
{
  const float x = *(const float *)a, y = *(const float *)b;

  return (x > y) - (x < y);
}

/* The slow twin: sort what is there. */
static float
slow_median (size_t n, const float *value, size_t i, size_t half_width)
{
  float sorted[MOST];
  size_t m = 0;

  for (size_t j = i > half_width ? i - half_width : 0; j < n && j - MIN (i, j) <= half_width; j++)
    if (isfinite (value[j]))
      sorted[m++] = value[j];
  qsort (sorted, m, sizeof *sorted, compare_floats);
  return m == 0 ? NAN : m % 2 ? sorted[m / 2] : (float)(0.5 * ((double)sorted[m / 2 - 1] + (double)sorted[m / 2]));
}

static void
assert_as_sorted (Kind kind, size_t n, size_t half_width, guint64 seed)
{
  float value[MOST], median[MOST];
  AntRandom random;

  ant_random_seed (&random, seed, kind);
  fill (&random, kind, n, value);
  g_assert_cmpint (ant_running_median (n, value, half_width, median), ==, ANT_OK);
  for (size_t i = 0; i < n; i++)
    {
      const float expected = slow_median (n, value, i, half_width);

      if (isnan (expected))
        g_assert_true (isnan (median[i]));
      else
        g_assert_cmpfloat (median[i], ==, expected);
    }
}

static void
every_window_equals_its_sorted_copy (void)
{
  static const size_t half_widths[] = { 0, 1, 2, 3, 7, 20, 64, 150 };

  for (Kind kind = 0; kind < N_KINDS; kind++)
    for (gsize h = 0; h < G_N_ELEMENTS (half_widths); h++)
      assert_as_sorted (kind, MOST, half_widths[h], h);
}

/* Every length up to 24 with every half width up to twice that. */
static void
windows_longer_than_the_record_equal_their_sorted_copies (void)
{
  for (Kind kind = 0; kind < N_KINDS; kind++)
    for (size_t n = 1; n <= 24; n++)
      for (size_t half_width = 0; half_width <= 2 * n; half_width++)
        assert_as_sorted (kind, n, half_width, 100 + n);
}

static void
boundless_window_gives_one_median_everywhere (void)
{
  static const float value[] = { 5, NAN, 1, 4, 100 };
  float median[5];

  g_assert_cmpint (ant_running_median (5, value, SIZE_MAX, median), ==, ANT_OK);
  for (int i = 0; i < 5; i++)
    g_assert_cmpfloat (median[i], ==, 4.5f);
}

static void
record_of_gaps_gives_gaps (void)
{
  static const float value[] = { NAN, INFINITY, NAN };
  float median[3];

  g_assert_cmpint (ant_running_median (3, value, 1, median), ==, ANT_OK);
  for (int i = 0; i < 3; i++)
    g_assert_true (isnan (median[i]));
  g_assert_cmpint (ant_running_median (0, NULL, 5, NULL), ==, ANT_OK);
}

static void
turning_the_record_over_turns_the_medians_over (void)
{
  float value[MOST], mirror[MOST], median[MOST], mirrored[MOST];
  AntRandom random;

  ant_random_seed (&random, 7, 0);
  fill (&random, GAPPY, MOST, value);
  for (int i = 0; i < MOST; i++)
    mirror[i] = -value[i];
  g_assert_cmpint (ant_running_median (MOST, value, 9, median), ==, ANT_OK);
  g_assert_cmpint (ant_running_median (MOST, mirror, 9, mirrored), ==, ANT_OK);
  for (int i = 0; i < MOST; i++)
    g_assert_true (isnan (median[i]) ? isnan (mirrored[i]) : mirrored[i] == -median[i]);
}

/* A dip shorter than half the window does not move the baseline by more than the noise does. */
static void
short_dip_leaves_the_baseline_flat (void)
{
  float value[MOST], median[MOST];

  for (int i = 0; i < MOST; i++)
    value[i] = (float)(i % 2) - (i >= 300 && i < 340 ? 1000.0f : 0.0f);
  g_assert_cmpint (ant_running_median (MOST, value, 60, median), ==, ANT_OK);
  for (int i = 0; i < MOST; i++)
    g_assert_true (median[i] >= 0 && median[i] <= 1);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/core/running-median/every-window-equals-its-sorted-copy", every_window_equals_its_sorted_copy);
  g_test_add_func ("/core/running-median/windows-longer-than-the-record-equal-their-sorted-copies",
                   windows_longer_than_the_record_equal_their_sorted_copies);
  g_test_add_func ("/core/running-median/boundless-window-gives-one-median-everywhere",
                   boundless_window_gives_one_median_everywhere);
  g_test_add_func ("/core/running-median/record-of-gaps-gives-gaps", record_of_gaps_gives_gaps);
  g_test_add_func ("/core/running-median/turning-the-record-over-turns-the-medians-over",
                   turning_the_record_over_turns_the_medians_over);
  g_test_add_func ("/core/running-median/short-dip-leaves-the-baseline-flat", short_dip_leaves_the_baseline_flat);
  return g_test_run ();
}
