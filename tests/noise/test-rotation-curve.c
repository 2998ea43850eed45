/* test-rotation-curve.c - the displayed curve follows rotation, ignores masked dips, and holds at ends and gaps. */
#include "noise/rotation-curve.h"
#include <glib.h>
#include <math.h>
#include "core/random.h"
#include "core/units.h"

#define STEP_D (10 / 1440.0)
#define PER_DAY 144

static const AntRotationOptions usual = ANT_ROTATION_OPTIONS_INIT;

static double
spots (double time_d)
{
  double phase = ANT_TAU * time_d / ANT_SYNODIC_ROTATION_D;
  return 800 * cos (phase + 0.4) + 300 * sin (2 * phase) - 100 * cos (3 * phase);
}

/* 35 of 96 min lost, and days 40 to 42. */
static int
is_lost (size_t i)
{
  double minute = (double) i * 10;
  return fmod (minute, 96) < 35 || (minute > 40 * 1440 && minute < 42 * 1440);
}

static void
fill (size_t n, double noise_ppm, gboolean gaps, float *value)
{
  AntRandom random;
  ant_random_seed (&random, 20, 1);
  for (size_t i = 0; i < n; i++)
    {
      double y = spots ((double) i * STEP_D) + noise_ppm * ant_random_normal (&random);
      value[i] = gaps && is_lost (i) ? NAN : (float) y;
    }
}

static void
run (size_t n, const float *value, const uint8_t *masked, float *curve)
{
  AntSeries series = { .n = n, .step_d = STEP_D, .value_ppm = value };
  g_assert_cmpint (ant_rotation_curve (&series, masked, &usual, curve), ==, ANT_OK);
}

/* Bins of 30 min average the harmonics over 0.02 d, and the stiffness costs a few 1e-5: below 0.3 ppm together. */
static void
test_harmonics_come_back_through_gaps (void)
{
  enum { n = 90 * PER_DAY };
  g_autofree float *value = g_new (float, n);
  g_autofree float *curve = g_new (float, n);
  fill (n, 0, TRUE, value);
  run (n, value, NULL, curve);
  for (size_t i = 0; i < n; i++)
    g_assert_cmpfloat_with_epsilon (curve[i], spots ((double) i * STEP_D), 0.3);
}

static void
test_noise_is_averaged (void)
{
  enum { n = 90 * PER_DAY };
  g_autofree float *value = g_new (float, n);
  g_autofree float *curve = g_new (float, n);
  fill (n, 30, TRUE, value);
  run (n, value, NULL, curve);
  double squares = 0;
  for (size_t i = 0; i < n; i++)
    squares += pow ((double) curve[i] - spots ((double) i * STEP_D), 2);
  /* About 2300 samples in a window, half of it by weight: 9 coefficients leave 30 sqrt (9/1300) = 2.5 ppm. */
  g_assert_cmpfloat (sqrt (squares / n), <, 3);
}

static void
test_masked_dips_leave_no_trace (void)
{
  enum { n = 90 * PER_DAY };
  g_autofree float *value = g_new (float, n);
  g_autofree float *without = g_new (float, n);
  g_autofree float *with = g_new (float, n);
  g_autofree uint8_t *masked = g_new0 (uint8_t, n);
  fill (n, 20, TRUE, value);
  for (size_t i = 30 * PER_DAY; i < 30 * PER_DAY + 80; i++)
    masked[i] = 1;
  run (n, value, masked, without);
  for (size_t i = 30 * PER_DAY; i < 30 * PER_DAY + 80; i++)
    value[i] -= 1000;
  run (n, value, masked, with);
  for (size_t i = 0; i < n; i++)
    g_assert_cmpfloat (with[i], ==, without[i]);
}

/* Masking half a day is itself harmless: under the dip the curve still follows the spots. */
static void
test_curve_under_a_masked_dip_is_the_suns (void)
{
  enum { n = 60 * PER_DAY };
  g_autofree float *value = g_new (float, n);
  g_autofree float *curve = g_new (float, n);
  g_autofree uint8_t *masked = g_new0 (uint8_t, n);
  fill (n, 0, FALSE, value);
  for (size_t i = 30 * PER_DAY; i < 30 * PER_DAY + 80; i++)
    {
      value[i] -= 84;
      masked[i] = 1;
    }
  run (n, value, masked, curve);
  for (size_t i = 0; i < n; i++)
    g_assert_cmpfloat_with_epsilon (curve[i], spots ((double) i * STEP_D), 0.3);
}

/* The biweight keeps a deep unmasked dip from pulling the curve by more than a small part of its depth. */
static void
test_unmasked_deep_dip_is_mostly_ignored (void)
{
  enum { n = 60 * PER_DAY };
  g_autofree float *value = g_new (float, n);
  g_autofree float *curve = g_new (float, n);
  fill (n, 20, FALSE, value);
  for (size_t i = 30 * PER_DAY; i < 30 * PER_DAY + 80; i++)
    value[i] -= 1000;
  run (n, value, NULL, curve);
  for (size_t i = 28 * PER_DAY; i < 33 * PER_DAY; i++)
    g_assert_cmpfloat_with_epsilon (curve[i], spots ((double) i * STEP_D), 15);
}

/* At an end the window reaches inward for its full width, so a record that starts at day 0 and one that starts earlier
 * agree there about what the Sun did. */
static void
test_ends_are_as_good_as_the_middle (void)
{
  enum { n = 60 * PER_DAY };
  g_autofree float *value = g_new (float, n);
  g_autofree float *curve = g_new (float, n);
  fill (n, 10, FALSE, value);
  run (n, value, NULL, curve);
  g_assert_cmpfloat_with_epsilon (curve[0], spots (0), 8);
  g_assert_cmpfloat_with_epsilon (curve[n - 1], spots ((n - 1) * STEP_D), 8);
}

static void
test_long_gap_is_bridged (void)
{
  enum { n = 90 * PER_DAY };
  g_autofree float *value = g_new (float, n);
  g_autofree float *curve = g_new (float, n);
  fill (n, 0, FALSE, value);
  for (size_t i = 35 * PER_DAY; i < 41 * PER_DAY; i++)
    value[i] = NAN;
  run (n, value, NULL, curve);
  for (size_t i = 0; i < n; i++)
    g_assert_cmpfloat_with_epsilon (curve[i], spots ((double) i * STEP_D), 3);
}

static void
test_curve_is_nan_only_beyond_the_reach_of_data (void)
{
  enum { n = 120 * PER_DAY };
  g_autofree float *value = g_new (float, n);
  g_autofree float *curve = g_new (float, n);
  fill (n, 0, FALSE, value);
  for (size_t i = 30 * PER_DAY; i < 90 * PER_DAY; i++)
    value[i] = NAN;
  run (n, value, NULL, curve);
  for (size_t i = 0; i < n; i++)
    if (i > 44 * PER_DAY && i < 76 * PER_DAY)
      g_assert_true (isnan (curve[i]));
    else if (i < 43 * PER_DAY || i > 77 * PER_DAY)
      g_assert_true (isfinite (curve[i]) && fabsf (curve[i]) < 5000);
}

/* A day of data under a slow trend: the curve is a gentle one, and a dip of 3 h stays out of it. */
static void
test_short_record_gets_a_gentle_curve (void)
{
  enum { n = PER_DAY };
  float value[n], curve[n];
  fill (n, 5, FALSE, value);
  for (size_t i = 60; i < 78; i++)
    value[i] -= 200;
  run (n, value, NULL, curve);
  for (size_t i = 0; i < n; i++)
    g_assert_cmpfloat_with_epsilon (curve[i], spots ((double) i * STEP_D), 10);
}

static void
test_hourly_and_daily_cadences_work (void)
{
  const double step_d[] = { 1 / 24.0, 1 };
  for (gsize j = 0; j < G_N_ELEMENTS (step_d); j++)
    {
      float value[200], curve[200];
      for (int i = 0; i < 200; i++)
        value[i] = i % 7 == 3 ? NAN : (float) spots (i * step_d[j]);
      AntSeries series = { .n = 200, .step_d = step_d[j], .value_ppm = value };
      g_assert_cmpint (ant_rotation_curve (&series, NULL, &usual, curve), ==, ANT_OK);
      for (int i = 0; i < 200; i++)
        g_assert_cmpfloat_with_epsilon (curve[i], spots (i * step_d[j]), 5);
    }
}

static void
test_no_data_and_bad_options_are_refused (void)
{
  float value[10], curve[10];
  for (int i = 0; i < 10; i++)
    value[i] = NAN;
  AntSeries series = { .n = 10, .step_d = STEP_D, .value_ppm = value };
  AntRotationOptions options = ANT_ROTATION_OPTIONS_INIT;
  g_assert_cmpint (ant_rotation_curve (&series, NULL, &options, curve), ==, ANT_NO_DATA);
  g_assert_true (isnan (curve[5]));
  options.harmonics = 100;
  g_assert_cmpint (ant_rotation_curve (&series, NULL, &options, curve), ==, ANT_BAD_ARGUMENT);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/noise/rotation-curve/harmonics-come-back-through-gaps", test_harmonics_come_back_through_gaps);
  g_test_add_func ("/noise/rotation-curve/noise-is-averaged", test_noise_is_averaged);
  g_test_add_func ("/noise/rotation-curve/masked-dips-leave-no-trace", test_masked_dips_leave_no_trace);
  g_test_add_func ("/noise/rotation-curve/curve-under-a-masked-dip-is-the-suns",
                   test_curve_under_a_masked_dip_is_the_suns);
  g_test_add_func ("/noise/rotation-curve/unmasked-deep-dip-is-mostly-ignored",
                   test_unmasked_deep_dip_is_mostly_ignored);
  g_test_add_func ("/noise/rotation-curve/ends-are-as-good-as-the-middle", test_ends_are_as_good_as_the_middle);
  g_test_add_func ("/noise/rotation-curve/long-gap-is-bridged", test_long_gap_is_bridged);
  g_test_add_func ("/noise/rotation-curve/curve-is-nan-only-beyond-the-reach-of-data",
                   test_curve_is_nan_only_beyond_the_reach_of_data);
  g_test_add_func ("/noise/rotation-curve/short-record-gets-a-gentle-curve", test_short_record_gets_a_gentle_curve);
  g_test_add_func ("/noise/rotation-curve/hourly-and-daily-cadences-work", test_hourly_and_daily_cadences_work);
  g_test_add_func ("/noise/rotation-curve/no-data-and-bad-options-are-refused",
                   test_no_data_and_bad_options_are_refused);
  return g_test_run ();
}
