/* repeat-round.c - one round of a search for repeats: whitened data, what is folded, the folds. */
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "search/repeat-work.h"

#define FINE_BELOW_D 6.0     /* shared fold: four phases to a ramp below this period, two above */
#define SHARED_DRIFT 4.0     /* phases, end to end, between its trial periods */
#define WORST_MISFIT 0.08    /* of the pair fit; beyond, a tree for each duration */
#define BOX_RATIO 1.5        /* from one tree's duration to the next, in white noise */
#define TRAPEZOID_RATIO 1.25 /* the same under fitted noise */
#define STARTS_TO_A_BOX 6.0
#define BINS_FROM 0.6        /* of the threshold: less is left out of the bins */

AntStatus
ant_repeats_whiten (AntRepeats *repeats, size_t i)
{
  const AntChunk *chunk = &repeats->chunk[i];
  AntSeries part = ant_series_part (&repeats->series, chunk->first, chunk->n);
  AntStatus status = ant_series_observed (&part, 0) ? ANT_OK : ANT_NO_DATA;
  AntWhitener *whitener = status ? NULL : ant_whitener_new_free_level (&chunk->model, &part, &status);
  double *z = malloc (chunk->n * sizeof *z), duration[ANT_CHANCE_DURATIONS];
  if (!z || !whitener)
    {
      ant_whitener_free (whitener);
      free (z);
      return status == ANT_NO_DATA ? ANT_OK : status ? status : ANT_NO_MEMORY; /* all of it taken out: z is 0 there */
    }
  status = ant_whitener_solve (whitener, part.value_ppm, z);
  for (size_t p = 0; p < chunk->n && !status; p++)
    if ((double) (chunk->first + p) >= chunk->own_from && (double) (chunk->first + p) < chunk->own_to)
      repeats->z[chunk->first + p] = z[p];
  if (!status)
    status = ant_repeat_pairs_tabulate (&repeats->pairs, whitener, chunk->first, chunk->own_from, chunk->own_to, &repeats->stop);
  for (size_t k = 0; k < ANT_CHANCE_DURATIONS; k++)
    duration[k] = ant_repeat_chance_duration (&repeats->options.grid, k) / repeats->series.step_d;
  if (!status && repeats->round == 0)
    status = ant_repeat_chance_rates (whitener, repeats->ramp, chunk->own_from - (double) chunk->first,
                                      chunk->own_to - (double) chunk->first, ANT_CHANCE_DURATIONS, duration,
                                      repeats->rate + i * ANT_CHANCE_DURATIONS);
  ant_whitener_free (whitener);
  free (z);
  return status;
}

/* The law and the threshold: rates averaged over the chunks, each by its own part. */
static void
init_chance (AntRepeats *repeats)
{
  double rate[ANT_CHANCE_DURATIONS] = { 0 }, total = 0;
  for (size_t i = 0; i < repeats->n_chunks; i++)
    {
      const AntChunk *chunk = &repeats->chunk[i];
      double own = fmin (chunk->own_to, (double) repeats->series.n) - fmax (chunk->own_from, 0);
      total += own;
      for (size_t k = 0; k < ANT_CHANCE_DURATIONS; k++)
        rate[k] += own * repeats->rate[i * ANT_CHANCE_DURATIONS + k];
    }
  for (size_t k = 0; k < ANT_CHANCE_DURATIONS; k++)
    rate[k] /= total > 0 ? total : 1;
  ant_repeat_chance_init (&repeats->chance, &repeats->options.grid, repeats->options.least_events, repeats->span_d,
                          repeats->series.step_d, repeats->options.white ? NULL : rate);
  repeats->threshold = ant_repeat_chance_threshold (&repeats->chance, repeats->options.false_alarms);
}

static AntStatus
init_box (AntRepeats *repeats, int side)
{
  double *weight = malloc (repeats->series.n * sizeof *weight);
  AntRepeatBox *box = &repeats->side[side].box;
  AntStatus status = weight ? ant_repeat_white_weights (&repeats->series, weight) : ANT_NO_MEMORY;
  if (!status)
    status = ant_repeat_box_init (box, &repeats->series, weight);
  for (size_t i = 0; side && !status && i <= box->n; i++)
    box->moment[i] = -box->moment[i];
  free (weight);
  return status;
}

static AntStatus
init_data (AntRepeats *repeats, int s)
{
  AntRepeatSide *side = &repeats->side[s];
  const AntSeries *series = &repeats->series;
  const AntRepeatGrid *grid = &repeats->options.grid;
  double floor_d = fmax (grid->shortest_d, series->step_d);
  side->train = (AntRepeatTrain){ .n = series->n, .least_duration = 0.8 * floor_d / series->step_d,
                                  .longest_duration = 1.2 * ant_repeat_grid_longest (grid) / series->step_d };
  AntStatus status = ant_repeat_bins_init (&side->bins, grid);
  side->bins.floor = fmax (ANT_REPEAT_FLOOR, pow (BINS_FROM * repeats->threshold, 2));
  if (!status && repeats->options.white)
    {
      status = init_box (repeats, s);
      side->train.box = &side->box;
    }
  else if (!status)
    {
      for (size_t i = 0; s && i < series->n; i++)
        repeats->z[i] = -repeats->z[i];
      status = ant_repeat_edges_init (&side->edges, series->n, repeats->z, repeats->ramp);
      side->train.edges = &side->edges;
      side->train.pairs = &repeats->pairs;
    }
  return status;
}

static AntStatus
init_shared (AntRepeats *repeats, AntRepeatSide *side)
{
  const AntRepeatGrid *grid = &repeats->options.grid;
  double longest_d = ant_repeat_grid_longest (grid), step_d = repeats->series.step_d;
  double at[3] = { grid->period_min_d, fmin (fmax (FINE_BELOW_D, grid->period_min_d), grid->period_max_d), grid->period_max_d };
  AntStatus status = ANT_OK;
  side->n_shared = 2;
  memcpy (side->shared_from_d, at, sizeof at);
  for (int i = 0; i < 2 && !status; i++)
    if (at[i + 1] > at[i])
      status = ant_repeat_shared_init (&side->shared[i], &side->edges, &repeats->pairs, step_d, i ? 2 : 4,
                                       SHARED_DRIFT, longest_d, at[i + 1]);
  return status;
}

/* A tree for each of a row of durations, each for those periods at which some duration near it is looked for. */
static AntStatus
init_trees (AntRepeats *repeats, AntRepeatSide *side, double *from_d, double *to_d)
{
  const AntRepeatGrid *grid = &repeats->options.grid;
  double ratio = repeats->options.white ? BOX_RATIO : TRAPEZOID_RATIO, half = sqrt (ratio), shortest_d, unused;
  double longest_d = ant_repeat_grid_longest (grid), step_d = repeats->series.step_d;
  AntStatus status = ANT_OK;
  ant_repeat_grid_durations (grid, grid->period_min_d, &shortest_d, &unused);
  for (double d = fmin (shortest_d * half, longest_d); d < longest_d * half && side->n_trees < ANT_REPEAT_TREES && !status;
       d *= ratio)
    {
      size_t k = side->n_trees;
      ant_repeat_grid_periods (grid, d / half, &from_d[k], &unused);
      ant_repeat_grid_periods (grid, d * half, &unused, &to_d[k]);
      from_d[k] = fmax (from_d[k], 3 * d);
      if (to_d[k] <= from_d[k])
        continue;
      status = repeats->options.white
                 ? ant_repeat_boxes_init (&side->tree[k], &side->box, d, STARTS_TO_A_BOX, to_d[k])
                 : ant_repeat_boxes_init_edges (&side->tree[k], &side->edges, &repeats->pairs, step_d, d,
                                                fmin (repeats->ramp * step_d, d / STARTS_TO_A_BOX), to_d[k]);
      side->n_trees++;
    }
  return status;
}

static AntStatus
add_slices (AntRepeats *repeats, int s, size_t engine, double from_d, double to_d)
{
  const AntRepeatSide *side = &repeats->side[s];
  for (double at = from_d; at < to_d;)
    {
      double end = side->n_shared ? ant_repeat_shared_chunk_end (&side->shared[engine], at)
                                  : ant_repeat_boxes_chunk_end (&side->tree[engine], at);
      if (repeats->n_slices == repeats->room_slices)
        {
          size_t room = 2 * repeats->room_slices + 256;
          AntRepeatSlice *more = realloc (repeats->slice, room * sizeof *more);
          if (!more)
            return ANT_NO_MEMORY;
          repeats->slice = more;
          repeats->room_slices = room;
        }
      end = end < to_d ? end : to_d;
      repeats->slice[repeats->n_slices++] = (AntRepeatSlice){ .side = s, .engine = engine, .from_d = at, .to_d = end };
      at = end;
    }
  return ANT_OK;
}

static AntStatus
plan_side (AntRepeats *repeats, int s)
{
  AntRepeatSide *side = &repeats->side[s];
  double from_d[ANT_REPEAT_TREES], to_d[ANT_REPEAT_TREES];
  AntStatus status = init_data (repeats, s);
  int trees = repeats->options.white || repeats->pairs.misfit > WORST_MISFIT;
  if (!status)
    status = trees ? init_trees (repeats, side, from_d, to_d) : init_shared (repeats, side);
  for (size_t k = 0; k < side->n_trees && !status; k++)
    status = add_slices (repeats, s, k, from_d[k], to_d[k]);
  for (size_t k = 0; k < side->n_shared && !status; k++)
    if (side->shared_from_d[k + 1] > side->shared_from_d[k])
      status = add_slices (repeats, s, k, side->shared_from_d[k], side->shared_from_d[k + 1]);
  return status;
}

AntStatus
ant_repeats_plan (AntRepeats *repeats)
{
  AntStatus status = repeats->options.white ? ANT_OK : ant_repeat_pairs_fit (&repeats->pairs);
  if (repeats->round == 0)
    init_chance (repeats);
  repeats->n_slices = 0;
  if (!status)
    status = plan_side (repeats, repeats->now);
  if (repeats->round == 0)
    repeats->n_first = repeats->n_slices;
  return status;
}

AntStatus
ant_repeats_fold (AntRepeats *repeats, size_t i)
{
  AntRepeatSlice *slice = &repeats->slice[i];
  const AntRepeatSide *side = &repeats->side[slice->side];
  double events = (double) repeats->options.least_events;
  AntStatus status = ant_repeat_bins_part (&slice->part, &side->bins, slice->from_d, slice->to_d);
  if (status)
    return status;
  status = side->n_shared ? ant_repeat_shared_search (&side->shared[slice->engine], &repeats->options.grid, slice->from_d, slice->to_d,
                                                      events, 0, &repeats->stop, &slice->part)
                          : ant_repeat_boxes_search (&side->tree[slice->engine], slice->from_d, slice->to_d, events, &repeats->stop,
                                                     &slice->part);
  return status;
}

AntStatus
ant_repeats_merge (AntRepeats *repeats)
{
  for (size_t i = 0; i < repeats->n_slices; i++)
    {
      ant_repeat_bins_merge (&repeats->side[repeats->slice[i].side].bins, &repeats->slice[i].part);
      ant_repeat_bins_clear (&repeats->slice[i].part);
    }
  if (repeats->round == 0)
    {
      repeats->n_done = repeats->n_first;
      ant_repeat_bins_merge (&repeats->spectrum, &repeats->side[0].bins);
    }
  return ANT_OK;
}

/* Drop the data of a round; also after a stop. */
void
ant_repeats_forget (AntRepeats *repeats)
{
  for (size_t i = 0; i < repeats->n_slices; i++)
    ant_repeat_bins_clear (&repeats->slice[i].part);
  for (int s = 0; s < 2; s++)
    {
      AntRepeatSide *side = &repeats->side[s];
      for (size_t k = 0; k < side->n_shared; k++)
        ant_repeat_shared_clear (&side->shared[k]);
      for (size_t k = 0; k < side->n_trees; k++)
        ant_repeat_boxes_clear (&side->tree[k]);
      ant_repeat_box_clear (&side->box);
      ant_repeat_edges_clear (&side->edges);
      ant_repeat_bins_clear (&side->bins);
      *side = (AntRepeatSide){ 0 };
    }
  ant_repeats_forget_finalists (repeats);
  ant_repeat_pairs_clear (&repeats->pairs);
  repeats->n_slices = repeats->n_peaks = 0;
}
