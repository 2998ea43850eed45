/* test-passages.c - spot groups are found where they are and as deep as they are; what is no passage is not listed. */
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/units.h"
#include "driving.h"
#include "models.h"

#define STEP_D (1 / 48.0)
#define DAYS 400
#define N (DAYS * 48)

typedef struct
{
  double mid_d, depth_ppm;
} Group;

/* A group on the disc for half a rotation, as its light would be: mu (3 mu + 2)/5 with mu = cos of the longitude. */
static double
group_light (const Group *group, double time_d)
{
  double mu = cos (ANT_TAU * (time_d - group->mid_d) / 27.275);
  return fabs (time_d - group->mid_d) < 27.275 / 4 ? -group->depth_ppm * mu * (3 * mu + 2) / 5 : 0;
}

static void
add_groups (const AntSeries *series, size_t n_groups, const Group *group, float *value)
{
  for (size_t i = 0; i < series->n; i++)
    for (size_t g = 0; g < n_groups; g++)
      value[i] += (float) group_light (&group[g], ant_series_time (series, (double) i));
}

static void
lose (float *value, double from_d, double to_d)
{
  for (size_t i = (size_t) (from_d / STEP_D); i < (size_t) (to_d / STEP_D); i++)
    value[i] = NAN;
}

/* The passage nearest to a time; how many have it between start and end. */
static const AntPassage *
passage_at (const AntScan *scan, double time_d, int *covering)
{
  const AntPassage *passage, *nearest = NULL;
  size_t n = ant_scan_passages (scan, &passage);
  *covering = 0;
  for (size_t i = 0; i < n; i++)
    {
      *covering += passage[i].start_d <= time_d && time_d <= passage[i].end_d;
      if (!nearest || fabs (passage[i].mid_d - time_d) < fabs (nearest->mid_d - time_d))
        nearest = &passage[i];
    }
  return nearest;
}

/* Chunks of 180 d: the borders of three lie at 146.7 and 253.3 d. */
static void
test_groups_are_found_on_borders_and_in_gaps (void)
{
  static const Group group[] = { { 40, 500 }, { 100, 1500 }, { 146.7, 900 }, { 200, 2500 }, { 253.3, 700 }, { 330, 300 } };
  g_autofree float *value = g_new (float, N);
  AntSeries series = ant_study_record ('A', ANT_MASK_L1, N, STEP_D, 5, value);
  add_groups (&series, G_N_ELEMENTS (group), group, value);
  lose (value, 101, 102.5);
  lose (value, 327, 327.6);
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  AntScan *scan = scan_to_the_end (&series, &options);
  const AntChunk *chunk;
  g_assert_cmpuint (ant_scan_chunks (scan, &chunk), ==, 3);
  for (size_t g = 0; g < G_N_ELEMENTS (group); g++)
    {
      int covering;
      const AntPassage *found = passage_at (scan, group[g].mid_d, &covering);
      g_assert_nonnull (found);
      g_test_message ("%.0f ppm at %.1f d: %.1f +- %.1f ppm at %.2f d, %.2f d wide", group[g].depth_ppm, group[g].mid_d,
                      found->depth_ppm, found->depth_sigma_ppm, found->mid_d, found->end_d - found->start_d);
      g_assert_cmpint (covering, ==, 1);
      g_assert_cmpfloat (fabs (found->mid_d - group[g].mid_d), <, 0.5);
      g_assert_cmpfloat (fabs (found->depth_ppm / group[g].depth_ppm - 1), <, 0.15);
      g_assert_cmpfloat (fabs (found->end_d - found->start_d - 7), <, 1);
      g_assert_cmpfloat (found->depth_ppm, >=, ANT_PASSAGE_SIGMAS * found->depth_sigma_ppm);
    }
  ant_scan_free (scan);
}

static void
test_slow_curve_follows_the_groups_and_not_the_crossing (void)
{
  static const Group group = { 30, 1200 };
  enum { n = 60 * 48 };
  g_autofree float *value = g_new (float, n);
  AntSeries series = ant_study_record ('A', ANT_MASK_L1, n, STEP_D, 6, value);
  add_groups (&series, 1, &group, value);
  AntCrossingShape crossing;
  ant_crossing_shape_init (&crossing, 6 / 24.0, 0.5 / 24, 0.3, ANT_LIMB_DARKENING_SUN);
  for (size_t i = 0; i < n; i++)
    value[i] -= (float) (1000 * ant_crossing_shape_mean (&crossing, (double) i * STEP_D - 29, STEP_D));
  lose (value, 31.5, 32.5);
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  AntScan *scan = scan_to_the_end (&series, &options);
  const AntDip *dip;
  g_assert_cmpuint (ant_scan_dips (scan, &dip), ==, 1);
  const float *slow = ant_scan_slow (scan);
  double squares = 0, worst = 0;
  for (size_t i = 0; i < n; i++)
    {
      g_assert_true (isfinite (slow[i]));
      double off = (double) slow[i] - group_light (&group, (double) i * STEP_D);
      squares += off * off;
      worst = fmax (worst, fabs (off));
    }
  g_test_message ("slow curve less truth: rms %.1f, worst %.1f ppm", sqrt (squares / n), worst);
  g_assert_cmpfloat (sqrt (squares / n), <, 30); /* the noise's own slow half is 40/sqrt(2) ppm */
  int covering;
  const AntPassage *found = passage_at (scan, group.mid_d, &covering);
  g_test_message ("%.1f +- %.1f ppm at %.2f d", found->depth_ppm, found->depth_sigma_ppm, found->mid_d);
  g_assert_cmpint (covering, ==, 1);
  g_assert_cmpfloat (fabs (found->mid_d - group.mid_d), <, 0.5);
  g_assert_cmpfloat (fabs (found->depth_ppm / group.depth_ppm - 1), <, 0.15);
  ant_scan_free (scan);
}

/* --- the reading of a curve, the model given --- */

static AntNoiseModel
known_model (void)
{
  return (AntNoiseModel){ .n_parts = 2, .white_ppm = 5, .error_scale = 1,
                          .part = { { ANT_OSCILLATOR, 500, 20, 0.70710678 }, { ANT_OSCILLATOR, 20, 2, 0.70710678 } } };
}

/* Passages of a light curve under white noise of 5 ppm. */
static size_t
trace (double days, double (*light) (double time_d), double gap_from_d, double gap_to_d, AntPassage **passage)
{
  AntNoiseModel model = known_model ();
  AntRandom random;
  size_t n = (size_t) (days / STEP_D), found;
  g_autofree float *value = g_new (float, n), *slow = g_new (float, n);
  AntSeries series = { .n = n, .step_d = STEP_D, .value_ppm = value };
  ant_random_seed (&random, 31, 1);
  for (size_t i = 0; i < n; i++)
    value[i] = (float) (light ((double) i * STEP_D) + 5 * ant_random_normal (&random));
  lose (value, gap_from_d, gap_to_d);
  g_assert_cmpint (ant_passages_trace (&model, &series, slow, &found, passage), ==, ANT_OK);
  for (size_t i = 0; i < found; i++)
    g_test_message ("%.1f +- %.1f ppm at %.2f d, %.2f d wide, %.2f observed", (*passage)[i].depth_ppm,
                    (*passage)[i].depth_sigma_ppm, (*passage)[i].mid_d, (*passage)[i].end_d - (*passage)[i].start_d,
                    (*passage)[i].coverage);
  return found;
}

static double
two_groups_close (double time_d)
{
  return -400 * exp (-0.5 * pow ((time_d - 20) / 1.2, 2)) - 250 * exp (-0.5 * pow ((time_d - 26) / 1.2, 2));
}

static void
test_two_groups_are_two_passages (void)
{
  AntPassage *passage;
  g_assert_cmpuint (trace (50, two_groups_close, 0, 0, &passage), ==, 2);
  g_assert_cmpfloat (fabs (passage[0].mid_d - 20), <, 0.1);
  g_assert_cmpfloat (fabs (passage[0].depth_ppm - 400), <, 20);
  g_assert_cmpfloat (fabs (passage[1].mid_d - 26), <, 0.1);
  g_assert_cmpfloat (fabs (passage[1].depth_ppm - 250), <, 20);
  g_assert_cmpfloat (fabs (passage[1].end_d - passage[1].start_d - 2.355 * 1.2), <, 0.15);
  free (passage);
}

static double
a_slow_wave (double time_d)
{
  return 400 * cos (ANT_TAU * time_d / 40);
}

static double
a_night (double time_d)
{
  return -300 * exp (-0.5 * pow ((time_d - 20) / 0.25, 2));
}

static void
test_widths_are_one_to_fourteen_days (void)
{
  AntPassage *passage;
  g_assert_cmpuint (trace (80, a_slow_wave, 0, 0, &passage), ==, 0); /* half-depth width 20 d */
  free (passage);
  g_assert_cmpuint (trace (40, a_night, 0, 0, &passage), ==, 0); /* 0.6 d */
  free (passage);
}

static double
a_bright_month (double time_d)
{
  return 500 * exp (-pow ((time_d - 50) / 16, 4));
}

/* Within a long gap the smoothed curve sags towards the level of the record, here a hundred ppm and more. */
static void
test_a_gap_alone_makes_no_passage (void)
{
  AntPassage *passage;
  size_t found = trace (100, a_bright_month, 42, 58, &passage);
  for (size_t i = 0; i < found; i++)
    g_assert_true (passage[i].end_d < 42 || passage[i].start_d > 58);
  free (passage);
}

static void
test_coverage_is_the_observed_share (void)
{
  AntPassage *passage;
  g_assert_cmpuint (trace (50, two_groups_close, 20.5, 21, &passage), ==, 2);
  double width_d = passage[0].end_d - passage[0].start_d;
  g_assert_cmpfloat (fabs (passage[0].coverage - (1 - 0.5 / width_d)), <, 0.02);
  g_assert_cmpfloat (passage[1].coverage, ==, 1);
  free (passage);
}

static void
test_chunk_shares_add_up_to_one (void)
{
  float value[2000] = { 0 };
  AntSeries series = { .n = 2000, .step_d = 0.25, .value_ppm = value };
  AntChunkOptions options = { .length_d = 100, .overlap_d = 20 };
  AntChunk chunk[16];
  size_t n = ant_chunks_plan (&series, &options, G_N_ELEMENTS (chunk), chunk);
  g_assert_cmpuint (n, >, 3);
  for (size_t p = 0; p < series.n; p++)
    {
      double sum = 0;
      for (size_t i = 0; i < n; i++)
        {
          double share = ant_chunk_share (&chunk[i], 80, (double) p);
          g_assert_true (share == 0 || (p >= chunk[i].first && p < chunk[i].first + chunk[i].n));
          sum += share;
        }
      g_assert_cmpfloat (fabs (sum - 1), <, 1e-12);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/search/passages/groups-are-found-on-borders-and-in-gaps", test_groups_are_found_on_borders_and_in_gaps);
  g_test_add_func ("/search/passages/slow-curve-follows-the-groups-and-not-the-crossing",
                   test_slow_curve_follows_the_groups_and_not_the_crossing);
  g_test_add_func ("/search/passages/two-groups-are-two-passages", test_two_groups_are_two_passages);
  g_test_add_func ("/search/passages/widths-are-one-to-fourteen-days", test_widths_are_one_to_fourteen_days);
  g_test_add_func ("/search/passages/a-gap-alone-makes-no-passage", test_a_gap_alone_makes_no_passage);
  g_test_add_func ("/search/passages/coverage-is-the-observed-share", test_coverage_is_the_observed_share);
  g_test_add_func ("/search/passages/chunk-shares-add-up-to-one", test_chunk_shares_add_up_to_one);
  return g_test_run ();
}
