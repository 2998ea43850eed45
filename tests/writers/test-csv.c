/* test-csv.c - fields are quoted when they must be, numbers know no locale, comments stay on their line. */
#include <locale.h>
#include <math.h>
#include "writers/csv.h"

static void
assert_text (const char *text, const char *expected)
{
  g_autoptr (GString) table = g_string_new (NULL);
  ant_csv_text (table, text);
  g_assert_cmpstr (table->str, ==, expected);
}

static void
test_quoting (void)
{
  assert_text ("plain words", "plain words");
  assert_text ("", "");
  assert_text ("a,b", "\"a,b\"");
  assert_text ("say \"no\"", "\"say \"\"no\"\"\"");
  assert_text ("two\nlines", "\"two\nlines\"");
  assert_text ("# not a comment", "\"# not a comment\"");
}

static void
test_numbers (void)
{
  const char *locales[] = { "C", "de_DE.UTF-8", "fr_FR.UTF-8" };
  for (gsize i = 0; i < G_N_ELEMENTS (locales); i++)
    {
      setlocale (LC_ALL, locales[i]); /* a locale that is not installed changes nothing */
      g_autoptr (GString) table = g_string_new (NULL);
      ant_csv_number (table, "%.3f", 1234.5);
      ant_csv_number (table, "%.3f", NAN);
      ant_csv_number (table, "%.3f", INFINITY);
      g_assert_cmpstr (table->str, ==, "1234.500");
    }
  setlocale (LC_ALL, "C");
}

static void
test_largest_number (void)
{
  g_autoptr (GString) table = g_string_new (NULL);
  ant_csv_number (table, "%.7f", -1.7e308);
  g_assert_cmpuint (table->len, ==, 1 + 309 + 8);
}

static void
test_comments (void)
{
  g_autoptr (GString) table = g_string_new (NULL);
  ant_csv_comment (table, "record: %s", "odd\r\nname");
  g_assert_cmpstr (table->str, ==, "# record: odd  name\n");
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/writers/csv/fields-are-quoted-when-they-must-be", test_quoting);
  g_test_add_func ("/writers/csv/numbers-know-no-locale", test_numbers);
  g_test_add_func ("/writers/csv/the-largest-number-fits", test_largest_number);
  g_test_add_func ("/writers/csv/a-comment-stays-on-its-line", test_comments);
  return g_test_run ();
}
