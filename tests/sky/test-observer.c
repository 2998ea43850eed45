/* test-observer.c - observers stand where they should, and impossible ones are told apart. */
#include "sky/observer.h"

#include <erfa.h>
#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "sky/places.h"

#define ROWS 200

static double time_d[ROWS], x_km[ROWS], y_km[ROWS], z_km[ROWS];

/* A circle of 7000 km, tilted, 95 min, every `step_min`. */
static AntObserver
circling (size_t n, double step_min)
{
  for (size_t i = 0; i < n; i++)
    {
      double angle = ANT_TAU * (double) i * step_min / 95;
      time_d[i] = 1000 + (double) i * step_min / ANT_MINUTES_PER_DAY;
      x_km[i] = 7000 * cos (angle);
      y_km[i] = 7000 * sin (angle) * 0.6;
      z_km[i] = 7000 * sin (angle) * 0.8;
    }
  return (AntObserver){ .kind = ANT_OBSERVER_TABLE, .table = { n, time_d, x_km, y_km, z_km, ANT_FRAME_GCRS } };
}

static void
a_table_is_read_between_its_rows (void)
{
  AntObserver observer = circling (ROWS, 2);
  double earth[3] = { ANT_AU_KM, 0, 0 }, place[3];
  g_assert_cmpint (ant_observer_check (&observer, NULL, NULL), ==, ANT_OBSERVER_GOOD);
  for (double minute = 0.3; minute < 2 * (ROWS - 1); minute += 7.1)
    {
      double angle = ANT_TAU * minute / 95;
      g_assert_cmpint (ant_observer_place (&observer, 1000 + minute / ANT_MINUTES_PER_DAY, earth, place), ==, ANT_OK);
      g_assert_cmpfloat_with_epsilon (place[0], 7000 * cos (angle), 0.05);
      g_assert_cmpfloat_with_epsilon (place[1], 7000 * sin (angle) * 0.6, 0.05);
      g_assert_cmpfloat_with_epsilon (place[2], 7000 * sin (angle) * 0.8, 0.05);
    }
}

static void
outside_its_span_a_table_tells_nothing (void)
{
  AntObserver observer = circling (ROWS, 2);
  double earth[3] = { ANT_AU_KM, 0, 0 }, place[3], from, to;
  ant_observer_span (&observer, &from, &to);
  g_assert_cmpfloat (from, ==, time_d[0]);
  g_assert_cmpfloat (to, ==, time_d[ROWS - 1]);
  g_assert_cmpint (ant_observer_place (&observer, from - 1e-6, earth, place), ==, ANT_NO_DATA);
  g_assert_cmpint (ant_observer_place (&observer, to + 1e-6, earth, place), ==, ANT_NO_DATA);
  g_assert_cmpint (ant_observer_place (&observer, from, earth, place), ==, ANT_OK);
}

static void
fault_is (const AntObserver *observer, AntObserverFault expected, size_t expected_row)
{
  size_t row = 0;
  g_assert_cmpint (ant_observer_check (observer, &row, NULL), ==, expected);
  g_assert_cmpuint (row, ==, expected_row);
}

static void
tables_that_cannot_be_are_told_apart (void)
{
  AntObserver observer = circling (ROWS, 2);
  z_km[40] = 1e9;
  fault_is (&observer, ANT_OBSERVER_TOO_FAR, 40);
  observer = circling (ROWS, 2);
  x_km[30] = NAN;
  fault_is (&observer, ANT_OBSERVER_INSIDE_EARTH, 30);
  observer = circling (ROWS, 2);
  for (size_t i = 100; i < ROWS; i++)
    time_d[i] += 0.1;
  fault_is (&observer, ANT_OBSERVER_HOLE, 100);
  observer = circling (ROWS, 2);
  time_d[7] = time_d[6];
  fault_is (&observer, ANT_OBSERVER_NOT_RISING, 7);
  observer = circling (ROWS, 25);
  fault_is (&observer, ANT_OBSERVER_TOO_COARSE, 3);
  observer = circling (1, 2);
  fault_is (&observer, ANT_OBSERVER_TOO_FEW, 0);
}

static void
units_wrong_by_a_thousand_are_seen (void)
{
  static const double distance_km[] = { 6700, 7000, 42164, 384400, 1.65e6 };
  for (gsize i = 0; i < G_N_ELEMENTS (distance_km); i++)
    for (int power = -1; power <= 1; power++)
      {
        double x[2] = { distance_km[i] * pow (1000, power), x[0] }, zero[2] = { 0 }, time[2] = { 0, 1 };
        AntObserver observer = { .kind = ANT_OBSERVER_TABLE, .table = { 2, time, x, zero, zero, ANT_FRAME_GSE } };
        AntObserverFault expected = power < 0 ? ANT_OBSERVER_INSIDE_EARTH : power > 0 ? ANT_OBSERVER_TOO_FAR : ANT_OBSERVER_GOOD;
        if (power < 0 && distance_km[i] >= 1e9)
          continue;
        g_assert_cmpint (ant_observer_check (&observer, NULL, NULL), ==, expected);
      }
}

static void
sites_that_cannot_be_are_told_apart (void)
{
  static const struct
  {
    double longitude, latitude, height;
    AntObserverFault fault;
  } sites[] = {
    { 0, 0, 0, ANT_OBSERVER_GOOD },          { -180, -90, -430, ANT_OBSERVER_GOOD },  { 360, 90, 8849, ANT_OBSERVER_GOOD },
    { 0, 90.1, 0, ANT_OBSERVER_NOT_ON_EARTH }, { 361, 0, 0, ANT_OBSERVER_NOT_ON_EARTH }, { NAN, 0, 0, ANT_OBSERVER_NOT_ON_EARTH },
    { 0, 0, NAN, ANT_OBSERVER_NOT_ON_EARTH }, { 10, 50, -501, ANT_OBSERVER_UNDERGROUND }, { 10, 50, 2e5, ANT_OBSERVER_TOO_HIGH },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (sites); i++)
    {
      AntObserver site = { .kind = ANT_OBSERVER_SITE, .longitude_deg = sites[i].longitude, .latitude_deg = sites[i].latitude,
                           .height_m = sites[i].height };
      g_assert_cmpint (ant_observer_check (&site, NULL, NULL), ==, sites[i].fault);
    }
}

/* A site on the equator at longitude 0 stands at right ascension = apparent sidereal time, 6378.137 km out (WGS 84). */
static void
a_site_turns_with_sidereal_time (void)
{
  AntObserver site = { .kind = ANT_OBSERVER_SITE };
  double earth[3] = { ANT_AU_KM, 0, 0 }, place[3], tai1, tai2, ut1, ut2;
  for (double tt_d = 0; tt_d < 20; tt_d += 1.37)
    {
      g_assert_cmpint (ant_observer_place (&site, tt_d, earth, place), ==, ANT_OK);
      eraTttai (ANT_J2000_JD, tt_d, &tai1, &tai2);
      eraTaiutc (tai1, tai2, &ut1, &ut2);
      double sidereal = eraGst06a (ut1, ut2, ANT_J2000_JD, tt_d), out = hypot (place[0], place[1]);
      g_assert_cmpfloat_with_epsilon (out, 6378.137, 1e-3);
      g_assert_cmpfloat_with_epsilon (remainder (atan2 (place[1], place[0]) - sidereal, ANT_TAU), 0, 1e-4); /* 20": precession since 2000 */
    }
}

/* GSE by hand at a time when the Sun stands at a known place: x to the Sun, z to the ecliptic's pole. */
static void
gse_points_to_the_sun_and_the_pole (void)
{
  double earth[3], x[2] = { 0, 0 }, y[2] = { 0, 0 }, z[2] = { 0, 0 }, time[2] = { 0, 1 }, place[3];
  AntObserver observer = { .kind = ANT_OBSERVER_TABLE, .table = { 2, time, x, y, z, ANT_FRAME_GSE } };
  ant_place_exact (ANT_BODY_EARTH, 0.5, earth);
  double distance = sqrt (earth[0] * earth[0] + earth[1] * earth[1] + earth[2] * earth[2]);
  x[0] = x[1] = 1.5e6;
  g_assert_cmpint (ant_observer_place (&observer, 0.5, earth, place), ==, ANT_OK);
  for (int i = 0; i < 3; i++)
    g_assert_cmpfloat_with_epsilon (place[i], -earth[i] / distance * 1.5e6, 1e-3);
  x[0] = x[1] = 0;
  z[0] = z[1] = 1e6;
  g_assert_cmpint (ant_observer_place (&observer, 0.5, earth, place), ==, ANT_OK);
  double obliquity = 23.4393 * ANT_PI / 180; /* IAU 2006, J2000 */
  g_assert_cmpfloat_with_epsilon (place[0], 0, 100);
  g_assert_cmpfloat_with_epsilon (place[1], -1e6 * sin (obliquity), 100);
  g_assert_cmpfloat_with_epsilon (place[2], 1e6 * cos (obliquity), 100);
  z[0] = z[1] = 0;
  y[0] = y[1] = 1e6; /* completes a right-handed set: against the Earth's motion */
  g_assert_cmpint (ant_observer_place (&observer, 0.5, earth, place), ==, ANT_OK);
  double later[3], along = 0;
  ant_place_exact (ANT_BODY_EARTH, 0.6, later);
  for (int i = 0; i < 3; i++)
    along += place[i] * (later[i] - earth[i]);
  g_assert_cmpfloat (along, <, 0);
}

static void
l1_stands_a_hundredth_of_the_way_to_the_sun (void)
{
  AntObserver observer = { .kind = ANT_OBSERVER_L1 };
  double earth[3] = { 0, ANT_AU_KM, 0 }, place[3];
  g_assert_cmpint (ant_observer_place (&observer, 0, earth, place), ==, ANT_OK);
  g_assert_cmpfloat_with_epsilon (place[1], -1.4976e6, 100); /* solved from the three-body balance */
  /* Pulls balance there, mass of Earth and Moon over the Sun 1/328900.56 (IAU 2009): sun - planet = centrifugal. */
  double m = 1 / 328900.56, d = -place[1] / ANT_AU_KM;
  g_assert_cmpfloat_with_epsilon (1 / ((1 - d) * (1 - d)) - m / (d * d) - ((1 + m) * (1 / (1 + m) - d)), 0, 2e-5);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/sky/observer/a-table-is-read-between-its-rows", a_table_is_read_between_its_rows);
  g_test_add_func ("/sky/observer/outside-its-span-a-table-tells-nothing", outside_its_span_a_table_tells_nothing);
  g_test_add_func ("/sky/observer/tables-that-cannot-be-are-told-apart", tables_that_cannot_be_are_told_apart);
  g_test_add_func ("/sky/observer/units-wrong-by-a-thousand-are-seen", units_wrong_by_a_thousand_are_seen);
  g_test_add_func ("/sky/observer/sites-that-cannot-be-are-told-apart", sites_that_cannot_be_are_told_apart);
  g_test_add_func ("/sky/observer/a-site-turns-with-sidereal-time", a_site_turns_with_sidereal_time);
  g_test_add_func ("/sky/observer/gse-points-to-the-sun-and-the-pole", gse_points_to_the_sun_and_the_pole);
  g_test_add_func ("/sky/observer/l1-stands-a-hundredth-of-the-way-to-the-sun", l1_stands_a_hundredth_of_the_way_to_the_sun);
  return g_test_run ();
}
