/* test-comparison.c - two records of one Sun: on one grid, ratio and difference show what one alone has. */
#include "rows.h"

#include <math.h>
#include <string.h>
#include "core/random.h"
#include "core/units.h"
#include "data/comparison.h"
#include "data/error.h"

#define START_JD 2453371.5

/* What the Sun does, at days from the start. */
static double
sun_ppm (double time_d)
{
  return 200.0 * sin (time_d * 2.1) + 100.0 * sin (time_d * 0.23) - (fabs (time_d - 20.3) < 0.15 ? 900.0 : 0.0);
}

/* An instrument: its level, cadence, noise, clock, what it drifts by a day, and whether a fault dips it at day 30. */
static AntRecord *
instrument (double level, double step_d, double noise_ppm, AntTimeScale scale, double drift_ppm, gboolean faulty, uint64_t seed)
{
  gsize n = (gsize) (40.0 / step_d);
  AntRandom random;
  AntRecord *record = test_rows (n, 0.5 * step_d, step_d);
  ant_random_seed (&random, seed, 2);
  g_free (record->path);
  record->path = g_strdup ("instrument.txt");
  record->time.scale = scale;
  record->time.origin_known = TRUE;
  record->time.origin_jd1 = START_JD;
  record->time.origin_jd2 = 0.0;
  double ahead_d = scale == ANT_SCALE_TT ? 64.184 / ANT_SECONDS_PER_DAY : 0.0; /* TT runs ahead of UTC: the same number is earlier */
  for (gsize i = 0; i < n; i++)
    {
      double utc_d = record->time_d[i] - ahead_d, fault = faulty && fabs (utc_d - 30.0) < 0.2 ? -700.0 : 0.0;
      record->value[i] = level * (1.0 + (sun_ppm (utc_d) + drift_ppm * utc_d + fault + noise_ppm * ant_random_normal (&random)) * ANT_PPM);
    }
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  test_grid (record, &options);
  return record;
}

static AntComparison *
compared (AntRecord *a, AntRecord *b, double drift_d)
{
  g_autoptr (GError) error = NULL;
  AntComparison *comparison = ant_comparison_new (a, b, drift_d, &error);
  g_assert_no_error (error);
  return comparison;
}

static double
at (const AntComparison *comparison, const float *value, double time_d)
{
  return (double) value[(gsize) round ((time_d - comparison->start_d) / comparison->step_d)];
}

static void
what_both_see_is_no_ratio (void)
{
  g_autoptr (AntRecord) a = instrument (1361.0, 1.0 / 144.0, 10.0, ANT_SCALE_UTC, 0.0, TRUE, 1);
  g_autoptr (AntRecord) b = instrument (1365.4, 1.0 / 24.0, 10.0, ANT_SCALE_UTC, 0.0, FALSE, 2);
  g_autoptr (AntComparison) forth = compared (a, b, 0.0), back = compared (b, a, 0.0);
  g_assert_cmpfloat_with_epsilon (forth->step_d, 1.0 / 24.0, 1e-9); /* the coarser of the two */
  g_assert_cmpfloat_with_epsilon (back->step_d, 1.0 / 24.0, 1e-9);
  g_assert_cmpfloat_with_epsilon (forth->level_ratio, 1361.0 / 1365.4, 2e-5);
  g_assert_cmpuint (forth->n_both, >, 900);
  g_assert_cmpfloat (fabs (at (forth, forth->ratio_ppm, 20.3)), <, 50.0);            /* the Sun's dip is in both */
  g_assert_cmpfloat (at (forth, forth->witness_ppm, 20.3), <, -500.0);
  g_assert_cmpfloat_with_epsilon (at (forth, forth->ratio_ppm, 30.0), -700.0, 60.0); /* the fault is in one */
  g_assert_cmpfloat_with_epsilon (at (forth, forth->difference_ppm, 30.0), -700.0, 60.0);
  g_assert_cmpfloat_with_epsilon (at (back, back->ratio_ppm, 30.0), 700.0, 60.0);
  g_assert_cmpfloat (forth->ratio_scatter_ppm, <, 16.0); /* 10 ppm and 10 ppm over sqrt 6 */
}

static void
clocks_are_brought_together (void)
{
  g_autoptr (AntRecord) a = instrument (1361.0, 1.0 / 288.0, 5.0, ANT_SCALE_UTC, 0.0, FALSE, 3);
  g_autoptr (AntRecord) b = instrument (1361.0, 1.0 / 288.0, 5.0, ANT_SCALE_TT, 0.0, FALSE, 4);
  g_autoptr (AntComparison) comparison = compared (a, b, 0.0);
  g_assert_true (comparison->scales_known);
  g_assert_cmpfloat_with_epsilon (comparison->shift_d * ANT_SECONDS_PER_DAY, -64.184, 1e-3);
  b->time.scale = ANT_SCALE_UNKNOWN;
  g_autoptr (AntComparison) unsure = compared (a, b, 0.0);
  g_assert_false (unsure->scales_known);
  g_assert_cmpfloat (unsure->shift_d, ==, 0.0);
}

static void
a_drift_is_taken_out_on_request (void)
{
  g_autoptr (AntRecord) a = instrument (1361.0, 1.0 / 48.0, 10.0, ANT_SCALE_UTC, 25.0, TRUE, 5);
  g_autoptr (AntRecord) b = instrument (1361.0, 1.0 / 48.0, 10.0, ANT_SCALE_UTC, 0.0, FALSE, 6);
  g_autoptr (AntComparison) kept = compared (a, b, 0.0), taken = compared (a, b, 5.0);
  g_assert_cmpfloat_with_epsilon (at (kept, kept->ratio_ppm, 35.0) - at (kept, kept->ratio_ppm, 5.0), 750.0, 80.0);
  g_assert_cmpfloat_with_epsilon (at (taken, taken->ratio_ppm, 35.0) - at (taken, taken->ratio_ppm, 5.0), 0.0, 80.0);
  g_assert_cmpfloat_with_epsilon (at (taken, taken->ratio_ppm, 30.0), -700.0, 80.0); /* the fault stays */
}

/* Independent instruments share no noise; the Sun's own waves of days are no noise on the scale of hours. */
static void
independent_instruments_share_no_noise (void)
{
  g_autoptr (AntRecord) a = instrument (1361.0, 1.0 / 48.0, 50.0, ANT_SCALE_UTC, 0.0, FALSE, 7);
  g_autoptr (AntRecord) b = instrument (1361.0, 1.0 / 48.0, 80.0, ANT_SCALE_UTC, 0.0, FALSE, 8);
  g_autoptr (AntComparison) comparison = compared (a, b, 0.0);
  double sigma, r = ant_comparison_correlation (comparison, 1.2 / 24.0, &sigma);
  g_assert_cmpfloat (fabs (r), <, 4.0 * sigma);
  g_assert_cmpfloat (sigma, <, 0.1);
  g_assert_cmpfloat_with_epsilon (comparison->common[0].rms_a_ppm, 50.0 / sqrt (2.0), 4.0);
  g_assert_cmpfloat_with_epsilon (comparison->common[0].rms_b_ppm, 80.0 / sqrt (2.0), 6.0);
}

static void
what_has_no_common_clock_is_refused (void)
{
  g_autoptr (AntRecord) a = instrument (1361.0, 1.0 / 24.0, 10.0, ANT_SCALE_UTC, 0.0, FALSE, 9);
  g_autoptr (AntRecord) b = instrument (1361.0, 1.0 / 24.0, 10.0, ANT_SCALE_UTC, 0.0, FALSE, 10);
  g_autoptr (GError) no_origin = NULL, no_overlap = NULL;
  b->time.origin_jd1 += 400.0;
  g_assert_null (ant_comparison_new (a, b, 0.0, &no_overlap));
  g_assert_error (no_overlap, ANT_ERROR, ANT_ERROR_USAGE);
  g_assert_nonnull (strstr (no_overlap->message, "in common"));
  b->time.origin_known = FALSE;
  g_assert_null (ant_comparison_new (a, b, 0.0, &no_origin));
  g_assert_nonnull (strstr (no_origin->message, "no known origin"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/comparison/what-both-see-is-no-ratio", what_both_see_is_no_ratio);
  g_test_add_func ("/data/comparison/clocks-are-brought-together", clocks_are_brought_together);
  g_test_add_func ("/data/comparison/a-drift-is-taken-out-on-request", a_drift_is_taken_out_on_request);
  g_test_add_func ("/data/comparison/independent-instruments-share-no-noise", independent_instruments_share_no_noise);
  g_test_add_func ("/data/comparison/what-has-no-common-clock-is-refused", what_has_no_common_clock_is_refused);
  return g_test_run ();
}
