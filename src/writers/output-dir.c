/* output-dir.c - a directory of results that appears whole or not at all. */
#include "writers/output-dir.h"

#include <errno.h>
#include <glib/gi18n.h>
#include <glib/gstdio.h>

#include "data/error.h"
#include "writers/whole-file.h"

typedef struct
{
  AntWholeFile *file; /* NULL once in its place */
  char *path;
  gboolean is_new; /* nothing stood there before */
} Part;

struct _AntOutputDir
{
  char *path;
  GPtrArray *parts; /* of Part */
  GPtrArray *made;  /* of char*: directories made for it, outermost first */
  gboolean committed;
};

static void
part_free (gpointer data)
{
  Part *part = data;
  ant_whole_file_abandon (part->file);
  g_free (part->path);
  g_free (part);
}

/* Make a directory and those above it that are missing, outermost first, and remember which. */
static gboolean
make_folders (AntOutputDir *dir, const char *path, GError **error)
{
  if (g_file_test (path, G_FILE_TEST_IS_DIR))
    return TRUE;
  g_autofree char *parent = g_path_get_dirname (path), *shown = g_filename_display_name (path);
  if (g_strcmp0 (parent, path) != 0 && !make_folders (dir, parent, error))
    return FALSE;
  if (g_mkdir (path, 0777) == 0)
    g_ptr_array_add (dir->made, g_strdup (path));
  else if (errno != EEXIST || !g_file_test (path, G_FILE_TEST_IS_DIR))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE, _("%s: cannot be made: %s"), shown, g_strerror (errno));
      return FALSE;
    }
  return TRUE;
}

/* A draft of every result, begun and dropped. */
static gboolean
try_names (const char *folder, const char *const *names, gboolean replace, GError **error)
{
  for (; *names; names++)
    {
      g_autofree char *path = g_build_filename (folder, *names, NULL);
      g_autoptr (AntWholeFile) trial = ant_whole_file_open (path, replace, error);
      if (!trial)
        return FALSE;
    }
  return TRUE;
}

AntOutputDir *
ant_output_dir_open (const char *path, const char *const *names, gboolean replace, GError **error)
{
  g_autoptr (AntOutputDir) dir = g_new0 (AntOutputDir, 1);
  dir->path = g_strdup (path);
  dir->parts = g_ptr_array_new_with_free_func (part_free);
  dir->made = g_ptr_array_new_with_free_func (g_free);
  if (!make_folders (dir, path, error) || !try_names (path, names, replace, error))
    return NULL;
  return g_steal_pointer (&dir);
}

gboolean
ant_output_dir_add (AntOutputDir *dir, const char *name, const char *text, gsize length, GError **error)
{
  g_autofree char *path = g_build_filename (dir->path, name, NULL);
  g_autoptr (AntWholeFile) file = ant_whole_file_open (path, TRUE, error);
  if (!file)
    return FALSE;
  fwrite (text, 1, length, ant_whole_file_stream (file));
  if (!ant_whole_file_finish (file, error))
    return FALSE;
  Part *part = g_new0 (Part, 1);
  part->is_new = !g_file_test (path, G_FILE_TEST_EXISTS);
  part->path = g_steal_pointer (&path);
  part->file = g_steal_pointer (&file);
  g_ptr_array_add (dir->parts, part);
  return TRUE;
}

gboolean
ant_output_dir_commit (AntOutputDir *dir, GError **error)
{
  for (guint i = 0; i < dir->parts->len; i++)
    {
      Part *part = g_ptr_array_index (dir->parts, i);
      if (ant_whole_file_commit (g_steal_pointer (&part->file), error))
        continue;
      for (guint j = 0; j < i; j++)
        {
          const Part *done = g_ptr_array_index (dir->parts, j);
          if (done->is_new)
            g_unlink (done->path);
        }
      return FALSE;
    }
  dir->committed = TRUE;
  return TRUE;
}

void
ant_output_dir_close (AntOutputDir *dir)
{
  if (!dir)
    return;
  g_ptr_array_unref (dir->parts);
  if (!dir->committed)
    for (guint i = dir->made->len; i > 0; i--)
      g_rmdir (g_ptr_array_index (dir->made, i - 1)); /* refused by a directory that others use meanwhile */
  g_ptr_array_unref (dir->made);
  g_free (dir->path);
  g_free (dir);
}
