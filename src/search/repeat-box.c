/* repeat-box.c - box least squares in white noise: sums over boxes, and the coarse fold of one duration. */
#include "search/repeat-box.h"
#include <math.h>
#include <stdlib.h>
#include "core/prefix-sums.h"
#include "core/robust.h"
#include "core/simd.h"

#define CLIP 5.0f        /* sigma, of single boxes in the coarse arrays */
#define DRIFT_TOP 4      /* steps, end to end, between trial periods */
#define DRIFT_INNER 3
#define TILE 8192

AntStatus
ant_repeat_white_weights (const AntSeries *series, double *weight)
{
  double *value = malloc (2 * series->n * sizeof *value), *work = value + series->n;
  if (!value)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < series->n; i++)
    value[i] = (double) series->value_ppm[i];
  double median = ant_median (series->n, value, work);
  for (size_t i = 0; i < series->n; i++)
    value[i] = (value[i] - median) / (series->error_ppm ? (double) series->error_ppm[i] : 1);
  double scale = ant_mad_sigma (series->n, value, work);
  for (size_t i = 0; i < series->n; i++)
    {
      double sigma = scale * (series->error_ppm ? (double) series->error_ppm[i] : 1);
      weight[i] = isfinite (value[i]) && sigma > 0 ? 1 / (sigma * sigma) : 0;
    }
  free (value);
  return scale > 0 ? ANT_OK : ANT_NO_DATA;
}

static double
weighted_mean (const AntSeries *series, const double *weight)
{
  double sum = 0, total = 0;
  for (size_t i = 0; i < series->n; i++)
    if (weight[i] > 0)
      {
        sum += weight[i] * (double) series->value_ppm[i];
        total += weight[i];
      }
  return sum / total;
}

static double
typical_weight (size_t n, const double *weight, double *work)
{
  for (size_t i = 0; i < n; i++)
    work[i] = weight[i] > 0 ? weight[i] : NAN;
  return ant_median (n, work, work);
}

AntStatus
ant_repeat_box_init (AntRepeatBox *box, const AntSeries *series, const double *weight)
{
  *box = (AntRepeatBox){ .n = series->n, .step_d = series->step_d };
  box->moment = malloc ((series->n + 1) * sizeof *box->moment);
  box->weight = malloc ((series->n + 1) * sizeof *box->weight);
  double *work = malloc (series->n * sizeof *work);
  if (!box->moment || !box->weight || !work)
    {
      free (work);
      ant_repeat_box_clear (box);
      return ANT_NO_MEMORY;
    }
  box->typical = typical_weight (series->n, weight, work);
  double level = weighted_mean (series, weight);
  for (size_t i = 0; i < series->n; i++)
    work[i] = weight[i] > 0 ? weight[i] * (level - (double) series->value_ppm[i]) : 0;
  ant_prefix_sums_double (series->n, work, box->moment);
  ant_prefix_sums_double (series->n, weight, box->weight);
  box->total = box->weight[series->n];
  free (work);
  if (box->total > 0)
    return ANT_OK;
  ant_repeat_box_clear (box);
  return ANT_NO_DATA;
}

void
ant_repeat_box_clear (AntRepeatBox *box)
{
  free (box->moment);
  free (box->weight);
  *box = (AntRepeatBox){ 0 };
}

double
ant_repeat_box_snr (const AntRepeatBox *box, double num, double den)
{
  double effective = den - den * den / box->total;
  return effective > 0 ? num / sqrt (effective) : 0;
}

double
ant_repeat_box_depth (const AntRepeatBox *box, double num, double den)
{
  return num / (den - den * den / box->total);
}

AntStatus
ant_repeat_boxes_init (AntRepeatBoxes *boxes, const AntRepeatBox *box, double duration_d, double steps, double longest_d)
{
  double length = duration_d / box->step_d, step = length / steps;
  size_t lead = (size_t) ceil (steps), n = (size_t) ceil ((double) box->n / step) + lead;
  size_t longest = (size_t) ceil (longest_d / (step * box->step_d)) + ANT_FOLD_LANES;
  *boxes = (AntRepeatBoxes){ .duration_d = duration_d, .step_d = step * box->step_d, .lead = lead };
  AntStatus status = ant_fold_arrays_init (&boxes->arrays, n, longest);
  if (status)
    return status;
  double full = box->typical * length;
  boxes->inverse_total = (float) (full / box->total);
  for (size_t j = 0; j < n; j++)
    {
      double start = ((double) j - (double) lead) * step;
      ptrdiff_t first = (ptrdiff_t) ceil (start), last = (ptrdiff_t) ceil (start + length);
      float num = (float) (ant_window_sum (box->n, box->moment, first, last) / sqrt (full));
      float den = (float) (ant_window_sum (box->n, box->weight, first, last) / full);
      float most = CLIP * sqrtf (den);
      boxes->arrays.a[j] = num < most ? num : most;
      boxes->arrays.b[j] = den;
    }
  return ANT_OK;
}

AntStatus
ant_repeat_boxes_init_edges (AntRepeatBoxes *boxes, const AntRepeatEdges *edges, const AntRepeatPairs *pairs, double cadence_d,
                             double duration_d, double step_d, double longest_d)
{
  double step = step_d / cadence_d, half_depth = fmax (duration_d / cadence_d - edges->ramp, 0.5 * edges->ramp);
  size_t lead = (size_t) ceil (duration_d / step_d), n = (size_t) ceil ((double) edges->n / step) + lead;
  *boxes = (AntRepeatBoxes){ .duration_d = duration_d, .step_d = step_d, .lead = lead };
  AntStatus status = ant_fold_arrays_init (&boxes->arrays, n, (size_t) ceil (longest_d / step_d) + ANT_FOLD_LANES);
  double full = ant_repeat_pairs_full (pairs, half_depth);
  for (size_t j = 0; j < n && !status; j++)
    {
      double place = ((double) j - (double) lead) * step;
      double den = ant_repeat_pairs_energy (pairs, place, half_depth) / full;
      double num = ant_repeat_edges_at (edges, place) - ant_repeat_edges_at (edges, place + half_depth);
      boxes->arrays.a[j] = (float) fmin (num / sqrt (full), (double) CLIP * sqrt (den));
      boxes->arrays.b[j] = (float) den;
    }
  return status;
}

void
ant_repeat_boxes_clear (AntRepeatBoxes *boxes)
{
  ant_fold_arrays_clear (&boxes->arrays);
}

typedef struct
{
  const AntRepeatBoxes *boxes;
  float least; /* den of enough events */
  AntRepeatBins *bins;
} Visit;

/* SNR^2 with the sign of num; 0 where too little is observed. */
static inline __attribute__ ((always_inline)) float
power_of (float num, float den, float least, float inverse_total)
{
  float magnitude = num < 0 ? -num : num;
  return den >= least ? num * magnitude / (den - den * den * inverse_total) : 0;
}

static inline __attribute__ ((always_inline)) float
power_at (size_t n_rows, const AntFoldLeaf *leaf, size_t t, float least, float inverse_total)
{
  float num = leaf->a[0][t], den = leaf->b[0][t];
  for (size_t r = 1; r < n_rows; r++)
    {
      num += leaf->a[r][t];
      den += leaf->b[r][t];
    }
  return power_of (num, den, least, inverse_total);
}

static inline __attribute__ ((always_inline)) float
best_of (size_t n_rows, const AntFoldLeaf *leaf, float least, float inverse_total)
{
  float best[ANT_FOLD_LANES] = { 0 }, greatest = 0;
  for (size_t t = 0; t < leaf->n_phases; t += ANT_FOLD_LANES)
    for (size_t i = 0; i < ANT_FOLD_LANES; i++)
      {
        float power = power_at (n_rows, leaf, t + i, least, inverse_total);
        best[i] = power > best[i] ? power : best[i];
      }
  for (size_t i = 0; i < ANT_FOLD_LANES; i++)
    greatest = best[i] > greatest ? best[i] : greatest;
  return greatest;
}

ANT_SIMD static float
best_power (const AntFoldLeaf *leaf, float least, float inverse_total)
{
  switch (leaf->n_rows)
    {
    case 1: return best_of (1, leaf, least, inverse_total);
    case 2: return best_of (2, leaf, least, inverse_total);
    case 3: return best_of (3, leaf, least, inverse_total);
    case 4: return best_of (4, leaf, least, inverse_total);
    case 5: return best_of (5, leaf, least, inverse_total);
    case 6: return best_of (6, leaf, least, inverse_total);
    case 7: return best_of (7, leaf, least, inverse_total);
    default: return best_of (8, leaf, least, inverse_total);
    }
}

/* The first lanes among whose phases one has this power. */
static inline __attribute__ ((always_inline)) size_t
lanes_of (size_t n_rows, const AntFoldLeaf *leaf, float wanted, float least, float inverse_total)
{
  for (size_t t = 0; t < leaf->n_phases; t += ANT_FOLD_LANES)
    {
      int any = 0;
      for (size_t i = 0; i < ANT_FOLD_LANES; i++)
        any |= power_at (n_rows, leaf, t + i, least, inverse_total) >= wanted;
      if (any)
        return t;
    }
  return 0;
}

/* The first phase that has this power. */
ANT_SIMD static size_t
phase_of (const AntFoldLeaf *leaf, float power, float least, float inverse_total)
{
  size_t t;
  switch (leaf->n_rows)
    {
    case 1: t = lanes_of (1, leaf, power, least, inverse_total); break;
    case 2: t = lanes_of (2, leaf, power, least, inverse_total); break;
    case 3: t = lanes_of (3, leaf, power, least, inverse_total); break;
    case 4: t = lanes_of (4, leaf, power, least, inverse_total); break;
    case 5: t = lanes_of (5, leaf, power, least, inverse_total); break;
    case 6: t = lanes_of (6, leaf, power, least, inverse_total); break;
    case 7: t = lanes_of (7, leaf, power, least, inverse_total); break;
    default: t = lanes_of (8, leaf, power, least, inverse_total); break;
    }
  for (size_t i = 0; i < ANT_FOLD_LANES; i++)
    if (power_at (leaf->n_rows, leaf, t + i, least, inverse_total) >= power)
      return leaf->first_phase + t + i;
  return leaf->first_phase + t;
}

static void
visit (void *data, const AntFoldLeaf *leaf)
{
  Visit *v = data;
  const AntRepeatBoxes *boxes = v->boxes;
  float power = best_power (leaf, v->least, boxes->inverse_total);
  double period_d = leaf->period * boxes->step_d;
  AntRepeatCell *cell = ant_repeat_bins_at (v->bins, period_d);
  if ((double) power <= fmax (cell->power, v->bins->floor))
    return;
  double start = (double) phase_of (leaf, power, v->least, boxes->inverse_total) - (double) boxes->lead;
  *cell = (AntRepeatCell){ .power = (double) power, .period_d = period_d, .duration_d = boxes->duration_d,
                           .mid_d = start * boxes->step_d + 0.5 * boxes->duration_d };
}

AntStatus
ant_repeat_boxes_search (const AntRepeatBoxes *boxes, double from_d, double to_d, double least_events, const AntStop *stop,
                         AntRepeatBins *bins)
{
  AntFoldRange range = { .from = from_d / boxes->step_d, .to = to_d / boxes->step_d, .drift_top = DRIFT_TOP,
                         .drift_inner = DRIFT_INNER, .tile = TILE, .stop = stop };
  Visit v = { .boxes = boxes, .least = (float) (0.5 * least_events), .bins = bins };
  return ant_fold_tree_run (&boxes->arrays, &range, visit, &v);
}

double
ant_repeat_boxes_chunk_end (const AntRepeatBoxes *boxes, double from_d)
{
  return ant_fold_chunk_end (boxes->arrays.n, from_d / boxes->step_d) * boxes->step_d;
}
