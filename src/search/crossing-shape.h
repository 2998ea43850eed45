/* crossing-shape.h - the shape of a crossing at continuous parameters, averaged over the exposure of each sample.
 *
 * Normalised so that its greatest loss before smearing is 1. The radius ratio follows from duration, ingress and impact
 * (core/transit-curve.h). The loss is tabulated once for a shape and integrated, so that averaging over any exposure is
 * a difference of two readings. */
#pragma once

#include <stddef.h>
#include "core/transit-curve.h"

#define ANT_SHAPE_NODES 96
#define ANT_SHAPE_IMPACT 0.3 /* of the bank: between a central and a typical chord (2/pi would be the mean) */

typedef struct
{
  double duration_d, edge_d, impact;
  double time_d[ANT_SHAPE_NODES];   /* from the middle outwards, 0 .. duration/2 */
  double loss[ANT_SHAPE_NODES];     /* normalised */
  double total_d[ANT_SHAPE_NODES];  /* integral of loss from the middle */
} AntCrossingShape;

/* 0 < edge_d <= duration_d/2, 0 <= impact < 1. */
void ant_crossing_shape_init (AntCrossingShape *shape, double duration_d, double edge_d, double impact,
                              AntLimbDarkening ld);
/* The same of a given crossing, 0 <= impact < 1 + radius ratio: the edge follows. */
void ant_crossing_shape_of (AntCrossingShape *shape, const AntCrossing *crossing, AntLimbDarkening ld);
/* Mean loss over an exposure of exposure_d (> 0) centred `time_d` from the middle. */
double ant_crossing_shape_mean (const AntCrossingShape *shape, double time_d, double exposure_d);
/* Mean of the loss over I..IV. */
double ant_crossing_shape_average (const AntCrossingShape *shape);

/* Samples of the shape, times `scale`, for a middle at (fractional) place `centre`: value[0..return-1] stand at places
 * *first onwards. At most `room` are written; 0 is returned if more would be needed. value has `stride` between samples. */
size_t ant_crossing_shape_sample (const AntCrossingShape *shape, double centre, double step_d, double exposure_d,
                                  double scale, ptrdiff_t *first, size_t room, size_t stride, double *value);
