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

/* One point by the single likelihood, several by lanes. */
static void
minus_log_posterior (void *data, size_t n_points, const double *theta, double *value)
{
  Problem *problem = data;
  size_t n = ant_noise_model_get (&problem->model, NULL);
  for (size_t done = 0; done < n_points; done += ANT_LANES)
    {
      AntNoiseModel model[ANT_LANES];
      double log_likelihood[ANT_LANES];
      size_t lanes = n_points - done < ANT_LANES ? n_points - done : ANT_LANES;
      for (size_t l = 0; l < lanes; l++)
        {
          model[l] = problem->model;
          ant_noise_model_set (&model[l], theta + (done + l) * n);
        }
      AntStatus status = lanes == 1 ? ant_noise_log_likelihood (model, problem->series, log_likelihood)
                                    : ant_noise_log_likelihoods (lanes, model, problem->series, log_likelihood);
      for (size_t l = 0; l < lanes; l++)
        value[done + l] = status ? HUGE_VAL : ant_noise_model_penalty (&model[l]) - log_likelihood[l];
    }
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
  double here[ANT_MAX_FREE], theta[(2 * ANT_MAX_FREE + 1) * ANT_MAX_FREE], value[2 * ANT_MAX_FREE + 1], h = 0.1;
  size_t n = ant_noise_model_get (model, here);
  for (size_t p = 0; p <= 2 * n; p++)
    {
      for (size_t i = 0; i < n; i++)
        theta[p * n + i] = here[i];
      if (p < 2 * n)
        theta[p * n + p / 2] += p % 2 ? h : -h;
    }
  minus_log_posterior (&problem, 2 * n + 1, theta, value);
  if (!isfinite (value[2 * n]))
    return ANT_BAD_ARGUMENT;
  double centre = ant_noise_model_penalty (model);
  for (size_t i = 0; i < n; i++)
    {
      double curvature = value[2 * i] + value[2 * i + 1] - 2 * value[2 * n], prior = -2 * centre;
      for (size_t side = 0; side < 2; side++)
        {
          ant_noise_model_set (&problem.model, theta + (2 * i + side) * n);
          prior += ant_noise_model_penalty (&problem.model);
        }
      unconstrained[i] = curvature - prior < prior; /* both over h^2 */
    }
  return ANT_OK;
}
