/* test-record-open.c - a long text read by slices on the pool is the record that one thread reads. */
#include "jobs/record-open.h"

#include <glib/gstdio.h>
#include <math.h>
#include <string.h>

#include "core/random.h"
#include "data/error.h"

#define N_LINES 330000 /* of about 36 bytes: several batches of slices */

/* Rows of which a few are comments, blank, of another width, without a time, or not a number; odd ones at odd places. */
static GString *
make_text (void)
{
  GString *text = g_string_new ("JD,value,error,flag,temperature\n");
  AntRandom random;
  ant_random_seed (&random, 5, 0);
  for (int i = 0; i < N_LINES; i++)
    {
      double value = 1361.0 + 0.5 * ant_random_normal (&random);
      if (i % 9973 == 77)
        g_string_append (text, i % 2 ? "# a pause\n" : "\n");
      else if (i % 20011 == 4321)
        g_string_append (text, "2466000.5,1361\n");
      else if (i % 30011 == 100)
        g_string_append_printf (text, "soon,%.6f,0.1,0,21\r\n", value);
      else
        g_string_append_printf (text, "%.6f,%.17g,%s,%d,%.2f\n", 2466000.5 + i / 1440.0, value, i % 5003 ? "0.125" : "NaN", i % 101 == 0,
                                20.0 + i % 13);
    }
  return text;
}

static char *
write_text (const char *text, gsize n)
{
  char *path = NULL;
  int file = g_file_open_tmp (NULL, &path, NULL);
  g_assert_true (file >= 0 && g_file_set_contents (path, text, (gssize) n, NULL));
  g_close (file, NULL);
  return path;
}

static void
assert_same (const AntRecord *a, const AntRecord *b)
{
  gsize n = a->n_rows;
  g_assert_cmpuint (n, ==, b->n_rows);
  g_assert_cmpmem (a->time_d, n * sizeof (double), b->time_d, n * sizeof (double));
  g_assert_cmpmem (a->value, n * sizeof (double), b->value, n * sizeof (double));
  g_assert_cmpmem (a->error, n * sizeof (double), b->error, n * sizeof (double));
  g_assert_cmpmem (a->quality, n * sizeof (gint64), b->quality, n * sizeof (gint64));
  g_assert_cmpmem (a->line, n * sizeof (guint32), b->line, n * sizeof (guint32));
  g_assert_cmpmem (a->flags, n * sizeof (guint16), b->flags, n * sizeof (guint16));
  g_assert_cmpstr (a->sha256, ==, b->sha256);
  g_assert_cmpuint (a->columns->len, ==, 1);
  g_assert_cmpmem (((AntColumn *) g_ptr_array_index (a->columns, 0))->value, n * sizeof (float),
                   ((AntColumn *) g_ptr_array_index (b->columns, 0))->value, n * sizeof (float));
  g_assert_cmpuint (a->said->len, ==, b->said->len);
  for (guint i = 0; i < a->said->len; i++)
    g_assert_cmpstr (g_ptr_array_index (a->said, i), ==, g_ptr_array_index (b->said, i));
}

static void
any_number_of_threads_reads_the_same_record (void)
{
  g_autoptr (GString) text = make_text ();
  g_autofree char *path = write_text (text->str, text->len), *sum = g_compute_checksum_for_string (G_CHECKSUM_SHA256, text->str, -1);
  g_autoptr (AntRecord) alone = ant_reader_open (path, NULL, NULL, NULL);
  g_assert_nonnull (alone);
  g_assert_cmpstr (alone->sha256, ==, sum);
  for (guint n_threads = 1; n_threads <= 3; n_threads++)
    {
      g_autoptr (AntRecord) record = ant_record_open (path, NULL, n_threads, NULL, NULL);
      g_assert_nonnull (record);
      assert_same (alone, record);
    }
  g_unlink (path);
}

/* Row for row what the text says, by strtod and counting lines. */
static void
rows_and_lines_are_those_of_the_text (void)
{
  g_autoptr (GString) text = make_text ();
  g_autofree char *path = write_text (text->str, text->len);
  g_autoptr (AntRecord) record = ant_record_open (path, NULL, 2, NULL, NULL);
  gsize row = 0;
  guint32 number = 1;
  for (const char *line = strchr (text->str, '\n') + 1; *line; line = strchr (line, '\n') + 1)
    {
      number++;
      if (*line == '#' || *line == '\n' || !strncmp (line, "2466000.5,1361\n", 15))
        continue;
      char *end;
      double value = g_ascii_strtod (strchr (line, ',') + 1, &end);
      g_assert_cmpuint (record->line[row], ==, number);
      g_assert_true (record->value[row] == value);
      g_assert_cmpint (isnan (record->time_d[row]) != 0, ==, *line == 's');
      row++;
    }
  g_assert_cmpuint (record->n_rows, ==, row);
  g_unlink (path);
}

static void
expect_fault (GString *text, gsize at, const char *odd, gsize n_odd, const char *words)
{
  g_autoptr (GError) error = NULL;
  guint32 line = 1;
  at = (gsize) (strchr (text->str + at, '\n') + 1 - text->str);
  for (gsize i = 0; i < at; i++)
    line += text->str[i] == '\n';
  g_string_insert_len (text, (gssize) at, odd, (gssize) n_odd);
  g_autofree char *path = write_text (text->str, text->len), *place = g_strdup_printf (": line %u: %s", line, words);
  g_assert_null (ant_record_open (path, NULL, 2, NULL, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  if (!strstr (error->message, place))
    g_error ("“%s” lacks “%s”", error->message, place);
  g_unlink (path);
  g_string_erase (text, (gssize) at, (gssize) n_odd);
}

static void
faults_deep_in_the_text_name_their_line (void)
{
  g_autoptr (GString) text = make_text (), long_line = g_string_new (NULL);
  for (int i = 0; i < 1100000; i++)
    g_string_append_c (long_line, '7');
  g_string_append_c (long_line, '\n');
  for (gsize at = text->len / 5; at < text->len; at += text->len / 5)
    {
      expect_fault (text, at, "2466001,\0,1\n", 12, "found a NUL byte");
      expect_fault (text, at, long_line->str, long_line->len, "found a line longer than");
    }
}

static void
a_cancelled_read_stops (void)
{
  g_autoptr (GString) text = make_text ();
  g_autofree char *path = write_text (text->str, text->len);
  g_autoptr (GCancellable) cancellable = g_cancellable_new ();
  g_autoptr (GError) error = NULL;
  g_cancellable_cancel (cancellable);
  g_assert_null (ant_record_open (path, NULL, 2, cancellable, &error));
  g_assert_error (error, G_IO_ERROR, G_IO_ERROR_CANCELLED);
  g_unlink (path);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/jobs/record-open/any-number-of-threads-reads-the-same-record", any_number_of_threads_reads_the_same_record);
  g_test_add_func ("/jobs/record-open/rows-and-lines-are-those-of-the-text", rows_and_lines_are_those_of_the_text);
  g_test_add_func ("/jobs/record-open/faults-deep-in-the-text-name-their-line", faults_deep_in_the_text_name_their_line);
  g_test_add_func ("/jobs/record-open/a-cancelled-read-stops", a_cancelled_read_stops);
  return g_test_run ();
}
