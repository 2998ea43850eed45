/* row-order.h - which rows of a record can be used, in the order of time. Inside the data room only.
 *
 * Flags rows as fill, without a time, bad by quality, duplicate and excluded; what is found is said. */
#pragma once

#include "data/record.h"

/* The rows that have a time of their own, sorted by it: row[k] is an index into the record's arrays. */
typedef struct
{
  gsize n;
  guint32 *row;    /* [n] */
  double *time_d;  /* [n] strictly increasing, as stamped */
} AntRowOrder;

void ant_row_order_clear (AntRowOrder *order);
/* Flags values and quality, sorts, flags duplicates. FALSE with one sentence if the times run backwards. */
gboolean ant_row_order_make (AntRowOrder *order, AntRecord *record, const AntGridOptions *options, GError **error);
/* Flags the rows whose stamps lie outside from/to or inside an excluded span: people name times as the record does. */
void ant_row_order_judge_spans (const AntRowOrder *order, AntRecord *record, const AntGridOptions *options);
/* A row that the search may use: no flag but a spike. */
static inline gboolean
ant_row_used (const AntRecord *record, guint32 row)
{
  return (record->flags[row] & ~ANT_FLAG_SPIKE) == 0;
}
/* Drop the rows before the first good one and after the last; there must be one. */
void ant_row_order_trim (AntRowOrder *order, const AntRecord *record);
gsize ant_row_order_count_good (const AntRowOrder *order, const AntRecord *record);
/* FALSE with one sentence, which counts the reasons, if fewer than 50 rows are good. */
gboolean ant_row_order_require_good (const AntRowOrder *order, const AntRecord *record, GError **error);
