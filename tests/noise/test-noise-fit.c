/* test-noise-fit.c - the fit of a noise model: measurement variance, priors, and the minimiser by itself. */
#include <glib.h>
#include <math.h>
#include "models.h"
#include "noise/noise-fit.h"
#include "noise/spectrum.h"
#include "noise/surrogate.h"
#include "noise/whitener.h"

#define N 4000
#define STEP_D (120 / 86400.0)

/* White errors that differ from sample to sample by a factor of ten, s times as large as stated, over a floor r0. */
static AntSeries
heteroscedastic (double white_ppm, double scale, unsigned long seed, float *value, float *error)
{
  AntRandom random;
  ant_random_seed (&random, seed, 1);
  for (size_t i = 0; i < N; i++)
    {
      error[i] = (float) (4 * pow (10, ant_random_uniform (&random)));
      double sigma = sqrt (white_ppm * white_ppm + pow (scale * (double) error[i], 2));
      value[i] = (float) (sigma * ant_random_normal (&random));
    }
  return (AntSeries){ .n = N, .step_d = STEP_D, .value_ppm = value, .error_ppm = error };
}

static void
errors_stated_too_small_are_scaled_up (void)
{
  static const double scales[] = { 0.6, 1, 1.7 };
  for (size_t k = 0; k < G_N_ELEMENTS (scales); k++)
    {
      float value[N], error[N];
      AntNoiseModel model;
      AntFitOptions options = ANT_FIT_OPTIONS_INIT;
      AntSeries series = heteroscedastic (6, scales[k], 3100 + k, value, error);
      ant_noise_model_default (&model, STEP_D, 20, 20, 1, 0, NULL);
      AntStatus status = ant_noise_fit (&model, &series, &options, NULL);
      g_assert_true (status == ANT_OK || status == ANT_NOT_CONVERGED);
      g_test_message ("scale %.3f for %.1f, white %.2f for 6 ppm", model.error_scale, scales[k], model.white_ppm);
      /* s is known to about 1/sqrt(2 N), times 1.5 for what r0 takes of it */
      g_assert_cmpfloat_with_epsilon (model.error_scale / scales[k], 1, 3 * 1.5 / sqrt (2 * N));
    }
}

static void
without_stated_errors_there_is_no_scale (void)
{
  AntNoiseModel model;
  ant_noise_model_default (&model, STEP_D, 20, 20, 0, 0, NULL);
  g_assert_cmpfloat (model.error_scale_width_ln, ==, 0);
  g_assert_cmpfloat (model.error_scale, ==, 1);
}

/* Bins of n samples are known n times as well. */
static void
bins_of_many_samples_weigh_more (void)
{
  float value[N], count[N];
  AntRandom random;
  AntNoiseModel model;
  AntFitOptions options = ANT_FIT_OPTIONS_INIT;
  ant_random_seed (&random, 3201, 1);
  for (size_t i = 0; i < N; i++)
    {
      count[i] = (float) (1 + 8 * (i % 2));
      value[i] = (float) (60 / sqrt ((double) count[i]) * ant_random_normal (&random));
    }
  AntSeries series = { .n = N, .step_d = STEP_D, .value_ppm = value, .bin_count = count };
  ant_noise_model_default (&model, STEP_D, 45, 45, 0, 0, NULL);
  AntStatus status = ant_noise_fit (&model, &series, &options, NULL);
  g_assert_true (status == ANT_OK || status == ANT_NOT_CONVERGED);
  g_assert_cmpfloat_with_epsilon (model.white_ppm / 60, 1, 4 / sqrt (2 * N));
}

static double
posterior (const AntNoiseModel *model, const AntSeries *series)
{
  double log_likelihood;
  g_assert_cmpint (ant_noise_log_likelihood (model, series, &log_likelihood), ==, ANT_OK);
  return log_likelihood - ant_noise_model_penalty (model);
}

static void
a_fit_never_ends_below_its_start_and_reports_its_height (void)
{
  float value[N];
  AntSeries series = ant_study_record ('A', ANT_MASK_LOW_ORBIT, N, STEP_D, 3301, value);
  for (double rms_ppm = 5; rms_ppm < 2000; rms_ppm *= 6)
    {
      AntNoiseModel model;
      AntFitReport report;
      AntFitOptions options = ANT_FIT_OPTIONS_INIT;
      ant_noise_model_default (&model, STEP_D, rms_ppm, rms_ppm / 3, 0, 0, NULL);
      double start = posterior (&model, &series);
      AntStatus status = ant_noise_fit (&model, &series, &options, &report);
      g_assert_true (status == ANT_OK || status == ANT_NOT_CONVERGED);
      g_assert_cmpfloat (posterior (&model, &series), >=, start);
      g_assert_cmpfloat_with_epsilon (report.log_posterior, posterior (&model, &series), 1e-6 * fabs (start));
      g_assert_cmpuint (report.steps, <=, options.max_steps);
    }
}

/* A slow component of 20 d in a record of 5.6 d: its period is the prior's business, the white noise is not. */
static void
what_only_the_prior_decides_is_told (void)
{
  float value[N];
  char name[64];
  AntNoiseModel model;
  AntFitOptions options = ANT_FIT_OPTIONS_INIT;
  unsigned char unconstrained[ANT_MAX_FREE];
  AntSeries series = ant_study_record ('C', ANT_MASK_L1, N, STEP_D, 3401, value);
  ant_noise_model_default (&model, STEP_D, 100, 100, 0, 0, NULL);
  ant_noise_fit (&model, &series, &options, NULL);
  g_assert_cmpint (ant_noise_fit_unconstrained (&model, &series, unconstrained), ==, ANT_OK);
  size_t n = ant_noise_model_get (&model, NULL), white = n;
  for (size_t i = 0; i < n; i++)
    {
      ant_noise_model_parameter_name (&model, i, sizeof name, name);
      if (g_strcmp0 (name, "white") == 0)
        white = i;
    }
  g_assert_cmpuint (white, <, n);
  g_assert_cmpint (unconstrained[white], ==, 0);
  g_assert_cmpint (unconstrained[1], ==, 1); /* time of the slowest part */
}

static void
held_parameters_stay (void)
{
  float value[N];
  AntNoiseModel model;
  AntFitOptions options = ANT_FIT_OPTIONS_INIT;
  AntSeries series = ant_study_record ('C', ANT_MASK_L1, N, STEP_D, 3501, value);
  ant_noise_model_default (&model, STEP_D, 100, 100, 0, 1, &(AntNoiseLine){ 96 / 1440.0, 2 });
  model.part[1].rms_width_ln = 0;
  double rms_ppm = model.part[1].rms_ppm, line_d = model.part[model.n_parts - 1].time_d;
  ant_noise_fit (&model, &series, &options, NULL);
  g_assert_cmpfloat (model.part[1].rms_ppm, ==, rms_ppm);
  g_assert_cmpfloat (model.part[model.n_parts - 1].time_d, ==, line_d);
}

/* --- the minimiser --- */

/* Rosenbrock's banana in n dimensions (Rosenbrock 1960, Comput. J. 3, 175), least 0 at (1, ... 1); not defined left of -5. */
static void
banana (void *data, size_t n_points, const double *x, double *value)
{
  size_t n = *(size_t *) data;
  for (size_t p = 0; p < n_points; p++, x += n)
    {
      value[p] = x[0] < -5 ? HUGE_VAL : 0;
      for (size_t i = 0; i + 1 < n; i++)
        value[p] += 100 * pow (x[i + 1] - x[i] * x[i], 2) + pow (1 - x[i], 2);
    }
}

static void
the_minimiser_walks_a_curved_valley (void)
{
  for (size_t n = 2; n <= 6; n += 2)
    {
      double x[6] = { -1.2, 1, -1.2, 1, -1.2, 1 }, value;
      AntFitOptions options = { .max_steps = 400, .settled_lnl = 1e-12 };
      AntFitReport report;
      AntStatus status = ant_minimise (n, x, banana, &n, 0.5, 1e-7, &options, &report);
      banana (&n, 1, x, &value);
      g_test_message ("%zu dimensions: %zu steps, %zu evaluations, value %.2g", n, report.steps, report.evaluations, value);
      g_assert_true (status == ANT_OK || status == ANT_NOT_CONVERGED);
      g_assert_cmpfloat (value, <, 1e-4);
      for (size_t i = 0; i < n; i++)
        g_assert_cmpfloat_with_epsilon (x[i], 1, 0.02);
    }
}

static void
too_few_steps_leave_the_best_point_and_say_so (void)
{
  size_t n = 2;
  double x[2] = { -1.2, 1 }, start, value;
  AntFitOptions options = { .max_steps = 2, .settled_lnl = 1e-12 };
  banana (&n, 1, x, &start);
  g_assert_cmpint (ant_minimise (n, x, banana, &n, 0.5, 1e-7, &options, NULL), ==, ANT_NOT_CONVERGED);
  banana (&n, 1, x, &value);
  g_assert_cmpfloat (value, <, start);
}

/* The pace of a series is looked at by every pass over it. */
static void
a_wish_to_stop_ends_every_pass (void)
{
  float value[N], error[N];
  double log_likelihood[ANT_LANES], on_pace;
  AntStop stop = { 0 };
  AntPace pace = { &stop, 0 };
  AntNoiseModel model[2];
  AntFitOptions options = ANT_FIT_OPTIONS_INIT;
  AntSeries series = heteroscedastic (6, 1, 3200, value, error);
  AntStatus status;
  ant_noise_model_default (&model[0], STEP_D, 20, 20, 1, 0, NULL);
  model[1] = model[0];
  g_assert_cmpint (ant_noise_log_likelihood (model, &series, log_likelihood), ==, ANT_OK);
  series.pace = &pace;
  g_assert_cmpint (ant_noise_log_likelihood (model, &series, &on_pace), ==, ANT_OK);
  g_assert_cmpfloat (on_pace, ==, log_likelihood[0]);
  g_assert_cmpuint (ant_pace_passed (&pace), >=, N);
  AntSpectrum *spectrum = ant_spectrum_new (&series, 6, &status);
  options.stop = &stop;
  ant_stop_ask (&stop);
  g_assert_cmpint (ant_noise_log_likelihood (model, &series, log_likelihood), ==, ANT_STOPPED);
  g_assert_cmpint (ant_noise_log_likelihoods (2, model, &series, log_likelihood), ==, ANT_STOPPED);
  g_assert_null (ant_whitener_new_free_level (model, &series, &status));
  g_assert_cmpint (status, ==, ANT_STOPPED);
  g_assert_cmpint (ant_noise_fit (&model[1], &series, &options, NULL), ==, ANT_STOPPED);
  g_assert_cmpint (ant_spectrum_whittle_fit (spectrum, &model[1]), ==, ANT_STOPPED);
  g_assert_cmpmem (&model[0], sizeof model[0], &model[1], sizeof model[1]);
  ant_spectrum_free (spectrum);
}

/* A pace's guess is passed now and then: what is left shrinks and never ends. */
static void
the_part_told_rises_and_stays_below_the_whole (void)
{
  double before = 0;
  for (double passed = 1; passed < 1e6; passed *= 1.3)
    {
      double part = ant_pace_part (passed, 1000);
      g_assert_cmpfloat (part, >, before);
      g_assert_cmpfloat (part, <, 1);
      before = part;
    }
  g_assert_cmpfloat (ant_pace_part (500, 1000), ==, 0.5);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, function) g_test_add_func ("/noise/noise-fit/" path, function)
  TEST ("errors-stated-too-small-are-scaled-up", errors_stated_too_small_are_scaled_up);
  TEST ("without-stated-errors-there-is-no-scale", without_stated_errors_there_is_no_scale);
  TEST ("bins-of-many-samples-weigh-more", bins_of_many_samples_weigh_more);
  TEST ("a-fit-never-ends-below-its-start-and-reports-its-height", a_fit_never_ends_below_its_start_and_reports_its_height);
  TEST ("what-only-the-prior-decides-is-told", what_only_the_prior_decides_is_told);
  TEST ("a-wish-to-stop-ends-every-pass", a_wish_to_stop_ends_every_pass);
  TEST ("the-part-told-rises-and-stays-below-the-whole", the_part_told_rises_and_stays_below_the_whole);
  TEST ("held-parameters-stay", held_parameters_stay);
  TEST ("the-minimiser-walks-a-curved-valley", the_minimiser_walks_a_curved_valley);
  TEST ("too-few-steps-leave-the-best-point-and-say-so", too_few_steps_leave_the_best_point_and_say_so);
  return g_test_run ();
}
