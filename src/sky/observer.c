/* observer.c - places of observers from the Earth's centre. */
#include "sky/observer.h"

#include <erfa.h>
#include <math.h>
#include <stdlib.h>
#include "core/robust.h"
#include "core/units.h"
#include "sky/places.h"

#define NODES 6                /* of the interpolating polynomial */
#define HOLE_STEPS 2.5
#define COARSE 0.05            /* of the distance: what a row may differ from the polynomial through its neighbours */
#define DEEPEST_M (-500.0)
#define HIGHEST_M 100000.0
#define SITE_SPEED_KM_S 0.5    /* the equator does 0.465 */
#define EARTH_SPEED_RAD_S 2e-7 /* the Sun-Earth line turns at most so fast: it carries GSE tables and L1 */

/* First of the (at most six) rows that stand around `time`. */
static size_t
first_node (const AntPositionTable *table, double tt_d, size_t nodes)
{
  size_t low = 0, high = table->n - 1;
  while (high - low > 1)
    {
      size_t mid = (low + high) / 2;
      if (table->time_tt_d[mid] <= tt_d)
        low = mid;
      else
        high = mid;
    }
  size_t before = nodes / 2 - 1;
  size_t first = low > before ? low - before : 0;
  return first + nodes > table->n ? table->n - nodes : first;
}

/* The polynomial through rows first .. first+nodes-1, without row `skip`. */
static void
interpolate (const AntPositionTable *table, double tt_d, size_t first, size_t nodes, size_t skip, double place[3])
{
  place[0] = place[1] = place[2] = 0;
  for (size_t i = first; i < first + nodes; i++)
    {
      double weight = 1;
      if (i == skip)
        continue;
      for (size_t j = first; j < first + nodes; j++)
        if (j != i && j != skip)
          weight *= (tt_d - table->time_tt_d[j]) / (table->time_tt_d[i] - table->time_tt_d[j]);
      place[0] += weight * table->x_km[i];
      place[1] += weight * table->y_km[i];
      place[2] += weight * table->z_km[i];
    }
}

static double
length (const double v[3])
{
  return sqrt (v[0] * v[0] + v[1] * v[1] + v[2] * v[2]);
}

static AntObserverFault
check_site (const AntObserver *observer, double *value)
{
  double longitude = observer->longitude_deg, latitude = observer->latitude_deg;
  *value = observer->height_m;
  if (!(fabs (latitude) <= 90) || !(longitude >= -180 && longitude <= 360) || !isfinite (observer->height_m))
    return ANT_OBSERVER_NOT_ON_EARTH;
  if (observer->height_m < DEEPEST_M)
    return ANT_OBSERVER_UNDERGROUND;
  return observer->height_m > HIGHEST_M ? ANT_OBSERVER_TOO_HIGH : ANT_OBSERVER_GOOD;
}

static AntObserverFault
check_distance (const AntPositionTable *table, size_t i, double *value)
{
  double place[3] = { table->x_km[i], table->y_km[i], table->z_km[i] };
  *value = length (place);
  if (!(*value >= ANT_OBSERVER_NEAREST_KM))
    return ANT_OBSERVER_INSIDE_EARTH;
  return *value <= ANT_OBSERVER_FARTHEST_KM ? ANT_OBSERVER_GOOD : ANT_OBSERVER_TOO_FAR;
}

/* A row must be told by the six around it: what is read between rows is then far better known. */
static AntObserverFault
check_smooth (const AntPositionTable *table, size_t i, double *value)
{
  double place[3] = { table->x_km[i], table->y_km[i], table->z_km[i] }, guess[3];
  if (i < NODES / 2 || i + NODES / 2 >= table->n)
    return ANT_OBSERVER_GOOD;
  interpolate (table, table->time_tt_d[i], i - NODES / 2, NODES + 1, i, guess);
  for (int axis = 0; axis < 3; axis++)
    guess[axis] -= place[axis];
  *value = length (guess);
  return *value > COARSE * length (place) ? ANT_OBSERVER_TOO_COARSE : ANT_OBSERVER_GOOD;
}

static AntObserverFault
check_steps (const AntPositionTable *table, size_t *row, double *value)
{
  double *step = malloc (table->n * sizeof *step);
  if (!step)
    return ANT_OBSERVER_TOO_FEW;
  AntObserverFault fault = ANT_OBSERVER_GOOD;
  for (size_t i = 1; i < table->n; i++)
    step[i - 1] = table->time_tt_d[i] - table->time_tt_d[i - 1];
  double usual_d = ant_median (table->n - 1, step, step);
  free (step);
  for (size_t i = 1; i < table->n && !fault; i++)
    {
      *row = i;
      *value = table->time_tt_d[i] - table->time_tt_d[i - 1];
      fault = !(*value > 0) ? ANT_OBSERVER_NOT_RISING : *value > HOLE_STEPS * usual_d ? ANT_OBSERVER_HOLE : ANT_OBSERVER_GOOD;
    }
  return fault;
}

static AntObserverFault
check_table (const AntPositionTable *table, size_t *row, double *value)
{
  *row = 0;
  *value = (double) table->n;
  if (table->n < 2)
    return ANT_OBSERVER_TOO_FEW;
  AntObserverFault fault = check_steps (table, row, value);
  for (size_t i = 0; i < table->n && !fault; i++)
    fault = check_distance (table, *row = i, value);
  for (size_t i = 0; i < table->n && !fault; i++)
    fault = check_smooth (table, *row = i, value);
  return fault;
}

AntObserverFault
ant_observer_check (const AntObserver *observer, size_t *row, double *value)
{
  size_t unused_row = 0;
  double unused_value = 0;
  row = row ? row : &unused_row;
  value = value ? value : &unused_value;
  if (observer->kind == ANT_OBSERVER_SITE)
    return check_site (observer, value);
  return observer->kind == ANT_OBSERVER_TABLE ? check_table (&observer->table, row, value) : ANT_OBSERVER_GOOD;
}

/* Geocentric solar ecliptic axes of date, to the equator of J2000. */
static void
from_gse (double tt_d, const double earth_km[3], double place[3])
{
  double to_ecliptic[3][3], x[3], y[3], z[3], gse[3] = { place[0], place[1], place[2] };
  double sunward[3] = { -earth_km[0], -earth_km[1], -earth_km[2] }, unused;
  eraEcm06 (ANT_J2000_JD, tt_d, to_ecliptic); /* its third row is the pole */
  eraPn (sunward, &unused, x);
  eraPxp (to_ecliptic[2], x, y);
  eraPn (y, &unused, y);
  eraPxp (x, y, z);
  for (int i = 0; i < 3; i++)
    place[i] = gse[0] * x[i] + gse[1] * y[i] + gse[2] * z[i];
}

static void
site_place (const AntObserver *observer, double tt_d, double place_km[3])
{
  double tai1, tai2, ut1, ut2, turned[3][3], on_earth_m[3], in_sky_m[3];
  eraGd2gc (1, observer->longitude_deg * ANT_PI / 180, observer->latitude_deg * ANT_PI / 180, observer->height_m,
            on_earth_m);
  eraTttai (ANT_J2000_JD, tt_d, &tai1, &tai2);
  eraTaiutc (tai1, tai2, &ut1, &ut2);
  eraC2t00b (ANT_J2000_JD, tt_d, ut1, ut2, 0, 0, turned);
  eraTrxp (turned, on_earth_m, in_sky_m);
  for (int i = 0; i < 3; i++)
    place_km[i] = in_sky_m[i] / 1000;
}

static AntStatus
table_place (const AntPositionTable *table, double tt_d, const double earth_km[3], double place_km[3])
{
  if (!(tt_d >= table->time_tt_d[0] && tt_d <= table->time_tt_d[table->n - 1]))
    return ANT_NO_DATA;
  size_t nodes = table->n < NODES ? table->n : NODES;
  interpolate (table, tt_d, first_node (table, tt_d, nodes), nodes, table->n, place_km);
  if (table->frame == ANT_FRAME_GSE)
    from_gse (tt_d, earth_km, place_km);
  return ANT_OK;
}

AntStatus
ant_observer_place (const AntObserver *observer, double tt_d, const double earth_km[3], double place_km[3])
{
  switch (observer->kind)
    {
    case ANT_OBSERVER_SITE: site_place (observer, tt_d, place_km); return ANT_OK;
    case ANT_OBSERVER_TABLE: return table_place (&observer->table, tt_d, earth_km, place_km);
    case ANT_OBSERVER_L1:
      for (int i = 0; i < 3; i++)
        place_km[i] = -ANT_L1_FRACTION * earth_km[i];
      return ANT_OK;
    case ANT_OBSERVER_EARTH: break;
    }
  place_km[0] = place_km[1] = place_km[2] = 0;
  return ANT_OK;
}

void
ant_observer_span (const AntObserver *observer, double *from_tt_d, double *to_tt_d)
{
  const AntPositionTable *table = &observer->table;
  int listed = observer->kind == ANT_OBSERVER_TABLE;
  *from_tt_d = listed ? fmax (ANT_SKY_FIRST_TT_D, table->time_tt_d[0]) : ANT_SKY_FIRST_TT_D;
  *to_tt_d = listed ? fmin (ANT_SKY_LAST_TT_D, table->time_tt_d[table->n - 1]) : ANT_SKY_LAST_TT_D;
}

double
ant_observer_speed (const AntObserver *observer)
{
  const AntPositionTable *table = &observer->table;
  double greatest = 0;
  if (observer->kind == ANT_OBSERVER_SITE)
    return SITE_SPEED_KM_S;
  if (observer->kind == ANT_OBSERVER_L1)
    return ANT_L1_FRACTION * ANT_AU_KM * 1.02 * EARTH_SPEED_RAD_S * 1.1;
  if (observer->kind == ANT_OBSERVER_EARTH)
    return 0;
  for (size_t i = 1; i < table->n; i++)
    {
      double from[3] = { table->x_km[i - 1], table->y_km[i - 1], table->z_km[i - 1] };
      double step[3] = { table->x_km[i] - from[0], table->y_km[i] - from[1], table->z_km[i] - from[2] };
      double speed = length (step) / ((table->time_tt_d[i] - table->time_tt_d[i - 1]) * ANT_SECONDS_PER_DAY);
      if (table->frame == ANT_FRAME_GSE)
        speed += length (from) * EARTH_SPEED_RAD_S;
      greatest = fmax (greatest, speed);
    }
  return 1.5 * greatest; /* between rows the path is longer than its chord, and faster here and there */
}
