/* number-table.c - any table of named columns of numbers under comment lines. */
#include "writers/number-table.h"
#include "writers/csv.h"

GString *
ant_number_table_text (const AntRecord *record, const char *title, const char *const *notes, gsize n_columns,
                       const AntNumberColumn *columns, gsize n_rows)
{
  GString *table = g_string_new (NULL);
  ant_csv_preamble (table, title, record);
  for (; notes && *notes; notes++)
    ant_csv_comment (table, "%s", *notes);
  for (gsize c = 0; c < n_columns; c++)
    {
      ant_csv_text (table, columns[c].name);
      g_string_append_c (table, c + 1 < n_columns ? ',' : '\n');
    }
  for (gsize row = 0; row < n_rows; row++)
    for (gsize c = 0; c < n_columns; c++)
      {
        ant_csv_number (table, columns[c].format ? columns[c].format : "%.10g", columns[c].number[row]);
        g_string_append_c (table, c + 1 < n_columns ? ',' : '\n');
      }
  return table;
}
