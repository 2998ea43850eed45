/* test-number-table.c - columns come back as they went in. */
#include <math.h>
#include <string.h>
#include "rows.h"
#include "writers/number-table.h"

static void
test_round_trip (void)
{
  g_autoptr (AntRecord) record = test_rows (3, 0.0, 1.0);
  double hours[] = { 0.5, 4.0, 13.0 }, ppm[] = { 1.0 / 3.0, NAN, 1e-12 };
  const AntNumberColumn columns[] = { { "duration_h", hours, NULL }, { "floor_ppm", ppm, "%.17g" } };
  g_autoptr (GString) table
      = ant_number_table_text (record, "Noise floor", (const char *[]){ "floor_ppm: sigma", NULL }, 2, columns, 3);
  const char *body = strstr (table->str, "duration_h,floor_ppm\n");
  g_assert_nonnull (strstr (table->str, "# floor_ppm: sigma\n"));
  g_assert_nonnull (body);
  g_auto (GStrv) lines = g_strsplit (body, "\n", -1);
  g_assert_cmpuint (g_strv_length (lines), ==, 5); /* header, three rows, the empty end */
  for (int i = 0; i < 3; i++)
    {
      g_auto (GStrv) fields = g_strsplit (lines[i + 1], ",", -1);
      g_assert_cmpuint (g_strv_length (fields), ==, 2);
      g_assert_cmpfloat (g_ascii_strtod (fields[0], NULL), ==, hours[i]);
      if (isnan (ppm[i]))
        g_assert_cmpstr (fields[1], ==, "");
      else
        g_assert_cmpfloat (g_ascii_strtod (fields[1], NULL), ==, ppm[i]);
    }
}

static void
test_no_rows (void)
{
  g_autoptr (AntRecord) record = test_rows (3, 0.0, 1.0);
  const AntNumberColumn column = { "x", NULL, NULL };
  g_autoptr (GString) table = ant_number_table_text (record, "Nothing", NULL, 1, &column, 0);
  g_assert_true (g_str_has_prefix (table->str, "# Nothing (Antumbra "));
  g_assert_true (g_str_has_suffix (table->str, "\nx\n"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/writers/number-table/columns-come-back-as-they-went-in", test_round_trip);
  g_test_add_func ("/writers/number-table/a-table-without-rows-keeps-its-header", test_no_rows);
  return g_test_run ();
}
