/* passages.c - trace the slow part of a record and read its passages. */
#include "search/passages.h"
#include <math.h>
#include <stdlib.h>
#include "core/units.h"
#include "noise/smoother.h"
#include "noise/whitener.h"

#define SLOW_D 0.5              /* a part this slow or slower is traced: correlation time, half an undamped period */
#define BIN_D (1.0 / 24)        /* the curve is read in bins: finer than any passage, coarser than its kinks */

static void
choose_slow (const AntNoiseModel *model, unsigned char *chosen)
{
  for (size_t p = 0; p < model->n_parts; p++)
    {
      const AntNoisePart *part = &model->part[p];
      chosen[p] = part->kind == ANT_OSCILLATOR ? part->quality < 2 && part->time_d >= 2 * SLOW_D : part->time_d >= SLOW_D;
    }
}

/* The curve in bins. */
typedef struct
{
  size_t n, places; /* bins, places in a bin */
  double *value;
} Curve;

static AntStatus
curve_fill (Curve *curve, const AntSeries *part, const double *slow)
{
  curve->places = (size_t) fmax (1, round (BIN_D / part->step_d));
  curve->n = part->n / curve->places;
  curve->value = calloc (curve->n + 1, sizeof *curve->value);
  if (!curve->value)
    return ANT_NO_MEMORY;
  for (size_t p = 0; p < curve->n * curve->places; p++)
    curve->value[p / curve->places] += slow[p] / (double) curve->places;
  return ANT_OK;
}

/* A minimum, the points that its line rests on, and where half its depth is reached, in bins. */
typedef struct
{
  size_t lowest, left, right;
  double from, to, depth;
} Hollow;

static double
below_line (const Curve *curve, const Hollow *hollow, size_t i)
{
  double l = (double) hollow->left, r = (double) hollow->right, share = ((double) i - l) / (r - l);
  return (1 - share) * curve->value[hollow->left] + share * curve->value[hollow->right] - curve->value[i];
}

/* Of the bins on one side of the lowest, the one where the line through it and the other shoulder passes highest. */
static size_t
raise_line (const Curve *curve, Hollow hollow, int right, size_t reach)
{
  size_t best = right ? hollow.right : hollow.left, k = hollow.lowest;
  double highest = below_line (curve, &hollow, k);
  for (size_t i = 1; i <= reach && (right ? k + i < curve->n : i <= k); i++)
    {
      size_t at = right ? k + i : k - i;
      if (curve->value[at] < curve->value[k])
        break;
      *(right ? &hollow.right : &hollow.left) = at;
      double height = below_line (curve, &hollow, k);
      if (height > highest)
        {
          highest = height;
          best = at;
        }
    }
  return best;
}

/* Lay the line over a minimum: it rests on one shoulder after the other, each time higher, until neither moves it. */
static void
lay_line (const Curve *curve, Hollow *hollow, size_t reach)
{
  size_t left, right;
  hollow->left = hollow->lowest - 1;
  hollow->right = hollow->lowest + 1;
  do
    {
      left = hollow->left;
      right = hollow->right;
      hollow->left = raise_line (curve, *hollow, 0, reach);
      hollow->right = raise_line (curve, *hollow, 1, reach);
    }
  while (left != hollow->left || right != hollow->right);
}

/* How far the curve rises on one side before it comes to lower ground. */
static double
rise (const Curve *curve, size_t k, int right, size_t reach)
{
  double highest = curve->value[k];
  for (size_t i = 1; i <= reach && (right ? k + i < curve->n : i <= k); i++)
    {
      double value = curve->value[right ? k + i : k - i];
      if (value < curve->value[k])
        break;
      highest = fmax (highest, value);
    }
  return highest - curve->value[k];
}

/* Where half the depth is reached on one side, between bins. */
static double
half_way (const Curve *curve, const Hollow *hollow, int side)
{
  double inside = hollow->depth, outside = inside, half = 0.5 * hollow->depth;
  size_t i = hollow->lowest;
  while (outside >= half) /* at the shoulder it is 0 */
    {
      inside = outside;
      i = side > 0 ? i + 1 : i - 1;
      outside = below_line (curve, hollow, i);
    }
  return (double) i - side * (half - outside) / (inside - outside);
}

static double
coverage (const AntSeries *part, double from, double to)
{
  size_t first = (size_t) fmax (0, ceil (from)), last = (size_t) fmin ((double) part->n - 1, floor (to));
  AntSeries inside = ant_series_part (part, first, last - first + 1);
  return (double) ant_series_observed (&inside, 0) / (double) inside.n;
}

/* A hollow of passage width, with its uncertainty. *good 0 if it is none. */
static AntStatus
judge (const Curve *curve, const Hollow *hollow, const AntWhitener *whitener, const AntNoiseModel *model,
       const unsigned char *chosen, const AntSeries *part, AntPassage *passage, int *good)
{
  double places = (double) curve->places, width_d = (hollow->to - hollow->from) * places * part->step_d;
  *good = 0;
  if (!(width_d >= ANT_PASSAGE_SHORTEST_D && width_d <= ANT_PASSAGE_LONGEST_D))
    return ANT_OK;
  size_t place[] = { hollow->lowest, hollow->left, hollow->right };
  for (int i = 0; i < 3; i++)
    place[i] = place[i] * curve->places + curve->places / 2;
  double share = (double) (hollow->lowest - hollow->left) / (double) (hollow->right - hollow->left), sigma;
  AntStatus status = ant_smooth_contrast_sigma (whitener, model, chosen, part->step_d, 3, place,
                                                (double[]){ -1, 1 - share, share }, &sigma);
  if (status || !(hollow->depth >= ANT_PASSAGE_SIGMAS * sigma))
    return status;
  double from = (hollow->from + 0.5) * places - 0.5, to = (hollow->to + 0.5) * places - 0.5; /* a bin's middle */
  *passage = (AntPassage){ .start_d = ant_series_time (part, from), .end_d = ant_series_time (part, to),
                           .mid_d = ant_series_time (part, 0.5 * (from + to)), .depth_ppm = hollow->depth,
                           .depth_sigma_ppm = sigma, .coverage = coverage (part, from, to) };
  *good = 1;
  return ANT_OK;
}

static AntStatus
read_passages (const Curve *curve, const AntWhitener *whitener, const AntNoiseModel *model, const unsigned char *chosen,
               const AntSeries *part, size_t *n_passages, AntPassage *passage)
{
  size_t reach = (size_t) ceil (ANT_PASSAGE_LONGEST_D / (part->step_d * (double) curve->places));
  AntStatus status = ANT_OK;
  for (size_t i = 1; i + 1 < curve->n && !status; i++)
    {
      Hollow hollow = { .lowest = i };
      if (!(curve->value[i] < curve->value[i - 1] && curve->value[i] <= curve->value[i + 1]))
        continue;
      lay_line (curve, &hollow, reach);
      hollow.depth = below_line (curve, &hollow, i);
      double least_rise = fmin (rise (curve, i, 0, reach), rise (curve, i, 1, reach));
      if (!(hollow.depth > 0) || least_rise < 0.5 * hollow.depth) /* a ripple on the flank of another */
        continue;
      hollow.from = half_way (curve, &hollow, -1);
      hollow.to = half_way (curve, &hollow, 1);
      int good;
      status = judge (curve, &hollow, whitener, model, chosen, part, &passage[*n_passages], &good);
      *n_passages += !status && good;
    }
  return status;
}

AntStatus
ant_passages_trace (const AntNoiseModel *model, const AntSeries *part, float *slow_ppm, size_t *n_passages,
                    AntPassage **passage)
{
  AntStatus status;
  unsigned char chosen[ANT_MAX_PARTS];
  Curve curve = { 0 };
  double *z = malloc (2 * part->n * sizeof *z), *slow = z + part->n, level_ppm = 0;
  AntWhitener *whitener = z ? ant_whitener_new_free_level (model, part, &status) : NULL;
  *n_passages = 0;
  *passage = NULL;
  choose_slow (model, chosen);
  if (!z)
    status = ANT_NO_MEMORY;
  if (whitener)
    {
      status = ant_whitener_solve (whitener, part->value_ppm, z);
      level_ppm = ant_whitener_level (whitener, part->value_ppm);
    }
  if (!status)
    status = ant_smooth (model, chosen, part->step_d, part->n, z, slow);
  if (!status)
    status = curve_fill (&curve, part, slow);
  if (!status)
    {
      *passage = malloc ((curve.n / 2 + 1) * sizeof **passage);
      status = *passage ? read_passages (&curve, whitener, model, chosen, part, n_passages, *passage) : ANT_NO_MEMORY;
    }
  for (size_t p = 0; p < part->n && !status; p++)
    slow_ppm[p] = (float) (level_ppm + slow[p]);
  ant_whitener_free (whitener);
  free (curve.value);
  free (z);
  return status;
}
