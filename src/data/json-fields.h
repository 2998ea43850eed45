/* json-fields.h - structs as JSON objects by a table of their members, and typed reading that says what is wrong.
 * Inside the data room only.
 *
 * Errors are ANT_ERROR_READ, "name: found …, expected …"; callers put the names around it before (ant_json_within), so
 * that a sentence in the end names the whole way: "results.dips[3].snr: found a string, expected a number". */
#pragma once

#include <json-glib/json-glib.h>

typedef enum
{
  ANT_JSON_REAL,  /* double; NaN and the infinities are null */
  ANT_JSON_COUNT, /* gsize, 0 to 2^53 */
  ANT_JSON_WORD,  /* an enum (int) by its name in `words` */
} AntJsonKind;

typedef struct
{
  const char *name;
  AntJsonKind kind;
  gsize offset;
  const char *const *words; /* NULL-ended, by value */
  gboolean may_miss;        /* a file written before the member came to be: it is left as it is */
} AntJsonField;

/* Rows of a table of a struct. */
#define ANT_JSON_REAL_OF(type, member) { #member, ANT_JSON_REAL, G_STRUCT_OFFSET (type, member), NULL, FALSE }
#define ANT_JSON_COUNT_OF(type, member) { #member, ANT_JSON_COUNT, G_STRUCT_OFFSET (type, member), NULL, FALSE }
#define ANT_JSON_WORD_OF(type, member, words) { #member, ANT_JSON_WORD, G_STRUCT_OFFSET (type, member), words, FALSE }

void ant_json_put_fields (JsonObject *object, gsize n, const AntJsonField *field, gconstpointer record);
gboolean ant_json_get_fields (JsonObject *object, gsize n, const AntJsonField *field, gpointer record, GError **error);

/* An array of such structs, `size` bytes each. NULL with an error; else *n_records of them, to be freed. */
JsonArray *ant_json_put_records (gsize n, const AntJsonField *field, gsize n_records, gconstpointer records, gsize size);
gboolean ant_json_get_records (JsonObject *object, const char *name, gsize n, const AntJsonField *field, gsize size,
                               gsize most, gsize *n_records, gpointer *records, GError **error);

/* Single values. Text that is null or absent is NULL. */
void ant_json_put_real (JsonObject *object, const char *name, double value);
void ant_json_put_text (JsonObject *object, const char *name, const char *text);
gboolean ant_json_get_real (JsonObject *object, const char *name, double *value, GError **error);
gboolean ant_json_get_text (JsonObject *object, const char *name, char **text, GError **error);
JsonArray *ant_json_put_reals (gsize n, const double *value);
/* n of them, written to value. */
gboolean ant_json_get_reals (JsonObject *object, const char *name, gsize n, double *value, GError **error);

/* Parts: what is there by that name, borrowed; NULL with an error. */
JsonObject *ant_json_get_object (JsonObject *object, const char *name, GError **error);
JsonArray *ant_json_get_array (JsonObject *object, const char *name, gsize most, GError **error);
/* The i-th element, which must be an object. */
JsonObject *ant_json_element (JsonArray *array, guint i, GError **error);

/* Put a name, and the place in its array unless i is negative, before what an inner part said. Returns FALSE. */
gboolean ant_json_within (GError **error, const char *name, gint64 i);
/* "name: found …, expected …"; node NULL: nothing was there. Returns FALSE. */
gboolean ant_json_refuse (GError **error, const char *name, JsonNode *node, const char *expected);
