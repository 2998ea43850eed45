/* value-columns.c - value, error and quality by name and content. */
#include "readers/value-columns.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "data/error.h"
#include "readers/text-names.h"
#include "readers/time-columns.h"

static gboolean
is_time_part (const AntTimeForm *form, guint c)
{
  for (guint i = 0; i < form->n_parts; i++)
    if (form->columns[i] == c)
      return TRUE;
  return form->repeats[0] == (int) c || form->repeats[1] == (int) c;
}

static gboolean
names_error (const AntTableColumn *column)
{
  static const char *const words[] = { "error", "errors", "err", "sigma", "unc", "uncertainty", "std", "stdev", "stddev", "sd", "e",
                                       "precision", "accuracy", "deviation", NULL };
  return ant_table_column_has_word (column, words);
}

static gboolean
names_quality (const AntTableColumn *column)
{
  static const char *const words[] = { "flag", "flags", "quality", "qual", "qualityflag", "qualityflags", "qc", "dq", "qa", "qf",
                                       "qflag", NULL };
  static const char *const other[] = { "provisional", NULL };
  return ant_table_column_has_word (column, words) && !ant_table_column_has_word (column, other);
}

static gboolean
mostly_numbers (const AntTableColumn *column)
{
  return 2 * column->n_text < column->n_cells;
}

static gboolean
is_whole (const AntTableColumn *column)
{
  return column->n_numbers > 0 && column->n_whole == column->n_numbers && mostly_numbers (column);
}

static gboolean
chosen (const AntTableLayout *layout, const char *name, const char *path, int *column, GError **error)
{
  *column = ant_table_layout_column (layout, name);
  if (*column < 0)
    {
      ant_table_layout_no_column (layout, name, error);
      g_prefix_error (error, "%s: ", path);
    }
  return *column >= 0;
}

/* Sure enough to look no further: numbers that vary, none of them a likely fill. */
static gboolean
plainly_good (const AntTableColumn *column)
{
  return 2 * column->n_numbers > column->n_cells && column->n_up + column->n_down > 0 && column->least > 0.0
         && column->greatest < 9999.0;
}

/* Flags without a name: small whole numbers. */
static gboolean
is_flag (const AntTableColumn *column)
{
  return !*column->name && is_whole (column) && column->least >= 0.0 && column->greatest <= 9.0;
}

static gboolean
has_flag (const AntTableLayout *layout, guint c)
{
  return c + 1 < layout->n_columns && !*layout->columns[c].name && !is_flag (&layout->columns[c]) && is_flag (&layout->columns[c + 1]);
}

/* A table without names whose values are each followed by a flag. */
static gboolean
is_interleaved (const AntTableLayout *layout, const AntTimeForm *form)
{
  guint n_pairs = 0, n_rest = 0;
  for (guint c = 0; c < layout->n_columns; c++)
    if (!is_time_part (form, c))
      {
        n_pairs += has_flag (layout, c) && !is_time_part (form, c + 1);
        n_rest++;
      }
  return n_pairs >= 3 && 3 * n_pairs >= n_rest;
}

/* The first value with a flag that varies, and that flag. */
static void
find_pair (const AntTableLayout *layout, const AntTimeForm *form, AntValueColumns *columns)
{
  for (guint c = 0; c < layout->n_columns && columns->n_values == 0; c++)
    {
      const AntTableColumn *column = &layout->columns[c];
      if (!is_time_part (form, c) && has_flag (layout, c) && 2 * column->n_numbers > column->n_cells && column->n_up + column->n_down > 0)
        columns->values[columns->n_values++] = c;
    }
}

static void
candidates (const AntTableLayout *layout, const AntTimeForm *form, AntValueColumns *columns)
{
  for (guint c = 0; c < layout->n_columns && columns->n_values < ANT_MOST_CANDIDATES; c++)
    {
      const AntTableColumn *column = &layout->columns[c];
      if (is_time_part (form, c) || (int) c == columns->error || (int) c == columns->quality || !mostly_numbers (column)
          || names_error (column) || names_quality (column) || ant_time_columns_alike (layout, c))
        continue;
      columns->values[columns->n_values++] = c;
      if (plainly_good (column))
        break;
    }
}

/* A column of this kind: the first after the value that its name tells, else the first at all. */
static int
by_name (const AntTableLayout *layout, const AntTimeForm *form, gboolean (*names) (const AntTableColumn *), gboolean whole)
{
  for (guint c = 0; c < layout->n_columns; c++)
    if (names (&layout->columns[c]) && !is_time_part (form, c) && mostly_numbers (&layout->columns[c])
        && (!whole || is_whole (&layout->columns[c])))
      return (int) c;
  return -1;
}

/* The error that belongs to the value stands behind it: behind the first candidate that has values. */
static int
error_by_name (const AntTableLayout *layout, const AntTimeForm *form, const AntValueColumns *columns)
{
  guint value = columns->values[columns->n_values - 1];
  for (guint i = columns->n_values; i-- > 0;)
    {
      const AntTableColumn *column = &layout->columns[columns->values[i]];
      if (2 * column->n_numbers > column->n_cells && column->n_up + column->n_down > 0)
        value = columns->values[i];
    }
  for (guint c = value + 1; c < layout->n_columns; c++)
    if (names_error (&layout->columns[c]) && mostly_numbers (&layout->columns[c]) && !is_time_part (form, c))
      return (int) c;
  return -1;
}

static gboolean
is_candidate (const AntValueColumns *columns, guint c)
{
  for (guint i = 0; i < columns->n_values; i++)
    if (columns->values[i] == c)
      return TRUE;
  return FALSE;
}

/* Housekeeping and other bands: all that is left but other ways to write the time. */
static void
find_further (const AntTableLayout *layout, const AntTimeForm *form, AntValueColumns *columns)
{
  for (guint c = 0; c < layout->n_columns; c++)
    {
      const AntTableColumn *column = &layout->columns[c];
      if (is_time_part (form, c) || is_candidate (columns, c) || (int) c == columns->error || (int) c == columns->quality
          || (columns->interleaved && is_flag (column)) || !mostly_numbers (column) || column->n_missing == column->n_cells || ant_time_columns_alike (layout, c))
        continue;
      if (columns->n_further < ANT_MOST_FURTHER)
        columns->further[columns->n_further++] = c;
      else
        columns->n_left_out++;
    }
}

gboolean
ant_value_columns_find (const AntTableLayout *layout, const AntTimeForm *form, const AntReadingChoices *choices, const char *path,
                        AntValueColumns *columns, GError **error)
{
  static const AntReadingChoices none = { 0 };
  int value;
  if (!choices)
    choices = &none;
  *columns = (AntValueColumns){ .error = -1, .quality = -1 };
  gboolean no_quality = choices->quality_column && !g_ascii_strcasecmp (choices->quality_column, "none");
  gboolean no_error = choices->error_column && !g_ascii_strcasecmp (choices->error_column, "none");
  if (choices->quality_column && !no_quality && !chosen (layout, choices->quality_column, path, &columns->quality, error))
    return FALSE;
  if (choices->error_column && !no_error && !chosen (layout, choices->error_column, path, &columns->error, error))
    return FALSE;
  if (!choices->quality_column)
    columns->quality = by_name (layout, form, names_quality, TRUE);
  columns->interleaved = !choices->quality_column && columns->quality < 0 && is_interleaved (layout, form);
  if (choices->value_column)
    {
      if (!chosen (layout, choices->value_column, path, &value, error))
        return FALSE;
      columns->values[columns->n_values++] = (guint) value;
    }
  else if (columns->interleaved)
    find_pair (layout, form, columns);
  else
    candidates (layout, form, columns);
  if (columns->n_values == 0)
    {
      g_autofree char *place = ant_table_layout_place (layout);
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ,
                   _("%s: %s: found no column of numbers beside the time, expected one; name it with --column value=…"), path,
                   place);
      return FALSE;
    }
  if (columns->interleaved && has_flag (layout, columns->values[0]))
    columns->quality = (int) columns->values[0] + 1;
  if (!choices->error_column)
    columns->error = error_by_name (layout, form, columns);
  find_further (layout, form, columns);
  return TRUE;
}

char *
ant_value_columns_own_unit (const AntTableColumn *column)
{
  static const char *const ppm[] = { "ppm", NULL };
  static const char *const relative[] = { "relative", "rel", "normalized", "normalised", "norm", NULL };
  if (column->unit)
    {
      const char *known = ant_text_known_unit (column->unit);
      return g_strdup (known ? known : column->unit);
    }
  if (ant_table_column_has_word (column, ppm))
    return g_strdup ("ppm");
  return ant_table_column_has_word (column, relative) ? g_strdup ("relative") : NULL;
}

char *
ant_value_columns_unit (const AntTableLayout *layout, guint c)
{
  static const char *const spellings[] = { "W/m2", "W/m^2", "Wm-2", "W m-2", "W.m2", "W m^-2" };
  char *own = ant_value_columns_own_unit (&layout->columns[c]);
  if (own)
    return own;
  for (guint i = 0; i < layout->header->len; i++)
    for (gsize s = 0; s < G_N_ELEMENTS (spellings); s++)
      if (strcasestr (g_ptr_array_index (layout->header, i), "unit") && strstr (g_ptr_array_index (layout->header, i), spellings[s]))
        return g_strdup ("W/m2");
  return NULL;
}
