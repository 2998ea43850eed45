/* record-page.c - the page Record. */
#include "gui/record-page.h"

#include <glib/gi18n.h>

#include "data/record-words.h"
#include "gui/columns.h"
#include "gui/fact-list.h"

#define MOST_SPANS 200

struct _AntRecordPage
{
  GtkWidget parent_instance;

  /* From the template */
  AntColumns *columns;
  AntFactList *facts, *left_out;
  GtkWidget *said;
  GtkListBox *gaps;

  /* Owned */
  AntDesk *desk;
  guint waiting; /* for the rows to be made anew */
};

G_DEFINE_FINAL_TYPE (AntRecordPage, ant_record_page, GTK_TYPE_WIDGET)

static void
show_said (AntRecordPage *self, const AntRecord *record)
{
  GtkWidget *child;
  while ((child = gtk_widget_get_first_child (self->said)))
    gtk_box_remove (GTK_BOX (self->said), child);
  for (guint i = 0; i < record->said->len; i++)
    {
      GtkWidget *label = gtk_label_new (g_ptr_array_index (record->said, i));
      gtk_label_set_xalign (GTK_LABEL (label), 0);
      gtk_label_set_wrap (GTK_LABEL (label), TRUE);
      gtk_label_set_wrap_mode (GTK_LABEL (label), PANGO_WRAP_WORD_CHAR);
      gtk_box_append (GTK_BOX (self->said), label);
    }
}

/* A row that leads to its span in the strips. */
static GtkWidget *
span_row_new (const AntRecord *record, const AntSpan *span, const char *what)
{
  g_autofree char *start = ant_instant_words (record, span->start_d);
  g_autofree char *length = ant_length_words (span->end_d - span->start_d);
  g_autofree char *text = g_strdup_printf ("%s  ·  %s  ·  %s", start, length, what);
  GtkWidget *label = gtk_label_new (text), *row = gtk_list_box_row_new ();
  gtk_label_set_xalign (GTK_LABEL (label), 0);
  gtk_label_set_ellipsize (GTK_LABEL (label), PANGO_ELLIPSIZE_END);
  gtk_widget_add_css_class (label, "numeric");
  gtk_list_box_row_set_child (GTK_LIST_BOX_ROW (row), label);
  g_object_set_data_full (G_OBJECT (row), "span", g_memdup2 (span, sizeof *span), g_free);
  return row;
}

/* A span that the analyst left out: why, and back with it. The row's number tells which. */

static void
reason_given (AntRecordPage *self, GtkWidget *entry)
{
  if (self->desk)
    ant_desk_set_mask_reason (self->desk, GPOINTER_TO_UINT (g_object_get_data (G_OBJECT (entry), "mask")),
                              gtk_editable_get_text (GTK_EDITABLE (entry)));
}

static void
reason_left_cb (GtkEventController *controller, AntRecordPage *self)
{
  reason_given (self, gtk_event_controller_get_widget (controller));
}

static void
reason_cb (GtkEntry *entry, AntRecordPage *self)
{
  reason_given (self, GTK_WIDGET (entry));
}

static void
unmask_cb (GtkButton *button, AntRecordPage *self)
{
  ant_desk_unmask (self->desk, g_object_get_data (G_OBJECT (button), "span"));
}

static GtkWidget *
mask_row_new (AntRecordPage *self, const AntRecord *record, const AntMask *mask, guint i)
{
  gboolean by_hand = mask->kind == ANT_MASK_HAND;
  GtkWidget *row = span_row_new (record, &mask->span, by_hand ? _("left out by hand") : _("excluded"));
  GtkWidget *box = gtk_box_new (GTK_ORIENTATION_VERTICAL, 2), *line = gtk_box_new (GTK_ORIENTATION_HORIZONTAL, 6);
  GtkWidget *entry = gtk_entry_new ();
  GtkWidget *button = gtk_button_new_with_label (_("Use Again")), *label = g_object_ref (gtk_list_box_row_get_child (GTK_LIST_BOX_ROW (row)));
  GtkEventController *focus = gtk_event_controller_focus_new ();
  gtk_list_box_row_set_child (GTK_LIST_BOX_ROW (row), box);
  gtk_box_append (GTK_BOX (box), label);
  g_object_unref (label);
  gtk_box_append (GTK_BOX (box), line);
  gtk_box_append (GTK_BOX (line), entry);
  gtk_box_append (GTK_BOX (line), button);
  gtk_widget_set_hexpand (entry, TRUE);
  gtk_entry_set_placeholder_text (GTK_ENTRY (entry), _("Why?"));
  gtk_editable_set_text (GTK_EDITABLE (entry), mask->reason);
  gtk_accessible_update_property (GTK_ACCESSIBLE (entry), GTK_ACCESSIBLE_PROPERTY_LABEL, _("Why it is left out"), -1);
  g_object_set_data (G_OBJECT (entry), "mask", GUINT_TO_POINTER (i));
  g_object_set_data_full (G_OBJECT (button), "span", g_memdup2 (&mask->span, sizeof mask->span), g_free);
  g_signal_connect (entry, "activate", G_CALLBACK (reason_cb), self);
  g_signal_connect (focus, "leave", G_CALLBACK (reason_left_cb), self);
  gtk_widget_add_controller (entry, focus);
  g_signal_connect (button, "clicked", G_CALLBACK (unmask_cb), self);
  return row;
}

static void
show_spans (AntRecordPage *self, const AntRecord *record)
{
  GtkWidget *child;
  while ((child = gtk_widget_get_first_child (GTK_WIDGET (self->gaps))))
    gtk_list_box_remove (self->gaps, child);
  const GPtrArray *masks = ant_analysis_get_treatment (ant_desk_get_analysis (self->desk))->masks;
  for (guint i = 0; i < MIN (masks->len, MOST_SPANS); i++)
    gtk_list_box_append (self->gaps, mask_row_new (self, record, g_ptr_array_index (masks, i), i));
  for (guint i = 0; i < MIN (record->dark_spans->len, MOST_SPANS); i++)
    gtk_list_box_append (self->gaps,
                         span_row_new (record, &g_array_index (record->dark_spans, AntSpan, i), _("dark or covered")));
  for (guint i = 0; i < MIN (record->gaps->len, MOST_SPANS); i++)
    gtk_list_box_append (self->gaps, span_row_new (record, &g_array_index (record->gaps, AntSpan, i), _("gap")));
}

static void
span_chosen_cb (AntRecordPage *self, GtkListBoxRow *row, GtkListBox *list)
{
  const AntSpan *span = g_object_get_data (G_OBJECT (row), "span");
  double length_d = span->end_d - span->start_d;
  ant_desk_set_view (self->desk, span->start_d - length_d, span->end_d + length_d);
}

static gboolean
show_spans_cb (gpointer data)
{
  AntRecordPage *self = data;
  self->waiting = 0;
  if (ant_desk_get_record (self->desk))
    show_spans (self, ant_desk_get_record (self->desk));
  return G_SOURCE_REMOVE;
}

/* Not from within a row that has just made the change. */
static void
show_spans_soon (AntRecordPage *self)
{
  if (!self->waiting)
    self->waiting = g_idle_add_full (G_PRIORITY_DEFAULT, show_spans_cb, self, NULL);
}

static void
desk_changed_cb (AntDesk *desk, guint what, AntRecordPage *self)
{
  const AntLayers *layers = ant_desk_get_layers (desk);
  if (!layers)
    return;
  if (what & (ANT_DESK_RECORD | ANT_DESK_MASKS))
    show_spans_soon (self);
  if (!(what & ANT_DESK_RECORD))
    return;
  g_autoptr (GPtrArray) facts = ant_record_facts (layers->record, &layers->summary);
  g_autoptr (GPtrArray) left_out = ant_record_left_out (&layers->summary);
  ant_fact_list_set_facts (self->facts, facts);
  ant_fact_list_set_facts (self->left_out, left_out);
  show_said (self, layers->record);
}

void
ant_record_page_set_desk (AntRecordPage *self, AntDesk *desk)
{
  g_set_object (&self->desk, desk);
  g_signal_connect_object (desk, "changed", G_CALLBACK (desk_changed_cb), self, 0);
  desk_changed_cb (desk, ANT_DESK_EVERYTHING, self);
}

static void
ant_record_page_dispose (GObject *object)
{
  g_clear_handle_id (&ANT_RECORD_PAGE (object)->waiting, g_source_remove);
  g_clear_object (&ANT_RECORD_PAGE (object)->desk);
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_RECORD_PAGE);
  G_OBJECT_CLASS (ant_record_page_parent_class)->dispose (object);
}

static void
ant_record_page_class_init (AntRecordPageClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_record_page_dispose;
  g_type_ensure (ANT_TYPE_COLUMNS);
  g_type_ensure (ANT_TYPE_FACT_LIST);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/record-page.ui");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_bind_template_child (widget_class, AntRecordPage, columns);
  gtk_widget_class_bind_template_child (widget_class, AntRecordPage, facts);
  gtk_widget_class_bind_template_child (widget_class, AntRecordPage, left_out);
  gtk_widget_class_bind_template_child (widget_class, AntRecordPage, said);
  gtk_widget_class_bind_template_child (widget_class, AntRecordPage, gaps);
  gtk_widget_class_bind_template_callback (widget_class, span_chosen_cb);
}

static void
ant_record_page_init (AntRecordPage *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
}
