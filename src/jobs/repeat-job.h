/* repeat-job.h - run the search for repeats over the pool, after that for single dips. */
#pragma once

#include <gio/gio.h>
#include "data/scan-results.h"
#include "jobs/pool.h"

/* Fill results->repeats and say what should be known of them; nothing if the settings do not ask for repeats. The results are
 * not shared yet. A stop keeps what was found. FALSE with one sentence if the numbers allow no search or memory is out. */
gboolean ant_repeat_job_run (AntScanResults *results, GCancellable *cancellable, AntProgressFunc progress, gpointer data,
                             GError **error);
