/* test-time-scale.c - time scales and calendars against published anchors and against each other. */
#include "sky/time-scale.h"

#include <glib.h>
#include <math.h>
#include <string.h>

#include "sky/iso-time.h"

/* Check values made once by a separate program from the ERFA routines (IAU SOFA algorithms). The Unix column leaves
 * out leap-second days, where that program stretched the day instead of following POSIX. */
static const struct
{
  int year, month, day, hour, minute;
  double second;
  double jd_utc, mjd_tt, tai_1972_s, gps_s, unix_s;
} anchors[] = {
  { 1972, 1, 1, 0, 0, 0, 2441317.500000000, 41317.0004882407, 10.000, -252892809.0, 63072000.0 },
  { 1999, 11, 15, 21, 41, 0, 2451498.403472222, 51497.9042150926, 879630092.0, 626737273.0, 942702060.0 },
  { 2003, 10, 29, 0, 0, 0, 2452941.500000000, 52941.0007428704, 1004313632.0, 751420813.0, 1067385600.0 },
  { 2004, 6, 8, 8, 19, 44, 2453164.847037037, 53164.3477799074, 1023610816.0, 770717997.0, 1086682784.0 },
  { 2006, 1, 1, 0, 0, 0, 2453736.500000000, 53736.0007544444, 1073001633.0, 820108814.0, 1136073600.0 },
  { 2008, 12, 31, 23, 59, 60, 2454832.499988426, 54832.0007544444, 1167696033.0, 914803214.0, NAN },
  { 2012, 6, 6, 1, 29, 36, 2456084.562222222, 56084.0629882407, 1275874210.0, 1022981391.0, 1338946176.0 },
  { 2012, 6, 30, 23, 59, 60, 2456109.499988426, 56109.0007660185, 1278028834.0, 1025136015.0, NAN },
  { 2015, 6, 30, 23, 59, 59, 2457204.499976852, 57204.0007660185, 1372636834.0, 1119744015.0, NAN },
  { 2015, 7, 1, 0, 0, 0, 2457204.500000000, 57204.0007891667, 1372636836.0, 1119744017.0, 1435708800.0 },
  { 2016, 12, 31, 23, 59, 58, 2457754.499965278, 57754.0007660185, 1420156834.0, 1167264015.0, NAN },
  { 2016, 12, 31, 23, 59, 59, 2457754.499976852, 57754.0007775926, 1420156835.0, 1167264016.0, NAN },
  { 2016, 12, 31, 23, 59, 60, 2457754.499988426, 57754.0007891667, 1420156836.0, 1167264017.0, NAN },
  { 2016, 12, 31, 23, 59, 60.5, 2457754.499994213, 57754.0007949537, 1420156836.5, 1167264017.5, NAN },
  { 2017, 1, 1, 0, 0, 0, 2457754.500000000, 57754.0008007407, 1420156837.0, 1167264018.0, 1483228800.0 },
  { 2032, 11, 13, 8, 54, 0, 2463549.870833333, 63549.3716340741, 1920876877.0, 1667984058.0, 1983948840.0 },
};

static void
utc_anchors_reach_every_scale (void)
{
  for (gsize i = 0; i < G_N_ELEMENTS (anchors); i++)
    {
      double jd1, jd2, a, b;
      g_assert_cmpint (ant_time_from_calendar (ANT_SCALE_UTC, anchors[i].year, anchors[i].month, anchors[i].day,
                                               anchors[i].hour, anchors[i].minute, anchors[i].second, &jd1, &jd2),
                       ==, ANT_OK);
      g_assert_cmpfloat_with_epsilon (jd1 + jd2, anchors[i].jd_utc, 1e-9);
      g_assert_cmpint (ant_time_convert (ANT_SCALE_UTC, jd1, jd2, ANT_SCALE_TT, &a, &b), ==, ANT_OK);
      g_assert_cmpfloat_with_epsilon ((a - 2400000.5) + b, anchors[i].mjd_tt, 2e-10);
      g_assert_cmpint (ant_time_convert (ANT_SCALE_UTC, jd1, jd2, ANT_SCALE_TAI, &a, &b), ==, ANT_OK);
      g_assert_cmpfloat_with_epsilon (((a - 2441317.5) + b) * 86400.0, anchors[i].tai_1972_s, 2e-5);
      g_assert_cmpint (ant_time_convert (ANT_SCALE_UTC, jd1, jd2, ANT_SCALE_GPS, &a, &b), ==, ANT_OK);
      g_assert_cmpfloat_with_epsilon (((a - 2444244.5) + b) * 86400.0, anchors[i].gps_s, 2e-5);
      g_assert_cmpint (ant_time_convert (ANT_SCALE_UTC, jd1, jd2, ANT_SCALE_UNIX, &a, &b), ==, ANT_OK);
      if (isfinite (anchors[i].unix_s))
        g_assert_cmpfloat_with_epsilon (((a - 2440587.5) + b) * 86400.0, anchors[i].unix_s, 2e-5);
    }
}

/* The same table's calendars, to the microsecond that they are written with. */
static void
the_calendars_of_tai_and_tt_agree_to_the_microsecond (void)
{
  static const struct
  {
    const char *utc, *tai, *tt;
  } rows[] = {
    { "1972-01-01T00:00:00.000000Z", "1972-01-01T00:00:10.000000", "1972-01-01T00:00:42.184000" },
    { "1999-11-15T21:41:00.000000Z", "1999-11-15T21:41:32.000000", "1999-11-15T21:42:04.184000" },
    { "2003-10-29T00:00:00.000000Z", "2003-10-29T00:00:32.000000", "2003-10-29T00:01:04.184000" },
    { "2004-06-08T08:19:44.000000Z", "2004-06-08T08:20:16.000000", "2004-06-08T08:20:48.184000" },
    { "2006-01-01T00:00:00.000000Z", "2006-01-01T00:00:33.000000", "2006-01-01T00:01:05.184000" },
    { "2008-12-31T23:59:60.000000Z", "2009-01-01T00:00:33.000000", "2009-01-01T00:01:05.184000" },
    { "2012-06-06T01:29:36.000000Z", "2012-06-06T01:30:10.000000", "2012-06-06T01:30:42.184000" },
    { "2012-06-30T23:59:60.000000Z", "2012-07-01T00:00:34.000000", "2012-07-01T00:01:06.184000" },
    { "2015-06-30T23:59:59.000000Z", "2015-07-01T00:00:34.000000", "2015-07-01T00:01:06.184000" },
    { "2015-07-01T00:00:00.000000Z", "2015-07-01T00:00:36.000000", "2015-07-01T00:01:08.184000" },
    { "2016-12-31T23:59:58.000000Z", "2017-01-01T00:00:34.000000", "2017-01-01T00:01:06.184000" },
    { "2016-12-31T23:59:59.000000Z", "2017-01-01T00:00:35.000000", "2017-01-01T00:01:07.184000" },
    { "2016-12-31T23:59:60.000000Z", "2017-01-01T00:00:36.000000", "2017-01-01T00:01:08.184000" },
    { "2016-12-31T23:59:60.500000Z", "2017-01-01T00:00:36.500000", "2017-01-01T00:01:08.684000" },
    { "2017-01-01T00:00:00.000000Z", "2017-01-01T00:00:37.000000", "2017-01-01T00:01:09.184000" },
    { "2032-11-13T08:54:00.000000Z", "2032-11-13T08:54:37.000000", "2032-11-13T08:55:09.184000" },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (rows); i++)
    {
      AntIsoTime iso;
      char text[40];
      double jd1, jd2, a, b, back1, back2;
      g_assert_true (ant_iso_read (rows[i].utc, rows[i].utc + strlen (rows[i].utc), &iso));
      g_assert_cmpint (ant_iso_instant (&iso, ANT_SCALE_UTC, &jd1, &jd2), ==, ANT_OK);
      g_assert_cmpint (ant_time_convert (ANT_SCALE_UTC, jd1, jd2, ANT_SCALE_TAI, &a, &b), ==, ANT_OK);
      g_assert_cmpint (ant_time_text (ANT_SCALE_TAI, a, b, 6, sizeof text, text), ==, ANT_OK);
      g_assert_cmpstr (text, ==, rows[i].tai);
      g_assert_cmpint (ant_time_convert (ANT_SCALE_UTC, jd1, jd2, ANT_SCALE_TT, &a, &b), ==, ANT_OK);
      g_assert_cmpint (ant_time_text (ANT_SCALE_TT, a, b, 6, sizeof text, text), ==, ANT_OK);
      g_assert_cmpstr (text, ==, rows[i].tt);
      g_assert_cmpint (ant_time_convert (ANT_SCALE_TT, a, b, ANT_SCALE_UTC, &back1, &back2), ==, ANT_OK);
      g_assert_cmpint (ant_time_text (ANT_SCALE_UTC, back1, back2, 6, sizeof text, text), ==, ANT_OK);
      g_assert_cmpstr (text, ==, rows[i].utc);
    }
}

/* The Bulletin C history: TAI - UTC from the first day of these months. */
static void
every_leap_second_since_1972_is_counted (void)
{
  static const int table[][3] = {
    { 1972, 1, 10 }, { 1972, 7, 11 }, { 1973, 1, 12 }, { 1974, 1, 13 }, { 1975, 1, 14 }, { 1976, 1, 15 }, { 1977, 1, 16 },
    { 1978, 1, 17 }, { 1979, 1, 18 }, { 1980, 1, 19 }, { 1981, 7, 20 }, { 1982, 7, 21 }, { 1983, 7, 22 }, { 1985, 7, 23 },
    { 1988, 1, 24 }, { 1990, 1, 25 }, { 1991, 1, 26 }, { 1992, 7, 27 }, { 1993, 7, 28 }, { 1994, 7, 29 }, { 1996, 1, 30 },
    { 1997, 7, 31 }, { 1999, 1, 32 }, { 2006, 1, 33 }, { 2009, 1, 34 }, { 2012, 7, 35 }, { 2015, 7, 36 }, { 2017, 1, 37 },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (table); i++)
    {
      double jd1, jd2, tai1, tai2;
      ant_time_from_calendar (ANT_SCALE_UTC, table[i][0], table[i][1], 1, 0, 0, 0.0, &jd1, &jd2);
      ant_time_convert (ANT_SCALE_UTC, jd1, jd2, ANT_SCALE_TAI, &tai1, &tai2);
      g_assert_cmpfloat_with_epsilon (((tai1 - jd1) + (tai2 - jd2)) * 86400.0, table[i][2], 1e-6);
      if (i == 0)
        continue;
      /* The day before is 86401 s long. */
      g_assert_cmpfloat_with_epsilon (ant_time_elapsed_d (ANT_SCALE_UTC, jd1, jd2 - 1.0, jd1, jd2) * 86400.0, 86401.0, 1e-6);
    }
}

static void
every_pair_of_scales_goes_there_and_back (void)
{
  for (int from = ANT_SCALE_UTC; from <= ANT_SCALE_UNIX; from++)
    for (int to = ANT_SCALE_UTC; to <= ANT_SCALE_UNIX; to++)
      for (double jd = 2441400.5; jd < 2466000.0; jd += 1234.567)
        {
          double a1, a2, b1, b2;
          g_assert_cmpint (ant_time_convert (from, jd, 0.123, to, &a1, &a2), ==, ANT_OK);
          g_assert_cmpint (ant_time_convert (to, a1, a2, from, &b1, &b2), ==, ANT_OK);
          g_assert_cmpfloat_with_epsilon (((b1 - jd) + (b2 - 0.123)) * 86400.0, 0.0, 1e-6);
        }
}

/* TDB - TT never leaves +-2 ms and reaches 1.6 ms each year (Fairhead & Bretagnon 1990). */
static void
tdb_swings_by_milliseconds_about_tt (void)
{
  double low = 0.0, high = 0.0;
  for (double jd = 2451544.5; jd < 2451910.5; jd += 1.0)
    {
      double a1, a2;
      ant_time_convert (ANT_SCALE_TT, jd, 0.0, ANT_SCALE_TDB, &a1, &a2);
      double difference_s = ((a1 - jd) + a2) * 86400.0;
      low = MIN (low, difference_s);
      high = MAX (high, difference_s);
    }
  g_assert_cmpfloat (high, >, 0.0015);
  g_assert_cmpfloat (high, <, 0.002);
  g_assert_cmpfloat (low, <, -0.0015);
  g_assert_cmpfloat (low, >, -0.002);
}

static void
a_leap_second_survives_being_written (void)
{
  double jd1, jd2;
  char text[40];
  ant_time_from_calendar (ANT_SCALE_UTC, 2016, 12, 31, 23, 59, 60.25, &jd1, &jd2);
  g_assert_cmpint (ant_time_text (ANT_SCALE_UTC, jd1, jd2, 2, sizeof text, text), ==, ANT_OK);
  g_assert_cmpstr (text, ==, "2016-12-31T23:59:60.25Z");
  ant_time_text (ANT_SCALE_UTC, jd1, jd2, 0, sizeof text, text);
  g_assert_cmpstr (text, ==, "2016-12-31T23:59:60Z");
  ant_time_after (ANT_SCALE_UTC, jd1, jd2, 0.75 / 86400.0, &jd1, &jd2);
  ant_time_text (ANT_SCALE_UTC, jd1, jd2, 3, sizeof text, text);
  g_assert_cmpstr (text, ==, "2017-01-01T00:00:00.000Z");
}

static void
text_rounds_over_midnight_and_marks_utc_only (void)
{
  double jd1, jd2;
  char text[40];
  ant_time_from_calendar (ANT_SCALE_TT, 1999, 12, 31, 23, 59, 59.96, &jd1, &jd2);
  ant_time_text (ANT_SCALE_TT, jd1, jd2, 1, sizeof text, text);
  g_assert_cmpstr (text, ==, "2000-01-01T00:00:00.0");
}

static void
impossible_dates_are_refused (void)
{
  static const double bad[][6] = {
    { 2015, 2, 29, 0, 0, 0 },    { 2015, 13, 1, 0, 0, 0 },   { 2015, 0, 1, 0, 0, 0 },     { 2015, 1, 32, 0, 0, 0 },
    { 2015, 1, 1, 24, 0, 1 },    { 2015, 1, 1, 25, 0, 0 },   { 2015, 1, 1, 12, 60, 0 },   { 2015, 1, 1, 12, 0, 60 },
    { 2015, 6, 29, 23, 59, 60 }, { 2015, 1, 1, 12, 0, NAN }, { 2016, 12, 31, 23, 59, 61 }, { 123456, 1, 1, 0, 0, 0 },
    { 2016, 12, 31, 22, 59, 60 }, { 2015, 1, 1, 0, 0, -1 },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (bad); i++)
    {
      double jd1, jd2;
      g_assert_cmpint (ant_time_from_calendar (ANT_SCALE_UTC, (int) bad[i][0], (int) bad[i][1], (int) bad[i][2],
                                               (int) bad[i][3], (int) bad[i][4], bad[i][5], &jd1, &jd2),
                       ==, ANT_BAD_ARGUMENT);
    }
  double jd1, jd2;
  g_assert_cmpint (ant_time_from_calendar (ANT_SCALE_TT, 2016, 12, 31, 23, 59, 60, &jd1, &jd2), ==, ANT_BAD_ARGUMENT);
}

static void
hour_24_is_the_next_midnight (void)
{
  double a1, a2, b1, b2;
  ant_time_from_calendar (ANT_SCALE_UTC, 2016, 12, 31, 24, 0, 0, &a1, &a2);
  ant_time_from_calendar (ANT_SCALE_UTC, 2017, 1, 1, 0, 0, 0, &b1, &b2);
  g_assert_cmpfloat ((a1 - b1) + (a2 - b2), ==, 0.0);
}

static void
posix_seconds_fold_the_leap_second_onto_the_next_day (void)
{
  double utc1, utc2, a1, a2, b1, b2;
  ant_time_from_calendar (ANT_SCALE_UTC, 2016, 12, 31, 23, 59, 60.0, &utc1, &utc2);
  ant_time_convert (ANT_SCALE_UTC, utc1, utc2, ANT_SCALE_UNIX, &a1, &a2);
  g_assert_cmpfloat_with_epsilon (((a1 - 2440587.5) + a2) * 86400.0, 1483228800.0, 1e-4);
  ant_time_from_calendar (ANT_SCALE_UTC, 2016, 12, 31, 23, 59, 59.0, &utc1, &utc2);
  ant_time_convert (ANT_SCALE_UTC, utc1, utc2, ANT_SCALE_UNIX, &b1, &b2);
  g_assert_cmpfloat_with_epsilon (((b1 - 2440587.5) + b2) * 86400.0, 1483228799.0, 1e-4);
  /* Two Unix times an SI second apart across it are two seconds apart in elapsed time. */
  g_assert_cmpfloat_with_epsilon (ant_time_elapsed_d (ANT_SCALE_UNIX, 2457753.5, 0.0, 2457754.5, 0.0) * 86400.0, 86401.0, 1e-6);
}

static void
elapsed_and_after_are_each_others_inverse (void)
{
  for (int scale = ANT_SCALE_UNKNOWN; scale <= ANT_SCALE_UNIX; scale++)
    for (double elapsed_d = -4000.3; elapsed_d < 4000.0; elapsed_d += 311.7)
      {
        double b1, b2;
        g_assert_cmpint (ant_time_after (scale, 2455000.5, 0.25, elapsed_d, &b1, &b2), ==, ANT_OK);
        double back_d = ant_time_elapsed_d (scale, 2455000.5, 0.25, b1, b2);
        g_assert_cmpfloat_with_epsilon ((back_d - elapsed_d) * 86400.0, 0.0, 1e-6);
      }
}

static void
day_of_year_and_decimal_year_meet_the_calendar (void)
{
  double a1, a2, b1, b2;
  ant_time_from_day_of_year (ANT_SCALE_UTC, 2004, 160.25, &a1, &a2);
  ant_time_from_calendar (ANT_SCALE_UTC, 2004, 6, 8, 6, 0, 0, &b1, &b2);
  g_assert_cmpfloat ((a1 - b1) + (a2 - b2), ==, 0.0);
  g_assert_cmpint (ant_time_from_day_of_year (ANT_SCALE_UTC, 2004, 366.5, &a1, &a2), ==, ANT_OK);
  g_assert_cmpint (ant_time_from_day_of_year (ANT_SCALE_UTC, 2005, 366.5, &a1, &a2), ==, ANT_BAD_ARGUMENT);
  g_assert_cmpint (ant_time_from_day_of_year (ANT_SCALE_UTC, 2005, 0.5, &a1, &a2), ==, ANT_BAD_ARGUMENT);
  ant_time_from_decimal_year (ANT_SCALE_UTC, 2004.5, &a1, &a2);
  ant_time_from_calendar (ANT_SCALE_UTC, 2004, 7, 2, 0, 0, 0, &b1, &b2);
  g_assert_cmpfloat ((a1 - b1) + (a2 - b2), ==, 0.0);
  for (double year = 1970.0; year < 2050.0; year += 0.777)
    {
      ant_time_from_decimal_year (ANT_SCALE_TT, year, &a1, &a2);
      g_assert_cmpfloat_with_epsilon (ant_time_to_decimal_year (a1, a2), year, 1e-11);
    }
}

static void
names_are_known_in_any_case (void)
{
  g_assert_cmpint (ant_time_scale_from_name ("utc"), ==, ANT_SCALE_UTC);
  g_assert_cmpint (ant_time_scale_from_name ("tdt"), ==, ANT_SCALE_TT);
  g_assert_cmpint (ant_time_scale_from_name ("Et"), ==, ANT_SCALE_TT);
  g_assert_cmpint (ant_time_scale_from_name ("martian"), ==, ANT_SCALE_UNKNOWN);
  for (int scale = ANT_SCALE_UNKNOWN; scale <= ANT_SCALE_UNIX; scale++)
    g_assert_cmpint (ant_time_scale_from_name (ant_time_scale_name (scale)), ==, scale);
}

static void
numbers_that_are_no_dates_are_refused (void)
{
  static const double bad[] = { NAN, INFINITY, 1e300, -1e300, 1e12 };
  char text[40];
  double a, b;
  for (gsize i = 0; i < G_N_ELEMENTS (bad); i++)
    {
      g_assert_cmpint (ant_time_convert (ANT_SCALE_UTC, bad[i], 0.0, ANT_SCALE_TT, &a, &b), ==, ANT_BAD_ARGUMENT);
      g_assert_cmpint (ant_time_text (ANT_SCALE_UTC, bad[i], 0.0, 0, sizeof text, text), ==, ANT_BAD_ARGUMENT);
      g_assert_cmpint (ant_time_from_decimal_year (ANT_SCALE_UTC, bad[i], &a, &b), ==, ANT_BAD_ARGUMENT);
      g_assert_cmpint (ant_time_from_day_of_year (ANT_SCALE_UTC, 2000, bad[i], &a, &b), ==, ANT_BAD_ARGUMENT);
      g_assert_true (isnan (ant_time_to_decimal_year (bad[i], 0.0)));
    }
  g_assert_cmpint (ant_time_convert (ANT_SCALE_UNKNOWN, 2455000.5, 0.0, ANT_SCALE_TT, &a, &b), ==, ANT_BAD_ARGUMENT);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/sky/time-scale/utc-anchors-reach-every-scale", utc_anchors_reach_every_scale);
  g_test_add_func ("/sky/time-scale/the-calendars-of-tai-and-tt-agree-to-the-microsecond",
                   the_calendars_of_tai_and_tt_agree_to_the_microsecond);
  g_test_add_func ("/sky/time-scale/every-leap-second-since-1972-is-counted", every_leap_second_since_1972_is_counted);
  g_test_add_func ("/sky/time-scale/every-pair-of-scales-goes-there-and-back", every_pair_of_scales_goes_there_and_back);
  g_test_add_func ("/sky/time-scale/tdb-swings-by-milliseconds-about-tt", tdb_swings_by_milliseconds_about_tt);
  g_test_add_func ("/sky/time-scale/a-leap-second-survives-being-written", a_leap_second_survives_being_written);
  g_test_add_func ("/sky/time-scale/text-rounds-over-midnight-and-marks-utc-only", text_rounds_over_midnight_and_marks_utc_only);
  g_test_add_func ("/sky/time-scale/impossible-dates-are-refused", impossible_dates_are_refused);
  g_test_add_func ("/sky/time-scale/hour-24-is-the-next-midnight", hour_24_is_the_next_midnight);
  g_test_add_func ("/sky/time-scale/posix-seconds-fold-the-leap-second-onto-the-next-day",
                   posix_seconds_fold_the_leap_second_onto_the_next_day);
  g_test_add_func ("/sky/time-scale/elapsed-and-after-are-each-others-inverse", elapsed_and_after_are_each_others_inverse);
  g_test_add_func ("/sky/time-scale/day-of-year-and-decimal-year-meet-the-calendar",
                   day_of_year_and_decimal_year_meet_the_calendar);
  g_test_add_func ("/sky/time-scale/names-are-known-in-any-case", names_are_known_in_any_case);
  g_test_add_func ("/sky/time-scale/numbers-that-are-no-dates-are-refused", numbers_that_are_no_dates_are_refused);
  return g_test_run ();
}
