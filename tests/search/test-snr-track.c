/* test-snr-track.c - the dip SNR against time: what the dip map says place by place, one chunk after another. */
#include "search/snr-track.h"
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
  AntSnrTrack *track;
} Fixture;

static void
set_up (Fixture *f, gconstpointer data)
{
  f->options = (AntScanOptions) ANT_SCAN_OPTIONS_INIT;
}

static void
tear_down (Fixture *f, gconstpointer data)
{
  ant_snr_track_free (f->track);
  ant_scan_free (f->scan);
  g_free (f->value);
}

static void
lay (Fixture *f, double days, double step_s, size_t n, const Planted *planted)
{
  size_t places = (size_t) (days * ANT_SECONDS_PER_DAY / step_s);
  f->value = g_new (float, places);
  f->series = ant_study_record ('C', ANT_MASK_L1, places, step_s / ANT_SECONDS_PER_DAY, 4401, f->value);
  for (size_t i = 0; i < n; i++)
    plant (&f->series, &planted[i], f->value);
}

static const float *
follow (Fixture *f, double duration_h)
{
  AntStatus status;
  const AntChunk *chunk;
  size_t n = ant_scan_chunks (f->scan, &chunk);
  const AntStages *stages = ant_snr_track_stages ();
  f->track = ant_snr_track_new (&f->series, &f->options.bank, f->options.least_coverage, duration_h / 24, n, chunk, &status);
  g_assert_cmpint (status, ==, ANT_OK);
  g_assert_cmpuint (stages->count (f->track, 0), ==, n);
  for (size_t i = n; i-- > 0;) /* in any order */
    g_assert_cmpint (stages->run_slice (f->track, 0, i), ==, ANT_OK);
  g_assert_cmpint (stages->finish (f->track, 0), ==, ANT_OK);
  return ant_snr_track_snr (f->track);
}

static void
a_dip_peaks_at_its_middle_with_its_snr (Fixture *f, gconstpointer data)
{
  static const Planted planted = { 9.3, 7, 20, 0.3, 300 };
  const AntDip *dip;
  lay (f, 20, 120, 1, &planted);
  f->scan = scan_all (&f->series, &f->options);
  g_assert_cmpuint (ant_scan_dips (f->scan, &dip), ==, 1);
  const float *snr = follow (f, dip->duration_d * 24);
  size_t best = 0;
  for (size_t p = 0; p < f->series.n; p++)
    if (!isnan (snr[p]) && !(snr[p] <= snr[best]))
      best = p;
  g_assert_cmpfloat_with_epsilon (ant_series_time (&f->series, (double) best), dip->mid_d, 20 / ANT_MINUTES_PER_DAY);
  g_assert_cmpfloat_with_epsilon ((double) snr[best], dip->snr, 0.05 * dip->snr);
}

/* Between dips the SNR of noise has a spread of 1, over the borders of chunks too. */
static void
noise_has_a_spread_of_one_in_every_chunk (Fixture *f, gconstpointer data)
{
  const AntChunk *chunk;
  lay (f, 200, 1800, 0, NULL);
  f->options.chunk.length_d = 60;
  f->scan = scan_all (&f->series, &f->options);
  size_t n_chunks = ant_scan_chunks (f->scan, &chunk);
  g_assert_cmpuint (n_chunks, >, 2);
  const float *snr = follow (f, 4);
  for (size_t i = 0; i < n_chunks; i++)
    {
      double sum = 0, n = 0, from = fmax (ceil (chunk[i].own_from), 0), to = fmin (chunk[i].own_to, (double) f->series.n);
      for (size_t p = (size_t) from; (double) p < to; p++)
        if (!isnan (snr[p]))
          {
            sum += (double) (snr[p] * snr[p]);
            n++;
          }
      g_test_message ("chunk %zu: %.3f over %.0f places", i, sqrt (sum / n), n);
      g_assert_cmpfloat (n, >, 0.8 * (to - from));
      g_assert_cmpfloat_with_epsilon (sqrt (sum / n), 1, 0.2);
    }
}

static void
nothing_is_told_in_the_middle_of_a_gap (Fixture *f, gconstpointer data)
{
  lay (f, 12, 300, 0, NULL);
  size_t from = 1500, to = 2000; /* 1.7 d */
  for (size_t p = from; p < to; p++)
    f->value[p] = NAN;
  f->scan = scan_all (&f->series, &f->options);
  const float *snr = follow (f, 6);
  g_assert_true (isnan (snr[(from + to) / 2]));
  g_assert_true (isnan (snr[from + 36])); /* 3 h from the edge: all of the dip is in the gap */
  g_assert_false (isnan (snr[from - 40]));
  g_assert_false (isnan (snr[to + 40]));
}

static void
a_stop_ends_it_soon (Fixture *f, gconstpointer data)
{
  lay (f, 12, 300, 0, NULL);
  f->scan = scan_all (&f->series, &f->options);
  follow (f, 6);
  ant_stop_ask (ant_snr_track_stages ()->stop (f->track));
  g_assert_cmpint (ant_snr_track_stages ()->run_slice (f->track, 0, 0), ==, ANT_STOPPED);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, function) g_test_add ("/search/snr-track/" path, Fixture, NULL, set_up, function, tear_down)
  TEST ("a-dip-peaks-at-its-middle-with-its-snr", a_dip_peaks_at_its_middle_with_its_snr);
  TEST ("noise-has-a-spread-of-one-in-every-chunk", noise_has_a_spread_of_one_in_every_chunk);
  TEST ("nothing-is-told-in-the-middle-of-a-gap", nothing_is_told_in_the_middle_of_a_gap);
  TEST ("a-stop-ends-it-soon", a_stop_ends_it_soon);
  return g_test_run ();
}
