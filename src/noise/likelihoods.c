/* likelihoods.c - the likelihoods of eight models at once: each lane is a model, so the arithmetic needs no sideways sums
 * and only half of the symmetric matrix, and the walk over the record is shared. */
#include <math.h>
#include <string.h>
#include "core/simd.h"
#include "core/units.h"
#include "noise/state-space.h"
#include "noise/whitener.h"

#define LANES_COST 12 /* for each sample, on the pace */
#define EXACT_EVERY 128
#define TRIANGLE (ANT_MAX_TERMS * (ANT_MAX_TERMS + 1) / 2)

typedef struct
{
  size_t terms, waves; /* terms without padding */
  double step_d;
  AntEight a[ANT_MAX_PARTS], b[ANT_MAX_PARTS], single[ANT_MAX_PARTS];
  AntEight turn_cos[ANT_MAX_PARTS], turn_sin[ANT_MAX_PARTS], rate_d[ANT_MAX_PARTS];
  AntEight decay_step[ANT_MAX_TERMS], decay_d[ANT_MAX_TERMS];
  AntEight total;
} LaneTerms;

typedef struct
{
  size_t place, since_exact, decay_gap;
  AntEight cosine[ANT_MAX_PARTS], sine[ANT_MAX_PARTS], decay[ANT_MAX_TERMS];
  AntEight s[TRIANGLE]; /* lower triangle by rows */
  AntEight u[ANT_MAX_TERMS], v[ANT_MAX_TERMS], w[ANT_MAX_TERMS], memory[ANT_MAX_TERMS];
  AntEight d, innovation;
  AntEight quadratic, product, log_det;
  size_t n;
} LaneState;

static AntStatus
fill_terms (LaneTerms *lanes, size_t n, const AntNoiseModel *model, double step_d, AntTerms *terms)
{
  memset (lanes, 0, sizeof *lanes);
  for (size_t l = 0; l < ANT_LANES; l++)
    {
      /* Idle lanes repeat the first model; a bad one stands for it and is struck out at the end. */
      if (l < n && !ant_terms_from_model (terms, &model[l], step_d))
        ;
      else if (ant_terms_from_model (terms, &model[0], step_d))
        return ANT_BAD_ARGUMENT;
      lanes->terms = 2 * terms->waves + terms->singles;
      lanes->waves = terms->waves;
      lanes->step_d = step_d;
      lanes->total[l] = terms->total;
      for (size_t w = 0; w < terms->waves; w++)
        {
          lanes->a[w][l] = terms->a[w];
          lanes->b[w][l] = terms->b[w];
          lanes->rate_d[w][l] = terms->rate_d[w];
          lanes->turn_cos[w][l] = terms->turn_cos[w];
          lanes->turn_sin[w][l] = terms->turn_sin[w];
        }
      for (size_t e = 0; e < terms->singles; e++)
        lanes->single[e][l] = terms->single[e];
      for (size_t j = 0; j < lanes->terms; j++)
        {
          lanes->decay_d[j][l] = terms->decay_d[j];
          lanes->decay_step[j][l] = terms->decay_step[j];
        }
    }
  return ANT_OK;
}

static void
rotate_exactly (LaneState *state, const LaneTerms *terms)
{
  for (size_t w = 0; w < terms->waves; w++)
    for (size_t l = 0; l < ANT_LANES; l++)
      {
        double angle = terms->rate_d[w][l] * terms->step_d * (double) state->place;
        state->cosine[w][l] = cos (angle);
        state->sine[w][l] = sin (angle);
      }
  state->since_exact = 0;
}

static void
set_decay (LaneState *state, const LaneTerms *terms, size_t gap)
{
  if (gap == state->decay_gap)
    return;
  state->decay_gap = gap;
  if (gap == 1)
    memcpy (state->decay, terms->decay_step, terms->terms * sizeof *state->decay);
  else
    for (size_t j = 0; j < terms->terms; j++)
      for (size_t l = 0; l < ANT_LANES; l++)
        state->decay[j][l] = exp (-terms->decay_d[j][l] * terms->step_d * (double) gap);
}

static inline __attribute__ ((always_inline)) void
walk_to (LaneState *state, const LaneTerms *terms, size_t place)
{
  size_t gap = place - state->place;
  state->place = place;
  set_decay (state, terms, gap);
  if (gap > 1 || ++state->since_exact >= EXACT_EVERY)
    rotate_exactly (state, terms);
  else
    for (size_t w = 0; w < terms->waves; w++)
      {
        AntEight cosine = state->cosine[w], sine = state->sine[w];
        state->cosine[w] = cosine * terms->turn_cos[w] - sine * terms->turn_sin[w];
        state->sine[w] = sine * terms->turn_cos[w] + cosine * terms->turn_sin[w];
      }
}

static inline __attribute__ ((always_inline)) void
set_vectors (LaneState *state, const LaneTerms *terms)
{
  for (size_t w = 0; w < terms->waves; w++)
    {
      state->u[2 * w] = terms->a[w] * state->cosine[w] + terms->b[w] * state->sine[w];
      state->u[2 * w + 1] = terms->a[w] * state->sine[w] - terms->b[w] * state->cosine[w];
      state->v[2 * w] = state->cosine[w];
      state->v[2 * w + 1] = state->sine[w];
    }
  for (size_t j = 2 * terms->waves; j < terms->terms; j++)
    {
      state->u[j] = terms->single[j - 2 * terms->waves];
      state->v[j] = (AntEight){ 1, 1, 1, 1, 1, 1, 1, 1 };
    }
}

/* As ant_factor_step, with only the lower triangle kept. */
static inline __attribute__ ((always_inline)) void
learn (LaneState *state, size_t terms, double y, const AntEight *variance)
{
  AntEight explained[ANT_MAX_TERMS], predicted = { 0 }, known = { 0 };
  AntEight *s = state->s;
  for (size_t j = 0; j < terms; j++)
    {
      AntEight learnt = state->d * state->w[j], sum = { 0 }, keep = state->decay[j], uj = state->u[j];
      for (size_t k = 0; k < j; k++, s++)
        {
          *s = keep * state->decay[k] * (*s + learnt * state->w[k]);
          sum += *s * state->u[k];
          explained[k] += *s * uj;
        }
      *s = keep * keep * (*s + learnt * state->w[j]);
      explained[j] = sum + *s++ * uj;
      state->memory[j] = keep * (state->memory[j] + state->w[j] * state->innovation);
      predicted += uj * state->memory[j];
    }
  for (size_t j = 0; j < terms; j++)
    known += state->u[j] * explained[j];
  state->d = *variance - known;
  AntEight scale = 1.0 / state->d;
  for (size_t j = 0; j < terms; j++)
    state->w[j] = (state->v[j] - explained[j]) * scale;
  state->innovation = y - predicted;
  state->quadratic += state->innovation * state->innovation * scale;
  state->product *= state->d;
}

/* Sixteen innovation variances multiplied stay far from overflow; then a logarithm is taken. */
static void
settle_product (LaneState *state)
{
  for (size_t l = 0; l < ANT_LANES; l++)
    {
      state->log_det[l] += log (state->product[l]);
      state->product[l] = 1;
    }
}

static inline __attribute__ ((always_inline)) void
run (LaneState *state, const LaneTerms *terms, size_t width, size_t n_models, const AntNoiseModel *model,
     const AntSeries *series)
{
  int plain = !series->error_ppm && !series->bin_count;
  AntEight variance = { 0 };
  for (size_t i = 0; i < series->n; i++)
    {
      if (i % ANT_PACE_EVERY == 0 && !ant_pace_on (series->pace, LANES_COST * ANT_PACE_EVERY))
        return;
      double y = (double) series->value_ppm[i];
      if (isnan (y) || (series->spike && series->spike[i]))
        continue;
      if (state->n == 0)
        {
          state->place = i;
          set_decay (state, terms, 1);
          rotate_exactly (state, terms);
        }
      else
        walk_to (state, terms, i);
      set_vectors (state, terms);
      if (!plain || state->n == 0)
        for (size_t l = 0; l < ANT_LANES; l++)
          variance[l] = terms->total[l]
                        + ant_noise_model_variance (&model[l < n_models ? l : 0],
                                                    series->error_ppm ? (double) series->error_ppm[i] : 0,
                                                    series->bin_count ? (double) series->bin_count[i] : 1);
      learn (state, width, y, &variance);
      if (++state->n % 16 == 0)
        settle_product (state);
    }
}

ANT_SIMD static void
run_any_width (LaneState *state, const LaneTerms *terms, size_t n, const AntNoiseModel *model, const AntSeries *series)
{
  switch (terms->terms)
    {
    case 8: run (state, terms, 8, n, model, series); break;
    case 9: run (state, terms, 9, n, model, series); break;
    case 12: run (state, terms, 12, n, model, series); break;
    default: run (state, terms, terms->terms, n, model, series); break;
    }
}

AntStatus
ant_noise_log_likelihoods (size_t n, const AntNoiseModel *model, const AntSeries *series, double *log_likelihood)
{
  LaneTerms lanes;
  LaneState state;
  AntTerms terms;
  memset (&state, 0, sizeof state);
  for (size_t l = 0; l < ANT_LANES; l++)
    state.product[l] = 1;
  AntStatus status = n && n <= ANT_LANES ? fill_terms (&lanes, n, model, series->step_d, &terms) : ANT_BAD_ARGUMENT;
  if (status)
    return status;
  run_any_width (&state, &lanes, n, model, series);
  if (ant_pace_stopped (series->pace))
    return ANT_STOPPED;
  if (!state.n)
    return ANT_NO_DATA;
  settle_product (&state);
  for (size_t l = 0; l < n; l++)
    {
      double value = -0.5 * (state.quadratic[l] + state.log_det[l] + (double) state.n * log (ANT_TAU));
      int bad = ant_terms_from_model (&terms, &model[l], series->step_d) || !isfinite (value);
      log_likelihood[l] = bad ? -HUGE_VAL : value;
    }
  return ANT_OK;
}
