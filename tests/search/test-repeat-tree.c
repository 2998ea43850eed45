/* test-repeat-tree.c - the folding tree against plain sums, at every kind of period. */
#include <glib.h>
#include <math.h>
#include <stdlib.h>
#include "core/random.h"
#include "search/repeat-tree.h"

typedef struct
{
  const AntFoldArrays *arrays;
  size_t reach, leaves, last_phase;
  double worst;    /* relative loss of a box of ones, or departure from integer sums */
  double previous; /* period */
  size_t width;
} Seen;

/* A staircase of ones at exact event places is recovered: with ramps wider than the slip every phase's sum equals the plain sum
 * of values at rounded places within what rounding moves. Here values are linear in place, so a row's error is its slip. */
static void
compare (void *data, const AntFoldLeaf *leaf)
{
  Seen *seen = data;
  const AntFoldArrays *arrays = seen->arrays;
  g_assert_cmpuint (leaf->n_rows, <=, ANT_FOLD_RADIX);
  if (leaf->first_phase == 0)
    {
      g_assert_cmpfloat (leaf->period, >, seen->previous);
      seen->previous = leaf->period;
      seen->leaves++;
    }
  for (size_t t = 0; t < leaf->n_phases; t += 7)
    {
      double sum = 0, rows = 0, plain_rows = 0, plain = 0;
      for (size_t r = 0; r < leaf->n_rows; r++)
        {
          sum += (double) leaf->a[r][t];
          rows += (double) leaf->b[r][t];
        }
      for (double at = (double) (leaf->first_phase + t); at < (double) arrays->n; at += leaf->period)
        {
          plain += (double) arrays->a[(size_t) (at + 0.5)];
          plain_rows += (double) arrays->b[(size_t) (at + 0.5)];
        }
      seen->worst = fmax (seen->worst, fabs (sum - plain) / fmax (plain_rows, 1));
      g_assert_cmpfloat (fabs (rows - plain_rows), <=, fmax (1, 0.02 * plain_rows));
    }
}

static double
fold_waves (size_t n, double from, double to, size_t tile, size_t *leaves)
{
  AntFoldArrays arrays;
  AntFoldRange range = { .from = from, .to = to, .drift_top = 4, .drift_inner = 3, .reach = 30, .tile = tile };
  g_assert_cmpint (ant_fold_arrays_init (&arrays, n, (size_t) ceil (to) + 30 + ANT_FOLD_LANES), ==, ANT_OK);
  for (size_t i = 0; i < n; i++)
    {
      arrays.a[i] = (float) sin (2 * G_PI * (double) i / 97.0); /* a place of slip is at most 0.065 */
      arrays.b[i] = 1;
    }
  Seen seen = { .arrays = &arrays };
  g_assert_cmpint (ant_fold_tree_run (&arrays, &range, compare, &seen), ==, ANT_OK);
  ant_fold_arrays_clear (&arrays);
  *leaves = seen.leaves;
  return seen.worst;
}

static void
test_few_rows (void)
{
  size_t leaves;
  g_assert_cmpfloat (fold_waves (5000, 1700, 2400, 4096, &leaves), <, 0.07 * 1.6);
  g_assert_cmpuint (leaves, ==, 350);
}

static void
test_many_rows (void)
{
  size_t leaves;
  g_assert_cmpfloat (fold_waves (20000, 150, 154, 4096, &leaves), <, 0.065 * 4);
  g_assert_cmpuint (leaves, >=, 130);
}

static void
test_tiles (void)
{
  size_t leaves;
  g_assert_cmpfloat (fold_waves (60000, 3000, 3060, 512, &leaves), <, 0.065 * 4);
}

/* With hundreds of short rows a block is folded over one period. */
static void
test_round (void)
{
  size_t leaves;
  g_assert_cmpfloat (fold_waves (60000, 40, 40.5, 4096, &leaves), <, 0.2);
}

static void
remember (void *data, const AntFoldLeaf *leaf)
{
  double *best = data;
  for (size_t t = 0; t < leaf->n_phases; t++)
    {
      double sum = 0;
      for (size_t r = 0; r < leaf->n_rows; r++)
        sum += (double) leaf->a[r][t];
      best[0] = fmax (best[0], sum);
    }
}

/* Boxes of six places at any period and phase keep most of their sum at the best trial. */
static void
test_boxes_are_kept (void)
{
  AntRandom random;
  ant_random_seed (&random, 3, 1);
  double mean = 0, least = 1;
  for (int trial = 0; trial < 60; trial++)
    {
      size_t n = 3000 + (size_t) (30000 * ant_random_uniform (&random));
      double period = 30 * pow ((double) n / 3 / 30, ant_random_uniform (&random)), phase = period * ant_random_uniform (&random);
      double best = 0, events = 0;
      AntFoldArrays arrays;
      AntFoldRange range = { .from = period * (1 - 3 / (double) n), .to = period * (1 + 3 / (double) n), .drift_top = 4,
                             .drift_inner = 3, .tile = 1024 };
      range.from = fmax (range.from - 4 * period / (double) n, 16);
      range.to += 4 * period / (double) n;
      g_assert_cmpint (ant_fold_arrays_init (&arrays, n, (size_t) ceil (range.to) + ANT_FOLD_LANES), ==, ANT_OK);
      for (double at = phase; at < (double) n; at += period, events++)
        for (int k = -6; k <= 6; k++) /* the overlap of two boxes of six places */
          {
            ptrdiff_t place = (ptrdiff_t) floor (at + 0.5) + k;
            if (place >= 0 && place < (ptrdiff_t) n)
              arrays.a[place] = (float) fmax ((double) arrays.a[place], 1 - fabs ((double) place - at) / 6);
          }
      ant_fold_tree_run (&arrays, &range, remember, &best);
      ant_fold_arrays_clear (&arrays);
      mean += best / events / 60;
      least = fmin (least, best / events);
    }
  g_assert_cmpfloat (mean, >, 0.87);
  g_assert_cmpfloat (least, >, 0.78);
}

static void
test_stop (void)
{
  AntFoldArrays arrays;
  AntStop stop = { 0 };
  AntFoldRange range = { .from = 30, .to = 31, .drift_top = 4, .drift_inner = 3, .tile = 64, .stop = &stop };
  double best = 0;
  ant_stop_ask (&stop);
  g_assert_cmpint (ant_fold_arrays_init (&arrays, 10000, 64), ==, ANT_OK);
  g_assert_cmpint (ant_fold_tree_run (&arrays, &range, remember, &best), ==, ANT_STOPPED);
  ant_fold_arrays_clear (&arrays);
}

static void
test_chunks_advance (void)
{
  double at = 20;
  for (int k = 0; k < 2000 && at < 5000; k++)
    {
      double end = ant_fold_chunk_end (10007, at);
      g_assert_cmpfloat (end, >, at * (1 + 1e-9));
      at = end;
    }
  g_assert_cmpfloat (at, >=, 5000);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/search/repeat-tree/few-rows-equal-plain-sums", test_few_rows);
  g_test_add_func ("/search/repeat-tree/many-rows-slip-by-few-places", test_many_rows);
  g_test_add_func ("/search/repeat-tree/tiles-of-a-long-period-join", test_tiles);
  g_test_add_func ("/search/repeat-tree/many-short-rows-go-round", test_round);
  g_test_add_func ("/search/repeat-tree/boxes-keep-their-sum", test_boxes_are_kept);
  g_test_add_func ("/search/repeat-tree/stops-when-asked", test_stop);
  g_test_add_func ("/search/repeat-tree/chunks-of-periods-advance", test_chunks_advance);
  return g_test_run ();
}
