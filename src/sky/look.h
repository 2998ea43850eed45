/* look.h - how a body stands before the Sun for an observer at an instant: separation, sizes, offset.
 *
 * The observer at the time of seeing, the body where it was when the light left it, the Sun at rest in the middle: what
 * the Sun's own motion and the observer's aberration do to both alike (0.002" are left) is left out. A look keeps the
 * orbits as Chebyshev polynomials over the day around, so that the theories are asked once a day. Its exact looks ask
 * places.h: one thread. */
#pragma once

#include "core/transit-curve.h"
#include "sky/observer.h"
#include "sky/places.h"

#define ANT_TRACK_NODES 6

typedef struct
{
  AntBody body;
  const AntObserver *observer; /* borrowed, checked (observer.h) */
  AntRadii radii;
  int has_track;
  double track_start_d;
  double earth_km[3][ANT_TRACK_NODES], body_km[3][ANT_TRACK_NODES]; /* Chebyshev coefficients */
} AntWatch;

typedef struct
{
  double separation;             /* of the centres, radians, as all angles here */
  double east, north;            /* of the body from the Sun's centre, on the plane of the sky */
  double sun_radius, body_radius;
  double sun_km, body_km;        /* distances from the observer */
  double halo;                   /* what an observer elsewhere about L1 may see the separation changed by; 0 for others */
} AntLook;

void ant_watch_init (AntWatch *watch, AntBody body, const AntObserver *observer, AntRadiiSet radii);
/* ANT_NO_DATA outside the span of an observer's table, ANT_BAD_ARGUMENT outside that of the theories. */
AntStatus ant_watch_look (AntWatch *watch, double tt_d, AntLook *look);
/* From the rough places: separation to 1', in a few us. */
AntStatus ant_watch_look_rough (const AntWatch *watch, double tt_d, AntLook *look);
/* Fraction of the Sun's light that is lost, 0..1: none if the body is behind the Sun. */
double ant_look_loss (const AntLook *look, AntLimbDarkening limb_darkening);
