/* verb-info.c - `antumbra-cli info`: what is in a record, what was assumed and what was found, for people and programs. */
#include <gio/gio.h>
#include <glib/gi18n.h>
#include <math.h>

#include "cli/exit-code.h"
#include "cli/json-values.h"
#include "cli/fold-options.h"
#include "cli/record-options.h"
#include "cli/settings-options.h"
#include "cli/verbs.h"
#include "cli/witness-options.h"
#include "core/units.h"
#include "data/record-summary.h"
#include "data/record-words.h"
#include "jobs/stop.h"
#include "readers/observer-reader.h"

#define MOST_COLUMNS 16

static const char *const style_names[] = { "days",     "jd",           "unix", "iso", "ymd",
                                           "year-day", "decimal-year" };
static const char *const place_names[] = { "unknown", "start", "middle", "end" };

static void print_line (const char *label, const char *format, ...) G_GNUC_PRINTF (2, 3);

static void
print_line (const char *label, const char *format, ...)
{
  va_list arguments;
  va_start (arguments, format);
  g_autofree char *text = g_strdup_vprintf (format, arguments);
  va_end (arguments);
  g_print ("  %-12s %s\n", label, text);
}

/* A length of time in the unit that people would use. */
static char *
length_text (double length_d)
{
  double size_d = fabs (length_d);
  if (size_d >= 2.0)
    return g_strdup_printf (_("%.2f d"), length_d);
  if (size_d >= 2.0 / ANT_HOURS_PER_DAY)
    return g_strdup_printf (_("%.2f h"), length_d * ANT_HOURS_PER_DAY);
  return g_strdup_printf (_("%.6g s"), length_d * ANT_SECONDS_PER_DAY);
}

static const char *
or_none (const char *text)
{
  return text ? text : _("none");
}

static void
print_columns (const AntRecord *record)
{
  const AntTimeReference *time = &record->time;
  print_line (_("time"), _("%s, written as %s; scale %s%s%s%s"), record->time_name, style_names[time->style],
              ant_time_scale_name (time->scale), time->scale_assumed ? _(" (assumed)") : "", time->place ? _("; clock at the ") : "",
              time->place ? time->place : "");
  print_line (_("value"), _("%s, unit %s"), record->value_name, record->value_unit ? record->value_unit : _("not named"));
  print_line (_("error"), "%s", or_none (record->error_name));
  print_line (_("quality"), "%s", or_none (record->quality_name));
  for (guint i = 0; i < MIN (record->columns->len, MOST_COLUMNS); i++)
    {
      g_autofree char *words = ant_column_words (g_ptr_array_index (record->columns, i), record->n_rows);
      print_line (i ? "" : _("further"), "%s", words);
    }
  if (record->columns->len > MOST_COLUMNS)
    print_line ("", _("and %u more"), record->columns->len - MOST_COLUMNS);
}

static void
print_span (const AntRecord *record, const AntRecordSummary *summary)
{
  if (!summary->has_times)
    return;
  g_autofree char *first = ant_time_reference_own_text (&record->time, summary->first_d);
  g_autofree char *last = ant_time_reference_own_text (&record->time, summary->last_d);
  g_autofree char *first_utc = ant_time_reference_utc_text (&record->time, summary->first_d, 0);
  g_autofree char *last_utc = ant_time_reference_utc_text (&record->time, summary->last_d, 0);
  g_autofree char *length = length_text (summary->last_d - summary->first_d);
  print_line (_("span"), _("%s to %s (%s)"), first, last, length);
  if (*first_utc)
    print_line (_("in UTC"), _("%s to %s"), first_utc, last_utc);
  else
    print_line (_("in UTC"), _("not known: the record does not tell its %s"),
                record->time.origin_known ? _("time scale") : _("origin of time"));
}

static void
print_rows (const AntRecord *record, const AntRecordSummary *summary)
{
  print_line (_("rows"), record->part ? _("%zu in rows %u to %u, %zu of them good") : _("%zu in lines %u to %u, %zu of them good"), record->n_rows,
              record->line[0], record->line[record->n_rows - 1], summary->n_good);
  for (unsigned bit = 0; bit < ANT_N_FLAGS; bit++)
    if (summary->n_flagged[bit] > 0)
      print_line ("", _("%zu %s: %s"), summary->n_flagged[bit], ant_flag_name (bit), ant_flag_description (bit));
}

static void
print_dark (const AntRecord *record)
{
  guint n = record->dark_spans->len;
  double sum_d = 0.0;
  for (guint i = 0; i < n; i++)
    sum_d += g_array_index (record->dark_spans, AntSpan, i).end_d - g_array_index (record->dark_spans, AntSpan, i).start_d;
  g_autofree char *sum = length_text (sum_d);
  print_line (_("dark spans"), n ? _("%u, %s together") : _("none"), n, sum);
  for (guint i = 0; i < MIN (n, 5); i++)
    {
      const AntSpan *span = &g_array_index (record->dark_spans, AntSpan, i);
      g_autofree char *start = ant_time_reference_own_text (&record->time, span->start_d);
      g_autofree char *end = ant_time_reference_own_text (&record->time, span->end_d);
      print_line ("", _("%s to %s"), start, end);
    }
  if (n > 5)
    print_line ("", _("and %u more"), n - 5);
}

static void
print_grid (const AntRecord *record, const AntRecordSummary *summary)
{
  g_autofree char *cadence = length_text (record->cadence_d), *exposure = length_text (record->exposure_d);
  g_autofree char *rms = length_text (summary->jitter_rms_d), *most = length_text (summary->jitter_most_d);
  g_autofree char *gap = length_text (summary->longest_gap_d);
  g_autofree char *gap_start = ant_time_reference_own_text (&record->time, summary->longest_gap_start_d);
  print_line (_("cadence"), _("%s; stamps are off the grid by %s rms, %s at most"), cadence, rms, most);
  print_line (_("exposure"), record->exposure_known ? "%s" : _("unknown: %s, the cadence, is used"), exposure);
  print_line (_("stamps"), record->stamp == ANT_AT_UNKNOWN ? _("unknown: taken as middles of exposures") : _("%s of exposure"),
              place_names[record->stamp]);
  print_line (_("samples"), _("%zu on %zu grid places: duty cycle %.1f %%"), summary->n_observed,
              summary->n_places, 100.0 * (double) summary->n_observed / (double) summary->n_places);
  if (record->gaps->len > 0)
    print_line (_("gaps"), _("%u, the longest %s from %s"), record->gaps->len, gap, gap_start);
  else
    print_line (_("gaps"), "%s", _("none"));
  print_dark (record);
  print_line (_("level"), _("median %.8g%s%s"), record->median, record->value_unit ? " " : "",
              record->value_unit ? record->value_unit : "");
  g_autofree char *distance = ant_record_distance_words (record);
  print_line (_("distance"), "%s", distance);
  print_line (_("scatter"), _("%.4g ppm about the median, %.4g ppm from sample to sample"), summary->scatter_ppm,
              summary->sample_scatter_ppm);
}

static void
print_plain (const AntRecord *record, const AntRecordSummary *summary, gboolean gridded)
{
  g_print ("%s\n", record->path);
  print_line (_("format"), "%s%s%s", record->format, record->part ? ", " : "", record->part ? record->part : "");
  print_line ("SHA-256", "%s", record->sha256);
  print_columns (record);
  print_span (record, summary);
  print_rows (record, summary);
  if (gridded)
    print_grid (record, summary);
  g_print ("%s\n", _("Assumed or found:"));
  for (guint i = 0; i < record->said->len; i++)
    g_print ("  - %s\n", (const char *) g_ptr_array_index (record->said, i));
}

static void
add_time (JsonBuilder *json, const AntRecord *record, const char *name, double time_d)
{
  g_autofree char *own = ant_time_reference_own_text (&record->time, time_d);
  g_autofree char *utc = ant_time_reference_utc_text (&record->time, time_d, 3);
  json_builder_begin_object (json_builder_set_member_name (json, name));
  ant_json_text (json, "own", own);
  ant_json_number (json, "jd", ant_time_reference_jd (&record->time, time_d));
  ant_json_text (json, "utc", utc);
  json_builder_end_object (json);
}

static void
add_rows (JsonBuilder *json, const AntRecord *record, const AntRecordSummary *summary)
{
  ant_json_count (json, "rows", record->n_rows);
  ant_json_count (json, "good_rows", summary->n_good);
  json_builder_begin_object (json_builder_set_member_name (json, "flags"));
  for (unsigned bit = 0; bit < ANT_N_FLAGS; bit++)
    ant_json_count (json, ant_flag_name (bit), summary->n_flagged[bit]);
  json_builder_end_object (json);
  if (summary->has_times)
    {
      add_time (json, record, "first", summary->first_d);
      add_time (json, record, "last", summary->last_d);
      ant_json_number (json, "span_d", summary->last_d - summary->first_d);
    }
}

static void
add_columns (JsonBuilder *json, const AntRecord *record)
{
  ant_json_text (json, "time_column", record->time_name);
  ant_json_text (json, "value_column", record->value_name);
  ant_json_text (json, "error_column", record->error_name);
  ant_json_text (json, "quality_column", record->quality_name);
  ant_json_text (json, "unit", record->value_unit);
  ant_json_text (json, "time_format", style_names[record->time.style]);
  ant_json_text (json, "time_scale", ant_time_scale_name (record->time.scale));
  ant_json_truth (json, "time_scale_assumed", record->time.scale_assumed);
  ant_json_text (json, "time_place", record->time.place);
  ant_json_truth (json, "origin_known", record->time.origin_known);
  json_builder_begin_array (json_builder_set_member_name (json, "columns"));
  for (guint i = 0; i < record->columns->len; i++)
    {
      const AntColumn *column = g_ptr_array_index (record->columns, i);
      json_builder_begin_object (json);
      ant_json_text (json, "name", column->name);
      ant_json_text (json, "unit", column->unit);
      ant_json_count (json, "values", record->n_rows - column->n_missing);
      json_builder_end_object (json);
    }
  json_builder_end_array (json);
}

static void
add_spans (JsonBuilder *json, const AntRecord *record, const char *name, const GArray *spans)
{
  json_builder_begin_array (json_builder_set_member_name (json, name));
  for (guint i = 0; i < spans->len; i++)
    {
      json_builder_begin_object (json);
      add_time (json, record, "start", g_array_index (spans, AntSpan, i).start_d);
      add_time (json, record, "end", g_array_index (spans, AntSpan, i).end_d);
      json_builder_end_object (json);
    }
  json_builder_end_array (json);
}

static void
add_grid (JsonBuilder *json, const AntRecord *record, const AntRecordSummary *summary)
{
  ant_json_number (json, "median", record->median);
  ant_json_number (json, "cadence_s", record->cadence_d * ANT_SECONDS_PER_DAY);
  ant_json_number (json, "jitter_rms_s", summary->jitter_rms_d * ANT_SECONDS_PER_DAY);
  ant_json_number (json, "jitter_most_s", summary->jitter_most_d * ANT_SECONDS_PER_DAY);
  ant_json_number (json, "exposure_s", record->exposure_d * ANT_SECONDS_PER_DAY);
  ant_json_truth (json, "exposure_known", record->exposure_known);
  ant_json_text (json, "stamp", place_names[record->stamp]);
  ant_json_count (json, "places", summary->n_places);
  ant_json_count (json, "observed", summary->n_observed);
  ant_json_number (json, "duty_cycle", (double) summary->n_observed / (double) summary->n_places);
  ant_json_count (json, "gaps", record->gaps->len);
  ant_json_number (json, "longest_gap_h", summary->longest_gap_d * ANT_HOURS_PER_DAY);
  add_spans (json, record, "dark_spans", record->dark_spans);
  ant_json_text (json, "distance", record->distance == ANT_DISTANCE_ONE_AU ? "1 au" : record->distance == ANT_DISTANCE_OBSERVER ? "observer" : "unknown");
  ant_json_number (json, "yearly_swing", record->swing);
  ant_json_number (json, "yearly_swing_sigma", record->swing_sigma);
  ant_json_number (json, "scatter_ppm", summary->scatter_ppm);
  ant_json_number (json, "sample_scatter_ppm", summary->sample_scatter_ppm);
}

static void
add_witnesses (JsonBuilder *json, const GPtrArray *witnesses)
{
  json_builder_begin_array (json_builder_set_member_name (json, "witnesses"));
  for (guint i = 0; i < witnesses->len; i++)
    {
      const AntComparison *comparison = g_ptr_array_index (witnesses, i);
      json_builder_begin_object (json);
      ant_json_text (json, "path", comparison->witness->path);
      ant_json_text (json, "sha256", comparison->witness->sha256);
      ant_json_number (json, "step_s", comparison->step_d * ANT_SECONDS_PER_DAY);
      ant_json_count (json, "in_common", comparison->n_both);
      ant_json_number (json, "level_ratio", comparison->level_ratio);
      ant_json_number (json, "ratio_scatter_ppm", comparison->ratio_scatter_ppm);
      json_builder_begin_array (json_builder_set_member_name (json, "common_noise"));
      for (int k = 0; k < ANT_N_COMMON_SCALES; k++)
        {
          json_builder_begin_object (json);
          ant_json_number (json, "hours", ant_common_scales_h[k]);
          ant_json_number (json, "correlation", comparison->common[k].correlation);
          ant_json_number (json, "sigma", comparison->common[k].sigma);
          ant_json_number (json, "record_ppm", comparison->common[k].rms_a_ppm);
          ant_json_number (json, "witness_ppm", comparison->common[k].rms_b_ppm);
          json_builder_end_object (json);
        }
      json_builder_end_array (json);
      json_builder_end_object (json);
    }
  json_builder_end_array (json);
}

static void
print_json (const AntRecord *record, const AntRecordSummary *summary, gboolean gridded, const GPtrArray *witnesses, const GError *refusal)
{
  g_autoptr (JsonBuilder) json = json_builder_new ();
  json_builder_begin_object (json);
  ant_json_text (json, "path", record->path);
  ant_json_text (json, "format", record->format);
  ant_json_text (json, "part", record->part);
  ant_json_text (json, "sha256", record->sha256);
  add_columns (json, record);
  add_rows (json, record, summary);
  if (gridded)
    add_grid (json, record, summary);
  if (witnesses && witnesses->len > 0)
    add_witnesses (json, witnesses);
  ant_json_text (json, "refused", refusal ? refusal->message : NULL);
  json_builder_begin_array (json_builder_set_member_name (json, "said"));
  for (guint i = 0; i < record->said->len; i++)
    json_builder_add_string_value (json, g_ptr_array_index (record->said, i));
  json_builder_end_array (json);
  json_builder_end_object (json);
  ant_json_print (json);
}

/* A record that no grid can be laid on is told about as far as it was read; the exit code tells the rest. */
static int
tell (const char *path, const AntRecordOptions *reading, const AntWitnessOptions *witness, const AntFoldWish *fold,
      const char *observer, const AntSettingsOptions *given, gboolean as_json)
{
  g_autoptr (GError) error = NULL;
  AntSettings settings;
  AntRecordSummary summary;
  if (!ant_settings_options_apply (given, &settings, &error))
    return ant_cli_fail (error);
  g_autoptr (AntObserverChoice) choice = observer ? ant_observer_open (observer, &error) : NULL;
  if (observer && !choice)
    return ant_cli_fail (error);
  AntGridOptions grid = ant_settings_grid (&settings);
  grid.observer = choice ? &choice->observer : NULL;
  g_autoptr (AntRecord) record = NULL;
  gboolean gridded = FALSE;
  if (ant_record_options_good (reading, &grid, &error)
      && (record = ant_record_options_read (reading, path, ant_stop_on_signals (), &error)))
    gridded = ant_record_make_grid (record, &grid, &error);
  g_autoptr (GPtrArray) named = g_ptr_array_new_with_free_func ((GDestroyNotify) ant_witness_free), witnesses = NULL;
  if (gridded && ant_witness_options_add_to (witness, named, &error))
    witnesses = ant_witnesses_open (named, record, &settings, ant_stop_on_signals (), &error);
  g_clear_pointer (&grid.good_values, g_array_unref);
  if (gridded && fold->clock && !error)
    ant_fold_options_print (fold, record, &settings, &error);
  else if (record)
    {
      ant_record_summarise (record, gridded, &summary);
      if (as_json)
        print_json (record, &summary, gridded, witnesses, error);
      else
        print_plain (record, &summary, gridded);
      if (witnesses && !as_json)
        ant_witnesses_print (witnesses);
    }
  return error ? ant_cli_fail (error) : ANT_EXIT_DONE;
}

int
ant_verb_info (int argc, char **argv)
{
  gboolean as_json = FALSE;
  g_autofree char *observer = NULL;
  AntRecordOptions reading = { 0 };
  AntWitnessOptions witness = { 0 };
  AntFoldWish fold = { 0 };
  AntSettingsOptions given = { 0 };
  const GOptionEntry entries[] = { { "json", 0, 0, G_OPTION_ARG_NONE, &as_json, N_("print JSON"), NULL },
                                   { "observer", 0, 0, G_OPTION_ARG_FILENAME, &observer,
                                     N_("whose distance from the Sun the setting distance takes; without it the Earth's centre"),
                                     N_("earth|l1|site:LON,LAT,HEIGHT_M|FILE") },
                                   { NULL } };
  g_autoptr (GOptionContext) context = g_option_context_new (_("RECORD"));
  g_option_context_set_summary (context, _("Tells what is in a record (“-”: standard input), and what was assumed to read it."));
  g_option_context_add_main_entries (context, entries, NULL);
  ant_record_options_add (context, &reading);
  ant_witness_options_add (context, &witness);
  ant_fold_options_add (context, &fold);
  ant_settings_options_add (context, &given);

  g_autoptr (GError) error = NULL;
  int code;
  if (!g_option_context_parse (context, &argc, &argv, &error))
    code = ant_cli_fail (error);
  else if (argc != 2)
    code = ant_cli_fail_usage (_("info: found %d files, expected one record"), argc - 1);
  else
    code = tell (argv[1], &reading, &witness, &fold, observer, &given, as_json);
  ant_record_options_clear (&reading);
  ant_witness_options_clear (&witness);
  ant_fold_options_clear (&fold);
  ant_settings_options_clear (&given);
  return code;
}
