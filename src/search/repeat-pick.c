/* repeat-pick.c - from the bins of a round to its peaks, from peaks to finalist, and from that to the repeat that stands. */
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "search/repeat-work.h"

#define WORST_FOLD 0.82      /* a fold keeps this much of the refined SNR at least (docs/search.md) */
#define STRONG_SNR 8.0       /* known dips of this and more may hide trains */
#define MOST_SCATTER 0.5     /* of the events' depths, in units of their mean, beyond the noise */
#define SURE_CHI2 4.0        /* sigma beyond which the scatter is not noise */
#define AS_GOOD 0.9995       /* a multiple of a period with this much of its SNR has all of its events */
#define MASK_REACH 0.6       /* durations to each side of an event that is taken out */

static int
stronger_first (const void *a, const void *b)
{
  const AntRepeatPeak *left = a, *right = b;
  if (left->cell.power != right->cell.power)
    return left->cell.power > right->cell.power ? -1 : 1;
  return (left->cell.period_d > right->cell.period_d) - (left->cell.period_d < right->cell.period_d);
}

/* One signal fills many bins: a cell whose events slip by less than a duration against a stronger one's is the same. */
static int
is_same (const AntRepeats *repeats, const AntRepeatCell *a, const AntRepeatCell *b)
{
  double events = 0.5 * repeats->span_d / a->period_d;
  return fabs (a->period_d - b->period_d) * events < fmax (a->duration_d, b->duration_d);
}

static AntStatus
pick_from (AntRepeats *repeats, int side)
{
  const AntRepeatBins *bins = &repeats->side[side].bins;
  double cut = WORST_FOLD * repeats->threshold;
  size_t n = 0, first = repeats->n_peaks;
  AntRepeatPeak *all = malloc ((bins->n + 1) * sizeof *all);
  if (!all)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < bins->n; i++)
    if (bins->cell[i].power >= cut * cut)
      all[n++] = (AntRepeatPeak){ .side = side, .cell = bins->cell[i] };
  qsort (all, n, sizeof *all, stronger_first);
  for (size_t i = 0; i < n && repeats->n_peaks - first < ANT_REPEAT_PEAKS; i++)
    {
      int known = 0;
      for (size_t k = first; k < repeats->n_peaks && !known; k++)
        known = is_same (repeats, &repeats->peak[k].cell, &all[i].cell);
      if (!known)
        repeats->peak[repeats->n_peaks++] = all[i];
    }
  free (all);
  return ANT_OK;
}

AntStatus
ant_repeats_pick_peaks (AntRepeats *repeats)
{
  repeats->n_peaks = 0;
  return pick_from (repeats, repeats->now);
}

int
ant_repeats_consistent (const AntTrainSums *sums)
{
  if (sums->n_events < 2 || sums->without_largest < ANT_WITHOUT_LARGEST)
    return 0;
  double freedom = (double) (sums->n_events - 1), excess = sums->chi2 - freedom;
  if (excess < SURE_CHI2 * sqrt (2 * freedom))
    return 1;
  double mean_snr2 = sums->snr * sums->snr / (double) sums->n_events;
  return excess / freedom < MOST_SCATTER * MOST_SCATTER * mean_snr2;
}

/* Where twice or three times the period has all the events that were seen, the shorter one claims some that were not. */
static void
lengthen (const AntRepeats *repeats, AntRepeatPeak *peak, const AntRepeatTrain *train)
{
  for (int k = 3; k >= 2; k--)
    for (int j = 0; j < k; j++)
      {
        AntTrainTrial longer = peak->trial;
        longer.period *= k;
        longer.mid += j * peak->trial.period;
        if (longer.period * repeats->series.step_d > repeats->options.grid.period_max_d * 1.001)
          continue;
        double snr = ant_repeat_train_snr (train, &longer, repeats->options.least_events);
        if (snr >= AS_GOOD * peak->sums.snr)
          {
            peak->trial = longer;
            return;
          }
      }
}

AntStatus
ant_repeats_climb (AntRepeats *repeats, size_t i)
{
  AntRepeatPeak *peak = &repeats->peak[i];
  const AntRepeatTrain *train = &repeats->side[peak->side].train;
  double step_d = repeats->series.step_d, start = 0.25 * peak->cell.duration_d / step_d;
  if (!repeats->options.white)
    start = 0.5 * repeats->ramp;
  peak->trial = (AntTrainTrial){ .period = peak->cell.period_d / step_d, .mid = peak->cell.mid_d / step_d,
                                 .duration = peak->cell.duration_d / step_d };
  ant_repeat_train_climb (train, &peak->trial, start, repeats->options.least_events);
  ant_repeat_train_sums (train, &peak->trial, &peak->sums);
  lengthen (repeats, peak, train);
  ant_repeat_train_sums (train, &peak->trial, &peak->sums);
  peak->passes = peak->sums.n_events >= repeats->options.least_events && ant_repeats_consistent (&peak->sums);
  return ANT_OK;
}

/* The strongest peak of a side that passes and is not taken; -1 if none reaches `least`. */
static ptrdiff_t
best_peak (const AntRepeats *repeats, int side, double least)
{
  ptrdiff_t best = -1;
  for (size_t i = 0; i < repeats->n_peaks; i++)
    {
      const AntRepeatPeak *peak = &repeats->peak[i];
      if (peak->side == side && peak->passes && peak->sums.snr >= least
          && (best < 0 || peak->sums.snr > repeats->peak[best].sums.snr))
        best = (ptrdiff_t) i;
    }
  return best;
}

static AntStatus
add_finalist (AntRepeats *repeats, const AntRepeatPeak *peak)
{
  AntRepeatFinalist *finalist = &repeats->finalist;
  *finalist = (AntRepeatFinalist){ .trial = peak->trial, .sums = peak->sums };
  ant_repeat_train_range (&repeats->side[0].train, &peak->trial, &finalist->first, &finalist->end);
  finalist->fit = calloc ((size_t) (finalist->end - finalist->first), sizeof *finalist->fit);
  if (!finalist->fit)
    return ANT_NO_MEMORY;
  repeats->has_finalist = 1;
  return ANT_OK;
}

AntStatus
ant_repeats_choose (AntRepeats *repeats)
{
  if (repeats->now) /* in the last round: strong dips lift their surroundings, until they are out */
    {
      ptrdiff_t mirrored = best_peak (repeats, 1, 0);
      repeats->best_mirrored = mirrored < 0 ? 0 : repeats->peak[mirrored].sums.snr;
      repeats->n_mirrored = repeats->best_mirrored >= repeats->threshold;
    }
  ptrdiff_t best = best_peak (repeats, 0, repeats->threshold);
  return best < 0 ? ANT_OK : add_finalist (repeats, &repeats->peak[best]);
}

static AntShapeFit
shape_of (const AntRepeats *repeats, const AntRepeatFinalist *finalist, long number)
{
  double duration_d = finalist->trial.duration * repeats->series.step_d;
  return (AntShapeFit){ .centre = finalist->trial.mid + (double) number * finalist->trial.period, .duration_d = duration_d,
                        .edge_d = fmin (repeats->ramp * repeats->series.step_d, 0.5 * duration_d), .impact = ANT_SHAPE_IMPACT };
}

/* The finalist's events of one chunk, as crossings under its exact noise. */
AntStatus
ant_repeats_measure (AntRepeats *repeats, size_t i)
{
  const AntChunk *chunk = &repeats->chunk[i];
  const AntRepeatOptions *o = &repeats->options;
  AntSeries part = ant_series_part (&repeats->series, chunk->first, chunk->n);
  AntRefineOptions refine = { .step_d = part.step_d, .exposure_d = o->exposure_d > 0 ? o->exposure_d : part.step_d,
                              .limb_darkening = o->limb_darkening };
  AntStatus status = ANT_OK;
  double *z = malloc (part.n * sizeof *z);
  AntWhitener *whitener = !z || !ant_series_observed (&part, 0) ? NULL : ant_whitener_new_free_level (&chunk->model, &part, &status);
  status = !z ? ANT_NO_MEMORY : whitener ? ant_whitener_solve (whitener, part.value_ppm, z) : status;
  for (long j = repeats->finalist.first; j < repeats->finalist.end && whitener && !status; j++)
      {
        AntShapeFit fit = shape_of (repeats, &repeats->finalist, j), *kept = &repeats->finalist.fit[j - repeats->finalist.first];
        double place = fmin (fmax (fit.centre, 0), (double) repeats->series.n - 1);
        if (place < chunk->own_from || place >= chunk->own_to)
          continue;
        fit.centre -= (double) chunk->first;
        if (ant_measure (whitener, z, &refine, &fit) == ANT_OK)
          *kept = fit;
      }
  ant_whitener_free (whitener);
  free (z);
  return status;
}

/* Make gaps of what lies within reach of a middle (places). */
static void
take_out (AntRepeats *repeats, double mid, double duration)
{
  double reach = MASK_REACH * duration + repeats->ramp;
  for (double p = ceil (fmax (mid - reach, 0)); p <= mid + reach && p < (double) repeats->series.n; p++)
    repeats->value[(size_t) p] = NAN;
}

/* Known strong dips become gaps. Returns whether there are any that are none yet. */
static int
take_out_dips (AntRepeats *repeats)
{
  int any = 0;
  for (size_t i = 0; i < repeats->options.n_dips && !repeats->dips_out; i++)
    any |= repeats->options.dip[i].snr >= STRONG_SNR;
  for (size_t i = 0; i < repeats->options.n_dips && any; i++)
    take_out (repeats, ant_series_place (&repeats->series, repeats->options.dip[i].mid_d),
              repeats->options.dip[i].duration_d / repeats->series.step_d);
  repeats->dips_out |= any;
  return any;
}

/* The finalist becomes a repeat, its events gaps. */
static AntStatus
stand (AntRepeats *repeats)
{
  AntRepeat *repeat = &repeats->repeat[repeats->n_repeats];
  AntStatus status = ant_repeats_report (repeats, &repeats->finalist, repeat);
  if (status)
    return status;
  for (size_t e = 0; e < repeat->n_events; e++)
    take_out (repeats, ant_series_place (&repeats->series, repeat->event[e].mid_d), repeat->duration_d / repeats->series.step_d);
  repeats->n_repeats++;
  return ANT_OK;
}

AntStatus
ant_repeats_settle (AntRepeats *repeats)
{
  int found = repeats->has_finalist > 0, again = found && repeats->n_repeats + 1 < ANT_MOST_REPEATS;
  AntStatus status = found ? stand (repeats) : ANT_OK;
  ant_repeats_forget (repeats);
  repeats->active = !repeats->now && !status;
  if (!again && (found || !take_out_dips (repeats)))
    repeats->now = 1;
  repeats->round++;
  if (repeats->active && !repeats->options.white)
    {
      double longest = ant_repeat_grid_longest (&repeats->options.grid) / repeats->series.step_d;
      memset (repeats->z, 0, repeats->series.n * sizeof *repeats->z);
      status = ant_repeat_pairs_init (&repeats->pairs, repeats->series.n, repeats->ramp, longest);
    }
  return status;
}
