/* verdict-text.h - verdicts as JSON and back, for the analysis file. Inside the data room only. */
#pragma once

#include <json-glib/json-glib.h>
#include "verdict/verdict.h"

JsonArray *ant_verdicts_to_json (gsize n, const AntVerdict *verdict);
/* The array `name` of n verdicts, to be freed; NULL if there is none by that name, which is no error. */
gboolean ant_verdicts_from_json (JsonObject *object, const char *name, gsize n, AntVerdict **verdict, GError **error);
