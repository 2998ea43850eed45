/* time-stack.c - the time stack. */
#include "gui/time-stack.h"

#include "gui/ribbon-view.h"
#include "gui/strip-view.h"

struct _AntTimeStack
{
  GtkWidget parent_instance;

  /* From the template */
  GtkWidget *box;
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
  gtk_widget_set_visible (GTK_WIDGET (self->readout), *text != '\0');
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
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_set_css_name (widget_class, "timestack");
  gtk_widget_class_bind_template_child (widget_class, AntTimeStack, box);
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
