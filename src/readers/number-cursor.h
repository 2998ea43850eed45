/* number-cursor.h - decimal numbers out of text in place, exactly as strtod rounds them and in no locale.
 *
 * The text must hold a character that belongs to no number before its memory ends (lines here end in a newline), so the
 * loops need no bound. Method of the fast path: Clinger (1990): a mantissa below 2^53 times or over an exact power of ten
 * is one correctly rounded operation. */
#pragma once

#include <stdint.h>

#define ANT_EXACT_MANTISSA (UINT64_C (1) << 53)
#define ANT_EXACT_POWER 22
extern const double ant_power_of_ten[ANT_EXACT_POWER + 1];

/* The rest of the numbers; use ant_number_read. `start` is past the sign. */
double ant_number_slow (const char *start, const char *end, int n_digits, uint64_t mantissa, int exponent);
/* Past an exponent (e, E, or Fortran's d, D) if one stands here, else `at`; its value is added to *exponent, clamped. */
const char *ant_number_exponent (const char *at, int *exponent);

static inline int
ant_is_digit (char c)
{
  return (unsigned char) (c - '0') < 10;
}

/* Read a number at `at` (no blanks before it). Returns the place after it, NULL if no number begins here; words such as
 * inf, nan and hexadecimal numbers do not count. Overflow gives infinity, as strtod. */
static inline const char *
ant_number_read (const char *at, double *value)
{
  int negative = *at == '-';
  at += negative || *at == '+';
  const char *start = at;
  uint64_t mantissa = 0;
  int exponent = 0, n_digits;
  for (; ant_is_digit (*at); at++)
    mantissa = 10 * mantissa + (uint64_t) (*at - '0');
  n_digits = (int) (at - start);
  if (*at == '.')
    {
      const char *after_dot = ++at;
      for (; ant_is_digit (*at); at++)
        mantissa = 10 * mantissa + (uint64_t) (*at - '0');
      exponent = (int) (after_dot - at);
      n_digits -= exponent;
    }
  if (n_digits == 0)
    return 0;
  char letter = (char) (*at | 0x20);
  if (letter == 'e' || letter == 'd')
    at = ant_number_exponent (at, &exponent);
  double size;
  if (n_digits <= 19 && mantissa < ANT_EXACT_MANTISSA && exponent >= -ANT_EXACT_POWER && exponent <= ANT_EXACT_POWER)
    size = exponent < 0 ? (double) mantissa / ant_power_of_ten[-exponent] : (double) mantissa * ant_power_of_ten[exponent];
  else
    size = ant_number_slow (start, at, n_digits, mantissa, exponent);
  *value = negative ? -size : size;
  return at;
}
