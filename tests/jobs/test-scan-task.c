/* test-scan-task.c - opening and scanning off the main loop: the loop stays awake, progress rises, stopping stops. */
#include "jobs/scan-task.h"

#include <fftw3.h>
#include <glib/gstdio.h>
#include <gsl/gsl_errno.h>
#include <math.h>

#include "jobs/open-task.h"

/* The loop must come round at least this often while others work, on a machine that may be busy. */
#define LONGEST_MS 100

typedef struct
{
  gboolean done, monotone;
  guint reports;
  double fraction;
  AntLayers *layers;
  AntScanOutcome *outcome;
  GError *error;
  gint64 last_us, longest_us;
} Watch;

static char *
write_record (gsize rows)
{
  GString *text = g_string_new ("time_jd,irradiance (W/m2)\n");
  guint32 state = 1;
  for (gsize i = 0; i < rows; i++)
    {
      double noise = (double) (state = state * 1664525u + 1013904223u) / 4294967296.0 - 0.5;
      g_string_append_printf (text, "%.8f,%.6f\n", 2466583.5 + (double) i / 288, 1361 * (1 + 60e-6 * noise));
    }
  char *path = NULL;
  g_close (g_file_open_tmp (NULL, &path, NULL), NULL);
  g_assert_true (g_file_set_contents (path, text->str, (gssize) text->len, NULL));
  g_string_free (text, TRUE);
  return path;
}

static void
opened_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  Watch *watch = data;
  watch->layers = ant_open_task_finish (result, &watch->error);
  watch->done = TRUE;
}

static void
scanned_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  Watch *watch = data;
  watch->outcome = ant_scan_task_finish (result, &watch->error);
  watch->done = TRUE;
}

static void
progress_cb (const AntTaskProgress *progress, gpointer data)
{
  Watch *watch = data;
  g_assert_false (watch->done);
  watch->monotone = watch->monotone && progress->fraction >= watch->fraction;
  watch->fraction = progress->fraction;
  watch->reports++;
}

static gboolean
tick_cb (gpointer data)
{
  Watch *watch = data;
  gint64 now_us = g_get_monotonic_time ();
  if (watch->last_us > 0)
    watch->longest_us = MAX (watch->longest_us, now_us - watch->last_us);
  watch->last_us = now_us;
  return G_SOURCE_CONTINUE;
}

static void
wait_until_done (Watch *watch)
{
  guint ticking = g_timeout_add (5, tick_cb, watch);
  while (!watch->done)
    g_main_context_iteration (NULL, TRUE);
  g_source_remove (ticking);
}

static AntLayers *
open_record (const char *path)
{
  Watch watch = { 0 };
  g_autoptr (AntTreatment) treatment = ant_treatment_new ();
  ant_open_task_async (path, treatment, NULL, NULL, NULL, opened_cb, &watch);
  wait_until_done (&watch);
  g_assert_no_error (watch.error);
  return watch.layers;
}

static void
opening_prepares_curve_residual_and_averages (void)
{
  g_autofree char *path = write_record (2880);
  g_autoptr (AntLayers) layers = open_record (path);
  g_remove (path);
  g_assert_cmpuint (layers->record->series.n, ==, 2880);
  g_assert_cmpuint (ant_pyramid_samples (layers->residual), ==, 2880);
  for (gsize i = 0; i < 2880; i += 97)
    g_assert_cmpfloat_with_epsilon ((double) (layers->curve_ppm[i] + layers->residual_ppm[i]),
                                    (double) layers->record->series.value_ppm[i], 1e-3);
  g_assert_nonnull (ant_averages_level (layers->value_averages[0], 1));
}

static void
a_missing_file_is_named_in_the_error (void)
{
  Watch watch = { 0 };
  g_autoptr (AntTreatment) treatment = ant_treatment_new ();
  ant_open_task_async ("no-such-record.csv", treatment, NULL, NULL, NULL, opened_cb, &watch);
  wait_until_done (&watch);
  g_assert_null (watch.layers);
  g_assert_nonnull (strstr (watch.error->message, "no-such-record.csv"));
  g_error_free (watch.error);
}

static void
progress_rises_and_the_loop_stays_awake (void)
{
  g_autofree char *path = write_record (40 * 288);
  g_autoptr (AntLayers) layers = open_record (path);
  g_remove (path);
  Watch watch = { .monotone = TRUE };
  AntSettings settings;
  ant_settings_init (&settings);
  ant_scan_task_async (layers, &settings, NULL, NULL, NULL, NULL, progress_cb, scanned_cb, &watch);
  wait_until_done (&watch);
  g_assert_no_error (watch.error);
  g_assert_true (watch.monotone);
  g_assert_cmpuint (watch.reports, >, 0);
  g_assert_cmpint (watch.longest_us / 1000, <, LONGEST_MS);
  g_assert_true (watch.outcome->results->record == layers->record);
  ant_scan_outcome_free (watch.outcome);
}

static void
a_stopped_scan_says_so (void)
{
  g_autofree char *path = write_record (40 * 288);
  g_autoptr (AntLayers) layers = open_record (path);
  g_autoptr (GCancellable) stop = g_cancellable_new ();
  g_remove (path);
  Watch watch = { 0 };
  AntSettings settings;
  ant_settings_init (&settings);
  ant_scan_task_async (layers, &settings, NULL, NULL, NULL, stop, NULL, scanned_cb, &watch);
  g_cancellable_cancel (stop);
  wait_until_done (&watch);
  g_assert_error (watch.error, G_IO_ERROR, G_IO_ERROR_CANCELLED);
  g_assert_null (watch.outcome);
  g_error_free (watch.error);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  gsl_set_error_handler_off ();
  fftw_make_planner_thread_safe ();
  g_test_add_func ("/jobs/scan-task/opening-prepares-curve-residual-and-averages", opening_prepares_curve_residual_and_averages);
  g_test_add_func ("/jobs/scan-task/a-missing-file-is-named-in-the-error", a_missing_file_is_named_in_the_error);
  g_test_add_func ("/jobs/scan-task/progress-rises-and-the-loop-stays-awake", progress_rises_and_the_loop_stays_awake);
  g_test_add_func ("/jobs/scan-task/a-stopped-scan-says-so", a_stopped_scan_says_so);
  return g_test_run ();
}
