/* repeat-grid.h - which periods and durations a search for repeats covers, and its best answer for every bin of ln P.
 *
 * A body on a circular orbit about a Sun-like star crosses it in at most 13 h (P / 1 yr)^(1/3) (Kepler's third law at the
 * Sun's mean density); durations are that time a range of factors, since chords are shorter and orbits eccentric. */
#pragma once

#include <stddef.h>
#include "core/status.h"

#define ANT_REPEAT_CROSSING_H 13.0 /* of a central crossing at a period of a year */
#define ANT_REPEAT_BINS 20000      /* at most */
#define ANT_REPEAT_BIN_LN 2e-4     /* finest */
#define ANT_REPEAT_FLOOR 16.0      /* SNR^2 below which bins stay empty, unless another is asked */

typedef struct
{
  double period_min_d, period_max_d;
  int any_duration;                     /* 0: factors of the crossing time; 1: the same durations at every period */
  double shortest_factor, longest_factor;
  double shortest_d, longest_d;         /* of any duration; with factors, shortest_d is a floor */
} AntRepeatGrid;

/* Shortest and longest duration looked for at a period; none if *longest < *shortest. Never above a third of the period. */
void ant_repeat_grid_durations (const AntRepeatGrid *grid, double period_d, double *shortest_d, double *longest_d);
/* Periods at which a duration is looked for; none if *to <= *from. */
void ant_repeat_grid_periods (const AntRepeatGrid *grid, double duration_d, double *from_d, double *to_d);
/* Longest duration anywhere in the grid. */
double ant_repeat_grid_longest (const AntRepeatGrid *grid);

/* The best of one bin: mid_d is the middle of its event 0, days after place 0; event j is j periods later. */
typedef struct
{
  double power; /* SNR^2; 0: nothing */
  double period_d, mid_d, duration_d;
} AntRepeatCell;

typedef struct
{
  double from_ln, step_ln; /* bin i: ln P from from_ln + i step_ln */
  double floor;            /* SNR^2 below which bins stay empty */
  size_t first, n;         /* bins first .. first+n-1 of the whole range are held here */
  AntRepeatCell *cell;
} AntRepeatBins;

/* All bins of a grid, empty. */
AntStatus ant_repeat_bins_init (AntRepeatBins *bins, const AntRepeatGrid *grid);
/* Those bins of `whole` that periods from..to fall in, empty. */
AntStatus ant_repeat_bins_part (AntRepeatBins *part, const AntRepeatBins *whole, double from_d, double to_d);
void ant_repeat_bins_clear (AntRepeatBins *bins);
AntRepeatCell *ant_repeat_bins_at (const AntRepeatBins *bins, double period_d);
/* Keep the better of both in every bin; the earlier one of equals. */
void ant_repeat_bins_merge (AntRepeatBins *whole, const AntRepeatBins *part);
/* Middle of a bin, days. */
double ant_repeat_bins_period (const AntRepeatBins *bins, size_t i);
