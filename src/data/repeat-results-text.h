/* repeat-results-text.h - what a search for repeats gave, as a part of an analysis file. Inside the data room only. */
#pragma once

#include <json-glib/json-glib.h>
#include "data/repeat-results.h"

/* Add a member "repeats". */
void ant_repeat_results_put (JsonObject *object, const AntRepeatResults *results);
/* Read it back; a file without it was written before there were repeats: none were searched. FALSE with one sentence. */
gboolean ant_repeat_results_get (JsonObject *object, AntRepeatResults *results, GError **error);
