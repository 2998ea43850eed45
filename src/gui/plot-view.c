/* plot-view.c - a painter's widget. */
#include "gui/plot-view.h"

#include <glib/gi18n.h>
#include <math.h>

#include "gui/file-prompt.h"
#include "gui/paper.h"
#include "plot/figure.h"

#define FONT_SHARE 0.88 /* of the desktop's font: labels are quieter than controls */
#define PICTURE_SCALE 2.0

typedef struct
{
  AntDesk *desk; /* owned */
  char *title;
  AntTheme theme;
  gboolean theme_known;
  char *font;
  GskRenderNode *picture; /* cached; NULL: to be painted */
  int width, height;
  GtkWidget *menu; /* popover, made when first asked for */
} AntPlotViewPrivate;

G_DEFINE_ABSTRACT_TYPE_WITH_PRIVATE (AntPlotView, ant_plot_view, GTK_TYPE_WIDGET)

static AntPlotViewPrivate *
private (AntPlotView *self)
{
  return ant_plot_view_get_instance_private (self);
}

static void
set_fonts (AntPlotView *self, AntTheme *theme)
{
  AntPlotViewPrivate *priv = private (self);
  const PangoFontDescription *font
      = pango_context_get_font_description (gtk_widget_get_pango_context (GTK_WIDGET (self)));
  const char *family = font ? pango_font_description_get_family (font) : NULL;
  if (!family)
    return;
  g_free (priv->font);
  priv->font = g_strdup (family);
  theme->font = priv->font;
  double size = pango_font_description_get_size (font) / (double) PANGO_SCALE;
  if (!pango_font_description_get_size_is_absolute (font))
    size *= 96.0 / 72.0;
  theme->font_px = fmax (FONT_SHARE * size, 9);
}

const AntTheme *
ant_plot_view_theme (AntPlotView *self)
{
  AntPlotViewPrivate *priv = private (self);
  if (!priv->theme_known)
    {
      ant_theme_init (&priv->theme, ant_paper_kind (GTK_WIDGET (self)));
      set_fonts (self, &priv->theme);
      priv->theme_known = TRUE;
    }
  return &priv->theme;
}

AntBox
ant_plot_view_box (AntPlotView *self)
{
  return (AntBox) { 0, 0, gtk_widget_get_width (GTK_WIDGET (self)), gtk_widget_get_height (GTK_WIDGET (self)) };
}

static void
describe (AntPlotView *self)
{
  AntPlotViewPrivate *priv = private (self);
  AntPlotViewClass *klass = ANT_PLOT_VIEW_GET_CLASS (self);
  gboolean shown = priv->desk && ant_desk_get_layers (priv->desk);
  g_autofree char *text = shown && klass->describe ? klass->describe (self) : g_strdup (_("Nothing to show yet"));
  gtk_accessible_update_property (GTK_ACCESSIBLE (self), GTK_ACCESSIBLE_PROPERTY_LABEL,
                                  priv->title ? priv->title : _("Plot"), GTK_ACCESSIBLE_PROPERTY_DESCRIPTION, text,
                                  -1);
}

void
ant_plot_view_redraw (AntPlotView *self)
{
  g_clear_pointer (&private (self)->picture, gsk_render_node_unref);
  describe (self);
  gtk_widget_queue_draw (GTK_WIDGET (self));
}

static void
desk_changed_cb (AntDesk *desk, guint what, AntPlotView *self)
{
  AntPlotViewClass *klass = ANT_PLOT_VIEW_GET_CLASS (self);
  if (klass->desk_changed)
    klass->desk_changed (self, (AntDeskChange) what);
  if (what & klass->watches)
    ant_plot_view_redraw (self);
  else if (klass->overlay && (what & ANT_DESK_POINTER))
    gtk_widget_queue_draw (GTK_WIDGET (self));
}

void
ant_plot_view_set_desk (AntPlotView *self, AntDesk *desk)
{
  AntPlotViewPrivate *priv = private (self);
  g_set_object (&priv->desk, desk);
  g_signal_connect_object (desk, "changed", G_CALLBACK (desk_changed_cb), self, 0);
  desk_changed_cb (desk, ANT_DESK_EVERYTHING, self);
}

AntDesk *
ant_plot_view_get_desk (AntPlotView *self)
{
  return private (self)->desk;
}

void
ant_plot_view_set_title (AntPlotView *self, const char *title)
{
  AntPlotViewPrivate *priv = private (self);
  g_free (priv->title);
  priv->title = g_strdup (title);
  describe (self);
}

const char *
ant_plot_view_get_title (AntPlotView *self)
{
  return private (self)->title;
}

static gboolean
has_record (AntPlotView *self)
{
  AntPlotViewPrivate *priv = private (self);
  return priv->desk && ant_desk_get_layers (priv->desk);
}

/* A cairo drawing is kept as a render node: hovering only adds a line over it. */
static void
ant_plot_view_snapshot (GtkWidget *widget, GtkSnapshot *snapshot)
{
  AntPlotView *self = ANT_PLOT_VIEW (widget);
  AntPlotViewPrivate *priv = private (self);
  AntPlotViewClass *klass = ANT_PLOT_VIEW_GET_CLASS (self);
  AntBox box = ant_plot_view_box (self);
  if (!has_record (self) || box.width < 16 || box.height < 16)
    return;
  if (!priv->picture || priv->width != (int) box.width || priv->height != (int) box.height)
    {
      g_clear_pointer (&priv->picture, gsk_render_node_unref);
      graphene_rect_t bounds = GRAPHENE_RECT_INIT (0, 0, (float) box.width, (float) box.height);
      priv->picture = gsk_cairo_node_new (&bounds);
      cairo_t *cr = gsk_cairo_node_get_draw_context (priv->picture);
      klass->paint (self, cr, &box, ant_plot_view_theme (self), gtk_widget_get_scale_factor (widget));
      cairo_destroy (cr);
      priv->width = (int) box.width;
      priv->height = (int) box.height;
    }
  gtk_snapshot_append_node (snapshot, priv->picture);
  if (klass->overlay)
    klass->overlay (self, snapshot, &box, ant_plot_view_theme (self));
}

static void
paint_figure (cairo_t *cr, const AntBox *box, double scale, gpointer data)
{
  AntPlotView *self = data;
  AntTheme theme;
  ant_theme_init (&theme, ANT_THEME_LIGHT);
  set_fonts (self, &theme);
  ANT_PLOT_VIEW_GET_CLASS (self)->paint (self, cr, box, &theme, scale);
}

static AntFigureOptions
figure_options (AntPlotView *self, AntFigureFormat format)
{
  return (AntFigureOptions){ format, fmax (gtk_widget_get_width (GTK_WIDGET (self)), 16),
                             fmax (gtk_widget_get_height (GTK_WIDGET (self)), 16), PICTURE_SCALE,
                             private(self)->title };
}

gboolean
ant_plot_view_save (AntPlotView *self, const char *path, GError **error)
{
  AntFigureFormat format;
  if (!ant_figure_format_of (path, &format, error))
    return FALSE;
  AntFigureOptions options = figure_options (self, format);
  return ant_figure_write (path, &options, paint_figure, self, error);
}

static void
save_path_cb (const char *path, gpointer data)
{
  AntPlotView *self = data;
  g_autoptr (GError) error = NULL;
  if (path && !ant_plot_view_save (self, path, &error))
    g_signal_emit_by_name (private (self)->desk, "failed", error->message);
  g_object_unref (self);
}

static void
save_action (GtkWidget *widget, const char *name, GVariant *parameter)
{
  AntPlotView *self = ANT_PLOT_VIEW (widget);
  if (!has_record (self))
    return;
  g_autofree char *lower = g_utf8_strdown (private (self)->title, -1);
  g_autofree char *suggested = g_strconcat (g_strdelimit (lower, " ", '-'), ".png", NULL);
  ant_file_prompt_save (GTK_WINDOW (gtk_widget_get_root (widget)), _("Save figure as PNG, SVG or PDF"), suggested,
                        save_path_cb, g_object_ref (self));
}

static void
copy_action (GtkWidget *widget, const char *name, GVariant *parameter)
{
  AntPlotView *self = ANT_PLOT_VIEW (widget);
  AntFigureOptions options = figure_options (self, ANT_FIGURE_PNG);
  g_autoptr (GError) error = NULL;
  if (!has_record (self))
    return;
  g_autoptr (GBytes) bytes = ant_figure_bytes (&options, paint_figure, self, &error);
  g_autoptr (GdkTexture) texture = bytes ? gdk_texture_new_from_bytes (bytes, &error) : NULL;
  if (texture)
    gdk_clipboard_set_texture (gtk_widget_get_clipboard (widget), texture);
  else
    g_signal_emit_by_name (private (self)->desk, "failed", error->message);
}

static void
popup (AntPlotView *self, double x, double y)
{
  AntPlotViewPrivate *priv = private (self);
  if (!priv->menu)
    {
      g_autoptr (GMenu) model = g_menu_new ();
      g_menu_append (model, _("_Save Figure…"), "plot.save");
      g_menu_append (model, _("_Copy Figure"), "plot.copy");
      priv->menu = gtk_popover_menu_new_from_model (G_MENU_MODEL (model));
      gtk_popover_set_has_arrow (GTK_POPOVER (priv->menu), FALSE);
      gtk_widget_set_halign (priv->menu, GTK_ALIGN_START);
      gtk_widget_set_parent (priv->menu, GTK_WIDGET (self));
    }
  gtk_popover_set_pointing_to (GTK_POPOVER (priv->menu), &(GdkRectangle) { (int) x, (int) y, 1, 1 });
  gtk_popover_popup (GTK_POPOVER (priv->menu));
}

static void
menu_action (GtkWidget *widget, const char *name, GVariant *parameter)
{
  AntBox box = ant_plot_view_box (ANT_PLOT_VIEW (widget));
  popup (ANT_PLOT_VIEW (widget), box.width / 2, box.height / 2);
}

static void
pressed_cb (GtkGestureClick *gesture, int n_press, double x, double y, AntPlotView *self)
{
  gtk_gesture_set_state (GTK_GESTURE (gesture), GTK_EVENT_SEQUENCE_CLAIMED);
  popup (self, x, y);
}

static void
ant_plot_view_size_allocate (GtkWidget *widget, int width, int height, int baseline)
{
  AntPlotViewPrivate *priv = private (ANT_PLOT_VIEW (widget));
  if (priv->menu)
    gtk_popover_present (GTK_POPOVER (priv->menu));
}

static void
ant_plot_view_css_changed (GtkWidget *widget, GtkCssStyleChange *change)
{
  GTK_WIDGET_CLASS (ant_plot_view_parent_class)->css_changed (widget, change);
  private (ANT_PLOT_VIEW (widget))->theme_known = FALSE;
  g_clear_pointer (&private (ANT_PLOT_VIEW (widget))->picture, gsk_render_node_unref);
  gtk_widget_queue_draw (widget);
}

static void
ant_plot_view_measure (GtkWidget *widget, GtkOrientation orientation, int for_size, int *minimum, int *natural,
                       int *minimum_baseline, int *natural_baseline)
{
  *minimum = orientation == GTK_ORIENTATION_HORIZONTAL ? 160 : 48;
  *natural = orientation == GTK_ORIENTATION_HORIZONTAL ? 320 : 160;
}

static void
scale_changed_cb (AntPlotView *self)
{
  ant_plot_view_redraw (self);
}

static void
ant_plot_view_dispose (GObject *object)
{
  AntPlotViewPrivate *priv = private (ANT_PLOT_VIEW (object));
  g_clear_pointer (&priv->menu, gtk_widget_unparent);
  g_clear_pointer (&priv->picture, gsk_render_node_unref);
  g_clear_object (&priv->desk);
  G_OBJECT_CLASS (ant_plot_view_parent_class)->dispose (object);
}

static void
ant_plot_view_finalize (GObject *object)
{
  AntPlotViewPrivate *priv = private (ANT_PLOT_VIEW (object));
  g_free (priv->title);
  g_free (priv->font);
  G_OBJECT_CLASS (ant_plot_view_parent_class)->finalize (object);
}

static void
ant_plot_view_class_init (AntPlotViewClass *klass)
{
  GObjectClass *object_class = G_OBJECT_CLASS (klass);
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  object_class->dispose = ant_plot_view_dispose;
  object_class->finalize = ant_plot_view_finalize;
  widget_class->snapshot = ant_plot_view_snapshot;
  widget_class->measure = ant_plot_view_measure;
  widget_class->size_allocate = ant_plot_view_size_allocate;
  widget_class->css_changed = ant_plot_view_css_changed;
  gtk_widget_class_set_css_name (widget_class, "plot");
  gtk_widget_class_set_accessible_role (widget_class, GTK_ACCESSIBLE_ROLE_IMG);
  gtk_widget_class_install_action (widget_class, "plot.save", NULL, save_action);
  gtk_widget_class_install_action (widget_class, "plot.copy", NULL, copy_action);
  gtk_widget_class_install_action (widget_class, "plot.menu", NULL, menu_action);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_s, GDK_CONTROL_MASK | GDK_SHIFT_MASK, "plot.save", NULL);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_c, GDK_CONTROL_MASK, "plot.copy", NULL);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_Menu, 0, "plot.menu", NULL);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_F10, GDK_SHIFT_MASK, "plot.menu", NULL);
}

static void
ant_plot_view_init (AntPlotView *self)
{
  GtkWidget *widget = GTK_WIDGET (self);
  gtk_widget_set_focusable (widget, TRUE);
  gtk_widget_set_focus_on_click (widget, TRUE);
  gtk_widget_set_overflow (widget, GTK_OVERFLOW_HIDDEN);
  GtkGesture *menu = gtk_gesture_click_new ();
  gtk_gesture_single_set_button (GTK_GESTURE_SINGLE (menu), GDK_BUTTON_SECONDARY);
  g_signal_connect (menu, "pressed", G_CALLBACK (pressed_cb), self);
  gtk_widget_add_controller (widget, GTK_EVENT_CONTROLLER (menu));
  g_signal_connect (self, "notify::scale-factor", G_CALLBACK (scale_changed_cb), NULL);
}
