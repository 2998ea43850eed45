/* scan-work.c - bring record, analysis and options together. */
#include "cli/scan-work.h"

#include <glib/gi18n.h>
#include <math.h>

#include "data/analysis-text.h"
#include "data/error.h"
#include "data/exclusions.h"
#include "jobs/record-open.h"
#include "readers/observer-reader.h"

void
ant_scan_work_add (GOptionContext *context, AntScanWork *work)
{
  const GOptionEntry entries[] = {
    { "from", 0, 0, G_OPTION_ARG_FILENAME_ARRAY, &work->from,
      N_("use the record from this time; or an analysis file to go on with: its record, reading, settings and masks"),
      N_("TIME|FILE.antumbra") },
    { "to", 0, 0, G_OPTION_ARG_STRING, &work->to, N_("use the record up to this time"), N_("TIME") },
    { "exclude", 0, 0, G_OPTION_ARG_FILENAME, &work->exclude,
      N_("leave out spans: lines of start, end, reason, or an earlier flags.csv"), N_("FILE") },
    { "observer", 0, 0, G_OPTION_ARG_FILENAME, &work->observer,
      N_("who took the record: what crossed the Sun there and then is evidence for the verdicts"), N_("earth|l1|site:LON,LAT,HEIGHT_M|FILE") },
    { NULL }
  };
  g_option_context_add_main_entries (context, entries, NULL);
  ant_record_options_add (context, &work->reading);
  ant_settings_options_add (context, &work->given);
  ant_witness_options_add (context, &work->witness);
}

void
ant_scan_work_clear (AntScanWork *work)
{
  g_clear_pointer (&work->from, g_strfreev);
  g_clear_pointer (&work->to, g_free);
  g_clear_pointer (&work->exclude, g_free);
  g_clear_pointer (&work->observer, g_free);
  ant_record_options_clear (&work->reading);
  ant_settings_options_clear (&work->given);
  ant_witness_options_clear (&work->witness);
}

/* A time never names a file that is there and ends so. */
static gboolean
is_file (const char *from)
{
  return ant_analysis_is_name (from) && g_file_test (from, G_FILE_TEST_EXISTS);
}

const char *
ant_scan_work_file (const AntScanWork *work)
{
  for (char **from = work->from; from && *from; from++)
    if (is_file (*from))
      return *from;
  return NULL;
}

/* The analysis of the file with nothing found yet, or a new one. */
static AntAnalysis *
begin_analysis (const AntScanWork *work, GError **error)
{
  const char *file = ant_scan_work_file (work);
  g_autofree char *newer = NULL;
  AntAnalysis *analysis = file ? ant_analysis_load (file, &newer, error) : ant_analysis_new ();
  if (newer)
    g_printerr ("antumbra-cli: %s\n", newer);
  if (analysis)
    ant_analysis_drop_results (analysis);
  return analysis;
}

static AntRecord *
read_record (const AntScanWork *work, const AntAnalysis *analysis, const char *path, GCancellable *stop, GError **error)
{
  AntReadingChoices choices;
  AntRecord *record = NULL;
  const char *kept = ant_analysis_get_record_path (analysis);
  if (!path && !kept)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("%s: names no record; expected one as argument"),
                   ant_scan_work_file (work));
      return NULL;
    }
  ant_reading_choices_copy (&ant_analysis_get_treatment (analysis)->reading, &choices);
  if (ant_record_options_choose (&work->reading, &choices, error))
    record = ant_record_open (path ? path : kept, &choices, 0, stop, error);
  ant_reading_choices_clear (&choices);
  if (!record && !path)
    g_prefix_error (error, _("the record of %s: "), ant_scan_work_file (work));
  return record;
}

static gboolean
exclude (AntTreatment *treatment, const char *path, const AntTimeReference *time, GError **error)
{
  g_autoptr (GArray) spans = ant_exclusions_read (path, time, error);
  for (guint i = 0; spans && i < spans->len; i++)
    ant_treatment_mask (treatment, g_array_index (spans, AntSpan, i), ANT_MASK_EXCLUDED, "");
  return spans != NULL;
}

/* The options on top of the analysis's own treatment. */
static AntTreatment *
treat (const AntScanWork *work, const AntAnalysis *analysis, const AntRecord *record, GError **error)
{
  g_autoptr (AntTreatment) treatment = ant_treatment_copy (ant_analysis_get_treatment (analysis));
  if (!ant_record_options_choose (&work->reading, &treatment->reading, error)
      || !ant_settings_options_add_to (&work->given, &treatment->settings, error))
    return NULL;
  if (work->reading.good)
    {
      g_free (treatment->good);
      treatment->good = g_strdup (work->reading.good);
    }
  if (work->observer)
    {
      g_autoptr (AntObserverChoice) choice = ant_observer_open (work->observer, error);
      if (!choice)
        return NULL;
      g_free (treatment->observer);
      treatment->observer = choice->observer.kind == ANT_OBSERVER_TABLE ? g_canonicalize_filename (work->observer, NULL)
                                                                       : g_strdup (work->observer);
    }
  for (char **from = work->from; from && *from; from++)
    if (!is_file (*from) && !ant_time_reference_parse (&record->time, *from, &treatment->from_d, error))
      return NULL;
  if (work->to && !ant_time_reference_parse (&record->time, work->to, &treatment->to_d, error))
    return NULL;
  if (!ant_witness_options_add_to (&work->witness, treatment->witnesses, error))
    return NULL;
  if (work->exclude && !exclude (treatment, work->exclude, &record->time, error))
    return NULL;
  return g_steal_pointer (&treatment);
}

/* The values at 1 au or not by the observer's own places. */
static gboolean
lay_grid (AntRecord *record, const AntTreatment *treatment, GError **error)
{
  AntGridOptions grid;
  g_autoptr (AntObserverChoice) choice = treatment->observer ? ant_observer_open (treatment->observer, error) : NULL;
  if ((treatment->observer && !choice) || !ant_treatment_grid (treatment, &grid, error))
    return FALSE;
  grid.observer = choice ? &choice->observer : NULL;
  gboolean good = ant_record_make_grid (record, &grid, error);
  ant_grid_options_clear (&grid);
  return good;
}

/* Options that make no sense are told before a long record is read. */
static gboolean
try_options (const AntScanWork *work, GError **error)
{
  AntSettings settings;
  AntGridOptions grid = ANT_GRID_OPTIONS_INIT;
  gboolean good = ant_settings_options_apply (&work->given, &settings, error)
                  && ant_record_options_good (&work->reading, &grid, error);
  ant_grid_options_clear (&grid);
  return good;
}

/* Settings that change no result, such as the report's paper, are kept too. */
static gboolean
differs (const AntTreatment *one, const AntTreatment *other)
{
  for (gsize i = 0; i < ant_n_settings; i++)
    if (ant_setting_get (&ant_setting_table[i], &one->settings) != ant_setting_get (&ant_setting_table[i], &other->settings))
      return TRUE;
  return !ant_treatment_same (one, other);
}

AntAnalysis *
ant_scan_work_begin (const AntScanWork *work, const char *path, gboolean no_repeats, GCancellable *stop, AntRecord **record,
                     GPtrArray **comparisons, GError **error)
{
  g_autoptr (AntAnalysis) analysis = try_options (work, error) ? begin_analysis (work, error) : NULL;
  g_autoptr (AntRecord) read = analysis ? read_record (work, analysis, path, stop, error) : NULL;
  if (!read)
    return NULL;
  g_autofree char *changed = ant_analysis_take_record (analysis, read);
  if (changed)
    g_printerr ("antumbra-cli: %s\n", changed);
  g_autoptr (AntTreatment) treatment = treat (work, analysis, read, error);
  if (treatment && no_repeats)
    treatment->settings.repeats = 0;
  g_autoptr (GPtrArray) compared = NULL;
  if (treatment && lay_grid (read, treatment, error))
    compared = ant_witnesses_open (treatment->witnesses, read, &treatment->settings, stop, error);
  if (!compared)
    return NULL;
  if (differs (treatment, ant_analysis_get_treatment (analysis)))
    ant_analysis_treat (analysis, _("Options of the command"), g_steal_pointer (&treatment));
  *record = g_steal_pointer (&read);
  *comparisons = g_steal_pointer (&compared);
  return g_steal_pointer (&analysis);
}
