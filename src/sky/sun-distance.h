/* sun-distance.h - how far an observer is from the Sun, and what that does to the light.
 *
 * Irradiance falls with the square of the distance, and a recession stretches the light: brought to 1 au a value is
 * multiplied by (r/au)^2 (1 + 2 v/c), v positive receding (to first order in v/c: energy and rate of photons). The Earth by
 * Bretagnon & Francou's VSOP2000 as ERFA's eraEpv00 has it, good to 1e-8 au; nothing here asks the theories of places.h,
 * so it is pure. */
#pragma once

#include "sky/observer.h"

typedef struct
{
  double au;           /* distance from the Sun */
  double recession_km_s; /* its growth */
} AntSunDistance;

/* NULL observer: the Earth's centre. ANT_NO_DATA outside an observer's table, ANT_BAD_ARGUMENT outside 1900-2100. About 30 us. */
AntStatus ant_sun_distance (const AntObserver *observer, double tt_d, AntSunDistance *distance);
/* Factor that brings a value to 1 au; without Doppler only (r/au)^2. */
double ant_one_au_factor (const AntSunDistance *distance, int with_doppler);
