/* planting.h - put crossings into records by the plain transit curve, and run a whole scan on this thread: what the tests of
 * the search share. */
#pragma once

#include "noise/whitener.h"
#include "search/scan.h"

/* One crossing (depth > 0) or its mirror image (depth < 0); depth before smearing. */
typedef struct
{
  double mid_d, t14_h, ingress_min, impact, depth_ppm;
} Planted;

/* Loss of the crossing at `time_d` from its middle over its greatest, averaged over an exposure by the midpoint rule. */
double planted_mean (const Planted *planted, double time_d, double exposure_d, int points);
/* Take it off the values [series->n], exposures as long as the cadence. */
void plant (const AntSeries *series, const Planted *planted, float *value);
/* Drive all stages; the scan is the caller's. Fails the test unless all goes well. */
AntScan *scan_all (const AntSeries *series, const AntScanOptions *options);
/* The dip nearest to a time; NULL if there is none within `within_d`. Counts those within. */
const AntDip *nearest_dip (size_t n, const AntDip *dip, double time_d, double within_d, size_t *count);
/* s'C^-1 s of one shape. */
double shape_energy (const AntWhitener *whitener, ptrdiff_t first, size_t n, const double *shape);
