/* test-spikes.c - spikes drawn at random. */
#include <glib.h>
#include <math.h>

#include "trials/spikes.h"

static const AntSpikePlan plan = { .per_30d = 400, .size_min_ppm = 50, .size_max_ppm = 500, .dark_fraction = 0.25,
                                   .flagged = 1 };

static void
their_number_is_the_rate (void)
{
  g_assert_cmpuint (ant_spikes_count (&plan, 30), ==, 400);
  g_assert_cmpuint (ant_spikes_count (&plan, 3), ==, 40);
  g_assert_cmpuint (ant_spikes_count (&(AntSpikePlan) { 0 }, 30), ==, 0);
}

static void
they_keep_to_the_plan (void)
{
  AntTrialSpike spike[400];
  int dark = 0;
  ant_spikes_draw (&plan, 30, 3, spike);
  for (int i = 0; i < 400; i++)
    {
      g_assert_true (fabs (spike[i].size_ppm) >= 50 && fabs (spike[i].size_ppm) <= 500);
      g_assert_true (spike[i].time_d >= 0 && spike[i].time_d < 30);
      g_assert_cmpuint (spike[i].n_samples, ==, 1);
      g_assert_cmpint (spike[i].flagged, ==, 1);
      dark += spike[i].size_ppm < 0;
    }
  /* 100 of 400, binomial sigma 8.7. */
  g_assert_cmpint (ABS (dark - 100), <, 35);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/trials/spikes/their-number-is-the-rate", their_number_is_the_rate);
  g_test_add_func ("/trials/spikes/they-keep-to-the-plan", they_keep_to_the_plan);
  return g_test_run ();
}
