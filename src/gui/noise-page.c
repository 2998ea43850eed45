/* noise-page.c - the page Noise: spectrum, floor or counts, and the fitted model. A record that was cut into pieces has a
 * model for each; one is shown at a time. */
#include "gui/noise-page.h"

#include <glib/gi18n.h>

#include "gui/columns.h"
#include "gui/fact-list.h"
#include "gui/floor-view.h"
#include "gui/spectrum-view.h"
#include "gui/tail-view.h"
#include "data/noise-words.h"

struct _AntNoisePage
{
  GtkWidget parent_instance;

  /* From the template */
  GtkStack *stack;
  AntColumns *columns;
  AntSpectrumView *spectrum;
  AntFloorView *floor;
  AntTailView *tail;
  AntFactList *parts, *health;
  GtkDropDown *chunk;

  /* Owned */
  AntDesk *desk;
};

G_DEFINE_FINAL_TYPE (AntNoisePage, ant_noise_page, GTK_TYPE_WIDGET)

static void
show_chunk (AntNoisePage *self)
{
  const AntScanResults *results = ant_desk_get_results (self->desk);
  guint chunk = gtk_drop_down_get_selected (self->chunk);
  if (!results || chunk >= results->n_chunks)
    return;
  g_autoptr (GPtrArray) parts = ant_noise_part_facts (&results->chunk[chunk].model);
  g_autoptr (GPtrArray) health = ant_noise_health_facts (results, chunk);
  ant_fact_list_set_facts (self->parts, parts);
  ant_fact_list_set_facts (self->health, health);
  ant_spectrum_view_set_chunk (self->spectrum, chunk);
  ant_floor_view_set_chunk (self->floor, (int) chunk);
}

static void
chunk_chosen_cb (AntNoisePage *self)
{
  if (self->desk)
    show_chunk (self);
}

static void
list_chunks (AntNoisePage *self, const AntScanResults *results)
{
  g_autoptr (GtkStringList) names = gtk_string_list_new (NULL);
  for (gsize i = 0; i < results->n_chunks; i++)
    {
      g_autofree char *name = ant_noise_chunk_title (results, i);
      gtk_string_list_append (names, name);
    }
  gtk_drop_down_set_model (self->chunk, G_LIST_MODEL (names));
  gtk_widget_set_visible (GTK_WIDGET (self->chunk), results->n_chunks > 1);
}

static void
desk_changed_cb (AntDesk *desk, guint what, AntNoisePage *self)
{
  const AntScanResults *results = ant_desk_get_results (desk);
  if (!(what & (ANT_DESK_RECORD | ANT_DESK_RESULTS)))
    return;
  gtk_stack_set_visible_child_name (self->stack, results ? "noise" : "empty");
  if (results)
    {
      list_chunks (self, results);
      show_chunk (self);
    }
}

void
ant_noise_page_set_desk (AntNoisePage *self, AntDesk *desk)
{
  g_set_object (&self->desk, desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->spectrum), desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->floor), desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->tail), desk);
  g_signal_connect_object (desk, "changed", G_CALLBACK (desk_changed_cb), self, 0);
  desk_changed_cb (desk, ANT_DESK_EVERYTHING, self);
}

static void
ant_noise_page_dispose (GObject *object)
{
  g_clear_object (&ANT_NOISE_PAGE (object)->desk);
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_NOISE_PAGE);
  G_OBJECT_CLASS (ant_noise_page_parent_class)->dispose (object);
}

static void
ant_noise_page_class_init (AntNoisePageClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_noise_page_dispose;
  g_type_ensure (ANT_TYPE_COLUMNS);
  g_type_ensure (ANT_TYPE_FACT_LIST);
  g_type_ensure (ANT_TYPE_FLOOR_VIEW);
  g_type_ensure (ANT_TYPE_SPECTRUM_VIEW);
  g_type_ensure (ANT_TYPE_TAIL_VIEW);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/noise-page.ui");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_bind_template_child (widget_class, AntNoisePage, stack);
  gtk_widget_class_bind_template_child (widget_class, AntNoisePage, columns);
  gtk_widget_class_bind_template_child (widget_class, AntNoisePage, spectrum);
  gtk_widget_class_bind_template_child (widget_class, AntNoisePage, floor);
  gtk_widget_class_bind_template_child (widget_class, AntNoisePage, tail);
  gtk_widget_class_bind_template_child (widget_class, AntNoisePage, parts);
  gtk_widget_class_bind_template_child (widget_class, AntNoisePage, health);
  gtk_widget_class_bind_template_child (widget_class, AntNoisePage, chunk);
  gtk_widget_class_bind_template_callback (widget_class, chunk_chosen_cb);
}

static void
ant_noise_page_init (AntNoisePage *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
  ant_floor_view_set_bare (self->floor, TRUE);
}
