/* test-prefix-sums.c - sums over windows against adding them up. */
#include <glib.h>
#include <math.h>
#include "core/prefix-sums.h"
#include "core/random.h"

enum
{
  N = 300
};

/* Whole numbers below 2^24 in float: every sum is exact, so the twin must agree to the last bit. */
static void
fill_with_whole_numbers_and_gaps (guint64 seed, float *value)
{
  AntRandom random;

  ant_random_seed (&random, seed, 0);
  for (int i = 0; i < N; i++)
    value[i] = ant_random_uniform (&random) < 0.2 ? NAN : (float)(ant_random_next (&random) % 2000001) - 1000000.0f;
}

static double
slow_sum (const float *value, ptrdiff_t first, ptrdiff_t last)
{
  double total = 0;

  for (ptrdiff_t i = first; i < last; i++)
    if (i >= 0 && i < N && !isnan (value[i]))
      total += (double)value[i];
  return total;
}

static void
every_window_equals_its_plain_sum (void)
{
  float value[N];
  double sum[N + 1];

  fill_with_whole_numbers_and_gaps (1, value);
  ant_prefix_sums (N, value, sum);
  for (ptrdiff_t first = -5; first <= N + 5; first++)
    for (ptrdiff_t last = -5; last <= N + 5; last++)
      g_assert_cmpfloat (ant_window_sum (N, sum, first, last), ==, slow_sum (value, first, last));
}

static void
float_and_double_records_give_the_same_totals (void)
{
  float value[N];
  double wide[N], sum[N + 1], sum_wide[N + 1];

  fill_with_whole_numbers_and_gaps (2, value);
  for (int i = 0; i < N; i++)
    wide[i] = (double)value[i];
  ant_prefix_sums (N, value, sum);
  ant_prefix_sums_double (N, wide, sum_wide);
  for (int i = 0; i <= N; i++)
    g_assert_cmpfloat (sum[i], ==, sum_wide[i]);
}

static void
empty_record_has_one_total_of_zero (void)
{
  double sum[1] = { 7 };

  ant_prefix_sums (0, NULL, sum);
  g_assert_cmpfloat (sum[0], ==, 0);
  g_assert_cmpfloat (ant_window_sum (0, sum, -3, 4), ==, 0);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/core/prefix-sums/every-window-equals-its-plain-sum", every_window_equals_its_plain_sum);
  g_test_add_func ("/core/prefix-sums/float-and-double-records-give-the-same-totals",
                   float_and_double_records_give_the_same_totals);
  g_test_add_func ("/core/prefix-sums/empty-record-has-one-total-of-zero", empty_record_has_one_total_of_zero);
  return g_test_run ();
}
