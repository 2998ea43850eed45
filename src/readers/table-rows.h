/* table-rows.h - the rows of a text table while they are read: growing columns of numbers and a tally of what was odd. */
#pragma once

#include "readers/line-source.h"
#include "readers/table-layout.h"
#include "readers/time-form.h"
#include "readers/value-columns.h"

typedef struct
{
  gsize n, room;
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

/* Read all lines from the layout's first row on. FALSE on a fault of the source or a cancel. */
gboolean ant_table_rows_read (AntTableRows *rows, AntLineSource *lines, const AntTableLayout *layout, AntTimeForm *form,
                              const AntValueColumns *columns, GError **error);
void ant_table_rows_clear (AntTableRows *rows);
