/* value-columns.h - which columns of a text table hold its values, their errors and its quality. */
#pragma once

#include "data/record.h"
#include "readers/reader.h"
#include "readers/table-layout.h"
#include "readers/time-form.h"

#define ANT_MOST_CANDIDATES 16
#define ANT_MOST_FURTHER 64 /* further columns that are kept: the next ones are left out, which is said */

typedef struct
{
  /* Columns that may hold the value, in order; the choice falls when all rows are read. */
  guint n_values, values[ANT_MOST_CANDIDATES];
  int error, quality; /* -1 if there is none */
  guint n_further, further[ANT_MOST_FURTHER]; /* the other columns of numbers, in order */
  gboolean interleaved; /* every value is followed by its flag; quality is the value's */
  guint n_left_out; /* more of them than are kept */
} AntValueColumns;

/* By the user's choices ("none" for no error or quality), else by names (error, quality) and contents (value). FALSE with
 * one sentence. */
gboolean ant_value_columns_find (const AntTableLayout *layout, const AntTimeForm *form, const AntReadingChoices *choices,
                                 const char *path, AntValueColumns *columns, GError **error);
/* The unit by the column's own words: one of ours for its many spellings. NULL if unknown. Caller frees. */
char *ant_value_columns_own_unit (const AntTableColumn *column);
/* The same, else as the header says for all values. */
char *ant_value_columns_unit (const AntTableLayout *layout, guint column);
