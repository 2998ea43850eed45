/* repeat-report.c - a train that was measured, as a repeat: period and epoch with errors, its events, its aliases. */
#include <math.h>
#include <stdlib.h>
#include "search/repeat-work.h"

/* Of SNR^2, that noise adds on the mean to a train whose period, epoch and duration are those of the greatest SNR. */
#define CHOSEN 3.0

static const int alias_ratio[ANT_REPEAT_ALIASES][2] = { { 1, 2 }, { 2, 1 }, { 1, 3 }, { 3, 1 }, { 3, 2 } };

/* The step along period (slip of the record's ends) or epoch over which SNR^2/2 falls by a half on the mean of both sides. Of a
 * strong train the top is not read, which the table's straight lines make sharper than it is: the fall by a hundredth is, as
 * that of a parabola. */
static double
error_of (const AntRepeatTrain *train, const AntTrainTrial *at, long middle, int of_period)
{
  double best = ant_repeat_train_snr (train, at, 0), low = 0, high = 0.01 * at->duration;
  double least = train->box ? 0.5 : fmax (0.5, 0.005 * best * best);
  double per = of_period ? fmax (0.5 * (double) train->n / at->period, 1) : 1;
  for (int round = 0; round < 60; round++)
    {
      double h = low > 0 || round > 30 ? 0.5 * (low + high) : high, fall = best * best;
      for (int side = -1; side <= 1; side += 2)
        {
          AntTrainTrial moved = *at;
          moved.period += of_period ? side * h / per : 0;
          moved.mid = at->mid + (of_period ? -(double) middle * (moved.period - at->period) : side * h);
          double snr = ant_repeat_train_snr (train, &moved, 0);
          fall -= 0.5 * snr * fabs (snr);
        }
      if (0.5 * fall >= least)
        high = h;
      else if (high > h || low > 0)
        low = h;
      else
        high *= 1.5;
      if (low > 0 && high - low < 0.01 * high)
        break;
    }
  return high / per / sqrt (2 * least);
}

static size_t
dip_at (const AntRepeats *repeats, double mid_d, double duration_d)
{
  for (size_t i = 0; i < repeats->options.n_dips; i++)
    if (fabs (repeats->options.dip[i].mid_d - mid_d) < 0.5 * fmax (duration_d, repeats->options.dip[i].duration_d))
      return i + 1;
  return 0;
}

/* One event: from the crossing fitted to it, or from its box in white noise. den 0: nothing of it is observed. */
static AntRepeatEvent
event_of (const AntRepeats *repeats, const AntRepeatFinalist *finalist, long number, double *num, double *den)
{
  AntTrainEvent event = finalist->event[number - finalist->first];
  const AntShapeFit *fit = &finalist->fit[number - finalist->first];
  *num = event.num;
  *den = event.den;
  if (!repeats->options.white)
    {
      *den = fit->sigma_ppm > 0 && isfinite (fit->sigma_ppm) ? 1 / (fit->sigma_ppm * fit->sigma_ppm) : 0;
      *num = *den > 0 ? fit->depth_ppm * *den : 0;
    }
  double mid_d = ant_series_time (&repeats->series, event.mid);
  return (AntRepeatEvent){ .mid_d = mid_d, .depth_ppm = *num / *den, .sigma_ppm = 1 / sqrt (*den), .snr = *num / sqrt (*den),
                           .coverage = fmin (event.den / event.full, 1), .number = number,
                           .dip = dip_at (repeats, mid_d, finalist->trial.duration * repeats->series.step_d) };
}

/* Sums of a train, kept apart in what it takes for each test. */
typedef struct
{
  double num, den;
} Sum;

static double
snr_of (const AntRepeats *repeats, Sum sum)
{
  double total = repeats->options.white ? repeats->side[0].box.total : HUGE_VAL, e = sum.den - sum.den * sum.den / total;
  return e > 0 ? sum.num / sqrt (e) : 0;
}

/* Events, and what rests on the crossings fitted to them: the common depth. */
static void
add_events (const AntRepeats *repeats, const AntRepeatFinalist *finalist, AntRepeat *repeat)
{
  Sum all = { 0, 0 }, unlisted = { 0, 0 };
  for (long j = finalist->first; j < finalist->end; j++)
    {
      double num, den;
      AntRepeatEvent event = event_of (repeats, finalist, j, &num, &den);
      if (!(den > 0))
        continue;
      AntTrainEvent train = finalist->event[j - finalist->first];
      repeat->event[repeat->n_events++] = event;
      all = (Sum){ all.num + num, all.den + den };
      if (!event.dip)
        unlisted = (Sum){ unlisted.num + train.num, unlisted.den + train.den };
    }
  double total = repeats->options.white ? repeats->side[0].box.total : HUGE_VAL, effective = all.den - all.den * all.den / total;
  repeat->depth_ppm = all.num / effective;
  if (!repeats->options.white) /* a box stays what the textbook says */
    repeat->depth_ppm *= fmax (1 - 0.5 * CHOSEN / (repeat->snr * repeat->snr), 0);
  repeat->depth_sigma_ppm = 1 / sqrt (effective);
  repeat->snr_unlisted = snr_of (repeats, unlisted);
}

void
ant_repeat_name_aliases (AntRepeat *repeat)
{
  for (size_t k = 0; k < ANT_REPEAT_ALIASES; k++)
    {
      AntRepeatAlias *alias = &repeat->alias[k];
      alias->numerator = alias_ratio[k][0];
      alias->denominator = alias_ratio[k][1];
      alias->period_d = repeat->period_d * alias->numerator / alias->denominator;
    }
}

/* The best SNR at a simple ratio of the period, over those phases that share events with it. */
static void
find_aliases (const AntRepeats *repeats, const AntTrainTrial *trial, AntRepeat *repeat)
{
  for (size_t k = 0; k < ANT_REPEAT_ALIASES; k++)
    {
      AntRepeatAlias *alias = &repeat->alias[k];
      AntTrainTrial other = *trial;
      other.period = trial->period * alias->numerator / alias->denominator;
      for (int j = 0; j < alias->numerator; j++)
        {
          other.mid = trial->mid + j * trial->period;
          alias->snr = fmax (alias->snr, ant_repeat_train_snr (&repeats->side[0].train, &other, 0));
        }
    }
}

AntStatus
ant_repeats_report (const AntRepeats *repeats, const AntRepeatFinalist *finalist, AntRepeat *repeat)
{
  const AntRepeatTrain *train = &repeats->side[0].train;
  const AntTrainTrial *trial = &finalist->trial;
  double step_d = repeats->series.step_d;
  long middle = (long) floor ((0.5 * (double) repeats->series.n - trial->mid) / trial->period + 0.5);
  *repeat = (AntRepeat){ .period_d = trial->period * step_d, .duration_d = trial->duration * step_d,
                         .epoch_d = ant_series_time (&repeats->series, trial->mid + (double) middle * trial->period),
                         .period_sigma_d = error_of (train, trial, middle, 1) * step_d,
                         .epoch_sigma_d = error_of (train, trial, middle, 0) * step_d };
  repeat->event = malloc ((size_t) (finalist->end - finalist->first) * sizeof *repeat->event);
  if (!repeat->event)
    return ANT_NO_MEMORY;
  const AntTrainSums *sums = &finalist->sums;
  repeat->snr = sums->snr;
  repeat->snr_without_largest = sums->without_largest;
  repeat->odd_even = sums->odd_even;
  repeat->chi2 = sums->chi2;
  repeat->n_observed = sums->n_events;
  add_events (repeats, finalist, repeat);
  for (size_t e = 0; e < repeat->n_events; e++)
    repeat->event[e].number -= middle;
  repeat->expected_false = ant_repeat_chance_expected (&repeats->chance, repeat->snr);
  ant_repeat_name_aliases (repeat);
  find_aliases (repeats, trial, repeat);
  return ANT_OK;
}
