/* time-stack.c - the time stack. */
#include "gui/time-stack.h"

#include "gui/ribbon-view.h"
#include "gui/strip-view.h"

#define LEAST_STRIP 78 /* height */
#define AXIS 22        /* what the lowest strip needs more, for its labels of time */

struct _AntTimeStack
{
  GtkWidget parent_instance;

  /* From the template */
  AntRibbonView *ribbon;
  GtkLabel *readout;

  AntStripView *strip[ANT_N_STRIPS]; /* children, in their order */

  /* Owned */
  AntDesk *desk;
};

G_DEFINE_FINAL_TYPE (AntTimeStack, ant_time_stack, GTK_TYPE_WIDGET)

static void
desk_changed_cb (AntDesk *desk, guint what, AntTimeStack *self)
{
  if (what & (ANT_DESK_SNR | ANT_DESK_WITNESS | ANT_DESK_COLUMNS | ANT_DESK_RECORD))
    gtk_widget_queue_allocate (GTK_WIDGET (self));
  if (!(what & (ANT_DESK_POINTER | ANT_DESK_RECORD)))
    return;
  g_autofree char *text = ant_desk_readout (desk);
  gtk_label_set_text (self->readout, text);
}

void
ant_time_stack_set_desk (AntTimeStack *self, AntDesk *desk)
{
  g_set_object (&self->desk, desk);
  for (guint k = 0; k < ANT_N_STRIPS; k++)
    ant_plot_view_set_desk (ANT_PLOT_VIEW (self->strip[k]), desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->ribbon), desk);
  g_signal_connect_object (desk, "changed", G_CALLBACK (desk_changed_cb), self, 0);
  desk_changed_cb (desk, ANT_DESK_EVERYTHING, self);
}

/* With little height one strip is worth more than two that nobody can read: the upper ones give way to the lower, which
 * were asked for. Returns how many are shown. */
static guint
choose_strips (AntTimeStack *self, int height, AntStripView **shown)
{
  guint n = 0, room = (guint) CLAMP ((height - AXIS) / LEAST_STRIP, 1, ANT_N_STRIPS);
  for (guint k = ANT_N_STRIPS; k-- > 0;)
    {
      gboolean visible = n < room && self->desk && ant_strip_wanted (self->desk, (AntStripKind) k);
      gtk_widget_set_child_visible (GTK_WIDGET (self->strip[k]), visible);
      if (visible)
        shown[n++] = self->strip[k];
    }
  return n;
}

/* From the lowest up, all of one height but for the labels of time. */
static void
allocate_strips (AntTimeStack *self, int width, int height)
{
  AntStripView *shown[ANT_N_STRIPS];
  int n = (int) choose_strips (self, height, shown), foot = height;
  for (int i = 0; i < n; i++)
    {
      int each = i + 1 < n ? (height - AXIS) / n + (i == 0 ? AXIS : 0) : foot;
      foot -= each;
      ant_strip_view_set_axis (shown[i], i == 0);
      gtk_widget_size_allocate (GTK_WIDGET (shown[i]), &(GtkAllocation) { 0, foot, width, each }, -1);
    }
}

static void
ant_time_stack_size_allocate (GtkWidget *widget, int width, int height, int baseline)
{
  AntTimeStack *self = ANT_TIME_STACK (widget);
  int x = 0, y = 0, ribbon, unused;
  gtk_widget_measure (GTK_WIDGET (self->ribbon), GTK_ORIENTATION_VERTICAL, -1, &ribbon, &unused, NULL, NULL);
  allocate_strips (self, width, height - ribbon);
  gtk_widget_size_allocate (GTK_WIDGET (self->ribbon), &(GtkAllocation) { 0, height - ribbon, width, ribbon }, -1);
  gtk_widget_measure (GTK_WIDGET (self->readout), GTK_ORIENTATION_HORIZONTAL, -1, &unused, &x, NULL, NULL);
  gtk_widget_measure (GTK_WIDGET (self->readout), GTK_ORIENTATION_VERTICAL, x, &unused, &y, NULL, NULL);
  x = MIN (x, width);
  gtk_widget_size_allocate (GTK_WIDGET (self->readout), &(GtkAllocation) { width - x, 0, x, y }, -1);
}

static void
ant_time_stack_measure (GtkWidget *widget, GtkOrientation orientation, int for_size, int *minimum, int *natural,
                        int *minimum_baseline, int *natural_baseline)
{
  *minimum = orientation == GTK_ORIENTATION_HORIZONTAL ? 300 : 116;
  *natural = orientation == GTK_ORIENTATION_HORIZONTAL ? 800 : 340;
}

static void
ant_time_stack_dispose (GObject *object)
{
  AntTimeStack *self = ANT_TIME_STACK (object);
  g_clear_object (&self->desk);
  for (guint k = 0; k < ANT_N_STRIPS; k++)
    if (self->strip[k])
      gtk_widget_unparent (GTK_WIDGET (g_steal_pointer (&self->strip[k])));
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_TIME_STACK);
  G_OBJECT_CLASS (ant_time_stack_parent_class)->dispose (object);
}

static void
ant_time_stack_class_init (AntTimeStackClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_time_stack_dispose;
  g_type_ensure (ANT_TYPE_RIBBON_VIEW);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/time-stack.ui");
  widget_class->size_allocate = ant_time_stack_size_allocate;
  widget_class->measure = ant_time_stack_measure;
  gtk_widget_class_set_css_name (widget_class, "timestack");
  gtk_widget_class_bind_template_child (widget_class, AntTimeStack, ribbon);
  gtk_widget_class_bind_template_child (widget_class, AntTimeStack, readout);
}

static void
ant_time_stack_init (AntTimeStack *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
  for (guint k = ANT_N_STRIPS; k-- > 0;)
    {
      self->strip[k] = g_object_new (ANT_TYPE_STRIP_VIEW, NULL);
      ant_strip_view_set_kind (self->strip[k], (AntStripKind) k);
      gtk_widget_insert_after (GTK_WIDGET (self->strip[k]), GTK_WIDGET (self), NULL);
    }
}
