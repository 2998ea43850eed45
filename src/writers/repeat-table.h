/* repeat-table.h - the tables of dips that recur, and of the best SNR at every period. */
#pragma once

#include "data/scan-results.h"
#include "writers/table.h"

/* Both borrow the results. Where no period was searched they have no rows and say so. Caller frees. */
AntTable *ant_repeat_table_new (const AntScanResults *results);
AntTable *ant_period_table_new (const AntScanResults *results);
