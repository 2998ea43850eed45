/* test-surrogates.c - the chance law refitted: to events of a known law, to few, to none, and to a scan's surrogates. */
#include <math.h>
#include "core/random.h"
#include "driving.h"
#include "models.h"
#include "search/scan-private.h"

#define LOWEST 4.5

static AntChanceLaw
law_of (double crossings, double yield, double softness)
{
  return (AntChanceLaw){ .field = { .crossings = crossings, .observed_d = 30 }, .yield = yield, .softness = softness };
}

/* An SNR drawn from a law's tail above LOWEST: the chance of exceeding it is uniform. */
static double
draw_snr (const AntChanceLaw *law, AntRandom *random)
{
  double share = 1 - ant_random_uniform (random);
  return ant_chance_law_threshold (law, share * ant_chance_law_expected (law, LOWEST));
}

static void
test_fit_finds_a_known_law (void)
{
  enum { records = 120 };
  AntChanceLaw truth = law_of (3e4, 0.12, 0.18), law = law_of (3e4, 0.2, 0.05);
  size_t n = (size_t) (2 * records * ant_chance_law_expected (&truth, LOWEST));
  g_autofree double *snr = g_new (double, n);
  AntRandom random;
  ant_random_seed (&random, 17, 1);
  for (size_t i = 0; i < n; i++)
    snr[i] = draw_snr (&truth, &random);
  ant_chance_law_fit (&law, n, snr, records, LOWEST);
  g_test_message ("%zu events: yield %.4f softness %.4f", n, law.yield, law.softness);
  g_assert_cmpuint (n, >, 500);
  /* Mean of SNR^2/2 beyond the lowest is about 1/(1 - softness), with a relative error of 1/sqrt(n). */
  g_assert_cmpfloat (fabs (law.softness - truth.softness), <, 3.5 * 1.2 / sqrt ((double) n));
  double ratio = ant_chance_law_expected (&law, LOWEST) / ant_chance_law_expected (&truth, LOWEST);
  g_assert_cmpfloat (fabs (ratio - 1), <, 0.02);
  g_assert_cmpfloat (fabs (log (ant_chance_law_expected (&law, 5.5) / ant_chance_law_expected (&truth, 5.5))), <, 0.7);
}

static void
test_few_events_move_the_yield_only (void)
{
  const double snr[] = { 4.55, 4.6, 4.9 };
  AntChanceLaw before = law_of (4e3, 0.1, 0.1), law = before;
  double expected = 2 * 40 * ant_chance_law_expected (&before, LOWEST);
  ant_chance_law_fit (&law, G_N_ELEMENTS (snr), snr, 40, LOWEST);
  g_test_message ("expected %.1f: yield %.4f softness %.4f", expected, law.yield, law.softness);
  g_assert_cmpfloat (expected, >, 6);
  g_assert_cmpfloat (fabs (law.softness - before.softness), <, 0.05);
  g_assert_cmpfloat (law.yield, <, 0.8 * before.yield);
}

static void
test_no_event_leaves_a_law (void)
{
  AntChanceLaw before = law_of (4e3, 0.1, 0.1), law = before;
  ant_chance_law_fit (&law, 0, NULL, 10, LOWEST);
  g_assert_cmpfloat (law.softness, ==, before.softness);
  g_assert_cmpfloat (law.yield, >, 0);
  g_assert_cmpfloat (law.yield, <, before.yield);
}

static void
test_a_scan_refits_its_law (void)
{
  enum { n = 8 * 96 };
  float value[n];
  AntSeries series = ant_study_record ('A', ANT_MASK_L1, n, 1 / 96.0, 3, value);
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  options.false_alarms_per_year = 20;
  AntScan *plain = scan_to_the_end (&series, &options);
  options.surrogates = 4;
  options.seed = 11;
  AntScan *one = scan_to_the_end (&series, &options), *two = scan_to_the_end (&series, &options);
  size_t events, again;
  g_assert_cmpuint (ant_scan_surrogates (plain, &events), ==, 0);
  g_assert_cmpuint (ant_scan_surrogates (one, &events), ==, 4);
  ant_scan_surrogates (two, &again);
  g_test_message ("%zu events, threshold %.3f, built-in law %.3f", events, ant_scan_threshold (one),
                  ant_scan_threshold (plain));
  g_assert_cmpuint (events, ==, again);
  g_assert_cmpfloat (ant_scan_threshold (one), ==, ant_scan_threshold (two));
  g_assert_cmpfloat (ant_scan_threshold (one), !=, ant_scan_threshold (plain));
  double asked = 20 * ant_scan_chance_field (one).observed_d / 365.25;
  g_assert_cmpfloat (fabs (ant_scan_expected_false (one, ant_scan_threshold (one)) / asked - 1), <, 1e-6);
  ant_scan_free (plain);
  ant_scan_free (one);
  ant_scan_free (two);
}

/* Two chunks, the second twenty times as loud: a draw pieced together would jump where they meet, by about a standard
 * deviation of the loud one. */
static void
test_surrogates_go_over_from_chunk_to_chunk (void)
{
  enum { n = 300 * 24, records = 400, border = n / 2, apart = 12 };
  g_autofree float *value = g_new0 (float, n);
  AntSeries series = { .n = n, .step_d = 1 / 24.0, .value_ppm = value };
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  AntStatus status;
  value[5] = NAN;
  AntScan *scan = ant_scan_new (&series, &options, &status);
  const AntChunk *chunk;
  g_assert_cmpuint (ant_scan_chunks (scan, &chunk), ==, 2);
  for (int i = 0; i < 2; i++)
    scan->chunk[i].model = (AntNoiseModel){ .n_parts = 1, .error_scale = 1,
                                            .part = { { ANT_OSCILLATOR, i ? 1000 : 50, 20, 0.70710678 } } };
  g_autofree float *drawn = g_new (float, n);
  const size_t place[] = { 1000, border, 6000 };
  double squares[3] = { 0 }, jumps[3] = { 0 };
  for (size_t r = 0; r < records; r++)
    {
      g_assert_cmpint (ant_scan_draw_surrogate (scan, r, drawn), ==, ANT_OK);
      g_assert_true (isnan (drawn[5]));
      for (int k = 0; k < 3; k++)
        {
          double jump = (double) drawn[place[k] + apart] - (double) drawn[place[k] - apart];
          squares[k] += (double) drawn[place[k]] * (double) drawn[place[k]] / records;
          jumps[k] += jump * jump / records;
        }
    }
  const double truth[] = { 2500, 0.5 * (2500 + 1e6), 1e6 };
  for (int k = 0; k < 3; k++)
    {
      g_test_message ("place %zu: rms %.0f ppm, jump over a day %.0f ppm", place[k], sqrt (squares[k]), sqrt (jumps[k]));
      g_assert_cmpfloat (fabs (squares[k] / truth[k] - 1), <, 3.5 * sqrt (2.0 / records));
    }
  g_assert_cmpfloat (jumps[1], <, jumps[2]);
  ant_scan_free (scan);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/search/surrogates/fit-finds-a-known-law", test_fit_finds_a_known_law);
  g_test_add_func ("/search/surrogates/few-events-move-the-yield-only", test_few_events_move_the_yield_only);
  g_test_add_func ("/search/surrogates/no-event-leaves-a-law", test_no_event_leaves_a_law);
  g_test_add_func ("/search/surrogates/a-scan-refits-its-law", test_a_scan_refits_its_law);
  g_test_add_func ("/search/surrogates/surrogates-go-over-from-chunk-to-chunk", test_surrogates_go_over_from_chunk_to_chunk);
  return g_test_run ();
}
