/* repeat-results-text.c - what a search for repeats gave, to JSON and back. */
#include "data/repeat-results-text.h"

#include <glib/gi18n.h>
#include <math.h>

#include "data/json-fields.h"

#define MOST_EVENTS 1000000

static const AntJsonField result_fields[] = {
  ANT_JSON_COUNT_OF (AntRepeatResults, searched),     ANT_JSON_REAL_OF (AntRepeatResults, done),
  ANT_JSON_REAL_OF (AntRepeatResults, period_min_d),  ANT_JSON_REAL_OF (AntRepeatResults, period_max_d),
  ANT_JSON_COUNT_OF (AntRepeatResults, least_events), ANT_JSON_COUNT_OF (AntRepeatResults, white),
  ANT_JSON_REAL_OF (AntRepeatResults, threshold_snr), ANT_JSON_REAL_OF (AntRepeatResults, expected_at_threshold),
  ANT_JSON_COUNT_OF (AntRepeatResults, n_mirrored),   ANT_JSON_REAL_OF (AntRepeatResults, best_mirrored_snr),
};
static const AntJsonField repeat_fields[] = {
  ANT_JSON_REAL_OF (AntRepeat, period_d),         ANT_JSON_REAL_OF (AntRepeat, period_sigma_d),
  ANT_JSON_REAL_OF (AntRepeat, epoch_d),          ANT_JSON_REAL_OF (AntRepeat, epoch_sigma_d),
  ANT_JSON_REAL_OF (AntRepeat, duration_d),       ANT_JSON_REAL_OF (AntRepeat, depth_ppm),
  ANT_JSON_REAL_OF (AntRepeat, depth_sigma_ppm),  ANT_JSON_REAL_OF (AntRepeat, snr),
  ANT_JSON_REAL_OF (AntRepeat, snr_without_largest), ANT_JSON_REAL_OF (AntRepeat, snr_unlisted),
  ANT_JSON_REAL_OF (AntRepeat, odd_even),         ANT_JSON_REAL_OF (AntRepeat, chi2),
  ANT_JSON_REAL_OF (AntRepeat, expected_false),   ANT_JSON_COUNT_OF (AntRepeat, n_observed),
};
static const AntJsonField event_fields[] = {
  ANT_JSON_REAL_OF (AntRepeatEvent, mid_d),     ANT_JSON_REAL_OF (AntRepeatEvent, depth_ppm),
  ANT_JSON_REAL_OF (AntRepeatEvent, sigma_ppm), ANT_JSON_REAL_OF (AntRepeatEvent, snr),
  ANT_JSON_REAL_OF (AntRepeatEvent, coverage),  ANT_JSON_COUNT_OF (AntRepeatEvent, dip),
};
#define TABLE(fields) G_N_ELEMENTS (fields), fields

static JsonObject *
put_repeat (const AntRepeat *repeat)
{
  JsonObject *object = json_object_new ();
  double alias[ANT_REPEAT_ALIASES];
  ant_json_put_fields (object, TABLE (repeat_fields), repeat);
  for (gsize k = 0; k < ANT_REPEAT_ALIASES; k++)
    alias[k] = repeat->alias[k].snr;
  json_object_set_array_member (object, "alias_snr", ant_json_put_reals (ANT_REPEAT_ALIASES, alias));
  json_object_set_array_member (
      object, "events", ant_json_put_records (TABLE (event_fields), repeat->n_events, repeat->event, sizeof (AntRepeatEvent)));
  return object;
}

void
ant_repeat_results_put (JsonObject *object, const AntRepeatResults *results)
{
  JsonObject *part = json_object_new ();
  JsonArray *array = json_array_new ();
  ant_json_put_fields (part, TABLE (result_fields), results);
  for (gsize i = 0; i < results->n; i++)
    json_array_add_object_element (array, put_repeat (&results->repeat[i]));
  json_object_set_array_member (part, "list", array);
  json_object_set_array_member (part, "period_d", ant_json_put_reals (results->n_periods, results->period_d));
  json_object_set_array_member (part, "period_snr", ant_json_put_reals (results->n_periods, results->period_snr));
  json_object_set_array_member (part, "period_duration_h", ant_json_put_reals (results->n_periods, results->period_duration_h));
  json_object_set_object_member (object, "repeats", part);
}

static gboolean
get_repeat (JsonObject *object, AntRepeat *repeat, GError **error)
{
  double alias[ANT_REPEAT_ALIASES];
  if (!ant_json_get_fields (object, TABLE (repeat_fields), repeat, error)
      || !ant_json_get_reals (object, "alias_snr", ANT_REPEAT_ALIASES, alias, error)
      || !ant_json_get_records (object, "events", TABLE (event_fields), sizeof (AntRepeatEvent), MOST_EVENTS, &repeat->n_events,
                                (gpointer *) &repeat->event, error))
    return FALSE;
  if (!(repeat->period_d > 0 && repeat->duration_d > 0 && repeat->duration_d < repeat->period_d) || !isfinite (repeat->epoch_d))
    return ant_json_refuse (error, "period_d", json_object_get_member (object, "period_d"),
                            _("a period longer than its duration, and an epoch"));
  ant_repeat_name_aliases (repeat);
  for (gsize k = 0; k < ANT_REPEAT_ALIASES; k++)
    repeat->alias[k].snr = alias[k];
  for (gsize e = 0; e < repeat->n_events; e++)
    repeat->event[e].number = (long) floor ((repeat->event[e].mid_d - repeat->epoch_d) / repeat->period_d + 0.5);
  return TRUE;
}

static gboolean
get_list (JsonObject *part, AntRepeatResults *results, GError **error)
{
  JsonArray *array = ant_json_get_array (part, "list", ANT_MOST_REPEATS, error);
  if (!array)
    return FALSE;
  gsize n = json_array_get_length (array);
  results->repeat = g_new0 (AntRepeat, n);
  for (gsize i = 0; i < n; i++)
    {
      JsonObject *element = ant_json_element (array, (guint) i, error);
      results->n = i + 1; /* so that what this one holds is freed too */
      if (!element || !get_repeat (element, &results->repeat[i], error))
        return ant_json_within (error, "list", (gint64) i);
    }
  return TRUE;
}

static gboolean
get_spectrum (JsonObject *part, AntRepeatResults *results, GError **error)
{
  JsonArray *array = ant_json_get_array (part, "period_d", ANT_REPEAT_BINS, error);
  if (!array)
    return FALSE;
  gsize n = results->n_periods = json_array_get_length (array);
  results->period_d = g_new0 (double, n);
  results->period_snr = g_new0 (double, n);
  results->period_duration_h = g_new0 (double, n);
  return ant_json_get_reals (part, "period_d", n, results->period_d, error)
         && ant_json_get_reals (part, "period_snr", n, results->period_snr, error)
         && ant_json_get_reals (part, "period_duration_h", n, results->period_duration_h, error);
}

gboolean
ant_repeat_results_get (JsonObject *object, AntRepeatResults *results, GError **error)
{
  if (!json_object_has_member (object, "repeats"))
    return TRUE;
  JsonObject *part = ant_json_get_object (object, "repeats", error);
  if (!part)
    return FALSE;
  if (ant_json_get_fields (part, TABLE (result_fields), results, error) && get_list (part, results, error)
      && get_spectrum (part, results, error))
    return TRUE;
  return ant_json_within (error, "repeats", -1);
}
