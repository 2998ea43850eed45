/* flags-table.c - flags of rows, listed and as a mask. */
#include "writers/flags-table.h"

#include <math.h>

#include "data/exclusions.h"
#include "writers/csv.h"

#define USED "rows that are not listed are used; a row with only \"spike\" is used too, but not in the noise fit"

char *
ant_flag_names (guint16 flags)
{
  GString *names = g_string_new (NULL);
  for (unsigned bit = 0; bit < ANT_N_FLAGS; bit++)
    if (flags >> bit & 1)
      g_string_append_printf (names, "%s%s", names->len ? "|" : "", ant_flag_name (bit));
  return g_string_free (names, FALSE);
}

static char *
stamp_text (const AntRecord *record, gsize row)
{
  return isfinite (record->time_d[row]) ? ant_time_reference_own_text (&record->time, record->time_d[row]) : g_strdup ("");
}

GString *
ant_flags_table_text (const AntRecord *record, const guint16 *flags)
{
  GString *table = g_string_new (NULL);
  ant_csv_preamble (table, "Flags of rows", record);
  ant_csv_comment (table, "row: line or row number in the file; " USED);
  g_string_append (table, ANT_FLAGS_HEADER "\n");
  for (gsize i = 0; i < record->n_rows; i++)
    {
      if (flags[i] == 0)
        continue;
      g_autofree char *time = stamp_text (record, i), *names = ant_flag_names (flags[i]);
      g_string_append_printf (table, "%u,", record->line[i]);
      ant_csv_text (table, time);
      g_string_append_c (table, ',');
      ant_csv_text (table, names);
      g_string_append_c (table, '\n');
    }
  return table;
}

typedef struct
{
  const AntRecord *record;
  const guint16 *flags;
} Rows;

static double
line (gconstpointer data, gsize row)
{
  return ((const Rows *) data)->record->line[row];
}

static char *
time_text (gconstpointer data, gsize row)
{
  return stamp_text (((const Rows *) data)->record, row);
}

static double
time_jd (gconstpointer data, gsize row)
{
  const AntRecord *record = ((const Rows *) data)->record;
  return ant_time_reference_jd (&record->time, record->time_d[row]);
}

static double
flag_bits (gconstpointer data, gsize row)
{
  return ((const Rows *) data)->flags[row];
}

static char *
flag_text (gconstpointer data, gsize row)
{
  return ant_flag_names (((const Rows *) data)->flags[row]);
}

static const AntTableColumn columns[] = {
  { "row", ANT_CELL_WHOLE, NULL, NULL, "meta.record", "line or row number in the record's file", FALSE, line, NULL },
  { "time", ANT_CELL_TEXT, NULL, NULL, "time.epoch", "stamp as the record writes it; empty where it cannot be read", FALSE, NULL, time_text },
  { "jd", ANT_CELL_REAL, "%.7f", "d", "time.epoch;meta.main",
    "stamp, JD in the record's time scale; empty if the origin of its times is unknown", TRUE, time_jd, NULL },
  { "flags", ANT_CELL_BITS, NULL, NULL, "meta.code.qual", "why the row is left out: a bit for each reason, 0 for used rows", FALSE,
    flag_bits, flag_text },
};

void
ant_table_flag_legend (AntTable *table)
{
  static const char *const keys[] = { "FLAG1", "FLAG2", "FLAG4", "FLAG8", "FLAG16", "FLAG32", "FLAG64", "FLAG128" };
  G_STATIC_ASSERT (G_N_ELEMENTS (keys) == ANT_N_FLAGS);
  for (unsigned bit = 0; bit < ANT_N_FLAGS; bit++)
    {
      AntTableFact fact = { .key = keys[bit], .text = ant_flag_name (bit), .meaning = "what this bit of flags says" };
      g_array_append_val (table->facts, fact);
      ant_table_note (table, "%s (%d): %s", ant_flag_name (bit), 1 << bit, ant_flag_description (bit));
    }
}

AntTable *
ant_mask_table_new (const AntRecord *record, const guint16 *flags)
{
  AntTable *table = ant_table_new ("Flags of rows", "FLAGS", record);
  Rows *rows = g_new (Rows, 1);
  *rows = (Rows) { record, flags };
  ant_table_note (table, "every row of the record; flags 0: used; only the bit of \"spike\": used, but not in the noise fit");
  ant_table_flag_legend (table);
  ant_table_add_columns (table, G_N_ELEMENTS (columns), columns);
  ant_table_set_rows (table, record->n_rows, rows, g_free);
  return table;
}
