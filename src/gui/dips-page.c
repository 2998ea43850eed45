/* dips-page.c - the page Dips. */
#include "gui/dips-page.h"

#include "gui/columns.h"
#include "gui/dip-inspector.h"
#include "gui/dip-table.h"
#include "gui/floor-view.h"

enum
{
  LIST,
  CHART,
  DIP,
};

struct _AntDipsPage
{
  GtkWidget parent_instance;

  /* From the template */
  GtkStack *stack;
  AntColumns *columns;
  AntDipTable *table;
  AntFloorView *floor;
  AntDipInspector *inspector;

  /* Owned */
  AntDesk *desk;
};

G_DEFINE_FINAL_TYPE (AntDipsPage, ant_dips_page, GTK_TYPE_WIDGET)

static void
desk_changed_cb (AntDesk *desk, guint what, AntDipsPage *self)
{
  gboolean something = ant_desk_get_results (desk) || g_list_model_get_n_items (ant_desk_get_items (desk)) > 0;
  gtk_stack_set_visible_child_name (self->stack, something ? "dips" : "empty");
}

void
ant_dips_page_set_desk (AntDipsPage *self, AntDesk *desk)
{
  g_set_object (&self->desk, desk);
  ant_dip_table_set_desk (self->table, desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->floor), desk);
  ant_dip_inspector_set_desk (self->inspector, desk);
  g_signal_connect_object (desk, "changed", G_CALLBACK (desk_changed_cb), self, 0);
  desk_changed_cb (desk, ANT_DESK_EVERYTHING, self);
}

void
ant_dips_page_focus_note (AntDipsPage *self)
{
  ant_columns_set_front (self->columns, DIP);
  ant_dip_inspector_focus_note (self->inspector);
}

void
ant_dips_page_focus_filter (AntDipsPage *self)
{
  if (ant_columns_get_shown (self->columns) == 1)
    ant_columns_set_front (self->columns, LIST);
  ant_dip_table_focus_filter (self->table);
}

static void
ant_dips_page_dispose (GObject *object)
{
  g_clear_object (&ANT_DIPS_PAGE (object)->desk);
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_DIPS_PAGE);
  G_OBJECT_CLASS (ant_dips_page_parent_class)->dispose (object);
}

static void
ant_dips_page_class_init (AntDipsPageClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_dips_page_dispose;
  g_type_ensure (ANT_TYPE_COLUMNS);
  g_type_ensure (ANT_TYPE_DIP_INSPECTOR);
  g_type_ensure (ANT_TYPE_DIP_TABLE);
  g_type_ensure (ANT_TYPE_FLOOR_VIEW);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/dips-page.ui");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_bind_template_child (widget_class, AntDipsPage, stack);
  gtk_widget_class_bind_template_child (widget_class, AntDipsPage, columns);
  gtk_widget_class_bind_template_child (widget_class, AntDipsPage, table);
  gtk_widget_class_bind_template_child (widget_class, AntDipsPage, floor);
  gtk_widget_class_bind_template_child (widget_class, AntDipsPage, inspector);
}

static void
ant_dips_page_init (AntDipsPage *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
  ant_columns_set_front (self->columns, DIP);
}
