/* test-widgets.c - each widget of the window by itself: list, inspector, plots, settings, preferences. */
#include <glib/gstdio.h>
#include <string.h>

#include "gui/clock-view.h"
#include "gui/closeup-view.h"
#include "gui/columns.h"
#include "gui/dip-inspector.h"
#include "gui/dip-table.h"
#include "gui/event-view.h"
#include "gui/fold-events.h"
#include "gui/floor-view.h"
#include "gui/fold-view.h"
#include "gui/instrument-page.h"
#include "gui/noise-page.h"
#include "gui/period-view.h"
#include "gui/preferences.h"
#include "gui/record-page.h"
#include "gui/repeats-page.h"
#include "gui/ribbon-view.h"
#include "gui/settings-panel.h"
#include "gui/settings-row.h"
#include "gui/spectrum-view.h"
#include "gui/strip-view.h"
#include "gui/sun-view.h"
#include "gui/tail-view.h"
#include "gui/time-stack.h"
#include "support.h"

static void
every_widget_can_be_made_and_dropped_without_a_desk (void)
{
  const GType types[] = { ANT_TYPE_CLOCK_VIEW, ANT_TYPE_INSTRUMENT_PAGE, ANT_TYPE_CLOSEUP_VIEW, ANT_TYPE_COLUMNS, ANT_TYPE_DIP_INSPECTOR, ANT_TYPE_DIP_TABLE,
                          ANT_TYPE_FLOOR_VIEW, ANT_TYPE_NOISE_PAGE, ANT_TYPE_RECORD_PAGE, ANT_TYPE_RIBBON_VIEW,
                          ANT_TYPE_SETTINGS_PANEL, ANT_TYPE_SETTINGS_ROW, ANT_TYPE_SPECTRUM_VIEW, ANT_TYPE_STRIP_VIEW,
                          ANT_TYPE_TAIL_VIEW, ANT_TYPE_TIME_STACK, ANT_TYPE_FOLD_EVENTS, ANT_TYPE_FOLD_VIEW,
                          ANT_TYPE_PERIOD_VIEW, ANT_TYPE_REPEATS_PAGE };
  for (gsize i = 0; i < G_N_ELEMENTS (types); i++)
    {
      GtkWidget *widget = g_object_ref_sink (g_object_new (types[i], NULL));
      g_test_message ("%s", g_type_name (types[i]));
      g_assert_finalize_object (widget);
    }
}

static void
every_plot_has_a_name_and_says_what_it_shows (void)
{
  const GType types[] = { ANT_TYPE_STRIP_VIEW, ANT_TYPE_RIBBON_VIEW, ANT_TYPE_FLOOR_VIEW, ANT_TYPE_SPECTRUM_VIEW,
                          ANT_TYPE_TAIL_VIEW, ANT_TYPE_CLOSEUP_VIEW, ANT_TYPE_CLOCK_VIEW, ANT_TYPE_PERIOD_VIEW,
                          ANT_TYPE_FOLD_VIEW, ANT_TYPE_EVENT_VIEW, ANT_TYPE_SUN_VIEW };
  AntWindow *window = test_gui_window_scanned ();
  ant_desk_select_mark (ant_window_get_desk (window), 0);
  for (gsize i = 0; i < G_N_ELEMENTS (types); i++)
    {
      AntPlotView *plot = test_gui_find (window, types[i]);
      g_assert_nonnull (plot);
      gtk_test_accessible_assert_role (plot, GTK_ACCESSIBLE_ROLE_IMG);
      gtk_test_accessible_assert_property (plot, GTK_ACCESSIBLE_PROPERTY_LABEL, ant_plot_view_get_title (plot));
      g_assert_true (gtk_test_accessible_has_property (GTK_ACCESSIBLE (plot), GTK_ACCESSIBLE_PROPERTY_DESCRIPTION));
    }
  test_gui_close (window);
}

static void
every_plot_is_saved_in_every_format (void)
{
  const GType types[] = { ANT_TYPE_STRIP_VIEW, ANT_TYPE_RIBBON_VIEW, ANT_TYPE_FLOOR_VIEW, ANT_TYPE_SPECTRUM_VIEW,
                          ANT_TYPE_TAIL_VIEW, ANT_TYPE_CLOSEUP_VIEW, ANT_TYPE_CLOCK_VIEW };
  const char *const endings[] = { "png", "svg", "pdf" };
  const char *const starts[] = { "\211PNG", "<?xml", "%PDF" };
  g_autofree char *folder = g_dir_make_tmp (NULL, NULL);
  AntWindow *window = test_gui_window_scanned ();
  ant_desk_select_mark (ant_window_get_desk (window), 0);
  for (gsize i = 0; i < G_N_ELEMENTS (types); i++)
    for (gsize e = 0; e < G_N_ELEMENTS (endings); e++)
      {
        g_autofree char *path = g_strdup_printf ("%s/figure.%s", folder, endings[e]), *text = NULL;
        g_autoptr (GError) error = NULL;
        g_assert_true (ant_plot_view_save (test_gui_find (window, types[i]), path, &error));
        g_assert_true (g_file_get_contents (path, &text, NULL, NULL));
        g_assert_true (g_str_has_prefix (text, starts[e]));
        g_remove (path);
      }
  g_autofree char *nowhere = g_strdup_printf ("%s/figure.bmp", folder);
  g_autoptr (GError) error = NULL;
  g_assert_false (ant_plot_view_save (test_gui_find (window, ANT_TYPE_STRIP_VIEW), nowhere, &error));
  g_rmdir (folder);
  test_gui_close (window);
}

/* Three labels that have some room; which of them are shown, as letters. */
static char *
shown_of (AntColumns *columns)
{
  GString *text = g_string_new (NULL);
  for (GtkWidget *child = gtk_widget_get_first_child (GTK_WIDGET (columns)); child; child = gtk_widget_get_next_sibling (child))
    if (GTK_IS_LABEL (child) && gtk_widget_get_child_visible (child))
      g_string_append (text, gtk_label_get_text (GTK_LABEL (child)));
  return g_string_free (text, FALSE);
}

static void
expect_columns (int width, const char *const expected[3])
{
  const char *ui = "<interface><object class='AntColumns' id='columns'><property name='titles'>First|Second|Third</property>"
                   "<child><object class='GtkLabel'><property name='label'>a</property></object></child>"
                   "<child><object class='GtkLabel'><property name='label'>b</property></object></child>"
                   "<child><object class='GtkLabel'><property name='label'>c</property></object></child></object></interface>";
  g_autoptr (GtkBuilder) builder = gtk_builder_new_from_string (ui, -1);
  AntColumns *columns = ANT_COLUMNS (gtk_builder_get_object (builder, "columns"));
  GtkWindow *window = GTK_WINDOW (gtk_window_new ());
  gtk_window_set_default_size (window, width, 300);
  gtk_window_set_child (window, GTK_WIDGET (columns));
  gtk_window_present (window);
  test_gui_settle (300);
  GtkWidget *button = gtk_widget_get_first_child (gtk_widget_get_first_child (GTK_WIDGET (columns)));
  for (guint i = 0; i < 3; i++, button = gtk_widget_get_next_sibling (button))
    {
      if (gtk_widget_get_mapped (button))
        gtk_toggle_button_set_active (GTK_TOGGLE_BUTTON (button), TRUE);
      test_gui_settle (100);
      g_autofree char *shown = shown_of (columns);
      g_assert_cmpstr (shown, ==, expected[i]);
    }
  gtk_window_destroy (window);
}

static void
what_waits_behind_is_brought_to_the_front (void)
{
  g_type_ensure (ANT_TYPE_COLUMNS);
  expect_columns (620, (const char *const[]) { "a", "b", "c" });
  expect_columns (850, (const char *const[]) { "ac", "ab", "ac" });
  expect_columns (1200, (const char *const[]) { "abc", "abc", "abc" });
}

static void
the_list_is_filtered_by_words_and_follows_the_selection (void)
{
  AntWindow *window = test_gui_window_scanned ();
  AntDesk *desk = ant_window_get_desk (window);
  AntDipTable *table = test_gui_find (window, ANT_TYPE_DIP_TABLE);
  GtkEditable *search = test_gui_find (table, GTK_TYPE_SEARCH_ENTRY);
  g_assert_cmpuint (ant_dip_table_get_n_rows (table), ==, 1);
  ant_desk_select_mark (desk, 0);
  GtkSingleSelection *selection = GTK_SINGLE_SELECTION (gtk_column_view_get_model (ant_dip_table_get_view (table)));
  g_assert_true (gtk_single_selection_get_selected_item (selection) == (gpointer) ant_desk_get_selected (desk));
  ant_desk_note (desk, "Blue heron");
  gtk_editable_set_text (search, "heron");
  g_assert_cmpuint (ant_dip_table_get_n_rows (table), ==, 1);
  gtk_editable_set_text (search, "kingfisher");
  g_assert_cmpuint (ant_dip_table_get_n_rows (table), ==, 0);
  gtk_editable_set_text (search, "");
  g_assert_cmpuint (ant_dip_table_get_n_rows (table), ==, 1);
  test_gui_close (window);
}

static void
choosing_a_row_selects_the_dip_everywhere (void)
{
  AntWindow *window = test_gui_window_scanned ();
  AntDesk *desk = ant_window_get_desk (window);
  AntDipTable *table = test_gui_find (window, ANT_TYPE_DIP_TABLE);
  GtkSingleSelection *selection = GTK_SINGLE_SELECTION (gtk_column_view_get_model (ant_dip_table_get_view (table)));
  gtk_single_selection_set_selected (selection, 0);
  g_assert_cmpuint (ant_desk_get_selected_mark (desk), ==, 0);
  GtkColumnView *view = ant_dip_table_get_view (table);
  for (guint i = 0; i < g_list_model_get_n_items (gtk_column_view_get_columns (view)); i++)
    {
      g_autoptr (GtkColumnViewColumn) column = g_list_model_get_item (gtk_column_view_get_columns (view), i);
      gtk_column_view_sort_by_column (view, column, GTK_SORT_DESCENDING);
      g_assert_cmpuint (ant_desk_get_selected_mark (desk), ==, 0);
    }
  test_gui_close (window); /* sorted and with a selected row: this once called back into a half-closed list */
}

static void
the_inspector_judges_the_selected_dip (void)
{
  AntWindow *window = test_gui_window_scanned ();
  AntDesk *desk = ant_window_get_desk (window);
  AntDipInspector *inspector = test_gui_find (window, ANT_TYPE_DIP_INSPECTOR);
  ant_desk_select_mark (desk, 0);
  gtk_drop_down_set_selected (test_gui_find (inspector, GTK_TYPE_DROP_DOWN), ANT_CLASS_SPOT);
  gtk_editable_set_text (test_gui_find (inspector, GTK_TYPE_ENTRY), "too wide");
  g_assert_cmpint (ant_dip_item_get_class (ant_desk_get_selected (desk)), ==, ANT_CLASS_SPOT);
  g_assert_cmpstr (ant_dip_item_get_note (ant_desk_get_selected (desk)), ==, "too wide");
  const AntDipMark *mark;
  ant_desk_get_marks (desk, &mark);
  g_assert_cmpint (mark[0].look, ==, ANT_LOOK_SPOT);
  test_gui_close (window);
}

static void
a_setting_is_refused_with_its_range_and_reset_by_its_action (void)
{
  g_autoptr (AntDesk) desk = ant_desk_new ();
  const AntSetting *setting = ant_setting_find ("duration-max");
  GtkWidget *row = g_object_ref_sink (ant_settings_row_new (desk, setting));
  GtkEditable *entry = test_gui_find (row, GTK_TYPE_ENTRY);
  gtk_editable_set_text (entry, "9");
  g_assert_cmpfloat (ant_setting_get (setting, ant_desk_get_settings (desk)), ==, 9);
  g_assert_true (gtk_widget_has_css_class (row, "changed"));
  gtk_editable_set_text (entry, "1000");
  g_assert_cmpfloat (ant_setting_get (setting, ant_desk_get_settings (desk)), ==, 9);
  g_assert_true (gtk_widget_has_css_class (GTK_WIDGET (entry), "error"));
  gtk_widget_activate_action (row, "setting.reset", NULL);
  g_assert_cmpfloat (ant_setting_get (setting, ant_desk_get_settings (desk)), ==, setting->fallback);
  g_assert_false (gtk_widget_has_css_class (row, "changed"));
  g_assert_false (gtk_widget_has_css_class (GTK_WIDGET (entry), "error"));
  g_assert_finalize_object (row);
}

static void
the_panel_has_a_row_for_every_setting (void)
{
  AntWindow *window = test_gui_window ();
  AntSettingsPanel *panel = test_gui_find (window, ANT_TYPE_SETTINGS_PANEL);
  GtkWidget *row = test_gui_find (panel, ANT_TYPE_SETTINGS_ROW);
  gsize n = 0;
  for (; row; row = gtk_widget_get_next_sibling (row))
    n += G_TYPE_CHECK_INSTANCE_TYPE (row, ANT_TYPE_SETTINGS_ROW);
  g_assert_cmpuint (n, ==, ant_n_settings);
  test_gui_close (window);
}

/* Waits until the page says what it found. */
static gboolean
has_told (gpointer label)
{
  return *gtk_label_get_text (label) != '\0';
}

static GtkLabel *
told_by (GtkWidget *page)
{
  for (GtkWidget *child = gtk_widget_get_first_child (page); child; child = gtk_widget_get_next_sibling (child))
    {
      GtkLabel *inside = GTK_IS_LABEL (child) && gtk_label_get_selectable (GTK_LABEL (child)) ? GTK_LABEL (child) : told_by (child);
      if (inside)
        return inside;
    }
  return NULL;
}

/* The dip stands in some phase of any orbit; the page folds once it is looked at, and again by the other clock. */
static void
the_instrument_page_folds_what_is_chosen (void)
{
  AntWindow *window = test_gui_window_with_record ();
  AntInstrumentPage *page = test_gui_find (window, ANT_TYPE_INSTRUMENT_PAGE);
  AntClockView *chart = test_gui_find (window, ANT_TYPE_CLOCK_VIEW);
  GtkLabel *told = told_by (GTK_WIDGET (page));
  g_assert_nonnull (told);
  g_assert_cmpstr (gtk_label_get_text (told), ==, "");
  gtk_widget_activate_action (GTK_WIDGET (window), "win.page", "s", "instrument");
  test_gui_wait (has_told, told, 20);
  g_assert_nonnull (strstr (gtk_label_get_text (told), "Greatest difference"));
  g_autofree char *shown = ANT_PLOT_VIEW_GET_CLASS (chart)->describe (ANT_PLOT_VIEW (chart));
  g_assert_true (g_str_has_prefix (shown, "Residual, ppm by phase of the orbit in 48 bins"));
  test_gui_close (window);
}

static void
recent_records_are_kept_latest_first_while_they_exist (void)
{
  ant_preferences_add_recent (test_gui_bad_record ());
  ant_preferences_add_recent ("gone-long-ago.csv");
  ant_preferences_add_recent (test_gui_record ());
  g_auto (GStrv) paths = ant_preferences_recent ();
  g_assert_cmpuint (g_strv_length (paths), >=, 2);
  g_assert_cmpstr (paths[0], ==, test_gui_record ());
  g_assert_cmpstr (paths[1], ==, test_gui_bad_record ());
}

static void
add (void)
{
  g_test_add_func ("/gui/widgets/each-can-be-made-and-dropped-without-a-desk",
                   every_widget_can_be_made_and_dropped_without_a_desk);
  g_test_add_func ("/gui/widgets/every-plot-has-a-name-and-says-what-it-shows",
                   every_plot_has_a_name_and_says_what_it_shows);
  g_test_add_func ("/gui/widgets/every-plot-is-saved-in-every-format", every_plot_is_saved_in_every_format);
  g_test_add_func ("/gui/widgets/what-waits-behind-is-brought-to-the-front", what_waits_behind_is_brought_to_the_front);
  g_test_add_func ("/gui/widgets/the-list-is-filtered-by-words-and-follows-the-selection",
                   the_list_is_filtered_by_words_and_follows_the_selection);
  g_test_add_func ("/gui/widgets/choosing-a-row-selects-the-dip-everywhere", choosing_a_row_selects_the_dip_everywhere);
  g_test_add_func ("/gui/widgets/the-inspector-judges-the-selected-dip", the_inspector_judges_the_selected_dip);
  g_test_add_func ("/gui/widgets/a-setting-is-refused-with-its-range-and-reset-by-its-action",
                   a_setting_is_refused_with_its_range_and_reset_by_its_action);
  g_test_add_func ("/gui/widgets/the-panel-has-a-row-for-every-setting", the_panel_has_a_row_for_every_setting);
  g_test_add_func ("/gui/widgets/the-instrument-page-folds-what-is-chosen", the_instrument_page_folds_what_is_chosen);
  g_test_add_func ("/gui/widgets/recent-records-are-kept-latest-first-while-they-exist",
                   recent_records_are_kept_latest_first_while_they_exist);
}

int
main (int argc, char **argv)
{
  return test_gui_run (&argc, &argv, add);
}
