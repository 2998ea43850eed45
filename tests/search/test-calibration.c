/* test-calibration.c - a quick study: on records of noise alone the dip SNR has mean 0 and standard deviation 1. */
#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "models.h"
#include "planting.h"

#define DAYS 30
#define RECORDS 10

typedef struct
{
  char model;
  AntMask mask;
  double step_s;
  unsigned long seed;
} Kind;

static const Kind kinds[] = { { 'A', ANT_MASK_L1, 120, 11000 }, { 'A', ANT_MASK_LOW_ORBIT, 120, 12000 },
                              { 'C', ANT_MASK_L1, 120, 13000 }, { 'C', ANT_MASK_LOW_ORBIT, 120, 14000 } };
static const double durations_h[] = { 0.5, 4, 13 };

typedef struct
{
  double starts, sum, squares;
} Pooled;

static void
add_record (const Kind *kind, unsigned long i, float *value, Pooled pooled[3], double *observed_d)
{
  size_t n = (size_t) (DAYS * ANT_SECONDS_PER_DAY / kind->step_s);
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  const AntChunk *chunk;
  options.threshold_snr = 7; /* nothing of noise reaches it: no time goes into weighing */
  AntSeries series = ant_study_record (kind->model, kind->mask, n, kind->step_s / ANT_SECONDS_PER_DAY, kind->seed + i, value);
  AntScan *scan = scan_all (&series, &options);
  *observed_d += (double) ant_series_observed (&series, 0) * series.step_d;
  for (size_t c = ant_scan_chunks (scan, &chunk); c-- > 0;)
    for (size_t p = 0; p < chunk[c].n_floor; p++)
      for (int d = 0; d < 3; d++)
        if (fabs (chunk[c].floor[p].duration_d * ANT_HOURS_PER_DAY - durations_h[d]) < 1e-6)
          {
            const AntFloorPoint *point = &chunk[c].floor[p];
            pooled[d].starts += (double) point->starts;
            pooled[d].sum += (double) point->starts * point->snr_mean;
            pooled[d].squares += (double) point->starts * point->snr_sd * point->snr_sd;
          }
  ant_scan_free (scan);
}

/* The bar for the deviation is 5 %. The SNR of one template is correlated over about its own
 * length T: over L of data its mean is known to sqrt(T/L) and its standard deviation to sqrt(T/(3 L)), the correlation being
 * about 1 - lag/T. */
static void
snr_has_mean_0_and_deviation_1 (gconstpointer data)
{
  const Kind *kind = data;
  Pooled pooled[3] = { { 0, 0, 0 } };
  double observed_d = 0;
  float *value = g_new (float, (size_t) (DAYS * ANT_SECONDS_PER_DAY / kind->step_s));
  for (unsigned long i = 0; i < RECORDS; i++)
    add_record (kind, i, value, pooled, &observed_d);
  g_free (value);
  for (int d = 0; d < 3; d++)
    {
      double mean = pooled[d].sum / pooled[d].starts, deviation = sqrt (pooled[d].squares / pooled[d].starts);
      double known = sqrt (durations_h[d] / ANT_HOURS_PER_DAY / observed_d);
      g_test_message ("%g h: mean %+.3f (known to %.3f), standard deviation %.3f (known to %.3f)", durations_h[d], mean, known,
                      deviation, known / sqrt (3));
    }
  for (int d = 0; d < 3; d++)
    {
      double known = sqrt (durations_h[d] / ANT_HOURS_PER_DAY / observed_d);
      g_assert_cmpfloat_with_epsilon (pooled[d].sum / pooled[d].starts, 0, 3 * known);
      g_assert_cmpfloat_with_epsilon (sqrt (pooled[d].squares / pooled[d].starts), 1, 0.05);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, kind) g_test_add_data_func ("/search/calibration/snr-has-mean-0-and-deviation-1/" path, kind, snr_has_mean_0_and_deviation_1)
  TEST ("solar-noise-from-l1", &kinds[0]);
  TEST ("solar-noise-from-a-low-orbit", &kinds[1]);
  TEST ("loud-instrument-from-l1", &kinds[2]);
  TEST ("loud-instrument-from-a-low-orbit", &kinds[3]);
  return g_test_run ();
}
