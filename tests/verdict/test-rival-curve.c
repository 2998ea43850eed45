/* test-rival-curve.c - rival shapes: their size, their means over exposures, their known widths. */
#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "verdict/rival-curve.h"

static const double example[ANT_N_RIVALS][ANT_RIVAL_PARAMETERS] = {
  [ANT_RIVAL_CROSSING] = { 3, 0.25, 0.4, 0.03 }, [ANT_RIVAL_TRAPEZOID] = { 3, 0.25, 0.2 }, [ANT_RIVAL_STEP] = { 3 },
  [ANT_RIVAL_RECOVERY] = { 3, 0.2 },             [ANT_RIVAL_THERMAL] = { 3, 0.05, 0.3 },   [ANT_RIVAL_SPIKE] = { 3, 0.01 },
  [ANT_RIVAL_SPOT] = { 3, 1.5 },                 [ANT_RIVAL_ECLIPSE] = { 3, 0.2 },         [ANT_RIVAL_FLARE] = { 3, 0.005, 0.05 },
};

static AntRivalCurve
curve_of (AntRivalKind kind)
{
  AntRivalCurve curve;
  AntCrossingShape eclipse;
  ant_rival_eclipse (ANT_LIMB_DARKENING_SUN, 500, &eclipse);
  ant_rival_curve_init (&curve, kind, example[kind], ANT_LIMB_DARKENING_SUN, &eclipse);
  return curve;
}

static void
test_greatest_is_one (void)
{
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    {
      AntRivalCurve curve = curve_of ((AntRivalKind) kind);
      double greatest = 0;
      for (double t = 2; t < 5; t += 1e-4)
        greatest = fmax (greatest, ant_rival_curve_mean (&curve, t, 1e-6));
      g_assert_cmpfloat_with_epsilon (greatest, 1, 2e-3);
    }
}

static void
test_exposure_is_a_mean (void)
{
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    {
      AntRivalCurve curve = curve_of ((AntRivalKind) kind);
      for (double t = 2.2; t < 4; t += 0.0371)
        {
          double sum = 0, exposure_d = 0.04;
          for (int i = 0; i < 4000; i++)
            sum += ant_rival_curve_mean (&curve, t + exposure_d * ((i + 0.5) / 4000 - 0.5), exposure_d / 4000);
          g_assert_cmpfloat_with_epsilon (ant_rival_curve_mean (&curve, t, exposure_d), sum / 4000, 1e-7);
        }
    }
}

static void
test_samples_are_means (void)
{
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    {
      AntRivalCurve curve = curve_of ((AntRivalKind) kind);
      double value[200];
      ant_rival_curve_sample (&curve, 2.6, 0.005, 0.005, -2, 100, 2, value);
      for (int i = 0; i < 100; i++)
        g_assert_cmpfloat_with_epsilon (value[2 * i], -2 * ant_rival_curve_mean (&curve, 2.6 + 0.005 * i, 0.005), 1e-9);
    }
}

static void
test_nothing_outside (void)
{
  for (int kind = 0; kind < ANT_N_RIVALS; kind++)
    {
      AntRivalCurve curve = curve_of ((AntRivalKind) kind);
      g_assert_cmpfloat (fabs (ant_rival_curve_mean (&curve, curve.from_d - 0.02, 0.04)), <, 1e-12);
      if (isfinite (curve.to_d))
        g_assert_cmpfloat (fabs (ant_rival_curve_mean (&curve, curve.to_d + 0.02, 0.04)), <, 2e-6);
    }
}

static void
test_spot_has_its_width (void)
{
  AntRivalCurve curve = curve_of (ANT_RIVAL_SPOT);
  g_assert_cmpfloat_with_epsilon (ant_rival_curve_mean (&curve, 3 - 0.75, 1e-5), 0.5, 2e-3);
  g_assert_cmpfloat_with_epsilon (ant_rival_curve_mean (&curve, 3 + 0.75, 1e-5), 0.5, 2e-3);
}

static void
test_crossing_depth_is_tied (void)
{
  AntRivalCurve curve = curve_of (ANT_RIVAL_CROSSING);
  double expected = ant_transit_loss (0.03, 0.4, ANT_LIMB_DARKENING_SUN) * 1e6;
  g_assert_cmpfloat_with_epsilon (curve.tied_depth_ppm, expected, 1e-6);
  g_assert_true (isnan (curve_of (ANT_RIVAL_STEP).tied_depth_ppm));
}

static void
test_eclipse_is_as_deep_as_asked (void)
{
  for (double depth = 10; depth < 5e5; depth *= 7)
    {
      AntCrossingShape eclipse;
      ant_rival_eclipse (ANT_LIMB_DARKENING_SUN, depth, &eclipse);
      g_assert_cmpfloat_with_epsilon (ant_transit_loss (1, eclipse.impact, ANT_LIMB_DARKENING_SUN) * 1e6, depth, 1e-6 * depth);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/verdict/rival-curve/greatest-value-is-one", test_greatest_is_one);
  g_test_add_func ("/verdict/rival-curve/an-exposure-gives-the-mean", test_exposure_is_a_mean);
  g_test_add_func ("/verdict/rival-curve/samples-are-means", test_samples_are_means);
  g_test_add_func ("/verdict/rival-curve/nothing-outside-its-reach", test_nothing_outside);
  g_test_add_func ("/verdict/rival-curve/spot-has-its-width-at-half-depth", test_spot_has_its_width);
  g_test_add_func ("/verdict/rival-curve/depth-of-a-crossing-follows-from-its-radius", test_crossing_depth_is_tied);
  g_test_add_func ("/verdict/rival-curve/eclipse-is-as-deep-as-asked", test_eclipse_is_as_deep_as_asked);
  return g_test_run ();
}
