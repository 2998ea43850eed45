/* spectrum-private.h - what spectrum.c, expectation.c and whittle.c share. */
#pragma once

#include <fftw3.h>
#include "noise/spectrum.h"

struct _AntSpectrum
{
  size_t n;           /* grid places */
  double step_d;
  size_t length;      /* 2-3-5-7-smooth, >= n: ordinate k has frequency k / (length step_d) */
  size_t bins;
  size_t *first;      /* [bins+1] ordinates of bin b are first[b] .. first[b+1]-1 */
  double *frequency_cd, *power, *ordinates; /* [bins] */
  double *taper;      /* [n] 0 where not observed */
  double *overlap;    /* [n] autocorrelation of the taper over its value at 0 */
  fftw_complex *taper_transform; /* [length+1] of the taper padded to 2 length */
  double sum_squares; /* of the taper */
  double mean_error_ppm, mean_count; /* what stands for the measurements in ant_noise_model_variance */
  fftw_plan forward, backward;       /* of 2 length */
  AntPace *pace;      /* of the series, or NULL */
  AntSpectrum *steps; /* the same of the differences of neighbours, with the same bins; NULL where too few */
};

/* Room for the transforms of one thread. */
typedef struct
{
  double *covariance;           /* [n] in: autocovariance at lags 0 .. n-1 steps */
  double *real;                 /* [2 length] */
  fftw_complex *complex, *cross; /* [length+1] */
} AntSpectrumWork;

static inline double
ant_squared (const fftw_complex z)
{
  return z[0] * z[0] + z[1] * z[1];
}

/* value [n] times factor [n] (NULL: 1) into real [2 length], zero beyond. */
void ant_spectrum_pad (const AntSpectrum *spectrum, const double *value, const double *factor, double *real);
/* Of real [2 length], into complex [length+1]. Left out once the pace asks to stop: whoever began the work ends with
 * ANT_STOPPED. */
void ant_spectrum_transform (const AntSpectrum *spectrum, double *real, fftw_complex *complex);

AntStatus ant_spectrum_work_init (AntSpectrumWork *work, const AntSpectrum *spectrum);
void ant_spectrum_work_clear (AntSpectrumWork *work);
/* Expected power in the bins, out [bins], of noise with work->covariance. What the removal of the mean takes away is
 * left in unless `mean` is nonzero: that is exact, and costs four transforms instead of one. */
void ant_spectrum_expect (const AntSpectrum *spectrum, AntSpectrumWork *work, int mean, double *out);
/* The mean variance of a measurement under a model, ppm^2. */
double ant_spectrum_white (const AntSpectrum *spectrum, const AntNoiseModel *model);
