/* report.c - put a report together. */
#include "jobs/report.h"

#include <glib/gi18n.h>

#include "config.h"
#include "data/verdict-words.h"
#include "jobs/report-private.h"

static void (*const sections[]) (const AntReport *report, AntPages *pages) = {
  ant_report_summary, ant_report_time,         ant_report_noise,    ant_report_dips,
  ant_report_repeats, ant_report_brightenings, ant_report_passages, ant_report_witnesses, ant_report_settings,
};

char *
ant_report_record_name (const AntRecord *record)
{
  if (!record->path || g_str_equal (record->path, "-"))
    return g_strdup (_("standard input"));
  return g_filename_display_basename (record->path);
}

AntDipClass
ant_report_class (const AntReport *report, gsize dip)
{
  const AntVerdict *verdict = report->results->dip_verdict;
  if (report->word && report->word[dip].class != ANT_CLASS_UNDECIDED)
    return report->word[dip].class;
  return verdict ? ant_verdict_class (&verdict[dip]) : ANT_CLASS_UNDECIDED;
}

char *
ant_report_verdict_words (const AntReport *report, gsize dip)
{
  const AntVerdict *verdict = report->results->dip_verdict;
  const char *title = ant_dip_class_title (ant_report_class (report, dip));
  if (report->word && report->word[dip].class != ANT_CLASS_UNDECIDED)
    return g_strdup_printf (_("%s (analyst)"), title);
  if (!verdict || ant_verdict_class (&verdict[dip]) == ANT_CLASS_UNDECIDED)
    return g_strdup (title);
  g_autofree char *probability = ant_probability_words (ant_verdict_probability (&verdict[dip]));
  return g_strdup_printf ("%s, %s", title, probability);
}

AntReportWord *
ant_report_words (const AntScanResults *results, const AntJudgements *judgements)
{
  AntReportWord *word = g_new0 (AntReportWord, results->n_dips + 1);
  for (gsize i = 0; i < results->n_dips; i++)
    {
      const AntDip *dip = &results->dip[i];
      word[i] = (AntReportWord) { ant_judgements_class (judgements, dip->mid_d, dip->duration_d),
                                  ant_judgements_note (judgements, dip->mid_d, dip->duration_d) };
    }
  return word;
}

GBytes *
ant_report_bytes (const AntScanResults *results, const AntReportWord *word, const GPtrArray *comparisons, AntPaper paper, GError **error)
{
  g_autoptr (AntLayers) layers = ant_layers_new (results->record, &results->settings, results, NULL, error);
  if (!layers)
    return NULL;
  AntReport report = { results, layers, word, comparisons };
  g_autofree char *name = ant_report_record_name (results->record);
  g_autofree char *title = g_strdup_printf (_("Dips in %s"), name);
  g_autofree char *foot = g_strdup_printf (_("%s · Antumbra %s"), title, ANT_VERSION);
  g_autoptr (AntPages) pages = ant_pages_new (paper, title, foot);
  for (gsize i = 0; i < G_N_ELEMENTS (sections); i++)
    sections[i] (&report, pages);
  return ant_pages_finish (pages, error);
}
