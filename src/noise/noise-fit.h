/* noise-fit.h - find the noise model of a series: maximum of likelihood times priors.
 * Start: debiased Whittle fit of the masked periodogram (spectrum.h); polish: exact Gaussian likelihood (whitener.h) by
 * BFGS (Nocedal & Wright 2006, algorithm 6.1) with forward differences. */
#pragma once

#include "core/stages.h"
#include "noise/noise-model.h"
#include "noise/series.h"

#define ANT_MAX_FREE (2 * ANT_MAX_PARTS + 2)

typedef struct
{
  size_t max_steps;       /* BFGS steps at most */
  double settled_lnl;     /* stop when a step gains less ln posterior than this */
  double *curvature;      /* [ANT_MAX_FREE^2] inverse Hessian, or NULL: read if warm, written on return */
  const AntStop *stop;    /* looked at between steps; NULL: never */
  int warm;               /* curvature holds that of a fit to much the same data */
} AntFitOptions;
#define ANT_FIT_OPTIONS_INIT { .max_steps = 40, .settled_lnl = 0.01 }

typedef struct
{
  double log_likelihood;
  double log_posterior;   /* up to a constant: log_likelihood - penalty */
  size_t steps;
  size_t evaluations;     /* likelihoods computed */
} AntFitReport;

/* Polish `model` in place on the exact likelihood of the fit-worthy samples. report may be NULL.
 * ANT_NOT_CONVERGED leaves the best point found. */
AntStatus ant_noise_fit (AntNoiseModel *model, const AntSeries *series, const AntFitOptions *options,
                         AntFitReport *report);

/* Which free parameters the data did not constrain: unconstrained[i] = 1 where the curvature of the likelihood is below
 * that of the prior. [count of ant_noise_model_get]. */
AntStatus ant_noise_fit_unconstrained (const AntNoiseModel *model, const AntSeries *series, unsigned char *unconstrained);

/* Generic BFGS minimiser used by both fits: f writes the values (inf where not defined) at n_points points, each of n
 * numbers, one after another. x [n] in/out; first_step: length of the first trial step; h: forward-difference step. Own code
 * because a gradient is one call of f for n points here, which f does for little more than the price of one. */
typedef void (*AntObjective) (void *data, size_t n_points, const double *x, double *value);
AntStatus ant_minimise (size_t n, double *x, AntObjective f, void *data, double first_step, double h,
                        const AntFitOptions *options, AntFitReport *report);
