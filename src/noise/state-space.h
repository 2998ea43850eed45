/* state-space.h - private to noise/: the terms of a model's covariance as decaying waves, and the walk over observed
 * places that the factor, the likelihood and the solver share.
 *
 * Term pairs carry covariance exp(-c lag) (a cos w lag + b sin w lag) = U_n . V_m exp(-c lag) with U, V rotating at w, so
 * that a step only multiplies by the real decay exp(-c dt), whatever the gap. Terms are padded to a multiple of 4 with zeros. */
#pragma once

#include <stddef.h>
#include "core/status.h"
#include "noise/noise-model.h"
#include "noise/series.h"

#define ANT_MAX_TERMS (2 * ANT_MAX_PARTS)

typedef struct
{
  size_t terms;                     /* padded count */
  size_t waves;                     /* oscillators: terms 2p, 2p+1 belong to wave p */
  size_t singles;                   /* exponentials: terms 2 waves .. 2 waves + singles - 1, which do not turn */
  double step_d;
  double a[ANT_MAX_TERMS / 2], b[ANT_MAX_TERMS / 2];
  double single[ANT_MAX_TERMS];     /* variance of each exponential */
  double decay_d[ANT_MAX_TERMS];    /* c of each term, per day */
  double rate_d[ANT_MAX_TERMS / 2]; /* w of each wave, radians per day */
  double turn_cos[ANT_MAX_TERMS / 2], turn_sin[ANT_MAX_TERMS / 2]; /* one step's rotation */
  double decay_step[ANT_MAX_TERMS]; /* exp(-c step) */
  double total;                     /* variance of all parts, ppm^2 */
} AntTerms;

/* Fill the terms of a model at a cadence. ANT_BAD_ARGUMENT for non-positive or non-finite parameters. */
AntStatus ant_terms_from_model (AntTerms *terms, const AntNoiseModel *model, double step_d);

/* A position on the grid with its rotating vectors, advanced from one observed place to the next. */
typedef struct
{
  size_t place;
  size_t since_exact; /* steps since the rotation was computed afresh */
  double cosine[ANT_MAX_TERMS / 2], sine[ANT_MAX_TERMS / 2];
  double decay[ANT_MAX_TERMS]; /* of the step just made */
  size_t decay_gap;            /* gap that `decay` holds */
} AntWalk;

void ant_walk_start (AntWalk *walk, const AntTerms *terms, size_t place);
/* Advance to a later place. */
void ant_walk_to (AntWalk *walk, const AntTerms *terms, size_t place);
/* U and V at the walk's place, [terms]. */
void ant_walk_vectors (const AntWalk *walk, const AntTerms *terms, double *u, double *v);
/* exp(-c gap) of every term for a gap of whole steps. */
void ant_terms_decay (const AntTerms *terms, size_t gap, double *decay);
