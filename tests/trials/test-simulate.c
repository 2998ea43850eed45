/* test-simulate.c - records put together from their ingredients. */
#include <glib.h>
#include <math.h>
#include <string.h>

#include "core/units.h"
#include "trials/noise-presets.h"
#include "trials/simulate.h"

G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntSimulated, ant_simulated_free)

static const AntTrialPlanet venus = { .mid_d = 1.3,
                                      .crossing = { .radius_ratio = 0.0306, .impact = 0.6, .t14_d = 6.3 / 24 } };
static const AntTrialStep step = { .time_d = 2.2, .size_ppm = -190, .recovery_d = 0.2, .flagged = 1 };

/* Everything at once, over four days. */
static AntScenario
rich_scenario (void)
{
  AntScenario scenario = ANT_SCENARIO_INIT;
  scenario.days = 4;
  scenario.seed = 11;
  ant_noise_preset (ANT_PRESET_A, &scenario.noise);
  scenario.gaps = ant_gap_plan_for_mask (ANT_GAPS_LOW_ORBIT);
  scenario.spots = (AntSpotPlan) { .rotation_d = ANT_SYNODIC_ROTATION_D, .groups_per_30d = 10, .area_median = 1e-4,
                                   .area_spread_ln = 0.5, .area_max = 1e-3, .latitude_deg = 15, .growth_d = 3,
                                   .decay_d = 10, .facula_ratio = 8 };
  scenario.spikes = (AntSpikePlan) { .per_30d = 100, .size_min_ppm = 50, .size_max_ppm = 500, .dark_fraction = 0.5 };
  scenario.warm_up = (AntWarmUp) { .size_ppm = -50, .decay_d = 0.01, .after_gap_d = 0.02 };
  scenario.n_planets = scenario.n_steps = 1;
  scenario.planet = &venus;
  scenario.step = &step;
  return scenario;
}

static AntSimulated *
simulate (const AntScenario *scenario)
{
  AntStatus status;
  AntSimulated *simulated = ant_simulate (scenario, &status);
  g_assert_cmpint (status, ==, ANT_OK);
  g_assert_nonnull (simulated);
  return simulated;
}

static void
one_seed_gives_one_record (void)
{
  AntScenario scenario = rich_scenario ();
  g_autoptr (AntSimulated) one = simulate (&scenario);
  g_autoptr (AntSimulated) two = simulate (&scenario);
  g_assert_cmpuint (one->n, ==, 5760);
  g_assert_cmpmem (one->irradiance_w_m2, one->n * sizeof (double), two->irradiance_w_m2, two->n * sizeof (double));
  g_assert_cmpmem (one->flag, one->n, two->flag, two->n);
}

static void
another_seed_gives_another_record (void)
{
  AntScenario scenario = rich_scenario ();
  g_autoptr (AntSimulated) one = simulate (&scenario);
  scenario.seed++;
  g_autoptr (AntSimulated) two = simulate (&scenario);
  gsize equal = 0;
  for (gsize i = 0; i < one->n; i++)
    equal += one->irradiance_w_m2[i] == two->irradiance_w_m2[i];
  g_assert_cmpuint (equal, ==, 0);
}

static void
gaps_leave_the_other_samples_as_they_were (void)
{
  AntScenario scenario = rich_scenario ();
  scenario.warm_up.size_ppm = 0;
  g_autoptr (AntSimulated) gappy = simulate (&scenario);
  scenario.gaps = ant_gap_plan_for_mask (ANT_GAPS_NONE);
  g_autoptr (AntSimulated) whole = simulate (&scenario);
  gsize missing = 0;
  for (gsize i = 0; i < whole->n; i++)
    {
      g_assert_false (isnan (whole->irradiance_w_m2[i]));
      if (isnan (gappy->irradiance_w_m2[i]))
        missing++;
      else
        g_assert_cmpfloat (gappy->irradiance_w_m2[i], ==, whole->irradiance_w_m2[i]);
    }
  g_assert_cmpuint (missing, >, whole->n / 4);
}

static void
an_ingredient_more_adds_itself_and_nothing_else (void)
{
  AntScenario scenario = ANT_SCENARIO_INIT;
  scenario.days = 4;
  ant_noise_preset (ANT_PRESET_A, &scenario.noise);
  g_autoptr (AntSimulated) without = simulate (&scenario);
  scenario.n_steps = 1;
  scenario.step = &step;
  g_autoptr (AntSimulated) with = simulate (&scenario);
  for (gsize i = 0; i < with->n; i++)
    {
      double start_d = (double) i * scenario.cadence_d;
      double expected_ppm = ant_step_mean_ppm (&step, start_d, start_d + scenario.exposure_d);
      double found_ppm = (with->irradiance_w_m2[i] - without->irradiance_w_m2[i]) / 1361 / ANT_PPM;
      g_assert_cmpfloat_with_epsilon (found_ppm, expected_ppm, 1e-6);
    }
}

static void
a_crossing_without_noise_is_the_integrated_light_curve (void)
{
  AntScenario scenario = ANT_SCENARIO_INIT;
  scenario.days = 3;
  scenario.cadence_d = 300.0 / 86400;
  scenario.exposure_d = 131.0 / 86400;
  scenario.n_planets = 1;
  scenario.planet = &venus;
  g_autoptr (AntSimulated) simulated = simulate (&scenario);
  double greatest = 0;
  for (gsize i = 0; i < simulated->n; i++)
    {
      double loss = 1 - simulated->irradiance_w_m2[i] / 1361, sum = 0;
      for (int k = 0; k < 500; k++)
        {
          double t = (double) i * scenario.cadence_d + (k + 0.5) / 500 * scenario.exposure_d - venus.mid_d;
          sum += ant_crossing_loss (&venus.crossing, ANT_LIMB_DARKENING_SUN, t) / 500;
        }
      g_assert_cmpfloat_with_epsilon (loss, sum, 0.05e-6);
      greatest = MAX (greatest, loss);
    }
  g_assert_cmpfloat_with_epsilon (greatest, ant_transit_loss (0.0306, 0.6, ANT_LIMB_DARKENING_SUN), 0.05e-6);
}

static void
white_noise_has_its_scatter (void)
{
  AntScenario scenario = ANT_SCENARIO_INIT;
  double sum = 0, square = 0;
  scenario.noise.white_ppm = 100;
  g_autoptr (AntSimulated) simulated = simulate (&scenario);
  for (gsize i = 0; i < simulated->n; i++)
    {
      double ppm = (simulated->irradiance_w_m2[i] / 1361 - 1) / ANT_PPM;
      sum += ppm;
      square += ppm * ppm;
    }
  g_assert_cmpfloat_with_epsilon (sum / 43200, 0, 4 * 100 / sqrt (43200));
  g_assert_cmpfloat_with_epsilon (square / 43200, 1e4, 4 * 1e4 * sqrt (2.0 / 43200));
}

static void
only_what_is_asked_to_be_is_flagged (void)
{
  AntScenario scenario = ANT_SCENARIO_INIT;
  AntTrialSpike spikes[] = { { .time_d = 0.5, .size_ppm = 900, .n_samples = 3, .flagged = 1 },
                             { .time_d = 0.7, .size_ppm = -900, .n_samples = 1 } };
  scenario.days = 4;
  scenario.spikes.n_listed = 2;
  scenario.spikes.listed = spikes;
  scenario.n_steps = 1;
  scenario.step = &step;
  g_autoptr (AntSimulated) simulated = simulate (&scenario);
  for (gsize i = 0; i < simulated->n; i++)
    {
      gboolean in_spike = i >= 720 && i < 723;
      gboolean in_step = i >= 3168 && i < 4032; /* 2.2 to 2.8 d */
      g_assert_cmpuint (simulated->flag[i], ==, in_spike || in_step);
    }
  g_assert_cmpfloat_with_epsilon (simulated->irradiance_w_m2[722], 1361 * (1 + 900e-6), 1e-9);
  g_assert_cmpfloat_with_epsilon (simulated->irradiance_w_m2[1008], 1361 * (1 - 900e-6), 1e-9);
}

static void
the_instrument_warms_up_after_long_gaps_only (void)
{
  AntScenario scenario = ANT_SCENARIO_INIT;
  AntSpan gaps[] = { { 0.2, 0.21 }, { 0.5, 0.9 } };
  scenario.days = 2;
  scenario.gaps.n_listed = 2;
  scenario.gaps.listed = gaps;
  scenario.warm_up = (AntWarmUp) { .size_ppm = -80, .decay_d = 0.02, .after_gap_d = 0.1 };
  g_autoptr (AntSimulated) simulated = simulate (&scenario);
  gsize after = (gsize) (0.9 * 1440);
  for (gsize i = 0; i < after; i++)
    g_assert_true (isnan (simulated->irradiance_w_m2[i]) || simulated->irradiance_w_m2[i] == 1361);
  g_assert_cmpfloat_with_epsilon (simulated->irradiance_w_m2[after], 1361 * (1 - 80e-6), 1361 * 2e-6);
  g_assert_cmpfloat_with_epsilon (simulated->irradiance_w_m2[after + 29] / 1361, 1 - 80e-6 / G_E, 2e-6);
}

static void
impossible_scenarios_are_refused (void)
{
  AntScenario scenarios[5];
  for (int i = 0; i < 5; i++)
    scenarios[i] = (AntScenario) ANT_SCENARIO_INIT;
  scenarios[0].days = 0;
  scenarios[1].cadence_d = NAN;
  scenarios[2].exposure_d = 2 * scenarios[2].cadence_d;
  scenarios[3].days = 1e9;
  scenarios[4].noise.n_parts = 1;
  for (int i = 0; i < 5; i++)
    {
      AntStatus status = ANT_OK;
      g_assert_null (ant_simulate (&scenarios[i], &status));
      g_assert_cmpint (status, ==, ANT_BAD_ARGUMENT);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/trials/simulate/one-seed-gives-one-record", one_seed_gives_one_record);
  g_test_add_func ("/trials/simulate/another-seed-gives-another-record", another_seed_gives_another_record);
  g_test_add_func ("/trials/simulate/gaps-leave-the-other-samples-as-they-were",
                   gaps_leave_the_other_samples_as_they_were);
  g_test_add_func ("/trials/simulate/an-ingredient-more-adds-itself-and-nothing-else",
                   an_ingredient_more_adds_itself_and_nothing_else);
  g_test_add_func ("/trials/simulate/a-crossing-without-noise-is-the-integrated-light-curve",
                   a_crossing_without_noise_is_the_integrated_light_curve);
  g_test_add_func ("/trials/simulate/white-noise-has-its-scatter", white_noise_has_its_scatter);
  g_test_add_func ("/trials/simulate/only-what-is-asked-to-be-is-flagged", only_what_is_asked_to_be_is_flagged);
  g_test_add_func ("/trials/simulate/the-instrument-warms-up-after-long-gaps-only",
                   the_instrument_warms_up_after_long_gaps_only);
  g_test_add_func ("/trials/simulate/impossible-scenarios-are-refused", impossible_scenarios_are_refused);
  return g_test_run ();
}
