/* study-repeats.c - records of noise, with or without a planted repeat, through the search for repeats under the true noise
 * model: what noise alone lists at a stated rate, what of a planted repeat is found, and what one strong dip raises.
 *
 * usage: study-repeats MODEL MASK DAYS CADENCE_S RECORDS SEED RATE [IDEAL_SNR [glitch]]
 * MODEL A, B, C, or W: white, 100 ppm; glitch: a single dip of that SNR in place of the repeat. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>
#include "core/random.h"
#include "core/units.h"
#include "models.h"
#include "search/crossing-shape.h"
#include "search/repeat-work.h"

typedef struct
{
  char model;
  AntMask mask;
  size_t n;
  double step_d, rate, ideal_snr;
  int glitch;
} Study;

typedef struct
{
  double period_d, mid_d, duration_d, depth_ppm, snr;
  double at_truth, refined; /* the train's own SNR where it was planted, and the best that the climb from the folds reaches */
} Planted;

static double
cpu_s (void)
{
  struct timespec t;
  clock_gettime (CLOCK_THREAD_CPUTIME_ID, &t);
  return (double) t.tv_sec + 1e-9 * (double) t.tv_nsec;
}

static AntSeries
draw (const Study *study, unsigned long seed, float *value, AntNoiseModel *model)
{
  if (study->model != 'W')
    {
      ant_study_model (study->model, model);
      return ant_study_record (study->model, study->mask, study->n, study->step_d, seed, value);
    }
  AntSeries series = ant_study_record ('C', study->mask, study->n, study->step_d, seed, value); /* for its gaps */
  AntRandom random;
  ant_random_seed (&random, seed, 78);
  *model = (AntNoiseModel){ .white_ppm = 100, .error_scale = 1 };
  for (size_t i = 0; i < series.n; i++)
    value[i] = isnan (value[i]) ? NAN : (float) (100 * ant_random_normal (&random));
  return series;
}

/* Subtract a train of crossings (boxes in white noise) of this depth. */
static void
subtract (const Study *study, const AntSeries *series, const Planted *planted, double depth_ppm, float *value)
{
  AntCrossingShape shape;
  double edge_d = fmax (20 / ANT_MINUTES_PER_DAY, study->step_d);
  ant_crossing_shape_init (&shape, planted->duration_d, fmin (edge_d, 0.5 * planted->duration_d), ANT_SHAPE_IMPACT,
                           ANT_LIMB_DARKENING_SUN);
  for (size_t i = 0; i < series->n; i++)
    {
      double t = (double) i * study->step_d - planted->mid_d;
      t -= planted->period_d * floor (t / planted->period_d + 0.5);
      if (fabs (t) < 0.5 * planted->duration_d + study->step_d)
        value[i] -= (float) (depth_ppm
                             * (study->model == 'W' ? fabs (t) < 0.5 * planted->duration_d
                                                    : ant_crossing_shape_mean (&shape, t, study->step_d)));
    }
}

/* SNR of a train of unit depth under the true noise, the level fitted with it. */
static double
unit_snr (const Study *study, const AntSeries *series, const AntNoiseModel *model, const Planted *planted)
{
  float *shape = malloc (series->n * sizeof *shape);
  double *z = malloc (series->n * sizeof *z), energy = 0, sum = 0, count = 0;
  AntStatus status;
  for (size_t i = 0; i < series->n; i++)
    shape[i] = isnan (series->value_ppm[i]) ? NAN : 0;
  subtract (study, series, planted, 1, shape);
  if (study->model != 'W')
    {
      AntWhitener *whitener = ant_whitener_new_free_level (model, series, &status);
      ant_whitener_solve (whitener, shape, z);
      ant_whitener_free (whitener);
    }
  for (size_t i = 0; i < series->n; i++)
    if (!isnan (shape[i]))
      {
        double here = (double) shape[i];
        energy += study->model == 'W' ? here * here : here * z[i];
        sum += here;
        count++;
      }
  if (study->model == 'W')
    energy = (energy - sum * sum / count) / (model->white_ppm * model->white_ppm);
  free (shape);
  free (z);
  return sqrt (energy);
}

/* Plant a repeat whose ideal SNR under the true noise is that of the study. Period and duration are log-uniform. */
static Planted
plant (const Study *study, const AntSeries *series, const AntNoiseModel *model, AntRandom *random, float *value)
{
  double span_d = (double) series->n * series->step_d;
  Planted planted = { .period_d = exp (log (0.5) + ant_random_uniform (random) * log (span_d / 3 / 0.5)), .snr = study->ideal_snr };
  planted.duration_d = 13.0 / 24 * cbrt (planted.period_d / 365.25) * exp (log (0.5) + ant_random_uniform (random) * log (3.0));
  planted.duration_d = fmax (planted.duration_d, 0.75 / 24);
  planted.mid_d = ant_random_uniform (random) * (study->glitch ? span_d : planted.period_d);
  planted.period_d = study->glitch ? 10 * span_d : planted.period_d;
  planted.depth_ppm = study->ideal_snr / unit_snr (study, series, model, &planted);
  if (!isfinite (planted.depth_ppm)) /* a glitch in a gap */
    return plant (study, series, model, random, value);
  subtract (study, series, &planted, planted.depth_ppm, value);
  return planted;
}

/* After the climb of the first round. */
static void
compare (const AntRepeats *repeats, Planted *planted)
{
  double step_d = repeats->series.step_d;
  AntTrainTrial truth = { .period = planted->period_d / step_d, .mid = planted->mid_d / step_d, .duration = planted->duration_d / step_d };
  planted->at_truth = ant_repeat_train_snr (&repeats->side[0].train, &truth, repeats->options.least_events);
  for (size_t i = 0; i < repeats->n_peaks; i++)
    planted->refined = fmax (planted->refined, repeats->peak[i].sums.snr);
}

static AntRepeats *
search (const Study *study, const AntSeries *series, const AntChunk *chunk, Planted *planted)
{
  AntRepeatOptions options = { .grid = { .period_min_d = 0.5, .shortest_factor = 0.2, .longest_factor = 2, .shortest_d = 0.5 / 24 },
                               .least_events = 3, .false_alarms = study->rate, .white = study->model == 'W',
                               .edge_d = 20 / ANT_MINUTES_PER_DAY, .exposure_d = study->step_d,
                               .limb_darkening = ANT_LIMB_DARKENING_SUN };
  AntStatus status;
  const AntStages *stages = ant_repeats_stages ();
  AntRepeats *repeats = ant_repeats_new (series, &options, 1, chunk, &status);
  for (size_t stage = 0; repeats && !status && stage < stages->n_stages; stage++)
    {
      size_t count = stages->count (repeats, stage);
      double t0 = cpu_s ();
      for (size_t i = 0; i < count && !status; i++)
        status = stages->run_slice (repeats, stage, i);
      double t1 = cpu_s ();
      if (stage == 2 && !status)
        compare (repeats, planted);
      status = status ? status : stages->finish (repeats, stage);
      if (getenv ("TELL_STAGES") && count)
        printf ("  %s: %zu slices, %.2f + %.2f s\n", stages->title (repeats, stage), count, t1 - t0, cpu_s () - t1);
    }
  if (!status)
    return repeats;
  fprintf (stderr, "study-repeats: %s\n", ant_status_text (status));
  exit (1);
}

static void
tell (unsigned long seed, const AntRepeats *repeats, const Planted *planted, double cost_s)
{
  const AntRepeat *repeat;
  double mirrored;
  size_t n = ant_repeats_list (repeats, &repeat), n_mirrored = ant_repeats_mirrored (repeats, &mirrored);
  printf ("seed %lu: threshold %.3f, %zu listed, mirrored %zu (best %.3f), %.2f s", seed, ant_repeats_threshold (repeats), n,
          n_mirrored, mirrored, cost_s);
  if (planted)
    printf (", planted P %.5f D %.2f h depth %.2f snr %.2f, there %.3f, refined %.3f", planted->period_d, planted->duration_d * 24,
            planted->depth_ppm, planted->snr, planted->at_truth, planted->refined);
  for (size_t i = 0; i < n; i++)
    printf ("; P %.6f +- %.6f D %.2f h depth %.2f +- %.2f snr %.3f (without largest %.2f) events %zu of %zu chi2 %.1f false %.3g",
            repeat[i].period_d, repeat[i].period_sigma_d, repeat[i].duration_d * 24, repeat[i].depth_ppm, repeat[i].depth_sigma_ppm,
            repeat[i].snr, repeat[i].snr_without_largest, repeat[i].n_observed, repeat[i].n_events, repeat[i].chi2, repeat[i].expected_false);
  printf ("; expected above the best: dips %.4f, brightenings %.4f\n",
          n ? ant_repeats_expected_false (repeats, repeat->snr) : HUGE_VAL,
          n_mirrored ? ant_repeats_expected_false (repeats, mirrored) : HUGE_VAL);
  fflush (stdout);
}

/* What the records have given. */
typedef struct
{
  size_t records, listed, mirrored, right;
  size_t strong, kept; /* realised SNR 8 and more where they were planted; refined to 0.995 of that */
  double least_kept;
  double snr, depth, depth2; /* sums of ratios to the planted ones, where the period is right */
} Totals;

static void
count_record (const Study *study, const AntRepeats *repeats, const Planted *planted, Totals *totals)
{
  const AntRepeat *repeat;
  double best, events = (double) study->n * study->step_d / planted->period_d;
  size_t n = ant_repeats_list (repeats, &repeat);
  totals->records++;
  totals->listed += n > 0;
  totals->mirrored += ant_repeats_mirrored (repeats, &best);
  if (planted->at_truth >= 8)
    {
      double kept = planted->refined / planted->at_truth;
      totals->strong++;
      totals->kept += kept >= 0.995;
      totals->least_kept = totals->strong == 1 ? kept : fmin (totals->least_kept, kept);
    }
  if (!(planted->snr > 0) || !n || fabs (repeat->period_d - planted->period_d) * events >= 0.5 * planted->duration_d)
    return;
  double depth = repeat->depth_ppm / planted->depth_ppm;
  totals->right++;
  totals->snr += repeat->snr / planted->snr;
  totals->depth += depth;
  totals->depth2 += depth * depth;
}

static void
tell_totals (const Study *study, const Totals *totals)
{
  double records = (double) totals->records, right = (double) totals->right, share = (double) (totals->listed + totals->mirrored) / 2 / records;
  printf ("records %zu, with a repeat listed %zu, with a brightening %zu: %.3f +- %.3f of one sign", totals->records, totals->listed,
          totals->mirrored, -log (1 - share), sqrt (share / (1 - share) / 2 / records));
  if (study->ideal_snr > 0 && !study->glitch)
    printf (", of %zu with a realised SNR of 8 and more %zu refined to 0.995 of it, the worst to %.4f", totals->strong, totals->kept,
            totals->least_kept);
  if (study->ideal_snr > 0 && !study->glitch)
    printf (", period right %zu, mean SNR ratio %.4f, mean depth ratio %.4f +- %.4f", totals->right, totals->snr / right, totals->depth / right,
            sqrt (fmax (totals->depth2 / right - pow (totals->depth / right, 2), 0) / right));
  printf ("\n");
}

static Study
asked (char **argv, int argc)
{
  Study study = { .model = argv[1][0], .mask = strcmp (argv[2], "l1") ? ANT_MASK_LOW_ORBIT : ANT_MASK_L1,
                  .step_d = atof (argv[4]) / ANT_SECONDS_PER_DAY, .rate = atof (argv[7]), .ideal_snr = argc > 8 ? atof (argv[8]) : 0,
                  .glitch = argc > 9 };
  study.n = (size_t) (atof (argv[3]) / study.step_d);
  return study;
}

int
main (int argc, char **argv)
{
  if (argc < 8)
    return 2;
  Study study = asked (argv, argc);
  Totals totals = { 0 };
  float *value = malloc (study.n * sizeof *value);
  for (unsigned long r = 0; r < strtoul (argv[5], NULL, 10); r++)
    {
      unsigned long seed = strtoul (argv[6], NULL, 10) + r;
      AntChunk *chunk = calloc (1, sizeof *chunk);
      AntRandom random;
      ant_random_seed (&random, seed, 79);
      AntSeries series = draw (&study, seed, value, &chunk->model);
      Planted planted = { .period_d = 1 };
      if (study.ideal_snr > 0)
        planted = plant (&study, &series, &chunk->model, &random, value);
      chunk->n = series.n;
      chunk->own_from = -HUGE_VAL;
      chunk->own_to = HUGE_VAL;
      double t0 = cpu_s ();
      AntRepeats *repeats = search (&study, &series, chunk, &planted);
      tell (seed, repeats, study.ideal_snr > 0 ? &planted : NULL, cpu_s () - t0);
      count_record (&study, repeats, &planted, &totals);
      ant_repeats_free (repeats);
      free (chunk);
    }
  tell_totals (&study, &totals);
  free (value);
  return 0;
}
