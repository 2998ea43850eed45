/* test-noise-draw.c - drawn noise against the spectrum and the variances it was drawn from. */
#include <fftw3.h>
#include <glib.h>
#include <math.h>

#include "core/units.h"
#include "trials/noise-draw.h"

#define N 8192
#define RECORDS 60

/* One-sided spectrum of the continuous process at f cycles/day, written down anew: Harvey's law and the damped
 * oscillator. */
static double
slow_psd (const AntNoisePart *part, double f)
{
  double variance = part->rms_ppm * part->rms_ppm;
  if (part->kind == ANT_EXPONENTIAL)
    {
      double x = ANT_TAU * f * part->time_d;
      return 4 * variance * part->time_d / (1 + x * x);
    }
  double u = f * part->time_d, w0 = ANT_TAU / part->time_d;
  return 4 * variance / (part->quality * w0) / ((1 - u * u) * (1 - u * u) + u * u / (part->quality * part->quality));
}

/* What sampling makes of it: the exposure's boxcar, then every alias. */
static double
sampled_psd (const AntNoisePart *part, double f, double cadence_d, double exposure_d)
{
  double sum = 0;
  for (int m = -400; m <= 400; m++)
    {
      double g = fabs (f + m / cadence_d), a = ANT_PI * g * exposure_d;
      double boxcar = a > 1e-9 ? sin (a) / a : 1;
      sum += slow_psd (part, g) * boxcar * boxcar;
    }
  return sum;
}

/* Mean Hann periodogram of many records, one-sided, ppm^2 per cycle/day. */
static void
mean_periodogram (const AntNoisePart *part, double cadence_d, double exposure_d, double *power)
{
  double *value = fftw_alloc_real (N);
  fftw_complex *bin = fftw_alloc_complex (N / 2 + 1);
  fftw_plan plan = fftw_plan_dft_r2c_1d (N, value, bin, FFTW_ESTIMATE);
  for (int k = 0; k <= N / 2; k++)
    power[k] = 0;
  for (guint64 record = 0; record < RECORDS; record++)
    {
      AntRandom random;
      ant_random_seed (&random, 77, record);
      for (int i = 0; i < N; i++)
        value[i] = 0;
      ant_noise_part_draw (part, N, cadence_d, exposure_d, &random, value);
      for (int i = 0; i < N; i++)
        value[i] *= 1 - cos (ANT_TAU * i / N);
      fftw_execute (plan);
      for (int k = 0; k <= N / 2; k++)
        power[k] += 2 * cadence_d / (1.5 * N) * (bin[k][0] * bin[k][0] + bin[k][1] * bin[k][1]) / RECORDS;
    }
  fftw_destroy_plan (plan);
  fftw_free (bin);
  fftw_free (value);
}

static void
assert_spectrum (const AntNoisePart *part, double cadence_d, double exposure_d)
{
  g_autofree double *power = g_new (double, N / 2 + 1);
  mean_periodogram (part, cadence_d, exposure_d, power);
  for (int first = 16; first < N / 2; first *= 2)
    {
      int last = MIN (2 * first, N / 2);
      double ratio = 0;
      for (int k = first; k < last; k++)
        ratio += power[k] / sampled_psd (part, k / (N * cadence_d), cadence_d, exposure_d) / (last - first);
      /* Hann: ordinates have unit relative variance and 1.94 of them count as one (sum of squared correlations); the
       * curvature of a fourth-power law biases the first octave by up to 1 %. */
      double sigma = sqrt (1.94 / ((double) RECORDS * (last - first)));
      g_assert_cmpfloat (fabs (ratio - 1), <, 4 * sigma + 3.3 / (first * first));
    }
}

static AntNoisePart
oscillator (double rms_ppm, double period_s, double quality)
{
  return (AntNoisePart) { .kind = ANT_OSCILLATOR, .rms_ppm = rms_ppm, .time_d = period_s / 86400, .quality = quality };
}

static AntNoisePart
exponential (double rms_ppm, double time_s)
{
  return (AntNoisePart) { .kind = ANT_EXPONENTIAL, .rms_ppm = rms_ppm, .time_d = time_s / 86400 };
}

#define SECONDS(s) ((s) / 86400.0)

static void
granulation_has_its_spectrum (void)
{
  AntNoisePart part = oscillator (40, ANT_TAU * 250, sqrt (0.5));
  assert_spectrum (&part, SECONDS (60), 0);
  assert_spectrum (&part, SECONDS (60), SECONDS (60));
}

static void
oscillations_have_their_spectrum (void)
{
  AntNoisePart part = oscillator (11, 1 / 3.09e-3, 4);
  assert_spectrum (&part, SECONDS (60), 0);
  assert_spectrum (&part, SECONDS (60), SECONDS (60));
}

static void
a_heavily_damped_oscillator_has_its_spectrum (void)
{
  AntNoisePart part = oscillator (5, 600, 0.2);
  assert_spectrum (&part, SECONDS (60), SECONDS (30));
}

static void
an_exponential_has_its_spectrum (void)
{
  AntNoisePart part = exponential (50, 3600);
  assert_spectrum (&part, SECONDS (60), 0);
  assert_spectrum (&part, SECONDS (60), SECONDS (60));
  assert_spectrum (&part, SECONDS (600), SECONDS (131));
}

/* Mean square over many short records, each begun anew. */
static double
mean_square (const AntNoisePart *part, double cadence_d, double exposure_d, gsize n, guint64 records)
{
  g_autofree double *value = g_new (double, n);
  double sum = 0;
  for (guint64 record = 0; record < records; record++)
    {
      AntRandom random;
      ant_random_seed (&random, 5, record);
      for (gsize i = 0; i < n; i++)
        value[i] = 0;
      ant_noise_part_draw (part, n, cadence_d, exposure_d, &random, value);
      sum += value[n - 1] * value[n - 1];
    }
  return sum / (double) records;
}

static void
the_first_sample_is_as_stationary_as_the_last (void)
{
  AntNoisePart part = oscillator (7, 20 * 86400, sqrt (0.5));
  /* Relative error of a mean square of 20 000 normals: 1 %. */
  g_assert_cmpfloat_with_epsilon (mean_square (&part, SECONDS (60), 0, 1, 20000), 49, 4 * 0.49);
  g_assert_cmpfloat_with_epsilon (mean_square (&part, SECONDS (60), 0, 50, 20000), 49, 4 * 0.49);
}

static void
a_mean_over_an_exposure_has_the_closed_form_variance (void)
{
  /* Mean of an exponential process over T: variance 2 (tau/T - (tau/T)^2 (1 - exp (-T/tau))). */
  AntNoisePart part = exponential (10, 100);
  double r = 100.0 / 250;
  double expected = 100 * 2 * (r - r * r * (1 - exp (-1 / r)));
  g_assert_cmpfloat_with_epsilon (mean_square (&part, SECONDS (300), SECONDS (250), 3, 20000), expected,
                                  4 * 0.01 * expected);
}

static void
a_long_cadence_leaves_fast_noise_white (void)
{
  AntNoisePart part = oscillator (30, 300, 4);
  g_autofree double *value = g_new0 (double, 20000);
  AntRandom random;
  double square = 0, product = 0;
  ant_random_seed (&random, 9, 1);
  ant_noise_part_draw (&part, 20000, 1, 0, &random, value);
  for (int i = 1; i < 20000; i++)
    {
      square += value[i] * value[i];
      product += value[i] * value[i - 1];
    }
  g_assert_cmpfloat_with_epsilon (square / 20000, 900, 4 * 9);
  g_assert_cmpfloat_with_epsilon (product / square, 0, 4 / sqrt (20000));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/trials/noise-draw/granulation-has-its-spectrum", granulation_has_its_spectrum);
  g_test_add_func ("/trials/noise-draw/oscillations-have-their-spectrum", oscillations_have_their_spectrum);
  g_test_add_func ("/trials/noise-draw/a-heavily-damped-oscillator-has-its-spectrum",
                   a_heavily_damped_oscillator_has_its_spectrum);
  g_test_add_func ("/trials/noise-draw/an-exponential-has-its-spectrum", an_exponential_has_its_spectrum);
  g_test_add_func ("/trials/noise-draw/the-first-sample-is-as-stationary-as-the-last",
                   the_first_sample_is_as_stationary_as_the_last);
  g_test_add_func ("/trials/noise-draw/a-mean-over-an-exposure-has-the-closed-form-variance",
                   a_mean_over_an_exposure_has_the_closed_form_variance);
  g_test_add_func ("/trials/noise-draw/a-long-cadence-leaves-fast-noise-white", a_long_cadence_leaves_fast_noise_white);
  return g_test_run ();
}
