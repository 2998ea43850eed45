/* test-number-cursor.c - every number comes out bit for bit as strtod rounds it. */
#include "readers/number-cursor.h"

#include <glib.h>
#include <math.h>
#include <string.h>

static guint64 state = 20410314;

/* splitmix64: any bits will do, the same each time. */
static guint64
random_bits (void)
{
  guint64 z = state += 0x9e3779b97f4a7c15u;
  z = (z ^ (z >> 30)) * 0xbf58476d1ce4e5b9u;
  z = (z ^ (z >> 27)) * 0x94d049bb133111ebu;
  return z ^ (z >> 31);
}

static void
same_as_strtod (const char *text)
{
  char *end;
  double expected = g_ascii_strtod (text, &end), found = -12345.0;
  const char *after = ant_number_read (text, &found);
  if (after != end || memcmp (&found, &expected, sizeof found) != 0)
    g_error ("%s: found %.17g up to %zd, expected %.17g up to %zd", text, found, after ? after - text : -1, expected, end - text);
  /* Whatever stands behind it: more digits beyond the end would be seen. */
  g_autofree char *padded = g_strconcat (text, "\n", "1.5e7777", NULL);
  after = ant_number_read_padded (padded, &found);
  if (after != padded + (end - text) || memcmp (&found, &expected, sizeof found) != 0)
    g_error ("%s: by eights found %.17g up to %zd, expected %.17g", text, found, after ? after - padded : -1, expected);
}

static void
a_million_random_numbers_equal_strtod (void)
{
  char text[64];
  for (int i = 0; i < 1000000; i++)
    {
      guint64 bits = random_bits ();
      int form = i % 5;
      double any;
      memcpy (&any, &bits, sizeof any);
      double everyday = (double) (bits >> 11) / 9007199254740992.0 * 3000.0;
      if (form == 0 && isfinite (any))
        g_snprintf (text, sizeof text, "%.17g,", any);
      else if (form == 1)
        g_snprintf (text, sizeof text, "%.*f\n", (int) (bits % 12), everyday);
      else if (form == 2)
        g_snprintf (text, sizeof text, "-%.18e;", everyday);
      else if (form == 3)
        g_snprintf (text, sizeof text, "%" G_GUINT64_FORMAT "e%d ", random_bits () >> (bits % 64), (int) (bits % 60) - 30);
      else
        g_snprintf (text, sizeof text, "+%" G_GUINT64_FORMAT ".%" G_GUINT64_FORMAT "\t", bits % 10000000, random_bits () >> (bits % 50));
      same_as_strtod (text);
    }
}

static void
numbers_on_the_border_between_two_doubles_equal_strtod (void)
{
  char text[64];
  for (int i = 0; i < 200000; i++)
    {
      /* 54-bit whole numbers are doubles or exactly half way between two. */
      guint64 half = (random_bits () >> 10) | (UINT64_C (1) << 53);
      g_snprintf (text, sizeof text, "%" G_GUINT64_FORMAT "%s", half, i % 2 ? "\n" : ".0,");
      same_as_strtod (text);
      g_snprintf (text, sizeof text, "%" G_GUINT64_FORMAT "e-%d\n", half, i % 28);
      same_as_strtod (text);
      g_snprintf (text, sizeof text, "%" G_GUINT64_FORMAT "e%d\n", half >> (i % 20), i % 30);
      same_as_strtod (text);
    }
}

static void
awkward_numbers_equal_strtod (void)
{
  static const char *const awkward[] = {
    "0\n", "-0\n", "0.0\n", "-0.0e5\n", "00000000000000000000000000001\n", "0.00000000000000000000000000001\n", "1e22\n", "1e23\n",
    "9007199254740991\n", "9007199254740992\n", "9007199254740993\n", "9007199254740993e0\n", "18446744073709551615\n",
    "18446744073709551616\n", "9999999999999999999\n", "99999999999999999999\n", "1.7976931348623157e308\n", "1.8e308\n",
    "-1e999\n", "1e-999\n", "4.9e-324\n", "2.4703282292062327e-324\n", "2.4703282292062328e-324\n", "2.2250738585072011e-308\n",
    "2.2250738585072014e-308\n", "1.\n", ".5\n", "-.5\n", "+.5\n", "5e\n", "5e+\n", "5e-\n", "5ex\n", "1e0000000000000000005\n",
    "1e99999999999999999999\n", "0e99999999999999999999\n", "8.5e-323\n", "123456789012345678901234567890\n", "1..2\n", "1.2.3\n",
    "7.2057594037927933e16\n", "0.1\n", "0.3\n", "2451639.5\n", "1361.409702785820855e+03\n", "1-2\n", "3+4\n",
  };
  for (gsize i = 0; i < G_N_ELEMENTS (awkward); i++)
    same_as_strtod (awkward[i]);
}

static void
a_thousand_digits_equal_strtod (void)
{
  g_autoptr (GString) text = g_string_new ("1361.");
  for (int i = 0; i < 1000; i++)
    g_string_append_c (text, (char) ('0' + random_bits () % 10));
  g_string_append (text, "e-3\n");
  same_as_strtod (text->str);
}

static void
fortran_exponents_are_understood (void)
{
  double value = 0.0;
  g_assert_nonnull (ant_number_read ("1.361D+03,", &value));
  g_assert_cmpfloat (value, ==, 1361.0);
  g_assert_nonnull (ant_number_read ("1.2345678901234567890123d-300\n", &value));
  g_assert_cmpfloat (value, ==, 1.2345678901234567890123e-300);
}

static void
words_are_no_numbers (void)
{
  static const char *const words[] = { "\n", "-\n", "+\n", ".\n", "-.\n", "e5\n", "nan\n", "inf\n", "abc\n", ",1\n", "--1\n", " 1\n" };
  double value = 0.0;
  for (gsize i = 0; i < G_N_ELEMENTS (words); i++)
    {
      g_autofree char *padded = g_strconcat (words[i], "12345678", NULL);
      g_assert_null (ant_number_read (words[i], &value));
      g_assert_null (ant_number_read_padded (padded, &value));
    }
  g_assert_cmpstr (ant_number_read ("0x10\n", &value), ==, "x10\n");
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/readers/number-cursor/a-million-random-numbers-equal-strtod", a_million_random_numbers_equal_strtod);
  g_test_add_func ("/readers/number-cursor/numbers-on-the-border-between-two-doubles-equal-strtod",
                   numbers_on_the_border_between_two_doubles_equal_strtod);
  g_test_add_func ("/readers/number-cursor/awkward-numbers-equal-strtod", awkward_numbers_equal_strtod);
  g_test_add_func ("/readers/number-cursor/a-thousand-digits-equal-strtod", a_thousand_digits_equal_strtod);
  g_test_add_func ("/readers/number-cursor/fortran-exponents-are-understood", fortran_exponents_are_understood);
  g_test_add_func ("/readers/number-cursor/words-are-no-numbers", words_are_no_numbers);
  return g_test_run ();
}
