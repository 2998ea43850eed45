/* line-source.h - lines of a byte source in a buffer of bounded size, to be parsed in place. */
#pragma once

#include "readers/byte-source.h"

#define ANT_LONGEST_LINE (1024 * 1024)

typedef struct
{
  AntByteSource *source;     /* borrowed */
  GCancellable *cancellable; /* borrowed, or NULL */
  char *buffer;              /* [ANT_LONGEST_LINE + 2] */
  gsize at, filled;          /* what is left to hand out */
  gboolean at_end;           /* the source has no more */
  guint32 line;              /* number of the line last handed out, from 1 */
} AntLineSource;

void ant_line_source_init (AntLineSource *lines, AntByteSource *source, GCancellable *cancellable);
void ant_line_source_clear (AntLineSource *lines);
/* Have at least n bytes (at most ANT_LONGEST_LINE) of what comes next in the buffer, fewer only at the end. */
gboolean ant_line_source_fill (AntLineSource *lines, gsize n, GError **error);
/* The next line, [start, end) without its line end; a character that belongs to no number stands at *end.
 * 1; 0 at the end; -1 with an error: a NUL byte, a line longer than ANT_LONGEST_LINE, a fault of the source. */
int ant_line_source_next (AntLineSource *lines, const char **start, const char **end, GError **error);
