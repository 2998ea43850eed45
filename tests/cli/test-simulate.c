/* test-simulate.c - `antumbra-cli simulate` as a program. Its path is in ANT_CLI. */
#include <gio/gio.h>
#include <glib/gstdio.h>
#include <string.h>

typedef struct
{
  char *folder, *recipe, *record, *truth;
} Place;

static void
place_make (Place *place, gconstpointer unused)
{
  place->folder = g_dir_make_tmp (NULL, NULL);
  place->recipe = g_build_filename (place->folder, "some.recipe", NULL);
  place->record = g_build_filename (place->folder, "some.csv", NULL);
  place->truth = g_build_filename (place->folder, "some-truth.csv", NULL);
  g_assert_true (g_file_set_contents (
      place->recipe, "[record]\nstart=2041-03-03T00:00:00\ndays=0.5\n[noise]\npreset=a\n[gaps]\nmask=l1\n", -1, NULL));
}

static void
place_clear (Place *place, gconstpointer unused)
{
  g_unlink (place->recipe);
  g_unlink (place->record);
  g_unlink (place->truth);
  g_assert_cmpint (g_rmdir (place->folder), ==, 0); /* no drafts are left behind */
  g_free (place->folder);
  g_free (place->recipe);
  g_free (place->record);
  g_free (place->truth);
}

/* Run it on the recipe, writing the record, with up to two more arguments; what it said on standard error in *said. */
static int
run (const Place *place, const char *recipe, const char *first, const char *second, char **said)
{
  const char *arguments[] = { g_getenv ("ANT_CLI"), "simulate", recipe, "--out", place->record, first, second, NULL };
  g_autoptr (GError) error = NULL;
  g_autoptr (GSubprocess) child
      = g_subprocess_newv (arguments, G_SUBPROCESS_FLAGS_STDOUT_PIPE | G_SUBPROCESS_FLAGS_STDERR_PIPE, &error);
  g_assert_no_error (error);
  g_subprocess_communicate_utf8 (child, NULL, NULL, NULL, said, &error);
  g_assert_no_error (error);
  return g_subprocess_get_exit_status (child);
}

static char *
contents (const char *path)
{
  char *text = NULL;
  g_assert_true (g_file_get_contents (path, &text, NULL, NULL));
  return text;
}

static void
the_same_seed_gives_the_same_bytes (Place *place, gconstpointer unused)
{
  g_assert_cmpint (run (place, place->recipe, NULL, NULL, NULL), ==, 0);
  g_autofree char *record = contents (place->record), *truth = contents (place->truth);
  g_assert_cmpint (run (place, place->recipe, "--force", NULL, NULL), ==, 0);
  g_autofree char *record_again = contents (place->record), *truth_again = contents (place->truth);
  g_assert_cmpstr (record, ==, record_again);
  g_assert_cmpstr (truth, ==, truth_again);
}

static void
another_seed_gives_another_record (Place *place, gconstpointer unused)
{
  g_assert_cmpint (run (place, place->recipe, NULL, NULL, NULL), ==, 0);
  g_autofree char *one = contents (place->record);
  g_assert_cmpint (run (place, place->recipe, "--force", "--seed=2", NULL), ==, 0);
  g_autofree char *two = contents (place->record);
  g_assert_cmpstr (one, !=, two);
  g_assert_nonnull (strstr (two, "seed 2"));
}

static void
files_that_are_there_stay (Place *place, gconstpointer unused)
{
  g_autofree char *said = NULL;
  g_assert_true (g_file_set_contents (place->truth, "mine\n", -1, NULL));
  g_assert_cmpint (run (place, place->recipe, NULL, NULL, &said), ==, 4);
  g_assert_nonnull (strstr (said, place->truth));
  g_assert_false (g_file_test (place->record, G_FILE_TEST_EXISTS));
  g_autofree char *kept = contents (place->truth);
  g_assert_cmpstr (kept, ==, "mine\n");
}

static void
a_bad_recipe_is_told_in_one_line (Place *place, gconstpointer unused)
{
  g_autofree char *said = NULL;
  g_assert_true (g_file_set_contents (place->recipe, "[record]\nstart=2041-03-03T00:00:00\ndays=one\n", -1, NULL));
  g_assert_cmpint (run (place, place->recipe, NULL, NULL, &said), ==, 3);
  g_assert_true (g_str_has_prefix (said, "antumbra-cli: "));
  g_assert_nonnull (strstr (said, "some.recipe: [record] days: found “one”"));
  g_assert_true (strchr (said, '\n') == said + strlen (said) - 1);
  g_assert_false (g_file_test (place->record, G_FILE_TEST_EXISTS));
}

static void
usage_errors_are_told (Place *place, gconstpointer unused)
{
  g_assert_cmpint (run (place, place->recipe, "another.recipe", NULL, NULL), ==, 2);
  g_assert_cmpint (run (place, place->recipe, "--seed=many", NULL, NULL), ==, 2);
  g_assert_cmpint (run (place, place->recipe, "--truth", place->record, NULL), ==, 2);
  g_assert_cmpint (run (place, "no/such.recipe", NULL, NULL, NULL), ==, 3);
  g_assert_false (g_file_test (place->record, G_FILE_TEST_EXISTS));
}

#define ADD(path, function) g_test_add (path, Place, NULL, place_make, function, place_clear)

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  ADD ("/cli/simulate/the-same-seed-gives-the-same-bytes", the_same_seed_gives_the_same_bytes);
  ADD ("/cli/simulate/another-seed-gives-another-record", another_seed_gives_another_record);
  ADD ("/cli/simulate/files-that-are-there-stay", files_that_are_there_stay);
  ADD ("/cli/simulate/a-bad-recipe-is-told-in-one-line", a_bad_recipe_is_told_in_one_line);
  ADD ("/cli/simulate/usage-errors-are-told", usage_errors_are_told);
  return g_test_run ();
}
