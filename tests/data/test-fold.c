/* test-fold.c - what is locked to an orbit or to the end of a gap comes out of a fold, and nothing else does. */
#include "data/fold.h"

#include <math.h>
#include "core/random.h"
#include "core/units.h"

#define N 20000
#define STEP_D (1.0 / 1440.0)
#define PERIOD_D (96.0 / 1440.0)

/* A minute's cadence, 35 of 96 minutes lost each orbit; 80 ppm of the orbit's, and 200 ppm that decay over 10 min after a gap. */
static AntSeries
orbiting (float *value, double orbit_ppm, double recovery_ppm)
{
  AntRandom random;
  AntSeries series = { .n = N, .step_d = STEP_D, .start_d = 3.0, .value_ppm = value };
  ant_random_seed (&random, 4, 0);
  for (int i = 0; i < N; i++)
    {
      double time_d = ant_series_time (&series, i), phase = time_d / PERIOD_D - floor (time_d / PERIOD_D);
      double since_min = (phase - 35.0 / 96.0) * 96.0;
      value[i] = phase < 35.0 / 96.0 ? NAN
                                     : (float) (orbit_ppm * sin (ANT_TAU * phase) + recovery_ppm * exp (-since_min / 10.0)
                                                + 30.0 * ant_random_normal (&random));
    }
  return series;
}

static void
the_orbit_shows_by_phase (void)
{
  static float value[N];
  AntSeries series = orbiting (value, 80.0, 0.0);
  AntFoldOptions options = ANT_FOLD_OPTIONS_INIT;
  AntFoldBin bin[48];
  double swing;
  options.period_d = PERIOD_D;
  g_assert_true (ant_fold (&series, value, &options, bin));
  gsize sum = 0;
  for (int b = 0; b < 48; b++)
    {
      sum += bin[b].n;
      g_assert_cmpfloat_with_epsilon (bin[b].x, (b + 0.5) / 48.0, 1e-12);
      if (bin[b].n > 100)
        g_assert_cmpfloat (fabs (bin[b].mean - 80.0 * sin (ANT_TAU * bin[b].x)), <, 5.0 * bin[b].sigma + 1.0);
      else
        g_assert_cmpfloat (bin[b].x, <, 36.0 / 96.0);
    }
  gsize observed = 0;
  for (int i = 0; i < N; i++)
    observed += !isnan (value[i]);
  g_assert_cmpuint (sum, ==, observed); /* every sample stands in one bin */
  g_assert_cmpfloat (ant_fold_swing (bin, 48, &swing), >, 20.0);
  options.period_d = 1.37 * PERIOD_D;
  g_assert_true (ant_fold (&series, value, &options, bin));
  ant_fold_swing (bin, 48, &swing);
  g_assert_cmpfloat (swing, <, 60.0); /* another period smears it */
}

static void
recoveries_show_by_minutes_since_a_gap (void)
{
  static float value[N];
  AntSeries series = orbiting (value, 0.0, 200.0);
  AntFoldOptions options = ANT_FOLD_OPTIONS_INIT;
  AntFoldBin bin[60];
  options.clock = ANT_FOLD_SINCE_GAP;
  options.reach_d = 60.0 / 1440.0;
  options.n_bins = 60;
  g_assert_true (ant_fold (&series, value, &options, bin));
  for (int b = 1; b < 59; b++)
    g_assert_cmpfloat (fabs (bin[b].mean - 200.0 * exp (-bin[b].x / 10.0)), <, 5.0 * bin[b].sigma + 12.0);
}

static void
noise_alone_shows_nothing (void)
{
  static float value[N];
  AntSeries series = orbiting (value, 0.0, 0.0);
  AntFoldOptions options = ANT_FOLD_OPTIONS_INIT;
  AntFoldBin bin[48];
  double swing;
  options.period_d = PERIOD_D;
  g_assert_true (ant_fold (&series, value, &options, bin));
  g_assert_cmpfloat (ant_fold_swing (bin, 48, &swing), <, 5.0);
}

static void
what_cannot_be_folded_is_refused (void)
{
  float value[3] = { 1, 2, 3 };
  AntSeries series = { .n = 3, .step_d = 1.0, .value_ppm = value };
  AntFoldOptions options = ANT_FOLD_OPTIONS_INIT;
  AntFoldBin bin[48];
  double swing;
  g_assert_false (ant_fold (&series, value, &options, bin)); /* no period */
  options.period_d = 1.0;
  options.n_bins = ANT_MOST_FOLD_BINS + 1;
  g_assert_false (ant_fold (&series, value, &options, bin));
  options = (AntFoldOptions)ANT_FOLD_OPTIONS_INIT;
  options.clock = ANT_FOLD_SINCE_GAP;
  g_assert_true (ant_fold (&series, value, &options, bin)); /* and no gap: no values */
  for (int b = 0; b < 48; b++)
    g_assert_true (bin[b].n == 0 && isnan (bin[b].mean));
  g_assert_true (isnan (ant_fold_swing (bin, 48, &swing)));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/fold/the-orbit-shows-by-phase", the_orbit_shows_by_phase);
  g_test_add_func ("/data/fold/recoveries-show-by-minutes-since-a-gap", recoveries_show_by_minutes_since_a_gap);
  g_test_add_func ("/data/fold/noise-alone-shows-nothing", noise_alone_shows_nothing);
  g_test_add_func ("/data/fold/what-cannot-be-folded-is-refused", what_cannot_be_folded_is_refused);
  return g_test_run ();
}
