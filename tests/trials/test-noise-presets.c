/* test-noise-presets.c - the named noise models have the spectra they are named for. */
#include <glib.h>
#include <math.h>

#include "core/units.h"
#include "trials/noise-presets.h"

#define MICROHERTZ_CD 0.0864 /* cycles/day */

static double
variance (const AntNoiseModel *model)
{
  double sum = 0;
  for (gsize i = 0; i < model->n_parts; i++)
    sum += model->part[i].rms_ppm * model->part[i].rms_ppm;
  return sum;
}

static void
presets_have_the_stated_scatter (void)
{
  static const struct { AntNoisePreset preset; double variance, white_ppm; } expected[] = {
    { ANT_PRESET_NONE, 0, 0 },
    { ANT_PRESET_A, 40 * 40 + 40 * 40 + 3 * 3, 10 },
    { ANT_PRESET_B, 40 * 40 + 50 * 50 + 3 * 3, 5 },
    { ANT_PRESET_C, 30 * 30, 100 },
    { ANT_PRESET_SUN, 2 * 25.34 * 25.34 + 11 * 11 + 9 * 9 + 12 * 12, 0 },
    { ANT_PRESET_QUIET_SUN, 2 * 25.34 * 25.34 + 11 * 11 + 9 * 9 + 12 * 12 + 60 * 60, 0 },
    { ANT_PRESET_ACTIVE_SUN, 2 * 25.34 * 25.34 + 11 * 11 + 9 * 9 + 12 * 12 + 400 * 400, 0 },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (expected); i++)
    {
      AntNoiseModel model;
      ant_noise_preset (expected[i].preset, &model);
      g_assert_cmpfloat_with_epsilon (variance (&model), expected[i].variance, 1e-4 * (1 + expected[i].variance));
      g_assert_cmpfloat (model.white_ppm, ==, expected[i].white_ppm);
      g_assert_cmpuint (ant_noise_model_get (&model, NULL), ==, 0);
    }
}

static void
model_a_follows_the_third_power (void)
{
  AntNoiseModel model;
  ant_noise_preset (ANT_PRESET_A, &model);
  /* Leave granulation (the first part) and oscillations (the last) out; what stays is 40 ppm, 3 h, exponent 3:
   * S = 40^2 tau 2 pi / (1.2092 (1 + x^3)), since the integral of 1/(1 + x^3) is 2 pi/(3 sqrt 3) = 1.2092. */
  model.part[0].rms_ppm = model.part[model.n_parts - 1].rms_ppm = 0;
  double tau_d = 0.125;
  for (double x = 0.03; x < 30; x *= 1.1)
    {
      double law = 1600 * tau_d * ANT_TAU / (ANT_TAU / (3 * sqrt (3)) * (1 + x * x * x));
      double f_cd = x / (ANT_TAU * tau_d);
      g_assert_cmpfloat_with_epsilon (ant_noise_model_psd (&model, f_cd) / law, 1, 0.035);
    }
}

static void
the_sun_has_the_recommended_spectrum (void)
{
  /* ppm^2/uHz, computed for a list of solar noise values: super-Lorentzian granulation (Kallinger et al. 2014, from
   * memory), 8000 s, 5e4 s and 3e5 s parts, oscillations as a Gaussian. Ours are a damped oscillator, which adds 0.006
   * below its peak. */
  static const struct
  {
    double f_uhz, quiet, active;
  } expected[] = {
    { 0.1, 6147.0561, 271232.01 },
    { 1, 493.38577, 19974.841 },
    { 3, 33.4, 293 },
    { 10, 4.87, 6.97 },
    { 30, 1.561, NAN },
    { 100, 0.967, NAN },
    { 300, 0.945, NAN },
    { 1000, 0.402, NAN },
  };
  AntNoiseModel quiet, active;
  ant_noise_preset (ANT_PRESET_QUIET_SUN, &quiet);
  ant_noise_preset (ANT_PRESET_ACTIVE_SUN, &active);
  for (gsize i = 0; i < G_N_ELEMENTS (expected); i++)
    {
      double f_cd = expected[i].f_uhz * MICROHERTZ_CD;
      double p = ant_noise_model_psd (&quiet, f_cd) * MICROHERTZ_CD;
      g_assert_cmpfloat_with_epsilon (p, expected[i].quiet, 0.002 * expected[i].quiet + 0.008);
      if (!isnan (expected[i].active))
        g_assert_cmpfloat_with_epsilon (ant_noise_model_psd (&active, f_cd) * MICROHERTZ_CD, expected[i].active,
                                        0.002 * expected[i].active + 0.008);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/trials/noise-presets/presets-have-the-stated-scatter", presets_have_the_stated_scatter);
  g_test_add_func ("/trials/noise-presets/model-a-follows-the-third-power", model_a_follows_the_third_power);
  g_test_add_func ("/trials/noise-presets/the-sun-has-the-recommended-spectrum", the_sun_has_the_recommended_spectrum);
  return g_test_run ();
}
