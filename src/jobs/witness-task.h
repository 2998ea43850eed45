/* witness-task.h - open a witness and make it ready to be drawn, without holding up the main loop. */
#pragma once

#include <gio/gio.h>
#include "data/comparison.h"
#include "data/settings.h"
#include "plot/pyramid.h"

/* What of a comparison a strip shows. */
typedef enum
{
  ANT_WITNESS_ITSELF,
  ANT_WITNESS_RATIO,
  ANT_WITNESS_DIFFERENCE,
  ANT_N_WITNESS_LOOKS,
} AntWitnessLook;

/* Immutable once made and counted. */
typedef struct
{
  AntComparison *comparison; /* owned reference */
  AntPyramid *pyramid[ANT_N_WITNESS_LOOKS];
  gint ref_count;
} AntWitnessStrips;
AntWitnessStrips *ant_witness_strips_ref (AntWitnessStrips *strips);
void ant_witness_strips_unref (AntWitnessStrips *strips); /* NULL is fine */

/* The record is referenced, witness and settings are copied; the callback runs in the caller's context. */
void ant_witness_task_async (AntRecord *record, const AntWitness *witness, const AntSettings *settings, GCancellable *cancellable,
                             GAsyncReadyCallback callback, gpointer data);
/* NULL with one sentence; G_IO_ERROR_CANCELLED if stopped. */
AntWitnessStrips *ant_witness_task_finish (GAsyncResult *result, GError **error);
