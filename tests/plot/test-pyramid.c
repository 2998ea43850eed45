/* test-pyramid.c - extents agree with a plain look at every sample, gaps and all, and columns share nothing. */
#include "plot/pyramid.h"
#include <glib.h>
#include <math.h>
#include "core/random.h"

static float *
noise_with_gaps (size_t n, guint64 seed)
{
  AntRandom random;
  ant_random_seed (&random, seed, 1);
  float *value = g_new (float, n);
  for (size_t i = 0; i < n; i++)
    value[i] = (float) (100 * ant_random_normal (&random));
  for (size_t k = 0; k < n / 50; k++)
    {
      size_t first = (size_t) (ant_random_uniform (&random) * (double) n);
      size_t length = (size_t) (pow (ant_random_uniform (&random), 4) * 200);
      for (size_t i = first; i < MIN (n, first + length); i++)
        value[i] = NAN;
    }
  return value;
}

static AntExtent
slow_extent (const float *value, size_t first, size_t last)
{
  AntExtent extent = { INFINITY, -INFINITY };
  for (size_t i = first; i < last; i++)
    if (!isnan (value[i]))
      {
        extent.low = MIN (extent.low, value[i]);
        extent.high = MAX (extent.high, value[i]);
      }
  return extent;
}

static void
assert_same (AntExtent a, AntExtent b)
{
  g_assert_true (a.low == b.low && a.high == b.high);
}

static void
extents_agree_with_a_plain_look (void)
{
  static const size_t lengths[] = { 0, 1, 15, 16, 17, 63, 64, 65, 1000, 4096, 20011 };
  AntRandom random;
  ant_random_seed (&random, 5, 1);
  for (size_t k = 0; k < G_N_ELEMENTS (lengths); k++)
    {
      size_t n = lengths[k];
      g_autofree float *value = noise_with_gaps (n, k + 1);
      AntPyramid *pyramid = ant_pyramid_new (n, value);
      for (int try = 0; try < 2000; try++)
        {
          size_t a = (size_t) (ant_random_uniform (&random) * (double) (n + 1));
          size_t b = (size_t) (ant_random_uniform (&random) * (double) (n + 1));
          assert_same (ant_pyramid_extent (pyramid, MIN (a, b), MAX (a, b)),
                       slow_extent (value, MIN (a, b), MAX (a, b)));
        }
      assert_same (ant_pyramid_extent (pyramid, 0, n + 100), slow_extent (value, 0, n));
      ant_pyramid_free (pyramid);
    }
}

static void
gaps_alone_have_no_extent (void)
{
  float value[500];
  for (size_t i = 0; i < G_N_ELEMENTS (value); i++)
    value[i] = NAN;
  AntPyramid *pyramid = ant_pyramid_new (G_N_ELEMENTS (value), value);
  AntExtent extent = ant_pyramid_extent (pyramid, 0, 500);
  g_assert_true (extent.low > extent.high);
  ant_pyramid_free (pyramid);
}

static void
it_takes_less_than_a_third_of_the_data (void)
{
  size_t n = 1 << 20;
  g_autofree float *value = g_new0 (float, n);
  AntPyramid *pyramid = ant_pyramid_new (n, value);
  g_assert_cmpuint (ant_pyramid_bytes (pyramid), <, n * sizeof (float) * 30 / 100);
  ant_pyramid_free (pyramid);
}

static void
a_dip_of_one_sample_is_in_exactly_one_column (void)
{
  size_t n = 30011;
  g_autofree float *value = g_new0 (float, n);
  static const size_t at[] = { 0, 1, 777, 16000, 30010 };
  for (size_t k = 0; k < G_N_ELEMENTS (at); k++)
    {
      value[at[k]] = -1;
      AntPyramid *pyramid = ant_pyramid_new (n, value);
      for (size_t width = 1; width < 2500; width += 37)
        for (double shift = -0.7; shift < 1; shift += 0.31)
          {
            g_autofree AntExtent *column = g_new (AntExtent, width);
            size_t seen = 0;
            ant_pyramid_columns (pyramid, shift - 1, shift + (double) n, width, column);
            for (size_t c = 0; c < width; c++)
              seen += column[c].low == -1;
            g_assert_cmpuint (seen, ==, 1);
          }
      ant_pyramid_free (pyramid);
      value[at[k]] = 0;
    }
}

static void
columns_agree_with_a_plain_look (void)
{
  size_t n = 5003, width = 321;
  g_autofree float *value = noise_with_gaps (n, 77);
  AntPyramid *pyramid = ant_pyramid_new (n, value);
  g_autofree AntExtent *column = g_new (AntExtent, width);
  double from = -50.25, to = 5100.5, places = (to - from) / (double) width;
  ant_pyramid_columns (pyramid, from, to, width, column);
  for (size_t c = 0; c < width; c++)
    {
      AntExtent slow = { INFINITY, -INFINITY };
      for (size_t i = 0; i < n; i++)
        if ((double) i >= from + places * (double) c && (double) i < from + places * (double) (c + 1) && !isnan (value[i]))
          slow = (AntExtent) { MIN (slow.low, value[i]), MAX (slow.high, value[i]) };
      assert_same (column[c], slow);
    }
  ant_pyramid_free (pyramid);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/plot/pyramid/extents-agree-with-a-plain-look", extents_agree_with_a_plain_look);
  g_test_add_func ("/plot/pyramid/gaps-alone-have-no-extent", gaps_alone_have_no_extent);
  g_test_add_func ("/plot/pyramid/it-takes-less-than-a-third-of-the-data", it_takes_less_than_a_third_of_the_data);
  g_test_add_func ("/plot/pyramid/a-dip-of-one-sample-is-in-exactly-one-column",
                   a_dip_of_one_sample_is_in_exactly_one_column);
  g_test_add_func ("/plot/pyramid/columns-agree-with-a-plain-look", columns_agree_with_a_plain_look);
  return g_test_run ();
}
