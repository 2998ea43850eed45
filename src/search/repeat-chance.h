/* repeat-chance.h - how many repeats of a given SNR noise alone would show.
 *
 * Under the noise the SNR of a train is a Gaussian random field over period, epoch and duration, of variance 1. The expected
 * number of its maxima above a high T is the volume searched, in units of the field's own lengths, times
 *   (T^2 - 1) exp (-T^2/2) / (2 pi)^2                                 (Adler & Taylor 2007, Random Fields and Geometry, ch. 12)
 * for smooth templates. Epoch: lambda_t is the variance of the field's derivative. Period: it moves every event by its number,
 * so its length is that of the epoch over the scatter of the events' numbers, M/sqrt(12). With M P = span the volume is
 *   span/sqrt(12) times the integral over period and duration of lambda_t sqrt(lambda_D),
 * read from the fitted model through the record's gaps. Boxes in white noise have no derivative: each of the three
 * dimensions then gives T^2/duration in place of T sqrt(lambda) (Pickands 1969, Trans. AMS 145, 51). A constant factor for either is
 * calibrated on noise sent through the whole search (docs/search.md). */
#pragma once

#include "core/status.h"
#include "noise/whitener.h"
#include "search/repeat-grid.h"

#define ANT_CHANCE_DURATIONS 10

/* lambda_t sqrt(lambda_D), per cubic place, of trapezoids with this ramp (places), mean over a fixed sample of epochs in
 * places from .. to of the whitener; 0 where nothing was observed well enough. duration: contact I to IV, places. */
AntStatus ant_repeat_chance_rates (const AntWhitener *whitener, double ramp, double from, double to, size_t n,
                                   const double *duration, double *rate);

typedef struct
{
  int white;
  double volume; /* span times the integral, with the calibrated factor */
} AntRepeatChance;

/* span_d: from first to last observed sample. rate [ANT_CHANCE_DURATIONS] at durations of ant_repeat_chance_duration,
 * NULL in white noise. step_d: the cadence, in which rates are. */
void ant_repeat_chance_init (AntRepeatChance *chance, const AntRepeatGrid *grid, double span_d, double step_d, const double *rate);
double ant_repeat_chance_duration (const AntRepeatGrid *grid, size_t i); /* days */
/* Noise-only repeats of one sign expected in the record with an SNR of at least `snr`. */
double ant_repeat_chance_expected (const AntRepeatChance *chance, double snr);
/* SNR at which `number` are expected; between 4 and 40. */
double ant_repeat_chance_threshold (const AntRepeatChance *chance, double number);
