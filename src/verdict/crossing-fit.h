/* crossing-fit.h - the parameters of a well-measured crossing by maximum likelihood, freed of the bias that curvature gives.
 *
 * Generalised least squares in epoch, ln of the length between the middles of the edges, impact and ln of the depth, which
 * the data pin down each by a feature of its own (Gauss-Newton, Levenberg's damping). Estimates of a curved model are
 * biased in second order: -1/2 F^-1 D'C^-1 tr (F^-1 H) (Box 1971, J. R. Stat. Soc. B 33, 171), D and H the first and second
 * derivatives of the model, F = D'C^-1 D; this is taken off, for T14, impact and radius ratio too, which are curved
 * functions of those. */
#pragma once

#include "verdict/rival-fit.h"

enum { ANT_CROSSING_EPOCH, ANT_CROSSING_T14, ANT_CROSSING_IMPACT, ANT_CROSSING_RADIUS, ANT_CROSSING_DEPTH, ANT_CROSSING_QUANTITIES };

/* start: middle, T14, impact, radius ratio. value, sigma [ANT_CROSSING_QUANTITIES] out: days, ln of days, 1, ln, ppm. ANT_NO_DATA where
 * the data do not say which chord it is (impact known to worse than 0.15, or near the limb): a posterior's moments are
 * what there is then. ANT_NO_MEMORY. */
AntStatus ant_crossing_fit (const AntRivalBench *bench, const double start[ANT_RIVAL_PARAMETERS],
                            double value[ANT_CROSSING_QUANTITIES], double sigma[ANT_CROSSING_QUANTITIES]);
