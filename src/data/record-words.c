/* record-words.c - what a record is, for people. */
#include "data/record-words.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"

#define MOST_COLUMNS 16

static void
add_columns (GPtrArray *facts, const AntRecord *record)
{
  const AntTimeReference *time = &record->time;
  ant_facts_add_format (facts, _("Time"), _("%s, %s%s"), record->time_name, ant_time_scale_name (time->scale),
       time->scale_assumed ? _(" (assumed)") : "");
  if (time->place)
    ant_facts_add_format (facts, _("Clock at"), "%s", time->place);
  ant_facts_add_format (facts, _("Value"), "%s%s%s", record->value_name, record->value_unit ? ", " : "",
       record->value_unit ? record->value_unit : "");
  ant_facts_add_format (facts, _("Error"), "%s", record->error_name ? record->error_name : _("none"));
  ant_facts_add_format (facts, _("Quality"), "%s", record->quality_name ? record->quality_name : _("none"));
}

void
ant_record_add_further (GPtrArray *facts, const AntRecord *record)
{
  for (guint i = 0; i < MIN (record->columns->len, MOST_COLUMNS); i++)
    {
      g_autofree char *words = ant_column_words (g_ptr_array_index (record->columns, i), record->n_rows);
      ant_facts_add_format (facts, i ? "" : _("Further"), "%s", words);
    }
  if (record->columns->len > MOST_COLUMNS)
    ant_facts_add_format (facts, "", _("and %u more"), record->columns->len - MOST_COLUMNS);
}

char *
ant_record_distance_words (const AntRecord *record)
{
  static const char *const places[] = { N_("unknown"), N_("as the observer saw them"), N_("at 1 au") };
  const char *place = _ (places[record->distance]);
  if (!isfinite (record->swing))
    return g_strdup (place);
  return g_strdup_printf (_("%s (of the yearly swing %.3f +- %.3f in the file)"), place, record->swing, record->swing_sigma);
}

static void
add_grid (GPtrArray *facts, const AntRecord *record, const AntRecordSummary *summary)
{
  static const char *const places[] = { N_("unknown, taken as the middle"), N_("start"), N_("middle"), N_("end") };
  g_autofree char *cadence = ant_length_words (record->cadence_d), *exposure = ant_length_words (record->exposure_d);
  g_autofree char *jitter = ant_length_words (summary->jitter_most_d), *gap = ant_length_words (summary->longest_gap_d);
  if (summary->jitter_most_d * ANT_SECONDS_PER_DAY < 0.001)
    ant_facts_add_format (facts, _("Cadence"), _("%s, every stamp on the grid"), cadence);
  else
    ant_facts_add_format (facts, _("Cadence"), _("%s, stamps within %s of the grid"), cadence, jitter);
  ant_facts_add_format (facts, _("Exposure"), record->exposure_known ? "%s" : _("unknown, %s used"), exposure);
  ant_facts_add_format (facts, _("Stamps mark"), "%s", _ (places[record->stamp]));
  ant_facts_add_format (facts, _("Samples"), _("%zu of %zu places, duty cycle %.1f %%"), summary->n_observed,
       summary->n_places, 100.0 * (double) summary->n_observed / (double) summary->n_places);
  if (record->gaps->len > 0)
    ant_facts_add_format (facts, _("Gaps"), _("%u, the longest %s"), record->gaps->len, gap);
  ant_facts_add_format (facts, _("Level"), _("%.8g%s%s, the median: 0 ppm"), record->median, record->value_unit ? " " : "",
       record->value_unit ? record->value_unit : "");
  g_autofree char *distance = ant_record_distance_words (record);
  ant_facts_add_format (facts, _("Distance"), "%s", distance);
  ant_facts_add_format (facts, _("Scatter"), _("%.4g ppm, %.4g ppm from sample to sample"), summary->scatter_ppm,
       summary->sample_scatter_ppm);
}

GPtrArray *
ant_record_facts (const AntRecord *record, const AntRecordSummary *summary)
{
  GPtrArray *facts = g_ptr_array_new_with_free_func (ant_fact_free);
  ant_facts_add_format (facts, _("Format"), "%s%s%s", record->format, record->part ? ", " : "", record->part ? record->part : "");
  if (summary->has_times)
    {
      g_autofree char *first = ant_instant_words (record, summary->first_d),
                      *last = ant_instant_words (record, summary->last_d);
      ant_facts_add_format (facts, _("From"), "%s", first);
      ant_facts_add_format (facts, _("To"), "%s", last);
    }
  add_columns (facts, record);
  add_grid (facts, record, summary);
  ant_facts_add_format (facts, "SHA-256", "%.16s…", record->sha256 ? record->sha256 : "");
  return facts;
}

GPtrArray *
ant_record_left_out (const AntRecordSummary *summary)
{
  GPtrArray *facts = g_ptr_array_new_with_free_func (ant_fact_free);
  for (unsigned bit = 0; bit < ANT_N_FLAGS; bit++)
    if (summary->n_flagged[bit] > 0)
      ant_facts_add_format (facts, ant_flag_name (bit), _("%zu rows\n%s"), summary->n_flagged[bit], ant_flag_description (bit));
  return facts;
}

char *
ant_record_headline (const AntRecord *record, const AntRecordSummary *summary)
{
  g_autofree char *span = ant_length_words (summary->last_d - summary->first_d);
  g_autofree char *cadence = ant_length_words (record->cadence_d);
  double missing = 100.0 * (1.0 - (double) summary->n_observed / (double) summary->n_places);
  return g_strdup_printf (_("%s · %s · %zu samples · %.0f %% missing"), span, cadence, summary->n_observed,
                          missing);
}

char *
ant_preview_words (const AntRecord *record, gboolean partial)
{
  AntRecordSummary summary;
  double least = HUGE_VAL, greatest = -HUGE_VAL;
  ant_record_summarise (record, FALSE, &summary);
  for (gsize i = 0; i < record->n_rows; i++)
    if (!isnan (record->value[i]))
      {
        least = fmin (least, record->value[i]);
        greatest = fmax (greatest, record->value[i]);
      }
  g_autofree char *first = summary.has_times ? ant_instant_words (record, summary.first_d) : g_strdup ("–");
  g_autofree char *last = summary.has_times ? ant_instant_words (record, summary.last_d) : g_strdup ("–");
  return g_strdup_printf (partial ? _("The first %zu rows: %s to %s, values %.8g to %.8g%s%s")
                                  : _("%zu rows: %s to %s, values %.8g to %.8g%s%s"),
                          record->n_rows, first, last, least, greatest, record->value_unit ? " " : "",
                          record->value_unit ? record->value_unit : "");
}
