/* smoother.h - what the data say about some of a model's parts: their conditional mean, at every grid place.
 *
 * Given all observed samples y, a part with covariance K has the mean E[part | y] = K z with z = C^-1 y (Wiener 1949;
 * Rauch, Tung & Striebel 1965, AIAA J. 3, 1445, for the same by a filter and its reverse). In a gap it is the best
 * interpolation, and it returns to zero beyond the part's memory. Sums of parts are smoothed together. */
#pragma once

#include <stddef.h>
#include "core/status.h"
#include "noise/noise-model.h"
#include "noise/whitener.h"

/* K z for the sum of the chosen parts (chosen [model->n_parts], nonzero = taken), in n J operations: mean_ppm [n] out.
 * z [n]: from ant_whitener_solve, 0 at places not observed. ANT_BAD_ARGUMENT for a model without meaning. */
AntStatus ant_smooth (const AntNoiseModel *model, const unsigned char *chosen, double step_d, size_t n, const double *z,
                      double *mean_ppm);

/* A contrast: a weighted sum of the chosen parts at a few places. Its posterior standard deviation, given the whitener's
 * observations: sqrt (c'K c - (K c)' C^-1 (K c)), in n J operations. model must be the whitener's. */
AntStatus ant_smooth_contrast_sigma (const AntWhitener *whitener, const AntNoiseModel *model, const unsigned char *chosen,
                                     double step_d, size_t n_places, const size_t *place, const double *weight,
                                     double *sigma_ppm);
