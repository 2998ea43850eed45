/* window.c - the window: header bar, time stack, pages, and what is said about running work. */
#include <glib/gi18n.h>
#include <math.h>

#include "data/noise-words.h"
#include "data/record-words.h"
#include "gui/paper.h"
#include "gui/preferences.h"
#include "gui/window-private.h"

G_DEFINE_FINAL_TYPE (AntWindow, ant_window, GTK_TYPE_APPLICATION_WINDOW)

AntDesk *
ant_window_get_desk (AntWindow *self)
{
  return self->desk;
}

gboolean
ant_window_is_empty (AntWindow *self)
{
  return !ant_desk_get_record (self->desk) && ant_desk_get_busy (self->desk) == ANT_BUSY_NO;
}

/* A sentence, and the way on. */
static void
show_banner (AntWindow *self, GtkMessageType type, const char *sentence, const char *way, const char *action)
{
  gtk_label_set_text (self->banner_text, sentence);
  gtk_info_bar_set_message_type (self->banner, type);
  gtk_button_set_label (self->banner_button, way);
  gtk_actionable_set_action_name (GTK_ACTIONABLE (self->banner_button), action);
  gtk_info_bar_set_revealed (self->banner, TRUE);
}

void
ant_window_complain (AntWindow *self, const char *sentence)
{
  gboolean choose = ant_desk_get_refused (self->desk) != NULL;
  show_banner (self, GTK_MESSAGE_ERROR, sentence, choose ? _("Choose Columns…") : _("Open Another…"),
               choose ? "win.columns" : "win.open");
}

/* Results of a stopped scan say so as long as they are shown; complete ones take that back. */
static void
show_completeness (AntWindow *self)
{
  const AntScanResults *results = ant_desk_get_results (self->desk);
  const char *lack = results ? ant_scan_reach_words (results->reach) : NULL;
  if (lack)
    show_banner (self, GTK_MESSAGE_WARNING, lack, _("Scan Again"), "win.scan");
  else if (gtk_info_bar_get_message_type (self->banner) == GTK_MESSAGE_WARNING)
    gtk_info_bar_set_revealed (self->banner, FALSE);
}

static void
banner_closed_cb (AntWindow *self)
{
  gtk_info_bar_set_revealed (self->banner, FALSE);
}

void
ant_window_open (AntWindow *self, const char *path)
{
  ant_window_leave (self, path);
}

/* Recent records */

static void
recent_chosen_cb (AntWindow *self, GtkListBoxRow *row, GtkListBox *list)
{
  ant_window_open (self, g_object_get_data (G_OBJECT (row), "path"));
}

static GtkWidget *
recent_row_new (const char *path)
{
  g_autofree char *name = g_path_get_basename (path);
  GtkWidget *label = gtk_label_new (name), *row = gtk_list_box_row_new ();
  gtk_label_set_ellipsize (GTK_LABEL (label), PANGO_ELLIPSIZE_MIDDLE);
  gtk_list_box_row_set_child (GTK_LIST_BOX_ROW (row), label);
  gtk_widget_set_tooltip_text (row, path);
  g_object_set_data_full (G_OBJECT (row), "path", g_strdup (path), g_free);
  return row;
}

static void
show_recent (AntWindow *self)
{
  g_auto (GStrv) paths = ant_preferences_recent ();
  g_autoptr (GMenu) menu = g_menu_new ();
  GtkWidget *child;
  while ((child = gtk_widget_get_first_child (GTK_WIDGET (self->recent))))
    gtk_list_box_remove (self->recent, child);
  for (char **path = paths; *path; path++)
    {
      g_autofree char *name = g_path_get_basename (*path);
      g_autoptr (GMenuItem) item = g_menu_item_new (name, NULL);
      g_menu_item_set_action_and_target (item, "win.open-recent", "s", *path);
      g_menu_append_item (menu, item);
      gtk_list_box_append (self->recent, recent_row_new (*path));
    }
  gtk_menu_button_set_menu_model (self->recent_button, G_MENU_MODEL (menu));
  gtk_widget_set_sensitive (GTK_WIDGET (self->recent_button), *paths != NULL);
  gtk_widget_set_visible (GTK_WIDGET (self->recent), *paths != NULL);
}

/* What is shown of the desk */

static void
show_record (AntWindow *self)
{
  const AntLayers *layers = ant_desk_get_layers (self->desk);
  const char *path = ant_analysis_get_path (ant_desk_get_analysis (self->desk));
  g_autofree char *headline = layers ? ant_record_headline (layers->record, &layers->summary) : g_strdup ("");
  gtk_label_set_text (self->subtitle, headline);
  gtk_widget_set_visible (GTK_WIDGET (self->subtitle), layers != NULL);
  gtk_stack_set_visible_child_name (self->stack, layers ? "work" : "welcome");
  if (!layers)
    return;
  gtk_widget_child_focus (GTK_WIDGET (self->time_stack), GTK_DIR_TAB_FORWARD);
  gtk_info_bar_set_revealed (self->banner, FALSE);
  ant_preferences_add_recent (path ? path : layers->record->path);
  show_recent (self);
}

static void
append_time_left (GString *text, double seconds)
{
  if (seconds < 90)
    g_string_append_printf (text, _(": %.0f s left"), ceil (seconds));
  else
    g_string_append_printf (text, _(": %.0f min left"), ceil (seconds / 60));
}

static char *
progress_text (AntDesk *desk)
{
  const AntTaskProgress *progress = ant_desk_get_progress (desk);
  if (ant_desk_get_busy (desk) == ANT_BUSY_ASKING)
    return g_strdup (_("Measuring the dip…"));
  if (ant_desk_get_busy (desk) == ANT_BUSY_STOPPING)
    return g_strdup (_("Stopping…"));
  if (ant_desk_get_busy (desk) == ANT_BUSY_OPENING)
    {
      g_autofree char *name = g_path_get_basename (ant_desk_get_opening (desk));
      return g_strdup_printf (_("Reading %s…"), name);
    }
  if (!progress->title)
    return g_strdup (_("Beginning…"));
  GString *text = g_string_new (NULL);
  g_string_printf (text, _("Stage %zu of %zu, %s"), progress->stage + 1, progress->n_stages,
                   _ (progress->title));
  if (!isnan (progress->stage_left_s))
    append_time_left (text, progress->stage_left_s);
  return g_string_free (text, FALSE);
}

static void
show_status (AntWindow *self)
{
  AntBusy busy = ant_desk_get_busy (self->desk);
  const AntScanResults *results = ant_desk_get_results (self->desk);
  g_autofree char *text = busy != ANT_BUSY_NO                   ? progress_text (self->desk)
                          : ant_desk_is_stale (self->desk)      ? g_strdup (_("Settings or masks have changed: scan again"))
                          : ant_desk_get_purpose (self->desk) == ANT_DRAG_MEASURE
                              ? g_strdup (_("Drag across the dip to measure it"))
                          : ant_desk_get_purpose (self->desk) == ANT_DRAG_MASK
                              ? g_strdup (_("Drag across what is to be left out"))
                          : ant_desk_get_purpose (self->desk) == ANT_DRAG_UNMASK
                              ? g_strdup (_("Drag across what is to be used again"))
                          : results                             ? ant_scan_headline (results)
                                                                : g_strdup (_("Not scanned yet"));
  gtk_label_set_text (self->status, text);
  gtk_widget_set_tooltip_text (GTK_WIDGET (self->status), busy == ANT_BUSY_NO ? text : NULL); /* all of it, where it is narrow */
  gtk_widget_set_visible (GTK_WIDGET (self->progress), busy != ANT_BUSY_NO);
  if (busy == ANT_BUSY_SCANNING)
    gtk_progress_bar_set_fraction (self->progress, ant_desk_get_progress (self->desk)->fraction);
  else if (busy != ANT_BUSY_NO)
    gtk_progress_bar_pulse (self->progress);
  gtk_label_set_text (self->welcome, busy == ANT_BUSY_OPENING ? text : _("Open a record of solar irradiance"));
  gtk_widget_set_visible (GTK_WIDGET (self->welcome_more), busy == ANT_BUSY_NO);
  gtk_spinner_set_spinning (self->spinner, busy == ANT_BUSY_OPENING);
}

/* The desktop's list of windows tells from afar whether the scan is over; a dot, that there is something to save. */
static void
show_title (AntWindow *self)
{
  g_autofree char *kept = ant_desk_get_name (self->desk), *name = kept ? g_steal_pointer (&kept) : g_strdup (_("Antumbra"));
  gboolean changed = ant_analysis_is_changed (ant_desk_get_analysis (self->desk));
  g_autofree char *marked = g_strconcat (changed ? "• " : "", name, NULL);
  gboolean scanning = ant_desk_get_busy (self->desk) == ANT_BUSY_SCANNING;
  g_autofree char *title = scanning ? g_strdup_printf (_("%s – scanning"), marked) : g_strdup (marked);
  gtk_label_set_text (self->title, marked);
  gtk_widget_set_tooltip_text (GTK_WIDGET (self->title), changed ? _("Not saved since the last change") : NULL);
  if (g_strcmp0 (title, gtk_window_get_title (GTK_WINDOW (self))) != 0)
    gtk_window_set_title (GTK_WINDOW (self), title);
}

/* One button in one place: what it does now stands on it. */
static void
show_scan_button (AntWindow *self)
{
  AntBusy busy = ant_desk_get_busy (self->desk);
  gboolean done = ant_desk_get_results (self->desk) && !ant_desk_is_stale (self->desk);
  gtk_button_set_label (self->scan, busy != ANT_BUSY_NO                  ? _("_Stop")
                                    : ant_desk_get_results (self->desk) ? _("_Scan Again")
                                                                        : _("_Scan"));
  gtk_actionable_set_action_name (GTK_ACTIONABLE (self->scan), busy != ANT_BUSY_NO ? "win.stop" : "win.scan");
  gtk_widget_set_tooltip_text (GTK_WIDGET (self->scan), busy != ANT_BUSY_NO
                                                            ? _("Stop (Ctrl+.)")
                                                            : _("Search the record for dips (Ctrl+Return)"));
  gtk_widget_set_visible (GTK_WIDGET (self->scan), ant_desk_get_record (self->desk) || busy != ANT_BUSY_NO);
  if (busy == ANT_BUSY_NO && !done)
    gtk_widget_add_css_class (GTK_WIDGET (self->scan), "suggested-action");
  else
    gtk_widget_remove_css_class (GTK_WIDGET (self->scan), "suggested-action");
}

static void
desk_changed_cb (AntDesk *desk, guint what, AntWindow *self)
{
  if (what & ANT_DESK_RECORD)
    show_record (self);
  if (what & (ANT_DESK_RESULTS | ANT_DESK_RECORD))
    show_completeness (self);
  if (what & (ANT_DESK_BUSY | ANT_DESK_RESULTS | ANT_DESK_RECORD | ANT_DESK_SETTINGS | ANT_DESK_POINTER | ANT_DESK_MASKS))
    show_status (self);
  if (what & (ANT_DESK_BUSY | ANT_DESK_RESULTS | ANT_DESK_RECORD | ANT_DESK_SETTINGS))
    {
      show_scan_button (self);
    }
  if (what & (ANT_DESK_BUSY | ANT_DESK_RESULTS | ANT_DESK_RECORD | ANT_DESK_KEPT))
    {
      show_title (self);
      ant_window_show_kept (self);
    }
  ant_window_update_actions (self);
}

static void
page_shown_cb (AntWindow *self)
{
  GAction *page = g_action_map_lookup_action (G_ACTION_MAP (self), "page");
  if (page)
    g_simple_action_set_state (G_SIMPLE_ACTION (page),
                               g_variant_new_string (gtk_stack_get_visible_child_name (self->pages)));
}

static gboolean
drop_cb (GtkDropTarget *target, const GValue *value, double x, double y, AntWindow *self)
{
  g_autofree char *path = g_file_get_path (g_value_get_object (value));
  gtk_widget_remove_css_class (GTK_WIDGET (self), "drop-here");
  if (path)
    ant_window_open (self, path);
  return path != NULL;
}

static GdkDragAction
drop_enter_cb (GtkDropTarget *target, double x, double y, AntWindow *self)
{
  gtk_widget_add_css_class (GTK_WIDGET (self), "drop-here");
  return GDK_ACTION_COPY;
}

static void
drop_leave_cb (GtkDropTarget *target, AntWindow *self)
{
  gtk_widget_remove_css_class (GTK_WIDGET (self), "drop-here");
}

static void
take_drops (AntWindow *self)
{
  GtkDropTarget *target = gtk_drop_target_new (G_TYPE_FILE, GDK_ACTION_COPY);
  g_signal_connect (target, "drop", G_CALLBACK (drop_cb), self);
  g_signal_connect (target, "enter", G_CALLBACK (drop_enter_cb), self);
  g_signal_connect (target, "leave", G_CALLBACK (drop_leave_cb), self);
  gtk_widget_add_controller (GTK_WIDGET (self), GTK_EVENT_CONTROLLER (target));
}

AntWindow *
ant_window_new (GtkApplication *application)
{
  return g_object_new (ANT_TYPE_WINDOW, "application", application, NULL);
}

static gboolean
ant_window_close_request (GtkWindow *window)
{
  if (!ant_window_leave (ANT_WINDOW (window), NULL))
    return TRUE;
  if (!gtk_window_is_maximized (window))
    {
      int width, height;
      gtk_window_get_default_size (window, &width, &height);
      ant_preferences_set_size (width, height);
    }
  ant_desk_abandon (ANT_WINDOW (window)->desk);
  return GTK_WINDOW_CLASS (ant_window_parent_class)->close_request (window);
}

static void
ant_window_dispose (GObject *object)
{
  AntWindow *self = ANT_WINDOW (object);
  if (self->desk)
    {
      g_signal_handlers_disconnect_by_data (self->desk, self);
      ant_desk_abandon (self->desk);
    }
  g_clear_object (&self->desk);
  g_clear_pointer (&self->going_to, g_free);
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_WINDOW);
  G_OBJECT_CLASS (ant_window_parent_class)->dispose (object);
}

static void
bind_children (GtkWidgetClass *widget_class)
{
  gtk_widget_class_bind_template_child (widget_class, AntWindow, title);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, subtitle);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, banner_text);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, banner_button);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, welcome);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, welcome_more);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, welcome_open);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, status);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, recent_button);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, scan);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, spinner);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, banner);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, offer);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, offer_text);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, offer_yes);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, offer_no);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, edit_section);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, stack);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, pages);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, recent);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, paned);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, time_stack);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, progress);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, record_page);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, noise_page);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, sky_page);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, instrument_page);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, dips_page);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, repeats_page);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, settings_revealer);
  gtk_widget_class_bind_template_child (widget_class, AntWindow, settings_panel);
}

static void
ant_window_class_init (AntWindowClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_window_dispose;
  GTK_WINDOW_CLASS (klass)->close_request = ant_window_close_request;
  g_type_ensure (ANT_TYPE_TIME_STACK);
  g_type_ensure (ANT_TYPE_RECORD_PAGE);
  g_type_ensure (ANT_TYPE_NOISE_PAGE);
  g_type_ensure (ANT_TYPE_DIPS_PAGE);
  g_type_ensure (ANT_TYPE_REPEATS_PAGE);
  g_type_ensure (ANT_TYPE_INSTRUMENT_PAGE);
  g_type_ensure (ANT_TYPE_SKY_PAGE);
  g_type_ensure (ANT_TYPE_SETTINGS_PANEL);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/window.ui");
  bind_children (widget_class);
  gtk_widget_class_bind_template_callback (widget_class, banner_closed_cb);
  gtk_widget_class_bind_template_callback (widget_class, ant_window_accept_offer);
  gtk_widget_class_bind_template_callback (widget_class, ant_window_decline_offer);
  gtk_widget_class_bind_template_callback (widget_class, page_shown_cb);
  gtk_widget_class_bind_template_callback (widget_class, recent_chosen_cb);
}

static void
ant_window_init (AntWindow *self)
{
  self->desk = ant_desk_new ();
  ant_paper_follow (GTK_WIDGET (self));
  gtk_widget_init_template (GTK_WIDGET (self));
  ant_window_add_actions (self);
  ant_time_stack_set_desk (self->time_stack, self->desk);
  ant_record_page_set_desk (self->record_page, self->desk);
  ant_noise_page_set_desk (self->noise_page, self->desk);
  ant_sky_page_set_desk (self->sky_page, self->desk);
  ant_instrument_page_set_desk (self->instrument_page, self->desk);
  ant_dips_page_set_desk (self->dips_page, self->desk);
  ant_repeats_page_set_desk (self->repeats_page, self->desk);
  ant_settings_panel_set_desk (self->settings_panel, self->desk);
  g_signal_connect (self->desk, "changed", G_CALLBACK (desk_changed_cb), self);
  g_signal_connect_swapped (self->desk, "failed", G_CALLBACK (ant_window_complain), self);
  take_drops (self);
  ant_desk_set_average (self->desk, 0);
  gtk_stack_set_visible_child_name (self->pages, "dips");
  show_recent (self);
  desk_changed_cb (self->desk, ANT_DESK_EVERYTHING, self);
  if (ant_preferences_get_settings_shown ())
    g_action_group_change_action_state (G_ACTION_GROUP (self), "settings", g_variant_new_boolean (TRUE));
  int width = 1280, height = 800;
  ant_preferences_get_size (&width, &height);
  gtk_window_set_default_size (GTK_WINDOW (self), width, height);
  gtk_paned_set_position (self->paned, height * 42 / 100);
}
