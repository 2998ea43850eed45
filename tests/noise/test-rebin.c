/* test-rebin.c - averages keep what there is, and shared noise is measured for what it is. */
#include "noise/rebin.h"

#include <glib.h>
#include <math.h>
#include "core/random.h"

#define N 4000

static void
averages_of_a_line_lie_on_it (void)
{
  float value[N], mean[300];
  AntSeries series = { .n = N, .step_d = 0.01, .start_d = 3.0, .value_ppm = value };
  for (int i = 0; i < N; i++)
    value[i] = (float) i;
  /* 7.3 places a bin, and no bin begins where a sample does. */
  g_assert_cmpint (ant_series_rebin (&series, 0.5, 4.037, 0.073, 300, mean), ==, ANT_OK);
  for (int i = 0; i < 300; i++)
    g_assert_cmpfloat_with_epsilon ((double) mean[i], (4.037 + 0.073 * i - 0.5 - 3.0) / 0.01, 0.05);
}

static void
the_sum_of_whole_bins_is_that_of_the_samples (void)
{
  float value[N], mean[N / 8];
  AntRandom random;
  AntSeries series = { .n = N, .step_d = 1.0, .start_d = 0.0, .value_ppm = value };
  double sum = 0.0, binned = 0.0;
  ant_random_seed (&random, 3, 0);
  for (int i = 0; i < N; i++)
    {
      value[i] = (float) ant_random_normal (&random);
      sum += (double) value[i];
    }
  g_assert_cmpint (ant_series_rebin (&series, 0.0, 3.5, 8.0, N / 8, mean), ==, ANT_OK);
  for (int i = 0; i < N / 8; i++)
    binned += 8.0 * (double) mean[i];
  g_assert_cmpfloat_with_epsilon (binned, sum, 1e-3);
}

static void
bins_less_than_half_observed_are_gaps (void)
{
  float value[40], mean[6];
  AntSeries series = { .n = 40, .step_d = 1.0, .start_d = 0.0, .value_ppm = value };
  for (int i = 0; i < 40; i++)
    value[i] = i < 10 || (i >= 13 && i < 20) || (i >= 26 && i < 30) || i >= 30 ? 5.0f : NAN;
  g_assert_cmpint (ant_series_rebin (&series, 0.0, -5.5, 10.0, 6, mean), ==, ANT_OK);
  g_assert_true (isnan (mean[0])); /* before the record */
  g_assert_true (mean[1] == 5.0f && mean[2] == 5.0f && mean[4] == 5.0f);
  g_assert_true (isnan (mean[3])); /* 4 of 10 */
  g_assert_true (isnan (mean[5]));
  g_assert_cmpint (ant_series_rebin (&series, 0.0, 0.0, 0.5, 6, mean), ==, ANT_BAD_ARGUMENT);
}

/* Two instruments with `shared` of their variance in common, on a slow drift that one of them has. */
static AntCommonNoise
measure (double shared, uint64_t seed)
{
  static float a[N], b[N];
  static double work[2 * N];
  AntRandom random;
  ant_random_seed (&random, seed, 1);
  for (int i = 0; i < N; i++)
    {
      double common = sqrt (shared) * ant_random_normal (&random), rest = sqrt (1.0 - shared);
      a[i] = (float) (10.0 * (common + rest * ant_random_normal (&random)) + 300.0 * sin (i / 500.0));
      b[i] = (float) (20.0 * (common + rest * ant_random_normal (&random)));
      if (i % 400 == 7)
        a[i] = b[i] = -900.0f; /* dips that both see are no noise */
      if (i % 31 == 3)
        b[i] = NAN;
    }
  return ant_common_noise (N, a, b, work);
}

static void
shared_noise_is_measured_within_its_error (void)
{
  for (int k = 0; k <= 4; k++)
    {
      double square = 0.0;
      for (uint64_t seed = 0; seed < 20; seed++)
        {
          AntCommonNoise common = measure (0.2 * k, seed);
          double pull = (common.correlation - 0.2 * k) / common.sigma;
          g_assert_cmpfloat (fabs (pull), <, 4.0);
          square += pull * pull / 20.0;
          g_assert_cmpfloat_with_epsilon (common.rms_a_ppm, 10.0, 0.8);
          g_assert_cmpfloat_with_epsilon (common.rms_b_ppm, 20.0, 1.6);
        }
      g_assert_cmpfloat (square, >, 0.4); /* the stated error is neither too large nor too small */
      g_assert_cmpfloat (square, <, 2.0);
    }
}

static void
too_little_in_common_is_unknown (void)
{
  float a[20], b[20];
  double work[40];
  for (int i = 0; i < 20; i++)
    {
      a[i] = i < 11 ? (float) (i * i % 7) : NAN;
      b[i] = i > 6 ? (float) (i * i % 5) : NAN;
    }
  AntCommonNoise common = ant_common_noise (20, a, b, work);
  g_assert_true (isnan (common.correlation) && isnan (common.sigma));
  g_assert_true (isnan (ant_common_noise (0, a, b, work).correlation));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/noise/rebin/averages-of-a-line-lie-on-it", averages_of_a_line_lie_on_it);
  g_test_add_func ("/noise/rebin/the-sum-of-whole-bins-is-that-of-the-samples", the_sum_of_whole_bins_is_that_of_the_samples);
  g_test_add_func ("/noise/rebin/bins-less-than-half-observed-are-gaps", bins_less_than_half_observed_are_gaps);
  g_test_add_func ("/noise/rebin/shared-noise-is-measured-within-its-error", shared_noise_is_measured_within_its_error);
  g_test_add_func ("/noise/rebin/too-little-in-common-is-unknown", too_little_in_common_is_unknown);
  return g_test_run ();
}
