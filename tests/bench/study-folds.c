/* study-folds.c - what the coarse search for repeats loses: trains without noise, folded near their period as the search does it,
 * against the exact matched filter of the whole train; and whether what the bound of the shared fold skips could have won.
 *
 * usage: study-folds MODEL MASK DAYS CADENCE_S TRAINS SEED    (MODEL A, B, C, or W: white)
 * Periods and durations are log-uniform, 0.5 d to a third of the record and 0.2 to 2 crossing times; three events and more are
 * observed. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include "core/robust.h"
#include "core/units.h"
#include "models.h"
#include "search/repeat-work.h"

#define SNR 7.0          /* small enough that no event of three is cut, large enough for the floor of the bins */
#define RAMP_D (20 / ANT_MINUTES_PER_DAY)
#define BOX_RATIO 1.5       /* of the durations of trees, as in the search */
#define TRAPEZOID_RATIO 1.25
#define FINE_BELOW_D 6.0
#define WORST_MISFIT 0.08

typedef struct
{
  int white, trees;
  AntSeries series;      /* of the noise, for its gaps and for the bound */
  float *value;          /* [n] a train */
  double *z, *weight;
  AntWhitener *whitener;
  double ramp;           /* places */
  AntRepeatGrid grid;
  AntRepeatEdges noise;
  AntRepeatPairs pairs;
  AntRepeatShared shared[2];
} Study;

typedef struct
{
  double period, start, duration; /* places, contact I and I to IV */
} Train;

static void
fail (AntStatus status)
{
  if (!status)
    return;
  fprintf (stderr, "study-folds: %s\n", ant_status_text (status));
  exit (1);
}

static double
clip (double x)
{
  return x < 0 ? 0 : x > 1 ? 1 : x;
}

/* Draw a train without noise, of this SNR for a matched filter of the whole of it. */
static void
draw (Study *study, const Train *train)
{
  size_t n = study->series.n;
  double energy = 0, weights = 0, sum = 0;
  for (size_t i = 0; i < n; i++)
    {
      double t = (double) i - train->start, depth;
      t -= train->period * floor (t / train->period);
      depth = study->white ? t < train->duration : clip (t / study->ramp) - clip ((t - train->duration + study->ramp) / study->ramp);
      study->value[i] = isnan (study->series.value_ppm[i]) ? NAN : (float) -depth;
    }
  if (!study->white)
    fail (ant_whitener_solve (study->whitener, study->value, study->z));
  for (size_t i = 0; i < n; i++)
    if (!isnan (study->value[i]))
      {
        double v = (double) study->value[i];
        energy += study->white ? v * v : v * study->z[i];
        weights += 1;
        sum += v;
      }
  double scale = SNR / sqrt (study->white ? energy - sum * sum / weights : energy);
  for (size_t i = 0; i < n; i++)
    {
      study->value[i] *= (float) scale;
      study->z[i] = isnan (study->value[i]) ? 0 : study->z[i] * scale;
    }
}

static double
best_of (AntRepeatBins *bins)
{
  double best = 0;
  for (size_t i = 0; i < bins->n; i++)
    best = fmax (best, bins->cell[i].power);
  ant_repeat_bins_clear (bins);
  return sqrt (best);
}

/* The fold's own Z, of the train in place of the noise. */
static double
shared_best (Study *study, const AntRepeatEdges *edges, double from_d, double to_d, AntRepeatBins *bins)
{
  AntRepeatShared *shared = &study->shared[to_d > FINE_BELOW_D];
  shared->edges = edges;
  double root = sqrt (study->pairs.typical);
  for (size_t i = 0; i < shared->arrays.n; i++)
    shared->arrays.a[i] = (float) (ant_repeat_edges_at (edges, ((double) i - (double) shared->lead) * shared->step) / root);
  fail (ant_repeat_shared_search (shared, &study->grid, from_d, to_d, 3, 0, NULL, bins));
  return best_of (bins);
}

static double
trees_best (Study *study, const AntRepeatEdges *edges, const AntRepeatBox *box, const Train *train, double from_d, double to_d,
            AntRepeatBins *bins)
{
  double ratio = study->white ? BOX_RATIO : TRAPEZOID_RATIO, shortest_d, unused;
  double step_d = study->series.step_d, duration_d = train->duration * step_d;
  ant_repeat_grid_durations (&study->grid, study->grid.period_min_d, &shortest_d, &unused);
  for (double d = shortest_d * sqrt (ratio); d < 2 * duration_d; d *= ratio)
    if (d > 0.5 * duration_d && from_d > 3 * d)
      {
        AntRepeatBoxes boxes;
        fail (study->white ? ant_repeat_boxes_init (&boxes, box, d, 6, to_d)
                           : ant_repeat_boxes_init_edges (&boxes, edges, &study->pairs, step_d, d, fmin (RAMP_D, d / 6), to_d));
        fail (ant_repeat_boxes_search (&boxes, from_d, to_d, 3, NULL, bins));
        ant_repeat_boxes_clear (&boxes);
      }
  return best_of (bins);
}

/* Whether three events are half observed, as the search asks. */
static int
is_observed (Study *study, const AntRepeatBox *box, const AntRepeatEdges *edges, const Train *train)
{
  AntRepeatTrain sums = { .box = box, .edges = edges, .pairs = &study->pairs, .n = study->series.n };
  AntTrainTrial trial = { .period = train->period, .mid = train->start + 0.5 * train->duration, .duration = train->duration };
  return ant_repeat_train_snr (&sums, &trial, 3) > 0;
}

/* The range that a train's period is looked for in: wide enough for its best, on its own side of the change of steps. */
static void
range_of (const Study *study, const Train *train, double *from_d, double *to_d)
{
  double period_d = train->period * study->series.step_d, span_d = (double) study->series.n * study->series.step_d;
  double half_d = 8 * fmax (0.5 * train->duration * study->series.step_d, RAMP_D) * period_d / span_d;
  *from_d = fmax (period_d - half_d, period_d < FINE_BELOW_D ? study->grid.period_min_d : FINE_BELOW_D);
  *to_d = fmin (period_d + half_d, period_d < FINE_BELOW_D ? FINE_BELOW_D : study->grid.period_max_d);
}

/* Part of the train's SNR that the fold loses; below 0: too little of it is observed. */
static double
loss_of (Study *study, const Train *train)
{
  AntRepeatBins all = { .from_ln = log (study->grid.period_min_d), .step_ln = ANT_REPEAT_BIN_LN, .n = (size_t) 1 << 20 }, bins;
  AntSeries series = study->series;
  AntRepeatEdges edges = { 0 };
  AntRepeatBox box = { 0 };
  double from_d, to_d, loss = -1;
  range_of (study, train, &from_d, &to_d);
  draw (study, train);
  series.value_ppm = study->value;
  fail (study->white ? ant_repeat_box_init (&box, &series, study->weight)
                     : ant_repeat_edges_init (&edges, study->series.n, study->z, study->ramp));
  if (is_observed (study, study->white ? &box : NULL, &edges, train))
    {
      fail (ant_repeat_bins_part (&bins, &all, from_d, to_d));
      loss = 1 - (study->trees ? trees_best (study, &edges, &box, train, from_d, to_d, &bins)
                               : shared_best (study, &edges, from_d, to_d, &bins)) / SNR;
    }
  ant_repeat_box_clear (&box);
  ant_repeat_edges_clear (&edges);
  return loss;
}

static void
init_fitted (Study *study, char name)
{
  AntNoiseModel model;
  AntStatus status;
  double step_d = study->series.step_d, longest_d = ant_repeat_grid_longest (&study->grid);
  ant_study_model (name, &model);
  study->whitener = ant_whitener_new_free_level (&model, &study->series, &status);
  fail (status);
  fail (ant_whitener_solve (study->whitener, study->series.value_ppm, study->z));
  for (size_t i = 0; i < study->series.n; i++)
    study->z[i] = isnan (study->series.value_ppm[i]) ? 0 : study->z[i];
  fail (ant_repeat_edges_init (&study->noise, study->series.n, study->z, study->ramp));
  fail (ant_repeat_pairs_init (&study->pairs, study->series.n, study->ramp, longest_d / step_d));
  fail (ant_repeat_pairs_tabulate (&study->pairs, study->whitener, 0, -HUGE_VAL, HUGE_VAL, NULL));
  fail (ant_repeat_pairs_fit (&study->pairs));
  study->trees = study->pairs.misfit > WORST_MISFIT;
  for (int i = 0; i < 2; i++)
    fail (ant_repeat_shared_init (&study->shared[i], &study->noise, &study->pairs, step_d, i ? 2 : 4, 4, longest_d,
                                  study->grid.period_max_d));
}

/* Bins of the noise with the bound and without it; counts those at or above 5. */
static void
tell_bound (const Study *study)
{
  double limit[3] = { study->grid.period_min_d, FINE_BELOW_D, study->grid.period_max_d };
  size_t different = 0, peaks = 0, filled = 0;
  for (int i = 0; i < 2; i++)
    for (double at = limit[i]; at < limit[i + 1];)
      {
        double end = fmin (ant_repeat_shared_chunk_end (&study->shared[i], at), limit[i + 1]);
        AntRepeatBins bins[2], whole;
        fail (ant_repeat_bins_init (&whole, &study->grid));
        for (int all = 0; all < 2; all++)
          {
            fail (ant_repeat_bins_part (&bins[all], &whole, at, end));
            fail (ant_repeat_shared_search (&study->shared[i], &study->grid, at, end, 3, all, NULL, &bins[all]));
          }
        for (size_t k = 0; k < bins[0].n; k++)
          {
            different += memcmp (&bins[0].cell[k], &bins[1].cell[k], sizeof bins[0].cell[k]) != 0;
            filled += bins[1].cell[k].power > 0;
            peaks += bins[1].cell[k].power >= 25;
          }
        ant_repeat_bins_clear (&bins[0]);
        ant_repeat_bins_clear (&bins[1]);
        ant_repeat_bins_clear (&whole);
        at = end;
      }
  printf ("noise alone: %zu bins with an answer, %zu of SNR 5 and more; with the bound and in an exhaustive pass %zu differ\n", filled,
          peaks, different);
}

static void
tell_losses (Study *study, size_t n, unsigned long seed)
{
  double *loss = malloc (n * sizeof *loss), *work = malloc (n * sizeof *work), step_d = study->series.step_d, worst = -2;
  Train lost = { 0 };
  AntRandom random;
  ant_random_seed (&random, seed, 80);
  for (size_t k = 0; k < n;)
    {
      double most = log (study->grid.period_max_d / study->grid.period_min_d), shortest_d, longest_d;
      double period_d = study->grid.period_min_d * exp (ant_random_uniform (&random) * most);
      ant_repeat_grid_durations (&study->grid, period_d, &shortest_d, &longest_d);
      double duration_d = shortest_d * exp (ant_random_uniform (&random) * log (longest_d / shortest_d));
      Train train = { .period = period_d / step_d, .duration = duration_d / step_d };
      train.start = ant_random_uniform (&random) * train.period;
      loss[k] = loss_of (study, &train);
      if (loss[k] > worst)
        lost = train;
      worst = fmax (worst, loss[k]);
      k += loss[k] > -1;
    }
  printf ("%zu trains, %s: loss median %.1f %%, 95 %% below %.1f %%, 99 %% below %.1f %%, worst %.1f %% (P %.4f d, duration %.2f h)\n", n,
          study->white ? "boxes" : study->trees ? "a tree for each duration" : "shared fold", 100 * ant_quantile (n, loss, 0.5, work),
          100 * ant_quantile (n, loss, 0.95, work), 100 * ant_quantile (n, loss, 0.99, work), 100 * worst, lost.period * step_d,
          lost.duration * step_d * 24);
  free (loss);
  free (work);
}

int
main (int argc, char **argv)
{
  if (argc < 7)
    return 2;
  Study study = { .white = argv[1][0] == 'W' };
  double step_d = atof (argv[4]) / ANT_SECONDS_PER_DAY;
  size_t n = (size_t) (atof (argv[3]) / step_d);
  unsigned long seed = strtoul (argv[6], NULL, 10);
  float *noise = malloc (n * sizeof *noise);
  study.series = ant_study_record (study.white ? 'C' : argv[1][0], strcmp (argv[2], "l1") ? ANT_MASK_LOW_ORBIT : ANT_MASK_L1, n, step_d,
                                   seed, noise);
  study.grid = (AntRepeatGrid){ .period_min_d = 0.5, .period_max_d = (double) n * step_d / 3, .shortest_factor = 0.2,
                                .longest_factor = 2, .shortest_d = study.white ? 2 * step_d : 0.5 / ANT_HOURS_PER_DAY };
  study.ramp = fmax (RAMP_D / step_d, 1);
  study.value = malloc (n * sizeof *study.value);
  study.z = calloc (n, sizeof *study.z);
  study.weight = malloc (n * sizeof *study.weight);
  for (size_t i = 0; i < n; i++)
    study.weight[i] = !isnan (noise[i]);
  study.trees = study.white;
  if (!study.white)
    {
      init_fitted (&study, argv[1][0]);
      if (!study.trees)
        tell_bound (&study);
    }
  tell_losses (&study, strtoul (argv[5], NULL, 10), seed);
  if (!study.white)
    {
      ant_repeat_shared_clear (&study.shared[0]);
      ant_repeat_shared_clear (&study.shared[1]);
      ant_repeat_pairs_clear (&study.pairs);
      ant_repeat_edges_clear (&study.noise);
      ant_whitener_free (study.whitener);
    }
  free (study.value);
  free (study.z);
  free (study.weight);
  free (noise);
  return 0;
}
