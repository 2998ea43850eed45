/* evidence-integral.c - climb, Laplace's Gaussian, and adaptive importance sampling from it. */
#include "verdict/evidence-integral.h"

#include <math.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>
#include "core/dense.h"
#include "core/random.h"
#include "core/units.h"

#define N ANT_INTEGRAL_DIMENSIONS
#define BATCH ANT_INTEGRAL_BATCH
#define CLIMB_PASSES 60
#define CLIMBS 2
#define ATTEMPTS 3
#define HIGHER 1.0         /* in ln f: a point this far above the hill that was sampled is another hill */
#define ADAPT_ROUNDS 3
#define ADAPT_SAMPLES 96
#define USUAL_SAMPLES 256
#define LEAST_EFFECTIVE 20.0 /* fewer samples do not tell a covariance: weights are tempered */
#define WIDEN 1.25           /* the proposal over the Gaussian it is made from */

typedef struct
{
  size_t n;
  AntLogFunction f;
  void *data;
  AntRandom random;
  AntIntegral *result;
  double centre[N], factor[N * N]; /* of the proposal: a Student t with 4 degrees of freedom, scale L L' */
  double quantity[ANT_INTEGRAL_SAMPLES * ANT_INTEGRAL_QUANTITIES];
  double point[ANT_INTEGRAL_SAMPLES * N], value[ANT_INTEGRAL_SAMPLES], log_weight[ANT_INTEGRAL_SAMPLES];
} Integral;

/* f at up to BATCH points, 0 outside the cube; the highest is kept. */
static void
evaluate (Integral *it, size_t count, const double *u, double *value)
{
  it->f (it->data, count, u, value);
  for (size_t i = 0; i < count; i++)
    {
      for (size_t k = 0; k < it->n; k++)
        if (!(u[i * it->n + k] > 0 && u[i * it->n + k] < 1))
          value[i] = -HUGE_VAL;
      if (!(value[i] > -HUGE_VAL))
        value[i] = -HUGE_VAL; /* NaN too */
      if (value[i] > it->result->best_value)
        {
          it->result->best_value = value[i];
          memcpy (it->result->best, u + i * it->n, it->n * sizeof *u);
        }
    }
}

static void
evaluate_all (Integral *it, size_t count, const double *u, double *value)
{
  for (size_t i = 0; i < count; i += BATCH)
    evaluate (it, count - i < BATCH ? count - i : BATCH, u + i * it->n, value + i);
}

/* Pattern search from a point; returns the highest value met. */
static double
climb (Integral *it, const double *from, double value_there, double *at)
{
  double h[N], u[BATCH * N] = { 0 }, value[BATCH], best = value_there;
  size_t n = it->n;
  memcpy (at, from, n * sizeof *at);
  for (size_t k = 0; k < n; k++)
    h[k] = 0.05;
  for (int pass = 0; pass < CLIMB_PASSES; pass++)
    {
      double before = best, widest = 0;
      size_t winner = SIZE_MAX;
      for (size_t k = 0; k < n; k++)
        for (size_t side = 0; side < 2; side++)
          {
            double *trial = u + (2 * k + side) * n;
            memcpy (trial, at, n * sizeof *trial);
            trial[k] += side ? h[k] : -h[k];
          }
      evaluate (it, 2 * n, u, value);
      for (size_t i = 0; i < 2 * n; i++)
        if (value[i] > best)
          {
            best = value[i];
            winner = i;
          }
      for (size_t k = 0; k < n; k++)
        {
          widest = fmax (widest, before - fmin (value[2 * k], value[2 * k + 1]));
          h[k] *= fmax (value[2 * k], value[2 * k + 1]) > before ? 1.3 : 0.5;
        }
      if (winner != SIZE_MAX)
        memcpy (at, u + winner * n, n * sizeof *at);
      else if (widest < 0.05)
        break;
    }
  return best;
}

/* Climb from the best starts, which may lie on different hills; the highest point met is the result's best. */
static void
climb_from_starts (Integral *it, size_t n_starts, const double *start, double *value)
{
  double at[N];
  for (int climbs = 0; climbs < CLIMBS; climbs++)
    {
      size_t best = 0;
      for (size_t i = 1; i < n_starts; i++)
        best = value[i] > value[best] ? i : best;
      if (!(value[best] > -HUGE_VAL))
        return;
      climb (it, start + best * it->n, value[best], at);
      value[best] = -HUGE_VAL;
    }
}

/* One more guess at a step whose fall is between a fifth and one: doubled or shrunk, or halfway between a step that was too
 * short and one that was too long, for a wall has no other. Returns whether it is good. */
static int
adjust (double fall, double *step, double bracket[2])
{
  if ((fall > 0.2 && fall < 1) || (fall <= 0.2 && *step > 0.3))
    return 1;
  bracket[fall >= 1] = *step;
  if (bracket[0] > 0 && bracket[1] > 0)
    *step = sqrt (bracket[0] * bracket[1]);
  else
    *step *= fall >= 1 ? fmax (0.15, sqrt (0.5 / fall)) : 2;
  return 0;
}

/* Steps along each axis over which ln f falls by about a half, as the mean of both sides, and these falls. */
static void
axis_steps (Integral *it, const double *at, double best, double *step, double *fall)
{
  double u[BATCH * N] = { 0 }, value[BATCH], bracket[N][2] = { { 0 } };
  for (size_t k = 0; k < it->n; k++)
    step[k] = 0.01;
  for (int round = 0, left = 1; round < 24 && left; round++)
    {
      double tried[N];
      for (size_t k = 0; k < it->n; k++)
        for (size_t side = 0; side < 2; side++)
          {
            double *trial = u + (2 * k + side) * it->n;
            memcpy (trial, at, it->n * sizeof *trial);
            trial[k] = fmax (1e-9, fmin (1 - 1e-9, trial[k] + (side ? step[k] : -step[k])));
          }
      evaluate (it, 2 * it->n, u, value);
      left = 0;
      for (size_t k = 0; k < it->n; k++)
        {
          fall[k] = best - 0.5 * (value[2 * k] + value[2 * k + 1]);
          tried[k] = step[k];
          if (!adjust (fall[k], &step[k], bracket[k]))
            left = 1;
        }
      if (round == 23 || !left)
        memcpy (step, tried, it->n * sizeof *step);
    }
  for (size_t k = 0; k < it->n; k++)
    fall[k] = fmin (fall[k], 2); /* a wall: its distance counts, not its height */
}

/* Laplace's covariance from the curvature; the axes alone where the whole is no Gaussian. */
static void
laplace (Integral *it, double *covariance)
{
  size_t n = it->n, pairs = 0;
  double at[N], best = it->result->best_value, step[N], fall[N], curvature[N * N] = { 0 };
  double u[12 * N], value[12];
  memcpy (at, it->result->best, sizeof at);
  axis_steps (it, at, best, step, fall);
  for (size_t i = 0; i < n; i++)
    for (size_t j = 0; j < i; j++)
      for (size_t side = 0; side < 2; side++, pairs++)
        {
          memcpy (u + pairs * n, at, n * sizeof *u);
          u[pairs * n + i] += side ? step[i] : -step[i];
          u[pairs * n + j] += side ? step[j] : -step[j];
        }
  evaluate_all (it, pairs, u, value);
  pairs = 0;
  for (size_t i = 0; i < n; i++)
    {
      curvature[i * n + i] = 2 * fmax (fall[i], 1e-3);
      for (size_t j = 0; j < i; j++, pairs += 2)
        {
          double both = best - 0.5 * (value[pairs] + value[pairs + 1]);
          curvature[i * n + j] = curvature[j * n + i] = isfinite (both) ? both - fall[i] - fall[j] : 0;
        }
    }
  double factor[N * N], diagonal[N];
  for (size_t i = 0; i < n; i++)
    diagonal[i] = curvature[i * n + i];
  memcpy (factor, curvature, sizeof factor);
  it->result->log_laplace = NAN;
  memset (covariance, 0, N * N * sizeof *covariance);
  if (!ant_cholesky (n, factor))
    {
      ant_cholesky_inverse (n, factor, covariance);
      it->result->log_laplace = best + 0.5 * ((double) n * log (ANT_TAU) - ant_cholesky_log_det (n, factor));
    }
  else
    for (size_t i = 0; i < n; i++)
      covariance[i * n + i] = 1 / diagonal[i];
  for (size_t i = 0; i < n; i++)
    {
      it->result->log_laplace += log (step[i]);
      for (size_t j = 0; j < n; j++)
        covariance[i * n + j] *= step[i] * step[j];
    }
}

/* Take a Gaussian as the next proposal. */
static void
propose (Integral *it, const double *centre, const double *covariance)
{
  size_t n = it->n;
  memcpy (it->centre, centre, n * sizeof *centre);
  for (size_t i = 0; i < n * n; i++)
    it->factor[i] = covariance[i] * WIDEN * WIDEN;
  for (size_t i = 0; i < n; i++)
    it->factor[i * n + i] += 1e-18;
  if (ant_cholesky (n, it->factor))
    for (size_t i = 0; i < n; i++)
      for (size_t j = 0; j < n; j++)
        it->factor[i * n + j] = i == j ? WIDEN * sqrt (fmax (covariance[i * n + i], 1e-18)) : 0;
}

/* Draw from the proposal, evaluate, and set ln weights = ln f - ln proposal. */
static void
sample (Integral *it, size_t count)
{
  size_t n = it->n;
  double constant = lgamma (0.5 * (4 + (double) n)) - lgamma (2) - 0.5 * (double) n * log (4 * ANT_PI);
  for (size_t i = 0; i < n; i++)
    constant -= log (it->factor[i * n + i]);
  for (size_t s = 0; s < count; s++)
    {
      double normal[N], squares = 0, *u = it->point + s * n;
      double chi2 = -2 * log ((1 - ant_random_uniform (&it->random)) * (1 - ant_random_uniform (&it->random)));
      for (size_t i = 0; i < n; i++)
        {
          normal[i] = ant_random_normal (&it->random) * sqrt (4 / chi2);
          squares += normal[i] * normal[i];
        }
      for (size_t i = 0; i < n; i++)
        {
          u[i] = it->centre[i];
          for (size_t j = 0; j <= i; j++)
            u[i] += it->factor[i * n + j] * normal[j];
        }
      it->log_weight[s] = -constant + 0.5 * (4 + (double) n) * log1p (squares / 4);
    }
  evaluate_all (it, count, it->point, it->value);
  for (size_t s = 0; s < count; s++)
    it->log_weight[s] += it->value[s];
}

/* Weights exp (power (w - highest)); their sum, and the effective number of samples. */
static double
effective (const Integral *it, size_t count, double power, double highest, double *sum)
{
  double squares = 0;
  *sum = 0;
  for (size_t s = 0; s < count; s++)
    {
      double weight = exp (power * (it->log_weight[s] - highest));
      *sum += weight;
      squares += weight * weight;
    }
  return squares > 0 ? *sum * *sum / squares : 0;
}

/* Mean [n] and covariance [n][n] of n numbers for each weighted sample. */
static void
moments (const Integral *it, size_t count, double power, double highest, double sum, size_t n, const double *number,
         double *mean, double *covariance)
{
  memset (mean, 0, n * sizeof *mean);
  memset (covariance, 0, n * n * sizeof *covariance);
  for (int pass = 0; pass < 2; pass++)
    for (size_t s = 0; s < count; s++)
      {
        double weight = exp (power * (it->log_weight[s] - highest)) / sum;
        const double *u = number + s * n;
        if (!(weight > 0)) /* outside the cube */
          continue;
        for (size_t i = 0; i < n; i++)
          if (pass == 0)
            mean[i] += weight * u[i];
          else
            for (size_t j = 0; j < n; j++)
              covariance[i * n + j] += weight * (u[i] - mean[i]) * (u[j] - mean[j]);
      }
}

static double
highest_weight (const Integral *it, size_t count)
{
  double highest = -HUGE_VAL;
  for (size_t s = 0; s < count; s++)
    highest = fmax (highest, it->log_weight[s]);
  return highest;
}

/* The power of the weights at which enough samples count. */
static double
even_out (const Integral *it, size_t count, double highest, double *sum)
{
  double power = 1;
  while (effective (it, count, power, highest, sum) < LEAST_EFFECTIVE && power > 1e-3)
    power *= 0.7;
  return power;
}

/* Learn the proposal from what it showed; too uneven weights are tempered. */
static void
adapt (Integral *it)
{
  double highest = highest_weight (it, ADAPT_SAMPLES), power, sum, mean[N], covariance[N * N];
  if (!isfinite (highest))
    return;
  power = even_out (it, ADAPT_SAMPLES, highest, &sum);
  moments (it, ADAPT_SAMPLES, power, highest, sum, it->n, it->point, mean, covariance);
  propose (it, mean, covariance);
}

/* The proposal about the highest point met, adapted; again from the start where a higher hill shows up meanwhile. */
static void
settle (Integral *it)
{
  double covariance[N * N], at[N];
  for (int attempt = 0; attempt < ATTEMPTS; attempt++)
    {
      double best = it->result->best_value;
      memcpy (at, it->result->best, sizeof at);
      laplace (it, covariance);
      propose (it, at, covariance);
      for (int round = 0; round < ADAPT_ROUNDS; round++)
        {
          sample (it, ADAPT_SAMPLES);
          adapt (it);
        }
      if (it->result->best_value < best + HIGHER)
        return;
      memcpy (at, it->result->best, sizeof at);
      climb (it, at, it->result->best_value, at);
    }
}

typedef struct
{
  double quantity, weight;
} Weighted;

static int
by_quantity (const void *a, const void *b)
{
  double difference = ((const Weighted *) a)->quantity - ((const Weighted *) b)->quantity;
  return (difference > 0) - (difference < 0);
}

/* Where the sorted weights have come to a share of their sum. */
static double
quantile (size_t count, const Weighted *sorted, double share)
{
  double sum = 0;
  for (size_t s = 0; s < count; s++)
    {
      sum += sorted[s].weight;
      if (sum >= share)
        return sorted[s].quantity;
    }
  return sorted[count - 1].quantity;
}

/* Medians and central intervals of the same. */
static void
intervals (const Integral *it, size_t count, double power, double highest, double sum, size_t n, const double *number)
{
  Weighted sorted[ANT_INTEGRAL_SAMPLES];
  for (size_t k = 0; k < n; k++)
    {
      size_t inside = 0;
      for (size_t s = 0; s < count; s++)
        {
          double weight = exp (power * (it->log_weight[s] - highest)) / sum;
          if (weight > 0)
            sorted[inside++] = (Weighted){ number[s * n + k], weight };
        }
      qsort (sorted, inside, sizeof *sorted, by_quantity);
      it->result->median[k] = quantile (inside, sorted, 0.5);
      it->result->half_width[k] = 0.5 * (quantile (inside, sorted, 0.84134) - quantile (inside, sorted, 0.15866));
    }
}

AntStatus
ant_evidence_integral (size_t n, AntLogFunction f, AntQuantities quantities, void *data, size_t n_starts,
                       const double *start, AntIntegral *result)
{
  Integral it = { .n = n, .f = f, .data = data, .result = result };
  double sum;
  *result = (AntIntegral){ .n = n, .best_value = -HUGE_VAL };
  if (n_starts > ANT_INTEGRAL_STARTS)
    return ANT_BAD_ARGUMENT;
  ant_random_seed (&it.random, 9, n);
  evaluate_all (&it, n_starts, start, it.value);
  if (!(result->best_value > -HUGE_VAL))
    return ANT_NO_DATA;
  climb_from_starts (&it, n_starts, start, it.value);
  settle (&it);
  size_t count = quantities.samples ? quantities.samples : USUAL_SAMPLES;
  sample (&it, count);
  double highest = highest_weight (&it, count);
  result->effective = effective (&it, count, 1, highest, &sum);
  result->log_integral = highest + log (sum / (double) count);
  result->n = quantities.tell ? quantities.count : n;
  for (size_t s = 0; s < count && quantities.tell; s++)
    if (it.log_weight[s] > -HUGE_VAL)
      it.log_weight[s] += quantities.tell (data, it.point + s * n, it.quantity + s * quantities.count);
  highest = highest_weight (&it, count);
  double power = even_out (&it, count, highest, &sum);
  const double *number = quantities.tell ? it.quantity : it.point;
  moments (&it, count, power, highest, sum, result->n, number, result->mean, result->covariance);
  intervals (&it, count, power, highest, sum, result->n, number);
  return isfinite (result->log_integral) ? ANT_OK : ANT_NO_DATA;
}
