/* priors.h - everything that is assumed before the data are looked at: the range of each parameter, how often each cause
 * shows itself, and in which shapes. docs/verdict.md prints this table.
 *
 * The epoch is uniform in time, so that a cause enters with its rate and no trial is ever counted: the integral over
 * epoch and duration is the trials factor, and it does not know the cadence. */
#pragma once

#include "verdict/cause.h"
#include "verdict/rival-curve.h"

/* Depths: uniform in ln between these, of every shape (a crossing's radius ratio: between the square roots). */
#define ANT_PRIOR_DEPTH_LOW_PPM 1.0
#define ANT_PRIOR_DEPTH_HIGH_PPM 1e6

typedef struct
{
  double low, high;
  int logarithmic; /* uniform in ln instead of uniform */
} AntPriorRange;

/* Lengths of crossing and trapezoid are limited between the middles of their edges: the data pin those down, whatever the
 * edges are. */
typedef struct
{
  const char *name; /* "crossing": untranslated, static */
  size_t n;         /* parameters after the epoch */
  AntPriorRange range[ANT_RIVAL_PARAMETERS - 1];
  int either_sign;  /* an event of one sign may come from an amplitude of the other (a step up ends a dip) */
  AntCause cause[2];  /* of dips, of brightenings */
  double share[2];    /* of that cause's rate that has this shape, for dips and for brightenings; 0: is not one */
} AntRivalPrior;

const AntRivalPrior *ant_rival_prior (AntRivalKind kind);

/* Events of each cause, per year of observed time and over the whole range of depths. Noise has none: it comes from
 * the expected number of false dips. */
typedef struct
{
  double per_year[ANT_N_CAUSES];
} AntCauseRates;
