/* models.h - the three invented noises of the studies, as draws on a masked grid.
 * A: 40 ppm of granulation (250 s), 40 ppm of 3 h (an oscillator and an exponential: exponent about 3), 3 ppm of 5-minute oscillations, white 10.
 * B: 40 ppm (250 s), 50 ppm exponential of 10 h, oscillations, white 5.  C: 30 ppm of 1 h, white 100. All in ppm at 60 s. */
#pragma once

#include "masks.h"
#include "noise/noise-model.h"
#include "noise/series.h"

void ant_study_model (char name, AntNoiseModel *model);
/* Draw record `seed` into value [n] (NaN in the gaps) and view it. */
AntSeries ant_study_record (char name, AntMask mask, size_t n, double step_d, unsigned long seed, float *value);
