/* test-repeat-results.c - repeats are kept to the last digit, settings that cannot be are refused in a line. */
#include <glib.h>
#include <math.h>
#include <string.h>

#include "data/error.h"
#include "data/repeat-results-text.h"
#include "data/repeat-words.h"

static AntRepeatResults
some_results (void)
{
  AntRepeatResults results = { .searched = 1, .done = 1, .period_min_d = 0.5, .period_max_d = 20.1, .least_events = 3,
                               .threshold_snr = 7.3125, .expected_at_threshold = 0.01, .n_mirrored = 0, .best_mirrored_snr = 6.1 };
  results.n = 1;
  results.repeat = g_new0 (AntRepeat, 1);
  results.repeat[0] = (AntRepeat) { .period_d = 100.0 / 7, .period_sigma_d = 0.001, .epoch_d = 31.7, .epoch_sigma_d = 0.01,
                                    .duration_d = 0.25, .depth_ppm = 84.1, .depth_sigma_ppm = 5.2, .snr = 16.3,
                                    .snr_without_largest = 12, .snr_unlisted = 9.5, .odd_even = 0.7, .chi2 = 2.1,
                                    .expected_false = 1e-30, .n_observed = 3, .n_events = 2 };
  results.repeat[0].event = g_new0 (AntRepeatEvent, 2);
  results.repeat[0].event[0] = (AntRepeatEvent) { .mid_d = 31.7 - 100.0 / 7, .depth_ppm = 80, .sigma_ppm = 9, .snr = 8.9,
                                                  .coverage = 0.75, .number = -1, .dip = 4 };
  results.repeat[0].event[1] = (AntRepeatEvent) { .mid_d = 31.7, .depth_ppm = 88, .sigma_ppm = 9, .snr = 9.8, .coverage = 1 };
  for (gsize k = 0; k < ANT_REPEAT_ALIASES; k++)
    results.repeat[0].alias[k].snr = 5 + 0.1 * (double) k;
  ant_repeat_name_aliases (&results.repeat[0]);
  results.n_periods = 3;
  results.period_d = g_memdup2 ((double[]) { 1, 2.5, 100.0 / 7 }, 3 * sizeof (double));
  results.period_snr = g_memdup2 ((double[]) { 4.2, 5, 16.1 }, 3 * sizeof (double));
  results.period_duration_h = g_memdup2 ((double[]) { 1, 2, 6 }, 3 * sizeof (double));
  return results;
}

static void
test_kept (void)
{
  AntRepeatResults before = some_results (), after = { 0 };
  g_autoptr (JsonObject) object = json_object_new ();
  g_autoptr (GError) error = NULL;
  ant_repeat_results_put (object, &before);
  g_assert_true (ant_repeat_results_get (object, &after, &error));
  g_assert_no_error (error);
  g_assert_cmpmem (before.repeat[0].event, 2 * sizeof (AntRepeatEvent), after.repeat[0].event, 2 * sizeof (AntRepeatEvent));
  after.repeat[0].event = (g_free (after.repeat[0].event), before.repeat[0].event);
  g_assert_cmpmem (before.repeat, sizeof (AntRepeat), after.repeat, sizeof (AntRepeat));
  after.repeat[0].event = NULL;
  g_assert_cmpuint (after.n_periods, ==, 3);
  g_assert_cmpmem (before.period_d, 3 * sizeof (double), after.period_d, 3 * sizeof (double));
  g_assert_cmpfloat (before.threshold_snr, ==, after.threshold_snr);
  ant_repeat_results_clear (&before);
  ant_repeat_results_clear (&after);
}

static void
test_older_files (void)
{
  AntRepeatResults results = { 0 };
  g_autoptr (JsonObject) object = json_object_new ();
  g_assert_true (ant_repeat_results_get (object, &results, NULL));
  g_assert_cmpuint (results.searched, ==, 0);
}

static void
test_nonsense (void)
{
  AntRepeatResults before = some_results (), after = { 0 };
  g_autoptr (JsonObject) object = json_object_new ();
  g_autoptr (GError) error = NULL;
  before.repeat[0].duration_d = 20;
  ant_repeat_results_put (object, &before);
  g_assert_false (ant_repeat_results_get (object, &after, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  g_assert_nonnull (strstr (error->message, "repeats.list[0].period_d"));
  ant_repeat_results_clear (&before);
  ant_repeat_results_clear (&after);
}

static void
test_settings (void)
{
  static const struct
  {
    const char *assign, *names;
  } wrong[] = {
    { "repeat-period-max=0.4", "repeat-period-min" },
    { "repeat-period-max=30", "at most 20" },
    { "repeat-longest=0.1", "repeat-shortest" },
  };
  float value[2000] = { 0 };
  g_autoptr (AntRecord) record = ant_record_new ();
  record->series = (AntSeries) { .n = 2000, .step_d = 0.02, .value_ppm = value };
  record->exposure_d = 0.02;
  for (gsize i = 0; i < G_N_ELEMENTS (wrong); i++)
    {
      AntSettings settings;
      g_autoptr (GError) error = NULL;
      ant_settings_init (&settings);
      g_assert_true (ant_repeat_results_check (record, &settings, NULL));
      g_assert_true (ant_settings_assign (&settings, wrong[i].assign, NULL));
      g_assert_false (ant_repeat_results_check (record, &settings, &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
      g_assert_nonnull (strstr (error->message, wrong[i].names));
      g_assert_null (strchr (error->message, '\n'));
    }
  record->series = (AntSeries) { 0 };
}

static void
test_short_record (void)
{
  float value[60] = { 0 };
  g_autoptr (AntRecord) record = ant_record_new ();
  g_autoptr (GPtrArray) said = g_ptr_array_new_with_free_func (g_free);
  AntSettings settings;
  AntRepeatResults results = { 0 };
  ant_settings_init (&settings);
  record->series = (AntSeries) { .n = 60, .step_d = 0.01, .value_ppm = value };
  record->exposure_d = 0.01;
  g_assert_true (ant_repeat_results_check (record, &settings, NULL));
  ant_repeat_results_say (&results, record, &settings, said);
  g_assert_cmpuint (said->len, ==, 1);
  g_assert_nonnull (strstr (said->pdata[0], "No period was searched"));
  record->series = (AntSeries) { 0 };
}

static void
test_peak_above_threshold (void)
{
  AntRepeatResults results = some_results ();
  gsize n = results.n;
  g_autofree char *listed = ant_repeat_summary (&results);
  results.n = 0;
  g_autofree char *peak = ant_repeat_summary (&results); /* its best bin has SNR 16.1 */
  results.threshold_snr = 17;
  g_autofree char *none = ant_repeat_summary (&results);
  g_assert_null (strstr (listed, "Peaks above"));
  g_assert_nonnull (strstr (peak, "Peaks above"));
  g_assert_null (strstr (none, "Peaks above"));
  results.n = n;
  ant_repeat_results_clear (&results);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/repeat-results/are-kept-to-the-last-digit", test_kept);
  g_test_add_func ("/data/repeat-results/files-from-before-have-none", test_older_files);
  g_test_add_func ("/data/repeat-results/nonsense-names-its-place", test_nonsense);
  g_test_add_func ("/data/repeat-results/impossible-settings-are-refused", test_settings);
  g_test_add_func ("/data/repeat-results/a-short-record-is-told-in-words", test_short_record);
  g_test_add_func ("/data/repeat-results/a-peak-that-is-not-listed-is-explained", test_peak_above_threshold);
  return g_test_run ();
}
