/* columns.c - side by side, or behind each other. */
#include "gui/columns.h"

#define GAP 10
#define WIDE 1000 /* room for all */
#define MIDDLE 700 /* room for two */
#define FIRST_SHARE 1.2 /* the first is wider than each other by this */

struct _AntColumns
{
  GtkWidget parent_instance;
  guint front, shown, idle;
};

static void ant_columns_buildable_init (GtkBuildableIface *iface);

G_DEFINE_FINAL_TYPE_WITH_CODE (AntColumns, ant_columns, GTK_TYPE_WIDGET,
                               G_IMPLEMENT_INTERFACE (GTK_TYPE_BUILDABLE, ant_columns_buildable_init))

static guint changed_signal;

guint
ant_columns_get_shown (AntColumns *self)
{
  return self->shown;
}

guint
ant_columns_get_front (AntColumns *self)
{
  return self->front;
}

void
ant_columns_set_front (AntColumns *self, guint front)
{
  self->front = front;
  gtk_widget_queue_allocate (GTK_WIDGET (self));
}

static void
tell_cb (gpointer data)
{
  AntColumns *self = data;
  self->idle = 0;
  g_signal_emit (self, changed_signal, 0);
}

static void
ant_columns_measure (GtkWidget *widget, GtkOrientation orientation, int for_size, int *minimum, int *natural,
                     int *minimum_baseline, int *natural_baseline)
{
  for (GtkWidget *child = gtk_widget_get_first_child (widget); child; child = gtk_widget_get_next_sibling (child))
    {
      int least, usual;
      gtk_widget_measure (child, orientation, -1, &least, &usual, NULL, NULL);
      *minimum = MAX (*minimum, least);
      *natural = orientation == GTK_ORIENTATION_HORIZONTAL ? *natural + usual : MAX (*natural, usual);
    }
}

static void
ant_columns_size_allocate (GtkWidget *widget, int width, int height, int baseline)
{
  AntColumns *self = ANT_COLUMNS (widget);
  guint shown = width >= WIDE ? 3 : width >= MIDDLE ? 2 : 1;
  guint second = self->front == 0 ? 1 : self->front;
  int room = width - GAP * ((int) shown - 1), x = 0;
  int first = shown == 1 ? room : (int) (room * FIRST_SHARE / (FIRST_SHARE + shown - 1));
  int other = shown == 1 ? room : (room - first) / ((int) shown - 1);
  guint index = 0;
  for (GtkWidget *child = gtk_widget_get_first_child (widget); child;
       child = gtk_widget_get_next_sibling (child), index++)
    {
      gboolean fits =
          shown == 3 || (shown == 2 && (index == 0 || index == second)) || (shown == 1 && index == self->front);
      gtk_widget_set_child_visible (child, fits);
      if (!fits)
        continue;
      int own = index == 0 ? first : other;
      gtk_widget_size_allocate (child, &(GtkAllocation) { x, 0, own, height }, -1);
      x += own + GAP;
    }
  if (shown == self->shown)
    return;
  self->shown = shown;
  if (self->idle == 0)
    self->idle = g_idle_add_once (tell_cb, self);
}

static void
ant_columns_add_child (GtkBuildable *buildable, GtkBuilder *builder, GObject *child, const char *type)
{
  gtk_widget_set_parent (GTK_WIDGET (child), GTK_WIDGET (buildable));
}

static void
ant_columns_buildable_init (GtkBuildableIface *iface)
{
  iface->add_child = ant_columns_add_child;
}

static void
ant_columns_dispose (GObject *object)
{
  g_clear_handle_id (&ANT_COLUMNS (object)->idle, g_source_remove);
  GtkWidget *child;
  while ((child = gtk_widget_get_first_child (GTK_WIDGET (object))))
    gtk_widget_unparent (child);
  G_OBJECT_CLASS (ant_columns_parent_class)->dispose (object);
}

static void
ant_columns_class_init (AntColumnsClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_columns_dispose;
  widget_class->measure = ant_columns_measure;
  widget_class->size_allocate = ant_columns_size_allocate;
  changed_signal = g_signal_new ("changed", ANT_TYPE_COLUMNS, G_SIGNAL_RUN_LAST, 0, NULL, NULL, NULL, G_TYPE_NONE, 0);
}

static void
ant_columns_init (AntColumns *self)
{
  self->front = 2;
  self->shown = 3;
}
