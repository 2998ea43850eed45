/* repeat-pairs.c - tabulate the energies of trapezoids, and split them into those of their edges. */
#include "search/repeat-pairs.h"
#include <math.h>
#include <stdlib.h>
#include "core/robust.h"

#define EVERY_UP_TO 12 /* durations in strides: each of these, then every twelfth */
#define PASSES 25

AntStatus
ant_repeat_pairs_init (AntRepeatPairs *pairs, size_t n, double ramp, double longest)
{
  *pairs = (AntRepeatPairs){ .ramp = ramp, .stride = ramp >= 4 ? (size_t) (0.5 * ramp + 0.5) : 1 };
  size_t most = (size_t) ceil (longest / (double) pairs->stride), apart = EVERY_UP_TO;
  while (most > EVERY_UP_TO + apart * (ANT_PAIR_DURATIONS - EVERY_UP_TO))
    apart += EVERY_UP_TO;
  for (size_t m = 1; pairs->n_durations < ANT_PAIR_DURATIONS; m += m < EVERY_UP_TO ? 1 : apart)
    {
      pairs->strides[pairs->n_durations++] = m;
      if (m >= most && m > 2)
        break;
    }
  pairs->lead = pairs->strides[pairs->n_durations - 1] + (size_t) ceil (ramp / (double) pairs->stride);
  pairs->n_starts = pairs->lead + n / pairs->stride + 1;
  pairs->energy = calloc (pairs->n_starts * pairs->n_durations, sizeof *pairs->energy);
  pairs->edge = malloc (pairs->n_starts * sizeof *pairs->edge);
  if (pairs->energy && pairs->edge)
    return ANT_OK;
  ant_repeat_pairs_clear (pairs);
  return ANT_NO_MEMORY;
}

void
ant_repeat_pairs_clear (AntRepeatPairs *pairs)
{
  free (pairs->energy);
  free (pairs->edge);
  *pairs = (AntRepeatPairs){ 0 };
}

static double
clip (double x)
{
  return x < 0 ? 0 : x > 1 ? 1 : x;
}

/* Trapezoids of a block of durations that begin at one place, in lanes; returns their length. */
static size_t
draw (const AntRepeatPairs *pairs, size_t block, double *shape)
{
  size_t first = block * ANT_LANES, last = first + ANT_LANES < pairs->n_durations ? first + ANT_LANES : pairs->n_durations;
  size_t length = (size_t) ceil ((double) (pairs->strides[last - 1] * pairs->stride) + pairs->ramp) + 1;
  for (size_t j = 0; j < length; j++)
    for (size_t l = 0; l < ANT_LANES; l++)
      {
        double duration = first + l < last ? (double) (pairs->strides[first + l] * pairs->stride) : 0;
        shape[j * ANT_LANES + l] = clip (((double) j - duration) / pairs->ramp) - clip ((double) j / pairs->ramp);
      }
  return length;
}

AntStatus
ant_repeat_pairs_tabulate (AntRepeatPairs *pairs, const AntWhitener *whitener, size_t first, double from, double to,
                           const AntStop *stop)
{
  size_t blocks = (pairs->n_durations + ANT_LANES - 1) / ANT_LANES;
  size_t longest = pairs->strides[pairs->n_durations - 1] * pairs->stride + (size_t) ceil (pairs->ramp) + 1;
  double *shape = malloc (blocks * longest * ANT_LANES * sizeof *shape), energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES];
  if (!shape)
    return ANT_NO_MEMORY;
  size_t length[ANT_PAIR_DURATIONS / ANT_LANES];
  for (size_t b = 0; b < blocks; b++)
    length[b] = draw (pairs, b, shape + b * longest * ANT_LANES);
  for (size_t i = 0; i < pairs->n_starts && !ant_stop_asked (stop); i++)
    {
      double place = ((double) i - (double) pairs->lead) * (double) pairs->stride;
      if (place < from || place >= to)
        continue;
      for (size_t b = 0; b < blocks; b++)
        {
          ant_whitener_energies (whitener, NULL, (ptrdiff_t) place - (ptrdiff_t) first, length[b],
                                 shape + b * longest * ANT_LANES, energy, moment, weight);
          for (size_t l = 0; l < ANT_LANES && b * ANT_LANES + l < pairs->n_durations; l++)
            pairs->energy[i * pairs->n_durations + b * ANT_LANES + l] = (float) energy[l];
        }
    }
  free (shape);
  return ant_stop_asked (stop) ? ANT_STOPPED : ANT_OK;
}

/* A of the second edge; beyond the record nothing. */
static double
other_edge (const AntRepeatPairs *pairs, size_t start, size_t d)
{
  size_t other = start + pairs->strides[d];
  return other < pairs->n_starts ? (double) pairs->edge[other] : 0;
}

static void
fit_scales (AntRepeatPairs *pairs)
{
  for (size_t d = 0; d < pairs->n_durations; d++)
    {
      double up = 0, down = 0;
      for (size_t i = 0; i < pairs->n_starts; i++)
        {
          double pair = (double) pairs->edge[i] + other_edge (pairs, i, d);
          up += (double) pairs->energy[i * pairs->n_durations + d] * pair;
          down += pair * pair;
        }
      pairs->scale[d] = down > 0 ? up / down : 0;
    }
}

/* One multiplicative step of every A: what the dips that begin or end there have, over what the fit gives them. */
static void
fit_edges (AntRepeatPairs *pairs, double *have, double *given)
{
  for (size_t i = 0; i < pairs->n_starts; i++)
    have[i] = given[i] = 0;
  for (size_t i = 0; i < pairs->n_starts; i++)
    for (size_t d = 0; d < pairs->n_durations; d++)
      {
        double k = pairs->scale[d], g = k * (double) pairs->energy[i * pairs->n_durations + d];
        double fit = k * k * ((double) pairs->edge[i] + other_edge (pairs, i, d));
        size_t other = i + pairs->strides[d];
        have[i] += g;
        given[i] += fit;
        if (other < pairs->n_starts)
          {
            have[other] += g;
            given[other] += fit;
          }
      }
  for (size_t i = 0; i < pairs->n_starts; i++)
    pairs->edge[i] = given[i] > 0 ? (float) ((double) pairs->edge[i] * have[i] / given[i]) : 0;
}

/* Full energies, and how far the fit is off. */
static void
judge (AntRepeatPairs *pairs, double *work)
{
  double squares = 0, count = 0;
  for (size_t d = 0; d < pairs->n_durations; d++)
    {
      for (size_t i = 0; i < pairs->n_starts; i++)
        work[i] = pairs->energy[i * pairs->n_durations + d] > 0 ? (double) pairs->energy[i * pairs->n_durations + d] : NAN;
      pairs->full[d] = ant_quantile (pairs->n_starts, work, 0.9, work);
      if ((double) (pairs->strides[d] * pairs->stride) < 3 * pairs->ramp)
        continue;
      for (size_t i = 0; i < pairs->n_starts; i++)
        {
          double g = (double) pairs->energy[i * pairs->n_durations + d];
          double off = pairs->scale[d] * ((double) pairs->edge[i] + other_edge (pairs, i, d)) / g - 1;
          squares += g > 0.5 * pairs->full[d] ? off * off : 0;
          count += g > 0.5 * pairs->full[d];
        }
    }
  pairs->misfit = count > 0 ? sqrt (squares / count) : 0;
}

AntStatus
ant_repeat_pairs_fit (AntRepeatPairs *pairs)
{
  double *have = malloc (2 * pairs->n_starts * sizeof *have), *given = have + pairs->n_starts;
  if (!have)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < pairs->n_starts; i++)
    {
      double sum = 0;
      for (size_t d = 0; d < pairs->n_durations; d++)
        sum += (double) pairs->energy[i * pairs->n_durations + d];
      pairs->edge[i] = (float) (0.5 * sum / (double) pairs->n_durations);
    }
  for (size_t i = pairs->n_starts; i-- > pairs->lead;) /* an edge near the end has a start before it at least */
    if (pairs->edge[i] <= 0)
      pairs->edge[i] = pairs->edge[i - pairs->strides[0]];
  for (int pass = 0; pass < PASSES; pass++)
    {
      fit_scales (pairs);
      fit_edges (pairs, have, given);
    }
  fit_scales (pairs);
  judge (pairs, have);
  for (size_t i = 0; i < pairs->n_starts; i++)
    have[i] = pairs->edge[i] > 0 ? (double) pairs->edge[i] : NAN;
  pairs->typical = ant_median (pairs->n_starts, have, have);
  free (have);
  return pairs->typical > 0 ? ANT_OK : ANT_NO_DATA;
}

double
ant_repeat_pairs_edge (const AntRepeatPairs *pairs, double place)
{
  double at = place / (double) pairs->stride + (double) pairs->lead;
  if (!(at >= 0) || at > (double) (pairs->n_starts - 1))
    return 0;
  size_t i = (size_t) at;
  double part = at - (double) i, here = (double) pairs->edge[i];
  return i + 1 < pairs->n_starts ? here + part * ((double) pairs->edge[i + 1] - here) : here;
}

/* The column below a duration and the part of the way to the next one. Durations below the first column scale with it. */
static size_t
column_of (const AntRepeatPairs *pairs, double duration, double *part, double *factor)
{
  double at = duration / (double) pairs->stride;
  size_t last = pairs->n_durations - 1, d = 0;
  *factor = at < (double) pairs->strides[0] ? at / (double) pairs->strides[0] : 1;
  *part = 0;
  if (at >= (double) pairs->strides[last])
    return last;
  while (d < last && (double) pairs->strides[d + 1] <= at)
    d++;
  if (at > (double) pairs->strides[d])
    *part = (at - (double) pairs->strides[d]) / (double) (pairs->strides[d + 1] - pairs->strides[d]);
  return d;
}

static inline double
between (double low, double high, double part)
{
  return low + part * (high - low);
}

double
ant_repeat_pairs_scale (const AntRepeatPairs *pairs, double duration)
{
  double part, factor;
  size_t d = column_of (pairs, duration, &part, &factor);
  return factor * (part > 0 ? between (pairs->scale[d], pairs->scale[d + 1], part) : pairs->scale[d]);
}

double
ant_repeat_pairs_full (const AntRepeatPairs *pairs, double duration)
{
  double part, factor;
  size_t d = column_of (pairs, duration, &part, &factor);
  return factor * (part > 0 ? between (pairs->full[d], pairs->full[d + 1], part) : pairs->full[d]);
}

double
ant_repeat_pairs_energy (const AntRepeatPairs *pairs, double place, double duration)
{
  double at = place / (double) pairs->stride + (double) pairs->lead, part, factor;
  if (!(at >= 0) || at >= (double) (pairs->n_starts - 1))
    return 0;
  size_t i = (size_t) at, d = column_of (pairs, duration, &part, &factor);
  const float *here = pairs->energy + i * pairs->n_durations + d, *next = here + pairs->n_durations;
  double on = at - (double) i, g = between ((double) here[0], (double) next[0], on);
  if (part > 0)
    g = between (g, between ((double) here[1], (double) next[1], on), part);
  return factor * g;
}
