/* study-spread.c - the spread of the dip SNR over noise-only records, fit and all: 1 if the significances are right.
 * Arguments: model, mask, days, cadence in seconds, records, seed, spots (0 or 1). Prints for each duration the pooled standard deviation, the
 * mean, and how many independent-looking peaks pass 4, as against a Gaussian of the same number of trials. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include "jobs/pool.h"
#include "models.h"
#include "noise/whitener.h"
#include "search/scan-private.h"
#include "spotted.h"

#define MOST 64

int
main (int argc, char **argv)
{
  if (argc < 8)
    return 2;
  AntMask mask = strcmp (argv[2], "l1") ? ANT_MASK_LOW_ORBIT : ANT_MASK_L1;
  double step_d = atof (argv[4]) / 86400;
  size_t n = (size_t) (atof (argv[3]) / step_d), records = (size_t) atol (argv[5]), points = 0;
  unsigned long seed = strtoul (argv[6], NULL, 10);
  double squares[MOST] = { 0 }, sums[MOST] = { 0 }, starts[MOST] = { 0 }, above[MOST] = { 0 }, duration_h[MOST] = { 0 };
  float *value = malloc (n * sizeof *value);
  double *z = malloc (n * sizeof *z);
  for (size_t r = 0; r < records; r++)
    {
      AntStatus status;
      AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
      AntSeries series = ant_study_record (argv[1][0], mask, n, step_d, seed + r, value);
      if (atoi (argv[7]))
        ant_study_add_spots (n, step_d, seed + r, value);
      AntScan *scan = ant_scan_new (&series, &options, &status);
      if (!scan || ant_scan_learn_noise (scan))
        return 1;
      AntWhitener *whitener = ant_whitener_new_free_level (&scan->start, &series, &status);
      if (!whitener || ant_whitener_solve (whitener, value, z))
        return 1;
      AntDipMap *map = ant_dip_map_new (scan->bank, whitener, z, options.least_coverage, NULL, &status);
      const AntFamily *family = &scan->bank->family[0];
      for (size_t i = 0; i < map->family[0].n_starts * family->n_members; i++)
        {
          size_t m = i % family->n_members;
          double snr = (double) map->family[0].snr[i];
          if (isnan (map->family[0].sigma_ppm[i]) || m >= MOST || !family->member[m].length)
            continue;
          points = m + 1 > points ? m + 1 : points;
          duration_h[m] = family->member[m].duration_d * 24;
          squares[m] += snr * snr;
          sums[m] += snr;
          starts[m]++;
          above[m] += fabs (snr) > 4;
        }
      ant_dip_map_free (map);
      ant_whitener_free (whitener);
      ant_scan_free (scan);
    }
  double all_above = 0, all_starts = 0;
  printf ("%s %s, %zu records of %s d%s:", argv[1], argv[2], records, argv[3], atoi (argv[7]) ? " with spots" : "");
  for (size_t m = 0; m < points; m++)
    {
      all_above += above[m];
      all_starts += starts[m];
      if (m % 5 == 0 || duration_h[m] == 1 || duration_h[m] == 2 || duration_h[m] == 4 || duration_h[m] == 9)
        printf (" %.1f h %.3f (%+.3f)", duration_h[m], sqrt (squares[m] / starts[m]), sums[m] / starts[m]);
    }
  printf ("; |SNR| > 4 in %.0f of %.0f, a Gaussian would have %.0f\n", all_above, all_starts, all_starts * erfc (4 / sqrt (2)));
  return 0;
}
