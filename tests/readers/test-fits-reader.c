/* test-fits-reader.c - tables of FITS files: columns, cells, keywords of time, and what is refused. */
#include <gio/gio.h>
#include <glib/gstdio.h>

#include "fits-making.h"
#include "reading.h"

#define N 60

static AntRecord *
read_bytes (const guint8 *bytes, gsize n, const AntReadingChoices *choices)
{
  g_autoptr (GError) error = NULL;
  AntRecord *record = ant_reader_read_bytes ("trial.fits", bytes, n, choices, &error);
  g_assert_no_error (error);
  return record;
}

static AntRecord *
finish (Making *making)
{
  gsize n;
  g_autofree guint8 *bytes = making_end (making, &n);
  return read_bytes (bytes, n, NULL);
}

static char *
refusal (const guint8 *bytes, gsize n, const AntReadingChoices *choices)
{
  g_autoptr (GError) error = NULL;
  g_assert_null (ant_reader_read_bytes ("trial.fits", bytes, n, choices, &error));
  g_assert_nonnull (error);
  g_assert_null (strchr (error->message, '\n'));
  return g_strdup (error->message);
}

/* TIME (form, unit), RATE and further columns with values that show their row. */
static void
start_series (Making *making, const char *form, const char *unit, double first, double step)
{
  const char *const names[] = { "TIME", "RATE" }, *const forms[] = { form, "1D" }, *const units[] = { unit, "W/m**2" };
  double time[N], rate[N];
  for (int i = 0; i < N; i++)
    {
      time[i] = first + step * i;
      rate[i] = 1361.0 + 0.001 * i + 1e-9 * i * i;
    }
  making_start (making);
  making_table (making, "RATES", BINARY_TBL, N, 2, names, forms, units);
  making_numbers (making, 1, N, time);
  making_numbers (making, 2, N, rate);
}

static void
assert_utc (const AntRecord *record, gsize row, const char *expected)
{
  g_autofree char *utc = ant_time_reference_utc_text (&record->time, record->time_d[row], 6);
  g_assert_cmpstr (utc, ==, expected);
}

static void
a_table_is_read_to_the_last_bit (void)
{
  Making making;
  start_series (&making, "1D", "s", 0.0, 60.0);
  g_autoptr (AntRecord) record = finish (&making);
  g_assert_cmpstr (record->format, ==, "FITS");
  g_assert_cmpstr (record->part, ==, "HDU 1 (RATES)");
  g_assert_cmpstr (record->value_name, ==, "RATE");
  g_assert_cmpstr (record->value_unit, ==, "W/m2");
  g_assert_cmpuint (record->n_rows, ==, N);
  for (gsize i = 0; i < N; i++)
    {
      g_assert_true (record->value[i] == 1361.0 + 0.001 * (double) i + 1e-9 * (double) i * (double) i);
      g_assert_cmpfloat_with_epsilon (record->time_d[i], (double) i * 60.0 / 86400.0, 1e-15);
      g_assert_cmpuint (record->line[i], ==, i + 1);
    }
  g_assert_false (record->time.origin_known);
}

static void
whole_and_fraction_of_the_epoch_are_kept_apart (void)
{
  Making making;
  start_series (&making, "1D", "s", 3e8 + 0.25, 1.0);
  making_number_key (&making, "MJDREFI", 51910);
  making_number_key (&making, "MJDREFF", 7.428703703703703e-4); /* 64.184 s: TT - UTC at 2001-01-01 */
  making_text_key (&making, "TIMESYS", "TT");
  g_autoptr (AntRecord) record = finish (&making);
  g_assert_cmpint (record->time.scale, ==, ANT_SCALE_TT);
  g_assert_false (record->time.scale_assumed);
  /* 3e8 s after 2001-01-01T00:00:00 UTC, less the leap seconds of 2005 and 2008 */
  assert_utc (record, 0, "2010-07-05T05:19:58.250000Z");
  assert_utc (record, 1, "2010-07-05T05:19:59.250000Z");
}

static void
epochs_go_by_their_precedence (void)
{
  static const struct
  {
    const char *key;
    double number;
    const char *text, *expected;
  } keys[] = { { "DATEREF", 0.0, "2020-01-01T12:00:00", "2020-01-01T12:00:00.000000Z" },
               { "JDREF", 2458850.5, NULL, "2020-01-02T00:00:00.000000Z" },
               { "MJDREF", 58851.0, NULL, "2020-01-03T00:00:00.000000Z" },
               { "MJDREFI", 58852.0, NULL, "2020-01-04T00:00:00.000000Z" } };
  for (gsize last = 0; last < G_N_ELEMENTS (keys); last++)
    {
      Making making;
      start_series (&making, "1D", "s", 0.0, 10.0);
      making_text_key (&making, "TIMESYS", "UTC");
      for (gsize k = 0; k <= last; k++)
        if (keys[k].text)
          making_text_key (&making, keys[k].key, keys[k].text);
        else
          making_number_key (&making, keys[k].key, keys[k].number);
      g_autoptr (AntRecord) record = finish (&making);
      assert_utc (record, 0, keys[last].expected);
    }
}

static void
offsets_units_and_stamps_are_obeyed (void)
{
  Making making;
  start_series (&making, "1D", "", 0.0, 2.0);
  making_text_key (&making, "TIMESYS", "TAI");
  making_text_key (&making, "TIMEUNIT", "min");
  making_number_key (&making, "MJDREF", 58849.0); /* 2020-01-01 */
  making_number_key (&making, "TIMEOFFS", 3.0);
  making_number_key (&making, "TIMEZERO", 4.0);
  making_number_key (&making, "TIMEPIXR", 1.0);
  making_number_key (&making, "TIMEDEL", 2.0);
  making_text_key (&making, "TREFPOS", "GEOCENTER");
  g_autoptr (AntRecord) record = finish (&making);
  assert_utc (record, 0, "2020-01-01T00:06:23.000000Z"); /* 7 min, less TAI - UTC = 37 s */
  assert_utc (record, 1, "2020-01-01T00:08:23.000000Z");
  g_assert_cmpint (record->stamp, ==, ANT_AT_END);
  g_assert_true (record->exposure_known);
  g_assert_cmpfloat_with_epsilon (record->exposure_d, 120.0 / 86400.0, 1e-15);
  g_assert_cmpstr (record->time.place, ==, "geocentre");
}

static void
a_column_overrules_the_header (void)
{
  Making making;
  start_series (&making, "1D", "s", 0.0, 1.0);
  making_text_key (&making, "TIMESYS", "UTC");
  making_number_key (&making, "MJDREF", 58849.0);
  making_text_key (&making, "TREFPOS", "TOPOCENTER");
  making_text_key (&making, "TCTYP1", "TDB");
  making_text_key (&making, "TCUNI1", "d");
  making_text_key (&making, "TRPOS1", "BARYCENTER");
  g_autoptr (AntRecord) record = finish (&making);
  g_assert_cmpint (record->time.scale, ==, ANT_SCALE_TDB);
  g_assert_cmpstr (record->time.place, ==, "barycentre");
  g_assert_cmpfloat (record->time_d[N - 1], ==, N - 1.0);
}

static void
seconds_over_a_leap_second_are_counted (void)
{
  Making making;
  start_series (&making, "1D", "s", 0.0, 1.0);
  making_text_key (&making, "TIMESYS", "UTC");
  making_text_key (&making, "DATEREF", "2016-12-31T23:59:58");
  g_autoptr (AntRecord) record = finish (&making);
  assert_utc (record, 2, "2016-12-31T23:59:60.000000Z");
  assert_utc (record, 3, "2017-01-01T00:00:00.000000Z");
}

static void
no_epoch_leaves_the_start_of_the_observation (void)
{
  Making making;
  start_series (&making, "1I", "MIN", 0.0, 1.0);
  making_text_key (&making, "DATE-OBS", "01/06/2012");
  making_text_key (&making, "TIME-OBS", "00:00:01.500");
  g_autoptr (AntRecord) record = finish (&making);
  assert_utc (record, 1, "2012-06-01T00:01:01.500000Z");
  g_assert_true (was_said (record, "assumed to count from DATE-OBS"));
  g_assert_true (record->time.scale_assumed);
}

static void
a_time_in_two_parts_keeps_all_digits (void)
{
  const char *const names[] = { "time", "flux" }, *const forms[] = { "2D", "1D" }, *const units[] = { "d", "" };
  double time[2 * N], flux[N];
  Making making;
  for (int i = 0; i < N; i++)
    {
      time[2 * i] = 2460000.0 + i;
      time[2 * i + 1] = -0.4 + i / 1024.0;
      flux[i] = 1.0 + 1e-5 * i;
    }
  making_start (&making);
  making_table (&making, NULL, BINARY_TBL, N, 2, names, forms, units);
  making_numbers (&making, 1, 2 * N, time);
  making_numbers (&making, 2, N, flux);
  making_text_key (&making, "TIMESYS", "TDB");
  making_number_key (&making, "JDREF", 0.0);
  g_autoptr (AntRecord) record = finish (&making);
  g_assert_cmpstr (record->time_name, ==, "time[1] + time[2]");
  for (int i = 1; i < N; i++)
    g_assert_cmpfloat_with_epsilon (record->time_d[i] - record->time_d[0], i + i / 1024.0, 1e-13);
  g_assert_cmpfloat_with_epsilon (ant_time_reference_jd (&record->time, record->time_d[0]), 2459999.6, 1e-9);
}

/* One row whose cells hold all; bands first or samples first. */
static void
series_in_the_cells_of_one_row_are_unrolled (void)
{
  for (int samples_first = 0; samples_first < 2; samples_first++)
    {
      const char *const names[] = { "TIME", "FLUX", "NOTE" }, *const forms[] = { "60D", "120E", "1E" };
      double time[N], flux[2 * N];
      Making making;
      int status = 0;
      long axes[2] = { samples_first ? N : 2, samples_first ? 2 : N };
      for (int i = 0; i < N; i++)
        {
          time[i] = 2.0 * i;
          flux[samples_first ? i : 2 * i] = 100.0 + i;
          flux[samples_first ? N + i : 2 * i + 1] = 500.0 - i;
        }
      making_start (&making);
      making_table (&making, "FLUXES", BINARY_TBL, 1, 3, names, forms, NULL);
      fits_write_tdim (making.file, 2, 2, axes, &status);
      must (status);
      making_numbers (&making, 1, N, time);
      making_numbers (&making, 2, 2 * N, flux);
      making_number_key (&making, "MJDREF", 58849.0);
      g_autoptr (AntRecord) record = finish (&making);
      g_assert_cmpuint (record->n_rows, ==, N);
      g_assert_cmpstr (record->value_name, ==, "FLUX[1]");
      const AntColumn *second = g_ptr_array_index (record->columns, 0);
      g_assert_cmpstr (second->name, ==, "FLUX[2]");
      for (int i = 0; i < N; i++)
        {
          g_assert_cmpfloat (record->value[i], ==, 100.0 + i);
          g_assert_cmpfloat (second->value[i], ==, 500.0f - (float) i);
          g_assert_cmpfloat_with_epsilon (record->time_d[i], 2.0 * i / 86400.0, 1e-15);
        }
      g_assert_true (was_said (record, "NOTE"));
    }
}

static void
scaled_whole_numbers_and_nulls_are_values_and_fills (void)
{
  const char *const names[] = { "MJD", "TSI", "ERROR", "FLAG" }, *const forms[] = { "1D", "1I", "1E", "1J" };
  double mjd[N], tsi[N], error[N], flag[N];
  Making making;
  int status = 0;
  short null = -32768, raw = null;
  for (int i = 0; i < N; i++)
    {
      mjd[i] = 60000.0 + i;
      tsi[i] = 1361.0 + 0.01 * i;
      error[i] = 0.1;
      flag[i] = i % 7 == 0 ? 65536.0 : 0.0;
    }
  making_start (&making);
  making_table (&making, NULL, BINARY_TBL, N, 4, names, forms, NULL);
  making_number_key (&making, "TSCAL2", 0.01);
  making_number_key (&making, "TZERO2", 1361.0);
  fits_update_key (making.file, TSHORT, "TNULL2", &null, NULL, &status);
  fits_set_hdustruc (making.file, &status);
  making_numbers (&making, 1, N, mjd);
  making_numbers (&making, 2, N, tsi);
  making_numbers (&making, 3, N, error);
  making_numbers (&making, 4, N, flag);
  fits_set_tscale (making.file, 2, 1.0, 0.0, &status);
  fits_write_col (making.file, TSHORT, 2, 5, 1, 1, &raw, &status);
  must (status);
  g_autoptr (AntRecord) record = finish (&making);
  g_assert_cmpint (record->time.style, ==, ANT_STAMP_JD);
  g_assert_true (isnan (record->value[4]));
  g_assert_cmpint (record->flags[4], ==, ANT_FLAG_FILL);
  g_assert_cmpfloat (record->value[5], ==, 5 * 0.01 + 1361.0);
  g_assert_cmpint (record->quality[7], ==, 65536);
  g_assert_cmpstr (record->error_name, ==, "ERROR");
}

static void
year_day_and_second_make_a_time (void)
{
  const char *const names[] = { "RATE", "YEAR", "DOY", "SOD" }, *const forms[] = { "1E", "1I", "1I", "1D" };
  double rate[N], year[N], day[N], second[N];
  Making making;
  for (int i = 0; i < N; i++)
    {
      rate[i] = 10.0 + i % 5;
      year[i] = 2011.0;
      day[i] = 46.0;
      second[i] = 6250.25 + 0.25 * i;
    }
  making_start (&making);
  making_table (&making, NULL, BINARY_TBL, N, 4, names, forms, NULL);
  making_numbers (&making, 1, N, rate);
  making_numbers (&making, 2, N, year);
  making_numbers (&making, 3, N, day);
  making_numbers (&making, 4, N, second);
  g_autoptr (AntRecord) record = finish (&making);
  assert_utc (record, 0, "2011-02-15T01:44:10.250000Z");
  assert_utc (record, N - 1, "2011-02-15T01:44:25.000000Z");
}

static void
dates_as_text_are_read_in_either_kind_of_table (void)
{
  static const int types[] = { BINARY_TBL, ASCII_TBL };
  for (gsize t = 0; t < G_N_ELEMENTS (types); t++)
    {
      const char *const names[] = { "DATE", "RATE" };
      const char *const binary[] = { "24A", "1D" }, *const ascii[] = { "A24", "D25.17" };
      Making making;
      int status = 0;
      making_start (&making);
      making_table (&making, "RATES", types[t], N, 2, names, types[t] == BINARY_TBL ? binary : ascii, NULL);
      making_text_key (&making, "TIMESYS", "TT");
      for (int i = 0; i < N; i++)
        {
          g_autofree char *date = g_strdup_printf ("2021-05-09T%02d:%02d:00.500", i / 60, i % 60);
          double rate = 1361.0 + i;
          fits_write_col (making.file, TSTRING, 1, i + 1, 1, 1, &date, &status);
          fits_write_col (making.file, TDOUBLE, 2, i + 1, 1, 1, &rate, &status);
        }
      must (status);
      g_autoptr (AntRecord) record = finish (&making);
      g_assert_cmpint (record->time.scale, ==, ANT_SCALE_TT);
      g_assert_cmpfloat (record->value[N - 1], ==, 1361.0 + N - 1);
      g_assert_cmpfloat_with_epsilon (record->time_d[1], 60.5 / 86400.0, 1e-15);
    }
}

/* A table without a time, two with. */
static guint8 *
three_tables (gsize *n)
{
  const char *const names[] = { "ENERGY", "WIDTH" }, *const forms[] = { "1D", "1D" };
  const char *const time_names[] = { "TIME", "RATE" };
  Making making;
  making_start (&making);
  making_table (&making, "BOUNDS", BINARY_TBL, 3, 2, names, forms, NULL);
  for (int t = 0; t < 2; t++)
    {
      double time[N], rate[N];
      for (int i = 0; i < N; i++)
        {
          time[i] = i;
          rate[i] = 100.0 * (t + 1) + i;
        }
      making_table (&making, t ? "SECOND" : "FIRST", BINARY_TBL, N, 2, time_names, forms, NULL);
      making_numbers (&making, 1, N, time);
      making_numbers (&making, 2, N, rate);
    }
  return making_end (&making, n);
}

static void
the_first_table_with_a_time_is_read_unless_another_is_asked_for (void)
{
  gsize n;
  g_autofree guint8 *bytes = three_tables (&n);
  g_autoptr (AntRecord) first = read_bytes (bytes, n, NULL);
  g_assert_cmpstr (first->part, ==, "HDU 2 (FIRST)");
  char second[] = "second", number[] = "3", none[] = "THIRD", bounds[] = "1";
  AntReadingChoices by_name = { .hdu = second }, by_number = { .hdu = number }, wrong = { .hdu = none }, timeless = { .hdu = bounds };
  g_autoptr (AntRecord) named = read_bytes (bytes, n, &by_name);
  g_autoptr (AntRecord) numbered = read_bytes (bytes, n, &by_number);
  g_assert_cmpfloat (named->value[0], ==, 200.0);
  g_assert_cmpfloat (numbered->value[0], ==, 200.0);
  g_autofree char *unknown = refusal (bytes, n, &wrong);
  g_assert_nonnull (strstr (unknown, "THIRD"));
  g_autofree char *no_time = refusal (bytes, n, &timeless);
  g_assert_nonnull (strstr (no_time, "HDU 1 (BOUNDS): found columns ENERGY, WIDTH"));
}

static void
packed_plain_and_on_disk_it_is_the_same_record (void)
{
  gsize n;
  g_autofree guint8 *bytes = three_tables (&n);
  g_autoptr (GConverter) packer = G_CONVERTER (g_zlib_compressor_new (G_ZLIB_COMPRESSOR_FORMAT_GZIP, -1));
  g_autofree guint8 *packed = g_malloc (2 * n);
  gsize n_read, n_packed;
  g_assert_cmpint (g_converter_convert (packer, bytes, n, packed, 2 * n, G_CONVERTER_INPUT_AT_END, &n_read, &n_packed, NULL), ==,
                   G_CONVERTER_FINISHED);
  g_autofree char *folder = g_dir_make_tmp (NULL, NULL);
  g_autofree char *path = g_build_filename (folder, "trial[1].fits", NULL); /* CFITSIO's own file names would trip over it */
  g_assert_true (g_file_set_contents (path, (char *) bytes, (gssize) n, NULL));
  g_autoptr (AntRecord) plain = read_bytes (bytes, n, NULL);
  g_autoptr (AntRecord) unpacked = read_bytes (packed, n_packed, NULL);
  g_autoptr (AntRecord) on_disk = ant_reader_open (path, NULL, NULL, NULL);
  g_unlink (path);
  g_rmdir (folder);
  g_assert_nonnull (on_disk);
  g_assert_cmpmem (plain->value, N * sizeof (double), unpacked->value, N * sizeof (double));
  g_assert_cmpmem (plain->value, N * sizeof (double), on_disk->value, N * sizeof (double));
  g_assert_cmpstr (plain->sha256, ==, on_disk->sha256);
  g_assert_cmpstr (plain->sha256, !=, unpacked->sha256);
}

static void
a_file_cut_off_is_refused_with_its_hdu (void)
{
  gsize n;
  g_autofree guint8 *bytes = three_tables (&n);
  char second[] = "SECOND";
  AntReadingChoices choices = { .hdu = second };
  g_autofree char *said = refusal (bytes, n - 2880, &choices);
  g_assert_nonnull (strstr (said, "HDU 3 (SECOND): found 60 rows of 16 bytes in the header, expected at most 0"));
}

static void
a_header_that_promises_too_much_is_refused (void)
{
  gsize n;
  g_autofree guint8 *bytes = three_tables (&n);
  char *rows = NULL;
  for (gsize at = 0; at + 30 < n && !rows; at += 80)
    if (!memcmp (bytes + at, "NAXIS2  =                   60", 30))
      rows = (char *) bytes + at + 10;
  g_assert_nonnull (rows);
  memcpy (rows, "          9999999999", 20);
  char first[] = "FIRST";
  AntReadingChoices choices = { .hdu = first };
  g_autofree char *said = refusal (bytes, n, &choices);
  g_assert_nonnull (strstr (said, "expected"));
}

static void
pictures_alone_are_no_record (void)
{
  Making making;
  gsize n;
  making_start (&making);
  g_autofree guint8 *bytes = making_end (&making, &n);
  g_autofree char *said = refusal (bytes, n, NULL);
  g_assert_nonnull (strstr (said, "HDU 0: found no table"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define ADD(path, function) g_test_add_func ("/readers/fits-reader/" path, function)
  ADD ("a-table-is-read-to-the-last-bit", a_table_is_read_to_the_last_bit);
  ADD ("whole-and-fraction-of-the-epoch-are-kept-apart", whole_and_fraction_of_the_epoch_are_kept_apart);
  ADD ("epochs-go-by-their-precedence", epochs_go_by_their_precedence);
  ADD ("offsets-units-and-stamps-are-obeyed", offsets_units_and_stamps_are_obeyed);
  ADD ("a-column-overrules-the-header", a_column_overrules_the_header);
  ADD ("seconds-over-a-leap-second-are-counted", seconds_over_a_leap_second_are_counted);
  ADD ("no-epoch-leaves-the-start-of-the-observation", no_epoch_leaves_the_start_of_the_observation);
  ADD ("a-time-in-two-parts-keeps-all-digits", a_time_in_two_parts_keeps_all_digits);
  ADD ("series-in-the-cells-of-one-row-are-unrolled", series_in_the_cells_of_one_row_are_unrolled);
  ADD ("scaled-whole-numbers-and-nulls-are-values-and-fills", scaled_whole_numbers_and_nulls_are_values_and_fills);
  ADD ("year-day-and-second-make-a-time", year_day_and_second_make_a_time);
  ADD ("dates-as-text-are-read-in-either-kind-of-table", dates_as_text_are_read_in_either_kind_of_table);
  ADD ("the-first-table-with-a-time-is-read-unless-another-is-asked-for", the_first_table_with_a_time_is_read_unless_another_is_asked_for);
  ADD ("packed-plain-and-on-disk-it-is-the-same-record", packed_plain_and_on_disk_it_is_the_same_record);
  ADD ("a-file-cut-off-is-refused-with-its-hdu", a_file_cut_off_is_refused_with_its_hdu);
  ADD ("a-header-that-promises-too-much-is-refused", a_header_that_promises_too_much_is_refused);
  ADD ("pictures-alone-are-no-record", pictures_alone_are_no_record);
  return g_test_run ();
}
