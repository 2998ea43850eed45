/* verdict-job.c - the stages of verdicts over the pool. */
#include "jobs/verdict-job.h"

#include <glib/gi18n.h>

#include "data/error.h"

gboolean
ant_verdict_job_run (AntScanResults *results, GCancellable *cancellable, AntProgressFunc progress, gpointer data,
                     GError **error)
{
  AntStatus status;
  AntVerdictInput input = ant_scan_results_verdict_input (results);
  AntVerdictWork *work = ant_verdict_work_new (&input, &status);
  if (work)
    status = ant_pool_run (ant_verdict_work_stages (), work, (guint) results->settings.threads, cancellable, progress, data);
  gboolean done = ant_status_to_error (status, _("judging dips"), error);
  if (done)
    ant_scan_results_add_verdicts (results, work);
  ant_verdict_work_free (work);
  return done;
}
