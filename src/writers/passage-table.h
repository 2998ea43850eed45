/* passage-table.h - passages.csv: spot groups and the like, found in the slow part of a record. */
#pragma once

#include "data/scan-results.h"

/* passage, start_jd, mid_jd, end_jd, mid_time, mid_utc, width_d, depth_ppm, depth_sigma_ppm, coverage under the definitions.
 * The caller's to free. */
GString *ant_passage_table_text (const AntScanResults *results);
