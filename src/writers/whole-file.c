/* whole-file.c - draft, sync, rename. */
#include "writers/whole-file.h"

#include <errno.h>
#include <fcntl.h>
#include <glib/gi18n.h>
#include <glib/gstdio.h>
#include <sys/stat.h>
#include <unistd.h>

#include "data/error.h"

struct _AntWholeFile
{
  char *path;
  char *draft;  /* its name until it is in its place; NULL from then on, and after an error */
  FILE *stream; /* NULL once finished */
};

static gboolean
fail (const char *path, const char *reason, GError **error)
{
  g_autofree char *shown = g_filename_display_name (path);
  g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE, _("%s: cannot be written: %s"), shown, reason);
  return FALSE;
}

static gboolean
check_place (const char *path, gboolean replace, GError **error)
{
  GStatBuf status;
  if (g_lstat (path, &status) != 0)
    return TRUE;
  if (S_ISDIR (status.st_mode))
    return fail (path, g_strerror (EISDIR), error);
  if (!S_ISREG (status.st_mode) && !S_ISLNK (status.st_mode)) /* a rename would put a file in place of the device */
    return fail (path, _("found a device, a pipe or a socket, expected an ordinary file"), error);
  if (replace)
    return TRUE;
  g_autofree char *shown = g_filename_display_name (path);
  g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE,
               _("%s: exists already; expected a new name, or --force to replace it"), shown);
  return FALSE;
}

/* A name beside `path` that `ls` does not show, as g_mkstemp_full fills it in. */
static char *
draft_name (const char *path)
{
  g_autofree char *folder = g_path_get_dirname (path), *name = g_path_get_basename (path);
  g_autofree char *hidden = g_strdup_printf (".%s-XXXXXX_new", name);
  return g_build_filename (folder, hidden, NULL);
}

AntWholeFile *
ant_whole_file_open (const char *path, gboolean replace, GError **error)
{
  if (!check_place (path, replace, error))
    return NULL;
  g_autofree char *draft = draft_name (path);
  int descriptor = g_mkstemp_full (draft, O_WRONLY | O_CLOEXEC, 0666);
  FILE *stream = descriptor < 0 ? NULL : fdopen (descriptor, "w");
  if (!stream)
    {
      fail (path, g_strerror (errno), error);
      return NULL;
    }
  AntWholeFile *file = g_new0 (AntWholeFile, 1);
  file->path = g_strdup (path);
  file->draft = g_steal_pointer (&draft);
  file->stream = stream;
  return file;
}

FILE *
ant_whole_file_stream (AntWholeFile *file)
{
  return file->stream;
}

static void
drop_draft (AntWholeFile *file)
{
  if (file->stream)
    fclose (g_steal_pointer (&file->stream));
  if (file->draft)
    g_unlink (file->draft);
  g_clear_pointer (&file->draft, g_free);
}

gboolean
ant_whole_file_finish (AntWholeFile *file, GError **error)
{
  int number = 0;
  if (!file->stream)
    return TRUE;
  errno = 0;
  if (ferror (file->stream) || fflush (file->stream) != 0 || fsync (fileno (file->stream)) != 0)
    number = errno ? errno : EIO;
  if (fclose (g_steal_pointer (&file->stream)) != 0 && number == 0)
    number = errno;
  if (number == 0)
    return TRUE;
  drop_draft (file);
  return fail (file->path, g_strerror (number), error);
}

/* The file is whole already; this only makes its name outlast a power cut. */
static void
sync_folder_of (const char *path)
{
  g_autofree char *folder = g_path_get_dirname (path);
  int descriptor = g_open (folder, O_RDONLY | O_DIRECTORY | O_CLOEXEC, 0);
  if (descriptor < 0)
    return;
  fsync (descriptor);
  close (descriptor);
}

gboolean
ant_whole_file_commit (AntWholeFile *file, GError **error)
{
  gboolean good = ant_whole_file_finish (file, error);
  if (good && g_rename (file->draft, file->path) != 0)
    good = fail (file->path, g_strerror (errno), error);
  if (good)
    {
      g_clear_pointer (&file->draft, g_free);
      sync_folder_of (file->path);
    }
  ant_whole_file_abandon (file);
  return good;
}

gboolean
ant_whole_file_write (const char *path, const char *bytes, gsize length, gboolean replace, GError **error)
{
  AntWholeFile *file = ant_whole_file_open (path, replace, error);
  if (!file)
    return FALSE;
  fwrite (bytes, 1, length, file->stream); /* the stream keeps what went wrong */
  return ant_whole_file_commit (file, error);
}

void
ant_whole_file_abandon (AntWholeFile *file)
{
  if (!file)
    return;
  drop_draft (file);
  g_free (file->path);
  g_free (file);
}
