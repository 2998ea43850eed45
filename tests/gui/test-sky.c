/* test-sky.c - the sky over a record in the window: predicted, measured when looked at, for an observer that is chosen. */
#include <glib/gstdio.h>
#include <math.h>
#include <string.h>

#include "gui/sky-page.h"
#include "search/crossing-shape.h"
#include "support.h"

#define DAYS 12
#define PER_DAY 144

static char *folder, *record_path, *orbit_path;

/* Twelve days of 2004 with the crossing of Venus in them, stamped in UTC. */
static void
make_files (void)
{
  g_autoptr (GString) text = g_string_new ("utc,irradiance (W/m2)\n");
  guint32 state = 20040608;
  AntCrossingShape shape;
  ant_crossing_shape_init (&shape, 6.208 / 24, 19.43 / 1440, 0.663, ANT_LIMB_DARKENING_SUN);
  for (int i = 0; i < DAYS * PER_DAY; i++)
    {
      double noise = 0, time_d = (double) i / PER_DAY, mid_d = 6 + (8 + 19.75 / 60) / 24; /* from June 2 */
      for (int k = 0; k < 6; k++)
        noise += (double) (state = state * 1664525u + 1013904223u) / 4294967296.0 - 0.5;
      double ppm = 20 * noise - 1007 * ant_crossing_shape_mean (&shape, time_d - mid_d, 1.0 / PER_DAY);
      g_string_append_printf (text, "2004-06-%02dT%02d:%02d:00Z,%.6f\n", 2 + i / PER_DAY, i % PER_DAY / 6, i % 6 * 10, 1361 * (1 + ppm * 1e-6));
    }
  folder = g_dir_make_tmp (NULL, NULL);
  record_path = g_build_filename (folder, "june.csv", NULL);
  orbit_path = g_build_filename (folder, "orbit.csv", NULL);
  g_assert_true (g_file_set_contents (record_path, text->str, -1, NULL));
  g_assert_true (g_file_set_contents (orbit_path, "# frame: GSE\n2004-06-01,7,0,0\n2004-06-20,7,0,0\n", -1, NULL));
}

static void
remove_files (void)
{
  g_remove (record_path);
  g_remove (orbit_path);
  g_rmdir (folder);
  g_free (record_path);
  g_free (orbit_path);
  g_free (folder);
}

static gboolean
is_predicted (gpointer desk)
{
  return ant_desk_get_sky (desk) && !ant_desk_is_watching (desk);
}

static gboolean
is_measured (gpointer desk)
{
  return is_predicted (desk) && ant_desk_get_sky (desk)->measured;
}

static AntDesk *
desk_under_the_sky (void)
{
  AntDesk *desk = ant_desk_new ();
  ant_desk_open (desk, record_path);
  test_gui_wait (is_predicted, desk, 20);
  return desk;
}

static void
opening_a_record_predicts_what_crossed (void)
{
  g_autoptr (AntDesk) desk = desk_under_the_sky ();
  const AntSkyList *sky = ant_desk_get_sky (desk);
  const double *tick_d;
  g_assert_cmpuint (sky->n, ==, 1);
  g_assert_cmpint (sky->sighting[0].event.body, ==, ANT_BODY_VENUS);
  g_assert_false (sky->measured);
  g_assert_cmpuint (ant_desk_get_ticks (desk, &tick_d), ==, 4);
  g_assert_cmpfloat_with_epsilon (tick_d[0], 6 + (5 + 13.5 / 60) / 24, 1e-3); /* contact I, 05:13:30 */
}

static void
looking_measures_it (void)
{
  g_autoptr (AntDesk) desk = desk_under_the_sky ();
  ant_desk_measure_sky (desk);
  test_gui_wait (is_measured, desk, 60);
  const AntSighting *sighting = &ant_desk_get_sky (desk)->sighting[0];
  g_assert_cmpint (sighting->shown, ==, ANT_SHOWN_AGREES);
  g_assert_cmpfloat_with_epsilon (sighting->measured.depth_ppm, 1007, 4 * sighting->measured.sigma_ppm);
}

static gboolean
is_about_l1 (gpointer desk)
{
  return ant_desk_get_observer (desk)->observer.kind == ANT_OBSERVER_L1 && is_predicted (desk);
}

static void
another_observer_has_another_sky (void)
{
  g_autoptr (AntDesk) desk = desk_under_the_sky ();
  const double *tick_d;
  ant_desk_set_observer (desk, "l1");
  test_gui_wait (is_about_l1, desk, 20);
  g_assert_true (ant_desk_get_sky (desk)->sighting[0].event.possible);
  g_assert_cmpuint (ant_desk_get_ticks (desk, &tick_d), ==, 0); /* nothing is known well enough to mark */
}

static gboolean
is_about_earth (gpointer desk)
{
  return ant_desk_get_observer (desk)->observer.kind == ANT_OBSERVER_EARTH && is_predicted (desk);
}

/* The observer is part of the work: kept with it, and a change of it can be undone. */
static void
the_choice_of_an_observer_can_be_undone (void)
{
  g_autoptr (AntDesk) desk = desk_under_the_sky ();
  ant_desk_set_observer (desk, "l1");
  test_gui_wait (is_about_l1, desk, 20);
  g_assert_true (ant_desk_undo (desk));
  test_gui_wait (is_about_earth, desk, 20);
  g_assert_false (ant_desk_get_sky (desk)->sighting[0].event.possible);
}

static void
failed_cb (AntDesk *desk, const char *sentence, char **said)
{
  g_free (*said);
  *said = g_strdup (sentence);
}

static gboolean
is_told (gpointer said)
{
  return *(char **) said != NULL;
}

static void
a_table_that_cannot_be_is_told (void)
{
  g_autoptr (AntDesk) desk = desk_under_the_sky ();
  g_autofree char *said = NULL;
  g_signal_connect (desk, "failed", G_CALLBACK (failed_cb), &said);
  ant_desk_set_observer (desk, orbit_path);
  test_gui_wait (is_told, &said, 20);
  g_assert_nonnull (strstr (said, "inside the Earth"));
  g_assert_cmpint (ant_desk_get_observer (desk)->observer.kind, ==, ANT_OBSERVER_EARTH);
}

static void
other_radii_change_the_depth (void)
{
  g_autoptr (AntDesk) desk = desk_under_the_sky ();
  double before = ant_desk_get_sky (desk)->sighting[0].event.depth_ppm;
  g_assert_true (ant_desk_set_setting (desk, ant_setting_find ("radii"), "iau", NULL));
  test_gui_wait (is_predicted, desk, 20);
  g_assert_cmpfloat_with_epsilon (ant_desk_get_sky (desk)->sighting[0].event.depth_ppm, before / 1.0150, 1);
}

/* The page, its list and its drawings in a window; selecting the event brings it into view. */
static void
the_page_lists_and_shows_events (void)
{
  AntWindow *window = test_gui_window ();
  AntDesk *desk = ant_window_get_desk (window);
  ant_window_open (window, record_path);
  test_gui_wait (is_predicted, desk, 20);
  gtk_widget_activate_action (GTK_WIDGET (window), "win.page", "s", "sky");
  test_gui_wait (is_measured, desk, 60);
  test_gui_settle (50);
  GtkWidget *page = test_gui_find (window, ANT_TYPE_SKY_PAGE);
  GtkListView *list = test_gui_find (page, GTK_TYPE_LIST_VIEW);
  g_assert_true (gtk_widget_get_mapped (page));
  g_assert_cmpuint (g_list_model_get_n_items (G_LIST_MODEL (gtk_list_view_get_model (list))), ==, 1);
  g_autoptr (GtkStringObject) row = g_list_model_get_item (G_LIST_MODEL (gtk_list_view_get_model (list)), 0);
  g_assert_nonnull (strstr (gtk_string_object_get_string (row), "Venus before the Sun\nagrees"));
  GtkDropDown *observer = test_gui_find (page, GTK_TYPE_DROP_DOWN);
  gtk_drop_down_set_selected (observer, ANT_OBSERVER_L1);
  test_gui_wait (is_about_l1, desk, 20);
  test_gui_close (window);
}

static void
add (void)
{
  g_test_add_func ("/gui/sky/opening-a-record-predicts-what-crossed", opening_a_record_predicts_what_crossed);
  g_test_add_func ("/gui/sky/looking-measures-it", looking_measures_it);
  g_test_add_func ("/gui/sky/another-observer-has-another-sky", another_observer_has_another_sky);
  g_test_add_func ("/gui/sky/the-choice-of-an-observer-can-be-undone", the_choice_of_an_observer_can_be_undone);
  g_test_add_func ("/gui/sky/a-table-that-cannot-be-is-told", a_table_that_cannot_be_is_told);
  g_test_add_func ("/gui/sky/other-radii-change-the-depth", other_radii_change_the_depth);
  g_test_add_func ("/gui/sky/the-page-lists-and-shows-events", the_page_lists_and_shows_events);
}

int
main (int argc, char **argv)
{
  make_files ();
  int code = test_gui_run (&argc, &argv, add);
  remove_files ();
  return code;
}
