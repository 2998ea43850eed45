/* reading-memory.c - the key file of choices about reading: a group for each kind of file. */
#include "gui/reading-memory.h"

#include "gui/config-file.h"

#define FILE_NAME "reading.ini"
#define KIND_KEY "kind"
#define FILL_KEY "fill"

/* A kind holds TABs and any words: its sum names the group, the kind itself stands in it. */
static char *
group_of (const char *kind)
{
  g_autofree char *sum = g_compute_checksum_for_string (G_CHECKSUM_SHA256, kind, -1);
  return g_strndup (sum, 16);
}

gboolean
ant_reading_memory_recall (const char *kind, AntReadingChoices *choices)
{
  g_autoptr (GKeyFile) file = ant_config_load (FILE_NAME);
  g_autofree char *group = group_of (kind);
  gsize n_fills = 0;
  if (!g_key_file_has_group (file, group))
    return FALSE;
  *choices = (AntReadingChoices){ 0 };
  for (gsize i = 0; i < ant_n_reading_words; i++)
    *ant_reading_choices_word (choices, &ant_reading_word_table[i])
        = g_key_file_get_string (file, group, ant_reading_word_table[i].name, NULL);
  g_autofree double *fills = g_key_file_get_double_list (file, group, FILL_KEY, &n_fills, NULL);
  if (fills)
    {
      choices->fill_values = g_array_new (FALSE, FALSE, sizeof (double));
      g_array_append_vals (choices->fill_values, fills, (guint) n_fills);
    }
  return TRUE;
}

void
ant_reading_memory_keep (const char *kind, const AntReadingChoices *choices)
{
  g_autoptr (GKeyFile) file = ant_config_load (FILE_NAME);
  g_autofree char *group = group_of (kind);
  AntReadingChoices none = { 0 }, copy;
  g_key_file_remove_group (file, group, NULL);
  ant_reading_choices_copy (choices, &copy);
  if (!ant_reading_choices_same (choices, &none))
    {
      g_key_file_set_string (file, group, KIND_KEY, kind);
      for (gsize i = 0; i < ant_n_reading_words; i++)
        if (*ant_reading_choices_word (&copy, &ant_reading_word_table[i]))
          g_key_file_set_string (file, group, ant_reading_word_table[i].name, *ant_reading_choices_word (&copy, &ant_reading_word_table[i]));
      if (copy.fill_values && copy.fill_values->len > 0)
        g_key_file_set_double_list (file, group, FILL_KEY, (double *) (void *) copy.fill_values->data, copy.fill_values->len);
    }
  ant_reading_choices_clear (&copy);
  ant_config_save (file, FILE_NAME);
}
