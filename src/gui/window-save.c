/* window-save.c - save tables and reports: ask where, make the file off the main loop, tell if it could not be written. */
#include <glib/gi18n.h>

#include "gui/file-prompt.h"
#include "gui/window-private.h"
#include "jobs/report.h"
#include "jobs/save-task.h"
#include "writers/dip-table.h"
#include "writers/flags-table.h"
#include "writers/result-files.h"

/* The rows of the list, copied. */
typedef struct
{
  GArray *dip, *upper_limit_ppm;  /* of AntDip, double */
  GPtrArray *class_name, *note;   /* char*; the notes are owned */
  gboolean asked, judged;         /* there is an asked dip; the analyst has said something */
} Rows;

/* What is to be saved, as it stood when the user asked; later changes of the window do not touch it. */
typedef struct
{
  AntWindow *window; /* until the file has been chosen: the order may end on another thread, a widget may not */
  AntSaveMake make;
  AntRecord *record;
  AntScanResults *results; /* or NULL */
  AntJudgements *judgements;
  AntResultTable which;
  AntTableFormat format;
  AntPaper paper;
  GPtrArray *comparisons;  /* of a report: AntComparison */
  Rows rows;               /* of a list of dips */
} Order;

static void
rows_clear (Rows *rows)
{
  g_clear_pointer (&rows->dip, g_array_unref);
  g_clear_pointer (&rows->upper_limit_ppm, g_array_unref);
  g_clear_pointer (&rows->class_name, g_ptr_array_unref);
  g_clear_pointer (&rows->note, g_ptr_array_unref);
}

/* Those of the kinds that the list shows, in its own order. */
static void
rows_take (Rows *rows, AntDesk *desk)
{
  GListModel *items = ant_desk_get_items (desk);
  *rows = (Rows) { g_array_new (FALSE, FALSE, sizeof (AntDip)), g_array_new (FALSE, FALSE, sizeof (double)),
                   g_ptr_array_new (), g_ptr_array_new_with_free_func (g_free), FALSE, FALSE };
  for (guint i = 0; i < g_list_model_get_n_items (items); i++)
    {
      g_autoptr (AntDipItem) item = g_list_model_get_item (items, i);
      double upper_limit_ppm = ant_dip_item_get_upper_limit_ppm (item);
      if (!(ant_dip_item_get_kind (item) & ant_desk_get_shown (desk)))
        continue;
      g_array_append_vals (rows->dip, ant_dip_item_get_dip (item), 1);
      g_array_append_val (rows->upper_limit_ppm, upper_limit_ppm);
      g_ptr_array_add (rows->class_name, (gpointer) (gsize) ant_dip_class_name (ant_dip_item_get_class (item)));
      g_ptr_array_add (rows->note, g_strdup (ant_dip_item_get_note (item)));
      rows->asked |= ant_dip_item_get_kind (item) == ANT_KIND_ASKED;
      rows->judged |= ant_dip_item_get_class (item) != ANT_CLASS_UNDECIDED || *ant_dip_item_get_note (item);
    }
}

static void
order_free (gpointer data)
{
  Order *order = data;
  ant_record_unref (order->record);
  ant_scan_results_unref (order->results);
  ant_judgements_free (order->judgements);
  g_clear_pointer (&order->comparisons, g_ptr_array_unref);
  g_clear_object (&order->window);
  rows_clear (&order->rows);
  g_free (order);
}

static Order *
order_new (AntWindow *self, AntSaveMake make)
{
  Order *order = g_new0 (Order, 1);
  const AntScanResults *results = ant_desk_get_results (self->desk);
  order->window = g_object_ref (self);
  order->make = make;
  order->record = ant_record_ref ((AntRecord *) (gsize) ant_desk_get_record (self->desk));
  order->judgements = ant_judgements_copy (ant_analysis_get_judgements (ant_desk_get_analysis (self->desk)));
  order->results = results ? ant_scan_results_ref ((AntScanResults *) (gsize) results) : NULL;
  return order;
}

/* The application stays until the file is whole, even if its windows are closed. */
static void
saved_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntWindow) self = data;
  g_autoptr (GError) error = NULL;
  if (!ant_save_task_finish (result, &error))
    ant_window_complain (self, error->message);
  if (g_application_get_default ())
    g_application_release (g_application_get_default ());
}

static void
start (Order *order, const char *path)
{
  if (g_application_get_default ())
    g_application_hold (g_application_get_default ());
  ant_save_task_async (path, order->make, order, order_free, saved_cb, g_steal_pointer (&order->window));
}

static void
table_chosen_cb (const char *path, gpointer data)
{
  Order *order = data;
  g_autoptr (GError) error = NULL;
  if (path && ant_table_format_of (path, &order->format, &error))
    {
      start (order, path);
      return;
    }
  if (error)
    ant_window_complain (order->window, error->message);
  order_free (order);
}

static GBytes *
make_table (gconstpointer data, GError **error)
{
  const Order *order = data;
  g_autoptr (AntTable) table = ant_result_table_new (order->which, order->results, order->judgements);
  return ant_table_bytes (table, order->format, error);
}

/* As the command writes it, but for what the analyst has added: asked dips, classes and notes. */
static GBytes *
make_list (gconstpointer data, GError **error)
{
  const Order *order = data;
  const Rows *rows = &order->rows;
  AntDipList list = ant_scan_results_list (order->results, order->which == ANT_RESULT_BRIGHTENINGS);
  list.n = rows->dip->len;
  list.dip = (const AntDip *) (gpointer) rows->dip->data;
  if (rows->asked)
    list.upper_limit_ppm = (const double *) (gpointer) rows->upper_limit_ppm->data;
  if (rows->judged)
    {
      list.analyst_class = (const char *const *) rows->class_name->pdata;
      list.analyst_note = (const char *const *) rows->note->pdata;
    }
  g_autoptr (AntTable) table = ant_dip_table_new (order->record, &list);
  return ant_table_bytes (table, order->format, error);
}

static GBytes *
make_flags (gconstpointer data, GError **error)
{
  const Order *order = data;
  const guint16 *flags = order->results ? order->results->flags : order->record->flags;
  if (order->format == ANT_TABLE_CSV)
    return g_string_free_to_bytes (ant_flags_table_text (order->record, flags));
  g_autoptr (AntTable) mask = ant_mask_table_new (order->record, flags);
  return ant_table_bytes (mask, order->format, error);
}

void
ant_window_save_list (AntWindow *self)
{
  guint shown = ant_desk_get_shown (self->desk);
  Order *order = order_new (self, shown == ANT_KIND_PASSAGE ? make_table : make_list);
  const char *name = "dips.csv";
  order->which = ANT_RESULT_DIPS;
  if (shown == ANT_KIND_BRIGHTENING)
    order->which = ANT_RESULT_BRIGHTENINGS, name = "brightenings.csv";
  else if (shown == ANT_KIND_PASSAGE)
    order->which = ANT_RESULT_PASSAGES, name = "passages.csv";
  rows_take (&order->rows, self->desk);
  ant_file_prompt_save (GTK_WINDOW (self), _("Save the List as CSV, FITS or VOTable"), name, table_chosen_cb, order);
}

void
ant_window_save_flags (AntWindow *self)
{
  ant_file_prompt_save (GTK_WINDOW (self), _("Save the Flags as CSV or FITS"), "flags.csv", table_chosen_cb, order_new (self, make_flags));
}

void
ant_window_save_series (AntWindow *self)
{
  Order *order = order_new (self, make_table);
  order->which = ANT_RESULT_SERIES;
  ant_file_prompt_save (GTK_WINDOW (self), _("Save the Detrended Series as CSV or FITS"), "series.csv", table_chosen_cb, order);
}

static GBytes *
make_report (gconstpointer data, GError **error)
{
  const Order *order = data;
  g_autofree AntReportWord *word = ant_report_words (order->results, order->judgements);
  return ant_report_bytes (order->results, word, order->comparisons, order->paper, error);
}

void
ant_window_write_report (AntWindow *self, const char *path)
{
  Order *order = order_new (self, make_report);
  order->comparisons = ant_desk_get_comparisons (self->desk);
  order->paper = (AntPaper) ant_desk_get_settings (self->desk)->paper;
  start (order, path);
}

static void
report_chosen_cb (const char *path, gpointer data)
{
  g_autoptr (AntWindow) self = data;
  if (path && ant_desk_get_results (self->desk))
    ant_window_write_report (self, path);
}

void
ant_window_save_report (AntWindow *self)
{
  ant_file_prompt_save (GTK_WINDOW (self), _("Save the Report as PDF"), "report.pdf", report_chosen_cb, g_object_ref (self));
}
