/* test-false-alarm.c - the law of chance: its shape, its inverse, and its crossings against counting them in noise. */
#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "models.h"
#include "planting.h"
#include "noise/surrogate.h"
#include "search/crossing-shape.h"
#include "search/false-alarm.h"

#define STEP_D (300 / ANT_SECONDS_PER_DAY)
#define N 2880 /* ten days */
#define DRAWS 60
#define T14_H 4.0
#define EDGE_H 1.0

static const AntChanceField fields[] = { { 800, 4 }, { 5e4, 30 }, { 4e6, 3000 } };

static void
fewer_are_expected_at_every_higher_snr (void)
{
  for (size_t k = 0; k < G_N_ELEMENTS (fields); k++)
    {
      AntChanceLaw law;
      ant_chance_law_init (&law, &fields[k], 30);
      double before = HUGE_VAL;
      for (double snr = 2.5; snr < 12; snr += 0.05)
        {
          double expected = ant_chance_law_expected (&law, snr);
          g_assert_cmpfloat (expected, <, before);
          g_assert_cmpfloat (expected, >, 0);
          before = expected;
        }
    }
}

static void
the_threshold_is_where_so_many_are_expected (void)
{
  for (size_t k = 0; k < G_N_ELEMENTS (fields); k++)
    for (double number = 1e-4; number < 20; number *= 3)
      {
        AntChanceLaw law;
        ant_chance_law_init (&law, &fields[k], 30);
        double snr = ant_chance_law_threshold (&law, number);
        if (snr > 3 + 1e-9)
          g_assert_cmpfloat_with_epsilon (ant_chance_law_expected (&law, snr) / number, 1, 1e-6);
        else
          g_assert_cmpfloat (ant_chance_law_expected (&law, 3), <=, number * (1 + 1e-6));
      }
}

static void
thresholds_stay_within_3_and_40 (void)
{
  AntChanceLaw law;
  ant_chance_law_init (&law, &fields[0], 30);
  g_assert_cmpfloat_with_epsilon (ant_chance_law_threshold (&law, 1e9), 3, 1e-9);
  g_assert_cmpfloat (ant_chance_law_threshold (&law, 0), <=, 40);
  g_assert_cmpfloat (ant_chance_law_threshold (&law, 0), >, 35);
}

static void
twice_the_record_expects_twice_the_dips (void)
{
  AntChanceField one = fields[1], two = { 0 };
  AntChanceLaw law, of_two;
  ant_chance_field_add (&two, &one);
  ant_chance_field_add (&two, &one);
  g_assert_cmpfloat (two.observed_d, ==, 2 * one.observed_d);
  ant_chance_law_init (&law, &one, 30);
  of_two = law;
  of_two.field = two;
  g_assert_cmpfloat_with_epsilon (ant_chance_law_expected (&of_two, 5) / ant_chance_law_expected (&law, 5), 2, 1e-12);
}

/* --- crossings, counted --- */

typedef struct
{
  AntSeries series;
  AntNoiseModel model;
  AntWhitener *whitener;
  AntTemplateBank *bank;
  AntRefineOptions refine;
  float value[N];
} Fixture;

static void
set_up (Fixture *f, gconstpointer mask)
{
  AntStatus status;
  AntBankOptions options = ANT_BANK_OPTIONS_INIT;
  options.duration_min_h = options.duration_max_h = T14_H;
  options.edge_h = EDGE_H;
  options.sharp_edge_h = 0;
  ant_study_model ('A', &f->model);
  for (size_t i = 0; i < N; i++)
    f->value[i] = 0;
  f->series = (AntSeries){ .n = N, .step_d = STEP_D, .value_ppm = f->value };
  f->bank = ant_template_bank_new (&options, STEP_D, &status);
  f->whitener = ant_whitener_new (&f->model, &f->series, &status);
  f->refine = (AntRefineOptions){ .step_d = STEP_D, .exposure_d = STEP_D, .limb_darkening = ANT_LIMB_DARKENING_SUN,
                                  .shortest_d = T14_H / 24, .longest_d = T14_H / 24, .least_edge_d = EDGE_H / 24 };
}

static void
tear_down (Fixture *f, gconstpointer mask)
{
  ant_whitener_free (f->whitener);
  ant_template_bank_free (f->bank);
}

/* Upward passages through zero of the template's SNR at every place of [from, to). */
static size_t
count_crossings (const Fixture *f, const double *z, size_t from, size_t to)
{
  AntCrossingShape shape;
  size_t count = 0, n = 0;
  double before = 0, sample[100];
  ptrdiff_t first;
  ant_crossing_shape_init (&shape, T14_H / 24, EDGE_H / 24, ANT_SHAPE_IMPACT, ANT_LIMB_DARKENING_SUN);
  for (size_t place = from; place < to; place++)
    {
      double moment = 0; /* the sign of the SNR */
      n = ant_crossing_shape_sample (&shape, (double) place, STEP_D, STEP_D, -1, &first, 100, 1, sample);
      for (size_t j = 0; j < n; j++)
        moment += sample[j] * z[(size_t) first + j];
      count += place > from && before < 0 && moment >= 0;
      before = moment;
    }
  return count;
}

/* What a template does not share with one half an hour longer, by their correlation under the noise: the weight with which
 * the field counts it. */
static double
own_part (const Fixture *f)
{
  double energy[3], sample[3][100] = { { 0 } };
  for (int k = 0; k < 2; k++)
    {
      AntCrossingShape shape;
      ant_crossing_shape_init (&shape, (T14_H + 0.5 * k) / 24, EDGE_H / 24, ANT_SHAPE_IMPACT, ANT_LIMB_DARKENING_SUN);
      for (int j = 0; j < 100; j++)
        sample[k][j] = -ant_crossing_shape_mean (&shape, (j - 50) * STEP_D, STEP_D);
    }
  for (int j = 0; j < 100; j++)
    sample[2][j] = sample[0][j] + sample[1][j];
  for (int k = 0; k < 3; k++)
    energy[k] = shape_energy (f->whitener, N / 2, 100, sample[k]);
  return sqrt (2 - (energy[2] - energy[0] - energy[1]) / sqrt (energy[0] * energy[1]));
}

static void
crossings_are_those_that_noise_makes (Fixture *f, gconstpointer mask)
{
  AntChanceField field;
  AntRandom random;
  float *drawn = g_new (float, N);
  double *z = g_new (double, N), sum = 0, squares = 0;
  g_assert_cmpint (ant_chance_field_measure (&field, f->whitener, f->bank, &f->refine, 200, N - 200), ==, ANT_OK);
  ant_random_seed (&random, 7101, 1);
  for (int k = 0; k < DRAWS; k++)
    {
      g_assert_cmpint (ant_surrogate_draw (&f->model, &f->series, &random, drawn), ==, ANT_OK);
      g_assert_cmpint (ant_whitener_solve (f->whitener, drawn, z), ==, ANT_OK);
      double count = (double) count_crossings (f, z, 200, N - 200);
      sum += count / DRAWS;
      squares += count * count / DRAWS;
    }
  double counted = sum * own_part (f), error = sqrt ((squares - sum * sum) / DRAWS) * own_part (f);
  g_test_message ("crossings: %.2f by formula, %.2f +- %.2f counted", field.crossings, counted, error);
  g_assert_cmpfloat_with_epsilon (field.crossings, counted, 3 * error + 0.01 * counted);
  g_assert_cmpfloat_with_epsilon (field.observed_d, (N - 400) * STEP_D, 1e-9);
  g_free (drawn);
  g_free (z);
}

static void
time_without_data_counts_for_nothing (Fixture *f, gconstpointer mask)
{
  AntStatus status;
  AntChanceField whole, half;
  g_assert_cmpint (ant_chance_field_measure (&whole, f->whitener, f->bank, &f->refine, 0, N), ==, ANT_OK);
  for (size_t i = N / 2; i < N; i++)
    f->value[i] = NAN;
  AntWhitener *whitener = ant_whitener_new (&f->model, &f->series, &status);
  g_assert_cmpint (ant_chance_field_measure (&half, whitener, f->bank, &f->refine, 0, N), ==, ANT_OK);
  g_assert_cmpfloat_with_epsilon (half.observed_d / whole.observed_d, 0.5, 1e-12);
  g_assert_cmpfloat_with_epsilon (half.crossings / whole.crossings, 0.5, 0.05); /* one of 24 sampled epochs at most */
  ant_whitener_free (whitener);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, function) g_test_add_func ("/search/false-alarm/" path, function)
  TEST ("fewer-are-expected-at-every-higher-snr", fewer_are_expected_at_every_higher_snr);
  TEST ("the-threshold-is-where-so-many-are-expected", the_threshold_is_where_so_many_are_expected);
  TEST ("thresholds-stay-within-3-and-40", thresholds_stay_within_3_and_40);
  TEST ("twice-the-record-expects-twice-the-dips", twice_the_record_expects_twice_the_dips);
#define FIELD(path, function) g_test_add ("/search/false-alarm/" path, Fixture, NULL, set_up, function, tear_down)
  FIELD ("crossings-are-those-that-noise-makes", crossings_are_those_that_noise_makes);
  FIELD ("time-without-data-counts-for-nothing", time_without_data_counts_for_nothing);
  return g_test_run ();
}
