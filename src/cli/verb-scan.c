/* verb-scan.c - `antumbra-cli scan`: search a record for dips, or measure one that is asked about, and write the tables. */
#include <gio/gio.h>
#include <glib/gi18n.h>
#include <math.h>

#include "cli/exit-code.h"
#include "cli/progress.h"
#include "cli/scan-summary.h"
#include "cli/scan-work.h"
#include "cli/verbs.h"
#include "data/analysis-text.h"
#include "data/error.h"
#include "jobs/outside-job.h"
#include "jobs/report.h"
#include "jobs/scan-job.h"
#include "jobs/stop.h"
#include "readers/observer-reader.h"
#include "writers/analysis-file.h"
#include "writers/dip-table.h"
#include "writers/output-dir.h"
#include "writers/result-files.h"
#include "writers/whole-file.h"

typedef struct
{
  char *out, *also, *save, *at;
  double hours;
  int threads;
  gboolean force, progress, no_report, no_repeats;
  AntResultChoice choice;
  AntScanWork work;
} Options;

static void
options_clear (Options *options)
{
  g_free (options->out);
  g_free (options->also);
  g_free (options->save);
  g_free (options->at);
  ant_scan_work_clear (&options->work);
}

#define REPORT "report.pdf"

static void
append_names (char ***names, const char *const *more)
{
  guint n = g_strv_length (*names), n_more = g_strv_length ((char **) (gsize) more);
  *names = g_renew (char *, *names, n + n_more + 1);
  for (guint i = 0; i <= n_more; i++)
    (*names)[n + i] = g_strdup (more[i]);
}

/* All that a search may write. */
static char **
names_of (const Options *options, const GPtrArray *comparisons)
{
  AntResultChoice choice = options->choice;
  choice.witnesses = comparisons->len;
  char **names = ant_result_file_names (&choice);
  if (!options->no_report)
    append_names (&names, (const char *const[]){ REPORT, NULL });
  return names;
}

/* The analysis as it will stand in the folder. */
static char *
text_for_folder (const AntAnalysis *analysis, const char *folder)
{
  g_autofree char *whole = g_canonicalize_filename (folder, NULL);
  g_autofree char *path = g_build_filename (whole, ANT_ANALYSIS_FILE_NAME, NULL);
  return ant_analysis_to_text (analysis, path);
}

static gboolean
write_all (const Options *options, AntOutputDir *dir, const AntAnalysis *analysis, const GPtrArray *witnesses, GError **error)
{
  const AntScanResults *results = ant_analysis_get_results (analysis);
  const AntJudgements *judgements = ant_analysis_get_judgements (analysis);
  g_autofree char *text = text_for_folder (analysis, options->out);
  AntFindings findings = { results, judgements, text, witnesses };
  gsize size = 0;
  g_autofree AntReportWord *word = ant_report_words (results, judgements);
  g_autoptr (GBytes) report = options->no_report ? NULL : ant_report_bytes (results, word, witnesses, (AntPaper) results->settings.paper, error);
  const char *pages = report ? g_bytes_get_data (report, &size) : NULL;
  return (report || options->no_report) && ant_result_files_add (dir, &findings, &options->choice, error)
         && (!report || ant_output_dir_add (dir, REPORT, pages, size, error))
         && ant_output_dir_commit (dir, error);
}

static void
print_names (const Options *options, const GPtrArray *comparisons)
{
  g_auto (GStrv) names = names_of (options, comparisons);
  g_autofree char *all = g_strjoinv (", ", names);
  g_print (_("In %s: %s.\n"), options->out, all);
}

/* Whether a stop cut the search for repeats short: what was found is kept, and the exit code tells. */
static gboolean
was_stopped (const AntScanResults *results)
{
  return results->repeats.searched && results->repeats.done < 1;
}

static gboolean
search (const Options *options, AntAnalysis *analysis, AntRecord *record, const GPtrArray *witnesses, const AntSettings *settings,
        AntOutputDir *dir, GCancellable *stop, GError **error)
{
  const char *who = ant_analysis_get_treatment (analysis)->observer;
  g_autoptr (AntObserverChoice) observer = who ? ant_observer_open (who, error) : NULL;
  if (who && !observer)
    return FALSE;
  AntProgressLine *line = ant_progress_line_new (options->progress);
  g_autoptr (AntScanResults) results = ant_scan_job_run (record, settings, stop, ant_progress_line_show, line, error);
  ant_progress_line_end (line);
  /* A stopped scan is held against what is outside it too: that takes no time worth stopping. */
  if (!results || !ant_outside_job_run (results, observer, witnesses, NULL, error))
    return FALSE;
  ant_analysis_set_results (analysis, results, ant_analysis_get_treatment (analysis));
  if ((dir && !write_all (options, dir, analysis, witnesses, error))
      || (options->save && !ant_analysis_file_save (analysis, options->save, options->force, error)))
    return FALSE;
  ant_scan_summary_print (results);
  g_autofree char *carried = ant_analysis_carried_words (analysis);
  if (carried)
    g_print ("%s.\n", carried);
  ant_witnesses_print (witnesses);
  if (dir)
    print_names (options, witnesses);
  if (options->save)
    g_print (_("The analysis is in %s.\n"), options->save);
  if (was_stopped (results))
    g_set_error_literal (error, G_IO_ERROR, G_IO_ERROR_CANCELLED, _("stopped while searching for repeats; what was found until then is kept"));
  return !was_stopped (results);
}

static const char *const asked_names[] = { "dips.csv", NULL };

static gboolean
ask (const Options *options, const AntAnalysis *analysis, AntRecord *record, const GPtrArray *witnesses, const AntSettings *settings,
     AntOutputDir *dir, GCancellable *stop, GError **error)
{
  const char *who = ant_analysis_get_treatment (analysis)->observer;
  g_autoptr (AntObserverChoice) observer = who ? ant_observer_open (who, error) : NULL;
  AntDip dip;
  AntVerdict verdict;
  double at_d, upper_limit_ppm;
  if ((who && !observer) || !ant_time_reference_parse (&record->time, options->at, &at_d, error)
      || !ant_scan_job_ask (record, settings, at_d, options->hours / 24, &dip, &upper_limit_ppm, &verdict, error)
      || !ant_outside_job_ask (record, settings, observer, witnesses, &dip, &verdict, stop, error))
    return FALSE;
  AntDipList list = { .n = 1, .dip = &dip, .verdict = &verdict, .limb_u1 = settings->bank.limb_darkening.u1, .threshold_snr = NAN,
                      .limb_u2 = settings->bank.limb_darkening.u2, .false_alarms = NAN, .upper_limit_ppm = &upper_limit_ppm };
  g_autoptr (GString) text = dir ? ant_dip_table_text (record, &list) : NULL;
  if (dir && !(ant_output_dir_add (dir, asked_names[0], text->str, text->len, error) && ant_output_dir_commit (dir, error)))
    return FALSE;
  ant_scan_summary_print_asked (record, &dip, upper_limit_ppm, &verdict);
  ant_witnesses_print_dip (witnesses, settings, &dip);
  return TRUE;
}

/* That the analysis can be saved there is known before a long scan. */
static gboolean
try_save (const Options *options, GError **error)
{
  g_autoptr (AntWholeFile) trial = options->save ? ant_whole_file_open (options->save, options->force, error) : NULL;
  return trial || !options->save;
}

static int
run (const Options *options, const char *path)
{
  g_autoptr (GError) error = NULL;
  g_autoptr (AntOutputDir) dir = NULL;
  g_autoptr (AntRecord) record = NULL;
  GCancellable *stop = ant_stop_on_signals ();
  g_autoptr (GPtrArray) witnesses = NULL;
  g_autoptr (AntAnalysis) analysis = ant_scan_work_begin (&options->work, path, options->no_repeats, stop, &record, &witnesses, &error);
  if (!analysis)
    return ant_cli_fail (error);
  AntSettings settings = ant_analysis_get_treatment (analysis)->settings;
  if (options->threads)
    settings.threads = options->threads;
  g_auto (GStrv) names = options->at ? g_strdupv ((char **) (gsize) asked_names) : names_of (options, witnesses);
  if (options->out)
    dir = ant_output_dir_open (options->out, (const char *const *) names, options->force, &error);
  gboolean good = (dir || !options->out) && try_save (options, &error)
                  && (options->at ? ask (options, analysis, record, witnesses, &settings, dir, stop, &error)
                                  : search (options, analysis, record, witnesses, &settings, dir, stop, &error));
  return good ? ANT_EXIT_DONE : ant_cli_fail (error);
}

/* What the options together ask for; NULL if it makes sense, else a sentence. */
static char *
find_fault (const Options *options, int n_files)
{
  gboolean file = ant_scan_work_file (&options->work) != NULL;
  if (n_files != 1 && !(file && n_files == 0))
    return g_strdup_printf (_("scan: found %d files, expected one record, or --from with an analysis file"), n_files);
  if (options->threads < 0)
    return g_strdup_printf (_("scan: found --threads %d, expected 1 or more"), options->threads);
  if (!options->at != isnan (options->hours))
    return g_strdup (_("scan: found only one of --at and --hours, expected both"));
  if (options->at && !(options->hours > 0 && options->hours < 1000))
    return g_strdup_printf (_("scan: found --hours %g, expected more than 0 and less than 1000"), options->hours);
  if (options->at && options->save)
    return g_strdup (_("scan: found --save with --at, expected it where something is searched"));
  if ((options->also || options->choice.series) && (options->at || !options->out))
    return g_strdup_printf (_("scan: found --also or --series %s, expected them where a search writes its tables"),
                            options->at ? _("with --at") : _("without --out"));
  return NULL;
}

int
ant_verb_scan (int argc, char **argv)
{
  Options options = { .hours = NAN };
  const GOptionEntry entries[] = {
    { "out", 'o', 0, G_OPTION_ARG_FILENAME, &options.out, N_("write the tables into this folder"), N_("DIR") },
    { "also", 0, 0, G_OPTION_ARG_STRING, &options.also, N_("write the tables as fits, votable or fits,votable too"), N_("FORMATS") },
    { "series", 0, 0, G_OPTION_ARG_NONE, &options.choice.series, N_("write the detrended series, row by row, too"), NULL },
    { "no-report", 0, 0, G_OPTION_ARG_NONE, &options.no_report, N_("leave out report.pdf"), NULL },
    { "no-repeats", 0, 0, G_OPTION_ARG_NONE, &options.no_repeats, N_("leave out the search for dips that recur"), NULL },
    { "save", 0, 0, G_OPTION_ARG_FILENAME, &options.save, N_("write the analysis into this file, which the window opens"), N_("FILE.antumbra") },
    { "force", 0, 0, G_OPTION_ARG_NONE, &options.force, N_("replace results that are there"), NULL },
    { "at", 0, 0, G_OPTION_ARG_STRING, &options.at, N_("measure a dip with this middle, without a search"), N_("TIME") },
    { "hours", 0, 0, G_OPTION_ARG_DOUBLE, &options.hours, N_("length of the dip of --at, contact I to IV"), N_("H") },
    { "threads", 0, 0, G_OPTION_ARG_INT, &options.threads, N_("threads to work with; the results do not depend on it"), N_("N") },
    { "progress", 0, 0, G_OPTION_ARG_NONE, &options.progress, N_("print progress as lines"), NULL },
    { NULL }
  };
  g_autoptr (GOptionContext) context = g_option_context_new (_("RECORD"));
  g_option_context_set_summary (context, _("Searches a record (“-”: standard input) for dips and weighs each against the Sun's own noise."));
  g_option_context_add_main_entries (context, entries, NULL);
  ant_scan_work_add (context, &options.work);

  g_autoptr (GError) error = NULL;
  g_autofree char *fault = NULL;
  int code;
  if (!g_option_context_parse (context, &argc, &argv, &error))
    code = ant_cli_fail (error);
  else if ((fault = find_fault (&options, argc - 1)))
    code = ant_cli_fail_usage ("%s", fault);
  else if (options.also && !ant_result_choice_parse (&options.choice, options.also, &error))
    code = ant_cli_fail (error);
  else
    code = run (&options, argc > 1 ? argv[1] : NULL);
  options_clear (&options);
  return code;
}
