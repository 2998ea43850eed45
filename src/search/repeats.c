/* repeats.c - a search for repeats from its making to its end, and the table of its stages. */
#include "search/repeats.h"
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "search/repeat-work.h"

enum { WHITEN, FOLD, CLIMB, MEASURE, N_KINDS };
#define ROUNDS (ANT_MOST_REPEATS + 2) /* three repeats and a round that finds nothing, one without known dips, brightenings */

/* Time from the first observed sample to the last, in places; 0 if nothing is observed. */
static double
observed_span (const AntSeries *series)
{
  size_t first = 0, end = series->n;
  while (first < end && isnan (series->value_ppm[first]))
    first++;
  while (end > first && isnan (series->value_ppm[end - 1]))
    end--;
  return (double) (end - first);
}

static double
edge_of (const AntSeries *series, const AntRepeatOptions *options)
{
  return fmax (fmax (options->edge_d, options->exposure_d), series->step_d);
}

void
ant_repeats_limits (const AntSeries *series, const AntRepeatOptions *options, double *shortest_d, double *longest_d)
{
  double span_d = observed_span (series) * series->step_d;
  *shortest_d = fmax (8 * edge_of (series, options), 3 * fmax (options->grid.shortest_d, series->step_d));
  *longest_d = span_d / (double) (options->least_events - 1);
}

static AntStatus
init (AntRepeats *repeats)
{
  AntRepeatGrid *grid = &repeats->options.grid;
  const AntSeries *series = &repeats->series;
  double shortest_d, longest_d;
  ant_repeats_limits (series, &repeats->options, &shortest_d, &longest_d);
  grid->period_min_d = fmax (grid->period_min_d, shortest_d);
  grid->period_max_d = grid->period_max_d > 0 ? fmin (grid->period_max_d, longest_d) : longest_d;
  grid->shortest_d = fmax (grid->shortest_d, series->step_d);
  if (!(grid->period_max_d > grid->period_min_d) || !(ant_repeat_grid_longest (grid) >= grid->shortest_d))
    return ANT_NO_DATA;
  repeats->ramp = edge_of (series, &repeats->options) / series->step_d;
  repeats->span_d = observed_span (series) * series->step_d;
  repeats->value = malloc (series->n * sizeof *repeats->value);
  repeats->z = calloc (series->n, sizeof *repeats->z);
  repeats->rate = calloc ((repeats->n_chunks + 1) * ANT_CHANCE_DURATIONS, sizeof *repeats->rate);
  repeats->peak = malloc (2 * (size_t) ANT_REPEAT_PEAKS * sizeof *repeats->peak);
  if (!repeats->value || !repeats->z || !repeats->rate || !repeats->peak)
    return ANT_NO_MEMORY;
  memcpy (repeats->value, series->value_ppm, series->n * sizeof *repeats->value);
  repeats->series.value_ppm = repeats->value;
  AntStatus status = ant_repeat_bins_init (&repeats->spectrum, grid);
  if (!status && !repeats->options.white)
    status = ant_repeat_pairs_init (&repeats->pairs, series->n, repeats->ramp, ant_repeat_grid_longest (grid) / series->step_d);
  return status;
}

AntRepeats *
ant_repeats_new (const AntSeries *series, const AntRepeatOptions *options, size_t n_chunks, const AntChunk *chunk,
                 AntStatus *status)
{
  *status = options->least_events >= 2 && (options->white || n_chunks) ? ANT_OK : ANT_BAD_ARGUMENT;
  AntRepeats *repeats = *status ? NULL : calloc (1, sizeof *repeats);
  if (!repeats)
    {
      *status = *status ? *status : ANT_NO_MEMORY;
      return NULL;
    }
  repeats->series = *series;
  repeats->options = *options;
  repeats->n_chunks = n_chunks;
  repeats->chunk = chunk;
  repeats->active = 1;
  *status = init (repeats);
  if (*status)
    {
      ant_repeats_free (repeats);
      return NULL;
    }
  return repeats;
}

void
ant_repeats_free (AntRepeats *repeats)
{
  if (!repeats)
    return;
  ant_repeats_forget (repeats);
  for (size_t i = 0; i < repeats->n_repeats; i++)
    free (repeats->repeat[i].event);
  ant_repeat_bins_clear (&repeats->spectrum);
  free (repeats->slice);
  free (repeats->peak);
  free (repeats->rate);
  free (repeats->z);
  free (repeats->value);
  free (repeats);
}

static const char *
stage_title (void *work, size_t stage)
{
  static const char *const title[N_KINDS] = { "preparing the search for repeats", "folding at every period", "refining repeats",
                                              "measuring repeats" };
  return title[stage % N_KINDS];
}

static size_t
stage_count (void *work, size_t stage)
{
  AntRepeats *repeats = work;
  if (!repeats->active)
    return 0;
  size_t chunks = repeats->options.white ? 0 : repeats->n_chunks;
  size_t count[N_KINDS] = { chunks, repeats->n_slices, repeats->n_peaks, repeats->n_finalists ? chunks : 0 };
  return count[stage % N_KINDS];
}

static AntStatus
run_slice (void *work, size_t stage, size_t slice)
{
  AntRepeats *repeats = work;
  if (ant_stop_asked (&repeats->stop))
    return ANT_STOPPED;
  switch (stage % N_KINDS)
    {
    case WHITEN: return ant_repeats_whiten (repeats, slice);
    case FOLD: return ant_repeats_fold (repeats, slice);
    case CLIMB: return ant_repeats_climb (repeats, slice);
    default: return ant_repeats_measure (repeats, slice);
    }
}

static AntStatus
finish (void *work, size_t stage)
{
  AntRepeats *repeats = work;
  AntStatus status;
  if (!repeats->active)
    return ANT_OK;
  switch (stage % N_KINDS)
    {
    case WHITEN: return ant_repeats_plan (repeats);
    case FOLD: status = ant_repeats_merge (repeats); return status ? status : ant_repeats_pick_peaks (repeats);
    case CLIMB: return ant_repeats_choose (repeats);
    default: return ant_repeats_settle (repeats);
    }
}

static AntStop *
stop_of (void *work)
{
  AntRepeats *repeats = work;
  return &repeats->stop;
}

const AntStages *
ant_repeats_stages (void)
{
  static const AntStages stages = { ROUNDS * N_KINDS, stage_title, stage_count, run_slice, finish, stop_of };
  return &stages;
}

size_t
ant_repeats_list (const AntRepeats *repeats, const AntRepeat **repeat)
{
  *repeat = repeats->repeat;
  return repeats->n_repeats;
}

const AntRepeatBins *ant_repeats_spectrum (const AntRepeats *repeats) { return &repeats->spectrum; }
AntRepeatGrid ant_repeats_grid (const AntRepeats *repeats) { return repeats->options.grid; }
double ant_repeats_threshold (const AntRepeats *repeats) { return repeats->threshold; }

double
ant_repeats_expected_false (const AntRepeats *repeats, double snr)
{
  return ant_repeat_chance_expected (&repeats->chance, snr);
}

size_t
ant_repeats_mirrored (const AntRepeats *repeats, double *best_snr)
{
  *best_snr = repeats->best_mirrored;
  return repeats->n_mirrored;
}

double
ant_repeats_done (const AntRepeats *repeats)
{
  return repeats->n_first ? (double) repeats->n_done / (double) repeats->n_first : 0;
}

void
ant_repeats_end_early (AntRepeats *repeats)
{
  if (repeats->round || repeats->n_done == repeats->n_first)
    return;
  for (size_t i = 0; i < repeats->n_slices; i++)
    if (repeats->slice[i].part.cell)
      {
        repeats->n_done++;
        if (repeats->slice[i].side == 0)
          ant_repeat_bins_merge (&repeats->spectrum, &repeats->slice[i].part);
      }
}
