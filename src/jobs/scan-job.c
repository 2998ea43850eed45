/* scan-job.c - a scan over the pool, and an asked dip. */
#include "jobs/scan-job.h"

#include <glib/gi18n.h>
#include <math.h>

#include "data/error.h"
#include "data/record-slip.h"
#include "jobs/progress-part.h"
#include "jobs/repeat-job.h"
#include "jobs/verdict-job.h"

/* Phi^-1(0.95): a Gaussian exceeds its mean by this many sigma with probability 5 %. */
#define ONE_SIDED_95 1.6448536269514722

/* What follows the search of a scan that ran to its end: verdicts, then repeats. FALSE if the scan is to be given up;
 * with keep_part a stop only leaves out what had not been made. */
static gboolean
go_on (AntScanResults *results, gboolean keep_part, GCancellable *cancellable, AntProgressPart *part, GError **error)
{
  GError *cause = NULL;
  ant_progress_part_next (part, ant_scan_stages ()->n_stages);
  if (!ant_verdict_job_run (results, cancellable, ant_progress_part_show, part, &cause))
    {
      gboolean kept = keep_part && g_error_matches (cause, G_IO_ERROR, G_IO_ERROR_CANCELLED);
      if (kept)
        g_error_free (cause);
      else
        g_propagate_error (error, cause);
      return kept;
    }
  ant_progress_part_next (part, ANT_VERDICT_STAGES);
  return ant_repeat_job_run (results, cancellable, ant_progress_part_show, part, error);
}

static AntScanResults *
run (AntRecord *record, const AntSettings *settings, gboolean keep_part, GCancellable *cancellable,
     AntProgressFunc progress, gpointer data, GError **error)
{
  AntStatus status;
  AntScanOptions options = ant_scan_results_options (record, settings);
  if (!ant_repeat_results_check (record, settings, error))
    return NULL;
  AntScan *scan = ant_scan_new (&record->series, &options, &status);
  AntProgressPart part = { .progress = progress, .data = data };
  part.n_stages = ant_scan_stages ()->n_stages + ANT_VERDICT_STAGES
                  + (settings->repeats > 0 ? ant_repeats_stages ()->n_stages : 0);
  if (scan)
    status = ant_pool_run (ant_scan_stages (), scan, (guint) settings->threads, cancellable, ant_progress_part_show, &part);
  if (keep_part && status == ANT_STOPPED && ant_scan_reach (scan) > ANT_SCAN_NOTHING)
    status = ant_scan_conclude (scan);
  AntScanResults *results = NULL;
  if (status == ANT_NO_DATA)
    g_set_error (error, ANT_ERROR, ANT_ERROR_NUMERIC,
                 _("%s: a part of the record has too few samples left for a noise model once outliers are set aside: expected the level of a source with noise "
                   "about it, not one that goes its own way (a flare, a night, steps)"), record->path);
  else if (ant_status_to_error (status, _("searching for dips"), error))
    results = ant_scan_results_new (record, settings, scan);
  ant_scan_free (scan);
  if (results && results->reach == ANT_SCAN_COMPLETE && !go_on (results, keep_part, cancellable, &part, error))
    g_clear_pointer (&results, ant_scan_results_unref);
  if (results)
    {
      ant_record_unslip (record, results->n_dips, results->dip);
      ant_record_unslip (record, results->n_brightenings, results->brightening);
    }
  return results;
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
                  double *upper_limit_ppm, AntVerdict *verdict, GError **error)
{
  AntScanOptions options = ant_scan_results_options (record, settings);
  g_autofree AntAskedScene *scene = verdict ? g_new0 (AntAskedScene, 1) : NULL;
  double grid_d = mid_d - ant_record_slip (record, mid_d); /* where the grid has what was stamped so */
  AntStatus status = ant_scan_asked_scene (&record->series, &options, grid_d, duration_d, dip, scene);
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
  gboolean good = ant_status_to_error (status, _("measuring the asked dip"), error)
                  && (!verdict || ant_verdict_job_ask (record, settings, dip, scene, verdict, error));
  if (record->slip_d)
    dip->mid_d = mid_d;
  return good;
}
