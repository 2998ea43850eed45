/* repeat-train.h - the exact statistic of one train of dips: period, epoch, duration at full resolution.
 *
 * In white noise a train is of boxes (repeat-box.h): a sample is inside if its middle is. Under correlated noise it is of
 * trapezoids (repeat-edges.h), their energies read from the table (repeat-pairs.h); cross terms between events are left
 * out, which is right as long as the period exceeds the noise's correlation time. */
#pragma once

#include "search/repeat-box.h"

typedef struct
{
  const AntRepeatBox *box;     /* white noise, or NULL: */
  const AntRepeatEdges *edges; /* correlated noise */
  const AntRepeatPairs *pairs;
  size_t n;
  double least_duration, longest_duration; /* places, contact I to IV */
} AntRepeatTrain;

/* A train in places: event j is centred on mid + j period. */
typedef struct
{
  double period, mid, duration;
} AntTrainTrial;

typedef struct
{
  double num, den, full;  /* of one event; full: den of a well observed one */
  double mid;             /* places */
  long number;            /* j */
} AntTrainEvent;

typedef struct
{
  double num, den, snr, depth;
  size_t n_events;        /* at least half observed */
  double without_largest; /* SNR without the event that adds most */
  double chi2;            /* of the events' depths about the common one, n_events - 1 degrees of freedom */
  double odd_even;        /* difference of the depths of odd and even events, in its own sigma; 0 if one has none */
} AntTrainSums;

/* SNR alone; 0 with fewer than least_events events half observed. */
double ant_repeat_train_snr (const AntRepeatTrain *train, const AntTrainTrial *trial, size_t least_events);
void ant_repeat_train_sums (const AntRepeatTrain *train, const AntTrainTrial *trial, AntTrainSums *sums);
/* The same of events that are given, with energies better than the table's. */
void ant_repeat_train_add_up (const AntRepeatTrain *train, size_t n, const AntTrainEvent *event, AntTrainSums *sums);
/* One event by its number; den 0 if nothing of it is observed. */
AntTrainEvent ant_repeat_train_event (const AntRepeatTrain *train, const AntTrainTrial *trial, long number);
/* Numbers of the events that touch the record: first <= j < end. */
void ant_repeat_train_range (const AntRepeatTrain *train, const AntTrainTrial *trial, long *first, long *end);

/* Climb to the greatest SNR near a trial, at real-valued period, epoch and duration: from steps of step places (of the
 * epoch, and of the slip end to end) and of a sixth of the duration, a beam of four over the 26 neighbours, halved
 * until a sixteenth of a place, or a tenth of the epoch's own error if that is less. Returns the SNR. */
double ant_repeat_train_climb (const AntRepeatTrain *train, AntTrainTrial *trial, double step, size_t least_events);
