/* scan-summary.h - what a scan found, in a screenful of plain words. */
#pragma once

#include "data/scan-results.h"

void ant_scan_summary_print (const AntScanResults *results);
void ant_scan_summary_print_asked (const AntRecord *record, const AntDip *dip, double upper_limit_ppm, const AntVerdict *verdict);
