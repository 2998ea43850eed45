/* analysis-text.c - an analysis to JSON and back. */
#include "data/analysis-text.h"

#include <gio/gio.h>
#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "config.h"
#include "data/analysis-private.h"
#include "data/bounded-json.h"
#include "data/error.h"
#include "data/json-fields.h"
#include "data/kept-path.h"
#include "data/scan-results-text.h"
#include "data/treatment-text.h"

#define VERSION_KEY "antumbra_analysis"
#define MOST_EVENTS 1000000

gboolean
ant_analysis_is_name (const char *path)
{
  gsize n = strlen (path), suffix = strlen (ANT_ANALYSIS_SUFFIX);
  return n > suffix && g_ascii_strcasecmp (path + n - suffix, ANT_ANALYSIS_SUFFIX) == 0;
}

static JsonObject *
put_record (const AntAnalysis *analysis, const char *path)
{
  JsonObject *object = json_object_new ();
  g_autofree char *folder = g_path_get_dirname (path);
  g_autofree char *text = ant_kept_path (folder, analysis->record_path);
  ant_json_put_text (object, "path", text);
  ant_json_put_text (object, "sha256", analysis->record_sha256);
  ant_json_put_real (object, "origin_jd", analysis->origin_jd);
  return object;
}

static gboolean
get_record (JsonObject *object, AntAnalysis *analysis, const char *path, GError **error)
{
  g_autofree char *text = NULL, *folder = g_path_get_dirname (path);
  if (!ant_json_get_text (object, "path", &text, error)
      || !ant_json_get_text (object, "sha256", &analysis->record_sha256, error)
      || !ant_json_get_real (object, "origin_jd", &analysis->origin_jd, error))
    return FALSE;
  analysis->record_path = ant_kept_path_resolve (folder, text);
  return TRUE;
}

static JsonArray *
put_history (const GPtrArray *history)
{
  JsonArray *array = json_array_new ();
  for (guint i = 0; i < history->len; i++)
    {
      const AntAnalysisEvent *event = g_ptr_array_index (history, i);
      JsonObject *object = json_object_new ();
      ant_json_put_text (object, "time", event->time);
      ant_json_put_text (object, "who", event->who);
      ant_json_put_text (object, "what", event->what);
      json_array_add_object_element (array, object);
    }
  return array;
}

static gboolean
get_event (JsonObject *object, AntAnalysisEvent *event, GError **error)
{
  return ant_json_get_text (object, "time", &event->time, error) && ant_json_get_text (object, "who", &event->who, error)
         && ant_json_get_text (object, "what", &event->what, error);
}

static GPtrArray *
get_history (JsonObject *parent, GError **error)
{
  g_autoptr (GPtrArray) history = g_ptr_array_new_with_free_func (ant_analysis_event_free);
  JsonArray *array = ant_json_get_array (parent, "history", MOST_EVENTS, error);
  for (guint i = 0; array && i < json_array_get_length (array); i++)
    {
      AntAnalysisEvent *event = g_new0 (AntAnalysisEvent, 1);
      g_ptr_array_add (history, event);
      JsonObject *object = ant_json_element (array, i, error);
      if (!object || !get_event (object, event, error))
        return ant_json_within (error, "history", i), NULL;
    }
  return array ? g_steal_pointer (&history) : NULL;
}

static void
put_results (JsonObject *root, const AntAnalysis *analysis, const char *path)
{
  if (!analysis->results)
    {
      json_object_set_null_member (root, "results");
      return;
    }
  JsonObject *object = ant_scan_results_to_json (analysis->results);
  json_object_set_object_member (object, "treatment", ant_treatment_to_json (analysis->scanned_with, path));
  json_object_set_object_member (root, "results", object);
}

static gboolean
get_results (JsonObject *root, AntAnalysis *analysis, const char *path, GError **error)
{
  JsonNode *node = json_object_get_member (root, "results");
  if (!node || JSON_NODE_HOLDS_NULL (node))
    return TRUE;
  JsonObject *object = ant_json_get_object (root, "results", error);
  JsonObject *treatment = object ? ant_json_get_object (object, "treatment", error) : NULL;
  if (!treatment)
    return FALSE;
  analysis->scanned_with = ant_treatment_from_json (treatment, path, error);
  if (!analysis->scanned_with)
    return ant_json_within (error, "results.treatment", -1);
  analysis->results = ant_scan_results_from_json (object, &analysis->scanned_with->settings, error);
  analysis->results_read = analysis->results;
  return analysis->results || ant_json_within (error, "results", -1);
}

/* What the file told and this program does not know */

/* The element of an array that tells of the same thing: where the first member of both is the same. */
static JsonObject *
twin (JsonArray *among, guint i, JsonObject *object)
{
  g_autoptr (GList) names = json_object_get_members (object);
  JsonNode *own = names ? json_object_get_member (object, names->data) : NULL;
  guint n = json_array_get_length (among);
  for (guint k = 0; own && k < n; k++)
    {
      JsonNode *node = json_array_get_element (among, (i + k) % n);
      JsonNode *other = JSON_NODE_HOLDS_OBJECT (node) ? json_object_get_member (json_node_get_object (node), names->data) : NULL;
      if (other && json_node_equal (own, other))
        return json_node_get_object (node);
    }
  return NULL;
}

/* Every member that this program knows is always written, so what the new object lacks is unknown; of settings only
 * those that differ from their defaults are written. */
static void
keep_unknown (JsonObject *object, JsonObject *read, gboolean settings)
{
  g_autoptr (GList) names = json_object_get_members (read);
  for (GList *name = names; name; name = name->next)
    {
      JsonNode *old = json_object_get_member (read, name->data), *new = json_object_get_member (object, name->data);
      if (!new && !(settings && ant_treatment_knows_setting (name->data)))
        json_object_set_member (object, name->data, json_node_copy (old));
      else if (new && JSON_NODE_HOLDS_OBJECT (new) && JSON_NODE_HOLDS_OBJECT (old))
        keep_unknown (json_node_get_object (new), json_node_get_object (old), g_str_equal (name->data, "settings"));
      else if (new && JSON_NODE_HOLDS_ARRAY (new) && JSON_NODE_HOLDS_ARRAY (old))
        for (guint i = 0; i < json_array_get_length (json_node_get_array (new)); i++)
          {
            JsonNode *element = json_array_get_element (json_node_get_array (new), i);
            JsonObject *other = JSON_NODE_HOLDS_OBJECT (element)
                                    ? twin (json_node_get_array (old), i, json_node_get_object (element)) : NULL;
            if (other)
              keep_unknown (json_node_get_object (element), other, FALSE);
          }
    }
}

/* What was found anew owes nothing to what the file had found. */
static void
keep_all_unknown (const AntAnalysis *analysis, JsonObject *root)
{
  if (!analysis->read)
    return;
  g_autoptr (JsonNode) results = json_object_dup_member (root, "results");
  gboolean same = analysis->results && analysis->results == analysis->results_read;
  if (!same)
    json_object_set_null_member (root, "results");
  keep_unknown (root, analysis->read, FALSE);
  if (!same)
    json_object_set_member (root, "results", g_steal_pointer (&results));
}

char *
ant_analysis_to_text (const AntAnalysis *analysis, const char *path)
{
  JsonObject *root = json_object_new ();
  json_object_set_int_member (root, VERSION_KEY, ANT_ANALYSIS_VERSION);
  json_object_set_string_member (root, "program", "Antumbra " ANT_VERSION);
  json_object_set_object_member (root, "record", put_record (analysis, path));
  json_object_set_object_member (root, "treatment", ant_treatment_to_json (ant_analysis_get_treatment (analysis), path));
  json_object_set_array_member (root, "judgements", ant_judgements_to_json (ant_analysis_get_judgements (analysis)));
  json_object_set_array_member (root, "history", put_history (analysis->history));
  put_results (root, analysis, path);
  keep_all_unknown (analysis, root);
  g_autoptr (JsonNode) node = json_node_init_object (json_node_alloc (), root);
  g_autoptr (JsonGenerator) generator = json_generator_new ();
  json_generator_set_root (generator, node);
  json_generator_set_pretty (generator, TRUE);
  json_generator_set_indent (generator, 1);
  json_object_unref (root);
  gsize length;
  g_autofree char *text = json_generator_to_data (generator, &length);
  return g_strconcat (text, "\n", NULL);
}

static gboolean
get_version (JsonObject *root, gint64 *version, GError **error)
{
  JsonNode *node = json_object_get_member (root, VERSION_KEY);
  gboolean whole = node && JSON_NODE_HOLDS_VALUE (node) && json_node_get_value_type (node) == G_TYPE_INT64;
  *version = whole ? json_node_get_int (node) : 0;
  return *version >= 1 || ant_json_refuse (error, VERSION_KEY, node, _("the version of an analysis file, 1 or more"));
}

static gboolean
fill (AntAnalysis *analysis, JsonObject *root, const char *path, GError **error)
{
  JsonObject *record = ant_json_get_object (root, "record", error);
  JsonObject *treated = record ? ant_json_get_object (root, "treatment", error) : NULL;
  if (!treated)
    return FALSE;
  if (!get_record (record, analysis, path, error))
    return ant_json_within (error, "record", -1);
  g_autoptr (AntTreatment) treatment = ant_treatment_from_json (treated, path, error);
  if (!treatment)
    return ant_json_within (error, "treatment", -1);
  g_autoptr (AntJudgements) judgements = ant_judgements_from_json (root, error);
  GPtrArray *history = judgements ? get_history (root, error) : NULL;
  if (!history)
    return FALSE;
  ant_analysis_fill (analysis, g_steal_pointer (&treatment), g_steal_pointer (&judgements), history);
  return get_results (root, analysis, path, error);
}

AntAnalysis *
ant_analysis_parse (const char *path, const char *text, gsize length, char **newer, GError **error)
{
  g_autoptr (AntAnalysis) analysis = ant_analysis_new ();
  g_autofree char *shown = g_filename_display_name (path);
  g_autoptr (GError) problem = NULL;
  gint64 version;
  *newer = NULL;
  analysis->read = ant_bounded_json_parse (text, length, &problem);
  if (!analysis->read || !get_version (analysis->read, &version, &problem) || !fill (analysis, analysis->read, path, &problem))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, "%s: %s", shown, problem->message);
      return NULL;
    }
  if (version > ANT_ANALYSIS_VERSION)
    *newer = g_strdup_printf (_("%s was written by a newer Antumbra (version %d of the file, this program knows %d): it is opened for reading, and stays as it is"),
                              shown, (int) MIN (version, G_MAXINT), ANT_ANALYSIS_VERSION);
  else
    ant_analysis_set_path (analysis, path);
  return g_steal_pointer (&analysis);
}

AntAnalysis *
ant_analysis_load (const char *path, char **newer, GError **error)
{
  g_autofree char *whole = g_canonicalize_filename (path, NULL), *shown = g_filename_display_name (path);
  g_autoptr (GFile) file = g_file_new_for_path (path);
  g_autoptr (GError) problem = NULL;
  g_autoptr (GFileInputStream) stream = g_file_read (file, NULL, &problem);
  g_autoptr (GByteArray) bytes = g_byte_array_new ();
  guint8 block[1 << 14];
  gsize n = sizeof block;
  *newer = NULL;
  while (stream && !problem && n == sizeof block && bytes->len <= ANT_LONGEST_JSON
         && g_input_stream_read_all (G_INPUT_STREAM (stream), block, sizeof block, &n, NULL, &problem))
    g_byte_array_append (bytes, block, (guint) n);
  if (problem)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: cannot be read: %s"), shown, problem->message);
      return NULL;
    }
  return ant_analysis_parse (whole, (const char *) bytes->data, bytes->len, newer, error);
}
