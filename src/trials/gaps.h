/* gaps.h - which samples of a simulated record are missing. */
#pragma once

#include <stddef.h>
#include <stdint.h>
#include "core/span.h"

/* Every kind is off where its lengths or rates are 0. Times are days from the start of the record. A sample is missing
 * when the middle of its exposure lies in a gap. */
typedef struct
{
  double orbit_period_d, orbit_gap_d; /* one gap per revolution */
  double orbit_offset_d;              /* start of one of these gaps */
  double daily_min_d, daily_max_d;    /* one gap a day, of a length between these, at a random hour */
  double short_per_30d, short_min_d, short_max_d;
  double long_per_30d, long_min_d, long_max_d;
  double dropped_fraction;            /* single samples lost at random */
  size_t n_listed;
  const AntSpan *listed;              /* [n_listed] borrowed */
} AntGapPlan;

/* Two ways of looking at the Sun, for records that need no particular gaps. */
typedef enum
{
  ANT_GAPS_NONE,
  ANT_GAPS_L1,        /* near-continuous: four gaps of 5-180 min in 30 d, 0.3 % single drops */
  ANT_GAPS_LOW_ORBIT, /* 35 of every 96 min, 1-3 h a day and one gap of 1-4 d in 30 d: about 55 % observed */
} AntGapMask;

AntGapPlan ant_gap_plan_for_mask (AntGapMask mask);
/* missing [n]: 1 in a gap, else 0. Rates give counts, rounded to whole gaps and spread one to each equal share of the
 * record, so that short records of one kind do not differ in their duty cycle by luck. */
void ant_gaps_draw (const AntGapPlan *plan, size_t n, double cadence_d, double exposure_d, uint64_t seed,
                    uint8_t *missing);
