/* study-depth.c - crossings planted at known epochs, masked while the noise is fitted, and measured: pull, scatter, bias.
 * Arguments: model, mask, days, cadence in seconds, records, seed, dips per record, T14 in hours, depth in ppm, impact, ingress in minutes,
 * and, if wanted, 1 for spots of 3000 ppm rotating past.
 * Every dip is measured twice, the others taken out: with the planted shape, and with the bank's wide template of the same
 * length. The paired bias compares the same noise with and without the dip. Prints one summary line. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include "jobs/pool.h"
#include "models.h"
#include "noise/whitener.h"
#include "search/scan-private.h"
#include "spotted.h"

typedef struct
{
  size_t n;
  double sum, squares;
} Mean;

static void
mean_add (Mean *mean, double value)
{
  mean->n++;
  mean->sum += value;
  mean->squares += value * value;
}

static double mean_of (const Mean *mean) { return mean->sum / (double) mean->n; }

static double
spread_of (const Mean *mean)
{
  return sqrt (mean->squares / (double) mean->n - mean_of (mean) * mean_of (mean));
}

/* Fit the noise of a record with every dip masked, and whiten the record and its noise alone under it. */
static AntWhitener *
whiten (AntScan *scan, AntSeries *series, size_t dips, const double *centre, double t14_d, AntStatus *status)
{
  for (size_t k = 0; k < dips; k++)
    ant_scan_mask (scan, centre[k], t14_d, 0, series->n, scan->spike);
  scan->series.spike = scan->spike;
  *status = ant_scan_learn_noise (scan);
  return *status ? NULL : ant_whitener_new_free_level (&scan->start, series, status);
}

int
main (int argc, char **argv)
{
  if (argc < 12)
    return 2;
  AntMask mask = strcmp (argv[2], "l1") ? ANT_MASK_LOW_ORBIT : ANT_MASK_L1;
  double step_d = atof (argv[4]) / 86400, t14_d = atof (argv[8]) / 24, depth = atof (argv[9]);
  double impact = atof (argv[10]), edge_d = atof (argv[11]) / 1440;
  size_t n = (size_t) (atof (argv[3]) / step_d), records = (size_t) atol (argv[5]), dips = (size_t) atol (argv[7]);
  float *noise = malloc (n * sizeof *noise), *value = malloc (n * sizeof *value);
  double *z = malloc (n * sizeof *z), *z_noise = malloc (n * sizeof *z), *centre = malloc (dips * sizeof *centre);
  Mean pull = { 0 }, paired = { 0 }, generic = { 0 }, sigma = { 0 };
  for (size_t r = 0; r < records; r++)
    {
      AntStatus status;
      AntRandom random;
      AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
      AntSeries series = ant_study_record (argv[1][0], mask, n, step_d, strtoul (argv[6], NULL, 10) + r, noise);
      ant_random_seed (&random, strtoul (argv[6], NULL, 10) + r, 55);
      if (argc > 12 && atoi (argv[12]))
        ant_study_add_spots (n, step_d, strtoul (argv[6], NULL, 10) + r, noise);
      AntScan *scan = ant_scan_new (&series, &options, &status);
      memcpy (value, noise, n * sizeof *value);
      AntShapeFit fit = { .duration_d = t14_d, .edge_d = edge_d, .impact = impact };
      for (size_t k = 0; k < dips && scan; k++)
        {
          fit.centre = centre[k] = (double) n * ((double) k + 0.3 + 0.4 * ant_random_uniform (&random)) / (double) dips;
          ant_scan_add_shape (scan, &fit, -depth, 0, n, value);
        }
      series.value_ppm = value;
      if (scan)
        scan->series.value_ppm = value;
      AntWhitener *whitener = scan ? whiten (scan, &series, dips, centre, t14_d, &status) : NULL;
      if (!whitener)
        return 1;
      ant_whitener_solve (whitener, noise, z_noise);
      for (size_t k = 0; k < dips; k++)
        {
          AntShapeFit with = fit, without = fit, wide = fit, wide_without = fit;
          with.centre = without.centre = wide.centre = wide_without.centre = centre[k];
          wide.edge_d = wide_without.edge_d = fmin (1.0 / 72, 0.4 * t14_d);
          wide.impact = wide_without.impact = ANT_SHAPE_IMPACT;
          memcpy (value, noise, n * sizeof *value);
          ant_scan_add_shape (scan, &with, -depth, 0, n, value);
          ant_whitener_solve (whitener, value, z);
          if (ant_measure (whitener, z, &scan->refine, &with) || with.coverage < 0.5)
            continue;
          ant_measure (whitener, z_noise, &scan->refine, &without);
          ant_measure (whitener, z, &scan->refine, &wide);
          ant_measure (whitener, z_noise, &scan->refine, &wide_without);
          mean_add (&pull, (with.depth_ppm - depth) / with.sigma_ppm);
          mean_add (&paired, (with.depth_ppm - without.depth_ppm) / depth - 1);
          mean_add (&generic, (wide.depth_ppm - wide_without.depth_ppm) / depth - 1);
          mean_add (&sigma, with.sigma_ppm);
        }
      ant_whitener_free (whitener);
      ant_scan_free (scan);
    }
  double root = sqrt ((double) pull.n);
  printf ("%s %s T14 %s h, %s ppm, b %s, ingress %s min: %zu dips, sigma %.1f ppm, pull %+.3f +- %.3f, scatter/formal %.3f +- %.3f, "
          "paired bias %+.2f %% matched, %+.2f %% wide template\n", argv[1], argv[2], argv[8], argv[9], argv[10], argv[11], pull.n,
          mean_of (&sigma), mean_of (&pull), spread_of (&pull) / root, spread_of (&pull), spread_of (&pull) / root / sqrt (2),
          100 * mean_of (&paired), 100 * mean_of (&generic));
  return 0;
}
