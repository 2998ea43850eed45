/* false-alarm.h - how many dips of a given final SNR noise alone would show in a record.
 *
 * Under the noise the SNR is a Gaussian field over epoch, duration and edge. The expected number of its peaks above a high
 * level T is that of its excursion set's Euler characteristic (Adler & Taylor 2007, Random Fields and Geometry, ch. 12):
 *   N(T) = sum over j of L_j rho_j(T),  rho_1 = e/(2 pi), rho_2 = T e/(2 pi)^(3/2), rho_3 = (T^2-1) e/(2 pi)^2, e = exp(-T^2/2),
 * where L_j are the lengths, areas and volumes of the searched range, measured in units in which neighbouring shapes decorrelate:
 * the metric is the covariance of the field's derivatives, computed here from the fitted model through the record's own mask.
 *
 * The search is not quite that field: its templates are a grid (it misses a little), and masking and refitting lifts
 * noise peaks, the more the shorter the record. Both are one constant and one exponent, calibrated on surrogates sent through the whole
 * pipeline (docs/search.md gives the study and its command). */
#pragma once

#include "core/status.h"
#include "noise/whitener.h"
#include "search/refine.h"
#include "search/template-bank.h"

/* Contents of the searched range, summed over chunks. */
typedef struct
{
  double length, area, volume; /* L_1, L_2, L_3 */
  double observed_d;           /* observed time */
} AntChanceField;

typedef struct
{
  AntChanceField field;
  double yield;    /* fraction of the field's peaks that the search finds and lists */
  double softness; /* SNR^2 is divided by 1 + softness: the lift of mask and refit */
} AntChanceLaw;

/* Measure a chunk's field over epochs [from, to) (places of the whitener) on a fixed sample of epochs, durations and edges. */
AntStatus ant_chance_field_measure (AntChanceField *field, const AntWhitener *whitener, const AntTemplateBank *bank,
                                    const AntRefineOptions *options, double from, double to);
void ant_chance_field_add (AntChanceField *sum, const AntChanceField *field);
/* The calibrated law for a field. */
void ant_chance_law_init (AntChanceLaw *law, const AntChanceField *field);
/* Dips of one sign expected from noise alone with a final SNR of at least `snr`. */
double ant_chance_law_expected (const AntChanceLaw *law, double snr);
/* SNR at which `number` are expected; between 3 and 40. */
double ant_chance_law_threshold (const AntChanceLaw *law, double number);
