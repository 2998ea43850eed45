/* repeat-job.c - the search for repeats over the pool. */
#include "jobs/repeat-job.h"

#include <glib/gi18n.h>

#include "data/error.h"

/* Before what was said of single pieces, of which a summary shows the first few. */
static void
say (AntScanResults *results)
{
  GPtrArray *said = g_ptr_array_new ();
  ant_repeat_results_say (&results->repeats, results->record, &results->settings, said);
  for (guint i = 0; i < said->len; i++)
    g_ptr_array_insert (results->said, (int) i, g_ptr_array_index (said, i));
  g_ptr_array_unref (said);
}

gboolean
ant_repeat_job_run (AntScanResults *results, GCancellable *cancellable, AntProgressFunc progress, gpointer data, GError **error)
{
  const AntSettings *settings = &results->settings;
  if (settings->repeats < 1)
    return TRUE;
  AntStatus status;
  AntRepeatOptions options = ant_repeat_results_options (results->record, settings);
  options.dip = results->dip;
  options.n_dips = results->n_dips;
  AntRepeats *repeats = ant_repeats_new (&results->record->series, &options, results->n_chunks, results->chunk, &status);
  if (repeats)
    status = ant_pool_run (ant_repeats_stages (), repeats, (guint) settings->threads, cancellable, progress, data);
  if (repeats && status == ANT_STOPPED)
    ant_repeats_end_early (repeats);
  if (repeats && (!status || status == ANT_STOPPED))
    ant_repeat_results_take (&results->repeats, &options, repeats);
  ant_repeats_free (repeats);
  /* A record too short, or too poor, is told in words. */
  gboolean good = !status || status == ANT_NO_DATA || status == ANT_STOPPED || ant_status_to_error (status, _("searching for repeats"), error);
  if (good)
    say (results);
  return good;
}
