/* line-source.c - a sliding buffer over a byte source. */
#include "readers/line-source.h"

#include <glib/gi18n.h>
#include <string.h>

#include "data/error.h"

#define BLOCK (256 * 1024) /* stays in the second-level cache while it is hashed and parsed */

void
ant_line_source_init (AntLineSource *lines, AntByteSource *source, GCancellable *cancellable)
{
  *lines = (AntLineSource){ .source = source, .cancellable = cancellable, .buffer = g_malloc (ANT_LONGEST_LINE + 2) };
}

void
ant_line_source_clear (AntLineSource *lines)
{
  g_clear_pointer (&lines->buffer, g_free);
}

static gboolean
refuse_nul (AntLineSource *lines, const char *nul, GError **error)
{
  guint line = lines->line + 1;
  for (const char *at = lines->buffer + lines->at; at < nul; at++)
    line += *at == '\n';
  g_set_error (error, ANT_ERROR, ANT_ERROR_READ, _("%s: line %u: found a NUL byte, expected text"),
               ant_byte_source_name (lines->source), line);
  return FALSE;
}

gboolean
ant_line_source_fill (AntLineSource *lines, gsize n, GError **error)
{
  if (lines->at > 0)
    {
      memmove (lines->buffer, lines->buffer + lines->at, lines->filled - lines->at);
      lines->filled -= lines->at;
      lines->at = 0;
    }
  while (!lines->at_end && lines->filled < n)
    {
      char *free_part = lines->buffer + lines->filled;
      if (g_cancellable_set_error_if_cancelled (lines->cancellable, error))
        return FALSE;
      gssize got = ant_byte_source_read (lines->source, free_part, MIN ((gsize) BLOCK, ANT_LONGEST_LINE - lines->filled), error);
      if (got < 0)
        return FALSE;
      const char *nul = got > 0 ? memchr (free_part, 0, (gsize) got) : NULL;
      if (nul)
        return refuse_nul (lines, nul, error);
      lines->filled += (gsize) got;
      lines->at_end = got == 0;
    }
  /* The last line may lack its end. */
  if (lines->at_end && lines->filled > 0 && lines->buffer[lines->filled - 1] != '\n')
    lines->buffer[lines->filled++] = '\n';
  return TRUE;
}

int
ant_line_source_next (AntLineSource *lines, const char **start, const char **end, GError **error)
{
  char *first = lines->buffer + lines->at;
  char *newline = lines->filled > lines->at ? memchr (first, '\n', lines->filled - lines->at) : NULL;
  while (!newline)
    {
      gsize seen = lines->filled - lines->at;
      if (lines->at_end && seen == 0)
        return 0;
      if (seen >= ANT_LONGEST_LINE || lines->line == G_MAXUINT32 - 1)
        {
          g_set_error (error, ANT_ERROR, ANT_ERROR_READ,
                       _("%s: line %u: found a line longer than %d bytes, expected a row of a table"),
                       ant_byte_source_name (lines->source), lines->line + 1, ANT_LONGEST_LINE);
          return -1;
        }
      if (!ant_line_source_fill (lines, seen + 1, error))
        return -1;
      first = lines->buffer;
      newline = lines->filled > seen ? memchr (first + seen, '\n', lines->filled - seen) : NULL;
    }
  lines->at = (gsize) (newline + 1 - lines->buffer);
  lines->line++;
  *start = first;
  *end = newline > first && newline[-1] == '\r' ? newline - 1 : newline;
  return 1;
}
