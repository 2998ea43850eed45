/* observer-task.h - make an observer of what a person asked for, off the main loop: a table may be long. */
#pragma once

#include <gio/gio.h>
#include "data/observer-choice.h"

/* text as of --observer; the callback comes on the caller's main context. */
void ant_observer_task_async (const char *text, GAsyncReadyCallback callback, gpointer data);
AntObserverChoice *ant_observer_task_finish (GAsyncResult *result, GError **error);
