/* averages.h - the mean of a series in equal time bins, each with its standard error, at the bin length asked for and
 * at twice, four times ... that length: an envelope of 100 ppm of scatter hides a dip of 30, its averages do not.
 *
 * Bins begin at place 0. The standard error is the scatter within the bin over the square root of its count: it knows
 * nothing of noise that is correlated beyond the bin. Immutable once built; building is pure work for off the main
 * loop. */
#pragma once

#include <stddef.h>

#define ANT_AVERAGES_MOST_LEVELS 40

typedef struct
{
  size_t n;           /* bins */
  size_t samples;     /* places in a bin; the last may hold fewer */
  float *mean;        /* [n] NaN where less than a quarter of the places of a bin of the first level was observed */
  float *error;       /* [n] standard error of the mean; 0 where one sample makes the bin */
} AntAverageLevel;

typedef struct
{
  size_t n_levels;    /* at least 1 where there are samples */
  AntAverageLevel level[ANT_AVERAGES_MOST_LEVELS];
} AntAverages;

/* value [n]: NaN = gap. bin: places in the finest bin, at least 1. */
AntAverages *ant_averages_new (size_t n, const float *value, size_t bin);
void ant_averages_free (AntAverages *averages); /* NULL is fine */
/* The finest level with at least `least` places in a bin, else the coarsest; NULL where there are no samples. */
const AntAverageLevel *ant_averages_level (const AntAverages *averages, double least);
