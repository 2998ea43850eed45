/* whitener.h - the covariance C of a gappy series under a noise model, factored once, then exact answers in linear time.
 *
 * Every part of the model has a covariance exp(-c lag) (a cos w lag + b sin w lag), so C is semiseparable and C = L D L'
 * costs n J^2 for J terms, through any gaps (Foreman-Mackey, Agol, Ambikasaran & Angus 2017, AJ 154, 220; the same as a
 * Kalman filter, Kalman 1960, for these models). Only observed places enter: a gap is one longer step.
 *
 * A whitener is immutable once made and may be used from several threads. It keeps no pointer into the series,
 * but for its pace. */
#pragma once

#include <stddef.h>
#include "core/status.h"
#include "noise/noise-model.h"
#include "noise/series.h"

typedef struct _AntWhitener AntWhitener;

/* Factor. Uses every observed place (spikes too). NULL with *status set on ANT_NO_DATA, ANT_NOT_POSITIVE, ANT_NO_MEMORY.
 * Memory: about (2J+4) doubles per observed place, J = 2 per oscillator, 1 per exponential. */
AntWhitener *ant_whitener_new (const AntNoiseModel *model, const AntSeries *series, AntStatus *status);
void ant_whitener_free (AntWhitener *whitener);

/* ln likelihood of the series' values, with no storage: for fits. Spikes are left out. Same value as through a factor. */
AntStatus ant_noise_log_likelihood (const AntNoiseModel *model, const AntSeries *series, double *log_likelihood);

/* The same for up to ANT_LANES models at once, which must have the same parts and differ in their numbers only: a gradient's points
 * for little more than the price of one. log_likelihood [n] out; -HUGE_VAL where a model is not positive or has a bad
 * parameter. Digits differ from the single one's in the last few. */
#define ANT_LANES 8
AntStatus ant_noise_log_likelihoods (size_t n, const AntNoiseModel *model, const AntSeries *series, double *log_likelihood);

/* As ant_whitener_new, with an unknown constant level: solutions and energies below are then those of C^-1 with the level
 * projected out, C^-1 - C^-1 1 1'C^-1 / 1'C^-1 1 (generalised least squares, Aitken 1936). What a search uses, since a
 * record's median is only near its level. */
AntWhitener *ant_whitener_new_free_level (const AntNoiseModel *model, const AntSeries *series, AntStatus *status);

/* The level itself, 1'C^-1 v / 1'C^-1 1, of a whitener with a free level. */
double ant_whitener_level (const AntWhitener *whitener, const float *value);

size_t ant_whitener_n (const AntWhitener *whitener);          /* grid places */
size_t ant_whitener_observed (const AntWhitener *whitener);   /* observed places */
const unsigned *ant_whitener_places (const AntWhitener *whitener); /* [observed] their grid places, rising */
const double *ant_whitener_variance (const AntWhitener *whitener); /* [observed] innovation variances D, ppm^2 */
/* [observed] diagonal of C^-1: z/precision is what a sample departs from the forecast of all others, with variance
 * 1/precision. */
const double *ant_whitener_precision (const AntWhitener *whitener);
double ant_whitener_log_det (const AntWhitener *whitener);    /* ln det C */

/* innovation[i] = (L^-1 v)[i] for values given on the grid [n] (places not observed are not read); [observed]. */
void ant_whitener_innovations (const AntWhitener *whitener, const float *value, double *innovation);
/* z = C^-1 v on the grid: z [n], 0 at places not observed. */
AntStatus ant_whitener_solve (const AntWhitener *whitener, const float *value, double *z);

/* Shapes are limited in time: s[j] at places first+j, j < n_shape, else 0. Parts outside the grid are ignored. */
/* s' C^-1 s, exact, for ANT_LANES shapes that begin at one place, stored interleaved shape[j*ANT_LANES + lane], j < n_shape;
 * a lane that is shorter is padded with zeros (length[lane] <= n_shape says where it ends).
 * energy [ANT_LANES] out: s'C^-1 s. moment [ANT_LANES] out: s'z with z from ant_whitener_solve.
 * weight [ANT_LANES] out: the sum of s over observed places, for the coverage. */
void ant_whitener_energies (const AntWhitener *whitener, const double *z, ptrdiff_t first, size_t n_shape,
                            const double *shape, double energy[ANT_LANES], double moment[ANT_LANES],
                            double weight[ANT_LANES]);
