/* test-planets.c - crossings as exposures see them, against the plain light curve summed finely. */
#include <glib.h>
#include <math.h>

#include "core/units.h"
#include "trials/planets.h"

static const AntCrossing venus = { .radius_ratio = 0.0306, .impact = 0.6, .t14_d = 6.3 / 24 };
static const AntCrossing grazing = { .radius_ratio = 0.02, .impact = 1.005, .t14_d = 1.0 / 24 };

static double
slow_mean (const AntCrossing *crossing, double start_d, double end_d)
{
  const int pieces = 20000;
  double sum = 0;
  for (int i = 0; i < pieces; i++)
    sum += ant_crossing_loss (crossing, ANT_LIMB_DARKENING_SUN, start_d + (i + 0.5) * (end_d - start_d) / pieces);
  return sum / pieces;
}

static void
means_agree_with_fine_sums (void)
{
  static const AntCrossing *const crossings[] = { &venus, &grazing };
  static const double exposures_s[] = { 1, 60, 131, 1800, 21600 };
  for (int c = 0; c < 2; c++)
    {
      double greatest = ant_crossing_loss (crossings[c], ANT_LIMB_DARKENING_SUN, 0);
      for (gsize e = 0; e < G_N_ELEMENTS (exposures_s); e++)
        for (double place = -0.55; place < 0.6; place += 0.0437)
          {
            double start_d = place * crossings[c]->t14_d, end_d = start_d + exposures_s[e] / 86400;
            double mean = ant_crossing_mean_loss (crossings[c], ANT_LIMB_DARKENING_SUN, start_d, end_d);
            g_assert_cmpfloat_with_epsilon (mean, slow_mean (crossings[c], start_d, end_d), 1e-4 * greatest);
          }
    }
}

static void
an_instant_sees_the_light_curve (void)
{
  for (double t = -0.14; t < 0.14; t += 0.007)
    g_assert_cmpfloat (ant_crossing_mean_loss (&venus, ANT_LIMB_DARKENING_SUN, t, t), ==,
                       ant_crossing_loss (&venus, ANT_LIMB_DARKENING_SUN, t));
}

static void
light_is_lost_between_the_contacts_only (void)
{
  AntTrialPlanet planet = { .mid_d = 0.5, .crossing = venus };
  double value[1440];
  for (int i = 0; i < 1440; i++)
    value[i] = 1;
  ant_planet_dim (&planet, ANT_LIMB_DARKENING_SUN, 1440, 1 / 1440.0, 1 / 1440.0, value);
  /* Contacts at 0.5 d -+ 3.15 h = minutes 531 and 909. */
  for (int i = 0; i < 1440; i++)
    g_assert_true ((value[i] < 1) == (i >= 531 && i < 909));
}

static void
a_period_repeats_the_crossing_on_both_sides (void)
{
  AntTrialPlanet planet = { .mid_d = 2.5, .period_d = 1.25, .crossing = venus };
  double value[7200];
  for (int i = 0; i < 7200; i++)
    value[i] = 1;
  ant_planet_dim (&planet, ANT_LIMB_DARKENING_SUN, 7200, 1 / 1440.0, 1 / 1440.0, value);
  for (int k = 0; k <= 3; k++) /* middles at 0, 1.25, 2.5, 3.75, 5 d */
    g_assert_cmpfloat_with_epsilon (1 - value[k * 1800], ant_crossing_loss (&venus, ANT_LIMB_DARKENING_SUN, 0.5 / 1440),
                                    1e-8);
  g_assert_cmpfloat (value[7199], <, 1);
  g_assert_cmpfloat (value[900], ==, 1);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/trials/planets/means-agree-with-fine-sums", means_agree_with_fine_sums);
  g_test_add_func ("/trials/planets/an-instant-sees-the-light-curve", an_instant_sees_the_light_curve);
  g_test_add_func ("/trials/planets/light-is-lost-between-the-contacts-only", light_is_lost_between_the_contacts_only);
  g_test_add_func ("/trials/planets/a-period-repeats-the-crossing-on-both-sides",
                   a_period_repeats_the_crossing_on_both_sides);
  return g_test_run ();
}
