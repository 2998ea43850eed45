/* fold-data.h - a record folded on a period: averages about the middle of its events with their errors, the common shape,
 * and every event by itself. */
#pragma once

#include "data/settings.h"
#include "jobs/layers.h"
#include "plot/dip-closeup.h"
#include "plot/event-strips.h"

typedef struct
{
  double period_d, epoch_d, duration_d; /* epoch: middle of one event, days from the record's origin */
  double depth_ppm;                     /* of the common shape; NaN: taken from the fold */
} AntFold;

typedef struct
{
  AntDipCloseup closeup; /* its arrays, and those of strips, belong to this struct */
  AntShapeLine shape[1];
  double *numbers;
  AntEventStrips strips;
  AntEventStrip *strip;
  double *mid_d;         /* [strips.n] */
  GPtrArray *owned;
} AntFoldData;

/* A few milliseconds for a million samples. Never NULL; no points where nothing was observed. At most 400 events. */
AntFoldData *ant_fold_data_new (const AntLayers *layers, const AntSettings *settings, const AntFold *fold);
void ant_fold_data_free (AntFoldData *data); /* NULL is fine */
