/* stop.h - Ctrl-C and SIGTERM as a cancelled GCancellable, so that work ends between two slices and leaves no half
 * files. It stands in jobs/ because it needs a thread that waits: no main loop runs in the command. */
#pragma once

#include <gio/gio.h>

/* From now on the first SIGINT or SIGTERM cancels the returned object (owned by stop.c, lives as long as the program);
 * a second one ends the program at once. Call before any other thread is made; later calls return the same object. */
GCancellable *ant_stop_on_signals (void);
