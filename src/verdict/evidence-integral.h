/* evidence-integral.h - the integral of a likelihood over a unit cube: Laplace's method, its Gaussian put right.
 *
 * From the best of some starting points a pattern search (Hooke & Jeeves 1961, J. ACM 8, 212) climbs to the mode; the curvature there gives
 * Laplace's Gaussian (Tierney & Kadane 1986, J. Am. Stat. Assoc. 81, 82), widened and given heavy tails it is the proposal
 * of an importance sampling that adapts (Cappe, Guillin, Marin & Robert 2004, J. Comput. Graph. Stat. 13, 907), since an
 * onset inside a gap or a sharp edge has no Gaussian. Random numbers with one fixed seed: same function, same digits. */
#pragma once

#include <stddef.h>
#include "core/status.h"

#define ANT_INTEGRAL_DIMENSIONS 4
#define ANT_INTEGRAL_QUANTITIES 5
#define ANT_INTEGRAL_BATCH 8
#define ANT_INTEGRAL_STARTS 256
#define ANT_INTEGRAL_SAMPLES 1024

/* ln f at n_points <= ANT_INTEGRAL_BATCH points of the cube, u [n_points][n]; -HUGE_VAL where f is 0. */
typedef void (*AntLogFunction) (void *data, size_t n_points, const double *u, double *value);

/* What means and covariances are to be of: `count` quantities at one point; tell NULL: the point itself. tell returns ln of
 * a factor by which f is multiplied for them (0: f as it is): another prior than the integral's. */
typedef struct
{
  size_t count;   /* at most ANT_INTEGRAL_QUANTITIES */
  double (*tell) (void *data, const double *u, double *quantity);
  size_t samples; /* the last round's points, at most ANT_INTEGRAL_SAMPLES; 0: 256 */
} AntQuantities;

typedef struct
{
  size_t n;                                         /* quantities: rows of the covariance */
  double best[ANT_INTEGRAL_DIMENSIONS], best_value; /* the highest point met */
  double mean[ANT_INTEGRAL_QUANTITIES];             /* of the quantities, under f as a density */
  double median[ANT_INTEGRAL_QUANTITIES], half_width[ANT_INTEGRAL_QUANTITIES]; /* half the central 68.27 % */
  double covariance[ANT_INTEGRAL_QUANTITIES * ANT_INTEGRAL_QUANTITIES];
  double log_integral;
  double log_laplace; /* what the Gaussian alone gives; NaN if the curvature is none */
  double effective;   /* number of independent samples that the integral rests on */
} AntIntegral;

/* start [n_starts][n], at most ANT_INTEGRAL_STARTS; 1 <= n <= 4. ANT_NO_DATA if f is 0 at all starts. */
AntStatus ant_evidence_integral (size_t n, AntLogFunction f, AntQuantities quantities, void *data, size_t n_starts,
                                 const double *start, AntIntegral *result);
#define ANT_NO_QUANTITIES ((AntQuantities){ 0, NULL, 0 })
