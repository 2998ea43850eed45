/* study-recovery.c - crossings planted in noise and sent through the whole search: found or not, SNR against that of the
 * true shape under the true noise, depth against the planted one.
 * Arguments: model, mask, days, cadence in seconds, records, seed, dips per record, ideal SNR, least and greatest impact,
 * least and greatest ingress in minutes, and, if wanted, T14 in hours (else 2 to 12.5 at random). One line per dip: found SNR true-shape-SNR depth planted sigma T14 true-T14 time error. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include "core/robust.h"
#include "jobs/pool.h"
#include "models.h"
#include "noise/whitener.h"
#include "search/scan.h"

typedef struct
{
  AntCrossingShape shape;
  double centre, depth_ppm, snr;
} Planted;

static double
between (AntRandom *random, double low, double high)
{
  return low + (high - low) * ant_random_uniform (random);
}

/* The planted shape's own amplitude and SNR on the data under the true noise. */
static void
truth (const AntWhitener *whitener, const double *z, double step_d, Planted *planted, double *ideal_per_ppm)
{
  AntShapeFit fit = { .centre = planted->centre, .duration_d = planted->shape.duration_d,
                      .edge_d = planted->shape.edge_d, .impact = planted->shape.impact };
  AntRefineOptions options = { .step_d = step_d, .exposure_d = step_d, .limb_darkening = ANT_LIMB_DARKENING_SUN };
  ant_measure (whitener, z, &options, &fit);
  planted->snr = fit.snr;
  *ideal_per_ppm = 1 / fit.sigma_ppm;
}

static void
add_shape (const Planted *planted, double step_d, size_t n, float *value)
{
  for (size_t i = 0; i < n; i++)
    value[i] -= (float) (planted->depth_ppm
                         * ant_crossing_shape_mean (&planted->shape, ((double) i - planted->centre) * step_d, step_d));
}

int
main (int argc, char **argv)
{
  if (argc < 13)
    return 2;
  AntMask mask = strcmp (argv[2], "l1") ? ANT_MASK_LOW_ORBIT : ANT_MASK_L1;
  double days = atof (argv[3]), step_d = atof (argv[4]) / 86400, ideal = atof (argv[8]);
  size_t records = (size_t) atol (argv[5]), n = (size_t) (days / step_d), dips = (size_t) atol (argv[7]);
  unsigned long seed = strtoul (argv[6], NULL, 10);
  AntScanOptions options = ANT_SCAN_OPTIONS_INIT;
  options.threshold_snr = fmin (5.5, 0.75 * ideal);
  float *value = malloc (n * sizeof *value);
  double *z = malloc (n * sizeof *z), *ratio = malloc (records * dips * sizeof *ratio);
  size_t found = 0, planted_count = 0;
  for (size_t r = 0; r < records; r++)
    {
      AntStatus status;
      AntNoiseModel model;
      AntRandom random;
      Planted planted[64];
      AntSeries series = ant_study_record (argv[1][0], mask, n, step_d, seed + r, value);
      ant_random_seed (&random, seed + r, 99);
      ant_study_model (argv[1][0], &model);
      AntWhitener *whitener = ant_whitener_new (&model, &series, &status);
      for (size_t k = 0; k < dips; k++)
        {
          double per_ppm, t14_d = (argc > 13 ? atof (argv[13]) : between (&random, 2, 12.5)) / 24;
          ant_crossing_shape_init (&planted[k].shape, t14_d, between (&random, atof (argv[11]), atof (argv[12])) / 1440,
                                   between (&random, atof (argv[9]), atof (argv[10])), ANT_LIMB_DARKENING_SUN);
          planted[k].centre = (double) n * ((double) k + between (&random, 0.35, 0.65)) / (double) dips;
          ant_whitener_solve (whitener, value, z);
          truth (whitener, z, step_d, &planted[k], &per_ppm);
          planted[k].depth_ppm = ideal / per_ppm;
          add_shape (&planted[k], step_d, n, value);
        }
      ant_whitener_solve (whitener, value, z);
      for (size_t k = 0; k < dips; k++)
        {
          double per_ppm;
          truth (whitener, z, step_d, &planted[k], &per_ppm);
        }
      ant_whitener_free (whitener);
      AntScan *scan = ant_scan_new (&series, &options, &status);
      if (!scan || ant_pool_run (ant_scan_stages (), scan, 0, NULL, NULL, NULL))
        return 1;
      const AntDip *dip;
      size_t listed = ant_scan_dips (scan, &dip);
      for (size_t k = 0; k < dips; k++)
        {
          const AntDip *match = NULL;
          for (size_t i = 0; i < listed; i++)
            if (fabs (dip[i].mid_d - planted[k].centre * step_d) < 0.5 * planted[k].shape.duration_d
                && (!match || dip[i].snr > match->snr))
              match = &dip[i];
          planted_count++;
          if (!match)
            {
              printf ("missed snr %.2f depth %.1f T14 %.2f\n", planted[k].snr, planted[k].depth_ppm,
                      planted[k].shape.duration_d * 24);
              continue;
            }
          ratio[found++] = match->snr / planted[k].snr;
          printf ("found %.3f %.3f depth %.2f %.2f %.2f T14 %.3f %.3f edge %.1f %.1f b %.2f dt %.2f first %.2f\n", match->snr,
                  planted[k].snr, match->depth_ppm, planted[k].depth_ppm, match->depth_sigma_ppm, match->duration_d * 24,
                  planted[k].shape.duration_d * 24, match->edge_d * 1440, planted[k].shape.edge_d * 1440, planted[k].shape.impact,
                  (match->mid_d - planted[k].centre * step_d) * 1440, match->first_snr);
        }
      ant_scan_free (scan);
      fflush (stdout);
    }
  printf ("planted %zu found %zu, SNR ratio median %.3f 5th percentile %.3f\n", planted_count, found,
          ant_quantile (found, ratio, 0.5, ratio), ant_quantile (found, ratio, 0.05, ratio));
  return 0;
}
