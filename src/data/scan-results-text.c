/* scan-results-text.c - what a scan gave, to JSON and back, part by part. */
#include "data/scan-results-text.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "data/error.h"
#include "data/json-fields.h"
#include "data/repeat-results-text.h"
#include "data/verdict-text.h"

#define MOST_DIPS 100000
#define MOST_CHUNKS 10000
#define MOST_BINS 100000
#define MOST_SPIKES 10000000
#define LONGEST_DIP_D 1000.0

static const char *const edges_words[] = { "none", "ingress", "egress", "both", NULL };
static const char *const part_words[] = { "oscillator", "exponential", NULL };

static const char *const reach_words[] = { "nothing", "noise", "weighed", "dips", "complete", NULL };

static const AntJsonField result_fields[] = {
  ANT_JSON_WORD_OF (AntScanResults, reach, reach_words),
  ANT_JSON_REAL_OF (AntScanResults, threshold_snr),   ANT_JSON_REAL_OF (AntScanResults, expected_at_threshold),
  ANT_JSON_COUNT_OF (AntScanResults, n_surrogates),   ANT_JSON_COUNT_OF (AntScanResults, n_surrogate_events),
  ANT_JSON_REAL_OF (AntScanResults, observed_d),      ANT_JSON_COUNT_OF (AntScanResults, n_refits),
  ANT_JSON_COUNT_OF (AntScanResults, n_mirror_dips),  ANT_JSON_COUNT_OF (AntScanResults, n_mirrored),
};
/* Named as the law's own members; files written before them have none. */
static const AntJsonField chance_fields[] = {
  { "crossings", ANT_JSON_REAL, G_STRUCT_OFFSET (AntChanceLaw, field.crossings), NULL, TRUE },
  { "observed_d", ANT_JSON_REAL, G_STRUCT_OFFSET (AntChanceLaw, field.observed_d), NULL, TRUE },
  { "yield", ANT_JSON_REAL, G_STRUCT_OFFSET (AntChanceLaw, yield), NULL, TRUE },
  { "softness", ANT_JSON_REAL, G_STRUCT_OFFSET (AntChanceLaw, softness), NULL, TRUE },
};
static const AntJsonField dip_fields[] = {
  ANT_JSON_REAL_OF (AntDip, mid_d),           ANT_JSON_REAL_OF (AntDip, duration_d),
  ANT_JSON_REAL_OF (AntDip, edge_d),          ANT_JSON_REAL_OF (AntDip, depth_ppm),
  ANT_JSON_REAL_OF (AntDip, depth_sigma_ppm), ANT_JSON_REAL_OF (AntDip, mean_depth_ppm),
  ANT_JSON_REAL_OF (AntDip, radius_ratio),    ANT_JSON_REAL_OF (AntDip, snr),
  ANT_JSON_REAL_OF (AntDip, first_snr),       ANT_JSON_REAL_OF (AntDip, mid_sigma_d),
  ANT_JSON_REAL_OF (AntDip, duration_sigma_d), ANT_JSON_REAL_OF (AntDip, expected_false),
  ANT_JSON_REAL_OF (AntDip, coverage),        ANT_JSON_WORD_OF (AntDip, edges, edges_words),
  ANT_JSON_COUNT_OF (AntDip, chunk),
};
static const AntJsonField passage_fields[] = {
  ANT_JSON_REAL_OF (AntPassage, start_d),   ANT_JSON_REAL_OF (AntPassage, mid_d),
  ANT_JSON_REAL_OF (AntPassage, end_d),     ANT_JSON_REAL_OF (AntPassage, depth_ppm),
  ANT_JSON_REAL_OF (AntPassage, depth_sigma_ppm), ANT_JSON_REAL_OF (AntPassage, coverage),
  ANT_JSON_COUNT_OF (AntPassage, chunk),
};
static const AntJsonField floor_fields[] = {
  ANT_JSON_REAL_OF (AntFloorPoint, duration_d), ANT_JSON_COUNT_OF (AntFloorPoint, starts),
  ANT_JSON_REAL_OF (AntFloorPoint, snr_sd),     ANT_JSON_REAL_OF (AntFloorPoint, snr_mean),
  ANT_JSON_REAL_OF (AntFloorPoint, sigma_ppm),
};
static const AntJsonField chunk_fields[] = {
  ANT_JSON_COUNT_OF (AntChunk, first),   ANT_JSON_COUNT_OF (AntChunk, n),
  ANT_JSON_REAL_OF (AntChunk, own_from), ANT_JSON_REAL_OF (AntChunk, own_to),
};
static const AntJsonField health_fields[] = {
  ANT_JSON_COUNT_OF (AntChunkHealth, observed), ANT_JSON_COUNT_OF (AntChunkHealth, spikes),
  ANT_JSON_COUNT_OF (AntChunkHealth, refits),   ANT_JSON_REAL_OF (AntChunkHealth, innovation_rms),
  ANT_JSON_REAL_OF (AntChunkHealth, lag1),      ANT_JSON_REAL_OF (AntChunkHealth, loudest),
  ANT_JSON_REAL_OF (AntChunkHealth, quietest),
};
static const AntJsonField fit_fields[] = {
  ANT_JSON_REAL_OF (AntFitReport, log_likelihood), ANT_JSON_REAL_OF (AntFitReport, log_posterior),
  ANT_JSON_COUNT_OF (AntFitReport, steps),         ANT_JSON_COUNT_OF (AntFitReport, evaluations),
};
static const AntJsonField model_fields[] = {
  ANT_JSON_REAL_OF (AntNoiseModel, white_ppm),      ANT_JSON_REAL_OF (AntNoiseModel, white_prior_ppm),
  ANT_JSON_REAL_OF (AntNoiseModel, white_width_ln), ANT_JSON_REAL_OF (AntNoiseModel, error_scale),
  ANT_JSON_REAL_OF (AntNoiseModel, error_scale_width_ln),
};
static const AntJsonField noise_part_fields[] = {
  ANT_JSON_WORD_OF (AntNoisePart, kind, part_words), ANT_JSON_REAL_OF (AntNoisePart, rms_ppm),
  ANT_JSON_REAL_OF (AntNoisePart, time_d),           ANT_JSON_REAL_OF (AntNoisePart, quality),
  ANT_JSON_REAL_OF (AntNoisePart, rms_prior_ppm),    ANT_JSON_REAL_OF (AntNoisePart, rms_width_ln),
  ANT_JSON_REAL_OF (AntNoisePart, time_prior_d),     ANT_JSON_REAL_OF (AntNoisePart, time_width_ln),
};
#define TABLE(fields) G_N_ELEMENTS (fields), fields

static gboolean
refuse (GError **error, const char *sentence)
{
  g_set_error_literal (error, ANT_ERROR, ANT_ERROR_READ, sentence);
  return FALSE;
}

/* Lists of dips and passages */

static gboolean
check_dips (const char *name, gsize n, const AntDip *dip, gsize n_chunks, GError **error)
{
  for (gsize i = 0; i < n; i++)
    if (!isfinite (dip[i].mid_d) || !(dip[i].duration_d > 0 && dip[i].duration_d < LONGEST_DIP_D) || dip[i].chunk >= n_chunks)
      {
        refuse (error, _("found a dip without a time, a length or a chunk of its own, expected all three"));
        return ant_json_within (error, name, (gint64) i);
      }
  return TRUE;
}

static void
put_dips (JsonObject *object, const AntScanResults *results)
{
  json_object_set_array_member (object, "dips",
                                ant_json_put_records (TABLE (dip_fields), results->n_dips, results->dip, sizeof (AntDip)));
}

static gboolean
get_dips (JsonObject *object, AntScanResults *results, GError **error)
{
  return ant_json_get_records (object, "dips", TABLE (dip_fields), sizeof (AntDip), MOST_DIPS, &results->n_dips,
                               (gpointer *) &results->dip, error)
         && check_dips ("dips", results->n_dips, results->dip, results->n_chunks, error);
}

static void
put_brightenings (JsonObject *object, const AntScanResults *results)
{
  json_object_set_array_member (
      object, "brightenings",
      ant_json_put_records (TABLE (dip_fields), results->n_brightenings, results->brightening, sizeof (AntDip)));
}

static gboolean
get_brightenings (JsonObject *object, AntScanResults *results, GError **error)
{
  return ant_json_get_records (object, "brightenings", TABLE (dip_fields), sizeof (AntDip), MOST_DIPS,
                               &results->n_brightenings, (gpointer *) &results->brightening, error)
         && check_dips ("brightenings", results->n_brightenings, results->brightening, results->n_chunks, error);
}

static void
put_verdicts (JsonObject *object, const AntScanResults *results)
{
  if (results->dip_verdict)
    json_object_set_array_member (object, "dip_verdicts", ant_verdicts_to_json (results->n_dips, results->dip_verdict));
  if (results->brightening_verdict)
    json_object_set_array_member (object, "brightening_verdicts",
                                  ant_verdicts_to_json (results->n_brightenings, results->brightening_verdict));
}

static gboolean
get_verdicts (JsonObject *object, AntScanResults *results, GError **error)
{
  return ant_verdicts_from_json (object, "dip_verdicts", results->n_dips, &results->dip_verdict, error)
         && ant_verdicts_from_json (object, "brightening_verdicts", results->n_brightenings, &results->brightening_verdict, error);
}

static void
put_passages (JsonObject *object, const AntScanResults *results)
{
  json_object_set_array_member (
      object, "passages",
      ant_json_put_records (TABLE (passage_fields), results->n_passages, results->passage, sizeof (AntPassage)));
}

static gboolean
get_passages (JsonObject *object, AntScanResults *results, GError **error)
{
  if (!ant_json_get_records (object, "passages", TABLE (passage_fields), sizeof (AntPassage), MOST_DIPS,
                             &results->n_passages, (gpointer *) &results->passage, error))
    return FALSE;
  for (gsize i = 0; i < results->n_passages; i++)
    if (!isfinite (results->passage[i].mid_d) || results->passage[i].chunk >= results->n_chunks)
      {
        refuse (error, _("found a passage without a time or a chunk of its own, expected both"));
        return ant_json_within (error, "passages", (gint64) i);
      }
  return TRUE;
}

/* Noise */

static JsonObject *
put_model (const AntNoiseModel *model)
{
  JsonObject *object = json_object_new ();
  ant_json_put_fields (object, TABLE (model_fields), model);
  json_object_set_array_member (
      object, "parts", ant_json_put_records (TABLE (noise_part_fields), model->n_parts, model->part, sizeof (AntNoisePart)));
  return object;
}

static gboolean
get_model (JsonObject *chunk, AntNoiseModel *model, GError **error)
{
  g_autofree AntNoisePart *part = NULL;
  JsonObject *object = ant_json_get_object (chunk, "model", error);
  if (!object)
    return FALSE;
  if (!ant_json_get_fields (object, TABLE (model_fields), model, error)
      || !ant_json_get_records (object, "parts", TABLE (noise_part_fields), sizeof (AntNoisePart), ANT_MAX_PARTS,
                                &model->n_parts, (gpointer *) &part, error))
    return ant_json_within (error, "model", -1);
  for (gsize i = 0; i < model->n_parts; i++)
    model->part[i] = part[i];
  if (ant_noise_model_check (model) != ANT_OK)
    {
      refuse (error, _("found numbers that are no noise model, expected positive times and amplitudes"));
      return ant_json_within (error, "model", -1);
    }
  return TRUE;
}

static void
put_unconstrained (JsonObject *object, const AntChunk *chunk)
{
  JsonArray *array = json_array_new ();
  gsize n = ant_noise_model_get (&chunk->model, NULL);
  for (gsize i = 0; i < n; i++)
    if (chunk->health.unconstrained[i])
      json_array_add_int_element (array, (gint64) i);
  json_object_set_array_member (object, "unconstrained", array);
}

static gboolean
get_unconstrained (JsonObject *object, AntChunk *chunk, GError **error)
{
  JsonArray *array = ant_json_get_array (object, "unconstrained", ANT_MAX_FREE, error);
  for (guint i = 0; array && i < json_array_get_length (array); i++)
    {
      JsonNode *node = json_array_get_element (array, i);
      gint64 which = JSON_NODE_HOLDS_VALUE (node) && json_node_get_value_type (node) == G_TYPE_INT64 ? json_node_get_int (node) : -1;
      if (which < 0 || which >= ANT_MAX_FREE)
        return ant_json_refuse (error, "unconstrained", node, _("the number of a parameter"));
      chunk->health.unconstrained[which] = 1;
    }
  return array != NULL;
}

static JsonObject *
put_chunk (const AntChunk *chunk)
{
  JsonObject *object = json_object_new (), *health = json_object_new (), *fit = json_object_new ();
  ant_json_put_fields (object, TABLE (chunk_fields), chunk);
  json_object_set_object_member (object, "model", put_model (&chunk->model));
  ant_json_put_fields (fit, TABLE (fit_fields), &chunk->fit);
  json_object_set_object_member (object, "fit", fit);
  ant_json_put_fields (health, TABLE (health_fields), &chunk->health);
  put_unconstrained (health, chunk);
  json_object_set_object_member (object, "health", health);
  json_object_set_array_member (
      object, "floor", ant_json_put_records (TABLE (floor_fields), chunk->n_floor, chunk->floor, sizeof (AntFloorPoint)));
  json_object_set_array_member (object, "frequency_cd", ant_json_put_reals (chunk->n_bins, chunk->frequency_cd));
  json_object_set_array_member (object, "power_unmasked", ant_json_put_reals (chunk->n_bins, chunk->power_unmasked));
  return object;
}

static gboolean
get_spectrum (JsonObject *object, AntChunk *chunk, GError **error)
{
  JsonArray *array = ant_json_get_array (object, "frequency_cd", MOST_BINS, error);
  if (!array)
    return FALSE;
  chunk->n_bins = json_array_get_length (array);
  chunk->frequency_cd = g_new0 (double, 2 * chunk->n_bins);
  chunk->power_unmasked = chunk->frequency_cd + chunk->n_bins;
  if (!ant_json_get_reals (object, "frequency_cd", chunk->n_bins, chunk->frequency_cd, error)
      || !ant_json_get_reals (object, "power_unmasked", chunk->n_bins, chunk->power_unmasked, error))
    return FALSE;
  for (gsize i = 0; i < chunk->n_bins; i++)
    if (!(chunk->frequency_cd[i] > (i ? chunk->frequency_cd[i - 1] : 0)))
      return refuse (error, _("frequency_cd: found a frequency that does not grow, expected ever higher ones"));
  return TRUE;
}

static gboolean
get_floor (JsonObject *object, gsize *n, AntFloorPoint *floor, GError **error)
{
  g_autofree AntFloorPoint *point = NULL;
  if (!ant_json_get_records (object, "floor", TABLE (floor_fields), sizeof (AntFloorPoint), ANT_MAX_FLOOR, n,
                             (gpointer *) &point, error))
    return FALSE;
  for (gsize i = 0; i < *n; i++)
    {
      floor[i] = point[i];
      if (!(point[i].duration_d > 0 && point[i].duration_d < LONGEST_DIP_D))
        return refuse (error, _("floor: found a duration out of range, expected one of a dip"));
    }
  return TRUE;
}

static gboolean
get_chunk (JsonObject *object, AntChunk *chunk, GError **error)
{
  JsonObject *health, *fit;
  if (!ant_json_get_fields (object, TABLE (chunk_fields), chunk, error) || !get_model (object, &chunk->model, error)
      || !(health = ant_json_get_object (object, "health", error)) || !(fit = ant_json_get_object (object, "fit", error)))
    return FALSE;
  if (!ant_json_get_fields (health, TABLE (health_fields), &chunk->health, error)
      || !get_unconstrained (health, chunk, error))
    return ant_json_within (error, "health", -1);
  if (!ant_json_get_fields (fit, TABLE (fit_fields), &chunk->fit, error))
    return ant_json_within (error, "fit", -1);
  if (isnan (chunk->own_from)) /* the first and the last piece reach without end */
    chunk->own_from = -INFINITY;
  if (isnan (chunk->own_to))
    chunk->own_to = INFINITY;
  return get_floor (object, &chunk->n_floor, chunk->floor, error) && get_spectrum (object, chunk, error);
}

static void
put_chunks (JsonObject *object, const AntScanResults *results)
{
  JsonArray *array = json_array_new ();
  for (gsize i = 0; i < results->n_chunks; i++)
    json_array_add_object_element (array, put_chunk (&results->chunk[i]));
  json_object_set_array_member (object, "chunks", array);
}

static gboolean
get_chunks (JsonObject *object, AntScanResults *results, GError **error)
{
  JsonArray *array = ant_json_get_array (object, "chunks", MOST_CHUNKS, error);
  if (!array)
    return FALSE;
  gsize n = json_array_get_length (array);
  results->chunk = g_new0 (AntChunk, n);
  for (gsize i = 0; i < n; i++)
    {
      JsonObject *element = ant_json_element (array, (guint) i, error);
      results->n_chunks = i + 1; /* so that what this one holds is freed too */
      if (!element || !get_chunk (element, &results->chunk[i], error))
        return ant_json_within (error, "chunks", (gint64) i);
    }
  return TRUE;
}

static void
put_floor (JsonObject *object, const AntScanResults *results)
{
  json_object_set_array_member (
      object, "floor",
      ant_json_put_records (TABLE (floor_fields), results->n_floor, results->floor, sizeof (AntFloorPoint)));
}

static gboolean
get_median_floor (JsonObject *object, AntScanResults *results, GError **error)
{
  return get_floor (object, &results->n_floor, results->floor, error);
}

/* The rest */

static void
put_repeats (JsonObject *object, const AntScanResults *results)
{
  ant_repeat_results_put (object, &results->repeats);
}

static gboolean
get_repeats (JsonObject *object, AntScanResults *results, GError **error)
{
  return ant_repeat_results_get (object, &results->repeats, error);
}

static void
put_spikes (JsonObject *object, const AntScanResults *results)
{
  JsonArray *array = json_array_sized_new ((guint) results->n_spikes);
  for (gsize i = 0; i < results->n_spikes; i++)
    json_array_add_int_element (array, results->spike_row[i]);
  json_object_set_array_member (object, "spike_rows", array);
}

static gboolean
get_spikes (JsonObject *object, AntScanResults *results, GError **error)
{
  JsonArray *array = ant_json_get_array (object, "spike_rows", MOST_SPIKES, error);
  if (!array)
    return FALSE;
  results->n_spikes = json_array_get_length (array);
  results->spike_row = g_new0 (guint32, results->n_spikes);
  for (gsize i = 0; i < results->n_spikes; i++)
    {
      JsonNode *node = json_array_get_element (array, (guint) i);
      gint64 row = JSON_NODE_HOLDS_VALUE (node) && json_node_get_value_type (node) == G_TYPE_INT64 ? json_node_get_int (node) : -1;
      if (row < 0 || row > G_MAXINT32)
        return ant_json_refuse (error, "spike_rows", node, _("the number of a row"));
      results->spike_row[i] = (guint32) row;
    }
  return TRUE;
}

static void
put_said (JsonObject *object, const AntScanResults *results)
{
  JsonArray *array = json_array_new ();
  for (guint i = 0; i < results->said->len; i++)
    json_array_add_string_element (array, g_ptr_array_index (results->said, i));
  json_object_set_array_member (object, "said", array);
}

static gboolean
get_said (JsonObject *object, AntScanResults *results, GError **error)
{
  JsonArray *array = ant_json_get_array (object, "said", MOST_DIPS, error);
  for (guint i = 0; array && i < json_array_get_length (array); i++)
    {
      JsonNode *node = json_array_get_element (array, i);
      if (!JSON_NODE_HOLDS_VALUE (node) || json_node_get_value_type (node) != G_TYPE_STRING)
        return ant_json_refuse (error, "said", node, _("a text"));
      g_ptr_array_add (results->said, json_node_dup_string (node));
    }
  return array != NULL;
}

static void
put_chance (JsonObject *object, const AntScanResults *results)
{
  JsonObject *chance = json_object_new ();
  ant_json_put_fields (chance, TABLE (chance_fields), &results->chance);
  json_object_set_object_member (object, "chance", chance);
}

static gboolean
get_chance (JsonObject *object, AntScanResults *results, GError **error)
{
  if (!json_object_has_member (object, "chance"))
    return TRUE;
  JsonObject *chance = ant_json_get_object (object, "chance", error);
  return chance
         && (ant_json_get_fields (chance, TABLE (chance_fields), &results->chance, error)
             || ant_json_within (error, "chance", -1));
}

/* The parts, in the order in which they are read: dips and passages name their chunks. */
static const struct
{
  void (*put) (JsonObject *object, const AntScanResults *results);
  gboolean (*get) (JsonObject *object, AntScanResults *results, GError **error);
} parts[] = {
  { put_chunks, get_chunks },     { put_dips, get_dips },   { put_brightenings, get_brightenings },
  { put_verdicts, get_verdicts },
  { put_passages, get_passages }, { put_floor, get_median_floor }, { put_spikes, get_spikes },
  { put_said, get_said },         { put_chance, get_chance }, { put_repeats, get_repeats },
};

JsonObject *
ant_scan_results_to_json (const AntScanResults *results)
{
  JsonObject *object = json_object_new ();
  ant_json_put_fields (object, TABLE (result_fields), results);
  for (gsize i = 0; i < G_N_ELEMENTS (parts); i++)
    parts[i].put (object, results);
  return object;
}

AntScanResults *
ant_scan_results_from_json (JsonObject *object, const AntSettings *settings, GError **error)
{
  g_autoptr (AntScanResults) results = g_new0 (AntScanResults, 1);
  results->ref_count = 1;
  results->settings = *settings;
  results->said = g_ptr_array_new_with_free_func (g_free);
  if (!ant_json_get_fields (object, TABLE (result_fields), results, error))
    return NULL;
  for (gsize i = 0; i < G_N_ELEMENTS (parts); i++)
    if (!parts[i].get (object, results, error))
      return NULL;
  return g_steal_pointer (&results);
}
