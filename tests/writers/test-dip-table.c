/* test-dip-table.c - the table of dips: its header to the letter, what is empty when unknown, the asked form. */
#include <math.h>
#include <string.h>
#include "rows.h"
#include "writers/dip-table.h"

#define HEADER                                                                                                         \
  "dip,start_jd,mid_jd,end_jd,mid_time,mid_utc,duration_h,depth_ppm,depth_sigma_ppm,mean_depth_ppm,radius_ratio,snr,"  \
  "first_snr,expected_false,coverage,edges,class,probability,evidence"

static const AntDip dips[] = {
  { .mid_d = 10.5, .duration_d = 0.25, .depth_ppm = 84.0, .depth_sigma_ppm = 12.0, .mean_depth_ppm = 75.5,
    .radius_ratio = 0.00837, .snr = 7.0, .first_snr = 6.25, .expected_false = 0.001, .coverage = 1.0,
    .edges = ANT_EDGES_BOTH },
  { .mid_d = 20.0, .duration_d = 0.5, .depth_ppm = 200.0, .depth_sigma_ppm = 20.0, .mean_depth_ppm = 180.0,
    .radius_ratio = 0.0129, .snr = 10.0, .first_snr = 9.0, .expected_false = NAN, .coverage = 0.5,
    .edges = ANT_EDGES_INGRESS },
};

static AntDipList
list_of (gsize n)
{
  return (AntDipList){ .n = n, .dip = dips, .limb_u1 = 0.4, .limb_u2 = 0.19, .threshold_snr = 5.2, .false_alarms = 0.05,
                       .mirror_known = TRUE, .n_found = 2, .n_mirrored = 1 };
}

static AntRecord *
record_in_utc (void)
{
  AntRecord *record = test_rows (100, 0.0, 1.0);
  record->time.scale = ANT_SCALE_UTC;
  record->time.style = ANT_STAMP_JD;
  record->time.origin_known = TRUE;
  record->time.origin_jd1 = 2466492.0; /* 2040-12-03T12:00: JD 2451544.5 (2000-01-01) and 14 947.5 d */
  record->time.own_zero = 66492.0;
  record->time.own_offset = 2400000.0;
  record->sha256 = g_strdup ("0123abcd");
  return record;
}

/* The fields of the n-th row (from 1) below the header. */
static GStrv
row_fields (const GString *table, guint n)
{
  g_auto (GStrv) lines = g_strsplit (strstr (table->str, "\ndip,") + 1, "\n", -1);
  g_assert_cmpuint (n, <, g_strv_length (lines));
  return g_strsplit (lines[n], ",", -1);
}

static void
test_header (void)
{
  g_autoptr (AntRecord) record = record_in_utc ();
  AntDipList list = list_of (2);
  g_autoptr (GString) table = ant_dip_table_text (record, &list);
  g_assert_nonnull (strstr (table->str, "\n" HEADER "\n1,"));
  for (const char *line = table->str; *line; line = strchr (line, '\n') + 1)
    g_assert_true (g_str_has_prefix (line, "# ") || g_str_has_prefix (line, HEADER "\n") || g_ascii_isdigit (*line));
}

static void
test_preamble (void)
{
  g_autoptr (AntRecord) record = record_in_utc ();
  AntDipList list = list_of (2);
  g_autoptr (GString) table = ant_dip_table_text (record, &list);
  static const char *const told[] = { "# record: rows.txt\n", "# SHA-256: 0123abcd\n", "# time scale: UTC; ",
                                      "quadratic 0.4, 0.19\n", "SNR 5.200; ", "in this record: 0.05\n",
                                      "2 dips and 1 brightenings", "# duration_h: ", "# depth_ppm: ",
                                      "# mean_depth_ppm: " };
  for (gsize i = 0; i < G_N_ELEMENTS (told); i++)
    g_assert_nonnull (strstr (table->str, told[i]));
}

static void
test_row (void)
{
  g_autoptr (AntRecord) record = record_in_utc ();
  AntDipList list = list_of (2);
  g_autoptr (GString) table = ant_dip_table_text (record, &list);
  g_auto (GStrv) row = row_fields (table, 1);
  g_assert_cmpuint (g_strv_length (row), ==, 19);
  g_assert_cmpstr (row[0], ==, "1");
  g_assert_cmpstr (row[1], ==, "2466502.3750000");
  g_assert_cmpstr (row[2], ==, "2466502.5000000");
  g_assert_cmpstr (row[3], ==, "2466502.6250000");
  g_assert_cmpfloat (g_ascii_strtod (row[4], NULL), ==, 66502.5);
  g_assert_cmpstr (row[5], ==, "2040-12-14T00:00:00Z");
  g_assert_cmpstr (row[6], ==, "6.0000");
  g_assert_cmpstr (row[7], ==, "84");
  g_assert_cmpstr (row[13], ==, "0.001");
  g_assert_cmpstr (row[15], ==, "both");
  g_assert_cmpstr (row[16], ==, "undecided");
  g_assert_cmpstr (row[17], ==, "");
  g_assert_cmpstr (row[18], ==, "");
  g_auto (GStrv) second = row_fields (table, 2);
  g_assert_cmpstr (second[13], ==, ""); /* not known */
  g_assert_cmpstr (second[15], ==, "ingress");
}

static void
test_unknown_origin (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 0.0, 1.0);
  AntDipList list = list_of (1);
  g_autoptr (GString) table = ant_dip_table_text (record, &list);
  g_auto (GStrv) row = row_fields (table, 1);
  for (int c = 1; c <= 3; c++)
    g_assert_cmpstr (row[c], ==, "");
  g_assert_cmpfloat (g_ascii_strtod (row[4], NULL), ==, 10.5);
  g_assert_cmpstr (row[5], ==, "");
}

static void
test_unknown_scale (void)
{
  g_autoptr (AntRecord) record = record_in_utc ();
  record->time.scale = ANT_SCALE_UNKNOWN;
  AntDipList list = list_of (1);
  g_autoptr (GString) table = ant_dip_table_text (record, &list);
  g_auto (GStrv) row = row_fields (table, 1);
  g_assert_cmpstr (row[2], ==, "2466502.5000000");
  g_assert_cmpstr (row[5], ==, "");
}

static void
test_asked (void)
{
  g_autoptr (AntRecord) record = record_in_utc ();
  AntDipList list = list_of (1);
  list.upper_limit_ppm = (double[]){ 103.7 };
  list.mirror_known = FALSE;
  g_autoptr (GString) table = ant_dip_table_text (record, &list);
  g_assert_nonnull (strstr (table->str, "\n" HEADER ",asked,upper_limit_ppm\n"));
  g_auto (GStrv) row = row_fields (table, 1);
  g_assert_cmpuint (g_strv_length (row), ==, 21);
  g_assert_cmpstr (row[19], ==, "asked");
  g_assert_cmpstr (row[20], ==, "103.7");
}

static void
test_judged (void)
{
  g_autoptr (AntRecord) record = record_in_utc ();
  g_autoptr (AntJudgements) judgements = ant_judgements_new ();
  AntDipList list = list_of (2);
  ant_judgements_set_class (judgements, list.dip[0].mid_d, list.dip[0].duration_d, ANT_CLASS_PLANET);
  ant_judgements_set_note (judgements, list.dip[0].mid_d, list.dip[0].duration_d, "as predicted");
  list.judgements = judgements;
  g_autoptr (GString) table = ant_dip_table_text (record, &list);
  g_auto (GStrv) row = row_fields (table, 1);
  g_assert_cmpstr (row[16], ==, "undecided"); /* what the program says stays beside it */
  g_assert_cmpstr (row[19], ==, "planet");
  g_assert_cmpstr (row[20], ==, "as predicted");
}

static void
test_same_bytes (void)
{
  g_autoptr (AntRecord) record = record_in_utc (), again = record_in_utc ();
  AntDipList list = list_of (2);
  g_autoptr (GString) one = ant_dip_table_text (record, &list), two = ant_dip_table_text (again, &list);
  g_assert_cmpstr (one->str, ==, two->str);
}

static void
test_analyst (void)
{
  g_autoptr (AntRecord) record = record_in_utc ();
  AntDipList list = list_of (2);
  const double upper_limit_ppm[] = { NAN, 210.5 };
  const char *const class[] = { "planet", "undecided" }, *const note[] = { "Venus, as predicted", "" };
  list.upper_limit_ppm = upper_limit_ppm;
  list.analyst_class = class;
  list.analyst_note = note;
  g_autoptr (GString) table = ant_dip_table_text (record, &list);
  g_assert_nonnull (strstr (table->str, HEADER ",asked,upper_limit_ppm,analyst_class,analyst_note\n"));
  g_assert_nonnull (strstr (table->str, ",,,planet,\"Venus, as predicted\"\n2,"));
  g_assert_true (g_str_has_suffix (table->str, ",asked,210.5,undecided,\n"));
  g_assert_nonnull (strstr (table->str, "# threshold: SNR 5.2")); /* of those that were found */
}

static void
test_incomplete (void)
{
  g_autoptr (AntRecord) record = record_in_utc ();
  AntDipList list = list_of (2);
  g_autoptr (GString) whole = ant_dip_table_text (record, &list);
  g_assert_null (strstr (whole->str, "incomplete"));
  list.incomplete = "stopped";
  g_autoptr (GString) part = ant_dip_table_text (record, &list);
  g_assert_nonnull (strstr (part->str, "\n# incomplete: stopped\n"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/writers/dip-table/header-to-the-letter", test_header);
  g_test_add_func ("/writers/dip-table/preamble-tells-record-and-search", test_preamble);
  g_test_add_func ("/writers/dip-table/a-row-tells-times-and-sizes", test_row);
  g_test_add_func ("/writers/dip-table/no-origin-no-jd", test_unknown_origin);
  g_test_add_func ("/writers/dip-table/no-scale-no-utc", test_unknown_scale);
  g_test_add_func ("/writers/dip-table/asked-dips-have-an-upper-limit", test_asked);
  g_test_add_func ("/writers/dip-table/the-analysts-word-stands-beside-the-programs", test_judged);
  g_test_add_func ("/writers/dip-table/same-record-same-bytes", test_same_bytes);
  g_test_add_func ("/writers/dip-table/a-stopped-scan-says-what-it-lacks", test_incomplete);
  g_test_add_func ("/writers/dip-table/asked-dips-and-the-analysts-words-are-told-beside-dips-found", test_analyst);
  return g_test_run ();
}
