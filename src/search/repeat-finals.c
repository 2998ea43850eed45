/* repeat-finals.c - the best peaks of a round under the exact noise, and the repeat that stands.
 *
 * The climb reads energies between the places and durations of a table, and what is chosen for its SNR favours those that
 * read low there. So the best peaks are judged once more with the energy of every event computed for its own trapezoid. */
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include "search/repeat-work.h"

#define STRONG_SNR 8.0       /* known dips of this and more may hide trains */
#define MOST_SCATTER 0.5     /* of the events' depths, in units of their mean, beyond the noise */
#define SURE_CHI2 4.0        /* sigma beyond which the scatter is not noise */
#define MASK_REACH 0.6       /* durations to each side of an event that is taken out */
#define NEARLY 0.95          /* of what must be reached: exact energies may still lift it */

/* Whether enough events are seen, do not rest on one of them, and agree with each other. */
static int
is_sound (const AntRepeats *repeats, const AntTrainSums *sums, double slack)
{
  if (sums->n_events < repeats->options.least_events || sums->without_largest < slack * ANT_WITHOUT_LARGEST)
    return 0;
  double freedom = (double) (sums->n_events - 1), excess = sums->chi2 - freedom;
  if (excess < SURE_CHI2 * sqrt (2 * freedom))
    return 1;
  double mean_snr2 = sums->snr * sums->snr / (double) sums->n_events;
  return excess / freedom < MOST_SCATTER * MOST_SCATTER * mean_snr2;
}

static int
higher_snr (const void *a, const void *b)
{
  const AntRepeatPeak *left = a, *right = b;
  if (left->sums.snr != right->sums.snr)
    return left->sums.snr > right->sums.snr ? -1 : 1;
  return (left->trial.period > right->trial.period) - (left->trial.period < right->trial.period);
}

static AntStatus
add_finalist (AntRepeats *repeats, const AntRepeatPeak *peak)
{
  const AntRepeatTrain *train = &repeats->side[repeats->now].train;
  AntRepeatFinalist *finalist = &repeats->finalist[repeats->n_finalists];
  *finalist = (AntRepeatFinalist){ .trial = peak->trial, .sums = peak->sums };
  ant_repeat_train_range (train, &peak->trial, &finalist->first, &finalist->end);
  size_t n = (size_t) (finalist->end - finalist->first);
  finalist->fit = calloc (n, sizeof *finalist->fit);
  finalist->event = calloc (n, sizeof *finalist->event);
  repeats->n_finalists++;
  if (!finalist->fit || !finalist->event)
    return ANT_NO_MEMORY;
  for (size_t i = 0; i < n; i++)
    finalist->event[i] = ant_repeat_train_event (train, &peak->trial, finalist->first + (long) i);
  return ANT_OK;
}

/* The folds cut strong events, which the climb does not: peaks stand in the spectrum as they were refined. */
static void
raise_spectrum (AntRepeats *repeats)
{
  for (size_t i = 0; i < repeats->n_peaks; i++)
    {
      const AntRepeatPeak *peak = &repeats->peak[i];
      double period_d = peak->trial.period * repeats->series.step_d, power = peak->sums.snr * peak->sums.snr;
      AntRepeatCell *cell = ant_repeat_bins_at (&repeats->spectrum, period_d);
      if (power > cell->power)
        *cell = (AntRepeatCell){ .power = power, .period_d = period_d, .mid_d = peak->trial.mid * repeats->series.step_d,
                                 .duration_d = peak->trial.duration * repeats->series.step_d };
    }
}

/* Brightenings have no threshold here: the best is told beside the dips. */
AntStatus
ant_repeats_choose (AntRepeats *repeats)
{
  double least = repeats->now ? 0 : NEARLY * repeats->threshold;
  AntStatus status = ANT_OK;
  if (repeats->round == 0)
    raise_spectrum (repeats);
  qsort (repeats->peak, repeats->n_peaks, sizeof *repeats->peak, higher_snr);
  for (size_t i = 0; i < repeats->n_peaks && repeats->n_finalists < ANT_REPEAT_FINALISTS && !status; i++)
    if (repeats->peak[i].sums.snr >= least && is_sound (repeats, &repeats->peak[i].sums, NEARLY))
      status = add_finalist (repeats, &repeats->peak[i]);
  return status;
}

void
ant_repeats_forget_finalists (AntRepeats *repeats)
{
  for (size_t i = 0; i < repeats->n_finalists; i++)
    {
      free (repeats->finalist[i].fit);
      free (repeats->finalist[i].event);
    }
  repeats->n_finalists = 0;
}

static double
clip (double x)
{
  return x < 0 ? 0 : x > 1 ? 1 : x;
}

/* Energy of a trapezoid about a place of the whitener. lane: room for `room` places. */
static double
exact_energy (const AntWhitener *whitener, double ramp, double centre, double duration, size_t room, double *lane)
{
  double start = centre - 0.5 * duration, half_depth = fmax (duration - ramp, 0.5 * ramp), first = floor (start);
  double energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES];
  size_t length = (size_t) ceil (half_depth + ramp) + 2;
  length = length < room ? length : room;
  for (size_t j = 0; j < length; j++)
    {
      double t = first + (double) j - start;
      lane[j * ANT_LANES] = clip (t / ramp) - clip ((t - half_depth) / ramp);
    }
  ant_whitener_energies (whitener, NULL, (ptrdiff_t) first, length, lane, energy, moment, weight);
  return energy[0];
}

static AntShapeFit
shape_of (const AntRepeats *repeats, const AntRepeatFinalist *finalist, long number)
{
  double duration_d = finalist->trial.duration * repeats->series.step_d;
  return (AntShapeFit){ .centre = finalist->trial.mid + (double) number * finalist->trial.period, .duration_d = duration_d,
                        .edge_d = fmin (repeats->ramp * repeats->series.step_d, 0.5 * duration_d), .impact = ANT_SHAPE_IMPACT };
}

/* One finalist's events of one chunk: exact energies, and crossings for their depths. */
static AntStatus
measure_events (const AntRepeats *repeats, const AntChunk *chunk, const AntWhitener *whitener, const double *z,
                AntRepeatFinalist *finalist)
{
  const AntRepeatOptions *o = &repeats->options;
  double step_d = repeats->series.step_d, duration = finalist->trial.duration;
  AntRefineOptions refine = { .step_d = step_d, .exposure_d = o->exposure_d > 0 ? o->exposure_d : step_d,
                              .limb_darkening = o->limb_darkening };
  size_t room = (size_t) (duration + 2 * repeats->ramp) + 4;
  double *lane = calloc (room * ANT_LANES, sizeof *lane);
  if (!lane)
    return ANT_NO_MEMORY;
  for (long j = finalist->first; j < finalist->end; j++)
    {
      AntShapeFit fit = shape_of (repeats, finalist, j);
      AntTrainEvent *event = &finalist->event[j - finalist->first];
      double place = fmin (fmax (fit.centre, 0), (double) repeats->series.n - 1);
      if (place < chunk->own_from || place >= chunk->own_to)
        continue;
      fit.centre -= (double) chunk->first;
      event->den = event->den > 0 ? exact_energy (whitener, repeats->ramp, fit.centre, duration, room, lane) : 0;
      if (ant_measure (whitener, z, &refine, &fit) == ANT_OK)
        finalist->fit[j - finalist->first] = fit;
    }
  free (lane);
  return ANT_OK;
}

AntStatus
ant_repeats_measure (AntRepeats *repeats, size_t i)
{
  const AntChunk *chunk = &repeats->chunk[i];
  AntSeries part = ant_series_part (&repeats->series, chunk->first, chunk->n);
  AntStatus status = ANT_OK;
  double *z = malloc (part.n * sizeof *z);
  AntWhitener *whitener = !z || !ant_series_observed (&part, 0) ? NULL : ant_whitener_new_free_level (&chunk->model, &part, &status);
  status = !z ? ANT_NO_MEMORY : whitener ? ant_whitener_solve (whitener, part.value_ppm, z) : status;
  for (size_t k = 0; k < repeats->n_finalists && whitener && !status; k++)
    status = measure_events (repeats, chunk, whitener, z, &repeats->finalist[k]);
  ant_whitener_free (whitener);
  free (z);
  return status;
}

/* The sound finalist of greatest SNR, all judged by their events once more; NULL if none reaches `least`. */
static AntRepeatFinalist *
best_finalist (AntRepeats *repeats, double least)
{
  const AntRepeatTrain *train = &repeats->side[repeats->now].train;
  AntRepeatFinalist *best = NULL;
  for (size_t i = 0; i < repeats->n_finalists; i++)
    {
      AntRepeatFinalist *finalist = &repeats->finalist[i];
      ant_repeat_train_add_up (train, (size_t) (finalist->end - finalist->first), finalist->event, &finalist->sums);
      if (finalist->sums.snr >= least && is_sound (repeats, &finalist->sums, 1) && (!best || finalist->sums.snr > best->sums.snr))
        best = finalist;
    }
  return best;
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
stand (AntRepeats *repeats, const AntRepeatFinalist *finalist)
{
  AntRepeat *repeat = &repeats->repeat[repeats->n_repeats];
  AntStatus status = ant_repeats_report (repeats, finalist, repeat);
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
  AntRepeatFinalist *best = best_finalist (repeats, repeats->now ? 0 : repeats->threshold);
  int found = best && !repeats->now, again = found && repeats->n_repeats + 1 < ANT_MOST_REPEATS;
  if (repeats->now) /* in the last round: strong dips lift their surroundings, until they are out */
    {
      repeats->best_mirrored = best ? best->sums.snr : 0;
      repeats->n_mirrored = repeats->best_mirrored >= repeats->threshold;
    }
  AntStatus status = found ? stand (repeats, best) : ANT_OK;
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
