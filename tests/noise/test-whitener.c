/* test-whitener.c - the fast factor against dense algebra, through the gaps of a low orbit. */
#include <glib.h>
#include <math.h>
#include "core/dense.h"
#include "core/units.h"
#include "masks.h"
#include "noise/whitener-private.h"

#define N 2000

typedef struct
{
  AntNoiseModel model;
  AntSeries series;
  float value[N], error[N];
  unsigned char seen[N];
  size_t m, place[N];
  double *factor; /* [m*m] dense Cholesky */
  double log_det;
} Fixture;

static void
set_up (Fixture *f, gconstpointer data)
{
  AntRandom random;
  ant_random_seed (&random, 20260101, 1);
  ant_noise_model_default (&f->model, 1 / 1440.0, 400, 20, 1, 1, &(AntNoiseLine){ 96 / 1440.0, 2 });
  ant_mask_make (ANT_MASK_LOW_ORBIT, 300, 1 / 1440.0, &random, f->seen);
  ant_mask_make (ANT_MASK_LOW_ORBIT, N, 1 / 1440.0, &random, f->seen);
  for (size_t i = 0; i < N; i++)
    {
      f->value[i] = f->seen[i] ? (float) (100 * ant_random_normal (&random)) : NAN;
      f->error[i] = (float) (5 + 10 * ant_random_uniform (&random));
      if (f->seen[i])
        f->place[f->m++] = i;
    }
  f->series = (AntSeries){ .n = N, .step_d = 1 / 1440.0, .value_ppm = f->value, .error_ppm = f->error };
  f->factor = g_new (double, f->m * f->m);
  for (size_t i = 0; i < f->m; i++)
    for (size_t j = 0; j < f->m; j++)
      f->factor[i * f->m + j]
        = ant_noise_model_covariance (&f->model, fabs ((double) f->place[i] - (double) f->place[j]) / 1440)
          + (i == j ? ant_noise_model_variance (&f->model, (double) f->error[f->place[i]], 1) : 0);
  g_assert_cmpint (ant_cholesky (f->m, f->factor), ==, ANT_OK);
  f->log_det = ant_cholesky_log_det (f->m, f->factor);
}

static void
tear_down (Fixture *f, gconstpointer data)
{
  g_free (f->factor);
}

/* C^-1 of a vector on the grid, by dense algebra, at observed places. */
static double *
dense_solve (const Fixture *f, const double *on_grid)
{
  double *x = g_new (double, f->m);
  for (size_t i = 0; i < f->m; i++)
    x[i] = on_grid[f->place[i]];
  ant_cholesky_solve (f->m, f->factor, x, x);
  return x;
}

static void
solution_equals_dense (Fixture *f, gconstpointer data)
{
  AntStatus status;
  AntWhitener *whitener = ant_whitener_new (&f->model, &f->series, &status);
  g_assert_nonnull (whitener);
  double z[N], y[N], largest = 0, worst = 0;
  for (size_t i = 0; i < N; i++)
    y[i] = (double) f->value[i];
  g_assert_cmpint (ant_whitener_solve (whitener, f->value, z), ==, ANT_OK);
  double *truth = dense_solve (f, y);
  for (size_t i = 0; i < f->m; i++)
    {
      largest = fmax (largest, fabs (truth[i]));
      worst = fmax (worst, fabs (truth[i] - z[f->place[i]]));
    }
  g_test_message ("worst error of z %.2g of its largest", worst / largest);
  g_assert_cmpfloat (worst, <, 1e-9 * largest);
  for (size_t i = 0; i < N; i++)
    g_assert_true (f->seen[i] || z[i] == 0);
  g_free (truth);
  ant_whitener_free (whitener);
}

static void
likelihood_equals_dense (Fixture *f, gconstpointer data)
{
  double y[N], quadratic = 0, fast;
  for (size_t i = 0; i < N; i++)
    y[i] = (double) f->value[i];
  double *z = dense_solve (f, y);
  for (size_t i = 0; i < f->m; i++)
    quadratic += z[i] * y[f->place[i]];
  double truth = -0.5 * (quadratic + f->log_det + (double) f->m * log (ANT_TAU));
  g_assert_cmpint (ant_noise_log_likelihood (&f->model, &f->series, &fast), ==, ANT_OK);
  g_test_message ("relative error of ln L %.2g", fast / truth - 1);
  g_assert_cmpfloat (fabs (fast / truth - 1), <, 1e-12);
  g_free (z);
}

static void
likelihoods_of_many_models_equal_those_of_each (Fixture *f, gconstpointer data)
{
  AntNoiseModel model[5];
  double together[5], alone;
  for (int l = 0; l < 5; l++)
    {
      model[l] = f->model;
      model[l].part[l].rms_ppm *= 1 + 0.2 * l;
      model[l].part[1].time_d *= 1 + 0.1 * l;
      model[l].white_ppm *= 1 + 0.05 * l;
    }
  model[3].part[0].time_d = -1;
  g_assert_cmpint (ant_noise_log_likelihoods (5, model, &f->series, together), ==, ANT_OK);
  for (int l = 0; l < 5; l++)
    if (l == 3)
      {
        g_assert_true (together[l] == -HUGE_VAL);
        g_assert_cmpint (ant_noise_log_likelihood (&model[l], &f->series, &alone), ==, ANT_BAD_ARGUMENT);
      }
    else
      {
        g_assert_cmpint (ant_noise_log_likelihood (&model[l], &f->series, &alone), ==, ANT_OK);
        g_assert_cmpfloat (fabs (together[l] / alone - 1), <, 1e-12);
      }
}

/* Shapes over gaps, over both ends of the series and across checkpoints. */
static void
energies_equal_dense (Fixture *f, gconstpointer data)
{
  AntStatus status;
  AntWhitener *whitener = ant_whitener_new (&f->model, &f->series, &status);
  double z[N], energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES], worst = 0;
  double shape[400 * ANT_LANES];
  g_assert_cmpint (ant_whitener_solve (whitener, f->value, z), ==, ANT_OK);
  for (ptrdiff_t first = -150; first < N; first += 173)
    {
      for (size_t j = 0; j < 400; j++)
        for (size_t l = 0; l < ANT_LANES; l++)
          shape[j * ANT_LANES + l] = j < 50 * (l + 1) ? -1 + 0.3 * cos (0.02 * (double) (j * (l + 1))) : 0;
      ant_whitener_energies (whitener, z, first, 400, shape, energy, moment, weight);
      for (size_t l = 0; l < ANT_LANES; l++)
        {
          double s[N] = { 0 }, e = 0, mz = 0, largest = 0;
          for (ptrdiff_t j = 0; j < 400; j++)
            if (first + j >= 0 && first + j < N)
              s[first + j] = shape[j * ANT_LANES + (ptrdiff_t) l];
          double *solved = dense_solve (f, s);
          for (size_t i = 0; i < f->m; i++)
            {
              e += solved[i] * s[f->place[i]];
              mz += z[f->place[i]] * s[f->place[i]];
              largest += fabs (z[f->place[i]] * s[f->place[i]]);
            }
          if (e > 0)
            worst = fmax (worst, fabs (energy[l] / e - 1));
          g_assert_cmpfloat (fabs (energy[l] - e), <=, 1e-6 * e);
          g_assert_cmpfloat (fabs (moment[l] - mz), <=, 1e-12 * largest);
          g_free (solved);
        }
    }
  g_test_message ("worst relative error of an energy %.2g", worst);
  ant_whitener_free (whitener);
}

static void
innovations_have_the_stated_variance (Fixture *f, gconstpointer data)
{
  AntStatus status;
  AntWhitener *whitener = ant_whitener_new (&f->model, &f->series, &status);
  double *w = g_new (double, f->m), quadratic = 0, y[N], dense = 0;
  ant_whitener_innovations (whitener, f->value, w);
  for (size_t i = 0; i < f->m; i++)
    quadratic += w[i] * w[i] / ant_whitener_variance (whitener)[i];
  for (size_t i = 0; i < N; i++)
    y[i] = (double) f->value[i];
  double *z = dense_solve (f, y);
  for (size_t i = 0; i < f->m; i++)
    dense += z[i] * y[f->place[i]];
  g_assert_cmpfloat (fabs (quadratic / dense - 1), <, 1e-10);
  g_assert_cmpfloat (fabs (ant_whitener_log_det (whitener) / f->log_det - 1), <, 1e-12);
  g_free (z);
  g_free (w);
  ant_whitener_free (whitener);
}

/* The worked numbers: N = 12, C = 400*0.6^|i-j|, a box over places 4..7. Computed with 30-digit arithmetic. */
static AntSeries
worked_example (AntNoiseModel *model)
{
  static const float d[12] = { 12, -5, 8, 3, -40, -61, -55, -38, 9, 2, -7, 11 };
  *model = (AntNoiseModel){ .n_parts = 1, .white_ppm = 0, .error_scale = 1 };
  model->part[0] = (AntNoisePart){ .kind = ANT_EXPONENTIAL, .rms_ppm = 20, .time_d = -1 / log (0.6) };
  return (AntSeries){ .n = 12, .step_d = 1, .value_ppm = d };
}

static void
weigh_the_box (AntWhitener *whitener, const AntSeries *series, double *energy, double *moment)
{
  double z[12], box[4 * ANT_LANES], energies[ANT_LANES], moments[ANT_LANES], weights[ANT_LANES];
  for (size_t j = 0; j < 4 * ANT_LANES; j++)
    box[j] = -1;
  g_assert_nonnull (whitener);
  g_assert_cmpint (ant_whitener_solve (whitener, series->value_ppm, z), ==, ANT_OK);
  ant_whitener_energies (whitener, z, 4, 4, box, energies, moments, weights);
  *energy = energies[0];
  *moment = moments[0];
  ant_whitener_free (whitener);
}

static void
worked_example_of_a_box_in_correlated_noise (void)
{
  AntNoiseModel model;
  AntStatus status;
  AntSeries series = worked_example (&model);
  double energy, moment;
  weigh_the_box (ant_whitener_new (&model, &series, &status), &series, &energy, &moment);
  g_assert_cmpfloat_with_epsilon (energy, 0.0071875, 1e-15);
  g_assert_cmpfloat_with_epsilon (moment, 0.3321875, 1e-13);
  g_assert_cmpfloat_with_epsilon (moment / energy, 46.2173913043, 1e-9);
  g_assert_cmpfloat_with_epsilon (moment / sqrt (energy), 3.91826998482, 1e-10);
}

static void
worked_example_with_a_free_level (void)
{
  AntNoiseModel model;
  AntStatus status;
  AntSeries series = worked_example (&model);
  double energy, moment;
  weigh_the_box (ant_whitener_new_free_level (&model, &series, &status), &series, &energy, &moment);
  g_assert_cmpfloat_with_epsilon (moment / energy, 47.7092651757, 1e-9);
  g_assert_cmpfloat_with_epsilon (1 / sqrt (energy), 12.3836437525, 1e-9);
  g_assert_cmpfloat_with_epsilon (moment / sqrt (energy), 3.85260316991, 1e-10);
}

/* A constant added to the record changes nothing, and a constant alone has no energy. */
static void
free_level_forgets_constants (Fixture *f, gconstpointer data)
{
  AntStatus status;
  AntWhitener *whitener = ant_whitener_new_free_level (&f->model, &f->series, &status);
  float raised[N];
  double z[N], z_raised[N], largest = 0, shape[N * ANT_LANES], energy[ANT_LANES], moment[ANT_LANES], weight[ANT_LANES];
  for (size_t i = 0; i < N; i++)
    raised[i] = f->value[i] + 1000;
  for (size_t i = 0; i < N * ANT_LANES; i++)
    shape[i] = -1;
  g_assert_cmpint (ant_whitener_solve (whitener, f->value, z), ==, ANT_OK);
  g_assert_cmpint (ant_whitener_solve (whitener, raised, z_raised), ==, ANT_OK);
  for (size_t i = 0; i < N; i++)
    largest = fmax (largest, fabs (z[i]));
  for (size_t i = 0; i < N; i++)
    g_assert_cmpfloat (fabs (z[i] - z_raised[i]), <, 1e-5 * largest); /* 1000 ppm + value in float */
  ant_whitener_energies (whitener, z, 0, N, shape, energy, moment, weight);
  g_assert_cmpfloat (fabs (energy[0]), <, 1e-8 * whitener->level_energy);
  ant_whitener_free (whitener);
}

static void
nothing_observed_is_refused (void)
{
  const float gaps[3] = { NAN, NAN, NAN };
  AntSeries series = { .n = 3, .step_d = 1, .value_ppm = gaps };
  AntNoiseModel model;
  AntStatus status = ANT_OK;
  ant_noise_model_default (&model, 1, 100, 10, 0, 0, NULL);
  g_assert_null (ant_whitener_new (&model, &series, &status));
  g_assert_cmpint (status, ==, ANT_NO_DATA);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define TEST(path, function) g_test_add ("/noise/whitener/" path, Fixture, NULL, set_up, function, tear_down)
  TEST ("solution-equals-dense-algebra", solution_equals_dense);
  TEST ("likelihood-equals-dense-algebra", likelihood_equals_dense);
  TEST ("likelihoods-of-many-models-equal-those-of-each", likelihoods_of_many_models_equal_those_of_each);
  TEST ("energies-equal-dense-algebra", energies_equal_dense);
  TEST ("innovations-have-the-stated-variance", innovations_have_the_stated_variance);
  TEST ("free-level-forgets-constants", free_level_forgets_constants);
  g_test_add_func ("/noise/whitener/worked-example-with-a-free-level", worked_example_with_a_free_level);
  g_test_add_func ("/noise/whitener/worked-example-of-a-box-in-correlated-noise", worked_example_of_a_box_in_correlated_noise);
  g_test_add_func ("/noise/whitener/nothing-observed-is-refused", nothing_observed_is_refused);
  return g_test_run ();
}
