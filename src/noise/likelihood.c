/* likelihood.c - the exact Gaussian likelihood of a series under a noise model, keeping nothing: the inner loop of fits. */
#include <math.h>
#include <string.h>
#include "core/units.h"
#include "noise/factor.h"
#include "noise/whitener.h"

#define SAMPLE_COST 4 /* on the pace */

typedef struct
{
  double quadratic; /* sum of innovation^2 / d */
  double log_det;   /* sum of ln d, less the running product */
  double product;
  size_t n;
} Tally;

/* A logarithm for each sample would cost as much as the step itself: multiply, and take one when the product is extreme. */
static inline void
tally_add (Tally *tally, double innovation, double d)
{
  tally->quadratic += innovation * innovation / d;
  tally->product *= d;
  if (tally->product > 1e200 || tally->product < 1e-200)
    {
      tally->log_det += log (tally->product);
      tally->product = 1;
    }
  tally->n++;
}

static inline __attribute__ ((always_inline)) AntStatus
run (const AntTerms *terms, size_t fours, const AntNoiseModel *model, const AntSeries *series, Tally *tally)
{
  AntFactorState state;
  AntWalk walk;
  AntFour memory[ANT_MAX_TERMS / 4] = { { 0 } };
  double innovation = 0;
  memset (&state, 0, sizeof state);
  int plain = !series->error_ppm && !series->bin_count;
  double r = ant_noise_model_variance (model, 0, 1);
  for (size_t i = 0; i < series->n; i++)
    {
      if (i % ANT_PACE_EVERY == 0 && !ant_pace_on (series->pace, SAMPLE_COST * ANT_PACE_EVERY))
        return ANT_STOPPED;
      double y = (double) series->value_ppm[i];
      if (isnan (y) || (series->spike && series->spike[i]))
        continue;
      if (tally->n == 0)
        ant_walk_start (&walk, terms, i);
      else
        ant_walk_to (&walk, terms, i);
      ant_walk_vectors (&walk, terms, (double *) state.u, (double *) state.v);
      memcpy (state.decay, walk.decay, sizeof state.decay);
      for (size_t k = 0; k < fours; k++)
        memory[k] = state.decay[k] * (memory[k] + state.w[k] * innovation);
      if (!plain)
        r = ant_noise_model_variance (model, series->error_ppm ? (double) series->error_ppm[i] : 0,
                                      series->bin_count ? (double) series->bin_count[i] : 1);
      ant_factor_step (&state, fours, terms->total + r);
      if (!(state.d > 0))
        return ANT_NOT_POSITIVE;
      AntFour predicted = { 0 };
      for (size_t k = 0; k < fours; k++)
        predicted += state.u[k] * memory[k];
      innovation = y - ((predicted[0] + predicted[1]) + (predicted[2] + predicted[3]));
      tally_add (tally, innovation, state.d);
    }
  return tally->n ? ANT_OK : ANT_NO_DATA;
}

/* One build of the loop per width, so that the compiler knows it. */
ANT_SIMD static AntStatus
run_any_width (const AntTerms *terms, const AntNoiseModel *model, const AntSeries *series, Tally *tally)
{
  switch (terms->terms / 4)
    {
    case 1: return run (terms, 1, model, series, tally);
    case 2: return run (terms, 2, model, series, tally);
    case 3: return run (terms, 3, model, series, tally);
    case 4: return run (terms, 4, model, series, tally);
    case 5: return run (terms, 5, model, series, tally);
    default: return run (terms, terms->terms / 4, model, series, tally);
    }
}

AntStatus
ant_noise_log_likelihood (const AntNoiseModel *model, const AntSeries *series, double *log_likelihood)
{
  AntTerms terms;
  Tally tally = { .product = 1 };
  AntStatus status = ant_terms_from_model (&terms, model, series->step_d);
  if (!status)
    status = run_any_width (&terms, model, series, &tally);
  if (status)
    return status;
  double log_det = tally.log_det + log (tally.product);
  *log_likelihood = -0.5 * (tally.quadratic + log_det + (double) tally.n * log (ANT_TAU));
  return ANT_OK;
}
