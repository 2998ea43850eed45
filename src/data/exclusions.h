/* exclusions.h - the spans a scan leaves out, from a file: lines of start, end, reason, or an earlier flags.csv. */
#pragma once

#include <glib.h>
#include "core/span.h"
#include "data/time-reference.h"

/* The header line of flags.csv (writers/flags-table.h writes it, ant_exclusions_read knows it by it). */
#define ANT_FLAGS_HEADER "row,time,flags"

/* Array of AntSpan, caller unrefs. Times are as ant_time_reference_parse understands them; blank lines, lines beginning
 * with # and a header line "start,end,reason" are skipped; the reason is optional and may be quoted. Of a flags.csv the
 * rows flagged hand, excluded or dark are left out by their times. NULL with one sentence that names the line. */
GArray *ant_exclusions_read (const char *path, const AntTimeReference *reference, GError **error);
/* The same from text; `name` stands for the path. */
GArray *ant_exclusions_parse (const char *name, const char *text, const AntTimeReference *reference, GError **error);
