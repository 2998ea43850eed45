/* test-window.c - the window as a whole: opening, scanning, stopping, closing. */
#include <math.h>
#include <string.h>

#include <gio/gio.h>

#include "gui/shortcuts.h"
#include "gui/strip-view.h"
#include "gui/time-stack.h"
#include "gui/window-private.h"
#include "support.h"

static gboolean
is_enabled (AntWindow *window, const char *name)
{
  return g_action_group_get_action_enabled (G_ACTION_GROUP (window), name);
}

static void
an_empty_window_offers_to_open (void)
{
  AntWindow *window = test_gui_window ();
  g_assert_true (ant_window_is_empty (window));
  g_assert_true (is_enabled (window, "open"));
  g_assert_false (is_enabled (window, "scan"));
  g_assert_false (is_enabled (window, "next-dip"));
  g_assert_false (is_enabled (window, "view-whole"));
  test_gui_close (window);
}

static void
opening_shows_the_whole_record (void)
{
  AntWindow *window = test_gui_window_with_record ();
  AntDesk *desk = ant_window_get_desk (window);
  g_assert_cmpstr (gtk_window_get_title (GTK_WINDOW (window)), ==, "record.csv");
  g_assert_cmpfloat (ant_desk_get_view (desk)->to - ant_desk_get_view (desk)->from, >, 15.9);
  g_assert_true (is_enabled (window, "scan"));
  g_assert_false (is_enabled (window, "save-list"));
  test_gui_close (window);
}

static void
a_bad_record_is_told_in_the_banner (void)
{
  AntWindow *window = test_gui_window ();
  GtkInfoBar *banner = test_gui_find (window, GTK_TYPE_INFO_BAR);
  ant_window_open (window, test_gui_bad_record ());
  test_gui_wait (test_gui_idle, ant_window_get_desk (window), 20);
  g_assert_true (gtk_info_bar_get_revealed (banner));
  g_assert_null (ant_desk_get_record (ant_window_get_desk (window)));
  ant_window_open (window, test_gui_record ());
  test_gui_wait (test_gui_idle, ant_window_get_desk (window), 20);
  g_assert_false (gtk_info_bar_get_revealed (banner));
  test_gui_close (window);
}

static void
a_bad_record_leaves_the_good_one_open (void)
{
  AntWindow *window = test_gui_window_with_record ();
  ant_window_open (window, test_gui_bad_record ());
  test_gui_wait (test_gui_idle, ant_window_get_desk (window), 20);
  g_assert_cmpstr (gtk_window_get_title (GTK_WINDOW (window)), ==, "record.csv");
  test_gui_close (window);
}

static void
a_scan_finds_the_planted_dip (void)
{
  AntWindow *window = test_gui_window_scanned ();
  AntDesk *desk = ant_window_get_desk (window);
  const AntDipMark *mark;
  g_assert_cmpuint (ant_desk_get_marks (desk, &mark), ==, 1);
  g_assert_cmpfloat_with_epsilon (mark[0].depth_ppm, 900, 60);
  g_assert_cmpfloat_with_epsilon (mark[0].duration_d * 24, 6, 0.5);
  g_assert_true (is_enabled (window, "next-dip"));
  gtk_widget_activate_action (GTK_WIDGET (window), "win.next-dip", NULL);
  g_assert_cmpuint (ant_desk_get_selected_mark (desk), ==, 0);
  g_assert_true (is_enabled (window, "copy-dip"));
  test_gui_close (window);
}

static void
a_verdict_and_a_note_outlive_a_scan (void)
{
  AntWindow *window = test_gui_window_scanned ();
  AntDesk *desk = ant_window_get_desk (window);
  ant_desk_select_mark (desk, 0);
  gtk_widget_activate_action (GTK_WIDGET (window), "win.verdict", "s", "planet");
  ant_desk_note (desk, "as predicted");
  gtk_widget_activate_action (GTK_WIDGET (window), "win.scan", NULL);
  test_gui_wait (test_gui_idle, desk, 120);
  AntDipItem *item = ant_desk_get_selected (desk);
  g_assert_nonnull (item);
  g_assert_cmpint (ant_dip_item_get_class (item), ==, ANT_CLASS_PLANET);
  g_assert_cmpstr (ant_dip_item_get_note (item), ==, "as predicted");
  test_gui_close (window);
}

static void
a_changed_setting_makes_the_results_stale (void)
{
  AntWindow *window = test_gui_window_scanned ();
  AntDesk *desk = ant_window_get_desk (window);
  g_assert_false (ant_desk_is_stale (desk));
  g_assert_true (ant_desk_set_setting (desk, ant_setting_find ("duration-max"), "8", NULL));
  g_assert_true (ant_desk_is_stale (desk));
  gtk_widget_activate_action (GTK_WIDGET (window), "win.reset-settings", NULL);
  g_assert_false (ant_desk_is_stale (desk));
  test_gui_close (window);
}

static void
a_setting_of_the_grid_reads_the_record_again (void)
{
  AntWindow *window = test_gui_window_scanned ();
  AntDesk *desk = ant_window_get_desk (window);
  g_assert_true (ant_desk_set_setting (desk, ant_setting_find ("exposure"), "300", NULL));
  gtk_widget_activate_action (GTK_WIDGET (window), "win.scan", NULL);
  test_gui_wait (test_gui_idle, desk, 120);
  g_assert_cmpfloat_with_epsilon (ant_desk_get_record (desk)->exposure_d, 300 / 86400.0, 1e-9);
  g_assert_nonnull (ant_desk_get_results (desk));
  test_gui_close (window);
}

static void
stopping_keeps_what_was_found_before (void)
{
  AntWindow *window = test_gui_window_scanned ();
  AntDesk *desk = ant_window_get_desk (window);
  const AntScanResults *before = ant_desk_get_results (desk);
  gtk_widget_activate_action (GTK_WIDGET (window), "win.scan", NULL);
  g_assert_true (is_enabled (window, "stop"));
  /* At once: a small record may be searched in the time of one frame. */
  gtk_widget_activate_action (GTK_WIDGET (window), "win.stop", NULL);
  g_assert_false (is_enabled (window, "stop"));
  test_gui_wait (test_gui_idle, desk, 20);
  g_assert_true (ant_desk_get_results (desk) == before);
  test_gui_close (window);
}

/* A condition: the scan has come to its surrogates, where it stays for a while. */
static gboolean
searches_surrogates (gpointer desk)
{
  return ant_desk_get_progress (desk)->stage >= 2;
}

static void
stopping_keeps_what_was_found_so_far_and_says_so (void)
{
  AntWindow *window = test_gui_window_with_record ();
  AntDesk *desk = ant_window_get_desk (window);
  GtkInfoBar *banner = test_gui_find (window, GTK_TYPE_INFO_BAR);
  g_assert_true (ant_desk_set_setting (desk, ant_setting_find ("threads"), "1", NULL));
  g_assert_true (ant_desk_set_setting (desk, ant_setting_find ("surrogates"), "100", NULL));
  gtk_widget_activate_action (GTK_WIDGET (window), "win.scan", NULL);
  test_gui_wait (searches_surrogates, desk, 60);
  gtk_widget_activate_action (GTK_WIDGET (window), "win.stop", NULL);
  test_gui_wait (test_gui_idle, desk, 60);
  const AntScanResults *results = ant_desk_get_results (desk);
  g_assert_nonnull (results);
  g_assert_cmpint (results->reach, ==, ANT_SCAN_NOISE);
  g_assert_cmpuint (results->n_dips, ==, 1);
  g_assert_true (gtk_info_bar_get_revealed (banner));
  g_assert_true (ant_desk_set_setting (desk, ant_setting_find ("surrogates"), "0", NULL));
  gtk_widget_activate_action (GTK_WIDGET (window), "win.scan", NULL);
  test_gui_wait (test_gui_idle, desk, 120);
  g_assert_cmpint (ant_desk_get_results (desk)->reach, ==, ANT_SCAN_COMPLETE);
  g_assert_false (gtk_info_bar_get_revealed (banner));
  test_gui_close (window);
}

static void
passages_are_listed_and_bracketed_instead_of_dips (void)
{
  AntWindow *window = test_gui_window_scanned ();
  AntDesk *desk = ant_window_get_desk (window);
  const AntScanResults *results = ant_desk_get_results (desk);
  const AntDipMark *mark;
  g_assert_cmpuint (results->n_passages, >, 0);
  ant_desk_set_shown (desk, ANT_KIND_PASSAGE);
  g_assert_cmpuint (ant_desk_get_marks (desk, &mark), ==, results->n_passages);
  g_assert_cmpfloat (mark[0].duration_d, ==, results->passage[0].end_d - results->passage[0].start_d);
  ant_desk_select_next (desk, 1);
  AntDipItem *item = ant_desk_get_selected (desk);
  g_assert_cmpint (ant_dip_item_get_kind (item), ==, ANT_KIND_PASSAGE);
  AntStrip strip;
  char text[128];
  ant_strip_fill (desk, ANT_STRIP_IRRADIANCE, &strip, sizeof text, text);
  g_assert_true (strip.brackets);
  ant_strip_fill (desk, ANT_STRIP_RESIDUAL, &strip, sizeof text, text);
  g_assert_false (strip.brackets);
  g_autoptr (GPtrArray) facts = ant_dip_item_facts (item, ant_desk_get_record (desk), ANT_DEPTH_PPM);
  g_assert_cmpuint (facts->len, >, 0);
  test_gui_settle (200); /* drawn, close-up and all */
  test_gui_close (window);
}

/* A widget's own controller of a type. */
static gpointer
controller_of (gpointer widget, GType type)
{
  g_autoptr (GListModel) all = gtk_widget_observe_controllers (widget);
  for (guint i = 0; i < g_list_model_get_n_items (all); i++)
    {
      g_autoptr (GObject) one = g_list_model_get_item (all, i);
      if (G_TYPE_CHECK_INSTANCE_TYPE (one, type))
        return one; /* the widget holds it */
    }
  return NULL;
}

static double
view_length (AntDesk *desk)
{
  return ant_desk_get_view (desk)->to - ant_desk_get_view (desk)->from;
}

/* GTK 4 takes no made events, so the controllers are spoken to where GTK would. */
static void
a_touchpad_zooms_by_pinching_and_pans_by_two_fingers (void)
{
  AntWindow *window = test_gui_window_with_record ();
  AntDesk *desk = ant_window_get_desk (window);
  GtkWidget *strip = test_gui_find (window, ANT_TYPE_STRIP_VIEW);
  gpointer pinch = controller_of (strip, GTK_TYPE_GESTURE_ZOOM), scroll = controller_of (strip, GTK_TYPE_EVENT_CONTROLLER_SCROLL);
  double whole = view_length (desk);
  gboolean taken = FALSE;
  g_signal_emit_by_name (pinch, "begin", NULL);
  g_signal_emit_by_name (pinch, "scale-changed", 1.5);
  g_signal_emit_by_name (pinch, "scale-changed", 2.0);
  g_assert_cmpfloat_with_epsilon (view_length (desk), whole / 2, 1e-6);
  double from = ant_desk_get_view (desk)->from;
  g_signal_emit_by_name (scroll, "scroll", 0.5, 0.0, &taken);
  g_assert_true (taken);
  g_assert_cmpfloat (ant_desk_get_view (desk)->from, >, from);
  g_assert_cmpfloat_with_epsilon (view_length (desk), whole / 2, 1e-6);
  g_signal_emit_by_name (scroll, "scroll", 0.0, -0.25, &taken);
  g_assert_cmpfloat (view_length (desk), <, whole / 2);
  test_gui_close (window);
}

static void
a_record_is_dropped_on_the_window (void)
{
  AntWindow *window = test_gui_window ();
  gpointer target = controller_of (window, GTK_TYPE_DROP_TARGET);
  g_auto (GValue) value = G_VALUE_INIT;
  gboolean taken = FALSE;
  g_value_init (&value, G_TYPE_FILE);
  g_value_take_object (&value, g_file_new_for_path (test_gui_record ()));
  g_signal_emit_by_name (target, "drop", &value, 10.0, 10.0, &taken);
  g_assert_true (taken);
  test_gui_wait (test_gui_idle, ant_window_get_desk (window), 20);
  g_assert_nonnull (ant_desk_get_record (ant_window_get_desk (window)));
  test_gui_close (window);
}

static gboolean
follows_snr (gpointer desk)
{
  return ant_desk_get_snr (desk) && ant_desk_get_snr_progress (desk) < 0;
}

static guint
n_visible_strips (AntWindow *window)
{
  guint n = 0;
  GtkWidget *stack = test_gui_find (window, ANT_TYPE_TIME_STACK);
  for (GtkWidget *child = gtk_widget_get_first_child (stack); child; child = gtk_widget_get_next_sibling (child))
    n += ANT_IS_STRIP_VIEW (child) && gtk_widget_get_child_visible (child);
  return n;
}

static void
the_dip_snr_is_followed_on_demand (void)
{
  AntWindow *window = test_gui_window_scanned ();
  AntDesk *desk = ant_window_get_desk (window);
  g_assert_null (ant_desk_get_snr (desk));
  g_assert_cmpuint (n_visible_strips (window), ==, 2);
  gtk_widget_activate_action (GTK_WIDGET (window), "win.snr", NULL);
  test_gui_wait (follows_snr, desk, 60);
  test_gui_settle (100);
  g_assert_cmpuint (n_visible_strips (window), ==, 3);
  g_assert_cmpfloat_with_epsilon (ant_desk_get_snr_duration (desk) * 24, 6, 1e-9);
  const AntSeries *series = &ant_desk_get_record (desk)->series;
  float peak = ant_pyramid_extent (ant_desk_get_snr (desk)->pyramid, 0, series->n).high;
  g_assert_cmpfloat ((double) peak, >, 2 * ant_desk_get_results (desk)->threshold_snr);
  ant_desk_set_pointer (desk, TEST_DIP_D);
  g_autofree char *readout = ant_desk_readout (desk);
  g_assert_nonnull (strstr (readout, "SNR"));
  /* The selected dip's duration, then one that was chosen; then no strip and no work. */
  ant_desk_select_mark (desk, 0);
  test_gui_wait (follows_snr, desk, 60);
  double own_d = ant_dip_item_get_dip (ant_desk_get_selected (desk))->duration_d;
  g_assert_cmpfloat_with_epsilon (ant_desk_get_snr_duration (desk), own_d, 0.02 * own_d);
  gtk_widget_activate_action (GTK_WIDGET (window), "win.snr-duration", "s", "2h");
  test_gui_wait (follows_snr, desk, 60);
  g_assert_cmpfloat_with_epsilon (ant_desk_get_snr_duration (desk) * 24, 2, 1e-9);
  gtk_widget_activate_action (GTK_WIDGET (window), "win.snr", NULL);
  g_assert_null (ant_desk_get_snr (desk));
  test_gui_close (window);
}

static void
the_dip_snr_may_be_overtaken_at_any_moment (void)
{
  AntWindow *window = test_gui_window_scanned ();
  AntDesk *desk = ant_window_get_desk (window);
  for (double hours = 1; hours < 12; hours++)
    {
      ant_desk_set_snr_shown (desk, TRUE);
      ant_desk_set_snr_duration (desk, hours / 24);
      test_gui_settle ((guint) hours);
    }
  test_gui_wait (follows_snr, desk, 60);
  g_assert_cmpfloat_with_epsilon (ant_desk_get_snr_duration (desk) * 24, 11, 1e-9);
  ant_desk_set_snr_duration (desk, 5 / 24.0);
  test_gui_close (window);
}

static void
a_window_may_be_closed_while_it_scans (void)
{
  for (guint wait = 0; wait < 200; wait += 60)
    {
      AntWindow *window = test_gui_window_with_record ();
      gtk_widget_activate_action (GTK_WIDGET (window), "win.scan", NULL);
      test_gui_settle (wait + 1);
      test_gui_close (window);
    }
}

static void
another_record_may_be_opened_while_it_scans (void)
{
  AntWindow *window = test_gui_window_with_record ();
  gtk_widget_activate_action (GTK_WIDGET (window), "win.scan", NULL);
  test_gui_settle (50);
  ant_window_open (window, test_gui_record ());
  test_gui_wait (test_gui_idle, ant_window_get_desk (window), 20);
  g_assert_null (ant_desk_get_results (ant_window_get_desk (window)));
  test_gui_close (window);
}

/* How light the window is on the whole, 0 to 1; NaN before its first frame. */
static double
lightness (AntWindow *window)
{
  g_autoptr (GdkPaintable) paintable = gtk_widget_paintable_new (GTK_WIDGET (window));
  int width = gdk_paintable_get_intrinsic_width (paintable), height = gdk_paintable_get_intrinsic_height (paintable);
  GtkSnapshot *snapshot = gtk_snapshot_new ();
  gdk_paintable_snapshot (paintable, snapshot, width, height);
  g_autoptr (GskRenderNode) node = gtk_snapshot_free_to_node (snapshot);
  if (!node)
    return NAN;
  g_autoptr (GdkTexture) texture
      = gsk_renderer_render_texture (gtk_native_get_renderer (GTK_NATIVE (window)), node, NULL);
  width = gdk_texture_get_width (texture);
  height = gdk_texture_get_height (texture);
  g_autofree guchar *pixels = g_malloc ((gsize) width * (gsize) height * 4);
  gdk_texture_download (texture, pixels, (gsize) width * 4);
  double sum = 0;
  for (gsize i = 0; i < (gsize) width * (gsize) height; i++)
    sum += pixels[4 * i + 1];
  return sum / 255 / width / height;
}

static gboolean
is_light (gpointer window)
{
  return lightness (window) > 0.8;
}

static gboolean
is_dark (gpointer window)
{
  return lightness (window) < 0.3;
}

static void
dark_and_light_are_followed_live (void)
{
  AntWindow *window = test_gui_window_with_record ();
  GtkSettings *settings = gtk_widget_get_settings (GTK_WIDGET (window));
  test_gui_wait (is_light, window, 20);
  g_object_set (settings, "gtk-application-prefer-dark-theme", TRUE, NULL);
  test_gui_wait (is_dark, window, 20);
  g_object_set (settings, "gtk-application-prefer-dark-theme", FALSE, NULL);
  test_gui_wait (is_light, window, 20);
  test_gui_close (window);
}

static void
it_fits_a_small_screen (void)
{
  AntWindow *window = test_gui_window_scanned ();
  int width, height;
  gtk_widget_measure (GTK_WIDGET (window), GTK_ORIENTATION_HORIZONTAL, -1, &width, NULL, NULL, NULL);
  gtk_widget_measure (GTK_WIDGET (window), GTK_ORIENTATION_VERTICAL, -1, &height, NULL, NULL, NULL);
  g_assert_cmpint (width, <=, 640);
  g_assert_cmpint (height, <=, 420);
  g_action_group_change_action_state (G_ACTION_GROUP (window), "settings", g_variant_new_boolean (TRUE));
  gtk_widget_measure (GTK_WIDGET (window), GTK_ORIENTATION_HORIZONTAL, -1, &width, NULL, NULL, NULL);
  g_assert_cmpint (width, <=, 640);
  g_action_group_change_action_state (G_ACTION_GROUP (window), "settings", g_variant_new_boolean (FALSE));
  test_gui_close (window);
}

static void
every_key_has_its_action (void)
{
  AntWindow *window = test_gui_window ();
  for (gsize i = 0; i < ant_n_shortcuts; i++)
    {
      g_autofree char *name = NULL;
      g_autoptr (GVariant) target = NULL;
      g_assert_true (g_action_parse_detailed_name (ant_shortcut_table[i].action, &name, &target, NULL));
      if (g_str_has_prefix (name, "win."))
        g_assert_true (g_action_group_has_action (G_ACTION_GROUP (window), name + 4));
      for (gsize k = 0; k < G_N_ELEMENTS (ant_shortcut_table[i].keys) && ant_shortcut_table[i].keys[k]; k++)
        {
          guint key;
          GdkModifierType modifiers;
          g_assert_true (gtk_accelerator_parse (ant_shortcut_table[i].keys[k], &key, &modifiers));
          for (gsize j = 0; j < i; j++)
            g_assert_cmpstr (ant_shortcut_table[j].keys[0], !=, ant_shortcut_table[i].keys[k]);
        }
    }
  test_gui_close (window);
}

static gboolean
is_there (gpointer path)
{
  return g_file_test (path, G_FILE_TEST_EXISTS);
}

/* Same input, same pages: with no verdict given, what the window saves is the file that a scan by the command leaves. */
static void
its_report_is_that_of_the_command (void)
{
  g_autofree char *folder = g_dir_make_tmp (NULL, NULL), *mine = g_build_filename (folder, "mine.pdf", NULL);
  g_autofree char *out = g_build_filename (folder, "out", NULL), *theirs = g_build_filename (out, "report.pdf", NULL);
  g_autofree char *one = NULL, *two = NULL, *tidy = g_strdup_printf ("rm -r '%s'", folder);
  gsize n_one = 0, n_two = 0;
  g_autoptr (GError) error = NULL;
  g_setenv ("SOURCE_DATE_EPOCH", "2240000000", TRUE);
  AntWindow *window = test_gui_window_scanned ();
  ant_window_write_report (window, mine);
  test_gui_wait (is_there, mine, 20);
  g_autoptr (GSubprocess) command = g_subprocess_new (G_SUBPROCESS_FLAGS_STDOUT_SILENCE, &error, g_getenv ("ANT_CLI"), "scan",
                                                      test_gui_record (), "--out", out, NULL);
  g_assert_no_error (error);
  g_assert_true (g_subprocess_wait_check (command, NULL, &error));
  g_assert_true (g_file_get_contents (mine, &one, &n_one, &error));
  g_assert_true (g_file_get_contents (theirs, &two, &n_two, &error));
  g_assert_cmpmem (one, n_one, two, n_two);
  g_unsetenv ("SOURCE_DATE_EPOCH");
  test_gui_settle (100); /* the last of the saving lets go of the window */
  test_gui_close (window);
  g_assert_true (g_spawn_command_line_sync (tidy, NULL, NULL, NULL, NULL));
}

static void
the_shortcuts_window_is_made_from_the_table (void)
{
  GtkWidget *window = ant_shortcuts_window_new ();
  g_assert_true (GTK_IS_SHORTCUTS_WINDOW (window));
  g_assert_nonnull (test_gui_find (window, GTK_TYPE_SHORTCUTS_SHORTCUT));
  gtk_window_destroy (GTK_WINDOW (window));
}

static void
add (void)
{
  g_test_add_func ("/gui/window/an-empty-one-offers-to-open", an_empty_window_offers_to_open);
  g_test_add_func ("/gui/window/opening-shows-the-whole-record", opening_shows_the_whole_record);
  g_test_add_func ("/gui/window/a-bad-record-is-told-in-the-banner", a_bad_record_is_told_in_the_banner);
  g_test_add_func ("/gui/window/a-bad-record-leaves-the-good-one-open", a_bad_record_leaves_the_good_one_open);
  g_test_add_func ("/gui/window/a-scan-finds-the-planted-dip", a_scan_finds_the_planted_dip);
  g_test_add_func ("/gui/window/a-verdict-and-a-note-outlive-a-scan", a_verdict_and_a_note_outlive_a_scan);
  g_test_add_func ("/gui/window/a-changed-setting-makes-the-results-stale", a_changed_setting_makes_the_results_stale);
  g_test_add_func ("/gui/window/a-setting-of-the-grid-reads-the-record-again",
                   a_setting_of_the_grid_reads_the_record_again);
  g_test_add_func ("/gui/window/stopping-keeps-what-was-found-before", stopping_keeps_what_was_found_before);
  g_test_add_func ("/gui/window/stopping-keeps-what-was-found-so-far-and-says-so",
                   stopping_keeps_what_was_found_so_far_and_says_so);
  g_test_add_func ("/gui/window/passages-are-listed-and-bracketed-instead-of-dips",
                   passages_are_listed_and_bracketed_instead_of_dips);
  g_test_add_func ("/gui/window/a-touchpad-zooms-by-pinching-and-pans-by-two-fingers",
                   a_touchpad_zooms_by_pinching_and_pans_by_two_fingers);
  g_test_add_func ("/gui/window/a-record-is-dropped-on-it", a_record_is_dropped_on_the_window);
  g_test_add_func ("/gui/window/the-dip-snr-is-followed-on-demand", the_dip_snr_is_followed_on_demand);
  g_test_add_func ("/gui/window/the-dip-snr-may-be-overtaken-at-any-moment", the_dip_snr_may_be_overtaken_at_any_moment);
  g_test_add_func ("/gui/window/it-may-be-closed-while-it-scans", a_window_may_be_closed_while_it_scans);
  g_test_add_func ("/gui/window/another-record-may-be-opened-while-it-scans",
                   another_record_may_be_opened_while_it_scans);
  g_test_add_func ("/gui/window/dark-and-light-are-followed-live", dark_and_light_are_followed_live);
  g_test_add_func ("/gui/window/it-fits-a-small-screen", it_fits_a_small_screen);
  g_test_add_func ("/gui/window/every-key-has-its-action", every_key_has_its_action);
  g_test_add_func ("/gui/window/its-report-is-that-of-the-command", its_report_is_that_of_the_command);
  g_test_add_func ("/gui/window/the-shortcuts-window-is-made-from-the-table",
                   the_shortcuts_window_is_made_from_the_table);
}

int
main (int argc, char **argv)
{
  return test_gui_run (&argc, &argv, add);
}
