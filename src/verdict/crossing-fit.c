/* crossing-fit.c - Gauss-Newton on a crossing under the noise of its record, and Box's correction. */
#include "verdict/crossing-fit.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/dense.h"
#include "core/units.h"

#define N 4 /* epoch, ln length, impact, ln depth */
#define Q ANT_CROSSING_QUANTITIES
#define ITERATIONS 40
#define SETTLED 1e-3       /* of a sigma: the step at which it is over */
#define LEAST_SURE 0.15    /* of the impact */
#define MOST_IMPACT 0.97

typedef struct
{
  const AntRivalBench *bench;
  double theta[N], step[N];
  float *model, *above, *below;     /* [n] */
  float *slope[N];                  /* [n] */
  double *solved[N], *solved_model; /* C^-1 of slopes and model */
  double fisher[N * N], factor[N * N], gradient[N], gain;
} Fit;

/* Impact is measured from the centre either way; beyond the limb there is no crossing to speak of. */
static double
impact_of (const double *theta)
{
  return fmin (fabs (theta[2]), MOST_IMPACT);
}

static AntCrossing
crossing_of (const Fit *fit, const double *theta)
{
  double depth = fmin (exp (theta[3]) * ANT_PPM, 0.9), b = impact_of (theta);
  AntCrossing crossing = { ant_crossing_radius_for_depth (b, fit->bench->limb_darkening, depth), b, 1 };
  crossing.t14_d = exp (theta[1]) / (1 - ant_crossing_ingress_d (&crossing));
  return crossing;
}

static void
model_at (const Fit *fit, const double *theta, float *value)
{
  const AntRivalBench *bench = fit->bench;
  AntCrossing crossing = crossing_of (fit, theta);
  AntRivalCurve curve;
  double parameter[ANT_RIVAL_PARAMETERS] = { theta[0], crossing.t14_d, crossing.impact, crossing.radius_ratio };
  ant_rival_curve_init (&curve, ANT_RIVAL_CROSSING, parameter, bench->limb_darkening, NULL);
  memset (value, 0, bench->window.n * sizeof *value);
  double from = ceil (ant_series_place (&bench->window, curve.from_d - 0.5 * bench->exposure_d));
  double to = floor (ant_series_place (&bench->window, curve.to_d + 0.5 * bench->exposure_d));
  for (double p = fmax (0, from); p <= to && p < (double) bench->window.n; p++)
    value[(size_t) p] = (float) (-bench->sign * exp (theta[3])
                                 * ant_rival_curve_mean (&curve, ant_series_time (&bench->window, p), bench->exposure_d));
}

static void
moved (const double *theta, const double *by, double times, double *there)
{
  for (size_t i = 0; i < N; i++)
    there[i] = theta[i] + times * by[i];
}

/* Observed places of the window alone count. */
static double
dot (const Fit *fit, const float *a, const double *solved)
{
  double sum = 0;
  for (size_t i = 0; i < fit->bench->window.n; i++)
    sum += (double) a[i] * solved[i];
  return sum;
}

static AntStatus
derive (Fit *fit)
{
  const AntWhitener *whitener = fit->bench->whitener;
  size_t n = fit->bench->window.n;
  model_at (fit, fit->theta, fit->model);
  AntStatus status = ant_whitener_solve (whitener, fit->model, fit->solved_model);
  for (size_t i = 0; i < N && !status; i++)
    {
      double by[N] = { 0 }, there[N];
      by[i] = fit->step[i];
      moved (fit->theta, by, 1, there);
      model_at (fit, there, fit->above);
      moved (fit->theta, by, -1, there);
      model_at (fit, there, fit->below);
      for (size_t j = 0; j < n; j++)
        fit->slope[i][j] = (float) ((double) (fit->above[j] - fit->below[j]) / (2 * fit->step[i]));
      status = ant_whitener_solve (whitener, fit->slope[i], fit->solved[i]);
    }
  for (size_t i = 0; i < N && !status; i++)
    {
      fit->gradient[i] = dot (fit, fit->slope[i], fit->bench->z) - dot (fit, fit->slope[i], fit->solved_model);
      for (size_t j = 0; j < N; j++)
        fit->fisher[i * N + j] = dot (fit, fit->slope[i], fit->solved[j]);
    }
  fit->gain = dot (fit, fit->model, fit->bench->z) - 0.5 * dot (fit, fit->model, fit->solved_model);
  return status;
}

static AntStatus
gain_at (Fit *fit, const double *theta, double *gain)
{
  model_at (fit, theta, fit->above);
  AntStatus status = ant_whitener_solve (fit->bench->whitener, fit->above, fit->solved_model);
  *gain = dot (fit, fit->above, fit->bench->z) - 0.5 * dot (fit, fit->above, fit->solved_model);
  return status;
}

/* To the top of the likelihood. */
static AntStatus
climb (Fit *fit)
{
  double damping = 1e-3;
  AntStatus status = derive (fit);
  for (int i = 0; i < ITERATIONS && !status; i++)
    {
      double by[N], there[N], gain, length = 0;
      memcpy (fit->factor, fit->fisher, sizeof fit->factor);
      for (size_t k = 0; k < N; k++)
        fit->factor[k * N + k] *= 1 + damping;
      if (ant_cholesky (N, fit->factor))
        return ANT_NO_DATA;
      ant_cholesky_solve (N, fit->factor, fit->gradient, by);
      for (size_t k = 0; k < N; k++)
        length += by[k] * fit->gradient[k];
      moved (fit->theta, by, 1, there);
      there[2] = fabs (there[2]);
      if (length < SETTLED * SETTLED)
        break;
      status = there[2] < MOST_IMPACT ? gain_at (fit, there, &gain) : ANT_OK;
      if (!status && there[2] < MOST_IMPACT && gain > fit->gain)
        {
          memcpy (fit->theta, there, sizeof there);
          damping *= 0.2;
          status = derive (fit);
        }
      else
        damping *= 8;
      if (damping > 1e6)
        break;
    }
  memcpy (fit->factor, fit->fisher, sizeof fit->factor);
  return status ? status : ant_cholesky (N, fit->factor) ? ANT_NO_DATA : ANT_OK;
}

static void
quantities_at (const Fit *fit, const double *theta, double *quantity)
{
  AntCrossing crossing = crossing_of (fit, theta);
  quantity[ANT_CROSSING_EPOCH] = theta[0];
  quantity[ANT_CROSSING_T14] = log (crossing.t14_d);
  quantity[ANT_CROSSING_IMPACT] = theta[2];
  quantity[ANT_CROSSING_RADIUS] = log (crossing.radius_ratio);
  quantity[ANT_CROSSING_DEPTH] = exp (theta[3]);
}

/* Along the columns of a root of the covariance: the spread of the quantities, and what curvature adds to them. */
static AntStatus
correct (Fit *fit, double *value, double *sigma)
{
  double covariance[N * N], bend[Q] = { 0 }, slope[Q][N], middle[Q], moment[N], bias[N], root[N][N];
  size_t n = fit->bench->window.n;
  ant_cholesky_inverse (N, fit->factor, covariance);
  if (ant_cholesky (N, covariance))
    return ANT_NO_DATA;
  memset (fit->below, 0, n * sizeof *fit->below);
  quantities_at (fit, fit->theta, middle);
  for (size_t k = 0; k < N; k++)
    {
      double there[N], side[2][Q];
      for (size_t i = 0; i < N; i++)
        root[k][i] = i < k ? 0 : covariance[i * N + k];
      for (int s = 0; s < 2; s++)
        {
          moved (fit->theta, root[k], s ? -1 : 1, there);
          quantities_at (fit, there, side[s]);
          model_at (fit, there, fit->above);
          for (size_t j = 0; j < n; j++)
            fit->below[j] += fit->above[j] - fit->model[j];
        }
      for (size_t q = 0; q < Q; q++)
        {
          slope[q][k] = 0.5 * (side[0][q] - side[1][q]);
          bend[q] += 0.5 * (side[0][q] + side[1][q] - 2 * middle[q]);
        }
    }
  for (size_t i = 0; i < N; i++)
    moment[i] = -0.5 * dot (fit, fit->below, fit->solved[i]);
  for (size_t k = 0; k < N; k++) /* the bias along the columns */
    {
      bias[k] = 0;
      for (size_t i = 0; i < N; i++)
        bias[k] += root[k][i] * moment[i];
    }
  for (size_t q = 0; q < Q; q++)
    {
      double squares = 0;
      value[q] = middle[q] - bend[q];
      for (size_t k = 0; k < N; k++)
        {
          squares += slope[q][k] * slope[q][k];
          value[q] -= slope[q][k] * bias[k];
        }
      sigma[q] = sqrt (squares);
    }
  return ANT_OK;
}

/* Room for all vectors in one piece. */
static AntStatus
make_room (Fit *fit, double **room)
{
  size_t n = fit->bench->window.n;
  *room = calloc (n, (N + 1) * sizeof (double) + (N + 3) * sizeof (float));
  if (!*room)
    return ANT_NO_MEMORY;
  float *floats = (float *) (*room + (N + 1) * n);
  for (size_t i = 0; i < N; i++)
    {
      fit->solved[i] = *room + i * n;
      fit->slope[i] = floats + i * n;
    }
  fit->solved_model = *room + N * n;
  fit->model = floats + N * n;
  fit->above = floats + (N + 1) * n;
  fit->below = floats + (N + 2) * n;
  return ANT_OK;
}

AntStatus
ant_crossing_fit (const AntRivalBench *bench, const double start[ANT_RIVAL_PARAMETERS], double value[Q], double sigma[Q])
{
  AntCrossing first = { start[3], start[2], 1 };
  double depth = ant_transit_loss (start[3], start[2], bench->limb_darkening) / ANT_PPM, *room;
  double length_d = start[1] * (1 - ant_crossing_ingress_d (&first));
  Fit fit = { .bench = bench, .theta = { start[0], log (length_d), fmax (0.05, start[2]), log (depth) },
              .step = { 0.005 * length_d, 0.005, 0.02, 0.01 } };
  if (!(depth > 0) || make_room (&fit, &room))
    return depth > 0 ? ANT_NO_MEMORY : ANT_NO_DATA;
  AntStatus status = climb (&fit);
  if (!status)
    status = correct (&fit, value, sigma);
  free (room);
  if (status)
    return status;
  int sure = sigma[ANT_CROSSING_IMPACT] < LEAST_SURE && value[ANT_CROSSING_IMPACT] > 0
             && value[ANT_CROSSING_IMPACT] + 2 * sigma[ANT_CROSSING_IMPACT] < MOST_IMPACT;
  return sure ? ANT_OK : ANT_NO_DATA;
}
