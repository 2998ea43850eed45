/* spikes.c - spikes at random times. */
#include "trials/spikes.h"

#include <math.h>
#include "core/random.h"
#include "trials/streams.h"

double
ant_spike_first (const AntTrialSpike *spike, double cadence_d)
{
  return floor (spike->time_d / cadence_d + 1e-6);
}

size_t
ant_spikes_count (const AntSpikePlan *plan, double days)
{
  return (size_t)round (plan->per_30d * days / 30);
}

void
ant_spikes_draw (const AntSpikePlan *plan, double days, uint64_t seed, AntTrialSpike *spike)
{
  const size_t count = ant_spikes_count (plan, days);
  AntRandom random;

  ant_random_seed (&random, seed, ANT_STREAM_SPIKES);
  for (size_t i = 0; i < count; i++)
    {
      const double size_ppm
          = plan->size_min_ppm + (plan->size_max_ppm - plan->size_min_ppm) * ant_random_uniform (&random);

      spike[i].time_d = days * ant_random_uniform (&random);
      spike[i].size_ppm = ant_random_uniform (&random) < plan->dark_fraction ? -size_ppm : size_ppm;
      spike[i].n_samples = 1;
      spike[i].flagged = plan->flagged;
    }
}
