/* text-layout.c - separator, header and column contents of a text table. */
#include "readers/text-layout.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "data/error.h"
#include "readers/text-cell.h"
#include "readers/text-names.h"
#include "sky/iso-time.h"

#define MOST_LINES 8192
#define MOST_HEADER_LINES 1000
#define LINES_JUDGED 256 /* from the end of the sample, where no header is left */

typedef struct
{
  const char *start, *end;
  gboolean is_text; /* neither blank nor a comment */
} Line;

static guint
cut_lines (const char *sample, gsize n, Line *lines)
{
  guint n_lines = 0;
  for (const char *at = sample; at < sample + n && n_lines < MOST_LINES;)
    {
      const char *newline = memchr (at, '\n', (gsize) (sample + n - at));
      const char *next = newline ? newline + 1 : sample + n;
      const char *end = newline ? newline : next;
      if (end > at && end[-1] == '\r')
        end--;
      const char *first = ant_cell_skip_blanks (at, end);
      lines[n_lines++] = (Line){ at, end, first < end && !ant_cell_is_comment_mark (*first) };
      at = next;
    }
  return n_lines;
}

/* A first line that holds a whole number alone, or one with a comment behind it, counts the header's lines. */
static guint
header_count (const Line *lines, guint n_lines)
{
  guint first = 0;
  while (first < n_lines && ant_cell_skip_blanks (lines[first].start, lines[first].end) == lines[first].end)
    first++;
  if (first == n_lines || !lines[first].is_text)
    return 0;
  const char *at = ant_cell_skip_blanks (lines[first].start, lines[first].end);
  guint count = 0;
  for (; g_ascii_isdigit (*at) && count < 100000; at++)
    count = 10 * count + (guint) (*at - '0');
  const char *rest = ant_cell_skip_blanks (at, lines[first].end);
  if (at == lines[first].start || count == 0 || count + 1 >= n_lines)
    return 0;
  if (rest < lines[first].end)
    return ant_cell_is_comment_mark (*rest) && rest + 1 < lines[first].end ? count : 0;
  const Line *next = &lines[first + 1];
  const char *begin = ant_cell_skip_blanks (next->start, next->end);
  return begin < next->end && !g_ascii_isdigit (*begin) && *begin != '-' && *begin != '.' ? count : 0;
}

static gboolean
is_date_or_clock (const AntCell *cell)
{
  AntIsoTime iso;
  double second;
  int leap;
  return ant_iso_read (cell->start, cell->end, &iso) || ant_iso_read_clock (cell->start, cell->end, &second, &leap);
}

/* Cells that data hold, as against words. */
static guint
count_data_cells (const AntCell *cells, guint n)
{
  guint good = 0;
  for (guint i = 0; i < n; i++)
    good += cells[i].kind != ANT_CELL_TEXT || is_date_or_clock (&cells[i]);
  return good;
}

/* How well a separator fits: the sum over the lines with the commonest number of cells of the part that are data. */
static double
judge_separator (const Line *lines, guint from, guint to, char separator, AntCell *cells, guint *n_columns)
{
  guint counts[LINES_JUDGED], best = 0, n_best = 0, n = 0;
  double parts[LINES_JUDGED], score = 0.0;
  for (guint i = to; i-- > from && n < LINES_JUDGED;)
    if (lines[i].is_text)
      {
        counts[n] = ant_cell_split (lines[i].start, lines[i].end, separator, ANT_MOST_COLUMNS, cells);
        guint kept = MIN (counts[n], ANT_MOST_COLUMNS);
        guint good = count_data_cells (cells, kept);
        parts[n++] = good >= 2 ? good / (double) kept : 0.0;
      }
  for (guint i = 0; i < n; i++)
    {
      guint same = 0;
      for (guint j = 0; j < n; j++)
        same += counts[j] == counts[i];
      if (same > n_best)
        {
          n_best = same;
          best = counts[i];
        }
    }
  for (guint i = 0; i < n; i++)
    score += counts[i] == best && best >= 2 ? parts[i] : 0.0;
  *n_columns = best;
  return score;
}

static gboolean
find_separator (AntTableLayout *layout, const char *name, const Line *lines, guint from, guint to, AntCell *cells,
                GError **error)
{
  static const char separators[] = { '\t', ',', ';', ' ' };
  double best = 0.0;
  for (gsize i = 0; i < G_N_ELEMENTS (separators); i++)
    {
      guint n_columns;
      double score = judge_separator (lines, from, to, separators[i], cells, &n_columns);
      if (score > best)
        {
          best = score;
          layout->separator = separators[i];
          layout->n_columns = n_columns;
        }
    }
  if (layout->n_columns > ANT_MOST_COLUMNS)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: found %u columns, expected at most %d"), name, layout->n_columns,
                   ANT_MOST_COLUMNS);
      return FALSE;
    }
  if (layout->n_columns > 0)
    return TRUE;
  guint at = from;
  while (at < to && !lines[at].is_text)
    at++;
  if (at == to)
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: found no line of data, expected rows of a time and a value"), name);
  else
    {
      g_autofree char *line = ant_text_excerpt (lines[at].start, lines[at].end, 40);
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ,
                   _("%s: line %u: found “%s”, expected rows of at least two columns of numbers or times"), name, at + 1, line);
    }
  return FALSE;
}

/* The first line that looks like the data at the end of the sample. */
static guint
find_first_row (const AntTableLayout *layout, const Line *lines, guint from, guint to, AntCell *cells)
{
  guint usual = 0;
  for (guint i = to, seen = 0; i-- > from && seen < 16;)
    if (lines[i].is_text
        && ant_cell_split (lines[i].start, lines[i].end, layout->separator, ANT_MOST_COLUMNS, cells) == layout->n_columns)
      {
        usual = MAX (usual, count_data_cells (cells, layout->n_columns));
        seen++;
      }
  for (guint i = from; i < to; i++)
    if (lines[i].is_text
        && ant_cell_split (lines[i].start, lines[i].end, layout->separator, ANT_MOST_COLUMNS, cells) == layout->n_columns
        && 2 * count_data_cells (cells, layout->n_columns) > usual)
      return i;
  return to;
}

static void
study_columns (AntTableLayout *layout, const Line *lines, guint from, guint to, AntCell *cells)
{
  g_autofree double *previous = g_new (double, layout->n_columns);
  for (guint c = 0; c < layout->n_columns; c++)
    previous[c] = layout->columns[c].least = layout->columns[c].greatest = NAN;
  for (guint i = from; i < to; i++)
    if (lines[i].is_text
        && ant_cell_split (lines[i].start, lines[i].end, layout->separator, ANT_MOST_COLUMNS, cells) == layout->n_columns)
      for (guint c = 0; c < layout->n_columns; c++)
        ant_table_column_study (&layout->columns[c], &cells[c], &previous[c]);
}

AntTableLayout *
ant_text_layout_find (const char *name, const char *sample, gsize n, GError **error)
{
  g_autoptr (AntTableLayout) layout = ant_table_layout_new (0);
  g_autofree Line *lines = g_new (Line, MOST_LINES);
  g_autofree AntCell *cells = g_new (AntCell, ANT_MOST_COLUMNS);
  guint n_lines = cut_lines (sample, n, lines);
  layout->is_text = TRUE;
  layout->counted = header_count (lines, n_lines);
  guint from = layout->counted;
  if (!find_separator (layout, name, lines, from, n_lines, cells, error))
    return NULL;
  guint first_row = find_first_row (layout, lines, from, n_lines, cells);
  layout->first_row = first_row + 1;
  for (guint i = 0; i < MIN (first_row, MOST_HEADER_LINES); i++)
    g_ptr_array_add (layout->header, ant_text_excerpt (lines[i].start, lines[i].end, 400));
  g_free (layout->columns);
  layout->columns = g_new0 (AntTableColumn, layout->n_columns);
  ant_text_name_columns (layout);
  study_columns (layout, lines, first_row, n_lines, cells);
  return g_steal_pointer (&layout);
}
