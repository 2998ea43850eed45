/* test-column-chooser.c - choices are seen at once, accepted, and remembered for files of the same kind. */
#include <glib/gstdio.h>

#include "gui/column-chooser.h"
#include "gui/reading-memory.h"
#include "support.h"

static char *
write_record (const char *name, const char *header, int shift)
{
  g_autoptr (GString) text = g_string_new (header);
  g_autofree char *folder = g_dir_make_tmp (NULL, NULL);
  for (int i = 0; i < 400; i++)
    g_string_append_printf (text, "%.4f,%.3f,%.3f\n", 2466000.5 + i / 144.0, 1361 + 0.01 * ((i + shift) % 7), 21 + 0.01 * (i % 5));
  char *path = g_build_filename (folder, name, NULL);
  g_assert_true (g_file_set_contents (path, text->str, -1, NULL));
  return path;
}

static void
remove_record (char *path)
{
  g_autofree char *folder = g_path_get_dirname (path);
  g_unlink (path);
  g_rmdir (folder);
  g_free (path);
}

static gpointer
field (GtkWidget *chooser, int column, int row)
{
  return gtk_grid_get_child_at (test_gui_find (chooser, GTK_TYPE_GRID), column, row);
}

static gboolean
can_accept (gpointer chooser)
{
  return gtk_widget_get_sensitive (gtk_window_get_default_widget (GTK_WINDOW (chooser)));
}

static gboolean
cannot_accept (gpointer chooser)
{
  return !can_accept (chooser);
}

static void
a_choice_is_taken_and_kept_for_the_kind (void)
{
  char *path = write_record ("first.csv", "JD,tsi,temperature\n", 0), *next = write_record ("next.csv", "JD,tsi,temperature\n", 3);
  char *other = write_record ("other.csv", "JD,tsi,voltage\n", 0);
  AntWindow *window = test_gui_window ();
  AntDesk *desk = ant_window_get_desk (window);
  AntReadingChoices none = { 0 };
  GtkWidget *chooser = ant_column_chooser_new (GTK_WINDOW (window), desk, path, &none, ANT_CHOOSE_RECORD);
  gtk_window_present (GTK_WINDOW (chooser));
  test_gui_wait (can_accept, chooser, 20);
  gtk_drop_down_set_selected (field (chooser, 3, 0), 3); /* found by the reader, JD, tsi, temperature */
  test_gui_settle (400);
  test_gui_wait (can_accept, chooser, 20);
  g_signal_emit_by_name (gtk_window_get_default_widget (GTK_WINDOW (chooser)), "clicked");
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_cmpstr (ant_desk_get_record (desk)->value_name, ==, "temperature");
  ant_desk_open (desk, next);
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_cmpstr (ant_desk_get_record (desk)->value_name, ==, "temperature");
  ant_desk_open (desk, other);
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_cmpstr (ant_desk_get_record (desk)->value_name, ==, "tsi");
  test_gui_close (window);
  remove_record (path);
  remove_record (next);
  remove_record (other);
}

static void
what_cannot_be_read_so_cannot_be_accepted (void)
{
  char *path = write_record ("third.csv", "JD,a,b\n", 0);
  AntWindow *window = test_gui_window ();
  AntReadingChoices none = { 0 };
  GtkWidget *chooser = ant_column_chooser_new (GTK_WINDOW (window), ant_window_get_desk (window), path, &none, ANT_CHOOSE_RECORD);
  gtk_window_present (GTK_WINDOW (chooser));
  test_gui_wait (can_accept, chooser, 20);
  gtk_editable_set_text (field (chooser, 1, 0), "no such column");
  test_gui_wait (cannot_accept, chooser, 20);
  gtk_editable_set_text (field (chooser, 1, 0), "1");
  test_gui_wait (can_accept, chooser, 20);
  gtk_editable_set_text (field (chooser, 3, 3), "-99, x");
  test_gui_wait (cannot_accept, chooser, 20);
  gtk_window_close (GTK_WINDOW (chooser));
  test_gui_settle (100);
  g_assert_null (ant_desk_get_record (ant_window_get_desk (window)));
  test_gui_close (window);
  remove_record (path);
}

static void
memory_keeps_every_choice_and_forgets_none (void)
{
  AntReadingChoices choices = { .time_column = g_strdup ("1+2"), .hdu = g_strdup ("RATES") }, kept, none = { 0 };
  g_assert_true (ant_reading_choices_parse_fills (&choices, "-99, 0", NULL));
  ant_reading_memory_keep ("text\ta\tb", &choices);
  g_assert_true (ant_reading_memory_recall ("text\ta\tb", &kept));
  g_assert_true (ant_reading_choices_same (&kept, &choices));
  g_assert_false (ant_reading_memory_recall ("text\ta", &none));
  ant_reading_memory_keep ("text\ta\tb", &(AntReadingChoices) { 0 });
  g_assert_false (ant_reading_memory_recall ("text\ta\tb", &none));
  ant_reading_choices_clear (&choices);
  ant_reading_choices_clear (&kept);
}

static void
add (void)
{
  g_test_add_func ("/gui/column-chooser/a-choice-is-taken-and-kept-for-the-kind", a_choice_is_taken_and_kept_for_the_kind);
  g_test_add_func ("/gui/column-chooser/what-cannot-be-read-so-cannot-be-accepted", what_cannot_be_read_so_cannot_be_accepted);
  g_test_add_func ("/gui/column-chooser/memory-keeps-every-choice-and-forgets-none", memory_keeps_every_choice_and_forgets_none);
}

int
main (int argc, char **argv)
{
  return test_gui_run (&argc, &argv, add);
}
