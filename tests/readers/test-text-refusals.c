/* test-text-refusals.c - what is no record is refused in one line that names the place, with bounded memory. */
#include "reading.h"

#include <glib/gstdio.h>
#include <sys/resource.h>
#include <unistd.h>
#include <zlib.h>

static void
expect_refusal (const void *bytes, gsize n, const char *words)
{
  g_autoptr (GError) error = NULL;
  g_autoptr (AntRecord) record = ant_reader_read_bytes ("trial.txt", bytes, n, NULL, &error);
  g_assert_null (record);
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  g_test_message ("%s", error->message);
  g_assert_true (g_str_has_prefix (error->message, "trial.txt: "));
  g_assert_null (strchr (error->message, '\n'));
  g_assert_nonnull (strstr (error->message, "expected"));
  if (!strstr (error->message, words))
    g_error ("“%s” lacks “%s”", error->message, words);
}

static void
text_that_is_no_record_is_refused (void)
{
  static const struct
  {
    const char *text, *words;
  } cases[] = {
    { "", "empty file" },
    { "\n\n\n", "no line of data" },
    { "# only\n# comments\n", "no line of data" },
    { "To be or not to be\nthat is the question\n", "line 1" },
    { "1361\n1362\n1363\n", "at least two columns" },
    { "JD,value\n2451639.5,1361\n", "one row" },
    { "JD,value\n2451639.5,-99\n2451640.5,-99\n2451641.5,-99\n", "no values" },
    { "JD,value\n2451639.5,\n2451640.5,\n2451641.5,\n", "no values" },
    { "JD,value\n2451639.5,NaN\n2451640.5,NaN\n2451641.5,NaN\n", "no values" },
    { "JD,value\n2451641.5,1361\n2451640.5,1362\n2451639.5,1361\n", "line 3: found times that run backwards" },
    { "JD,value\n2451639.5,1361\n2451640.5,1e300\n2451641.5,1362\n", "line 3: found 1e+300" },
    { "JD,value\n2451639.5,1361\n2451640.5,1e-300\n2451641.5,1362\n", "line 3: found 1e-300" },
    { "JD,value\n2451639.5,1361\n2451640.5,inf\n2451641.5,1362\n", "line 3: found inf" },
    { "JD,value\n2451639.5,1361\n2451640.5,1e999\n2451641.5,1362\n", "line 3: found inf" },
    { "a,b\n7,1361\n7,1362\n7,1361\n", "looks like a time" },
    { "JD,value\n2451639.5,1361\n2451640.5,1362,3\n2451641.5,1362,3\n2451640.5,1362\n2451640.5,1362\n", "line 3: found 3 columns" },
    { "date,v\n2015-02-29,1\n2015-02-30,2\n2015-02-28,3\n2015-02-31,3\n2015-02-27,3\n2015-02-26,3\n2015-02-31,3\n2015-02-31,3\n"
      "2015-02-31,3\n2015-02-31,3\n",
      "expected" },
  };
  for (gsize i = 0; i < G_N_ELEMENTS (cases); i++)
    expect_refusal (cases[i].text, strlen (cases[i].text), cases[i].words);
}

static void
bytes_that_are_no_text_are_refused (void)
{
  g_autofree guint8 *noise = g_malloc (100000);
  guint32 state = 7;
  for (gsize i = 0; i < 100000; i++)
    noise[i] = (guint8) ((state = state * 1664525u + 1013904223u) >> 24);
  expect_refusal (noise, 100000, "line ");
  static const char with_nul[] = "JD,value\n2451639.5,1361\n2451640.5,13\0 62\n2451641.5,1362\n";
  expect_refusal (with_nul, sizeof with_nul - 1, "line 3: found a NUL byte");
  static const char fits[] = "SIMPLE  =                    T / file does conform to FITS standard";
  expect_refusal (fits, sizeof fits - 1, "FITS");
}

static void
a_missing_file_and_a_folder_are_refused (void)
{
  g_autofree char *folder = g_dir_make_tmp (NULL, NULL);
  g_autofree char *path = g_build_filename (folder, "none.txt", NULL);
  g_autoptr (GError) missing = NULL, is_folder = NULL;
  g_assert_null (ant_reader_open (path, NULL, NULL, &missing));
  g_assert_error (missing, ANT_ERROR, ANT_ERROR_READ);
  g_assert_nonnull (strstr (missing->message, path));
  g_assert_null (ant_reader_open (folder, NULL, NULL, &is_folder));
  g_assert_error (is_folder, ANT_ERROR, ANT_ERROR_READ);
  g_assert_nonnull (strstr (is_folder->message, "folder"));
  g_rmdir (folder);
}

/* A gzip of n bytes of text made by repeating a block. */
static GByteArray *
pack (const char *head, const char *block, gsize n)
{
  GByteArray *packed = g_byte_array_new ();
  guint8 buffer[65536];
  z_stream deflater = { 0 };
  g_assert_cmpint (deflateInit2 (&deflater, 6, Z_DEFLATED, 15 + 16, 8, Z_DEFAULT_STRATEGY), ==, Z_OK);
  gsize n_block = strlen (block);
  g_autofree char *bytes = g_strdup (block), *first = g_strdup (head);
  for (gsize done = 0; done <= n;)
    {
      deflater.next_in = (Bytef *) (done == 0 ? first : bytes);
      deflater.avail_in = (uInt) (done == 0 ? strlen (first) : n_block);
      done += done == 0 ? 1 : n_block;
      int outcome;
      do
        {
          deflater.next_out = buffer;
          deflater.avail_out = sizeof buffer;
          outcome = deflate (&deflater, done > n ? Z_FINISH : Z_NO_FLUSH);
          g_byte_array_append (packed, buffer, (guint) (sizeof buffer - deflater.avail_out));
        }
      while (deflater.avail_out == 0 || (done > n && outcome != Z_STREAM_END));
    }
  deflateEnd (&deflater);
  return packed;
}

static void
a_cut_off_or_damaged_gzip_is_refused (void)
{
  g_autoptr (GString) text = g_string_new (NULL);
  for (int i = 0; i < 1000; i++)
    g_string_append_printf (text, "%d.5 136%d.%d\n", 2451639 + i, i % 7, i * 31 % 97);
  g_autoptr (GByteArray) packed = pack ("JD value\n", text->str, text->len);
  expect_refusal (packed->data, packed->len - 9, "found the end");
  expect_refusal (packed->data, packed->len / 2, "found the end");
  expect_refusal (packed->data, 5, "found the end");
  packed->data[packed->len / 2] ^= 0xff;
  packed->data[packed->len / 2 + 1] ^= 0x5a;
  expect_refusal (packed->data, packed->len, "found damage");
}

static void
an_endless_line_is_refused_in_little_memory (void)
{
  struct rusage before, after;
  g_autofree char *block = g_strnfill (1024 * 1024, '7');
  g_autoptr (GByteArray) packed = pack ("JD value\n2451639.5 1361\n", block, (gsize) 64 * 1024 * 1024);
  getrusage (RUSAGE_SELF, &before);
  expect_refusal (packed->data, packed->len, "line 3: found a line longer than 1048576 bytes");
  getrusage (RUSAGE_SELF, &after);
  g_assert_cmpint (after.ru_maxrss - before.ru_maxrss, <, 64 * 1024);
}

static void
a_gzip_that_unpacks_without_measure_is_refused (void)
{
  struct rusage before, after;
  g_autofree char *block = g_strnfill (1024 * 1024, '\n');
  g_autoptr (GByteArray) packed = pack ("JD value\n2451639.5 1361\n2451640.5 1361\n", block, (gsize) 96 * 1024 * 1024);
  getrusage (RUSAGE_SELF, &before);
  expect_refusal (packed->data, packed->len, "200 times");
  getrusage (RUSAGE_SELF, &after);
  g_assert_cmpint (after.ru_maxrss - before.ru_maxrss, <, 64 * 1024);
}

static void
too_many_columns_are_refused (void)
{
  g_autoptr (GString) text = g_string_new (NULL);
  for (int row = 0; row < 3; row++)
    for (int i = 0; i < 3000; i++)
      g_string_append (text, i == 2999 ? "1\n" : "1,");
  expect_refusal (text->str, text->len, "3000 columns");
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
#define ADD(path, function) g_test_add_func ("/readers/text-refusals/" path, function)
  ADD ("text-that-is-no-record-is-refused", text_that_is_no_record_is_refused);
  ADD ("bytes-that-are-no-text-are-refused", bytes_that_are_no_text_are_refused);
  ADD ("a-missing-file-and-a-folder-are-refused", a_missing_file_and_a_folder_are_refused);
  ADD ("a-cut-off-or-damaged-gzip-is-refused", a_cut_off_or_damaged_gzip_is_refused);
  ADD ("an-endless-line-is-refused-in-little-memory", an_endless_line_is_refused_in_little_memory);
  ADD ("a-gzip-that-unpacks-without-measure-is-refused", a_gzip_that_unpacks_without_measure_is_refused);
  ADD ("too-many-columns-are-refused", too_many_columns_are_refused);
  return g_test_run ();
}
