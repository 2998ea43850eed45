/* table-rows.c - the loop over the lines of a text table. */
#include "readers/table-rows.h"

#include <float.h>
#include <math.h>
#include <string.h>

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
make_room (AntTableRows *rows, const AntValueColumns *columns)
{
  if (rows->n < rows->room)
    return;
  rows->room = rows->room ? 2 * rows->room : 4096;
  rows->time_d = g_renew (double, rows->time_d, rows->room);
  rows->line = g_renew (guint32, rows->line, rows->room);
  for (guint i = 0; i < columns->n_values; i++)
    rows->values[i] = g_renew (double, rows->values[i], rows->room);
  for (guint i = 0; i < columns->n_further; i++)
    rows->further[i] = g_renew (float, rows->further[i], rows->room);
  if (columns->error >= 0)
    rows->error = g_renew (double, rows->error, rows->room);
  if (columns->quality >= 0)
    rows->quality = g_renew (gint64, rows->quality, rows->room);
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

gboolean
ant_table_rows_read (AntTableRows *rows, AntLineSource *lines, const AntTableLayout *layout, AntTimeForm *form,
                     const AntValueColumns *columns, GError **error)
{
  g_autofree Slots *slots = g_new (Slots, 1);
  const char *start, *end;
  guint n_cells;
  int more;
  make_slots (slots, layout, form, columns);
  while ((more = ant_line_source_next (lines, &start, &end, error)) == 1)
    {
      if (lines->line < layout->first_row)
        continue;
      const char *at = ant_cell_skip_blanks (start, end);
      if (at == end || ant_cell_is_comment_mark (*at))
        continue;
      make_room (rows, columns);
      if (cut (slots, layout, layout->separator == '\t' ? start : at, end, &n_cells))
        add_row (rows, slots, form, columns, lines->line);
      else if (rows->n_other_width++ == 0)
        {
          rows->first_other_width = lines->line;
          rows->other_width = n_cells;
        }
    }
  return more == 0;
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
