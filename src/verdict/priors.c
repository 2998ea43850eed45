/* priors.c - the table of priors. */
#include "verdict/priors.h"

#define MINUTE (1.0 / 1440)
#define HOUR (1.0 / 24)

static const AntRivalPrior table[ANT_N_RIVALS] = {
  [ANT_RIVAL_CROSSING] = { "crossing", 3, { { 0.3 * HOUR, 18 * HOUR, 1 }, { 0, 0.95, 0 }, { 1e-3, 0.2, 1 } }, 0,
                           { ANT_CAUSE_PLANET, ANT_CAUSE_PLANET }, { 1, 0 } },
  [ANT_RIVAL_TRAPEZOID] = { "trapezoid", 2, { { 0.2 * HOUR, 18 * HOUR, 1 }, { 0, 0.5, 0 } }, 0,
                            { ANT_CAUSE_INSTRUMENT, ANT_CAUSE_INSTRUMENT }, { 0.01, 0.05 } },
  [ANT_RIVAL_STEP] = { "step", 0, { { 0 } }, 1, { ANT_CAUSE_INSTRUMENT, ANT_CAUSE_INSTRUMENT }, { 0.25, 0.25 } },
  [ANT_RIVAL_RECOVERY] = { "recovery", 1, { { 5 * MINUTE, 10, 1 } }, 0,
                           { ANT_CAUSE_INSTRUMENT, ANT_CAUSE_INSTRUMENT }, { 0.34, 0.3 } },
  [ANT_RIVAL_THERMAL] = { "thermal", 2, { { 2 * MINUTE, 12 * HOUR, 1 }, { 20 * MINUTE, 10, 1 } }, 0,
                          { ANT_CAUSE_INSTRUMENT, ANT_CAUSE_INSTRUMENT }, { 0.2, 0.2 } },
  [ANT_RIVAL_SPIKE] = { "spike", 1, { { MINUTE / 6, 20 * MINUTE, 1 } }, 0,
                        { ANT_CAUSE_INSTRUMENT, ANT_CAUSE_INSTRUMENT }, { 0.2, 0.2 } },
  [ANT_RIVAL_SPOT] = { "spot", 1, { { 0.25, 8, 1 } }, 0, { ANT_CAUSE_SPOT, ANT_CAUSE_SPOT }, { 1, 0 } },
  [ANT_RIVAL_ECLIPSE] = { "eclipse", 1, { { 0.3 * HOUR, 8 * HOUR, 1 } }, 0,
                          { ANT_CAUSE_ECLIPSE, ANT_CAUSE_ECLIPSE }, { 1, 0 } },
  [ANT_RIVAL_FLARE] = { "flare", 2, { { 0.5 * MINUTE, 30 * MINUTE, 1 }, { 3 * MINUTE, 12 * HOUR, 1 } }, 0,
                        { ANT_CAUSE_FLARE, ANT_CAUSE_FLARE }, { 0, 1 } },
};

const AntRivalPrior *
ant_rival_prior (AntRivalKind kind)
{
  return &table[kind];
}
