/* passage-table.c - the columns of passages, and what stands above them. */
#include "writers/passage-table.h"

#define NUMBER(name, expression)                                                                                       \
  static double name (gconstpointer data, gsize row)                                                                   \
  {                                                                                                                    \
    const AntScanResults *results = data;                                                                              \
    G_GNUC_UNUSED const AntTimeReference *time = &results->record->time;                                               \
    G_GNUC_UNUSED const AntPassage *passage = &results->passage[row];                                                  \
    return expression;                                                                                                 \
  }
#define TEXT(name, expression)                                                                                         \
  static char *name (gconstpointer data, gsize row)                                                                    \
  {                                                                                                                    \
    const AntScanResults *results = data;                                                                              \
    const AntTimeReference *time = &results->record->time;                                                             \
    const AntPassage *passage = &results->passage[row];                                                                \
    return expression;                                                                                                 \
  }

NUMBER (number, (double) row + 1)
NUMBER (start_jd, ant_time_reference_jd (time, passage->start_d))
NUMBER (mid_jd, ant_time_reference_jd (time, passage->mid_d))
NUMBER (end_jd, ant_time_reference_jd (time, passage->end_d))
TEXT (mid_time, ant_time_reference_own_text (time, passage->mid_d))
TEXT (mid_utc, ant_time_reference_utc_text (time, passage->mid_d, 0))
NUMBER (width_d, passage->end_d - passage->start_d)
NUMBER (depth_ppm, passage->depth_ppm)
NUMBER (depth_sigma_ppm, passage->depth_sigma_ppm)
NUMBER (coverage, passage->coverage)

static const AntTableColumn columns[] = {
  { "passage", ANT_CELL_WHOLE, NULL, NULL, "meta.id;meta.main", NULL, FALSE, number, NULL },
  { "start_jd", ANT_CELL_REAL, "%.4f", "d", "time.start",
    "half of the depth is reached, JD in the record's time scale; empty if the origin of its times is unknown", TRUE, start_jd, NULL },
  { "mid_jd", ANT_CELL_REAL, "%.4f", "d", "time.epoch;meta.main", "halfway from start to end, likewise", TRUE, mid_jd, NULL },
  { "end_jd", ANT_CELL_REAL, "%.4f", "d", "time.end", "half of the depth is left, likewise", TRUE, end_jd, NULL },
  { "mid_time", ANT_CELL_TEXT, NULL, NULL, "time.epoch", "middle as the record writes its times", FALSE, NULL, mid_time },
  { "mid_utc", ANT_CELL_TEXT, NULL, NULL, "time.epoch", "middle in UTC; empty if the time scale is unknown", FALSE, NULL, mid_utc },
  { "width_d", ANT_CELL_REAL, "%.3f", "d", "time.duration", "from start to end, 1 to 14 d", FALSE, width_d, NULL },
  { "depth_ppm", ANT_CELL_REAL, "%.5g", "10**-6", "phot.flux.bol;arith.ratio;stat.max",
    "below the straight line over the minimum that touches the slow part on both sides; listed from 4 times its sigma", FALSE,
    depth_ppm, NULL },
  { "depth_sigma_ppm", ANT_CELL_REAL, "%.4g", "10**-6", "stat.error;phot.flux.bol;arith.ratio;stat.max",
    "uncertainty of depth_ppm given the noise model", FALSE, depth_sigma_ppm, NULL },
  { "coverage", ANT_CELL_REAL, "%.4f", NULL, "stat.filling", "observed fraction of start to end", FALSE, coverage, NULL },
};
G_STATIC_ASSERT ((int) ANT_PASSAGE_SIGMAS == 4 && (int) ANT_PASSAGE_SHORTEST_D == 1 && (int) ANT_PASSAGE_LONGEST_D == 14); /* as told above */

AntTable *
ant_passage_table_new (const AntScanResults *results)
{
  AntTable *table = ant_table_new ("Passages: minima of the slow part of the record, such as spot groups", "PASSAGES", results->record);
  if (results->reach < ANT_SCAN_COMPLETE)
    ant_table_note (table, "incomplete: %s", ant_scan_reach_words (results->reach));
  ant_table_note (table, "no false-alarm claim: the Sun does this");
  ant_table_note (table, "slow part: what the data say about the noise model's parts slower than half a day, dips taken out");
  ant_table_add_columns (table, G_N_ELEMENTS (columns), columns);
  ant_table_set_rows (table, results->n_passages, results, NULL);
  return table;
}

GString *
ant_passage_table_text (const AntScanResults *results)
{
  g_autoptr (AntTable) table = ant_passage_table_new (results);
  return ant_table_text (table);
}
