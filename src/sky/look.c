/* look.c - separation of a body from the Sun, with the time the light takes. */
#include "sky/look.h"

#include <math.h>
#include <string.h>
#include "core/units.h"

#define TRACK_D 1.0
#define TRACK_MARGIN_D 0.015 /* light needs 13 min from the far side of Venus's orbit */
#define LIGHT_LOOPS 5        /* each gains a factor v/c: two or three are needed */
#define SETTLED_D 1e-9       /* of the time the light takes */
#define SETTLED_ROUGH_D 1e-4

/* Chebyshev coefficients of a body's place over the track: sums over the roots (Press et al. 2007, sec. 5.8). */
static void
fit_track (AntBody body, double start_d, double coefficient[3][ANT_TRACK_NODES])
{
  double half = 0.5 * TRACK_D + TRACK_MARGIN_D, middle = start_d + 0.5 * TRACK_D;
  memset (coefficient, 0, 3 * sizeof *coefficient);
  for (int i = 0; i < ANT_TRACK_NODES; i++)
    {
      double place[3], angle = ANT_PI * (i + 0.5) / ANT_TRACK_NODES;
      ant_place_exact (body, middle + half * cos (angle), place);
      for (int axis = 0; axis < 3; axis++)
        for (int j = 0; j < ANT_TRACK_NODES; j++)
          coefficient[axis][j] += place[axis] * cos (angle * j) * (j ? 2.0 : 1.0) / ANT_TRACK_NODES;
    }
}

static void
read_track (const AntWatch *watch, const double coefficient[3][ANT_TRACK_NODES], double tt_d, double place_km[3])
{
  double x = (tt_d - watch->track_start_d - 0.5 * TRACK_D) / (0.5 * TRACK_D + TRACK_MARGIN_D);
  for (int axis = 0; axis < 3; axis++)
    {
      double b1 = 0, b2 = 0;
      for (int j = ANT_TRACK_NODES - 1; j > 0; j--)
        {
          double b = 2 * x * b1 - b2 + coefficient[axis][j];
          b2 = b1;
          b1 = b;
        }
      place_km[axis] = x * b1 - b2 + coefficient[axis][0];
    }
}

void
ant_watch_init (AntWatch *watch, AntBody body, const AntObserver *observer, AntRadiiSet radii)
{
  *watch = (AntWatch){ .body = body, .observer = observer, .radii = ant_radii (radii) };
}

static double
dot (const double a[3], const double b[3])
{
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

/* The body's place when the light left it that arrives at tt_d. */
static void
body_then (const AntWatch *watch, double tt_d, int rough, const double from_km[3], double away_km[3])
{
  double light_d = 0, was_d = 1;
  for (int loop = 0; loop < LIGHT_LOOPS && fabs (light_d - was_d) > (rough ? SETTLED_ROUGH_D : SETTLED_D); loop++)
    {
      if (rough)
        ant_place_rough (watch->body, tt_d - light_d, away_km);
      else
        read_track (watch, watch->body_km, tt_d - light_d, away_km);
      for (int i = 0; i < 3; i++)
        away_km[i] -= from_km[i];
      was_d = light_d;
      light_d = sqrt (dot (away_km, away_km)) / ANT_LIGHT_KM_S / ANT_SECONDS_PER_DAY;
    }
}

/* On the plane square to the line of sight to the Sun: east grows with right ascension. */
static void
set_offset (const double sunward[3], const double bodyward[3], AntLook *look)
{
  double level = hypot (sunward[0], sunward[1]);
  double east[3] = { -sunward[1] / level, sunward[0] / level, 0 };
  double sine = sunward[2] / look->sun_km, cosine = level / look->sun_km;
  double north[3] = { -sine * sunward[0] / level, -sine * sunward[1] / level, cosine };
  double u = dot (bodyward, east), v = dot (bodyward, north), across = hypot (u, v);
  look->east = across > 0 ? look->separation * u / across : 0;
  look->north = across > 0 ? look->separation * v / across : 0;
}

static AntStatus
look_from (const AntWatch *watch, double tt_d, int rough, const double earth_km[3], AntLook *look)
{
  double observer_km[3], sunward[3], bodyward[3];
  AntStatus status = ant_observer_place (watch->observer, tt_d, earth_km, observer_km);
  if (status)
    return status;
  for (int i = 0; i < 3; i++)
    {
      observer_km[i] += earth_km[i];
      sunward[i] = -observer_km[i];
    }
  body_then (watch, tt_d, rough, observer_km, bodyward);
  look->sun_km = sqrt (dot (sunward, sunward));
  look->body_km = sqrt (dot (bodyward, bodyward));
  double cross[3] = { sunward[1] * bodyward[2] - sunward[2] * bodyward[1], sunward[2] * bodyward[0] - sunward[0] * bodyward[2],
                      sunward[0] * bodyward[1] - sunward[1] * bodyward[0] };
  look->separation = atan2 (sqrt (dot (cross, cross)), dot (sunward, bodyward));
  look->sun_radius = asin (watch->radii.sun_km / look->sun_km);
  look->body_radius = asin (fmin (1, watch->radii.body_km[watch->body] / look->body_km));
  look->halo = watch->observer->kind == ANT_OBSERVER_L1
                 ? fabs (ANT_HALO_KM / look->body_km - ANT_HALO_KM / look->sun_km) : 0;
  set_offset (sunward, bodyward, look);
  return ANT_OK;
}

AntStatus
ant_watch_look (AntWatch *watch, double tt_d, AntLook *look)
{
  double earth_km[3];
  if (!(tt_d >= ANT_SKY_FIRST_TT_D && tt_d <= ANT_SKY_LAST_TT_D))
    return ANT_BAD_ARGUMENT;
  double start_d = floor (tt_d / TRACK_D) * TRACK_D;
  if (!watch->has_track || watch->track_start_d != start_d)
    {
      fit_track (ANT_BODY_EARTH, start_d, watch->earth_km);
      fit_track (watch->body, start_d, watch->body_km);
      watch->track_start_d = start_d;
      watch->has_track = 1;
    }
  read_track (watch, watch->earth_km, tt_d, earth_km);
  return look_from (watch, tt_d, 0, earth_km, look);
}

AntStatus
ant_watch_look_rough (const AntWatch *watch, double tt_d, AntLook *look)
{
  double earth_km[3];
  if (!(tt_d >= ANT_SKY_FIRST_TT_D && tt_d <= ANT_SKY_LAST_TT_D))
    return ANT_BAD_ARGUMENT;
  ant_place_rough (ANT_BODY_EARTH, tt_d, earth_km);
  return look_from (watch, tt_d, 1, earth_km, look);
}

double
ant_look_loss (const AntLook *look, AntLimbDarkening limb_darkening)
{
  if (look->body_km >= look->sun_km || look->separation >= look->sun_radius + look->body_radius)
    return 0;
  /* Radii on the plane of the sky; a body as near as the Earth of a low orbit is taken by its own angle. */
  return ant_transit_loss (look->body_radius / look->sun_radius, look->separation / look->sun_radius, limb_darkening);
}
