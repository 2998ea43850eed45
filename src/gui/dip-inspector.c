/* dip-inspector.c - the inspector of the page Dips. */
#include "gui/dip-inspector.h"

#include <glib/gi18n.h>

#include "data/verdict-words.h"
#include "gui/closeup-view.h"
#include "gui/fact-list.h"

#define CLOSEUP_PART 0.7
#define LEAST_CLOSEUP 84
#define MOST_CLOSEUP 340

struct _AntDipInspector
{
  GtkWidget parent_instance;

  /* From the template */
  GtkStack *stack;
  GtkScrolledWindow *scroller;
  GtkLabel *title, *span;
  AntCloseupView *closeup;
  AntFactList *facts, *evidence;
  GtkLabel *evidence_title;
  GtkDropDown *verdict;
  GtkEntry *note;

  /* Owned */
  AntDesk *desk;
  guint idle;
  gboolean filling; /* the controls follow the desk, not the user */
};

G_DEFINE_FINAL_TYPE (AntDipInspector, ant_dip_inspector, GTK_TYPE_WIDGET)

static void
show_judgement (AntDipInspector *self, AntDipItem *item)
{
  self->filling = TRUE;
  gtk_drop_down_set_selected (self->verdict, ant_dip_item_get_class (item));
  if (!g_str_equal (gtk_editable_get_text (GTK_EDITABLE (self->note)), ant_dip_item_get_note (item)))
    gtk_editable_set_text (GTK_EDITABLE (self->note), ant_dip_item_get_note (item));
  self->filling = FALSE;
}

/* Why the program takes it for what it does, heaviest first: ln odds for its class, then the sentence. */
static void
show_evidence (AntDipInspector *self, const AntVerdict *verdict)
{
  g_autoptr (GPtrArray) facts = g_ptr_array_new_with_free_func (ant_fact_free);
  g_autoptr (GPtrArray) lines = verdict ? ant_verdict_lines (verdict) : NULL;
  for (guint i = 0; lines && i < lines->len; i++)
    {
      const AntEvidenceLine *line = g_ptr_array_index (lines, i);
      g_autofree char *weight = ant_weight_words (line->weight);
      ant_facts_add (facts, weight, line->text);
    }
  ant_fact_list_set_facts (self->evidence, facts);
  gtk_widget_set_visible (GTK_WIDGET (self->evidence_title), facts->len > 0);
}

static void
show (AntDipInspector *self)
{
  AntDipItem *item = ant_desk_get_selected (self->desk);
  const AntRecord *record = ant_desk_get_record (self->desk);
  gtk_stack_set_visible_child_name (self->stack, item && record ? "dip" : "empty");
  if (!item || !record)
    return;
  const AntDip *dip = ant_dip_item_get_dip (item);
  g_autofree char *title = ant_dip_item_title (item), *span = ant_span_words (record, dip);
  g_autoptr (GPtrArray) facts = ant_dip_item_facts (item, record, ant_desk_get_unit (self->desk));
  gtk_label_set_text (self->title, title);
  gtk_label_set_text (self->span, span);
  gtk_widget_set_tooltip_text (GTK_WIDGET (self->span), span);
  g_autoptr (GPtrArray) all = g_ptr_array_new_with_free_func (ant_fact_free);
  if (ant_dip_item_get_verdict (item))
    ant_verdict_facts (ant_dip_item_get_verdict (item), all);
  g_ptr_array_extend_and_steal (all, g_steal_pointer (&facts));
  ant_fact_list_set_facts (self->facts, all);
  show_evidence (self, ant_dip_item_get_verdict (item));
  show_judgement (self, item);
}

/* The close-up first, at any height: it takes most of what is seen before anything is scrolled. */
static void
fit_closeup_cb (gpointer data)
{
  AntDipInspector *self = data;
  double height = CLOSEUP_PART * gtk_adjustment_get_page_size (gtk_scrolled_window_get_vadjustment (self->scroller));
  self->idle = 0;
  gtk_widget_set_size_request (GTK_WIDGET (self->closeup), -1, (int) CLAMP (height, LEAST_CLOSEUP, MOST_CLOSEUP));
}

/* Not at once: sizes are being given out. */
static void
height_changed_cb (AntDipInspector *self)
{
  if (self->idle == 0)
    self->idle = g_idle_add_once (fit_closeup_cb, self);
}

static void
desk_changed_cb (AntDesk *desk, guint what, AntDipInspector *self)
{
  if (what & (ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_SELECTION | ANT_DESK_LOOK))
    show (self);
  else if ((what & ANT_DESK_JUDGEMENT) && ant_desk_get_selected (desk))
    show_judgement (self, ant_desk_get_selected (desk));
}

static void
verdict_chosen_cb (AntDipInspector *self)
{
  if (!self->filling)
    ant_desk_judge (self->desk, (AntDipClass) gtk_drop_down_get_selected (self->verdict));
}

/* Every letter is kept as it is typed: there is nothing to confirm and nothing to lose. */
static void
note_changed_cb (AntDipInspector *self)
{
  if (!self->filling)
    ant_desk_note (self->desk, gtk_editable_get_text (GTK_EDITABLE (self->note)));
}

void
ant_dip_inspector_focus_note (AntDipInspector *self)
{
  gtk_widget_grab_focus (GTK_WIDGET (self->note));
}

void
ant_dip_inspector_set_desk (AntDipInspector *self, AntDesk *desk)
{
  g_set_object (&self->desk, desk);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->closeup), desk);
  g_signal_connect_object (desk, "changed", G_CALLBACK (desk_changed_cb), self, 0);
  desk_changed_cb (desk, ANT_DESK_EVERYTHING, self);
}

static void
ant_dip_inspector_dispose (GObject *object)
{
  g_clear_handle_id (&ANT_DIP_INSPECTOR (object)->idle, g_source_remove);
  g_clear_object (&ANT_DIP_INSPECTOR (object)->desk);
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_DIP_INSPECTOR);
  G_OBJECT_CLASS (ant_dip_inspector_parent_class)->dispose (object);
}

static void
ant_dip_inspector_class_init (AntDipInspectorClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_dip_inspector_dispose;
  g_type_ensure (ANT_TYPE_CLOSEUP_VIEW);
  g_type_ensure (ANT_TYPE_FACT_LIST);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/dip-inspector.ui");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_bind_template_child (widget_class, AntDipInspector, stack);
  gtk_widget_class_bind_template_child (widget_class, AntDipInspector, scroller);
  gtk_widget_class_bind_template_child (widget_class, AntDipInspector, title);
  gtk_widget_class_bind_template_child (widget_class, AntDipInspector, span);
  gtk_widget_class_bind_template_child (widget_class, AntDipInspector, closeup);
  gtk_widget_class_bind_template_child (widget_class, AntDipInspector, facts);
  gtk_widget_class_bind_template_child (widget_class, AntDipInspector, evidence);
  gtk_widget_class_bind_template_child (widget_class, AntDipInspector, evidence_title);
  gtk_widget_class_bind_template_child (widget_class, AntDipInspector, verdict);
  gtk_widget_class_bind_template_child (widget_class, AntDipInspector, note);
  gtk_widget_class_bind_template_callback (widget_class, verdict_chosen_cb);
  gtk_widget_class_bind_template_callback (widget_class, note_changed_cb);
}

static void
ant_dip_inspector_init (AntDipInspector *self)
{
  self->filling = TRUE;
  gtk_widget_init_template (GTK_WIDGET (self));
  g_signal_connect_object (gtk_scrolled_window_get_vadjustment (self->scroller), "notify::page-size",
                           G_CALLBACK (height_changed_cb), self, G_CONNECT_SWAPPED);
  const char *titles[ANT_N_CLASSES + 1] = { NULL };
  for (guint i = 0; i < ANT_N_CLASSES; i++)
    titles[i] = ant_dip_class_title ((AntDipClass) i);
  g_autoptr (GtkStringList) classes = gtk_string_list_new (titles);
  gtk_drop_down_set_model (self->verdict, G_LIST_MODEL (classes));
  self->filling = FALSE;
}
