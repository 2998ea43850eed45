/* test-table.c - a table in its three formats: the same cells, hostile words, no rows, the same bytes; FITS asked back of CFITSIO. */
#include <fitsio.h>
#include <math.h>
#include <string.h>
#include "rows.h"
#include "writers/table.h"

static const double reals[] = { 2466502.1234567891, NAN, -1.5e-12 };
static const char *const texts[] = { "plain", "100 \302\265W & <more>, \"quoted\"", "'tick' \001 and # \302\262" };

static double
real (gconstpointer data, gsize row)
{
  return reals[row];
}

static double
whole (gconstpointer data, gsize row)
{
  return (double) row - 1;
}

static char *
text (gconstpointer data, gsize row)
{
  return g_strdup (texts[row]);
}

static double
bits (gconstpointer data, gsize row)
{
  return (double) (row * 5);
}

static char *
bits_text (gconstpointer data, gsize row)
{
  return g_strdup (row == 0 ? "" : row == 1 ? "fill|duplicate" : "quality|hand");
}

static const AntTableColumn columns[] = {
  { "number", ANT_CELL_WHOLE, NULL, NULL, "meta.id", NULL, FALSE, whole, NULL },
  { "mid_jd", ANT_CELL_REAL, "%.7f", "d", "time.epoch", "the middle of what is told, in words enough that they do not fit on one card of a header", TRUE,
    real, NULL },
  { "word", ANT_CELL_TEXT, NULL, NULL, "meta.note", "any word", FALSE, NULL, text },
  { "flags", ANT_CELL_BITS, NULL, NULL, "meta.code.qual", NULL, FALSE, bits, bits_text },
};

static AntRecord *
record_of (AntTimeScale scale)
{
  AntRecord *record = test_rows (100, 0.0, 1.0);
  record->time.scale = scale;
  record->time.style = ANT_STAMP_JD;
  record->time.origin_known = TRUE;
  record->time.origin_jd1 = 2466492.0;
  g_free (record->path);
  record->path = g_strdup ("sp\303\244t's <record> & more.csv");
  return record;
}

static AntTable *
table_of (const AntRecord *record, gsize n_rows)
{
  AntTable *table = ant_table_new ("A test", "TEST", record);
  ant_table_note (table, "a note about %d things that is long enough to be broken once, between two of its words, and no more", 3);
  ant_table_fact_number (table, "KNOWN", 5.25, "known");
  ant_table_fact_number (table, "UNKNOWN", NAN, "not known");
  ant_table_add_columns (table, G_N_ELEMENTS (columns), columns);
  ant_table_set_rows (table, n_rows, NULL, NULL);
  return table;
}

/* The table as FITS, opened at its second part; CFITSIO keeps the places of data and size. */
typedef struct
{
  GBytes *bytes;
  void *data;
  size_t size;
  fitsfile *file;
} Opened;

static void
open_fits (Opened *opened, AntTimeScale scale, gsize n_rows)
{
  g_autoptr (AntRecord) record = record_of (scale);
  g_autoptr (AntTable) table = table_of (record, n_rows);
  g_autoptr (GError) error = NULL;
  int status = 0;
  opened->bytes = ant_table_bytes (table, ANT_TABLE_FITS, &error);
  g_assert_no_error (error);
  opened->data = (void *) (gsize) g_bytes_get_data (opened->bytes, &opened->size);
  fits_open_memfile (&opened->file, "table.fits", READONLY, &opened->data, &opened->size, 0, NULL, &status);
  fits_movabs_hdu (opened->file, 2, NULL, &status);
  g_assert_cmpint (status, ==, 0);
}

static void
close_fits (Opened *opened)
{
  int status = 0;
  fits_close_file (opened->file, &status);
  g_assert_cmpint (status, ==, 0);
  g_bytes_unref (opened->bytes);
}

static void
test_checksums (void)
{
  for (gsize n_rows = 0; n_rows <= G_N_ELEMENTS (reals); n_rows += G_N_ELEMENTS (reals))
    {
      Opened opened;
      open_fits (&opened, ANT_SCALE_UTC, n_rows);
      for (int hdu = 1; hdu <= 2; hdu++)
        {
          int status = 0, data_good = 0, hdu_good = 0;
          fits_movabs_hdu (opened.file, hdu, NULL, &status);
          fits_verify_chksum (opened.file, &data_good, &hdu_good, &status);
          g_assert_cmpint (status, ==, 0);
          g_assert_cmpint (data_good, ==, 1);
          g_assert_cmpint (hdu_good, ==, 1);
        }
      g_assert_cmpuint (opened.size % 2880, ==, 0);
      close_fits (&opened);
    }
}

/* Every card is one that CFITSIO's own verifier lets pass: its keyword, its value, nothing but printable letters. */
static void
test_cards (void)
{
  Opened opened;
  open_fits (&opened, ANT_SCALE_TDB, G_N_ELEMENTS (reals));
  int status = 0, n_cards = 0, more = 0;
  fits_get_hdrspace (opened.file, &n_cards, &more, &status);
  g_assert_cmpint (n_cards, >, 20);
  for (int i = 1; i <= n_cards; i++)
    {
      char card[FLEN_CARD], key[FLEN_KEYWORD], value[FLEN_VALUE], comment[FLEN_COMMENT];
      fits_read_record (opened.file, i, card, &status);
      fits_test_record (card, &status);
      fits_read_keyn (opened.file, i, key, value, comment, &status);
      fits_test_keyword (key, &status);
      g_test_message ("%s", card);
      g_assert_cmpint (status, ==, 0);
    }
  close_fits (&opened);
}

static void
test_types (void)
{
  static const struct { int code; long width; } want[] = { { TLONG, 4 }, { TDOUBLE, 8 }, { TSTRING, 25 }, { TSHORT, 2 } };
  Opened opened;
  open_fits (&opened, ANT_SCALE_UTC, G_N_ELEMENTS (reals));
  int status = 0, n = 0;
  long n_rows = 0;
  fits_get_num_cols (opened.file, &n, &status);
  fits_get_num_rows (opened.file, &n_rows, &status);
  g_assert_cmpint (n, ==, G_N_ELEMENTS (columns));
  g_assert_cmpint (n_rows, ==, G_N_ELEMENTS (reals));
  for (int c = 1; c <= n; c++)
    {
      int code;
      long repeat, width;
      fits_get_coltype (opened.file, c, &code, &repeat, &width, &status);
      g_assert_cmpint (code, ==, want[c - 1].code);
      if (code != TSTRING)
        g_assert_cmpint (width, ==, want[c - 1].width);
    }
  g_assert_cmpint (status, ==, 0);
  close_fits (&opened);
}

static void
test_cells (void)
{
  Opened opened;
  open_fits (&opened, ANT_SCALE_UTC, G_N_ELEMENTS (reals));
  int status = 0, any = 0, numbers[3];
  short flags[3];
  double values[3];
  char words[3][80], *word[] = { words[0], words[1], words[2] };
  fits_read_col (opened.file, TINT, 1, 1, 1, 3, NULL, numbers, &any, &status);
  fits_read_col (opened.file, TDOUBLE, 2, 1, 1, 3, NULL, values, &any, &status);
  fits_read_col (opened.file, TSTRING, 3, 1, 1, 3, NULL, word, &any, &status);
  fits_read_col (opened.file, TSHORT, 4, 1, 1, 3, NULL, flags, &any, &status);
  g_assert_cmpint (status, ==, 0);
  for (int i = 0; i < 3; i++)
    {
      g_assert_cmpint (numbers[i], ==, i - 1);
      g_assert_cmpint (flags[i], ==, 5 * i);
      g_assert_true (isnan (reals[i]) ? isnan (values[i]) : values[i] == reals[i]); /* to the bit */
      for (const char *c = words[i]; *c; c++)
        g_assert_true (*c >= 0x20 && *c < 0x7f);
    }
  g_assert_cmpstr (words[0], ==, "plain");
  g_assert_nonnull (strstr (words[1], "W & <more>, \"quoted\""));
  close_fits (&opened);
}

static char *
key_of (const Opened *opened, const char *key)
{
  char value[FLEN_VALUE];
  int status = 0;
  fits_read_key_str (opened->file, key, value, NULL, &status);
  return status ? NULL : g_strdup (value);
}

static void
test_times (void)
{
  static const struct { AntTimeScale scale; const char *word; } cases[] = {
    { ANT_SCALE_UTC, "UTC" }, { ANT_SCALE_TT, "TT" }, { ANT_SCALE_TDB, "TDB" }, { ANT_SCALE_GPS, "GPS" }, { ANT_SCALE_UNIX, "UTC" },
    { ANT_SCALE_UNKNOWN, "LOCAL" }
  };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    {
      Opened opened;
      open_fits (&opened, cases[i].scale, 1);
      g_autofree char *system = key_of (&opened, "TIMESYS"), *column = key_of (&opened, "TCTYP2"), *place = key_of (&opened, "TREFPOS");
      g_assert_cmpstr (system, ==, cases[i].word);
      g_assert_cmpstr (column, ==, cases[i].word);
      g_assert_cmpstr (place, ==, "UNKNOWN");
      close_fits (&opened);
    }
}

static void
test_facts (void)
{
  Opened opened;
  open_fits (&opened, ANT_SCALE_UTC, 1);
  g_autofree char *known = key_of (&opened, "KNOWN"), *unknown = key_of (&opened, "UNKNOWN"), *unit = key_of (&opened, "TUNIT2"),
                  *ucd = key_of (&opened, "TUCD2"), *name = key_of (&opened, "EXTNAME"), *record = key_of (&opened, "RECORD");
  g_assert_cmpfloat (g_ascii_strtod (known, NULL), ==, 5.25);
  g_assert_null (unknown);
  g_assert_cmpstr (unit, ==, "d");
  g_assert_cmpstr (ucd, ==, "time.epoch");
  g_assert_cmpstr (name, ==, "TEST");
  g_assert_nonnull (strstr (record, "t's <record> & more.csv"));
  close_fits (&opened);
}

static void
test_csv (void)
{
  g_autoptr (AntRecord) record = record_of (ANT_SCALE_UTC);
  g_autoptr (AntTable) table = table_of (record, 3);
  g_autoptr (GString) csv = ant_table_text (table);
  g_assert_nonnull (strstr (csv->str, "\nnumber,mid_jd,word,flags\n-1,2466502.1234568,plain,\n0,,\"100 \302\265W & <more>, \"\"quoted\"\"\",fill|duplicate\n"));
  g_assert_nonnull (strstr (csv->str, "\n# word: any word\n"));
}

static void
test_votable (void)
{
  g_autoptr (AntRecord) record = record_of (ANT_SCALE_TT);
  g_autoptr (AntTable) table = table_of (record, 3);
  g_autoptr (GBytes) bytes = ant_table_bytes (table, ANT_TABLE_VOTABLE, NULL);
  g_autofree char *xml = g_strndup (g_bytes_get_data (bytes, NULL), g_bytes_get_size (bytes));
  static const char *const told[] = { "version=\"1.4\"", "timescale=\"TT\"", "<TD>2466502.1234568</TD>", "<TD></TD>", "&lt;more&gt;",
                                      "value=\"sp\303\244t&apos;s &lt;record&gt; &amp; more.csv\"", "ref=\"times\"", "name=\"KNOWN\" value=\"5.25\"" };
  g_assert_true (g_utf8_validate (xml, -1, NULL));
  g_assert_null (strchr (xml, '\001'));
  for (gsize i = 0; i < G_N_ELEMENTS (told); i++)
    g_assert_nonnull (strstr (xml, told[i]));
  g_assert_null (strstr (xml, "name=\"UNKNOWN\""));
}

static void
test_unknown_origin (void)
{
  g_autoptr (AntRecord) record = test_rows (100, 0.0, 1.0);
  g_autoptr (AntTable) table = table_of (record, 1);
  g_autoptr (GBytes) fits = ant_table_bytes (table, ANT_TABLE_FITS, NULL), xml = ant_table_bytes (table, ANT_TABLE_VOTABLE, NULL);
  g_assert_null (g_strstr_len (g_bytes_get_data (xml, NULL), (gssize) g_bytes_get_size (xml), "TIMESYS"));
  g_assert_null (g_strstr_len (g_bytes_get_data (xml, NULL), (gssize) g_bytes_get_size (xml), "ref="));
  g_assert_null (g_strstr_len (g_bytes_get_data (fits, NULL), (gssize) g_bytes_get_size (fits), "TIMESYS"));
}

static void
test_same_bytes (void)
{
  for (AntTableFormat format = 0; format < ANT_N_TABLE_FORMATS; format++)
    {
      g_autoptr (AntRecord) record = record_of (ANT_SCALE_UTC);
      g_autoptr (AntTable) table = table_of (record, 3);
      g_autoptr (GBytes) one = ant_table_bytes (table, format, NULL), two = ant_table_bytes (table, format, NULL);
      g_assert_true (g_bytes_equal (one, two));
    }
}

static void
test_endings (void)
{
  static const struct { const char *path; AntTableFormat format; } good[] = {
    { "a.csv", ANT_TABLE_CSV }, { "/b/A.FITS", ANT_TABLE_FITS }, { "a.fit", ANT_TABLE_FITS }, { "a.vot", ANT_TABLE_VOTABLE }, { "a.xml", ANT_TABLE_VOTABLE }
  };
  AntTableFormat format;
  g_autoptr (GError) error = NULL;
  for (gsize i = 0; i < G_N_ELEMENTS (good); i++)
    {
      g_assert_true (ant_table_format_of (good[i].path, &format, NULL));
      g_assert_cmpint (format, ==, good[i].format);
    }
  g_assert_false (ant_table_format_of ("table.txt", &format, &error));
  g_assert_nonnull (strstr (error->message, "table.txt"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/writers/table/fits-checksums-hold", test_checksums);
  g_test_add_func ("/writers/table/fits-cards-pass-the-library's-tests", test_cards);
  g_test_add_func ("/writers/table/fits-columns-have-their-types", test_types);
  g_test_add_func ("/writers/table/fits-cells-come-back-to-the-bit", test_cells);
  g_test_add_func ("/writers/table/fits-tells-the-time-scale", test_times);
  g_test_add_func ("/writers/table/fits-tells-facts-units-and-ucds", test_facts);
  g_test_add_func ("/writers/table/csv-has-the-digits-asked-for", test_csv);
  g_test_add_func ("/writers/table/votable-escapes-and-refers", test_votable);
  g_test_add_func ("/writers/table/no-origin-no-time-system", test_unknown_origin);
  g_test_add_func ("/writers/table/same-table-same-bytes", test_same_bytes);
  g_test_add_func ("/writers/table/an-ending-tells-the-format", test_endings);
  return g_test_run ();
}
