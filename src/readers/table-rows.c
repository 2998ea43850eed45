/* table-rows.c - the loop over the lines of a text table. */
#include "readers/table-rows.h"

#include <float.h>
#include <math.h>
#include <string.h>

#include "readers/line-source.h"
#include "readers/text-cell.h"
#include "readers/text-names.h"

/* What to do with each column: a slot of the row's wanted cells, or none. A column may serve once only. */
typedef struct
{
  gint16 slot[ANT_MOST_COLUMNS];
  guint n_slots;
  guint error, quality; /* slots, where there are such columns */
  guint values[ANT_MOST_CANDIDATES], times[ANT_MOST_TIME_PARTS], further[ANT_MOST_FURTHER];
  AntCell cells[ANT_MOST_CANDIDATES + ANT_MOST_TIME_PARTS + ANT_MOST_FURTHER + 2];
} Slots;

struct _AntRowParser
{
  const AntTableLayout *layout;
  const AntValueColumns *columns;
  AntTimeForm form;
  Slots slots;
};

static guint
slot_of (Slots *slots, guint column)
{
  if (slots->slot[column] < 0)
    slots->slot[column] = (gint16) slots->n_slots++;
  return (guint) slots->slot[column];
}

static void
make_slots (Slots *slots, const AntTableLayout *layout, const AntTimeForm *form, const AntValueColumns *columns)
{
  memset (slots, 0, sizeof *slots);
  for (guint c = 0; c < layout->n_columns; c++)
    slots->slot[c] = -1;
  for (guint i = 0; i < form->n_parts; i++)
    slots->times[i] = slot_of (slots, form->columns[i]);
  for (guint i = 0; i < columns->n_values; i++)
    slots->values[i] = slot_of (slots, columns->values[i]);
  for (guint i = 0; i < columns->n_further; i++)
    slots->further[i] = slot_of (slots, columns->further[i]);
  if (columns->error >= 0)
    slots->error = slot_of (slots, (guint) columns->error);
  if (columns->quality >= 0)
    slots->quality = slot_of (slots, (guint) columns->quality);
}

static void
set_room (AntTableRows *rows, const AntValueColumns *columns, gsize room)
{
  rows->room = room;
  rows->time_d = g_renew (double, rows->time_d, room);
  rows->line = g_renew (guint32, rows->line, room);
  for (guint i = 0; i < columns->n_values; i++)
    rows->values[i] = g_renew (double, rows->values[i], room);
  for (guint i = 0; i < columns->n_further; i++)
    rows->further[i] = g_renew (float, rows->further[i], room);
  if (columns->error >= 0)
    rows->error = g_renew (double, rows->error, room);
  if (columns->quality >= 0)
    rows->quality = g_renew (gint64, rows->quality, room);
}

static void
make_room (AntTableRows *rows, const AntValueColumns *columns, gsize n_more)
{
  if (rows->n + n_more > rows->room)
    set_room (rows, columns, MAX (rows->n + n_more, rows->room ? 2 * rows->room : 4096));
}

void
ant_table_rows_expect (AntTableRows *rows, const AntValueColumns *columns, gsize n)
{
  if (n > rows->room)
    set_room (rows, columns, n);
}

/* Cut a line; TRUE if it has as many cells as there are columns. */
static gboolean
cut (Slots *slots, const AntTableLayout *layout, const char *at, const char *end, guint *n_cells)
{
  guint n = 0;
  while (at)
    {
      gint16 slot = n < layout->n_columns ? slots->slot[n] : -1;
      at = slot >= 0 ? ant_cell_next_number (at, end, layout->separator, &slots->cells[slot])
                     : ant_cell_skip (at, end, layout->separator);
      n++;
    }
  *n_cells = n;
  return n == layout->n_columns;
}

static void
note_first (gsize *count, guint32 *first, char **text, guint32 line, const AntCell *cell)
{
  if ((*count)++ > 0)
    return;
  *first = line;
  *text = ant_text_excerpt (cell->start, cell->end, 40);
}

/* Beyond a float there is no housekeeping, only marks of missing ones. */
static float
as_float (double number)
{
  return fabs (number) <= (double) FLT_MAX ? (float) number : NAN;
}

static void
add_row (AntTableRows *rows, const Slots *slots, AntTimeForm *form, const AntValueColumns *columns, guint32 line)
{
  const AntCell *times[ANT_MOST_TIME_PARTS];
  gsize row = rows->n++;
  for (guint i = 0; i < form->n_parts; i++)
    times[i] = &slots->cells[slots->times[i]];
  rows->line[row] = line;
  rows->time_d[row] = ant_time_form_read (form, times);
  if (isnan (rows->time_d[row]))
    note_first (&rows->n_no_time, &rows->first_no_time, &rows->no_time_text, line, times[0]);
  for (guint i = 0; i < columns->n_values; i++)
    {
      const AntCell *cell = &slots->cells[slots->values[i]];
      rows->values[i][row] = cell->kind == ANT_CELL_NUMBER ? cell->number : (double) NAN;
      if (cell->kind == ANT_CELL_TEXT && columns->n_values == 1)
        note_first (&rows->n_text_values, &rows->first_text_value, &rows->text_value, line, cell);
    }
  for (guint i = 0; i < columns->n_further; i++)
    rows->further[i][row] = as_float (slots->cells[slots->further[i]].number);
  if (columns->error >= 0)
    rows->error[row] = slots->cells[slots->error].number;
  /* An unreadable quality is a bad one: -1 has every bit set. */
  if (columns->quality >= 0 && !ant_cell_integer (&slots->cells[slots->quality], &rows->quality[row]))
    {
      rows->quality[row] = -1;
      rows->n_no_quality++;
    }
}

AntRowParser *
ant_row_parser_new (const AntTableLayout *layout, const AntTimeForm *form, const AntValueColumns *columns)
{
  AntRowParser *parser = g_new (AntRowParser, 1);
  parser->layout = layout;
  parser->columns = columns;
  parser->form = *form;
  make_slots (&parser->slots, layout, form, columns);
  return parser;
}

void
ant_row_parser_free (AntRowParser *parser)
{
  g_free (parser);
}

void
ant_row_parser_set_form (AntRowParser *parser, const AntTimeForm *form)
{
  parser->form = *form;
}

/* The cells of a line of data, [start, end) without its line end: 1 if there are as many as columns, 0 if not, -1 for a blank
 * line or a comment. */
static int
cut_line (AntRowParser *parser, const char *start, const char *end, guint *n_cells)
{
  const char *at = ant_cell_skip_blanks (start, end);
  if (at == end || ant_cell_is_comment_mark (*at))
    return -1;
  return cut (&parser->slots, parser->layout, parser->layout->separator == '\t' ? start : at, end, n_cells);
}

AntRowsFault
ant_table_rows_parse (AntTableRows *rows, AntRowParser *parser, const char *start, const char *end)
{
  const char *nul = memchr (start, 0, (gsize) (end - start));
  guint n_cells = 0;
  for (const char *next; start < end; start = next)
    {
      const char *newline = memchr (start, '\n', (gsize) (end - start));
      next = newline + 1;
      if (nul && nul < next)
        return ANT_ROWS_NUL;
      if (next - start > ANT_LONGEST_LINE)
        return ANT_ROWS_LONG_LINE;
      rows->n_lines++;
      make_room (rows, parser->columns, 1);
      int whole = cut_line (parser, start, newline > start && newline[-1] == '\r' ? newline - 1 : newline, &n_cells);
      if (whole > 0)
        add_row (rows, &parser->slots, &parser->form, parser->columns, rows->n_lines);
      else if (whole == 0 && rows->n_other_width++ == 0)
        {
          rows->first_other_width = rows->n_lines;
          rows->other_width = n_cells;
        }
    }
  return ANT_ROWS_GOOD;
}

void
ant_row_parser_start_form (AntRowParser *parser, const char *start, const char *end, AntTimeForm *form)
{
  const AntCell *times[ANT_MOST_TIME_PARTS];
  guint n_cells;
  for (guint i = 0; i < form->n_parts; i++)
    times[i] = &parser->slots.cells[parser->slots.times[i]];
  for (const char *newline; start < end && !form->started; start = newline + 1)
    {
      newline = memchr (start, '\n', (gsize) (end - start));
      if (cut_line (parser, start, newline, &n_cells) > 0)
        ant_time_form_read (form, times);
    }
}

static void
take_first (guint32 *first, char **text, gsize n_before, guint32 n_lines, guint32 *more_first, char **more_text)
{
  if (n_before == 0 && *more_first > 0)
    {
      *first = n_lines + *more_first;
      if (text)
        *text = g_steal_pointer (more_text);
    }
  if (more_text)
    g_clear_pointer (more_text, g_free);
  *more_first = 0;
}

void
ant_table_rows_append (AntTableRows *rows, AntTableRows *more, const AntValueColumns *columns)
{
  gsize n = more->n;
  make_room (rows, columns, n);
  memcpy (rows->time_d + rows->n, more->time_d, n * sizeof (double));
  for (gsize i = 0; i < n; i++)
    rows->line[rows->n + i] = rows->n_lines + more->line[i];
  for (guint v = 0; v < columns->n_values; v++)
    memcpy (rows->values[v] + rows->n, more->values[v], n * sizeof (double));
  for (guint f = 0; f < columns->n_further; f++)
    memcpy (rows->further[f] + rows->n, more->further[f], n * sizeof (float));
  if (columns->error >= 0)
    memcpy (rows->error + rows->n, more->error, n * sizeof (double));
  if (columns->quality >= 0)
    memcpy (rows->quality + rows->n, more->quality, n * sizeof (gint64));
  take_first (&rows->first_no_time, &rows->no_time_text, rows->n_no_time, rows->n_lines, &more->first_no_time, &more->no_time_text);
  take_first (&rows->first_text_value, &rows->text_value, rows->n_text_values, rows->n_lines, &more->first_text_value, &more->text_value);
  if (rows->n_other_width == 0)
    rows->other_width = more->other_width;
  take_first (&rows->first_other_width, NULL, rows->n_other_width, rows->n_lines, &more->first_other_width, NULL);
  rows->n += n;
  rows->n_lines += more->n_lines;
  rows->n_no_time += more->n_no_time;
  rows->n_text_values += more->n_text_values;
  rows->n_no_quality += more->n_no_quality;
  rows->n_other_width += more->n_other_width;
  more->n = more->n_no_time = more->n_text_values = more->n_no_quality = more->n_other_width = 0;
  more->n_lines = 0;
}

void
ant_table_rows_clear (AntTableRows *rows)
{
  g_free (rows->time_d);
  g_free (rows->error);
  g_free (rows->quality);
  g_free (rows->line);
  for (guint i = 0; i < ANT_MOST_CANDIDATES; i++)
    g_free (rows->values[i]);
  for (guint i = 0; i < ANT_MOST_FURTHER; i++)
    g_free (rows->further[i]);
  g_free (rows->no_time_text);
  g_free (rows->text_value);
  memset (rows, 0, sizeof *rows);
}
