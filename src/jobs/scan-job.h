/* scan-job.h - run the search of single dips on a record, and verdicts on what it finds, over the pool: the one way that
 * command and window use. */
#pragma once

#include <gio/gio.h>
#include "data/scan-results.h"
#include "jobs/pool.h"

/* Dips first, then (settings->repeats) dips that recur. Stopped during the latter, both functions give all that was found,
 * with results->repeats.done below 1. Settings of repeats that cannot be are refused before anything is searched. */
/* Blocks until done; progress is called on this thread. NULL with one sentence; G_IO_ERROR_CANCELLED if stopped. The
 * record must be gridded. Safe from any thread. */
AntScanResults *ant_scan_job_run (AntRecord *record, const AntSettings *settings, GCancellable *cancellable,
                                  AntProgressFunc progress, gpointer data, GError **error);
/* The same, but of a stopped scan it gives what the finished stages found (reach below ANT_SCAN_COMPLETE); NULL with
 * G_IO_ERROR_CANCELLED only if that is nothing. */
AntScanResults *ant_scan_job_run_partly (AntRecord *record, const AntSettings *settings, GCancellable *cancellable,
                                         AntProgressFunc progress, gpointer data, GError **error);
/* Measure one asked dip: middle and length. upper_limit_ppm: one-sided 95 % limit of its depth, never below 0. verdict: what it
 * is, target and rates as set; NULL: not judged. */
gboolean ant_scan_job_ask (AntRecord *record, const AntSettings *settings, double mid_d, double duration_d, AntDip *dip,
                           double *upper_limit_ppm, AntVerdict *verdict, GError **error);
