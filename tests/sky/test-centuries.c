/* test-centuries.c - four centuries hold every crossing that the catalogues list, and no other. */
#include <glib.h>

#include "sky/sky-events.h"
#include "sky/time-scale.h"

static double
midnight (int year)
{
  double jd1, jd2;
  g_assert_cmpint (ant_time_from_calendar (ANT_SCALE_TT, year, 1, 1, 0, 0, 0, &jd1, &jd2), ==, ANT_OK);
  return jd1 - ANT_J2000_JD + jd2;
}

/* All crossings of four centuries by the day of their middle (UT): Espenak's catalogues, from memory. Almanac radii; that
 * of 1937 only grazes. */
static const char *const mercury_days[] = {
  "1802-11-09", "1815-11-12", "1822-11-05", "1832-05-05", "1835-11-07", "1845-05-08", "1848-11-09", "1861-11-12",
  "1868-11-05", "1878-05-06", "1881-11-08", "1891-05-10", "1894-11-10", "1907-11-14", "1914-11-07", "1924-05-08",
  "1927-11-10", "1937-05-11", "1940-11-11", "1953-11-14", "1957-05-06", "1960-11-07", "1970-05-09", "1973-11-10",
  "1986-11-13", "1993-11-06", "1999-11-15", "2003-05-07", "2006-11-08", "2016-05-09", "2019-11-11", "2032-11-13",
  "2039-11-07", "2049-05-07", "2052-11-09", "2062-05-10", "2065-11-11", "2078-11-14", "2085-11-07", "2095-05-08",
  "2098-11-10", "2108-05-12", "2111-11-14", "2124-11-15", "2131-11-09", "2141-05-10", "2144-11-11", "2154-05-13",
  "2157-11-14", "2170-11-16", "2174-05-08", "2177-11-09", "2187-05-11", "2190-11-12",
};
static const char *const venus_days[] = { "1874-12-09", "1882-12-06", "2004-06-08", "2012-06-06", "2117-12-11", "2125-12-08" };

static void
four_centuries_hold_all_crossings_and_no_others (void)
{
  const AntObserver geocentre = { .kind = ANT_OBSERVER_EARTH };
  AntSkyOptions options = { &geocentre, ANT_RADII_ALMANAC, ANT_LIMB_DARKENING_SUN, NULL };
  g_autofree AntSkyEvent *event = NULL;
  size_t n, n_mercury = 0, n_venus = 0;
  g_assert_cmpint (ant_sky_events (&options, midnight (1800), midnight (2200), &n, &event), ==, ANT_OK);
  for (size_t i = 0; i < n; i++)
    {
      char text[40];
      g_assert_true (i == 0 || event[i].greatest_tt_d > event[i - 1].greatest_tt_d);
      g_assert_cmpint (ant_time_text (ANT_SCALE_TT, ANT_J2000_JD, event[i].greatest_tt_d, 0, sizeof text, text), ==, ANT_OK);
      text[10] = '\0';
      if (event[i].body == ANT_BODY_MERCURY && n_mercury < G_N_ELEMENTS (mercury_days))
        g_assert_cmpstr (text, ==, mercury_days[n_mercury]);
      if (event[i].body == ANT_BODY_VENUS && n_venus < G_N_ELEMENTS (venus_days))
        g_assert_cmpstr (text, ==, venus_days[n_venus]);
      n_mercury += event[i].body == ANT_BODY_MERCURY;
      n_venus += event[i].body == ANT_BODY_VENUS;
    }
  g_assert_cmpuint (n_mercury, ==, G_N_ELEMENTS (mercury_days));
  g_assert_cmpuint (n_venus, ==, G_N_ELEMENTS (venus_days));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/sky/centuries/four-centuries-hold-all-crossings-and-no-others", four_centuries_hold_all_crossings_and_no_others);
  return g_test_run ();
}
