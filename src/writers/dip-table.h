/* dip-table.h - dips and brightenings as a table: its columns, with what they mean, stand in dip-table.c once for every
 * format. */
#pragma once

#include "data/dip-list.h"
#include "writers/table.h"

/* One row for each dip. Asked dips (list->upper_limit_ppm) have two more columns, `asked` and `upper_limit_ppm`. Record and
 * the arrays of the list must outlive the table. Caller frees. */
AntTable *ant_dip_table_new (const AntRecord *record, const AntDipList *list);
/* The same as CSV at once. Caller frees. */
GString *ant_dip_table_text (const AntRecord *record, const AntDipList *list);
