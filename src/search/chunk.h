/* chunk.h - the pieces that a long record is cut into, each with a noise model of its own: the Sun's noise changes shape
 * over the cycle. Pieces overlap; an epoch belongs to the piece whose middle part it falls in. */
#pragma once

#include <stdint.h>
#include "core/status.h"
#include "noise/noise-fit.h"
#include "search/dip-map.h"

#define ANT_MAX_FLOOR 64

/* What the record shows of the model's fitness in one chunk. */
typedef struct
{
  size_t observed, spikes, refits;
  double innovation_rms;   /* of innovations over their stated sigma: 1 when the model fits */
  double lag1;             /* correlation of neighbouring innovations: 0 when the model fits */
  double loudest, quietest; /* innovation rms in windows of 4 d (400 samples where that is longer);
                               NaN below 3 windows */
  unsigned char unconstrained[ANT_MAX_FREE]; /* free parameters that only the prior decides */
} AntChunkHealth;

typedef struct
{
  size_t first, n;          /* places of the record */
  double own_from, own_to;  /* places of the record whose epochs belong here: own_from <= p < own_to */
  const AntStop *stop;      /* borrowed: fits of this chunk look at it; NULL: never */
  AntNoiseModel model;
  AntFitReport fit;
  double curvature[ANT_MAX_FREE * ANT_MAX_FREE]; /* inverse Hessian of the fit, to start refits warm */
  AntChunkHealth health;
  size_t n_floor;
  AntFloorPoint floor[ANT_MAX_FLOOR];
  size_t n_bins;
  double *frequency_cd, *power_unmasked; /* [n_bins] measured spectrum with the mask's effect removed; owned by the scan */
} AntChunk;

typedef struct
{
  double length_d;   /* 0: 90 below a 10-min cadence, else 180 */
  double overlap_d;  /* 20 */
} AntChunkOptions;

/* Cut a series: chunk [room] out, returns how many (1 for a series up to 1.3 lengths). Stretches with too little data are lengthened
 * until they hold enough for a fit. (size_t)-1 if room is too small. */
size_t ant_chunks_plan (const AntSeries *series, const AntChunkOptions *options, size_t room, AntChunk *chunk);
/* Upper bound of the count, for room. */
size_t ant_chunks_room (const AntSeries *series, const AntChunkOptions *options);

/* How much of a place belongs to a chunk: 1 in its own part, falling to 0 over the overlap (in places) with each
 * neighbour, so that the shares of neighbours add up to 1 if own parts are longer than the overlap. */
double ant_chunk_share (const AntChunk *chunk, double overlap, double place);

/* Fit the noise of a part in place, starting from chunk->model under its priors (and, if warm, from chunk->curvature);
 * spike [part->n] in/out: isolated
 * outliers (beyond 5.5 robust sigma of the forecast from all other samples, and from both neighbours on the same side)
 * are added with value ANT_SPIKE_FOUND and the fit repeated. Health's rms, lag and counts are filled. */
#define ANT_SPIKE_FOUND 1
#define ANT_SPIKE_DIP 2 /* inside a strong dip: out of the fit as long as the dip is being weighed */
AntStatus ant_chunk_fit (AntChunk *chunk, const AntSeries *part, uint8_t *spike, size_t max_steps, int warm);
/* Refit with more samples masked, from the chunk's model and curvature: a few warm steps. */
AntStatus ant_chunk_refit (const AntChunk *chunk, const AntSeries *part, AntNoiseModel *model);
