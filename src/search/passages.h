/* passages.h - spot groups rotating past: minima of the slow part of a record that last days.
 *
 * The slow part is what the data say about those parts of the noise model that vary over half a day and more (its
 * conditional mean about the fitted level, noise/smoother.h), dips taken out first. A passage is a minimum of that curve; its shoulders are where
 * the straight line over it touches the curve on both sides, before ground lower than the minimum and within 14 d, and on
 * both the curve rises by half the depth at least: a ripple on another's flank does not. Depth is measured from that line;
 * start and end are where half of it is reached, 1 to 14 d apart, and the middle is halfway: a fault of the instrument in
 * the passage moves it less than the lowest point. A passage is listed if its depth is at least 4 times its own
 * uncertainty given the model (4, since the minimum and its shoulders are the most telling of many places): below that the
 * record does not show the dip, the smoothing does, in a gap above all. That is a statement about the record and no
 * false-alarm claim: the Sun does this. */
#pragma once

#include <stddef.h>
#include "core/status.h"
#include "noise/noise-model.h"
#include "noise/series.h"

#define ANT_PASSAGE_SHORTEST_D 1.0
#define ANT_PASSAGE_LONGEST_D 14.0
#define ANT_PASSAGE_SIGMAS 4.0

typedef struct
{
  double start_d, mid_d, end_d; /* days from the record's origin */
  double depth_ppm, depth_sigma_ppm;
  double coverage;              /* observed fraction of start to end */
  size_t chunk;                 /* whose noise model smoothed it */
} AntPassage;

/* Trace the slow part of a series (its events taken out) under a noise model, gaps included: slow_ppm [part->n] out,
 * and the passages by time, *passage the caller's to free. */
AntStatus ant_passages_trace (const AntNoiseModel *model, const AntSeries *part, float *slow_ppm, size_t *n_passages,
                              AntPassage **passage);
