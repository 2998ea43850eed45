/* repeat-pick.c - from the bins of a round to its peaks, and the climb from each. */
#include <math.h>
#include <stdlib.h>
#include "search/repeat-work.h"

#define WORST_FOLD 0.82      /* a fold keeps this much of the refined SNR at least (docs/search.md) */
#define AS_GOOD 0.9995       /* a multiple of a period with this much of its SNR has all of its events */

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
  return ANT_OK;
}
