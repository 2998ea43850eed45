/* test-number-text.c - numbers and powers as they are written beside an axis. */
#include "plot/number-text.h"
#include <glib.h>

static void
assert_text (double value, int decimals, const char *expected)
{
  char text[48];
  ant_plot_number_text (value, decimals, sizeof text, text);
  g_assert_cmpstr (text, ==, expected);
}

static void
minus_is_a_minus (void)
{
  assert_text (-5.25, 2, ANT_MINUS "5.25");
}

static void
zero_has_no_sign (void)
{
  assert_text (-0.0, 0, "0");
  assert_text (-0.001, 1, "0.0");
}

static void
thousands_part_from_ten_thousand_up (void)
{
  assert_text (1361, 1, "1361.0");
  assert_text (12345678, 0, "12" ANT_THIN_SPACE "345" ANT_THIN_SPACE "678");
  assert_text (-10000, 0, ANT_MINUS "10" ANT_THIN_SPACE "000");
}

static void
powers_are_raised_beyond_the_plain_ones (void)
{
  char text[48];
  static const struct { int exponent; const char *text; } cases[] = {
    { -3, "10⁻³" }, { -2, "0.01" }, { 0, "1" }, { 3, "1000" }, { 4, "10⁴" }, { 12, "10¹²" },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    {
      ant_power_text (cases[i].exponent, sizeof text, text);
      g_assert_cmpstr (text, ==, cases[i].text);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/number-text/minus-is-a-minus", minus_is_a_minus);
  g_test_add_func ("/plot/number-text/zero-has-no-sign", zero_has_no_sign);
  g_test_add_func ("/plot/number-text/thousands-part-from-ten-thousand-up", thousands_part_from_ten_thousand_up);
  g_test_add_func ("/plot/number-text/powers-are-raised-beyond-the-plain-ones",
                   powers_are_raised_beyond_the_plain_ones);
  return g_test_run ();
}
