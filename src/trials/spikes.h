/* spikes.h - short runs of wild samples. */
#pragma once

#include <stddef.h>
#include <stdint.h>

typedef struct
{
  double time_d;    /* in the exposure of the first wild sample, days from the record's start */
  double size_ppm;  /* added; negative: dark */
  size_t n_samples; /* 1 = isolated */
  int flagged;      /* the record's own quality marks it */
} AntTrialSpike;

typedef struct
{
  double per_30d;
  double size_min_ppm, size_max_ppm; /* of isolated spikes drawn at random, > 0 */
  double dark_fraction;              /* share of them that is negative */
  int flagged;
  size_t n_listed;
  const AntTrialSpike *listed; /* [n_listed] borrowed */
} AntSpikePlan;

/* Index of the exposure that holds its time; a time that is a rounding error before an exposure belongs to it. */
double ant_spike_first (const AntTrialSpike *spike, double cadence_d);
/* How many spikes the plan draws for a record of `days`, and the spikes themselves [ant_spikes_count]. */
size_t ant_spikes_count (const AntSpikePlan *plan, double days);
void ant_spikes_draw (const AntSpikePlan *plan, double days, uint64_t seed, AntTrialSpike *spike);
