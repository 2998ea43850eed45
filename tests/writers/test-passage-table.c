/* test-passage-table.c - the table of passages: definitions, header, rows; no claim of chance. */
#include <math.h>
#include <string.h>
#include "rows.h"
#include "writers/passage-table.h"

#define HEADER "passage,start_jd,mid_jd,end_jd,mid_time,mid_utc,width_d,depth_ppm,depth_sigma_ppm,coverage"

static AntPassage passages[] = {
  { .start_d = 10, .mid_d = 13.5, .end_d = 17, .depth_ppm = 870.25, .depth_sigma_ppm = 11.5, .coverage = 0.875 },
  { .start_d = 40, .mid_d = 42, .end_d = 44, .depth_ppm = 120, .depth_sigma_ppm = 10, .coverage = 1 },
};

static GString *
table_of (AntRecord *record, gsize n)
{
  AntScanResults results = { .record = record, .reach = ANT_SCAN_COMPLETE, .n_passages = n, .passage = passages };
  return ant_passage_table_text (&results);
}

static void
test_preamble (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 0.0, 1.0);
  g_autoptr (GString) table = table_of (record, 0);
  static const char *const told[] = { "# record: rows.txt\n", "# no false-alarm claim: the Sun does this\n", "# depth_ppm: ",
                                      "width_d: from start to end, 1 to 14 d\n", "# coverage: ", "listed from 4 times its sigma\n" };
  for (gsize i = 0; i < G_N_ELEMENTS (told); i++)
    g_assert_nonnull (strstr (table->str, told[i]));
  g_assert_true (g_str_has_suffix (table->str, "\n" HEADER "\n"));
}

static void
test_rows_tell_times_and_sizes (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 0.0, 1.0);
  record->time.scale = ANT_SCALE_UTC;
  record->time.style = ANT_STAMP_JD;
  record->time.origin_known = TRUE;
  record->time.origin_jd1 = 2466492.0; /* 2040-12-03T12:00 */
  record->time.own_zero = 66492.0;
  record->time.own_offset = 2400000.0;
  g_autoptr (GString) table = table_of (record, 2);
  const char *rows = strstr (table->str, HEADER) + strlen (HEADER "\n");
  g_auto (GStrv) line = g_strsplit (rows, "\n", -1), row = g_strsplit (line[0], ",", -1);
  static const char *const want[] = { "1", "2466502.0000", "2466505.5000", "2466509.0000", NULL, "2040-12-17T00:00:00Z", "7.000",
                                      "870.25", "11.5", "0.8750" };
  g_assert_cmpuint (g_strv_length (row), ==, G_N_ELEMENTS (want));
  for (gsize i = 0; i < G_N_ELEMENTS (want); i++)
    if (want[i])
      g_assert_cmpstr (row[i], ==, want[i]);
  g_assert_cmpfloat (g_ascii_strtod (row[4], NULL), ==, 66505.5);
  g_assert_true (g_str_has_prefix (line[1], "2,"));
  g_assert_cmpstr (line[2], ==, "");
}

static void
test_unknown_origin (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 0.0, 1.0);
  g_autoptr (GString) table = table_of (record, 1);
  g_assert_nonnull (strstr (table->str, "\n1,,,,13.5"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/writers/passage-table/preamble-tells-definitions-and-claims-nothing", test_preamble);
  g_test_add_func ("/writers/passage-table/rows-tell-times-and-sizes", test_rows_tell_times_and_sizes);
  g_test_add_func ("/writers/passage-table/no-origin-no-jd", test_unknown_origin);
  return g_test_run ();
}
