/* bench-repeats.c - what the search for repeats costs on one thread: white noise, by the tree and projected for a plain fold
 * of the same boxes; fitted noise, by the shared fold and projected for a tree for each duration. Prints CPU seconds.
 *
 * usage: bench-repeats [DAYS [LONGEST_PERIOD_D]]    (60 s cadence; 730 d, 365 d) */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <time.h>
#include "core/random.h"
#include "core/simd.h"
#include "core/units.h"
#include "models.h"
#include "search/repeat-box.h"
#include "search/repeat-shared.h"

#define RATIO 1.35
#define MOST_TREES 64

static double
cpu_s (void)
{
  struct timespec t;
  clock_gettime (CLOCK_THREAD_CPUTIME_ID, &t);
  return (double) t.tv_sec + 1e-9 * (double) t.tv_nsec;
}

/* One trial period folded row by row; returns something of the sums, so that they are made. */
ANT_SIMD static float
plain_fold (const AntFoldArrays *arrays, double period, float *restrict num, float *restrict den)
{
  size_t phases = (size_t) ceil (period);
  for (size_t t = 0; t < phases; t++)
    num[t] = den[t] = 0;
  for (double at = 0; at < (double) arrays->n; at += period)
    {
      const float *a = arrays->a + (size_t) (at + 0.5), *b = arrays->b + (size_t) (at + 0.5);
      for (size_t t = 0; t < phases; t++)
        {
          num[t] += a[t];
          den[t] += b[t];
        }
    }
  float best = 0;
  for (size_t t = 0; t < phases; t++)
    best = den[t] > 1 && num[t] * num[t] > best * den[t] ? num[t] * num[t] / den[t] : best;
  return best;
}

/* Seconds that plain folds of a range would take: a few trial periods, times their number. */
static double
plain_cost (const AntRepeatBoxes *boxes, double from_d, double to_d)
{
  double from = from_d / boxes->step_d, to = to_d / boxes->step_d, rows = ceil ((double) boxes->arrays.n / from), sum = 0;
  float *work = malloc (2 * ((size_t) to + 2) * sizeof *work);
  volatile float sink = 0;
  double t0 = cpu_s ();
  for (int k = 0; k < 2; k++)
    sink += plain_fold (&boxes->arrays, from + (to - from) * (0.25 + 0.5 * k), work, work + (size_t) to + 2);
  sum = (cpu_s () - t0) / 2 * (to - from) * fmax (rows - 1, 1) / 4;
  free (work);
  return sum;
}

/* Search with trees; plain: add up what plain folds would cost; only every `sparse`-th chunk, projected. */
static double
trees (const AntRepeatGrid *grid, const AntRepeatBoxes *boxes, double d, int sparse, AntRepeatBins *bins, double *plain)
{
  double from_d, to_d, unused, half = sqrt (RATIO), cost = 0;
  ant_repeat_grid_periods (grid, d / half, &from_d, &unused);
  ant_repeat_grid_periods (grid, d * half, &unused, &to_d);
  from_d = fmax (from_d, 3 * d);
  int k = 0;
  for (double at = from_d; at < to_d; k++)
    {
      double end = fmin (ant_repeat_boxes_chunk_end (boxes, at), to_d), t0 = cpu_s ();
      if (k % sparse == 0)
        {
          AntRepeatBins part;
          ant_repeat_bins_part (&part, bins, at, end);
          ant_repeat_boxes_search (boxes, at, end, 3, NULL, &part);
          ant_repeat_bins_merge (bins, &part);
          ant_repeat_bins_clear (&part);
          cost += sparse * (cpu_s () - t0);
        }
      if (plain && k % 5 == 0)
        *plain += 5 * plain_cost (boxes, at, end);
      at = end;
    }
  return cost;
}

static double
bench_white (const AntRepeatGrid *grid, const AntSeries *series)
{
  double *weight = malloc (series->n * sizeof *weight), plain = 0, shortest_d, longest_d = ant_repeat_grid_longest (grid), unused;
  AntRepeatBins bins;
  AntRepeatBox box;
  double cost = -cpu_s ();
  ant_repeat_bins_init (&bins, grid);
  ant_repeat_white_weights (series, weight);
  ant_repeat_box_init (&box, series, weight);
  cost += cpu_s ();
  ant_repeat_grid_durations (grid, grid->period_min_d, &shortest_d, &unused);
  size_t n = 0;
  for (double d = shortest_d * sqrt (RATIO); d < longest_d * sqrt (RATIO); d *= RATIO, n++)
    {
      AntRepeatBoxes boxes;
      cost -= cpu_s ();
      ant_repeat_boxes_init (&boxes, &box, d, 6, grid->period_max_d);
      cost += cpu_s ();
      cost += trees (grid, &boxes, d, 1, &bins, &plain);
      ant_repeat_boxes_clear (&boxes);
    }
  printf ("white noise, trees of %zu durations: %.2f s; plain folds of the same boxes and periods: %.1f s, %.1f times as much\n", n, cost,
          plain, plain / cost);
  ant_repeat_box_clear (&box);
  ant_repeat_bins_clear (&bins);
  free (weight);
  return cost;
}

static void
bench_fitted (const AntRepeatGrid *grid, const AntSeries *series, char name, double white_s)
{
  AntNoiseModel model;
  AntStatus status;
  AntRepeatEdges edges;
  AntRepeatPairs pairs;
  AntRepeatBins bins;
  double step_d = series->step_d, longest_d = ant_repeat_grid_longest (grid), *z = malloc (series->n * sizeof *z), t0 = cpu_s ();
  ant_study_model (name, &model);
  AntWhitener *whitener = ant_whitener_new_free_level (&model, series, &status);
  ant_whitener_solve (whitener, series->value_ppm, z);
  ant_repeat_edges_init (&edges, series->n, z, 20);
  ant_repeat_pairs_init (&pairs, series->n, 20, longest_d / step_d);
  ant_repeat_pairs_tabulate (&pairs, whitener, 0, -HUGE_VAL, HUGE_VAL, NULL);
  ant_repeat_pairs_fit (&pairs);
  double t1 = cpu_s ();
  ant_repeat_bins_init (&bins, grid);
  double limit[3] = { grid->period_min_d, 6, grid->period_max_d }, fold_s = 0, drift = series->n > 2700000 ? 4 : 2;
  for (int i = 0; i < 2; i++)
    {
      AntRepeatShared shared;
      double t2 = cpu_s ();
      ant_repeat_shared_init (&shared, &edges, &pairs, step_d, i ? 2 : 4, i ? drift : 4, longest_d, limit[i + 1]);
      for (double at = limit[i]; at < limit[i + 1];)
        {
          double end = fmin (ant_repeat_shared_chunk_end (&shared, at), limit[i + 1]);
          ant_repeat_shared_search (&shared, grid, at, end, 3, 0, NULL, &bins);
          at = end;
        }
      fold_s += cpu_s () - t2;
      ant_repeat_shared_clear (&shared);
    }
  printf ("model %c, shared fold: %.2f s (%.1f times the white search), before it whitening and energies: %.2f s, misfit %.1f %%\n", name,
          fold_s, fold_s / white_s, t1 - t0, 100 * pairs.misfit);
  double trees_s = 0;
  for (double d = 1.0 / 24; d < longest_d; d += 6.0 / 24) /* half-hour spacing needs twelve times as many */
    {
      AntRepeatBoxes boxes;
      ant_repeat_boxes_init_edges (&boxes, &edges, &pairs, step_d, d, 10 / ANT_MINUTES_PER_DAY, grid->period_max_d);
      trees_s += 12 * trees (grid, &boxes, d, 40, &bins, NULL);
      ant_repeat_boxes_clear (&boxes);
    }
  printf ("model %c, a tree for each duration (30 min apart, steps of 10 min), projected: %.0f s, %.1f times as much\n", name, trees_s,
          trees_s / fold_s);
  ant_repeat_bins_clear (&bins);
  ant_repeat_pairs_clear (&pairs);
  ant_repeat_edges_clear (&edges);
  ant_whitener_free (whitener);
  free (z);
}

int
main (int argc, char **argv)
{
  double days = argc > 1 ? atof (argv[1]) : 730, longest = argc > 2 ? atof (argv[2]) : 365, step_d = 1 / ANT_MINUTES_PER_DAY;
  size_t n = (size_t) (days / step_d);
  float *value = malloc (n * sizeof *value);
  AntRepeatGrid grid = { .period_min_d = 0.5, .period_max_d = longest, .shortest_factor = 0.2, .longest_factor = 2,
                         .shortest_d = 2 * step_d };
  AntSeries series = ant_study_record ('A', ANT_MASK_L1, n, step_d, 1, value);
  AntRandom random;
  ant_random_seed (&random, 1, 2);
  float *white = malloc (n * sizeof *white);
  for (size_t i = 0; i < n; i++)
    white[i] = isnan (value[i]) ? NAN : (float) (100 * ant_random_normal (&random));
  printf ("%zu samples, periods 0.5 to %g d, durations 0.2 to 2 crossing times\n", n, longest);
  AntSeries plain = series;
  plain.value_ppm = white;
  double white_s = bench_white (&grid, &plain);
  fflush (stdout);
  grid.shortest_d = 0.5 / 24;
  bench_fitted (&grid, &series, 'A', white_s);
  free (value);
  free (white);
  return 0;
}
