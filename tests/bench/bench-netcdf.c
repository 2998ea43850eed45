/* bench-netcdf.c - the NetCDF reader, its child process and all, against the library's own bulk read of the same three
 * variables into arrays: bench-netcdf [ROWS]. Elapsed time, the best of several. */
#include <glib.h>
#include <glib/gstdio.h>
#include <math.h>
#include <netcdf.h>
#include <stdlib.h>
#include <sys/resource.h>
#include <unistd.h>

#include "core/random.h"
#include "jobs/record-open.h"

#define N_RUNS 5

static void
check (int status)
{
  if (status != NC_NOERR)
    g_error ("%s", nc_strerror (status));
}

static char *
make_file (int kind, size_t n)
{
  static const char *const names[] = { "time", "tsi", "tsi_error" };
  char *path = NULL;
  int file, dimension, variable[3], handle = g_file_open_tmp (NULL, &path, NULL);
  double *values = g_new (double, n);
  AntRandom random;
  close (handle);
  ant_random_seed (&random, 1, 0);
  check (nc_create (path, kind | NC_CLOBBER, &file));
  check (nc_def_dim (file, "time", n, &dimension));
  for (int i = 0; i < 3; i++)
    check (nc_def_var (file, names[i], NC_DOUBLE, 1, &dimension, &variable[i]));
  check (nc_put_att_text (file, variable[0], "units", 24, "seconds since 2029-01-01"));
  check (nc_enddef (file));
  for (int i = 0; i < 3; i++)
    {
      for (size_t k = 0; k < n; k++)
        values[k] = i == 0 ? 60.0 * (double) k : i == 1 ? 1361.0 + 0.5 * ant_random_normal (&random) : 0.1;
      check (nc_put_var_double (file, variable[i], values));
    }
  check (nc_close (file));
  g_free (values);
  return path;
}

static double
time_library (const char *path, size_t n)
{
  double best_s = HUGE_VAL;
  for (int run = 0; run < N_RUNS; run++)
    {
      gint64 start = g_get_monotonic_time ();
      double *values[3];
      int file;
      check (nc_open (path, NC_NOWRITE, &file));
      for (int i = 0; i < 3; i++)
        {
          values[i] = g_new (double, n);
          check (nc_get_var_double (file, i, values[i]));
        }
      check (nc_close (file));
      best_s = MIN (best_s, (double) (g_get_monotonic_time () - start) / 1e6);
      for (int i = 0; i < 3; i++)
        g_free (values[i]);
    }
  return best_s;
}

static double
time_reader (const char *path)
{
  double best_s = HUGE_VAL;
  for (int run = 0; run < N_RUNS; run++)
    {
      g_autoptr (GError) error = NULL;
      gint64 start = g_get_monotonic_time ();
      g_autoptr (AntRecord) record = ant_record_open (path, NULL, 0, NULL, &error);
      g_assert_no_error (error);
      best_s = MIN (best_s, (double) (g_get_monotonic_time () - start) / 1e6);
    }
  return best_s;
}

int
main (int argc, char **argv)
{
  size_t n = argc > 1 ? strtoul (argv[1], NULL, 10) : 5000000;
  for (int kind = 0; kind <= NC_NETCDF4; kind += NC_NETCDF4)
    {
      g_autofree char *path = make_file (kind, n);
      double reader_s = time_reader (path), library_s = time_library (path, n);
      g_print ("%zu rows, %s: reader %.3f s, library %.3f s, ratio %.2f\n", n, kind ? "NetCDF-4" : "classic", reader_s, library_s,
               reader_s / library_s);
      g_unlink (path);
    }
  struct rusage self, child;
  getrusage (RUSAGE_SELF, &self);
  getrusage (RUSAGE_CHILDREN, &child);
  g_print ("memory: %.0f MB at most, its child %.0f MB; the rows of a record take %.0f MB\n", (double) self.ru_maxrss / 1024.0,
           (double) child.ru_maxrss / 1024.0, (double) n * (3 * 8 + 4 + 2) / 1048576.0);
  return 0;
}
