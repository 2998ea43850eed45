/* columns.c - side by side, or behind each other. */
#include "gui/columns.h"

#define GAP 10
#define WIDE 1000 /* room for all */
#define MIDDLE 700 /* room for two */
#define FIRST_SHARE 1.3 /* the first is wider than each other by this */
#define MOST 3

enum
{
  PROP_0,
  PROP_TITLES,
};

struct _AntColumns
{
  GtkWidget parent_instance;
  GtkWidget *switcher;       /* shown while something waits behind something else; NULL without titles */
  GtkToggleButton *button[MOST];
  guint front, shown, idle;
};

static void ant_columns_buildable_init (GtkBuildableIface *iface);

G_DEFINE_FINAL_TYPE_WITH_CODE (AntColumns, ant_columns, GTK_TYPE_WIDGET,
                               G_IMPLEMENT_INTERFACE (GTK_TYPE_BUILDABLE, ant_columns_buildable_init))

guint
ant_columns_get_shown (AntColumns *self)
{
  return self->shown;
}

/* Of two the first always stays: with it in front, the last stands beside it. */
static guint
beside_first (const AntColumns *self)
{
  return self->front == 0 ? MOST - 1 : self->front;
}

static void
follow_front (AntColumns *self)
{
  guint active = self->shown == 2 ? beside_first (self) : self->front;
  if (self->switcher)
    gtk_toggle_button_set_active (self->button[active], TRUE);
}

void
ant_columns_set_front (AntColumns *self, guint front)
{
  self->front = front;
  follow_front (self);
  gtk_widget_queue_allocate (GTK_WIDGET (self));
}

static void
toggled_cb (GtkToggleButton *button, AntColumns *self)
{
  if (!gtk_toggle_button_get_active (button))
    return;
  for (guint i = 0; i < MOST; i++)
    if (button == self->button[i] && !(self->shown == 2 && i == beside_first (self)))
      self->front = i;
  gtk_widget_queue_allocate (GTK_WIDGET (self));
}

static void
set_titles (AntColumns *self, const char *titles)
{
  g_auto (GStrv) title = g_strsplit (titles ? titles : "", "|", -1);
  if (g_strv_length (title) != MOST)
    return;
  self->switcher = gtk_box_new (GTK_ORIENTATION_HORIZONTAL, 0);
  gtk_widget_set_halign (self->switcher, GTK_ALIGN_CENTER);
  gtk_widget_set_visible (self->switcher, FALSE);
  gtk_widget_add_css_class (self->switcher, "linked");
  gtk_widget_add_css_class (self->switcher, "switcher");
  for (guint i = 0; i < MOST; i++)
    {
      self->button[i] = GTK_TOGGLE_BUTTON (gtk_toggle_button_new_with_label (title[i]));
      gtk_toggle_button_set_group (self->button[i], i > 0 ? self->button[0] : NULL);
      g_signal_connect (self->button[i], "toggled", G_CALLBACK (toggled_cb), self);
      gtk_box_append (GTK_BOX (self->switcher), GTK_WIDGET (self->button[i]));
    }
  gtk_widget_insert_after (self->switcher, GTK_WIDGET (self), NULL);
  follow_front (self);
}

/* The switch for as many as are shown now. */
static void
show_switcher_cb (gpointer data)
{
  AntColumns *self = data;
  self->idle = 0;
  if (!self->switcher)
    return;
  gtk_widget_set_visible (self->switcher, self->shown < MOST);
  gtk_widget_set_visible (GTK_WIDGET (self->button[0]), self->shown == 1);
  follow_front (self);
}

static GtkWidget *
first_column (AntColumns *self)
{
  GtkWidget *child = gtk_widget_get_first_child (GTK_WIDGET (self));
  return child && child == self->switcher ? gtk_widget_get_next_sibling (child) : child;
}

static int
switcher_height (AntColumns *self)
{
  int least = 0;
  if (self->switcher && gtk_widget_get_visible (self->switcher))
    gtk_widget_measure (self->switcher, GTK_ORIENTATION_VERTICAL, -1, &least, NULL, NULL, NULL);
  return least > 0 ? least + GAP / 2 : 0;
}

static void
ant_columns_measure (GtkWidget *widget, GtkOrientation orientation, int for_size, int *minimum, int *natural,
                     int *minimum_baseline, int *natural_baseline)
{
  AntColumns *self = ANT_COLUMNS (widget);
  for (GtkWidget *child = first_column (self); child; child = gtk_widget_get_next_sibling (child))
    {
      int least, usual;
      gtk_widget_measure (child, orientation, -1, &least, &usual, NULL, NULL);
      *minimum = MAX (*minimum, least);
      *natural = orientation == GTK_ORIENTATION_HORIZONTAL ? *natural + usual : MAX (*natural, usual);
    }
  if (orientation == GTK_ORIENTATION_VERTICAL)
    {
      *minimum += switcher_height (self);
      *natural += switcher_height (self);
    }
}

static void
ant_columns_size_allocate (GtkWidget *widget, int width, int height, int baseline)
{
  AntColumns *self = ANT_COLUMNS (widget);
  guint shown = width >= WIDE ? MOST : width >= MIDDLE ? 2 : 1, index = 0;
  int top = switcher_height (self), room = width - GAP * ((int) shown - 1), x = 0;
  int first = shown == 1 ? room : (int) (room * FIRST_SHARE / (FIRST_SHARE + shown - 1));
  int other = shown == 1 ? room : (room - first) / ((int) shown - 1);
  if (top > 0)
    gtk_widget_size_allocate (self->switcher, &(GtkAllocation) { 0, 0, width, top - GAP / 2 }, -1);
  for (GtkWidget *child = first_column (self); child; child = gtk_widget_get_next_sibling (child), index++)
    {
      gboolean fits = shown == MOST || (shown == 2 && (index == 0 || index == beside_first (self)))
                      || (shown == 1 && index == self->front);
      gtk_widget_set_child_visible (child, fits);
      if (!fits)
        continue;
      int own = index == 0 ? first : other;
      gtk_widget_size_allocate (child, &(GtkAllocation) { x, top, own, height - top }, -1);
      x += own + GAP;
    }
  if (shown == self->shown)
    return;
  self->shown = shown;
  if (self->idle == 0)
    self->idle = g_idle_add_once (show_switcher_cb, self);
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
ant_columns_set_property (GObject *object, guint id, const GValue *value, GParamSpec *spec)
{
  if (id == PROP_TITLES)
    set_titles (ANT_COLUMNS (object), g_value_get_string (value));
  else
    G_OBJECT_WARN_INVALID_PROPERTY_ID (object, id, spec);
}

static void
ant_columns_dispose (GObject *object)
{
  AntColumns *self = ANT_COLUMNS (object);
  g_clear_handle_id (&self->idle, g_source_remove);
  self->switcher = NULL;
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
  G_OBJECT_CLASS (klass)->set_property = ant_columns_set_property;
  widget_class->measure = ant_columns_measure;
  widget_class->size_allocate = ant_columns_size_allocate;
  g_object_class_install_property (G_OBJECT_CLASS (klass), PROP_TITLES,
                                   g_param_spec_string ("titles", NULL, NULL, NULL,
                                                        G_PARAM_WRITABLE | G_PARAM_STATIC_STRINGS));
}

static void
ant_columns_init (AntColumns *self)
{
  self->shown = MOST;
}
