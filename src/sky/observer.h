/* observer.h - who is watching: the centre of the Earth, a place on its ground, a body whose positions are listed, or
 * somebody near L1 of whom no more is known. */
#pragma once

#include <stddef.h>
#include "core/status.h"

typedef enum
{
  ANT_OBSERVER_EARTH, /* its centre */
  ANT_OBSERVER_SITE,
  ANT_OBSERVER_TABLE,
  ANT_OBSERVER_L1,
} AntObserverKind;

typedef enum
{
  ANT_FRAME_GCRS, /* axes of the sky (ICRS) */
  ANT_FRAME_GSE,  /* x to the Sun, z to the north pole of the ecliptic of date (as near as it is square to x) */
} AntFrame;

/* Positions from the Earth's centre. Arrays are borrowed. */
typedef struct
{
  size_t n;                     /* >= 2 */
  const double *time_tt_d;      /* [n] rising, days of TT from J2000.0 */
  const double *x_km, *y_km, *z_km; /* [n] */
  AntFrame frame;
} AntPositionTable;

typedef struct
{
  AntObserverKind kind;
  double longitude_deg, latitude_deg, height_m; /* of a site; WGS 84, east positive */
  AntPositionTable table;
} AntObserver;

/* Distance of L1 from the Earth over that of the Sun: (m/3)^(1/3) less a third of its square, m = 1/328900.56 (Earth and
 * Moon over the Sun). */
#define ANT_L1_FRACTION 0.010011
/* Real orbits about L1 stand this far off the Sun-Earth line at most. */
#define ANT_HALO_KM 700000.0

/* Why a site or a table cannot be an observer. */
typedef enum
{
  ANT_OBSERVER_GOOD,
  ANT_OBSERVER_NOT_ON_EARTH,  /* a site: latitude or longitude is no angle of the Earth, or a number is not finite */
  ANT_OBSERVER_UNDERGROUND,   /* a site more than 500 m below the ellipsoid */
  ANT_OBSERVER_TOO_HIGH,      /* a site above 100 km is none */
  ANT_OBSERVER_TOO_FEW,       /* fewer than two rows */
  ANT_OBSERVER_NOT_RISING,    /* `row` is not later than the row before */
  ANT_OBSERVER_INSIDE_EARTH,  /* `row`: units of 1000 km, perhaps */
  ANT_OBSERVER_TOO_FAR,       /* `row`: beyond 3 million km: metres, perhaps */
  ANT_OBSERVER_HOLE,          /* `row` comes after more than 2.5 usual steps */
  ANT_OBSERVER_TOO_COARSE,    /* the rows around `row` do not tell its place */
} AntObserverFault;

#define ANT_OBSERVER_NEAREST_KM 6350.0 /* below the pole's ground */
#define ANT_OBSERVER_FARTHEST_KM 3e6

/* Check before first use. *row (from 0) and *value (km, or days for a hole) tell where and what; NULL is fine.
 * Allocates for a table; a failure of that counts as ANT_OBSERVER_TOO_FEW. */
AntObserverFault ant_observer_check (const AntObserver *observer, size_t *row, double *value);

/* Place from the Earth's centre, km, equator of J2000, for a checked observer. earth_km: the heliocentric Earth then.
 * ANT_NO_DATA outside a table's span. Tables are interpolated by a polynomial through the six rows around. A site turns with UT1 taken as UTC (0.4 km at most)
 * and IAU 2000B nutation. Pure. */
AntStatus ant_observer_place (const AntObserver *observer, double tt_d, const double earth_km[3], double place_km[3]);
/* The span over which the observer is known, within that of the theories. */
void ant_observer_span (const AntObserver *observer, double *from_tt_d, double *to_tt_d);
/* Greatest speed about the Earth's centre, km/s: an upper bound. */
double ant_observer_speed (const AntObserver *observer);
