/* places.c - places of the planets and the Moon, turned from libnova's ecliptic of J2000 to the equator. */
#include "sky/places.h"

#include <erfa.h>
#include <libnova/earth.h>
#include <libnova/lunar.h>
#include <libnova/mercury.h>
#include <libnova/venus.h>
#include <math.h>
#include "core/units.h"

#define J2000_OBLIQUITY (84381.448 / 3600.0 * ANT_PI / 180.0) /* of FK5, which libnova's places are reduced to */
#define ARCSEC (ANT_PI / 648000.0)
#define LEAST_TERM 1e-9 /* of the lunar theory: 0.02" are left out at most, and three quarters of the time */
#define ALMANAC_EARTH_KM 6378.137 /* the radius that the Moon's 0.2725076 counts in */

static const char *const body_names[ANT_N_BODIES] = { "Mercury", "Venus", "Moon", "Earth" };

const char *
ant_body_name (AntBody body)
{
  return body_names[body];
}

/* Ecliptic of J2000 to equator of J2000. */
static void
to_equator (double x, double y, double z, double place[3])
{
  double c = cos (J2000_OBLIQUITY), s = sin (J2000_OBLIQUITY);
  place[0] = x;
  place[1] = y * c - z * s;
  place[2] = y * s + z * c;
}

static void
from_longitude (const struct ln_helio_posn *at, double place_km[3])
{
  double l = at->L * ANT_PI / 180, b = at->B * ANT_PI / 180, r = at->R * ANT_AU_KM;
  to_equator (r * cos (b) * cos (l), r * cos (b) * sin (l), r * sin (b), place_km);
}

void
ant_place_exact (AntBody body, double tt_d, double place_km[3])
{
  double jd = ANT_J2000_JD + tt_d, moon_km[3];
  struct ln_helio_posn at;
  struct ln_rect_posn moon;
  if (body == ANT_BODY_MERCURY)
    ln_get_mercury_helio_coords (jd, &at);
  else if (body == ANT_BODY_VENUS)
    ln_get_venus_helio_coords (jd, &at);
  else
    ln_get_earth_helio_coords (jd, &at);
  from_longitude (&at, place_km);
  if (body != ANT_BODY_MOON)
    return;
  ln_get_lunar_geo_posn (jd, &moon, LEAST_TERM);
  to_equator (moon.X, moon.Y, moon.Z, moon_km);
  for (int i = 0; i < 3; i++)
    place_km[i] += moon_km[i];
}

void
ant_place_rough (AntBody body, double tt_d, double place_km[3])
{
  static const int planet[ANT_N_BODIES] = { 1, 2, 3, 3 }; /* ERFA's numbers; 3 is the Earth-Moon barycentre */
  double pv[2][3], moon[2][3];
  eraPlan94 (ANT_J2000_JD, tt_d, planet[body], pv);
  for (int i = 0; i < 3; i++)
    place_km[i] = pv[0][i] * ANT_AU_KM;
  if (body != ANT_BODY_MOON)
    return;
  eraMoon98 (ANT_J2000_JD, tt_d, moon);
  for (int i = 0; i < 3; i++)
    place_km[i] += moon[0][i] * ANT_AU_KM;
}

AntRadii
ant_radii (AntRadiiSet set)
{
  if (set == ANT_RADII_IAU)
    return (AntRadii){ ANT_SUN_RADIUS_KM, { 2439.4, 6051.8, 1737.4, ANT_EARTH_RADIUS_KM } };
  return (AntRadii){ ANT_AU_KM * sin (959.63 * ARCSEC),
                     { ANT_AU_KM * sin (3.36 * ARCSEC), ANT_AU_KM * sin (8.41 * ARCSEC), 0.2725076 * ALMANAC_EARTH_KM,
                       ANT_EARTH_RADIUS_KM } };
}
