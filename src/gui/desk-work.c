/* desk-work.c - the desk's long work: scanning, asking. A late answer to work that was abandoned is dropped. */
#include "gui/desk-private.h"

#include <math.h>

AntBusy
ant_desk_get_busy (AntDesk *self)
{
  return self->busy;
}

const char *
ant_desk_get_opening (AntDesk *self)
{
  return self->opening;
}

const AntTaskProgress *
ant_desk_get_progress (AntDesk *self)
{
  return &self->progress;
}

GCancellable *
ant_desk_begin (AntDesk *self, AntBusy busy)
{
  ant_desk_abandon (self);
  self->busy = busy;
  self->stop = g_cancellable_new ();
  self->progress = (AntTaskProgress) { .stage_left_s = NAN };
  return self->stop;
}

gboolean
ant_desk_end (AntDesk *self, GAsyncResult *result)
{
  if (g_task_get_cancellable (G_TASK (result)) != self->stop)
    return FALSE;
  self->busy = ANT_BUSY_NO;
  g_clear_object (&self->stop);
  g_clear_pointer (&self->opening, g_free);
  return TRUE;
}

void
ant_desk_abandon (AntDesk *self)
{
  if (self->busy == ANT_BUSY_NO)
    return;
  g_cancellable_cancel (self->stop);
  g_clear_object (&self->stop);
  g_clear_pointer (&self->opening, g_free);
  g_clear_pointer (&self->incoming, ant_analysis_free);
  self->busy = ANT_BUSY_NO;
  ant_desk_tell (self, ANT_DESK_BUSY);
}

void
ant_desk_stop (AntDesk *self)
{
  if (self->busy != ANT_BUSY_SCANNING)
    {
      if (self->busy != ANT_BUSY_STOPPING)
        ant_desk_abandon (self);
      return;
    }
  g_cancellable_cancel (self->stop);
  self->busy = ANT_BUSY_STOPPING;
  ant_desk_tell (self, ANT_DESK_BUSY);
}

/* What the analysis says of it. */
static void
judge_item (AntDesk *self, AntDipItem *item)
{
  const AntJudgements *judgements = ant_analysis_get_judgements (self->analysis);
  const AntDip *dip = ant_dip_item_get_dip (item);
  ant_dip_item_judge (item, ant_judgements_class (judgements, dip->mid_d, dip->duration_d),
                      ant_judgements_note (judgements, dip->mid_d, dip->duration_d));
}

void
ant_desk_judge_items (AntDesk *self)
{
  for (guint i = 0; i < g_list_model_get_n_items (G_LIST_MODEL (self->items)); i++)
    {
      g_autoptr (AntDipItem) item = g_list_model_get_item (G_LIST_MODEL (self->items), i);
      judge_item (self, item);
    }
}

static void
add_items (AntDesk *self, AntDipKind kind, gsize n, const AntDip *dip, const AntVerdict *verdict)
{
  for (gsize i = 0; i < n; i++)
    {
      g_autoptr (AntDipItem) item = ant_dip_item_new (kind, (guint) i + 1, &dip[i], NAN);
      ant_dip_item_set_verdict (item, verdict ? &verdict[i] : NULL);
      judge_item (self, item);
      g_list_store_append (self->items, item);
    }
}

/* Asked dips outlive a scan. */
static GPtrArray *
asked_items (AntDesk *self)
{
  GPtrArray *asked = g_ptr_array_new_with_free_func (g_object_unref);
  for (guint i = 0; i < g_list_model_get_n_items (G_LIST_MODEL (self->items)); i++)
    {
      g_autoptr (AntDipItem) item = g_list_model_get_item (G_LIST_MODEL (self->items), i);
      if (ant_dip_item_get_kind (item) == ANT_KIND_ASKED)
        g_ptr_array_add (asked, g_steal_pointer (&item));
    }
  return asked;
}

/* The dip at the same place as the one that was selected, so that a new scan keeps the eye where it was. */
static void
select_again (AntDesk *self, double mid_d)
{
  for (gsize i = 0; i < self->marks->len; i++)
    {
      const AntDipMark *mark = &g_array_index (self->marks, AntDipMark, i);
      if (fabs (mark->mid_d - mid_d) < mark->duration_d / 2)
        g_set_object (&self->selected, g_ptr_array_index (self->mark_items, i));
    }
}

void
ant_desk_clear_items (AntDesk *self)
{
  g_clear_object (&self->selected);
  g_ptr_array_set_size (self->mark_items, 0);
  g_array_set_size (self->marks, 0);
  g_list_store_remove_all (self->items);
  ant_desk_drop_fold (self);
}

void
ant_desk_make_items (AntDesk *self)
{
  double selected_d = self->selected ? ant_dip_item_get_dip (self->selected)->mid_d : NAN;
  g_autoptr (GPtrArray) asked = asked_items (self);
  ant_desk_clear_items (self);
  self->results = ant_analysis_get_results (self->analysis);
  if (self->results)
    {
      add_items (self, ANT_KIND_DIP, self->results->n_dips, self->results->dip, self->results->dip_verdict);
      add_items (self, ANT_KIND_BRIGHTENING, self->results->n_brightenings, self->results->brightening,
                 self->results->brightening_verdict);
      g_autofree AntDip *passage = g_new (AntDip, self->results->n_passages + 1);
      for (gsize i = 0; i < self->results->n_passages; i++)
        passage[i] = ant_passage_as_dip (&self->results->passage[i]);
      add_items (self, ANT_KIND_PASSAGE, self->results->n_passages, passage, NULL);
    }
  for (guint i = 0; i < asked->len; i++)
    g_list_store_append (self->items, g_ptr_array_index (asked, i));
  ant_desk_make_marks (self);
  select_again (self, selected_d);
  ant_desk_begin_fold (self);
}

/* The bytes may have been read anew for the scan; that they are others is said. */
static AntDeskChange
take_outcome (AntDesk *self, AntScanOutcome *outcome)
{
  gboolean read_again = self->layers && self->layers->record != outcome->results->record;
  g_autofree char *changed = ant_analysis_take_record (self->analysis, outcome->results->record);
  g_clear_pointer (&self->layers, ant_layers_unref);
  g_clear_pointer (&self->read_with, ant_treatment_free);
  self->layers = g_steal_pointer (&outcome->layers);
  self->read_with = ant_treatment_copy (self->scanning_with);
  ant_analysis_set_results (self->analysis, outcome->results, self->scanning_with);
  ant_desk_make_items (self);
  if (changed)
    ant_desk_fail (self, changed);
  return ANT_DESK_RESULTS | ANT_DESK_SELECTION | ANT_DESK_BUSY | (read_again ? ANT_DESK_RECORD : 0);
}

static void
scanned_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntDesk) self = data;
  g_autoptr (GError) error = NULL;
  g_autoptr (AntScanOutcome) outcome = ant_scan_task_finish (result, &error);
  if (!ant_desk_end (self, result))
    return;
  gboolean better = outcome && (!self->results || outcome->results->reach >= self->results->reach);
  if (better)
    ant_desk_changed (self, take_outcome (self, outcome));
  else
    ant_desk_tell (self, ANT_DESK_BUSY);
  if (!outcome && !g_error_matches (error, G_IO_ERROR, G_IO_ERROR_CANCELLED))
    ant_desk_fail (self, error->message);
}

static void
progress_cb (const AntTaskProgress *progress, gpointer data)
{
  AntDesk *self = data;
  if (self->busy != ANT_BUSY_SCANNING)
    return;
  self->progress = *progress;
  ant_desk_tell (self, ANT_DESK_BUSY);
}

void
ant_desk_start_scan (AntDesk *self, AntLayers *layers)
{
  AntTreatment *treatment = ant_treatment_copy (ant_analysis_get_treatment (self->analysis));
  GCancellable *stop = ant_desk_begin (self, ANT_BUSY_SCANNING);
  g_autoptr (GPtrArray) comparisons = ant_desk_get_comparisons (self);
  g_clear_pointer (&self->scanning_with, ant_treatment_free);
  self->scanning_with = treatment;
  ant_desk_name_compared (self, treatment); /* one that cannot be read is no evidence */
  ant_scan_task_async (layers, &treatment->settings, treatment->observer ? self->observer : NULL, treatment->witnesses, comparisons, stop,
                       progress_cb, scanned_cb, g_object_ref (self));
  ant_desk_tell (self, ANT_DESK_BUSY);
}

void
ant_desk_scan (AntDesk *self)
{
  if (!self->layers)
    return;
  if (ant_treatment_same_grid (self->read_with, ant_analysis_get_treatment (self->analysis)))
    ant_desk_start_scan (self, self->layers);
  else
    ant_desk_read_for_scan (self);
}

static guint
next_asked_number (AntDesk *self)
{
  g_autoptr (GPtrArray) asked = asked_items (self);
  return asked->len + 1;
}

static void
asked_cb (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (AntDesk) self = data;
  g_autoptr (GError) error = NULL;
  g_autofree AntAskedDip *asked = ant_ask_task_finish (result, &error);
  if (!ant_desk_end (self, result))
    return;
  if (asked)
    {
      g_autoptr (AntDipItem) item
          = ant_dip_item_new (ANT_KIND_ASKED, next_asked_number (self), &asked->dip, asked->upper_limit_ppm);
      ant_dip_item_set_verdict (item, &asked->verdict);
      judge_item (self, item);
      g_list_store_append (self->items, item);
      self->shown = self->shown == ANT_KIND_PASSAGE ? ANT_KIND_DIP | ANT_KIND_ASKED : self->shown | ANT_KIND_ASKED;
      ant_desk_make_marks (self);
      g_set_object (&self->selected, item);
    }
  self->span = (AntSpan) { NAN, NAN };
  ant_desk_tell (self, ANT_DESK_BUSY | ANT_DESK_POINTER
                           | (asked ? ANT_DESK_RESULTS | ANT_DESK_SELECTION | ANT_DESK_LOOK : 0));
  if (!asked)
    ant_desk_fail (self, error->message);
}

void
ant_desk_ask (AntDesk *self, double from_d, double to_d)
{
  if (!self->layers || !(to_d > from_d))
    return;
  GCancellable *stop = ant_desk_begin (self, ANT_BUSY_ASKING);
  g_autoptr (AntTreatment) treatment = ant_treatment_copy (ant_analysis_get_treatment (self->analysis));
  g_autoptr (GPtrArray) comparisons = ant_desk_get_comparisons (self);
  ant_desk_name_compared (self, treatment);
  ant_ask_task_async (self->layers, &treatment->settings, treatment->observer ? self->observer : NULL, treatment->witnesses, comparisons,
                      (from_d + to_d) / 2, to_d - from_d, stop, asked_cb, g_object_ref (self));
  ant_desk_tell (self, ANT_DESK_BUSY);
}
