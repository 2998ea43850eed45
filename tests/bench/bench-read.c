/* bench-read.c - the text reader against numpy's loadtxt, the FITS reader against CFITSIO's own bulk read, on files of a time, a
 * value and an error: bench-read [ROWS]. Seconds on the clock with the file in memory, the best of several runs. */
#include <fitsio.h>
#include <gio/gio.h>
#include <glib/gstdio.h>
#include <math.h>
#include <stdlib.h>

#include "core/random.h"
#include "jobs/record-open.h"

#define N_RUNS 7

static char name_time[] = "JD", name_value[] = "value", name_error[] = "error", form[] = "1D";

static char *
make_record (int n_rows, gboolean all_digits)
{
  g_autoptr (GString) text = g_string_new ("JD,value,error\n");
  AntRandom random;
  ant_random_seed (&random, 1, 0);
  for (int i = 0; i < n_rows; i++)
    {
      double jd = 2466000.5 + i / 1440.0, value = 1361.0 + 0.5 * ant_random_normal (&random);
      double error = 0.1 + 0.05 * ant_random_uniform (&random);
      if (all_digits)
        g_string_append_printf (text, "%.17g,%.17g,%.17g\n", jd, value, error);
      else
        g_string_append_printf (text, "%.6f,%.7f,%.5f\n", jd, value, error);
    }
  char *path = NULL;
  int file = g_file_open_tmp (NULL, &path, NULL);
  g_assert_true (file >= 0 && g_file_set_contents (path, text->str, (gssize) text->len, NULL));
  g_close (file, NULL);
  g_print ("%d rows, %.1f MB, %s: ", n_rows, (double) text->len / 1e6, all_digits ? "all 17 digits" : "everyday digits");
  return path;
}

static double
time_reader (const char *path, guint n_threads)
{
  double best_s = HUGE_VAL;
  for (int i = 0; i < N_RUNS; i++)
    {
      gint64 start = g_get_monotonic_time ();
      g_autoptr (AntRecord) record = ant_record_open (path, NULL, n_threads, NULL, NULL);
      g_assert_nonnull (record);
      best_s = MIN (best_s, (double) (g_get_monotonic_time () - start) / 1e6);
    }
  return best_s;
}

/* 0 without numpy. */
static double
time_numpy (const char *path)
{
  const char *script = "import sys, time, numpy\nbest = 9e9\nfor i in range(5):\n t = time.perf_counter()\n"
                       " numpy.loadtxt(sys.argv[1], delimiter=',', skiprows=1)\n best = min(best, time.perf_counter() - t)\nprint(best)";
  const char *const command[] = { "/usr/bin/python3", "-c", script, path, NULL };
  g_autoptr (GSubprocess) child = g_subprocess_newv (command, G_SUBPROCESS_FLAGS_STDOUT_PIPE, NULL);
  g_autofree char *out = NULL;
  if (!child || !g_subprocess_communicate_utf8 (child, NULL, NULL, &out, NULL, NULL) || !out)
    return 0.0;
  return g_ascii_strtod (out, NULL);
}

static char *
make_fits (int n_rows)
{
  char *ttype[] = { name_time, name_value, name_error }, *tform[] = { form, form, form };
  char *path = g_build_filename (g_get_tmp_dir (), "bench-read.fits", NULL);
  g_autofree double *column = g_new (double, n_rows);
  fitsfile *file;
  AntRandom random;
  int status = 0;
  ant_random_seed (&random, 1, 0);
  g_unlink (path);
  fits_create_diskfile (&file, path, &status);
  fits_create_tbl (file, BINARY_TBL, n_rows, 3, ttype, tform, NULL, "BENCH", &status);
  for (int c = 1; c <= 3; c++)
    {
      for (int i = 0; i < n_rows; i++)
        column[i] = c == 1 ? 2466000.5 + i / 1440.0 : c == 2 ? 1361.0 + 0.5 * ant_random_normal (&random) : 0.1;
      fits_write_col (file, TDOUBLE, c, 1, 1, n_rows, column, &status);
    }
  fits_close_file (file, &status);
  g_assert_cmpint (status, ==, 0);
  return path;
}

/* The three columns, in blocks of the rows that CFITSIO likes. */
static double
time_cfitsio (const char *path, int n_rows)
{
  double best_s = HUGE_VAL;
  for (int run = 0; run < N_RUNS; run++)
    {
      gint64 start = g_get_monotonic_time ();
      fitsfile *file;
      int status = 0, any_null;
      long block = 0;
      double *columns[3];
      fits_open_diskfile (&file, path, READONLY, &status);
      fits_movabs_hdu (file, 2, NULL, &status);
      fits_get_rowsize (file, &block, &status);
      for (int c = 0; c < 3; c++)
        columns[c] = g_new (double, n_rows);
      for (long from = 0; from < n_rows; from += block)
        for (int c = 0; c < 3; c++)
          fits_read_col (file, TDOUBLE, c + 1, from + 1, 1, MIN (block, n_rows - from), NULL, columns[c] + from, &any_null, &status);
      fits_close_file (file, &status);
      g_assert_cmpint (status, ==, 0);
      for (int c = 0; c < 3; c++)
        g_free (columns[c]);
      best_s = MIN (best_s, (double) (g_get_monotonic_time () - start) / 1e6);
    }
  return best_s;
}

static void
bench_fits (int n_rows)
{
  g_autofree char *path = make_fits (n_rows);
  double reader_s = time_reader (path, 0), library_s = time_cfitsio (path, n_rows);
  g_print ("%d rows of FITS: reader %.3f s, CFITSIO's bulk read %.3f s, ratio %.2f\n", n_rows, reader_s, library_s, reader_s / library_s);
  g_unlink (path);
}

int
main (int argc, char **argv)
{
  int n_rows = argc > 1 ? atoi (argv[1]) : 1000000;
  for (int all_digits = 0; all_digits < 2; all_digits++)
    {
      g_autofree char *path = make_record (n_rows, all_digits);
      double one_s = time_reader (path, 1), all_s = time_reader (path, 0), numpy_s = n_rows > 2000000 ? 0.0 : time_numpy (path);
      g_print ("reader %.3f s on one thread, %.3f s on all; loadtxt %.3f s, ratio %.2f\n", one_s, all_s, numpy_s, numpy_s / all_s);
      g_unlink (path);
    }
  bench_fits (n_rows);
  return 0;
}
