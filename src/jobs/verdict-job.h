/* verdict-job.h - verdicts on the events of a scan, over the pool. */
#pragma once

#include <gio/gio.h>
#include "data/scan-results.h"
#include "jobs/pool.h"

/* Stages that verdicts add to a scan's, for progress. */
#define ANT_VERDICT_STAGES 2

/* Judge every dip and brightening of results that nobody else has yet. Blocks. FALSE with one sentence;
 * G_IO_ERROR_CANCELLED if stopped, the results then being as they were. */
gboolean ant_verdict_job_run (AntScanResults *results, GCancellable *cancellable, AntProgressFunc progress, gpointer data,
                              GError **error);
/* Judge one dip that was asked about, under what it was measured in. Blocks. FALSE with one sentence. */
gboolean ant_verdict_job_ask (AntRecord *record, const AntSettings *settings, const AntDip *dip, const AntAskedScene *scene,
                              AntVerdict *verdict, GError **error);
