/* test-dense.c - the Cholesky factor against the products it must give back and an elimination written out. */
#include <glib.h>
#include <math.h>
#include <string.h>
#include "core/dense.h"
#include "core/random.h"

enum
{
  MOST = 40
};

/* A random symmetric positive matrix: B B' + I. */
static void
fill_positive (AntRandom *random, size_t n, double *a)
{
  double b[MOST * MOST];

  for (size_t i = 0; i < n * n; i++)
    b[i] = ant_random_normal (random);
  for (size_t i = 0; i < n; i++)
    for (size_t j = 0; j < n; j++)
      {
        a[i * n + j] = i == j;
        for (size_t k = 0; k < n; k++)
          a[i * n + j] += b[i * n + k] * b[j * n + k];
      }
}

/* The slow twin: Gauss elimination with row pivots; solves a x = b, returns ln |det a|. */
static double
slow_solve (size_t n, const double *a, const double *b, double *x)
{
  double rows[MOST][MOST + 1], log_det = 0;

  for (size_t i = 0; i < n; i++)
    {
      memcpy (rows[i], a + i * n, n * sizeof *a);
      rows[i][n] = b[i];
    }
  for (size_t p = 0; p < n; p++)
    {
      size_t best = p;

      for (size_t i = p; i < n; i++)
        if (fabs (rows[i][p]) > fabs (rows[best][p]))
          best = i;
      for (size_t j = 0; j <= n; j++)
        {
          const double swap = rows[p][j];

          rows[p][j] = rows[best][j];
          rows[best][j] = swap;
        }
      log_det += log (fabs (rows[p][p]));
      for (size_t i = 0; i < n; i++)
        {
          const double factor = i == p ? 0 : rows[i][p] / rows[p][p];

          for (size_t j = p; j <= n; j++)
            rows[i][j] -= factor * rows[p][j];
        }
    }
  for (size_t i = 0; i < n; i++)
    x[i] = rows[i][n] / rows[i][i];
  return log_det;
}

static void
factor_times_its_transpose_is_the_matrix (void)
{
  double a[MOST * MOST], factor[MOST * MOST];
  AntRandom random;

  ant_random_seed (&random, 1, 0);
  for (size_t n = 1; n <= MOST; n += 3)
    {
      fill_positive (&random, n, a);
      memcpy (factor, a, n * n * sizeof *a);
      g_assert_cmpint (ant_cholesky (n, factor), ==, ANT_OK);
      for (size_t i = 0; i < n; i++)
        for (size_t j = 0; j < n; j++)
          {
            double product = 0;

            for (size_t k = 0; k <= MIN (i, j); k++)
              product += factor[i * n + k] * factor[j * n + k];
            g_assert_cmpfloat (fabs (product - a[i * n + j]), <, 1e-12 * (double)n);
            if (j > i)
              g_assert_cmpfloat (factor[i * n + j], ==, a[i * n + j]); /* the upper part is left alone */
          }
    }
}

static void
solution_and_determinant_equal_those_of_elimination (void)
{
  double a[MOST * MOST], b[MOST], x[MOST], slow[MOST];
  AntRandom random;

  ant_random_seed (&random, 2, 0);
  for (size_t n = 1; n <= MOST; n += 3)
    {
      double log_det;

      fill_positive (&random, n, a);
      for (size_t i = 0; i < n; i++)
        b[i] = ant_random_normal (&random);
      log_det = slow_solve (n, a, b, slow);
      g_assert_cmpint (ant_cholesky (n, a), ==, ANT_OK);
      ant_cholesky_solve (n, a, b, x);
      ant_cholesky_solve (n, a, b, b); /* in place */
      for (size_t i = 0; i < n; i++)
        {
          g_assert_cmpfloat (fabs (x[i] - slow[i]), <, 1e-11);
          g_assert_cmpfloat (b[i], ==, x[i]);
        }
      g_assert_cmpfloat (fabs (ant_cholesky_log_det (n, a) - log_det), <, 1e-12 * (double)n);
    }
}

static void
inverse_times_the_matrix_is_one (void)
{
  double a[MOST * MOST], factor[MOST * MOST], inverse[MOST * MOST];
  AntRandom random;

  ant_random_seed (&random, 3, 0);
  for (size_t n = 1; n <= MOST; n += 3)
    {
      fill_positive (&random, n, a);
      memcpy (factor, a, n * n * sizeof *a);
      g_assert_cmpint (ant_cholesky (n, factor), ==, ANT_OK);
      ant_cholesky_inverse (n, factor, inverse);
      for (size_t i = 0; i < n; i++)
        for (size_t j = 0; j < n; j++)
          {
            double product = 0;

            for (size_t k = 0; k < n; k++)
              product += a[i * n + k] * inverse[k * n + j];
            g_assert_cmpfloat (fabs (product - (i == j)), <, 1e-11);
            g_assert_cmpfloat (inverse[i * n + j], ==, inverse[j * n + i]);
          }
    }
}

static void
matrices_that_are_not_positive_are_refused (void)
{
  double indefinite[] = { 1, 2, 2, 1 };
  double singular[] = { 1, 1, 1, 1 };
  double unknown[] = { 1, NAN, NAN, 1 };
  double zero[] = { 0 };

  g_assert_cmpint (ant_cholesky (2, indefinite), ==, ANT_NOT_POSITIVE);
  g_assert_cmpint (ant_cholesky (2, singular), ==, ANT_NOT_POSITIVE);
  g_assert_cmpint (ant_cholesky (2, unknown), ==, ANT_NOT_POSITIVE);
  g_assert_cmpint (ant_cholesky (1, zero), ==, ANT_NOT_POSITIVE);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/core/dense/factor-times-its-transpose-is-the-matrix", factor_times_its_transpose_is_the_matrix);
  g_test_add_func ("/core/dense/solution-and-determinant-equal-those-of-elimination",
                   solution_and_determinant_equal_those_of_elimination);
  g_test_add_func ("/core/dense/inverse-times-the-matrix-is-one", inverse_times_the_matrix_is_one);
  g_test_add_func ("/core/dense/matrices-that-are-not-positive-are-refused",
                   matrices_that_are_not_positive_are_refused);
  return g_test_run ();
}
