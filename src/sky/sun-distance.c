/* sun-distance.c - distance and recession from the Earth's place and motion, and the observer's about it. */
#include "sky/sun-distance.h"

#include <erfa.h>
#include <math.h>
#include "core/units.h"
#include "sky/places.h"

#define STEP_D (5.0 / ANT_SECONDS_PER_DAY) /* for the observer's own motion: 1e-3 of a low orbit */

AntStatus
ant_sun_distance (const AntObserver *observer, double tt_d, AntSunDistance *distance)
{
  double heliocentric[2][3], barycentric[2][3], away_km[3], motion_km_s[3], square = 0.0, along = 0.0;
  if (!isfinite (tt_d) || eraEpv00 (ANT_J2000_JD, tt_d, heliocentric, barycentric) != 0)
    return ANT_BAD_ARGUMENT;
  for (int i = 0; i < 3; i++)
    {
      away_km[i] = heliocentric[0][i] * ANT_AU_KM;
      motion_km_s[i] = heliocentric[1][i] * ANT_AU_KM / ANT_SECONDS_PER_DAY;
    }
  if (observer && observer->kind != ANT_OBSERVER_EARTH)
    {
      double before[3], here[3], after[3], earth_km[3] = { away_km[0], away_km[1], away_km[2] };
      AntStatus status = ant_observer_place (observer, tt_d, earth_km, here);
      if (status != ANT_OK)
        return status;
      /* At the ends of a table its motion is looked at from one side. */
      double back_d = ant_observer_place (observer, tt_d - STEP_D, earth_km, before) == ANT_OK ? STEP_D : 0.0;
      double on_d = ant_observer_place (observer, tt_d + STEP_D, earth_km, after) == ANT_OK ? STEP_D : 0.0;
      if (back_d + on_d == 0.0)
        return ANT_NO_DATA;
      for (int i = 0; i < 3; i++)
        {
          double moved = (on_d > 0.0 ? after[i] : here[i]) - (back_d > 0.0 ? before[i] : here[i]);
          away_km[i] += here[i];
          motion_km_s[i] += moved / (back_d + on_d) / ANT_SECONDS_PER_DAY;
        }
    }
  for (int i = 0; i < 3; i++)
    {
      square += away_km[i] * away_km[i];
      along += away_km[i] * motion_km_s[i];
    }
  distance->au = sqrt (square) / ANT_AU_KM;
  distance->recession_km_s = along / sqrt (square);
  return ANT_OK;
}

double
ant_one_au_factor (const AntSunDistance *distance, int with_doppler)
{
  double doppler = with_doppler ? 1.0 + 2.0 * distance->recession_km_s / ANT_LIGHT_KM_S : 1.0;
  return distance->au * distance->au * doppler;
}
