/* worked.h - an analysis with something of everything in it, for the tests of analyses and their files. */
#pragma once

#include "data/analysis.h"

/* Results made by hand, of a record that is not there: two chunks, three dips, a brightening, a passage, two spikes. */
AntScanResults *test_results (void);
/* 200 rows that these results fit. */
AntRecord *test_results_record (void);
/* Settings changed, spans masked, dips judged, those results. */
AntAnalysis *test_worked_analysis (void);
