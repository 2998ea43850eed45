/* series.h - a record as the numeric rooms see it: a uniform grid with gaps. A view, it owns nothing; a part of a record
 * is another view (ant_series_part). */
#pragma once

#include <stddef.h>
#include <stdint.h>
#include "core/stages.h"

typedef struct
{
  size_t n;               /* grid places */
  double step_d;          /* the cadence, days, > 0 */
  double start_d;         /* time of place 0 (middle of its exposure), days from the record's origin */
  const float *value_ppm; /* [n] relative irradiance, ppm about the median; NaN = not observed */
  const float *error_ppm; /* [n] stated 1-sigma errors, or NULL if the record states none */
  const float *bin_count; /* [n] samples averaged into each place, or NULL if one each */
  const uint8_t *spike;   /* [n] nonzero = observed and searched but left out of noise fits, or NULL */
  AntPace *pace;          /* long passes over the series count here, and end with ANT_STOPPED where it says so; or NULL */
} AntSeries;

/* Places first .. first+n-1 as a series of its own; clipped to the series. */
AntSeries ant_series_part (const AntSeries *series, size_t first, size_t n);
/* Observed places; with fit nonzero only those that noise fits may use. */
size_t ant_series_observed (const AntSeries *series, int fit);
/* Time of a (fractional) place and back, days. */
double ant_series_time (const AntSeries *series, double place);
double ant_series_place (const AntSeries *series, double time_d);
