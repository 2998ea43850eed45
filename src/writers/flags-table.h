/* flags-table.h - flags.csv: every row of a record that is flagged, and why. data/exclusions.h reads it back. */
#pragma once

#include "data/record.h"

/* Header ANT_FLAGS_HEADER: line or row number in the file, the row's stamp as the record writes it (empty where it
 * cannot be read), flag names joined by "|". Rows that are not listed are used.
 * flags [n_rows]: the record's own, or those with a scan's spikes. Caller frees. */
GString *ant_flags_table_text (const AntRecord *record, const guint16 *flags);
