/* bench-read.c - the text reader against numpy's loadtxt on one file of JD,value,error: bench-read [ROWS].
 * Processor time, the best of several, so that a busy machine counts for little. */
#include <gio/gio.h>
#include <glib/gstdio.h>
#include <math.h>
#include <stdlib.h>
#include <time.h>

#include "core/random.h"
#include "readers/reader.h"

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
time_reader (const char *path)
{
  double best_s = HUGE_VAL;
  for (int i = 0; i < 9; i++)
    {
      clock_t start = clock ();
      g_autoptr (AntRecord) record = ant_reader_open (path, NULL, NULL, NULL);
      g_assert_nonnull (record);
      best_s = MIN (best_s, (double) (clock () - start) / CLOCKS_PER_SEC);
    }
  return best_s;
}

/* 0 without numpy. */
static double
time_numpy (const char *path)
{
  const char *script = "import sys, time, numpy\nbest = 9e9\nfor i in range(9):\n t = time.process_time()\n"
                       " numpy.loadtxt(sys.argv[1], delimiter=',', skiprows=1)\n best = min(best, time.process_time() - t)\nprint(best)";
  const char *const command[] = { "/usr/bin/python3", "-c", script, path, NULL };
  g_autoptr (GSubprocess) child = g_subprocess_newv (command, G_SUBPROCESS_FLAGS_STDOUT_PIPE, NULL);
  g_autofree char *out = NULL;
  if (!child || !g_subprocess_communicate_utf8 (child, NULL, NULL, &out, NULL, NULL) || !out)
    return 0.0;
  return g_ascii_strtod (out, NULL);
}

int
main (int argc, char **argv)
{
  int n_rows = argc > 1 ? atoi (argv[1]) : 1000000;
  for (int all_digits = 0; all_digits < 2; all_digits++)
    {
      g_autofree char *path = make_record (n_rows, all_digits);
      double reader_s = time_reader (path), numpy_s = time_numpy (path);
      g_print ("reader %.3f s, loadtxt %.3f s, ratio %.2f\n", reader_s, numpy_s, numpy_s / reader_s);
      g_unlink (path);
    }
  return 0;
}
