/* bounded-json.c - look a text over before the parser sees it. */
#include "data/bounded-json.h"

#include <glib/gi18n.h>
#include <string.h>

#include "data/error.h"

/* A walk through the text; strings are passed over whole. */
typedef struct
{
  const char *at, *end;
  guint line, depth, values;
} Walk;

static gboolean
refuse (const Walk *walk, GError **error, const char *found)
{
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("line %u: found %s, expected an analysis in JSON"), walk->line, found);
  return FALSE;
}

/* The four hexadecimal digits of \u; -1 if they are not there. */
static int
unit_at (const char *at, const char *end)
{
  int unit = 0;
  if (end - at < 4)
    return -1;
  for (int i = 0; i < 4; i++)
    {
      if (!g_ascii_isxdigit (at[i]))
        return -1;
      unit = unit * 16 + g_ascii_xdigit_value (at[i]);
    }
  return unit;
}

/* An escape that begins at the backslash. The parser aborts at halves of pairs that stand alone. */
static gboolean
pass_escape (Walk *walk, GError **error)
{
  walk->at++;
  if (walk->at == walk->end)
    return refuse (walk, error, _("a text without an end"));
  if (*walk->at != 'u')
    {
      if (!strchr ("\"\\/bfnrt", *walk->at) || *walk->at == 0)
        return refuse (walk, error, _("an unknown escape in a text"));
      walk->at++;
      return TRUE;
    }
  int unit = unit_at (walk->at + 1, walk->end);
  walk->at += 5;
  if (unit <= 0)
    return refuse (walk, error, _("an escape \\u that is no character"));
  if (unit < 0xd800 || unit > 0xdfff)
    return TRUE;
  int second = walk->end - walk->at >= 2 && walk->at[0] == '\\' && walk->at[1] == 'u' ? unit_at (walk->at + 2, walk->end) : -1;
  if (unit > 0xdbff || second < 0xdc00 || second > 0xdfff)
    return refuse (walk, error, _("half of a pair of escapes \\u"));
  walk->at += 6;
  return TRUE;
}

static gboolean
pass_string (Walk *walk, GError **error)
{
  walk->at++;
  while (walk->at < walk->end && *walk->at != '"')
    {
      if ((guchar) *walk->at < 0x20)
        return refuse (walk, error, _("a control character in a text"));
      if (*walk->at != '\\')
        walk->at++;
      else if (!pass_escape (walk, error))
        return FALSE;
    }
  if (walk->at == walk->end)
    return refuse (walk, error, _("a text without an end"));
  walk->at++;
  return TRUE;
}

/* Everything outside strings is of a few characters: no comments, no other quotes, no words but three. */
static gboolean
pass_one (Walk *walk, GError **error)
{
  switch (*walk->at)
    {
    case '"':
      return pass_string (walk, error);
    case '{':
    case '[':
      if (++walk->depth > ANT_DEEPEST_JSON)
        return refuse (walk, error, _("brackets nested too deeply"));
      walk->values++;
      break;
    case '}':
    case ']':
      if (walk->depth-- == 0)
        return refuse (walk, error, _("a bracket that closes nothing"));
      break;
    case ',':
      walk->values++;
      break;
    case '\n':
      walk->line++;
      break;
    default:
      if (!g_ascii_isalnum (*walk->at) && !strchr (" \t\r:+-.", *walk->at))
        return refuse (walk, error, _("a character that has no place there"));
    }
  walk->at++;
  return TRUE;
}

static gboolean
look_over (const char *text, gsize length, GError **error)
{
  Walk walk = { text, text + length, 1, 0, 0 };
  if (length > ANT_LONGEST_JSON)
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("found more than %d MB, expected an analysis"), ANT_LONGEST_JSON >> 20);
      return FALSE;
    }
  if (memchr (text, 0, length) || !g_utf8_validate_len (text, length, NULL))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("found bytes that are no text (UTF-8), expected an analysis in JSON"));
      return FALSE;
    }
  while (walk.at < walk.end)
    {
      if (!pass_one (&walk, error))
        return FALSE;
      if (walk.values > ANT_MOST_JSON_VALUES)
        return refuse (&walk, error, _("too many values"));
    }
  return walk.depth == 0 || refuse (&walk, error, _("the end of the text within brackets"));
}

JsonObject *
ant_bounded_json_parse (const char *text, gsize length, GError **error)
{
  if (!look_over (text, length, error))
    return NULL;
  g_autoptr (JsonParser) parser = json_parser_new_immutable ();
  g_autoptr (GError) problem = NULL;
  if (!json_parser_load_from_data (parser, text, (gssize) length, &problem))
    {
      g_autofree char *sentence = g_strdelimit (g_strdup (problem->message), "\r\n", ' ');
      const char *start = g_str_has_prefix (sentence, "<data>:") ? sentence + strlen ("<data>:") : sentence;
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("line %s; expected an analysis in JSON"), start);
      return NULL;
    }
  JsonNode *root = json_parser_get_root (parser);
  if (!root || !JSON_NODE_HOLDS_OBJECT (root))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("found no object, expected an analysis in JSON"));
      return NULL;
    }
  return json_object_ref (json_node_get_object (root));
}
