/* replay.c - run a door over every file of a corpus, and over each cut short and damaged. */
#include <glib.h>
#include <stdio.h>

#include "fuzz-door.h"

/* An exact heap copy: a step beyond the end is seen by the sanitizers. */
static void
enter (const char *bytes, gsize n)
{
  g_autofree guint8 *copy = g_memdup2 (n ? bytes : "", n ? n : 1);
  LLVMFuzzerTestOneInput (copy, n);
}

static void
replay (gconstpointer data)
{
  const char *path = data;
  g_autofree char *bytes = NULL;
  gsize n;
  g_assert_true (g_file_get_contents (path, &bytes, &n, NULL));
  enter (bytes, n);
  for (gsize cut = n / 2; cut < n; cut += 1 + n / 16)
    enter (bytes, cut);
  for (gsize at = n / 7; at < n; at += 1 + n / 16)
    {
      char kept = bytes[at];
      bytes[at] ^= (char) (1 << at % 8);
      enter (bytes, n);
      bytes[at] = kept;
    }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_autoptr (GError) error = NULL;
  g_autoptr (GDir) folder = g_dir_open (argc > 1 ? argv[1] : ".", 0, &error);
  g_assert_no_error (error);
  for (const char *name; (name = g_dir_read_name (folder));)
    {
      g_autofree char *path = g_strdup_printf ("/fuzz/replay/%s", name);
      g_test_add_data_func_full (path, g_build_filename (argv[1], name, NULL), replay, g_free);
    }
  return g_test_run ();
}
