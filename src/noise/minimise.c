/* minimise.c - a small quasi-Newton minimiser: BFGS with a backtracking line search and forward differences. */
#include <math.h>
#include <string.h>
#include "noise/noise-fit.h"

typedef struct
{
  size_t n;
  AntObjective f;
  void *data;
  double h;
  size_t evaluations;
  double inverse[ANT_MAX_FREE * ANT_MAX_FREE]; /* of the Hessian */
} Search;

static double
value_at (Search *search, const double *x)
{
  double value;
  search->f (search->data, 1, x, &value);
  search->evaluations++;
  return isfinite (value) ? value : HUGE_VAL;
}

static void
gradient (Search *search, const double *x, double fx, double *g)
{
  size_t n = search->n;
  double moved[ANT_MAX_FREE * ANT_MAX_FREE] = { 0 };
  for (size_t i = 0; i < n; i++)
    {
      memcpy (moved + i * n, x, n * sizeof *x);
      moved[i * n + i] += search->h;
    }
  search->f (search->data, n, moved, g);
  search->evaluations += n;
  for (size_t i = 0; i < n; i++)
    {
      if (!isfinite (g[i])) /* a wall ahead: look the other way */
        {
          moved[i * n + i] = x[i] - search->h;
          g[i] = 2 * fx - value_at (search, moved + i * n);
        }
      g[i] = (g[i] - fx) / search->h;
    }
}

static void
reset (Search *search, const double *g, double first_step)
{
  double norm = 0;
  for (size_t i = 0; i < search->n; i++)
    norm += g[i] * g[i];
  double scale = norm > 0 ? first_step / sqrt (norm) : 1;
  memset (search->inverse, 0, sizeof search->inverse);
  for (size_t i = 0; i < search->n; i++)
    search->inverse[i * search->n + i] = scale;
}

/* Returns the directional derivative, < 0; the direction is limited to steps of 2 in any ln parameter. */
static double
direction (const Search *search, const double *g, double *p)
{
  double slope = 0, longest = 0;
  for (size_t i = 0; i < search->n; i++)
    {
      p[i] = 0;
      for (size_t j = 0; j < search->n; j++)
        p[i] -= search->inverse[i * search->n + j] * g[j];
      longest = fmax (longest, fabs (p[i]));
    }
  double shrink = longest > 2 ? 2 / longest : 1;
  for (size_t i = 0; i < search->n; i++)
    {
      p[i] *= shrink;
      slope += p[i] * g[i];
    }
  return slope;
}

/* Armijo backtracking with quadratic interpolation. Returns the step length, 0 if none helps. */
static double
backtrack (Search *search, const double *x, const double *p, double fx, double slope, double *moved, double *f_new)
{
  double length = 1;
  for (int trial = 0; trial < 12; trial++)
    {
      for (size_t i = 0; i < search->n; i++)
        moved[i] = x[i] + length * p[i];
      *f_new = value_at (search, moved);
      if (*f_new <= fx + 1e-4 * length * slope)
        return length;
      double best = isfinite (*f_new) ? -slope * length * length / (2 * (*f_new - fx - slope * length)) : 0;
      length = fmin (fmax (best, 0.1 * length), 0.5 * length);
    }
  return 0;
}

static void
update (Search *search, const double *step, const double *change)
{
  size_t n = search->n;
  double curvature = 0, hy[ANT_MAX_FREE], yhy = 0;
  for (size_t i = 0; i < n; i++)
    curvature += step[i] * change[i];
  if (!(curvature > 1e-12))
    return;
  for (size_t i = 0; i < n; i++)
    {
      hy[i] = 0;
      for (size_t j = 0; j < n; j++)
        hy[i] += search->inverse[i * n + j] * change[j];
      yhy += change[i] * hy[i];
    }
  double a = (curvature + yhy) / (curvature * curvature);
  for (size_t i = 0; i < n; i++)
    for (size_t j = 0; j < n; j++)
      search->inverse[i * n + j] += a * step[i] * step[j] - (hy[i] * step[j] + step[i] * hy[j]) / curvature;
}

/* The first curvature seen says how large the Hessian is (Nocedal & Wright 2006, eq. 6.20). */
static void
rescale (Search *search, const double *step, const double *change)
{
  double sy = 0, yy = 0;
  for (size_t i = 0; i < search->n; i++)
    {
      sy += step[i] * change[i];
      yy += change[i] * change[i];
    }
  if (!(sy > 1e-12))
    return;
  for (size_t i = 0; i < search->n; i++)
    search->inverse[i * search->n + i] = sy / yy;
}

AntStatus
ant_minimise (size_t n, double *x, AntObjective f, void *data, double first_step, double h, const AntFitOptions *options,
              AntFitReport *report)
{
  Search search = { .n = n, .f = f, .data = data, .h = h };
  double g[ANT_MAX_FREE], g_new[ANT_MAX_FREE], p[ANT_MAX_FREE], moved[ANT_MAX_FREE], f_new = 0;
  if (n == 0 || n > ANT_MAX_FREE)
    return ANT_BAD_ARGUMENT;
  double fx = value_at (&search, x);
  if (ant_stop_asked (options->stop))
    return ANT_STOPPED;
  if (!isfinite (fx))
    return ANT_BAD_ARGUMENT;
  AntStatus status = ANT_NOT_CONVERGED;
  int fresh = 1, small = options->warm ? 1 : 0;
  size_t steps = 0;
  gradient (&search, x, fx, g);
  if (options->curvature && options->warm)
    {
      memcpy (search.inverse, options->curvature, n * n * sizeof *search.inverse);
      fresh = 0;
    }
  else
    reset (&search, g, first_step);
  for (; steps < options->max_steps; steps++)
    {
      if (ant_stop_asked (options->stop))
        return ANT_STOPPED;
      double slope = direction (&search, g, p);
      double length = slope < 0 ? backtrack (&search, x, p, fx, slope, moved, &f_new) : 0;
      if (length == 0)
        {
          if (fresh) /* not even along the gradient: the bottom, to the accuracy of the differences */
            {
              status = ANT_OK;
              break;
            }
          reset (&search, g, 0.1 * first_step);
          fresh = 1;
          continue;
        }
      if (steps + 1 == options->max_steps) /* nothing more will be asked of the gradient */
        {
          memcpy (x, moved, n * sizeof *x);
          status = fx - f_new < options->settled_lnl ? ANT_OK : ANT_NOT_CONVERGED;
          fx = f_new;
          steps++;
          break;
        }
      gradient (&search, moved, f_new, g_new);
      for (size_t i = 0; i < n; i++)
        {
          p[i] = moved[i] - x[i];
          x[i] = moved[i];
          double change = g_new[i] - g[i];
          g[i] = g_new[i];
          g_new[i] = change;
        }
      if (fresh)
        rescale (&search, p, g_new);
      fresh = 0;
      update (&search, p, g_new);
      small = fx - f_new < options->settled_lnl ? small + 1 : 0;
      fx = f_new;
      if (small >= 2)
        {
          status = ANT_OK;
          break;
        }
    }
  if (options->curvature)
    memcpy (options->curvature, search.inverse, n * n * sizeof *search.inverse);
  if (report)
    *report = (AntFitReport){ .log_posterior = -fx, .steps = steps, .evaluations = search.evaluations };
  return status;
}
