/* text-cell.c - cutting a line into cells. */
#include "readers/text-cell.h"

#include <math.h>
#include <string.h>

#include "readers/number-cursor.h"

static gboolean
is_blank (char c)
{
  return c == ' ' || c == '\t';
}

const char *
ant_cell_skip_blanks (const char *at, const char *end)
{
  while (at < end && is_blank (*at))
    at++;
  return at;
}

gboolean
ant_cell_is_comment_mark (char c)
{
  return c == '#' || c == ';' || c == '%' || c == '!';
}

static gboolean
is_missing_word (const char *start, gsize n)
{
  static const char *const words[] = { "-", "nan", "na", "n/a", "null", "none", "--", "---", "*", "missing" };
  if (n == 0)
    return TRUE;
  if (n > 1 && (*start == '-' || *start == '+') && g_ascii_isalpha (start[1]))
    start++, n--; /* -nan, as C's printf writes it */
  for (gsize i = 0; i < G_N_ELEMENTS (words); i++)
    if (strlen (words[i]) == n && !g_ascii_strncasecmp (words[i], start, n))
      return TRUE;
  return FALSE;
}

/* inf in any dress: a number, though no good one. */
static gboolean
is_infinity (const char *start, gsize n, double *number)
{
  gboolean negative = n > 0 && *start == '-';
  if (n > 0 && (*start == '-' || *start == '+'))
    start++, n--;
  if (!(n == 3 && !g_ascii_strncasecmp (start, "inf", 3)) && !(n == 8 && !g_ascii_strncasecmp (start, "infinity", 8)))
    return FALSE;
  *number = negative ? -HUGE_VAL : HUGE_VAL;
  return TRUE;
}

static void
classify (AntCell *cell)
{
  while (cell->end > cell->start && is_blank (cell->end[-1]))
    cell->end--;
  if (cell->end - cell->start >= 2 && *cell->start == '"' && cell->end[-1] == '"')
    {
      cell->start = ant_cell_skip_blanks (cell->start + 1, cell->end - 1);
      cell->end--;
      while (cell->end > cell->start && is_blank (cell->end[-1]))
        cell->end--;
    }
  gsize n = (gsize) (cell->end - cell->start);
  const char *after = n > 0 ? ant_number_read (cell->start, &cell->number) : NULL;
  if (after == cell->end && n > 0)
    cell->kind = ANT_CELL_NUMBER;
  else if (is_infinity (cell->start, n, &cell->number))
    cell->kind = ANT_CELL_NUMBER;
  else
    {
      gboolean missing = (n == 0 || !ant_is_digit (*cell->start)) && is_missing_word (cell->start, n);
      cell->kind = missing ? ANT_CELL_MISSING : ANT_CELL_TEXT;
      cell->number = NAN;
    }
}

/* Past blanks, a TAB that separates aside. */
static const char *
skip_blanks_but (const char *at, const char *end, char separator)
{
  while (at < end && is_blank (*at) && *at != separator)
    at++;
  return at;
}

/* The end of a cell that may be quoted; separators inside quotes do not count. */
static const char *
find_cell_end (const char *at, const char *end, char separator)
{
  if (at < end && *at == '"')
    {
      const char *quote = memchr (at + 1, '"', (gsize) (end - at - 1));
      if (quote)
        at = quote + 1;
    }
  if (separator == ' ')
    {
      while (at < end && !is_blank (*at))
        at++;
      return at;
    }
  const char *found = at < end ? memchr (at, separator, (gsize) (end - at)) : NULL;
  return found ? found : end;
}

const char *
ant_cell_skip (const char *at, const char *end, char separator)
{
  at = skip_blanks_but (at, end, separator);
  at = find_cell_end (at, end, separator);
  if (separator == ' ')
    at = ant_cell_skip_blanks (at, end);
  else if (at < end)
    return at + 1;
  return at < end ? at : NULL;
}

const char *
ant_cell_next (const char *at, const char *end, char separator, AntCell *cell)
{
  at = skip_blanks_but (at, end, separator);
  cell->start = at;
  const char *after = ant_number_read (at, &cell->number);
  if (after && (after == end || (after < end && *after == separator)))
    {
      cell->end = after; /* the common case: a bare number */
      cell->kind = ANT_CELL_NUMBER;
    }
  else
    {
      after = cell->end = find_cell_end (at, end, separator);
      classify (cell);
    }
  if (separator == ' ')
    after = ant_cell_skip_blanks (after, end);
  else if (after < end)
    return after + 1; /* a separator at the end opens one more, empty cell */
  return after < end ? after : NULL;
}

guint
ant_cell_split (const char *start, const char *end, char separator, guint most, AntCell *cells)
{
  guint n = 0;
  AntCell spare;
  if (separator == ' ')
    start = ant_cell_skip_blanks (start, end);
  if (start == end)
    return 0;
  while (start)
    {
      start = ant_cell_next (start, end, separator, n < most ? &cells[n] : &spare);
      n++;
    }
  return n;
}

gboolean
ant_cell_integer (const AntCell *cell, gint64 *value)
{
  const char *at = cell->start;
  gboolean negative = at < cell->end && *at == '-';
  guint64 size = 0;
  if (cell->kind != ANT_CELL_NUMBER)
    return FALSE;
  if (at < cell->end && (*at == '-' || *at == '+'))
    at++;
  for (; at < cell->end && ant_is_digit (*at); at++)
    {
      guint64 digit = (guint64) (*at - '0');
      if (size > (G_MAXUINT64 - digit) / 10)
        return FALSE;
      size = 10 * size + digit;
    }
  if (at == cell->end)
    {
      /* Unsigned 64-bit flags keep their bits. */
      *value = (gint64) (negative ? 0 - size : size);
      return negative ? size <= (guint64) G_MAXINT64 + 1 : TRUE;
    }
  if (cell->number != floor (cell->number) || fabs (cell->number) > 9007199254740992.0)
    return FALSE;
  *value = (gint64) cell->number; /* 3.0, 1e3 */
  return TRUE;
}
