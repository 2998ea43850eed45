/* test-whole-file.c - files appear whole or not at all. */
#include <glib.h>
#include <glib/gstdio.h>
#include <string.h>
#include <sys/stat.h>

#include "data/error.h"
#include "writers/whole-file.h"

typedef struct
{
  char *folder, *path;
} Place;

static void
place_make (Place *place, gconstpointer unused)
{
  place->folder = g_dir_make_tmp (NULL, NULL);
  place->path = g_build_filename (place->folder, "table.csv", NULL);
}

static void
place_clear (Place *place, gconstpointer unused)
{
  g_unlink (place->path);
  g_assert_cmpint (g_rmdir (place->folder), ==, 0); /* nothing else was left in it */
  g_free (place->path);
  g_free (place->folder);
}

static void
assert_holds (const Place *place, const char *expected)
{
  g_autofree char *text = NULL;
  g_assert_true (g_file_get_contents (place->path, &text, NULL, NULL));
  g_assert_cmpstr (text, ==, expected);
}

static void
write_text (const Place *place, const char *text, gboolean replace)
{
  g_autoptr (GError) error = NULL;
  AntWholeFile *file = ant_whole_file_open (place->path, replace, &error);
  g_assert_no_error (error);
  fputs (text, ant_whole_file_stream (file));
  g_assert_true (ant_whole_file_commit (file, &error));
  g_assert_no_error (error);
}

static void
a_committed_file_is_in_its_place (Place *place, gconstpointer unused)
{
  write_text (place, "one\n", FALSE);
  assert_holds (place, "one\n");
}

static void
before_the_commit_nothing_changes (Place *place, gconstpointer unused)
{
  write_text (place, "one\n", FALSE);
  AntWholeFile *file = ant_whole_file_open (place->path, TRUE, NULL);
  fputs ("half of tw", ant_whole_file_stream (file));
  fflush (ant_whole_file_stream (file));
  assert_holds (place, "one\n");
  ant_whole_file_abandon (file);
  assert_holds (place, "one\n");
}

static void
a_finished_file_waits_for_its_commit (Place *place, gconstpointer unused)
{
  g_autoptr (GError) error = NULL;
  write_text (place, "one\n", FALSE);
  AntWholeFile *file = ant_whole_file_open (place->path, TRUE, NULL);
  fputs ("two\n", ant_whole_file_stream (file));
  g_assert_true (ant_whole_file_finish (file, &error));
  g_assert_no_error (error);
  assert_holds (place, "one\n");
  g_assert_true (ant_whole_file_commit (file, &error));
  assert_holds (place, "two\n");
}

static void
what_is_there_is_replaced_only_when_asked (Place *place, gconstpointer unused)
{
  g_autoptr (GError) error = NULL;
  write_text (place, "one\n", FALSE);
  g_assert_null (ant_whole_file_open (place->path, FALSE, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
  g_assert_nonnull (strstr (error->message, place->path));
  assert_holds (place, "one\n");
  write_text (place, "two\n", TRUE);
  assert_holds (place, "two\n");
}

static void
impossible_places_are_told (Place *place, gconstpointer unused)
{
  g_autofree char *nowhere = g_build_filename (place->folder, "no", "such", "table.csv", NULL);
  const char *paths[] = { nowhere, place->folder };
  for (int i = 0; i < 2; i++)
    {
      g_autoptr (GError) error = NULL;
      g_assert_null (ant_whole_file_open (paths[i], TRUE, &error));
      g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
      g_assert_nonnull (strstr (error->message, paths[i]));
    }
}

/* A pipe stands for /dev/null, which a rename would replace for the whole machine. */
static void
a_device_is_not_replaced (Place *place, gconstpointer unused)
{
  g_autoptr (GError) error = NULL;
  g_assert_cmpint (mkfifo (place->path, 0600), ==, 0);
  g_assert_null (ant_whole_file_open (place->path, TRUE, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
  g_assert_nonnull (strstr (error->message, "expected an ordinary file"));
}

static void
a_stream_in_error_is_not_committed (Place *place, gconstpointer unused)
{
  g_autoptr (GError) error = NULL;
  AntWholeFile *file = ant_whole_file_open (place->path, FALSE, NULL);
  fputs ("text\n", ant_whole_file_stream (file));
  fflush (ant_whole_file_stream (file));
  /* /dev/full takes the place of a full disk. */
  g_assert_nonnull (freopen ("/dev/full", "w", ant_whole_file_stream (file)));
  fputs ("more\n", ant_whole_file_stream (file));
  g_assert_false (ant_whole_file_commit (file, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
  g_assert_false (g_file_test (place->path, G_FILE_TEST_EXISTS));
}

#define ADD(path, function) g_test_add (path, Place, NULL, place_make, function, place_clear)

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  ADD ("/writers/whole-file/a-committed-file-is-in-its-place", a_committed_file_is_in_its_place);
  ADD ("/writers/whole-file/before-the-commit-nothing-changes", before_the_commit_nothing_changes);
  ADD ("/writers/whole-file/a-finished-file-waits-for-its-commit", a_finished_file_waits_for_its_commit);
  ADD ("/writers/whole-file/what-is-there-is-replaced-only-when-asked", what_is_there_is_replaced_only_when_asked);
  ADD ("/writers/whole-file/impossible-places-are-told", impossible_places_are_told);
  ADD ("/writers/whole-file/a-device-is-not-replaced", a_device_is_not_replaced);
  ADD ("/writers/whole-file/a-stream-in-error-is-not-committed", a_stream_in_error_is_not_committed);
  return g_test_run ();
}
