/* table.c - put a table together, and write it as CSV. */
#include "writers/table.h"

#include <glib/gi18n.h>
#include <math.h>

#include "data/error.h"
#include "writers/csv.h"
#include "writers/table-private.h"

AntTable *
ant_table_new (const char *title, const char *name, const AntRecord *record)
{
  AntTable *table = g_new0 (AntTable, 1);
  table->title = title;
  table->name = name;
  table->record = record;
  table->notes = g_ptr_array_new_with_free_func (g_free);
  table->facts = g_array_new (FALSE, FALSE, sizeof (AntTableFact));
  table->columns = g_array_new (FALSE, FALSE, sizeof (AntTableColumn));
  return table;
}

void
ant_table_free (AntTable *table)
{
  if (!table)
    return;
  if (table->rows_free)
    table->rows_free ((gpointer) (gsize) table->rows);
  g_ptr_array_unref (table->notes);
  g_array_unref (table->facts);
  g_array_unref (table->columns);
  g_free (table);
}

void
ant_table_note (AntTable *table, const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  g_ptr_array_add (table->notes, g_strdup_vprintf (format, arguments));
  va_end (arguments);
}

void
ant_table_fact_number (AntTable *table, const char *key, double number, const char *meaning)
{
  AntTableFact fact = { .key = key, .number = number, .meaning = meaning };
  g_array_append_val (table->facts, fact);
}

void
ant_table_add_columns (AntTable *table, gsize n, const AntTableColumn *column)
{
  g_array_append_vals (table->columns, column, (guint) n);
}

void
ant_table_set_rows (AntTable *table, gsize n_rows, gconstpointer rows, GDestroyNotify rows_free)
{
  table->n_rows = n_rows;
  table->rows = rows;
  table->rows_free = rows_free;
}

/* The first ending of each is the one that is written. */
static const struct
{
  const char *name, *endings[4];
} formats[] = {
  [ANT_TABLE_CSV] = { "csv", { ".csv" } },
  [ANT_TABLE_FITS] = { "fits", { ".fits", ".fit" } },
  [ANT_TABLE_VOTABLE] = { "votable", { ".vot", ".votable", ".xml" } },
};

const char *
ant_table_ending (AntTableFormat format)
{
  return formats[format].endings[0];
}

const char *
ant_table_format_name (AntTableFormat format)
{
  return formats[format].name;
}

gboolean
ant_table_format_of (const char *path, AntTableFormat *format, GError **error)
{
  g_autofree char *lower = g_ascii_strdown (path, -1), *shown = g_filename_display_name (path);
  for (int f = 0; f < ANT_N_TABLE_FORMATS; f++)
    for (const char *const *ending = formats[f].endings; *ending; ending++)
      if (g_str_has_suffix (lower, *ending))
        {
          *format = (AntTableFormat) f;
          return TRUE;
        }
  g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("%s: the name of a table must end in .csv, .fits or .vot"), shown);
  return FALSE;
}

const char *
ant_table_digits (const AntTableColumn *column, double number, gsize size, char *text)
{
  *text = '\0';
  return isfinite (number) ? g_ascii_formatd (text, (int) size, column->format, number) : text;
}

/* POSIX time is UTC whose leap seconds are not counted. */
const char *
ant_table_scale_word (const AntRecord *record, const char *unknown)
{
  switch (record->time.scale)
    {
    case ANT_SCALE_UNKNOWN: return unknown;
    case ANT_SCALE_UNIX: return "UTC";
    default: return ant_time_scale_name (record->time.scale);
    }
}

const char *
ant_table_place_word (const AntRecord *record)
{
  static const char *const words[][2] = { { "geocentre", "GEOCENTER" },   { "geocenter", "GEOCENTER" },
                                          { "heliocentre", "HELIOCENTER" }, { "heliocenter", "HELIOCENTER" },
                                          { "barycentre", "BARYCENTER" }, { "barycenter", "BARYCENTER" },
                                          { "observer", "TOPOCENTER" },   { "topocenter", "TOPOCENTER" } };
  const char *place = record->time.place;
  for (gsize i = 0; place && i < G_N_ELEMENTS (words); i++)
    if (g_ascii_strcasecmp (place, words[i][0]) == 0)
      return words[i][1];
  return "UNKNOWN";
}

static void
append_cell (GString *csv, const AntTable *table, const AntTableColumn *column, gsize row)
{
  char digits[400];
  if (column->kind == ANT_CELL_REAL)
    g_string_append (csv, ant_table_digits (column, column->number (table->rows, row), sizeof digits, digits));
  else if (column->kind == ANT_CELL_WHOLE)
    g_string_append_printf (csv, "%d", (int) column->number (table->rows, row));
  else
    {
      g_autofree char *text = column->text (table->rows, row);
      ant_csv_text (csv, text);
    }
}

GString *
ant_table_text (const AntTable *table)
{
  GString *csv = g_string_new (NULL);
  const AntTableColumn *column = (const AntTableColumn *) (void *) table->columns->data;
  guint n = table->columns->len;
  ant_csv_preamble (csv, table->title, table->record);
  for (guint i = 0; i < table->notes->len; i++)
    ant_csv_comment (csv, "%s", (const char *) g_ptr_array_index (table->notes, i));
  for (guint c = 0; c < n; c++)
    if (column[c].meaning)
      ant_csv_comment (csv, "%s: %s", column[c].name, column[c].meaning);
  for (guint c = 0; c < n; c++)
    g_string_append_printf (csv, "%s%c", column[c].name, c + 1 < n ? ',' : '\n');
  for (gsize row = 0; row < table->n_rows; row++)
    for (guint c = 0; c < n; c++)
      {
        append_cell (csv, table, &column[c], row);
        g_string_append_c (csv, c + 1 < n ? ',' : '\n');
      }
  return csv;
}

GBytes *
ant_table_bytes (const AntTable *table, AntTableFormat format, GError **error)
{
  switch (format)
    {
    case ANT_TABLE_CSV: return g_string_free_to_bytes (ant_table_text (table));
    case ANT_TABLE_FITS: return ant_table_fits (table, error);
    case ANT_TABLE_VOTABLE: return ant_table_votable (table);
    }
  g_return_val_if_reached (NULL);
}
