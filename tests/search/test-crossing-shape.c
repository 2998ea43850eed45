/* test-crossing-shape.c - tabulated crossings against the transit curve averaged point by point. */
#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "planting.h"
#include "search/crossing-shape.h"

/* A third of a day's crossing to a quarter hour's; round, flat and grazing; edges up to half the duration. */
static const Planted shapes[] = {
  { 0, 6, 20, 0.3, 1 },  { 0, 13, 5, 0, 1 },   { 0, 0.5, 12, 0.3, 1 }, { 0, 0.5, 15, 0.3, 1 },
  { 0, 2, 60, 0.3, 1 },  { 0, 8, 240, 0, 1 },  { 0, 5, 7, 0.7, 1 },    { 0, 4, 15, 0.95, 1 },
};

static void
set_up (AntCrossingShape *shape, const Planted *planted)
{
  ant_crossing_shape_init (shape, planted->t14_h / ANT_HOURS_PER_DAY, planted->ingress_min / ANT_MINUTES_PER_DAY,
                           planted->impact, ANT_LIMB_DARKENING_SUN);
}

static void
exposure_average_equals_the_slow_average (void)
{
  const double exposures_d[] = { 1 / ANT_MINUTES_PER_DAY, 10 / ANT_MINUTES_PER_DAY, 29.4 / ANT_MINUTES_PER_DAY, 1 / 24.0, 1 };
  double worst = 0;
  for (size_t s = 0; s < G_N_ELEMENTS (shapes); s++)
    for (size_t e = 0; e < G_N_ELEMENTS (exposures_d); e++)
      {
        AntCrossingShape shape;
        set_up (&shape, &shapes[s]);
        double reach_d = 0.5 * (shape.duration_d + exposures_d[e]);
        for (int k = 0; k <= 24; k++)
          {
            double time_d = reach_d * 1.02 * k / 24;
            double slow = planted_mean (&shapes[s], time_d, exposures_d[e], 4000);
            worst = fmax (worst, fabs (ant_crossing_shape_mean (&shape, time_d, exposures_d[e]) - slow));
          }
      }
  g_test_message ("worst departure %.2g of the depth", worst);
  g_assert_cmpfloat (worst, <, 2e-5);
}

static void
average_over_the_crossing_is_the_mean_loss (void)
{
  for (size_t s = 0; s < G_N_ELEMENTS (shapes); s++)
    {
      AntCrossingShape shape;
      set_up (&shape, &shapes[s]);
      g_assert_cmpfloat_with_epsilon (ant_crossing_shape_average (&shape),
                                      planted_mean (&shapes[s], 0, shape.duration_d, 40000), 2e-6);
    }
}

/* Exposures that follow one another without a break see all of the loss, wherever the middle falls between samples. */
static void
samples_sum_to_the_whole_loss (void)
{
  for (size_t s = 0; s < G_N_ELEMENTS (shapes); s++)
    for (double phase = 0; phase < 1; phase += 0.19)
      {
        AntCrossingShape shape;
        double value[1024] = { 0 }, sum = 0, step_d = 1 / ANT_MINUTES_PER_DAY;
        ptrdiff_t first;
        set_up (&shape, &shapes[s]);
        size_t n = ant_crossing_shape_sample (&shape, 500 + phase, step_d, step_d, -3, &first, G_N_ELEMENTS (value), 1, value);
        g_assert_cmpuint (n, >, 0);
        for (size_t i = 0; i < n; i++)
          sum += value[i];
        g_assert_cmpfloat_with_epsilon (sum * step_d / (-3 * ant_crossing_shape_average (&shape) * shape.duration_d), 1, 1e-12);
      }
}

static void
a_crossing_is_the_same_both_ways (void)
{
  for (size_t s = 0; s < G_N_ELEMENTS (shapes); s++)
    {
      AntCrossingShape shape;
      set_up (&shape, &shapes[s]);
      for (double time_d = 0; time_d < shape.duration_d; time_d += shape.duration_d / 37)
        g_assert_cmpfloat_with_epsilon (ant_crossing_shape_mean (&shape, time_d, 0.01),
                                        ant_crossing_shape_mean (&shape, -time_d, 0.01), 1e-14);
    }
}

static void
an_edge_of_half_the_duration_is_round_and_smooth (void)
{
  AntCrossingShape shape;
  ant_crossing_shape_init (&shape, 0.25, 0.125, 0.3, ANT_LIMB_DARKENING_SUN);
  double before = 1 + 1e-12;
  for (double time_d = 0; time_d <= 0.126; time_d += 0.002)
    {
      double loss = ant_crossing_shape_mean (&shape, time_d, 1e-5);
      g_assert_cmpfloat (loss, <=, before);
      before = loss;
    }
  g_assert_cmpfloat_with_epsilon (ant_crossing_shape_mean (&shape, 0, 1e-5), 1, 1e-6);
  g_assert_cmpfloat (ant_crossing_shape_mean (&shape, 0.1251, 1e-5), ==, 0);
}

static void
too_little_room_is_refused (void)
{
  AntCrossingShape shape;
  double value[360];
  ptrdiff_t first;
  set_up (&shape, &shapes[0]);
  double step_d = 1 / ANT_MINUTES_PER_DAY;
  g_assert_cmpuint (ant_crossing_shape_sample (&shape, 0.5, step_d, step_d, 1, &first, 300, 1, value), ==, 0);
}

static void
samples_stand_a_stride_apart (void)
{
  AntCrossingShape shape;
  double dense[400], spread[3200] = { 0 }, step_d = 1 / ANT_MINUTES_PER_DAY;
  ptrdiff_t first, first_spread;
  set_up (&shape, &shapes[0]);
  size_t n = ant_crossing_shape_sample (&shape, 200.3, step_d, step_d, 1, &first, 400, 1, dense);
  g_assert_cmpuint (ant_crossing_shape_sample (&shape, 200.3, step_d, step_d, 1, &first_spread, 400, 8, spread), ==, n);
  g_assert_cmpint (first, ==, first_spread);
  for (size_t i = 0; i < 8 * n; i++)
    g_assert_cmpfloat (spread[i], ==, i % 8 ? 0 : dense[i / 8]);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, function) g_test_add_func ("/search/crossing-shape/" path, function)
  TEST ("exposure-average-equals-the-slow-average", exposure_average_equals_the_slow_average);
  TEST ("average-over-the-crossing-is-the-mean-loss", average_over_the_crossing_is_the_mean_loss);
  TEST ("samples-sum-to-the-whole-loss", samples_sum_to_the_whole_loss);
  TEST ("a-crossing-is-the-same-both-ways", a_crossing_is_the_same_both_ways);
  TEST ("an-edge-of-half-the-duration-is-round-and-smooth", an_edge_of_half_the_duration_is_round_and_smooth);
  TEST ("too-little-room-is-refused", too_little_room_is_refused);
  TEST ("samples-stand-a-stride-apart", samples_stand_a_stride_apart);
  return g_test_run ();
}
