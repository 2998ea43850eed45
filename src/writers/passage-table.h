/* passage-table.h - spot groups and the like, found in the slow part of a record, as a table. */
#pragma once

#include "data/scan-results.h"
#include "writers/table.h"

/* passage, start_jd, mid_jd, end_jd, mid_time, mid_utc, width_d, depth_ppm, depth_sigma_ppm, coverage under the definitions.
 * The results must outlive the table. Caller frees. */
AntTable *ant_passage_table_new (const AntScanResults *results);
GString *ant_passage_table_text (const AntScanResults *results); /* the same as CSV at once */
