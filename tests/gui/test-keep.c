/* test-keep.c - the work is kept: saved, opened again, undone, brought back after a crash, and never lost unasked. */
#include <glib/gstdio.h>
#include <string.h>

#include "gui/window-private.h"
#include "support.h"
#include "writers/analysis-file.h"

typedef struct
{
  char *folder, *record, *path;
} Place;

/* A copy of the record that may be moved and changed. */
static void
set_up (Place *place, gconstpointer data)
{
  g_autofree char *text = NULL;
  gsize n;
  place->folder = g_dir_make_tmp (NULL, NULL);
  place->record = g_build_filename (place->folder, "record.txt", NULL);
  place->path = g_build_filename (place->folder, "work.antumbra", NULL);
  g_assert_true (g_file_get_contents (test_gui_record (), &text, &n, NULL));
  g_assert_true (g_file_set_contents (place->record, text, (gssize) n, NULL));
}

static void
remove_all (const char *path)
{
  GDir *dir = g_dir_open (path, 0, NULL);
  for (const char *name; dir && (name = g_dir_read_name (dir));)
    {
      g_autofree char *child = g_build_filename (path, name, NULL);
      remove_all (child);
    }
  if (dir)
    g_dir_close (dir);
  g_remove (path);
}

static void
tear_down (Place *place, gconstpointer data)
{
  remove_all (place->folder);
  g_free (place->folder);
  g_free (place->record);
  g_free (place->path);
}

static AntWindow *
window_with (const char *path)
{
  AntWindow *window = test_gui_window ();
  ant_window_open (window, path);
  test_gui_wait (test_gui_idle, ant_window_get_desk (window), 20);
  return window;
}

static AntWindow *
window_scanned (const Place *place)
{
  AntWindow *window = window_with (place->record);
  gtk_widget_activate_action (GTK_WIDGET (window), "win.scan", NULL);
  test_gui_wait (test_gui_idle, ant_window_get_desk (window), 120);
  return window;
}

static gboolean
is_saved (gpointer desk)
{
  return !ant_desk_is_saving (desk) && !ant_analysis_is_changed (ant_desk_get_analysis (desk));
}

static gboolean
is_not_saving (gpointer desk)
{
  return !ant_desk_is_saving (desk);
}

static gboolean
exists (gpointer path)
{
  return g_file_test (path, G_FILE_TEST_EXISTS);
}

static void
judge (AntWindow *window, const char *class, const char *note)
{
  AntDesk *desk = ant_window_get_desk (window);
  ant_desk_select_mark (desk, 0);
  gtk_widget_activate_action (GTK_WIDGET (window), "win.verdict", "s", class);
  ant_desk_note (desk, note);
}

static void
expect_verdict (AntDesk *desk, AntDipClass class, const char *note)
{
  ant_desk_select_mark (desk, 0);
  g_assert_nonnull (ant_desk_get_selected (desk));
  g_assert_cmpint (ant_dip_item_get_class (ant_desk_get_selected (desk)), ==, class);
  g_assert_cmpstr (ant_dip_item_get_note (ant_desk_get_selected (desk)), ==, note);
}

static void
save (AntWindow *window, const Place *place)
{
  ant_desk_save (ant_window_get_desk (window), place->path);
  test_gui_wait (is_saved, ant_window_get_desk (window), 20);
}

static void
a_saved_analysis_opens_without_a_scan (Place *place, gconstpointer data)
{
  AntWindow *window = window_scanned (place);
  judge (window, "planet", "as predicted");
  g_assert_true (g_str_has_prefix (gtk_window_get_title (GTK_WINDOW (window)), "• record.txt"));
  save (window, place);
  g_assert_cmpstr (gtk_window_get_title (GTK_WINDOW (window)), ==, "work.antumbra");
  test_gui_close (window);
  window = window_with (place->path);
  AntDesk *desk = ant_window_get_desk (window);
  g_assert_nonnull (ant_desk_get_results (desk));
  g_assert_false (ant_desk_is_stale (desk));
  expect_verdict (desk, ANT_CLASS_PLANET, "as predicted");
  g_assert_cmpstr (gtk_window_get_title (GTK_WINDOW (window)), ==, "work.antumbra");
  test_gui_close (window);
}

static char *
edit_label (AntWindow *window, int i)
{
  char *label = NULL;
  g_menu_model_get_item_attribute (G_MENU_MODEL (window->edit_section), i, "label", "s", &label);
  return label;
}

static void
changes_are_undone_and_done_again_by_name (Place *place, gconstpointer data)
{
  AntWindow *window = window_scanned (place);
  AntDesk *desk = ant_window_get_desk (window);
  judge (window, "planet", "");
  g_assert_true (ant_desk_set_setting (desk, ant_setting_find ("duration-max"), "8", NULL));
  g_autofree char *undo = edit_label (window, 0);
  g_assert_cmpstr (undo, ==, "_Undo: Set duration-max");
  gtk_widget_activate_action (GTK_WIDGET (window), "win.undo", NULL);
  g_assert_false (ant_desk_is_stale (desk));
  gtk_widget_activate_action (GTK_WIDGET (window), "win.undo", NULL);
  expect_verdict (desk, ANT_CLASS_UNDECIDED, "");
  g_autofree char *redo = edit_label (window, 1);
  g_assert_cmpstr (redo, ==, "_Redo: Verdict of dip 1");
  gtk_widget_activate_action (GTK_WIDGET (window), "win.redo", NULL);
  expect_verdict (desk, ANT_CLASS_PLANET, "");
  test_gui_close (window);
}

static void
a_masked_span_is_left_out_of_the_next_scan (Place *place, gconstpointer data)
{
  AntWindow *window = window_scanned (place);
  AntDesk *desk = ant_window_get_desk (window);
  const AntSpan dip = { TEST_DIP_D - 0.2, TEST_DIP_D + 0.2 }, *masks;
  gsize before = ant_desk_get_results (desk)->n_dips;
  gtk_widget_activate_action (GTK_WIDGET (window), "win.mask", NULL);
  g_assert_cmpint (ant_desk_get_purpose (desk), ==, ANT_DRAG_MASK);
  ant_desk_set_span (desk, &dip);
  ant_desk_use_span (desk);
  g_assert_cmpint (ant_desk_get_purpose (desk), ==, ANT_DRAG_VIEW);
  g_assert_cmpuint (ant_desk_get_masks (desk, &masks), ==, 1);
  g_assert_true (ant_desk_is_stale (desk));
  gtk_widget_activate_action (GTK_WIDGET (window), "win.scan", NULL);
  g_assert_nonnull (ant_desk_get_results (desk)); /* those of before, until it ends */
  test_gui_wait (test_gui_idle, desk, 120);
  g_assert_cmpuint (ant_desk_get_results (desk)->n_dips, ==, before - 1);
  gsize n_masked = 0;
  for (gsize i = 0; i < ant_desk_get_record (desk)->n_rows; i++)
    n_masked += ant_desk_get_record (desk)->flags[i] == ANT_FLAG_HAND;
  g_assert_cmpuint (n_masked, >, 50);
  ant_desk_set_span (desk, &(AntSpan) { 0, 16 });
  gtk_widget_activate_action (GTK_WIDGET (window), "win.unmask", NULL);
  g_assert_cmpuint (ant_desk_get_masks (desk, &masks), ==, 0);
  test_gui_close (window);
}

/* As a crash leaves it: what was kept aside stays, the window is never asked. */
static void
crash (AntWindow *window, const char *unsaved)
{
  g_autofree char *kept = NULL;
  gsize n;
  test_gui_wait (exists, (gpointer) (gsize) unsaved, 20);
  test_gui_settle (200);
  g_assert_true (g_file_get_contents (unsaved, &kept, &n, NULL));
  test_gui_close (window);
  g_assert_false (g_file_test (unsaved, G_FILE_TEST_EXISTS)); /* let go, it is not offered */
  g_assert_true (g_file_set_contents (unsaved, kept, (gssize) n, NULL));
}

static void
unsaved_work_is_offered_back (Place *place, gconstpointer data)
{
  AntWindow *window = window_scanned (place);
  g_autofree char *unsaved = ant_unsaved_path (place->path, 0);
  save (window, place);
  judge (window, "spot", "typed and never saved");
  crash (window, unsaved);
  window = window_with (place->path);
  AntDesk *desk = ant_window_get_desk (window);
  expect_verdict (desk, ANT_CLASS_UNDECIDED, "");
  g_assert_nonnull (ant_desk_get_left_behind (desk));
  g_assert_true (gtk_info_bar_get_revealed (window->offer));
  ant_window_accept_offer (window);
  test_gui_wait (test_gui_idle, desk, 20);
  expect_verdict (desk, ANT_CLASS_SPOT, "typed and never saved");
  g_assert_cmpstr (ant_analysis_get_path (ant_desk_get_analysis (desk)), ==, place->path);
  g_assert_true (ant_analysis_is_changed (ant_desk_get_analysis (desk)));
  g_assert_false (gtk_info_bar_get_revealed (window->offer));
  gtk_widget_activate_action (GTK_WIDGET (window), "win.save", NULL);
  test_gui_wait (is_saved, desk, 20);
  test_gui_close (window);
  g_assert_false (g_file_test (unsaved, G_FILE_TEST_EXISTS));
}

static void
unsaved_work_can_be_thrown_away (Place *place, gconstpointer data)
{
  AntWindow *window = window_scanned (place);
  g_autofree char *unsaved = ant_unsaved_path (place->path, 0);
  save (window, place);
  judge (window, "spot", "");
  crash (window, unsaved);
  window = window_with (place->path);
  ant_window_decline_offer (window);
  g_assert_false (gtk_info_bar_get_revealed (window->offer));
  test_gui_close (window);
  window = window_with (place->path);
  g_assert_null (ant_desk_get_left_behind (ant_window_get_desk (window)));
  test_gui_close (window);
}

static void
a_record_that_is_gone_can_be_pointed_to_again (Place *place, gconstpointer data)
{
  AntWindow *window = window_scanned (place);
  g_autofree char *moved = g_build_filename (place->folder, "moved.txt", NULL);
  judge (window, "planet", "");
  save (window, place);
  test_gui_close (window);
  g_assert_cmpint (g_rename (place->record, moved), ==, 0);
  window = window_with (place->path);
  AntDesk *desk = ant_window_get_desk (window);
  g_assert_true (ant_desk_lacks_record (desk));
  g_assert_true (gtk_info_bar_get_revealed (window->offer));
  ant_desk_locate (desk, moved);
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_false (ant_desk_lacks_record (desk));
  g_assert_false (gtk_info_bar_get_revealed (window->offer));
  g_assert_nonnull (ant_desk_get_results (desk));
  expect_verdict (desk, ANT_CLASS_PLANET, "");
  g_assert_true (ant_analysis_is_changed (ant_desk_get_analysis (desk)));
  test_gui_close (window);
}

static void
a_record_that_changed_is_told (Place *place, gconstpointer data)
{
  AntWindow *window = window_scanned (place);
  judge (window, "planet", "");
  save (window, place);
  test_gui_close (window);
  FILE *record = g_fopen (place->record, "a");
  g_assert_cmpint (fputs ("# a word more\n", record), >=, 0);
  fclose (record);
  window = window_with (place->path);
  g_assert_true (gtk_info_bar_get_revealed (window->banner));
  g_assert_nonnull (strstr (gtk_label_get_text (window->banner_text), "the bytes are not those"));
  g_assert_null (ant_desk_get_results (ant_window_get_desk (window)));
  g_assert_cmpuint (ant_judgements_count (ant_analysis_get_judgements (ant_desk_get_analysis (ant_window_get_desk (window)))), ==, 1);
  test_gui_close (window);
}

static void
a_place_that_cannot_be_written_is_one_sentence (Place *place, gconstpointer data)
{
  AntWindow *window = window_scanned (place);
  AntDesk *desk = ant_window_get_desk (window);
  judge (window, "planet", "kept in memory");
  ant_desk_save (desk, "/proc/nothing-can-be-made-here.antumbra");
  test_gui_wait (is_not_saving, desk, 20);
  g_assert_true (gtk_info_bar_get_revealed (window->banner));
  g_assert_true (g_str_has_prefix (gtk_label_get_text (window->banner_text), "/proc/nothing-can-be-made-here.antumbra: "));
  g_assert_true (ant_analysis_is_changed (ant_desk_get_analysis (desk)));
  expect_verdict (desk, ANT_CLASS_PLANET, "kept in memory");
  test_gui_close (window);
}

static void
closing_asks_only_where_work_would_be_lost (Place *place, gconstpointer data)
{
  AntWindow *window = window_scanned (place);
  gtk_window_close (GTK_WINDOW (window)); /* a scan can be made again */
  g_assert_null (test_gui_question ());
  test_gui_settle (50);
  window = window_scanned (place);
  AntDesk *desk = ant_window_get_desk (window);
  judge (window, "planet", "");
  gtk_window_close (GTK_WINDOW (window));
  g_assert_nonnull (test_gui_question ());
  gtk_dialog_response (test_gui_question (), GTK_RESPONSE_CANCEL);
  expect_verdict (desk, ANT_CLASS_PLANET, "");
  ant_window_open (window, test_gui_record ());
  g_assert_nonnull (test_gui_question ());
  gtk_dialog_response (test_gui_question (), GTK_RESPONSE_REJECT);
  test_gui_settle (50);
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_cmpuint (ant_judgements_count (ant_analysis_get_judgements (ant_desk_get_analysis (desk))), ==, 0);
  test_gui_close (window);
}

/* Same bytes as the command */

static void
run_cli (const char *const *argv)
{
  int status;
  g_autoptr (GError) error = NULL;
  g_assert_true (g_spawn_sync (NULL, (char **) (gsize) argv, NULL, G_SPAWN_STDOUT_TO_DEV_NULL, NULL, NULL, NULL, NULL, &status, &error));
  g_assert_no_error (error);
  g_assert_cmpint (status, ==, 0);
}

static void
expect_same_tables (const char *one, const char *other)
{
  g_autoptr (GDir) dir = g_dir_open (one, 0, NULL);
  guint n = 0;
  for (const char *name; (name = g_dir_read_name (dir));)
    {
      g_autofree char *a = g_build_filename (one, name, NULL), *b = g_build_filename (other, name, NULL);
      g_autofree char *text_a = NULL, *text_b = NULL;
      if (!g_str_has_suffix (name, ".csv"))
        continue;
      g_assert_true (g_file_get_contents (a, &text_a, NULL, NULL) && g_file_get_contents (b, &text_b, NULL, NULL));
      g_assert_cmpstr (text_a, ==, text_b);
      n++;
    }
  g_assert_cmpuint (n, >=, 7);
}

static void
save_tables (AntWindow *window, char *folder)
{
  g_autofree char *last = g_build_filename (folder, "analysis.antumbra", NULL);
  ant_window_save_tables_into (window, folder, FALSE);
  test_gui_wait (exists, last, 20);
  test_gui_settle (100);
}

static void
window_and_command_write_the_same_tables (Place *place, gconstpointer data)
{
  const char *cli = g_getenv ("ANT_CLI");
  AntWindow *window = window_with (place->record);
  AntDesk *desk = ant_window_get_desk (window);
  g_autofree char *live = g_build_filename (place->folder, "live", NULL), *opened = g_build_filename (place->folder, "opened", NULL);
  g_autofree char *scanned = g_build_filename (place->folder, "scanned", NULL);
  g_assert_true (ant_desk_set_setting (desk, ant_setting_find ("duration-max"), "11.3", NULL));
  ant_desk_mask (desk, &(AntSpan) { 3.21, 3.47 });
  gtk_widget_activate_action (GTK_WIDGET (window), "win.scan", NULL);
  test_gui_wait (test_gui_idle, desk, 120);
  judge (window, "planet", "seen, and “noted”");
  save (window, place);
  save_tables (window, live);
  test_gui_close (window);
  window = window_with (place->path);
  save_tables (window, opened);
  test_gui_close (window);
  run_cli ((const char *const[]) { cli, "scan", "--from", place->path, "--out", scanned, NULL });
  expect_same_tables (live, opened);
  expect_same_tables (live, scanned);
}

#define ADD(path, function) g_test_add ("/gui/keep/" path, Place, NULL, set_up, function, tear_down)

static void
add (void)
{
  ADD ("a-saved-analysis-opens-without-a-scan", a_saved_analysis_opens_without_a_scan);
  ADD ("changes-are-undone-and-done-again-by-name", changes_are_undone_and_done_again_by_name);
  ADD ("a-masked-span-is-left-out-of-the-next-scan", a_masked_span_is_left_out_of_the_next_scan);
  ADD ("unsaved-work-is-offered-back", unsaved_work_is_offered_back);
  ADD ("unsaved-work-can-be-thrown-away", unsaved_work_can_be_thrown_away);
  ADD ("a-record-that-is-gone-can-be-pointed-to-again", a_record_that_is_gone_can_be_pointed_to_again);
  ADD ("a-record-that-changed-is-told", a_record_that_changed_is_told);
  ADD ("a-place-that-cannot-be-written-is-one-sentence", a_place_that_cannot_be_written_is_one_sentence);
  ADD ("closing-asks-only-where-work-would-be-lost", closing_asks_only_where_work_would_be_lost);
  ADD ("window-and-command-write-the-same-tables", window_and_command_write_the_same_tables);
}

int
main (int argc, char **argv)
{
  return test_gui_run (&argc, &argv, add);
}
