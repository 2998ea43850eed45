/* test-smoother.c - conditional means of chosen parts against dense algebra, in gaps too, and their standard deviations. */
#include "noise/smoother.h"
#include <glib.h>
#include <math.h>
#include "core/dense.h"
#include "core/units.h"
#include "masks.h"

#define N 800
#define STEP_D (20 / 1440.0)

typedef struct
{
  AntNoiseModel model;
  AntSeries series;
  unsigned char slow[ANT_MAX_PARTS], fast[ANT_MAX_PARTS], all[ANT_MAX_PARTS];
  float value[N];
  double z[N];
  size_t m, place[N];
  double *factor; /* [m*m] dense Cholesky of C */
  AntWhitener *whitener;
} Fixture;

static void
set_up (Fixture *f, gconstpointer data)
{
  AntRandom random;
  AntStatus status;
  unsigned char seen[N];
  ant_random_seed (&random, 20260301, 1);
  ant_noise_model_default (&f->model, STEP_D, 300, 20, 0, 0, NULL);
  ant_mask_make (ANT_MASK_LOW_ORBIT, N, STEP_D, &random, seen);
  for (size_t i = 0; i < N; i++)
    {
      if (i > 300 && i < 480) /* and two and a half days */
        seen[i] = 0;
      f->value[i] = seen[i] ? (float) (100 * ant_random_normal (&random)) : NAN;
      if (seen[i])
        f->place[f->m++] = i;
    }
  f->series = (AntSeries){ .n = N, .step_d = STEP_D, .value_ppm = f->value };
  for (size_t p = 0; p < f->model.n_parts; p++)
    {
      f->all[p] = 1;
      f->slow[p] = f->model.part[p].time_d > 0.25;
      f->fast[p] = !f->slow[p];
    }
  f->factor = g_new (double, f->m * f->m);
  for (size_t i = 0; i < f->m; i++)
    for (size_t j = 0; j < f->m; j++)
      f->factor[i * f->m + j]
        = ant_noise_model_covariance (&f->model, fabs ((double) f->place[i] - (double) f->place[j]) * STEP_D)
          + (i == j ? ant_noise_model_variance (&f->model, 0, 1) : 0);
  g_assert_cmpint (ant_cholesky (f->m, f->factor), ==, ANT_OK);
  f->whitener = ant_whitener_new (&f->model, &f->series, &status);
  g_assert_nonnull (f->whitener);
  g_assert_cmpint (ant_whitener_solve (f->whitener, f->value, f->z), ==, ANT_OK);
}

static void
tear_down (Fixture *f, gconstpointer data)
{
  g_free (f->factor);
  ant_whitener_free (f->whitener);
}

/* Covariance of the chosen parts between two places. */
static double
covariance (const Fixture *f, const unsigned char *chosen, double p, double q)
{
  double sum = 0;
  for (size_t k = 0; k < f->model.n_parts; k++)
    if (chosen[k])
      sum += ant_noise_part_covariance (&f->model.part[k], fabs (p - q) * STEP_D);
  return sum;
}

static void
equals_dense_algebra_everywhere (Fixture *f, gconstpointer data)
{
  double mean[N], worst = 0, largest = 0;
  g_autofree double *z = g_new (double, f->m);
  for (size_t i = 0; i < f->m; i++)
    z[i] = (double) f->value[f->place[i]];
  ant_cholesky_solve (f->m, f->factor, z, z);
  g_assert_cmpint (ant_smooth (&f->model, f->slow, STEP_D, N, f->z, mean), ==, ANT_OK);
  for (size_t p = 0; p < N; p++)
    {
      double truth = 0;
      for (size_t i = 0; i < f->m; i++)
        truth += covariance (f, f->slow, (double) p, (double) f->place[i]) * z[i];
      worst = fmax (worst, fabs (mean[p] - truth));
      largest = fmax (largest, fabs (truth));
    }
  g_test_message ("worst error %.2g of the largest", worst / largest);
  g_assert_cmpfloat (largest, >, 1);
  g_assert_cmpfloat (worst, <, 1e-9 * largest);
}

static void
parts_add_up_to_the_data_less_white_noise (Fixture *f, gconstpointer data)
{
  double slow[N], fast[N], white = ant_noise_model_variance (&f->model, 0, 1);
  g_assert_cmpint (ant_smooth (&f->model, f->slow, STEP_D, N, f->z, slow), ==, ANT_OK);
  g_assert_cmpint (ant_smooth (&f->model, f->fast, STEP_D, N, f->z, fast), ==, ANT_OK);
  for (size_t i = 0; i < f->m; i++)
    {
      size_t p = f->place[i];
      g_assert_cmpfloat (fabs (slow[p] + fast[p] + white * f->z[p] - (double) f->value[p]), <, 1e-7);
    }
}

static void
forgets_beyond_its_memory (Fixture *f, gconstpointer data)
{
  AntNoiseModel model = { .n_parts = 1, .part = { { .kind = ANT_EXPONENTIAL, .rms_ppm = 50, .time_d = 0.1 } } };
  double z[N] = { [10] = 1 }, mean[N];
  unsigned char chosen[] = { 1 };
  g_assert_cmpint (ant_smooth (&model, chosen, STEP_D, N, z, mean), ==, ANT_OK);
  for (size_t p = 0; p < N; p++)
    g_assert_cmpfloat (fabs (mean[p] - 2500 * exp (-fabs ((double) p - 10) * STEP_D / 0.1)), <, 1e-9);
}

static void
contrast_sigma_equals_dense_algebra (Fixture *f, gconstpointer data)
{
  const size_t place[][3] = { { 100, 40, 200 }, { 390, 250, 600 }, { 799, 0, 5 } };
  const double weight[] = { -1, 0.4, 0.6 };
  g_autofree double *across = g_new (double, f->m), *solved = g_new (double, f->m);
  for (size_t t = 0; t < G_N_ELEMENTS (place); t++)
    {
      double truth = 0, sigma;
      for (size_t a = 0; a < 3; a++)
        for (size_t b = 0; b < 3; b++)
          truth += weight[a] * weight[b] * covariance (f, f->slow, (double) place[t][a], (double) place[t][b]);
      for (size_t i = 0; i < f->m; i++)
        {
          across[i] = 0;
          for (size_t a = 0; a < 3; a++)
            across[i] += weight[a] * covariance (f, f->slow, (double) place[t][a], (double) f->place[i]);
        }
      ant_cholesky_solve (f->m, f->factor, across, solved);
      for (size_t i = 0; i < f->m; i++)
        truth -= across[i] * solved[i];
      g_assert_cmpint (ant_smooth_contrast_sigma (f->whitener, &f->model, f->slow, STEP_D, 3, place[t], weight, &sigma), ==,
                       ANT_OK);
      g_test_message ("sigma %.4f ppm, dense %.4f", sigma, sqrt (truth));
      g_assert_cmpfloat (fabs (sigma / sqrt (truth) - 1), <, 1e-4);
    }
}

static void
a_model_without_meaning_is_refused (Fixture *f, gconstpointer data)
{
  double mean[N];
  f->model.part[0].time_d = -1;
  g_assert_cmpint (ant_smooth (&f->model, f->all, STEP_D, N, f->z, mean), ==, ANT_BAD_ARGUMENT);
}

#define ADD(path, test) g_test_add ("/noise/smoother/" path, Fixture, NULL, set_up, test, tear_down)

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  ADD ("equals-dense-algebra-everywhere", equals_dense_algebra_everywhere);
  ADD ("parts-add-up-to-the-data-less-white-noise", parts_add_up_to_the_data_less_white_noise);
  ADD ("forgets-beyond-its-memory", forgets_beyond_its_memory);
  ADD ("contrast-sigma-equals-dense-algebra", contrast_sigma_equals_dense_algebra);
  ADD ("a-model-without-meaning-is-refused", a_model_without_meaning_is_refused);
  return g_test_run ();
}
