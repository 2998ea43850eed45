/* treatment-text.c - treatment and judgements to JSON and back. */
#include "data/treatment-text.h"

#include <glib/gi18n.h>
#include <math.h>

#include "data/error.h"
#include "data/json-fields.h"
#include "data/kept-path.h"

#define MOST_ENTRIES 100000
#define MOST_FILLS 1000
#define LONGEST_RECORD_D 1e7

static const char *const kind_words[] = { "hand", "excluded", NULL };
static const AntJsonField mask_fields[] = {
  { "start_d", ANT_JSON_REAL, G_STRUCT_OFFSET (AntMask, span.start_d), NULL, FALSE },
  { "end_d", ANT_JSON_REAL, G_STRUCT_OFFSET (AntMask, span.end_d), NULL, FALSE },
  ANT_JSON_WORD_OF (AntMask, kind, kind_words),
};

/* A time within reach of any record, or where that is allowed none. */
static gboolean
get_time (JsonObject *object, const char *name, gboolean may_miss, double *time_d, GError **error)
{
  if (!ant_json_get_real (object, name, time_d, error))
    return FALSE;
  if (fabs (*time_d) < LONGEST_RECORD_D || (may_miss && isnan (*time_d)))
    return TRUE;
  return ant_json_refuse (error, name, json_object_get_member (object, name), _("days from the record's origin"));
}

/* The shortest text that gives the very same setting. */
static char *
exact_text (const AntSetting *setting, const AntSettings *settings)
{
  double value = ant_setting_get (setting, settings);
  g_autofree char *usual = ant_setting_format (setting, value);
  AntSettings back = *settings;
  for (int digits = 12; setting->kind != ANT_SETTING_WORD && digits <= 17; digits++)
    {
      char format[16], text[G_ASCII_DTOSTR_BUF_SIZE];
      g_snprintf (format, sizeof format, "%%.%dg", digits);
      g_ascii_formatd (text, sizeof text, format, value);
      if (ant_setting_set_text (setting, &back, text, NULL) && ant_setting_get (setting, &back) == value)
        return g_strdup (text);
    }
  return g_steal_pointer (&usual);
}

static JsonObject *
put_reading (const AntReadingChoices *reading)
{
  JsonObject *object = json_object_new ();
  const GArray *fills = reading->fill_values;
  AntReadingChoices words = *reading; /* a shallow copy to look at */
  for (gsize i = 0; i < ant_n_reading_words; i++)
    ant_json_put_text (object, ant_reading_word_table[i].name,
                       *ant_reading_choices_word (&words, &ant_reading_word_table[i]));
  if (fills)
    json_object_set_array_member (object, "fill_values", ant_json_put_reals (fills->len, (const double *) (gpointer) fills->data));
  else
    json_object_set_null_member (object, "fill_values");
  return object;
}

static gboolean
get_fills (JsonObject *object, AntReadingChoices *reading, GError **error)
{
  JsonNode *node = json_object_get_member (object, "fill_values");
  if (!node || JSON_NODE_HOLDS_NULL (node))
    return TRUE;
  JsonArray *array = ant_json_get_array (object, "fill_values", MOST_FILLS, error);
  if (!array)
    return FALSE;
  guint n = json_array_get_length (array);
  reading->fill_values = g_array_new (FALSE, TRUE, sizeof (double));
  g_array_set_size (reading->fill_values, n);
  return ant_json_get_reals (object, "fill_values", n, (double *) (gpointer) reading->fill_values->data, error);
}

static gboolean
get_reading (JsonObject *object, AntReadingChoices *reading, GError **error)
{
  for (gsize i = 0; i < ant_n_reading_words; i++)
    if (!ant_json_get_text (object, ant_reading_word_table[i].name, ant_reading_choices_word (reading, &ant_reading_word_table[i]), error))
      return FALSE;
  return get_fills (object, reading, error);
}

static gboolean
get_good (JsonObject *object, AntTreatment *treatment, GError **error)
{
  AntGridOptions grid = ANT_GRID_OPTIONS_INIT;
  if (!ant_json_get_text (object, "good", &treatment->good, error))
    return FALSE;
  gboolean good = !treatment->good || ant_grid_options_parse_good (&grid, "good", treatment->good, error);
  ant_grid_options_clear (&grid);
  return good;
}

static JsonObject *
put_settings (const AntSettings *settings)
{
  JsonObject *object = json_object_new ();
  AntSettings usual;
  ant_settings_init (&usual);
  for (gsize i = 0; i < ant_n_settings; i++)
    {
      const AntSetting *setting = &ant_setting_table[i];
      if (ant_setting_get (setting, settings) == ant_setting_get (setting, &usual))
        continue;
      g_autofree char *text = exact_text (setting, settings);
      json_object_set_string_member (object, setting->key, text);
    }
  return object;
}

gboolean
ant_treatment_knows_setting (const char *key)
{
  return ant_setting_find (key) != NULL;
}

static gboolean
get_settings (JsonObject *object, AntSettings *settings, GError **error)
{
  for (gsize i = 0; i < ant_n_settings; i++)
    {
      const AntSetting *setting = &ant_setting_table[i];
      g_autofree char *text = NULL;
      if (!ant_json_get_text (object, setting->key, &text, error)
          || (text && !ant_setting_set_text (setting, settings, text, error)))
        return FALSE;
    }
  return TRUE;
}

static JsonArray *
put_masks (const GPtrArray *masks)
{
  JsonArray *array = json_array_new ();
  for (guint i = 0; i < masks->len; i++)
    {
      const AntMask *mask = g_ptr_array_index (masks, i);
      JsonObject *object = json_object_new ();
      ant_json_put_fields (object, G_N_ELEMENTS (mask_fields), mask_fields, mask);
      ant_json_put_text (object, "reason", mask->reason);
      json_array_add_object_element (array, object);
    }
  return array;
}

static gboolean
get_mask (JsonObject *object, AntTreatment *treatment, GError **error)
{
  AntMask mask = { 0 };
  g_autofree char *reason = NULL;
  if (!ant_json_get_fields (object, G_N_ELEMENTS (mask_fields), mask_fields, &mask, error)
      || !get_time (object, "start_d", FALSE, &mask.span.start_d, error)
      || !get_time (object, "end_d", FALSE, &mask.span.end_d, error)
      || !ant_json_get_text (object, "reason", &reason, error))
    return FALSE;
  if (mask.span.end_d < mask.span.start_d)
    return ant_json_refuse (error, "end_d", json_object_get_member (object, "end_d"),
                            _("an end after the start"));
  ant_treatment_mask (treatment, mask.span, mask.kind, reason ? reason : "");
  return TRUE;
}

static gboolean
get_masks (JsonObject *parent, AntTreatment *treatment, GError **error)
{
  JsonArray *array = ant_json_get_array (parent, "masks", MOST_ENTRIES, error);
  for (guint i = 0; array && i < json_array_get_length (array); i++)
    {
      JsonObject *object = ant_json_element (array, i, error);
      if (!object || !get_mask (object, treatment, error))
        return ant_json_within (error, "masks", i);
    }
  return array != NULL;
}

static JsonArray *
put_witnesses (const GPtrArray *witnesses, const char *folder)
{
  JsonArray *array = json_array_new ();
  for (guint i = 0; i < witnesses->len; i++)
    {
      const AntWitness *witness = g_ptr_array_index (witnesses, i);
      JsonObject *object = json_object_new ();
      g_autofree char *path = ant_kept_path (folder, witness->path);
      ant_json_put_text (object, "path", path);
      ant_json_put_text (object, "sha256", witness->sha256);
      json_object_set_object_member (object, "reading", put_reading (&witness->reading));
      json_array_add_object_element (array, object);
    }
  return array;
}

static gboolean
get_witness (JsonObject *object, AntWitness *witness, const char *folder, GError **error)
{
  g_autofree char *text = NULL;
  if (!ant_json_get_text (object, "path", &text, error) || !ant_json_get_text (object, "sha256", &witness->sha256, error))
    return FALSE;
  witness->path = ant_kept_path_resolve (folder, text);
  if (!witness->path || !g_path_is_absolute (witness->path))
    return ant_json_refuse (error, "path", json_object_get_member (object, "path"), _("a file"));
  JsonObject *reading = ant_json_get_object (object, "reading", error);
  if (!reading)
    return FALSE;
  return get_reading (reading, &witness->reading, error) || ant_json_within (error, "reading", -1);
}

/* Files of before there were witnesses lack them. */
static gboolean
get_witnesses (JsonObject *parent, AntTreatment *treatment, const char *folder, GError **error)
{
  if (!json_object_has_member (parent, "witnesses"))
    return TRUE;
  JsonArray *array = ant_json_get_array (parent, "witnesses", ANT_MOST_WITNESSES, error);
  for (guint i = 0; array && i < json_array_get_length (array); i++)
    {
      AntWitness *witness = g_new0 (AntWitness, 1);
      g_ptr_array_add (treatment->witnesses, witness);
      JsonObject *object = ant_json_element (array, i, error);
      if (!object || !get_witness (object, witness, folder, error))
        return ant_json_within (error, "witnesses", i);
    }
  return array != NULL;
}

JsonObject *
ant_treatment_to_json (const AntTreatment *treatment, const char *path)
{
  JsonObject *object = json_object_new (), *reading = put_reading (&treatment->reading);
  g_autofree char *folder = g_path_get_dirname (path);
  ant_json_put_text (reading, "good", treatment->good);
  json_object_set_object_member (object, "reading", reading);
  json_object_set_object_member (object, "settings", put_settings (&treatment->settings));
  ant_json_put_text (object, "observer", treatment->observer);
  ant_json_put_real (object, "from_d", treatment->from_d);
  ant_json_put_real (object, "to_d", treatment->to_d);
  json_object_set_array_member (object, "masks", put_masks (treatment->masks));
  json_object_set_array_member (object, "witnesses", put_witnesses (treatment->witnesses, folder));
  return object;
}

AntTreatment *
ant_treatment_from_json (JsonObject *object, const char *path, GError **error)
{
  g_autoptr (AntTreatment) treatment = ant_treatment_new ();
  g_autofree char *folder = g_path_get_dirname (path);
  JsonObject *reading = ant_json_get_object (object, "reading", error);
  JsonObject *settings = reading ? ant_json_get_object (object, "settings", error) : NULL;
  if (!settings)
    return NULL;
  if (!get_reading (reading, &treatment->reading, error) || !get_good (reading, treatment, error))
    return ant_json_within (error, "reading", -1), NULL;
  if (!get_settings (settings, &treatment->settings, error))
    return ant_json_within (error, "settings", -1), NULL;
  return ant_json_get_text (object, "observer", &treatment->observer, error)
                 && get_time (object, "from_d", TRUE, &treatment->from_d, error)
                 && get_time (object, "to_d", TRUE, &treatment->to_d, error) && get_masks (object, treatment, error)
                 && get_witnesses (object, treatment, folder, error)
             ? g_steal_pointer (&treatment)
             : NULL;
}

JsonArray *
ant_judgements_to_json (const AntJudgements *judgements)
{
  JsonArray *array = json_array_new ();
  for (gsize i = 0; i < ant_judgements_count (judgements); i++)
    {
      AntJudgement one = ant_judgements_get (judgements, i);
      JsonObject *object = json_object_new ();
      ant_json_put_real (object, "mid_d", one.mid_d);
      ant_json_put_real (object, "duration_d", one.duration_d);
      ant_json_put_text (object, "class", ant_dip_class_name (one.class));
      ant_json_put_text (object, "note", one.note);
      json_array_add_object_element (array, object);
    }
  return array;
}

static gboolean
get_judgement (JsonObject *object, AntJudgements *judgements, GError **error)
{
  double mid_d, duration_d;
  g_autofree char *name = NULL, *note = NULL;
  AntDipClass class = ANT_CLASS_UNDECIDED;
  if (!get_time (object, "mid_d", FALSE, &mid_d, error) || !get_time (object, "duration_d", FALSE, &duration_d, error)
      || !ant_json_get_text (object, "class", &name, error) || !ant_json_get_text (object, "note", &note, error))
    return FALSE;
  if (!(duration_d > 0))
    return ant_json_refuse (error, "duration_d", json_object_get_member (object, "duration_d"), _("more than 0"));
  if (!name || !ant_dip_class_parse (name, &class))
    return ant_json_refuse (error, "class", json_object_get_member (object, "class"), _("a class of dips"));
  ant_judgements_add (judgements, &(AntJudgement) { mid_d, duration_d, class, note ? note : "" });
  return TRUE;
}

AntJudgements *
ant_judgements_from_json (JsonObject *parent, GError **error)
{
  g_autoptr (AntJudgements) judgements = ant_judgements_new ();
  JsonArray *array = ant_json_get_array (parent, "judgements", MOST_ENTRIES, error);
  for (guint i = 0; array && i < json_array_get_length (array); i++)
    {
      JsonObject *object = ant_json_element (array, i, error);
      if (!object || !get_judgement (object, judgements, error))
        return ant_json_within (error, "judgements", i), NULL;
    }
  return array ? g_steal_pointer (&judgements) : NULL;
}
