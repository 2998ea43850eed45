/* whitener.c - the kept factor of a gappy covariance, and exact answers from it. */
#include "noise/whitener.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/units.h"
#include "noise/factor.h"
#include "noise/whitener-private.h"

#define SAMPLE_COST 4 /* on the pace */

size_t ant_whitener_n (const AntWhitener *whitener) { return whitener->n; }
size_t ant_whitener_observed (const AntWhitener *whitener) { return whitener->observed; }
const unsigned *ant_whitener_places (const AntWhitener *whitener) { return whitener->place; }
const double *ant_whitener_variance (const AntWhitener *whitener) { return whitener->d; }
const double *ant_whitener_precision (const AntWhitener *whitener) { return whitener->precision; }
double ant_whitener_log_det (const AntWhitener *whitener) { return whitener->log_det; }

void
ant_whitener_free (AntWhitener *whitener)
{
  if (!whitener)
    return;
  free (whitener->place);
  free (whitener->next);
  free (whitener->d);
  free (whitener->precision);
  free (whitener->u);
  free (whitener->w);
  free (whitener->tail);
  free (whitener->level);
  free (whitener);
}

static AntStatus
reserve (AntWhitener *whitener, const AntSeries *series)
{
  size_t m = whitener->observed, terms = whitener->terms.terms;
  whitener->every = m > 20000 ? 32 : 8;
  size_t checkpoints = m / whitener->every + 1;
  whitener->place = malloc (m * sizeof *whitener->place);
  whitener->next = malloc ((series->n + 1) * sizeof *whitener->next);
  whitener->d = malloc (m * sizeof *whitener->d);
  whitener->precision = malloc (m * sizeof *whitener->precision);
  whitener->u = malloc (m * terms * sizeof *whitener->u);
  whitener->w = malloc (m * terms * sizeof *whitener->w);
  whitener->tail = malloc (checkpoints * terms * terms * sizeof *whitener->tail);
  if (!whitener->place || !whitener->next || !whitener->d || !whitener->precision || !whitener->u || !whitener->w
      || !whitener->tail)
    return ANT_NO_MEMORY;
  size_t at = 0;
  for (size_t i = 0; i < series->n; i++)
    {
      whitener->next[i] = (unsigned) at;
      if (!isnan (series->value_ppm[i]))
        whitener->place[at++] = (unsigned) i;
    }
  whitener->next[series->n] = (unsigned) at;
  return ANT_OK;
}

static inline __attribute__ ((always_inline)) AntStatus
factor (AntWhitener *whitener, size_t width, const AntNoiseModel *model, const AntSeries *series)
{
  const AntTerms *terms = &whitener->terms;
  AntFactorState state;
  AntWalk walk;
  memset (&state, 0, sizeof state);
  ant_walk_start (&walk, terms, whitener->place[0]);
  for (size_t i = 0; i < whitener->observed; i++)
    {
      size_t place = whitener->place[i];
      if (i % ANT_PACE_EVERY == 0 && !ant_pace_on (whitener->pace, SAMPLE_COST * ANT_PACE_EVERY))
        return ANT_STOPPED;
      if (i)
        ant_walk_to (&walk, terms, place);
      ant_walk_vectors (&walk, terms, (double *) state.u, (double *) state.v);
      memcpy (state.decay, walk.decay, sizeof state.decay);
      double r = ant_noise_model_variance (model, series->error_ppm ? (double) series->error_ppm[place] : 0,
                                           series->bin_count ? (double) series->bin_count[place] : 1);
      ant_factor_step (&state, width / 4, terms->total + r);
      if (!(state.d > 0) || !isfinite (state.d))
        return ANT_NOT_POSITIVE;
      whitener->d[i] = state.d;
      memcpy (whitener->u + i * width, state.u, width * sizeof (double));
      memcpy (whitener->w + i * width, state.w, width * sizeof (double));
      whitener->log_det += log (state.d);
    }
  return ANT_OK;
}

/* Backwards: the energy matrix of a state that enters sample i, from that of one that enters i+1.
 * O_i = (I - U W') M (I - W U') + U U'/d with M = decay O_(i+1) decay. */
static inline __attribute__ ((always_inline)) void
tails (AntWhitener *whitener, size_t width)
{
  AntFour o[ANT_MAX_TERMS * ANT_MAX_TERMS / 4] = { { 0 } }, u[ANT_MAX_TERMS / 4], q[ANT_MAX_TERMS / 4];
  double decay[ANT_MAX_TERMS] __attribute__ ((aligned (32))) = { 0 };
  size_t m = whitener->observed, fours = width / 4, bytes = width * width * sizeof (double);
  if (m % whitener->every == 0)
    memset (whitener->tail + m / whitener->every * width * width, 0, bytes);
  for (size_t i = m; i-- > 0;)
    {
      if (i % ANT_PACE_EVERY == 0 && !ant_pace_on (whitener->pace, SAMPLE_COST * ANT_PACE_EVERY))
        return;
      if (i + 1 < m)
        ant_terms_decay (&whitener->terms, whitener->place[i + 1] - whitener->place[i], decay);
      const double *uj = whitener->u + i * width, *w = whitener->w + i * width, *qj = (const double *) q;
      double own = 1.0 / whitener->d[i];
      memcpy (u, uj, width * sizeof (double));
      memset (q, 0, sizeof q);
      for (size_t j = 0; j < width; j++)
        for (size_t k = 0; k < fours; k++)
          {
            o[j * fours + k] = decay[j] * o[j * fours + k] * ((const AntFour *) decay)[k];
            q[k] += o[j * fours + k] * w[j];
          }
      for (size_t k = 0; k < width; k++)
        own += qj[k] * w[k];
      whitener->precision[i] = own;
      for (size_t j = 0; j < width; j++)
        for (size_t k = 0; k < fours; k++)
          o[j * fours + k] += (own * uj[j] - qj[j]) * u[k] - uj[j] * q[k];
      if (i % whitener->every == 0)
        memcpy (whitener->tail + i / whitener->every * width * width, o, bytes);
    }
}

ANT_SIMD static AntStatus
factor_any_width (AntWhitener *whitener, const AntNoiseModel *model, const AntSeries *series)
{
  size_t width = whitener->terms.terms;
  AntStatus status = width == 12   ? factor (whitener, 12, model, series)
                     : width == 16 ? factor (whitener, 16, model, series)
                                   : factor (whitener, width, model, series);
  if (status)
    return status;
  if (width == 12)
    tails (whitener, 12);
  else if (width == 16)
    tails (whitener, 16);
  else
    tails (whitener, width);
  return ant_pace_stopped (whitener->pace) ? ANT_STOPPED : ANT_OK;
}

AntWhitener *
ant_whitener_new (const AntNoiseModel *model, const AntSeries *series, AntStatus *status)
{
  AntWhitener *whitener = calloc (1, sizeof *whitener);
  if (!whitener)
    {
      *status = ANT_NO_MEMORY;
      return NULL;
    }
  whitener->n = series->n;
  whitener->pace = series->pace;
  whitener->observed = ant_series_observed (series, 0);
  *status = whitener->observed ? ant_terms_from_model (&whitener->terms, model, series->step_d) : ANT_NO_DATA;
  if (!*status)
    *status = reserve (whitener, series);
  if (!*status)
    *status = factor_any_width (whitener, model, series);
  if (*status)
    {
      ant_whitener_free (whitener);
      return NULL;
    }
  return whitener;
}

ANT_SIMD void
ant_whitener_innovations (const AntWhitener *whitener, const float *value, double *innovation)
{
  size_t width = whitener->terms.terms;
  double memory[ANT_MAX_TERMS] = { 0 }, scratch[ANT_MAX_TERMS];
  for (size_t i = 0; i < whitener->observed; i++)
    {
      const double *u = whitener->u + i * width;
      if (i)
        {
          const double *decay = ant_decay_before (whitener, i, scratch), *w = whitener->w + (i - 1) * width;
          for (size_t j = 0; j < width; j++)
            memory[j] = decay[j] * (memory[j] + w[j] * innovation[i - 1]);
        }
      double predicted = 0;
      for (size_t j = 0; j < width; j++)
        predicted += u[j] * memory[j];
      innovation[i] = (double) value[whitener->place[i]] - predicted;
    }
}

/* Backward substitution through L' D: z over D^-1 innovation, in place on the grid. */
ANT_SIMD static void
substitute_back (const AntWhitener *whitener, const double *innovation, double *z)
{
  size_t width = whitener->terms.terms;
  double memory[ANT_MAX_TERMS] = { 0 }, scratch[ANT_MAX_TERMS];
  for (size_t i = whitener->observed; i-- > 0;)
    {
      const double *u = whitener->u + i * width, *w = whitener->w + i * width;
      double known = 0;
      for (size_t j = 0; j < width; j++)
        known += w[j] * memory[j];
      double value = innovation[i] / whitener->d[i] - known;
      z[whitener->place[i]] = value;
      if (i == 0)
        break;
      const double *decay = ant_decay_before (whitener, i, scratch);
      for (size_t j = 0; j < width; j++)
        memory[j] = decay[j] * (memory[j] + u[j] * value);
    }
}

AntStatus
ant_whitener_solve (const AntWhitener *whitener, const float *value, double *z)
{
  double *innovation = malloc (whitener->observed * sizeof *innovation), moment = 0;
  if (!innovation)
    return ANT_NO_MEMORY;
  memset (z, 0, whitener->n * sizeof *z);
  ant_whitener_innovations (whitener, value, innovation);
  substitute_back (whitener, innovation, z);
  free (innovation);
  if (!whitener->level)
    return ANT_OK;
  for (size_t i = 0; i < whitener->n; i++)
    moment += z[i];
  for (size_t i = 0; i < whitener->n; i++)
    z[i] -= moment / whitener->level_energy * whitener->level[i];
  return ANT_OK;
}

AntWhitener *
ant_whitener_new_free_level (const AntNoiseModel *model, const AntSeries *series, AntStatus *status)
{
  AntWhitener *whitener = ant_whitener_new (model, series, status);
  if (!whitener)
    return NULL;
  float *ones = malloc (whitener->n * sizeof *ones);
  double *level = malloc (whitener->n * sizeof *level);
  *status = ones && level ? ANT_OK : ANT_NO_MEMORY;
  for (size_t i = 0; i < whitener->n && !*status; i++)
    ones[i] = 1;
  if (!*status)
    *status = ant_whitener_solve (whitener, ones, level);
  for (size_t i = 0; i < whitener->n && !*status; i++)
    whitener->level_energy += level[i];
  whitener->level = level; /* only now: until here solutions were those of C^-1 itself */
  free (ones);
  if (*status)
    {
      ant_whitener_free (whitener);
      return NULL;
    }
  return whitener;
}

double
ant_whitener_level (const AntWhitener *whitener, const float *value)
{
  double moment = 0;
  for (size_t i = 0; i < whitener->observed; i++)
    moment += whitener->level[whitener->place[i]] * (double) value[whitener->place[i]];
  return moment / whitener->level_energy;
}
