/* expectation.c - the power that a noise model puts into the bins of a gappy spectrum. */
#include <math.h>
#include <string.h>
#include "noise/spectrum-private.h"

#define TRANSFORM_COST 2 /* for each sample, on the pace */

AntStatus
ant_spectrum_work_init (AntSpectrumWork *work, const AntSpectrum *spectrum)
{
  work->covariance = fftw_malloc (spectrum->n * sizeof (double));
  work->real = fftw_malloc (2 * spectrum->length * sizeof (double));
  work->complex = fftw_malloc ((spectrum->length + 1) * sizeof (fftw_complex));
  work->cross = fftw_malloc ((spectrum->length + 1) * sizeof (fftw_complex));
  if (work->covariance && work->real && work->complex && work->cross)
    return ANT_OK;
  ant_spectrum_work_clear (work);
  return ANT_NO_MEMORY;
}

void
ant_spectrum_work_clear (AntSpectrumWork *work)
{
  fftw_free (work->covariance);
  fftw_free (work->real);
  fftw_free (work->complex);
  fftw_free (work->cross);
  *work = (AntSpectrumWork){ NULL };
}

void
ant_spectrum_transform (const AntSpectrum *spectrum, double *real, fftw_complex *complex)
{
  if (!ant_pace_stopped (spectrum->pace)) /* else nobody will look at it */
    fftw_execute_dft_r2c (spectrum->forward, real, complex);
}

void
ant_spectrum_pad (const AntSpectrum *spectrum, const double *value, const double *factor, double *real)
{
  for (size_t i = 0; i < spectrum->n; i++)
    real[i] = factor ? value[i] * factor[i] : value[i];
  memset (real + spectrum->n, 0, (2 * spectrum->length - spectrum->n) * sizeof *real);
}

/* As ant_spectrum_pad, for a function of lag, mirrored to negative lags. */
static void
pad_even (const AntSpectrum *spectrum, const double *value, const double *factor, double *real)
{
  ant_spectrum_pad (spectrum, value, factor, real);
  for (size_t i = 1; i < spectrum->n; i++)
    real[2 * spectrum->length - i] = real[i];
}

/* With Z_k the transform of taper times noise and W_k that of the taper, removing the tapered mean leaves
 * X_k = Z_k - Z_0 W_k/W_0. So E|X_k|^2 = E|Z_k|^2 - 2 Re (W_k* C_k)/W_0 + |W_k|^2 C_0/W_0^2 where
 * C_k = E (Z_k Z_0) is the transform of taper * (covariance convolved with taper), put into work->cross. */
static void
cross_with_mean (const AntSpectrum *spectrum, AntSpectrumWork *work)
{
  pad_even (spectrum, work->covariance, NULL, work->real);
  ant_spectrum_transform (spectrum, work->real, work->complex);
  for (size_t k = 0; k <= spectrum->length; k++)
    {
      double gain = work->complex[k][0] / (2 * (double) spectrum->length); /* of an even function: real */
      work->complex[k][0] = gain * spectrum->taper_transform[k][0];
      work->complex[k][1] = gain * spectrum->taper_transform[k][1];
    }
  if (ant_pace_stopped (spectrum->pace))
    return;
  fftw_execute_dft_c2r (spectrum->backward, work->complex, work->real);
  ant_spectrum_pad (spectrum, work->real, spectrum->taper, work->real);
  ant_spectrum_transform (spectrum, work->real, work->cross);
}

void
ant_spectrum_expect (const AntSpectrum *spectrum, AntSpectrumWork *work, int mean, double *out)
{
  ant_pace_on (spectrum->pace, (mean ? 4 : 1) * TRANSFORM_COST * spectrum->n);
  if (mean)
    cross_with_mean (spectrum, work);
  pad_even (spectrum, work->covariance, spectrum->overlap, work->real);
  ant_spectrum_transform (spectrum, work->real, work->complex);
  const fftw_complex *taper = (const fftw_complex *) spectrum->taper_transform;
  double total = taper[0][0];
  for (size_t b = 0; b < spectrum->bins; b++)
    {
      double sum = 0, removed = 0;
      for (size_t k = 2 * spectrum->first[b]; k < 2 * spectrum->first[b + 1]; k += 2)
        {
          sum += work->complex[k][0];
          if (mean)
            removed += 2 * (taper[k][0] * work->cross[k][0] + taper[k][1] * work->cross[k][1])
                       - ant_squared (taper[k]) * work->cross[0][0] / total;
        }
      double count = (double) (spectrum->first[b + 1] - spectrum->first[b]);
      out[b] = 2 * spectrum->step_d * (sum - removed / (total * spectrum->sum_squares)) / count;
    }
}

double
ant_spectrum_white (const AntSpectrum *spectrum, const AntNoiseModel *model)
{
  return ant_noise_model_variance (model, spectrum->mean_error_ppm, spectrum->mean_count);
}

AntStatus
ant_spectrum_expected (const AntSpectrum *spectrum, const AntNoiseModel *model, double *out)
{
  AntSpectrumWork work;
  if (ant_noise_model_check (model) != ANT_OK)
    return ANT_BAD_ARGUMENT;
  AntStatus status = ant_spectrum_work_init (&work, spectrum);
  if (status != ANT_OK)
    return status;
  for (size_t i = 0; i < spectrum->n; i++)
    work.covariance[i] = ant_noise_model_covariance (model, (double) i * spectrum->step_d);
  work.covariance[0] += ant_spectrum_white (spectrum, model);
  ant_spectrum_expect (spectrum, &work, 1, out);
  ant_spectrum_work_clear (&work);
  return ant_pace_stopped (spectrum->pace) ? ANT_STOPPED : ANT_OK;
}

AntStatus
ant_spectrum_unmasked (const AntSpectrum *spectrum, const AntNoiseModel *model, double *out)
{
  AntStatus status = ant_spectrum_expected (spectrum, model, out);
  if (status != ANT_OK)
    return status;
  double white = ant_noise_white_psd (ant_spectrum_white (spectrum, model), spectrum->step_d);
  for (size_t b = 0; b < spectrum->bins; b++)
    out[b] = spectrum->power[b] * (ant_noise_model_psd (model, spectrum->frequency_cd[b]) + white) / out[b];
  return ANT_OK;
}
