/* config-file.c - reads and writes the key files of config-file.h. */
#include "gui/config-file.h"

#include <glib/gstdio.h>

static char *
path_of (const char *name)
{
  return g_build_filename (g_get_user_config_dir (), "antumbra", name, NULL);
}

GKeyFile *
ant_config_load (const char *name)
{
  GKeyFile *file = g_key_file_new ();
  g_autofree char *path = path_of (name);
  g_key_file_load_from_file (file, path, G_KEY_FILE_NONE, NULL);
  return file;
}

void
ant_config_save (GKeyFile *file, const char *name)
{
  g_autofree char *path = path_of (name), *folder = g_path_get_dirname (path);
  g_autoptr (GError) error = NULL;
  g_mkdir_with_parents (folder, 0700);
  if (!g_key_file_save_to_file (file, path, &error))
    g_debug ("%s", error->message);
}
