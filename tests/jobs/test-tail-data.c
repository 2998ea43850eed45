/* test-tail-data.c - what the tail chart is given: dips and brightenings that may be compared, and the curve of chance. */
#include "jobs/tail-data.h"

#include <math.h>

static AntDip dips[] = { { .duration_d = 0.25, .snr = 8 }, { .duration_d = 0.5, .snr = 20 }, { .duration_d = 0.1, .snr = 6 } };
static AntDip brightenings[] = { { .duration_d = 0.2, .snr = -7 } };

static AntScanResults
results_of (double crossings)
{
  AntScanResults results = { .n_dips = G_N_ELEMENTS (dips), .dip = dips, .n_brightenings = 1, .brightening = brightenings,
                             .threshold_snr = 5.5 };
  AntChanceField field = { .crossings = crossings, .observed_d = 30 };
  if (crossings > 0)
    ant_chance_law_init (&results.chance, &field, 30);
  return results;
}

static void
dips_too_long_for_the_mirror_are_left_out (void)
{
  AntScanResults results = results_of (1e4);
  AntTailData *data = ant_tail_data_new (&results);
  g_assert_cmpuint (data->chart.n_dips, ==, 2); /* 12 h is too long */
  g_assert_cmpuint (data->chart.n_mirror, ==, 1);
  g_assert_cmpfloat (data->chart.mirror_snr[0], ==, 7);
  ant_tail_data_free (data);
}

static void
the_curve_is_the_chance_law (void)
{
  AntScanResults results = results_of (1e4);
  AntTailData *data = ant_tail_data_new (&results);
  const AntTailChart *chart = &data->chart;
  g_assert_cmpuint (chart->n_expected, >, 10);
  g_assert_cmpfloat (chart->snr[0], <, results.threshold_snr);
  for (gsize i = 0; i < chart->n_expected; i++)
    {
      g_assert_cmpfloat (chart->expected[i], ==, ant_chance_law_expected (&results.chance, chart->snr[i]));
      if (i > 0)
        g_assert_cmpfloat (chart->expected[i], <, chart->expected[i - 1]);
    }
  ant_tail_data_free (data);
}

static void
without_a_law_nothing_is_expected (void)
{
  AntScanResults results = results_of (0);
  AntTailData *data = ant_tail_data_new (&results);
  g_assert_cmpuint (data->chart.n_expected, ==, 0);
  ant_tail_data_free (data);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/jobs/tail-data/dips-too-long-for-the-mirror-are-left-out", dips_too_long_for_the_mirror_are_left_out);
  g_test_add_func ("/jobs/tail-data/the-curve-is-the-chance-law", the_curve_is_the_chance_law);
  g_test_add_func ("/jobs/tail-data/without-a-law-nothing-is-expected", without_a_law_nothing_is_expected);
  return g_test_run ();
}
