/* report.c - put a report together. */
#include "jobs/report.h"

#include <glib/gi18n.h>

#include "config.h"
#include "jobs/report-private.h"

static void (*const sections[]) (const AntReport *report, AntPages *pages) = {
  ant_report_summary, ant_report_time,         ant_report_noise,    ant_report_dips,
  ant_report_brightenings, ant_report_passages, ant_report_settings,
};

char *
ant_report_record_name (const AntRecord *record)
{
  if (!record->path || g_str_equal (record->path, "-"))
    return g_strdup (_("standard input"));
  return g_filename_display_basename (record->path);
}

const char *
ant_report_class_title (const AntReport *report, gsize dip)
{
  return ant_dip_class_title (report->word ? report->word[dip].class : ANT_CLASS_UNDECIDED);
}

GBytes *
ant_report_bytes (const AntScanResults *results, const AntReportWord *word, AntPaper paper, GError **error)
{
  g_autoptr (AntLayers) layers = ant_layers_new (results->record, &results->settings, results, NULL, error);
  if (!layers)
    return NULL;
  AntReport report = { results, layers, word };
  g_autofree char *name = ant_report_record_name (results->record);
  g_autofree char *title = g_strdup_printf (_("Dips in %s"), name);
  g_autofree char *foot = g_strdup_printf (_("%s · Antumbra %s"), title, ANT_VERSION);
  g_autoptr (AntPages) pages = ant_pages_new (paper, title, foot);
  for (gsize i = 0; i < G_N_ELEMENTS (sections); i++)
    sections[i] (&report, pages);
  return ant_pages_finish (pages, error);
}
