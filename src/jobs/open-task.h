/* open-task.h - read a record, lay its grid and prepare it for drawing; or read an analysis file: without holding up the
 * main loop. */
#pragma once

#include <gio/gio.h>
#include "data/analysis.h"
#include "jobs/layers.h"

/* Everything given is copied. results: what was found before in the record with this SHA-256, or NULL: if the bytes are
 * these, the dips are masked in the rotation curve. Cancelling ends it with G_IO_ERROR_CANCELLED. The callback runs in the
 * caller's context. */
void ant_open_task_async (const char *path, const AntTreatment *treatment, AntScanResults *results, const char *sha256,
                          GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data);
/* NULL with one sentence that names the file, what was found and what was expected. */
AntLayers *ant_open_task_finish (GAsyncResult *result, GError **error);

/* The same of an analysis file (ant_analysis_load); its record is not read. */
void ant_load_task_async (const char *path, GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data);
/* The caller's. *newer: a sentence to free if the file is of a newer version, else NULL. */
AntAnalysis *ant_load_task_finish (GAsyncResult *result, char **newer, GError **error);
