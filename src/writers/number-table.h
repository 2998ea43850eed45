/* number-table.h - any table of named columns of numbers under comment lines: floor.csv, spectrum.csv and the like. */
#pragma once

#include "data/record.h"

typedef struct
{
  const char *name;
  const double *number; /* [n_rows]; what is not finite becomes an empty field */
  const char *format;   /* of one double; NULL = "%.10g" */
} AntNumberColumn;

/* The preamble of csv.h with this title, each note as a comment line (NULL-terminated, or NULL), a header, the rows.
 * Caller frees. */
GString *ant_number_table_text (const AntRecord *record, const char *title, const char *const *notes, gsize n_columns,
                                const AntNumberColumn *columns, gsize n_rows);
