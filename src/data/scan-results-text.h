/* scan-results-text.h - what a scan gave, as a part of an analysis file. Inside the data room only.
 *
 * Everything that lists, charts and tables are made of is kept to the last digit. The slow part of the record is as long
 * as the record and left out, the inverse Hessians of the fits too. */
#pragma once

#include <json-glib/json-glib.h>
#include "data/scan-results.h"

/* Caller unrefs. */
JsonObject *ant_scan_results_to_json (const AntScanResults *results);
/* Without their record and settings; ant_scan_results_join brings the record. NULL with one sentence that names what was
 * found and expected. */
AntScanResults *ant_scan_results_from_json (JsonObject *object, const AntSettings *settings, GError **error);
