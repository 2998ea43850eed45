/* test-flags-table.c - what a scan left out is written, and read back it leaves out the same. */
#include <math.h>
#include <string.h>
#include "data/exclusions.h"
#include "rows.h"
#include "writers/flags-table.h"

/* An eclipse, a masked row, a fill, a limit. */
static AntRecord *
gridded_rows (const AntGridOptions *options)
{
  AntRecord *record = test_rows (2000, 100.0, 1.0 / 144.0);
  for (gsize i = 700; i < 712; i++)
    record->value[i] *= 0.5;
  record->value[300] = NAN;
  record->flags[400] = ANT_FLAG_HAND;
  record->time.own_zero = 0.0;
  record->time.style = ANT_STAMP_DAYS;
  test_grid (record, options);
  return record;
}

static void
test_lists_the_flagged (void)
{
  g_autoptr (AntRecord) record = gridded_rows (&(AntGridOptions) ANT_GRID_OPTIONS_INIT);
  g_autoptr (GString) table = ant_flags_table_text (record, record->flags);
  g_assert_nonnull (strstr (table->str, "rows that are not listed are used"));
  g_assert_nonnull (strstr (table->str, "\n" ANT_FLAGS_HEADER "\n301,"));
  g_assert_nonnull (strstr (table->str, ",fill\n401,"));
  g_assert_nonnull (strstr (table->str, ",hand\n701,"));
  gsize n_lines = 0, n_flagged = 0;
  for (const char *p = strstr (table->str, ANT_FLAGS_HEADER); (p = strchr (p, '\n')) && p[1]; p++)
    n_lines++;
  for (gsize i = 0; i < record->n_rows; i++)
    n_flagged += record->flags[i] != 0;
  g_assert_cmpuint (n_lines, ==, n_flagged);
}

static void
test_joins_names (void)
{
  g_autoptr (AntRecord) record = test_rows (1, 0.0, 1.0);
  record->flags[0] = ANT_FLAG_FILL | ANT_FLAG_QUALITY | ANT_FLAG_DUPLICATE;
  g_autoptr (GString) table = ant_flags_table_text (record, record->flags);
  g_assert_true (g_str_has_suffix (table->str, ",fill|quality|duplicate\n"));
}

static void
test_round_trip (void)
{
  static const AntStampPlace stamps[] = { ANT_AT_START, ANT_AT_MIDDLE, ANT_AT_END };
  for (int s = 0; s < 3; s++)
    {
      AntGridOptions options = ANT_GRID_OPTIONS_INIT;
      options.stamp = stamps[s];
      options.from_d = 101.0;
      g_autoptr (AntRecord) first = gridded_rows (&options);
      g_autoptr (GString) table = ant_flags_table_text (first, first->flags);
      g_autoptr (GArray) spans = ant_exclusions_parse ("flags.csv", table->str, &first->time, NULL);
      g_assert_nonnull (spans);
      options.from_d = NAN;
      options.excluded = spans;
      g_autoptr (AntRecord) second = gridded_rows (&options);
      for (gsize i = 0; i < first->n_rows; i++)
        g_assert_cmpint (first->flags[i] == 0, ==, second->flags[i] == 0);
      g_assert_cmpuint (second->series.n, ==, first->series.n);
      g_assert_cmpmem (first->series.value_ppm, first->series.n * sizeof (float), second->series.value_ppm,
                       second->series.n * sizeof (float));
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/writers/flags-table/lists-every-flagged-row", test_lists_the_flagged);
  g_test_add_func ("/writers/flags-table/joins-names-by-bars", test_joins_names);
  g_test_add_func ("/writers/flags-table/read-back-it-leaves-out-the-same-rows", test_round_trip);
  return g_test_run ();
}
