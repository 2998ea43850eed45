/* file-look.c - what the first bytes of a file show. */
#include "readers/file-look.h"

#include <string.h>

#include "readers/byte-source.h"
#include "readers/line-source.h"
#include "readers/reader.h"
#include "readers/text-layout.h"
#include "readers/text-names.h"

#define LOOKED_AT (64 * 1024)
#define MOST_LINES 60
#define LONGEST_SHOWN 400

/* "lyra_-_lev_std.fits": what files of a series have in common. */
static char *
kind_of_name (const char *path, const char *format)
{
  g_autofree char *name = g_path_get_basename (path);
  GString *kind = g_string_new (format);
  g_string_append_c (kind, ' ');
  for (const char *c = name; *c; c++)
    if (!g_ascii_isdigit (*c))
      g_string_append_c (kind, *c);
  return g_string_free (kind, FALSE);
}

static void
look_at_lines (AntFileLook *look, const char *bytes, gsize n)
{
  for (const char *at = bytes; at < bytes + n && look->lines->len < MOST_LINES;)
    {
      const char *newline = memchr (at, '\n', (gsize) (bytes + n - at));
      const char *end = newline ? newline : bytes + n;
      g_ptr_array_add (look->lines, ant_text_excerpt (at, end > at && end[-1] == '\r' ? end - 1 : end, LONGEST_SHOWN));
      at = end + 1;
    }
}

/* Columns without a layout are no fault here: reading will say what is wrong. */
static gboolean
look_at_text (AntFileLook *look, AntByteSource *source, const char *path, GError **error)
{
  AntLineSource lines;
  ant_line_source_init (&lines, source, NULL);
  gboolean good = ant_line_source_fill (&lines, LOOKED_AT, error);
  const char *last = good && lines.filled ? memrchr (lines.buffer, '\n', lines.filled) : NULL;
  gsize n = last ? (gsize) (last + 1 - lines.buffer) : 0;
  g_autoptr (AntTableLayout) layout = n ? ant_text_layout_find (path, lines.buffer, n, NULL) : NULL;
  gboolean named = FALSE;
  g_autoptr (GString) names = g_string_new ("text");
  for (guint c = 0; layout && c < layout->n_columns; c++)
    {
      g_ptr_array_add (look->columns, g_strdup (layout->columns[c].label));
      g_string_append_printf (names, "\t%s", layout->columns[c].label);
      named |= *layout->columns[c].name != 0;
    }
  if (good)
    look_at_lines (look, lines.buffer, n);
  look->kind = named ? g_string_free (g_steal_pointer (&names), FALSE) : kind_of_name (path, "text");
  ant_line_source_clear (&lines);
  return good;
}

AntFileLook *
ant_file_look_new (const char *path, GError **error)
{
  gsize n;
  g_autoptr (AntByteSource) source = ant_byte_source_open (path, error);
  const guint8 *head = source ? ant_byte_source_peek (source, &n, error) : NULL;
  if (!head)
    return NULL;
  g_autoptr (AntFileLook) look = g_new0 (AntFileLook, 1);
  look->columns = g_ptr_array_new_with_free_func (g_free);
  look->lines = g_ptr_array_new_with_free_func (g_free);
  look->format = ant_reader_format (head, n);
  if (g_strcmp0 (look->format, "text") == 0)
    return look_at_text (look, source, path, error) ? g_steal_pointer (&look) : NULL;
  look->kind = kind_of_name (path, look->format ? look->format : "unknown");
  return g_steal_pointer (&look);
}

void
ant_file_look_free (AntFileLook *look)
{
  if (!look)
    return;
  g_clear_pointer (&look->columns, g_ptr_array_unref);
  g_clear_pointer (&look->lines, g_ptr_array_unref);
  g_free (look->kind);
  g_free (look);
}
