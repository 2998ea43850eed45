/* observer-reader.h - an observer from what was asked for, a table of positions among them.
 *
 * A table is text of four columns: time, x, y, z in km from the Earth's centre. Times are ISO 8601, JD or MJD, in UTC unless
 * a comment says "scale: TT" or another; the axes must be named, "frame: GCRS" or "frame: GSE", in a comment or by the
 * columns' names (x_gse). Comments begin with # ; % or !; one line of names may stand first; separators are commas,
 * semicolons, tabs or blanks; gzip is unpacked. */
#pragma once

#include <gio/gio.h>
#include "data/observer-choice.h"

/* "earth", "l1", "site:LON,LAT,HEIGHT_M", else a table's path. NULL with one sentence. */
AntObserverChoice *ant_observer_open (const char *text, GError **error);
/* A table from memory, for tests: `name` stands for the path. */
AntObserverChoice *ant_observer_read_bytes (const char *name, const void *bytes, gsize n, GError **error);
