/* snr-task.c - a thread that follows the dip SNR through a record. */
#include "jobs/snr-task.h"

#include <glib/gi18n.h>

#include "data/error.h"
#include "search/snr-track.h"

typedef struct
{
  AntScanResults *results;
  double duration_d;
  AntProgressRelay *relay;
} Order;

static void
order_free (gpointer data)
{
  Order *order = data;
  ant_scan_results_unref (order->results);
  ant_progress_relay_free (order->relay);
  g_free (order);
}

AntSnrStrip *
ant_snr_strip_ref (AntSnrStrip *strip)
{
  g_atomic_int_inc (&strip->ref_count);
  return strip;
}

void
ant_snr_strip_unref (AntSnrStrip *strip)
{
  if (!strip || !g_atomic_int_dec_and_test (&strip->ref_count))
    return;
  ant_pyramid_free (strip->pyramid);
  g_free (strip->snr);
  ant_scan_results_unref (strip->results);
  g_free (strip);
}

static AntSnrStrip *
strip_new (const Order *order, const AntSnrTrack *track)
{
  gsize n = order->results->record->series.n;
  AntSnrStrip *strip = g_new (AntSnrStrip, 1);
  *strip = (AntSnrStrip) { .results = ant_scan_results_ref (order->results), .duration_d = order->duration_d,
                           .snr = g_memdup2 (ant_snr_track_snr (track), n * sizeof (float)), .ref_count = 1 };
  strip->pyramid = ant_pyramid_new (n, strip->snr);
  return strip;
}

static gpointer
run (gpointer data)
{
  g_autoptr (GTask) task = data;
  Order *order = g_task_get_task_data (task);
  const AntScanResults *results = order->results;
  AntScanOptions options = ant_scan_results_options (results->record, &results->settings);
  AntStatus status;
  GError *error = NULL;
  AntSnrTrack *track = ant_snr_track_new (&results->record->series, &options.bank, options.least_coverage,
                                          order->duration_d, results->n_chunks, results->chunk, &status);
  if (track)
    status = ant_pool_run (ant_snr_track_stages (), track, (guint) results->settings.threads,
                           g_task_get_cancellable (task), ant_progress_relay_note, order->relay);
  if (ant_status_to_error (status, _("following the dip SNR"), &error))
    g_task_return_pointer (task, strip_new (order, track), (GDestroyNotify) ant_snr_strip_unref);
  else
    g_task_return_error (task, error);
  ant_snr_track_free (track);
  return NULL;
}

void
ant_snr_task_async (AntScanResults *results, double duration_d, GCancellable *cancellable, AntTaskProgressFunc progress,
                    GAsyncReadyCallback callback, gpointer data)
{
  GTask *task = g_task_new (NULL, cancellable, callback, data);
  Order *order = g_new (Order, 1);
  *order = (Order) { ant_scan_results_ref (results), duration_d, ant_progress_relay_new (task, progress, data) };
  g_task_set_source_tag (task, ant_snr_task_async);
  g_task_set_task_data (task, order, order_free);
  g_thread_unref (g_thread_new ("snr", run, task));
}

AntSnrStrip *
ant_snr_task_finish (GAsyncResult *result, GError **error)
{
  return g_task_propagate_pointer (G_TASK (result), error);
}
