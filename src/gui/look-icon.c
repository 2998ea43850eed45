/* look-icon.c - the shape of a dip beside its number. */
#include "gui/look-icon.h"

#include "gui/paper.h"
#include "plot/pen.h"

#define SIZE 14

struct _AntLookIcon
{
  GtkWidget parent_instance;
  AntDipLook look;
};

G_DEFINE_FINAL_TYPE (AntLookIcon, ant_look_icon, GTK_TYPE_WIDGET)

void
ant_look_icon_set_look (AntLookIcon *self, AntDipLook look)
{
  self->look = look;
  gtk_widget_queue_draw (GTK_WIDGET (self));
}

static void
ant_look_icon_snapshot (GtkWidget *widget, GtkSnapshot *snapshot)
{
  float width = (float) gtk_widget_get_width (widget), height = (float) gtk_widget_get_height (widget);
  AntTheme theme;
  AntPen pen;
  ant_theme_init (&theme, ant_paper_kind (widget));
  cairo_t *cr = gtk_snapshot_append_cairo (snapshot, &GRAPHENE_RECT_INIT (0, 0, width, height));
  ant_pen_begin (&pen, cr, &theme, gtk_widget_get_scale_factor (widget));
  ant_pen_dip (&pen, ANT_LOOK_ICON (widget)->look, (double) width / 2, (double) height / 2, 4.5, FALSE);
  ant_pen_end (&pen);
  cairo_destroy (cr);
}

static void
ant_look_icon_measure (GtkWidget *widget, GtkOrientation orientation, int for_size, int *minimum, int *natural,
                       int *minimum_baseline, int *natural_baseline)
{
  *minimum = *natural = SIZE;
}

static void
ant_look_icon_class_init (AntLookIconClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  widget_class->snapshot = ant_look_icon_snapshot;
  widget_class->measure = ant_look_icon_measure;
  gtk_widget_class_set_accessible_role (widget_class, GTK_ACCESSIBLE_ROLE_PRESENTATION);
}

static void
ant_look_icon_init (AntLookIcon *self)
{
}
