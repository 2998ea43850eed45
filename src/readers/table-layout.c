/* table-layout.c - columns of a table by name, and what they hold. */
#include "readers/table-layout.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "data/error.h"
#include "sky/iso-time.h"

gboolean
ant_table_column_has_word (const AntTableColumn *column, const char *const *words)
{
  for (const char *at = column->name; *at;)
    {
      gsize n = 0;
      while (g_ascii_isalpha (at[n]))
        n++;
      for (gsize i = 0; n > 0 && words[i]; i++)
        if (strlen (words[i]) == n && !g_ascii_strncasecmp (words[i], at, n))
          return TRUE;
      at += n > 0 ? n : 1;
    }
  return FALSE;
}

int
ant_table_layout_column (const AntTableLayout *layout, const char *name)
{
  for (guint c = 0; c < layout->n_columns; c++)
    if (!g_ascii_strcasecmp (layout->columns[c].name, name))
      return (int) c;
  char *end;
  guint64 number = g_ascii_strtoull (name, &end, 10);
  return end != name && *end == 0 && number >= 1 && number <= layout->n_columns ? (int) number - 1 : -1;
}

void
ant_table_layout_no_column (const AntTableLayout *layout, const char *name, GError **error)
{
  g_autoptr (GString) names = g_string_new (NULL);
  for (guint c = 0; c < MIN (layout->n_columns, 12); c++)
    g_string_append_printf (names, "%s%s", c ? ", " : "", layout->columns[c].label);
  g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("no column “%s”; expected a number from 1 to %u or one of %s%s"), name,
               layout->n_columns, names->str, layout->n_columns > 12 ? ", …" : "");
}

gboolean
ant_table_column_mostly (const AntTableColumn *column, guint n)
{
  return n > 0 && 2 * n > column->n_cells - MIN (column->n_missing, column->n_cells - 1);
}

void
ant_table_column_study (AntTableColumn *column, const AntCell *cell, double *previous)
{
  AntIsoTime iso;
  double second, number = cell->number;
  int leap;
  column->n_cells++;
  if (cell->kind == ANT_CELL_MISSING)
    column->n_missing++;
  if (cell->kind == ANT_CELL_TEXT)
    {
      gboolean is_iso = ant_iso_read (cell->start, cell->end, &iso);
      column->n_text++;
      column->n_iso_time += is_iso && iso.has_time;
      column->n_iso_date += is_iso && !iso.has_time;
      column->has_zone |= is_iso && iso.has_zone;
      column->n_clock += !is_iso && ant_iso_read_clock (cell->start, cell->end, &second, &leap);
    }
  if (cell->kind != ANT_CELL_NUMBER)
    return;
  gboolean whole = number == floor (number) && fabs (number) < 2e19;
  column->n_numbers++;
  column->n_whole += whole;
  column->n_padded += cell->end - cell->start > 1 && cell->start[0] == '0' && g_ascii_isdigit (cell->start[1]);
  column->n_ymd += number > 1.5e7 && number < 3e7 && cell->end - cell->start >= 8
                   && ant_iso_read (cell->start, cell->start + 8, &iso);
  column->n_clock_digits += whole && number >= 0 && number < 240000 && fmod (number, 100.0) < 61.0
                            && fmod (floor (number / 100.0), 100.0) < 60.0;
  column->n_jd += number > 1.8e6 && number < 3.0e6;
  if (!(fabs (number) < 1e18))
    return;
  column->n_up += number > *previous;
  column->n_down += number < *previous;
  column->least = fmin (column->least, number);
  column->greatest = fmax (column->greatest, number);
  *previous = number;
}

AntTableLayout *
ant_table_layout_new (guint n_columns)
{
  AntTableLayout *layout = g_new0 (AntTableLayout, 1);
  layout->n_columns = n_columns;
  layout->columns = g_new0 (AntTableColumn, n_columns);
  for (guint c = 0; c < n_columns; c++)
    layout->columns[c].least = layout->columns[c].greatest = NAN;
  layout->header = g_ptr_array_new_with_free_func (g_free);
  layout->first_row = 1;
  return layout;
}

void
ant_table_layout_label (AntTableLayout *layout)
{
  for (guint c = 0; c < layout->n_columns; c++)
    {
      AntTableColumn *column = &layout->columns[c];
      column->label = *column->name ? g_strdup (column->name) : g_strdup_printf (_("column %u"), c + 1);
    }
}

char *
ant_table_layout_place (const AntTableLayout *layout)
{
  return layout->place ? g_strdup (layout->place) : g_strdup_printf (_("line %u"), layout->first_row);
}

void
ant_table_layout_free (AntTableLayout *layout)
{
  if (!layout)
    return;
  for (guint c = 0; layout->columns && c < layout->n_columns; c++)
    {
      g_free (layout->columns[c].name);
      g_free (layout->columns[c].label);
      g_free (layout->columns[c].unit);
      g_free (layout->columns[c].remark);
    }
  g_free (layout->columns);
  g_free (layout->place);
  g_clear_pointer (&layout->header, g_ptr_array_unref);
  g_free (layout);
}
