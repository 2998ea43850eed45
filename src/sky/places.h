/* places.h - where the Sun's planets and the Moon are, and how large they are.
 *
 * Places are geometric (no light time), heliocentric, in km on the equator and equinox of J2000 (FK5, which is the ICRS
 * within 0.03"); times are days of TT from J2000.0 (JD 2451545.0), one double: 2 us over four centuries.
 *
 * The exact places are VSOP87 (Bretagnon & Francou 1988, A&A 202, 309) for the planets and ELP 2000-82B
 * (Chapront-Touze & Chapront 1983, A&A 124, 50) for the Moon, as libnova computes them. libnova remembers its last
 * answers in static variables, so everything that asks for an exact place, directly or through the rest of this room,
 * belongs to one thread at a time: the caller sees to it. The rough ones are pure. */
#pragma once

#include "core/status.h"

typedef enum
{
  ANT_BODY_MERCURY,
  ANT_BODY_VENUS,
  ANT_BODY_MOON,
  ANT_BODY_EARTH,
  ANT_N_BODIES,
} AntBody;

const char *ant_body_name (AntBody body); /* "Mercury"; untranslated, static */

#define ANT_J2000_JD 2451545.0
/* The theories are used from 1600 to 2400: there they stay within a second or so of an ephemeris fitted to observations. */
#define ANT_SKY_FIRST_TT_D (-146097.5) /* 1600-01-01T00:00 TT */
#define ANT_SKY_LAST_TT_D 146096.5     /* 2400-01-01T00:00 TT */

/* Heliocentric place, km, to the few km of the theories, in 50 to 600 us. */
void ant_place_exact (AntBody body, double tt_d, double place_km[3]);
/* The same to 1' as seen from the Earth, in a few us: mean elements (Simon et al. 1994, A&A 282, 663) and a short
 * lunar theory (Meeus 1998, ch. 47), as ERFA has them. The Earth-Moon barycentre stands for the Earth. */
void ant_place_rough (AntBody body, double tt_d, double place_km[3]);

/* Which radii: those that published contact times assume, or those of the IAU. */
typedef enum
{
  ANT_RADII_ALMANAC, /* Sun 959.63", Mercury 3.36", Venus 8.41" at 1 au; Moon 0.2725076 Earth radii */
  ANT_RADII_IAU,     /* Sun 695 700 km (IAU 2015 B3); mean radii of Archinal et al. 2018, Celest. Mech. 130, 22 */
} AntRadiiSet;

typedef struct
{
  double sun_km;
  double body_km[ANT_N_BODIES];
} AntRadii;

AntRadii ant_radii (AntRadiiSet set);
