/* layers.h - what strips and ribbon are drawn from: a record's values, its rotation curve, what that leaves, and the
 * pyramids and averages of both. Immutable once made and counted, so that a window may draw while a job makes the next.
 */
#pragma once

#include <glib.h>
#include "data/record-summary.h"
#include "data/scan-results.h"
#include "plot/averages.h"
#include "plot/pyramid.h"

/* Lengths of the averages that can be drawn; the first is for "as fine as it gets". */
#define ANT_N_AVERAGES 4
extern const double ant_average_lengths_d[ANT_N_AVERAGES]; /* 10 min, 1 h, 6 h, 1 d */

typedef struct
{
  AntRecord *record; /* owned reference */
  AntRecordSummary summary;
  float *curve_ppm, *residual_ppm; /* [record->series.n] */
  AntPyramid *values, *residual;
  AntAverages *value_averages[ANT_N_AVERAGES], *residual_averages[ANT_N_AVERAGES];
  gint ref_count;
} AntLayers;

/* Seconds of work for a long record: call it off the main loop. The record must be gridded. results: their dips are
 * masked in the rotation curve; NULL: none are known. earlier: layers of the same record, whose summary is taken over,
 * or NULL. NULL with one sentence if the record is too poor for a curve. */
AntLayers *ant_layers_new (AntRecord *record, const AntSettings *settings, const AntScanResults *results,
                           const AntLayers *earlier, GError **error);
AntLayers *ant_layers_ref (AntLayers *layers);
void ant_layers_unref (AntLayers *layers); /* NULL is fine */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (AntLayers, ant_layers_unref)
