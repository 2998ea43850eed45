/* rotation-curve.h - the curve people look at: the slow variation of the Sun (rotation and spots) by a sliding harmonic
 * fit at the synodic period, dips masked. For display and passages only; the search never subtracts it.
 *
 * Sliding window of 27.275 d with a constant, and harmonics 1..K, weights tricube in time times Tukey's biweight in
 * residual (4.685, two reweightings), window slid inward at the ends, on bins of 30 min or the cadence if longer
 * (Cleveland 1979, JASA 74, 829, for the weights). A fit each window/108, their curves blended between. A faint penalty
 * on the harmonics (times k^4) keeps the curve from swinging where a window holds little; across gaps of more than half
 * a window it is a guess. */
#pragma once

#include <stdint.h>
#include "core/status.h"
#include "noise/series.h"

typedef struct
{
  double window_d;    /* 27.275232 */
  int harmonics;      /* 4 */
} AntRotationOptions;
#define ANT_ROTATION_OPTIONS_INIT { .window_d = 27.275232, .harmonics = 4 }

/* curve_ppm [series->n] out at every place, gaps included (NaN only where no window holds data).
 * masked [n] or NULL: nonzero = leave out (dips); spikes are left out too. Shorter series than the window use one window
 * over all of it. ANT_BAD_ARGUMENT, ANT_NO_DATA, ANT_NO_MEMORY. */
AntStatus ant_rotation_curve (const AntSeries *series, const uint8_t *masked, const AntRotationOptions *options,
                              float *curve_ppm);
