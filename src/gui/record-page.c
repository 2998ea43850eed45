/* record-page.c - the page Record. */
#include "gui/record-page.h"

#include <glib/gi18n.h>

#include "data/record-words.h"
#include "gui/column-chooser.h"
#include "gui/columns.h"
#include "gui/fact-list.h"

#define MOST_SPANS 200

struct _AntRecordPage
{
  GtkWidget parent_instance;

  /* From the template */
  AntColumns *columns;
  AntFactList *facts, *left_out;
  GtkWidget *said, *further_heading, *further, *witnesses;
  GtkListBox *gaps;

  /* Owned */
  AntDesk *desk;
  guint waiting; /* for the rows to be made anew */
  guint stale;   /* AntDeskChange of those that are */
};

G_DEFINE_FINAL_TYPE (AntRecordPage, ant_record_page, GTK_TYPE_WIDGET)

static void
empty_box (GtkWidget *box)
{
  GtkWidget *child;
  while ((child = gtk_widget_get_first_child (box)))
    gtk_box_remove (GTK_BOX (box), child);
}

static GtkWidget *
sentence_new (const char *text)
{
  GtkWidget *label = gtk_label_new (text);
  gtk_label_set_xalign (GTK_LABEL (label), 0);
  gtk_label_set_wrap (GTK_LABEL (label), TRUE);
  gtk_label_set_wrap_mode (GTK_LABEL (label), PANGO_WRAP_WORD_CHAR);
  return label;
}

static void
show_said (AntRecordPage *self, const AntRecord *record)
{
  empty_box (self->said);
  for (guint i = 0; i < record->said->len; i++)
    gtk_box_append (GTK_BOX (self->said), sentence_new (g_ptr_array_index (record->said, i)));
}

/* Further columns: each can be a strip. */

static void
further_cb (GtkCheckButton *button, AntRecordPage *self)
{
  guint column = GPOINTER_TO_UINT (g_object_get_data (G_OBJECT (button), "column"));
  ant_desk_show_column (self->desk, column, gtk_check_button_get_active (button));
  if (ant_desk_is_column_shown (self->desk, column) != gtk_check_button_get_active (button))
    gtk_check_button_set_active (button, ant_desk_is_column_shown (self->desk, column)); /* there are too many */
}

static void
show_further (AntRecordPage *self, const AntRecord *record)
{
  empty_box (self->further);
  gtk_widget_set_visible (self->further_heading, record->columns->len > 0);
  for (guint i = 0; i < record->columns->len; i++)
    {
      g_autofree char *words = ant_column_words (g_ptr_array_index (record->columns, i), record->n_rows);
      GtkWidget *button = gtk_check_button_new_with_label (words);
      gtk_check_button_set_active (GTK_CHECK_BUTTON (button), ant_desk_is_column_shown (self->desk, i));
      g_object_set_data (G_OBJECT (button), "column", GUINT_TO_POINTER (i));
      g_signal_connect (button, "toggled", G_CALLBACK (further_cb), self);
      gtk_box_append (GTK_BOX (self->further), button);
    }
}

/* What is ticked follows the desk. */
static void
show_shown (AntRecordPage *self)
{
  guint i = 0;
  for (GtkWidget *button = gtk_widget_get_first_child (self->further); button; button = gtk_widget_get_next_sibling (button))
    gtk_check_button_set_active (GTK_CHECK_BUTTON (button), ant_desk_is_column_shown (self->desk, i++));
}

/* Witnesses: what the comparison came to, and away with it. */

static void
close_witness_cb (GtkButton *button, AntRecordPage *self)
{
  ant_desk_close_witness (self->desk, GPOINTER_TO_UINT (g_object_get_data (G_OBJECT (button), "witness")));
}

static void
choose_witness_cb (GtkButton *button, AntRecordPage *self)
{
  const AntWitness *witness = ant_desk_get_witness (self->desk, GPOINTER_TO_UINT (g_object_get_data (G_OBJECT (button), "witness")));
  GtkRoot *root = gtk_widget_get_root (GTK_WIDGET (self));
  if (witness)
    gtk_window_present (GTK_WINDOW (ant_column_chooser_new (GTK_WINDOW (root), self->desk, witness->path, &witness->reading, ANT_CHOOSE_WITNESS)));
}

/* A flat button of the i-th witness, with a name of its own for those who do not see the row. */
static GtkWidget *
witness_button_new (AntRecordPage *self, const char *label, char *what, guint i, void (*clicked) (GtkButton *, AntRecordPage *))
{
  g_autofree char *name = what;
  GtkWidget *button = gtk_button_new_with_label (label);
  gtk_widget_add_css_class (button, "flat");
  gtk_widget_add_css_class (button, "small");
  gtk_accessible_update_property (GTK_ACCESSIBLE (button), GTK_ACCESSIBLE_PROPERTY_LABEL, name, -1);
  g_object_set_data (G_OBJECT (button), "witness", GUINT_TO_POINTER (i));
  g_signal_connect (button, "clicked", G_CALLBACK (clicked), self);
  return button;
}

static GtkWidget *
witness_new (AntRecordPage *self, guint i)
{
  const AntWitnessStrips *strips = ant_desk_get_witness_strips (self->desk, i);
  const char *problem = ant_desk_get_witness_problem (self->desk, i);
  g_autofree char *name = ant_witness_name (ant_desk_get_witness (self->desk, i));
  g_autofree char *title = g_strdup_printf ("%u · %s", i + 1, name);
  GtkWidget *box = gtk_box_new (GTK_ORIENTATION_VERTICAL, 2), *line = gtk_box_new (GTK_ORIENTATION_HORIZONTAL, 6);
  GtkWidget *label = sentence_new (title);
  gtk_widget_set_hexpand (label, TRUE);
  gtk_box_append (GTK_BOX (line), label);
  gtk_box_append (GTK_BOX (line), witness_button_new (self, _("Choose…"), g_strdup_printf (_("Choose columns of witness %s"), name), i,
                                                      choose_witness_cb));
  gtk_box_append (GTK_BOX (line), witness_button_new (self, _("Close"), g_strdup_printf (_("Close witness %s"), name), i, close_witness_cb));
  gtk_box_append (GTK_BOX (box), line);
  g_autoptr (GPtrArray) words = strips ? ant_comparison_words (strips->comparison) : NULL;
  for (guint k = 0; words && k < words->len; k++)
    gtk_box_append (GTK_BOX (box), sentence_new (g_ptr_array_index (words, k)));
  if (!words)
    gtk_box_append (GTK_BOX (box), sentence_new (problem ? problem : _("It is being read")));
  return box;
}

static void
show_witnesses (AntRecordPage *self)
{
  empty_box (self->witnesses);
  for (guint i = 0; i < ant_desk_count_witnesses (self->desk); i++)
    gtk_box_append (GTK_BOX (self->witnesses), witness_new (self, i));
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
show_rows_cb (gpointer data)
{
  AntRecordPage *self = data;
  const AntRecord *record = ant_desk_get_record (self->desk);
  self->waiting = 0;
  if (record && (self->stale & (ANT_DESK_RECORD | ANT_DESK_MASKS)))
    show_spans (self, record);
  if (record && (self->stale & ANT_DESK_WITNESS))
    show_witnesses (self);
  self->stale = 0;
  return G_SOURCE_REMOVE;
}

/* Not from within a row that has just made the change. */
static void
show_rows_soon (AntRecordPage *self, AntDeskChange what)
{
  self->stale |= what;
  if (!self->waiting)
    self->waiting = g_idle_add_full (G_PRIORITY_DEFAULT, show_rows_cb, self, NULL);
}

static void
desk_changed_cb (AntDesk *desk, guint what, AntRecordPage *self)
{
  const AntLayers *layers = ant_desk_get_layers (desk);
  if (!layers)
    return;
  if (what & (ANT_DESK_RECORD | ANT_DESK_MASKS | ANT_DESK_WITNESS))
    show_rows_soon (self, what);
  if (!(what & ANT_DESK_RECORD))
    {
      if (what & ANT_DESK_COLUMNS)
        show_shown (self);
      return;
    }
  g_autoptr (GPtrArray) facts = ant_record_facts (layers->record, &layers->summary);
  g_autoptr (GPtrArray) left_out = ant_record_left_out (&layers->summary);
  ant_fact_list_set_facts (self->facts, facts);
  ant_fact_list_set_facts (self->left_out, left_out);
  show_said (self, layers->record);
  show_further (self, layers->record);
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
  gtk_widget_class_bind_template_child (widget_class, AntRecordPage, further_heading);
  gtk_widget_class_bind_template_child (widget_class, AntRecordPage, further);
  gtk_widget_class_bind_template_child (widget_class, AntRecordPage, witnesses);
  gtk_widget_class_bind_template_callback (widget_class, span_chosen_cb);
}

static void
ant_record_page_init (AntRecordPage *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
}
