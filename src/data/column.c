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

double
ant_column_wavelength_nm (const char *name)
{
  const struct { const char *unit; double nm; } units[] = { { "nm", 1 }, { "um", 1000 }, { "µm", 1000 }, { "micron", 1000 } };
  for (const char *at = name; at && *at; at++)
    {
      if (!g_ascii_isdigit (*at) || (at > name && (g_ascii_isdigit (at[-1]) || at[-1] == '.')))
        continue;
      char *end;
      double number = g_ascii_strtod (at, &end);
      while (*end == ' ' || *end == '_' || *end == '-')
        end++;
      for (gsize u = 0; u < G_N_ELEMENTS (units); u++)
        {
          gsize length = strlen (units[u].unit);
          if (g_ascii_strncasecmp (end, units[u].unit, length) == 0 && !g_ascii_isalpha (end[length]) && number * units[u].nm >= 100
              && number * units[u].nm <= 1e5)
            return number * units[u].nm;
        }
    }
  return (double) NAN;
}

gboolean
ant_column_is_bookkeeping (const char *name)
{
  static const char *const words[] = { "err", "unc", "sigma", "std", "stdev", "count", "n", "num", "flag", "flags", "quality", "qual", "time",
                                       "date", "day", "jd", "mjd", "year", "month", "hour", "minute", "second", "row", "index",
                                       "error", "uncertainty", "version", "source" };
  g_autofree char *low = g_ascii_strdown (name, -1);
  g_strcanon (low, "abcdefghijklmnopqrstuvwxyz", ' ');
  g_auto (GStrv) part = g_strsplit (low, " ", -1);
  for (gsize i = 0; part[i]; i++)
    for (gsize w = 0; w < G_N_ELEMENTS (words); w++)
      if (strcmp (part[i], words[w]) == 0)
        return TRUE;
  return FALSE;
}
