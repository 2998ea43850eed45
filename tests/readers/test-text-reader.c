/* test-text-reader.c - the dialects of text tables all come to the same record, and what was assumed is said. */
#include "reading.h"

#include <fcntl.h>
#include <glib/gstdio.h>
#include <unistd.h>
#include <zlib.h>

static void
every_dialect_gives_the_same_record (void)
{
  static const char *const dialects[] = {
    "JD,value,error\n2451639.5,1361.25,0.5\n2451640.5,1361.5,0.5\n2451641.5,1362,0.25\n",
    "JD;value;error\n2451639.5;1361.25;0.5\n2451640.5;1361.5;0.5\n2451641.5;1362;0.25\n",
    "JD\tvalue\terror\n2451639.5\t1361.25\t0.5\n2451640.5\t1361.5\t0.5\n2451641.5\t1362\t0.25\n",
    "JD value error\n2451639.5 1361.25 0.5\n 2451640.5   1361.5 0.5 \n2451641.5\t1362 0.25",
    "JD,value,error\r\n2451639.5,1361.25,0.5\r\n2451640.5,1361.5,0.5\r\n2451641.5,1362,0.25\r\n",
    "# JD value error\n2451639.5 1361.25 0.5\n# a remark\n2451640.5 1361.5 0.5\n\n2451641.5 1362 0.25\n",
    "; written by hand\n;JD, value, error\n2451639.5, 1361.25, 0.5\n2451640.5, 1361.5, 0.5\n2451641.5, 1362, 0.25\n",
    "% JD value error\n2451639.5 1361.25 0.5\n2451640.5 1361.5 0.5\n2451641.5 1362 0.25\n",
    "! JD value error\n2451639.5 1361.25 0.5\n2451640.5 1361.5 0.5\n2451641.5 1362 0.25\n",
    "3 ; header lines\n2000 a year in the prose\nJD value error\n2451639.5 1361.25 0.5\n2451640.5 1361.5 0.5\n2451641.5 1362 0.25\n",
    "3\nmade by hand in a quiet hour\nJD value error\n2451639.5 1361.25 0.5\n2451640.5 1361.5 0.5\n2451641.5 1362 0.25\n",
    "A record\nversion: 3\nJD     value   error\n2451639.5 1361.25 0.5\n2451640.5 1361.5 0.5\n2451641.5 1362 0.25\n",
    "JD,value,error\n2.4516395E+06,1.36125e3,5e-1\n2.4516405D6,1.3615D+03,.5\n2451641.5,1362.,0.25\n",
    "\"JD\",\"value\",\"error\"\n\"2451639.5\",\"1361.25\",\"0.5\"\n2451640.5,1361.5,0.5\n2451641.5,1362,0.25\n",
    "\xef\xbb\xbfJD,value,error\n2451639.5,1361.25,0.5\n2451640.5,1361.5,0.5\n2451641.5,1362,0.25\n",
  };
  static const double values[] = { 1361.25, 1361.5, 1362.0 }, errors[] = { 0.5, 0.5, 0.25 };
  for (gsize d = 0; d < G_N_ELEMENTS (dialects); d++)
    {
      g_test_message ("%s", dialects[d]);
      g_autoptr (AntRecord) record = read_text (dialects[d]);
      g_assert_cmpuint (record->n_rows, ==, 3);
      for (gsize i = 0; i < 3; i++)
        {
          g_assert_cmpfloat (record->value[i], ==, values[i]);
          g_assert_cmpfloat (record->error[i], ==, errors[i]);
          g_assert_cmpfloat (record->time_d[i], ==, (double) i);
          g_assert_cmpuint (record->flags[i], ==, 0);
        }
      g_assert_cmpstr (record->time_name, ==, "JD");
      g_assert_cmpstr (record->value_name, ==, "value");
      g_assert_cmpstr (record->error_name, ==, "error");
      g_assert_null (record->quality_name);
      g_assert_cmpstr (record->format, ==, "text");
    }
}

static void
a_table_without_header_is_read_by_position (void)
{
  g_autoptr (AntRecord) record = read_text ("0.5 1361.25 7\n1.5 1361.5 7\n2.5 1362 9\n");
  g_assert_cmpuint (record->n_rows, ==, 3);
  g_assert_cmpstr (record->time_name, ==, "column 1");
  g_assert_cmpfloat (record->value[2], ==, 1362.0);
  g_assert_false (record->time.origin_known);
  g_assert_null (record->error);
}

static void
numbered_lines_of_prose_name_the_columns (void)
{
  g_autoptr (AntRecord) record = read_text (" 5  ;number of comment lines\n;1st col: Date (YYYYMMDD)\n;2nd col: Mean Time (hhmmss)\n"
                                            ";3rd col: TSI (Wm-2) as at 1 au\n;Missing values are indicated by -99.\n"
                                            "        one         two\n"
                                            "19960130 002920 1365.25\n19960130 012920 -99.000\n19960130 022920 1365.50\n");
  g_assert_cmpstr (record->value_name, ==, "TSI (Wm-2)");
  g_assert_cmpstr (record->value_unit, ==, "W/m2");
  g_assert_cmpuint (count_flag (record, ANT_FLAG_FILL), ==, 1);
  g_assert_true (was_said (record, "as at 1 au"));
  g_assert_true (was_said (record, "1 values are the stated fill value -99"));
  g_assert_cmpfloat_with_epsilon (record->time_d[0], 1760.0 / 86400.0, 1e-12);
}

static void
columns_are_taken_by_name_or_number (void)
{
  const char *text = "a,b,c,d\n1,2451639.5,1361.25,5\n2,2451640.5,1361.5,6\n3,2451641.5,1362,7\n";
  AntReadingChoices choices = { 0 };
  g_assert_true (ant_reading_choices_parse_columns (&choices, "time=b,value=3,quality=D,error=1", NULL));
  g_autoptr (AntRecord) record = read_with (text, &choices);
  g_assert_cmpfloat (record->value[1], ==, 1361.5);
  g_assert_cmpint (record->quality[2], ==, 7);
  g_assert_cmpfloat (record->error[1], ==, 2.0);
  g_assert_cmpfloat (record->time_d[2], ==, 2.0);
  ant_reading_choices_clear (&choices);
}

static void
other_columns_of_numbers_are_kept_in_order (void)
{
  g_autoptr (AntRecord) record
      = read_text ("JD,row,temperature [K],tsi,tsi_error,words,empty,pressure\n2451639.5,5,290.5,1361.25,0.5,a,,-9999.9\n"
                   "2451640.5,5,290.75,1361.5,0.5,b,,3\n2451641.5,5,,1361.75,0.5,c,,3.5\n");
  static const char *const names[] = { "row", "tsi", "pressure" };
  g_assert_cmpstr (record->value_name, ==, "temperature [K]");
  g_assert_cmpuint (record->columns->len, ==, G_N_ELEMENTS (names));
  for (guint i = 0; i < G_N_ELEMENTS (names); i++)
    g_assert_cmpstr (((AntColumn *) g_ptr_array_index (record->columns, i))->name, ==, names[i]);
  const AntColumn *tsi = g_ptr_array_index (record->columns, 1), *pressure = g_ptr_array_index (record->columns, 2);
  g_assert_cmpfloat (tsi->value[1], ==, 1361.5f);
  g_assert_cmpuint (tsi->n_missing, ==, 0);
  g_assert_true (isnan (pressure->value[0])); /* a fill */
  g_assert_cmpuint (pressure->n_missing, ==, 1);
}

static void
a_column_that_is_not_there_is_named_with_those_that_are (void)
{
  char wanted[] = "tsi";
  AntReadingChoices choices = { .value_column = wanted };
  g_autoptr (GError) error = NULL;
  const char *text = "JD,value\n2451639.5,1361\n2451640.5,1362\n";
  g_assert_null (ant_reader_read_bytes ("trial.txt", text, strlen (text), &choices, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_USAGE);
  g_assert_nonnull (strstr (error->message, "“tsi”"));
  g_assert_nonnull (strstr (error->message, "JD, value"));
}

static void
a_julian_date_is_taken_before_decimal_years (void)
{
  g_autoptr (AntRecord) record = read_text ("Time_dec Time_JD TSI[W.m2] Unc\n1.9801287e3 2.444287e6 1361.4 1e-3\n"
                                            "1.9801314e3 2.444288e6 1361.5 1e-3\n1.9801341e3 2.444289e6 1361.6 1e-3\n");
  g_assert_cmpstr (record->time_name, ==, "Time_JD");
  g_assert_cmpstr (record->value_unit, ==, "W/m2");
  g_assert_cmpstr (record->error_name, ==, "Unc");
  g_assert_true (was_said (record, "before the decimal years"));
}

static void
the_first_column_with_enough_values_is_the_value (void)
{
  g_autoptr (GString) text = g_string_new ("time,row,empty,late,good\n");
  for (int i = 0; i < 100; i++)
    g_string_append_printf (text, "%d,7,,%s,%d\n", i, i > 60 ? "5.5" : "", 1361 + i % 3);
  g_autoptr (AntRecord) record = read_text (text->str);
  g_assert_cmpstr (record->value_name, ==, "good");
}

static void
a_column_empty_at_first_is_still_found (void)
{
  g_autoptr (GString) text = g_string_new ("time,late,other\n");
  for (int i = 0; i < 100000; i++)
    g_string_append_printf (text, "%d,%s,%d\n", i, i < 40000 ? "" : i % 2 ? "1361.5" : "1361.25", 3 + i % 3);
  g_autoptr (AntRecord) record = read_text (text->str);
  g_assert_cmpstr (record->value_name, ==, "late");
  g_assert_cmpuint (count_flag (record, ANT_FLAG_FILL), ==, 40000);
}

static void
fills_far_from_all_else_are_flagged_and_counted (void)
{
  static const char *const fills[] = { "-99", "-9999.9", "-1e34", "65535", "0.0", "-7999", "-999", "-1" };
  for (gsize f = 0; f < G_N_ELEMENTS (fills); f++)
    {
      g_autoptr (GString) text = g_string_new ("JD value\n");
      for (int i = 0; i < 50; i++)
        g_string_append_printf (text, "%d.5 %s\n", 2451639 + i, i % 5 == 2 ? fills[f] : i % 2 ? "1361.2" : "1361.9");
      g_autoptr (AntRecord) record = read_text (text->str);
      g_test_message ("%s", fills[f]);
      g_assert_cmpuint (count_flag (record, ANT_FLAG_FILL), ==, 10);
      g_assert_true (isnan (record->value[2]));
      g_assert_true (was_said (record, "10 values are"));
    }
}

static void
numbers_among_the_others_are_no_fills (void)
{
  g_autoptr (GString) text = g_string_new ("time ppm\n");
  for (int i = 0; i < 200; i++)
    g_string_append_printf (text, "%d %d\n", i, i % 20 == 0 ? 0 : i % 20 == 1 ? -99 : (i * 37) % 300 - 150);
  g_autoptr (AntRecord) record = read_text (text->str);
  g_assert_cmpuint (count_flag (record, ANT_FLAG_FILL), ==, 0);
}

static void
a_single_zero_may_be_a_measurement (void)
{
  g_autoptr (GString) text = g_string_new ("JD value\n");
  for (int i = 0; i < 50; i++)
    g_string_append_printf (text, "%d.5 %s\n", 2451639 + i, i == 20 ? "0" : i % 2 ? "1361.2" : "1361.9");
  g_autoptr (AntRecord) record = read_text (text->str);
  g_assert_cmpuint (count_flag (record, ANT_FLAG_FILL), ==, 0);
}

static void
the_user_may_name_fills (void)
{
  AntReadingChoices choices = { .fill_values = g_array_new (FALSE, FALSE, sizeof (double)) };
  double fill = 1361.5;
  g_array_append_val (choices.fill_values, fill);
  g_autoptr (AntRecord) record = read_with ("JD value\n2451639.5 1361.5\n2451640.5 1361.2\n2451641.5 1361.7\n", &choices);
  g_assert_cmpuint (record->flags[0], ==, ANT_FLAG_FILL);
  g_assert_cmpuint (record->flags[1], ==, 0);
  ant_reading_choices_clear (&choices);
}

static void
empty_cells_and_nan_are_missing (void)
{
  g_autoptr (AntRecord) record = read_text ("JD,value,x\n2451639.5,,1\n2451640.5,NaN,1\n2451641.5,-,1\n2451642.5,1361,1\n"
                                            "2451643.5,1361.5,1\n2451644.5,1361.5,1\n2451645.5,1361.5,1\n");
  g_assert_cmpuint (count_flag (record, ANT_FLAG_FILL), ==, 3);
  g_assert_true (was_said (record, "3 values are empty or not numbers"));
}

static void
quality_keeps_64_bits_and_unreadable_ones_are_bad (void)
{
  g_autoptr (AntRecord) record = read_text ("utc,irradiance,qualityflags\n2021-05-09 00:07:09.589416,1361.1,2416017424\n"
                                            "2021-05-09 00:07:59.588492,1361.2,9007199254740993\n2021-05-09 00:08:49.58,1361.3,\n"
                                            "2021-05-09 00:09:49.58,1361.3,0\n");
  g_assert_cmpstr (record->quality_name, ==, "qualityflags");
  g_assert_cmpint (record->quality[0], ==, 2416017424);
  g_assert_cmpint (record->quality[1], ==, 9007199254740993);
  g_assert_cmpint (record->quality[2], ==, -1);
  g_assert_true (was_said (record, "1 qualities"));
}

static void
lines_of_another_width_are_left_out_and_said (void)
{
  g_autoptr (GString) text = g_string_new ("JD,value\n");
  for (int i = 0; i < 100; i++)
    g_string_append_printf (text, "%d.5,%d%s\n", 2451639 + i, 1361 + i % 2, i == 50 ? ",7" : "");
  g_autoptr (AntRecord) record = read_text (text->str);
  g_assert_cmpuint (record->n_rows, ==, 99);
  g_assert_cmpuint (record->line[50], ==, 53);
  g_assert_true (was_said (record, "the first is line 52"));
}

static void
rows_keep_their_line_numbers (void)
{
  g_autoptr (AntRecord) record = read_text ("# a\n\nJD value\n2451639.5 1361\n\n# b\n2451640.5 1362\n");
  g_assert_cmpuint (record->line[0], ==, 4);
  g_assert_cmpuint (record->line[1], ==, 7);
}

static void
rows_without_time_are_flagged (void)
{
  g_autoptr (AntRecord) record = read_text ("JD,value\n2451639.5,1361\nNaN,1362\n2451641.5,1361\n1e300,1361\ninf,1361\n2451642.5,1361\n"
                                            "2451643.5,1361\n");
  g_assert_cmpuint (count_flag (record, ANT_FLAG_NO_TIME), ==, 3);
  g_assert_true (was_said (record, "3 rows have no readable time, the first is line 3"));
}

static void
append_gzip (GByteArray *packed, const char *text)
{
  guint8 buffer[65536];
  z_stream deflater = { 0 };
  g_assert_cmpint (deflateInit2 (&deflater, 6, Z_DEFLATED, 15 + 16, 8, Z_DEFAULT_STRATEGY), ==, Z_OK);
  g_autofree char *copy = g_strdup (text);
  deflater.next_in = (Bytef *) copy;
  deflater.avail_in = (uInt) strlen (text);
  deflater.next_out = buffer;
  deflater.avail_out = sizeof buffer;
  g_assert_cmpint (deflate (&deflater, Z_FINISH), ==, Z_STREAM_END);
  g_byte_array_append (packed, buffer, (guint) (sizeof buffer - deflater.avail_out));
  deflateEnd (&deflater);
}

static void
all_members_of_a_gzip_are_read (void)
{
  g_autoptr (GByteArray) packed = g_byte_array_new ();
  append_gzip (packed, "JD value\n2451639.5 1361\n24516");
  append_gzip (packed, "40.5 1362\n");
  append_gzip (packed, "");
  append_gzip (packed, "2451641.5 1363\n");
  g_byte_array_append (packed, (const guint8 *) "\0\0\0\0", 4);
  g_autoptr (GError) error = NULL;
  g_autoptr (AntRecord) record = ant_reader_read_bytes ("trial.gz", packed->data, packed->len, NULL, &error);
  g_assert_no_error (error);
  g_assert_cmpuint (record->n_rows, ==, 3);
  g_assert_cmpfloat (record->value[1], ==, 1362.0);
  g_autofree char *sum = g_compute_checksum_for_data (G_CHECKSUM_SHA256, packed->data, packed->len);
  g_assert_cmpstr (record->sha256, ==, sum);
  g_assert_true (was_said (record, "gzip"));
}

static void
a_file_and_standard_input_read_alike (void)
{
  const char *text = "JD value\n2451639.5 1361\n2451640.5 1362\n";
  g_autofree char *folder = g_dir_make_tmp (NULL, NULL);
  g_autofree char *path = g_build_filename (folder, "record.txt", NULL);
  g_assert_true (g_file_set_contents (path, text, -1, NULL));
  g_autoptr (AntRecord) from_file = ant_reader_open (path, NULL, NULL, NULL);
  int saved = dup (STDIN_FILENO), file = open (path, O_RDONLY);
  dup2 (file, STDIN_FILENO);
  g_autoptr (AntRecord) from_input = ant_reader_open ("-", NULL, NULL, NULL);
  dup2 (saved, STDIN_FILENO);
  close (saved);
  close (file);
  g_assert_cmpuint (from_file->n_rows, ==, 2);
  g_assert_cmpuint (from_input->n_rows, ==, 2);
  g_assert_cmpstr (from_file->path, ==, path);
  g_assert_cmpstr (from_input->path, ==, "-");
  g_assert_cmpstr (from_file->sha256, ==, from_input->sha256);
  g_unlink (path);
  g_rmdir (folder);
}

static void
a_cancelled_read_stops (void)
{
  g_autofree char *folder = g_dir_make_tmp (NULL, NULL);
  g_autofree char *path = g_build_filename (folder, "record.txt", NULL);
  g_autoptr (GCancellable) cancellable = g_cancellable_new ();
  g_autoptr (GError) error = NULL;
  g_assert_true (g_file_set_contents (path, "JD value\n2451639.5 1361\n2451640.5 1362\n", -1, NULL));
  g_cancellable_cancel (cancellable);
  g_assert_null (ant_reader_open (path, NULL, cancellable, &error));
  g_assert_error (error, G_IO_ERROR, G_IO_ERROR_CANCELLED);
  g_unlink (path);
  g_rmdir (folder);
}

static void
errors_that_are_none_become_unknown (void)
{
  g_autoptr (AntRecord) record = read_text ("JD,value,sigma\n2451639.5,1361,0.1\n2451640.5,1362,0\n2451641.5,1362,-1\n2451642.5,1362,inf\n");
  g_assert_cmpfloat (record->error[0], ==, 0.1);
  for (gsize i = 1; i < 4; i++)
    g_assert_true (isnan (record->error[i]));
  g_assert_true (was_said (record, "3 values have no positive error"));
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define ADD(path, function) g_test_add_func ("/readers/text-reader/" path, function)
  ADD ("every-dialect-gives-the-same-record", every_dialect_gives_the_same_record);
  ADD ("a-table-without-header-is-read-by-position", a_table_without_header_is_read_by_position);
  ADD ("numbered-lines-of-prose-name-the-columns", numbered_lines_of_prose_name_the_columns);
  ADD ("columns-are-taken-by-name-or-number", columns_are_taken_by_name_or_number);
  ADD ("other-columns-of-numbers-are-kept-in-order", other_columns_of_numbers_are_kept_in_order);
  ADD ("a-column-that-is-not-there-is-named-with-those-that-are", a_column_that_is_not_there_is_named_with_those_that_are);
  ADD ("a-julian-date-is-taken-before-decimal-years", a_julian_date_is_taken_before_decimal_years);
  ADD ("the-first-column-with-enough-values-is-the-value", the_first_column_with_enough_values_is_the_value);
  ADD ("a-column-empty-at-first-is-still-found", a_column_empty_at_first_is_still_found);
  ADD ("fills-far-from-all-else-are-flagged-and-counted", fills_far_from_all_else_are_flagged_and_counted);
  ADD ("numbers-among-the-others-are-no-fills", numbers_among_the_others_are_no_fills);
  ADD ("a-single-zero-may-be-a-measurement", a_single_zero_may_be_a_measurement);
  ADD ("the-user-may-name-fills", the_user_may_name_fills);
  ADD ("empty-cells-and-nan-are-missing", empty_cells_and_nan_are_missing);
  ADD ("quality-keeps-64-bits-and-unreadable-ones-are-bad", quality_keeps_64_bits_and_unreadable_ones_are_bad);
  ADD ("lines-of-another-width-are-left-out-and-said", lines_of_another_width_are_left_out_and_said);
  ADD ("rows-keep-their-line-numbers", rows_keep_their_line_numbers);
  ADD ("rows-without-time-are-flagged", rows_without_time_are_flagged);
  ADD ("all-members-of-a-gzip-are-read", all_members_of_a_gzip_are_read);
  ADD ("a-file-and-standard-input-read-alike", a_file_and_standard_input_read_alike);
  ADD ("a-cancelled-read-stops", a_cancelled_read_stops);
  ADD ("errors-that-are-none-become-unknown", errors_that_are_none_become_unknown);
  return g_test_run ();
}
