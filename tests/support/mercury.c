/* mercury.c - a real crossing for records of the studies. */
#include "mercury.h"
#include <math.h>
#include <stdlib.h>
#include "models.h"
#include "sky/sky-curve.h"

#define MIDDLE_TT_D 7254.1395515 /* 2019-11-11T15:20:57.25 TT, DE405 */

size_t
ant_study_mercury (const AntSeries *series, double mid_d, ptrdiff_t *first, size_t room, double *loss)
{
  const AntObserver geocentre = { .kind = ANT_OBSERVER_EARTH };
  AntSkyOptions options = { &geocentre, ANT_RADII_ALMANAC, ANT_LIMB_DARKENING_SUN, NULL };
  AntSkyEvent *event;
  AntSkyCurve curve;
  size_t n, count = 0;
  if (ant_sky_events (&options, MIDDLE_TT_D - 0.5, MIDDLE_TT_D + 0.5, &n, &event) || n != 1
      || ant_sky_curve_init (&curve, &options, event))
    abort ();
  double origin_tt_d = event->greatest_tt_d - mid_d, half_d = 0.5 * series->step_d;
  *first = (ptrdiff_t) ceil (ant_series_place (series, event->start_tt_d - origin_tt_d - half_d));
  ptrdiff_t last = (ptrdiff_t) floor (ant_series_place (series, event->end_tt_d - origin_tt_d + half_d));
  for (ptrdiff_t place = *first; place <= last && count < room; place++)
    loss[count++] = ant_sky_curve_mean (&curve, origin_tt_d + ant_series_time (series, (double) place), series->step_d) / curve.greatest;
  ant_sky_curve_clear (&curve);
  free (event);
  return count;
}

double
ant_study_depth_of_snr (char name, const AntSeries *series, ptrdiff_t first, size_t n, const double *loss, double snr)
{
  AntNoiseModel model;
  AntStatus status;
  double energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES];
  ant_study_model (name, &model);
  AntWhitener *whitener = ant_whitener_new_free_level (&model, series, &status);
  double *lanes = calloc (n * ANT_LANES, sizeof *lanes), *z = calloc (series->n, sizeof *z);
  if (!whitener || !lanes || !z)
    abort ();
  for (size_t i = 0; i < n; i++)
    lanes[i * ANT_LANES] = loss[i];
  ant_whitener_energies (whitener, z, first, n, lanes, energy, moment, weight);
  ant_whitener_free (whitener);
  free (lanes);
  free (z);
  return snr / sqrt (energy[0]);
}
