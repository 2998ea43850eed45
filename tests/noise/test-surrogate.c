/* test-surrogate.c - drawn noise has the covariance of its model, from the first place on, and repeats by seed. */
#include "noise/surrogate.h"
#include <glib.h>
#include <math.h>
#include <string.h>

#define STEP_D (1 / 1440.0)

static AntNoiseModel
example_model (void)
{
  return (AntNoiseModel){
    .n_parts = 3,
    .part = {
      { .kind = ANT_OSCILLATOR, .rms_ppm = 40, .time_d = 30 * STEP_D, .quality = 0.70710678 },
      { .kind = ANT_OSCILLATOR, .rms_ppm = 10, .time_d = 5.4 * STEP_D, .quality = 4 },
      { .kind = ANT_EXPONENTIAL, .rms_ppm = 30, .time_d = 25 * STEP_D },
    },
    .white_ppm = 15,
    .error_scale = 1,
  };
}

static AntSeries
series_of (size_t n, const float *value_ppm)
{
  return (AntSeries){ .n = n, .step_d = STEP_D, .value_ppm = value_ppm };
}

static double
covariance (const AntNoiseModel *model, size_t lag)
{
  double white = lag ? 0 : ant_noise_model_variance (model, 0, 1);
  return ant_noise_model_covariance (model, (double) lag * STEP_D) + white;
}

/* Against the sampling error of a covariance estimate (Bartlett 1946): its variance is 1/n times the sum over m of
 * R(m)^2 + R(m+l) R(m-l). */
static void
test_covariance_is_the_models (void)
{
  enum { n = 200000 };
  const size_t lags[] = { 0, 1, 2, 5, 11, 25, 60, 200 };
  AntNoiseModel model = example_model ();
  g_autofree float *grid = g_new0 (float, n);
  g_autofree float *value = g_new (float, n);
  AntSeries series = series_of (n, grid);
  AntRandom random;
  ant_random_seed (&random, 7, 1);
  g_assert_cmpint (ant_surrogate_draw (&model, &series, &random, value), ==, ANT_OK);
  for (gsize j = 0; j < G_N_ELEMENTS (lags); j++)
    {
      double sum = 0, variance = 0;
      for (size_t i = 0; i + lags[j] < n; i++)
        sum += (double) value[i] * (double) value[i + lags[j]];
      for (long m = -3000; m <= 3000; m++)
        {
          double r = covariance (&model, (size_t) labs (m));
          variance += r * r
                      + covariance (&model, (size_t) labs (m + (long) lags[j]))
                          * covariance (&model, (size_t) labs (m - (long) lags[j]));
        }
      double off = sum / (double) (n - lags[j]) - covariance (&model, lags[j]);
      g_assert_cmpfloat (fabs (off), <, 3.5 * sqrt (variance / n));
    }
}

/* Slow parts at a fine cadence are where a step's own noise nearly vanishes. */
static void
test_slow_oscillator_is_stationary (void)
{
  enum { n = 3000, draws = 4000 };
  AntNoiseModel model = { .n_parts = 1, .error_scale = 1, .part = { { ANT_OSCILLATOR, 100, 1, 0.70710678 } } };
  g_autofree float *grid = g_new0 (float, n);
  g_autofree float *value = g_new (float, n);
  AntSeries series = series_of (n, grid);
  double start = 0, end = 0, product = 0;
  AntRandom random;
  ant_random_seed (&random, 8, 1);
  for (int i = 0; i < draws; i++)
    {
      ant_surrogate_draw (&model, &series, &random, value);
      start += (double) value[0] * (double) value[0];
      end += (double) value[n - 1] * (double) value[n - 1];
      product += (double) value[n - 1] * (double) value[n - 481];
    }
  double error = 1e4 * sqrt (2.0 / draws);
  g_assert_cmpfloat (fabs (start / draws - 1e4), <, 3.5 * error);
  g_assert_cmpfloat (fabs (end / draws - 1e4), <, 3.5 * error);
  double want = ant_noise_model_covariance (&model, 480 * STEP_D);
  g_assert_cmpfloat (fabs (product / draws - want), <, 3.5 * error);
}

static void
test_same_seed_gives_same_bytes (void)
{
  enum { n = 500 };
  AntNoiseModel model = example_model ();
  float grid[n] = { 0 }, one[n], two[n];
  AntSeries series = series_of (n, grid);
  AntRandom random;
  ant_random_seed (&random, 9, 3);
  ant_surrogate_draw (&model, &series, &random, one);
  ant_random_seed (&random, 9, 3);
  ant_surrogate_draw (&model, &series, &random, two);
  g_assert_cmpmem (one, sizeof one, two, sizeof two);
  ant_random_seed (&random, 9, 4);
  ant_surrogate_draw (&model, &series, &random, two);
  g_assert_cmpint (memcmp (one, two, sizeof one), !=, 0);
}

static void
test_gaps_stay_gaps_and_move_nothing (void)
{
  enum { n = 500 };
  AntNoiseModel model = example_model ();
  float grid[n] = { 0 }, whole[n], gappy[n];
  AntSeries series = series_of (n, grid);
  AntRandom random;
  ant_random_seed (&random, 10, 1);
  ant_surrogate_draw (&model, &series, &random, whole);
  for (int i = 100; i < 160; i++)
    grid[i] = NAN;
  ant_random_seed (&random, 10, 1);
  ant_surrogate_draw (&model, &series, &random, gappy);
  for (int i = 0; i < n; i++)
    if (i >= 100 && i < 160)
      g_assert_true (isnan (gappy[i]));
    else
      g_assert_cmpfloat (gappy[i], ==, whole[i]);
}

static void
test_stated_errors_scale_the_scatter (void)
{
  enum { n = 40000 };
  AntNoiseModel model = { .white_ppm = 6, .error_scale = 2 };
  g_autofree float *grid = g_new0 (float, n);
  g_autofree float *value = g_new (float, n);
  g_autofree float *error = g_new (float, n);
  g_autofree float *count = g_new (float, n);
  for (int i = 0; i < n; i++)
    {
      error[i] = 4;
      count[i] = 4;
    }
  AntSeries series = series_of (n, grid);
  series.error_ppm = error;
  series.bin_count = count;
  AntRandom random;
  ant_random_seed (&random, 11, 1);
  ant_surrogate_draw (&model, &series, &random, value);
  double sum = 0;
  for (int i = 0; i < n; i++)
    sum += (double) value[i] * (double) value[i];
  g_assert_cmpfloat (fabs (sum / n - 73), <, 3.5 * 73 * sqrt (2.0 / n));
}

static void
test_meaningless_model_is_refused (void)
{
  AntNoiseModel model = example_model ();
  float grid[10] = { 0 }, value[10];
  AntSeries series = series_of (10, grid);
  AntRandom random;
  ant_random_seed (&random, 12, 1);
  model.part[0].quality = 0.4;
  g_assert_cmpint (ant_surrogate_draw (&model, &series, &random, value), ==, ANT_BAD_ARGUMENT);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/noise/surrogate/covariance-is-the-models", test_covariance_is_the_models);
  g_test_add_func ("/noise/surrogate/slow-oscillator-is-stationary", test_slow_oscillator_is_stationary);
  g_test_add_func ("/noise/surrogate/same-seed-gives-same-bytes", test_same_seed_gives_same_bytes);
  g_test_add_func ("/noise/surrogate/gaps-stay-gaps-and-move-nothing", test_gaps_stay_gaps_and_move_nothing);
  g_test_add_func ("/noise/surrogate/stated-errors-scale-the-scatter", test_stated_errors_scale_the_scatter);
  g_test_add_func ("/noise/surrogate/meaningless-model-is-refused", test_meaningless_model_is_refused);
  return g_test_run ();
}
