/* json-values.c - named members of a JSON object. */
#include "cli/json-values.h"

#include <math.h>

void
ant_json_text (JsonBuilder *json, const char *name, const char *text)
{
  json_builder_set_member_name (json, name);
  if (text && *text)
    json_builder_add_string_value (json, text);
  else
    json_builder_add_null_value (json);
}

void
ant_json_number (JsonBuilder *json, const char *name, double number)
{
  json_builder_set_member_name (json, name);
  if (isfinite (number))
    json_builder_add_double_value (json, number);
  else
    json_builder_add_null_value (json);
}

void
ant_json_count (JsonBuilder *json, const char *name, gsize n)
{
  json_builder_add_int_value (json_builder_set_member_name (json, name), (gint64) n);
}

void
ant_json_truth (JsonBuilder *json, const char *name, gboolean truth)
{
  json_builder_add_boolean_value (json_builder_set_member_name (json, name), truth);
}

void
ant_json_print (JsonBuilder *json)
{
  g_autoptr (JsonNode) root = json_builder_get_root (json);
  g_autofree char *text = json_to_string (root, TRUE);
  g_print ("%s\n", text);
}
