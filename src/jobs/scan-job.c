/* scan-job.c - a scan over the pool, and an asked dip. */
#include "jobs/scan-job.h"

#include <glib/gi18n.h>
#include <math.h>

#include "data/error.h"
#include "jobs/verdict-job.h"

/* Phi^-1(0.95): a Gaussian exceeds its mean by this many sigma with probability 5 %. */
#define ONE_SIDED_95 1.6448536269514722

/* Search and verdicts are told as one run. */
typedef struct
{
  AntProgressFunc progress;
  gpointer data;
  gsize stages_before;
  gsize n_stages;
  double elapsed_before_s, elapsed_s;
} Whole;

static void
tell_whole (const AntProgress *progress, gpointer data)
{
  Whole *whole = data;
  AntProgress told = *progress;
  told.stage += whole->stages_before;
  told.n_stages = whole->n_stages;
  told.elapsed_s += whole->elapsed_before_s;
  whole->elapsed_s = told.elapsed_s;
  whole->progress (&told, whole->data);
}

/* A scan that was stopped keeps its dips without verdicts. */
static AntScanResults *
judged (AntScanResults *results, gboolean keep_part, GCancellable *cancellable, Whole *whole, GError **error)
{
  GError *cause = NULL;
  whole->stages_before = ant_scan_stages ()->n_stages;
  whole->elapsed_before_s = whole->elapsed_s;
  if (results->reach < ANT_SCAN_COMPLETE
      || ant_verdict_job_run (results, cancellable, whole->progress ? tell_whole : NULL, whole, &cause))
    return results;
  if (keep_part && g_error_matches (cause, G_IO_ERROR, G_IO_ERROR_CANCELLED))
    {
      g_error_free (cause);
      return results;
    }
  g_propagate_error (error, cause);
  ant_scan_results_unref (results);
  return NULL;
}

static AntScanResults *
run (AntRecord *record, const AntSettings *settings, gboolean keep_part, GCancellable *cancellable,
     AntProgressFunc progress, gpointer data, GError **error)
{
  AntStatus status;
  AntScanOptions options = ant_scan_results_options (record, settings);
  AntScan *scan = ant_scan_new (&record->series, &options, &status);
  Whole whole = { progress, data, 0, ant_scan_stages ()->n_stages + ANT_VERDICT_STAGES, 0, 0 };
  if (scan)
    status = ant_pool_run (ant_scan_stages (), scan, (guint) settings->threads, cancellable, progress ? tell_whole : NULL, &whole);
  if (keep_part && status == ANT_STOPPED && ant_scan_reach (scan) > ANT_SCAN_NOTHING)
    status = ant_scan_conclude (scan);
  AntScanResults *results = NULL;
  if (ant_status_to_error (status, _("searching for dips"), error))
    results = ant_scan_results_new (record, settings, scan);
  ant_scan_free (scan);
  return results ? judged (results, keep_part, cancellable, &whole, error) : NULL;
}

AntScanResults *
ant_scan_job_run (AntRecord *record, const AntSettings *settings, GCancellable *cancellable, AntProgressFunc progress,
                  gpointer data, GError **error)
{
  return run (record, settings, FALSE, cancellable, progress, data, error);
}

AntScanResults *
ant_scan_job_run_partly (AntRecord *record, const AntSettings *settings, GCancellable *cancellable,
                         AntProgressFunc progress, gpointer data, GError **error)
{
  return run (record, settings, TRUE, cancellable, progress, data, error);
}

/* The asked middle is none of the record's. */
static void
tell_outside (const AntRecord *record, double mid_d, GError **error)
{
  const AntSeries *series = &record->series;
  g_autofree char *asked = ant_time_reference_own_text (&record->time, mid_d);
  g_autofree char *start = ant_time_reference_own_text (&record->time, series->start_d);
  g_autofree char *end = ant_time_reference_own_text (&record->time, ant_series_time (series, (double) series->n - 1));
  g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("the asked time is %s, expected one within the record: %s to %s"), asked,
               start, end);
}

gboolean
ant_scan_job_ask (AntRecord *record, const AntSettings *settings, double mid_d, double duration_d, AntDip *dip,
                  double *upper_limit_ppm, GError **error)
{
  AntScanOptions options = ant_scan_results_options (record, settings);
  AntStatus status = ant_scan_asked (&record->series, &options, mid_d, duration_d, dip);
  *upper_limit_ppm = fmax (0, dip->depth_ppm) + ONE_SIDED_95 * dip->depth_sigma_ppm;
  if (status == ANT_BAD_ARGUMENT && duration_d > 0)
    {
      tell_outside (record, mid_d, error);
      return FALSE;
    }
  if (status == ANT_NO_DATA)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_NUMERIC,
                   _("the asked dip is not observed: less than %.0f %% of it has data"), 100 * options.least_coverage);
      return FALSE;
    }
  return ant_status_to_error (status, _("measuring the asked dip"), error);
}
