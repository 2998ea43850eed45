/* population.h - records with events of known cause, for the studies and tests of verdicts: noise of the invented models,
 * and every five days an event drawn at random, built from the simulator's own ingredients. */
#pragma once

#include "masks.h"
#include "noise/noise-model.h"
#include "noise/series.h"

typedef enum
{
  ANT_TRUTH_CROSSING,
  ANT_TRUTH_SPOT,
  ANT_TRUTH_STEP,
  ANT_TRUTH_RECOVERY,
  ANT_TRUTH_SPIKE,
  ANT_TRUTH_THERMAL,
  ANT_TRUTH_ECLIPSE,
  ANT_TRUTH_GAP_EDGE,
  ANT_TRUTH_NOISE,
  ANT_N_TRUTHS,
} AntTruth;

extern const char *const ant_truth_name[ANT_N_TRUTHS];
/* Share of each among the events planted; noise is what is left over. */
extern const double ant_truth_share[ANT_N_TRUTHS];

typedef struct
{
  AntTruth truth;
  double from_d, to_d;  /* where it changes the record most */
  double depth_ppm, snr; /* of its own shape under the true noise */
  double parameter[4];
} AntPlantedEvent;

#define ANT_POPULATION_EVENTS 5
#define ANT_POPULATION_DAYS 25.0

/* Record `seed`: value [n], n samples of step_d over ANT_POPULATION_DAYS, NaN in the gaps; events [ANT_POPULATION_EVENTS] out.
 * Own SNRs are uniform in ln between the two. */
AntSeries ant_population_record (char model, AntMask mask, size_t n, double step_d, unsigned long seed, double snr_low,
                                 double snr_high, float *value, AntPlantedEvent *event);
/* An event of a given kind at a given time, in a record that holds noise already: as above. */
void ant_population_plant (char model, const AntSeries *series, AntTruth truth, double time_d, double snr,
                           AntRandom *random, float *value, AntPlantedEvent *event);
