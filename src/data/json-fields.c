/* json-fields.c - structs to JSON and back. */
#include "data/json-fields.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "data/error.h"

#define LARGEST_COUNT (G_GINT64_CONSTANT (1) << 53)

static const char *
kind_of (JsonNode *node)
{
  if (!node)
    return _("nothing");
  if (JSON_NODE_HOLDS_OBJECT (node))
    return _("an object");
  if (JSON_NODE_HOLDS_ARRAY (node))
    return _("an array");
  if (JSON_NODE_HOLDS_NULL (node))
    return _("null");
  GType type = json_node_get_value_type (node);
  return type == G_TYPE_STRING ? _("a text") : type == G_TYPE_BOOLEAN ? _("true or false") : _("a number");
}

static char *
words_for (JsonNode *node)
{
  if (node && JSON_NODE_HOLDS_VALUE (node))
    {
      if (json_node_get_value_type (node) == G_TYPE_STRING)
        {
          g_autofree char *start = g_utf8_substring (json_node_get_string (node), 0,
                                                     MIN (g_utf8_strlen (json_node_get_string (node), -1), 40));
          g_autofree char *escaped = g_strescape (start, NULL);
          return g_strdup_printf ("“%s”", g_str_is_ascii (start) ? escaped : kind_of (node));
        }
      if (json_node_get_value_type (node) == G_TYPE_INT64)
        return g_strdup_printf ("%" G_GINT64_FORMAT, json_node_get_int (node));
      if (json_node_get_value_type (node) == G_TYPE_DOUBLE)
        return g_strdup_printf ("%g", json_node_get_double (node));
    }
  return g_strdup (kind_of (node));
}

gboolean
ant_json_refuse (GError **error, const char *name, JsonNode *node, const char *expected)
{
  g_autofree char *found = words_for (node);
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: found %s, expected %s"), name, found, expected);
  return FALSE;
}

gboolean
ant_json_within (GError **error, const char *name, gint64 i)
{
  if (i < 0)
    g_prefix_error (error, "%s.", name);
  else
    g_prefix_error (error, "%s[%" G_GINT64_FORMAT "].", name, i);
  return FALSE;
}

void
ant_json_put_real (JsonObject *object, const char *name, double value)
{
  if (isfinite (value))
    json_object_set_double_member (object, name, value);
  else
    json_object_set_null_member (object, name);
}

void
ant_json_put_text (JsonObject *object, const char *name, const char *text)
{
  if (text)
    json_object_set_string_member (object, name, text);
  else
    json_object_set_null_member (object, name);
}

static gboolean
read_real (JsonNode *node, double *value)
{
  if (node && JSON_NODE_HOLDS_NULL (node))
    *value = NAN;
  else if (node && JSON_NODE_HOLDS_VALUE (node) && json_node_get_value_type (node) == G_TYPE_DOUBLE)
    *value = json_node_get_double (node);
  else if (node && JSON_NODE_HOLDS_VALUE (node) && json_node_get_value_type (node) == G_TYPE_INT64)
    *value = (double) json_node_get_int (node);
  else
    return FALSE;
  return !isinf (*value);
}

gboolean
ant_json_get_real (JsonObject *object, const char *name, double *value, GError **error)
{
  JsonNode *node = json_object_get_member (object, name);
  return read_real (node, value) || ant_json_refuse (error, name, node, _("a number or null"));
}

gboolean
ant_json_get_text (JsonObject *object, const char *name, char **text, GError **error)
{
  JsonNode *node = json_object_get_member (object, name);
  *text = NULL;
  if (!node || JSON_NODE_HOLDS_NULL (node))
    return TRUE;
  if (!JSON_NODE_HOLDS_VALUE (node) || json_node_get_value_type (node) != G_TYPE_STRING)
    return ant_json_refuse (error, name, node, _("a text"));
  *text = json_node_dup_string (node);
  return TRUE;
}

static gboolean
read_count (JsonNode *node, gsize *count)
{
  if (!node || !JSON_NODE_HOLDS_VALUE (node) || json_node_get_value_type (node) != G_TYPE_INT64)
    return FALSE;
  gint64 value = json_node_get_int (node);
  *count = (gsize) value;
  return value >= 0 && value <= LARGEST_COUNT;
}

static gboolean
read_word (JsonNode *node, const char *const *words, int *word)
{
  if (!node || !JSON_NODE_HOLDS_VALUE (node) || json_node_get_value_type (node) != G_TYPE_STRING)
    return FALSE;
  for (int i = 0; words[i]; i++)
    if (g_str_equal (words[i], json_node_get_string (node)))
      return *word = i, TRUE;
  return FALSE;
}

static gboolean
refuse_word (GError **error, const AntJsonField *field, JsonNode *node)
{
  g_autoptr (GString) words = g_string_new (field->words[0]);
  for (gsize i = 1; field->words[i]; i++)
    g_string_append_printf (words, ", %s", field->words[i]);
  return ant_json_refuse (error, field->name, node, words->str);
}

void
ant_json_put_fields (JsonObject *object, gsize n, const AntJsonField *field, gconstpointer record)
{
  for (gsize i = 0; i < n; i++)
    {
      gconstpointer place = (const char *) record + field[i].offset;
      switch (field[i].kind)
        {
        case ANT_JSON_COUNT:
          json_object_set_int_member (object, field[i].name, (gint64) *(const gsize *) place);
          break;
        case ANT_JSON_WORD:
          json_object_set_string_member (object, field[i].name, field[i].words[*(const int *) place]);
          break;
        case ANT_JSON_REAL:
        default:
          ant_json_put_real (object, field[i].name, *(const double *) place);
        }
    }
}

gboolean
ant_json_get_fields (JsonObject *object, gsize n, const AntJsonField *field, gpointer record, GError **error)
{
  for (gsize i = 0; i < n; i++)
    {
      JsonNode *node = json_object_get_member (object, field[i].name);
      gpointer place = (char *) record + field[i].offset;
      if (!node && field[i].may_miss)
        continue;
      if (field[i].kind == ANT_JSON_REAL && !read_real (node, place))
        return ant_json_refuse (error, field[i].name, node, _("a number or null"));
      if (field[i].kind == ANT_JSON_COUNT && !read_count (node, place))
        return ant_json_refuse (error, field[i].name, node, _("a whole number, 0 or more"));
      if (field[i].kind == ANT_JSON_WORD && !read_word (node, field[i].words, place))
        return refuse_word (error, &field[i], node);
    }
  return TRUE;
}

JsonArray *
ant_json_put_records (gsize n, const AntJsonField *field, gsize n_records, gconstpointer records, gsize size)
{
  JsonArray *array = json_array_sized_new ((guint) n_records);
  for (gsize i = 0; i < n_records; i++)
    {
      JsonObject *object = json_object_new ();
      ant_json_put_fields (object, n, field, (const char *) records + i * size);
      json_array_add_object_element (array, object);
    }
  return array;
}

gboolean
ant_json_get_records (JsonObject *object, const char *name, gsize n, const AntJsonField *field, gsize size, gsize most,
                      gsize *n_records, gpointer *records, GError **error)
{
  JsonArray *array = ant_json_get_array (object, name, most, error);
  if (!array)
    return FALSE;
  gsize count = json_array_get_length (array);
  g_autofree char *read = g_malloc0 (MAX (count, 1) * size);
  for (gsize i = 0; i < count; i++)
    {
      JsonObject *element = ant_json_element (array, (guint) i, error);
      if (!element || !ant_json_get_fields (element, n, field, read + i * size, error))
        return ant_json_within (error, name, (gint64) i);
    }
  *n_records = count;
  *records = g_steal_pointer (&read);
  return TRUE;
}

JsonArray *
ant_json_put_reals (gsize n, const double *value)
{
  JsonArray *array = json_array_sized_new ((guint) n);
  for (gsize i = 0; i < n; i++)
    if (isfinite (value[i]))
      json_array_add_double_element (array, value[i]);
    else
      json_array_add_null_element (array);
  return array;
}

gboolean
ant_json_get_reals (JsonObject *object, const char *name, gsize n, double *value, GError **error)
{
  JsonNode *whole = json_object_get_member (object, name);
  g_autofree char *expected = g_strdup_printf (_("an array of %zu numbers"), n);
  if (!whole || !JSON_NODE_HOLDS_ARRAY (whole) || json_array_get_length (json_node_get_array (whole)) != n)
    return ant_json_refuse (error, name, whole, expected);
  JsonArray *array = json_node_get_array (whole);
  for (gsize i = 0; i < n; i++)
    if (!read_real (json_array_get_element (array, (guint) i), &value[i]))
      return ant_json_refuse (error, name, json_array_get_element (array, (guint) i), expected);
  return TRUE;
}

JsonObject *
ant_json_get_object (JsonObject *object, const char *name, GError **error)
{
  JsonNode *node = json_object_get_member (object, name);
  if (node && JSON_NODE_HOLDS_OBJECT (node))
    return json_node_get_object (node);
  ant_json_refuse (error, name, node, _("an object"));
  return NULL;
}

JsonArray *
ant_json_get_array (JsonObject *object, const char *name, gsize most, GError **error)
{
  JsonNode *node = json_object_get_member (object, name);
  if (node && JSON_NODE_HOLDS_ARRAY (node) && json_array_get_length (json_node_get_array (node)) <= most)
    return json_node_get_array (node);
  g_autofree char *expected = g_strdup_printf (_("an array of at most %zu"), most);
  ant_json_refuse (error, name, node, expected);
  return NULL;
}

JsonObject *
ant_json_element (JsonArray *array, guint i, GError **error)
{
  JsonNode *node = json_array_get_element (array, i);
  if (JSON_NODE_HOLDS_OBJECT (node))
    return json_node_get_object (node);
  ant_json_refuse (error, _("element"), node, _("an object"));
  return NULL;
}
