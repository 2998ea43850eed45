/* time-stack.c - the time stack. */
#include "gui/time-stack.h"

#include "gui/ribbon-view.h"
#include "gui/strip-view.h"

#define TWO_STRIPS 210 /* height */
#define AXIS 22        /* what the lower strip needs more, for its labels of time */

struct _AntTimeStack
{
  GtkWidget parent_instance;

  /* From the template */
  AntStripView *irradiance, *residual;
  AntRibbonView *ribbon;
  GtkLabel *readout;

  /* Owned */
  AntDesk *desk;
};

G_DEFINE_FINAL_TYPE (AntTimeStack, ant_time_stack, GTK_TYPE_WIDGET)

static void
desk_changed_cb (AntDesk *desk, guint what, AntTimeStack *self)
{
  if (!(what & (ANT_DESK_POINTER | ANT_DESK_RECORD)))
    return;
  g_autofree char *text = ant_desk_readout (desk);
  gtk_label_set_text (self->readout, text);
}

void
ant_time_stack_set_desk (AntTimeStack *self, AntDesk *desk)
{
  g_set_object (&self->desk, desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->irradiance), desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->residual), desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->ribbon), desk);
  g_signal_connect_object (desk, "changed", G_CALLBACK (desk_changed_cb), self, 0);
  desk_changed_cb (desk, ANT_DESK_EVERYTHING, self);
}

/* With little height one strip is worth more than two that nobody can read: the residual, which carries the time axis.
 */
static void
ant_time_stack_size_allocate (GtkWidget *widget, int width, int height, int baseline)
{
  AntTimeStack *self = ANT_TIME_STACK (widget);
  int x = 0, y = 0, ribbon, unused;
  gtk_widget_measure (GTK_WIDGET (self->ribbon), GTK_ORIENTATION_VERTICAL, -1, &ribbon, &unused, NULL, NULL);
  int strips = height - ribbon, upper = height >= TWO_STRIPS ? (strips - AXIS) / 2 : 0;
  gtk_widget_set_child_visible (GTK_WIDGET (self->irradiance), upper > 0);
  if (upper > 0)
    gtk_widget_size_allocate (GTK_WIDGET (self->irradiance), &(GtkAllocation) { x, y, width, upper }, -1);
  gtk_widget_size_allocate (GTK_WIDGET (self->residual), &(GtkAllocation) { x, upper, width, strips - upper }, -1);
  gtk_widget_size_allocate (GTK_WIDGET (self->ribbon), &(GtkAllocation) { x, strips, width, ribbon }, -1);
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
  g_clear_object (&ANT_TIME_STACK (object)->desk);
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_TIME_STACK);
  G_OBJECT_CLASS (ant_time_stack_parent_class)->dispose (object);
}

static void
ant_time_stack_class_init (AntTimeStackClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_time_stack_dispose;
  g_type_ensure (ANT_TYPE_STRIP_VIEW);
  g_type_ensure (ANT_TYPE_RIBBON_VIEW);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/time-stack.ui");
  widget_class->size_allocate = ant_time_stack_size_allocate;
  widget_class->measure = ant_time_stack_measure;
  gtk_widget_class_set_css_name (widget_class, "timestack");
  gtk_widget_class_bind_template_child (widget_class, AntTimeStack, irradiance);
  gtk_widget_class_bind_template_child (widget_class, AntTimeStack, residual);
  gtk_widget_class_bind_template_child (widget_class, AntTimeStack, ribbon);
  gtk_widget_class_bind_template_child (widget_class, AntTimeStack, readout);
}

static void
ant_time_stack_init (AntTimeStack *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
  ant_strip_view_set_kind (self->residual, ANT_STRIP_RESIDUAL);
}
