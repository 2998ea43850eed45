/* bounded-json.h - JSON of anybody's making, parsed without risk: length, depth and number of values are bounded, and
 * what the parser cannot survive is refused before it. Inside the data room only. */
#pragma once

#include <json-glib/json-glib.h>

#define ANT_LONGEST_JSON (64 << 20)    /* bytes */
#define ANT_DEEPEST_JSON 32            /* brackets within brackets */
#define ANT_MOST_JSON_VALUES (4 << 20) /* each takes some 100 bytes of memory */

/* The object that the text is; caller unrefs. NULL with an error that names the line, what was found and expected. */
JsonObject *ant_bounded_json_parse (const char *text, gsize length, GError **error);
