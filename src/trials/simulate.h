/* simulate.h - an irradiance record made from a description: the Sun, what crosses it, and the instrument that looks.
 *
 * level x ((1 + spots + flares + solar noise) x (light the planets leave) + steps + swings + warm-ups + spikes + white
 * noise), every term averaged over the exposure (products of small terms by their means). The record starts at time 0;
 * sample i is exposed from i cadence to i cadence + exposure. One seed gives one record: each ingredient has its own
 * stream of random numbers, so that changing one leaves the others as they were. */
#pragma once

#include <stddef.h>
#include <stdint.h>
#include "core/status.h"
#include "core/transit-curve.h"
#include "noise/noise-model.h"
#include "trials/gaps.h"
#include "trials/planets.h"
#include "trials/pulses.h"
#include "trials/spikes.h"
#include "trials/spots.h"
#include "trials/swings.h"

/* An instrument that reads off after every long gap and returns exponentially. */
typedef struct
{
  double size_ppm;    /* negative: reads low; 0 = none */
  double decay_d;     /* > 0 */
  double after_gap_d; /* only after gaps at least this long */
} AntWarmUp;

typedef struct
{
  double days;
  double cadence_d;
  double exposure_d; /* 0 = instantaneous samples; <= cadence_d */
  double level_w_m2;
  uint64_t seed;
  AntLimbDarkening limb_darkening;
  AntNoiseModel noise; /* parts and white_ppm are used */
  AntGapPlan gaps;
  AntSpotPlan spots;
  AntSpikePlan spikes;
  AntWarmUp warm_up;
  /* Borrowed arrays. */
  size_t n_planets, n_steps, n_flares, n_swings;
  const AntTrialPlanet *planet;
  const AntTrialStep *step;
  const AntTrialFlare *flare;
  const AntTrialSwing *swing;
} AntScenario;

#define ANT_SCENARIO_INIT                                                                               \
  {                                                                                                     \
    .days = 30, .cadence_d = 60.0 / 86400, .exposure_d = 60.0 / 86400, .level_w_m2 = 1361, .seed = 1,   \
    .limb_darkening = { 0.40, 0.19 }, .spots = { .rotation_d = 27.275232 }                              \
  }

/* The record, and what was drawn at random for it. Owns its arrays. */
typedef struct
{
  size_t n;
  double *irradiance_w_m2; /* [n] NaN where missing */
  uint8_t *flag;           /* [n] 1 = the record's own quality says bad */
  size_t n_groups;
  AntSpotGroup *group;     /* [n_groups] listed and drawn */
  size_t n_spikes;
  AntTrialSpike *spike;    /* [n_spikes] listed and drawn */
} AntSimulated;

/* Whether a gap of so many samples is long enough for a warm-up after it. */
int ant_warm_up_follows (const AntScenario *scenario, size_t gap_samples);
/* Samples of a record: its days over the cadence, rounded. */
size_t ant_scenario_samples (const AntScenario *scenario);
/* NULL with *status set on ANT_BAD_ARGUMENT (a length, a cadence, an exposure or a part outside its range, or more than
 * ANT_MAX_SAMPLES) and ANT_NO_MEMORY. Same scenario, same digits. Safe from any thread. */
AntSimulated *ant_simulate (const AntScenario *scenario, AntStatus *status);
void ant_simulated_free (AntSimulated *simulated); /* NULL is fine */

#define ANT_MAX_SAMPLES 100000000
