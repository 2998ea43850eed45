/* rows.h - small records made of rows for the tests of the data room. */
#pragma once

#include "data/record.h"

/* n rows at start + i step (days) with lines 1.., values 1361 (1 + wiggle_ppm(i) 1e-6) and known middle stamps. */
AntRecord *test_rows (gsize n, double start_d, double step_d);
/* A wiggle of some 100 ppm, the same for the same i, without a period. */
double test_wiggle_ppm (gsize i);
/* TRUE if something said contains the fragment. */
gboolean test_said (const AntRecord *record, const char *fragment);
/* Lay the grid with these options; stops the test with the message if it is refused. */
void test_grid (AntRecord *record, const AntGridOptions *options);
/* Expect the grid to be refused with a sentence that contains the fragment. */
void test_refused (AntRecord *record, const AntGridOptions *options, const char *fragment);
