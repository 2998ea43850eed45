/* study-chance.c - how many dips of each final SNR noise alone shows when records of it go through the whole search.
 * Arguments: model (A, B, C), mask (l1, low-orbit), days, cadence in seconds, records, seed, and either the lowest SNR
 * or, with a leading =, how many dips of one sign the law is to expect in all records together: it then sets the threshold.
 * Prints one line per event (sign, first and final SNR) and one of totals; docs/search.md says how the law's constants follow. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include "jobs/pool.h"
#include "models.h"
#include "search/scan.h"

int
main (int argc, char **argv)
{
  if (argc < 8)
    return 2;
  AntMask mask = strcmp (argv[2], "l1") ? ANT_MASK_LOW_ORBIT : ANT_MASK_L1;
  double days = atof (argv[3]), step_d = atof (argv[4]) / 86400;
  size_t records = (size_t) atol (argv[5]), n = (size_t) (days / step_d);
  unsigned long seed = strtoul (argv[6], NULL, 10);
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  int by_law = argv[7][0] == '=';
  double expected = by_law ? atof (argv[7] + 1) : 0;
  options.threshold_snr = by_law ? 0 : atof (argv[7]);
  float *value = malloc (n * sizeof *value);
  double crossings = 0, observed_d = 0;
  size_t listed[2] = { 0, 0 };
  for (size_t i = 0; i < records; i++)
    {
      AntStatus status;
      AntSeries series = ant_study_record (argv[1][0], mask, n, step_d, seed + i, value);
      options.false_alarms_per_year = expected / (double) records * 365.25 / ((double) ant_series_observed (&series, 0) * step_d);
      AntScan *scan = ant_scan_new (&series, &options, &status);
      if (scan)
        status = ant_pool_run (ant_scan_stages (), scan, 0, NULL, NULL, NULL);
      if (status)
        {
          fprintf (stderr, "record %zu: %s\n", i, ant_status_text (status));
          return 1;
        }
      AntChanceField field = ant_scan_chance_field (scan);
      crossings += field.crossings;
      observed_d += field.observed_d;
      const AntDip *dip;
      for (int sign = 1; sign >= -1; sign -= 2)
        for (size_t k = sign > 0 ? ant_scan_dips (scan, &dip) : ant_scan_brightenings (scan, &dip); k-- > 0; listed[sign > 0]++)
          printf ("%+d %.3f %.3f %.2f %.1f\n", sign, fabs (dip[k].first_snr), fabs (dip[k].snr), dip[k].duration_d * 24,
                  dip[k].edge_d * 1440);
      ant_scan_free (scan);
      fflush (stdout);
    }
  printf ("total %s %s %g d: %zu records, %.1f observed days, %.1f crossings; %zu dips and %zu brightenings listed\n", argv[1],
          argv[2], days, records, observed_d, crossings, listed[1], listed[0]);
  free (value);
  return 0;
}
