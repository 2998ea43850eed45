/* open-task.h - read a record, lay its grid and prepare it for drawing, without holding up the main loop. */
#pragma once

#include <gio/gio.h>
#include "jobs/layers.h"
#include "readers/reader.h"

/* Everything given is copied. Cancelling ends it with G_IO_ERROR_CANCELLED. The callback runs in the caller's context.
 */
void ant_open_task_async (const char *path, const AntSettings *settings, GCancellable *cancellable,
                          GAsyncReadyCallback callback, gpointer data);
/* NULL with one sentence that names the file, what was found and what was expected. */
AntLayers *ant_open_task_finish (GAsyncResult *result, GError **error);
