/* number-cursor.c - the numbers that one double operation does not settle. */
#include "readers/number-cursor.h"

#include <float.h>
#include <glib.h>
#include <string.h>

const double ant_power_of_ten[ANT_EXACT_POWER + 1] = { 1e0,  1e1,  1e2,  1e3,  1e4,  1e5,  1e6,  1e7,  1e8,  1e9,  1e10, 1e11,
                                                       1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22 };

#define MOST_EXPONENT 100000 /* beyond every double, whatever the mantissa of a line can do about it is strtod's business */

const char *
ant_number_exponent (const char *at, int *exponent)
{
  const char *digit = at + 1;
  int negative = *digit == '-', size = 0;
  digit += negative || *digit == '+';
  if (!ant_is_digit (*digit))
    return at;
  for (; ant_is_digit (*digit); digit++)
    if (size < MOST_EXPONENT)
      size = 10 * size + (*digit - '0');
  *exponent += negative ? -size : size;
  return digit;
}

#if LDBL_MANT_DIG == 64
/* With 64 bits of mantissa 19 digits and powers to 10^27 are exact, so one operation is within half a unit of the last of
 * 64 bits; rounding that to 53 is right unless the 11 spare bits stand at their middle, give or take one. */
static gboolean
settled_by_extended (uint64_t mantissa, int exponent, double *value)
{
  static const long double powers[] = { 1e0L,  1e1L,  1e2L,  1e3L,  1e4L,  1e5L,  1e6L,  1e7L,  1e8L,  1e9L,
                                        1e10L, 1e11L, 1e12L, 1e13L, 1e14L, 1e15L, 1e16L, 1e17L, 1e18L, 1e19L,
                                        1e20L, 1e21L, 1e22L, 1e23L, 1e24L, 1e25L, 1e26L, 1e27L };
  if (exponent < -27 || exponent > 27)
    return FALSE;
  long double size = exponent < 0 ? (long double) mantissa / powers[-exponent] : (long double) mantissa * powers[exponent];
  uint64_t bits;
  memcpy (&bits, &size, sizeof bits);
  *value = (double) size;
  return (bits & 0x7ff) - 0x3ff > 2;
}
#else
static gboolean
settled_by_extended (uint64_t mantissa, int exponent, double *value)
{
  return FALSE;
}
#endif

double
ant_number_slow (const char *start, const char *end, int n_digits, uint64_t mantissa, int exponent)
{
  double value;
  if (n_digits <= 19 && settled_by_extended (mantissa, exponent, &value))
    return value;
  char small[128];
  gsize n = (gsize) (end - start);
  char *copy = n < sizeof small ? small : g_malloc (n + 1);
  for (gsize i = 0; i < n; i++)
    copy[i] = start[i] == 'd' || start[i] == 'D' ? 'e' : start[i];
  copy[n] = 0;
  value = g_ascii_strtod (copy, NULL);
  if (copy != small)
    g_free (copy);
  return value;
}
