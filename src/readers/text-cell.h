/* text-cell.h - one cell of a text table: where it stands and what it holds. */
#pragma once

#include <glib.h>
#include "readers/number-cursor.h"

typedef enum
{
  ANT_CELL_MISSING, /* empty, "-", NaN, NA, null and the like */
  ANT_CELL_NUMBER,
  ANT_CELL_TEXT
} AntCellKind;

typedef struct
{
  const char *start, *end; /* blanks and quotes around it taken off */
  double number;           /* NaN unless a number */
  AntCellKind kind;
} AntCell;

/* Read the cell that begins at `at` and return the place after its separator (after its last character where the line
 * ends: NULL then). `separator` is ',', ';', '\t', or ' ' for runs of blanks. *end must not belong to a number. */
const char *ant_cell_next (const char *at, const char *end, char separator, AntCell *cell);
/* The same, with the way of a bare number between separators inlined for the loop over all rows; the line's memory goes on for eight
 * characters behind its end. */
static inline const char *
ant_cell_next_number (const char *at, const char *end, char separator, AntCell *cell)
{
  const char *after = ant_number_read_padded (at, &cell->number);
  if (!after || (after != end && *after != separator) || separator == ' ')
    return ant_cell_next (at, end, separator, cell);
  cell->start = at;
  cell->end = after;
  cell->kind = ANT_CELL_NUMBER;
  return after == end ? NULL : after + 1;
}

/* The same without looking at what the cell holds. */
const char *ant_cell_skip (const char *at, const char *end, char separator);
/* All cells of a line, the first `most` of them kept. Returns how many there are. */
guint ant_cell_split (const char *start, const char *end, char separator, guint most, AntCell *cells);
/* The line's first character past blanks; `end` for a blank line. */
const char *ant_cell_skip_blanks (const char *at, const char *end);
gboolean ant_cell_is_comment_mark (char c); /* # ; % ! */
/* A 64-bit whole number, exactly. FALSE if it is none. */
gboolean ant_cell_integer (const AntCell *cell, gint64 *value);
