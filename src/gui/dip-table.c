/* dip-table.c - the list of dips. */
#include "gui/dip-table.h"

#include <glib/gi18n.h>
#include <math.h>

#include "data/verdict-words.h"
#include "gui/look-icon.h"

struct _AntDipTable
{
  GtkWidget parent_instance;

  /* From the template */
  GtkWidget *content;
  GtkStack *stack;
  GtkColumnView *view;
  GtkDropDown *kinds;
  GtkSearchEntry *search;
  GtkLabel *empty;

  /* Owned */
  AntDesk *desk;
  GtkFilterListModel *filtered;
  GtkSingleSelection *selection;
  gboolean following; /* the selection follows the desk, not the user */
};

G_DEFINE_FINAL_TYPE (AntDipTable, ant_dip_table, GTK_TYPE_WIDGET)

static const guint kind_choices[] = { ANT_KIND_DIP | ANT_KIND_ASKED, ANT_KIND_BRIGHTENING,
                                      ANT_KIND_DIP | ANT_KIND_ASKED | ANT_KIND_BRIGHTENING, ANT_KIND_PASSAGE };

/* Columns */

typedef struct
{
  const char *title;
  char *(*text) (AntDesk *desk, AntDipItem *item);
  double (*key) (AntDipItem *item);
  gboolean number, strong, expands;
} Column;

static char *
middle_text (AntDesk *desk, AntDipItem *item)
{
  return ant_instant_short (ant_desk_get_record (desk), ant_dip_item_get_dip (item)->mid_d);
}

static char *
depth_text (AntDesk *desk, AntDipItem *item)
{
  return ant_depth_figures (ant_desk_get_record (desk), ant_dip_item_get_dip (item), ant_desk_get_unit (desk));
}

static char *
length_text (AntDesk *desk, AntDipItem *item)
{
  const AntDip *dip = ant_dip_item_get_dip (item);
  return ant_dip_item_get_kind (item) == ANT_KIND_PASSAGE ? ant_passage_width_words (dip)
                                                          : ant_length_words (dip->duration_d);
}

static char *
snr_text (AntDesk *desk, AntDipItem *item)
{
  return ant_number_words (ant_dip_item_get_dip (item)->snr, 1);
}

static char *
class_text (AntDesk *desk, AntDipItem *item)
{
  gboolean noted = *ant_dip_item_get_note (item) != '\0';
  g_autofree char *words = ant_class_words (ant_dip_item_get_class (item), ant_dip_item_get_verdict (item));
  return g_strconcat (words, noted ? " ✎" : "", NULL);
}

static double
number_key (AntDipItem *item)
{
  return ant_dip_item_get_kind (item) * 1e6 + ant_dip_item_get_number (item);
}

static double
middle_key (AntDipItem *item)
{
  return ant_dip_item_get_dip (item)->mid_d;
}

static double
depth_key (AntDipItem *item)
{
  return ant_dip_item_get_dip (item)->depth_ppm;
}

static double
length_key (AntDipItem *item)
{
  return ant_dip_item_get_dip (item)->duration_d;
}

static double
snr_key (AntDipItem *item)
{
  return ant_dip_item_get_dip (item)->snr;
}

static double
class_key (AntDipItem *item)
{
  return ant_dip_item_get_shown_class (item);
}

static const Column columns[] = {
  { N_("No"), NULL, number_key, FALSE, FALSE, FALSE },
  { N_("Middle"), middle_text, middle_key, FALSE, FALSE, FALSE },
  { N_("Depth"), depth_text, depth_key, TRUE, FALSE, FALSE },
  { N_("Length"), length_text, length_key, TRUE, FALSE, FALSE },
  { N_("SNR"), snr_text, snr_key, TRUE, TRUE, FALSE },
  { N_("Class"), class_text, class_key, FALSE, FALSE, TRUE },
};
#define DEPTH_COLUMN 2

static int
compare_cb (gconstpointer a, gconstpointer b, gpointer data)
{
  const Column *column = &columns[GPOINTER_TO_SIZE (data)];
  gpointer first = (gpointer) (gsize) a, second = (gpointer) (gsize) b; /* the API's const means nothing to GObject */
  double one = column->key (first), other = column->key (second);
  return one < other ? GTK_ORDERING_SMALLER : one > other ? GTK_ORDERING_LARGER : GTK_ORDERING_EQUAL;
}

static void
fill_cell (GtkListItem *cell, AntDipTable *self)
{
  AntDipItem *item = gtk_list_item_get_item (cell);
  const Column *column = &columns[GPOINTER_TO_SIZE (g_object_get_data (G_OBJECT (cell), "column"))];
  GtkWidget *child = gtk_list_item_get_child (cell);
  if (!item || !ant_desk_get_record (self->desk))
    return;
  if (column->text)
    {
      g_autofree char *text = column->text (self->desk, item);
      gtk_label_set_text (GTK_LABEL (child), text);
      return;
    }
  g_autofree char *label = ant_dip_item_label (item);
  ant_look_icon_set_look (ANT_LOOK_ICON (gtk_widget_get_first_child (child)), ant_dip_item_look (item));
  gtk_label_set_text (GTK_LABEL (gtk_widget_get_last_child (child)), label);
}

static void
judged_cb (AntDipItem *item, GParamSpec *pspec, GtkListItem *cell)
{
  fill_cell (cell, g_object_get_data (G_OBJECT (cell), "table"));
}

static void
setup_cb (GtkSignalListItemFactory *factory, GtkListItem *cell, AntDipTable *self)
{
  gpointer index = g_object_get_data (G_OBJECT (factory), "column");
  const Column *column = &columns[GPOINTER_TO_SIZE (index)];
  GtkWidget *label = gtk_label_new (NULL), *child = label;
  gtk_label_set_xalign (GTK_LABEL (label), column->number ? 1 : 0);
  gtk_label_set_single_line_mode (GTK_LABEL (label), TRUE);
  if (column->number || !column->expands)
    gtk_widget_add_css_class (label, "numeric");
  if (column->strong || !column->text)
    gtk_widget_add_css_class (label, "strong");
  if (column->expands)
    gtk_label_set_ellipsize (GTK_LABEL (label), PANGO_ELLIPSIZE_END);
  if (!column->text)
    {
      child = gtk_box_new (GTK_ORIENTATION_HORIZONTAL, 6);
      gtk_box_append (GTK_BOX (child), g_object_new (ANT_TYPE_LOOK_ICON, NULL));
      gtk_box_append (GTK_BOX (child), label);
    }
  gtk_list_item_set_child (cell, child);
  g_object_set_data (G_OBJECT (cell), "column", index);
  g_object_set_data (G_OBJECT (cell), "table", self);
}

static void
bind_cb (GtkSignalListItemFactory *factory, GtkListItem *cell, AntDipTable *self)
{
  fill_cell (cell, self);
  g_signal_connect_object (gtk_list_item_get_item (cell), "notify::judgement", G_CALLBACK (judged_cb), cell, 0);
}

static void
unbind_cb (GtkSignalListItemFactory *factory, GtkListItem *cell, AntDipTable *self)
{
  g_signal_handlers_disconnect_by_func (gtk_list_item_get_item (cell), judged_cb, cell);
}

static void
add_columns (AntDipTable *self)
{
  for (gsize i = 0; i < G_N_ELEMENTS (columns); i++)
    {
      GtkListItemFactory *factory = gtk_signal_list_item_factory_new ();
      g_object_set_data (G_OBJECT (factory), "column", GSIZE_TO_POINTER (i));
      g_signal_connect_object (factory, "setup", G_CALLBACK (setup_cb), self, 0);
      g_signal_connect_object (factory, "bind", G_CALLBACK (bind_cb), self, 0);
      g_signal_connect_object (factory, "unbind", G_CALLBACK (unbind_cb), self, 0);
      g_autoptr (GtkColumnViewColumn) column = gtk_column_view_column_new (_ (columns[i].title), factory);
      g_autoptr (GtkSorter) sorter = GTK_SORTER (gtk_custom_sorter_new (compare_cb, GSIZE_TO_POINTER (i), NULL));
      gtk_column_view_column_set_sorter (column, sorter);
      gtk_column_view_column_set_expand (column, columns[i].expands);
      gtk_column_view_append_column (self->view, column);
    }
}

/* Filter */

static gboolean
kept_cb (gpointer object, gpointer data)
{
  AntDipTable *self = data;
  return self->desk && ant_desk_keeps (self->desk, object);
}

static void
show_emptiness (AntDipTable *self)
{
  const AntScanResults *results = ant_desk_get_results (self->desk);
  gboolean empty = g_list_model_get_n_items (G_LIST_MODEL (self->selection)) == 0;
  gboolean filtered = *gtk_editable_get_text (GTK_EDITABLE (self->search)) != '\0';
  gboolean passages = ant_desk_get_shown (self->desk) == ANT_KIND_PASSAGE;
  g_autofree char *text =
      filtered || !results ? g_strdup (filtered ? _("Nothing fits these words.") : "")
      : passages           ? g_strdup (results->reach < ANT_SCAN_COMPLETE ? _("Passages were not traced.")
                                                                          : _("No spot group or the like stands out."))
                           : g_strdup_printf (_("Nothing reaches SNR %.1f. The chart shows what depth would have been seen."),
                             results->threshold_snr);
  gtk_label_set_text (self->empty, text);
  gtk_stack_set_visible_child_name (self->stack, empty ? "empty" : "list");
}

/* GtkColumnView 4.8 can only scroll by the action of the list inside it. */
static void
scroll_to (AntDipTable *self, guint position)
{
  for (GtkWidget *child = gtk_widget_get_first_child (GTK_WIDGET (self->view)); child;
       child = gtk_widget_get_next_sibling (child))
    if (GTK_IS_LIST_VIEW (child))
      gtk_widget_activate_action (child, "list.scroll-to-item", "u", position);
}

static void
follow_selection (AntDipTable *self)
{
  AntDipItem *item = ant_desk_get_selected (self->desk);
  guint n = g_list_model_get_n_items (G_LIST_MODEL (self->selection)), at = GTK_INVALID_LIST_POSITION;
  for (guint i = 0; item && i < n && at == GTK_INVALID_LIST_POSITION; i++)
    {
      g_autoptr (GObject) one = g_list_model_get_item (G_LIST_MODEL (self->selection), i);
      if (one == G_OBJECT (item))
        at = i;
    }
  self->following = TRUE;
  gtk_single_selection_set_selected (self->selection, at);
  self->following = FALSE;
  if (at != GTK_INVALID_LIST_POSITION)
    scroll_to (self, at);
}

static void
chosen_cb (GtkSingleSelection *selection, GParamSpec *pspec, AntDipTable *self)
{
  if (!self->following && self->desk)
    ant_desk_select (self->desk, gtk_single_selection_get_selected_item (selection));
}

static void
activated_cb (AntDipTable *self, guint position, GtkColumnView *view)
{
  ant_desk_view_selected (self->desk);
}

static void
kinds_chosen_cb (AntDipTable *self)
{
  guint chosen = gtk_drop_down_get_selected (self->kinds);
  if (self->desk && chosen < G_N_ELEMENTS (kind_choices) && ant_desk_get_shown (self->desk) != kind_choices[chosen])
    ant_desk_set_shown (self->desk, kind_choices[chosen]);
}

static void
search_changed_cb (AntDipTable *self)
{
  if (self->desk)
    ant_desk_set_filter (self->desk, gtk_editable_get_text (GTK_EDITABLE (self->search)));
}

static void
name_depth_column (AntDipTable *self)
{
  const AntRecord *record = ant_desk_get_record (self->desk);
  g_autoptr (GtkColumnViewColumn) column =
      g_list_model_get_item (gtk_column_view_get_columns (self->view), DEPTH_COLUMN);
  g_autofree char *title =
      g_strdup_printf (_("Depth, %s"), ant_depth_unit_name (record, ant_desk_get_unit (self->desk)));
  gtk_column_view_column_set_title (column, title);
}

static void
desk_changed_cb (AntDesk *desk, guint what, AntDipTable *self)
{
  if (!(what & (ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_SELECTION | ANT_DESK_LOOK)))
    return;
  if (what & (ANT_DESK_LOOK | ANT_DESK_RESULTS | ANT_DESK_RECORD))
    {
      for (guint i = 0; i < G_N_ELEMENTS (kind_choices); i++)
        if (ant_desk_get_shown (desk) == kind_choices[i])
          gtk_drop_down_set_selected (self->kinds, i);
      /* Rows are bound anew, so that they show the present unit. */
      self->following = TRUE;
      gtk_filter_list_model_set_model (self->filtered, NULL);
      gtk_filter_list_model_set_model (self->filtered, ant_desk_get_items (desk));
      self->following = FALSE;
      if (ant_desk_get_record (desk))
        name_depth_column (self);
      show_emptiness (self);
    }
  follow_selection (self);
}

static void
make_models (AntDipTable *self)
{
  GtkFilter *filter = GTK_FILTER (gtk_custom_filter_new (kept_cb, self, NULL));
  self->filtered = gtk_filter_list_model_new (NULL, filter);
  GtkSorter *sorter = g_object_ref (gtk_column_view_get_sorter (self->view));
  GtkSortListModel *sorted = gtk_sort_list_model_new (G_LIST_MODEL (g_object_ref (self->filtered)), sorter);
  self->selection = gtk_single_selection_new (G_LIST_MODEL (sorted));
  gtk_single_selection_set_autoselect (self->selection, FALSE);
  gtk_single_selection_set_can_unselect (self->selection, TRUE);
  g_signal_connect_object (self->selection, "notify::selected-item", G_CALLBACK (chosen_cb), self, 0);
  gtk_column_view_set_model (self->view, GTK_SELECTION_MODEL (self->selection));
}

void
ant_dip_table_set_desk (AntDipTable *self, AntDesk *desk)
{
  g_set_object (&self->desk, desk);
  g_signal_connect_object (desk, "changed", G_CALLBACK (desk_changed_cb), self, 0);
  desk_changed_cb (desk, ANT_DESK_EVERYTHING, self);
}

void
ant_dip_table_focus_filter (AntDipTable *self)
{
  gtk_widget_grab_focus (GTK_WIDGET (self->search));
}

guint
ant_dip_table_get_n_rows (AntDipTable *self)
{
  return g_list_model_get_n_items (G_LIST_MODEL (self->selection));
}

GtkColumnView *
ant_dip_table_get_view (AntDipTable *self)
{
  return self->view;
}

/* The view goes first: closing a sorted list with a selected row would call back into a half-closed widget. */
static void
ant_dip_table_dispose (GObject *object)
{
  AntDipTable *self = ANT_DIP_TABLE (object);
  self->following = TRUE;
  if (self->view)
    gtk_column_view_set_model (self->view, NULL);
  if (self->filtered)
    gtk_filter_list_model_set_model (self->filtered, NULL);
  g_clear_object (&self->selection);
  g_clear_object (&self->filtered);
  g_clear_object (&self->desk);
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_DIP_TABLE);
  G_OBJECT_CLASS (ant_dip_table_parent_class)->dispose (object);
}

static void
ant_dip_table_class_init (AntDipTableClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_dip_table_dispose;
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/dip-table.ui");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_bind_template_child (widget_class, AntDipTable, content);
  gtk_widget_class_bind_template_child (widget_class, AntDipTable, stack);
  gtk_widget_class_bind_template_child (widget_class, AntDipTable, view);
  gtk_widget_class_bind_template_child (widget_class, AntDipTable, kinds);
  gtk_widget_class_bind_template_child (widget_class, AntDipTable, search);
  gtk_widget_class_bind_template_child (widget_class, AntDipTable, empty);
  gtk_widget_class_bind_template_callback (widget_class, activated_cb);
  gtk_widget_class_bind_template_callback (widget_class, kinds_chosen_cb);
  gtk_widget_class_bind_template_callback (widget_class, search_changed_cb);
}

static void
ant_dip_table_init (AntDipTable *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
  add_columns (self);
  make_models (self);
}
