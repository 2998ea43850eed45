/* bench-repeats.c - what the search for repeats costs, dips alone and until peaks are refined: in white noise beside plain folds
 * of the same boxes and periods, under fitted noise beside a tree for each duration, both projected; one thread and more.
 *
 * usage: bench-repeats [DAYS [LONGEST_PERIOD_D [THREADS]]]    (60 s cadence; 730 d, 365 d, 1; THREADS 2 and more: walls too) */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <sys/resource.h>
#include <time.h>
#include "core/random.h"
#include "core/simd.h"
#include "core/units.h"
#include "jobs/pool.h"
#include "models.h"
#include "search/repeat-work.h"

#define RATIO 1.5

static double
seconds (clockid_t clock)
{
  struct timespec t;
  clock_gettime (clock, &t);
  return (double) t.tv_sec + 1e-9 * (double) t.tv_nsec;
}

static double
cpu_s (void)
{
  return seconds (CLOCK_THREAD_CPUTIME_ID);
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

/* Range of periods of one of the durations RATIO apart. */
static void
periods_of (const AntRepeatGrid *grid, double d, double *from_d, double *to_d)
{
  double unused, half = sqrt (RATIO);
  ant_repeat_grid_periods (grid, d / half, from_d, &unused);
  ant_repeat_grid_periods (grid, d * half, &unused, to_d);
  *from_d = fmax (*from_d, 3 * d);
}

/* Plain folds of the boxes that the white search has folded, projected from every fifth chunk of periods. */
static double
plain_folds (const AntRepeats *repeats)
{
  const AntRepeatSide *side = &repeats->side[0];
  double sum = 0;
  for (size_t k = 0; k < side->n_trees; k++)
    {
      double from_d, to_d;
      periods_of (&repeats->options.grid, side->tree[k].duration_d, &from_d, &to_d);
      int chunk = 0;
      for (double at = from_d; at < to_d; chunk++)
        {
          double end = fmin (ant_repeat_boxes_chunk_end (&side->tree[k], at), to_d);
          sum += chunk % 5 ? 0 : 5 * plain_cost (&side->tree[k], at, end);
          at = end;
        }
    }
  return sum;
}

/* Trees for durations half an hour apart, projected from one in twelve and every fortieth chunk of periods. */
static double
duration_trees (const AntRepeats *repeats)
{
  const AntRepeatSide *side = &repeats->side[0];
  const AntRepeatGrid *grid = &repeats->options.grid;
  double longest_d = ant_repeat_grid_longest (grid), sum = 0;
  for (double d = 1 / ANT_HOURS_PER_DAY; d < longest_d; d += 6 / ANT_HOURS_PER_DAY)
    {
      AntRepeatBoxes boxes;
      double from_d, to_d;
      periods_of (grid, d, &from_d, &to_d);
      if (ant_repeat_boxes_init_edges (&boxes, &side->edges, &repeats->pairs, repeats->series.step_d, d, 10 / ANT_MINUTES_PER_DAY,
                                       grid->period_max_d))
        exit (1);
      int chunk = 0;
      for (double at = from_d; at < to_d; chunk++)
        {
          double end = fmin (ant_repeat_boxes_chunk_end (&boxes, at), to_d), t0 = cpu_s ();
          if (chunk % 40 == 0)
            {
              AntRepeatBins part;
              ant_repeat_bins_part (&part, &side->bins, at, end);
              ant_repeat_boxes_search (&boxes, at, end, 3, NULL, &part);
              ant_repeat_bins_clear (&part);
              sum += 12 * 40 * (cpu_s () - t0);
            }
          at = end;
        }
      ant_repeat_boxes_clear (&boxes);
    }
  return sum;
}

static AntRepeats *
begin (const AntSeries *series, double longest_d, int white, size_t n_chunks, const AntChunk *chunk)
{
  AntRepeatOptions options = { .grid = { .period_min_d = 0.5, .period_max_d = longest_d, .shortest_factor = 0.2, .longest_factor = 2,
                                         .shortest_d = white ? 2 * series->step_d : 0.5 / ANT_HOURS_PER_DAY },
                               .least_events = 3, .false_alarms = 0.01, .white = white, .edge_d = 20 / ANT_MINUTES_PER_DAY,
                               .exposure_d = series->step_d, .limb_darkening = ANT_LIMB_DARKENING_SUN };
  AntStatus status;
  AntRepeats *repeats = ant_repeats_new (series, &options, n_chunks, chunk, &status);
  if (!repeats)
    exit (1);
  return repeats;
}

/* The first three stages: prepare, fold, refine; seconds of each. */
static void
search (AntRepeats *repeats, double cost_s[3])
{
  const AntStages *stages = ant_repeats_stages ();
  for (size_t stage = 0; stage < 3; stage++)
    {
      double t0 = cpu_s ();
      for (size_t i = 0, count = stages->count (repeats, stage); i < count; i++)
        if (stages->run_slice (repeats, stage, i))
          exit (1);
      if (stage < 2 && stages->finish (repeats, stage))
        exit (1);
      cost_s[stage] = cpu_s () - t0;
    }
}

/* Walls of the same on one thread and on several. */
static void
tell_threads (const AntSeries *series, double longest_d, int white, size_t n_chunks, const AntChunk *chunk, guint threads)
{
  double wall_s[2];
  for (int k = 0; k < 2; k++)
    {
      AntStages stages = *ant_repeats_stages ();
      AntRepeats *repeats = begin (series, longest_d, white, n_chunks, chunk);
      stages.n_stages = 3;
      wall_s[k] = -seconds (CLOCK_MONOTONIC);
      if (ant_pool_run (&stages, repeats, k ? threads : 1, NULL, NULL, NULL))
        exit (1);
      wall_s[k] += seconds (CLOCK_MONOTONIC);
      ant_repeats_free (repeats);
    }
  printf ("  wall on one thread %.2f s, on %u %.2f s: %.2f times as fast\n", wall_s[0], threads, wall_s[1], wall_s[0] / wall_s[1]);
}

static double
bench_white (const AntSeries *series, double longest_d, guint threads)
{
  double cost_s[3];
  AntRepeats *repeats = begin (series, longest_d, 1, 0, NULL);
  search (repeats, cost_s);
  struct rusage usage;
  getrusage (RUSAGE_SELF, &usage);
  double sum_s = cost_s[0] + cost_s[1] + cost_s[2];
  printf ("white noise, trees of %zu durations: %.2f s (prepare %.2f, fold %.2f, refine %zu peaks %.2f); %.1f bytes a sample at most\n",
          repeats->side[0].n_trees, sum_s, cost_s[0], cost_s[1], repeats->n_peaks, cost_s[2],
          (double) usage.ru_maxrss * 1024 / (double) series->n);
  fflush (stdout);
  double plain_s = plain_folds (repeats);
  printf ("  plain folds of the same boxes and periods, projected: %.1f s, %.1f times as much\n", plain_s, plain_s / sum_s);
  ant_repeats_free (repeats);
  if (threads > 1)
    tell_threads (series, longest_d, 1, 0, NULL, threads);
  fflush (stdout);
  return sum_s;
}

static void
bench_fitted (const AntSeries *series, char name, double longest_d, guint threads, double white_s)
{
  AntChunkOptions chunks = { .overlap_d = 20 };
  size_t room = ant_chunks_room (series, &chunks);
  AntChunk *chunk = calloc (room, sizeof *chunk);
  size_t n_chunks = ant_chunks_plan (series, &chunks, room, chunk);
  for (size_t i = 0; i < n_chunks; i++)
    ant_study_model (name, &chunk[i].model);
  double cost_s[3];
  AntRepeats *repeats = begin (series, longest_d, 0, n_chunks, chunk);
  search (repeats, cost_s);
  printf ("model %c, shared fold and %zu peaks refined: %.2f s, %.1f times the white search; before it whitening and energies: %.2f s, "
          "misfit %.1f %%\n", name, repeats->n_peaks, cost_s[1] + cost_s[2], (cost_s[1] + cost_s[2]) / white_s, cost_s[0],
          100 * repeats->pairs.misfit);
  fflush (stdout);
  double trees_s = duration_trees (repeats);
  printf ("  a tree for each duration (30 min apart, steps of 10 min), projected: %.0f s, %.1f times as much\n", trees_s, trees_s / cost_s[1]);
  ant_repeats_free (repeats);
  if (threads > 1)
    tell_threads (series, longest_d, 0, n_chunks, chunk, threads);
  free (chunk);
}

int
main (int argc, char **argv)
{
  double days = argc > 1 ? atof (argv[1]) : 730, longest_d = argc > 2 ? atof (argv[2]) : 365, step_d = 1 / ANT_MINUTES_PER_DAY;
  guint threads = argc > 3 ? (guint) atoi (argv[3]) : 1;
  size_t n = (size_t) (days / step_d);
  float *value = malloc (n * sizeof *value);
  AntRandom random;
  AntSeries series = { .n = n, .step_d = step_d, .value_ppm = value };
  ant_random_seed (&random, 1, 2);
  for (size_t i = 0; i < n; i++)
    value[i] = i % 1000 < 20 ? NAN : (float) (100 * ant_random_normal (&random));
  printf ("%zu samples, periods 0.5 to %g d, durations 0.2 to 2 crossing times\n", n, longest_d);
  double white_s = bench_white (&series, longest_d, threads);
  series = ant_study_record ('A', ANT_MASK_L1, n, step_d, 1, value);
  bench_fitted (&series, 'A', longest_d, threads, white_s);
  free (value);
  return 0;
}
