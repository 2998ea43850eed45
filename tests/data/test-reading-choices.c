/* test-reading-choices.c - choices about reading are parsed, refused and copied. */
#include "data/error.h"
#include "data/reading-choices.h"

static void
malformed_choices_are_refused (void)
{
  static const char *const bad[] = { "time", "time=", "flux=3", "=3", "" };
  for (gsize i = 0; i < G_N_ELEMENTS (bad); i++)
    {
      AntReadingChoices choices = { 0 };
      g_autoptr (GError) error = NULL;
      g_assert_cmpint (ant_reading_choices_parse_columns (&choices, bad[i], &error), ==, *bad[i] == 0);
      ant_reading_choices_clear (&choices);
    }
}

static void
a_copy_stands_alone (void)
{
  AntReadingChoices choices = { .time_scale = g_strdup ("TT"), .fill_values = g_array_new (FALSE, FALSE, sizeof (double)) }, copy;
  double fill = -99.0;
  g_array_append_val (choices.fill_values, fill);
  g_assert_true (ant_reading_choices_parse_columns (&choices, "time=1+2,value=tsi,error=none,quality=5", NULL));
  ant_reading_choices_copy (&choices, &copy);
  ant_reading_choices_clear (&choices);
  g_assert_null (choices.time_column);
  g_assert_cmpstr (copy.time_column, ==, "1+2");
  g_assert_cmpstr (copy.value_column, ==, "tsi");
  g_assert_cmpstr (copy.error_column, ==, "none");
  g_assert_cmpstr (copy.quality_column, ==, "5");
  g_assert_cmpstr (copy.time_scale, ==, "TT");
  g_assert_cmpfloat (g_array_index (copy.fill_values, double, 0), ==, -99.0);
  ant_reading_choices_clear (&copy);
}

static void
fills_are_parsed_and_told_again (void)
{
  AntReadingChoices choices = { 0 };
  g_autoptr (GError) error = NULL;
  g_assert_null (ant_reading_choices_fills_text (&choices));
  g_assert_true (ant_reading_choices_parse_fills (&choices, "-99, 0,1e34,-9999.9", NULL));
  g_autofree char *text = ant_reading_choices_fills_text (&choices);
  g_assert_cmpstr (text, ==, "-99, 0, 1e+34, -9999.9");
  g_assert_false (ant_reading_choices_parse_fills (&choices, "3, x", &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
  ant_reading_choices_clear (&choices);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/reading-choices/malformed-ones-are-refused", malformed_choices_are_refused);
  g_test_add_func ("/data/reading-choices/a-copy-stands-alone", a_copy_stands_alone);
  g_test_add_func ("/data/reading-choices/fills-are-parsed-and-told-again", fills_are_parsed_and_told_again);
  return g_test_run ();
}
