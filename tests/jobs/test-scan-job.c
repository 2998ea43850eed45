/* test-scan-job.c - a scan over the pool: the same results with any number of threads, stopped without a trace, asked dips. */
#include <fftw3.h>
#include <gsl/gsl_errno.h>
#include <math.h>
#include <string.h>
#include "core/units.h"
#include "jobs/scan-job.h"
#include "models.h"
#include "planting.h"

#define STEP_D (1800 / ANT_SECONDS_PER_DAY)
#define DAYS 150 /* three chunks of 60 d */

static const Planted planted = { 20.2, 8, 40, 0.3, 600 };

typedef struct
{
  AntRecord *record;
  AntSettings settings;
} Fixture;

static void
set_up (Fixture *f, gconstpointer data)
{
  gsize n = (gsize) (DAYS / STEP_D);
  AntRecord *record = f->record = ant_record_new ();
  float *ppm = g_new (float, n);
  AntSeries series = ant_study_record ('C', ANT_MASK_L1, n, STEP_D, 16001, ppm);
  plant (&series, &planted, ppm);
  record->n_rows = n;
  record->time_d = g_new (double, n);
  record->value = g_new (double, n);
  record->line = g_new (guint32, n);
  record->flags = g_new0 (guint16, n);
  record->path = g_strdup ("drawn.txt");
  for (gsize i = 0; i < n; i++)
    {
      record->time_d[i] = (double) i * STEP_D;
      record->value[i] = 1361 * (1 + (double) ppm[i] * ANT_PPM);
      record->line[i] = (guint32) i + 1;
    }
  g_free (ppm);
  AntGridOptions grid = ANT_GRID_OPTIONS_INIT;
  g_autoptr (GError) error = NULL;
  ant_record_make_grid (record, &grid, &error);
  g_assert_no_error (error);
  ant_settings_init (&f->settings);
  f->settings.chunk_d = 60;
  f->settings.threshold_snr = 4; /* so that many candidates are weighed and some are listed */
}

static void
tear_down (Fixture *f, gconstpointer data)
{
  ant_record_unref (f->record);
}

static AntScanResults *
scan_with (Fixture *f, double threads)
{
  g_autoptr (GError) error = NULL;
  f->settings.threads = threads;
  AntScanResults *results = ant_scan_job_run (f->record, &f->settings, NULL, NULL, NULL, &error);
  g_assert_no_error (error);
  return results;
}

/* Every digit of every dip; the bytes of a struct have padding that says nothing. */
static char *
digits (gsize n, const AntDip *dip)
{
  g_autoptr (GString) text = g_string_new (NULL);
  for (gsize i = 0; i < n; i++)
    g_string_append_printf (text, "%a %a %a %a %a %a %a %a %a %a %a %a %a %d %zu\n", dip[i].mid_d, dip[i].duration_d, dip[i].edge_d,
                            dip[i].depth_ppm, dip[i].depth_sigma_ppm, dip[i].mean_depth_ppm, dip[i].radius_ratio, dip[i].snr,
                            dip[i].first_snr, dip[i].mid_sigma_d, dip[i].duration_sigma_d, dip[i].expected_false, dip[i].coverage,
                            dip[i].edges, dip[i].chunk);
  return g_strdup (text->str);
}

static void
any_number_of_threads_gives_the_same_digits (Fixture *f, gconstpointer data)
{
  g_autoptr (AntScanResults) one = scan_with (f, 1);
  g_assert_cmpuint (one->n_chunks, >, 1);
  g_assert_cmpuint (one->n_dips, >=, 1);
  for (int threads = 2; threads <= 3; threads++)
    {
      g_autoptr (AntScanResults) many = scan_with (f, threads);
      g_autofree char *dips = digits (one->n_dips, one->dip), *same_dips = digits (many->n_dips, many->dip);
      g_autofree char *mirror = digits (one->n_brightenings, one->brightening);
      g_autofree char *same_mirror = digits (many->n_brightenings, many->brightening);
      g_assert_cmpstr (dips, ==, same_dips);
      g_assert_cmpstr (mirror, ==, same_mirror);
      g_assert_cmpmem (one->floor, one->n_floor * sizeof *one->floor, many->floor, many->n_floor * sizeof *one->floor);
      g_assert_cmpmem (one->slow_ppm, f->record->series.n * sizeof (float), many->slow_ppm, f->record->series.n * sizeof (float));
      g_assert_cmpmem (one->flags, f->record->n_rows * sizeof *one->flags, many->flags, f->record->n_rows * sizeof *one->flags);
      g_assert_cmpuint (one->n_chunks, ==, many->n_chunks);
      for (gsize i = 0; i < one->n_chunks; i++)
        {
          gsize bytes = one->chunk[i].n_bins * sizeof (double);
          g_assert_cmpmem (&one->chunk[i].model, sizeof (AntNoiseModel), &many->chunk[i].model, sizeof (AntNoiseModel));
          g_assert_cmpmem (one->chunk[i].power_unmasked, bytes, many->chunk[i].power_unmasked, bytes);
        }
      g_assert_cmpfloat (one->threshold_snr, ==, many->threshold_snr);
    }
}

static void
what_was_planted_is_in_the_results (Fixture *f, gconstpointer data)
{
  g_autoptr (AntScanResults) results = scan_with (f, 0);
  size_t count;
  const AntDip *dip = nearest_dip (results->n_dips, results->dip, planted.mid_d, 0.5, &count);
  g_assert_cmpuint (count, ==, 1);
  g_assert_cmpfloat_with_epsilon (dip->depth_ppm, planted.depth_ppm, 3 * dip->depth_sigma_ppm);
  g_assert_cmpfloat_with_epsilon (results->observed_d, (double) ant_series_observed (&f->record->series, 0) * STEP_D, 1e-6);
}

static void
note_progress (const AntProgress *progress, gpointer data)
{
  GArray *stages = data;
  g_assert_cmpuint (progress->done, <=, progress->count);
  g_assert_cmpfloat (ant_progress_share (progress), <=, 1);
  g_assert_cmpuint (progress->stage, <, progress->n_stages);
  g_assert_nonnull (progress->title);
  g_array_append_val (stages, progress->stage);
}

static void
progress_goes_forward_through_the_stages (Fixture *f, gconstpointer data)
{
  g_autoptr (GArray) stages = g_array_new (FALSE, FALSE, sizeof (gsize));
  g_autoptr (AntScanResults) results = ant_scan_job_run (f->record, &f->settings, NULL, note_progress, stages, NULL);
  g_assert_nonnull (results);
  g_assert_cmpuint (stages->len, >=, 3);
  for (guint i = 1; i < stages->len; i++)
    g_assert_cmpuint (g_array_index (stages, gsize, i), >=, g_array_index (stages, gsize, i - 1));
}

static void
cancel_at_once (const AntProgress *progress, gpointer data)
{
  g_cancellable_cancel (data);
}

static void
a_stopped_scan_gives_no_results (Fixture *f, gconstpointer data)
{
  g_autoptr (GCancellable) stop = g_cancellable_new ();
  g_autoptr (GError) error = NULL;
  g_assert_null (ant_scan_job_run (f->record, &f->settings, stop, cancel_at_once, stop, &error));
  g_assert_error (error, G_IO_ERROR, G_IO_ERROR_CANCELLED);
}

/* Cancel as soon as a stage begins. */
typedef struct
{
  GCancellable *stop;
  gsize stage;
} StopAt;

static void
cancel_at_stage (const AntProgress *progress, gpointer data)
{
  StopAt *at = data;
  if (progress->stage >= at->stage)
    g_cancellable_cancel (at->stop);
}

static void
what_a_stopped_scan_found_can_be_kept (Fixture *f, gconstpointer data)
{
  const AntScanReach expected[] = { ANT_SCAN_NOTHING, ANT_SCAN_NOTHING, ANT_SCAN_NOISE, ANT_SCAN_NOISE, ANT_SCAN_WEIGHED,
                                    ANT_SCAN_WEIGHED, ANT_SCAN_DIPS };
  for (gsize stage = 0; stage < G_N_ELEMENTS (expected); stage++)
    {
      g_autoptr (GCancellable) stop = g_cancellable_new ();
      g_autoptr (GError) error = NULL;
      StopAt at = { stop, stage };
      g_autoptr (AntScanResults) results
          = ant_scan_job_run_partly (f->record, &f->settings, stop, cancel_at_stage, &at, &error);
      if (expected[stage] == ANT_SCAN_NOTHING)
        {
          g_assert_null (results);
          g_assert_error (error, G_IO_ERROR, G_IO_ERROR_CANCELLED);
          continue;
        }
      g_assert_no_error (error);
      g_assert_cmpint (results->reach, ==, expected[stage]);
      g_assert_cmpuint (results->n_chunks, >, 1);
      g_assert_cmpuint (results->n_floor, >, 0);
      g_assert_cmpuint (results->n_passages, ==, 0);
      g_assert_cmpstr (g_ptr_array_index (results->said, 0), ==, ant_scan_reach_words (expected[stage]));
      size_t count;
      g_assert_nonnull (nearest_dip (results->n_dips, results->dip, planted.mid_d, 0.5, &count));
    }
}

static void
an_asked_dip_has_a_limit_above_its_depth (Fixture *f, gconstpointer data)
{
  AntDip dip;
  double limit_ppm;
  g_autoptr (GError) error = NULL;
  g_assert_true (ant_scan_job_ask (f->record, &f->settings, planted.mid_d, planted.t14_h / 24, &dip, &limit_ppm, NULL, &error));
  g_assert_no_error (error);
  g_assert_cmpfloat_with_epsilon (dip.depth_ppm, planted.depth_ppm, 3 * dip.depth_sigma_ppm);
  g_assert_cmpfloat_with_epsilon ((limit_ppm - dip.depth_ppm) / dip.depth_sigma_ppm, 1.644854, 1e-6);
  /* Where a brightening is measured the limit is that of no dip at all. */
  for (double mid_d = 40; mid_d < 60; mid_d += 0.5)
    if (ant_scan_job_ask (f->record, &f->settings, mid_d, 0.3, &dip, &limit_ppm, NULL, NULL) && dip.depth_ppm < 0)
      {
        g_assert_cmpfloat_with_epsilon (limit_ppm / dip.depth_sigma_ppm, 1.644854, 1e-6);
        return;
      }
  g_test_fail_printf ("no brightening among 40 places of noise");
}

static void
an_asked_dip_outside_the_data_is_refused (Fixture *f, gconstpointer data)
{
  AntDip dip;
  double limit_ppm;
  g_autoptr (GError) error = NULL;
  g_assert_false (ant_scan_job_ask (f->record, &f->settings, DAYS + 10, 0.3, &dip, &limit_ppm, NULL, &error));
  g_assert_nonnull (error);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  gsl_set_error_handler_off ();
  fftw_make_planner_thread_safe (); /* slices plan on several threads */
#define TEST(path, function) g_test_add ("/jobs/scan-job/" path, Fixture, NULL, set_up, function, tear_down)
  TEST ("any-number-of-threads-gives-the-same-digits", any_number_of_threads_gives_the_same_digits);
  TEST ("what-was-planted-is-in-the-results", what_was_planted_is_in_the_results);
  TEST ("progress-goes-forward-through-the-stages", progress_goes_forward_through_the_stages);
  TEST ("a-stopped-scan-gives-no-results", a_stopped_scan_gives_no_results);
  TEST ("what-a-stopped-scan-found-can-be-kept", what_a_stopped_scan_found_can_be_kept);
  TEST ("an-asked-dip-has-a-limit-above-its-depth", an_asked_dip_has_a_limit_above_its_depth);
  TEST ("an-asked-dip-outside-the-data-is-refused", an_asked_dip_outside_the_data_is_refused);
  return g_test_run ();
}
