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

static void
show_spans (AntRecordPage *self, const AntRecord *record)
{
  GtkWidget *child;
  while ((child = gtk_widget_get_first_child (GTK_WIDGET (self->gaps))))
    gtk_list_box_remove (self->gaps, child);
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

static void
desk_changed_cb (AntDesk *desk, guint what, AntRecordPage *self)
{
  const AntLayers *layers = ant_desk_get_layers (desk);
  if (!(what & ANT_DESK_RECORD) || !layers)
    return;
  g_autoptr (GPtrArray) facts = ant_record_facts (layers->record, &layers->summary);
  g_autoptr (GPtrArray) left_out = ant_record_left_out (&layers->summary);
  ant_fact_list_set_facts (self->facts, facts);
  ant_fact_list_set_facts (self->left_out, left_out);
  show_said (self, layers->record);
  show_spans (self, layers->record);
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
