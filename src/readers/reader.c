/* reader.c - the registry of formats. */
#include "readers/reader.h"

#include <glib/gi18n.h>
#include <string.h>

#include "data/error.h"
#include "readers/byte-source.h"
#include "readers/fits-reader.h"
#include "readers/netcdf-reader.h"
#include "readers/text-reader.h"

typedef struct
{
  const char *name;
  gboolean (*sniff) (const guint8 *head, gsize n);
  gboolean (*read) (AntByteSource *source, const AntReadingChoices *choices, const AntSliceRunner *runner,
                    GCancellable *cancellable, AntRecord *record, GError **error);
} AntFormat;

/* Known kinds of binary files, so that the sentence can name what was found. */
static const struct
{
  const char *magic, *name;
} binaries[] = {
  { "PK\003\004", "zip" }, { "%PDF", "PDF" }, { "\211PNG", "PNG" }, { "BZh", "bzip2" }, { "\3757zXZ", "xz" },
};

static const char *
binary_name (const guint8 *head, gsize n)
{
  for (gsize i = 0; i < G_N_ELEMENTS (binaries); i++)
    if (n >= strlen (binaries[i].magic) && !memcmp (head, binaries[i].magic, strlen (binaries[i].magic)))
      return binaries[i].name;
  return NULL;
}

static gboolean
sniff_text (const guint8 *head, gsize n)
{
  return binary_name (head, n) == NULL;
}

static gboolean
sniff_fits (const guint8 *head, gsize n)
{
  return n >= 9 && !memcmp (head, "SIMPLE  =", 9);
}

static const AntFormat formats[] = {
  { "FITS", sniff_fits, ant_fits_reader_read },
  { "NetCDF", ant_netcdf_reader_sniff, ant_netcdf_reader_read },
  { "text", sniff_text, ant_text_reader_read },
};

const char *
ant_reader_format (const guint8 *head, gsize n)
{
  for (gsize i = 0; i < G_N_ELEMENTS (formats); i++)
    if (formats[i].sniff (head, n))
      return formats[i].name;
  return NULL;
}

static AntRecord *
read_source (AntByteSource *source, const char *path, const AntReadingChoices *choices, const AntSliceRunner *runner,
             GCancellable *cancellable, GError **error)
{
  gsize n;
  const guint8 *head = ant_byte_source_peek (source, &n, error);
  if (!head)
    return NULL;
  for (gsize i = 0; i < G_N_ELEMENTS (formats); i++)
    {
      if (!formats[i].sniff (head, n))
        continue;
      g_autoptr (AntRecord) record = ant_record_new ();
      record->path = g_strdup (ant_byte_source_name (source));
      record->format = g_strdup (formats[i].name);
      if (!formats[i].read (source, choices, runner, cancellable, record, error))
        return NULL;
      g_free (record->path);
      record->path = g_strdup (path);
      record->sha256 = ant_byte_source_sha256 (source);
      return g_steal_pointer (&record);
    }
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: line 1: found a %s file, expected a table of text, FITS or NetCDF"),
               ant_byte_source_name (source), binary_name (head, n));
  return NULL;
}

AntRecord *
ant_reader_open_with (const char *path, const AntReadingChoices *choices, const AntSliceRunner *runner, GCancellable *cancellable,
                      GError **error)
{
  g_autoptr (AntByteSource) source = ant_byte_source_open (path, error);
  return source ? read_source (source, path, choices, runner, cancellable, error) : NULL;
}

AntRecord *
ant_reader_open (const char *path, const AntReadingChoices *choices, GCancellable *cancellable, GError **error)
{
  return ant_reader_open_with (path, choices, NULL, cancellable, error);
}

AntRecord *
ant_reader_read_bytes (const char *name, const void *bytes, gsize n, const AntReadingChoices *choices, GError **error)
{
  g_autoptr (AntByteSource) source = ant_byte_source_new_bytes (name, bytes, n);
  return read_source (source, name, choices, NULL, NULL, error);
}
