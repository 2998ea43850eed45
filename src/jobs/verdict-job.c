/* verdict-job.c - the stages of verdicts over the pool, and what the record's further columns say of its events. */
#include "jobs/verdict-job.h"

#include <glib/gi18n.h>

#include "data/error.h"
#include "jobs/column-job.h"

/* Bring the columns into verdicts on n events, and decide those anew. */
static void
add_columns (const AntColumnJob *job, const AntVerdictOptions *options, gsize n, const AntDip *dip, AntVerdict *verdict)
{
  for (gsize i = 0; i < n; i++)
    {
      ant_column_job_add (job, &dip[i], &verdict[i]);
      ant_verdict_decide (&verdict[i], &dip[i], options);
    }
}

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
  g_autoptr (AntColumnJob) columns = done ? ant_column_job_new (results->record, &results->settings) : NULL;
  if (done)
    ant_scan_results_add_verdicts (results, work);
  if (columns)
    {
      input.options.observed_d = ant_verdict_work_observed_d (work);
      add_columns (columns, &input.options, results->n_dips, results->dip, results->dip_verdict);
      add_columns (columns, &input.options, results->n_brightenings, results->brightening, results->brightening_verdict);
    }
  ant_verdict_work_free (work);
  return done;
}

gboolean
ant_verdict_job_ask (AntRecord *record, const AntSettings *settings, const AntDip *dip, const AntAskedScene *scene,
                     AntVerdict *verdict, GError **error)
{
  AntStatus status;
  AntVerdictInput input = ant_verdict_input_of (record, settings);
  AntDip one = *dip;
  one.chunk = 0;
  input.n_chunks = 1;
  input.chunk = &scene->chunk;
  input.n_dips = 1;
  input.dip = &one;
  input.n_others = scene->n_others;
  input.other = scene->other;
  AntVerdictWork *work = ant_verdict_work_new (&input, &status);
  if (work)
    status = ant_pool_run (ant_verdict_work_stages (), work, 1, NULL, NULL, NULL);
  gboolean done = ant_status_to_error (status, _("judging the asked dip"), error);
  if (done)
    {
      g_autoptr (AntColumnJob) columns = ant_column_job_new (record, settings);
      *verdict = *ant_verdict_work_dips (work);
      if (columns)
        add_columns (columns, &input.options, 1, dip, verdict);
    }
  ant_verdict_work_free (work);
  return done;
}
