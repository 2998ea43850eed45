/* strip-view.c - a strip, and what pointer and keys do on it. */
#include "gui/strip-view.h"

#include <glib/gi18n.h>
#include <math.h>

#define BRACKETS_APART_PX 6
#define WHEEL_ZOOM 1.25
#define KEY_ZOOM 1.5
#define WHEEL_PAN 0.08
#define KEY_PAN 0.2
#define CLICK_PX 4.0

struct _AntStripView
{
  AntPlotView parent_instance;
  AntStripKind kind;
  gboolean axis;
  AntPyramid *nothing; /* drawn while there is nothing yet */
  gboolean dragging, drawing; /* the view moves, or a span grows */
  double drag_from_d, drag_to_d, drag_at_d, pinch;
  AntView drag_view;
};

G_DEFINE_FINAL_TYPE (AntStripView, ant_strip_view, ANT_TYPE_PLOT_VIEW)

static AntDesk *
desk_of (AntStripView *self)
{
  return ant_plot_view_get_desk (ANT_PLOT_VIEW (self));
}

/* The strip as it is now, and the part of it in view. */
static AntView
fill_strip (AntStripView *self, AntStrip *strip, gsize size, char *text)
{
  ant_strip_fill (desk_of (self), self->kind, strip, size, text);
  if (!strip->pyramid)
    strip->pyramid = self->nothing;
  strip->title = ant_plot_view_get_title (ANT_PLOT_VIEW (self));
  strip->time_axis = self->axis;
  return ant_strip_range (desk_of (self), self->kind, strip);
}

static void
ant_strip_view_paint (AntPlotView *plot, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale)
{
  AntStrip strip;
  char text[128];
  AntView view = fill_strip (ANT_STRIP_VIEW (plot), &strip, sizeof text, text);
  ant_strip_paint (cr, box, &strip, &view, theme, scale);
}

static AntBox
data_area (AntStripView *self)
{
  AntPlotView *plot = ANT_PLOT_VIEW (self);
  AntBox box = ant_plot_view_box (plot);
  return ant_strip_area (&box, ant_plot_view_theme (plot), self->axis);
}

static GdkRGBA
rgba (AntColour colour, double alpha)
{
  return (GdkRGBA) { (float) colour.red, (float) colour.green, (float) colour.blue, (float) (colour.alpha * alpha) };
}

/* A bracket over every event of the selected repeat, as long as they stand apart. */
static void
bracket_events (AntStripView *self, GtkSnapshot *snapshot, const AntBox *area, const AntTheme *theme)
{
  AntDesk *desk = desk_of (self);
  const AntView *view = ant_desk_get_view (desk);
  const AntFold *fold = ant_desk_get_fold (desk);
  if (!fold || ant_desk_get_repeat (desk) == ANT_NO_DIP
      || fold->period_d / (view->to - view->from) * area->width < BRACKETS_APART_PX)
    return;
  GdkRGBA colour = rgba (theme->role[ANT_ROLE_SHAPE], 1);
  double mid_d = fold->epoch_d + fold->period_d * ceil ((view->from - fold->epoch_d - fold->duration_d) / fold->period_d);
  for (; mid_d - fold->duration_d < view->to; mid_d += fold->period_d)
    {
      double from = floor (fmax (ant_view_x (view, area, mid_d - 0.5 * fold->duration_d), area->x));
      double to = floor (fmin (ant_view_x (view, area, mid_d + 0.5 * fold->duration_d), area->x + area->width));
      if (to < area->x || from > area->x + area->width)
        continue;
      float left = (float) from, width = (float) fmax (to - from, 1), foot = (float) (area->y + area->height);
      gtk_snapshot_append_color (snapshot, &colour, &GRAPHENE_RECT_INIT (left, foot - 2, width, 2));
      gtk_snapshot_append_color (snapshot, &colour, &GRAPHENE_RECT_INIT (left, foot - 7, 1, 5));
      gtk_snapshot_append_color (snapshot, &colour, &GRAPHENE_RECT_INIT (left + width - 1, foot - 7, 1, 5));
    }
}

static void
ant_strip_view_overlay (AntPlotView *plot, GtkSnapshot *snapshot, const AntBox *box, const AntTheme *theme)
{
  AntStripView *self = ANT_STRIP_VIEW (plot);
  AntDesk *desk = desk_of (self);
  const AntView *view = ant_desk_get_view (desk);
  AntBox area = data_area (self);
  AntSpan span;
  if (ant_desk_get_span (desk, &span))
    {
      double from = fmax (ant_view_x (view, &area, span.start_d), area.x);
      double to = fmin (ant_view_x (view, &area, span.end_d), area.x + area.width);
      GdkRGBA wash = rgba (theme->role[ANT_ROLE_SELECTION], 0.18), edge = rgba (theme->role[ANT_ROLE_SELECTION], 1);
      if (to > from)
        {
          gtk_snapshot_append_color (
              snapshot, &wash,
              &GRAPHENE_RECT_INIT ((float) from, (float) area.y, (float) (to - from), (float) area.height));
          gtk_snapshot_append_color (snapshot, &edge,
                                     &GRAPHENE_RECT_INIT ((float) from, (float) area.y, 1, (float) area.height));
          gtk_snapshot_append_color (snapshot, &edge,
                                     &GRAPHENE_RECT_INIT ((float) to - 1, (float) area.y, 1, (float) area.height));
        }
    }
  bracket_events (self, snapshot, &area, theme);
  double pointer_d = ant_desk_get_pointer (desk);
  if (pointer_d >= view->from && pointer_d <= view->to)
    {
      GdkRGBA line = rgba (theme->role[ANT_ROLE_QUIET], 0.7);
      double x = floor (ant_view_x (view, &area, pointer_d));
      gtk_snapshot_append_color (snapshot, &line,
                                 &GRAPHENE_RECT_INIT ((float) x, (float) area.y, 1, (float) area.height));
    }
}

static char *
ant_strip_view_describe (AntPlotView *plot)
{
  return ant_strip_describe (ant_plot_view_get_desk (plot), ANT_STRIP_VIEW (plot)->kind);
}

static double
time_at (AntStripView *self, double x)
{
  AntBox area = data_area (self);
  return ant_view_at_x (ant_desk_get_view (desk_of (self)), &area, x);
}

/* Pointer */

static void
motion_cb (GtkEventControllerMotion *controller, double x, double y, AntStripView *self)
{
  if (!ant_desk_get_layers (desk_of (self)))
    return;
  AntBox area = data_area (self);
  gboolean inside = x >= area.x && x <= area.x + area.width;
  ant_desk_set_pointer (desk_of (self), inside ? time_at (self, x) : NAN);
}

static void
leave_cb (GtkEventControllerMotion *controller, AntStripView *self)
{
  ant_desk_set_pointer (desk_of (self), NAN);
}

static gboolean
scroll_cb (GtkEventControllerScroll *controller, double dx, double dy, AntStripView *self)
{
  AntDesk *desk = desk_of (self);
  if (!ant_desk_get_layers (desk))
    return GDK_EVENT_PROPAGATE;
  GdkModifierType state = gtk_event_controller_get_current_event_state (GTK_EVENT_CONTROLLER (controller));
  if (state & GDK_SHIFT_MASK)
    dx += dy, dy = 0;
  if (dx != 0)
    ant_desk_pan (desk, dx * WHEEL_PAN);
  if (dy != 0)
    ant_desk_zoom (desk, pow (WHEEL_ZOOM, -dy), ant_desk_get_pointer (desk));
  return GDK_EVENT_STOP;
}

static void
pinch_begin_cb (GtkGesture *gesture, GdkEventSequence *sequence, AntStripView *self)
{
  self->pinch = 1;
}

static void
pinch_cb (GtkGestureZoom *gesture, double scale, AntStripView *self)
{
  double x, y, at_d = ant_desk_get_pointer (desk_of (self));
  if (!ant_desk_get_layers (desk_of (self)) || !(scale > 0))
    return;
  if (gtk_gesture_is_active (GTK_GESTURE (gesture))
      && gtk_gesture_get_bounding_box_center (GTK_GESTURE (gesture), &x, &y))
    at_d = time_at (self, x);
  ant_desk_zoom (desk_of (self), scale / self->pinch, at_d);
  self->pinch = scale;
}

static void
drag_begin_cb (GtkGestureDrag *gesture, double x, double y, AntStripView *self)
{
  AntDesk *desk = desk_of (self);
  gtk_widget_grab_focus (GTK_WIDGET (self));
  if (!ant_desk_get_layers (desk))
    return;
  GdkModifierType state = gtk_event_controller_get_current_event_state (GTK_EVENT_CONTROLLER (gesture));
  self->dragging = FALSE;
  self->drawing = (state & GDK_SHIFT_MASK) || ant_desk_get_purpose (desk) != ANT_DRAG_VIEW;
  self->drag_view = *ant_desk_get_view (desk);
  self->drag_at_d = time_at (self, x);
}

static void
drag_update_cb (GtkGestureDrag *gesture, double dx, double dy, AntStripView *self)
{
  AntDesk *desk = desk_of (self);
  if (!ant_desk_get_layers (desk) || (!self->dragging && fabs (dx) < CLICK_PX))
    return;
  self->dragging = TRUE;
  gtk_gesture_set_state (GTK_GESTURE (gesture), GTK_EVENT_SEQUENCE_CLAIMED);
  AntBox area = data_area (self);
  double moved_d = dx / area.width * (self->drag_view.to - self->drag_view.from);
  if (self->drawing)
    ant_desk_set_span (desk, &(AntSpan) { self->drag_at_d, self->drag_at_d + moved_d });
  else
    ant_desk_set_view (desk, self->drag_view.from - moved_d, self->drag_view.to - moved_d);
}

static void
drag_end_cb (GtkGestureDrag *gesture, double dx, double dy, AntStripView *self)
{
  if (self->dragging && self->drawing)
    ant_desk_use_span (desk_of (self));
  self->dragging = self->drawing = FALSE;
}

static void
released_cb (GtkGestureClick *gesture, int n_press, double x, double y, AntStripView *self)
{
  AntDesk *desk = desk_of (self);
  if (self->dragging || !ant_desk_get_layers (desk))
    return;
  AntPlotView *plot = ANT_PLOT_VIEW (self);
  AntBox box = ant_plot_view_box (plot);
  AntStrip strip;
  char text[128];
  AntView view = fill_strip (self, &strip, sizeof text, text);
  gsize at = ant_strip_dip_at (&box, &strip, &view, ant_plot_view_theme (plot), x, y);
  if (at != ANT_NO_DIP)
    ant_desk_select_mark (desk, at);
  if (n_press == 2 && at != ANT_NO_DIP)
    ant_desk_view_selected (desk);
}

/* Keys */

typedef struct
{
  const char *name;
  guint key;
  GdkModifierType modifiers;
  enum { ZOOM, PAN, WHOLE, SPAN, MEASURE, MASK, UNMASK, FORGET, NEXT } what;
  double by;
} Move;

static const Move moves[] = {
  { "strip.zoom-in", GDK_KEY_plus, 0, ZOOM, KEY_ZOOM },
  { "strip.zoom-out", GDK_KEY_minus, 0, ZOOM, 1 / KEY_ZOOM },
  { "strip.pan-left", GDK_KEY_Left, 0, PAN, -KEY_PAN },
  { "strip.pan-right", GDK_KEY_Right, 0, PAN, KEY_PAN },
  { "strip.whole", GDK_KEY_Home, 0, WHOLE, 0 },
  { "strip.narrow-span", GDK_KEY_Left, GDK_SHIFT_MASK, SPAN, -1 },
  { "strip.widen-span", GDK_KEY_Right, GDK_SHIFT_MASK, SPAN, 1 },
  { "strip.measure-span", GDK_KEY_Return, 0, MEASURE, 0 },
  { "strip.mask-span", GDK_KEY_m, 0, MASK, 0 },
  { "strip.unmask-span", GDK_KEY_u, 0, UNMASK, 0 },
  { "strip.forget-span", GDK_KEY_Escape, 0, FORGET, 0 },
  { "strip.next", GDK_KEY_n, 0, NEXT, 1 },
  { "strip.previous", GDK_KEY_p, 0, NEXT, -1 },
};

static void
move_action (GtkWidget *widget, const char *name, GVariant *parameter)
{
  AntStripView *self = ANT_STRIP_VIEW (widget);
  AntDesk *desk = desk_of (self);
  for (gsize i = 0; i < G_N_ELEMENTS (moves); i++)
    if (g_str_equal (moves[i].name, name))
      switch (moves[i].what)
        {
        case ZOOM:
          ant_desk_zoom (desk, moves[i].by, NAN);
          break;
        case PAN:
          ant_desk_pan (desk, moves[i].by);
          break;
        case WHOLE:
          ant_desk_view_whole (desk);
          break;
        case SPAN:
          ant_desk_widen_span (desk, (int) moves[i].by);
          break;
        case MEASURE:
          ant_desk_use_span (desk_of (self));
          break;
        case NEXT:
          ant_desk_select_next (desk, (int) moves[i].by);
          break;
        case FORGET:
        default:
          ant_desk_set_span (desk, NULL);
          ant_desk_set_purpose (desk, ANT_DRAG_VIEW);
        }
}

static void
name (AntStripView *self)
{
  AntDesk *desk = desk_of (self);
  g_autofree char *title = desk ? ant_strip_title (desk, self->kind) : NULL;
  ant_plot_view_set_title (ANT_PLOT_VIEW (self), title ? title : _("Strip"));
}

static void
ant_strip_view_desk_changed (AntPlotView *plot, AntDeskChange what)
{
  if (what & (ANT_DESK_RECORD | ANT_DESK_LOOK | ANT_DESK_SNR | ANT_DESK_WITNESS | ANT_DESK_COLUMNS))
    name (ANT_STRIP_VIEW (plot));
  gtk_widget_set_cursor_from_name (GTK_WIDGET (plot),
                                   ant_desk_get_purpose (ant_plot_view_get_desk (plot)) != ANT_DRAG_VIEW ? "crosshair" : NULL);
}

void
ant_strip_view_set_kind (AntStripView *self, AntStripKind kind)
{
  self->kind = kind;
  name (self);
}

void
ant_strip_view_set_axis (AntStripView *self, gboolean axis)
{
  if (axis == self->axis)
    return;
  self->axis = axis;
  ant_plot_view_redraw (ANT_PLOT_VIEW (self));
}

static void
ant_strip_view_finalize (GObject *object)
{
  ant_pyramid_free (ANT_STRIP_VIEW (object)->nothing);
  G_OBJECT_CLASS (ant_strip_view_parent_class)->finalize (object);
}

static void
ant_strip_view_class_init (AntStripViewClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  AntPlotViewClass *plot_class = ANT_PLOT_VIEW_CLASS (klass);
  G_OBJECT_CLASS (klass)->finalize = ant_strip_view_finalize;
  plot_class->watches = ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_SELECTION | ANT_DESK_VIEW | ANT_DESK_JUDGEMENT
                        | ANT_DESK_LOOK | ANT_DESK_MASKS | ANT_DESK_SNR | ANT_DESK_FOLD | ANT_DESK_SKY | ANT_DESK_WITNESS
                        | ANT_DESK_COLUMNS;
  plot_class->paint = ant_strip_view_paint;
  plot_class->overlay = ant_strip_view_overlay;
  plot_class->describe = ant_strip_view_describe;
  plot_class->desk_changed = ant_strip_view_desk_changed;
  for (gsize i = 0; i < G_N_ELEMENTS (moves); i++)
    {
      gtk_widget_class_install_action (widget_class, moves[i].name, NULL, move_action);
      gtk_widget_class_add_binding_action (widget_class, moves[i].key, moves[i].modifiers, moves[i].name, NULL);
    }
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_equal, 0, "strip.zoom-in", NULL);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_KP_Add, 0, "strip.zoom-in", NULL);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_KP_Subtract, 0, "strip.zoom-out", NULL);
}

static void
add (AntStripView *self, gpointer controller)
{
  gtk_widget_add_controller (GTK_WIDGET (self), GTK_EVENT_CONTROLLER (controller));
}

static void
ant_strip_view_init (AntStripView *self)
{
  self->nothing = ant_pyramid_new (0, NULL);
  GtkEventController *motion = gtk_event_controller_motion_new ();
  g_signal_connect (motion, "motion", G_CALLBACK (motion_cb), self);
  g_signal_connect (motion, "leave", G_CALLBACK (leave_cb), self);
  add (self, motion);
  GtkEventController *scroll = gtk_event_controller_scroll_new (GTK_EVENT_CONTROLLER_SCROLL_BOTH_AXES);
  g_signal_connect (scroll, "scroll", G_CALLBACK (scroll_cb), self);
  add (self, scroll);
  GtkGesture *pinch = gtk_gesture_zoom_new ();
  g_signal_connect (pinch, "begin", G_CALLBACK (pinch_begin_cb), self);
  g_signal_connect (pinch, "scale-changed", G_CALLBACK (pinch_cb), self);
  add (self, pinch);
  GtkGesture *click = gtk_gesture_click_new ();
  g_signal_connect (click, "released", G_CALLBACK (released_cb), self);
  add (self, click);
  GtkGesture *drag = gtk_gesture_drag_new ();
  g_signal_connect (drag, "drag-begin", G_CALLBACK (drag_begin_cb), self);
  g_signal_connect (drag, "drag-update", G_CALLBACK (drag_update_cb), self);
  g_signal_connect (drag, "drag-end", G_CALLBACK (drag_end_cb), self);
  add (self, drag);
  ant_strip_view_set_kind (self, ANT_STRIP_IRRADIANCE);
}
