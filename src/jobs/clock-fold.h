/* clock-fold.h - any strip or column of the window folded by a clock of the instrument's own, without holding up the main loop. */
#pragma once

#include <gio/gio.h>
#include "data/comparison.h"
#include "data/fold.h"
#include "jobs/layers.h"
#include "jobs/witness-task.h"

typedef enum
{
  ANT_CLOCK_IRRADIANCE,
  ANT_CLOCK_RESIDUAL, /* of the rotation curve */
  ANT_CLOCK_COLUMN,   /* the record's i-th further column */
  ANT_CLOCK_WITNESS,  /* a look at a comparison */
} AntClockSource;

/* What is to be folded; all of it borrowed. */
typedef struct
{
  AntClockSource source;
  AntLayers *layers;
  guint column;
  AntComparison *comparison;
  AntWitnessLook look;
  AntFoldOptions options;
} AntClockWish;

typedef struct
{
  AntFoldOptions options;
  AntFoldBin bin[ANT_MOST_FOLD_BINS]; /* [options.n_bins] */
  double swing, significance;         /* ant_fold_swing */
} AntClockFold;

/* References are kept; the callback runs in the caller's context. */
void ant_clock_fold_async (const AntClockWish *wish, GCancellable *cancellable, GAsyncReadyCallback callback, gpointer data);
/* NULL with one sentence, or if it was stopped; else the caller frees by g_free. */
AntClockFold *ant_clock_fold_finish (GAsyncResult *result, GError **error);
