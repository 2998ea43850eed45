/* test-averages.c - means and errors agree with plain sums at every level, and averages show what an envelope hides. */
#include "plot/averages.h"
#include <glib.h>
#include <math.h>
#include "core/random.h"

#define N 5000

static void
fill (float *value, double gap_part)
{
  AntRandom random;
  ant_random_seed (&random, 3, 1);
  for (size_t i = 0; i < N; i++)
    {
      value[i] = (float) (1e4 + 100 * ant_random_normal (&random));
      if (ant_random_uniform (&random) < gap_part)
        value[i] = NAN;
    }
}

static size_t
plain (const float *value, size_t first, size_t last, double *mean, double *error)
{
  double sum = 0, squares = 0;
  size_t count = 0;
  for (size_t i = first; i < MIN (last, N); i++)
    if (!isnan (value[i]))
      {
        sum += (double) value[i];
        count++;
      }
  *mean = sum / (double) count;
  for (size_t i = first; i < MIN (last, N); i++)
    if (!isnan (value[i]))
      squares += ((double) value[i] - *mean) * ((double) value[i] - *mean);
  *error = sqrt (squares / ((double) count * ((double) count - 1)));
  return count;
}

static void
every_level_agrees_with_plain_sums (void)
{
  g_autofree float *value = g_new (float, N);
  fill (value, 0.3);
  AntAverages *averages = ant_averages_new (N, value, 7);
  g_assert_cmpuint (averages->n_levels, ==, 11); /* 715 bins, halved to one */
  for (size_t l = 0; l < averages->n_levels; l++)
    {
      const AntAverageLevel *level = &averages->level[l];
      g_assert_cmpuint (level->n, ==, (N + level->samples - 1) / level->samples);
      for (size_t b = 0; b < level->n; b++)
        {
          double mean, error;
          if (plain (value, b * level->samples, (b + 1) * level->samples, &mean, &error) < 2)
            continue;
          g_assert_cmpfloat_with_epsilon (level->mean[b], mean, 0.002);
          g_assert_cmpfloat_with_epsilon (level->error[b], error, 1e-4 * error + 1e-6);
        }
    }
  ant_averages_free (averages);
}

static void
bins_with_too_little_are_gaps (void)
{
  float value[24];
  for (size_t i = 0; i < 24; i++)
    value[i] = i < 2 || (i >= 8 && i < 9) ? 1 : NAN; /* two of eight, one of eight, none of eight */
  AntAverages *averages = ant_averages_new (24, value, 8);
  g_assert_cmpfloat (averages->level[0].mean[0], ==, 1);
  g_assert_true (isnan (averages->level[0].mean[1]));
  g_assert_true (isnan (averages->level[0].mean[2]));
  ant_averages_free (averages);
}

static void
the_level_fits_the_width (void)
{
  g_autofree float *value = g_new0 (float, N);
  AntAverages *averages = ant_averages_new (N, value, 10);
  g_assert_cmpuint (ant_averages_level (averages, 1)->samples, ==, 10);
  g_assert_cmpuint (ant_averages_level (averages, 10)->samples, ==, 10);
  g_assert_cmpuint (ant_averages_level (averages, 11)->samples, ==, 20);
  g_assert_cmpuint (ant_averages_level (averages, 1e9)->n, ==, 1);
  ant_averages_free (averages);
  averages = ant_averages_new (0, NULL, 10);
  g_assert_null (ant_averages_level (averages, 1));
  ant_averages_free (averages);
}

static void
thirty_ppm_show_in_a_hundred_of_scatter (void)
{
  g_autofree float *value = g_new (float, N);
  fill (value, 0);
  for (size_t i = 2000; i < 2400; i++)
    value[i] -= 30;
  AntAverages *averages = ant_averages_new (N, value, 400);
  const AntAverageLevel *level = &averages->level[0];
  for (size_t b = 0; b + 1 < level->n; b++)
    if (b != 5)
      g_assert_cmpfloat (level->mean[5] + 2 * level->error[5], <, level->mean[b]);
  ant_averages_free (averages);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/averages/every-level-agrees-with-plain-sums", every_level_agrees_with_plain_sums);
  g_test_add_func ("/plot/averages/bins-with-too-little-are-gaps", bins_with_too_little_are_gaps);
  g_test_add_func ("/plot/averages/the-level-fits-the-width", the_level_fits_the_width);
  g_test_add_func ("/plot/averages/thirty-ppm-show-in-a-hundred-of-scatter", thirty_ppm_show_in_a_hundred_of_scatter);
  return g_test_run ();
}
