/* test-sun-distance.c - distances and speeds of the Earth and of observers about it. */
#include "sky/sun-distance.h"

#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "sky/places.h"

static AntSunDistance
at (const AntObserver *observer, double tt_d)
{
  AntSunDistance distance = { 0 };
  g_assert_cmpint (ant_sun_distance (observer, tt_d, &distance), ==, ANT_OK);
  return distance;
}

/* At J2000 the radius vector of VSOP87D, 0.9833276819 au (vsop87.chk, from memory); on 2003-05-07 10:11:07.776 UTC 150 949 612 km,
 * as a flight dynamics note gives it. */
static void
the_earth_is_where_others_have_it (void)
{
  g_assert_cmpfloat_with_epsilon (at (NULL, 0.0).au, 0.9833276819, 1e-7);
  double tt_d = 2452766.5 - ANT_J2000_JD + (10.0 * 3600.0 + 11.0 * 60.0 + 7.776 + 64.184) / ANT_SECONDS_PER_DAY;
  g_assert_cmpfloat_with_epsilon (at (NULL, tt_d).au * ANT_AU_KM, 150949612.0, 15.0);
}

/* The theory of places.h is another one. */
static void
two_theories_agree_over_two_centuries (void)
{
  for (double tt_d = -36000.0; tt_d < 36000.0; tt_d += 1234.5)
    {
      double place[3];
      ant_place_exact (ANT_BODY_EARTH, tt_d, place);
      double km = sqrt (place[0] * place[0] + place[1] * place[1] + place[2] * place[2]);
      g_assert_cmpfloat_with_epsilon (at (NULL, tt_d).au * ANT_AU_KM, km, 60.0);
    }
}

static void
recession_is_the_growth_of_the_distance (void)
{
  AntObserver site = { .kind = ANT_OBSERVER_SITE, .longitude_deg = 12.5, .latitude_deg = 41.0 }, l1 = { .kind = ANT_OBSERVER_L1 };
  const AntObserver *const observers[] = { NULL, &site, &l1 };
  for (int i = 0; i < 3; i++)
    for (double tt_d = 100.2; tt_d < 4000.0; tt_d += 333.3)
      {
        double step_d = 0.005, before = at (observers[i], tt_d - step_d).au, after = at (observers[i], tt_d + step_d).au;
        double growth = (after - before) * ANT_AU_KM / (2.0 * step_d * ANT_SECONDS_PER_DAY);
        g_assert_cmpfloat_with_epsilon (at (observers[i], tt_d).recession_km_s, growth, i == 2 ? 0.02 : 1e-3);
      }
}

/* A circle of 7000 km in the ecliptic, 96.9 min a turn: the swing and the Doppler shift that are left if it is not known. */
static void
a_low_orbit_swings_by_a_hundred_ppm (void)
{
  enum { N = 400 };
  double time[N], x[N], y[N], z[N], least = 1.0, greatest = 1.0, slowest = 0.0, fastest = 0.0, radius = 7000.0;
  double period_d = ANT_TAU * sqrt (radius * radius * radius / 398600.4418) / ANT_SECONDS_PER_DAY;
  for (int i = 0; i < N; i++)
    {
      double angle = ANT_TAU * i / 100.0;
      time[i] = 1000.0 + i * period_d / 100.0;
      x[i] = radius * cos (angle);
      y[i] = radius * sin (angle);
      z[i] = 0.0;
    }
  AntObserver orbit = { .kind = ANT_OBSERVER_TABLE, .table = { N, time, x, y, z, ANT_FRAME_GSE } };
  g_assert_cmpint (ant_observer_check (&orbit, NULL, NULL), ==, ANT_OBSERVER_GOOD);
  for (int i = 20; i < N - 20; i++)
    {
      AntSunDistance here = at (&orbit, time[i]), earth = at (NULL, time[i]);
      double ratio = here.au * here.au / earth.au / earth.au, speed = here.recession_km_s - earth.recession_km_s;
      least = fmin (least, ratio);
      greatest = fmax (greatest, ratio);
      slowest = fmin (slowest, speed);
      fastest = fmax (fastest, speed);
    }
  g_assert_cmpfloat_with_epsilon ((greatest - 1.0) / ANT_PPM, 2.0 * radius / ANT_AU_KM / ANT_PPM, 4.0);
  g_assert_cmpfloat_with_epsilon ((1.0 - least) / ANT_PPM, 2.0 * radius / ANT_AU_KM / ANT_PPM, 4.0);
  g_assert_cmpfloat_with_epsilon (2.0 * fastest / ANT_LIGHT_KM_S / ANT_PPM, 50.3, 0.5);
  g_assert_cmpfloat_with_epsilon (2.0 * slowest / ANT_LIGHT_KM_S / ANT_PPM, -50.3, 0.5);
}

static void
one_au_needs_a_factor_of_the_square (void)
{
  AntSunDistance distance = { 1.1, 29.9792458 };
  g_assert_cmpfloat_with_epsilon (ant_one_au_factor (&distance, 0), 1.21, 1e-12);
  g_assert_cmpfloat_with_epsilon (ant_one_au_factor (&distance, 1), 1.21 * 1.0002, 1e-12);
}

static void
what_is_not_known_is_said (void)
{
  AntSunDistance distance;
  double time[] = { 0.0, 0.1 }, x[] = { 7000.0, 7000.0 }, zero[] = { 0.0, 0.0 };
  AntObserver table = { .kind = ANT_OBSERVER_TABLE, .table = { 2, time, x, zero, zero, ANT_FRAME_GCRS } };
  g_assert_cmpint (ant_sun_distance (&table, 5.0, &distance), ==, ANT_NO_DATA);
  g_assert_cmpint (ant_sun_distance (NULL, NAN, &distance), ==, ANT_BAD_ARGUMENT);
  g_assert_cmpint (ant_sun_distance (NULL, 40000.0, &distance), ==, ANT_BAD_ARGUMENT);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/sky/sun-distance/the-earth-is-where-others-have-it", the_earth_is_where_others_have_it);
  g_test_add_func ("/sky/sun-distance/two-theories-agree-over-two-centuries", two_theories_agree_over_two_centuries);
  g_test_add_func ("/sky/sun-distance/recession-is-the-growth-of-the-distance", recession_is_the_growth_of_the_distance);
  g_test_add_func ("/sky/sun-distance/a-low-orbit-swings-by-a-hundred-ppm", a_low_orbit_swings_by_a_hundred_ppm);
  g_test_add_func ("/sky/sun-distance/one-au-needs-a-factor-of-the-square", one_au_needs_a_factor_of_the_square);
  g_test_add_func ("/sky/sun-distance/what-is-not-known-is-said", what_is_not_known_is_said);
  return g_test_run ();
}
