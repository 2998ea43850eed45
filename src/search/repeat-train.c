/* repeat-train.c - sums over the events of one train, and the climb to its best. */
#include "search/repeat-train.h"
#include <math.h>
#include <string.h>
#include "core/prefix-sums.h"

#define BEAM 4
#define MOST_PASSES 80
#define LAST_STEP 0.0625 /* places */
#define FINE 0.1         /* of what noise moves a strong train's epoch by, duration over SNR: the last step if that is less */

void
ant_repeat_train_range (const AntRepeatTrain *train, const AntTrainTrial *trial, long *first, long *end)
{
  *first = (long) ceil ((-0.5 * trial->duration - trial->mid) / trial->period);
  *end = (long) floor (((double) train->n + 0.5 * trial->duration - trial->mid) / trial->period) + 1;
}

static inline void
event_sums (const AntRepeatTrain *train, double centre, double duration, double *num, double *den)
{
  double start = centre - 0.5 * duration;
  if (train->box)
    {
      ptrdiff_t from = (ptrdiff_t) ceil (start), to = (ptrdiff_t) ceil (start + duration);
      *num = ant_window_sum (train->n, train->box->moment, from, to);
      *den = ant_window_sum (train->n, train->box->weight, from, to);
      return;
    }
  double half_depth = fmax (duration - train->edges->ramp, 0.5 * train->edges->ramp);
  *num = ant_repeat_edges_at (train->edges, start) - ant_repeat_edges_at (train->edges, start + half_depth);
  *den = ant_repeat_pairs_energy (train->pairs, start, half_depth);
}

static double
full_den (const AntRepeatTrain *train, double duration)
{
  if (train->box)
    return train->box->typical * duration;
  return ant_repeat_pairs_full (train->pairs, fmax (duration - train->edges->ramp, 0.5 * train->edges->ramp));
}

static double
effective (const AntRepeatTrain *train, double den)
{
  return train->box ? den - den * den / train->box->total : den;
}

static double
snr_of (const AntRepeatTrain *train, double num, double den)
{
  double e = effective (train, den);
  return e > 0 ? num / sqrt (e) : 0;
}

AntTrainEvent
ant_repeat_train_event (const AntRepeatTrain *train, const AntTrainTrial *trial, long number)
{
  AntTrainEvent event = { .mid = trial->mid + (double) number * trial->period, .number = number,
                          .full = full_den (train, trial->duration) };
  event_sums (train, event.mid, trial->duration, &event.num, &event.den);
  return event;
}

double
ant_repeat_train_snr (const AntRepeatTrain *train, const AntTrainTrial *trial, size_t least_events)
{
  double num = 0, den = 0, half = 0.5 * full_den (train, trial->duration);
  size_t events = 0;
  long first, end;
  ant_repeat_train_range (train, trial, &first, &end);
  for (long j = first; j < end; j++)
    {
      double n, d;
      event_sums (train, trial->mid + (double) j * trial->period, trial->duration, &n, &d);
      num += n;
      den += d;
      events += d >= half;
    }
  return events >= least_events ? snr_of (train, num, den) : 0;
}

/* Sums of events as they come; the observed ones apart, for their scatter. */
typedef struct
{
  double num, den, side_num[2], side_den[2], largest, largest_den;
  double seen_num, seen_den, squares; /* squares: of num^2/den */
  size_t n_seen;
} Sums;

static void
add_event (Sums *sums, const AntTrainEvent *event)
{
  sums->num += event->num;
  sums->den += event->den;
  sums->side_num[event->number & 1] += event->num;
  sums->side_den[event->number & 1] += event->den;
  if (event->num > sums->largest)
    {
      sums->largest = event->num;
      sums->largest_den = event->den;
    }
  if (!(event->den >= 0.5 * event->full))
    return;
  sums->n_seen++;
  sums->seen_num += event->num;
  sums->seen_den += event->den;
  sums->squares += event->num * event->num / event->den;
}

static AntTrainSums
results_of (const AntRepeatTrain *train, const Sums *sums)
{
  AntTrainSums results = { .num = sums->num, .den = sums->den, .n_events = sums->n_seen };
  if (!(sums->den > 0))
    return results;
  double common = sums->num / sums->den;
  results.snr = snr_of (train, sums->num, sums->den);
  results.depth = sums->num / effective (train, sums->den);
  results.without_largest = snr_of (train, sums->num - sums->largest, sums->den - sums->largest_den);
  if (sums->side_den[0] > 0 && sums->side_den[1] > 0)
    results.odd_even = fabs (sums->side_num[0] / sums->side_den[0] - sums->side_num[1] / sums->side_den[1])
                       / sqrt (1 / sums->side_den[0] + 1 / sums->side_den[1]);
  results.chi2 = fmax (sums->squares - 2 * common * sums->seen_num + common * common * sums->seen_den, 0);
  return results;
}

void
ant_repeat_train_sums (const AntRepeatTrain *train, const AntTrainTrial *trial, AntTrainSums *sums)
{
  Sums running = { .largest = -HUGE_VAL };
  long first, end;
  ant_repeat_train_range (train, trial, &first, &end);
  for (long j = first; j < end; j++)
    {
      AntTrainEvent event = ant_repeat_train_event (train, trial, j);
      add_event (&running, &event);
    }
  *sums = results_of (train, &running);
}

void
ant_repeat_train_add_up (const AntRepeatTrain *train, size_t n, const AntTrainEvent *event, AntTrainSums *sums)
{
  Sums running = { .largest = -HUGE_VAL };
  for (size_t i = 0; i < n; i++)
    add_event (&running, &event[i]);
  *sums = results_of (train, &running);
}

/* A point of the climb: the event nearest to the record's middle keeps its number, so that period and epoch are independent. */
typedef struct
{
  double slip, mid, duration; /* slip: of the period, times half the number of events */
  double snr;
} Point;

typedef struct
{
  const AntRepeatTrain *train;
  size_t least_events;
  double half_events; /* half the number of events */
  double period;      /* where slip is 0 */
  long middle;
} Climb;

static AntTrainTrial
trial_of (const Climb *climb, const Point *point)
{
  double period = climb->period + point->slip / climb->half_events;
  return (AntTrainTrial){ .period = period, .mid = point->mid - (double) climb->middle * period, .duration = point->duration };
}

static void
rate (const Climb *climb, Point *point)
{
  AntTrainTrial trial = trial_of (climb, point);
  int allowed = point->duration >= climb->train->least_duration && point->duration <= climb->train->longest_duration
                && point->duration < 0.5 * trial.period;
  point->snr = allowed ? ant_repeat_train_snr (climb->train, &trial, climb->least_events) : 0;
}

static int
same (const Point *a, const Point *b)
{
  return a->slip == b->slip && a->mid == b->mid && a->duration == b->duration;
}

/* Put a point into the beam, best first, unless it is there. */
static void
offer (Point *beam, const Point *point)
{
  size_t at = BEAM;
  for (size_t i = 0; i < BEAM; i++)
    if (same (&beam[i], point))
      return;
  while (at > 0 && point->snr > beam[at - 1].snr)
    at--;
  if (at == BEAM)
    return;
  memmove (&beam[at + 1], &beam[at], (BEAM - 1 - at) * sizeof *beam);
  beam[at] = *point;
}

double
ant_repeat_train_climb (const AntRepeatTrain *train, AntTrainTrial *trial, double step, size_t least_events)
{
  Climb climb = { .train = train, .least_events = least_events, .period = trial->period };
  climb.half_events = fmax (0.5 * (double) train->n / trial->period, 1);
  climb.middle = (long) floor ((0.5 * (double) train->n - trial->mid) / trial->period + 0.5);
  Point start = { .mid = trial->mid + (double) climb.middle * trial->period, .duration = trial->duration }, beam[BEAM];
  rate (&climb, &start);
  for (size_t i = 0; i < BEAM; i++)
    beam[i] = (Point){ .snr = -1 };
  beam[0] = start;
  double h = step, stretch = trial->duration / 6;
  for (int pass = 0; pass < MOST_PASSES && h >= fmin (LAST_STEP, FINE * beam[0].duration / fmax (beam[0].snr, 1)); pass++)
    {
      Point from[BEAM];
      memcpy (from, beam, sizeof from);
      for (size_t b = 0; b < BEAM && from[b].snr >= 0; b++)
        for (int k = 0; k < 27; k++)
          {
            Point next = from[b];
            next.slip += h * (k % 3 - 1);
            next.mid += h * (k / 3 % 3 - 1);
            next.duration += stretch * (k / 9 - 1);
            rate (&climb, &next);
            offer (beam, &next);
          }
      if (same (&beam[0], &from[0]))
        {
          h *= 0.5;
          stretch *= 0.5;
        }
    }
  *trial = trial_of (&climb, &beam[0]);
  return beam[0].snr;
}
