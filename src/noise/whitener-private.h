/* whitener-private.h - what the files that work on a kept factor share. Private to noise/. */
#pragma once

#include "noise/state-space.h"
#include "noise/whitener.h"

struct _AntWhitener
{
  AntTerms terms;
  size_t n, observed;
  size_t every;     /* observed samples between checkpoints */
  unsigned *place;  /* [observed] */
  unsigned *next;   /* [n+1] index of the first observed sample at or after a place */
  double *d;        /* [observed] */
  double *precision; /* [observed] diagonal of C^-1 */
  double *u, *w;    /* [observed][terms] */
  double *tail;     /* [observed/every + 1][terms*terms]: energy that a state entering the checkpoint leaves behind */
  double log_det;
  AntPace *pace;    /* of the series, or NULL */
  double *level;        /* [n] C^-1 1 on the grid, or NULL where the level is known to be 0 */
  double level_energy;  /* 1' C^-1 1 */
};

/* Decay between observed samples i-1 and i. The result is either the table for one step or `scratch`. */
static inline const double *
ant_decay_before (const AntWhitener *whitener, size_t i, double *scratch)
{
  size_t gap = whitener->place[i] - whitener->place[i - 1];
  if (gap == 1)
    return whitener->terms.decay_step;
  ant_terms_decay (&whitener->terms, gap, scratch);
  return scratch;
}
