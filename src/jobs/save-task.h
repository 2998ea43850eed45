/* save-task.h - make a file's bytes and write it, whole or not at all, off the main loop. */
#pragma once

#include <gio/gio.h>

/* Runs on a thread of its own. NULL with one sentence. */
typedef GBytes *(*AntSaveMake) (gconstpointer order, GError **error);

/* `free_order` is called when all is done. An existing file is replaced: whoever chose the path was asked. */
void ant_save_task_async (const char *path, AntSaveMake make, gpointer order, GDestroyNotify free_order, GAsyncReadyCallback callback,
                          gpointer data);
/* FALSE with one sentence that names the file. */
gboolean ant_save_task_finish (GAsyncResult *result, GError **error);
