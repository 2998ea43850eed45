/* test-column-tie.c - a column that moves with an event is told from one that does not, however it wanders. */
#include <glib.h>
#include <math.h>
#include "core/random.h"
#include "verdict/column-tie.h"

#define N 4000
#define STEP_D (10 / 1440.0)

/* White noise with a dip of 6 h in it, and a column that wanders for hours; tied: it moves by so much in the dip, too. */
static double
tie (unsigned long seed, double tied)
{
  AntRandom random;
  g_autofree float *value = g_new (float, N), *column = g_new (float, N);
  double wander = 0;
  AntDip dip = { .mid_d = 14, .duration_d = 0.25 };
  ant_random_seed (&random, seed, 7);
  for (size_t i = 0; i < N; i++)
    {
      int inside = fabs ((double) i * STEP_D - dip.mid_d) < 0.5 * dip.duration_d;
      wander = 0.98 * wander + ant_random_normal (&random);
      value[i] = (float) (20 * ant_random_normal (&random) - (inside ? 200 : 0));
      column[i] = (float) (300 + wander + (inside ? tied : 0));
    }
  AntSeries series = { .n = N, .step_d = STEP_D, .value_ppm = value };
  return ant_column_tie (&series, column, &dip);
}

static void
test_tied (void)
{
  for (unsigned long seed = 0; seed < 5; seed++)
    {
      g_assert_cmpfloat (fabs (tie (seed, 60)), >, 6);
      g_assert_cmpfloat (tie (seed, 60) * tie (seed, -60), <, 0);
    }
}

/* The dip is ten times its noise, the column remembers hours: neither makes a tie of chance. */
static void
test_untied (void)
{
  enum { SEEDS = 60 };
  size_t beyond = 0;
  double squares = 0;
  for (unsigned long seed = 0; seed < SEEDS; seed++)
    {
      double one = tie (100 + seed, 0);
      beyond += fabs (one) > 3;
      squares += one * one / SEEDS;
    }
  g_test_message ("rms %.2f, %zu beyond 3", sqrt (squares), beyond);
  g_assert_cmpuint (beyond, <=, 2);
  g_assert_cmpfloat (sqrt (squares), <, 1.4);
}

static void
test_still (void)
{
  g_autofree float *value = g_new0 (float, N), *column = g_new0 (float, N);
  AntSeries series = { .n = N, .step_d = STEP_D, .value_ppm = value };
  AntDip dip = { .mid_d = 14, .duration_d = 0.25 };
  g_assert_true (isnan (ant_column_tie (&series, column, &dip)));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/verdict/column-tie/a-column-that-moves-in-the-dip-is-tied-to-it", test_tied);
  g_test_add_func ("/verdict/column-tie/a-column-that-only-wanders-is-not", test_untied);
  g_test_add_func ("/verdict/column-tie/a-column-that-stands-still-says-nothing", test_still);
  return g_test_run ();
}
