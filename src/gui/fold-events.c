/* fold-events.c - small strips, as high as there are events. */
#include "gui/fold-events.h"

#include <glib/gi18n.h>

struct _AntFoldEvents
{
  AntPlotView parent_instance;
  gsize selected; /* or ANT_NO_DIP */
};

G_DEFINE_FINAL_TYPE (AntFoldEvents, ant_fold_events, ANT_TYPE_PLOT_VIEW)

static const AntFoldData *
data_of (AntPlotView *plot)
{
  AntDesk *desk = ant_plot_view_get_desk (plot);
  return desk ? ant_desk_get_fold_data (desk) : NULL;
}

static void
ant_fold_events_paint (AntPlotView *plot, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale)
{
  const AntFoldData *data = data_of (plot);
  if (!data)
    return;
  AntEventStrips strips = data->strips;
  strips.selected = MIN (ANT_FOLD_EVENTS (plot)->selected, strips.n);
  ant_event_strips_paint (cr, box, &strips, theme, scale);
}

static char *
ant_fold_events_describe (AntPlotView *plot)
{
  const AntFoldData *data = data_of (plot);
  gsize n = data ? data->strips.n : 0, selected = ANT_FOLD_EVENTS (plot)->selected;
  if (selected < n)
    return g_strdup_printf (_("Event %zu of %zu, %s"), selected + 1, n, data->strip[selected].label);
  return g_strdup_printf (g_dngettext (NULL, "%zu event with data", "%zu events with data", n), n);
}

static void
ant_fold_events_desk_changed (AntPlotView *plot, AntDeskChange what)
{
  if (!(what & (ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_FOLD)))
    return;
  const AntFoldData *data = data_of (plot);
  double rows = data ? (double) data->strips.n : 0;
  ANT_FOLD_EVENTS (plot)->selected = ANT_NO_DIP;
  gtk_widget_set_size_request (GTK_WIDGET (plot), 150, (int) (rows * ant_event_strips_row (ant_plot_view_theme (plot))) + 2);
}

static void
choose (AntFoldEvents *self, gsize at)
{
  self->selected = at;
  ant_plot_view_redraw (ANT_PLOT_VIEW (self));
  ant_desk_view_event (ant_plot_view_get_desk (ANT_PLOT_VIEW (self)), at);
}

static void
pressed_cb (GtkGestureClick *gesture, int n_press, double x, double y, AntFoldEvents *self)
{
  AntPlotView *plot = ANT_PLOT_VIEW (self);
  const AntFoldData *data = data_of (plot);
  gtk_widget_grab_focus (GTK_WIDGET (self));
  if (!data)
    return;
  AntBox box = ant_plot_view_box (plot);
  gsize at = ant_event_strips_at (&box, &data->strips, ant_plot_view_theme (plot), y);
  if (at < data->strips.n)
    choose (self, at);
}

static void
step_action (GtkWidget *widget, const char *name, GVariant *parameter)
{
  AntFoldEvents *self = ANT_FOLD_EVENTS (widget);
  const AntFoldData *data = data_of (ANT_PLOT_VIEW (self));
  gsize n = data ? data->strips.n : 0;
  if (n == 0)
    return;
  if (self->selected >= n)
    choose (self, 0);
  else if (g_str_equal (name, "events.next"))
    choose (self, MIN (self->selected + 1, n - 1));
  else
    choose (self, self->selected ? self->selected - 1 : 0);
}

static void
ant_fold_events_class_init (AntFoldEventsClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  AntPlotViewClass *plot_class = ANT_PLOT_VIEW_CLASS (klass);
  plot_class->watches = ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_FOLD;
  plot_class->paint = ant_fold_events_paint;
  plot_class->describe = ant_fold_events_describe;
  plot_class->desk_changed = ant_fold_events_desk_changed;
  gtk_widget_class_install_action (widget_class, "events.next", NULL, step_action);
  gtk_widget_class_install_action (widget_class, "events.previous", NULL, step_action);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_Down, 0, "events.next", NULL);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_Up, 0, "events.previous", NULL);
}

static void
ant_fold_events_init (AntFoldEvents *self)
{
  self->selected = ANT_NO_DIP;
  ant_plot_view_set_title (ANT_PLOT_VIEW (self), _("Events"));
  GtkGesture *click = gtk_gesture_click_new ();
  g_signal_connect (click, "pressed", G_CALLBACK (pressed_cb), self);
  gtk_widget_add_controller (GTK_WIDGET (self), GTK_EVENT_CONTROLLER (click));
}
