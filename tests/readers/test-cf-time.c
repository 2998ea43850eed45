/* test-cf-time.c - times of the CF conventions come to the right instant, and calendars that no clock keeps are refused. */
#include "data/error.h"
#include "readers/cf-time.h"

#include <math.h>
#include <string.h>

static AntCfTime
parsed (const char *units, const char *calendar, const char *metadata)
{
  g_autoptr (GError) error = NULL;
  AntCfTime time;
  ant_cf_time_parse (units, calendar, metadata, NULL, &time, &error);
  g_assert_no_error (error);
  return time;
}

/* The instant of a number in the time's own scale, as text. */
static void
expect (const char *units, const char *calendar, double number, const char *expected)
{
  AntCfTime time = parsed (units, calendar, NULL);
  AntTimeReference reference = { 0 };
  double elapsed_d = ant_cf_time_read (&time, number), jd1, jd2;
  char text[40];
  g_assert_true (isfinite (elapsed_d));
  ant_cf_time_reference (&time, &reference);
  g_assert_cmpint (ant_time_after (reference.scale, reference.origin_jd1, reference.origin_jd2, elapsed_d, &jd1, &jd2), ==, ANT_OK);
  g_assert_cmpint (ant_time_text (reference.scale, jd1, jd2, 3, sizeof text, text), ==, ANT_OK);
  g_test_message ("%s, %s, %.10g", units, calendar ? calendar : "none", number);
  g_assert_cmpstr (text, ==, expected);
}

/* CF conventions 1.12, example 4.5: the same units and number in three calendars. */
static void
calendars_differ_in_their_leap_seconds (void)
{
  const char *units = "seconds since 2016-12-31 23:59:58";
  expect (units, "tai", 2, "2017-01-01T00:00:00.000");
  expect (units, "standard", 2, "2017-01-01T00:00:00.000Z");
  expect (units, "utc", 2, "2016-12-31T23:59:60.000Z");
  expect (units, "proleptic_gregorian", 2, "2017-01-01T00:00:00.000Z");
  expect (units, "gregorian", 86402, "2017-01-02T00:00:00.000Z");
  expect (units, "utc", 3, "2017-01-01T00:00:00.000Z");
  expect (units, "utc", 86403, "2017-01-02T00:00:00.000Z");
  expect ("seconds since 2016-12-31 23:59:60", "utc", 1, "2017-01-01T00:00:00.000Z");
  expect ("seconds since 2016-12-31 23:59:60", "utc", -1, "2016-12-31T23:59:59.000Z");
}

/* CF conventions 1.12, section 4.4.1: the same instant in every way of writing its zone. */
static void
zones_of_every_form_are_taken_off (void)
{
  static const char *const same[] = {
    "seconds since 1992-10-8 15:15:42.5 -6:00", "seconds since 1992-10-08T15:15:42.5-06:00", "seconds since 1992-10-8 15:15:42.5 -6",
    "seconds since 1992-10-8 15:15:42.5 -0600", "seconds since 1992-10-8 15:15:42.5 -600",   "seconds since 1992-10-8 21:15:42.5 Z",
    "seconds since 1992-10-8 21:15:42.5",       "seconds since 1992-10-8 21:15:42.5 UTC",    "seconds since 1992-10-9 02:45:42.5 5:30",
    "seconds since 1992-10-9 02:45:42.5 0530",  "seconds since 1992-10-9 02:45:42.5 +530",
  };
  for (gsize i = 0; i < G_N_ELEMENTS (same); i++)
    expect (same[i], NULL, 0, "1992-10-08T21:15:42.500Z");
  expect ("days since 1989-12-31 18:00:00 -6", NULL, 0, "1990-01-01T00:00:00.000Z");
}

static void
units_have_their_fixed_lengths (void)
{
  expect ("s since 2003-02-25", NULL, 86400, "2003-02-26T00:00:00.000Z");
  expect ("minutes since 2003-02-25 0:0:0", NULL, 1440, "2003-02-26T00:00:00.000Z");
  expect ("hours since 2003-2-25 12:00", NULL, 12, "2003-02-26T00:00:00.000Z");
  expect ("days since 2003-02-25", NULL, 3650.5, "2013-02-22T12:00:00.000Z");
  expect ("milliseconds since 2003-02-25", NULL, 500, "2003-02-25T00:00:00.500Z");
  expect ("nanoseconds since 1970-01-01", NULL, 1435708799965000000.0, "2015-06-30T23:59:59.965Z");
  expect ("Days Since 1610-01-01 00:00:00", "gregorian", 143541.5, "2003-01-02T12:00:00.000Z");
  expect ("years since 2000-01-01", NULL, 1, "2000-12-31T05:48:45.975Z"); /* 365.242198781 d */
  expect ("seconds since 1970-01-01 00:00:00.0 UTC", NULL, 1435708799.965, "2015-06-30T23:59:59.965Z");
}

/* 1582-10-15 is the day after 1582-10-04 in the standard calendar only. */
static void
the_standard_calendar_is_mixed (void)
{
  expect ("days since 1582-10-04", "standard", 1 + 153388, "2002-10-01T00:00:00.000Z");
  expect ("days since 1582-10-15", "standard", 153388, "2002-10-01T00:00:00.000Z");
  expect ("days since 1582-10-05", "proleptic_gregorian", 10 + 153388, "2002-10-01T00:00:00.000Z");
  expect ("days since 1-1-1", "standard", 719164, "1970-01-01T00:00:00.000Z"); /* two days of leap years more than Gregorian */
  expect ("days since 1-1-1", "proleptic_gregorian", 719162, "1970-01-01T00:00:00.000Z");
}

/* A microsecond over a century, and steps of a second across a leap second. */
static void
times_are_right_to_a_microsecond (void)
{
  AntCfTime days = parsed ("days since 1900-01-01", NULL, NULL), seconds = parsed ("seconds since 1970-01-01", NULL, NULL);
  double start_d = ant_cf_time_read (&days, 43465.0), before_d, after_d;
  for (int i = 0; i < 1000; i++)
    g_assert_cmpfloat_with_epsilon ((ant_cf_time_read (&days, 43465.0 + i / 1000.0) - start_d) * 86400.0, 86.4 * i, 1e-6);
  before_d = ant_cf_time_read (&seconds, 1483228799.0);
  after_d = ant_cf_time_read (&seconds, 1483228800.0);
  g_assert_cmpfloat_with_epsilon ((after_d - before_d) * 86400.0, 2.0, 1e-6); /* 23:59:59 to 00:00:00 over 23:59:60 */
}

static void
numbers_come_back_as_the_file_has_them (void)
{
  static const struct
  {
    const char *units, *calendar;
    double numbers[2];
  } cases[] = {
    { "seconds since 1970-01-01", NULL, { 1483228700.25, 1483228900.25 } },
    { "days since 2003-02-25", NULL, { 5053.5, 5060.25 } },
    { "seconds since 2016-12-31 23:59:58", "utc", { 1.5, 86403.5 } },
    { "seconds since 2016-12-31 23:59:58", "tai", { 1.5, 86403.5 } },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    for (int k = 0; k < 2; k++)
      {
        AntCfTime time = parsed (cases[i].units, cases[i].calendar, NULL);
        AntTimeReference reference = { 0 };
        ant_cf_time_read (&time, cases[i].numbers[0]);
        double elapsed_d = ant_cf_time_read (&time, cases[i].numbers[k]), back_d;
        ant_cf_time_reference (&time, &reference);
        g_autofree char *own = ant_time_reference_own_text (&reference, elapsed_d);
        g_assert_cmpfloat_with_epsilon (g_ascii_strtod (own, NULL), cases[i].numbers[k], 1e-6);
        g_assert_true (ant_time_reference_parse (&reference, own, &back_d, NULL));
        g_assert_cmpfloat_with_epsilon (back_d * 86400.0, elapsed_d * 86400.0, 1e-2);
      }
}

static void
scales_are_known_assumed_or_unknown (void)
{
  g_autoptr (GError) error = NULL;
  AntCfTime time = parsed ("seconds since 2010-01-01", NULL, NULL);
  g_assert_cmpint (time.scale, ==, ANT_SCALE_UTC);
  g_assert_true (time.scale_assumed);
  time = parsed ("seconds since 2010-01-01 00:00:00Z", NULL, NULL);
  g_assert_true (time.scale == ANT_SCALE_UTC && !time.scale_assumed);
  time = parsed ("seconds since 2010-01-01", NULL, "leap_seconds: utc");
  g_assert_true (time.scale == ANT_SCALE_UTC && !time.scale_assumed && !time.counts_leaps);
  time = parsed ("seconds since 2010-01-01", NULL, "leap_seconds: none");
  g_assert_cmpint (time.scale, ==, ANT_SCALE_UNKNOWN);
  time = parsed ("seconds since 2010-01-01 00:00:00 TAI", NULL, NULL);
  g_assert_cmpint (time.scale, ==, ANT_SCALE_TAI);
  g_assert_true (ant_cf_time_parse ("seconds since 2010-01-01", NULL, "leap_seconds: none", "GPS", &time, &error));
  g_assert_cmpint (time.scale, ==, ANT_SCALE_GPS);
  g_assert_false (ant_cf_time_parse ("seconds since 2010-01-01", NULL, NULL, "noon", &time, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
}

static void
what_no_clock_keeps_is_refused (void)
{
  static const struct
  {
    const char *units, *calendar, *words;
  } cases[] = {
    { "days since 2000-01-01", "noleap", "calendar “noleap”" },
    { "days since 2000-01-01", "360_day", "calendar “360_day”" },
    { "days since 2000-01-01", "all_leap", "calendar “all_leap”" },
    { "days since 2000-01-01", "julian", "calendar “julian”" },
    { "days since 2000-01-01", "none", "calendar “none”" },
    { "days since 2000-02-30", NULL, "2000-02-30" },
    { "days since 1582-10-10", "standard", "1582-10-10" },
    { "seconds since 2016-12-31 23:59:60", "standard", "no second 60" },
    { "seconds since 2015-12-31 23:59:60", "utc", "no second 60" },
    { "seconds since 1957-12-31 23:59:59", "utc", "1958" },
    { "fortnights since 2000-01-01", NULL, "fortnights" },
    { "days since", NULL, "days since" },
    { "days since yesterday", NULL, "yesterday" },
    { "days since 2000-01-01 25:00", NULL, "25:00" },
    { "days since 2000-01-01 00:00:00 Mars", NULL, "Mars" },
    { "days since 2000-01-01 00:00:00 -99:00", NULL, "-99:00" },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    {
      g_autoptr (GError) error = NULL;
      AntCfTime time;
      g_test_message ("%s", cases[i].units);
      g_assert_false (ant_cf_time_parse (cases[i].units, cases[i].calendar, NULL, NULL, &time, &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
      g_assert_nonnull (strstr (error->message, "expected"));
      if (!strstr (error->message, cases[i].words))
        g_error ("“%s” lacks “%s”", error->message, cases[i].words);
    }
}

static void
numbers_that_are_no_times_are_none (void)
{
  static const double wrong[] = { NAN, INFINITY, -INFINITY, 1e300, -9.969209968386869e36 };
  AntCfTime time = parsed ("days since 2000-01-01", NULL, NULL), utc = parsed ("days since 2000-01-01", "utc", NULL);
  for (gsize i = 0; i < G_N_ELEMENTS (wrong); i++)
    g_assert_true (isnan (ant_cf_time_read (&time, wrong[i])) && isnan (ant_cf_time_read (&utc, wrong[i])));
  g_assert_false (time.started);
  g_assert_cmpfloat (ant_cf_time_read (&time, 5.5), ==, 0.5);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/readers/cf-time/calendars-differ-in-their-leap-seconds", calendars_differ_in_their_leap_seconds);
  g_test_add_func ("/readers/cf-time/zones-of-every-form-are-taken-off", zones_of_every_form_are_taken_off);
  g_test_add_func ("/readers/cf-time/units-have-their-fixed-lengths", units_have_their_fixed_lengths);
  g_test_add_func ("/readers/cf-time/the-standard-calendar-is-mixed", the_standard_calendar_is_mixed);
  g_test_add_func ("/readers/cf-time/times-are-right-to-a-microsecond", times_are_right_to_a_microsecond);
  g_test_add_func ("/readers/cf-time/numbers-come-back-as-the-file-has-them", numbers_come_back_as_the_file_has_them);
  g_test_add_func ("/readers/cf-time/scales-are-known-assumed-or-unknown", scales_are_known_assumed_or_unknown);
  g_test_add_func ("/readers/cf-time/what-no-clock-keeps-is-refused", what_no_clock_keeps_is_refused);
  g_test_add_func ("/readers/cf-time/numbers-that-are-no-times-are-none", numbers_that_are_no_times_are_none);
  return g_test_run ();
}
