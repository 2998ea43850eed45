/* reader.h - bytes to a record: one registry of formats, each with a sniff and a read.
 * A reader never crashes, never loops, never allocates from a number in the file without a bound, and never guesses
 * silently: what it assumed stands in record->said. */
#pragma once

#include <gio/gio.h>
#include "data/record.h"

/* What the user said about columns and values; NULL or 0 fields are found by the reader and said. */
typedef struct
{
  char *time_column, *value_column, *error_column, *quality_column; /* names, or numbers from 1; time may be "1+2" */
  char *time_format; /* "jd", "mjd", "jd-OFFSET", "iso", "ymd", "unix", "year-day", "decimal-year", "days", "hours", "seconds" */
  char *time_scale;  /* "UTC", "TT", ... */
  GArray *fill_values; /* of double: these and the usual ones count as missing; NULL = only the usual ones */
} AntReadingChoices;
void ant_reading_choices_clear (AntReadingChoices *choices);
/* Parse "time=1,value=tsi,error=4,quality=flag". */
gboolean ant_reading_choices_parse_columns (AntReadingChoices *choices, const char *text, GError **error);

/* Read a file ("-" = standard input). The rows are filled, the grid is not made. NULL with one sentence that names the
 * place, what was found and what was expected (domain ANT_ERROR, ANT_ERROR_READ). Cancellable between blocks. */
AntRecord *ant_reader_open (const char *path, const AntReadingChoices *choices, GCancellable *cancellable, GError **error);
/* The same from memory, for tests and fuzzing: `name` stands for the path. */
AntRecord *ant_reader_read_bytes (const char *name, const void *bytes, gsize n, const AntReadingChoices *choices,
                                  GError **error);
