/* test-scan.c - the whole search on records with something planted: found once, where and as deep as it is. */
#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "models.h"
#include "planting.h"

typedef struct
{
  AntSeries series;
  AntScanOptions options;
  float *value;
  AntScan *scan;
} Fixture;

/* A record of `days` at a cadence with noise of a study model, and what is planted in it. */
static void
lay (Fixture *f, char model, AntMask mask, double days, double step_s, unsigned long seed, size_t n, const Planted *planted)
{
  size_t places = (size_t) (days * ANT_SECONDS_PER_DAY / step_s);
  f->value = g_new (float, places);
  f->series = ant_study_record (model, mask, places, step_s / ANT_SECONDS_PER_DAY, seed, f->value);
  for (size_t i = 0; i < n; i++)
    plant (&f->series, &planted[i], f->value);
}

static void
set_up (Fixture *f, gconstpointer data)
{
  f->options = (AntScanOptions) ANT_SCAN_OPTIONS_INIT;
}

static void
tear_down (Fixture *f, gconstpointer data)
{
  ant_scan_free (f->scan);
  g_free (f->value);
}

/* The one dip (or brightening) at a planted place: listed once, its time and depth right. */
static void
check_listed_once (const Fixture *f, const Planted *planted, double within_min, double within_sigma)
{
  const AntDip *list;
  size_t count, n = planted->depth_ppm > 0 ? ant_scan_dips (f->scan, &list) : ant_scan_brightenings (f->scan, &list);
  const AntDip *dip = nearest_dip (n, list, planted->mid_d, 1, &count);
  g_assert_cmpuint (count, ==, 1);
  g_test_message ("at %.1f d: %.1f min off, %.0f +- %.0f ppm for %.0f, T14 %.2f for %.2f h, SNR %.1f (first %.1f)", planted->mid_d,
                  (dip->mid_d - planted->mid_d) * ANT_MINUTES_PER_DAY, dip->depth_ppm, dip->depth_sigma_ppm, planted->depth_ppm,
                  dip->duration_d * 24, planted->t14_h, dip->snr, dip->first_snr);
  g_assert_cmpfloat_with_epsilon (dip->mid_d * ANT_MINUTES_PER_DAY, planted->mid_d * ANT_MINUTES_PER_DAY, within_min);
  g_assert_cmpfloat_with_epsilon (dip->depth_ppm, planted->depth_ppm, within_sigma * dip->depth_sigma_ppm);
}

static const Planted low_orbit_planted[] = { { 8.22, 7, 20, 0.3, 300 }, { 20.6, 6, 20, 0.3, -320 } };

static void
a_crossing_seen_from_a_low_orbit_is_found (Fixture *f, gconstpointer data)
{
  const AntDip *dip;
  lay (f, 'A', ANT_MASK_LOW_ORBIT, 30, 60, 9101, 2, low_orbit_planted);
  f->scan = scan_all (&f->series, &f->options);
  check_listed_once (f, &low_orbit_planted[0], 10, 3);
  check_listed_once (f, &low_orbit_planted[1], 10, 3); /* among the brightenings */
  g_assert_cmpuint (ant_scan_dips (f->scan, &dip), ==, 1);
  g_assert_cmpfloat (dip->expected_false, <, 1e-3);
  g_assert_cmpfloat (dip->radius_ratio, >, 0);
  g_assert_cmpuint (ant_scan_brightenings (f->scan, &dip), ==, 1);
  g_assert_cmpfloat (dip->snr, <, 0);
}

static void
a_mirrored_record_gives_the_mirrored_lists (Fixture *f, gconstpointer data)
{
  const AntDip *dip, *mirrored;
  lay (f, 'C', ANT_MASK_L1, 20, 300, 9102, 2, (Planted[]){ { 6, 7, 20, 0.3, 400 }, { 14, 6, 20, 0.3, -500 } });
  f->scan = scan_all (&f->series, &f->options);
  for (size_t i = 0; i < f->series.n; i++)
    f->value[i] = -f->value[i];
  AntScan *other = scan_all (&f->series, &f->options);
  for (int k = 0; k < 2; k++)
    {
      size_t n = k ? ant_scan_brightenings (f->scan, &dip) : ant_scan_dips (f->scan, &dip);
      g_assert_cmpuint (n, ==, k ? ant_scan_dips (other, &mirrored) : ant_scan_brightenings (other, &mirrored));
      g_assert_cmpuint (n, >=, 1);
      for (size_t i = 0; i < n; i++)
        {
          g_assert_cmpfloat_with_epsilon (mirrored[i].mid_d, dip[i].mid_d, 1e-9);
          g_assert_cmpfloat_with_epsilon (mirrored[i].depth_ppm, -dip[i].depth_ppm, 1e-6 * fabs (dip[i].depth_ppm));
        }
    }
  ant_scan_free (other);
}

static void
a_weak_dip_beside_a_strong_one_is_found (Fixture *f, gconstpointer data)
{
  static const Planted planted[] = { { 9, 8, 20, 0.3, 3000 }, { 9.9, 6, 20, 0.3, 150 } };
  const AntDip *dip;
  lay (f, 'C', ANT_MASK_L1, 20, 120, 9103, 2, planted);
  f->scan = scan_all (&f->series, &f->options);
  g_assert_cmpuint (ant_scan_dips (f->scan, &dip), ==, 2);
  for (int k = 0; k < 2; k++)
    {
      g_assert_cmpfloat_with_epsilon (dip[k].mid_d, planted[k].mid_d, 20 / ANT_MINUTES_PER_DAY);
      g_assert_cmpfloat_with_epsilon (dip[k].depth_ppm, planted[k].depth_ppm, 3 * dip[k].depth_sigma_ppm);
    }
  g_assert_cmpuint (ant_scan_brightenings (f->scan, &dip), ==, 0); /* no side lobes */
}

/* Chunks of about 90 d, and a dip on every border between their own stretches, weak and strong. */
static void
dips_on_borders_are_listed_once_and_measured_as_without_a_border (Fixture *f, gconstpointer data)
{
  enum { MOST = 8 };
  Planted planted[MOST];
  AntChunk chunk[MOST];
  double step_s = 480, days = 260;
  size_t places = (size_t) (days * ANT_SECONDS_PER_DAY / step_s);
  float *blank = g_new0 (float, places);
  AntSeries series = { .n = places, .step_d = step_s / ANT_SECONDS_PER_DAY, .value_ppm = blank };
  size_t n = ant_chunks_plan (&series, &f->options.chunk, MOST, chunk), borders = n - 1;
  g_free (blank);
  g_assert_cmpuint (borders, >=, 3);
  for (size_t i = 0; i < borders; i++)
    planted[i] = (Planted){ chunk[i].own_to * series.step_d + (i % 2 ? 0.03 : -0.02), 5 + (double) i, 20, 0.3, i == 1 ? 1200 : 260 };
  lay (f, 'C', ANT_MASK_L1, days, step_s, 9104, borders, planted);
  f->scan = scan_all (&f->series, &f->options);
  for (size_t i = 0; i < borders; i++)
    {
      const AntDip *list, *free_list;
      size_t count, free_count;
      check_listed_once (f, &planted[i], 40, 3); /* five samples of 8 min */
      /* The same length of record with the dip in its middle, and no border. */
      double from = (planted[i].mid_d / series.step_d) - 0.5 * (double) chunk[i].n;
      AntSeries centred = ant_series_part (&f->series, (size_t) from, chunk[i].n);
      AntScan *borderless = scan_all (&centred, &f->options);
      g_assert_cmpuint (ant_scan_chunks (borderless, &(const AntChunk *){ NULL }), ==, 1);
      size_t listed = ant_scan_dips (f->scan, &list), free_listed = ant_scan_dips (borderless, &free_list);
      const AntDip *dip = nearest_dip (listed, list, planted[i].mid_d, 1, &count);
      const AntDip *other = nearest_dip (free_listed, free_list, planted[i].mid_d, 1, &free_count);
      g_assert_cmpuint (free_count, ==, 1);
      g_test_message ("%.3f sigma from the borderless depth", (dip->depth_ppm - other->depth_ppm) / other->depth_sigma_ppm);
      g_assert_cmpfloat_with_epsilon (dip->depth_ppm, other->depth_ppm, 0.1 * other->depth_sigma_ppm);
      ant_scan_free (borderless);
    }
}

/* Swings with the orbit, eight times as deep as the dip: lost without the line, recovered with it. */
static void
a_dip_under_orbit_swings_is_recovered_with_a_line (Fixture *f, gconstpointer data)
{
  static const Planted planted = { 10.4, 7, 20, 0.3, 300 };
  double period_d = 96 / ANT_MINUTES_PER_DAY, swing_ppm = 8 * planted.depth_ppm / 2; /* peak to peak */
  lay (f, 'A', ANT_MASK_LOW_ORBIT, 24, 120, 9105, 1, &planted);
  for (size_t i = 0; i < f->series.n; i++)
    {
      double phase = ANT_TAU * (double) i * f->series.step_d / period_d;
      f->value[i] += (float) (swing_ppm * (sin (phase) + 0.3 * sin (2 * phase + 1)));
    }
  f->options.n_lines = 1;
  f->options.line[0] = (AntNoiseLine){ period_d, 3 };
  f->scan = scan_all (&f->series, &f->options);
  check_listed_once (f, &planted, 30, 3);
}

/* Two candidates that climb to one dip, or a dip longer than any template, are one line. */
static void
listed_dips_keep_their_distance (Fixture *f, gconstpointer data)
{
  static const Planted planted[] = { { 7, 14.5, 20, 0.3, 700 }, { 12, 3, 60, 0.3, 600 }, { 16, 0.8, 10, 0.3, 1500 } };
  lay (f, 'C', ANT_MASK_L1, 20, 120, 9106, 3, planted);
  f->scan = scan_all (&f->series, &f->options);
  const AntDip *dip;
  size_t n = ant_scan_dips (f->scan, &dip);
  g_assert_cmpuint (n, ==, 3);
  for (size_t i = 0; i < n; i++)
    {
      g_assert_cmpfloat_with_epsilon (dip[i].mid_d, planted[i].mid_d, 20 / ANT_MINUTES_PER_DAY);
      g_assert_cmpfloat (dip[i].snr, >=, ant_scan_threshold (f->scan));
      g_assert_cmpfloat_with_epsilon (dip[i].expected_false, ant_scan_expected_false (f->scan, dip[i].snr), 1e-12);
    }
}

static void
fewer_false_alarms_a_year_ask_for_a_higher_threshold (Fixture *f, gconstpointer data)
{
  double threshold[3];
  lay (f, 'C', ANT_MASK_L1, 12, 300, 9107, 0, NULL);
  for (int k = 0; k < 3; k++)
    {
      AntScanOptions options = f->options;
      options.false_alarms_per_year = pow (10, 1 - k);
      AntScan *scan = scan_all (&f->series, &options);
      threshold[k] = ant_scan_threshold (scan);
      double observed_d = (double) ant_series_observed (&f->series, 0) * f->series.step_d;
      g_assert_cmpfloat_with_epsilon (ant_scan_expected_false (scan, threshold[k]) / (options.false_alarms_per_year * observed_d / 365.25),
                                      1, 1e-6);
      ant_scan_free (scan);
    }
  g_assert_cmpfloat (threshold[0], <, threshold[1]);
  g_assert_cmpfloat (threshold[1], <, threshold[2]);
}

/* An isolated outlier is left out of the fits and told, and still searched. */
static void
spikes_are_told_and_still_searched (Fixture *f, gconstpointer data)
{
  lay (f, 'C', ANT_MASK_L1, 12, 300, 9108, 0, NULL);
  size_t place = 1700;
  while (isnan (f->value[place - 1]) || isnan (f->value[place]) || isnan (f->value[place + 1]))
    place++;
  f->value[place] -= 3000;
  f->scan = scan_all (&f->series, &f->options);
  g_assert_cmpint (ant_scan_spikes (f->scan)[place], ==, ANT_SPIKE_FOUND);
  const AntDip *dip;
  size_t count, n = ant_scan_dips (f->scan, &dip);
  g_assert_nonnull (nearest_dip (n, dip, (double) place * f->series.step_d, 0.02, &count));
  g_assert_cmpuint (count, ==, 1);
}

static void
a_record_too_bare_to_fit_is_refused (Fixture *f, gconstpointer data)
{
  AntStatus status;
  lay (f, 'C', ANT_MASK_L1, 12, 300, 9109, 0, NULL);
  for (size_t i = 15; i < f->series.n; i++)
    f->value[i] = NAN;
  f->scan = ant_scan_new (&f->series, &f->options, &status);
  g_assert_nonnull (f->scan);
  g_assert_cmpint (ant_scan_stages ()->run_slice (f->scan, 0, 0), ==, ANT_NO_DATA);
}

/* Once the one slice of a stage has run, its own count says that about all is done, before anyone else can. */
static void
a_slice_tells_how_far_it_is (Fixture *f, gconstpointer data)
{
  AntStatus status;
  const AntStages *stages = ant_scan_stages ();
  lay (f, 'C', ANT_MASK_L1, 12, 300, 9110, 0, NULL);
  f->scan = ant_scan_new (&f->series, &f->options, &status);
  for (size_t stage = 0; stage < 2; stage++)
    {
      g_assert_cmpuint (stages->count (f->scan, stage), ==, 1);
      g_assert_cmpfloat (stages->part (f->scan, stage), ==, 0);
      g_assert_cmpint (stages->run_slice (f->scan, stage, 0), ==, ANT_OK);
      double part = stages->part (f->scan, stage);
      g_test_message ("stage %zu: %.2f", stage, part);
      g_assert_cmpfloat (part, >, 0.2);
      g_assert_cmpfloat (part, <, 0.95);
      g_assert_cmpint (stages->finish (f->scan, stage), ==, ANT_OK);
    }
}

/* A scan whose first stages alone were finished; NULL fails the test. */
static AntScan *
scan_up_to (const AntSeries *series, const AntScanOptions *options, size_t n_stages)
{
  AntStatus status;
  const AntStages *stages = ant_scan_stages ();
  AntScan *scan = ant_scan_new (series, options, &status);
  g_assert_nonnull (scan);
  for (size_t stage = 0; stage < n_stages; stage++)
    {
      size_t count = stages->count (scan, stage);
      for (size_t i = 0; i < count; i++)
        g_assert_cmpint (stages->run_slice (scan, stage, i), ==, ANT_OK);
      g_assert_cmpint (stages->finish (scan, stage), ==, ANT_OK);
    }
  return scan;
}

static void
a_stopped_scan_tells_what_its_finished_stages_found (Fixture *f, gconstpointer data)
{
  static const Planted planted[] = { { 6, 8, 20, 0.3, 1500 }, { 14, 6, 20, 0.3, 200 } };
  const AntDip *whole, *part;
  lay (f, 'C', ANT_MASK_L1, 20, 300, 9110, 2, planted);
  f->scan = scan_all (&f->series, &f->options);
  size_t n_stages = ant_scan_stages ()->n_stages, n_whole = ant_scan_dips (f->scan, &whole);
  g_assert_cmpuint (n_whole, ==, 2);
  g_assert_cmpint (ant_scan_reach (f->scan), ==, ANT_SCAN_COMPLETE);
  AntScanReach last = ANT_SCAN_NOTHING;
  for (size_t stages = 0; stages < n_stages; stages++)
    {
      AntScan *scan = scan_up_to (&f->series, &f->options, stages);
      AntScanReach reach = ant_scan_reach (scan);
      g_assert_cmpint (ant_scan_conclude (scan), ==, reach == ANT_SCAN_NOTHING ? ANT_NO_DATA : ANT_OK);
      g_assert_cmpint (reach, >=, last);
      g_assert_cmpint (reach, <, ANT_SCAN_COMPLETE);
      g_assert_null (ant_scan_slow (scan));
      size_t n = ant_scan_dips (scan, &part), expected = reach == ANT_SCAN_NOTHING ? 0 : reach == ANT_SCAN_NOISE ? 1 : 2;
      g_assert_cmpuint (n, ==, expected);
      if (n > 0)
        g_assert_cmpfloat (ant_scan_threshold (scan), ==, ant_scan_threshold (f->scan));
      for (size_t i = 0; i < n; i++)
        g_assert_cmpfloat_with_epsilon (part[i].depth_ppm, whole[i].depth_ppm,
                                        reach == ANT_SCAN_DIPS ? 1e-9 : whole[i].depth_sigma_ppm);
      last = reach;
      ant_scan_free (scan);
    }
  g_assert_cmpint (last, ==, ANT_SCAN_DIPS);
}

static void
a_scan_stopped_among_its_surrogates_keeps_the_built_in_law (Fixture *f, gconstpointer data)
{
  size_t n_events;
  lay (f, 'C', ANT_MASK_L1, 12, 600, 9111, 0, NULL);
  f->scan = scan_all (&f->series, &f->options);
  f->options.surrogates = 2;
  AntScan *stopped = scan_up_to (&f->series, &f->options, 2);
  g_assert_cmpint (ant_scan_stages ()->run_slice (stopped, 2, 0), ==, ANT_OK);
  g_assert_cmpint (ant_scan_conclude (stopped), ==, ANT_OK);
  g_assert_cmpuint (ant_scan_surrogates (stopped, &n_events), ==, 0);
  g_assert_cmpuint (n_events, ==, 0);
  g_assert_cmpfloat (ant_scan_threshold (stopped), ==, ant_scan_threshold (f->scan));
  ant_scan_free (stopped);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, function) g_test_add ("/search/scan/" path, Fixture, NULL, set_up, function, tear_down)
  TEST ("a-crossing-seen-from-a-low-orbit-is-found", a_crossing_seen_from_a_low_orbit_is_found);
  TEST ("a-mirrored-record-gives-the-mirrored-lists", a_mirrored_record_gives_the_mirrored_lists);
  TEST ("a-weak-dip-beside-a-strong-one-is-found", a_weak_dip_beside_a_strong_one_is_found);
  TEST ("dips-on-borders-are-listed-once-and-measured-as-without-a-border",
        dips_on_borders_are_listed_once_and_measured_as_without_a_border);
  TEST ("a-dip-under-orbit-swings-is-recovered-with-a-line", a_dip_under_orbit_swings_is_recovered_with_a_line);
  TEST ("listed-dips-keep-their-distance", listed_dips_keep_their_distance);
  TEST ("fewer-false-alarms-a-year-ask-for-a-higher-threshold", fewer_false_alarms_a_year_ask_for_a_higher_threshold);
  TEST ("spikes-are-told-and-still-searched", spikes_are_told_and_still_searched);
  TEST ("a-slice-tells-how-far-it-is", a_slice_tells_how_far_it_is);
  TEST ("a-record-too-bare-to-fit-is-refused", a_record_too_bare_to_fit_is_refused);
  TEST ("a-stopped-one-tells-what-its-finished-stages-found", a_stopped_scan_tells_what_its_finished_stages_found);
  TEST ("one-stopped-among-its-surrogates-keeps-the-built-in-law", a_scan_stopped_among_its_surrogates_keeps_the_built_in_law);
  return g_test_run ();
}
