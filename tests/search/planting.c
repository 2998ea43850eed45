/* planting.c - crossings by the plain transit curve, and a scan on this thread. */
#include "planting.h"
#include <glib.h>
#include <math.h>
#include "core/units.h"

#define EXPOSURE_POINTS 24

static AntCrossing
crossing_of (const Planted *planted)
{
  double t14_d = planted->t14_h / ANT_HOURS_PER_DAY, ingress_d = planted->ingress_min / ANT_MINUTES_PER_DAY;
  return (AntCrossing){ .impact = planted->impact, .t14_d = t14_d,
                        .radius_ratio = ant_crossing_radius_for_ingress (planted->impact, t14_d, ingress_d) };
}

double
planted_mean (const Planted *planted, double time_d, double exposure_d, int points)
{
  AntCrossing crossing = crossing_of (planted);
  double sum = 0;
  for (int k = 0; k < points; k++)
    sum += ant_crossing_loss (&crossing, ANT_LIMB_DARKENING_SUN, time_d + exposure_d * ((k + 0.5) / points - 0.5));
  return sum / points / ant_crossing_loss (&crossing, ANT_LIMB_DARKENING_SUN, 0);
}

void
plant (const AntSeries *series, const Planted *planted, float *value)
{
  double reach_d = 0.5 * planted->t14_h / ANT_HOURS_PER_DAY + series->step_d;
  for (size_t i = 0; i < series->n; i++)
    {
      double time_d = ant_series_time (series, (double) i) - planted->mid_d;
      if (fabs (time_d) < reach_d)
        value[i] -= (float) (planted->depth_ppm * planted_mean (planted, time_d, series->step_d, EXPOSURE_POINTS));
    }
}

AntScan *
scan_all (const AntSeries *series, const AntScanOptions *options)
{
  AntStatus status;
  const AntStages *stages = ant_scan_stages ();
  AntScan *scan = ant_scan_new (series, options, &status);
  g_assert_cmpint (status, ==, ANT_OK);
  for (size_t stage = 0; stage < stages->n_stages; stage++)
    {
      size_t count = stages->count (scan, stage);
      for (size_t i = 0; i < count; i++)
        g_assert_cmpint (stages->run_slice (scan, stage, i), ==, ANT_OK);
      g_assert_cmpint (stages->finish (scan, stage), ==, ANT_OK);
    }
  return scan;
}

const AntDip *
nearest_dip (size_t n, const AntDip *dip, double time_d, double within_d, size_t *count)
{
  const AntDip *nearest = NULL;
  *count = 0;
  for (size_t i = 0; i < n; i++)
    if (fabs (dip[i].mid_d - time_d) < within_d)
      {
        ++*count;
        if (!nearest || fabs (dip[i].mid_d - time_d) < fabs (nearest->mid_d - time_d))
          nearest = &dip[i];
      }
  return nearest;
}

double
shape_energy (const AntWhitener *whitener, ptrdiff_t first, size_t n, const double *shape)
{
  double energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES];
  double *lanes = g_new0 (double, n * ANT_LANES);
  for (size_t j = 0; j < n; j++)
    lanes[j * ANT_LANES] = shape[j];
  ant_whitener_energies (whitener, NULL, first, n, lanes, energy, moment, weight);
  g_free (lanes);
  return energy[0];
}
