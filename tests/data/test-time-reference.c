/* test-time-reference.c - elapsed days come back as the record's own numbers, JD and UTC. */
#include "data/error.h"
#include "data/time-reference.h"

#include <math.h>

static const AntTimeReference bare_days = { .style = ANT_STAMP_DAYS, .own_zero = 352.0, .own_unit_d = 1.0 };
static const AntTimeReference bare_seconds = { .style = ANT_STAMP_DAYS, .own_zero = 1000.0, .own_unit_d = 1.0 / 86400.0 };
static const AntTimeReference bare_jd = { .style = ANT_STAMP_JD, .origin_known = TRUE, .origin_jd1 = 2451639.5,
                                          .own_zero = 2451639.5, .own_unit_d = 1.0 };
static const AntTimeReference utc_mjd = { .style = ANT_STAMP_JD, .scale = ANT_SCALE_UTC, .origin_known = TRUE,
                                          .origin_jd1 = 2457753.5, .own_zero = 57753.0, .own_unit_d = 1.0,
                                          .own_offset = 2400000.5 };
static const AntTimeReference utc_iso = { .style = ANT_STAMP_ISO, .scale = ANT_SCALE_UTC, .origin_known = TRUE,
                                          .origin_jd1 = 2457753.5, .own_unit_d = 1.0 };
static const AntTimeReference tt_iso = { .style = ANT_STAMP_ISO, .scale = ANT_SCALE_TT, .origin_known = TRUE,
                                         .origin_jd1 = 2457753.5, .own_unit_d = 1.0 };
static const AntTimeReference posix = { .style = ANT_STAMP_UNIX, .scale = ANT_SCALE_UNIX, .origin_known = TRUE,
                                        .origin_jd1 = 2457753.5, .own_zero = 1483142400.0, .own_unit_d = 1.0 / 86400.0 };
static const AntTimeReference years = { .style = ANT_STAMP_DECIMAL_YEAR, .scale = ANT_SCALE_UTC, .origin_known = TRUE,
                                        .origin_jd1 = 2457753.5, .own_zero = 2016.997, .own_unit_d = 365.25 };

static void
expect (char *text, const char *expected)
{
  g_assert_cmpstr (text, ==, expected);
  g_free (text);
}

static void
own_text_is_what_the_record_would_write (void)
{
  expect (ant_time_reference_own_text (&bare_days, 0.5975478), "352.5975478");
  expect (ant_time_reference_own_text (&bare_seconds, 1.0), "87400.000");
  expect (ant_time_reference_own_text (&bare_jd, 2.0), "2451641.5000000");
  expect (ant_time_reference_own_text (&utc_iso, 0.25), "2016-12-31T06:00:00Z");
  expect (ant_time_reference_own_text (&utc_iso, 0.25 + 0.25 / 86400.0), "2016-12-31T06:00:00.250Z");
  expect (ant_time_reference_own_text (&posix, 0.5), "1483185600.000");
  expect (ant_time_reference_own_text (&bare_days, NAN), "");
}

static void
utc_text_needs_a_scale_and_an_origin (void)
{
  expect (ant_time_reference_utc_text (&bare_days, 1.0, 0), "");
  expect (ant_time_reference_utc_text (&bare_jd, 1.0, 0), "");
  expect (ant_time_reference_utc_text (&utc_mjd, 1.0, 0), "2016-12-31T23:59:60Z");
  expect (ant_time_reference_utc_text (&utc_mjd, 86401.0 / 86400.0, 0), "2017-01-01T00:00:00Z");
  expect (ant_time_reference_utc_text (&tt_iso, 68.184 / 86400.0, 0), "2016-12-31T00:00:00Z");
  expect (ant_time_reference_utc_text (&posix, 0.5, 1), "2016-12-31T12:00:00.0Z");
}

static void
jd_is_unknown_without_an_origin (void)
{
  g_assert_true (isnan (ant_time_reference_jd (&bare_days, 1.0)));
  g_assert_cmpfloat_with_epsilon (ant_time_reference_jd (&bare_jd, 1.25), 2451640.75, 1e-9);
  g_assert_cmpfloat_with_epsilon (ant_time_reference_jd (&utc_iso, 86401.0 / 86400.0), 2457754.5, 1e-9);
}

static void
what_was_written_is_understood_again (void)
{
  const AntTimeReference *const all[] = { &bare_days, &bare_seconds, &bare_jd, &utc_mjd, &utc_iso, &tt_iso, &posix, &years };
  for (gsize i = 0; i < G_N_ELEMENTS (all); i++)
    for (double time_d = 0.0; time_d < 900.0; time_d += 77.7)
      {
        g_autofree char *text = ant_time_reference_own_text (all[i], time_d);
        double back_d;
        g_test_message ("%s", text);
        g_assert_true (ant_time_reference_parse (all[i], text, &back_d, NULL));
        g_assert_cmpfloat_with_epsilon ((back_d - time_d) * 86400.0, 0.0, 0.1);
      }
}

static void
a_person_may_type_own_numbers_jd_or_iso (void)
{
  double time_d;
  g_assert_true (ant_time_reference_parse (&utc_mjd, "57754", &time_d, NULL));
  g_assert_cmpfloat_with_epsilon (time_d * 86400.0, 86401.0, 1e-4);
  g_assert_true (ant_time_reference_parse (&utc_mjd, "2457754.5", &time_d, NULL));
  g_assert_cmpfloat_with_epsilon (time_d * 86400.0, 86401.0, 1e-4);
  g_assert_true (ant_time_reference_parse (&utc_mjd, "2017-01-01", &time_d, NULL));
  g_assert_cmpfloat_with_epsilon (time_d * 86400.0, 86401.0, 1e-4);
  g_assert_true (ant_time_reference_parse (&tt_iso, "2016-12-31T00:00:00Z", &time_d, NULL));
  g_assert_cmpfloat_with_epsilon (time_d * 86400.0, 68.184, 1e-4);
  g_assert_true (ant_time_reference_parse (&bare_jd, "2000-04-06", &time_d, NULL));
  g_assert_cmpfloat_with_epsilon (time_d, 1.0, 1e-9);
}

static void
what_cannot_be_a_time_is_refused_with_the_expected_form (void)
{
  static const char *const bad[] = { "", "noon", "12 apples", "nan", "inf", "2016-13-01", "1e999" };
  for (gsize i = 0; i < G_N_ELEMENTS (bad); i++)
    {
      g_autoptr (GError) error = NULL;
      double time_d;
      g_assert_false (ant_time_reference_parse (&utc_iso, bad[i], &time_d, &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
      g_assert_nonnull (g_strrstr (error->message, "expected"));
    }
  g_autoptr (GError) error = NULL;
  double time_d;
  g_assert_false (ant_time_reference_parse (&bare_days, "2016-12-31", &time_d, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/time-reference/own-text-is-what-the-record-would-write", own_text_is_what_the_record_would_write);
  g_test_add_func ("/data/time-reference/utc-text-needs-a-scale-and-an-origin", utc_text_needs_a_scale_and_an_origin);
  g_test_add_func ("/data/time-reference/jd-is-unknown-without-an-origin", jd_is_unknown_without_an_origin);
  g_test_add_func ("/data/time-reference/what-was-written-is-understood-again", what_was_written_is_understood_again);
  g_test_add_func ("/data/time-reference/a-person-may-type-own-numbers-jd-or-iso", a_person_may_type_own_numbers_jd_or_iso);
  g_test_add_func ("/data/time-reference/what-cannot-be-a-time-is-refused-with-the-expected-form",
                   what_cannot_be_a_time_is_refused_with_the_expected_form);
  return g_test_run ();
}
