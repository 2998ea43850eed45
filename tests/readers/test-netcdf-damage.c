/* test-netcdf-damage.c - fifty damaged files a kind: each is a record or one sentence, in bounded time. */
#include "core/random.h"
#include "netcdf-making.h"
#include "reading.h"

#define N_DAMAGED 50
#define MOST_S 60.0

static guint
pick (AntRandom *random, gsize n)
{
  return (guint) MIN ((double) n - 1.0, ant_random_uniform (random) * (double) n);
}

/* Cut short, bits turned, a run of bytes overwritten by great or negative numbers, or the head doubled. */
static gsize
damage (AntRandom *random, guint how, guint8 *bytes, gsize n)
{
  static const guint8 patterns[] = { 0x00, 0xff, 0x7f, 0x80 };
  gsize head = MIN (n, 2048);
  switch (how % 5)
    {
    case 0: return 4 + pick (random, n - 4);
    case 1:
      for (int i = 0; i < 3; i++)
        bytes[8 + pick (random, head - 8)] ^= (guint8) (1u << pick (random, 8));
      return n;
    case 2: memset (bytes + 4 + pick (random, head - 12), patterns[pick (random, 4)], 4); return n;
    case 3: memset (bytes + 4 + pick (random, n - 12), patterns[pick (random, 4)], 8); return n;
    default: memmove (bytes + head / 2, bytes, head / 2); return n;
    }
}

static void
read_damaged (int kind)
{
  AntRandom random;
  g_autofree char *path = make_netcdf (kind, NULL), *bytes = NULL;
  g_autoptr (GTimer) timer = g_timer_new ();
  gsize n;
  guint n_refused = 0;
  g_assert_true (g_file_get_contents (path, &bytes, &n, NULL));
  ant_random_seed (&random, 5, (uint64_t) kind);
  for (guint i = 0; i < N_DAMAGED; i++)
    {
      g_autofree guint8 *copy = g_memdup2 (bytes, n);
      gsize length = damage (&random, i, copy, n);
      g_assert_true (g_file_set_contents (path, (const char *) copy, (gssize) length, NULL));
      g_autoptr (GError) error = NULL;
      g_autoptr (AntRecord) record = ant_reader_open (path, NULL, NULL, &error);
      g_assert_true ((record == NULL) == (error != NULL));
      if (error)
        {
          g_assert_true (error->domain == ANT_ERROR && g_str_has_prefix (error->message, path) && !strchr (error->message, '\n'));
          g_assert_nonnull (strstr (error->message, "expected"));
          n_refused++;
        }
    }
  g_test_message ("%u of %u refused in %.2f s", n_refused, N_DAMAGED, g_timer_elapsed (timer, NULL));
  g_assert_cmpuint (n_refused, >, N_DAMAGED / 4);
  g_assert_cmpfloat (g_timer_elapsed (timer, NULL), <, MOST_S);
  g_unlink (path);
}

static void damaged_classic_files_are_survived (void) { read_damaged (0); }
static void damaged_new_files_are_survived (void) { read_damaged (NC_NETCDF4); }

/* A hole of a terabyte, which the library would fill with zeros, is not believed. */
static void
absurd_lengths_are_refused (void)
{
  g_autofree char *path = temporary_path ();
  int file, time, variable[2];
  made (nc_create (path, NC_NETCDF4 | NC_CLOBBER, &file));
  made (nc_def_dim (file, "time", (size_t) 1 << 40, &time));
  made (nc_def_var (file, "time", NC_DOUBLE, 1, &time, &variable[0]));
  put_text (file, variable[0], "units", "seconds since 2029-01-01");
  made (nc_def_var (file, "tsi", NC_DOUBLE, 1, &time, &variable[1]));
  size_t chunk = 1024;
  made (nc_def_var_chunking (file, variable[0], NC_CHUNKED, &chunk));
  made (nc_def_var_chunking (file, variable[1], NC_CHUNKED, &chunk));
  made (nc_close (file));
  g_autoptr (GError) error = NULL;
  g_assert_null (ant_reader_open (path, NULL, NULL, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_READ);
  g_assert_nonnull (strstr (error->message, "1099511627776"));
  g_unlink (path);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/readers/netcdf-damage/damaged-classic-files-are-survived", damaged_classic_files_are_survived);
  g_test_add_func ("/readers/netcdf-damage/damaged-new-files-are-survived", damaged_new_files_are_survived);
  g_test_add_func ("/readers/netcdf-damage/absurd-lengths-are-refused", absurd_lengths_are_refused);
  return g_test_run ();
}
