/* test-crossing-fit.c - a strong crossing's numbers come back with honest errors; of a weak one no chord is claimed. */
#include <glib.h>
#include <math.h>
#include "models.h"
#include "trials/planets.h"
#include "verdict/crossing-fit.h"

#define STEP_D (5 / 1440.0)
#define DAYS 6.0
#define PAIRS 12

typedef struct
{
  double value[ANT_CROSSING_QUANTITIES], sigma[ANT_CROSSING_QUANTITIES];
  AntStatus status;
} Found;

/* The fit of a crossing added to a draw of model A's noise, or to its negative. */
static Found
fit (const AntCrossing *crossing, double mid_d, unsigned long seed, double side)
{
  size_t n = (size_t) (DAYS / STEP_D);
  g_autofree float *value = g_new (float, n);
  g_autofree double *z = g_new (double, n);
  AntNoiseModel model;
  Found found;
  AntSeries series = ant_study_record ('A', ANT_MASK_L1, n, STEP_D, seed, value);
  for (size_t i = 0; i < n; i++)
    {
      double start_d = ant_series_time (&series, (double) i) - 0.5 * STEP_D - mid_d;
      value[i] = (float) (side * (double) value[i]
                          - 1e6 * ant_crossing_mean_loss (crossing, ANT_LIMB_DARKENING_SUN, start_d, start_d + STEP_D));
    }
  ant_study_model ('A', &model);
  AntWhitener *whitener = ant_whitener_new_free_level (&model, &series, &found.status);
  ant_whitener_solve (whitener, value, z);
  AntRivalBench bench = { .whitener = whitener, .z = z, .window = series, .exposure_d = STEP_D,
                          .limb_darkening = ANT_LIMB_DARKENING_SUN, .sign = 1 };
  double start[ANT_RIVAL_PARAMETERS] = { mid_d + 0.004, 1.04 * crossing->t14_d, 0.4, 1.05 * crossing->radius_ratio };
  found.status = ant_crossing_fit (&bench, start, found.value, found.sigma);
  ant_whitener_free (whitener);
  return found;
}

static void
truth_of (const AntCrossing *crossing, double mid_d, double truth[ANT_CROSSING_QUANTITIES])
{
  truth[ANT_CROSSING_EPOCH] = mid_d;
  truth[ANT_CROSSING_T14] = log (crossing->t14_d);
  truth[ANT_CROSSING_IMPACT] = crossing->impact;
  truth[ANT_CROSSING_RADIUS] = log (crossing->radius_ratio);
  truth[ANT_CROSSING_DEPTH] = 1e6 * ant_transit_loss (crossing->radius_ratio, crossing->impact, ANT_LIMB_DARKENING_SUN);
}

/* Errors of first order cancel in a pair; what the curvature of the model leaves has been taken off. */
static void
test_pairs (void)
{
  AntCrossing crossing = { 0.045, 0.6, 6.3 / 24 };
  double truth[ANT_CROSSING_QUANTITIES], bias[ANT_CROSSING_QUANTITIES] = { 0 }, squares[ANT_CROSSING_QUANTITIES] = { 0 };
  truth_of (&crossing, 3.02, truth);
  for (unsigned long seed = 0; seed < PAIRS; seed++)
    {
      Found found[2] = { fit (&crossing, 3.02, 300 + seed, 1), fit (&crossing, 3.02, 300 + seed, -1) };
      for (int q = 0; q < ANT_CROSSING_QUANTITIES; q++)
        for (int side = 0; side < 2; side++)
          {
            g_assert_cmpint (found[side].status, ==, ANT_OK);
            double error = found[side].value[q] - truth[q];
            bias[q] += error / (found[0].sigma[q] + found[1].sigma[q]) / PAIRS;
            squares[q] += error * error / (found[side].sigma[q] * found[side].sigma[q]) / (2 * PAIRS);
          }
    }
  for (int q = 0; q < ANT_CROSSING_QUANTITIES; q++)
    {
      g_test_message ("quantity %d: bias %.3f sigma, scatter over formal %.3f", q, bias[q], sqrt (squares[q]));
      g_assert_cmpfloat (fabs (bias[q]), <, 0.15);
      g_assert_cmpfloat (sqrt (squares[q]), >, 0.6); /* 24 draws in pairs: 1 within four sampling errors */
      g_assert_cmpfloat (sqrt (squares[q]), <, 1.6);
    }
}

static void
test_weak (void)
{
  AntCrossing crossing = { 0.009, 0.3, 6.3 / 24 };
  for (unsigned long seed = 0; seed < 4; seed++)
    g_assert_cmpint (fit (&crossing, 3.02, 400 + seed, 1).status, ==, ANT_NO_DATA);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/verdict/crossing-fit/pairs-of-strong-crossings-have-no-bias-and-honest-errors", test_pairs);
  g_test_add_func ("/verdict/crossing-fit/a-weak-crossing-tells-no-chord", test_weak);
  return g_test_run ();
}
