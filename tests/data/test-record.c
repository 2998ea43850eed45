/* test-record.c - a record's life, its said sentences and its flag names. */
#include <math.h>
#include "rows.h"

static void
test_flag_names_differ (void)
{
  for (unsigned a = 0; a < ANT_N_FLAGS; a++)
    {
      g_assert_cmpstr (ant_flag_name (a), !=, "");
      g_assert_cmpstr (ant_flag_description (a), !=, "");
      for (unsigned b = 0; b < a; b++)
        g_assert_cmpstr (ant_flag_name (a), !=, ant_flag_name (b));
    }
}

static void
test_flag_names_match_bits (void)
{
  static const struct { AntFlag flag; const char *name; } cases[] = {
    { ANT_FLAG_FILL, "fill" }, { ANT_FLAG_DUPLICATE, "duplicate" }, { ANT_FLAG_EXCLUDED, "excluded" },
    { ANT_FLAG_DARK, "dark" }, { ANT_FLAG_NO_TIME, "no-time" },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    g_assert_cmpstr (ant_flag_name ((unsigned) g_bit_nth_lsf (cases[i].flag, -1)), ==, cases[i].name);
}

static void
test_outlives_one_owner (void)
{
  AntRecord *record = test_rows (3, 0.0, 1.0);
  AntRecord *other = ant_record_ref (record);
  ant_record_unref (record);
  g_assert_cmpuint (other->n_rows, ==, 3);
  ant_record_unref (other);
  ant_record_unref (NULL);
}

static void
test_says_in_order (void)
{
  g_autoptr (AntRecord) record = ant_record_new ();
  ant_record_say (record, "rows: %d", 7);
  ant_record_say (record, "second");
  g_assert_cmpuint (record->said->len, ==, 2);
  g_assert_cmpstr (g_ptr_array_index (record->said, 0), ==, "rows: 7");
  g_assert_cmpstr (g_ptr_array_index (record->said, 1), ==, "second");
}

static void
test_value_undoes_ppm (void)
{
  g_autoptr (AntRecord) record = test_rows (200, 0.0, 0.01);
  test_grid (record, &(AntGridOptions) ANT_GRID_OPTIONS_INIT);
  for (gsize i = 0; i < 200; i++)
    g_assert_cmpfloat_with_epsilon (ant_record_value (record, (double) record->series.value_ppm[i]), record->value[i],
                                    1e-6);
}

static void
test_column_takes_its_places (void)
{
  g_autoptr (AntRecord) record = test_rows (200, 0.0, 0.01);
  float *value = g_new (float, 200);
  for (guint i = 0; i < 200; i++)
    value[i] = i == 7 ? NAN : (float) i;
  record->value[9] = NAN; /* the column goes on where the value does not */
  g_ptr_array_add (record->columns, ant_column_new ("temperature", "K", value, 200));
  test_grid (record, &(AntGridOptions) ANT_GRID_OPTIONS_INIT);
  g_autofree float *grid = ant_record_column_on_grid (record, g_ptr_array_index (record->columns, 0));
  for (guint i = 0; i < 200; i++)
    g_assert_true (i == 7 ? isnan (grid[i]) != 0 : grid[i] == (float) i);
  g_autofree char *words = ant_column_words (g_ptr_array_index (record->columns, 0), 200);
  g_assert_cmpstr (words, ==, "temperature, K, 1 of 200 missing");
}

static void
test_column_averages_shared_places (void)
{
  g_autoptr (AntRecord) record = test_rows (400, 0.0, 0.01);
  float *value = g_new (float, 400);
  for (guint i = 0; i < 400; i++)
    value[i] = (float) i;
  g_ptr_array_add (record->columns, ant_column_new ("counts", NULL, value, 400));
  AntGridOptions options = ANT_GRID_OPTIONS_INIT;
  options.cadence_d = 0.02;
  test_grid (record, &options);
  g_autofree float *grid = ant_record_column_on_grid (record, g_ptr_array_index (record->columns, 0));
  for (gsize k = 0; k < record->series.n; k++)
    {
      double sum = 0.0, n = 0.0;
      for (gsize i = 0; i < 400; i++)
        if (record->place[i] == (gint64) k)
          sum += (double) value[i], n++;
      g_assert_cmpfloat_with_epsilon ((double) grid[k], sum / n, 1e-4);
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/record/flag-names-differ", test_flag_names_differ);
  g_test_add_func ("/data/record/flag-names-match-their-bits", test_flag_names_match_bits);
  g_test_add_func ("/data/record/outlives-one-of-two-owners", test_outlives_one_owner);
  g_test_add_func ("/data/record/says-in-order", test_says_in_order);
  g_test_add_func ("/data/record/value-undoes-ppm", test_value_undoes_ppm);
  g_test_add_func ("/data/record/a-column-takes-the-places-of-its-rows", test_column_takes_its_places);
  g_test_add_func ("/data/record/a-column-averages-what-shares-a-place", test_column_averages_shared_places);
  return g_test_run ();
}
