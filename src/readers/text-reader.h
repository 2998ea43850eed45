/* text-reader.h - tables of text: layout found, columns told, rows read, fills flagged. */
#pragma once

#include "readers/byte-source.h"
#include "readers/reader.h"

/* Everything but path and SHA-256, which the registry sets. */
gboolean ant_text_reader_read (AntByteSource *source, const AntReadingChoices *choices, const AntSliceRunner *runner,
                               GCancellable *cancellable, AntRecord *record, GError **error);
