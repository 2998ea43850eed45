/* ribbon-view.c - the ribbon under the strips. */
#include "gui/ribbon-view.h"

#include <glib/gi18n.h>

#include "plot/ribbon.h"

#define HEIGHT 34
#define KEY_PAN 0.2

struct _AntRibbonView
{
  AntPlotView parent_instance;
  AntRibbonPart part; /* under the press */
  AntView pressed;    /* the view at that time */
  double pressed_d;
};

G_DEFINE_FINAL_TYPE (AntRibbonView, ant_ribbon_view, ANT_TYPE_PLOT_VIEW)

static AntRibbon
make_ribbon (AntPlotView *plot)
{
  AntDesk *desk = ant_plot_view_get_desk (plot);
  const AntLayers *layers = ant_desk_get_layers (desk);
  AntRibbon ribbon = { .pyramid = layers->values, .start_d = layers->record->series.start_d,
                       .step_d = layers->record->series.step_d, .selected = ant_desk_get_selected_mark (desk) };
  ribbon.n_dips = ant_desk_get_marks (desk, &ribbon.dip);
  ribbon.n_masks = ant_desk_get_masks (desk, &ribbon.mask);
  return ribbon;
}

static void
ant_ribbon_view_paint (AntPlotView *plot, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale)
{
  AntRibbon ribbon = make_ribbon (plot);
  ant_ribbon_paint (cr, box, &ribbon, ant_desk_get_view (ant_plot_view_get_desk (plot)), theme, scale);
}

static char *
ant_ribbon_view_describe (AntPlotView *plot)
{
  AntDesk *desk = ant_plot_view_get_desk (plot);
  const AntView *view = ant_desk_get_view (desk);
  g_autofree char *from = ant_instant_words (ant_desk_get_record (desk), view->from);
  g_autofree char *to = ant_instant_words (ant_desk_get_record (desk), view->to);
  return g_strdup_printf (_("The whole record; in view is %s to %s. Left and Right move the view."), from, to);
}

static double
time_at (AntRibbonView *self, double x)
{
  AntPlotView *plot = ANT_PLOT_VIEW (self);
  AntBox box = ant_plot_view_box (plot);
  AntRibbon ribbon = make_ribbon (plot);
  return ant_ribbon_time_at (&box, &ribbon, ant_plot_view_theme (plot), x);
}

static AntRibbonPart
part_at (AntRibbonView *self, double x)
{
  AntPlotView *plot = ANT_PLOT_VIEW (self);
  AntBox box = ant_plot_view_box (plot);
  AntRibbon ribbon = make_ribbon (plot);
  return ant_ribbon_part_at (&box, &ribbon, ant_desk_get_view (ant_plot_view_get_desk (plot)),
                             ant_plot_view_theme (plot), x);
}

static void
drag_begin_cb (GtkGestureDrag *gesture, double x, double y, AntRibbonView *self)
{
  AntDesk *desk = ant_plot_view_get_desk (ANT_PLOT_VIEW (self));
  gtk_widget_grab_focus (GTK_WIDGET (self));
  if (!ant_desk_get_layers (desk))
    return;
  self->part = part_at (self, x);
  self->pressed_d = time_at (self, x);
  if (self->part == ANT_RIBBON_OUTSIDE)
    {
      const AntView *view = ant_desk_get_view (desk);
      double half_d = (view->to - view->from) / 2;
      ant_desk_set_view (desk, self->pressed_d - half_d, self->pressed_d + half_d);
      self->part = ANT_RIBBON_INSIDE;
    }
  self->pressed = *ant_desk_get_view (desk);
}

static void
drag_update_cb (GtkGestureDrag *gesture, double dx, double dy, AntRibbonView *self)
{
  AntDesk *desk = ant_plot_view_get_desk (ANT_PLOT_VIEW (self));
  double x, y;
  if (!ant_desk_get_layers (desk) || !gtk_gesture_drag_get_start_point (gesture, &x, &y))
    return;
  double time_d = time_at (self, x + dx), moved_d = time_d - self->pressed_d;
  if (self->part == ANT_RIBBON_INSIDE)
    ant_desk_set_view (desk, self->pressed.from + moved_d, self->pressed.to + moved_d);
  else if (self->part == ANT_RIBBON_FROM_EDGE && time_d < self->pressed.to)
    ant_desk_set_view (desk, time_d, self->pressed.to);
  else if (self->part == ANT_RIBBON_TO_EDGE && time_d > self->pressed.from)
    ant_desk_set_view (desk, self->pressed.from, time_d);
}

static void
motion_cb (GtkEventControllerMotion *controller, double x, double y, AntRibbonView *self)
{
  if (!ant_desk_get_layers (ant_plot_view_get_desk (ANT_PLOT_VIEW (self))))
    return;
  AntRibbonPart part = part_at (self, x);
  const char *cursor = part == ANT_RIBBON_INSIDE ? "grab" : part == ANT_RIBBON_OUTSIDE ? NULL : "ew-resize";
  gtk_widget_set_cursor_from_name (GTK_WIDGET (self), cursor);
}

static gboolean
scroll_cb (GtkEventControllerScroll *controller, double dx, double dy, AntRibbonView *self)
{
  ant_desk_pan (ant_plot_view_get_desk (ANT_PLOT_VIEW (self)), (dx + dy) * KEY_PAN / 2);
  return GDK_EVENT_STOP;
}

static void
pan_action (GtkWidget *widget, const char *name, GVariant *parameter)
{
  double by = g_str_equal (name, "ribbon.left") ? -KEY_PAN : KEY_PAN;
  ant_desk_pan (ant_plot_view_get_desk (ANT_PLOT_VIEW (widget)), by);
}

static void
ant_ribbon_view_measure (GtkWidget *widget, GtkOrientation orientation, int for_size, int *minimum, int *natural,
                         int *minimum_baseline, int *natural_baseline)
{
  *minimum = *natural = orientation == GTK_ORIENTATION_HORIZONTAL ? 160 : HEIGHT;
}

static void
ant_ribbon_view_class_init (AntRibbonViewClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  AntPlotViewClass *plot_class = ANT_PLOT_VIEW_CLASS (klass);
  plot_class->watches =
      ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_SELECTION | ANT_DESK_VIEW | ANT_DESK_JUDGEMENT | ANT_DESK_LOOK
      | ANT_DESK_MASKS;
  plot_class->paint = ant_ribbon_view_paint;
  plot_class->describe = ant_ribbon_view_describe;
  widget_class->measure = ant_ribbon_view_measure;
  gtk_widget_class_install_action (widget_class, "ribbon.left", NULL, pan_action);
  gtk_widget_class_install_action (widget_class, "ribbon.right", NULL, pan_action);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_Left, 0, "ribbon.left", NULL);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_Right, 0, "ribbon.right", NULL);
}

static void
ant_ribbon_view_init (AntRibbonView *self)
{
  ant_plot_view_set_title (ANT_PLOT_VIEW (self), _("Ribbon of the record"));
  GtkGesture *drag = gtk_gesture_drag_new ();
  g_signal_connect (drag, "drag-begin", G_CALLBACK (drag_begin_cb), self);
  g_signal_connect (drag, "drag-update", G_CALLBACK (drag_update_cb), self);
  gtk_widget_add_controller (GTK_WIDGET (self), GTK_EVENT_CONTROLLER (drag));
  GtkEventController *motion = gtk_event_controller_motion_new ();
  g_signal_connect (motion, "motion", G_CALLBACK (motion_cb), self);
  gtk_widget_add_controller (GTK_WIDGET (self), motion);
  GtkEventController *scroll = gtk_event_controller_scroll_new (GTK_EVENT_CONTROLLER_SCROLL_BOTH_AXES);
  g_signal_connect (scroll, "scroll", G_CALLBACK (scroll_cb), self);
  gtk_widget_add_controller (GTK_WIDGET (self), scroll);
}
