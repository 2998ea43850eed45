/* tables-task.h - write the tables of an analysis into a folder, all or none, off the main loop: the same files as
 * `antumbra-cli scan --out` writes. */
#pragma once

#include <gio/gio.h>
#include "data/analysis.h"

/* snapshot (ant_analysis_snapshot) is taken over; it has results. comparisons: of AntComparison, referenced. replace: those that are there already. */
void ant_tables_task_async (const char *folder, AntAnalysis *snapshot, GPtrArray *comparisons, gboolean replace,
                            GAsyncReadyCallback callback, gpointer data);
/* FALSE with one sentence. */
gboolean ant_tables_task_finish (GAsyncResult *result, GError **error);
/* Whether one of the files is there already. */
gboolean ant_tables_would_replace (const char *folder, guint n_witnesses);
