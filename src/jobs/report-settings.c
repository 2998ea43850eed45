/* report-settings.c - the end of a report: with what settings it was made, and how to make it again. */
#include <glib/gi18n.h>

#include "config.h"
#include "data/dip-words.h"
#include "jobs/report-private.h"

static void
tell_changes (const AntSettings *settings, AntPages *pages)
{
  g_autoptr (GString) changed = g_string_new (NULL);
  for (gsize i = 0; i < ant_n_settings; i++)
    {
      const AntSetting *setting = &ant_setting_table[i];
      double value = ant_setting_get (setting, settings);
      g_autofree char *text = ant_setting_format (setting, value);
      if (ant_setting_matters (setting) && value != setting->fallback)
        g_string_append_printf (changed, "%s%s = %s%s%s", changed->len ? "; " : "", setting->key, text, *setting->unit ? " " : "",
                                setting->unit);
    }
  g_autofree char *line = changed->len ? g_strdup_printf (_("Changed from their defaults: %s."), changed->str) : g_strdup (_("All have their defaults."));
  ant_pages_text (pages, ANT_PAGES_BODY, line);
}

/* "9 h (default 13)": the default stands beside what was changed. */
static char *
value_words (const AntSetting *setting, double value)
{
  g_autofree char *text = ant_setting_format (setting, value), *fallback = ant_setting_format (setting, setting->fallback);
  const char *blank = *setting->unit ? " " : "";
  return value == setting->fallback ? g_strdup_printf ("%s%s%s", text, blank, setting->unit)
                                    : g_strdup_printf (_("%s%s%s (default %s)"), text, blank, setting->unit, fallback);
}

static void
tell_all (const AntSettings *settings, AntPages *pages)
{
  g_autoptr (GPtrArray) facts = g_ptr_array_new_with_free_func (ant_fact_free);
  for (gsize i = 0; i < ant_n_settings; i++)
    {
      const AntSetting *setting = &ant_setting_table[i];
      g_autofree char *value = value_words (setting, ant_setting_get (setting, settings));
      if (ant_setting_matters (setting))
        ant_facts_add (facts, setting->key, value);
    }
  ant_pages_facts (pages, facts, 2);
  ant_pages_text (pages, ANT_PAGES_QUIET, _("“antumbra-cli settings” tells what each of them means; 0 often stands for “found from the record”."));
}

static void
tell_origin (const AntRecord *record, AntPages *pages)
{
  g_autoptr (GPtrArray) facts = g_ptr_array_new_with_free_func (ant_fact_free);
  g_autofree char *name = ant_report_record_name (record), *rows = g_strdup_printf ("%zu", record->n_rows);
  ant_facts_add (facts, _("Record"), name);
  ant_facts_add (facts, _("Rows"), rows);
  ant_facts_add (facts, _("SHA-256"), record->sha256 ? record->sha256 : _("unknown"));
  ant_facts_add (facts, _("Program"), "Antumbra " ANT_VERSION);
  ant_pages_heading (pages, 2, _("Where this comes from"), 50);
  ant_pages_facts (pages, facts, 1);
  ant_pages_text (pages, ANT_PAGES_QUIET,
                  _("The same record, settings and version give the same numbers, whatever the machine and the number of its processors."));
}

void
ant_report_settings (const AntReport *report, AntPages *pages)
{
  ant_pages_heading (pages, 1, _("Settings"), 210); /* all of it */
  tell_changes (&report->results->settings, pages);
  tell_all (&report->results->settings, pages);
  tell_origin (report->results->record, pages);
}
