/* test-row-order.c - each reason to leave a row out, one by one. */
#include <math.h>
#include "data/row-order.h"
#include "rows.h"

static AntRowOrder
order_rows (AntRecord *record, const AntGridOptions *options)
{
  AntRowOrder order;
  g_autoptr (GError) error = NULL;
  g_assert_true (ant_row_order_make (&order, record, options, &error));
  g_assert_no_error (error);
  return order;
}

static void
test_fill_and_no_time (void)
{
  g_autoptr (AntRecord) record = test_rows (10, 0.0, 1.0);
  record->value[3] = NAN;
  record->value[4] = INFINITY;
  record->time_d[5] = NAN;
  AntRowOrder order = order_rows (record, &(AntGridOptions) ANT_GRID_OPTIONS_INIT);
  g_assert_cmpuint (record->flags[3], ==, ANT_FLAG_FILL);
  g_assert_cmpuint (record->flags[4], ==, ANT_FLAG_FILL);
  g_assert_cmpuint (record->flags[5], ==, ANT_FLAG_NO_TIME);
  g_assert_cmpuint (order.n, ==, 9);
  g_assert_cmpuint (ant_row_order_count_good (&order, record), ==, 7);
  ant_row_order_clear (&order);
}

static AntRecord *
rows_with_quality (void)
{
  AntRecord *record = test_rows (4, 0.0, 1.0);
  record->quality = g_memdup2 ((gint64[]){ 0, 1, 1LL << 40, 3 }, 4 * sizeof (gint64));
  return record;
}

static void
assert_bad (const AntRecord *record, const char *bad)
{
  for (gsize i = 0; i < record->n_rows; i++)
    g_assert_cmpuint (record->flags[i], ==, bad[i] == 'x' ? ANT_FLAG_QUALITY : 0);
}

static void
test_quality_zero (void)
{
  g_autoptr (AntRecord) record = rows_with_quality ();
  AntRowOrder order = order_rows (record, &(AntGridOptions) ANT_GRID_OPTIONS_INIT);
  assert_bad (record, ".xxx");
  g_assert_true (test_said (record, "good = 0"));
  ant_row_order_clear (&order);
}

static void
test_quality_mask (void)
{
  g_autoptr (AntRecord) record = rows_with_quality ();
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  options.good_mask = 1LL << 40 | 2;
  AntRowOrder order = order_rows (record, &options);
  assert_bad (record, "..xx");
  ant_row_order_clear (&order);
}

static void
test_quality_list (void)
{
  g_autoptr (AntRecord) record = rows_with_quality ();
  g_autoptr (GArray) good = g_array_new (FALSE, FALSE, sizeof (gint64));
  g_array_append_vals (good, (gint64[]){ 3, 1LL << 40 }, 2);
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  options.quality_is_list = TRUE;
  options.good_values = good;
  AntRowOrder order = order_rows (record, &options);
  assert_bad (record, "xx..");
  ant_row_order_clear (&order);
}

static void
test_duplicates_keep_the_first_good (void)
{
  g_autoptr (AntRecord) record = test_rows (8, 0.0, 1.0);
  record->time_d[1] = record->time_d[0]; /* both good: the first stays */
  record->time_d[4] = record->time_d[3]; /* the first is fill: the second stays */
  record->value[3] = NAN;
  AntRowOrder order = order_rows (record, &(AntGridOptions) ANT_GRID_OPTIONS_INIT);
  g_assert_cmpuint (record->flags[0], ==, 0);
  g_assert_cmpuint (record->flags[1], ==, ANT_FLAG_DUPLICATE);
  g_assert_cmpuint (record->flags[3], ==, ANT_FLAG_FILL | ANT_FLAG_DUPLICATE);
  g_assert_cmpuint (record->flags[4], ==, 0);
  g_assert_cmpuint (order.n, ==, 6);
  for (gsize k = 1; k < order.n; k++)
    g_assert_cmpfloat (order.time_d[k], >, order.time_d[k - 1]);
  g_assert_true (test_said (record, "first at line 2"));
  ant_row_order_clear (&order);
}

static void
test_disorder_is_sorted (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 0.0, 1.0);
  record->time_d[20] = 70.5;
  record->time_d[71] = 20.0;
  AntRowOrder order = order_rows (record, &(AntGridOptions) ANT_GRID_OPTIONS_INIT);
  g_assert_cmpuint (order.n, ==, 100);
  for (gsize k = 0; k < order.n; k++)
    {
      g_assert_cmpfloat (order.time_d[k], ==, record->time_d[order.row[k]]);
      if (k > 0)
        g_assert_cmpfloat (order.time_d[k], >, order.time_d[k - 1]);
    }
  g_assert_true (test_said (record, "go back at 2 places, first at line 22"));
  ant_row_order_clear (&order);
}

/* Slow twin: each row against each span. */
static void
test_spans (void)
{
  g_autoptr (GRand) random = g_rand_new_with_seed (5);
  for (int trial = 0; trial < 50; trial++)
    {
      g_autoptr (AntRecord) record = test_rows (200, 0.0, 1.0);
      g_autoptr (GArray) spans = g_array_new (FALSE, FALSE, sizeof (AntSpan));
      for (int s = 0; s < 6; s++)
        {
          double start_d = g_rand_int_range (random, -5, 205);
          AntSpan span = { start_d, start_d + g_rand_int_range (random, 0, 20) };
          g_array_append_val (spans, span);
        }
      AntGridOptions options = ANT_GRID_OPTIONS_INIT;
      options.excluded = spans;
      options.from_d = 10.0;
      options.to_d = 190.0;
      AntRowOrder order = order_rows (record, &options);
      ant_row_order_judge_spans (&order, record, &options);
      for (gsize i = 0; i < 200; i++)
        {
          double t = record->time_d[i];
          gboolean out = t < 10.0 || t > 190.0;
          for (guint s = 0; s < spans->len; s++)
            {
              AntSpan span = g_array_index (spans, AntSpan, s);
              out |= t >= span.start_d && t <= span.end_d;
            }
          g_assert_cmpuint (record->flags[i], ==, out ? ANT_FLAG_EXCLUDED : 0);
        }
      ant_row_order_clear (&order);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/row-order/fill-and-unreadable-times-are-flagged", test_fill_and_no_time);
  g_test_add_func ("/data/row-order/quality-is-good-at-zero", test_quality_zero);
  g_test_add_func ("/data/row-order/quality-mask-reaches-past-32-bits", test_quality_mask);
  g_test_add_func ("/data/row-order/quality-list-names-the-good", test_quality_list);
  g_test_add_func ("/data/row-order/duplicates-keep-the-first-good-row", test_duplicates_keep_the_first_good);
  g_test_add_func ("/data/row-order/disorder-is-sorted-and-said", test_disorder_is_sorted);
  g_test_add_func ("/data/row-order/spans-agree-with-a-plain-double-loop", test_spans);
  return g_test_run ();
}
