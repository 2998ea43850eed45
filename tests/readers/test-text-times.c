/* test-text-times.c - every way of writing a time comes to the right instant, leap seconds counted. */
#include "reading.h"

/* Three rows that cross the leap second at the end of 2016, one minute apart in UTC's own labels; the middle ones are
 * 61 s apart. Each dialect gives 23:59:00, 00:00:00, 00:01:00. */
static void
expect_leap_minute (const AntRecord *record, double tolerance_s)
{
  g_assert_cmpuint (record->n_rows, ==, 3);
  g_assert_cmpfloat_with_epsilon (record->time_d[0] * 86400.0, 86340.0, tolerance_s);
  g_assert_cmpfloat_with_epsilon ((record->time_d[1] - record->time_d[0]) * 86400.0, 61.0, tolerance_s);
  g_assert_cmpfloat_with_epsilon ((record->time_d[2] - record->time_d[1]) * 86400.0, 60.0, tolerance_s);
  g_autofree char *utc = ant_time_reference_utc_text (&record->time, record->time_d[2], 0);
  g_assert_cmpstr (utc, ==, "2017-01-01T00:01:00Z");
}

static void
calendars_count_the_leap_second (void)
{
  static const char *const dialects[] = {
    "utc,v\n2016-12-31T23:59:00,1361\n2017-01-01T00:00:00,1362\n2017-01-01T00:01:00,1361\n",
    "t,v\n2016-12-31 23:59,1361\n2017-01-01 00:00,1362\n2017-01-01 00:01,1361\n",
    "date v\n2016-12-31T23:59:00Z 1361\n2017-01-01T00:00:00Z 1362\n2017-01-01T00:01:00Z 1361\n",
    "date v\n2017-01-01T01:59:00+02:00 1361\n2016-12-31T24:00:00Z 1362\n2017-01-01T00:01:00Z 1361\n",
    "date time v\n2016-12-31 23:59:00 1361\n2017-01-01 00:00:00 1362\n2017-01-01 00:01:00 1361\n",
    "date;time;v\n20161231;235900;1361\n20170101;000000;1362\n20170101;000100;1361\n",
    "20161231 235900 1361\n20170101 000000 1362\n20170101 000100 1361\n",
    "20161231 2359 1361\n20170101 0000 1362\n20170101 0001 1361\n",
    "year doy hhmm v\n2016 366 2359 1361\n2017 1 0000 1362\n2017 1 0001 1361\n",
    "year,doy,hour,minute,v\n2016,366,23,59,1361\n2017,1,0,0,1362\n2017,1,0,1,1361\n",
    "year doy sod v\n2016 366 86340 1361\n2017 1 0 1362\n2017 1 60 1361\n",
    "unix,v\n1483228740,1361\n1483228800,1362\n1483228860,1361\n",
    "date v\n2016-366T23:59 1361\n2017-001T00:00 1362\n2017-001T00:01 1361\n",
  };
  for (gsize i = 0; i < G_N_ELEMENTS (dialects); i++)
    {
      g_test_message ("%s", dialects[i]);
      g_autoptr (AntRecord) record = read_text (dialects[i]);
      expect_leap_minute (record, 1e-4);
    }
}

static void
fractions_of_days_are_read (void)
{
  static const char *const dialects[] = {
    "JD_UTC v\n2457754.49930556 1361\n2457754.5 1362\n2457754.50069444 1361\n",
    "MJD_UTC v\n57753.99930556 1361\n57754.0 1362\n57754.00069444 1361\n",
    "# time = UTC JD - 2450000\nJD_UTC-2450000 v\n7754.49930556 1361\n7754.5 1362\n7754.50069444 1361\n",
    "yyyymmdd v\n20161231.99930556 1361\n20170101.0 1362\n20170101.00069444 1361\n",
    "year doy v\n2016 366.99930556 1361\n2017 1.0 1362\n2017 1.00069444 1361\n",
  };
  for (gsize i = 0; i < G_N_ELEMENTS (dialects); i++)
    {
      g_test_message ("%s", dialects[i]);
      g_autoptr (AntRecord) record = read_text (dialects[i]);
      g_assert_cmpfloat_with_epsilon ((record->time_d[2] - record->time_d[1]) * 86400.0, 60.0, 0.002);
      g_autofree char *utc = ant_time_reference_utc_text (&record->time, record->time_d[1], 0);
      g_assert_cmpstr (utc, ==, "2017-01-01T00:00:00Z");
    }
}

static void
the_leap_second_itself_has_its_place (void)
{
  g_autoptr (AntRecord) record = read_text ("utc v\n2016-12-31T23:59:59 1361\n2016-12-31T23:59:60 1362\n2017-01-01T00:00:00 1361\n"
                                            "2017-01-01T12:59:60 1361\n2017-01-01T23:59:60 1361\n2017-01-02T00:00:00 1361\n");
  g_assert_cmpfloat_with_epsilon ((record->time_d[1] - record->time_d[0]) * 86400.0, 1.0, 1e-6);
  g_assert_cmpfloat_with_epsilon ((record->time_d[2] - record->time_d[1]) * 86400.0, 1.0, 1e-6);
  g_assert_cmpuint (record->flags[3], ==, ANT_FLAG_NO_TIME);
  g_assert_cmpuint (record->flags[4], ==, ANT_FLAG_NO_TIME);
}

static void
the_origin_is_the_midnight_before_the_first_row (void)
{
  g_autoptr (AntRecord) record = read_text ("JD v\n2451639.75 1361\n2451640.0 1362\n2451640.25 1361\n");
  g_assert_cmpfloat (record->time.origin_jd1, ==, 2451639.5);
  g_assert_cmpfloat (record->time_d[0], ==, 0.25);
  g_assert_cmpfloat (record->time.own_zero, ==, 2451639.5);
  g_assert_true (record->time.origin_known);
}

static void
bare_counts_have_no_origin (void)
{
  g_autoptr (AntRecord) days = read_text ("time,flux\n352.5,1\n353.5,1.5\n354.5,1\n");
  g_assert_false (days->time.origin_known);
  g_assert_cmpfloat (days->time.own_zero, ==, 352.0);
  g_assert_cmpfloat (days->time_d[0], ==, 0.5);
  g_autoptr (AntRecord) seconds = read_text ("time (s),flux\n86400,1\n129600,1.5\n172800,1\n");
  g_assert_cmpfloat (seconds->time_d[1], ==, 0.5);
  g_assert_cmpfloat_with_epsilon (seconds->time.own_unit_d, 1.0 / 86400.0, 1e-18);
  g_autoptr (AntRecord) negative = read_text ("-0.25 0.998\n-0.125 0.999\n0.125 1.001\n");
  g_assert_cmpfloat (negative->time.own_zero, ==, -1.0);
  g_assert_cmpfloat (negative->time_d[0], ==, 0.75);
}

static void
a_stated_offset_is_added_and_the_place_kept (void)
{
  g_autoptr (AntRecord) record = read_text ("BJD-2454833,flux\n352.25,1\n353.25,1.5\n354.25,1\n");
  g_assert_cmpint (record->time.style, ==, ANT_STAMP_JD);
  g_assert_cmpfloat_with_epsilon (ant_time_reference_jd (&record->time, record->time_d[0]), 2455185.25, 1e-8);
  g_assert_cmpstr (record->time.place, ==, "barycentre");
  g_autofree char *own = ant_time_reference_own_text (&record->time, record->time_d[0]);
  g_assert_cmpstr (own, ==, "352.2500000");
}

static void
scales_are_stated_assumed_or_unknown (void)
{
  static const struct
  {
    const char *text;
    AntTimeScale scale;
    gboolean assumed;
  } cases[] = {
    { "utc v\n2016-12-31T00:00:00 1\n2016-12-31T00:01:00 2\n2016-12-31T00:02:00 1\n", ANT_SCALE_UTC, FALSE },
    { "date v\n2016-12-31T00:00:00Z 1\n2016-12-31T00:01:00Z 2\n2016-12-31T00:02:00Z 1\n", ANT_SCALE_UTC, FALSE },
    { "date v\n2016-12-31T00:00:00 1\n2016-12-31T00:01:00 2\n2016-12-31T00:02:00 1\n", ANT_SCALE_UTC, TRUE },
    { "20161231 000000 1\n20161231 010000 2\n20161231 020000 1\n", ANT_SCALE_UTC, TRUE },
    { "JD v\n2451639.5 1\n2451640.5 2\n2451641.5 1\n", ANT_SCALE_UNKNOWN, FALSE },
    { "JD_TDB v\n2451639.5 1\n2451640.5 2\n2451641.5 1\n", ANT_SCALE_TDB, FALSE },
    { "# Time scale: TT\nJD v\n2451639.5 1\n2451640.5 2\n2451641.5 1\n", ANT_SCALE_TT, FALSE },
    { "Year,DOY,MST,v\n2018,291,0,1\n2018,291,30,2\n2018,291,100,1\n", ANT_SCALE_UNKNOWN, FALSE },
    { "unix v\n1483228740 1\n1483228800 2\n1483228860 1\n", ANT_SCALE_UNIX, FALSE },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    {
      g_test_message ("%s", cases[i].text);
      g_autoptr (AntRecord) record = read_text (cases[i].text);
      g_assert_cmpint (record->time.scale, ==, cases[i].scale);
      g_assert_cmpint (record->time.scale_assumed, ==, cases[i].assumed);
      if (cases[i].assumed)
        g_assert_true (was_said (record, "UTC is assumed"));
    }
}

static void
decimal_years_follow_the_calendar (void)
{
  g_autoptr (AntRecord) record = read_text ("year v\n2004.0 1361\n2004.5 1362\n2005.0 1361\n2005.5 1361\n");
  g_assert_cmpint (record->time.style, ==, ANT_STAMP_DECIMAL_YEAR);
  g_assert_cmpfloat_with_epsilon (record->time_d[1], 183.0, 1e-6);
  g_assert_cmpfloat_with_epsilon (record->time_d[2], 366.0, 1e-6);
  g_assert_cmpfloat_with_epsilon (record->time_d[3] - record->time_d[2], 182.5, 1e-6);
}

static void
the_user_chooses_columns_format_and_scale (void)
{
  static const struct
  {
    const char *columns, *format, *scale, *text, *utc;
  } cases[] = {
    { "1", "mjd", "UTC", "57752.5 1361\n57753.5 1362\n57754.5 1361\n", "2016-12-30T12:00:00Z" },
    { "a", "jd-2450000", "TT", "a b\n7754.5 1361\n7755.5 1362\n7756.5 1361\n", "2016-12-31T23:58:52Z" },
    { "1+2", "ymd", NULL, "20161231 12 1361\n20161231 13 1362\n20161231 14 1361\n", "2016-12-31T12:00:00Z" },
    { "1+2+3+4", "year-day", NULL, "2016 366 12 30 1361\n2016 366 13 30 1362\n2016 366 14 30 1361\n", "2016-12-31T12:30:00Z" },
    { "1+2", NULL, NULL, "2016-12-31 12:30 1361\n2016-12-31 13:30 1362\n2016-12-31 14:30 1361\n", "2016-12-31T12:30:00Z" },
    { "2", "unix", NULL, "x y z\n1 1483228740 1361\n1 1483228800 1362\n1 1483228860 1361\n", "2016-12-31T23:59:00Z" },
    { NULL, "mjd", "UTC", "57752.5 1361\n57753.5 1362\n57754.5 1361\n", "2016-12-30T12:00:00Z" },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    {
      AntReadingChoices choices = { .time_column = g_strdup (cases[i].columns), .time_format = g_strdup (cases[i].format),
                                    .time_scale = g_strdup (cases[i].scale) };
      g_test_message ("%s", cases[i].text);
      g_autoptr (AntRecord) record = read_with (cases[i].text, &choices);
      g_autofree char *utc = ant_time_reference_utc_text (&record->time, record->time_d[0], 0);
      g_assert_cmpstr (utc, ==, cases[i].utc);
      ant_reading_choices_clear (&choices);
    }
}

static void
unknown_formats_and_scales_are_refused (void)
{
  char stardate[] = "stardate", mars[] = "MARS", no_offset[] = "jd-x", many[] = "1+2+3+4+5+6+7";
  const AntReadingChoices bad[] = { { .time_format = stardate }, { .time_scale = mars }, { .time_format = no_offset },
                                    { .time_column = many } };
  const char *text = "JD v\n2451639.5 1\n2451640.5 2\n";
  for (gsize i = 0; i < G_N_ELEMENTS (bad); i++)
    {
      g_autoptr (GError) error = NULL;
      g_assert_null (ant_reader_read_bytes ("trial.txt", text, strlen (text), &bad[i], &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define ADD(path, function) g_test_add_func ("/readers/text-times/" path, function)
  ADD ("calendars-count-the-leap-second", calendars_count_the_leap_second);
  ADD ("fractions-of-days-are-read", fractions_of_days_are_read);
  ADD ("the-leap-second-itself-has-its-place", the_leap_second_itself_has_its_place);
  ADD ("the-origin-is-the-midnight-before-the-first-row", the_origin_is_the_midnight_before_the_first_row);
  ADD ("bare-counts-have-no-origin", bare_counts_have_no_origin);
  ADD ("a-stated-offset-is-added-and-the-place-kept", a_stated_offset_is_added_and_the_place_kept);
  ADD ("scales-are-stated-assumed-or-unknown", scales_are_stated_assumed_or_unknown);
  ADD ("decimal-years-follow-the-calendar", decimal_years_follow_the_calendar);
  ADD ("the-user-chooses-columns-format-and-scale", the_user_chooses_columns_format_and_scale);
  ADD ("unknown-formats-and-scales-are-refused", unknown_formats_and_scales_are_refused);
  return g_test_run ();
}
