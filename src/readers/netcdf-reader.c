/* netcdf-reader.c - ask the child what is in the file, choose, ask it for the columns, and make rows of them. */
#include "readers/netcdf-reader.h"

#include <errno.h>
#include <fcntl.h>
#include <glib/gi18n.h>
#include <math.h>
#include <string.h>
#include <sys/mman.h>
#include <sys/stat.h>
#include <unistd.h>

#include "data/error.h"
#include "readers/netcdf-classic.h"
#include "readers/netcdf-process.h"
#include "readers/netcdf-rows.h"

#define CONTENTS_SECONDS 10
#define CONTENTS_BYTES (64 << 20)
#define COLUMNS_SECONDS 20
#define SLOWEST_BYTES_PER_S (10 << 20) /* unpacking, beyond those seconds */
#define BLOCK (1 << 20)
#define MOST_HEADER (16 << 20)

gboolean
ant_netcdf_reader_sniff (const guint8 *head, gsize n)
{
  return n >= 4 && (!memcmp (head, "\211HDF", 4) || (!memcmp (head, "CDF", 3) && (head[3] == 1 || head[3] == 2 || head[3] == 5)));
}

/* A classic file that was cut short would read as zeros. */
static gboolean
check_length (int file, const char *name, GError **error)
{
  struct stat status;
  guint64 needed;
  if (fstat (file, &status) != 0)
    return TRUE; /* the child will say what is wrong */
  gsize n = (gsize) MIN (status.st_size, MOST_HEADER), at = 0;
  g_autofree guint8 *head = g_malloc (n + 1);
  for (gssize got; at < n && (got = pread (file, head + at, n - at, (off_t) at)) > 0;)
    at += (gsize) got;
  AntClassic found = ant_netcdf_classic_length (head, at, &needed);
  if (found == ANT_CLASSIC_DAMAGED)
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ,
                 _("%s: byte %zu: found a NetCDF header that contradicts itself, expected dimensions, attributes and variables"), name,
                 (gsize) needed);
  else if (found == ANT_CLASSIC_LONGER && at == (gsize) status.st_size)
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: byte %zu: found the end in the middle of a NetCDF header, expected a whole file"),
                 name, at);
  else if (found == ANT_CLASSIC_WHOLE && needed > (guint64) status.st_size)
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ,
                 _("%s: found %zu bytes of NetCDF, expected the %zu that its header tells of"), name, (gsize) status.st_size,
                 (gsize) needed);
  else
    return TRUE;
  return FALSE;
}

static AntNetcdfContents *
ask_contents (int file, const char *name, GCancellable *cancellable, GError **error)
{
  const char *const asked[] = { "contents", NULL };
  g_auto (AntNetcdfOutput) output = { 0 };
  AntNetcdfProcess *process = ant_netcdf_process_start (file, name, asked, CONTENTS_SECONDS, CONTENTS_BYTES, error);
  if (!process || !ant_netcdf_process_finish (process, name, cancellable, &output, error))
    return NULL;
  AntNetcdfContents *contents = ant_netcdf_contents_parse (output.bytes, output.n);
  if (!contents)
    g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: found a NetCDF file whose contents cannot be listed, expected a plain one"), name);
  return contents;
}

static AntNetcdfProcess *
start_columns (int file, const char *name, const AntNetcdfContents *contents, const AntNetcdfColumns *columns, GError **error)
{
  g_autoptr (GPtrArray) asked = g_ptr_array_new_with_free_func (g_free);
  guint64 bytes = (guint64) columns->n_rows * 8 * (columns->n_columns + 2);
  g_ptr_array_add (asked, g_strdup ("columns"));
  for (guint i = 0; i < columns->n_columns; i++)
    g_ptr_array_add (asked, ant_netcdf_pick_text (contents, &columns->column[i]));
  if (columns->bounds >= 0)
    {
      g_ptr_array_add (asked, g_strdup_printf ("%d:*,0", columns->bounds));
      g_ptr_array_add (asked, g_strdup_printf ("%d:*,1", columns->bounds));
    }
  g_ptr_array_add (asked, NULL);
  return ant_netcdf_process_start (file, name, (const char *const *) asked->pdata,
                                   COLUMNS_SECONDS + (guint) (bytes / SLOWEST_BYTES_PER_S), bytes, error);
}

/* unread: the source is still to be read for its SHA-256. */
static gboolean
read_file (int file, gboolean unread, AntByteSource *source, const AntReadingChoices *choices, const AntSliceRunner *runner,
           GCancellable *cancellable, AntRecord *record, GError **error)
{
  struct stat status;
  gsize n;
  g_auto (AntNetcdfOutput) output = { 0 };
  g_autoptr (GError) failure = NULL;
  if (!check_length (file, record->path, error))
    return FALSE;
  g_autoptr (AntNetcdfContents) contents = ask_contents (file, record->path, cancellable, error);
  if (!contents || fstat (file, &status) != 0)
    return FALSE;
  g_autoptr (AntNetcdfColumns) columns = ant_netcdf_columns_choose (contents, choices, (guint64) status.st_size, error);
  if (!columns)
    {
      g_prefix_error (error, "%s: ", record->path);
      return FALSE;
    }
  AntNetcdfProcess *process = start_columns (file, record->path, contents, columns, error);
  if (!process)
    return FALSE;
  gboolean hashed = !unread || ant_byte_source_drain (source, &n, cancellable, &failure); /* while the child reads */
  gboolean read = ant_netcdf_process_finish (process, record->path, cancellable, &output, hashed ? error : NULL);
  if (!hashed)
    g_propagate_error (error, g_steal_pointer (&failure));
  return hashed && read && ant_netcdf_rows_fill (contents, columns, output.bytes, output.n, choices, runner, record, error);
}

/* All of a packed file or a pipe, in memory. -1 with one sentence. */
static int
keep_in_memory (AntByteSource *source, GCancellable *cancellable, GError **error)
{
  gsize n;
  g_autofree guint8 *bytes = ant_byte_source_take (source, &n, cancellable, error);
  if (!bytes)
    return -1;
  int file = memfd_create ("netcdf", MFD_CLOEXEC);
  gsize at = 0;
  for (gssize written; file >= 0 && at < n && (written = write (file, bytes + at, n - at)) > 0;)
    at += (gsize) written;
  if (file >= 0 && at == n)
    return file;
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: cannot be kept in memory: %s"), ant_byte_source_name (source),
               g_strerror (errno));
  if (file >= 0)
    close (file);
  return -1;
}

gboolean
ant_netcdf_reader_read (AntByteSource *source, const AntReadingChoices *choices, const AntSliceRunner *runner,
                        GCancellable *cancellable, AntRecord *record, GError **error)
{
  const char *path = ant_byte_source_path (source);
  int file = path ? open (path, O_RDONLY | O_CLOEXEC) : keep_in_memory (source, cancellable, error);
  if (file < 0)
    {
      if (path)
        g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: cannot be opened: %s"), path, g_strerror (errno));
      return FALSE;
    }
  gboolean done = read_file (file, path != NULL, source, choices, runner, cancellable, record, error);
  close (file);
  return done;
}
