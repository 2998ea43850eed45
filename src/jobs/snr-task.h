/* snr-task.h - the dip SNR of one duration over a whole record, ready to be drawn, without holding up the main loop. */
#pragma once

#include <gio/gio.h>
#include "data/scan-results.h"
#include "jobs/progress-relay.h"
#include "plot/pyramid.h"

/* Immutable once made and counted. */
typedef struct
{
  AntScanResults *results; /* owned reference: whose noise models weighed it */
  double duration_d;
  float *snr;              /* [record->series.n] NaN where too little is observed */
  AntPyramid *pyramid;     /* of snr */
  gint ref_count;
} AntSnrStrip;
AntSnrStrip *ant_snr_strip_ref (AntSnrStrip *strip);
void ant_snr_strip_unref (AntSnrStrip *strip); /* NULL is fine */

/* Callbacks run in the caller's context; `data` goes to both. The results are referenced. */
void ant_snr_task_async (AntScanResults *results, double duration_d, GCancellable *cancellable,
                         AntTaskProgressFunc progress, GAsyncReadyCallback callback, gpointer data);
/* NULL with one sentence; G_IO_ERROR_CANCELLED if stopped. */
AntSnrStrip *ant_snr_task_finish (GAsyncResult *result, GError **error);
