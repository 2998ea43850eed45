/* test-look.c - a body before the Sun: light time, offsets, loss. */
#include "sky/look.h"

#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "sky/time-scale.h"

#define ARCSEC (ANT_PI / 648000)

static const AntObserver geocentre = { .kind = ANT_OBSERVER_EARTH };

static double
tt (int year, int month, int day, int hour, int minute, double second)
{
  double jd1, jd2;
  g_assert_cmpint (ant_time_from_calendar (ANT_SCALE_UTC, year, month, day, hour, minute, second, &jd1, &jd2), ==, ANT_OK);
  g_assert_cmpint (ant_time_convert (ANT_SCALE_UTC, jd1, jd2, ANT_SCALE_TT, &jd1, &jd2), ==, ANT_OK);
  return jd1 - ANT_J2000_JD + jd2;
}

/* The near miss of 1999 from a spacecraft near L1: position and speed at 21:42:02 UTC as its project published them, in
 * a frame whose x and y are those of GSE reversed; 93.60" off the limb at 21:48:40 UTC with light time (computed with DE405;
 * the project's own 92.64" leaves the light time out). */
static void
a_planet_passes_beside_the_sun_as_it_did (void)
{
  double epoch = tt (1999, 11, 15, 21, 42, 2), time[2] = { epoch - 0.2, epoch + 0.2 }, x[2], y[2], z[2];
  for (int i = 0; i < 2; i++)
    {
      double s = (time[i] - epoch) * ANT_SECONDS_PER_DAY;
      x[i] = 1648672.298 - 0.0330075 * s;
      y[i] = -92255.185 - 0.2631283 * s;
      z[i] = -133113.471 + 0.0058365 * s;
    }
  AntObserver observer = { .kind = ANT_OBSERVER_TABLE, .table = { 2, time, x, y, z, ANT_FRAME_GSE } };
  AntWatch watch;
  AntLook look, best = { .separation = 1 };
  double best_d = 0;
  ant_watch_init (&watch, ANT_BODY_MERCURY, &observer, ANT_RADII_ALMANAC);
  for (double s = -3600; s < 3600; s++)
    {
      double at = epoch + s / ANT_SECONDS_PER_DAY;
      g_assert_cmpint (ant_watch_look (&watch, at, &look), ==, ANT_OK);
      if (look.separation < best.separation)
        {
          best = look;
          best_d = at;
        }
    }
  g_assert_cmpfloat_with_epsilon ((best.separation - best.sun_radius) / ARCSEC, 93.60, 1);
  g_assert_cmpfloat_with_epsilon ((best_d - tt (1999, 11, 15, 21, 48, 40)) * ANT_SECONDS_PER_DAY, 0, 10);
}

static void
tracks_join_without_a_step (void)
{
  AntWatch watch;
  AntLook before, after;
  for (AntBody body = ANT_BODY_MERCURY; body <= ANT_BODY_MOON; body++)
    {
      ant_watch_init (&watch, body, &geocentre, ANT_RADII_ALMANAC);
      for (double day = -3000; day < 3000; day += 997)
        {
          g_assert_cmpint (ant_watch_look (&watch, day - 1e-9, &before), ==, ANT_OK);
          g_assert_cmpint (ant_watch_look (&watch, day, &after), ==, ANT_OK);
          g_assert_cmpfloat_with_epsilon (before.separation / ARCSEC, after.separation / ARCSEC, 1e-3);
        }
    }
}

static void
offsets_have_the_length_of_the_separation (void)
{
  AntWatch watch;
  AntLook look;
  ant_watch_init (&watch, ANT_BODY_VENUS, &geocentre, ANT_RADII_ALMANAC);
  g_assert_cmpint (ant_watch_look (&watch, tt (2004, 6, 8, 8, 19, 44), &look), ==, ANT_OK);
  g_assert_cmpfloat_with_epsilon (hypot (look.east, look.north), look.separation, 1e-12);
  g_assert_cmpfloat (look.north, <, 0); /* it crossed the southern half, from east to west */
  double was = look.east;
  g_assert_cmpint (ant_watch_look (&watch, tt (2004, 6, 8, 9, 19, 44), &look), ==, ANT_OK);
  g_assert_cmpfloat (look.east, <, was);
}

static void
a_planet_behind_the_sun_takes_nothing (void)
{
  AntWatch watch;
  AntLook look;
  ant_watch_init (&watch, ANT_BODY_VENUS, &geocentre, ANT_RADII_ALMANAC);
  /* Superior conjunction of 2008-06-09, behind the disc. */
  g_assert_cmpint (ant_watch_look (&watch, tt (2008, 6, 9, 3, 0, 0), &look), ==, ANT_OK);
  g_assert_cmpfloat (look.separation, <, look.sun_radius);
  g_assert_cmpfloat (ant_look_loss (&look, ANT_LIMB_DARKENING_SUN), ==, 0);
}

static void
times_outside_the_theories_are_refused (void)
{
  AntWatch watch;
  AntLook look;
  ant_watch_init (&watch, ANT_BODY_VENUS, &geocentre, ANT_RADII_ALMANAC);
  g_assert_cmpint (ant_watch_look (&watch, ANT_SKY_LAST_TT_D + 1, &look), ==, ANT_BAD_ARGUMENT);
  g_assert_cmpint (ant_watch_look_rough (&watch, ANT_SKY_FIRST_TT_D - 1, &look), ==, ANT_BAD_ARGUMENT);
  g_assert_cmpint (ant_watch_look (&watch, NAN, &look), ==, ANT_BAD_ARGUMENT);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/sky/look/a-planet-passes-beside-the-sun-as-it-did", a_planet_passes_beside_the_sun_as_it_did);
  g_test_add_func ("/sky/look/tracks-join-without-a-step", tracks_join_without_a_step);
  g_test_add_func ("/sky/look/offsets-have-the-length-of-the-separation", offsets_have_the_length_of_the_separation);
  g_test_add_func ("/sky/look/a-planet-behind-the-sun-takes-nothing", a_planet_behind_the_sun_takes_nothing);
  g_test_add_func ("/sky/look/times-outside-the-theories-are-refused", times_outside_the_theories_are_refused);
  return g_test_run ();
}
