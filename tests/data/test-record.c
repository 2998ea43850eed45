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

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/data/record/flag-names-differ", test_flag_names_differ);
  g_test_add_func ("/data/record/flag-names-match-their-bits", test_flag_names_match_bits);
  g_test_add_func ("/data/record/outlives-one-of-two-owners", test_outlives_one_owner);
  g_test_add_func ("/data/record/says-in-order", test_says_in_order);
  g_test_add_func ("/data/record/value-undoes-ppm", test_value_undoes_ppm);
  return g_test_run ();
}
