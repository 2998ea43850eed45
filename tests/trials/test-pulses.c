/* test-pulses.c - steps, flares and swings: closed forms against fine sums of their instantaneous values. */
#include <glib.h>
#include <math.h>

#include "core/units.h"
#include "trials/pulses.h"
#include "trials/swings.h"

typedef double (*Mean) (const void *shape, double start_d, double end_d);

static double
step_mean (const void *shape, double start_d, double end_d)
{
  return ant_step_mean_ppm (shape, start_d, end_d);
}

static double
flare_mean (const void *shape, double start_d, double end_d)
{
  return ant_flare_mean_ppm (shape, start_d, end_d);
}

static double
swing_mean (const void *shape, double start_d, double end_d)
{
  return ant_swing_mean_ppm (shape, start_d, end_d);
}

static void
assert_means (Mean mean, const void *shape, double size_ppm)
{
  const int pieces = 20000;
  static const double lengths_d[] = { 1.0 / 1440, 0.03, 0.7 };
  for (gsize l = 0; l < G_N_ELEMENTS (lengths_d); l++)
    for (double start_d = 0.2; start_d < 1.8; start_d += 0.0731)
      {
        double sum = 0, end_d = start_d + lengths_d[l];
        for (int i = 0; i < pieces; i++)
          {
            double t = start_d + (i + 0.5) * lengths_d[l] / pieces;
            sum += mean (shape, t, t) / pieces;
          }
        g_assert_cmpfloat_with_epsilon (mean (shape, start_d, end_d), sum, 1e-4 * size_ppm);
      }
}

static void
steps_average_over_the_exposure (void)
{
  AntTrialStep stays = { .time_d = 1, .size_ppm = -190 };
  AntTrialStep recovers = { .time_d = 1, .size_ppm = -190, .recovery_d = 0.1 };
  assert_means (step_mean, &stays, 190);
  assert_means (step_mean, &recovers, 190);
}

static void
a_recovering_step_returns_by_its_time_constant (void)
{
  AntTrialStep step = { .time_d = 1, .size_ppm = -190, .recovery_d = 0.5 };
  g_assert_cmpfloat (ant_step_mean_ppm (&step, 0.999, 0.999), ==, 0);
  g_assert_cmpfloat (ant_step_mean_ppm (&step, 1, 1), ==, -190);
  g_assert_cmpfloat_with_epsilon (ant_step_mean_ppm (&step, 1.5, 1.5), -190 / G_E, 1e-9);
}

static void
flares_average_over_the_exposure (void)
{
  AntTrialFlare flare = { .start_d = 1, .size_ppm = 210, .rise_d = 0.004, .decay_d = 0.02 };
  AntTrialFlare sudden = { .start_d = 1, .size_ppm = 210, .rise_d = 0, .decay_d = 0.02 };
  assert_means (flare_mean, &flare, 210);
  assert_means (flare_mean, &sudden, 210);
}

static void
swings_average_over_the_exposure (void)
{
  AntTrialSwing swing = { .period_d = 96 / ANT_MINUTES_PER_DAY, .phase = 0.2, .amplitude_ppm = 30,
                          .relative = { 1, 0.35, -0.1, 0.05 } };
  assert_means (swing_mean, &swing, 30);
}

static void
a_whole_period_averages_a_swing_away (void)
{
  AntTrialSwing swing = { .period_d = 0.125, .phase = 0.3, .amplitude_ppm = 30, .relative = { 1, 0.5, 0.2, 0.1 } };
  g_assert_cmpfloat_with_epsilon (ant_swing_mean_ppm (&swing, 3.21, 3.21 + 0.125), 0, 1e-10);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/trials/pulses/steps-average-over-the-exposure", steps_average_over_the_exposure);
  g_test_add_func ("/trials/pulses/a-recovering-step-returns-by-its-time-constant",
                   a_recovering_step_returns_by_its_time_constant);
  g_test_add_func ("/trials/pulses/flares-average-over-the-exposure", flares_average_over_the_exposure);
  g_test_add_func ("/trials/pulses/swings-average-over-the-exposure", swings_average_over_the_exposure);
  g_test_add_func ("/trials/pulses/a-whole-period-averages-a-swing-away", a_whole_period_averages_a_swing_away);
  return g_test_run ();
}
