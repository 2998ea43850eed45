/* noise-draw.h - exact draws of a random process as an instrument sees it: averaged over each exposure.
 *
 * An oscillator is a 2-state, an exponential a 1-state Gauss-Markov process. Its mean over the exposure is one state
 * more, so that state and mean are stepped together with their exact joint covariance (the matrix exponential by Taylor
 * series and doubling; Van Loan 1978, IEEE Trans. Autom. Control 23, 395, asks the same integrals). No FFT, no
 * periodicity, no sub-sampling. With exposure 0 the samples are instantaneous, as noise/surrogate.h draws them. */
#pragma once

#include <stddef.h>
#include "core/random.h"
#include "noise/noise-model.h"

/* Add n samples of a stationary part, exposures of exposure_d <= cadence_d starting every cadence_d, to sum_ppm [n]. */
void ant_noise_part_draw (const AntNoisePart *part, size_t n, double cadence_d, double exposure_d, AntRandom *random,
                          double *sum_ppm);
