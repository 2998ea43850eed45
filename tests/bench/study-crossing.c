/* study-crossing.c - what the measurement of a predicted crossing is worth where a blind search sees nothing: Mercury of 2019-11-11
 * at a stated ideal SNR in many records. Arguments: model, mask, days, cadence in seconds, records, seed, ideal SNR, and every how
 * many records are searched too (0: none). Prints the bias of the depth and its error, the scatter over the formal error, and how
 * often the blind search lists the crossing. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include "jobs/pool.h"
#include "mercury.h"
#include "models.h"
#include "search/scan.h"

#define ROOM 100000

typedef struct
{
  double bias, bias_squares, pull, pull_squares;
  size_t measured, searched, listed;
} Sums;

/* Whether a blind search lists a dip that overlaps the crossing. */
static int
is_listed (const AntSeries *series, double mid_d, double length_d)
{
  AntStatus status;
  const AntDip *dip;
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  AntScan *scan = ant_scan_new (series, &options, &status);
  if (!scan || ant_pool_run (ant_scan_stages (), scan, 1, NULL, NULL, NULL))
    exit (1);
  size_t n = ant_scan_dips (scan, &dip);
  int listed = 0;
  for (size_t i = 0; i < n; i++)
    listed |= fabs (dip[i].mid_d - mid_d) < 0.5 * length_d;
  ant_scan_free (scan);
  return listed;
}

static void
try_record (char model, AntSeries *series, float *value, double snr, int search, double *loss, Sums *sums)
{
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  AntAmplitude found;
  ptrdiff_t first;
  double mid_d = ant_series_time (series, 0.5 * (double) series->n + 0.31);
  size_t n = ant_study_mercury (series, mid_d, &first, ROOM, loss);
  double depth_ppm = ant_study_depth_of_snr (model, series, first, n, loss, snr);
  for (size_t i = 0; i < n; i++)
    value[(size_t) first + i] -= (float) (depth_ppm * loss[i]);
  AntStatus status = ant_scan_asked_shape (series, &options, first, n, loss, &found);
  if (status == ANT_NO_DATA) /* the mask's gap fell on it */
    return;
  if (status)
    exit (1);
  double bias = found.depth_ppm / depth_ppm - 1, pull = (found.depth_ppm - depth_ppm) / found.sigma_ppm;
  sums->bias += bias;
  sums->bias_squares += bias * bias;
  sums->pull += pull;
  sums->pull_squares += pull * pull;
  sums->measured++;
  sums->searched += search;
  sums->listed += search && is_listed (series, mid_d, (double) n * series->step_d);
}

int
main (int argc, char **argv)
{
  if (argc < 9)
    return 2;
  AntMask mask = strcmp (argv[2], "l1") ? ANT_MASK_LOW_ORBIT : ANT_MASK_L1;
  double step_d = atof (argv[4]) / 86400, snr = atof (argv[7]);
  size_t n = (size_t) (atof (argv[3]) / step_d), records = (size_t) atol (argv[5]), every = (size_t) atol (argv[8]);
  unsigned long seed = strtoul (argv[6], NULL, 10);
  float *value = malloc (n * sizeof *value);
  double *loss = malloc (ROOM * sizeof *loss);
  Sums sums = { 0 };
  for (size_t r = 0; sums.measured < records && r < 2 * records; r++)
    {
      AntSeries series = ant_study_record (argv[1][0], mask, n, step_d, seed + r, value);
      try_record (argv[1][0], &series, value, snr, every && r % every == 0, loss, &sums);
    }
  double count = (double) sums.measured, bias = sums.bias / count, pull = sums.pull / count;
  printf ("%s %s, ideal SNR %s in %zu records of %s d: bias %+.2f %% +- %.2f, scatter/formal %.3f +- %.3f, listed %zu of %zu\n", argv[1],
          argv[2], argv[7], sums.measured, argv[3], 100 * bias, 100 * sqrt ((sums.bias_squares / count - bias * bias) / count),
          sqrt (sums.pull_squares / count - pull * pull), 1 / sqrt (2 * count), sums.listed, sums.searched);
  free (value);
  free (loss);
  return 0;
}
