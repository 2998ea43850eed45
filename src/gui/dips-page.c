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
  GtkWidget *switcher;
  GtkToggleButton *list_button, *chart_button, *dip_button;
  AntDipTable *table;
  AntFloorView *floor;
  AntDipInspector *inspector;

  /* Owned */
  AntDesk *desk;
};

G_DEFINE_FINAL_TYPE (AntDipsPage, ant_dips_page, GTK_TYPE_WIDGET)

static void
show_front (AntDipsPage *self, guint front)
{
  GtkToggleButton *const buttons[] = { self->list_button, self->chart_button, self->dip_button };
  gtk_toggle_button_set_active (buttons[front], TRUE);
  ant_columns_set_front (self->columns, front);
}

static void
toggled_cb (AntDipsPage *self, GtkToggleButton *button)
{
  if (!gtk_toggle_button_get_active (button))
    return;
  guint front = button == self->list_button ? LIST : button == self->chart_button ? CHART : DIP;
  ant_columns_set_front (self->columns, front);
}

/* The switch is there when something waits behind something else. */
static void
columns_changed_cb (AntDipsPage *self)
{
  guint shown = ant_columns_get_shown (self->columns);
  gtk_widget_set_visible (self->switcher, shown < 3);
  gtk_widget_set_visible (GTK_WIDGET (self->list_button), shown == 1);
  if (shown == 2 && ant_columns_get_front (self->columns) == LIST)
    show_front (self, DIP);
}

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
  show_front (self, DIP);
  ant_dip_inspector_focus_note (self->inspector);
}

void
ant_dips_page_focus_filter (AntDipsPage *self)
{
  if (ant_columns_get_shown (self->columns) == 1)
    show_front (self, LIST);
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
  gtk_widget_class_bind_template_child (widget_class, AntDipsPage, switcher);
  gtk_widget_class_bind_template_child (widget_class, AntDipsPage, list_button);
  gtk_widget_class_bind_template_child (widget_class, AntDipsPage, chart_button);
  gtk_widget_class_bind_template_child (widget_class, AntDipsPage, dip_button);
  gtk_widget_class_bind_template_child (widget_class, AntDipsPage, table);
  gtk_widget_class_bind_template_child (widget_class, AntDipsPage, floor);
  gtk_widget_class_bind_template_child (widget_class, AntDipsPage, inspector);
  gtk_widget_class_bind_template_callback (widget_class, toggled_cb);
  gtk_widget_class_bind_template_callback (widget_class, columns_changed_cb);
}

static void
ant_dips_page_init (AntDipsPage *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
}
