/* recipe.c - a recipe's key file, read with every group and key checked, and written again. */
#include "data/recipe.h"

#include <errno.h>
#include <glib/gi18n.h>
#include <glib/gstdio.h>
#include <math.h>
#include <string.h>

#include "core/units.h"
#include "data/error.h"
#include "data/near-word.h"

#define MIDNIGHT_2000_JD 2451544.5
#define MOST_BYTES 1000000

static void
item_free (gpointer data)
{
  AntRecipeItem *item = data;
  g_free (item->name);
  g_free (item);
}

void
ant_recipe_free (AntRecipe *recipe)
{
  GArray **arrays[] = { &recipe->gaps,   &recipe->groups, &recipe->planets, &recipe->steps,
                        &recipe->flares, &recipe->swings, &recipe->spikes };
  GPtrArray **names[] = { &recipe->group_names, &recipe->planet_names, &recipe->step_names,
                          &recipe->flare_names, &recipe->swing_names,  &recipe->spike_names };
  for (gsize i = 0; i < G_N_ELEMENTS (arrays); i++)
    g_clear_pointer (arrays[i], g_array_unref);
  for (gsize i = 0; i < G_N_ELEMENTS (names); i++)
    g_clear_pointer (names[i], g_ptr_array_unref);
  g_ptr_array_unref (recipe->items);
  ant_time_reference_clear (&recipe->time);
  g_free (recipe->path);
  g_free (recipe->title);
  g_free (recipe);
}

static AntRecipe *
recipe_new (const char *path)
{
  AntRecipe *recipe = g_new0 (AntRecipe, 1);
  recipe->path = g_strdup (path);
  recipe->title = g_strdup ("");
  recipe->items = g_ptr_array_new_with_free_func (item_free);
  recipe->time = (AntTimeReference) { .scale = ANT_SCALE_UTC, .style = ANT_STAMP_ISO, .origin_known = TRUE,
                                      .origin_jd1 = MIDNIGHT_2000_JD, .own_unit_d = 1 };
  return recipe;
}

static gboolean refuse (GError **error, const char *path, const char *format, ...) G_GNUC_PRINTF (3, 4);

static gboolean
refuse (GError **error, const char *path, const char *format, ...)
{
  va_list args;
  va_start (args, format);
  g_autofree char *what = g_strdup_vprintf (format, args);
  va_end (args);
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ, "%s: %s", path, what);
  return FALSE;
}

/* A key file lets a group or a key come twice and keeps the later; here that is a slip to be told. */
static gboolean
check_repeats (const char *path, const char *text, gsize length, GError **error)
{
  g_autoptr (GHashTable) seen = g_hash_table_new_full (g_str_hash, g_str_equal, g_free, NULL);
  g_autofree char *copy = g_strndup (text, length);
  g_auto (GStrv) lines = g_strsplit (copy, "\n", -1);
  g_autofree char *group = g_strdup ("");
  for (gsize i = 0; lines[i]; i++)
    {
      char *line = g_strstrip (lines[i]);
      char *end = strpbrk (line, line[0] == '[' ? "]" : "=");
      if (line[0] == '#' || !end)
        continue;
      *end = '\0';
      g_strchomp (line);
      gboolean is_group = line[0] == '[';
      if (is_group)
        {
          g_free (group);
          group = g_strdup (line + 1);
        }
      char *name = is_group ? g_strdup_printf ("[%s]", group) : g_strdup_printf ("[%s] %s", group, line);
      if (!g_hash_table_add (seen, name))
        return refuse (error, path, _("line %zu: found %s%s%s a second time, expected it once"), i + 1,
                       is_group ? "[" : "", line + is_group, is_group ? "]" : "");
    }
  return TRUE;
}

static gboolean
read_number (const AntRecipeKey *key, const char *text, double *value, char **expected)
{
  char *end;
  *value = g_ascii_strtod (text, &end);
  if (end != text && *end == '\0' && *value >= key->minimum && *value <= key->maximum
      && (key->kind == ANT_KEY_NUMBER || *value == floor (*value)))
    return TRUE;
  *expected = g_strdup_printf (key->kind == ANT_KEY_WHOLE ? _("a whole number from %.16g to %.16g")
                                                          : _("a number from %.10g to %.10g"),
                               key->minimum, key->maximum);
  return FALSE;
}

static gboolean
read_word (const char *const *words, const char *text, double *value, char **expected)
{
  for (gsize i = 0; words[i]; i++)
    if (g_str_equal (words[i], text))
      {
        *value = (double) i;
        return TRUE;
      }
  g_autofree char *list = g_strjoinv (", ", (char **) (gsize) words);
  *expected = g_strdup_printf (_("one of %s"), list);
  return FALSE;
}

static gboolean
read_value (const AntRecipe *recipe, const AntRecipeKey *key, const char *text, double *value, char **expected)
{
  static const char *const switch_words[] = { "no", "yes", NULL };
  switch (key->kind)
    {
    case ANT_KEY_NUMBER:
    case ANT_KEY_WHOLE:
      return read_number (key, text, value, expected);
    case ANT_KEY_SWITCH:
      return read_word (switch_words, text, value, expected);
    case ANT_KEY_WORD:
      return read_word (key->words, text, value, expected);
    case ANT_KEY_TIME:
      if (strchr (text, '-') && ant_time_reference_parse (&recipe->time, text, value, NULL))
        return TRUE;
      *expected = g_strdup (_("a UTC time such as 2041-03-14T07:12:00"));
      return FALSE;
    case ANT_KEY_TEXT:
      return TRUE;
    }
  return FALSE;
}

static gboolean
refuse_key (const AntRecipe *recipe, const AntRecipeGroup *group, const char *header, const char *name, GError **error)
{
  const char *words[ANT_MAX_RECIPE_KEYS + 1] = { NULL };
  for (gsize i = 0; i < group->n_keys; i++)
    words[i] = group->key[i].name;
  const char *near = ant_near_word (name, words);
  if (near)
    return refuse (error, recipe->path, _("[%s]: found the key “%s”, expected perhaps “%s”"), header, name, near);
  g_autofree char *list = g_strjoinv (", ", (char **) (gsize) words);
  return refuse (error, recipe->path, _("[%s]: found the key “%s”, expected one of %s"), header, name, list);
}

static gboolean
refuse_group (const AntRecipe *recipe, const char *header, GError **error)
{
  g_autoptr (GString) list = g_string_new (NULL);
  for (gsize i = 0; i < ANT_N_RECIPE_GROUPS; i++)
    g_string_append_printf (list, "%s[%s%s]", i ? ", " : "", ant_recipe_group_table[i].name,
                            ant_recipe_group_table[i].many ? _(" NAME") : "");
  return refuse (error, recipe->path, _("found the group [%s], expected one of %s"), header, list->str);
}

static AntRecipeItem *
item_new (AntRecipe *recipe, const AntRecipeGroup *group, const char *own_name)
{
  AntRecipeItem *item = g_new0 (AntRecipeItem, 1);
  item->group = (AntRecipeGroupIndex) (group - ant_recipe_group_table);
  item->name = g_strdup (own_name);
  for (gsize i = 0; i < group->n_keys; i++)
    item->value[i] = group->key[i].fallback;
  g_ptr_array_add (recipe->items, item);
  return item;
}

static gboolean
read_keys (AntRecipe *recipe, GKeyFile *file, const char *header, const AntRecipeGroup *group, AntRecipeItem *item,
           GError **error)
{
  g_auto (GStrv) names = g_key_file_get_keys (file, header, NULL, NULL);
  for (gsize i = 0; names[i]; i++)
    {
      g_autofree char *text = g_key_file_get_string (file, header, names[i], NULL);
      g_autofree char *expected = NULL;
      int place = ant_recipe_key_find (group, names[i]);
      if (place < 0)
        return refuse_key (recipe, group, header, names[i], error);
      if (!text)
        return refuse (error, recipe->path, _("[%s] %s: found text that is not UTF-8, expected plain text"), header,
                       names[i]);
      g_strchomp (text);
      if (!read_value (recipe, &group->key[place], text, &item->value[place], &expected))
        return refuse (error, recipe->path, _("[%s] %s: found “%s”, expected %s"), header, names[i], text, expected);
      if (group->key[place].kind == ANT_KEY_TEXT)
        {
          g_free (recipe->title);
          recipe->title = g_strdup (text);
        }
    }
  for (gsize i = 0; i < group->n_keys; i++)
    if (group->key[i].required && isnan (item->value[i]))
      return refuse (error, recipe->path, _("[%s]: found no key “%s”, expected it: %s"), header, group->key[i].name,
                     group->key[i].help);
  return TRUE;
}

static gboolean
read_group (AntRecipe *recipe, GKeyFile *file, const char *header, GError **error)
{
  const char *own_name = "";
  const AntRecipeGroup *group = ant_recipe_group_find (header, &own_name);
  if (!group)
    return refuse_group (recipe, header, error);
  if (strpbrk (own_name, ",\""))
    return refuse (error, recipe->path, _("found the group [%s], expected a name without commas and quotes"), header);
  return read_keys (recipe, file, header, group, item_new (recipe, group, own_name), error);
}

/* [record] comes first wherever it stands, since all other times count from its start. */
static gboolean
read_record (AntRecipe *recipe, GKeyFile *file, GError **error)
{
  if (!g_key_file_has_group (file, "record"))
    return refuse (error, recipe->path, _("found no group [record], expected one with start and days"));
  if (!read_group (recipe, file, "record", error))
    return FALSE;
  AntRecipeItem *record = g_ptr_array_index (recipe->items, 0);
  if (ant_time_after (ANT_SCALE_UTC, MIDNIGHT_2000_JD, 0, record->value[ANT_RECORD_START], &recipe->time.origin_jd1,
                      &recipe->time.origin_jd2) != ANT_OK)
    return refuse (error, recipe->path, _("[record] start: found a date out of reach, expected a UTC time"));
  record->value[ANT_RECORD_START] = 0;
  return TRUE;
}

AntRecipe *
ant_recipe_parse (const char *path, const char *text, gsize length, GError **error)
{
  g_autoptr (AntRecipe) recipe = recipe_new (path);
  g_autoptr (GKeyFile) file = g_key_file_new ();
  g_autoptr (GError) inner = NULL;
  if (length == 0 || memchr (text, '\0', length)
      || !g_key_file_load_from_data (file, text, length, G_KEY_FILE_NONE, &inner))
    {
      refuse (error, path, _("found %s, expected a recipe: groups in brackets with lines “key = value”"),
              inner ? inner->message : length == 0 ? _("nothing") : _("a zero byte"));
      return NULL;
    }
  if (!check_repeats (path, text, length, error) || !read_record (recipe, file, error))
    return NULL;
  g_auto (GStrv) headers = g_key_file_get_groups (file, NULL);
  for (gsize i = 0; headers[i]; i++)
    if (!g_str_equal (headers[i], "record") && !read_group (recipe, file, headers[i], error))
      return NULL;
  if (!ant_recipe_make_scenario (recipe, error))
    return NULL;
  return g_steal_pointer (&recipe);
}

AntRecipe *
ant_recipe_load (const char *path, GError **error)
{
  g_autofree char *text = g_malloc (MOST_BYTES + 1);
  FILE *stream = g_fopen (path, "re");
  gsize length = stream ? fread (text, 1, MOST_BYTES + 1, stream) : 0;
  int number = !stream || ferror (stream) ? errno : 0;
  if (stream)
    fclose (stream);
  if (number)
    {
      refuse (error, path, _("cannot be read: %s"), g_strerror (number));
      return NULL;
    }
  if (length > MOST_BYTES)
    {
      refuse (error, path, _("found more than %d bytes, expected a recipe"), MOST_BYTES);
      return NULL;
    }
  return ant_recipe_parse (path, text, length, error);
}

gboolean
ant_recipe_set_seed (AntRecipe *recipe, const char *text, GError **error)
{
  AntRecipeItem *record = g_ptr_array_index (recipe->items, 0);
  g_autofree char *expected = NULL;
  double seed;
  if (!read_number (&ant_recipe_group_table[ANT_GROUP_RECORD].key[ANT_RECORD_SEED], text, &seed, &expected))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("found the seed “%s”, expected %s"), text, expected);
      return FALSE;
    }
  record->value[ANT_RECORD_SEED] = seed;
  recipe->scenario.seed = (uint64_t) seed;
  return TRUE;
}

static void
write_value (const AntRecipe *recipe, const AntRecipeKey *key, double value, GString *text)
{
  char number[G_ASCII_DTOSTR_BUF_SIZE];
  g_autofree char *time = NULL;
  switch (key->kind)
    {
    case ANT_KEY_NUMBER:
    case ANT_KEY_WHOLE:
      g_string_append (text, g_ascii_dtostr (number, sizeof number, value));
      break;
    case ANT_KEY_TIME:
      time = ant_time_reference_utc_text (&recipe->time, value, 6);
      g_string_append (text, time);
      break;
    case ANT_KEY_SWITCH:
      g_string_append (text, value != 0 ? "yes" : "no");
      break;
    case ANT_KEY_WORD:
      g_string_append (text, key->words[(gsize) value]);
      break;
    case ANT_KEY_TEXT:
      break;
    }
}

char *
ant_recipe_to_text (const AntRecipe *recipe)
{
  GString *text = g_string_new (NULL);
  for (gsize i = 0; i < recipe->items->len; i++)
    {
      const AntRecipeItem *item = g_ptr_array_index (recipe->items, i);
      const AntRecipeGroup *group = &ant_recipe_group_table[item->group];
      g_string_append_printf (text, "%s[%s%s%s]\n", i ? "\n" : "", group->name, *item->name ? " " : "", item->name);
      for (gsize k = 0; k < group->n_keys; k++)
        {
          const AntRecipeKey *key = &group->key[k];
          if (key->kind == ANT_KEY_TEXT)
            g_string_append_printf (text, "%s = %s\n", key->name, recipe->title);
          if (isnan (item->value[k]))
            continue;
          g_string_append_printf (text, "%s = ", key->name);
          write_value (recipe, key, item->value[k], text);
          g_string_append_c (text, '\n');
        }
    }
  return g_string_free (text, FALSE);
}
