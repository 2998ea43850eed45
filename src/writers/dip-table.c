/* dip-table.c - dips.csv and brightenings.csv. */
#include "writers/dip-table.h"
#include <math.h>
#include "writers/csv.h"

#define COLUMNS                                                                                                        \
  "dip,start_jd,mid_jd,end_jd,mid_time,mid_utc,duration_h,depth_ppm,depth_sigma_ppm,mean_depth_ppm,radius_ratio,snr,"  \
  "first_snr,expected_false,coverage,edges,class,probability,evidence"

static void
append_search (GString *table, const AntDipList *list)
{
  char u1[G_ASCII_DTOSTR_BUF_SIZE], u2[G_ASCII_DTOSTR_BUF_SIZE];
  if (list->incomplete)
    ant_csv_comment (table, "incomplete: %s", list->incomplete);
  ant_csv_comment (table, "limb darkening: quadratic %s, %s", g_ascii_formatd (u1, sizeof u1, "%.4g", list->limb_u1),
                   g_ascii_formatd (u2, sizeof u2, "%.4g", list->limb_u2));
  if (list->upper_limit_ppm)
    {
      ant_csv_comment (table, "asked: time and duration were given and nothing was searched; snr is not to be held "
                              "against the threshold of a search");
      ant_csv_comment (table, "upper_limit_ppm: depth that is exceeded with a probability of 5 %%");
      return;
    }
  char snr[G_ASCII_DTOSTR_BUF_SIZE], false_alarms[G_ASCII_DTOSTR_BUF_SIZE];
  ant_csv_comment (
      table, "threshold: SNR %s; expected by chance at or above it in this record: %s",
      isfinite (list->threshold_snr) ? g_ascii_formatd (snr, sizeof snr, "%.3f", list->threshold_snr) : "unknown",
      isfinite (list->false_alarms) ? g_ascii_formatd (false_alarms, sizeof false_alarms, "%.3g", list->false_alarms)
                                    : "unknown");
  if (list->n_surrogates)
    ant_csv_comment (table, "threshold and expected_false: from %zu surrogates of this record, with %zu events of SNR 4 and more",
                     list->n_surrogates, list->n_surrogate_events);
  if (list->mirror_known)
    ant_csv_comment (
        table, "mirrored search, durations of 9 h and less: %zu dips and %zu brightenings at or above the threshold",
        list->n_found, list->n_mirrored);
}

static void
append_definitions (GString *table, const AntRecord *record, const AntDipList *list)
{
  static const char *const lines[] = {
    "duration_h: contact I to IV of the fitted shape; start and end are these contacts",
    "depth_ppm: greatest depth of the fitted shape before exposure smearing, relative to the undimmed level at that "
    "time",
    "mean_depth_ppm: average of the fitted shape over contact I to IV",
    "radius_ratio: radius of the dark disc whose crossing is that deep, over the radius of the source",
    "snr: of the fitted shape against the noise, after the dip was masked and the noise refitted; first_snr: of the "
    "best "
    "template on the first pass",
    "expected_false: dips by noise alone expected to reach this snr in this record",
    "coverage: observed fraction of the dip, weighted by its shape; edges: which of ingress and egress were observed",
  };
  if (record->time.origin_known)
    ant_csv_comment (table, "start_jd, mid_jd, end_jd: JD(%s); mid_time: as the record writes its times",
                     record->time.scale == ANT_SCALE_UNKNOWN ? "of the record"
                                                             : ant_time_scale_name (record->time.scale));
  else
    ant_csv_comment (table,
                     "start_jd, mid_jd, end_jd: empty, the origin of the times is unknown; mid_time: as the record "
                     "writes its times");
  for (gsize i = 0; i < G_N_ELEMENTS (lines); i++)
    ant_csv_comment (table, "%s", lines[i]);
  if (list->brightenings)
    ant_csv_comment (table, "brightenings have negative depth and snr");
}

static void
append_number (GString *table, const char *format, double number)
{
  ant_csv_number (table, format, number);
  g_string_append_c (table, ',');
}

static void
append_own_text (GString *table, char *text)
{
  ant_csv_text (table, text);
  g_string_append_c (table, ',');
  g_free (text);
}

static void
append_dip (GString *table, const AntRecord *record, gsize number, const AntDip *dip)
{
  const AntTimeReference *time = &record->time;
  double half_d = 0.5 * dip->duration_d;
  g_string_append_printf (table, "%zu,", number);
  append_number (table, "%.7f", ant_time_reference_jd (time, dip->mid_d - half_d));
  append_number (table, "%.7f", ant_time_reference_jd (time, dip->mid_d));
  append_number (table, "%.7f", ant_time_reference_jd (time, dip->mid_d + half_d));
  append_own_text (table, ant_time_reference_own_text (time, dip->mid_d));
  append_own_text (table, ant_time_reference_utc_text (time, dip->mid_d, 0));
  append_number (table, "%.4f", dip->duration_d * 24.0);
  append_number (table, "%.6g", dip->depth_ppm);
  append_number (table, "%.6g", dip->depth_sigma_ppm);
  append_number (table, "%.6g", dip->mean_depth_ppm);
  append_number (table, "%.6g", dip->radius_ratio);
  append_number (table, "%.4f", dip->snr);
  append_number (table, "%.4f", dip->first_snr);
  append_number (table, "%.3g", dip->expected_false);
  append_number (table, "%.4f", dip->coverage);
  g_string_append_printf (table, "%s,undecided,,", ant_edges_text (dip->edges));
}

GString *
ant_dip_table_text (const AntRecord *record, const AntDipList *list)
{
  GString *table = g_string_new (NULL);
  ant_csv_preamble (table, list->brightenings ? "Brightenings" : "Dips", record);
  append_search (table, list);
  append_definitions (table, record, list);
  g_string_append (table, list->upper_limit_ppm ? COLUMNS ",asked,upper_limit_ppm\n" : COLUMNS "\n");
  for (gsize i = 0; i < list->n; i++)
    {
      append_dip (table, record, i + 1, &list->dip[i]);
      if (list->upper_limit_ppm)
        {
          g_string_append (table, ",asked,");
          ant_csv_number (table, "%.6g", list->upper_limit_ppm[i]);
        }
      g_string_append_c (table, '\n');
    }
  return table;
}
