/* series.c - views of a gridded record. */
#include "noise/series.h"
#include <math.h>

AntSeries
ant_series_part (const AntSeries *series, size_t first, size_t n)
{
  AntSeries part = *series;
  if (first > series->n)
    first = series->n;
  if (n > series->n - first)
    n = series->n - first;
  part.n = n;
  part.start_d = ant_series_time (series, (double) first);
  part.value_ppm = series->value_ppm + first;
  part.error_ppm = series->error_ppm ? series->error_ppm + first : NULL;
  part.bin_count = series->bin_count ? series->bin_count + first : NULL;
  part.spike = series->spike ? series->spike + first : NULL;
  return part;
}

size_t
ant_series_observed (const AntSeries *series, int fit)
{
  size_t count = 0;
  for (size_t i = 0; i < series->n; i++)
    count += !isnan (series->value_ppm[i]) && !(fit && series->spike && series->spike[i]);
  return count;
}

double
ant_series_time (const AntSeries *series, double place)
{
  return series->start_d + place * series->step_d;
}

double
ant_series_place (const AntSeries *series, double time_d)
{
  return (time_d - series->start_d) / series->step_d;
}
