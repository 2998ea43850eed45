/* dip-table.h - dips.csv and brightenings.csv: a list of dips as a table with its definitions above it. */
#pragma once

#include "data/dip-list.h"
#include "data/record.h"

/* Comment lines, a header and a line for each dip. Asked dips (list->upper_limit_ppm) have two more columns, `asked`
 * and `upper_limit_ppm`. Numbers that are not known are empty. Caller frees. */
GString *ant_dip_table_text (const AntRecord *record, const AntDipList *list);
