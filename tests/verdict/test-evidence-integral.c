/* test-evidence-integral.c - integrals over the cube against closed forms and sums over a fine grid. */
#include <glib.h>
#include <math.h>
#include "core/units.h"
#include "verdict/evidence-integral.h"

typedef struct
{
  size_t n;
  double centre[4], scale[4], mixing;
} Bell;

/* A Gaussian in coordinates that are sheared by `mixing`, so that its volume is that of its axes. */
static void
bell (void *data, size_t count, const double *u, double *value)
{
  const Bell *b = data;
  for (size_t i = 0; i < count; i++)
    {
      double before = 0;
      value[i] = 0;
      for (size_t k = 0; k < b->n; k++)
        {
          double x = (u[i * b->n + k] - b->centre[k]) / b->scale[k] - b->mixing * before;
          value[i] -= 0.5 * x * x;
          before = (u[i * b->n + k] - b->centre[k]) / b->scale[k];
        }
    }
}

static void
check_bell (size_t n, double mixing, double tolerance)
{
  Bell b = { .n = n, .centre = { 0.4, 0.55, 0.5, 0.6 }, .scale = { 0.003, 0.02, 0.01, 0.03 }, .mixing = mixing };
  AntIntegral result;
  double start[4] = { 0.42, 0.5, 0.52, 0.55 }, expected = 0;
  g_assert_cmpint (ant_evidence_integral (n, bell, ANT_NO_QUANTITIES, &b, 1, start, &result), ==, ANT_OK);
  for (size_t k = 0; k < n; k++)
    expected += log (b.scale[k] * sqrt (ANT_TAU));
  g_assert_cmpfloat_with_epsilon (result.log_integral, expected, tolerance);
  g_assert_cmpfloat_with_epsilon (result.log_laplace, expected, 0.15);
  g_assert_cmpfloat_with_epsilon (result.mean[0], 0.4, 0.0012);
  g_assert_cmpfloat_with_epsilon (sqrt (result.covariance[0]), b.scale[0], 0.2 * b.scale[0]);
  g_assert_cmpfloat (result.effective, >, 60);
}

static void
test_gaussian (void)
{
  for (size_t n = 1; n <= 4; n++)
    check_bell (n, 0, 0.12);
}

static void
test_correlated (void)
{
  check_bell (2, 3, 0.12);
  check_bell (3, 2, 0.15);
}

/* Flat between two steep walls, as an onset inside a gap. */
static void
box (void *data, size_t count, const double *u, double *value)
{
  for (size_t i = 0; i < count; i++)
    {
      double outside = fmax (0, fabs (u[2 * i] - 0.5) - 0.05) / 0.001, x = (u[2 * i + 1] - 0.5) / 0.02;
      value[i] = -0.5 * (outside * outside + x * x);
    }
}

static void
test_flat_top (void)
{
  AntIntegral result;
  double start[2] = { 0.546, 0.5 }, expected = log ((0.1 + 0.001 * sqrt (ANT_TAU)) * 0.02 * sqrt (ANT_TAU));
  g_assert_cmpint (ant_evidence_integral (2, box, ANT_NO_QUANTITIES, NULL, 1, start, &result), ==, ANT_OK);
  g_assert_cmpfloat_with_epsilon (result.log_integral, expected, 0.2);
}

/* Highest at a face of the cube. */
static void
slope (void *data, size_t count, const double *u, double *value)
{
  for (size_t i = 0; i < count; i++)
    value[i] = -30 * u[i];
}

static void
test_face (void)
{
  AntIntegral result;
  double start = 0.3;
  g_assert_cmpint (ant_evidence_integral (1, slope, ANT_NO_QUANTITIES, NULL, 1, &start, &result), ==, ANT_OK);
  g_assert_cmpfloat_with_epsilon (result.log_integral, log (1.0 / 30), 0.15);
}

static void
nowhere (void *data, size_t count, const double *u, double *value)
{
  for (size_t i = 0; i < count; i++)
    value[i] = -HUGE_VAL;
}

static void
test_nothing_to_integrate (void)
{
  AntIntegral result;
  double start = 0.3;
  g_assert_cmpint (ant_evidence_integral (1, nowhere, ANT_NO_QUANTITIES, NULL, 1, &start, &result), ==, ANT_NO_DATA);
}

static void
test_same_digits (void)
{
  Bell b = { .n = 2, .centre = { 0.4, 0.5 }, .scale = { 0.01, 0.02 } };
  AntIntegral one, two;
  double start[2] = { 0.45, 0.45 };
  ant_evidence_integral (2, bell, ANT_NO_QUANTITIES, &b, 1, start, &one);
  ant_evidence_integral (2, bell, ANT_NO_QUANTITIES, &b, 1, start, &two);
  g_assert_cmpfloat (one.log_integral, ==, two.log_integral);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/verdict/evidence-integral/gaussian-has-its-volume", test_gaussian);
  g_test_add_func ("/verdict/evidence-integral/correlated-parameters-too", test_correlated);
  g_test_add_func ("/verdict/evidence-integral/flat-top-of-an-onset-in-a-gap", test_flat_top);
  g_test_add_func ("/verdict/evidence-integral/highest-at-a-face", test_face);
  g_test_add_func ("/verdict/evidence-integral/nothing-is-no-data", test_nothing_to_integrate);
  g_test_add_func ("/verdict/evidence-integral/same-function-same-digits", test_same_digits);
  return g_test_run ();
}
