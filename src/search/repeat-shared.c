/* repeat-shared.c - fold the edges of dips once, and look at single durations only where one may win. */
#include "search/repeat-shared.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "core/robust.h"
#include "core/running-median.h"
#include "core/simd.h"

#define CLIP 3.7       /* of its scatter, of single edges */
#define CLIP_EVENT 5.0 /* sigma, of single events that are looked at one by one */
#define TILE 2048
#define LANES ANT_FOLD_LANES
#define GROUP (4 * LANES) /* phases that are held against the bound at once */

/* Scatter of (Z - its surroundings)/sqrt(A) where an edge is well observed. */
static double
scatter_of (const AntRepeatShared *shared, const float *around, double *work)
{
  for (size_t i = 0; i < shared->arrays.n; i++)
    {
      double a = (double) shared->arrays.b[i];
      work[i] = a > 0.3 * (double) shared->typical ? (double) (shared->arrays.a[i] - around[i]) / sqrt (a) : NAN;
    }
  return ant_mad_sigma (shared->arrays.n, work, work);
}

/* Cut what stands out of its surroundings: Z itself wanders slowly, which cancels in differences. */
static AntStatus
clip_edges (AntRepeatShared *shared)
{
  size_t n = shared->arrays.n;
  float *around = malloc (n * sizeof *around);
  double *work = malloc (n * sizeof *work);
  AntStatus status = around && work ? ant_running_median (n, shared->arrays.a, 2 * shared->n_widths, around) : ANT_NO_MEMORY;
  if (!status)
    {
      double scatter = scatter_of (shared, around, work);
      for (size_t i = 0; i < n; i++)
        {
          double most = CLIP * scatter * sqrt (fmax ((double) shared->arrays.b[i], (double) shared->typical));
          double off = (double) (shared->arrays.a[i] - around[i]);
          shared->arrays.a[i] = around[i] + (float) fmax (-most, fmin (most, off));
        }
    }
  free (around);
  free (work);
  return status;
}

AntStatus
ant_repeat_shared_init (AntRepeatShared *shared, const AntRepeatEdges *edges, const AntRepeatPairs *pairs, double cadence_d,
                        double steps, double drift_top, double longest_d, double period_d)
{
  double step = edges->ramp / steps, ramp_d = edges->ramp * cadence_d;
  size_t widths = (size_t) ceil (fmax (longest_d - ramp_d, ramp_d) / (step * cadence_d)) + 2;
  *shared = (AntRepeatShared){ .edges = edges, .pairs = pairs, .step_d = step * cadence_d, .step = step, .n = edges->n, .n_widths = widths, .ramp_d = ramp_d,
                               .lead = widths + (size_t) ceil (steps), .drift_top = drift_top, .drift_inner = drift_top < 3 ? 2 : 3,
                               .shortest = 0.5 * steps };
  shared->scale = malloc (widths * sizeof *shared->scale);
  size_t n = (size_t) ceil ((double) edges->n / step) + shared->lead + widths;
  AntStatus status = shared->scale ? ant_fold_arrays_init (&shared->arrays, n, (size_t) ceil (period_d / shared->step_d) + widths + LANES)
                                   : ANT_NO_MEMORY;
  if (!status)
    {
      double root = sqrt (pairs->typical);
      for (size_t w = 0; w < widths; w++)
        shared->scale[w] = (float) ant_repeat_pairs_scale (pairs, (double) w * step);
      shared->typical = 1;
      for (size_t i = 0; i < n; i++)
        {
          double place = ((double) i - (double) shared->lead) * step;
          shared->arrays.a[i] = (float) (ant_repeat_edges_at (edges, place) / root);
          double sum = 0;
          for (int k = -2; k <= 2; k++)
            sum += ant_repeat_pairs_edge (pairs, place + 0.25 * k * edges->ramp);
          shared->arrays.b[i] = (float) (0.2 * sum / pairs->typical);
        }
      status = clip_edges (shared);
    }
  if (status)
    ant_repeat_shared_clear (shared);
  return status;
}

void
ant_repeat_shared_clear (AntRepeatShared *shared)
{
  free (shared->scale);
  ant_fold_arrays_clear (&shared->arrays);
  *shared = (AntRepeatShared){ 0 };
}

#define ROOM_OF(shared) (TILE + (shared)->n_widths + 3 * LANES)

typedef struct
{
  const AntRepeatShared *shared;
  const AntRepeatGrid *grid;
  AntRepeatBins *bins;
  double events; /* at least */
  float least;   /* of A(phase) + A(phase + D), of half of them */
  int all;
  size_t narrow, wide;  /* durations at this leaf, steps */
  float scale_least;
  float *z, *a, *z_least; /* [ROOM_OF] folded, and least over the durations' reach */
  float *a_least, *work;  /* the same of A, by blocks of LANES */
} Visit;

static void
set_widths (Visit *v, double period_d)
{
  const AntRepeatShared *shared = v->shared;
  double shortest_d, longest_d;
  ant_repeat_grid_durations (v->grid, period_d, &shortest_d, &longest_d);
  double narrow = fmax (floor ((shortest_d - shared->ramp_d) / shared->step_d + 0.5), shared->shortest);
  double wide = fmax (floor ((longest_d - shared->ramp_d) / shared->step_d + 0.5), narrow);
  v->narrow = narrow < 1 ? 1 : (size_t) narrow;
  v->wide = wide < (double) v->narrow ? v->narrow : (size_t) wide;
  v->wide = v->wide < shared->n_widths ? v->wide : shared->n_widths - 1;
  v->scale_least = shared->scale[v->narrow];
  for (size_t w = v->narrow; w <= v->wide; w++)
    v->scale_least = shared->scale[w] < v->scale_least ? shared->scale[w] : v->scale_least;
}

static inline __attribute__ ((always_inline)) void
add_rows (size_t n_rows, const float *const *row, size_t length, float *restrict sum)
{
  for (size_t t = 0; t < length; t += LANES)
    for (size_t i = 0; i < LANES; i++)
      {
        float total = row[0][t + i];
        for (size_t r = 1; r < n_rows; r++)
          total += row[r][t + i];
        sum[t + i] = total;
      }
}

static inline __attribute__ ((always_inline)) void
add_up (size_t n_rows, const float *const *row, size_t length, float *restrict sum)
{
  switch (n_rows)
    {
    case 1: add_rows (1, row, length, sum); break;
    case 2: add_rows (2, row, length, sum); break;
    case 3: add_rows (3, row, length, sum); break;
    case 4: add_rows (4, row, length, sum); break;
    case 5: add_rows (5, row, length, sum); break;
    case 6: add_rows (6, row, length, sum); break;
    case 7: add_rows (7, row, length, sum); break;
    default: add_rows (8, row, length, sum); break;
    }
}

static inline float
lesser (float one, float other)
{
  return other < one ? other : one;
}

/* least[t] = the least of value[t + narrow .. t + wide], t < n, by doubling windows in place. */
static inline __attribute__ ((always_inline)) void
sliding_least (const float *value, size_t n, size_t narrow, size_t wide, float *restrict least)
{
  size_t width = wide - narrow + 1, have = 1, length = n + width;
  memcpy (least, value + narrow, length * sizeof *least);
  for (; 2 * have <= width; have *= 2)
    for (size_t t = 0; t + have < length; t++)
      least[t] = lesser (least[t], least[t + have]);
  size_t rest = width - have;
  if (rest)
    for (size_t t = 0; t < n; t++)
      least[t] = lesser (least[t], least[t + rest]);
}

static inline float
power_of (float z, float other_z, float a, float other_a, float scale, float least)
{
  float x = z - other_z, pair = a + other_a;
  return x > 0 && pair >= least ? x * x / (scale * pair) : 0;
}

/* least[k] = at most the least of value[t + narrow .. t + wide] for t in block k of LANES: whole blocks, since A is smooth and a
 * bound is all that is asked. work: as many blocks as value has. */
static inline __attribute__ ((always_inline)) void
blocks_least (const float *value, size_t n, size_t narrow, size_t wide, float *restrict work, float *restrict least)
{
  size_t first = narrow / LANES, n_blocks = n / LANES, reach = (wide + 2 * LANES - 1) / LANES;
  for (size_t k = first; k < n_blocks + reach; k++)
    {
      float lowest[LANES];
      memcpy (lowest, value + k * LANES, sizeof lowest);
      for (size_t half = LANES / 2; half > 0; half /= 2)
        for (size_t i = 0; i < half; i++)
          lowest[i] = lesser (lowest[i], lowest[i + half]);
      work[k] = lowest[0];
    }
  for (size_t k = 0; k < n_blocks; k++)
    {
      float all = work[k + first];
      for (size_t j = k + first + 1; j < k + reach; j++)
        all = lesser (all, work[j]);
      least[k] = all;
    }
}

/* Whether any of a group of phases may have more than `cut`. */
static inline __attribute__ ((always_inline)) int
may_exceed (const Visit *v, size_t t, size_t n, float cut)
{
  float least = v->least, price = cut * v->scale_least, over[LANES];
  int any = 0;
  for (size_t i = 0; i < LANES; i++)
    over[i] = -1;
  for (size_t at = t; at < t + n; at += LANES)
    {
      const float *z = v->z + at, *z_least = v->z_least + at, *a = v->a + at;
      float a_least = v->a_least[at / LANES];
      for (size_t i = 0; i < LANES; i++)
        {
          float x = z[i] - z_least[i], pair = a[i] + a_least;
          x = x > 0 ? x : 0;
          pair = pair > least ? pair : least;
          float excess = x * x - price * pair;
          over[i] = excess > over[i] ? excess : over[i];
        }
    }
  for (size_t i = 0; i < LANES; i++)
    any |= over[i] >= 0;
  return any;
}

/* The best of these phases and its width, over all durations; the earliest of the narrowest of equals. */
static inline __attribute__ ((always_inline)) float
best_at (const Visit *v, size_t t, size_t *phase, size_t *width)
{
  float best[LANES] = { 0 }, best_w[LANES] = { 0 }, greatest = 0;
  for (size_t w = v->narrow; w <= v->wide; w++)
    {
      float scale = v->shared->scale[w], here = (float) w;
      for (size_t i = 0; i < LANES; i++)
        {
          float power = power_of (v->z[t + i], v->z[t + i + w], v->a[t + i], v->a[t + i + w], scale, v->least);
          best_w[i] = power > best[i] ? here : best_w[i];
          best[i] = power > best[i] ? power : best[i];
        }
    }
  for (size_t i = 0; i < LANES; i++)
    if (best[i] > greatest)
      {
        greatest = best[i];
        *phase = t + i;
        *width = (size_t) best_w[i];
      }
  return greatest;
}

/* SNR^2 of phase i and width w, event by event at its own place, single events cut as in the arrays; 0 if too few are
 * observed. */
static double
exact_power (const Visit *v, const AntFoldLeaf *leaf, size_t i, size_t w)
{
  const AntRepeatShared *shared = v->shared;
  double place = ((double) (leaf->first_phase + i) - (double) shared->lead) * shared->step;
  double period = leaf->period * shared->step, duration = (double) w * shared->step, num = 0, den = 0;
  double half = 0.5 * ant_repeat_pairs_full (shared->pairs, duration), events = 0;
  for (; place < (double) shared->n; place += period)
    {
      double g = ant_repeat_pairs_energy (shared->pairs, place, duration);
      double x = ant_repeat_edges_at (shared->edges, place) - ant_repeat_edges_at (shared->edges, place + duration);
      num += fmin (x, CLIP_EVENT * sqrt (g));
      den += g;
      events += g >= half;
    }
  return events >= v->events && num > 0 ? num * num / den : 0;
}

/* Hold a phase and width against the table, and keep it if it still is better than the cell. */
static void
settle (const Visit *v, const AntFoldLeaf *leaf, size_t phase, size_t width, AntRepeatCell *cell)
{
  const AntRepeatShared *shared = v->shared;
  double exact = exact_power (v, leaf, phase, width);
  if (exact <= fmax (cell->power, v->bins->floor))
    return;
  double begin_d = ((double) (leaf->first_phase + phase) - (double) shared->lead) * shared->step_d;
  double duration_d = (double) width * shared->step_d + shared->ramp_d;
  *cell = (AntRepeatCell){ .power = exact, .period_d = leaf->period * shared->step_d, .duration_d = duration_d,
                           .mid_d = begin_d + 0.5 * duration_d };
}

/* The first block of phases from t on that holds more than `cut`, its best phase and width, or `phases`. The bound is rounded a
 * little to the safe side. */
ANT_SIMD static size_t
next_block (const Visit *v, size_t t, size_t phases, float cut, size_t *phase, size_t *width)
{
  while (t < phases)
    {
      size_t group = phases - t < GROUP - t % GROUP ? phases - t : GROUP - t % GROUP;
      if (!v->all && !may_exceed (v, t, group, cut * 0.99999f))
        {
          t += group;
          continue;
        }
      for (size_t end = t + group; t < end; t += LANES)
        if ((v->all || may_exceed (v, t, LANES, cut * 0.99999f)) && best_at (v, t, phase, width) > cut)
          return t;
    }
  return phases;
}

ANT_SIMD static void
fold_leaf (const Visit *v, const AntFoldLeaf *leaf, size_t phases)
{
  size_t length = phases + v->wide + LANES;
  add_up (leaf->n_rows, leaf->a, length, v->z);
  add_up (leaf->n_rows, leaf->b, length, v->a);
  sliding_least (v->z, phases, v->narrow, v->wide, v->z_least);
  blocks_least (v->a, phases, v->narrow, v->wide, v->work, v->a_least);
}

static void
visit (void *data, const AntFoldLeaf *leaf)
{
  Visit *v = data;
  double period_d = leaf->period * v->shared->step_d;
  size_t phases = (leaf->n_phases + LANES - 1) / LANES * LANES, t = 0, phase = 0, width = 0;
  AntRepeatCell *cell = ant_repeat_bins_at (v->bins, period_d);
  set_widths (v, period_d);
  fold_leaf (v, leaf, phases);
  while ((t = next_block (v, t, phases, (float) fmax (cell->power, v->bins->floor), &phase, &width)) < phases)
    {
      settle (v, leaf, phase, width, cell);
      t += LANES;
    }
}

AntStatus
ant_repeat_shared_search (const AntRepeatShared *shared, const AntRepeatGrid *grid, double from_d, double to_d,
                          double least_events, int all, const AntStop *stop, AntRepeatBins *bins)
{
  AntFoldRange range = { .from = from_d / shared->step_d, .to = to_d / shared->step_d, .drift_top = shared->drift_top,
                         .drift_inner = shared->drift_inner, .reach = shared->n_widths, .tile = TILE, .stop = stop };
  size_t room = ROOM_OF (shared);
  float *work = malloc (5 * room * sizeof *work);
  if (!work)
    return ANT_NO_MEMORY;
  Visit v = { .shared = shared, .grid = grid, .bins = bins, .events = least_events,
              .least = (float) (least_events * (double) shared->typical), .all = all,
              .z = work, .a = work + room, .z_least = work + 2 * room, .a_least = work + 3 * room,
              .work = work + 4 * room };
  AntStatus status = ant_fold_tree_run (&shared->arrays, &range, visit, &v);
  free (work);
  return status;
}

double
ant_repeat_shared_chunk_end (const AntRepeatShared *shared, double from_d)
{
  return ant_fold_chunk_end (shared->arrays.n, from_d / shared->step_d) * shared->step_d;
}
