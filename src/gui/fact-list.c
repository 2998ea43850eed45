/* fact-list.c - a table of facts. */
#include "gui/fact-list.h"

#include "data/dip-words.h"

struct _AntFactList
{
  GtkWidget parent_instance;
  GtkGrid *grid;
};

G_DEFINE_FINAL_TYPE (AntFactList, ant_fact_list, GTK_TYPE_WIDGET)

static GtkWidget *
text_new (const char *text, gboolean value)
{
  GtkWidget *label = gtk_label_new (text);
  gtk_label_set_xalign (GTK_LABEL (label), 0);
  gtk_widget_set_valign (label, GTK_ALIGN_START);
  gtk_label_set_wrap (GTK_LABEL (label), TRUE);
  gtk_label_set_wrap_mode (GTK_LABEL (label), PANGO_WRAP_WORD_CHAR);
  if (value)
    {
      gtk_widget_set_hexpand (label, TRUE);
      gtk_widget_add_css_class (label, "numeric");
    }
  else
    {
      gtk_widget_add_css_class (label, "dim-label");
      gtk_label_set_wrap (GTK_LABEL (label), FALSE);
    }
  return label;
}

void
ant_fact_list_set_facts (AntFactList *self, const GPtrArray *facts)
{
  GtkWidget *child;
  while ((child = gtk_widget_get_first_child (GTK_WIDGET (self->grid))))
    gtk_grid_remove (self->grid, child);
  for (guint i = 0; facts && i < facts->len; i++)
    {
      const AntFact *fact = g_ptr_array_index (facts, i);
      gtk_grid_attach (self->grid, text_new (fact->label, FALSE), 0, (int) i, 1, 1);
      gtk_grid_attach (self->grid, text_new (fact->value, TRUE), 1, (int) i, 1, 1);
    }
}

static void
ant_fact_list_dispose (GObject *object)
{
  AntFactList *self = ANT_FACT_LIST (object);
  if (self->grid)
    gtk_widget_unparent (GTK_WIDGET (self->grid));
  self->grid = NULL;
  G_OBJECT_CLASS (ant_fact_list_parent_class)->dispose (object);
}

static void
ant_fact_list_class_init (AntFactListClass *klass)
{
  G_OBJECT_CLASS (klass)->dispose = ant_fact_list_dispose;
  gtk_widget_class_set_layout_manager_type (GTK_WIDGET_CLASS (klass), GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_set_css_name (GTK_WIDGET_CLASS (klass), "facts");
}

static void
ant_fact_list_init (AntFactList *self)
{
  self->grid = GTK_GRID (gtk_grid_new ());
  gtk_grid_set_column_spacing (self->grid, 12);
  gtk_grid_set_row_spacing (self->grid, 3);
  gtk_widget_set_parent (GTK_WIDGET (self->grid), GTK_WIDGET (self));
}
