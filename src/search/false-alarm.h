/* false-alarm.h - how many dips of a given final SNR noise alone would show in a record.
 *
 * Under the noise the SNR of one template is a Gaussian process in time with unit variance, which crosses a high level T
 * upwards crossings * exp(-T^2/2) times (Rice 1945); `crossings` is computed here from the fitted model through the
 * record's own mask and summed over the templates, each counted by what its neighbour in duration does not share. The
 * families still share peaks, the fit of the shape then climbs two more dimensions (a factor T each: Adler & Taylor 2007, Random Fields and Geometry, ch. 12), and mask and
 * refit lifts noise peaks, the more the shorter the record:
 *   N(T) = yield * crossings * T^2 exp(-(T^2 - softness * (T^2 - T0^2)) / 2),  the softness only beyond T0 = 4.33.
 * yield, T0 and the softness of records of different length are calibrated on surrogates sent through the whole pipeline
 * (docs/search.md has the study).
 */
#pragma once

#include "core/status.h"
#include "noise/whitener.h"
#include "search/refine.h"
#include "search/template-bank.h"

typedef struct
{
  double crossings;            /* of zero, upwards, summed over all templates as above */
  double observed_d;           /* observed time */
} AntChanceField;

typedef struct
{
  AntChanceField field;
  double yield;
  double softness;
} AntChanceLaw;

/* Measure a chunk's field over epochs [from, to) (places of the whitener) on a fixed sample of epochs, durations and edges. */
AntStatus ant_chance_field_measure (AntChanceField *field, const AntWhitener *whitener, const AntTemplateBank *bank,
                                    const AntRefineOptions *options, double from, double to);
void ant_chance_field_add (AntChanceField *sum, const AntChanceField *field);
/* The calibrated law for a field. fitted_d: days of record that one noise fit sees (a chunk's length). */
void ant_chance_law_init (AntChanceLaw *law, const AntChanceField *field, double fitted_d);
/* Refit yield and softness to surrogates of the record: snr [n] final SNRs (signs dropped) of all events of both signs
 * at or above `lowest` in n_records noise-only records. Greatest posterior of the tail above `lowest`, the law as it stands
 * being the prior: few events leave the softness where it is and move the yield only. */
void ant_chance_law_fit (AntChanceLaw *law, size_t n, const double *snr, size_t n_records, double lowest);
/* Dips of one sign expected from noise alone with a final SNR of at least `snr`. */
double ant_chance_law_expected (const AntChanceLaw *law, double snr);
/* SNR at which `number` are expected; between 3 and 40. */
double ant_chance_law_threshold (const AntChanceLaw *law, double number);
