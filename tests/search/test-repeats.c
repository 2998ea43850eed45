/* test-repeats.c - repeats: the statistics against their formulas, planted ones found, chance and glitches not. */
#include <glib.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/units.h"
#include "models.h"
#include "planting.h"
#include "search/repeat-work.h"

#define MINUTE_D (1 / ANT_MINUTES_PER_DAY)

static AntSeries
white_record (size_t n, double step_d, unsigned long seed, double sigma, float *value)
{
  AntRandom random;
  ant_random_seed (&random, seed, 1);
  for (size_t i = 0; i < n; i++)
    value[i] = i > n / 3 && i < n / 3 + n / 30 ? NAN : (float) (sigma * ant_random_normal (&random));
  return (AntSeries){ .n = n, .step_d = step_d, .start_d = 100, .value_ppm = value };
}

static void
dig (const AntSeries *series, double period_d, double mid_d, double duration_d, double depth_ppm, float *value)
{
  for (size_t i = 0; i < series->n; i++)
    {
      double t = ant_series_time (series, (double) i) - mid_d;
      t -= period_d * floor (t / period_d + 0.5);
      if (fabs (t) < 0.5 * duration_d)
        value[i] -= (float) depth_ppm;
    }
}

static AntRepeatOptions
usual (const AntSeries *series, int white)
{
  return (AntRepeatOptions){ .grid = { .period_min_d = 0.5, .shortest_factor = 0.2, .longest_factor = 2, .shortest_d = 0.5 / 24 },
                             .least_events = 3, .false_alarms = 0.01, .white = white, .edge_d = 20 * MINUTE_D,
                             .exposure_d = series->step_d, .limb_darkening = ANT_LIMB_DARKENING_SUN };
}

/* backwards: slices of every stage in falling order, as threads might end them. */
static AntRepeats *
run_in_order (const AntSeries *series, const AntRepeatOptions *options, const AntChunk *chunk, int backwards)
{
  AntStatus status;
  const AntStages *stages = ant_repeats_stages ();
  AntRepeats *repeats = ant_repeats_new (series, options, chunk ? 1 : 0, chunk, &status);
  g_assert_cmpint (status, ==, ANT_OK);
  for (size_t stage = 0; stage < stages->n_stages; stage++)
    {
      size_t count = stages->count (repeats, stage);
      for (size_t i = 0; i < count; i++)
        g_assert_cmpint (stages->run_slice (repeats, stage, backwards ? count - 1 - i : i), ==, ANT_OK);
      g_assert_cmpint (stages->finish (repeats, stage), ==, ANT_OK);
    }
  return repeats;
}

static AntRepeats *
run (const AntSeries *series, const AntRepeatOptions *options, const AntChunk *chunk)
{
  return run_in_order (series, options, chunk, 0);
}

static AntChunk *
whole_chunk (const AntSeries *series, char model)
{
  AntChunk *chunk = g_new0 (AntChunk, 1);
  chunk->n = series->n;
  chunk->own_from = -HUGE_VAL;
  chunk->own_to = HUGE_VAL;
  ant_study_model (model, &chunk->model);
  return chunk;
}

/* SNR^2 is the drop of chi^2 when depth and level are fitted together. */
static void
test_textbook (void)
{
  enum { N = 3000 };
  float *value = g_new (float, N);
  double *weight = g_new (double, N);
  AntSeries series = white_record (N, 10 * MINUTE_D, 5, 80, value);
  AntRandom random;
  ant_random_seed (&random, 5, 2);
  for (size_t i = 0; i < N; i++)
    weight[i] = isnan (value[i]) ? 0 : 1 / pow (60 + 40 * ant_random_uniform (&random), 2);
  AntRepeatBox box;
  g_assert_cmpint (ant_repeat_box_init (&box, &series, weight), ==, ANT_OK);
  AntRepeatTrain train = { .box = &box, .n = N, .least_duration = 2, .longest_duration = 100 };
  for (int k = 0; k < 20; k++)
    {
      AntTrainTrial trial = { .period = 100.0271 + 57.3 * k, .mid = 0.3137 + 20.2371 * k, .duration = 5.0173 + 2.1 * k };
      double s[3] = { 0 }, sy[2] = { 0 }, depth, drop;
      for (size_t i = 0; i < N; i++)
        if (weight[i] > 0)
          {
            double phase = (double) i - trial.mid;
            phase -= trial.period * floor (phase / trial.period + 0.5);
            int in = phase >= -0.5 * trial.duration && phase < 0.5 * trial.duration;
            s[0] += weight[i];
            s[1] += in * weight[i];
            sy[0] += weight[i] * (double) value[i];
            sy[1] += in * weight[i] * (double) value[i];
          }
      double mean_in = sy[1] / s[1], mean_out = (sy[0] - sy[1]) / (s[0] - s[1]);
      depth = mean_out - mean_in;
      drop = depth * depth / (1 / s[1] + 1 / (s[0] - s[1]));
      AntTrainSums sums;
      ant_repeat_train_sums (&train, &trial, &sums);
      g_assert_cmpfloat (fabs (sums.depth / depth - 1), <, 1e-10);
      g_assert_cmpfloat (fabs (sums.snr * sums.snr / drop - 1), <, 1e-10);
    }
  ant_repeat_box_clear (&box);
  g_free (value);
  g_free (weight);
}

/* Numerators of trapezoids at any place from running sums, and their energies in the table. */
static void
test_edges (void)
{
  enum { N = 6000 };
  float *value = g_new (float, N);
  double *z = g_new (double, N), lane[400 * ANT_LANES], energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES], worst = 0;
  AntSeries series = ant_study_record ('A', ANT_MASK_LOW_ORBIT, N, MINUTE_D, 3, value);
  AntChunk *chunk = whole_chunk (&series, 'A');
  AntStatus status;
  AntWhitener *whitener = ant_whitener_new_free_level (&chunk->model, &series, &status);
  ant_whitener_solve (whitener, value, z);
  AntRepeatEdges edges;
  AntRepeatPairs pairs;
  ant_repeat_edges_init (&edges, N, z, 20.5);
  ant_repeat_pairs_init (&pairs, N, 20, 600);
  ant_repeat_pairs_tabulate (&pairs, whitener, 0, -HUGE_VAL, HUGE_VAL, NULL);
  for (int k = 0; k < 50; k++)
    {
      double place = 13.3 + 113.7 * k, duration = 40.1 + 5 * k, direct = 0, sum = 0;
      for (size_t i = 0; i < N; i++)
        {
          double t = (double) i - place;
          double shape = fmin (fmax (t / 20.5, 0), 1) - fmin (fmax ((t - duration) / 20.5, 0), 1);
          direct -= shape * z[i];
          sum += shape * fabs (z[i]);
        }
      worst = fmax (worst, fabs (direct - (ant_repeat_edges_at (&edges, place) - ant_repeat_edges_at (&edges, place + duration))) / sum);
    }
  g_assert_cmpfloat (worst, <, 1e-9);
  memset (lane, 0, sizeof lane);
  for (size_t j = 0; j < 400; j++)
    lane[j * ANT_LANES] = fmin ((double) j / 20, 1) - fmin (fmax (((double) j - 120) / 20, 0), 1);
  ant_whitener_energies (whitener, NULL, 2000, 400, lane, energy, moment, weight);
  g_assert_cmpfloat (fabs (ant_repeat_pairs_energy (&pairs, 2000, 120) / energy[0] - 1), <, 1e-6);
  ant_repeat_pairs_clear (&pairs);
  ant_repeat_edges_clear (&edges);
  ant_whitener_free (whitener);
  g_free (chunk);
  g_free (value);
  g_free (z);
}

/* What the bound skips could not have won: bins are those of an exhaustive pass. */
static void
test_bound (void)
{
  enum { N = 40 * 1440 };
  float *value = g_new (float, N);
  double *z = g_new (double, N);
  AntSeries series = ant_study_record ('B', ANT_MASK_L1, N, MINUTE_D, 7, value);
  AntChunk *chunk = whole_chunk (&series, 'B');
  AntRepeatGrid grid = { .period_min_d = 2, .period_max_d = 4, .shortest_factor = 0.2, .longest_factor = 2, .shortest_d = 0.5 / 24 };
  AntStatus status;
  AntWhitener *whitener = ant_whitener_new_free_level (&chunk->model, &series, &status);
  ant_whitener_solve (whitener, value, z);
  AntRepeatEdges edges;
  AntRepeatPairs pairs;
  AntRepeatShared shared;
  AntRepeatBins bins[2];
  double longest_d = ant_repeat_grid_longest (&grid);
  ant_repeat_edges_init (&edges, N, z, 20);
  ant_repeat_pairs_init (&pairs, N, 20, longest_d / MINUTE_D);
  ant_repeat_pairs_tabulate (&pairs, whitener, 0, -HUGE_VAL, HUGE_VAL, NULL);
  g_assert_cmpint (ant_repeat_pairs_fit (&pairs), ==, ANT_OK);
  g_assert_cmpfloat (pairs.misfit, <, 0.03);
  g_assert_cmpint (ant_repeat_shared_init (&shared, &edges, &pairs, MINUTE_D, 2, 2, longest_d, 4), ==, ANT_OK);
  for (int all = 0; all < 2; all++)
    {
      ant_repeat_bins_init (&bins[all], &grid);
      g_assert_cmpint (ant_repeat_shared_search (&shared, &grid, 2, 2.5, 3, all, NULL, &bins[all]), ==, ANT_OK);
    }
  g_assert_cmpmem (bins[0].cell, bins[0].n * sizeof *bins[0].cell, bins[1].cell, bins[1].n * sizeof *bins[1].cell);
  size_t filled = 0;
  for (size_t i = 0; i < bins[0].n; i++)
    filled += bins[0].cell[i].power > ANT_REPEAT_FLOOR;
  g_assert_cmpuint (filled, >, 20);
  ant_repeat_bins_clear (&bins[0]);
  ant_repeat_bins_clear (&bins[1]);
  ant_repeat_shared_clear (&shared);
  ant_repeat_pairs_clear (&pairs);
  ant_repeat_edges_clear (&edges);
  ant_whitener_free (whitener);
  g_free (chunk);
  g_free (value);
  g_free (z);
}

static void
test_white_found (void)
{
  enum { N = 60 * 144 };
  float *value = g_new (float, N);
  AntSeries series = white_record (N, 10 * MINUTE_D, 11, 100, value);
  dig (&series, 3.7101, 101.234, 2.5 / 24, 120, value);
  AntRepeatOptions options = usual (&series, 1);
  AntRepeats *repeats = run (&series, &options, NULL);
  const AntRepeat *repeat;
  g_assert_cmpuint (ant_repeats_list (repeats, &repeat), ==, 1);
  g_assert_cmpfloat (fabs (repeat->period_d - 3.7101), <, 4 * repeat->period_sigma_d + 0.001);
  g_assert_cmpfloat (fabs (fmod (repeat->epoch_d - 101.234 + 0.5 * 3.7101, 3.7101) - 0.5 * 3.7101), <, 0.01);
  g_assert_cmpfloat (fabs (repeat->depth_ppm - 120), <, 4 * repeat->depth_sigma_ppm);
  g_assert_cmpuint (repeat->n_observed, ==, 16);
  g_assert_cmpfloat (fabs (repeat->alias[0].snr / repeat->snr - sqrt (0.5)), <, 0.15);
  ant_repeats_free (repeats);
  g_free (value);
}

static void
plant_train (const AntSeries *series, double period_d, double depth_ppm, double t14_h, float *value)
{
  for (double mid_d = 1.3; mid_d < (double) series->n * series->step_d; mid_d += period_d)
    {
      Planted planted = { .mid_d = mid_d, .t14_h = t14_h, .depth_ppm = depth_ppm, .impact = 0.3, .ingress_min = 20 };
      plant (series, &planted, value);
    }
}

static void
test_two_found_in_solar_noise (void)
{
  enum { N = 45 * 720 };
  float *value = g_new (float, N);
  AntSeries series = ant_study_record ('A', ANT_MASK_L1, N, 2 * MINUTE_D, 21, value);
  plant_train (&series, 4.321, 150, 4, value);
  plant_train (&series, 7.77, 140, 5, value);
  AntChunk *chunk = whole_chunk (&series, 'A');
  AntRepeatOptions options = usual (&series, 0);
  options.false_alarms = 0.001; /* one noise in a hundred has a repeat of its own at the usual rate; this one's reaches 6.64 */
  AntRepeats *repeats = run (&series, &options, chunk);
  const AntRepeat *repeat;
  g_assert_cmpuint (ant_repeats_list (repeats, &repeat), ==, 2);
  double period[2] = { fmin (repeat[0].period_d, repeat[1].period_d), fmax (repeat[0].period_d, repeat[1].period_d) };
  g_assert_cmpfloat (fabs (period[0] - 4.321), <, 0.005);
  g_assert_cmpfloat (fabs (period[1] - 7.77), <, 0.01);
  for (int i = 0; i < 2; i++)
    {
      double depth = repeat[i].period_d < 6 ? 150 : 140;
      g_assert_cmpfloat (fabs (repeat[i].depth_ppm - depth), <, 4 * repeat[i].depth_sigma_ppm);
    }
  ant_repeats_free (repeats);
  g_free (chunk);
  g_free (value);
}

/* Slices land in their own places: whatever order they run in, the digits are the same. */
static void
test_any_order (void)
{
  enum { N = 25 * 288 };
  float *value = g_new (float, N);
  AntSeries series = ant_study_record ('A', ANT_MASK_LOW_ORBIT, N, 5 * MINUTE_D, 23, value);
  plant_train (&series, 2.9, 150, 4, value);
  AntChunk *chunk = whole_chunk (&series, 'A');
  AntRepeatOptions options = usual (&series, 0);
  AntRepeats *forwards = run_in_order (&series, &options, chunk, 0), *backwards = run_in_order (&series, &options, chunk, 1);
  const AntRepeatBins *one = ant_repeats_spectrum (forwards), *other = ant_repeats_spectrum (backwards);
  const AntRepeat *repeat[2];
  g_assert_cmpmem (one->cell, one->n * sizeof *one->cell, other->cell, other->n * sizeof *other->cell);
  g_assert_cmpuint (ant_repeats_list (forwards, &repeat[0]), ==, 1);
  g_assert_cmpuint (ant_repeats_list (backwards, &repeat[1]), ==, 1);
  g_assert_cmpfloat (repeat[0]->period_d, ==, repeat[1]->period_d);
  g_assert_cmpfloat (repeat[0]->depth_ppm, ==, repeat[1]->depth_ppm);
  ant_repeats_free (forwards);
  ant_repeats_free (backwards);
  g_free (chunk);
  g_free (value);
}

/* One strong glitch is no repeat, nor are two. */
static void
test_glitches (void)
{
  enum { N = 30 * 720 };
  float *value = g_new (float, N);
  AntSeries series = ant_study_record ('A', ANT_MASK_L1, N, 2 * MINUTE_D, 31, value);
  Planted planted[2] = { { .mid_d = 11.1, .t14_h = 4, .depth_ppm = 600, .impact = 0.3, .ingress_min = 20 },
                         { .mid_d = 23.4, .t14_h = 4, .depth_ppm = 600, .impact = 0.3, .ingress_min = 20 } };
  AntChunk *chunk = whole_chunk (&series, 'A');
  AntRepeatOptions options = usual (&series, 0);
  for (int k = 0; k < 2; k++)
    {
      plant (&series, &planted[k], value);
      AntRepeats *repeats = run (&series, &options, chunk);
      const AntRepeat *repeat;
      g_assert_cmpuint (ant_repeats_list (repeats, &repeat), ==, 0);
      ant_repeats_free (repeats);
    }
  g_free (chunk);
  g_free (value);
}

/* An event that is a known dip names it, and the evidence without such events is less. */
static void
test_known_dips (void)
{
  enum { N = 60 * 144 };
  float *value = g_new (float, N);
  AntSeries series = white_record (N, 10 * MINUTE_D, 12, 100, value);
  dig (&series, 5.5, 102, 3 / 24.0, 200, value);
  AntDip dip = { .mid_d = 113, .duration_d = 3 / 24.0 };
  AntRepeatOptions options = usual (&series, 1);
  options.dip = &dip;
  options.n_dips = 1;
  AntRepeats *repeats = run (&series, &options, NULL);
  const AntRepeat *repeat;
  size_t named = 0;
  g_assert_cmpuint (ant_repeats_list (repeats, &repeat), ==, 1);
  for (size_t e = 0; e < repeat->n_events; e++)
    named += repeat->event[e].dip == 1;
  g_assert_cmpuint (named, ==, 1);
  g_assert_cmpfloat (repeat->snr_unlisted, <, repeat->snr);
  g_assert_cmpfloat (repeat->snr_unlisted, >, 0.8 * repeat->snr);
  ant_repeats_free (repeats);
  g_free (value);
}

static void
test_limits (void)
{
  float value[100] = { 0 };
  AntSeries series = { .n = 100, .step_d = 10 * MINUTE_D, .value_ppm = value };
  AntRepeatOptions options = usual (&series, 1);
  AntStatus status;
  double shortest_d, longest_d;
  ant_repeats_limits (&series, &options, &shortest_d, &longest_d);
  g_assert_cmpfloat (fabs (longest_d - 50 * series.step_d), <, 1e-12);
  g_assert_null (ant_repeats_new (&series, &options, 0, NULL, &status));
  g_assert_cmpint (status, ==, ANT_NO_DATA);
  options.least_events = 1;
  g_assert_null (ant_repeats_new (&series, &options, 0, NULL, &status));
  g_assert_cmpint (status, ==, ANT_BAD_ARGUMENT);
}

/* Expected numbers fall with SNR, grow with the span, and the threshold is their inverse. */
static void
test_chance (void)
{
  AntRepeatGrid grid = { .period_min_d = 0.5, .period_max_d = 3, .shortest_factor = 0.2, .longest_factor = 2, .shortest_d = 0.5 / 24 };
  double rate[ANT_CHANCE_DURATIONS];
  for (int i = 0; i < ANT_CHANCE_DURATIONS; i++)
    rate[i] = 1e-4;
  for (int white = 0; white < 2; white++)
    {
      AntRepeatChance one, ten;
      ant_repeat_chance_init (&one, &grid, 3, 30, MINUTE_D, white ? NULL : rate);
      ant_repeat_chance_init (&ten, &grid, 3, 300, MINUTE_D, white ? NULL : rate);
      g_assert_cmpfloat (ant_repeat_chance_expected (&one, 6), >, ant_repeat_chance_expected (&one, 6.5));
      double ratio = ant_repeat_chance_expected (&ten, 9) / ant_repeat_chance_expected (&one, 9); /* sqrt (M^2-1) is nearly M */
      g_assert_cmpfloat (fabs (ratio / 10 - 1), <, 0.01);
      double threshold = ant_repeat_chance_threshold (&one, 0.01);
      g_assert_cmpfloat (fabs (ant_repeat_chance_expected (&one, threshold) / 0.01 - 1), <, 1e-7);
    }
}

/* The part of trains of noise that keep enough without their largest event, counted in draws at one SNR. */
static void
test_few_events_seldom_pass (void)
{
  AntRepeatGrid grid = { .period_min_d = 0.5, .period_max_d = 3, .shortest_factor = 0.2, .longest_factor = 2, .shortest_d = 0.5 / 24 };
  AntRepeatChance chance;
  AntRandom random;
  ant_random_seed (&random, 8, 1);
  ant_repeat_chance_init (&chance, &grid, 3, 30, MINUTE_D, NULL);
  for (int events = 3; events <= 12; events += 3)
    {
      double snr = 6.6, count = 0, draws = 40000;
      for (int k = 0; k < draws; k++)
        {
          double e[12], mean = 0, largest = -HUGE_VAL;
          for (int i = 0; i < events; i++)
            mean += (e[i] = ant_random_normal (&random)) / events;
          for (int i = 0; i < events; i++)
            largest = fmax (largest, snr / sqrt (events) + e[i] - mean);
          count += (snr * sqrt (events) - largest) / sqrt (events - 1) >= ANT_WITHOUT_LARGEST;
        }
      g_assert_cmpfloat (fabs (ant_repeat_chance_keeps_enough (&chance, (size_t) events, snr) - count / draws), <, 0.04);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/search/repeats/white-trains-equal-the-textbook", test_textbook);
  g_test_add_func ("/search/repeats/edges-equal-direct-sums", test_edges);
  g_test_add_func ("/search/repeats/a-box-in-white-noise-is-found", test_white_found);
  g_test_add_func ("/search/repeats/slices-in-any-order-give-the-same", test_any_order);
  g_test_add_func ("/search/repeats/a-short-record-allows-none", test_limits);
  g_test_add_func ("/search/repeats/chance-follows-its-law", test_chance);
  g_test_add_func ("/search/repeats/few-events-of-noise-seldom-pass", test_few_events_seldom_pass);
  if (g_test_slow ()) /* too long for the sanitizers */
    {
      g_test_add_func ("/search/repeats/the-bound-loses-no-maximum", test_bound);
      g_test_add_func ("/search/repeats/two-planets-in-solar-noise-are-found", test_two_found_in_solar_noise);
      g_test_add_func ("/search/repeats/glitches-are-no-repeat", test_glitches);
      g_test_add_func ("/search/repeats/known-dips-are-named", test_known_dips);
    }
  return g_test_run ();
}
