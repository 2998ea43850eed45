/* flags-table.h - why rows of a record are left out: flags.csv, which data/exclusions.h reads back, and the whole mask. */
#pragma once

#include "data/record.h"
#include "writers/table.h"

/* As CSV, the flagged rows only. Header ANT_FLAGS_HEADER: line or row number in the file, the row's stamp as the record
 * writes it (empty where it cannot be read), flag names joined by "|". Rows that are not listed are used.
 * flags [n_rows]: the record's own, or those with a scan's spikes. Caller frees. */
GString *ant_flags_table_text (const AntRecord *record, const guint16 *flags);
/* The mask: every row of the record, with a bit for each reason and the legend of the bits as facts FLAG1, FLAG2, FLAG4 ...
 * Made for FITS. Record and flags must outlive it. Caller frees. */
AntTable *ant_mask_table_new (const AntRecord *record, const guint16 *flags);

/* "fill|quality". Caller frees. */
char *ant_flag_names (guint16 flags);
/* The legend of the bits, as facts and as notes. */
void ant_table_flag_legend (AntTable *table);
