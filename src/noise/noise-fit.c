/* noise-fit.c - a noise model's parameters at the maximum of exact likelihood times priors. */
#include "noise/noise-fit.h"
#include <math.h>
#include "noise/whitener.h"

/* Forward-difference step in ln parameters: far above the rounding of ln L (about 1e-8), far below its curvature. */
#define DIFFERENCE_LN 1e-4
#define FIRST_STEP_LN 0.3

typedef struct
{
  AntNoiseModel model;
  const AntSeries *series;
} Problem;

static double
minus_log_posterior (void *data, const double *theta)
{
  Problem *problem = data;
  double log_likelihood;
  ant_noise_model_set (&problem->model, theta);
  if (ant_noise_log_likelihood (&problem->model, problem->series, &log_likelihood))
    return HUGE_VAL;
  return ant_noise_model_penalty (&problem->model) - log_likelihood;
}

AntStatus
ant_noise_fit (AntNoiseModel *model, const AntSeries *series, const AntFitOptions *options, AntFitReport *report)
{
  Problem problem = { *model, series };
  AntFitReport own = { 0 };
  double theta[ANT_MAX_FREE];
  size_t n = ant_noise_model_get (model, theta);
  if (ant_series_observed (series, 1) < 10)
    return ANT_NO_DATA;
  AntStatus status = ant_minimise (n, theta, minus_log_posterior, &problem, FIRST_STEP_LN, DIFFERENCE_LN,
                                   options, &own);
  if (status != ANT_OK && status != ANT_NOT_CONVERGED)
    return status;
  ant_noise_model_set (model, theta);
  own.log_likelihood = own.log_posterior + ant_noise_model_penalty (model);
  if (report)
    *report = own;
  return status;
}

AntStatus
ant_noise_fit_unconstrained (const AntNoiseModel *model, const AntSeries *series, unsigned char *unconstrained)
{
  Problem problem = { *model, series };
  double theta[ANT_MAX_FREE], h = 0.1;
  size_t n = ant_noise_model_get (model, theta);
  double here = minus_log_posterior (&problem, theta), penalty_here = ant_noise_model_penalty (&problem.model);
  if (!isfinite (here))
    return ANT_BAD_ARGUMENT;
  for (size_t i = 0; i < n; i++)
    {
      double centre = theta[i], curvature = -2 * here, prior = -2 * penalty_here;
      for (int side = -1; side <= 1; side += 2)
        {
          theta[i] = centre + side * h;
          curvature += minus_log_posterior (&problem, theta);
          prior += ant_noise_model_penalty (&problem.model);
        }
      theta[i] = centre;
      unconstrained[i] = curvature - prior < prior; /* both over h^2 */
    }
  return ANT_OK;
}
