/* passage-table.c - passages.csv. */
#include "writers/passage-table.h"

#include <glib/gi18n.h>

#include "writers/csv.h"

static void
append_definitions (GString *table, const AntRecord *record)
{
  ant_csv_preamble (table, _("Passages: minima of the slow part of the record, such as spot groups"), record);
  ant_csv_comment (table, _("no false-alarm claim: the Sun does this"));
  ant_csv_comment (table, _("slow part: what the data say about the noise model's parts slower than half a day, dips taken out"));
  ant_csv_comment (table, _("depth_ppm: below the straight line over the minimum that touches the slow part on both sides; "
                            "depth_sigma_ppm: its uncertainty given the noise model; listed from %g times that"),
                   ANT_PASSAGE_SIGMAS);
  ant_csv_comment (table, _("start, end: half of that depth; mid: halfway; width_d: from start to end, %g to %g d"),
                   ANT_PASSAGE_SHORTEST_D, ANT_PASSAGE_LONGEST_D);
  ant_csv_comment (table, _("coverage: observed fraction of start to end"));
  if (!record->time.origin_known)
    ant_csv_comment (table, _("start_jd, mid_jd, end_jd: empty, the origin of the times is unknown"));
}

static void
append_number (GString *table, const char *format, double number)
{
  g_string_append_c (table, ',');
  ant_csv_number (table, format, number);
}

static void
append_text (GString *table, char *text)
{
  g_string_append_c (table, ',');
  ant_csv_text (table, text);
  g_free (text);
}

GString *
ant_passage_table_text (const AntScanResults *results)
{
  GString *table = g_string_new (NULL);
  const AntTimeReference *time = &results->record->time;
  append_definitions (table, results->record);
  g_string_append (table, "passage,start_jd,mid_jd,end_jd,mid_time,mid_utc,width_d,depth_ppm,depth_sigma_ppm,coverage\n");
  for (gsize i = 0; i < results->n_passages; i++)
    {
      const AntPassage *passage = &results->passage[i];
      g_string_append_printf (table, "%zu", i + 1);
      append_number (table, "%.4f", ant_time_reference_jd (time, passage->start_d));
      append_number (table, "%.4f", ant_time_reference_jd (time, passage->mid_d));
      append_number (table, "%.4f", ant_time_reference_jd (time, passage->end_d));
      append_text (table, ant_time_reference_own_text (time, passage->mid_d));
      append_text (table, ant_time_reference_utc_text (time, passage->mid_d, 0));
      append_number (table, "%.3f", passage->end_d - passage->start_d);
      append_number (table, "%.5g", passage->depth_ppm);
      append_number (table, "%.4g", passage->depth_sigma_ppm);
      append_number (table, "%.4f", passage->coverage);
      g_string_append_c (table, '\n');
    }
  return table;
}
