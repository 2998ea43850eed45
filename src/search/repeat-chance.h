/* repeat-chance.h - how many repeats of a given SNR noise alone would show.
 *
 * Under the noise the SNR of a train is a Gaussian random field over period, epoch and duration, of variance 1. The expected
 * number of its maxima above a high T is the volume searched, in units of the field's own lengths, times
 *   (T^2 - 1) exp (-T^2/2) / (2 pi)^2                                 (Adler & Taylor 2007, Random Fields and Geometry, ch. 12)
 * for smooth templates. Epoch: lambda_t is the variance of the field's derivative. Period: it moves every event by its number,
 * so its length is that of the epoch over the scatter of the events' numbers, sqrt ((M^2-1)/12) for M of them. A period with
 * span/period = k + f has k + 1 events at a part f of its epochs and k at the rest. So the volume is a sum over M of integrals
 * over period, epoch and duration of sqrt ((M^2-1)/12) lambda_t sqrt(lambda_D), read from the fitted model through the record's
 * gaps. Boxes in white noise have no derivative: each of the three dimensions then gives T^2/duration in place of
 * T sqrt(lambda) (Pickands 1969, Trans. AMS 145, 51). A constant factor for either is calibrated on noise sent through the
 * whole search (docs/search.md).
 *
 * A train must reach ANT_WITHOUT_LARGEST without its largest event. Of M like events of noise alone with a common SNR of T, the
 * SNR without number i is T sqrt ((M-1)/M) - e_i/sqrt(M-1), e_i normal of variance (M-1)/M: few events seldom pass, and the
 * density of maxima is weighted with the chance that they do. */
#pragma once

#include "core/status.h"
#include "noise/whitener.h"
#include "search/repeat-grid.h"

#define ANT_CHANCE_DURATIONS 10
#define ANT_CHANCE_EVENTS 60     /* this many and more count alike */
#define ANT_WITHOUT_LARGEST 5.0  /* least SNR of a train without its largest event */

/* lambda_t sqrt(lambda_D), per cubic place, of trapezoids with this ramp (places), mean over a fixed sample of epochs in
 * places from .. to of the whitener; 0 where nothing was observed well enough. duration: contact I to IV, places. */
AntStatus ant_repeat_chance_rates (const AntWhitener *whitener, double ramp, double from, double to, size_t n,
                                   const double *duration, double *rate);

typedef struct
{
  int white;
  double volume[ANT_CHANCE_EVENTS + 1]; /* of trains of so many events, with the calibrated factor */
  double mean[ANT_CHANCE_EVENTS + 1], stretch[ANT_CHANCE_EVENTS + 1]; /* of the largest of so many events */
} AntRepeatChance;

/* span_d: from first to last observed sample. Trains of fewer than least_events are not counted. rate [ANT_CHANCE_DURATIONS] at durations of ant_repeat_chance_duration,
 * NULL in white noise. step_d: the cadence, in which rates are. */
void ant_repeat_chance_init (AntRepeatChance *chance, const AntRepeatGrid *grid, size_t least_events, double span_d, double step_d,
                             const double *rate);
double ant_repeat_chance_duration (const AntRepeatGrid *grid, size_t i); /* days */
/* Noise-only repeats of one sign expected in the record with an SNR of at least `snr`. */
double ant_repeat_chance_expected (const AntRepeatChance *chance, double snr);
/* Chance that a train of noise with so many like events and this SNR reaches ANT_WITHOUT_LARGEST without its largest. */
double ant_repeat_chance_keeps_enough (const AntRepeatChance *chance, size_t events, double snr);
/* SNR at which `number` are expected; between ANT_WITHOUT_LARGEST and 40. */
double ant_repeat_chance_threshold (const AntRepeatChance *chance, double number);
