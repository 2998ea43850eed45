/* gaps.c - orbit, daily, short, long and listed gaps, and single drops. */
#include "trials/gaps.h"

#include <math.h>
#include <string.h>
#include "core/random.h"
#include "core/units.h"
#include "trials/streams.h"

typedef struct
{
  size_t n;
  double cadence_d, exposure_d;
  uint8_t *missing;
} Grid;

AntGapPlan
ant_gap_plan_for_mask (AntGapMask mask)
{
  AntGapPlan plan = { 0 };

  if (mask == ANT_GAPS_L1)
    {
      plan.short_per_30d = 4;
      plan.short_min_d = 5 / ANT_MINUTES_PER_DAY;
      plan.short_max_d = 180 / ANT_MINUTES_PER_DAY;
      plan.dropped_fraction = 0.003;
    }
  if (mask == ANT_GAPS_LOW_ORBIT)
    {
      plan.orbit_period_d = 96 / ANT_MINUTES_PER_DAY;
      plan.orbit_gap_d = 35 / ANT_MINUTES_PER_DAY;
      plan.daily_min_d = 1 / ANT_HOURS_PER_DAY;
      plan.daily_max_d = 3 / ANT_HOURS_PER_DAY;
      plan.long_per_30d = 1;
      plan.long_min_d = 1;
      plan.long_max_d = 4;
    }
  return plan;
}

static void
remove_span (Grid *grid, double start_d, double end_d)
{
  /* Middles of exposures at i cadence + exposure/2, in start <= t < end, rounding errors of the times left aside. */
  const double first = ceil ((start_d - grid->exposure_d / 2) / grid->cadence_d - 1e-6);
  const double last = ceil ((end_d - grid->exposure_d / 2) / grid->cadence_d - 1e-6);
  const size_t from = first > 0 ? (size_t)fmin (first, (double)grid->n) : 0;
  const size_t to = last > 0 ? (size_t)fmin (last, (double)grid->n) : 0;

  if (to > from)
    memset (grid->missing + from, 1, to - from);
}

/* One gap in each of `count` equal shares of the record. */
static void
remove_spread (Grid *grid, double count, double min_d, double max_d, uint64_t seed, AntStream stream)
{
  const double share_d = (double)grid->n * grid->cadence_d / count;
  AntRandom random;

  ant_random_seed (&random, seed, stream);
  for (double i = 0; i < count; i++)
    {
      const double length_d = min_d + (max_d - min_d) * ant_random_uniform (&random);
      const double room_d = fmax (0, share_d - length_d);
      const double start_d = i * share_d + room_d * ant_random_uniform (&random);

      remove_span (grid, start_d, start_d + length_d);
    }
}

static void
remove_orbit (Grid *grid, const AntGapPlan *plan)
{
  const double days = (double)grid->n * grid->cadence_d;
  const double first = floor (-(plan->orbit_offset_d + plan->orbit_gap_d) / plan->orbit_period_d);

  for (double k = first; k * plan->orbit_period_d + plan->orbit_offset_d < days; k++)
    {
      const double start_d = k * plan->orbit_period_d + plan->orbit_offset_d;

      remove_span (grid, start_d, start_d + plan->orbit_gap_d);
    }
}

static void
remove_dropped (Grid *grid, double fraction, uint64_t seed)
{
  AntRandom random;

  ant_random_seed (&random, seed, ANT_STREAM_DROPPED);
  for (size_t i = 0; i < grid->n; i++)
    if (ant_random_uniform (&random) < fraction)
      grid->missing[i] = 1;
}

void
ant_gaps_draw (const AntGapPlan *plan, size_t n, double cadence_d, double exposure_d, uint64_t seed, uint8_t *missing)
{
  Grid grid = { n, cadence_d, exposure_d, missing };
  const double days = (double)n * cadence_d;

  memset (missing, 0, n);
  if (plan->orbit_period_d > 0 && plan->orbit_gap_d > 0)
    remove_orbit (&grid, plan);
  if (plan->daily_max_d > 0)
    remove_spread (&grid, fmax (1, round (days)), plan->daily_min_d, plan->daily_max_d, seed, ANT_STREAM_DAILY_GAPS);
  remove_spread (&grid, round (plan->short_per_30d * days / 30), plan->short_min_d, plan->short_max_d, seed,
                 ANT_STREAM_SHORT_GAPS);
  remove_spread (&grid, round (plan->long_per_30d * days / 30), plan->long_min_d, plan->long_max_d, seed,
                 ANT_STREAM_LONG_GAPS);
  for (size_t i = 0; i < plan->n_listed; i++)
    remove_span (&grid, plan->listed[i].start_d, plan->listed[i].end_d);
  if (plan->dropped_fraction > 0)
    remove_dropped (&grid, plan->dropped_fraction, seed);
}
