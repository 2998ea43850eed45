/* reading-choices.c - the life and the words of choices about reading. */
#include "data/reading-choices.h"

#include <glib/gi18n.h>
#include <math.h>
#include <string.h>

#include "data/error.h"

#define WORD(member) { #member, G_STRUCT_OFFSET (AntReadingChoices, member) }
const AntReadingWord ant_reading_word_table[] = {
  WORD (time_column), WORD (value_column), WORD (error_column), WORD (quality_column), WORD (time_format), WORD (time_scale),
  WORD (time_zone), WORD (epoch), WORD (hdu), WORD (index),
};
const gsize ant_n_reading_words = G_N_ELEMENTS (ant_reading_word_table);

char **
ant_reading_choices_word (AntReadingChoices *choices, const AntReadingWord *word)
{
  return G_STRUCT_MEMBER_P (choices, word->offset);
}

static const char *
word_of (const AntReadingChoices *choices, gsize i)
{
  return *(char *const *) ((const char *) choices + ant_reading_word_table[i].offset);
}

void
ant_reading_choices_clear (AntReadingChoices *choices)
{
  for (gsize i = 0; i < ant_n_reading_words; i++)
    g_free (*ant_reading_choices_word (choices, &ant_reading_word_table[i]));
  g_clear_pointer (&choices->fill_values, g_array_unref);
  memset (choices, 0, sizeof *choices);
}

void
ant_reading_choices_copy (const AntReadingChoices *choices, AntReadingChoices *copy)
{
  *copy = (AntReadingChoices) { .fill_values = choices->fill_values ? g_array_copy (choices->fill_values) : NULL };
  for (gsize i = 0; i < ant_n_reading_words; i++)
    *ant_reading_choices_word (copy, &ant_reading_word_table[i]) = g_strdup (word_of (choices, i));
}

gboolean
ant_reading_choices_same (const AntReadingChoices *one, const AntReadingChoices *other)
{
  for (gsize i = 0; i < ant_n_reading_words; i++)
    if (g_strcmp0 (word_of (one, i), word_of (other, i)) != 0)
      return FALSE;
  gsize n = one->fill_values ? one->fill_values->len : 0;
  if (n != (other->fill_values ? other->fill_values->len : 0))
    return FALSE;
  return n == 0 || memcmp (one->fill_values->data, other->fill_values->data, n * sizeof (double)) == 0;
}

gboolean
ant_reading_choices_parse_columns (AntReadingChoices *choices, const char *text, GError **error)
{
  const struct
  {
    const char *key;
    char **place;
  } keys[] = { { "time", &choices->time_column },
               { "value", &choices->value_column },
               { "error", &choices->error_column },
               { "quality", &choices->quality_column } };
  g_auto (GStrv) parts = g_strsplit (text, ",", -1);
  for (guint i = 0; parts[i]; i++)
    {
      char *equals = strchr (parts[i], '=');
      char **place = NULL;
      if (equals)
        *equals = 0;
      for (gsize k = 0; equals && k < G_N_ELEMENTS (keys); k++)
        if (!strcmp (g_strstrip (parts[i]), keys[k].key))
          place = keys[k].place;
      if (!place || *g_strstrip (equals + 1) == 0)
        {
          g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE,
                       _("column “%s”: expected time=…, value=…, error=… or quality=…, each with a name or number"), parts[i]);
          return FALSE;
        }
      g_free (*place);
      *place = g_strdup (equals + 1);
    }
  return TRUE;
}

gboolean
ant_reading_choices_parse_fills (AntReadingChoices *choices, const char *text, GError **error)
{
  g_auto (GStrv) parts = g_strsplit (text, ",", -1);
  if (!choices->fill_values)
    choices->fill_values = g_array_new (FALSE, FALSE, sizeof (double));
  for (guint i = 0; parts[i]; i++)
    {
      char *end;
      double value = g_ascii_strtod (g_strstrip (parts[i]), &end);
      if (end == parts[i] || *end || !isfinite (value))
        {
          g_set_error (error, ANT_ERROR, ANT_ERROR_USAGE, _("fill values: found “%s”, expected numbers separated by commas"), parts[i]);
          return FALSE;
        }
      g_array_append_val (choices->fill_values, value);
    }
  return TRUE;
}

char *
ant_reading_choices_fills_text (const AntReadingChoices *choices)
{
  if (!choices->fill_values || choices->fill_values->len == 0)
    return NULL;
  GString *text = g_string_new (NULL);
  for (guint i = 0; i < choices->fill_values->len; i++)
    {
      char number[G_ASCII_DTOSTR_BUF_SIZE];
      g_ascii_formatd (number, sizeof number, "%.15g", g_array_index (choices->fill_values, double, i));
      g_string_append_printf (text, "%s%s", i ? ", " : "", number);
    }
  return g_string_free (text, FALSE);
}
