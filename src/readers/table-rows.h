/* table-rows.h - the rows of a text table while they are read: growing columns of numbers and a tally of what was odd. */
#pragma once

#include "readers/table-layout.h"
#include "readers/time-form.h"
#include "readers/value-columns.h"

typedef struct
{
  gsize n, room;
  guint32 n_lines; /* of text that have been parsed */
  double *time_d, *error;
  double *values[ANT_MOST_CANDIDATES];
  float *further[ANT_MOST_FURTHER];
  gint64 *quality;
  guint32 *line;

  gsize n_no_time, n_text_values, n_no_quality; /* times, values, qualities that could not be read */
  gsize n_other_width;                          /* lines with another number of cells, left out */
  guint32 first_no_time, first_text_value, first_other_width; /* their first lines */
  guint other_width;                            /* cells found there */
  char *no_time_text, *text_value;              /* what stood there first */
} AntTableRows;

/* What is to be read of each line of a text table, and how; the form is its own copy, so that slices can go on by themselves. */
typedef struct _AntRowParser AntRowParser;
AntRowParser *ant_row_parser_new (const AntTableLayout *layout, const AntTimeForm *form, const AntValueColumns *columns);
void ant_row_parser_free (AntRowParser *parser);
void ant_row_parser_set_form (AntRowParser *parser, const AntTimeForm *form);

/* Room for so many rows in all; they may be more or fewer. */
void ant_table_rows_expect (AntTableRows *rows, const AntValueColumns *columns, gsize n);

typedef enum { ANT_ROWS_GOOD, ANT_ROWS_NUL, ANT_ROWS_LONG_LINE } AntRowsFault;

/* Add the rows of the whole lines [start, end), each ended by a newline. Line numbers count from rows->n_lines + 1, and n_lines
 * goes on; after a fault it is the last line before the faulty one. */
AntRowsFault ant_table_rows_parse (AntTableRows *rows, AntRowParser *parser, const char *start, const char *end);
/* Read times until one can be read: that sets the origin. */
void ant_row_parser_start_form (AntRowParser *parser, const char *start, const char *end, AntTimeForm *form);
/* Add the rows of `more` behind, its lines after those of `rows`; `more` is emptied but keeps its room. */
void ant_table_rows_append (AntTableRows *rows, AntTableRows *more, const AntValueColumns *columns);
void ant_table_rows_clear (AntTableRows *rows);
