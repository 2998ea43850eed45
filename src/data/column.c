/* column.c - the life of a further column. */
#include "data/column.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

AntColumn *
ant_column_new (const char *name, const char *unit, float *value, gsize n_rows)
{
  AntColumn *column = g_new0 (AntColumn, 1);
  *column = (AntColumn){ .name = g_strdup (name), .unit = g_strdup (unit), .value = value };
  for (gsize i = 0; i < n_rows; i++)
    column->n_missing += isnan (value[i]) != 0;
  return column;
}

void
ant_column_free (AntColumn *column)
{
  if (!column)
    return;
  g_free (column->name);
  g_free (column->unit);
  g_free (column->value);
  g_free (column);
}

char *
ant_column_title (const AntColumn *column)
{
  if (!column->unit || !*column->unit || strstr (column->name, column->unit))
    return g_strdup (column->name);
  return g_strdup_printf ("%s, %s", column->name, column->unit);
}

char *
ant_column_words (const AntColumn *column, gsize n_rows)
{
  g_autofree char *title = ant_column_title (column);
  return column->n_missing == 0 ? g_steal_pointer (&title)
                                : g_strdup_printf (_("%s, %zu of %zu missing"), title, column->n_missing, n_rows);
}
