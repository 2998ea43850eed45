/* number-text.c - digits, signs and thin spaces. */
#include "plot/number-text.h"
#include <glib.h>
#include <math.h>
#include <string.h>

#define MOST_DIGITS 32

void
ant_plot_number_text (double value, int decimals, size_t size, char *text)
{
  char plain[MOST_DIGITS];
  g_snprintf (plain, sizeof plain, "%.*f", decimals, fabs (value));
  size_t whole = strspn (plain, "0123456789");
  gboolean is_zero = strspn (plain, "0.,") == strlen (plain);
  GString *out = g_string_new (value < 0 && !is_zero ? ANT_MINUS : "");
  for (size_t i = 0; i < whole; i++)
    {
      if (i > 0 && whole > 4 && (whole - i) % 3 == 0)
        g_string_append (out, ANT_THIN_SPACE);
      g_string_append_c (out, plain[i]);
    }
  g_string_append (out, plain + whole);
  g_strlcpy (text, out->str, size);
  g_string_free (out, TRUE);
}

void
ant_power_text (int exponent, size_t size, char *text)
{
  static const char *const raised[] = { "⁰", "¹", "²", "³", "⁴", "⁵", "⁶", "⁷", "⁸", "⁹" };
  if (exponent >= -2 && exponent <= 3)
    {
      ant_plot_number_text (pow (10, exponent), MAX (0, -exponent), size, text);
      return;
    }
  char digits[MOST_DIGITS];
  g_snprintf (digits, sizeof digits, "%d", ABS (exponent));
  g_strlcpy (text, exponent < 0 ? "10⁻" : "10", size);
  for (const char *digit = digits; *digit; digit++)
    g_strlcat (text, raised[*digit - '0'], size);
}
