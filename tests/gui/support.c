/* support.c - shared by the tests of the window. */
#include "support.h"

#include <fftw3.h>
#include <glib/gstdio.h>
#include <gsl/gsl_errno.h>
#include <math.h>

#include "gui/style.h"
#include "search/crossing-shape.h"

static char *folder;

int
test_gui_run (int *argc, char ***argv, void (*add) (void))
{
  gtk_test_init (argc, argv, NULL);
  ant_style_install ();
  gsl_set_error_handler_off ();
  fftw_make_planner_thread_safe ();
  folder = g_dir_make_tmp (NULL, NULL);
  add ();
  int code = g_test_run ();
  for (gsize i = 0; i < 2; i++)
    {
      g_autofree char *path = g_build_filename (folder, i ? "bad.csv" : "record.csv", NULL);
      g_remove (path);
    }
  g_rmdir (folder);
  g_free (folder);
  return code;
}

static char *
write_text (const char *name, const char *text)
{
  char *path = g_build_filename (folder, name, NULL);
  g_assert_true (g_file_set_contents (path, text, -1, NULL));
  return path;
}

/* Noise comes from a small generator of its own, so that the bytes are always the same. */
static char *
make_record (void)
{
  g_autoptr (GString) text = g_string_new ("# time in days\ntime_jd,irradiance (W/m2)\n");
  guint32 state = 20410303;
  AntCrossingShape shape;
  ant_crossing_shape_init (&shape, 6 / 24.0, 0.4 / 24.0, ANT_SHAPE_IMPACT, ANT_LIMB_DARKENING_SUN);
  for (int i = 0; i < 16 * 144; i++)
    {
      double noise = 0, time_d = i / 144.0;
      for (int k = 0; k < 6; k++)
        noise += (double) (state = state * 1664525u + 1013904223u) / 4294967296.0 - 0.5;
      double depth = 900 * ant_crossing_shape_mean (&shape, time_d - TEST_DIP_D, 1 / 144.0);
      double spot = 400 * exp (-pow ((time_d - TEST_SPOT_D) / 1.5, 2));
      g_string_append_printf (text, "%.8f,%.6f\n", 2466583.5 + time_d,
                              1361 * (1 + (20 * noise - depth - spot + 60 * sin (time_d / 3)) * 1e-6));
    }
  return write_text ("record.csv", text->str);
}

const char *
test_gui_record (void)
{
  static char *path;
  if (!path)
    path = make_record ();
  return path;
}

const char *
test_gui_bad_record (void)
{
  static char *path;
  if (!path)
    path = write_text ("bad.csv", "time,value\n1,2\n2,2\n3,2\n4,2\n5,2\n6,2\n7,2\n");
  return path;
}

static gboolean
late_cb (gpointer data)
{
  *(gboolean *) data = TRUE;
  return G_SOURCE_REMOVE;
}

void
test_gui_wait (gboolean (*holds) (gpointer data), gpointer data, double seconds)
{
  gboolean late = FALSE;
  guint timer = g_timeout_add ((guint) (seconds * 1000), late_cb, &late);
  while (!holds (data))
    {
      g_assert_false (late);
      g_main_context_iteration (NULL, TRUE); /* the timer at least brings it back */
    }
  if (!late)
    g_source_remove (timer);
}

void
test_gui_settle (guint milliseconds)
{
  gboolean over = FALSE;
  g_timeout_add (milliseconds, late_cb, &over);
  while (!over)
    g_main_context_iteration (NULL, TRUE);
}

gboolean
test_gui_idle (gpointer desk)
{
  return ant_desk_get_busy (desk) == ANT_BUSY_NO;
}

AntWindow *
test_gui_window (void)
{
  AntWindow *window = ant_window_new (NULL);
  gtk_window_present (GTK_WINDOW (window));
  test_gui_settle (50);
  return window;
}

AntWindow *
test_gui_window_with_record (void)
{
  AntWindow *window = test_gui_window ();
  ant_window_open (window, test_gui_record ());
  test_gui_wait (test_gui_idle, ant_window_get_desk (window), 20);
  g_assert_nonnull (ant_desk_get_record (ant_window_get_desk (window)));
  return window;
}

AntWindow *
test_gui_window_scanned (void)
{
  AntWindow *window = test_gui_window_with_record ();
  gtk_widget_activate_action (GTK_WIDGET (window), "win.scan", NULL);
  test_gui_wait (test_gui_idle, ant_window_get_desk (window), 120);
  g_assert_nonnull (ant_desk_get_results (ant_window_get_desk (window)));
  return window;
}

static gboolean
is_gone (gpointer data)
{
  return *(gpointer *) data == NULL;
}

GtkDialog *
test_gui_question (void)
{
  g_autoptr (GList) windows = gtk_window_list_toplevels ();
  for (GList *one = windows; one; one = one->next)
    if (GTK_IS_MESSAGE_DIALOG (one->data) && gtk_widget_get_visible (one->data))
      return one->data;
  return NULL;
}

void
test_gui_close (AntWindow *window)
{
  gpointer left = window;
  g_object_add_weak_pointer (G_OBJECT (window), &left);
  gtk_window_close (GTK_WINDOW (window));
  if (test_gui_question ())
    gtk_dialog_response (test_gui_question (), GTK_RESPONSE_REJECT);
  test_gui_wait (is_gone, &left, 20);
}

gpointer
test_gui_find (gpointer widget, GType type)
{
  if (G_TYPE_CHECK_INSTANCE_TYPE (widget, type))
    return widget;
  for (GtkWidget *child = gtk_widget_get_first_child (widget); child; child = gtk_widget_get_next_sibling (child))
    {
      gpointer found = GTK_IS_POPOVER (child) ? NULL : test_gui_find (child, type);
      if (found)
        return found;
    }
  return NULL;
}
