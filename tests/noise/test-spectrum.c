/* test-spectrum.c - the periodogram's levels, and its expectation through gaps against slow twins and drawn noise. */
#include "noise/spectrum.h"
#include <complex.h>
#include <glib.h>
#include <math.h>
#include "core/random.h"
#include "core/units.h"
#include "noise/surrogate.h"

#define STEP_D (1 / 1440.0)
#define EACH_ALONE 100000 /* so many bins per octave that every ordinate is a bin */

static AntNoiseModel
example_model (void)
{
  return (AntNoiseModel){
    .n_parts = 3,
    .part = {
      { .kind = ANT_OSCILLATOR, .rms_ppm = 300, .time_d = 3, .quality = 0.70710678 },
      { .kind = ANT_OSCILLATOR, .rms_ppm = 40, .time_d = 26 * STEP_D, .quality = 0.70710678 },
      { .kind = ANT_EXPONENTIAL, .rms_ppm = 30, .time_d = 0.3 },
    },
    .white_ppm = 10,
    .error_scale = 1,
  };
}

/* 35 of 96 min lost, and a longer break. */
static AntSeries
low_orbit_series (size_t n, guint64 seed, float *value)
{
  AntRandom random;
  ant_random_seed (&random, seed, 1);
  for (size_t i = 0; i < n; i++)
    {
      int lost = (i + 20) % 96 < 35 || (i > n * 2 / 5 && i < n / 2);
      value[i] = lost ? NAN : (float) (20 * ant_random_normal (&random));
    }
  return (AntSeries){ .n = n, .step_d = STEP_D, .value_ppm = value };
}

static AntSpectrum *
spectrum_of (const AntSeries *series, int bins_per_octave)
{
  AntStatus status;
  AntSpectrum *spectrum = ant_spectrum_new (series, bins_per_octave, &status);
  g_assert_cmpint (status, ==, ANT_OK);
  g_assert_nonnull (spectrum);
  return spectrum;
}

static void
assert_near (double got, double want, double relative)
{
  g_assert_cmpfloat_with_epsilon (got, want, relative * fabs (want));
}

/* Hann's taper from the first to the last sample, as the header and the method page say. */
static void
taper_of (const AntSeries *series, double *taper)
{
  size_t first = 0, end = series->n;
  while (isnan (series->value_ppm[first]))
    first++;
  while (isnan (series->value_ppm[end - 1]))
    end--;
  for (size_t i = 0; i < series->n; i++)
    {
      double s = sin (ANT_PI * ((double) i - (double) first + 0.5) / (double) (end - first));
      taper[i] = isnan (series->value_ppm[i]) ? 0 : s * s;
    }
}

/* The same in O(n^2) for each ordinate: E |X|^2 = sum over i, j of u_i u_j* R_(i-j), u the weights of the samples in the
 * ordinate once the tapered mean is removed. */
static double
direct_expectation (const AntSeries *series, const AntNoiseModel *model, double f_cd)
{
  size_t n = series->n;
  g_autofree double *taper = g_new (double, n);
  g_autofree double complex *u = g_new (double complex, n);
  taper_of (series, taper);
  double complex transform = 0;
  double total = 0, squares = 0, white = ant_noise_model_variance (model, 0, 1);
  for (size_t i = 0; i < n; i++)
    {
      u[i] = taper[i] * cexp (CMPLX (0, -ANT_TAU * f_cd * STEP_D * (double) i));
      transform += u[i];
      total += taper[i];
      squares += taper[i] * taper[i];
    }
  for (size_t i = 0; i < n; i++)
    u[i] -= taper[i] * transform / total;
  double sum = 0;
  for (size_t i = 0; i < n; i++)
    for (size_t j = 0; j < n; j++)
      {
        double r = ant_noise_model_covariance (model, ((double) i - (double) j) * STEP_D) + (i == j ? white : 0);
        sum += creal (u[i] * conj (u[j])) * r;
      }
  return 2 * STEP_D * sum / squares;
}

static void
test_expectation_equals_direct_sums (void)
{
  enum { n = 300 };
  float value[n];
  AntSeries series = low_orbit_series (n, 1, value);
  AntNoiseModel model = example_model ();
  AntSpectrum *spectrum = spectrum_of (&series, EACH_ALONE);
  size_t bins = ant_spectrum_bins (spectrum);
  g_autofree double *expected = g_new (double, bins);
  g_assert_cmpuint (bins, ==, n / 2 - 1);
  g_assert_cmpint (ant_spectrum_expected (spectrum, &model, expected), ==, ANT_OK);
  double top = 0;
  for (size_t b = 0; b < bins; b++)
    top = fmax (top, expected[b]);
  for (size_t b = 0; b < bins; b++)
    {
      double want = direct_expectation (&series, &model, ant_spectrum_frequency_cd (spectrum)[b]);
      g_assert_cmpfloat_with_epsilon (expected[b], want, 1e-10 * want + 1e-15 * top);
    }
  ant_spectrum_free (spectrum);
}

static void
test_bins_average_their_ordinates (void)
{
  enum { n = 3000 };
  float value[n];
  AntSeries series = low_orbit_series (n, 2, value);
  AntNoiseModel model = example_model ();
  AntSpectrum *fine = spectrum_of (&series, EACH_ALONE), *coarse = spectrum_of (&series, 6);
  g_autofree double *fine_expected = g_new (double, ant_spectrum_bins (fine));
  g_autofree double *expected = g_new (double, ant_spectrum_bins (coarse));
  ant_spectrum_expected (fine, &model, fine_expected);
  ant_spectrum_expected (coarse, &model, expected);
  size_t k = 0;
  for (size_t b = 0; b < ant_spectrum_bins (coarse); b++)
    {
      /* Bins are bounded by powers of 2^(1/6) about 1/length. */
      double edge = exp2 (floor (6 * log2 ((double) k + 1) + 0.5) / 6 + 0.5 / 6);
      double power = 0, mean = 0, count = 0;
      for (; k < ant_spectrum_bins (fine) && (double) k + 1 < edge; k++, count++)
        {
          power += ant_spectrum_power (fine)[k];
          mean += fine_expected[k];
        }
      assert_near (ant_spectrum_power (coarse)[b], power / count, 1e-12);
      assert_near (expected[b], mean / count, 1e-12);
      g_assert_cmpfloat (ant_spectrum_ordinates (coarse)[b], >=, 1 - 1e-12);
      g_assert_cmpfloat (ant_spectrum_ordinates (coarse)[b], <=, count + 1e-9);
    }
  g_assert_cmpuint (k, ==, ant_spectrum_bins (fine));
  ant_spectrum_free (fine);
  ant_spectrum_free (coarse);
}

/* Over 400 records drawn through low-orbit gaps the mean of each bin lies within its sampling error of the expectation,
 * and, for white noise, its variance is the square of the mean over the number of independent ordinates. */
static void
average_draws (const AntNoiseModel *model, int check_variance)
{
  enum { n = 4320, draws = 400 };
  float value[n], drawn[n];
  AntSeries series = low_orbit_series (n, 3, value);
  AntSpectrum *spectrum = spectrum_of (&series, 6);
  size_t bins = ant_spectrum_bins (spectrum);
  g_autofree double *expected = g_new (double, bins);
  g_autofree double *sum = g_new0 (double, bins);
  g_autofree double *squares = g_new0 (double, bins);
  ant_spectrum_expected (spectrum, model, expected);
  AntRandom random;
  ant_random_seed (&random, 4, 1);
  for (int d = 0; d < draws; d++)
    {
      ant_surrogate_draw (model, &series, &random, drawn);
      AntSeries noise = series;
      noise.value_ppm = drawn;
      AntSpectrum *one = spectrum_of (&noise, 6);
      for (size_t b = 0; b < bins; b++)
        {
          double ratio = ant_spectrum_power (one)[b] / expected[b];
          sum[b] += ratio;
          squares[b] += ratio * ratio;
        }
      ant_spectrum_free (one);
    }
  double chi2 = 0, relative = 0;
  for (size_t b = 0; b < bins; b++)
    {
      double mean = sum[b] / draws;
      double variance = squares[b] / draws - mean * mean;
      double off = (mean - 1) / sqrt (variance / draws);
      g_assert_cmpfloat (fabs (off), <, 4);
      chi2 += off * off;
      relative += variance * ant_spectrum_ordinates (spectrum)[b];
    }
  g_assert_cmpfloat (chi2 / (double) bins, <, 2);
  if (check_variance)
    g_assert_cmpfloat_with_epsilon (relative / (double) bins, 1, 0.05);
  ant_spectrum_free (spectrum);
}

static void
test_expectation_is_the_mean_of_draws (void)
{
  AntNoiseModel model = example_model ();
  average_draws (&model, FALSE);
}

static void
test_ordinates_give_the_scatter_of_white_noise (void)
{
  AntNoiseModel model = { .white_ppm = 10, .error_scale = 1 };
  average_draws (&model, TRUE);
}

/* An odd length has no Nyquist ordinate, and the tapered mean is gone: what is left sums to the tapered mean square. */
static void
test_power_sums_to_mean_square (void)
{
  enum { n = 315 };
  float value[n];
  double taper[n], total = 0, mean = 0, squares = 0, want = 0, sum = 0;
  AntSeries series = low_orbit_series (n, 5, value);
  taper_of (&series, taper);
  for (int i = 0; i < n; i++)
    if (taper[i] > 0)
      {
        total += taper[i];
        mean += taper[i] * (double) value[i];
      }
  mean /= total;
  for (int i = 0; i < n; i++)
    if (taper[i] > 0)
      {
        squares += taper[i] * taper[i];
        want += pow (taper[i] * ((double) value[i] - mean), 2);
      }
  AntSpectrum *spectrum = spectrum_of (&series, EACH_ALONE);
  for (size_t b = 0; b < ant_spectrum_bins (spectrum); b++)
    sum += ant_spectrum_power (spectrum)[b] / (n * STEP_D);
  assert_near (sum, want / squares, 1e-12);
  ant_spectrum_free (spectrum);
}

/* 25 ppm every 60 s: 0.075 ppm^2/uHz (2 sigma^2 dt), measured and expected. */
static void
test_white_level_is_twice_variance_times_step (void)
{
  enum { n = 100000 };
  double level = 0.075 / (ANT_SECONDS_PER_DAY * 1e-6);
  AntNoiseModel model = { .white_ppm = 25, .error_scale = 1 };
  g_autofree float *value = g_new (float, n);
  AntRandom random;
  ant_random_seed (&random, 6, 1);
  for (int i = 0; i < n; i++)
    value[i] = (float) (25 * ant_random_normal (&random));
  AntSeries series = { .n = n, .step_d = STEP_D, .value_ppm = value };
  AntSpectrum *spectrum = spectrum_of (&series, 6);
  size_t bins = ant_spectrum_bins (spectrum);
  g_autofree double *expected = g_new (double, bins);
  ant_spectrum_expected (spectrum, &model, expected);
  double power = 0, ordinates = 0;
  for (size_t b = 0; b < bins; b++)
    {
      if (b > 2) /* the removed mean took some of the lowest */
        assert_near (expected[b], level, 1e-9);
      power += ant_spectrum_power (spectrum)[b] * ant_spectrum_ordinates (spectrum)[b];
      ordinates += ant_spectrum_ordinates (spectrum)[b];
    }
  g_assert_cmpfloat (fabs (power / ordinates / level - 1), <, 3 / sqrt (ordinates));
  ant_spectrum_free (spectrum);
}

/* Hann: a sine on an ordinate stands A^2/2 T/1.5 high (equivalent noise bandwidth 1.5 ordinates, Harris 1978, Proc. IEEE
 * 66, 51), its neighbours a quarter of that, and nothing lies beyond them. */
static void
test_taper_is_hann (void)
{
  enum { n = 4320 };
  g_autofree float *value = g_new (float, n);
  for (int i = 0; i < n; i++)
    value[i] = (float) (100 * sin (ANT_TAU * 40 * i / n + 0.3));
  AntSeries series = { .n = n, .step_d = STEP_D, .value_ppm = value };
  AntSpectrum *spectrum = spectrum_of (&series, EACH_ALONE);
  const double *power = ant_spectrum_power (spectrum);
  double peak = 5000 * n * STEP_D / 1.5;
  assert_near (power[39], peak, 1e-6);
  assert_near (power[38], peak / 4, 1e-6);
  assert_near (power[40], peak / 4, 1e-6);
  for (size_t b = 0; b < ant_spectrum_bins (spectrum); b++)
    if (b < 38 || b > 40)
      g_assert_cmpfloat (power[b], <, 1e-12 * peak);
  assert_near (ant_spectrum_frequency_cd (spectrum)[39], 40 / (n * STEP_D), 1e-12);
  ant_spectrum_free (spectrum);
}

/* Power beyond Nyquist's frequency folds back, so the expectation lies above the model's own spectrum there. */
static void
test_power_beyond_nyquist_is_folded (void)
{
  enum { n = 4096 };
  g_autofree float *value = g_new0 (float, n);
  AntNoiseModel model = { .n_parts = 1, .error_scale = 1,
                          .part = { { .kind = ANT_EXPONENTIAL, .rms_ppm = 30, .time_d = 2 * STEP_D } } };
  AntSeries series = { .n = n, .step_d = STEP_D, .value_ppm = value };
  AntSpectrum *spectrum = spectrum_of (&series, 6);
  size_t last = ant_spectrum_bins (spectrum) - 4;
  g_autofree double *expected = g_new (double, ant_spectrum_bins (spectrum));
  ant_spectrum_expected (spectrum, &model, expected);
  double f_cd = ant_spectrum_frequency_cd (spectrum)[last], folded = 0;
  for (int alias = -20000; alias <= 20000; alias++)
    folded += ant_noise_model_psd (&model, fabs (f_cd + 1440 * alias));
  assert_near (expected[last], folded, 2e-3);
  g_assert_cmpfloat (expected[last], >, 1.2 * ant_noise_model_psd (&model, f_cd));
  ant_spectrum_free (spectrum);
}

static void
test_unmasking_compares_with_the_models_spectrum (void)
{
  enum { n = 3000 };
  float value[n];
  AntSeries series = low_orbit_series (n, 7, value);
  AntNoiseModel model = example_model ();
  AntSpectrum *spectrum = spectrum_of (&series, 6);
  size_t bins = ant_spectrum_bins (spectrum);
  g_autofree double *expected = g_new (double, bins);
  g_autofree double *unmasked = g_new (double, bins);
  ant_spectrum_expected (spectrum, &model, expected);
  g_assert_cmpint (ant_spectrum_unmasked (spectrum, &model, unmasked), ==, ANT_OK);
  for (size_t b = 0; b < bins; b++)
    {
      double truth = ant_noise_model_psd (&model, ant_spectrum_frequency_cd (spectrum)[b])
                     + ant_noise_white_psd (100, STEP_D);
      assert_near (unmasked[b] / truth, ant_spectrum_power (spectrum)[b] / expected[b], 1e-12);
    }
  ant_spectrum_free (spectrum);
}

static void
test_spikes_count_as_gaps (void)
{
  enum { n = 1000 };
  float value[n], without[n];
  uint8_t spike[n] = { 0 };
  AntSeries series = low_orbit_series (n, 8, value);
  for (int i = 0; i < n; i++)
    {
      spike[i] = i % 97 == 5;
      without[i] = spike[i] ? NAN : value[i];
    }
  AntSeries gaps = series;
  gaps.value_ppm = without;
  series.spike = spike;
  AntSpectrum *one = spectrum_of (&series, 6), *two = spectrum_of (&gaps, 6);
  for (size_t b = 0; b < ant_spectrum_bins (one); b++)
    g_assert_cmpfloat (ant_spectrum_power (one)[b], ==, ant_spectrum_power (two)[b]);
  ant_spectrum_free (one);
  ant_spectrum_free (two);
}

static void
test_stated_errors_enter_as_their_mean_variance (void)
{
  enum { n = 1000 };
  float value[n], error[n];
  AntSeries series = low_orbit_series (n, 9, value);
  AntSpectrum *plain = spectrum_of (&series, 6);
  for (int i = 0; i < n; i++)
    error[i] = 8;
  series.error_ppm = error;
  AntSpectrum *spectrum = spectrum_of (&series, 6);
  size_t bins = ant_spectrum_bins (spectrum);
  g_autofree double *one = g_new (double, bins);
  g_autofree double *two = g_new (double, bins);
  AntNoiseModel with = { .white_ppm = 6, .error_scale = 1 }, white = { .white_ppm = 10, .error_scale = 1 };
  ant_spectrum_expected (spectrum, &with, one);
  ant_spectrum_expected (plain, &white, two);
  for (size_t b = 0; b < bins; b++)
    assert_near (one[b], two[b], 1e-6);
  ant_spectrum_free (plain);
  ant_spectrum_free (spectrum);
}

static void
test_too_few_samples_are_refused (void)
{
  AntStatus status;
  float value[100];
  for (int i = 0; i < 100; i++)
    value[i] = NAN;
  AntSeries series = { .n = 100, .step_d = STEP_D, .value_ppm = value };
  g_assert_null (ant_spectrum_new (&series, 6, &status));
  g_assert_cmpint (status, ==, ANT_NO_DATA);
  value[50] = value[51] = 1;
  g_assert_null (ant_spectrum_new (&series, 6, &status));
  g_assert_cmpint (status, ==, ANT_NO_DATA);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/noise/spectrum/expectation-equals-direct-sums", test_expectation_equals_direct_sums);
  g_test_add_func ("/noise/spectrum/bins-average-their-ordinates", test_bins_average_their_ordinates);
  g_test_add_func ("/noise/spectrum/expectation-is-the-mean-of-draws", test_expectation_is_the_mean_of_draws);
  g_test_add_func ("/noise/spectrum/ordinates-give-the-scatter-of-white-noise",
                   test_ordinates_give_the_scatter_of_white_noise);
  g_test_add_func ("/noise/spectrum/power-sums-to-mean-square", test_power_sums_to_mean_square);
  g_test_add_func ("/noise/spectrum/white-level-is-twice-variance-times-step",
                   test_white_level_is_twice_variance_times_step);
  g_test_add_func ("/noise/spectrum/taper-is-hann", test_taper_is_hann);
  g_test_add_func ("/noise/spectrum/power-beyond-nyquist-is-folded", test_power_beyond_nyquist_is_folded);
  g_test_add_func ("/noise/spectrum/unmasking-compares-with-the-models-spectrum",
                   test_unmasking_compares_with_the_models_spectrum);
  g_test_add_func ("/noise/spectrum/spikes-count-as-gaps", test_spikes_count_as_gaps);
  g_test_add_func ("/noise/spectrum/stated-errors-enter-as-their-mean-variance",
                   test_stated_errors_enter_as_their_mean_variance);
  g_test_add_func ("/noise/spectrum/too-few-samples-are-refused", test_too_few_samples_are_refused);
  return g_test_run ();
}
