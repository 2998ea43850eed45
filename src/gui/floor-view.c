/* floor-view.c - the floor chart, and choosing dips on it. */
#include "gui/floor-view.h"

#include <glib/gi18n.h>

#include "plot/floor-chart.h"

struct _AntFloorView
{
  AntPlotView parent_instance;
  gboolean bare;
  int chunk;
};

G_DEFINE_FINAL_TYPE (AntFloorView, ant_floor_view, ANT_TYPE_PLOT_VIEW)

static AntFloorChart
make_chart (AntFloorView *self)
{
  AntDesk *desk = ant_plot_view_get_desk (ANT_PLOT_VIEW (self));
  const AntScanResults *results = ant_desk_get_results (desk);
  AntFloorChart chart = { .selected = ANT_NO_DIP };
  if (results)
    {
      gboolean one = self->chunk >= 0 && (gsize) self->chunk < results->n_chunks;
      chart.floor = one ? results->chunk[self->chunk].floor : results->floor;
      chart.n_floor = one ? results->chunk[self->chunk].n_floor : results->n_floor;
      chart.threshold_snr = results->threshold_snr;
    }
  if (!self->bare && ant_desk_get_shown (desk) != ANT_KIND_PASSAGE) /* days wide: no place on it */
    {
      chart.n_dips = ant_desk_get_marks (desk, &chart.dip);
      chart.selected = ant_desk_get_selected_mark (desk);
    }
  return chart;
}

static void
ant_floor_view_paint (AntPlotView *plot, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale)
{
  AntFloorChart chart = make_chart (ANT_FLOOR_VIEW (plot));
  AntView view;
  ant_floor_chart_view (&chart, &view);
  ant_floor_chart_paint (cr, box, &chart, &view, theme, scale);
}

static char *
ant_floor_view_describe (AntPlotView *plot)
{
  AntDesk *desk = ant_plot_view_get_desk (plot);
  const AntScanResults *results = ant_desk_get_results (desk);
  if (!results)
    return g_strdup (_("Nothing to show before a scan"));
  const AntDipMark *marks;
  return g_strdup_printf (_("Depth against duration: %zu dips over a threshold of %.1f times the noise floor. Left "
                             "and Right choose a dip."),
                          ant_desk_get_marks (desk, &marks), results->threshold_snr);
}

static void
pressed_cb (GtkGestureClick *gesture, int n_press, double x, double y, AntFloorView *self)
{
  AntPlotView *plot = ANT_PLOT_VIEW (self);
  gtk_widget_grab_focus (GTK_WIDGET (self));
  if (self->bare || !ant_desk_get_results (ant_plot_view_get_desk (plot)))
    return;
  AntFloorChart chart = make_chart (self);
  AntBox box = ant_plot_view_box (plot);
  AntView view;
  ant_floor_chart_view (&chart, &view);
  gsize at = ant_floor_chart_dip_at (&box, &chart, &view, ant_plot_view_theme (plot), x, y);
  if (at != ANT_NO_DIP)
    ant_desk_select_mark (ant_plot_view_get_desk (plot), at);
  if (at != ANT_NO_DIP && n_press == 2)
    ant_desk_view_selected (ant_plot_view_get_desk (plot));
}

static void
step_action (GtkWidget *widget, const char *name, GVariant *parameter)
{
  ant_desk_select_next (ant_plot_view_get_desk (ANT_PLOT_VIEW (widget)), g_str_equal (name, "floor.next") ? 1 : -1);
}

void
ant_floor_view_set_bare (AntFloorView *self, gboolean bare)
{
  self->bare = bare;
  ant_plot_view_set_title (ANT_PLOT_VIEW (self), bare ? _("Noise floor") : _("Floor chart"));
}

void
ant_floor_view_set_chunk (AntFloorView *self, int chunk)
{
  self->chunk = chunk;
  ant_plot_view_redraw (ANT_PLOT_VIEW (self));
}

static void
ant_floor_view_class_init (AntFloorViewClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  AntPlotViewClass *plot_class = ANT_PLOT_VIEW_CLASS (klass);
  plot_class->watches = ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_SELECTION | ANT_DESK_JUDGEMENT | ANT_DESK_LOOK;
  plot_class->paint = ant_floor_view_paint;
  plot_class->describe = ant_floor_view_describe;
  gtk_widget_class_install_action (widget_class, "floor.next", NULL, step_action);
  gtk_widget_class_install_action (widget_class, "floor.previous", NULL, step_action);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_Right, 0, "floor.next", NULL);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_Left, 0, "floor.previous", NULL);
}

static void
ant_floor_view_init (AntFloorView *self)
{
  self->chunk = -1;
  ant_floor_view_set_bare (self, FALSE);
  GtkGesture *click = gtk_gesture_click_new ();
  g_signal_connect (click, "pressed", G_CALLBACK (pressed_cb), self);
  gtk_widget_add_controller (GTK_WIDGET (self), GTK_EVENT_CONTROLLER (click));
}
