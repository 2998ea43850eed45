/* factor.h - private to noise/: one step of the factor C = L D L', shared by the likelihood (which keeps nothing) and the
 * whitener (which keeps U, W and D). */
#pragma once

#include "core/simd.h"
#include "noise/state-space.h"

typedef struct
{
  AntFour s[ANT_MAX_TERMS * ANT_MAX_TERMS / 4]; /* what earlier samples explain, in V's coordinates; row-major, terms wide */
  AntFour u[ANT_MAX_TERMS / 4], v[ANT_MAX_TERMS / 4], w[ANT_MAX_TERMS / 4], decay[ANT_MAX_TERMS / 4];
  double d; /* innovation variance of the present sample */
} AntFactorState;

/* Decay what is explained to the present sample, having learnt the sample before (state->w, state->d), then find the new
 * d and w. u, v, decay are those of the present sample. `fours` = terms/4 is a constant at each call so that loops unroll. */
static inline __attribute__ ((always_inline)) void
ant_factor_step (AntFactorState *state, size_t fours, double variance)
{
  const double *u = (const double *) state->u, *w = (const double *) state->w, *decay = (const double *) state->decay;
  AntFour explained[ANT_MAX_TERMS / 4], known = { 0 };
  for (size_t k = 0; k < fours; k++)
    explained[k] = known;
  for (size_t j = 0; j < 4 * fours; j++)
    {
      double learnt = state->d * w[j] * decay[j], keep = decay[j], uj = u[j];
      AntFour *row = state->s + j * fours;
      for (size_t k = 0; k < fours; k++)
        {
          row[k] = state->decay[k] * (keep * row[k] + learnt * state->w[k]);
          explained[k] += uj * row[k];
        }
    }
  for (size_t k = 0; k < fours; k++)
    known += state->u[k] * explained[k];
  state->d = variance - ((known[0] + known[1]) + (known[2] + known[3]));
  double scale = 1.0 / state->d;
  for (size_t k = 0; k < fours; k++)
    state->w[k] = (state->v[k] - explained[k]) * scale;
}
