/* test-rival-fit.c - evidence of rivals against sums over fine grids with dense algebra's meaning, and fits of planted shapes. */
#include <glib.h>
#include <math.h>
#include <string.h>
#include "core/units.h"
#include "models.h"
#include "verdict/rival-fit.h"

#define STEP_D (5 / 1440.0)

typedef struct
{
  size_t n;
  float *value;
  double *z, *buffer;
  AntWhitener *whitener;
  AntRivalBench bench;
} Stand;

/* Model A with one rival of known parameters planted, under its true noise. */
static Stand
stand_with (AntRivalKind kind, const double *parameter, double depth_ppm, unsigned long seed)
{
  Stand stand = { .n = (size_t) (12 / STEP_D) };
  AntStatus status;
  AntNoiseModel model;
  AntRivalCurve curve;
  stand.value = g_new (float, stand.n);
  stand.z = g_new (double, stand.n);
  stand.buffer = g_new (double, stand.n * ANT_LANES);
  AntSeries series = ant_study_record ('A', ANT_MASK_L1, stand.n, STEP_D, seed, stand.value);
  stand.bench = (AntRivalBench) { .window = series, .exposure_d = STEP_D, .limb_darkening = ANT_LIMB_DARKENING_SUN, .sign = 1 };
  ant_rival_eclipse (ANT_LIMB_DARKENING_SUN, depth_ppm, &stand.bench.eclipse);
  ant_rival_curve_init (&curve, kind, parameter, ANT_LIMB_DARKENING_SUN, &stand.bench.eclipse);
  for (size_t i = 0; i < stand.n; i++)
    stand.value[i] -= (float) (depth_ppm * ant_rival_curve_mean (&curve, ant_series_time (&series, (double) i), STEP_D));
  ant_study_model ('A', &model);
  stand.whitener = ant_whitener_new_free_level (&model, &series, &status);
  ant_whitener_solve (stand.whitener, stand.value, stand.z);
  stand.bench.whitener = stand.whitener;
  stand.bench.z = stand.z;
  stand.bench.buffer = stand.buffer;
  return stand;
}

static void
stand_clear (Stand *stand)
{
  ant_whitener_free (stand->whitener);
  g_free (stand->value);
  g_free (stand->z);
  g_free (stand->buffer);
}

static AntDip
dip_at (double mid_d, double duration_d, double depth_ppm)
{
  return (AntDip) { .mid_d = mid_d, .duration_d = duration_d, .edge_d = 0.01, .depth_ppm = depth_ppm, .depth_sigma_ppm = 10, .snr = 10 };
}

/* ln of the likelihood gain of a step at each epoch, its depth integrated numerically over the prior, summed over epochs. */
static void
test_step_against_a_sum (void)
{
  const double planted[4] = { 6.02 };
  Stand stand = stand_with (ANT_RIVAL_STEP, planted, 200, 3);
  AntDip dip = dip_at (6.15, 0.3, 150);
  AntRivalFit fit;
  g_assert_cmpint (ant_rival_fit (&stand.bench, &dip, ANT_RIVAL_STEP, &fit), ==, ANT_OK);
  double total = 0, highest = fit.log_gain, fine_d = STEP_D / 20;
  for (double epoch = 5.9; epoch < 6.15; epoch += fine_d)
    {
      AntRivalCurve curve;
      double energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES], parameter[4] = { epoch };
      ant_rival_curve_init (&curve, ANT_RIVAL_STEP, parameter, ANT_LIMB_DARKENING_SUN, NULL);
      memset (stand.buffer, 0, stand.n * ANT_LANES * sizeof *stand.buffer);
      for (size_t i = 0; i < stand.n; i++)
        stand.buffer[i * ANT_LANES] = -ant_rival_curve_mean (&curve, ant_series_time (&stand.bench.window, (double) i), STEP_D);
      ant_whitener_energies (stand.whitener, stand.z, 0, stand.n, stand.buffer, energy, moment, weight);
      double inner = 0, width = 0.002, range = log (ANT_PRIOR_DEPTH_HIGH_PPM / ANT_PRIOR_DEPTH_LOW_PPM);
      for (double ln = log (50); ln < log (800); ln += width)
        inner += exp (exp (ln) * moment[0] - 0.5 * exp (2 * ln) * energy[0] - highest) * width / range;
      total += 0.5 * inner * fine_d; /* half the prior is for steps up */
    }
  g_assert_cmpfloat_with_epsilon (fit.log_evidence, log (total) + highest, 0.2);
  stand_clear (&stand);
}

static void
check_recovered (AntRivalKind kind, const double *planted, double depth_ppm, double duration_d, double mid_d)
{
  Stand stand = stand_with (kind, planted, depth_ppm, 11);
  AntDip dip = dip_at (mid_d, duration_d, depth_ppm);
  double best = -HUGE_VAL, own = 0;
  for (int rival = 0; rival < ANT_N_RIVALS; rival++)
    {
      AntRivalFit fit;
      g_assert_cmpint (ant_rival_fit (&stand.bench, &dip, (AntRivalKind) rival, &fit), ==, ANT_OK);
      if (!fit.fitted)
        continue;
      best = fmax (best, fit.log_evidence);
      if (rival != (int) kind)
        continue;
      own = fit.log_evidence;
      g_assert_cmpfloat_with_epsilon (fit.parameter[0], planted[0], 5 * fit.sigma[0] + 1e-3);
      g_assert_cmpfloat_with_epsilon (fit.depth_ppm, depth_ppm, 0.15 * depth_ppm);
      g_assert_cmpfloat (fit.chi2, <, ant_rival_chi2_of_nothing (&stand.bench, &dip));
      g_assert_cmpfloat_with_epsilon (fit.chi2, 1, 0.35);
    }
  g_assert_cmpfloat (own, ==, best);
  stand_clear (&stand);
}

static void
test_each_shape_wins_its_own (void)
{
  double k = ant_crossing_radius_for_depth (0.4, ANT_LIMB_DARKENING_SUN, 1000e-6);
  check_recovered (ANT_RIVAL_CROSSING, (double[4]) { 6, 0.25, 0.4, k }, 1000, 0.25, 6);
  check_recovered (ANT_RIVAL_TRAPEZOID, (double[4]) { 6, 0.25, 0.2 }, 1000, 0.25, 6);
  check_recovered (ANT_RIVAL_STEP, (double[4]) { 6 }, 600, 0.3, 6.15);
  check_recovered (ANT_RIVAL_RECOVERY, (double[4]) { 6, 0.1 }, 800, 0.15, 6.07);
  check_recovered (ANT_RIVAL_THERMAL, (double[4]) { 6, 0.04, 0.15 }, 1000, 0.3, 6.12);
  check_recovered (ANT_RIVAL_SPIKE, (double[4]) { 6, 0.008 }, 700, 0.03, 6);
  check_recovered (ANT_RIVAL_SPOT, (double[4]) { 6, 0.6 }, 1500, 0.5, 6);
  check_recovered (ANT_RIVAL_ECLIPSE, (double[4]) { 6, 0.2 }, 1500, 0.2, 6);
}

/* The same dip turned upside down, as a brightening, gains the same from a shape that both know. */
static void
test_brightening_mirrors_dip (void)
{
  Stand stand = stand_with (ANT_RIVAL_TRAPEZOID, (double[4]) { 6, 0.25, 0.2 }, 500, 5);
  AntDip dip = dip_at (6, 0.25, 500);
  AntRivalFit down, up;
  ant_rival_fit (&stand.bench, &dip, ANT_RIVAL_TRAPEZOID, &down);
  for (size_t i = 0; i < stand.n; i++)
    stand.value[i] *= -1;
  ant_whitener_solve (stand.whitener, stand.value, stand.z);
  stand.bench.sign = -1;
  ant_rival_fit (&stand.bench, &dip, ANT_RIVAL_TRAPEZOID, &up);
  g_assert_cmpfloat_with_epsilon (down.log_gain, up.log_gain, 1e-6 * down.log_gain);
  g_assert_cmpfloat_with_epsilon (down.depth_ppm, -up.depth_ppm, 1e-6 * down.depth_ppm);
  ant_rival_fit (&stand.bench, &dip, ANT_RIVAL_CROSSING, &up);
  g_assert_false (up.fitted);
  stand_clear (&stand);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/verdict/rival-fit/evidence-of-a-step-is-the-sum-over-epochs-and-depths", test_step_against_a_sum);
  g_test_add_func ("/verdict/rival-fit/each-shape-wins-where-it-was-planted", test_each_shape_wins_its_own);
  g_test_add_func ("/verdict/rival-fit/brightening-mirrors-dip", test_brightening_mirrors_dip);
  return g_test_run ();
}
