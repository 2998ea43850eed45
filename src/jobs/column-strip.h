/* column-strip.h - a further column of a record made ready to be drawn, without holding up the main loop. */
#pragma once

#include <gio/gio.h>
#include "data/record.h"
#include "plot/pyramid.h"

/* Immutable once made and counted. */
typedef struct
{
  AntRecord *record;       /* owned reference */
  const AntColumn *column; /* of the record */
  float *value;            /* [record->series.n] */
  AntPyramid *pyramid;
  gint ref_count;
} AntColumnStrip;
AntColumnStrip *ant_column_strip_ref (AntColumnStrip *strip);
void ant_column_strip_unref (AntColumnStrip *strip); /* NULL is fine */

/* The record's i-th further column. The record is referenced; the callback runs in the caller's context. */
void ant_column_strip_async (AntRecord *record, guint i, GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data);
/* NULL if it was stopped. */
AntColumnStrip *ant_column_strip_finish (GAsyncResult *result);
