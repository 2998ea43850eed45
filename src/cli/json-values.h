/* json-values.h - named members of a JSON object as the verbs print them: nothing known is null. */
#pragma once

#include <json-glib/json-glib.h>

void ant_json_text (JsonBuilder *json, const char *name, const char *text); /* NULL and "" are null */
void ant_json_number (JsonBuilder *json, const char *name, double number);  /* NaN and infinities are null */
void ant_json_count (JsonBuilder *json, const char *name, gsize n);
void ant_json_truth (JsonBuilder *json, const char *name, gboolean truth);
/* Print what was built, indented, and end the line. */
void ant_json_print (JsonBuilder *json);
