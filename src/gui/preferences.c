/* preferences.c - the key file of the window. */
#include "gui/preferences.h"

#include <glib/gstdio.h>

#define GROUP "window"

static char *
file_path (void)
{
  return g_build_filename (g_get_user_config_dir (), "antumbra", "window.ini", NULL);
}

static GKeyFile *
load (void)
{
  GKeyFile *file = g_key_file_new ();
  g_autofree char *path = file_path ();
  g_key_file_load_from_file (file, path, G_KEY_FILE_NONE, NULL);
  return file;
}

static void
save (GKeyFile *file)
{
  g_autofree char *path = file_path (), *folder = g_path_get_dirname (path);
  g_autoptr (GError) error = NULL;
  g_mkdir_with_parents (folder, 0700);
  if (!g_key_file_save_to_file (file, path, &error))
    g_debug ("%s", error->message);
}

char **
ant_preferences_recent (void)
{
  g_autoptr (GKeyFile) file = load ();
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
  g_autoptr (GKeyFile) file = load ();
  g_autofree char *absolute = g_canonicalize_filename (path, NULL);
  g_auto (GStrv) before = g_key_file_get_string_list (file, GROUP, "recent", NULL, NULL);
  const char *paths[ANT_MOST_RECENT] = { absolute };
  gsize n = 1;
  for (char **one = before; one && *one && n < ANT_MOST_RECENT; one++)
    if (!g_str_equal (*one, absolute))
      paths[n++] = *one;
  g_key_file_set_string_list (file, GROUP, "recent", paths, n);
  save (file);
}

void
ant_preferences_get_size (int *width, int *height)
{
  g_autoptr (GKeyFile) file = load ();
  int w = g_key_file_get_integer (file, GROUP, "width", NULL), h = g_key_file_get_integer (file, GROUP, "height", NULL);
  if (w > 0 && h > 0)
    *width = w, *height = h;
}

void
ant_preferences_set_size (int width, int height)
{
  g_autoptr (GKeyFile) file = load ();
  g_key_file_set_integer (file, GROUP, "width", width);
  g_key_file_set_integer (file, GROUP, "height", height);
  save (file);
}

gboolean
ant_preferences_get_settings_shown (void)
{
  g_autoptr (GKeyFile) file = load ();
  return g_key_file_get_boolean (file, GROUP, "settings", NULL);
}

void
ant_preferences_set_settings_shown (gboolean shown)
{
  g_autoptr (GKeyFile) file = load ();
  g_key_file_set_boolean (file, GROUP, "settings", shown);
  save (file);
}
