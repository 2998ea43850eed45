/* test-spots.c - the passage of spots and faculae over the disc. */
#include <glib.h>
#include <math.h>

#include "core/units.h"
#include "trials/spots.h"

#define P ANT_SYNODIC_ROTATION_D

static const AntSpotGroup thousand = { .meridian_d = 10, .area = 1000e-6, .peak_d = 10 };

/* Where the light of a group crosses a level, by bisection between two times. */
static double
crossing (const AntSpotGroup *group, double level, double below_d, double above_d)
{
  for (int i = 0; i < 60; i++)
    {
      double mid_d = (below_d + above_d) / 2;
      if (-ant_spot_light (group, P, mid_d) > level)
        above_d = mid_d;
      else
        below_d = mid_d;
    }
  return (below_d + above_d) / 2;
}

static void
depths_follow_the_sunspot_index (void)
{
  /* Hudson et al. 1982 (coefficient from memory): 1000 millionths at disc centre take 800 ppm, 4000 take 3200 ppm. */
  AntSpotGroup four = thousand;
  four.area = 4000e-6;
  g_assert_cmpfloat_with_epsilon (ant_spot_light (&thousand, P, 10), -800e-6, 1e-12);
  g_assert_cmpfloat_with_epsilon (ant_spot_light (&four, P, 10), -3200e-6, 1e-12);
  double mu = cos (60 * ANT_PI / 180);
  g_assert_cmpfloat_with_epsilon (ant_spot_light (&thousand, P, 10 + P / 6), -0.32 * 1000e-6 * mu * (3 * mu + 2) / 2,
                                  1e-12);
}

static void
a_passage_takes_half_a_rotation (void)
{
  /* Computed from the form above and the synodic rotation: 13.64 d limb to limb, width at half depth 7.63 d, equivalent
   * width 7.56 d. */
  double first = crossing (&thousand, 0, 10 - P / 2, 10), last = crossing (&thousand, 0, 10 + P / 2, 10);
  double left = crossing (&thousand, 400e-6, 10 - P / 4, 10), right = crossing (&thousand, 400e-6, 10 + P / 4, 10);
  double area = ant_spot_mean (&thousand, P, 10 - P / 4, 10 + P / 4) * P / 2;
  g_assert_cmpfloat_with_epsilon (last - first, 13.64, 0.005);
  g_assert_cmpfloat_with_epsilon (right - left, 7.63, 0.005);
  g_assert_cmpfloat_with_epsilon (area / -800e-6, 7.56, 0.005);
}

static void
behind_the_limb_there_is_nothing (void)
{
  for (double t = 10 + P / 4 + 1e-6; t < 10 + 3 * P / 4; t += 0.1)
    g_assert_cmpfloat (ant_spot_light (&thousand, P, t), ==, 0);
}

static void
it_comes_back_after_a_rotation (void)
{
  for (double t = 4; t < 16; t += 0.37)
    g_assert_cmpfloat_with_epsilon (ant_spot_light (&thousand, P, t), ant_spot_light (&thousand, P, t + P), 1e-15);
}

static void
faculae_shine_near_the_limb_only (void)
{
  AntSpotGroup with = thousand;
  with.facula_ratio = 10;
  g_assert_cmpfloat (ant_spot_light (&with, P, 10), ==, ant_spot_light (&thousand, P, 10));
  double near_limb = 10 + P * acos (0.25) / ANT_TAU;
  g_assert_cmpfloat (ant_spot_light (&with, P, near_limb), >, 0);
  /* They vanish at the limb itself, so that nothing jumps there. */
  g_assert_cmpfloat_with_epsilon (ant_spot_light (&with, P, 10 + P / 4 - 1e-7), 0, 1e-9);
}

static void
groups_grow_and_decay (void)
{
  AntSpotGroup group = thousand;
  group.growth_d = 4;
  group.decay_d = 5;
  g_assert_cmpfloat (ant_spot_light (&group, P, 5.99), ==, 0);
  g_assert_cmpfloat_with_epsilon (ant_spot_light (&group, P, 8), ant_spot_light (&thousand, P, 8) / 2, 1e-15);
  g_assert_cmpfloat_with_epsilon (ant_spot_light (&group, P, 15), ant_spot_light (&thousand, P, 15) / G_E, 1e-15);
}

static void
means_agree_with_fine_sums (void)
{
  AntSpotGroup group = {
    .meridian_d = 10, .latitude_deg = 15, .area = 3000e-6, .peak_d = 9, .growth_d = 3, .decay_d = 10, .facula_ratio = 8
  };
  static const double lengths_d[] = { 1.0 / 1440, 1.0 / 24, 1, 5 };
  for (gsize l = 0; l < G_N_ELEMENTS (lengths_d); l++)
    for (double start_d = 1.3; start_d < 18; start_d += 0.831)
      {
        double sum = 0;
        for (int i = 0; i < 20000; i++)
          sum += ant_spot_light (&group, P, start_d + (i + 0.5) * lengths_d[l] / 20000) / 20000;
        g_assert_cmpfloat_with_epsilon (ant_spot_mean (&group, P, start_d, start_d + lengths_d[l]), sum, 0.05e-6);
      }
}

static void
drawn_groups_keep_to_the_plan (void)
{
  AntSpotPlan plan = { .rotation_d = P, .groups_per_30d = 100, .area_median = 100e-6, .area_spread_ln = 1,
                       .area_max = 500e-6, .latitude_deg = 15, .growth_d = 3, .decay_d = 12, .facula_ratio = 8 };
  gsize n = ant_spots_count (&plan, 90), large = 0, north = 0;
  g_autofree AntSpotGroup *group = g_new (AntSpotGroup, n);
  g_assert_cmpuint (n, ==, 500); /* 90 d and two months before them */
  ant_spots_draw (&plan, 90, 1, group);
  for (gsize i = 0; i < n; i++)
    {
      g_assert_true (group[i].area > 0 && group[i].area <= 500e-6);
      g_assert_true (group[i].peak_d >= -60 && group[i].peak_d < 90);
      large += group[i].area > 100e-6;
      north += group[i].latitude_deg > 0;
    }
  /* Half above the median, half in the north; binomial sigma 11. */
  g_assert_cmpint (ABS ((int) large - 250), <, 45);
  g_assert_cmpint (ABS ((int) north - 250), <, 45);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/trials/spots/depths-follow-the-sunspot-index", depths_follow_the_sunspot_index);
  g_test_add_func ("/trials/spots/a-passage-takes-half-a-rotation", a_passage_takes_half_a_rotation);
  g_test_add_func ("/trials/spots/behind-the-limb-there-is-nothing", behind_the_limb_there_is_nothing);
  g_test_add_func ("/trials/spots/it-comes-back-after-a-rotation", it_comes_back_after_a_rotation);
  g_test_add_func ("/trials/spots/faculae-shine-near-the-limb-only", faculae_shine_near_the_limb_only);
  g_test_add_func ("/trials/spots/groups-grow-and-decay", groups_grow_and_decay);
  g_test_add_func ("/trials/spots/means-agree-with-fine-sums", means_agree_with_fine_sums);
  g_test_add_func ("/trials/spots/drawn-groups-keep-to-the-plan", drawn_groups_keep_to_the_plan);
  return g_test_run ();
}
