/* repeats-page.c - the page Repeats. */
#include "gui/repeats-page.h"

#include <glib/gi18n.h>

#include "data/repeat-words.h"
#include "gui/columns.h"
#include "gui/fact-list.h"
#include "gui/fold-events.h"
#include "gui/fold-view.h"
#include "gui/period-view.h"

struct _AntRepeatsPage
{
  GtkWidget parent_instance;

  /* From the template */
  GtkStack *stack;
  AntPeriodView *periods;
  AntFoldView *fold;
  AntFoldEvents *events;
  GtkDropDown *list;
  GtkEntry *period;
  AntFactList *facts;
  GtkLabel *said;

  /* Owned */
  AntDesk *desk;
  gboolean telling; /* widgets are being set from the desk */
};

G_DEFINE_FINAL_TYPE (AntRepeatsPage, ant_repeats_page, GTK_TYPE_WIDGET)

static void
list_chosen_cb (AntRepeatsPage *self)
{
  if (self->desk && !self->telling)
    ant_desk_select_repeat (self->desk, gtk_drop_down_get_selected (self->list));
}

static void
period_typed_cb (AntRepeatsPage *self)
{
  double period_d;
  if (ant_repeat_period_parse (gtk_editable_get_text (GTK_EDITABLE (self->period)), &period_d))
    ant_desk_fold_on (self->desk, period_d);
  else
    gtk_widget_error_bell (GTK_WIDGET (self->period));
}

static void
shorter_cb (AntRepeatsPage *self)
{
  ant_desk_nudge_fold (self->desk, -1);
}

static void
longer_cb (AntRepeatsPage *self)
{
  ant_desk_nudge_fold (self->desk, 1);
}

static void
show_list (AntRepeatsPage *self, const AntRepeatResults *repeats)
{
  g_autoptr (GtkStringList) names = gtk_string_list_new (NULL);
  for (gsize i = 0; i < repeats->n; i++)
    {
      g_autofree char *title = ant_repeat_title (repeats, i);
      gtk_string_list_append (names, title);
    }
  gtk_drop_down_set_model (self->list, G_LIST_MODEL (names));
  gtk_widget_set_visible (GTK_WIDGET (self->list), repeats->n > 0);
  g_autofree char *said = ant_repeat_summary (repeats);
  gtk_label_set_text (self->said, said);
}

static void
show_fold (AntRepeatsPage *self, const AntRepeatResults *repeats)
{
  const AntFold *fold = ant_desk_get_fold (self->desk);
  gsize selected = ant_desk_get_repeat (self->desk);
  g_autofree char *text = fold ? ant_repeat_period_text (fold->period_d) : g_strdup ("");
  g_autoptr (GPtrArray) facts = ant_repeat_facts (repeats, selected);
  gtk_editable_set_text (GTK_EDITABLE (self->period), text);
  gtk_drop_down_set_selected (self->list, selected < repeats->n ? (guint) selected : GTK_INVALID_LIST_POSITION);
  ant_fact_list_set_facts (self->facts, facts);
}

static void
desk_changed_cb (AntDesk *desk, guint what, AntRepeatsPage *self)
{
  const AntScanResults *results = ant_desk_get_results (desk);
  gboolean searched = results && results->repeats.searched;
  if (!(what & (ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_FOLD)))
    return;
  self->telling = TRUE;
  gtk_stack_set_visible_child_name (self->stack, searched ? "repeats" : "empty");
  if (searched && (what & (ANT_DESK_RECORD | ANT_DESK_RESULTS)))
    show_list (self, &results->repeats);
  if (searched)
    show_fold (self, &results->repeats);
  self->telling = FALSE;
}

void
ant_repeats_page_set_desk (AntRepeatsPage *self, AntDesk *desk)
{
  g_set_object (&self->desk, desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->periods), desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->fold), desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->events), desk);
  g_signal_connect_object (desk, "changed", G_CALLBACK (desk_changed_cb), self, 0);
  desk_changed_cb (desk, ANT_DESK_EVERYTHING, self);
}

static void
ant_repeats_page_dispose (GObject *object)
{
  g_clear_object (&ANT_REPEATS_PAGE (object)->desk);
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_REPEATS_PAGE);
  G_OBJECT_CLASS (ant_repeats_page_parent_class)->dispose (object);
}

static void
ant_repeats_page_class_init (AntRepeatsPageClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_repeats_page_dispose;
  g_type_ensure (ANT_TYPE_COLUMNS);
  g_type_ensure (ANT_TYPE_FOLD_EVENTS);
  g_type_ensure (ANT_TYPE_FACT_LIST);
  g_type_ensure (ANT_TYPE_FOLD_VIEW);
  g_type_ensure (ANT_TYPE_PERIOD_VIEW);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/repeats-page.ui");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_bind_template_child (widget_class, AntRepeatsPage, stack);
  gtk_widget_class_bind_template_child (widget_class, AntRepeatsPage, periods);
  gtk_widget_class_bind_template_child (widget_class, AntRepeatsPage, fold);
  gtk_widget_class_bind_template_child (widget_class, AntRepeatsPage, events);
  gtk_widget_class_bind_template_child (widget_class, AntRepeatsPage, list);
  gtk_widget_class_bind_template_child (widget_class, AntRepeatsPage, period);
  gtk_widget_class_bind_template_child (widget_class, AntRepeatsPage, facts);
  gtk_widget_class_bind_template_child (widget_class, AntRepeatsPage, said);
  gtk_widget_class_bind_template_callback (widget_class, list_chosen_cb);
  gtk_widget_class_bind_template_callback (widget_class, period_typed_cb);
  gtk_widget_class_bind_template_callback (widget_class, shorter_cb);
  gtk_widget_class_bind_template_callback (widget_class, longer_cb);
}

static void
ant_repeats_page_init (AntRepeatsPage *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
}
