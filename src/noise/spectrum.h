/* spectrum.h - the power spectrum of a gappy series in logarithmic bins, and what a noise model predicts for those bins
 * through the very same gaps.
 *
 * Periodogram with a Hann-like taper over observed samples, one-sided, ppm^2 per (cycle/day): P_k = 2 dt |X_k|^2 / sum w^2.
 * The expectation through mask and taper is the Fourier transform of (model autocovariance x autocorrelation of
 * mask*taper): debiased Whittle likelihood, Sykulski, Olhede, Guillaumin, Lilly & Early 2019, Biometrika 106, 251.
 * The mean that is removed is weighted by the taper, and its removal is part of the expectation.
 * FFTW with ESTIMATE plans, fftw_malloc only, sizes of 2-3-5-7. A spectrum is immutable once made and
 * may be used from several threads; making and freeing it plan, so main calls fftw_make_planner_thread_safe. */
#pragma once

#include <stddef.h>
#include "core/status.h"
#include "noise/noise-model.h"
#include "noise/series.h"

typedef struct _AntSpectrum AntSpectrum;

/* Measure. bins_per_octave: usual 6. Uses fit-worthy samples, their mean removed. NULL with *status set (may be NULL) on
 * ANT_BAD_ARGUMENT, ANT_NO_DATA (fewer than 4 samples), ANT_NO_MEMORY. Frequencies run up to Nyquist's, exclusive. */
AntSpectrum *ant_spectrum_new (const AntSeries *series, int bins_per_octave, AntStatus *status);
void ant_spectrum_free (AntSpectrum *spectrum);
size_t ant_spectrum_bins (const AntSpectrum *spectrum);
const double *ant_spectrum_frequency_cd (const AntSpectrum *spectrum); /* [bins] cycles/day, log centre */
const double *ant_spectrum_power (const AntSpectrum *spectrum);        /* [bins] measured through the mask */
const double *ant_spectrum_ordinates (const AntSpectrum *spectrum);    /* [bins] independent ordinates in each bin */

/* Expected power in every bin for a model (white noise with the series' mean measurement variance included),
 * out [bins]: exact, one FFT pair. */
AntStatus ant_spectrum_expected (const AntSpectrum *spectrum, const AntNoiseModel *model, double *out);
/* The measured power with the mask's effect removed: power * S(f)/expected, comparable to S, the model's PSD plus the
 * white part's. out [bins]. */
AntStatus ant_spectrum_unmasked (const AntSpectrum *spectrum, const AntNoiseModel *model, double *out);

/* Fit the model's free parameters in place: minimise sum over bins of n_b (ln E_b + I_b/E_b) plus the prior penalty,
 * each bin taken from the values or from their first differences, whichever the gaps spoil less under the model given.
 * E comes from a matrix of hats (piecewise linear PSD) computed once for this mask, so an evaluation costs bins^2.
 * Times of narrow oscillators (quality above 2) are left as they are, even if free.
 * ANT_NOT_CONVERGED leaves the best point found. */
AntStatus ant_spectrum_whittle_fit (const AntSpectrum *spectrum, AntNoiseModel *model);
