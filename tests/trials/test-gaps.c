/* test-gaps.c - the masks of simulated records. */
#include <glib.h>

#include "core/units.h"
#include "trials/gaps.h"

#define MINUTE_D (1 / ANT_MINUTES_PER_DAY)

static double
observed_fraction (const AntGapPlan *plan, gsize n, guint64 seed)
{
  g_autofree guint8 *missing = g_new (guint8, n);
  gsize lost = 0;
  ant_gaps_draw (plan, n, MINUTE_D, MINUTE_D, seed, missing);
  for (gsize i = 0; i < n; i++)
    lost += missing[i];
  return 1 - (double) lost / (double) n;
}

static void
no_mask_loses_nothing (void)
{
  AntGapPlan plan = ant_gap_plan_for_mask (ANT_GAPS_NONE);
  g_assert_cmpfloat (observed_fraction (&plan, 43200, 1), ==, 1);
}

static void
l1_is_nearly_continuous (void)
{
  /* Four gaps of 92.5 min on average and 0.3 % in 30 d: 98.85 % on average, the gaps between 0.05 and 1.67 %. */
  AntGapPlan plan = ant_gap_plan_for_mask (ANT_GAPS_L1);
  double sum = 0;
  for (guint64 seed = 1; seed <= 50; seed++)
    {
      double observed = observed_fraction (&plan, 43200, seed);
      g_assert_cmpfloat (observed, >, 0.978);
      g_assert_cmpfloat (observed, <, 0.998);
      sum += observed;
    }
  g_assert_cmpfloat_with_epsilon (sum / 50, 0.9885, 0.0015);
}

static void
low_orbit_sees_about_half (void)
{
  /* 61/96 of the orbit, 22/24 of the day, 27.5/30 of the month: 53.4 %. */
  AntGapPlan plan = ant_gap_plan_for_mask (ANT_GAPS_LOW_ORBIT);
  double sum = 0;
  for (guint64 seed = 1; seed <= 50; seed++)
    {
      double observed = observed_fraction (&plan, 43200, seed);
      g_assert_cmpfloat (observed, >, 0.49);
      g_assert_cmpfloat (observed, <, 0.58);
      sum += observed;
    }
  g_assert_cmpfloat_with_epsilon (sum / 50, 61.0 / 96 * 22 / 24 * 27.5 / 30, 0.01);
}

static void
an_orbit_gap_comes_every_revolution (void)
{
  AntGapPlan plan = { .orbit_period_d = 96 * MINUTE_D, .orbit_gap_d = 35 * MINUTE_D, .orbit_offset_d = 80 * MINUTE_D };
  guint8 missing[400];
  ant_gaps_draw (&plan, 400, MINUTE_D, MINUTE_D, 1, missing);
  for (int i = 0; i < 400; i++)
    g_assert_cmpuint (missing[i], ==, (i + 96 - 80) % 96 < 35);
}

static void
a_listed_gap_takes_the_exposures_whose_middle_it_holds (void)
{
  AntSpan span = { 10.4 * MINUTE_D, 12.6 * MINUTE_D };
  AntGapPlan plan = { .n_listed = 1, .listed = &span };
  guint8 missing[20];
  ant_gaps_draw (&plan, 20, MINUTE_D, MINUTE_D, 1, missing);
  for (int i = 0; i < 20; i++)
    g_assert_cmpuint (missing[i], ==, i >= 10 && i <= 12);
}

static void
gaps_beyond_the_record_do_no_harm (void)
{
  AntSpan spans[] = { { -5, -1 }, { -1, 2 * MINUTE_D }, { 19 * MINUTE_D, 99 }, { 50, 60 } };
  AntGapPlan plan = { .n_listed = 4, .listed = spans, .long_per_30d = 3000, .long_min_d = 0.001, .long_max_d = 0.002 };
  guint8 missing[20];
  ant_gaps_draw (&plan, 20, MINUTE_D, MINUTE_D, 1, missing);
  g_assert_cmpuint (missing[0] & missing[1] & missing[19], ==, 1);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/trials/gaps/no-mask-loses-nothing", no_mask_loses_nothing);
  g_test_add_func ("/trials/gaps/l1-is-nearly-continuous", l1_is_nearly_continuous);
  g_test_add_func ("/trials/gaps/low-orbit-sees-about-half", low_orbit_sees_about_half);
  g_test_add_func ("/trials/gaps/an-orbit-gap-comes-every-revolution", an_orbit_gap_comes_every_revolution);
  g_test_add_func ("/trials/gaps/a-listed-gap-takes-the-exposures-whose-middle-it-holds",
                   a_listed_gap_takes_the_exposures_whose_middle_it_holds);
  g_test_add_func ("/trials/gaps/gaps-beyond-the-record-do-no-harm", gaps_beyond_the_record_do_no_harm);
  return g_test_run ();
}
