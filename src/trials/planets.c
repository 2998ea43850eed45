/* planets.c - crossings averaged over exposures. */
#include "trials/planets.h"

#include <math.h>

#define MAX_PIECES 4096

double
ant_crossing_mean_loss (const AntCrossing *crossing, AntLimbDarkening ld, double start_d, double end_d)
{
  const double half_d = crossing->t14_d / 2, node = sqrt (0.6);
  const double from_d = fmax (start_d, -half_d), to_d = fmin (end_d, half_d);
  double pieces, piece_d, sum = 0;

  if (!(end_d > start_d))
    return ant_crossing_loss (crossing, ld, start_d);
  if (!(to_d > from_d))
    return 0;
  pieces = fmin (MAX_PIECES, fmax (4, ceil (8 * (to_d - from_d) / ant_crossing_ingress_d (crossing))));
  piece_d = (to_d - from_d) / pieces;
  for (double i = 0; i < pieces; i++)
    {
      const double mid_d = from_d + (i + 0.5) * piece_d, reach_d = node * piece_d / 2;

      sum += 5 * ant_crossing_loss (crossing, ld, mid_d - reach_d) + 8 * ant_crossing_loss (crossing, ld, mid_d)
             + 5 * ant_crossing_loss (crossing, ld, mid_d + reach_d);
    }
  return sum / 18 * piece_d / (end_d - start_d);
}

static void
dim_once (const AntTrialPlanet *planet, double mid_d, AntLimbDarkening ld, size_t n, double cadence_d,
          double exposure_d, double *value)
{
  const double half_d = planet->crossing.t14_d / 2;
  const double first = fmax (0, floor ((mid_d - half_d - exposure_d) / cadence_d));
  const double last = fmin ((double)n, ceil ((mid_d + half_d) / cadence_d) + 1);

  for (double i = first; i < last; i++)
    {
      const double start_d = i * cadence_d - mid_d;

      value[(size_t)i] *= 1 - ant_crossing_mean_loss (&planet->crossing, ld, start_d, start_d + exposure_d);
    }
}

void
ant_planet_dim (const AntTrialPlanet *planet, AntLimbDarkening ld, size_t n, double cadence_d, double exposure_d,
                double *value)
{
  const double days = (double)n * cadence_d, half_d = planet->crossing.t14_d / 2;

  if (!(planet->period_d > 0))
    {
      dim_once (planet, planet->mid_d, ld, n, cadence_d, exposure_d, value);
      return;
    }
  for (double k = ceil (-(planet->mid_d + half_d) / planet->period_d);
       planet->mid_d + k * planet->period_d - half_d < days; k++)
    dim_once (planet, planet->mid_d + k * planet->period_d, ld, n, cadence_d, exposure_d, value);
}
