/* output-dir.c - a directory of results that appears whole or not at all. */
#include "writers/output-dir.h"
#include <errno.h>
#include <fcntl.h>
#include <glib/gi18n.h>
#include <glib/gstdio.h>
#include <sys/stat.h>
#include <unistd.h>
#include "data/error.h"

typedef struct
{
  char *path;
  char *temporary; /* NULL once renamed */
  gboolean is_new; /* nothing stood there before */
} Part;

struct _AntOutputDir
{
  char *path;
  GPtrArray *parts; /* of Part */
  GPtrArray *made;  /* of char*: directories made for it, outermost first */
  gboolean committed;
};

static gboolean
fail (const char *path, int code, GError **error)
{
  g_autofree char *shown = g_filename_display_name (path);
  g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE, _("%s: cannot be written: %s"), shown, g_strerror (code));
  return FALSE;
}

static gboolean
refuse_existing (const char *path, GError **error)
{
  g_autofree char *shown = g_filename_display_name (path);
  g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE,
               _("%s: exists already; expected a new name, or --force to replace it"), shown);
  return FALSE;
}

static void
part_free (gpointer data)
{
  Part *part = data;
  if (part->temporary)
    g_unlink (part->temporary);
  g_free (part->temporary);
  g_free (part->path);
  g_free (part);
}

static gboolean
write_all (int fd, const char *text, gsize length)
{
  while (length > 0)
    {
      gssize n = write (fd, text, length);
      if (n < 0 && errno != EINTR)
        return FALSE;
      if (n > 0)
        {
          text += n;
          length -= (gsize) n;
        }
    }
  return fsync (fd) == 0 || errno == EINVAL; /* EINVAL: a special file has nothing to sync */
}

/* Write text to a new file beside `path`; returns its name, or NULL, *code and nothing left behind. */
static char *
write_temporary (const char *path, const char *text, gsize length, int *code)
{
  g_autofree char *folder = g_path_get_dirname (path), *name = g_path_get_basename (path);
  g_autofree char *hidden = g_strdup_printf (".%s-XXXXXX_new", name);
  g_autofree char *temporary = g_build_filename (folder, hidden, NULL);
  int fd = g_mkstemp_full (temporary, O_WRONLY | O_CLOEXEC, 0666);
  if (fd < 0)
    {
      *code = errno;
      return NULL;
    }
  *code = write_all (fd, text, length) ? 0 : errno;
  if (close (fd) != 0 && *code == 0)
    *code = errno;
  if (*code == 0)
    return g_steal_pointer (&temporary);
  g_unlink (temporary);
  return NULL;
}

static void
sync_folder (const char *path)
{
  int fd = g_open (path, O_RDONLY | O_DIRECTORY | O_CLOEXEC, 0);
  if (fd < 0)
    return;
  fsync (fd); /* the files are whole already; this only makes their names outlast a power cut */
  close (fd);
}

/* Make a directory and those above it that are missing, outermost first, and remember which. */
static gboolean
make_folders (AntOutputDir *dir, const char *path, GError **error)
{
  if (g_file_test (path, G_FILE_TEST_IS_DIR))
    return TRUE;
  g_autofree char *parent = g_path_get_dirname (path);
  if (g_strcmp0 (parent, path) != 0 && !make_folders (dir, parent, error))
    return FALSE;
  if (g_mkdir (path, 0777) == 0)
    g_ptr_array_add (dir->made, g_strdup (path));
  else if (errno != EEXIST || !g_file_test (path, G_FILE_TEST_IS_DIR))
    return fail (path, errno, error);
  return TRUE;
}

static gboolean
check_names (const char *folder, const char *const *names, gboolean replace, GError **error)
{
  for (; *names; names++)
    {
      GStatBuf status;
      g_autofree char *path = g_build_filename (folder, *names, NULL);
      if (g_lstat (path, &status) != 0)
        continue;
      if (S_ISDIR (status.st_mode))
        return fail (path, EISDIR, error);
      if (!replace)
        return refuse_existing (path, error);
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
  if (!make_folders (dir, path, error) || !check_names (path, names, replace, error))
    return NULL;
  int code;
  g_autofree char *trial = g_build_filename (path, "trial", NULL);
  g_autofree char *temporary = write_temporary (trial, "", 0, &code);
  if (!temporary)
    {
      fail (path, code, error);
      return NULL;
    }
  g_unlink (temporary);
  return g_steal_pointer (&dir);
}

gboolean
ant_output_dir_add (AntOutputDir *dir, const char *name, const char *text, gsize length, GError **error)
{
  g_autofree char *path = g_build_filename (dir->path, name, NULL);
  int code;
  char *temporary = write_temporary (path, text, length, &code);
  if (!temporary)
    return fail (path, code, error);
  Part *part = g_new0 (Part, 1);
  part->path = g_steal_pointer (&path);
  part->temporary = temporary;
  part->is_new = !g_file_test (part->path, G_FILE_TEST_EXISTS);
  g_ptr_array_add (dir->parts, part);
  return TRUE;
}

gboolean
ant_output_dir_commit (AntOutputDir *dir, GError **error)
{
  for (guint i = 0; i < dir->parts->len; i++)
    {
      Part *part = g_ptr_array_index (dir->parts, i);
      if (g_rename (part->temporary, part->path) == 0)
        {
          g_clear_pointer (&part->temporary, g_free);
          continue;
        }
      fail (part->path, errno, error);
      for (guint j = 0; j < i; j++)
        {
          const Part *done = g_ptr_array_index (dir->parts, j);
          if (done->is_new)
            g_unlink (done->path);
        }
      return FALSE;
    }
  sync_folder (dir->path);
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

gboolean
ant_output_file_write (const char *path, const char *text, gsize length, gboolean replace, GError **error)
{
  g_autofree char *folder = g_path_get_dirname (path), *name = g_path_get_basename (path);
  if (!check_names (folder, (const char *[]){ name, NULL }, replace, error))
    return FALSE;
  int code;
  g_autofree char *temporary = write_temporary (path, text, length, &code);
  if (!temporary)
    return fail (path, code, error);
  if (g_rename (temporary, path) != 0)
    {
      fail (path, errno, error);
      g_unlink (temporary);
      return FALSE;
    }
  sync_folder (folder);
  return TRUE;
}
