/* test-sky-words.c - predicted events in words: times to a tenth of a second or to the hour, what a record shows. */
#include "data/sky-words.h"

#include <math.h>
#include <string.h>

#include "core/units.h"
#include "data/error.h"

static void
typed_times_come_back (void)
{
  static const struct
  {
    const char *typed, *iso;
  } times[] = {
    { "2004-06-08T08:19:44.7Z", "2004-06-08T08:19:44.7Z" }, { "2004-06-08", "2004-06-08T00:00:00.0Z" },
    { "2453164.5", "2004-06-08T00:00:00.0Z" },              { "2004-06-08T10:19:44.7+02:00", "2004-06-08T08:19:44.7Z" },
    { "2016-12-31T23:59:60.5Z", "2016-12-31T23:59:60.5Z" },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (times); i++)
    {
      double tt_d;
      g_autoptr (GError) error = NULL;
      ant_sky_time_parse (times[i].typed, &tt_d, &error);
      g_assert_no_error (error);
      g_autofree char *text = ant_sky_time_iso (tt_d, FALSE);
      g_assert_cmpstr (text, ==, times[i].iso);
    }
}

static void
what_is_no_time_is_refused (void)
{
  static const char *const typed[] = { "", "2004", "soon", "2004-13-01", "nan", "1e9" };
  for (gsize i = 0; i < G_N_ELEMENTS (typed); i++)
    {
      double tt_d;
      g_autoptr (GError) error = NULL;
      g_assert_false (ant_sky_time_parse (typed[i], &tt_d, &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
    }
}

static void
unsure_times_are_to_the_hour (void)
{
  double tt_d;
  g_assert_true (ant_sky_time_parse ("1999-11-15T23:41:10Z", &tt_d, NULL));
  g_autofree char *iso = ant_sky_time_iso (tt_d, TRUE), *text = ant_sky_time_text (tt_d, TRUE);
  g_assert_cmpstr (iso, ==, "1999-11-16T00:00:00.0Z");
  g_assert_cmpstr (text, ==, "1999-11-16 00 h");
  g_assert_null (ant_sky_time_iso (NAN, FALSE));
}

static void
clocks_tell_another_day (void)
{
  double day, before, after;
  g_assert_true (ant_sky_time_parse ("2012-06-06T01:29:36Z", &day, NULL));
  g_assert_true (ant_sky_time_parse ("2012-06-05T22:09:37.8Z", &before, NULL));
  g_assert_true (ant_sky_time_parse ("2012-06-07T00:00:01Z", &after, NULL));
  g_autofree char *yesterday = ant_sky_clock_text (before, day, FALSE), *same = ant_sky_clock_text (day, day, FALSE),
                  *tomorrow = ant_sky_clock_text (after, day, FALSE), *none = ant_sky_clock_text (NAN, day, FALSE);
  g_assert_cmpstr (yesterday, ==, "22:09:37.8-1");
  g_assert_cmpstr (same, ==, "01:29:36.0");
  g_assert_cmpstr (tomorrow, ==, "00:00:01.0+1");
  g_assert_cmpstr (none, ==, "-");
}

static void
spans_outside_what_is_known_are_refused (void)
{
  g_autoptr (AntObserverChoice) earth = ant_observer_choice_new_earth ();
  g_autoptr (GError) error = NULL;
  g_assert_true (ant_sky_span_check (earth, 0, 10, &error));
  g_assert_false (ant_sky_span_check (earth, 10, 0, &error));
  g_clear_error (&error);
  g_assert_false (ant_sky_span_check (earth, ANT_SKY_FIRST_TT_D - 1, 0, &error));
  g_assert_nonnull (strstr (error->message, "1600 to 2400"));
}

/* Depth, sigma and expected depth to what is said of them. */
static void
three_sigma_decide_what_a_record_shows (void)
{
  static const struct
  {
    double depth, sigma, expected;
    AntShown shown;
  } cases[] = {
    { 1000, 50, 1007, ANT_SHOWN_AGREES }, { 1140, 50, 1007, ANT_SHOWN_AGREES }, { 10, 50, 1007, ANT_SHOWN_ABSENT },
    { -300, 50, 1007, ANT_SHOWN_DIFFERS }, { 700, 50, 1007, ANT_SHOWN_DIFFERS }, { 5, 20, 40, ANT_SHOWN_FAINT },
    { 70, 20, 40, ANT_SHOWN_AGREES },     { 200, 20, 40, ANT_SHOWN_DIFFERS },   { 10, 10, 40, ANT_SHOWN_AGREES },
    { NAN, NAN, 40, ANT_SHOWN_GAP },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    {
      AntSighting sighting = { .expected_ppm = cases[i].expected,
                               .measured = { .depth_ppm = cases[i].depth, .sigma_ppm = cases[i].sigma } };
      sighting.shown = ant_sighting_judge (&sighting);
      g_autofree char *words = ant_sighting_words (&sighting);
      g_test_message ("%g +- %g for %g: %s", cases[i].depth, cases[i].sigma, cases[i].expected, words);
      g_assert_cmpint (sighting.shown, ==, cases[i].shown);
    }
}

/* The shape on a grid is the mean of the loss over each exposure: against sums over a thousand instants of each. */
static void
shapes_are_averaged_over_exposures (void)
{
  double loss[65], total[65];
  AntSkyCurve curve = { 65, 7000, 0.25 / 64, loss, total, 0 };
  for (int i = 0; i < 65; i++)
    {
      loss[i] = sin (ANT_PI * i / 64) * 1e-3;
      total[i] = i ? total[i - 1] + 0.5 * curve.step_d * (loss[i - 1] + loss[i]) : 0;
      curve.greatest = fmax (curve.greatest, loss[i]);
    }
  static const double steps_d[] = { 0.01, 1.0 };
  for (gsize s = 0; s < G_N_ELEMENTS (steps_d); s++)
    {
      g_autoptr (AntRecord) record = ant_record_new ();
      gssize first;
      record->exposure_d = steps_d[s];
      record->series = (AntSeries){ .n = 400, .step_d = steps_d[s], .start_d = s ? -200.3 : -2.003 };
      g_autoptr (GArray) shape = ant_sighting_shape (record, &curve, 7000.2, &first); /* the event begins at -0.2 */
      double sum = 0;
      g_assert_cmpuint (shape->len, >, 0);
      for (guint i = 0; i < shape->len; i++)
        {
          double mean = 0, middle = ant_series_time (&record->series, (double) (first + (gssize) i));
          for (int k = 0; k < 1000; k++)
            {
              double place = (middle + record->exposure_d * ((k + 0.5) / 1000 - 0.5) + 0.2) / 0.25;
              mean += place > 0 && place < 1 ? sin (ANT_PI * place) / 1000 : 0;
            }
          g_assert_cmpfloat_with_epsilon (g_array_index (shape, double, i), mean, 2e-3);
          sum += g_array_index (shape, double, i) * steps_d[s];
        }
      g_assert_cmpfloat_with_epsilon (sum, 0.25 * 2 / ANT_PI, 1e-4); /* nothing of the event is lost */
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/sky-words/typed-times-come-back", typed_times_come_back);
  g_test_add_func ("/data/sky-words/what-is-no-time-is-refused", what_is_no_time_is_refused);
  g_test_add_func ("/data/sky-words/unsure-times-are-to-the-hour", unsure_times_are_to_the_hour);
  g_test_add_func ("/data/sky-words/clocks-tell-another-day", clocks_tell_another_day);
  g_test_add_func ("/data/sky-words/spans-outside-what-is-known-are-refused", spans_outside_what_is_known_are_refused);
  g_test_add_func ("/data/sighting/three-sigma-decide-what-a-record-shows", three_sigma_decide_what_a_record_shows);
  g_test_add_func ("/data/sighting/shapes-are-averaged-over-exposures", shapes_are_averaged_over_exposures);
  return g_test_run ();
}
