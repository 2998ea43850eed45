/* test-whittle.c - the spectral fit finds the spectrum that made a record, through the gaps of a low orbit. */
#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "masks.h"
#include "noise/spectrum-private.h"
#include "noise/surrogate.h"

#define STEP_D (1 / 1440.0)
#define HOUR_D (1 / 24.0)
#define SECOND_D (1 / 86400.0)
#define HARVEY 0.70710678118654752

/* Granulation-like noise of 40 ppm with time scale 250 s, 40 ppm about 3 h shared by an oscillator and an exponential,
 * the 5-minute oscillations, and 10 ppm of white noise. */
static AntNoiseModel
true_model (void)
{
  return (AntNoiseModel){
    .n_parts = 4,
    .part = {
      { .kind = ANT_OSCILLATOR, .rms_ppm = 40, .time_d = ANT_TAU * 250 * SECOND_D, .quality = HARVEY },
      { .kind = ANT_OSCILLATOR, .rms_ppm = 28, .time_d = ANT_TAU * 3 * HOUR_D, .quality = HARVEY },
      { .kind = ANT_EXPONENTIAL, .rms_ppm = 28, .time_d = 3 * HOUR_D },
      { .kind = ANT_OSCILLATOR, .rms_ppm = 3, .time_d = SECOND_D / 3.1e-3, .quality = 4 },
    },
    .white_ppm = 10,
    .error_scale = 1,
  };
}

static AntSeries
draw (const AntNoiseModel *model, AntMask mask, size_t n, guint64 seed, float *value)
{
  AntRandom random;
  g_autofree unsigned char *seen = g_new (unsigned char, n);
  ant_random_seed (&random, seed, 1);
  ant_mask_make (mask, n, STEP_D, &random, seen);
  for (size_t i = 0; i < n; i++)
    value[i] = seen[i] ? 0 : NAN;
  AntSeries series = { .n = n, .step_d = STEP_D, .value_ppm = value };
  g_assert_cmpint (ant_surrogate_draw (model, &series, &random, value), ==, ANT_OK);
  return series;
}

/* A start as a program would make it: from the scatter of the values and of their neighbouring differences. */
static AntNoiseModel
default_model (const AntSeries *series, gsize n_lines, const AntNoiseLine *lines)
{
  double squares = 0, differences = 0, count = 0, pairs = 0;
  for (size_t i = 0; i < series->n; i++)
    if (!isnan (series->value_ppm[i]))
      {
        squares += pow ((double) series->value_ppm[i], 2);
        count++;
        if (i && !isnan (series->value_ppm[i - 1]))
          {
            differences += pow ((double) (series->value_ppm[i] - series->value_ppm[i - 1]), 2);
            pairs++;
          }
      }
  AntNoiseModel model;
  ant_noise_model_default (&model, series->step_d, sqrt (squares / count), sqrt (differences / pairs / 2), 0, n_lines,
                           lines);
  return model;
}

static double
level (const AntNoiseModel *model, double hertz)
{
  return ant_noise_model_psd (model, hertz * ANT_SECONDS_PER_DAY)
         + ant_noise_white_psd (ant_noise_model_variance (model, 0, 1), STEP_D);
}

/* The worst |fit/truth - 1| over a band, 20 frequencies to the octave. */
static double
worst_error (const AntNoiseModel *fit, const AntNoiseModel *truth, double low_hz, double high_hz)
{
  double worst = 0;
  for (double f = low_hz; f < high_hz; f *= exp2 (0.05))
    worst = fmax (worst, fabs (level (fit, f) / level (truth, f) - 1));
  return worst;
}

static AntSpectrum *
spectrum_of (const AntSeries *series)
{
  AntStatus status;
  AntSpectrum *spectrum = ant_spectrum_new (series, 6, &status);
  g_assert_cmpint (status, ==, ANT_OK);
  return spectrum;
}

static void
fit_drawn (const AntNoiseModel *truth, AntMask mask, guint64 seed, double low_hz)
{
  enum { n = 43200 };
  g_autofree float *value = g_new (float, n);
  AntSeries series = draw (truth, mask, n, seed, value);
  AntNoiseModel fit = default_model (&series, 0, NULL);
  AntSpectrum *spectrum = spectrum_of (&series);
  g_assert_cmpint (ant_spectrum_whittle_fit (spectrum, &fit), ==, ANT_OK);
  double worst = worst_error (&fit, truth, low_hz, 8e-3);
  g_test_message ("worst %.3f, white %.2f ppm", worst, fit.white_ppm);
  g_assert_cmpfloat (worst, <, 0.25);
  ant_spectrum_free (spectrum);
}

static void
test_low_orbit_record_gives_back_its_spectrum (void)
{
  AntNoiseModel truth = true_model ();
  fit_drawn (&truth, ANT_MASK_LOW_ORBIT, 101, 1e-5);
}

static void
test_nearly_whole_record_gives_back_its_spectrum (void)
{
  AntNoiseModel truth = true_model ();
  fit_drawn (&truth, ANT_MASK_L1, 102, 1e-5);
}

/* Rotation of 1000 ppm leaks through the gaps into every bin of the values; the differences keep it out. */
static void
test_rotation_does_not_drown_the_fast_end (void)
{
  AntNoiseModel truth = true_model ();
  truth.part[truth.n_parts++] = (AntNoisePart){ ANT_OSCILLATOR, 1000, 27, HARVEY };
  fit_drawn (&truth, ANT_MASK_LOW_ORBIT, 107, 1e-4);
  fit_drawn (&truth, ANT_MASK_L1, 108, 1e-4);
}

/* Data that are exactly the expectation leave only the error of the hats, which interpolate f^-4 by straight lines. */
static void
test_exact_expectation_gives_back_the_model (void)
{
  enum { n = 43200 };
  g_autofree float *value = g_new (float, n);
  AntNoiseModel truth = true_model ();
  AntSeries series = draw (&truth, ANT_MASK_LOW_ORBIT, n, 103, value);
  AntSpectrum *spectrum = spectrum_of (&series);
  ant_spectrum_expected (spectrum, &truth, spectrum->power);
  AntNoiseModel fit = truth;
  for (size_t p = 0; p < fit.n_parts; p++)
    {
      fit.part[p].rms_ppm *= p % 2 ? 2 : 0.6;
      fit.part[p].rms_prior_ppm = fit.part[p].rms_ppm;
      fit.part[p].rms_width_ln = 5;
      fit.part[p].time_d *= p % 2 ? 0.6 : 1.5;
      fit.part[p].time_prior_d = fit.part[p].time_d;
      fit.part[p].time_width_ln = 5;
    }
  fit.part[3].time_d = truth.part[3].time_d;
  fit.part[3].time_width_ln = 0;
  fit.white_ppm = fit.white_prior_ppm = 20;
  fit.white_width_ln = 5;
  g_assert_cmpint (ant_spectrum_whittle_fit (spectrum, &fit), ==, ANT_OK);
  double worst = worst_error (&fit, &truth, 3e-6, 8e-3);
  g_test_message ("worst %.4f", worst);
  g_assert_cmpfloat (worst, <, 0.05);
  ant_spectrum_free (spectrum);
}

/* A line of quality 30 is far narrower than the hats. */
static void
test_line_gets_its_amplitude (void)
{
  enum { n = 43200 };
  g_autofree float *value = g_new (float, n);
  AntNoiseModel truth = true_model ();
  AntNoiseLine line = { .period_d = 96 / 1440.0, .harmonics = 2 };
  truth.part[4] = (AntNoisePart){ .kind = ANT_OSCILLATOR, .rms_ppm = 60, .time_d = line.period_d, .quality = 30 };
  truth.n_parts = 5;
  AntSeries series = draw (&truth, ANT_MASK_L1, n, 104, value);
  AntNoiseModel fit = default_model (&series, 1, &line);
  AntSpectrum *spectrum = spectrum_of (&series);
  g_assert_cmpint (ant_spectrum_whittle_fit (spectrum, &fit), ==, ANT_OK);
  const AntNoisePart *first = &fit.part[fit.n_parts - 2], *second = &fit.part[fit.n_parts - 1];
  g_assert_cmpstr (ant_noise_part_role (first), ==, "line");
  /* About 450 orbits / (30/pi) independent swings: 10 % in the rms is two sigma. */
  g_assert_cmpfloat_with_epsilon (first->rms_ppm, 60, 9);
  g_assert_cmpfloat (second->rms_ppm, <, 15);
  g_assert_cmpfloat (first->time_d, ==, line.period_d);
  ant_spectrum_free (spectrum);
}

static void
test_held_parameters_stay (void)
{
  enum { n = 4320 };
  g_autofree float *value = g_new (float, n);
  AntNoiseModel truth = true_model ();
  AntSeries series = draw (&truth, ANT_MASK_L1, n, 105, value);
  AntSpectrum *spectrum = spectrum_of (&series);
  AntNoiseModel fit = truth;
  fit.part[0].rms_prior_ppm = 40;
  fit.part[0].rms_width_ln = 1;
  g_assert_cmpint (ant_spectrum_whittle_fit (spectrum, &fit), ==, ANT_OK);
  g_assert_cmpfloat (fit.part[0].rms_ppm, !=, 40);
  g_assert_cmpfloat (fit.part[0].time_d, ==, truth.part[0].time_d);
  g_assert_cmpfloat (fit.part[1].rms_ppm, ==, 28);
  g_assert_cmpfloat (fit.white_ppm, ==, 10);
  ant_spectrum_free (spectrum);
}

/* 90 d at 60 s. The bar leaves a loaded machine room; the method page has the time of an idle one. */
static void
test_ninety_days_take_seconds (void)
{
  enum { n = 129600 };
  g_autofree float *value = g_new (float, n);
  AntNoiseModel truth = true_model ();
  AntSeries series = draw (&truth, ANT_MASK_LOW_ORBIT, n, 106, value);
  AntNoiseModel fit = default_model (&series, 0, NULL);
  g_test_timer_start ();
  AntSpectrum *spectrum = spectrum_of (&series);
  g_assert_cmpint (ant_spectrum_whittle_fit (spectrum, &fit), ==, ANT_OK);
  double seconds = g_test_timer_elapsed ();
  g_test_message ("90 d: %.2f s", seconds);
  g_assert_cmpfloat (worst_error (&fit, &truth, 1e-5, 8e-3), <, 0.25);
  g_assert_cmpfloat (seconds, <, 20);
  ant_spectrum_free (spectrum);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/noise/whittle/low-orbit-record-gives-back-its-spectrum",
                   test_low_orbit_record_gives_back_its_spectrum);
  g_test_add_func ("/noise/whittle/nearly-whole-record-gives-back-its-spectrum",
                   test_nearly_whole_record_gives_back_its_spectrum);
  g_test_add_func ("/noise/whittle/rotation-does-not-drown-the-fast-end", test_rotation_does_not_drown_the_fast_end);
  g_test_add_func ("/noise/whittle/exact-expectation-gives-back-the-model",
                   test_exact_expectation_gives_back_the_model);
  g_test_add_func ("/noise/whittle/line-gets-its-amplitude", test_line_gets_its_amplitude);
  g_test_add_func ("/noise/whittle/held-parameters-stay", test_held_parameters_stay);
  g_test_add_func ("/noise/whittle/ninety-days-take-seconds", test_ninety_days_take_seconds);
  return g_test_run ();
}
