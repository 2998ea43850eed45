/* test-record-grid.c - rows become a uniform grid in ppm: what is laid, what is set aside, what is refused. */
#include <math.h>
#include <string.h>
#include "core/robust.h"
#include "data/record-slip.h"
#include "rows.h"

#define MINUTE (1.0 / 1440.0)

static const AntGridOptions plain = ANT_GRID_OPTIONS_INIT;

static void
test_even_rows (void)
{
  g_autoptr (AntRecord) record = test_rows (500, 3.0, 10.0 * MINUTE);
  test_grid (record, &plain);
  g_assert_cmpuint (record->series.n, ==, 500);
  g_assert_cmpfloat_with_epsilon (record->series.step_d, 10.0 * MINUTE, 1e-12);
  g_assert_cmpfloat_with_epsilon (record->series.start_d, 3.0, 1e-9);
  double work[500];
  g_assert_cmpfloat_with_epsilon (record->median, ant_median (500, record->value, work), 1e-9);
  for (gsize i = 0; i < 500; i++)
    {
      g_assert_cmpint (record->place[i], ==, (gint64) i);
      double ppm = (record->value[i] / record->median - 1.0) * 1e6;
      g_assert_cmpfloat_with_epsilon ((double) record->series.value_ppm[i], ppm, 1e-4);
    }
  g_assert_null (record->series.bin_count);
  g_assert_cmpuint (record->gaps->len, ==, 0);
  g_assert_true (test_said (record, "Cadence 10 min"));
  g_assert_true (test_said (record, "exposure of a sample is unknown"));
}

static void
test_gaps (void)
{
  g_autoptr (AntRecord) record = test_rows (300, 0.0, 1.0);
  for (gsize i = 0; i < 300; i++)
    record->time_d[i] += i >= 100 ? 7.0 : 0.0; /* seven rows missing */
  record->value[50] = NAN;                     /* a single place: no gap */
  record->value[200] = record->value[201] = NAN;
  test_grid (record, &plain);
  g_assert_cmpuint (record->series.n, ==, 307);
  g_assert_cmpuint (record->gaps->len, ==, 2);
  AntSpan first = g_array_index (record->gaps, AntSpan, 0), second = g_array_index (record->gaps, AntSpan, 1);
  g_assert_cmpfloat_with_epsilon (first.start_d, 99.5, 1e-6);
  g_assert_cmpfloat_with_epsilon (first.end_d, 106.5, 1e-6);
  g_assert_cmpfloat_with_epsilon (second.start_d, 206.5, 1e-6);
  g_assert_cmpfloat_with_epsilon (second.end_d, 208.5, 1e-6);
  g_assert_true (test_said (record, "297 of 307 places"));
}

/* The order of the rows in the file is of no consequence. */
static void
test_shuffled (void)
{
  g_autoptr (AntRecord) sorted = test_rows (400, 0.0, 0.25), shuffled = test_rows (400, 0.0, 0.25);
  for (gsize i = 10; i + 40 < 400; i += 40)
    {
      gsize j = i + 17;
      double t = shuffled->time_d[i], v = shuffled->value[i];
      shuffled->time_d[i] = shuffled->time_d[j];
      shuffled->value[i] = shuffled->value[j];
      shuffled->time_d[j] = t;
      shuffled->value[j] = v;
    }
  test_grid (sorted, &plain);
  test_grid (shuffled, &plain);
  g_assert_cmpmem (sorted->series.value_ppm, 400 * sizeof (float), shuffled->series.value_ppm, 400 * sizeof (float));
}

static void
test_scale_free (void)
{
  g_autoptr (AntRecord) usual = test_rows (200, 0.0, 0.1);
  g_autoptr (AntRecord) tiny = test_rows (200, 0.0, 0.1), huge = test_rows (200, 0.0, 0.1);
  for (gsize i = 0; i < 200; i++)
    {
      tiny->value[i] *= 1e-300;
      huge->value[i] *= 1e300;
    }
  test_grid (usual, &plain);
  test_grid (tiny, &plain);
  test_grid (huge, &plain);
  for (gsize i = 0; i < 200; i++)
    {
      g_assert_cmpfloat_with_epsilon ((double) tiny->series.value_ppm[i], (double) usual->series.value_ppm[i], 1e-4);
      g_assert_cmpfloat_with_epsilon ((double) huge->series.value_ppm[i], (double) usual->series.value_ppm[i], 1e-4);
    }
}

static void
test_wild_values (void)
{
  g_autoptr (AntRecord) record = test_rows (200, 0.0, 0.1);
  record->value[20] = 1e300;
  record->value[30] = -1e34;
  record->value[40] = 1e-300;
  test_grid (record, &plain);
  g_assert_cmpuint (record->flags[20], ==, ANT_FLAG_FILL);
  g_assert_cmpuint (record->flags[30], ==, ANT_FLAG_FILL);
  g_assert_cmpuint (record->flags[40], ==, ANT_FLAG_DARK);
  g_assert_true (test_said (record, "first at line 21"));
  for (gsize i = 0; i < 200; i++)
    g_assert_true (isnan (record->series.value_ppm[i]) || fabsf (record->series.value_ppm[i]) < 1e3f);
}

static void
test_stamps (void)
{
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  options.exposure_d = 6.0 * MINUTE;
  static const AntStampPlace stamps[] = { ANT_AT_START, ANT_AT_MIDDLE, ANT_AT_END };
  for (int i = 0; i < 3; i++)
    {
      g_autoptr (AntRecord) record = test_rows (100, 1.0, 10.0 * MINUTE);
      options.stamp = stamps[i];
      test_grid (record, &options);
      g_assert_cmpfloat_with_epsilon (record->series.start_d, 1.0 + (1 - i) * 3.0 * MINUTE, 1e-9);
      g_assert_true (record->exposure_known);
    }
}

static void
test_unknowns_are_said (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 1.0, 10.0 * MINUTE);
  record->stamp = ANT_AT_UNKNOWN;
  test_grid (record, &plain);
  g_assert_false (record->exposure_known);
  g_assert_cmpfloat (record->exposure_d, ==, record->cadence_d);
  g_assert_true (test_said (record, "What the time stamps mark is unknown"));
  g_assert_true (test_said (record, "taken as the cadence, 10 min"));
}

static void
test_limits_trim_the_grid (void)
{
  g_autoptr (AntRecord) record = test_rows (1000, 0.0, 1.0);
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  options.from_d = 99.5;
  options.to_d = 299.5;
  test_grid (record, &options);
  g_assert_cmpuint (record->series.n, ==, 200);
  g_assert_cmpfloat_with_epsilon (record->series.start_d, 100.0, 1e-6);
  g_assert_cmpint (record->place[99], ==, -1);
  g_assert_cmpint (record->place[100], ==, 0);
  g_assert_cmpuint (record->flags[99], ==, ANT_FLAG_EXCLUDED);
}

/* One row far away in time would ask for a grid without bound. */
static void
test_rogue_time (void)
{
  g_autoptr (AntRecord) record = test_rows (200, 0.0, 10.0 * MINUTE);
  record->time_d[199] = 1e9;
  test_refused (record, &plain, "lines 1 to 200");
}

/* The same row does no harm if it is not used, or cut off by the limits of the scan. */
static void
test_rogue_time_left_out (void)
{
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  for (int way = 0; way < 2; way++)
    {
      g_autoptr (AntRecord) record = test_rows (200, 0.0, 10.0 * MINUTE);
      record->time_d[199] = 1e200;
      if (way == 0)
        record->value[199] = NAN;
      else
        options.to_d = 100.0;
      test_grid (record, &options);
      g_assert_cmpuint (record->series.n, ==, 199);
      g_assert_cmpint (record->place[199], ==, -1);
    }
}

static void
test_eclipse (void)
{
  g_autoptr (AntRecord) record = test_rows (4000, 0.0, 10.0 * MINUTE);
  for (gsize i = 1000; i < 1030; i++)
    record->value[i] *= 0.6;
  record->value[2000] *= 1.02;
  test_grid (record, &plain);
  g_assert_cmpuint (record->dark_spans->len, ==, 2);
  AntSpan span = g_array_index (record->dark_spans, AntSpan, 0);
  g_assert_cmpfloat_with_epsilon (span.start_d, 999.5 * 10.0 * MINUTE, 1e-6);
  g_assert_cmpfloat_with_epsilon (span.end_d, 1029.5 * 10.0 * MINUTE, 1e-6);
  for (gsize i = 0; i < 4000; i++)
    {
      gboolean dark = (i >= 1000 && i < 1030) || i == 2000;
      g_assert_cmpuint (record->flags[i], ==, dark ? ANT_FLAG_DARK : 0);
      g_assert_cmpint (isnan (record->series.value_ppm[i]), ==, dark);
    }
  g_assert_true (test_said (record, "31 rows in 2 spans"));
}

static void
test_dip_is_not_dark (void)
{
  g_autoptr (AntRecord) record = test_rows (4000, 0.0, 10.0 * MINUTE);
  for (gsize i = 1000; i < 1030; i++)
    record->value[i] *= 0.995;
  test_grid (record, &plain);
  g_assert_cmpuint (record->dark_spans->len, ==, 0);
}

static void
test_night_is_refused (void)
{
  static const double night[] = { 0.3, 0.5, 0.6 };
  for (int k = 0; k < 3; k++)
    {
      g_autoptr (AntRecord) record = test_rows (10 * 144, 0.0, 10.0 * MINUTE);
      for (gsize i = 0; i < record->n_rows; i++)
        if (fmod (record->time_d[i], 1.0) < night[k])
          record->value[i] *= 0.002;
      test_refused (record, &plain, "not the usual level");
    }
}

/* The Sun's arc over a ground station in less than a day is used, half a night beside it is not. */
static void
test_a_chosen_daylight_is_used (void)
{
  for (int night = 0; night < 2; night++)
    {
      g_autoptr (AntRecord) record = test_rows (3 * 1440, 0.0, MINUTE);
      for (gsize i = 0; i < record->n_rows; i++)
        {
          double hour = 24.0 * fmod (record->time_d[i], 1.0), arc = cos ((hour - 12.0) * G_PI / 12.0);
          record->value[i] *= fmax (arc, 0.001);
        }
      AntGridOptions options = ANT_GRID_OPTIONS_INIT;
      options.from_d = 1.0 + (night ? 1.0 : 8.0) / 24.0;
      options.to_d = 1.0 + 13.0 / 24.0;
      if (night)
        {
          test_refused (record, &options, "not the usual level");
          continue;
        }
      test_grid (record, &options);
      g_assert_cmpuint (record->series.n, >=, 300);
      g_assert_cmpuint (record->dark_spans->len, ==, 0);
      g_assert_true (test_said (record, "in less than a day"));
      for (gsize i = 0; i < record->series.n; i++)
        g_assert_false (isnan (record->series.value_ppm[i]));
    }
}

/* Nights longer than the window: the running median follows each level, so that nothing is far from it. */
static void
test_polar_night_is_refused (void)
{
  g_autoptr (AntRecord) record = test_rows (200 * 24, 0.0, 1.0 / 24.0);
  for (gsize i = 0; i < record->n_rows; i++)
    if (fmod (record->time_d[i], 40.0) < 16.0)
      record->value[i] *= 0.002;
  test_refused (record, &plain, "not the usual level");
}

static void
test_too_few (void)
{
  g_autoptr (AntRecord) record = test_rows (60, 0.0, 1.0);
  for (gsize i = 0; i < 11; i++)
    record->value[i] = NAN;
  test_refused (record, &plain, "49 of 60 rows are good (fill 11): expected at least 50");
}

static void
test_no_rows (void)
{
  g_autoptr (AntRecord) record = test_rows (0, 0.0, 1.0);
  test_refused (record, &plain, "0 of 0 rows are good");
}

static void
test_constant (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 0.0, 1.0);
  for (gsize i = 0; i < 100; i++)
    record->value[i] = 1361.25;
  test_refused (record, &plain, "every good value is 1361.25");
}

static void
test_no_level (void)
{
  for (int sign = -1; sign <= 0; sign++)
    {
      g_autoptr (AntRecord) record = test_rows (100, 0.0, 1.0);
      for (gsize i = 0; i < 100; i++)
        record->value[i] = sign < 0 ? -record->value[i] : (double) i - 49.5;
      test_refused (record, &plain, "level above 0");
    }
}

static void
test_backwards (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 0.0, -1.0);
  test_refused (record, &plain, "line 2: the time goes back");
}

static void
test_errors_kept (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 0.0, 1.0);
  record->error = g_new (double, 100);
  for (gsize i = 0; i < 100; i++)
    record->error[i] = 0.01 + 0.001 * (double) i;
  record->error[7] = 0.0;
  record->error[8] = NAN;
  test_grid (record, &plain);
  for (gsize i = 0; i < 100; i++)
    if (i != 7 && i != 8)
      g_assert_cmpfloat_with_epsilon ((double) record->series.error_ppm[i], record->error[i] / record->median * 1e6,
                                      1e-3);
  g_assert_cmpfloat_with_epsilon ((double) record->series.error_ppm[7], 0.0604 / record->median * 1e6, 0.5);
  g_assert_cmpfloat (record->series.error_ppm[7], ==, record->series.error_ppm[8]);
  g_assert_true (test_said (record, "median of the others: 2"));
}

static void
test_errors_dropped (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 0.0, 1.0);
  record->error = g_new0 (double, 100);
  record->error[5] = 0.1;
  test_grid (record, &plain);
  g_assert_null (record->series.error_ppm);
  g_assert_true (test_said (record, "error column is not used: 1 of 100"));
}

/* Ten samples a bin: each place holds their mean, its count, and the error of the mean. */
static void
test_bins (void)
{
  g_autoptr (AntRecord) record = test_rows (2000, 0.0, MINUTE);
  record->error = g_new (double, 2000);
  for (gsize i = 0; i < 2000; i++)
    record->error[i] = 0.02 + 0.01 * (double) (i % 3);
  record->value[777] = NAN;
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  options.cadence_d = 10.0 * MINUTE;
  test_grid (record, &options);
  gsize n = record->series.n;
  g_autofree double *sum = g_new0 (double, n), *count = g_new0 (double, n), *variance = g_new0 (double, n);
  for (gsize i = 0; i < 2000; i++)
    if (record->flags[i] == 0)
      {
        sum[record->place[i]] += (record->value[i] / record->median - 1.0) * 1e6;
        variance[record->place[i]] += pow (record->error[i] / record->median * 1e6, 2.0);
        count[record->place[i]] += 1.0;
      }
  g_assert_nonnull (record->series.bin_count);
  double total = 0.0;
  for (gsize i = 0; i < n; i++)
    {
      total += (double) record->series.bin_count[i];
      g_assert_cmpfloat ((double) record->series.bin_count[i], ==, count[i]);
      g_assert_cmpfloat_with_epsilon ((double) record->series.value_ppm[i], sum[i] / count[i], 1e-3);
      g_assert_cmpfloat_with_epsilon ((double) record->series.error_ppm[i], sqrt (variance[i]) / count[i], 1e-4);
    }
  g_assert_cmpfloat (total, ==, 1999.0);
}

/* Times that wander by a third of a step: said as coarse, each sample near its place. */
static void
test_coarse_jitter (void)
{
  g_autoptr (AntRecord) record = test_rows (3000, 0.0, 1.0);
  g_autoptr (GRand) random = g_rand_new_with_seed (6);
  for (gsize i = 0; i < 3000; i++)
    record->time_d[i] += g_rand_double_range (random, -0.33, 0.33);
  test_grid (record, &plain);
  g_assert_true (test_said (record, "a quarter step or more"));
  for (gsize i = 0; i < 3000; i++)
    {
      double off = record->time_d[i] - ant_series_time (&record->series, (double) record->place[i]);
      g_assert_cmpfloat (fabs (off), <=, 0.61 * record->series.step_d);
    }
}

/* Stamps at the barycentre run 499 s early and late in a year: every sample stays near its place, and grid times go back to
 * the stamps to a second, wherever the clock slips by a step. */
static void
test_a_slipping_clock_is_followed (void)
{
  for (int minutes = 1; minutes <= 30; minutes += 29)
    {
      gsize n = (gsize) (200.0 / (minutes * MINUTE));
      g_autoptr (AntRecord) record = test_rows (n, 0.0, minutes * MINUTE);
      for (gsize i = 0; i < n; i++)
        record->time_d[i] += 499.0 / 86400.0 * sin (2.0 * G_PI * record->time_d[i] / 365.25);
      test_grid (record, &plain);
      if (minutes == 30)
        {
          g_assert_null (record->slip_d); /* 499 s of 1800 are a quarter step only at the ends, which the slope takes up */
          continue;
        }
      g_assert_nonnull (record->slip_d);
      g_assert_true (test_said (record, "the clock wanders"));
      for (gsize i = 0; i < n; i++)
        {
          double grid_d = ant_series_time (&record->series, (double) record->place[i]);
          g_assert_cmpfloat (fabs (record->time_d[i] - grid_d), <, 0.61 * record->series.step_d);
        }
      for (double hours = 20.0; hours < 4780.0; hours += 7.3)
        {
          gsize i = (gsize) (hours * 60.0 / minutes), half = 300; /* contacts at rows of which the stamps are known */
          double first_d = ant_series_time (&record->series, (double) record->place[i - half]);
          double last_d = ant_series_time (&record->series, (double) record->place[i + half]);
          AntDip dip = { .mid_d = 0.5 * (first_d + last_d), .duration_d = last_d - first_d };
          ant_record_unslip (record, 1, &dip);
          /* A step that is left out or doubled within two places of a contact is met on the way. */
          gboolean near = fabs (dip.mid_d - 0.5 * (record->time_d[i - half] + record->time_d[i + half])) * 86400.0 < 1.0;
          gboolean steps = FALSE;
          for (gsize k = 0; k < 6; k++)
            steps |= record->place[i - half + k - 2] - record->place[i - half + k - 3] != 1
                     || record->place[i + half + k - 2] - record->place[i + half + k - 3] != 1;
          g_assert_true (near || steps);
        }
    }
}

static void
test_spikes_stay (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 0.0, 1.0);
  record->flags[42] = ANT_FLAG_SPIKE;
  record->flags[43] = ANT_FLAG_HAND;
  test_grid (record, &plain);
  g_assert_false (isnan (record->series.value_ppm[42]));
  g_assert_cmpuint (record->series.spike[42], ==, 1);
  g_assert_true (isnan (record->series.value_ppm[43]));
}

/* Whatever the rows hold, they are refused in a sentence or laid so that used rows and places agree. */
static void
test_any_rows (void)
{
  static const double odd[] = { NAN, INFINITY, -INFINITY, 1e300, -1e300, 1e-300, 0.0, -0.0, 4.9e-324, -99.0, 1e17 };
  g_autoptr (GRand) random = g_rand_new_with_seed (7);
  int n_made = 0;
  for (int trial = 0; trial < 400; trial++)
    {
      g_autoptr (AntRecord) record = test_rows (60 + (gsize) g_rand_int_range (random, 0, 200), 0.0, 1.0);
      g_autoptr (GError) error = NULL;
      for (int k = g_rand_int_range (random, 0, 1 << g_rand_int_range (random, 1, 7)); k > 0; k--)
        {
          gsize i = (gsize) g_rand_int_range (random, 0, (gint32) record->n_rows);
          double *array = g_rand_boolean (random) ? record->value : record->time_d;
          array[i] = g_rand_boolean (random) ? odd[g_rand_int_range (random, 0, G_N_ELEMENTS (odd))]
                                             : array[(gsize) g_rand_int_range (random, 0, (gint32) record->n_rows)];
        }
      if (!ant_record_make_grid (record, &plain, &error))
        {
          g_assert_nonnull (error);
          continue;
        }
      n_made++;
      gsize n_used = 0;
      for (gsize i = 0; i < record->n_rows; i++)
        {
          g_assert_cmpint (record->place[i], <, (gint64) record->series.n);
          if (record->flags[i] != 0)
            continue;
          n_used++;
          g_assert_cmpint (record->place[i], >=, 0);
          g_assert_true (isfinite (record->series.value_ppm[record->place[i]]));
        }
      g_assert_cmpuint (n_used, >=, 50);
      g_assert_cmpuint (ant_series_observed (&record->series, FALSE), <=, n_used);
    }
  g_assert_cmpint (n_made, >, 50);
}

static void
test_bad_options (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 0.0, 1.0);
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  options.from_d = 5.0;
  options.to_d = 4.0;
  g_autoptr (GError) error = NULL;
  g_assert_false (ant_record_make_grid (record, &options, &error));
  g_assert_cmpstr (error->message, ==, "the scan ends before it begins");
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/record-grid/even-rows-fill-an-even-grid", test_even_rows);
  g_test_add_func ("/data/record-grid/missing-and-fill-rows-leave-gaps", test_gaps);
  g_test_add_func ("/data/record-grid/the-order-of-rows-is-of-no-consequence", test_shuffled);
  g_test_add_func ("/data/record-grid/ppm-do-not-depend-on-the-unit", test_scale_free);
  g_test_add_func ("/data/record-grid/wild-values-are-set-aside", test_wild_values);
  g_test_add_func ("/data/record-grid/stamps-at-start-and-end-shift-by-half-an-exposure", test_stamps);
  g_test_add_func ("/data/record-grid/unknown-exposure-and-stamp-are-said", test_unknowns_are_said);
  g_test_add_func ("/data/record-grid/limits-trim-the-grid", test_limits_trim_the_grid);
  g_test_add_func ("/data/record-grid/a-rogue-time-is-refused", test_rogue_time);
  g_test_add_func ("/data/record-grid/a-rogue-time-left-out-does-no-harm", test_rogue_time_left_out);
  g_test_add_func ("/data/record-grid/an-eclipse-is-set-aside-as-a-span", test_eclipse);
  g_test_add_func ("/data/record-grid/a-shallow-dip-is-not-dark", test_dip_is_not_dark);
  g_test_add_func ("/data/record-grid/nights-are-refused", test_night_is_refused);
  g_test_add_func ("/data/record-grid/a-slipping-clock-is-followed", test_a_slipping_clock_is_followed);
  g_test_add_func ("/data/record-grid/a-chosen-daylight-is-used-whole", test_a_chosen_daylight_is_used);
  g_test_add_func ("/data/record-grid/polar-nights-are-refused", test_polar_night_is_refused);
  g_test_add_func ("/data/record-grid/fewer-than-fifty-good-rows-are-refused", test_too_few);
  g_test_add_func ("/data/record-grid/no-rows-are-refused", test_no_rows);
  g_test_add_func ("/data/record-grid/a-constant-record-is-refused", test_constant);
  g_test_add_func ("/data/record-grid/a-level-of-zero-or-less-is-refused", test_no_level);
  g_test_add_func ("/data/record-grid/times-that-run-backwards-are-refused", test_backwards);
  g_test_add_func ("/data/record-grid/stated-errors-become-ppm", test_errors_kept);
  g_test_add_func ("/data/record-grid/an-error-column-of-zeros-is-dropped", test_errors_dropped);
  g_test_add_func ("/data/record-grid/bins-hold-mean-count-and-error-of-the-mean", test_bins);
  g_test_add_func ("/data/record-grid/coarse-jitter-is-binned-near-its-times", test_coarse_jitter);
  g_test_add_func ("/data/record-grid/spikes-stay-and-hand-masks-do-not", test_spikes_stay);
  g_test_add_func ("/data/record-grid/any-rows-are-laid-or-refused", test_any_rows);
  g_test_add_func ("/data/record-grid/limits-in-the-wrong-order-are-a-usage-error", test_bad_options);
  return g_test_run ();
}
