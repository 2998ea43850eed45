/* simulate.c - the ingredients of a record put together. */
#include "trials/simulate.h"

#include <math.h>
#include <stdlib.h>
#include "core/random.h"
#include "core/units.h"
#include "trials/noise-draw.h"
#include "trials/streams.h"

size_t
ant_scenario_samples (const AntScenario *scenario)
{
  return (size_t)round (scenario->days / scenario->cadence_d);
}

static int
is_possible (const AntScenario *scenario)
{
  if (!(scenario->days > 0 && scenario->cadence_d > 0 && scenario->days / scenario->cadence_d < ANT_MAX_SAMPLES))
    return 0;
  if (!(scenario->exposure_d >= 0 && scenario->exposure_d <= scenario->cadence_d * (1 + 1e-12)))
    return 0;
  for (size_t i = 0; i < scenario->noise.n_parts; i++)
    {
      const AntNoisePart *part = &scenario->noise.part[i];

      if (!(part->rms_ppm >= 0 && part->time_d > 0) || (part->kind == ANT_OSCILLATOR && !(part->quality > 0)))
        return 0;
    }
  return scenario->noise.n_parts <= ANT_MAX_PARTS && ant_scenario_samples (scenario) > 0;
}

static void
add_spots (const AntScenario *scenario, const AntSimulated *simulated, double *value_ppm)
{
  for (size_t g = 0; g < simulated->n_groups; g++)
    for (size_t i = 0; i < simulated->n; i++)
      {
        const double start_d = (double)i * scenario->cadence_d;

        value_ppm[i] += ant_spot_mean (&simulated->group[g], scenario->spots.rotation_d, start_d,
                                       start_d + scenario->exposure_d) / ANT_PPM;
      }
}

static void
add_solar_noise (const AntScenario *scenario, size_t n, double *value_ppm)
{
  for (size_t i = 0; i < scenario->noise.n_parts; i++)
    {
      AntRandom random;

      ant_random_seed (&random, scenario->seed, ANT_STREAM_NOISE_PARTS + i);
      ant_noise_part_draw (&scenario->noise.part[i], n, scenario->cadence_d, scenario->exposure_d, &random, value_ppm);
    }
}

static void
add_flares (const AntScenario *scenario, size_t n, double *value_ppm)
{
  for (size_t f = 0; f < scenario->n_flares; f++)
    for (size_t i = 0; i < n; i++)
      {
        const double start_d = (double)i * scenario->cadence_d;

        value_ppm[i] += ant_flare_mean_ppm (&scenario->flare[f], start_d, start_d + scenario->exposure_d);
      }
}

/* The instrument's regular faults, relative to the level. */
static double
instrument_ppm (const AntScenario *scenario, size_t i)
{
  const double start_d = (double)i * scenario->cadence_d, end_d = start_d + scenario->exposure_d;
  double sum = 0;

  for (size_t s = 0; s < scenario->n_steps; s++)
    sum += ant_step_mean_ppm (&scenario->step[s], start_d, end_d);
  for (size_t s = 0; s < scenario->n_swings; s++)
    sum += ant_swing_mean_ppm (&scenario->swing[s], start_d, end_d);
  return sum;
}

static void
add_instrument (const AntScenario *scenario, size_t n, double *value)
{
  AntRandom random;

  ant_random_seed (&random, scenario->seed, ANT_STREAM_WHITE);
  for (size_t i = 0; i < n; i++)
    value[i] += ANT_PPM * (instrument_ppm (scenario, i) + scenario->noise.white_ppm * ant_random_normal (&random));
}

int
ant_warm_up_follows (const AntScenario *scenario, size_t gap_samples)
{
  return (double)gap_samples * scenario->cadence_d >= scenario->warm_up.after_gap_d;
}

/* The return after each gap that is long enough; warm-ups that have not died out are forgotten at the next gap. */
static void
add_warm_ups (const AntScenario *scenario, const uint8_t *missing, size_t n, double *value)
{
  size_t run = 0;
  AntTrialStep return_step = { .time_d = INFINITY, .recovery_d = scenario->warm_up.decay_d };

  return_step.size_ppm = scenario->warm_up.size_ppm;
  for (size_t i = 0; i < n; i++)
    {
      const double start_d = (double)i * scenario->cadence_d;

      if (missing[i])
        {
          run++;
          continue;
        }
      if (run > 0 && ant_warm_up_follows (scenario, run))
        return_step.time_d = start_d;
      run = 0;
      value[i] += ANT_PPM * ant_step_mean_ppm (&return_step, start_d, start_d + scenario->exposure_d);
    }
}

static void
add_spikes (const AntScenario *scenario, AntSimulated *simulated)
{
  for (size_t s = 0; s < simulated->n_spikes; s++)
    {
      const AntTrialSpike *spike = &simulated->spike[s];
      const double first = ant_spike_first (spike, scenario->cadence_d);

      for (double i = fmax (0, first); i < first + (double)spike->n_samples && i < (double)simulated->n; i++)
        {
          simulated->irradiance_w_m2[(size_t)i] += ANT_PPM * spike->size_ppm;
          if (spike->flagged)
            simulated->flag[(size_t)i] = 1;
        }
    }
}

static void
flag_steps (const AntScenario *scenario, AntSimulated *simulated)
{
  for (size_t s = 0; s < scenario->n_steps; s++)
    {
      const AntTrialStep *step = &scenario->step[s];

      if (!step->flagged)
        continue;
      for (size_t i = 0; i < simulated->n; i++)
        {
          const double start_d = (double)i * scenario->cadence_d;

          if (start_d + scenario->exposure_d > step->time_d && start_d < step->time_d + 3 * step->recovery_d)
            simulated->flag[i] = 1;
        }
    }
}

/* Listed groups and spikes first, then those drawn. 0 if memory is short. */
static int
draw_events (const AntScenario *scenario, AntSimulated *simulated)
{
  const AntSpotPlan *spots = &scenario->spots;
  const AntSpikePlan *spikes = &scenario->spikes;

  simulated->n_groups = spots->n_listed + ant_spots_count (spots, scenario->days);
  simulated->n_spikes = spikes->n_listed + ant_spikes_count (spikes, scenario->days);
  simulated->group = malloc ((simulated->n_groups + 1) * sizeof *simulated->group);
  simulated->spike = malloc ((simulated->n_spikes + 1) * sizeof *simulated->spike);
  if (!simulated->group || !simulated->spike)
    return 0;
  for (size_t i = 0; i < spots->n_listed; i++)
    simulated->group[i] = spots->listed[i];
  ant_spots_draw (spots, scenario->days, scenario->seed, simulated->group + spots->n_listed);
  for (size_t i = 0; i < spikes->n_listed; i++)
    simulated->spike[i] = spikes->listed[i];
  ant_spikes_draw (spikes, scenario->days, scenario->seed, simulated->spike + spikes->n_listed);
  return 1;
}

static void
compose (const AntScenario *scenario, const uint8_t *missing, AntSimulated *simulated)
{
  double *value = simulated->irradiance_w_m2;
  const size_t n = simulated->n;

  add_spots (scenario, simulated, value);
  add_solar_noise (scenario, n, value);
  add_flares (scenario, n, value);
  for (size_t i = 0; i < n; i++)
    value[i] = 1 + ANT_PPM * value[i];
  for (size_t p = 0; p < scenario->n_planets; p++)
    ant_planet_dim (&scenario->planet[p], scenario->limb_darkening, n, scenario->cadence_d, scenario->exposure_d,
                    value);
  add_instrument (scenario, n, value);
  if (scenario->warm_up.size_ppm != 0)
    add_warm_ups (scenario, missing, n, value);
  add_spikes (scenario, simulated);
  flag_steps (scenario, simulated);
  for (size_t i = 0; i < n; i++)
    {
      value[i] = missing[i] ? (double)NAN : scenario->level_w_m2 * value[i];
      if (missing[i])
        simulated->flag[i] = 0;
    }
}

AntSimulated *
ant_simulate (const AntScenario *scenario, AntStatus *status)
{
  AntSimulated *simulated;
  uint8_t *missing;
  size_t n;

  *status = ANT_BAD_ARGUMENT;
  if (!is_possible (scenario))
    return NULL;
  *status = ANT_NO_MEMORY;
  n = ant_scenario_samples (scenario);
  simulated = calloc (1, sizeof *simulated);
  missing = malloc (n);
  if (simulated)
    {
      simulated->n = n;
      simulated->irradiance_w_m2 = calloc (n, sizeof *simulated->irradiance_w_m2);
      simulated->flag = calloc (n, 1);
    }
  if (!simulated || !missing || !simulated->irradiance_w_m2 || !simulated->flag || !draw_events (scenario, simulated))
    {
      free (missing);
      ant_simulated_free (simulated);
      return NULL;
    }
  ant_gaps_draw (&scenario->gaps, n, scenario->cadence_d, scenario->exposure_d, scenario->seed, missing);
  compose (scenario, missing, simulated);
  free (missing);
  *status = ANT_OK;
  return simulated;
}

void
ant_simulated_free (AntSimulated *simulated)
{
  if (!simulated)
    return;
  free (simulated->irradiance_w_m2);
  free (simulated->flag);
  free (simulated->group);
  free (simulated->spike);
  free (simulated);
}
