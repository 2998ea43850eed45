/* flags-table.c - flags.csv: every row of a record that is flagged, and why. */
#include "writers/flags-table.h"
#include <math.h>
#include "data/exclusions.h"
#include "writers/csv.h"

static void
append_flag_names (GString *table, guint16 flags)
{
  const char *bar = "";
  for (unsigned bit = 0; bit < ANT_N_FLAGS; bit++)
    if (flags >> bit & 1)
      {
        g_string_append_printf (table, "%s%s", bar, ant_flag_name (bit));
        bar = "|";
      }
}

GString *
ant_flags_table_text (const AntRecord *record, const guint16 *flags)
{
  GString *table = g_string_new (NULL);
  ant_csv_preamble (table, "Flags of rows", record);
  ant_csv_comment (table, "row: line or row number in the file; rows that are not listed are used; a row with only "
                          "\"spike\" is used too, but not in the noise fit");
  g_string_append (table, ANT_FLAGS_HEADER "\n");
  for (gsize i = 0; i < record->n_rows; i++)
    {
      if (flags[i] == 0)
        continue;
      g_autofree char *time =
          isfinite (record->time_d[i]) ? ant_time_reference_own_text (&record->time, record->time_d[i]) : g_strdup ("");
      g_string_append_printf (table, "%u,", record->line[i]);
      ant_csv_text (table, time);
      g_string_append_c (table, ',');
      append_flag_names (table, flags[i]);
      g_string_append_c (table, '\n');
    }
  return table;
}
