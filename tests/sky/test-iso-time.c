/* test-iso-time.c - written times are read exactly, impossible ones are not read. */
#include "sky/iso-time.h"

#include <glib.h>
#include <string.h>

static int
reads (const char *text, AntIsoTime *time)
{
  /* A heap copy without terminator, so that a step beyond the end is seen by the sanitizers. */
  gsize n = strlen (text);
  g_autofree char *copy = g_memdup2 (text, n ? n : 1);
  return ant_iso_read (copy, copy + n, time);
}

static void
everyday_forms_mean_the_same_instant (void)
{
  static const char *const same[] = {
    "2041-03-14T07:12:05Z",      "2041-03-14 07:12:05Z",  "2041/03/14 07:12:05 UTC", "2041-073T07:12:05Z",
    "20410314T071205Z",          "2041-03-14t07:12:05z",  " 2041-03-14T07:12:05.000Z ", "2041-03-14T09:12:05+02:00",
    "2041-03-13T21:12:05-1000",  "2041-03-14_07:12:05,0", "2041-03-14T07:12:05",     "2041-03-14  08:12:05+01",
  };
  double jd1, jd2, a1, a2;
  ant_time_from_calendar (ANT_SCALE_UTC, 2041, 3, 14, 7, 12, 5.0, &jd1, &jd2);
  for (gsize i = 0; i < G_N_ELEMENTS (same); i++)
    {
      AntIsoTime time;
      g_test_message ("%s", same[i]);
      g_assert_true (reads (same[i], &time));
      g_assert_cmpint (ant_iso_instant (&time, ANT_SCALE_UTC, &a1, &a2), ==, ANT_OK);
      g_assert_cmpfloat_with_epsilon (((a1 - jd1) + (a2 - jd2)) * 86400.0, 0.0, 1e-5);
    }
}

static void
what_is_no_time_is_not_read (void)
{
  static const char *const bad[] = {
    "",           "2041",          "2041-3-14",           "2041-13-01",          "2041-02-29",     "2041-366",
    "2041-000",   "204103140",     "2041-03-14T",         "2041-03-14T7:12",     "2041-03-14T25", "2041-03-14T24:00:01",
    "2041-03/14", "2041-03-14T07:60", "2041-03-14T07:12:61", "2041-03-14T07:12:05X", "12:00",       "2041-03-14T07:12:05+1",
    "1361.5",     "-41-03-14",     "2041-03-14T07:1",     "2041-03-14x07:12",    "20410314071205", "2041-03-14T07:12:05 Z Z",
  };
  for (gsize i = 0; i < G_N_ELEMENTS (bad); i++)
    {
      AntIsoTime time;
      g_test_message ("%s", bad[i]);
      g_assert_false (reads (bad[i], &time));
    }
}

static void
fractions_and_leap_seconds_are_kept (void)
{
  AntIsoTime time;
  double jd1, jd2, second;
  int leap;
  g_assert_true (reads ("2016-12-31T23:59:60.5Z", &time));
  g_assert_true (time.leap);
  g_assert_cmpfloat (time.second, ==, 86400.5);
  g_assert_cmpint (ant_iso_instant (&time, ANT_SCALE_UTC, &jd1, &jd2), ==, ANT_OK);
  g_assert_cmpfloat_with_epsilon (jd1 + jd2, 2457754.499994213, 1e-9);
  g_assert_true (reads ("2016-12-30T23:59:60Z", &time));
  g_assert_cmpint (ant_iso_instant (&time, ANT_SCALE_UTC, &jd1, &jd2), ==, ANT_BAD_ARGUMENT);
  g_assert_true (reads ("2021-05-09 00:07:09.589416", &time));
  g_assert_cmpfloat_with_epsilon (time.second, 429.589416, 1e-12);
  g_assert_true (ant_iso_read_clock ("002920", "002920" + 6, &second, &leap));
  g_assert_cmpfloat (second, ==, 1760.0);
  g_assert_true (reads ("2020-01-01T24:00", &time));
  g_assert_cmpfloat (time.second, ==, 86400.0);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/sky/iso-time/everyday-forms-mean-the-same-instant", everyday_forms_mean_the_same_instant);
  g_test_add_func ("/sky/iso-time/what-is-no-time-is-not-read", what_is_no_time_is_not_read);
  g_test_add_func ("/sky/iso-time/fractions-and-leap-seconds-are-kept", fractions_and_leap_seconds_are_kept);
  return g_test_run ();
}
