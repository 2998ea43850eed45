/* repeat-grid.c - durations for each period, and bins of ln P. */
#include "search/repeat-grid.h"
#include <math.h>
#include <stdlib.h>
#include "core/units.h"

#define YEAR_D 365.25
#define MOST_DUTY (1.0 / 3)

static double
crossing_d (double period_d)
{
  return ANT_REPEAT_CROSSING_H / ANT_HOURS_PER_DAY * cbrt (period_d / YEAR_D);
}

void
ant_repeat_grid_durations (const AntRepeatGrid *grid, double period_d, double *shortest_d, double *longest_d)
{
  *shortest_d = grid->any_duration ? grid->shortest_d : fmax (grid->shortest_factor * crossing_d (period_d), grid->shortest_d);
  *longest_d = grid->any_duration ? grid->longest_d : grid->longest_factor * crossing_d (period_d);
  *longest_d = fmin (*longest_d, MOST_DUTY * period_d);
}

void
ant_repeat_grid_periods (const AntRepeatGrid *grid, double duration_d, double *from_d, double *to_d)
{
  double crossings = duration_d / crossing_d (YEAR_D);
  *from_d = grid->any_duration ? 0 : YEAR_D * pow (crossings / grid->longest_factor, 3);
  *to_d = grid->any_duration ? HUGE_VAL : YEAR_D * pow (crossings / grid->shortest_factor, 3);
  *from_d = fmax (fmax (*from_d, duration_d / MOST_DUTY), grid->period_min_d);
  *to_d = fmin (*to_d, grid->period_max_d);
}

double
ant_repeat_grid_longest (const AntRepeatGrid *grid)
{
  double shortest_d, longest_d;
  ant_repeat_grid_durations (grid, grid->period_max_d, &shortest_d, &longest_d);
  return longest_d;
}

AntStatus
ant_repeat_bins_init (AntRepeatBins *bins, const AntRepeatGrid *grid)
{
  double from = log (grid->period_min_d), width = log (grid->period_max_d) - from;
  double step = fmax (ANT_REPEAT_BIN_LN, width / ANT_REPEAT_BINS);
  size_t n = (size_t) ceil (width / step);
  n = n < 1 ? 1 : n > ANT_REPEAT_BINS ? ANT_REPEAT_BINS : n;
  *bins = (AntRepeatBins){ .from_ln = from, .step_ln = step, .n = n, .floor = ANT_REPEAT_FLOOR, .cell = calloc (n, sizeof *bins->cell) };
  return bins->cell ? ANT_OK : ANT_NO_MEMORY;
}

/* Bin of a period, within the whole range. */
static size_t
bin_of (const AntRepeatBins *bins, double period_d)
{
  double at = floor ((log (period_d) - bins->from_ln) / bins->step_ln);
  size_t i = at > 0 ? (size_t) at : 0;
  i = i < bins->first ? bins->first : i;
  return i < bins->first + bins->n ? i : bins->first + bins->n - 1;
}

AntStatus
ant_repeat_bins_part (AntRepeatBins *part, const AntRepeatBins *whole, double from_d, double to_d)
{
  *part = *whole;
  part->first = bin_of (whole, from_d);
  part->n = bin_of (whole, to_d) - part->first + 1;
  part->cell = calloc (part->n, sizeof *part->cell);
  return part->cell ? ANT_OK : ANT_NO_MEMORY;
}

void
ant_repeat_bins_clear (AntRepeatBins *bins)
{
  free (bins->cell);
  *bins = (AntRepeatBins){ 0 };
}

AntRepeatCell *
ant_repeat_bins_at (const AntRepeatBins *bins, double period_d)
{
  return &bins->cell[bin_of (bins, period_d) - bins->first];
}

void
ant_repeat_bins_merge (AntRepeatBins *whole, const AntRepeatBins *part)
{
  for (size_t i = 0; i < part->n; i++)
    {
      AntRepeatCell *cell = &whole->cell[part->first - whole->first + i];
      if (part->cell[i].power > cell->power)
        *cell = part->cell[i];
    }
}

double
ant_repeat_bins_period (const AntRepeatBins *bins, size_t i)
{
  return exp (bins->from_ln + ((double) (bins->first + i) + 0.5) * bins->step_ln);
}
