/* reading-choices.c - the life and the words of choices about reading. */
#include "data/reading-choices.h"

#include <glib/gi18n.h>
#include <string.h>

#include "data/error.h"

void
ant_reading_choices_clear (AntReadingChoices *choices)
{
  g_free (choices->time_column);
  g_free (choices->value_column);
  g_free (choices->error_column);
  g_free (choices->quality_column);
  g_free (choices->time_format);
  g_free (choices->time_scale);
  g_free (choices->time_zone);
  g_free (choices->epoch);
  g_free (choices->hdu);
  g_clear_pointer (&choices->fill_values, g_array_unref);
  memset (choices, 0, sizeof *choices);
}

void
ant_reading_choices_copy (const AntReadingChoices *choices, AntReadingChoices *copy)
{
  *copy = (AntReadingChoices){
    .time_column = g_strdup (choices->time_column),
    .value_column = g_strdup (choices->value_column),
    .error_column = g_strdup (choices->error_column),
    .quality_column = g_strdup (choices->quality_column),
    .time_format = g_strdup (choices->time_format),
    .time_scale = g_strdup (choices->time_scale),
    .time_zone = g_strdup (choices->time_zone),
    .epoch = g_strdup (choices->epoch),
    .hdu = g_strdup (choices->hdu),
    .fill_values = choices->fill_values ? g_array_copy (choices->fill_values) : NULL,
  };
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
