/* factor.h - private to noise/: one step of the factor C = L D L', shared by the likelihood (which keeps nothing) and the
 * whitener (which keeps U, W and D). */
#pragma once

#include "core/simd.h"
#include "noise/state-space.h"

typedef struct
{
  double s[ANT_MAX_TERMS * ANT_MAX_TERMS]; /* what earlier samples explain, in V's coordinates; row-major, terms wide */
  double u[ANT_MAX_TERMS], v[ANT_MAX_TERMS], w[ANT_MAX_TERMS];
  double d; /* innovation variance of the present sample */
} AntFactorState;

/* Decay what is explained to the present sample, having learnt the sample before (state->w, state->d), then find the new
 * d and w. u, v are those of the present sample. `terms` is a constant at each call so that the loops unroll. */
static inline __attribute__ ((always_inline)) void
ant_factor_step (AntFactorState *state, size_t terms, const double *decay, double variance)
{
  double explained[ANT_MAX_TERMS] = { 0 };
  for (size_t j = 0; j < terms; j++)
    {
      double learnt = state->d * state->w[j] * decay[j], u = state->u[j];
      double keep = decay[j];
      double *row = state->s + j * terms;
      for (size_t k = 0; k < terms; k++)
        {
          row[k] = decay[k] * (keep * row[k] + learnt * state->w[k]);
          explained[k] += row[k] * u;
        }
    }
  double known = 0;
  for (size_t k = 0; k < terms; k++)
    known += state->u[k] * explained[k];
  state->d = variance - known;
  double scale = 1.0 / state->d;
  for (size_t k = 0; k < terms; k++)
    state->w[k] = (state->v[k] - explained[k]) * scale;
}
