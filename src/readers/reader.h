/* reader.h - bytes to a record: one registry of formats, each with a sniff and a read.
 * A reader never crashes, never loops, never allocates from a number in the file without a bound, and never guesses
 * silently: what it assumed stands in record->said. */
#pragma once

#include <gio/gio.h>
#include "data/reading-choices.h"
#include "core/stages.h"
#include "data/record.h"

/* Who runs the slices of a long table: jobs/ gives one that drives its pool (jobs/record-open.h). Without one they run here, one
 * after another; the digits are the same. */
typedef struct
{
  AntStatus (*run) (const AntStages *stages, gpointer work, GCancellable *cancellable, gpointer data);
  gpointer data;
} AntSliceRunner;

/* The name of the format that files with this head (at least a kilobyte of it, if there is so much) are read as; NULL for none. */
const char *ant_reader_format (const guint8 *head, gsize n);
/* Read a file ("-" = standard input). The rows are filled, the grid is not made. NULL with one sentence that names the
 * place, what was found and what was expected (domain ANT_ERROR, ANT_ERROR_READ). Cancellable between blocks. */
AntRecord *ant_reader_open (const char *path, const AntReadingChoices *choices, GCancellable *cancellable, GError **error);
AntRecord *ant_reader_open_with (const char *path, const AntReadingChoices *choices, const AntSliceRunner *runner,
                                 GCancellable *cancellable, GError **error);
/* The same from memory, for tests and fuzzing: `name` stands for the path. */
AntRecord *ant_reader_read_bytes (const char *name, const void *bytes, gsize n, const AntReadingChoices *choices,
                                  GError **error);
