/* spectrum.c - tapered periodogram of a gappy series in logarithmic bins. */
#include "noise/spectrum-private.h"
#include <math.h>
#include <stdlib.h>
#include "core/units.h"

#define FEWEST_SAMPLES 4

static size_t
smooth_length (size_t n)
{
  static const size_t prime[] = { 2, 3, 5, 7 };
  for (;; n++)
    {
      size_t rest = n;
      for (int i = 0; i < 4; i++)
        while (rest % prime[i] == 0)
          rest /= prime[i];
      if (rest == 1)
        return n;
    }
}

static int
is_fit_worthy (const AntSeries *series, size_t i)
{
  return !isnan (series->value_ppm[i]) && !(series->spike && series->spike[i]);
}

/* Hann's taper from the first to the last sample, zero in gaps; and the means that stand for the measurements.
 * sin^2 at half places makes sum = n/2 and sum of squares = 3n/8 exact without gaps (Harris 1978, Proc. IEEE 66, 51). */
static void
fill_taper (AntSpectrum *spectrum, const AntSeries *series)
{
  size_t first = 0, end = series->n;
  while (!is_fit_worthy (series, first))
    first++;
  while (!is_fit_worthy (series, end - 1))
    end--;
  double inverse_count = 0, error2 = 0;
  for (size_t i = 0; i < series->n; i++)
    {
      spectrum->taper[i] = 0;
      if (i < first || i >= end || !is_fit_worthy (series, i))
        continue;
      double s = sin (ANT_PI * ((double) (i - first) + 0.5) / (double) (end - first));
      double weight = s * s;
      double count = series->bin_count ? (double) series->bin_count[i] : 1;
      double error = series->error_ppm ? (double) series->error_ppm[i] : 0;
      spectrum->taper[i] = weight;
      spectrum->sum_squares += weight * weight;
      inverse_count += weight * weight / (count > 0 ? count : 1);
      error2 += error > 0 ? weight * weight * error * error : 0;
    }
  spectrum->mean_count = spectrum->sum_squares / inverse_count;
  spectrum->mean_error_ppm = sqrt (error2 / spectrum->sum_squares);
}

/* Cut the ordinates 1 .. (length-1)/2 (Nyquist's excluded) into bins of equal width in ln f, none of them empty. */
static AntStatus
cut_bins (AntSpectrum *spectrum, int bins_per_octave)
{
  size_t end = (spectrum->length + 1) / 2;
  spectrum->first = malloc ((end + 1) * sizeof *spectrum->first);
  if (!spectrum->first)
    return ANT_NO_MEMORY;
  size_t bins = 0;
  long last_octant = -1;
  for (size_t k = 1; k < end; k++)
    {
      long octant = lrint (floor (bins_per_octave * log2 ((double) k) + 0.5));
      if (octant == last_octant)
        continue;
      last_octant = octant;
      spectrum->first[bins++] = k;
    }
  spectrum->first[bins] = end;
  spectrum->bins = bins;
  spectrum->frequency_cd = calloc (bins, sizeof (double));
  spectrum->power = calloc (bins, sizeof (double));
  spectrum->ordinates = calloc (bins, sizeof (double));
  return spectrum->frequency_cd && spectrum->power && spectrum->ordinates ? ANT_OK : ANT_NO_MEMORY;
}

/* The taper's own transform and autocorrelation, and how many independent ordinates a bin holds: ordinates d apart are
 * correlated by the transform of the squared taper, |U_d|^2 / U_0^2, so that K of them count as
 * K^2 / sum over |d| < K of (K - |d|) |U_d|^2 / U_0^2. */
static void
study_taper (AntSpectrum *spectrum, AntSpectrumWork *work)
{
  ant_spectrum_pad (spectrum, spectrum->taper, spectrum->taper, work->real);
  ant_spectrum_transform (spectrum, work->real, work->complex);
  double top = ant_squared (work->complex[0]);
  size_t widest = 0;
  for (size_t b = 0; b < spectrum->bins; b++)
    {
      size_t count = spectrum->first[b + 1] - spectrum->first[b];
      widest = count > widest ? count : widest;
    }
  /* Bins may have any width up to the widest: running sums of c_d and d c_d serve all, kept in work->real. */
  double *sum = work->real, *moment = work->real + spectrum->length;
  sum[0] = moment[0] = 0;
  for (size_t d = 1; d < widest; d++)
    {
      double c = ant_squared (work->complex[2 * d]) / top;
      sum[d] = sum[d - 1] + c;
      moment[d] = moment[d - 1] + (double) d * c;
    }
  for (size_t b = 0; b < spectrum->bins; b++)
    {
      size_t count = spectrum->first[b + 1] - spectrum->first[b];
      double k = (double) count;
      spectrum->ordinates[b] = k * k / (k + 2 * (k * sum[count - 1] - moment[count - 1]));
    }

  ant_spectrum_pad (spectrum, spectrum->taper, NULL, work->real);
  ant_spectrum_transform (spectrum, work->real, spectrum->taper_transform);
  for (size_t k = 0; k <= spectrum->length; k++)
    {
      work->complex[k][0] = ant_squared (spectrum->taper_transform[k]);
      work->complex[k][1] = 0;
    }
  fftw_execute_dft_c2r (spectrum->backward, work->complex, work->real);
  for (size_t i = 0; i < spectrum->n; i++)
    spectrum->overlap[i] = work->real[i] / (2 * (double) spectrum->length * spectrum->sum_squares);
}

static void
measure (AntSpectrum *spectrum, const AntSeries *series, AntSpectrumWork *work)
{
  double sum = 0, weights = 0;
  for (size_t i = 0; i < series->n; i++)
    if (spectrum->taper[i] > 0)
      {
        sum += spectrum->taper[i] * (double) series->value_ppm[i];
        weights += spectrum->taper[i];
      }
  double mean = sum / weights;
  for (size_t i = 0; i < series->n; i++)
    work->covariance[i] = spectrum->taper[i] > 0 ? (double) series->value_ppm[i] - mean : 0;
  ant_spectrum_pad (spectrum, work->covariance, spectrum->taper, work->real);
  ant_spectrum_transform (spectrum, work->real, work->complex);
  double scale = 2 * spectrum->step_d / spectrum->sum_squares;
  for (size_t b = 0; b < spectrum->bins; b++)
    {
      double power = 0, log_sum = 0;
      for (size_t k = spectrum->first[b]; k < spectrum->first[b + 1]; k++)
        {
          power += ant_squared (work->complex[2 * k]);
          log_sum += log ((double) k);
        }
      double count = (double) (spectrum->first[b + 1] - spectrum->first[b]);
      spectrum->power[b] = scale * power / count;
      spectrum->frequency_cd[b] = exp (log_sum / count) / ((double) spectrum->length * spectrum->step_d);
    }
}

static AntStatus
allocate (AntSpectrum *spectrum, AntSpectrumWork *work)
{
  spectrum->taper = fftw_malloc (spectrum->n * sizeof (double));
  spectrum->overlap = fftw_malloc (spectrum->n * sizeof (double));
  spectrum->taper_transform = fftw_malloc ((spectrum->length + 1) * sizeof (fftw_complex));
  if (!spectrum->taper || !spectrum->overlap || !spectrum->taper_transform)
    return ANT_NO_MEMORY;
  AntStatus status = ant_spectrum_work_init (work, spectrum);
  if (status != ANT_OK)
    return status;
  int size = (int) (2 * spectrum->length);
  spectrum->forward = fftw_plan_dft_r2c_1d (size, work->real, work->complex, FFTW_ESTIMATE);
  spectrum->backward = fftw_plan_dft_c2r_1d (size, work->complex, work->real, FFTW_ESTIMATE);
  return spectrum->forward && spectrum->backward ? ANT_OK : ANT_NO_MEMORY;
}

static AntSpectrum *
study (const AntSeries *series, int bins_per_octave, AntStatus *status)
{
  *status = ANT_NO_DATA;
  if (ant_series_observed (series, 1) < FEWEST_SAMPLES)
    return NULL;
  *status = ANT_NO_MEMORY;
  AntSpectrum *spectrum = calloc (1, sizeof *spectrum);
  if (!spectrum)
    return NULL;
  spectrum->n = series->n;
  spectrum->step_d = series->step_d;
  spectrum->pace = series->pace;
  spectrum->length = smooth_length (series->n);
  AntSpectrumWork work = { NULL };
  *status = cut_bins (spectrum, bins_per_octave);
  if (*status == ANT_OK)
    *status = allocate (spectrum, &work);
  if (*status == ANT_OK)
    {
      fill_taper (spectrum, series);
      study_taper (spectrum, &work);
      measure (spectrum, series, &work);
    }
  ant_spectrum_work_clear (&work);
  if (*status == ANT_OK)
    return spectrum;
  ant_spectrum_free (spectrum);
  return NULL;
}

/* The differences of neighbours, each at the place of the later one, so that both spectra have the same bins. */
static AntSpectrum *
study_steps (const AntSeries *series, int bins_per_octave, AntStatus *status)
{
  float *step = malloc (series->n * sizeof *step);
  *status = ANT_NO_MEMORY;
  if (!step)
    return NULL;
  for (size_t i = 0; i < series->n; i++)
    {
      int both = i > 0 && is_fit_worthy (series, i) && is_fit_worthy (series, i - 1);
      step[i] = both ? series->value_ppm[i] - series->value_ppm[i - 1] : NAN;
    }
  AntSeries steps = { .n = series->n, .step_d = series->step_d, .start_d = series->start_d, .value_ppm = step,
                      .pace = series->pace };
  AntSpectrum *spectrum = study (&steps, bins_per_octave, status);
  free (step);
  return spectrum;
}

AntSpectrum *
ant_spectrum_new (const AntSeries *series, int bins_per_octave, AntStatus *status)
{
  AntStatus ignored;
  status = status ? status : &ignored;
  *status = ANT_BAD_ARGUMENT;
  if (bins_per_octave < 1 || !(series->step_d > 0) || series->n > (size_t) 1 << 29)
    return NULL;
  AntSpectrum *spectrum = study (series, bins_per_octave, status);
  if (!spectrum)
    return NULL;
  spectrum->steps = study_steps (series, bins_per_octave, status);
  if (*status == ANT_NO_DATA) /* no neighbours: the values have to do */
    *status = ANT_OK;
  if (ant_pace_stopped (series->pace))
    *status = ANT_STOPPED;
  if (*status == ANT_OK)
    return spectrum;
  ant_spectrum_free (spectrum);
  return NULL;
}

void
ant_spectrum_free (AntSpectrum *spectrum)
{
  if (!spectrum)
    return;
  ant_spectrum_free (spectrum->steps);
  free (spectrum->first);
  free (spectrum->frequency_cd);
  free (spectrum->power);
  free (spectrum->ordinates);
  fftw_free (spectrum->taper);
  fftw_free (spectrum->overlap);
  fftw_free (spectrum->taper_transform);
  if (spectrum->forward)
    fftw_destroy_plan (spectrum->forward);
  if (spectrum->backward)
    fftw_destroy_plan (spectrum->backward);
  free (spectrum);
}

size_t
ant_spectrum_bins (const AntSpectrum *spectrum)
{
  return spectrum->bins;
}

const double *
ant_spectrum_frequency_cd (const AntSpectrum *spectrum)
{
  return spectrum->frequency_cd;
}

const double *
ant_spectrum_power (const AntSpectrum *spectrum)
{
  return spectrum->power;
}

const double *
ant_spectrum_ordinates (const AntSpectrum *spectrum)
{
  return spectrum->ordinates;
}
