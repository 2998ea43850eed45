/* record-open.h - read a record with its slices on the pool. */
#pragma once

#include "readers/reader.h"

/* As ant_reader_open, on n_threads (0: as many as processors). The record does not depend on them. Blocks. */
AntRecord *ant_record_open (const char *path, const AntReadingChoices *choices, guint n_threads, GCancellable *cancellable,
                            GError **error);
