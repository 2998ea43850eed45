/* mercury.h - the crossing of Mercury of 2019-11-11, seen from the Earth's centre, put into records of the studies. */
#pragma once

#include "noise/whitener.h"

/* The predicted loss on the series' grid, averaged over exposures as long as the cadence and scaled to a greatest loss of 1
 * before that, its greatest phase at mid_d: loss [room] out, places from *first. Returns how many. */
size_t ant_study_mercury (const AntSeries *series, double mid_d, ptrdiff_t *first, size_t room, double *loss);
/* The depth, ppm, at which that shape has this SNR under the noise a record was drawn from (its gaps counted). */
double ant_study_depth_of_snr (char model, const AntSeries *series, ptrdiff_t first, size_t n, const double *loss, double snr);
