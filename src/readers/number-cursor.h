/* number-cursor.h - decimal numbers out of text in place, exactly as strtod rounds them and in no locale.
 *
 * The text must hold a character that belongs to no number before its memory ends (lines here end in a newline), so the
 * loops need no bound. Method of the fast path: Clinger (1990): a mantissa below 2^53 times or over an exact power of ten
 * is one correctly rounded operation. */
#pragma once

#include <glib.h>
#include <stdint.h>
#include <string.h>

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

/* How many digits a word of eight characters begins with, the first at its low end. */
static inline unsigned
ant_digits_begin (uint64_t word)
{
  uint64_t bare = word ^ UINT64_C (0x3030303030303030);
  uint64_t others = ((bare + UINT64_C (0x7676767676767676)) | bare) & UINT64_C (0x8080808080808080);
  return others ? (unsigned) __builtin_ctzll (others) / 8 : 8;
}

/* The value of its first n digits, 1 to 8 of them: pairs, then fours, then all in three multiplications. */
static inline uint64_t
ant_digits_value (uint64_t word, unsigned n)
{
  uint64_t bare = (word ^ UINT64_C (0x3030303030303030)) << (64 - 8 * n);
  bare = 10 * bare + (bare >> 8);
  return ((bare & UINT64_C (0x000000ff000000ff)) * UINT64_C (0x000f424000000064)
          + ((bare >> 16) & UINT64_C (0x000000ff000000ff)) * UINT64_C (0x0000271000000001)) >> 32;
}

/* Past a run of digits, eight at a time, which are added to the mantissa; it wraps after 19 digits. */
static inline const char *
ant_digits_read (const char *at, uint64_t *mantissa)
{
  static const uint64_t powers[] = { 1, 10, 100, 1000, 10000, 100000, 1000000, 10000000, 100000000 };
  for (unsigned n = 8; n == 8; at += n)
    {
      uint64_t word;
      memcpy (&word, at, sizeof word);
      word = GUINT64_FROM_LE (word);
      n = ant_digits_begin (word);
      if (n > 0)
        *mantissa = powers[n] * *mantissa + ant_digits_value (word, n);
    }
  return at;
}

/* Finish a number of which the digits are read: its exponent, and the double. */
static inline const char *
ant_number_finish (const char *start, const char *at, int n_digits, uint64_t mantissa, int exponent, int negative, double *value)
{
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

/* ant_number_read for text with eight more characters of memory behind it, whatever they hold. */
static inline const char *
ant_number_read_padded (const char *at, double *value)
{
  int negative = *at == '-', exponent = 0;
  at += negative || *at == '+';
  const char *start = at;
  uint64_t mantissa = 0;
  at = ant_digits_read (at, &mantissa);
  int n_digits = (int) (at - start);
  if (*at == '.')
    {
      const char *after_dot = ++at;
      at = ant_digits_read (at, &mantissa);
      exponent = (int) (after_dot - at);
      n_digits -= exponent;
    }
  return n_digits ? ant_number_finish (start, at, n_digits, mantissa, exponent, negative, value) : NULL;
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
    return NULL;
  return ant_number_finish (start, at, n_digits, mantissa, exponent, negative, value);
}
