/* test-sha256.c - the same sum as GLib's, however the bytes are dealt out. */
#include "readers/sha256.h"

static void
every_length_and_cut_equals_glib (void)
{
  guint8 bytes[300];
  for (gsize i = 0; i < sizeof bytes; i++)
    bytes[i] = (guint8) (i * 37 + i / 7);
  for (gsize n = 0; n <= sizeof bytes; n++)
    for (gsize step = 1; step <= 200; step += 33)
      {
        AntSha256 *sha256 = ant_sha256_new ();
        for (gsize at = 0; at < n; at += step)
          ant_sha256_update (sha256, bytes + at, MIN (step, n - at));
        g_autofree char *found = ant_sha256_hex (sha256);
        g_autofree char *expected = g_compute_checksum_for_data (G_CHECKSUM_SHA256, bytes, n);
        g_assert_cmpstr (found, ==, expected);
        ant_sha256_free (sha256);
      }
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/readers/sha256/every-length-and-cut-equals-glib", every_length_and_cut_equals_glib);
  return g_test_run ();
}
