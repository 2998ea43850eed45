/* cadence.c - the even step hidden in a record's times. */
#include "data/cadence.h"
#include <float.h>
#include <math.h>
#include "core/robust.h"
#include "core/units.h"

#define COHERENT_STEPS 0.25 /* samples keep step while their rms distance from it stays below this */
#define KEEP_COUNT_STEPS 0.6

/* The mean of those spacings that lie within half of the median one: gaps and near-duplicates drop out, and times
 * rounded to a few digits (0.04, 0.04, 0.05 d) average to the true step. */
static double
typical_spacing (gsize n, const double *time_d)
{
  double *spacing = g_new (double, n - 1);
  for (gsize i = 0; i + 1 < n; i++)
    spacing[i] = time_d[i + 1] - time_d[i];
  double median = ant_median (n - 1, spacing, spacing);
  g_free (spacing);

  double sum = 0.0;
  gsize count = 0;
  for (gsize i = 0; i + 1 < n; i++)
    {
      double d = time_d[i + 1] - time_d[i];
      if (d > 0.5 * median && d < 1.5 * median)
        {
          sum += d;
          count++;
        }
    }
  return count > 0 ? sum / (double) count : median;
}

/* Running sums of one run: k is the index from its start, d what is left of the time after k steps. */
typedef struct
{
  double n, k, d, kk, kd, dd;
} RunSums;

static void
add_sample (RunSums *run, double k, double d)
{
  run->n += 1.0;
  run->k += k;
  run->d += d;
  run->kk += k * k;
  run->kd += k * d;
  run->dd += d * d;
}

/* Add a run's sums about its own mean, so that each run keeps a phase of its own. */
static void
close_run (RunSums *run, RunSums *pool)
{
  pool->n += run->n;
  pool->kk += run->kk - run->k * run->k / run->n;
  pool->kd += run->kd - run->k * run->d / run->n;
  pool->dd += run->dd - run->d * run->d / run->n;
  *run = (RunSums){ 0 };
}

/* Least-squares slope of time against index, one slope for all runs, a phase for each; a spacing above max_gap steps
 * ends a run. *rms_d is the scatter about it. */
static double
fit_step (gsize n, const double *time_d, double step_d, double max_gap, double *rms_d)
{
  RunSums run = { 0 }, pool = { 0 };
  double k = 0.0, origin_d = time_d[0];
  add_sample (&run, 0.0, 0.0);
  for (gsize i = 1; i < n; i++)
    {
      double steps = (time_d[i] - time_d[i - 1]) / step_d;
      if (steps > max_gap)
        {
          close_run (&run, &pool);
          k = 0.0;
          origin_d = time_d[i];
        }
      else
        k += rint (steps);
      add_sample (&run, k, time_d[i] - origin_d - k * step_d);
    }
  close_run (&run, &pool);

  double change_d = pool.kk > 0.0 ? pool.kd / pool.kk : 0.0;
  *rms_d = sqrt (fmax (pool.dd - change_d * pool.kd, 0.0) / pool.n);
  return step_d + change_d;
}

static double
refine_step (gsize n, const double *time_d, double step_d)
{
  static const double max_gaps[] = { 1.5, 10.0, 100.0, 1e4, HUGE_VAL };
  for (gsize s = 0; s < G_N_ELEMENTS (max_gaps); s++)
    /* Twice each: the better step counts the gaps better. */
    for (int pass = 0; pass < 2; pass++)
      {
        double rms_d;
        double better_d = fit_step (n, time_d, step_d, max_gaps[s], &rms_d);
        if (!(rms_d < COHERENT_STEPS * step_d) || !(fabs (better_d - step_d) < 0.25 * step_d))
          return step_d;
        step_d = better_d;
      }
  return step_d;
}

/* The phase shared by most samples: a mean on the circle, so that it does not matter where the circle is cut. */
static double
common_phase (gsize n, const double *time_d, double step_d)
{
  double sine = 0.0, cosine = 0.0;
  for (gsize i = 0; i < n; i++)
    {
      double steps = (time_d[i] - time_d[0]) / step_d;
      double angle = ANT_TAU * (steps - rint (steps));
      sine += sin (angle);
      cosine += cos (angle);
    }
  return atan2 (sine, cosine) / ANT_TAU;
}

gboolean
ant_cadence_find (gsize n, const double *time_d, double given_d, AntCadence *cadence)
{
  if (n < 3)
    return FALSE;
  double largest_d = fmax (fabs (time_d[0]), fabs (time_d[n - 1]));
  double step_d = given_d > 0.0 ? given_d : typical_spacing (n, time_d);
  if (!isfinite (step_d) || step_d < 16.0 * DBL_EPSILON * largest_d || step_d < DBL_MIN ||
      !isfinite (time_d[n - 1] - time_d[0]))
    return FALSE;
  if (!(given_d > 0.0))
    step_d = refine_step (n, time_d, step_d);
  cadence->step_d = step_d;
  cadence->start_d = time_d[0] + step_d * common_phase (n, time_d, step_d);
  return TRUE;
}

void
ant_cadence_place (const AntCadence *cadence, gsize n, const double *time_d, gint64 *place)
{
  double last = 0.0;
  for (gsize i = 0; i < n; i++)
    {
      double exact = (time_d[i] - cadence->start_d) / cadence->step_d;
      double here = rint (exact);
      if (i > 0)
        {
          double count = rint ((time_d[i] - time_d[i - 1]) / cadence->step_d);
          if (count == 1.0 && fabs (exact - (last + count)) <= KEEP_COUNT_STEPS)
            here = last + count;
          here = fmax (here, last);
        }
      place[i] = (gint64) here;
      last = here;
    }
}
