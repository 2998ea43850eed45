/* window-actions.c - all that a window can do, and when. Buttons, menus, keys and tests name these actions and nothing
 * else. */
#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "gui/column-chooser.h"
#include "gui/file-prompt.h"
#include "gui/preferences.h"
#include "gui/shortcuts.h"
#include "gui/window-private.h"

#define VIEW_ZOOM 1.5
#define VIEW_PAN 0.2

/* What must hold for an action to make sense. */
enum
{
  NEEDS_RECORD = 1 << 0,
  NEEDS_RESULTS = 1 << 1,
  NEEDS_MARKS = 1 << 2,
  NEEDS_SELECTION = 1 << 3,
  NEEDS_WORK = 1 << 4, /* something is running and can be stopped */
  NEEDS_BACK = 1 << 5,
  NEEDS_FORWARD = 1 << 6,
  NEEDS_PLACE = 1 << 7, /* a span or a selection to go to */
  NEEDS_NO_SCAN = 1 << 8,
  NEEDS_SLOW_PART = 1 << 9, /* a scan has run to its end */
  NEEDS_WITNESS = 1 << 10,
  NEEDS_ANALYSIS = 1 << 11, /* of some record, be it there or not */
  NEEDS_UNDO = 1 << 12,
  NEEDS_REDO = 1 << 13,
  NEEDS_MASKS = 1 << 14,
  NEEDS_FILE = 1 << 15, /* a record, read or refused */
};

static const char *const witness_looks[ANT_N_WITNESS_LOOKS] = { "itself", "ratio", "difference" };
static const char *const average_names[] = { "none", "10min", "1h", "6h", "1d" };

/* Durations of dips whose SNR can be followed; 0: the selected dip's. */
static const struct
{
  const char *name;
  double hours;
} snr_durations[] = { { "selected", 0 }, { "30min", 0.5 }, { "1h", 1 }, { "2h", 2 }, { "4h", 4 },
                      { "6h", 6 }, { "8h", 8 }, { "10h", 10 }, { "13h", 13 } };

static void
open_path_cb (const char *path, gpointer data)
{
  AntWindow *self = data;
  if (path)
    ant_window_open (self, path);
  g_object_unref (self);
}

static void
open_record (AntWindow *self, GVariant *parameter)
{
  ant_file_prompt_open (GTK_WINDOW (self), _("Open a Record"), open_path_cb, g_object_ref (self));
}

static void
open_named (AntWindow *self, GVariant *parameter)
{
  ant_window_open (self, g_variant_get_string (parameter, NULL));
}

static void
open_witness_cb (const char *path, gpointer data)
{
  AntWindow *self = data;
  if (path)
    ant_desk_open_witness (self->desk, path);
  g_object_unref (self);
}

static void
open_witness (AntWindow *self, GVariant *parameter)
{
  ant_file_prompt_open (GTK_WINDOW (self), _("Open a Witness"), open_witness_cb, g_object_ref (self));
}

static void
close_witness (AntWindow *self, GVariant *parameter)
{
  ant_desk_close_witness (self->desk, ant_desk_count_witnesses (self->desk) - 1); /* the latest */
}

static void
choose_witness_look (AntWindow *self, GVariant *state)
{
  for (guint i = 0; i < ANT_N_WITNESS_LOOKS; i++)
    if (g_str_equal (witness_looks[i], g_variant_get_string (state, NULL)))
      ant_desk_set_witness_look (self->desk, (AntWitnessLook) i);
}

static void
next_witness_look (AntWindow *self, GVariant *parameter)
{
  guint next = ((guint) ant_desk_get_witness_look (self->desk) + 1) % ANT_N_WITNESS_LOOKS;
  g_action_group_change_action_state (G_ACTION_GROUP (self), "witness-look", g_variant_new_string (witness_looks[next]));
}

static void
reload (AntWindow *self, GVariant *parameter)
{
  ant_desk_reload (self->desk);
}

/* For the record that could not be read, else for the present one. */
static void
choose_columns (AntWindow *self, GVariant *parameter)
{
  const AntAnalysis *analysis = ant_desk_get_analysis (self->desk);
  const char *refused = ant_desk_get_refused (self->desk), *path = refused ? refused : ant_analysis_get_record_path (analysis);
  const AntReadingChoices none = { 0 };
  GtkWidget *chooser = ant_column_chooser_new (GTK_WINDOW (self), self->desk, path,
                                               refused ? &none : &ant_analysis_get_treatment (analysis)->reading, ANT_CHOOSE_RECORD);
  gtk_window_present (GTK_WINDOW (chooser));
}

static void
close_window (AntWindow *self, GVariant *parameter)
{
  gtk_window_close (GTK_WINDOW (self));
}

static void
scan (AntWindow *self, GVariant *parameter)
{
  ant_desk_scan (self->desk);
}

static void
stop (AntWindow *self, GVariant *parameter)
{
  ant_desk_stop (self->desk);
}

static void
toggle_purpose (AntWindow *self, AntDragPurpose purpose)
{
  ant_desk_set_purpose (self->desk, ant_desk_get_purpose (self->desk) == purpose ? ANT_DRAG_VIEW : purpose);
}

/* A span that is drawn already is taken; else the next one is. */
static void
draw_for (AntWindow *self, AntDragPurpose purpose)
{
  AntSpan span;
  toggle_purpose (self, purpose);
  if (ant_desk_get_purpose (self->desk) == purpose && ant_desk_get_span (self->desk, &span))
    ant_desk_use_span (self->desk);
}

static void
mask (AntWindow *self, GVariant *parameter)
{
  draw_for (self, ANT_DRAG_MASK);
}

static void
unmask (AntWindow *self, GVariant *parameter)
{
  draw_for (self, ANT_DRAG_UNMASK);
}

static void
undo (AntWindow *self, GVariant *parameter)
{
  ant_desk_undo (self->desk);
}

static void
redo (AntWindow *self, GVariant *parameter)
{
  ant_desk_redo (self->desk);
}

static void
save (AntWindow *self, GVariant *parameter)
{
  ant_window_save (self);
}

static void
save_as (AntWindow *self, GVariant *parameter)
{
  ant_window_save_as (self);
}

static void
save_tables (AntWindow *self, GVariant *parameter)
{
  ant_window_save_tables (self);
}

static void
find_record (AntWindow *self, GVariant *parameter)
{
  ant_window_find_record (self);
}

static void
measure (AntWindow *self, GVariant *parameter)
{
  AntSpan span;
  if (ant_desk_get_span (self->desk, &span))
    ant_desk_ask (self->desk, span.start_d, span.end_d);
  else
    toggle_purpose (self, ANT_DRAG_MEASURE);
}

static void
reset_settings (AntWindow *self, GVariant *parameter)
{
  ant_desk_reset_settings (self->desk);
}

/* Out of sight, the panel takes no room; in sight, it has the keys. */
static void
settled_cb (GtkRevealer *revealer, GParamSpec *pspec, AntWindow *self)
{
  if (!gtk_revealer_get_reveal_child (revealer))
    gtk_widget_set_visible (GTK_WIDGET (revealer), FALSE);
  else if (gtk_revealer_get_child_revealed (revealer))
    ant_settings_panel_focus (self->settings_panel);
}

static void
show_settings (AntWindow *self, gboolean shown)
{
  if (shown)
    gtk_widget_set_visible (GTK_WIDGET (self->settings_revealer), TRUE);
  gtk_revealer_set_reveal_child (self->settings_revealer, shown);
  if (!shown && !gtk_revealer_get_child_revealed (self->settings_revealer))
    settled_cb (self->settings_revealer, NULL, self);
}

static void
toggle_settings (AntWindow *self, GVariant *state)
{
  show_settings (self, g_variant_get_boolean (state));
  ant_preferences_set_settings_shown (g_variant_get_boolean (state));
}

static void
toggle_unit (AntWindow *self, GVariant *state)
{
  ant_desk_set_unit (self->desk, g_variant_get_boolean (state) ? ANT_DEPTH_W_M2 : ANT_DEPTH_PPM);
}

static void
choose_average (AntWindow *self, GVariant *state)
{
  for (int i = 0; i < (int) G_N_ELEMENTS (average_names); i++)
    if (g_str_equal (average_names[i], g_variant_get_string (state, NULL)))
      ant_desk_set_average (self->desk, i - 1);
}

static void
next_average (AntWindow *self, GVariant *parameter)
{
  guint next = (guint) (ant_desk_get_average (self->desk) + 2) % G_N_ELEMENTS (average_names);
  g_action_group_change_action_state (G_ACTION_GROUP (self), "average", g_variant_new_string (average_names[next]));
}

static void
toggle_snr (AntWindow *self, GVariant *state)
{
  ant_desk_set_snr_shown (self->desk, g_variant_get_boolean (state));
}

static void
choose_snr_duration (AntWindow *self, GVariant *state)
{
  for (gsize i = 0; i < G_N_ELEMENTS (snr_durations); i++)
    if (g_str_equal (snr_durations[i].name, g_variant_get_string (state, NULL)))
      ant_desk_set_snr_duration (self->desk, snr_durations[i].hours / ANT_HOURS_PER_DAY);
  g_action_group_change_action_state (G_ACTION_GROUP (self), "snr", g_variant_new_boolean (TRUE));
}

static void
next_snr_duration (AntWindow *self, GVariant *parameter)
{
  g_autoptr (GVariant) state = g_action_group_get_action_state (G_ACTION_GROUP (self), "snr-duration");
  gsize at = 0;
  while (at + 1 < G_N_ELEMENTS (snr_durations) && !g_str_equal (snr_durations[at].name, g_variant_get_string (state, NULL)))
    at++;
  const char *next = snr_durations[(at + 1) % G_N_ELEMENTS (snr_durations)].name;
  g_action_group_change_action_state (G_ACTION_GROUP (self), "snr-duration", g_variant_new_string (next));
}

static void
choose_page (AntWindow *self, GVariant *state)
{
  if (gtk_stack_get_child_by_name (self->pages, g_variant_get_string (state, NULL)))
    gtk_stack_set_visible_child_name (self->pages, g_variant_get_string (state, NULL));
}

static void
view_in (AntWindow *self, GVariant *parameter)
{
  ant_desk_zoom (self->desk, VIEW_ZOOM, ant_desk_get_pointer (self->desk));
}

static void
view_out (AntWindow *self, GVariant *parameter)
{
  ant_desk_zoom (self->desk, 1 / VIEW_ZOOM, ant_desk_get_pointer (self->desk));
}

static void
view_whole (AntWindow *self, GVariant *parameter)
{
  ant_desk_view_whole (self->desk);
}

static void
view_selected (AntWindow *self, GVariant *parameter)
{
  ant_desk_view_selected (self->desk);
}

static void
view_earlier (AntWindow *self, GVariant *parameter)
{
  ant_desk_pan (self->desk, -VIEW_PAN);
}

static void
view_later (AntWindow *self, GVariant *parameter)
{
  ant_desk_pan (self->desk, VIEW_PAN);
}

static void
view_back (AntWindow *self, GVariant *parameter)
{
  ant_desk_go (self->desk, -1);
}

static void
view_forward (AntWindow *self, GVariant *parameter)
{
  ant_desk_go (self->desk, 1);
}

static void
next_dip (AntWindow *self, GVariant *parameter)
{
  ant_desk_select_next (self->desk, 1);
}

static void
previous_dip (AntWindow *self, GVariant *parameter)
{
  ant_desk_select_next (self->desk, -1);
}

static void
give_verdict (AntWindow *self, GVariant *parameter)
{
  AntDipClass class;
  if (ant_dip_class_parse (g_variant_get_string (parameter, NULL), &class))
    ant_desk_judge (self->desk, class);
}

static void
write_note (AntWindow *self, GVariant *parameter)
{
  gtk_stack_set_visible_child_name (self->pages, "dips");
  ant_dips_page_focus_note (self->dips_page);
}

static void
filter (AntWindow *self, GVariant *parameter)
{
  gtk_stack_set_visible_child_name (self->pages, "dips");
  ant_dips_page_focus_filter (self->dips_page);
}

static void
copy_dip (AntWindow *self, GVariant *parameter)
{
  AntDipItem *item = ant_desk_get_selected (self->desk);
  g_autoptr (GPtrArray) facts
      = ant_dip_item_facts (item, ant_desk_get_record (self->desk), ant_desk_get_unit (self->desk));
  ant_facts_add (facts, _("Verdict"), ant_dip_class_title (ant_dip_item_get_class (item)));
  if (*ant_dip_item_get_note (item))
    ant_facts_add (facts, _("Note"), ant_dip_item_get_note (item));
  g_autofree char *text = ant_facts_text (facts);
  gdk_clipboard_set_text (gtk_widget_get_clipboard (GTK_WIDGET (self)), text);
}

static void
save_list (AntWindow *self, GVariant *parameter)
{
  ant_window_save_list (self);
}

static void
save_flags (AntWindow *self, GVariant *parameter)
{
  ant_window_save_flags (self);
}

static void
save_series (AntWindow *self, GVariant *parameter)
{
  ant_window_save_series (self);
}

static void
save_report (AntWindow *self, GVariant *parameter)
{
  ant_window_save_report (self);
}

static void
show_shortcuts (AntWindow *self, GVariant *parameter)
{
  GtkWidget *window = ant_shortcuts_window_new ();
  gtk_window_set_transient_for (GTK_WINDOW (window), GTK_WINDOW (self));
  gtk_window_present (GTK_WINDOW (window));
}

/* The table: a state makes an action a toggle or a choice, whose `run` takes the new state. */
typedef struct
{
  const char *name, *parameter, *state;
  void (*run) (AntWindow *self, GVariant *value);
  unsigned needs;
} Action;

static const Action actions[] = {
  { "open", NULL, NULL, open_record, 0 },
  { "open-recent", "s", NULL, open_named, 0 },
  { "open-witness", NULL, NULL, open_witness, NEEDS_RECORD },
  { "close-witness", NULL, NULL, close_witness, NEEDS_WITNESS },
  { "witness-look", "s", "'ratio'", choose_witness_look, NEEDS_WITNESS },
  { "next-witness-look", NULL, NULL, next_witness_look, NEEDS_WITNESS },
  { "reload", NULL, NULL, reload, NEEDS_RECORD | NEEDS_NO_SCAN },
  { "columns", NULL, NULL, choose_columns, NEEDS_FILE | NEEDS_NO_SCAN },
  { "close", NULL, NULL, close_window, 0 },
  { "save", NULL, NULL, save, NEEDS_ANALYSIS },
  { "save-as", NULL, NULL, save_as, NEEDS_ANALYSIS },
  { "save-tables", NULL, NULL, save_tables, NEEDS_RESULTS },
  { "find-record", NULL, NULL, find_record, NEEDS_ANALYSIS | NEEDS_NO_SCAN },
  { "undo", NULL, NULL, undo, NEEDS_UNDO },
  { "redo", NULL, NULL, redo, NEEDS_REDO },
  { "mask", NULL, NULL, mask, NEEDS_RECORD },
  { "unmask", NULL, NULL, unmask, NEEDS_RECORD | NEEDS_MASKS },
  { "save-list", NULL, NULL, save_list, NEEDS_RESULTS },
  { "save-flags", NULL, NULL, save_flags, NEEDS_RECORD },
  { "save-series", NULL, NULL, save_series, NEEDS_SLOW_PART },
  { "save-report", NULL, NULL, save_report, NEEDS_RESULTS },
  { "scan", NULL, NULL, scan, NEEDS_RECORD | NEEDS_NO_SCAN },
  { "stop", NULL, NULL, stop, NEEDS_WORK },
  { "measure", NULL, NULL, measure, NEEDS_RECORD | NEEDS_NO_SCAN },
  { "settings", NULL, "false", toggle_settings, 0 },
  { "reset-settings", NULL, NULL, reset_settings, 0 },
  { "own-unit", NULL, "false", toggle_unit, NEEDS_RECORD },
  { "average", "s", "'10min'", choose_average, NEEDS_RECORD },
  { "next-average", NULL, NULL, next_average, NEEDS_RECORD },
  { "snr", NULL, "false", toggle_snr, NEEDS_RECORD },
  { "snr-duration", "s", "'selected'", choose_snr_duration, NEEDS_RECORD },
  { "next-snr-duration", NULL, NULL, next_snr_duration, NEEDS_RECORD },
  { "page", "s", "'dips'", choose_page, NEEDS_RECORD },
  { "view-in", NULL, NULL, view_in, NEEDS_RECORD },
  { "view-out", NULL, NULL, view_out, NEEDS_RECORD },
  { "view-whole", NULL, NULL, view_whole, NEEDS_RECORD },
  { "view-selected", NULL, NULL, view_selected, NEEDS_PLACE },
  { "view-earlier", NULL, NULL, view_earlier, NEEDS_RECORD },
  { "view-later", NULL, NULL, view_later, NEEDS_RECORD },
  { "view-back", NULL, NULL, view_back, NEEDS_BACK },
  { "view-forward", NULL, NULL, view_forward, NEEDS_FORWARD },
  { "next-dip", NULL, NULL, next_dip, NEEDS_MARKS },
  { "previous-dip", NULL, NULL, previous_dip, NEEDS_MARKS },
  { "verdict", "s", NULL, give_verdict, NEEDS_SELECTION },
  { "note", NULL, NULL, write_note, NEEDS_SELECTION },
  { "filter", NULL, NULL, filter, NEEDS_MARKS },
  { "copy-dip", NULL, NULL, copy_dip, NEEDS_SELECTION },
  { "shortcuts", NULL, NULL, show_shortcuts, 0 },
};

static void
activated_cb (GSimpleAction *simple, GVariant *parameter, gpointer data)
{
  const Action *action = &actions[GPOINTER_TO_SIZE (g_object_get_data (G_OBJECT (simple), "action"))];
  action->run (ANT_WINDOW (data), parameter);
}

static void
state_cb (GSimpleAction *simple, GVariant *state, gpointer data)
{
  const Action *action = &actions[GPOINTER_TO_SIZE (g_object_get_data (G_OBJECT (simple), "action"))];
  g_simple_action_set_state (simple, state);
  action->run (ANT_WINDOW (data), state);
}

void
ant_window_add_actions (AntWindow *self)
{
  for (gsize i = 0; i < G_N_ELEMENTS (actions); i++)
    {
      const Action *action = &actions[i];
      const GVariantType *type = action->parameter ? G_VARIANT_TYPE (action->parameter) : NULL;
      g_autoptr (GVariant) state = action->state ? g_variant_new_parsed (action->state) : NULL;
      g_autoptr (GSimpleAction) simple =
          action->state ? g_simple_action_new_stateful (action->name, type, g_variant_ref_sink (state))
                        : g_simple_action_new (action->name, type);
      g_object_set_data (G_OBJECT (simple), "action", GSIZE_TO_POINTER (i));
      if (action->state)
        g_signal_connect (simple, "change-state", G_CALLBACK (state_cb), self);
      else
        g_signal_connect (simple, "activate", G_CALLBACK (activated_cb), self);
      g_action_map_add_action (G_ACTION_MAP (self), G_ACTION (simple));
    }
  g_signal_connect (self->settings_revealer, "notify::child-revealed", G_CALLBACK (settled_cb), self);
}

static unsigned
present_state (AntDesk *desk)
{
  const AntDipMark *marks;
  const AntAnalysis *analysis = ant_desk_get_analysis (desk);
  const AntSpan *masks;
  AntSpan span;
  const AntScanResults *results = ant_desk_get_results (desk);
  AntBusy busy = ant_desk_get_busy (desk);
  gboolean record = ant_desk_get_record (desk) != NULL, selection = ant_desk_get_selected (desk) != NULL;
  return (ant_analysis_get_record_path (analysis) ? NEEDS_ANALYSIS : 0u) | (ant_analysis_undo_name (analysis) ? NEEDS_UNDO : 0u)
         | (ant_analysis_redo_name (analysis) ? NEEDS_REDO : 0u) | (ant_desk_get_masks (desk, &masks) > 0 ? NEEDS_MASKS : 0u)
         | (record || ant_desk_get_refused (desk) ? NEEDS_FILE : 0u)
         | (record ? NEEDS_RECORD : 0u) | (results ? NEEDS_RESULTS : 0u)
         | (results && results->slow_ppm ? NEEDS_SLOW_PART : 0u)
         | (ant_desk_get_marks (desk, &marks) > 0 ? NEEDS_MARKS : 0u) | (selection ? NEEDS_SELECTION : 0u)
         | (busy != ANT_BUSY_NO && busy != ANT_BUSY_STOPPING ? NEEDS_WORK : 0u) | (ant_desk_can_go (desk, -1) ? NEEDS_BACK : 0u)
         | (ant_desk_can_go (desk, 1) ? NEEDS_FORWARD : 0u)
         | (selection || (record && ant_desk_get_span (desk, &span)) ? NEEDS_PLACE : 0u)
         | (busy == ANT_BUSY_NO ? NEEDS_NO_SCAN : 0u) | (ant_desk_count_witnesses (desk) > 0 ? NEEDS_WITNESS : 0u);
}

void
ant_window_update_actions (AntWindow *self)
{
  unsigned state = present_state (self->desk);
  for (gsize i = 0; i < G_N_ELEMENTS (actions); i++)
    {
      GAction *action = g_action_map_lookup_action (G_ACTION_MAP (self), actions[i].name);
      g_simple_action_set_enabled (G_SIMPLE_ACTION (action), (state & actions[i].needs) == actions[i].needs);
    }
}
