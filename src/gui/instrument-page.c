/* instrument-page.c - the page Instrument: what is folded, by which clock, and what stands out. */
#include "gui/instrument-page.h"

#include <glib/gi18n.h>
#include <math.h>

#include "core/units.h"
#include "gui/clock-view.h"

#define LOW_ORBIT_H 1.6 /* to begin with */

struct _AntInstrumentPage
{
  GtkWidget parent_instance;

  /* From the template */
  GtkWidget *box;
  GtkDropDown *what, *clock;
  GtkSpinButton *hours, *minutes;
  GtkWidget *hours_row, *minutes_row;
  GtkLabel *found;
  AntClockView *chart;

  /* Owned */
  AntDesk *desk;
  GArray *wishes;      /* of AntClockWish: what each row of `what` stands for; borrows from the desk */
  GCancellable *stop;  /* NULL: nothing is being folded */
  char *folding;       /* what is */
  gboolean stale;      /* fold anew when somebody looks */
  gboolean listing;    /* rows are being made: no choice of the user's */
};

G_DEFINE_FINAL_TYPE (AntInstrumentPage, ant_instrument_page, GTK_TYPE_WIDGET)

/* What there is to fold */

static void
add_row (AntInstrumentPage *self, GtkStringList *names, const char *name, const AntClockWish *wish)
{
  gtk_string_list_append (names, name);
  g_array_append_vals (self->wishes, wish, 1);
}

static void
add_columns (AntInstrumentPage *self, GtkStringList *names)
{
  const AntRecord *record = ant_desk_get_record (self->desk);
  for (guint i = 0; i < record->columns->len; i++)
    {
      g_autofree char *name = ant_column_title (g_ptr_array_index (record->columns, i));
      add_row (self, names, name, &(AntClockWish){ .source = ANT_CLOCK_COLUMN, .column = i });
    }
}

static void
add_witnesses (AntInstrumentPage *self, GtkStringList *names)
{
  static const char *const looks[] = { N_("Witness, ppm"), N_("Record over witness, ppm"), N_("Record less witness, ppm") };
  for (guint i = 0; i < ant_desk_count_witnesses (self->desk); i++)
    for (int look = 0; ant_desk_get_witness_strips (self->desk, i) && look < ANT_N_WITNESS_LOOKS; look++)
      {
        g_autofree char *file = ant_witness_name (ant_desk_get_witness (self->desk, i));
        g_autofree char *name = g_strdup_printf ("%s: %s", _ (looks[look]), file);
        AntClockWish wish = { .source = ANT_CLOCK_WITNESS, .look = (AntWitnessLook) look, .column = i };
        add_row (self, names, name, &wish);
      }
}

static void
list_rows (AntInstrumentPage *self)
{
  g_autoptr (GtkStringList) names = gtk_string_list_new (NULL);
  guint selected = gtk_drop_down_get_selected (self->what);
  g_array_set_size (self->wishes, 0);
  if (ant_desk_get_record (self->desk))
    {
      add_row (self, names, _("Residual, ppm"), &(AntClockWish){ .source = ANT_CLOCK_RESIDUAL });
      add_row (self, names, _("Irradiance, ppm"), &(AntClockWish){ .source = ANT_CLOCK_IRRADIANCE });
      add_columns (self, names);
      add_witnesses (self, names);
    }
  self->listing = TRUE;
  gtk_drop_down_set_model (self->what, G_LIST_MODEL (names));
  if (selected < self->wishes->len)
    gtk_drop_down_set_selected (self->what, selected);
  self->listing = FALSE;
}

/* Folding */

static void
tell (AntInstrumentPage *self, const AntClockFold *fold)
{
  g_autofree char *text
      = !isfinite (fold->significance) ? g_strdup (_("Less than two bins have five samples and more."))
      : g_strdup_printf (_("Greatest difference of two of %u bins: %.4g, which is %.3g times its error. Chance gives 3 to 4.5."),
                         fold->options.n_bins, fold->swing, fold->significance);
  gtk_label_set_text (self->found, text);
}

static void
folded_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntInstrumentPage) self = data;
  g_autoptr (GError) error = NULL;
  AntClockFold *fold = ant_clock_fold_finish (result, &error);
  if (g_task_get_cancellable (G_TASK (result)) != self->stop)
    {
      g_free (fold); /* overtaken */
      return;
    }
  g_clear_object (&self->stop);
  if (fold)
    tell (self, fold);
  else
    gtk_label_set_text (self->found, error->message);
  ant_clock_view_set_fold (self->chart, fold, self->folding);
}

static void
cancel (AntInstrumentPage *self)
{
  if (self->stop)
    g_cancellable_cancel (self->stop);
  g_clear_object (&self->stop);
}

static void
fold (AntInstrumentPage *self)
{
  guint row = gtk_drop_down_get_selected (self->what);
  cancel (self);
  self->stale = FALSE;
  if (row >= self->wishes->len)
    {
      gtk_label_set_text (self->found, "");
      ant_clock_view_set_fold (self->chart, NULL, NULL);
      return;
    }
  AntClockWish wish = g_array_index (self->wishes, AntClockWish, row);
  wish.layers = (AntLayers *) (gsize) ant_desk_get_layers (self->desk);
  if (wish.source == ANT_CLOCK_WITNESS)
    wish.comparison = ant_desk_get_witness_strips (self->desk, wish.column)->comparison;
  wish.options = (AntFoldOptions) ANT_FOLD_OPTIONS_INIT;
  wish.options.clock = gtk_drop_down_get_selected (self->clock) == 0 ? ANT_FOLD_ORBIT : ANT_FOLD_SINCE_GAP;
  wish.options.period_d = gtk_spin_button_get_value (self->hours) / ANT_HOURS_PER_DAY;
  wish.options.reach_d = gtk_spin_button_get_value (self->minutes) / ANT_MINUTES_PER_DAY;
  g_free (self->folding);
  self->folding = g_strdup (gtk_string_object_get_string (gtk_drop_down_get_selected_item (self->what)));
  self->stop = g_cancellable_new ();
  ant_clock_fold_async (&wish, self->stop, folded_cb, g_object_ref (self));
}

/* Only what somebody looks at is worth the work. */
static void
fold_when_seen (AntInstrumentPage *self)
{
  self->stale = TRUE;
  if (gtk_widget_get_mapped (GTK_WIDGET (self)))
    fold (self);
}

static void
chosen_cb (AntInstrumentPage *self)
{
  gboolean by_orbit = gtk_drop_down_get_selected (self->clock) == 0;
  gtk_widget_set_visible (self->hours_row, by_orbit);
  gtk_widget_set_visible (self->minutes_row, !by_orbit);
  if (self->desk && !self->listing)
    fold_when_seen (self);
}

static void
desk_changed_cb (AntDesk *desk, guint what, AntInstrumentPage *self)
{
  if (what & (ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_WITNESS))
    {
      list_rows (self);
      fold_when_seen (self);
    }
}

void
ant_instrument_page_set_desk (AntInstrumentPage *self, AntDesk *desk)
{
  double line_h = ant_desk_get_settings (desk)->line_period_h;
  g_set_object (&self->desk, desk);
  gtk_spin_button_set_value (self->hours, line_h > 0 ? line_h : LOW_ORBIT_H);
  ant_plot_view_set_desk (ANT_PLOT_VIEW (self->chart), desk);
  g_signal_connect_object (desk, "changed", G_CALLBACK (desk_changed_cb), self, 0);
  desk_changed_cb (desk, ANT_DESK_EVERYTHING, self);
}

static void
ant_instrument_page_map (GtkWidget *widget)
{
  AntInstrumentPage *self = ANT_INSTRUMENT_PAGE (widget);
  GTK_WIDGET_CLASS (ant_instrument_page_parent_class)->map (widget);
  if (self->stale)
    fold (self);
}

static void
ant_instrument_page_dispose (GObject *object)
{
  AntInstrumentPage *self = ANT_INSTRUMENT_PAGE (object);
  cancel (self);
  g_clear_object (&self->desk);
  gtk_widget_dispose_template (GTK_WIDGET (object), ANT_TYPE_INSTRUMENT_PAGE);
  G_OBJECT_CLASS (ant_instrument_page_parent_class)->dispose (object);
}

static void
ant_instrument_page_finalize (GObject *object)
{
  g_array_unref (ANT_INSTRUMENT_PAGE (object)->wishes);
  g_free (ANT_INSTRUMENT_PAGE (object)->folding);
  G_OBJECT_CLASS (ant_instrument_page_parent_class)->finalize (object);
}

static void
ant_instrument_page_class_init (AntInstrumentPageClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);
  G_OBJECT_CLASS (klass)->dispose = ant_instrument_page_dispose;
  G_OBJECT_CLASS (klass)->finalize = ant_instrument_page_finalize;
  widget_class->map = ant_instrument_page_map;
  g_type_ensure (ANT_TYPE_CLOCK_VIEW);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/antumbra/Antumbra/instrument-page.ui");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_bind_template_child (widget_class, AntInstrumentPage, box);
  gtk_widget_class_bind_template_child (widget_class, AntInstrumentPage, what);
  gtk_widget_class_bind_template_child (widget_class, AntInstrumentPage, clock);
  gtk_widget_class_bind_template_child (widget_class, AntInstrumentPage, hours);
  gtk_widget_class_bind_template_child (widget_class, AntInstrumentPage, minutes);
  gtk_widget_class_bind_template_child (widget_class, AntInstrumentPage, hours_row);
  gtk_widget_class_bind_template_child (widget_class, AntInstrumentPage, minutes_row);
  gtk_widget_class_bind_template_child (widget_class, AntInstrumentPage, found);
  gtk_widget_class_bind_template_child (widget_class, AntInstrumentPage, chart);
  gtk_widget_class_bind_template_callback (widget_class, chosen_cb);
}

static void
ant_instrument_page_init (AntInstrumentPage *self)
{
  self->wishes = g_array_new (FALSE, TRUE, sizeof (AntClockWish));
  gtk_widget_init_template (GTK_WIDGET (self));
  chosen_cb (self);
}
