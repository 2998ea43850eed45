/* preferences.c - the key file of the window. */
#include "gui/preferences.h"

#include "gui/config-file.h"

#define FILE_NAME "window.ini"
#define GROUP "window"

char **
ant_preferences_recent (void)
{
  g_autoptr (GKeyFile) file = ant_config_load (FILE_NAME);
  g_auto (GStrv) paths = g_key_file_get_string_list (file, GROUP, "recent", NULL, NULL);
  g_autoptr (GStrvBuilder) kept = g_strv_builder_new ();
  for (char **path = paths; path && *path; path++)
    if (g_file_test (*path, G_FILE_TEST_IS_REGULAR))
      g_strv_builder_add (kept, *path);
  return g_strv_builder_end (kept);
}

void
ant_preferences_add_recent (const char *path)
{
  g_autoptr (GKeyFile) file = ant_config_load (FILE_NAME);
  g_autofree char *absolute = g_canonicalize_filename (path, NULL);
  g_auto (GStrv) before = g_key_file_get_string_list (file, GROUP, "recent", NULL, NULL);
  const char *paths[ANT_MOST_RECENT] = { absolute };
  gsize n = 1;
  for (char **one = before; one && *one && n < ANT_MOST_RECENT; one++)
    if (!g_str_equal (*one, absolute))
      paths[n++] = *one;
  g_key_file_set_string_list (file, GROUP, "recent", paths, n);
  ant_config_save (file, FILE_NAME);
}

void
ant_preferences_get_size (int *width, int *height)
{
  g_autoptr (GKeyFile) file = ant_config_load (FILE_NAME);
  int w = g_key_file_get_integer (file, GROUP, "width", NULL), h = g_key_file_get_integer (file, GROUP, "height", NULL);
  if (w > 0 && h > 0)
    *width = w, *height = h;
}

void
ant_preferences_set_size (int width, int height)
{
  g_autoptr (GKeyFile) file = ant_config_load (FILE_NAME);
  g_key_file_set_integer (file, GROUP, "width", width);
  g_key_file_set_integer (file, GROUP, "height", height);
  ant_config_save (file, FILE_NAME);
}

gboolean
ant_preferences_get_settings_shown (void)
{
  g_autoptr (GKeyFile) file = ant_config_load (FILE_NAME);
  return g_key_file_get_boolean (file, GROUP, "settings", NULL);
}

void
ant_preferences_set_settings_shown (gboolean shown)
{
  g_autoptr (GKeyFile) file = ant_config_load (FILE_NAME);
  g_key_file_set_boolean (file, GROUP, "settings", shown);
  ant_config_save (file, FILE_NAME);
}
