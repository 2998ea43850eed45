/* whole-file.c - write, sync, rename. */
#include "writers/whole-file.h"

#include <errno.h>
#include <fcntl.h>
#include <glib/gi18n.h>
#include <glib/gstdio.h>
#include <unistd.h>

#include "data/error.h"

struct _AntWholeFile
{
  char *path;
  char *draft;  /* name while it is being written; NULL once it is gone */
  FILE *stream;
};

static void
set_error (GError **error, const char *path, int number)
{
  g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE, _("%s cannot be written: %s"), path, g_strerror (number));
}

AntWholeFile *
ant_whole_file_open (const char *path, gboolean replace, GError **error)
{
  if (!replace && g_file_test (path, G_FILE_TEST_EXISTS))
    {
      g_set_error (error, ANT_ERROR, ANT_ERROR_WRITE, _("%s is there already, expected a new name or --force"), path);
      return NULL;
    }
  if (g_file_test (path, G_FILE_TEST_IS_DIR))
    {
      set_error (error, path, EISDIR);
      return NULL;
    }
  g_autofree char *draft = g_strdup_printf ("%s.%08x-draft", path, g_random_int ());
  int descriptor = g_open (draft, O_WRONLY | O_CREAT | O_EXCL | O_CLOEXEC, 0666);
  FILE *stream = descriptor < 0 ? NULL : fdopen (descriptor, "w");
  if (!stream)
    {
      set_error (error, path, errno);
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

gboolean
ant_whole_file_commit (AntWholeFile *file, GError **error)
{
  int number = 0;
  errno = 0;
  if (ferror (file->stream) || fflush (file->stream) != 0 || fsync (fileno (file->stream)) != 0)
    number = errno ? errno : EIO;
  if (fclose (file->stream) != 0 && number == 0)
    number = errno;
  file->stream = NULL;
  if (number == 0 && g_rename (file->draft, file->path) != 0)
    number = errno;
  if (number == 0)
    g_clear_pointer (&file->draft, g_free);
  else
    set_error (error, file->path, number);
  ant_whole_file_abandon (file);
  return number == 0;
}

void
ant_whole_file_abandon (AntWholeFile *file)
{
  if (!file)
    return;
  if (file->stream)
    fclose (file->stream);
  if (file->draft)
    g_unlink (file->draft);
  g_free (file->draft);
  g_free (file->path);
  g_free (file);
}
