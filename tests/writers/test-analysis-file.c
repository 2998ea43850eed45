/* test-analysis-file.c - an analysis on the disk: whole or as before when the disk is full, the folder may not be written,
 * or the program is killed; and unsaved work kept beside it. */
#include "writers/analysis-file.h"

#include <errno.h>
#include <glib/gstdio.h>
#include <signal.h>
#include <string.h>
#include <sys/resource.h>
#include <sys/wait.h>
#include <unistd.h>

#include "core/random.h"
#include "data/analysis-text.h"
#include "data/error.h"
#include "worked.h"

typedef struct
{
  char *folder, *path, *unsaved;
} Fixture;

static void
set_up (Fixture *f, gconstpointer data)
{
  f->folder = g_dir_make_tmp (NULL, NULL);
  f->path = g_build_filename (f->folder, "work.antumbra", NULL);
  f->unsaved = ant_unsaved_path (f->path, 0);
}

static void
empty (const char *folder)
{
  g_autoptr (GDir) dir = g_dir_open (folder, 0, NULL);
  for (const char *name; (name = g_dir_read_name (dir));)
    {
      g_autofree char *path = g_build_filename (folder, name, NULL);
      g_unlink (path);
    }
}

static void
tear_down (Fixture *f, gconstpointer data)
{
  g_chmod (f->folder, 0700);
  empty (f->folder);
  g_rmdir (f->folder);
  g_free (f->folder);
  g_free (f->path);
  g_free (f->unsaved);
}

static AntAnalysis *
load (const char *path)
{
  g_autoptr (GError) error = NULL;
  g_autofree char *newer = NULL;
  AntAnalysis *analysis = ant_analysis_load (path, &newer, &error);
  g_assert_no_error (error);
  return analysis;
}

static void
save (AntAnalysis *analysis, const char *path)
{
  g_autoptr (GError) error = NULL;
  ant_analysis_file_save (analysis, path, TRUE, &error);
  g_assert_no_error (error);
}

static void
what_is_saved_is_not_unsaved (Fixture *f, gconstpointer data)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  g_assert_true (ant_analysis_is_changed (analysis));
  save (analysis, f->path);
  g_assert_false (ant_analysis_is_changed (analysis));
  g_assert_cmpstr (ant_analysis_get_path (analysis), ==, f->path);
  g_autoptr (AntAnalysis) back = load (f->path);
  g_autofree char *one = ant_analysis_to_text (analysis, f->path), *other = ant_analysis_to_text (back, f->path);
  g_assert_cmpstr (one, ==, other);
}

/* Whatever is wrong with the place: one sentence, the file as it was, and the work still unsaved in memory. */
static void
expect_kept (Fixture *f, AntAnalysis *analysis, const char *path)
{
  g_autoptr (GError) error = NULL;
  g_autofree char *before = NULL, *after = NULL;
  g_file_get_contents (f->path, &before, NULL, NULL);
  g_assert_false (ant_analysis_file_save (analysis, path, TRUE, &error));
  g_assert_error (error, ANT_ERROR, ANT_ERROR_WRITE);
  g_assert_true (g_str_has_prefix (error->message, path));
  g_assert_null (strchr (error->message, '\n'));
  g_file_get_contents (f->path, &after, NULL, NULL);
  g_assert_cmpstr (before, ==, after);
  g_assert_true (ant_analysis_is_changed (analysis));
  g_assert_cmpint (ant_judgements_class (ant_analysis_get_judgements (analysis), 2, 0.3), ==, ANT_CLASS_PLANET);
}

static void
a_full_disk_leaves_the_file_as_it_was (Fixture *f, gconstpointer data)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  struct rlimit before, small;
  save (analysis, f->path);
  ant_analysis_mask (analysis, (AntSpan) { 0, 1 }, "");
  signal (SIGXFSZ, SIG_IGN); /* the write fails instead */
  g_assert_cmpint (getrlimit (RLIMIT_FSIZE, &before), ==, 0);
  small = (struct rlimit) { 2000, before.rlim_max };
  g_assert_cmpint (setrlimit (RLIMIT_FSIZE, &small), ==, 0);
  expect_kept (f, analysis, f->path);
  g_assert_cmpint (setrlimit (RLIMIT_FSIZE, &before), ==, 0);
  save (analysis, f->path);
}

static void
a_folder_that_may_not_be_written_is_one_sentence (Fixture *f, gconstpointer data)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  save (analysis, f->path);
  ant_analysis_mask (analysis, (AntSpan) { 0, 1 }, "");
  expect_kept (f, analysis, "/proc/nothing-can-be-made-here.antumbra"); /* for root too */
  if (geteuid () == 0)
    return;
  g_chmod (f->folder, 0500);
  expect_kept (f, analysis, f->path);
}

static void
a_folder_that_is_gone_is_one_sentence (Fixture *f, gconstpointer data)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  g_autofree char *gone = g_build_filename (f->folder, "gone", "work.antumbra", NULL);
  expect_kept (f, analysis, gone);
}

static void
a_file_removed_meanwhile_is_saved_again (Fixture *f, gconstpointer data)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  save (analysis, f->path);
  g_unlink (f->path);
  save (analysis, f->path);
  g_autoptr (AntAnalysis) back = load (f->path);
}

static void
unsaved_work_stands_beside_the_file (Fixture *f, gconstpointer data)
{
  g_autoptr (AntAnalysis) analysis = test_worked_analysis ();
  g_autofree char *text = ant_analysis_to_text (analysis, f->unsaved), *beside = g_path_get_dirname (f->unsaved);
  g_assert_cmpstr (beside, ==, f->folder);
  g_assert_true (ant_unsaved_write (f->unsaved, text, NULL));
  g_autoptr (AntAnalysis) back = load (f->unsaved);
  g_assert_cmpstr (ant_analysis_get_record_path (back), ==, ant_analysis_get_record_path (analysis));
  ant_unsaved_remove (f->unsaved);
  g_assert_false (g_file_test (f->unsaved, G_FILE_TEST_EXISTS));
}

static void
work_without_a_file_is_found_when_its_process_is_no_more (Fixture *f, gconstpointer data)
{
  g_autofree char *own = ant_unsaved_path (NULL, 1), *folder = g_path_get_dirname (own);
  g_assert_true (ant_unsaved_write (own, "{}", NULL));
  pid_t child = fork ();
  if (child == 0)
    {
      g_autofree char *its = ant_unsaved_path (NULL, 1);
      _exit (!ant_unsaved_write (its, "{}", NULL));
    }
  int status;
  g_assert_cmpint (waitpid (child, &status, 0), ==, child);
  g_assert_cmpint (status, ==, 0);
  g_auto (GStrv) left = ant_unsaved_left_behind ();
  g_assert_cmpuint (g_strv_length (left), ==, 1);
  g_assert_cmpstr (left[0], !=, own);
  empty (folder);
}

/* Killed at any moment */

/* The state number k of the work: a mask of k days, so that a file tells which it is. */
static AntAnalysis *
state (guint k)
{
  AntAnalysis *analysis = test_worked_analysis ();
  ant_analysis_mask (analysis, (AntSpan) { 100, 100 + k }, "state");
  return analysis;
}

static guint
state_of (const char *path)
{
  g_autoptr (AntAnalysis) analysis = load (path);
  const GPtrArray *masks = ant_analysis_get_treatment (analysis)->masks;
  const AntMask *last = g_ptr_array_index (masks, masks->len - 1);
  g_assert_cmpstr (last->reason, ==, "state");
  return (guint) (last->span.end_d - last->span.start_d);
}

/* Save state after state, an unsaved one after each; tell the pipe what has been brought to the disk. */
static void
save_for_ever (const Fixture *f, int told)
{
  for (guint k = 1;; k++)
    {
      g_autoptr (AntAnalysis) analysis = state (k);
      g_autofree char *text = ant_analysis_to_text (analysis, f->path), *unsaved = ant_analysis_to_text (analysis, f->unsaved);
      if (!ant_unsaved_write (f->unsaved, unsaved, NULL) || write (told, &(guint8) { 'u' }, 1) != 1
          || !ant_analysis_file_write (f->path, text, TRUE, NULL) || write (told, &(guint8) { 's' }, 1) != 1)
        _exit (1);
    }
}

/* Returns how many states it had brought to the disk. */
static guint
kill_one (const Fixture *f, AntRandom *random)
{
  int ends[2];
  guint n_unsaved = 0, n_saved = 0;
  guint8 what;
  g_assert_cmpint (pipe (ends), ==, 0);
  pid_t child = fork ();
  if (child == 0)
    {
      close (ends[0]);
      save_for_ever (f, ends[1]);
    }
  close (ends[1]);
  if (ant_random_uniform (random) < 0.8 && read (ends[0], &what, 1) == 1) /* mostly once it is at work */
    n_unsaved++;
  g_usleep ((gulong) (12000 * ant_random_uniform (random)));
  g_assert_cmpint (kill (child, SIGKILL), ==, 0);
  int status;
  g_assert_cmpint (waitpid (child, &status, 0), ==, child);
  g_assert_true (WIFSIGNALED (status));
  while (read (ends[0], &what, 1) == 1)
    *(what == 's' ? &n_saved : &n_unsaved) += 1;
  close (ends[0]);
  /* What was told is there, or the one after it that was not told any more. */
  guint saved = g_file_test (f->path, G_FILE_TEST_EXISTS) ? state_of (f->path) : 0;
  guint unsaved = g_file_test (f->unsaved, G_FILE_TEST_EXISTS) ? state_of (f->unsaved) : 0;
  g_assert_true (saved == n_saved || saved == n_saved + 1);
  g_assert_true (unsaved == n_unsaved || unsaved == n_unsaved + 1);
  empty (f->folder);
  return n_saved + n_unsaved;
}

static void
killed_at_any_moment_it_opens_as_before_or_after (Fixture *f, gconstpointer data)
{
  int n = g_getenv ("ANT_KILLS") ? (int) g_ascii_strtoll (g_getenv ("ANT_KILLS"), NULL, 10) : 40;
  AntRandom random;
  ant_random_seed (&random, 909, 0);
  guint n_states = 0;
  for (int i = 0; i < n; i++)
    n_states += kill_one (f, &random);
  g_test_message ("killed %d times, after %u states on the disk", n, n_states);
  g_assert_cmpuint (n_states, >, (guint) n / 2);
}

#define ADD(path, function) g_test_add ("/writers/analysis-file/" path, Fixture, NULL, set_up, function, tear_down)

int
main (int argc, char **argv)
{
  g_autofree char *states = g_dir_make_tmp (NULL, NULL);
  g_setenv ("XDG_STATE_HOME", states, TRUE);
  g_test_init (&argc, &argv, NULL);
  ADD ("what-is-saved-is-not-unsaved", what_is_saved_is_not_unsaved);
  ADD ("a-full-disk-leaves-the-file-as-it-was", a_full_disk_leaves_the_file_as_it_was);
  ADD ("a-folder-that-may-not-be-written-is-one-sentence", a_folder_that_may_not_be_written_is_one_sentence);
  ADD ("a-folder-that-is-gone-is-one-sentence", a_folder_that_is_gone_is_one_sentence);
  ADD ("a-file-removed-meanwhile-is-saved-again", a_file_removed_meanwhile_is_saved_again);
  ADD ("unsaved-work-stands-beside-the-file", unsaved_work_stands_beside_the_file);
  ADD ("work-without-a-file-is-found-when-its-process-is-no-more", work_without_a_file_is_found_when_its_process_is_no_more);
  ADD ("killed-at-any-moment-it-opens-as-before-or-after", killed_at_any_moment_it_opens_as_before_or_after);
  return g_test_run ();
}
