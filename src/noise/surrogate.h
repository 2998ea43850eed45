/* surrogate.h - draw a noise-only record from a fitted model, on the same grid with the same gaps.
 * Exact state-space simulation per part (each oscillator a 2-state Gauss-Markov process stepped with its exact
 * covariance); no FFT, no periodicity. */
#pragma once

#include "core/random.h"
#include "core/status.h"
#include "noise/noise-model.h"
#include "noise/series.h"

/* value_ppm [series->n] out: NaN where the series has no observation. Safe from any thread with its own generator. */
AntStatus ant_surrogate_draw (const AntNoiseModel *model, const AntSeries *series, AntRandom *random, float *value_ppm);
