/* test-text-dialects.c - times spread over columns and headers, flags between values, local clocks, epochs that are said. */
#include "reading.h"

static void
assert_utc (const AntRecord *record, gsize row, const char *expected)
{
  g_autofree char *utc = ant_time_reference_utc_text (&record->time, record->time_d[row], 0);
  g_assert_cmpstr (utc, ==, expected);
}

/* 90 rows, a minute each, from 2016-02-29T23:30; the separators stand behind year, month, day, hour and minute. */
static AntRecord *
read_minutes (const char *header, const char *separators, const AntReadingChoices *choices)
{
  g_autoptr (GString) text = g_string_new (header);
  for (int i = 0; i < 90; i++)
    {
      int minute = 23 * 60 + 30 + i, day = minute / 1440;
      g_string_append_printf (text, "2016%c%02d%c%02d%c%02d%c%02d%c%.2f\n", separators[0], day ? 3 : 2, separators[1], day ? 1 : 29,
                              separators[2], minute / 60 % 24, separators[3], minute % 60, separators[4], 1361.0 + 0.01 * (i % 7));
    }
  return read_with (text->str, choices);
}

static void
year_month_day_hour_and_minute_are_told_by_their_names (void)
{
  g_autoptr (AntRecord) record
      = read_minutes ("Year,Month,Day,Hour,Minute,tsi\n", ",,,,,", NULL);
  g_assert_cmpstr (record->time_name, ==, "Year + Month + Day + Hour + Minute");
  assert_utc (record, 0, "2016-02-29T23:30:00Z");
  assert_utc (record, 89, "2016-03-01T00:59:00Z");
  g_assert_cmpstr (record->value_name, ==, "tsi");
}

static void
short_names_do_for_month_and_minute (void)
{
  g_autoptr (AntRecord) record = read_minutes ("YYYY MM DD HH MM value\n", "     ", NULL);
  assert_utc (record, 0, "2016-02-29T23:30:00Z");
  assert_utc (record, 89, "2016-03-01T00:59:00Z");
}

static void
without_names_their_ranges_tell (void)
{
  g_autoptr (AntRecord) record = read_minutes ("", "     ", NULL);
  assert_utc (record, 0, "2016-02-29T23:30:00Z");
  assert_utc (record, 89, "2016-03-01T00:59:00Z");
  g_assert_cmpstr (record->value_name, ==, "column 6");
}

static void
flags_between_values_are_their_qualities (void)
{
  g_autoptr (GString) text = g_string_new (" Station\n   37.70  105.92 2317 m version 1\n");
  for (int i = 0; i < 600; i++)
    g_string_append_printf (text, " 2016  61  3  1 %2d %2d %6.3f %6.2f %7.1f %d %7.1f %d %7.1f 0\n", i / 60, i % 60, i / 60.0, 91.65 + i * 0.1,
                            i % 50 == 3 ? -9999.9 : 500.0 + i % 9, i % 50 == 3, i % 50 == 4 ? -9999.9 : 20.5 + i % 4, i % 50 == 4,
                            186.3 + i % 5);
  g_autoptr (AntRecord) record = read_text (text->str);
  g_assert_cmpstr (record->time_name, ==, "column 1 + column 3 + column 4 + column 5 + column 6");
  assert_utc (record, 61, "2016-03-01T01:01:00Z");
  g_assert_cmpstr (record->value_name, ==, "column 9");
  g_assert_cmpstr (record->quality_name, ==, "column 10");
  g_assert_cmpint (record->quality[3], ==, 1);
  g_assert_cmpuint (count_flag (record, ANT_FLAG_FILL), ==, 12);
  g_assert_cmpuint (record->columns->len, ==, 3); /* the angle and two values: no flags, no second clock */

  char eleven[] = "11";
  AntReadingChoices choices = { .value_column = eleven };
  g_autoptr (AntRecord) other = read_with (text->str, &choices);
  g_assert_cmpstr (other->quality_name, ==, "column 12");
  g_assert_cmpint (other->quality[4], ==, 1);
}

static void
a_date_in_the_header_goes_with_a_clock_in_the_rows (void)
{
  static const char *const dates[] = { "2016 162 06 10", "2016 06 10", "2016 162", "2016-06-10" };
  for (gsize i = 0; i < G_N_ELEMENTS (dates); i++)
    {
      g_autoptr (GString) text = g_string_new ("; Missing data: -1.00e+00\n;  HHMM XRS-B    XRS-A  17.1  dark\n;------\n");
      g_string_append_printf (text, "%s\n", dates[i]);
      for (int row = 0; row < 130; row++)
        g_string_append_printf (text, "%02d%02d  2.18e-07  %s  4.98e-04 -1.00e+00\n", row / 60, row % 60, row % 3 ? "1.84e-10" : "1.9e-10");
      g_autoptr (AntRecord) record = read_text (text->str);
      assert_utc (record, 0, "2016-06-10T00:00:00Z");
      assert_utc (record, 129, "2016-06-10T02:09:00Z");
      g_assert_true (was_said (record, "2016-06-10, stands in the header"));
      g_assert_cmpstr (record->value_name, ==, "XRS-A");
      g_assert_cmpstr (((AntColumn *) g_ptr_array_index (record->columns, 1))->name, ==, "17.1");
    }
}

static void
a_date_in_the_header_must_agree_with_itself (void)
{
  g_autoptr (GError) error = NULL;
  const char *text = "; HHMM flux\n2016 163 06 10\n0000 1.5\n0001 1.6\n0002 1.7\n";
  g_assert_null (ant_reader_read_bytes ("trial.txt", text, strlen (text), NULL, &error));
  g_assert_nonnull (strstr (error->message, "looks like a time"));
}

static void
hour_24_ends_its_day (void)
{
  g_autoptr (AntRecord) digits = read_text ("date hhmm v\n20160229 2330 1\n20160229 2400 2\n20160301 0030 3\n");
  assert_utc (digits, 1, "2016-03-01T00:00:00Z");
  g_autoptr (AntRecord) iso = read_text ("time,v\n2016-12-31T23:30:00,1\n2016-12-31T24:00:00,2\n2017-01-01T00:30:00,3\n");
  assert_utc (iso, 1, "2017-01-01T00:00:00Z"); /* after the leap second */
  g_assert_cmpfloat_with_epsilon (iso->time_d[1] - iso->time_d[0], 1801.0 / 86400.0, 1e-12);
}

static void
dates_with_a_day_fraction_are_dates (void)
{
  g_autoptr (AntRecord) one = read_text ("date v\n20160229.25 1\n20160229.75 2\n20160301.25 3\n");
  assert_utc (one, 2, "2016-03-01T06:00:00Z");
  g_autoptr (AntRecord) parts = read_text ("year month day v\n2016 2 29.25 1\n2016 2 29.75 2\n2016 3 1.25 3\n");
  assert_utc (parts, 2, "2016-03-01T06:00:00Z");
}

static void
a_local_clock_is_converted_by_a_zone_that_is_said (void)
{
  static const struct
  {
    const char *zone, *first;
  } zones[] = { { "-7", "2016-03-01T06:30:00Z" }, { "-07:00", "2016-03-01T06:30:00Z" }, { "UTC-0700", "2016-03-01T06:30:00Z" },
                { "+05:30", "2016-02-29T18:00:00Z" }, { "Z", "2016-02-29T23:30:00Z" } };
  const char *header = "date,MST,v\n", *separators = "--,:,";
  g_autoptr (AntRecord) unknown = read_minutes (header, separators, NULL);
  g_assert_cmpint (unknown->time.scale, ==, ANT_SCALE_UNKNOWN);
  g_assert_true (was_said (unknown, "--time-zone"));
  for (gsize i = 0; i < G_N_ELEMENTS (zones); i++)
    {
      AntReadingChoices choices = { .time_zone = (char *) (guintptr) zones[i].zone };
      g_autoptr (AntRecord) record = read_minutes (header, separators, &choices);
      g_assert_cmpint (record->time.scale, ==, ANT_SCALE_UTC);
      assert_utc (record, 0, zones[i].first);
    }
}

static void
what_plain_numbers_count_from_can_be_said (void)
{
  char epoch[] = "2016-12-31T23:59:30", scale[] = "UTC", jd[] = "2451545.0";
  AntReadingChoices choices = { .epoch = epoch, .time_scale = scale }, by_jd = { .epoch = jd };
  const char *text = "time [s],v\n0,1\n30,2\n31,3\n";
  g_autoptr (AntRecord) record = read_with (text, &choices);
  assert_utc (record, 1, "2016-12-31T23:59:60Z");
  assert_utc (record, 2, "2017-01-01T00:00:00Z");
  g_autoptr (AntRecord) unknown = read_with (text, &by_jd);
  g_assert_cmpint (unknown->time.scale, ==, ANT_SCALE_UNKNOWN);
  g_assert_cmpfloat (ant_time_reference_jd (&unknown->time, unknown->time_d[0]), ==, 2451545.0);
}

static void
nonsense_about_zones_and_epochs_is_refused (void)
{
  static const struct
  {
    const char *text, *zone, *epoch;
  } cases[] = { { "date,v\n2016-02-29,1\n2016-03-01,2\n", "west", NULL },
                { "date,v\n2016-02-29,1\n2016-03-01,2\n", "+25", NULL },
                { "date,v\n2016-02-29,1\n2016-03-01,2\n", NULL, "2000-01-01" },
                { "time,v\n1,1\n2,2\n", "+1", NULL },
                { "time,v\n1,1\n2,2\n", NULL, "yesterday" } };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    {
      g_autoptr (GError) error = NULL;
      AntReadingChoices choices = { .time_zone = g_strdup (cases[i].zone), .epoch = g_strdup (cases[i].epoch) };
      g_assert_null (ant_reader_read_bytes ("trial.txt", cases[i].text, strlen (cases[i].text), &choices, &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
      ant_reading_choices_clear (&choices);
    }
}

static void
several_fills_are_told_at_once (void)
{
  g_autoptr (GString) text = g_string_new ("JD,a\n");
  static const char *const fills[] = { "-99", "-9999.9", "-99999", "-7999", "65535", "65535", "0.0", "0.0", "-1e34", "NaN", "" };
  for (int i = 0; i < 300; i++)
    g_string_append_printf (text, "%.5f,%s\n", 2451545.0 + i / 1440.0, i % 20 == 7 ? fills[i / 20 % G_N_ELEMENTS (fills)] : i % 2 ? "1361.5" : "1360.75");
  g_autoptr (AntRecord) record = read_text (text->str);
  g_assert_cmpuint (count_flag (record, ANT_FLAG_FILL), ==, 15);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define ADD(path, function) g_test_add_func ("/readers/text-dialects/" path, function)
  ADD ("year-month-day-hour-and-minute-are-told-by-their-names", year_month_day_hour_and_minute_are_told_by_their_names);
  ADD ("short-names-do-for-month-and-minute", short_names_do_for_month_and_minute);
  ADD ("without-names-their-ranges-tell", without_names_their_ranges_tell);
  ADD ("flags-between-values-are-their-qualities", flags_between_values_are_their_qualities);
  ADD ("a-date-in-the-header-goes-with-a-clock-in-the-rows", a_date_in_the_header_goes_with_a_clock_in_the_rows);
  ADD ("a-date-in-the-header-must-agree-with-itself", a_date_in_the_header_must_agree_with_itself);
  ADD ("hour-24-ends-its-day", hour_24_ends_its_day);
  ADD ("dates-with-a-day-fraction-are-dates", dates_with_a_day_fraction_are_dates);
  ADD ("a-local-clock-is-converted-by-a-zone-that-is-said", a_local_clock_is_converted_by_a_zone_that_is_said);
  ADD ("what-plain-numbers-count-from-can-be-said", what_plain_numbers_count_from_can_be_said);
  ADD ("nonsense-about-zones-and-epochs-is-refused", nonsense_about_zones_and_epochs_is_refused);
  ADD ("several-fills-are-told-at-once", several_fills_are_told_at_once);
  return g_test_run ();
}
