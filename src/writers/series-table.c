/* series-table.c - the columns of the detrended series. */
#include "writers/series-table.h"

#include <math.h>

#include "core/units.h"
#include "writers/flags-table.h"

typedef struct
{
  const AntScanResults *results;
  const AntRecord *record;
  double floor_h;    /* length of crossing that the floor is told for */
  double *floor_ppm; /* [n_chunks] */
} Rows;

static void
rows_free (gpointer data)
{
  Rows *rows = data;
  g_free (rows->floor_ppm);
  g_free (rows);
}

static double
line (gconstpointer data, gsize row)
{
  return ((const Rows *) data)->record->line[row];
}

static char *
time_text (gconstpointer data, gsize row)
{
  const AntRecord *record = ((const Rows *) data)->record;
  return ant_time_reference_own_text (&record->time, record->time_d[row]);
}

static double
time_jd (gconstpointer data, gsize row)
{
  const AntRecord *record = ((const Rows *) data)->record;
  return ant_time_reference_jd (&record->time, record->time_d[row]);
}

static double
value (gconstpointer data, gsize row)
{
  return ((const Rows *) data)->record->value[row];
}

static double
slow_ppm (gconstpointer data, gsize row)
{
  const Rows *rows = data;
  gint64 place = rows->record->place[row];
  return place < 0 ? (double) NAN : (double) rows->results->slow_ppm[place];
}

static double
residual_ppm (gconstpointer data, gsize row)
{
  return (value (data, row) / ((const Rows *) data)->record->median - 1) / ANT_PPM - slow_ppm (data, row);
}

static double
floor_ppm (gconstpointer data, gsize row)
{
  const Rows *rows = data;
  double place = (double) rows->record->place[row];
  for (gsize i = 0; place >= 0 && i < rows->results->n_chunks; i++)
    if (place >= rows->results->chunk[i].own_from && place < rows->results->chunk[i].own_to)
      return rows->floor_ppm[i];
  return NAN;
}

static double
flag_bits (gconstpointer data, gsize row)
{
  return ((const Rows *) data)->results->flags[row];
}

static char *
flag_text (gconstpointer data, gsize row)
{
  return ant_flag_names (((const Rows *) data)->results->flags[row]);
}

enum { VALUE_COLUMN = 3 };
static const AntTableColumn columns[] = {
  { "row", ANT_CELL_WHOLE, NULL, NULL, "meta.record", "line or row number in the record's file", FALSE, line, NULL },
  { "time", ANT_CELL_TEXT, NULL, NULL, "time.epoch", "stamp as the record writes it", FALSE, NULL, time_text },
  { "jd", ANT_CELL_REAL, "%.7f", "d", "time.epoch;meta.main",
    "stamp, JD in the record's time scale; empty if the origin of its times is unknown", TRUE, time_jd, NULL },
  [VALUE_COLUMN] = { "value", ANT_CELL_REAL, "%.10g", NULL, "phot.flux.bol", "as the record has it", FALSE, value, NULL },
  { "residual_ppm", ANT_CELL_REAL, "%.3f", "10**-6", "stat.fit.residual;phot.flux.bol;arith.ratio",
    "value less the slow part, of the record's median; dips keep their depth", FALSE, residual_ppm, NULL },
  { "slow_ppm", ANT_CELL_REAL, "%.3f", "10**-6", "phot.flux.bol;arith.ratio",
    "slow part: what the data say about the noise model's parts slower than half a day, dips taken out", FALSE, slow_ppm, NULL },
  { "floor_ppm", ANT_CELL_REAL, "%.5g", "10**-6", "stat.stdev;phot.flux.bol;arith.ratio",
    "noise floor: 1-sigma depth of a crossing of the length stated above, in this row's piece of the record", FALSE, floor_ppm, NULL },
  { "flags", ANT_CELL_BITS, NULL, NULL, "meta.code.qual", "why the row is left out; nothing (0) for used rows; only spike: used, but not in the noise fit",
    FALSE, flag_bits, flag_text },
};

/* The searched length nearest to the wanted one; all chunks have the same. */
static void
choose_floor (Rows *rows)
{
  const AntScanResults *results = rows->results;
  gsize best = 0;
  for (gsize p = 0; p < results->n_floor; p++)
    if (fabs (results->floor[p].duration_d - ANT_SERIES_FLOOR_H / ANT_HOURS_PER_DAY)
        < fabs (results->floor[best].duration_d - ANT_SERIES_FLOOR_H / ANT_HOURS_PER_DAY))
      best = p;
  rows->floor_h = results->n_floor ? results->floor[best].duration_d * ANT_HOURS_PER_DAY : (double) NAN;
  rows->floor_ppm = g_new (double, results->n_chunks);
  for (gsize i = 0; i < results->n_chunks; i++)
    rows->floor_ppm[i] = best < results->chunk[i].n_floor ? results->chunk[i].floor[best].sigma_ppm : (double) NAN;
}

/* The unit in the spelling that FITS knows, where it is the usual one; others are told in words. */
static void
set_unit (AntTable *table, AntTableColumn *column, const char *unit)
{
  static const char *const usual[] = { "W/m2", "W/m^2", "W/m**2", "W m-2", "W m^-2", "W/m²", "W m⁻²", NULL };
  if (unit && g_strv_contains (usual, unit))
    column->unit = "W/m**2";
  else if (unit)
    ant_table_note (table, "unit of value: %s", unit);
}

AntTable *
ant_series_table_new (const AntScanResults *results)
{
  if (!results->slow_ppm)
    return NULL;
  AntTable *table = ant_table_new ("Detrended series", "SERIES", results->record);
  Rows *rows = g_new0 (Rows, 1);
  AntTableColumn mine[G_N_ELEMENTS (columns)];
  char hours[G_ASCII_DTOSTR_BUF_SIZE], median[G_ASCII_DTOSTR_BUF_SIZE];
  *rows = (Rows) { .results = results, .record = results->record };
  choose_floor (rows);
  memcpy (mine, columns, sizeof columns);
  set_unit (table, &mine[VALUE_COLUMN], results->record->value_unit);
  ant_table_note (table, "0 ppm: value %s, the median of the record",
                  g_ascii_formatd (median, sizeof median, "%.10g", results->record->median));
  ant_table_note (table, "floor_ppm is for crossings of %s h, contact I to IV", g_ascii_formatd (hours, sizeof hours, "%.4g", rows->floor_h));
  ant_table_fact_number (table, "FLOORHRS", rows->floor_h, "length of crossing of floor_ppm, hours");
  ant_table_fact_number (table, "MEDIAN", results->record->median, "value that 0 ppm stands for");
  ant_table_flag_legend (table);
  ant_table_add_columns (table, G_N_ELEMENTS (mine), mine);
  ant_table_set_rows (table, results->record->n_rows, rows, rows_free);
  return table;
}
