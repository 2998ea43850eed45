/* dense.c - the Cholesky factor of dense.h and what is read from it. */
#include "core/dense.h"

#include <math.h>

AntStatus
ant_cholesky (size_t n, double *a)
{
  for (size_t i = 0; i < n; i++)
    {
      double *row = a + i * n;

      for (size_t j = 0; j <= i; j++)
        {
          const double *above = a + j * n;
          double rest = row[j];

          for (size_t k = 0; k < j; k++)
            rest -= row[k] * above[k];
          if (j < i)
            row[j] = rest / above[j];
          else if (rest > 0)
            row[j] = sqrt (rest);
          else /* a NaN ends here too */
            return ANT_NOT_POSITIVE;
        }
    }
  return ANT_OK;
}

void
ant_cholesky_solve (size_t n, const double *factor, const double *b, double *x)
{
  for (size_t i = 0; i < n; i++)
    {
      double rest = b[i];

      for (size_t k = 0; k < i; k++)
        rest -= factor[i * n + k] * x[k];
      x[i] = rest / factor[i * n + i];
    }
  for (size_t i = n; i-- > 0;)
    {
      double rest = x[i];

      for (size_t k = i + 1; k < n; k++)
        rest -= factor[k * n + i] * x[k];
      x[i] = rest / factor[i * n + i];
    }
}

/* The inverse of the lower triangle `factor` into the lower triangle of `inverse`. */
static void
invert_triangle (size_t n, const double *factor, double *inverse)
{
  for (size_t i = 0; i < n; i++)
    {
      const double pivot = factor[i * n + i];

      for (size_t j = 0; j < i; j++)
        {
          double rest = 0;

          for (size_t k = j; k < i; k++)
            rest -= factor[i * n + k] * inverse[k * n + j];
          inverse[i * n + j] = rest / pivot;
        }
      inverse[i * n + i] = 1 / pivot;
    }
}

void
ant_cholesky_inverse (size_t n, const double *factor, double *inverse)
{
  invert_triangle (n, factor, inverse);
  /* A^-1 = L^-T L^-1 over L^-1 itself: row i needs only rows i and below, and its own diagonal last. */
  for (size_t i = 0; i < n; i++)
    for (size_t j = 0; j <= i; j++)
      {
        double total = 0;

        for (size_t k = i; k < n; k++)
          total += inverse[k * n + i] * inverse[k * n + j];
        inverse[i * n + j] = total;
      }
  for (size_t i = 0; i < n; i++)
    for (size_t j = 0; j < i; j++)
      inverse[j * n + i] = inverse[i * n + j];
}

double
ant_cholesky_log_det (size_t n, const double *factor)
{
  double total = 0;

  for (size_t i = 0; i < n; i++)
    total += log (factor[i * n + i]);
  return 2 * total;
}
