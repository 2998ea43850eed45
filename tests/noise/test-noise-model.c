/* test-noise-model.c - the laws that tie spectra, covariances, priors and names of the noise model together. */
#include "noise/noise-model.h"
#include <glib.h>
#include <math.h>
#include "core/units.h"

static AntNoisePart
oscillator (double rms_ppm, double time_d, double quality)
{
  return (AntNoisePart){ .kind = ANT_OSCILLATOR, .rms_ppm = rms_ppm, .time_d = time_d, .quality = quality };
}

static AntNoisePart
exponential (double rms_ppm, double time_d)
{
  return (AntNoisePart){ .kind = ANT_EXPONENTIAL, .rms_ppm = rms_ppm, .time_d = time_d };
}

static void
assert_near (double got, double want, double relative)
{
  g_assert_cmpfloat_with_epsilon (got, want, relative * fabs (want));
}

static const AntNoisePart samples[] = {
  { .kind = ANT_OSCILLATOR, .rms_ppm = 40, .time_d = 0.02, .quality = 0.70710678118654752 },
  { .kind = ANT_OSCILLATOR, .rms_ppm = 3, .time_d = 0.004, .quality = 4 },
  { .kind = ANT_OSCILLATOR, .rms_ppm = 300, .time_d = 20, .quality = 0.51 },
  { .kind = ANT_OSCILLATOR, .rms_ppm = 15, .time_d = 0.0667, .quality = 30 },
  { .kind = ANT_EXPONENTIAL, .rms_ppm = 25, .time_d = 0.3 },
};

/* Trapezoid in ln f over 17 decades, which converges faster than any power of the step for such smooth functions. */
static void
test_power_integrates_to_variance (void)
{
  for (gsize i = 0; i < G_N_ELEMENTS (samples); i++)
    {
      double sum = 0, step = 1e-3;
      for (double x = -20; x < 20; x += step)
        {
          double f_cd = exp (x) / samples[i].time_d;
          sum += ant_noise_part_psd (&samples[i], f_cd) * f_cd * step;
        }
      assert_near (sum, samples[i].rms_ppm * samples[i].rms_ppm, 1e-7);
    }
}

/* S(f) = 4 times the integral of R(t) cos(2 pi f t) over t > 0 (Wiener-Khinchin), by Simpson's rule. */
static void
test_power_is_cosine_transform_of_covariance (void)
{
  for (gsize i = 0; i < G_N_ELEMENTS (samples); i++)
    for (double scaled = 0.2; scaled < 5; scaled *= 1.7)
      {
        double f_cd = scaled / samples[i].time_d;
        double end = samples[i].time_d * (samples[i].quality > 10 ? 300 : 40);
        int steps = 400000;
        double sum = 0;
        for (int j = 0; j <= steps; j++)
          {
            double t = end * j / steps;
            double weight = j == 0 || j == steps ? 1 : j % 2 ? 4 : 2;
            sum += weight * ant_noise_part_covariance (&samples[i], t) * cos (ANT_TAU * f_cd * t);
          }
        assert_near (4 * sum * end / steps / 3, ant_noise_part_psd (&samples[i], f_cd), 1e-7);
      }
}

static void
test_covariance_is_even_and_starts_at_variance (void)
{
  for (gsize i = 0; i < G_N_ELEMENTS (samples); i++)
    {
      assert_near (ant_noise_part_covariance (&samples[i], 0), samples[i].rms_ppm * samples[i].rms_ppm, 1e-14);
      g_assert_cmpfloat (ant_noise_part_covariance (&samples[i], 0.01), ==,
                         ant_noise_part_covariance (&samples[i], -0.01));
    }
}

/* Harvey's law with exponent 4 as written by Kallinger et al. 2014, A&A 570, A41 (from memory), for two granulation
 * parts of 25.34 ppm at 769.7 and 2746.9 uHz, in ppm^2/uHz. */
static void
test_quality_of_harvey_gives_exponent_four (void)
{
  double rms_ppm = 25.34;
  double corner_uhz[] = { 769.7, 2746.9 };
  for (int i = 0; i < 2; i++)
    for (double uhz = 1; uhz < 1e4; uhz *= 2)
      {
        double per_day = ANT_SECONDS_PER_DAY * 1e-6; /* cycles/day in a uHz */
        AntNoisePart part = oscillator (rms_ppm, 1 / (corner_uhz[i] * per_day), sqrt (0.5));
        double want = 2 * sqrt (2) / ANT_PI * rms_ppm * rms_ppm / corner_uhz[i] / (1 + pow (uhz / corner_uhz[i], 4));
        assert_near (ant_noise_part_psd (&part, uhz * per_day) * per_day, want, 1e-12);
      }
}

/* Harvey 1985: 4 sigma^2 tau / (1 + (2 pi nu tau)^2). */
static void
test_exponential_gives_exponent_two (void)
{
  AntNoisePart part = exponential (10, 0.25);
  assert_near (ant_noise_part_psd (&part, 0), 100, 1e-14);
  assert_near (ant_noise_part_psd (&part, 1 / (ANT_TAU * 0.25)), 50, 1e-14);
}

/* 25 ppm every 60 s is 0.075 ppm^2/uHz. */
static void
test_white_level_is_twice_variance_times_step (void)
{
  double per_day = ANT_SECONDS_PER_DAY * 1e-6;
  assert_near (ant_noise_white_psd (625, 60 / ANT_SECONDS_PER_DAY) * per_day, 0.075, 1e-12);
}

static void
test_low_quality_is_refused (void)
{
  AntNoiseModel model = { .n_parts = 1, .part = { oscillator (1, 1, 0.5) }, .error_scale = 1 };
  g_assert_cmpint (ant_noise_model_check (&model), ==, ANT_BAD_ARGUMENT);
  g_assert_true (isnan (ant_noise_model_psd (&model, 1)));
  g_assert_true (isnan (ant_noise_model_covariance (&model, 1)));
  model.part[0].quality = 0.6;
  g_assert_cmpint (ant_noise_model_check (&model), ==, ANT_OK);
  model.part[0].time_d = 0;
  g_assert_cmpint (ant_noise_model_check (&model), ==, ANT_BAD_ARGUMENT);
}

static gboolean
has_part (const AntNoiseModel *model, AntPartKind kind, double time_d)
{
  for (size_t i = 0; i < model->n_parts; i++)
    if (model->part[i].kind == kind && fabs (log (model->part[i].time_d / time_d)) < 0.1)
      return TRUE;
  return FALSE;
}

static void
test_bank_follows_cadence (void)
{
  AntNoiseModel model;
  double minute = 1 / ANT_MINUTES_PER_DAY;
  ant_noise_model_default (&model, minute, 500, 15, 0, 0, NULL);
  g_assert_cmpuint (model.n_parts, ==, 7);
  g_assert_true (has_part (&model, ANT_OSCILLATOR, ANT_TAU * 280 / ANT_SECONDS_PER_DAY));
  g_assert_true (has_part (&model, ANT_OSCILLATOR, 1 / (3.1e-3 * ANT_SECONDS_PER_DAY)));
  ant_noise_model_default (&model, 60 * minute, 500, 15, 0, 0, NULL);
  g_assert_cmpuint (model.n_parts, ==, 4);
  g_assert_true (has_part (&model, ANT_OSCILLATOR, ANT_TAU * 3 / 24));
  g_assert_false (has_part (&model, ANT_EXPONENTIAL, 25 * minute));
  ant_noise_model_default (&model, 1, 500, 15, 0, 0, NULL);
  g_assert_cmpuint (model.n_parts, ==, 3);
  g_assert_true (has_part (&model, ANT_OSCILLATOR, 20));
  g_assert_true (has_part (&model, ANT_OSCILLATOR, 5));
  g_assert_true (has_part (&model, ANT_EXPONENTIAL, 3));
}

static void
test_bank_starts_between_white_and_scatter (void)
{
  AntNoiseModel model;
  ant_noise_model_default (&model, 1 / ANT_MINUTES_PER_DAY, 1000, 10, 1, 0, NULL);
  double variance = 0;
  for (size_t i = 0; i < model.n_parts; i++)
    {
      g_assert_cmpfloat (model.part[i].rms_ppm, <=, 1000);
      g_assert_cmpfloat (model.part[i].rms_ppm, >=, 1);
      if (model.part[i].time_d > 0.5) /* slow parts are expected to be smaller than they start */
        g_assert_cmpfloat (model.part[i].rms_prior_ppm, <=, model.part[i].rms_ppm);
      else
        g_assert_cmpfloat (model.part[i].rms_prior_ppm, ==, model.part[i].rms_ppm);
      variance += model.part[i].rms_ppm * model.part[i].rms_ppm;
    }
  g_assert_cmpfloat (variance, <, 1.2e6);
  g_assert_cmpfloat (variance, >, 0.3e6);
  g_assert_cmpfloat (model.error_scale_width_ln, >, 0);
  ant_noise_model_default (&model, 1, 0, 0, 0, 0, NULL);
  g_assert_cmpint (ant_noise_model_check (&model), ==, ANT_OK);
  double theta[2 * ANT_MAX_PARTS + 2];
  size_t n = ant_noise_model_get (&model, theta);
  for (size_t i = 0; i < n; i++)
    g_assert_true (isfinite (theta[i]));
}

static void
test_bank_expects_small_parts_of_a_white_record (void)
{
  AntNoiseModel coloured, white;
  ant_noise_model_default (&coloured, 1 / ANT_MINUTES_PER_DAY, 100, 10, 0, 0, NULL);
  ant_noise_model_default (&white, 1 / ANT_MINUTES_PER_DAY, 100, 98, 0, 0, NULL);
  g_assert_cmpuint (white.n_parts, ==, coloured.n_parts);
  for (size_t i = 0; i < white.n_parts; i++)
    {
      g_assert_cmpfloat (white.part[i].rms_prior_ppm, <, 10);
      g_assert_cmpfloat (white.part[i].rms_prior_ppm, >, 0);
    }
}

static void
test_lines_keep_their_period (void)
{
  AntNoiseModel model;
  AntNoiseLine line = { .period_d = 96 / ANT_MINUTES_PER_DAY, .harmonics = 4 };
  ant_noise_model_default (&model, 1 / ANT_MINUTES_PER_DAY, 100, 10, 0, 1, &line);
  g_assert_cmpuint (model.n_parts, ==, 11);
  for (int h = 1; h <= 4; h++)
    {
      const AntNoisePart *part = &model.part[6 + h];
      g_assert_cmpfloat (part->time_d, ==, line.period_d / h);
      g_assert_cmpfloat (part->time_width_ln, ==, 0);
      g_assert_cmpfloat (part->quality, ==, 30);
      g_assert_cmpstr (ant_noise_part_role (part), ==, "line");
    }
  /* Beyond the Nyquist frequency a harmonic says nothing that a lower one would not. */
  ant_noise_model_default (&model, 30 / ANT_MINUTES_PER_DAY, 100, 10, 0, 1, &line);
  g_assert_cmpuint (model.n_parts, ==, 5);
  line.harmonics = 100;
  ant_noise_model_default (&model, 0.1 / ANT_MINUTES_PER_DAY, 100, 10, 0, 1, &line);
  g_assert_cmpuint (model.n_parts, ==, ANT_MAX_PARTS);
}

static void
test_roles_follow_power (void)
{
  const struct
  {
    AntNoisePart part;
    const char *role;
  } table[] = {
    { oscillator (1, 20, 0.71), "rotation" },
    { oscillator (1, 7, 0.71), "days" },
    { exponential (1, 8.0 / 24), "days" },
    { exponential (1, 2), "rotation" },
    { oscillator (1, 3.0 / 24, 0.71), "hours" },
    { oscillator (1, 29.0 / 1440, 0.71), "granulation" },
    { oscillator (1, 1.0 / 1440, 0.71), "granulation" },
    { oscillator (1, 5.4 / 1440, 4), "oscillations" },
    { oscillator (1, 5.4 / 1440, 0.71), "granulation" },
    { oscillator (1, 96.0 / 1440, 30), "line" },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (table); i++)
    g_assert_cmpstr (ant_noise_part_role (&table[i].part), ==, table[i].role);
}

static void
test_parameters_return_as_they_went (void)
{
  AntNoiseModel model, before;
  double theta[2 * ANT_MAX_PARTS + 2];
  ant_noise_model_default (&model, 1 / ANT_MINUTES_PER_DAY, 300, 12, 1, 0, NULL);
  size_t n = ant_noise_model_get (&model, NULL);
  g_assert_cmpuint (n, ==, 7 + 6 + 2); /* the oscillations' frequency is held */
  g_assert_cmpuint (ant_noise_model_get (&model, theta), ==, n);
  before = model;
  for (size_t i = 0; i < n; i++)
    theta[i] += 0.1 * (double) i;
  ant_noise_model_set (&model, theta);
  assert_near (model.part[0].rms_ppm, before.part[0].rms_ppm, 1e-14);
  assert_near (model.part[0].time_d, before.part[0].time_d * exp (0.1), 1e-14);
  assert_near (model.error_scale, exp (1.4), 1e-14);
  g_assert_cmpfloat (model.part[6].time_d, ==, before.part[6].time_d);
}

static void
test_penalty_is_half_square_of_prior_widths (void)
{
  AntNoiseModel model;
  ant_noise_model_default (&model, 1, 300, 12, 1, 0, NULL);
  for (size_t i = 0; i < model.n_parts; i++)
    model.part[i].rms_ppm = model.part[i].rms_prior_ppm;
  g_assert_cmpfloat (ant_noise_model_penalty (&model), ==, 0);
  model.part[0].rms_ppm *= exp (2);
  model.part[0].time_d *= exp (-1);
  model.error_scale = exp (0.5);
  assert_near (ant_noise_model_penalty (&model), 0.5 + 2 + 0.5, 1e-12);
  ant_noise_model_centre_priors (&model, 0.7);
  assert_near (ant_noise_model_penalty (&model), 0.5 * (0.5 / 0.7) * (0.5 / 0.7), 1e-12);
}

static void
test_parameter_names_are_distinct (void)
{
  AntNoiseModel model;
  char text[40], other[40];
  ant_noise_model_default (&model, 1 / ANT_MINUTES_PER_DAY, 300, 12, 1, 0, NULL);
  size_t n = ant_noise_model_get (&model, NULL);
  ant_noise_model_parameter_name (&model, 0, sizeof text, text);
  g_assert_cmpstr (text, ==, "rotation.rms");
  ant_noise_model_parameter_name (&model, n - 2, sizeof text, text);
  g_assert_cmpstr (text, ==, "white");
  for (size_t i = 0; i < n; i++)
    for (size_t j = 0; j < i; j++)
      {
        ant_noise_model_parameter_name (&model, i, sizeof text, text);
        ant_noise_model_parameter_name (&model, j, sizeof other, other);
        g_assert_cmpstr (text, !=, other);
      }
  ant_noise_model_parameter_name (&model, n, sizeof text, text);
  g_assert_cmpstr (text, ==, "");
}

static void
test_measurement_variance_adds_stated_errors (void)
{
  AntNoiseModel model = { .white_ppm = 6, .error_scale = 2 };
  assert_near (ant_noise_model_variance (&model, 0, 1), 36, 1e-14);
  assert_near (ant_noise_model_variance (&model, 5, 4), 9 + 100, 1e-14);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/noise/noise-model/power-integrates-to-variance", test_power_integrates_to_variance);
  g_test_add_func ("/noise/noise-model/power-is-cosine-transform-of-covariance",
                   test_power_is_cosine_transform_of_covariance);
  g_test_add_func ("/noise/noise-model/covariance-is-even-and-starts-at-variance",
                   test_covariance_is_even_and_starts_at_variance);
  g_test_add_func ("/noise/noise-model/quality-of-harvey-gives-exponent-four",
                   test_quality_of_harvey_gives_exponent_four);
  g_test_add_func ("/noise/noise-model/exponential-gives-exponent-two", test_exponential_gives_exponent_two);
  g_test_add_func ("/noise/noise-model/white-level-is-twice-variance-times-step",
                   test_white_level_is_twice_variance_times_step);
  g_test_add_func ("/noise/noise-model/low-quality-is-refused", test_low_quality_is_refused);
  g_test_add_func ("/noise/noise-model/bank-follows-cadence", test_bank_follows_cadence);
  g_test_add_func ("/noise/noise-model/bank-starts-between-white-and-scatter",
                   test_bank_starts_between_white_and_scatter);
  g_test_add_func ("/noise/noise-model/bank-expects-small-parts-of-a-white-record",
                   test_bank_expects_small_parts_of_a_white_record);
  g_test_add_func ("/noise/noise-model/lines-keep-their-period", test_lines_keep_their_period);
  g_test_add_func ("/noise/noise-model/roles-follow-power", test_roles_follow_power);
  g_test_add_func ("/noise/noise-model/parameters-return-as-they-went", test_parameters_return_as_they_went);
  g_test_add_func ("/noise/noise-model/penalty-is-half-square-of-prior-widths",
                   test_penalty_is_half_square_of_prior_widths);
  g_test_add_func ("/noise/noise-model/parameter-names-are-distinct", test_parameter_names_are_distinct);
  g_test_add_func ("/noise/noise-model/measurement-variance-adds-stated-errors",
                   test_measurement_variance_adds_stated_errors);
  return g_test_run ();
}
