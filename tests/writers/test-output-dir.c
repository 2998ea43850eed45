/* test-output-dir.c - results appear whole or not at all, whatever stops them. */
#include <glib/gstdio.h>
#include <signal.h>
#include <string.h>
#include <sys/resource.h>
#include "data/error.h"
#include "writers/output-dir.h"

static const char *const names[] = { "a.csv", "b.csv", NULL };

static char *
new_folder (void)
{
  g_autoptr (GError) error = NULL;
  char *folder = g_dir_make_tmp (NULL, &error);
  g_assert_no_error (error);
  return folder;
}

static guint
count_entries (const char *folder)
{
  guint count = 0;
  GDir *dir = g_dir_open (folder, 0, NULL);
  while (dir && g_dir_read_name (dir))
    count++;
  if (dir)
    g_dir_close (dir);
  return count;
}

static void
remove_folder (char *folder)
{
  GDir *dir = g_dir_open (folder, 0, NULL);
  for (const char *name; dir && (name = g_dir_read_name (dir));)
    {
      g_autofree char *path = g_build_filename (folder, name, NULL);
      g_remove (path);
    }
  if (dir)
    g_dir_close (dir);
  g_rmdir (folder);
  g_free (folder);
}

static void
assert_contents (const char *folder, const char *name, const char *expected)
{
  g_autofree char *path = g_build_filename (folder, name, NULL), *text = NULL;
  g_assert_true (g_file_get_contents (path, &text, NULL, NULL));
  g_assert_cmpstr (text, ==, expected);
}

static AntOutputDir *
open_dir (const char *path, gboolean replace)
{
  g_autoptr (GError) error = NULL;
  AntOutputDir *dir = ant_output_dir_open (path, names, replace, &error);
  g_assert_no_error (error);
  g_assert_nonnull (dir);
  return dir;
}

static void
add (AntOutputDir *dir, const char *name, const char *text)
{
  g_autoptr (GError) error = NULL;
  ant_output_dir_add (dir, name, text, strlen (text), &error);
  g_assert_no_error (error);
}

static void
test_whole (void)
{
  char *folder = new_folder ();
  g_autofree char *deep = g_build_filename (folder, "x", "y", NULL), *middle = g_build_filename (folder, "x", NULL);
  AntOutputDir *dir = open_dir (deep, FALSE);
  add (dir, "a.csv", "one\n");
  add (dir, "b.csv", "two\n");
  g_autofree char *path = g_build_filename (deep, "a.csv", NULL);
  g_assert_false (g_file_test (path, G_FILE_TEST_EXISTS)); /* not before all are whole */
  g_assert_true (ant_output_dir_commit (dir, NULL));
  ant_output_dir_close (dir);
  assert_contents (deep, "a.csv", "one\n");
  assert_contents (deep, "b.csv", "two\n");
  g_assert_cmpuint (count_entries (deep), ==, 2);
  remove_folder (g_steal_pointer (&deep));
  remove_folder (g_steal_pointer (&middle));
  remove_folder (folder);
}

static void
test_nothing_without_commit (void)
{
  char *folder = new_folder ();
  g_autofree char *deep = g_build_filename (folder, "x", "y", NULL);
  AntOutputDir *dir = open_dir (deep, FALSE);
  add (dir, "a.csv", "one\n");
  ant_output_dir_close (dir);
  g_assert_cmpuint (count_entries (folder), ==, 0);
  remove_folder (folder);
}

static void
test_existing_results (void)
{
  char *folder = new_folder ();
  AntOutputDir *dir = open_dir (folder, FALSE);
  add (dir, "b.csv", "old\n");
  g_assert_true (ant_output_dir_commit (dir, NULL));
  ant_output_dir_close (dir);

  g_autoptr (GError) error = NULL;
  g_assert_null (ant_output_dir_open (folder, names, FALSE, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
  g_assert_nonnull (strstr (error->message, "b.csv: exists already"));
  assert_contents (folder, "b.csv", "old\n");

  dir = open_dir (folder, TRUE);
  add (dir, "b.csv", "new\n");
  assert_contents (folder, "b.csv", "old\n");
  g_assert_true (ant_output_dir_commit (dir, NULL));
  ant_output_dir_close (dir);
  assert_contents (folder, "b.csv", "new\n");
  remove_folder (folder);
}

/* A file that reaches the size limit of the process stands for a full disk: part of it is written, then no more. */
static void
test_no_room (void)
{
  char *folder = new_folder ();
  g_autoptr (GError) error = NULL;
  g_autofree char *text = g_strnfill (100000, 'x');
  AntOutputDir *dir = open_dir (folder, FALSE);
  add (dir, "a.csv", "one\n");
  struct rlimit usual, small;
  g_assert_cmpint (getrlimit (RLIMIT_FSIZE, &usual), ==, 0);
  small = usual;
  small.rlim_cur = 20000;
  signal (SIGXFSZ, SIG_IGN);
  g_assert_cmpint (setrlimit (RLIMIT_FSIZE, &small), ==, 0);
  gboolean added = ant_output_dir_add (dir, "b.csv", text, 100000, &error);
  g_assert_cmpint (setrlimit (RLIMIT_FSIZE, &usual), ==, 0);
  g_assert_false (added);
  g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
  g_assert_nonnull (strstr (error->message, "b.csv: cannot be written: "));
  ant_output_dir_close (dir);
  g_assert_cmpuint (count_entries (folder), ==, 0);
  remove_folder (folder);
}

static void
test_below_a_file (void)
{
  char *folder = new_folder ();
  g_autoptr (GError) error = NULL;
  g_autofree char *file = g_build_filename (folder, "file", NULL), *below = g_build_filename (file, "out", NULL);
  g_assert_true (g_file_set_contents (file, "x", 1, NULL));
  g_assert_null (ant_output_dir_open (below, names, TRUE, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
  g_assert_nonnull (strstr (error->message, file));
  assert_contents (folder, "file", "x");
  remove_folder (folder);
}

static void
test_a_folder_in_the_way (void)
{
  char *folder = new_folder ();
  g_autoptr (GError) error = NULL;
  g_autofree char *in_the_way = g_build_filename (folder, "b.csv", NULL);
  g_assert_cmpint (g_mkdir (in_the_way, 0777), ==, 0);
  g_assert_null (ant_output_dir_open (folder, names, TRUE, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
  g_assert_nonnull (strstr (error->message, "b.csv"));
  remove_folder (folder);
}

static void
test_vanished (void)
{
  char *folder = new_folder ();
  g_autoptr (GError) error = NULL;
  AntOutputDir *dir = open_dir (folder, FALSE);
  g_assert_cmpint (g_rmdir (folder), ==, 0);
  g_assert_false (ant_output_dir_add (dir, "a.csv", "one\n", 4, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
  g_assert_true (g_str_has_prefix (error->message, folder));
  ant_output_dir_close (dir);
  g_assert_false (g_file_test (folder, G_FILE_TEST_EXISTS));
  g_free (folder);
}

/* One result cannot take its name at the last moment: the others that were new go too. */
static void
test_late_failure (void)
{
  char *folder = new_folder ();
  g_autoptr (GError) error = NULL;
  g_autofree char *in_the_way = g_build_filename (folder, "b.csv", NULL);
  AntOutputDir *dir = open_dir (folder, FALSE);
  add (dir, "a.csv", "one\n");
  add (dir, "b.csv", "two\n");
  g_assert_cmpint (g_mkdir (in_the_way, 0777), ==, 0);
  g_assert_false (ant_output_dir_commit (dir, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
  ant_output_dir_close (dir);
  g_assert_cmpuint (count_entries (folder), ==, 1);
  remove_folder (folder);
}

int
main (int argc, char **argv)
{
  g_test_init (&argc, &argv, NULL);
  g_test_add_func ("/writers/output-dir/all-results-appear-at-once", test_whole);
  g_test_add_func ("/writers/output-dir/without-a-commit-nothing-is-left", test_nothing_without_commit);
  g_test_add_func ("/writers/output-dir/existing-results-are-replaced-only-when-asked", test_existing_results);
  g_test_add_func ("/writers/output-dir/no-room-leaves-nothing", test_no_room);
  g_test_add_func ("/writers/output-dir/a-file-cannot-be-a-folder", test_below_a_file);
  g_test_add_func ("/writers/output-dir/a-folder-in-the-way-is-named", test_a_folder_in_the_way);
  g_test_add_func ("/writers/output-dir/a-vanished-folder-is-named", test_vanished);
  g_test_add_func ("/writers/output-dir/a-late-failure-takes-the-others-back", test_late_failure);
  return g_test_run ();
}
