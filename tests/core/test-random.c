/* test-random.c - known digits and plain statistics of the generator. */
#include <glib.h>
#include <math.h>
#include "core/random.h"

/* The first outputs of xoshiro256** from state {1, 2, 3, 4}; source: the rand_xoshiro library's test vector, itself
 * made with the authors' C code (from memory). The first is easy by hand: 2*5 = 10, rotated by 7 = 1280, times 9. */
static void
state_one_two_three_four_gives_the_published_digits (void)
{
  static const guint64 expected[] = { 11520,
                                      0,
                                      1509978240,
                                      G_GUINT64_CONSTANT (1215971899390074240),
                                      G_GUINT64_CONSTANT (1216172134540287360),
                                      G_GUINT64_CONSTANT (607988272756665600),
                                      G_GUINT64_CONSTANT (16172922978634559625),
                                      G_GUINT64_CONSTANT (8476171486693032832) };
  AntRandom random = { { 1, 2, 3, 4 }, 0, 0 };

  for (gsize i = 0; i < G_N_ELEMENTS (expected); i++)
    g_assert_cmpuint (ant_random_next (&random), ==, expected[i]);
}

static void
same_seed_and_stream_repeat_every_digit (void)
{
  AntRandom a, b;

  ant_random_seed (&a, 20040608, 3);
  ant_random_normal (&a); /* leaves a spare normal behind, which a new seed must forget */
  ant_random_seed (&a, 20040608, 3);
  ant_random_seed (&b, 20040608, 3);
  for (int i = 0; i < 1000; i++)
    {
      g_assert_cmpfloat (ant_random_normal (&a), ==, ant_random_normal (&b));
      g_assert_cmpuint (ant_random_next (&a), ==, ant_random_next (&b));
    }
}

/* No two of 64 x 64 neighbouring (seed, stream) pairs start alike, swapped pairs included. */
static void
neighbouring_seeds_and_streams_start_apart (void)
{
  g_autoptr (GHashTable) seen = g_hash_table_new_full (g_int64_hash, g_int64_equal, g_free, NULL);

  for (guint64 seed = 0; seed < 64; seed++)
    for (guint64 stream = 0; stream < 64; stream++)
      {
        AntRandom random;
        gint64 *first = g_new (gint64, 1);

        ant_random_seed (&random, seed, stream);
        *first = (gint64)ant_random_next (&random);
        g_assert_true (g_hash_table_add (seen, first));
      }
}

/* Correlations between 200 streams of one seed: each is N(0, 1/n), so the mean square times n is 1 +- sqrt(2/pairs). */
static void
streams_are_uncorrelated (void)
{
  enum
  {
    STREAMS = 200,
    N = 400
  };
  g_autofree double *value = g_new (double, STREAMS * N);
  double total = 0;
  const double pairs = STREAMS * (STREAMS - 1) / 2;

  for (int s = 0; s < STREAMS; s++)
    {
      AntRandom random;

      ant_random_seed (&random, 11, (guint64)s);
      for (int i = 0; i < N; i++)
        value[s * N + i] = ant_random_normal (&random);
    }
  for (int s = 0; s < STREAMS; s++)
    for (int t = 0; t < s; t++)
      {
        double product = 0;

        for (int i = 0; i < N; i++)
          product += value[s * N + i] * value[t * N + i];
        total += product * product / N;
      }
  g_assert_cmpfloat (fabs (total / pairs - 1), <, 5 * sqrt (2 / pairs));
}

static void
uniforms_fill_zero_to_one_evenly (void)
{
  enum
  {
    BINS = 64,
    N = 640000
  };
  int count[BINS] = { 0 };
  double chi2 = 0;
  AntRandom random;

  ant_random_seed (&random, 5, 0);
  for (int i = 0; i < N; i++)
    {
      const double u = ant_random_uniform (&random);

      g_assert_true (u >= 0 && u < 1);
      count[(int)(BINS * u)]++;
    }
  for (int b = 0; b < BINS; b++)
    chi2 += (count[b] - (double)N / BINS) * (count[b] - (double)N / BINS) / ((double)N / BINS);
  g_assert_cmpfloat (fabs (chi2 - (BINS - 1)), <, 4 * sqrt (2.0 * (BINS - 1)));
}

/* Mean, variance, fourth moment and the fraction beyond 3 sigma, each within 4.5 of its own standard error. */
static void
normals_have_the_moments_and_tails_of_a_gaussian (void)
{
  enum
  {
    N = 1000000
  };
  double sum = 0, sum2 = 0, sum4 = 0;
  int beyond = 0;
  const double tail = erfc (3 / sqrt (2));
  AntRandom random;

  ant_random_seed (&random, 17, 1);
  for (int i = 0; i < N; i++)
    {
      const double x = ant_random_normal (&random);

      sum += x;
      sum2 += x * x;
      sum4 += x * x * x * x;
      beyond += fabs (x) > 3;
    }
  g_assert_cmpfloat (fabs (sum / N), <, 4.5 * sqrt (1.0 / N));
  g_assert_cmpfloat (fabs (sum2 / N - 1), <, 4.5 * sqrt (2.0 / N));
  g_assert_cmpfloat (fabs (sum4 / N - 3), <, 4.5 * sqrt (96.0 / N));
  g_assert_cmpfloat (fabs ((double)beyond / N - tail), <, 4.5 * sqrt (tail / N));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/core/random/state-1-2-3-4-gives-the-published-digits",
                   state_one_two_three_four_gives_the_published_digits);
  g_test_add_func ("/core/random/same-seed-and-stream-repeat-every-digit", same_seed_and_stream_repeat_every_digit);
  g_test_add_func ("/core/random/neighbouring-seeds-and-streams-start-apart",
                   neighbouring_seeds_and_streams_start_apart);
  g_test_add_func ("/core/random/streams-are-uncorrelated", streams_are_uncorrelated);
  g_test_add_func ("/core/random/uniforms-fill-zero-to-one-evenly", uniforms_fill_zero_to_one_evenly);
  g_test_add_func ("/core/random/normals-have-the-moments-and-tails-of-a-gaussian",
                   normals_have_the_moments_and_tails_of_a_gaussian);
  return g_test_run ();
}
