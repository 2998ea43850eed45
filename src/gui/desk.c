/* desk.c - the things on the desk, selection and judgement. */
#include "gui/desk-private.h"

#include <math.h>

G_DEFINE_FINAL_TYPE (AntDesk, ant_desk, G_TYPE_OBJECT)

enum
{
  CHANGED,
  FAILED,
  N_SIGNALS
};
static guint signals[N_SIGNALS];

void
ant_desk_tell (AntDesk *self, AntDeskChange what)
{
  if (what & (ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_SELECTION))
    ant_desk_follow_snr (self);
  if ((what & (ANT_DESK_RECORD | ANT_DESK_SETTINGS)) && ant_desk_follow_witnesses (self))
    what |= ANT_DESK_WITNESS;
  if (what & ANT_DESK_RECORD)
    ant_desk_follow_columns (self);
  g_signal_emit (self, signals[CHANGED], 0, (guint) what);
}

void
ant_desk_fail (AntDesk *self, const char *sentence)
{
  g_signal_emit (self, signals[FAILED], 0, sentence);
}

AntDesk *
ant_desk_new (void)
{
  return g_object_new (ANT_TYPE_DESK, NULL);
}

const AntLayers *
ant_desk_get_layers (AntDesk *self)
{
  return self->layers;
}

const AntRecord *
ant_desk_get_record (AntDesk *self)
{
  return self->layers ? self->layers->record : NULL;
}

const AntScanResults *
ant_desk_get_results (AntDesk *self)
{
  return self->results;
}

gboolean
ant_desk_is_stale (AntDesk *self)
{
  return self->results && ant_analysis_is_stale (self->analysis);
}

const AntAnalysis *
ant_desk_get_analysis (AntDesk *self)
{
  return self->analysis;
}

char *
ant_desk_get_name (AntDesk *self)
{
  const char *path = ant_analysis_get_path (self->analysis);
  if (!path)
    path = ant_analysis_get_record_path (self->analysis);
  g_autofree char *name = path ? g_path_get_basename (path) : NULL;
  return name ? g_filename_display_name (name) : NULL;
}

gboolean
ant_desk_lacks_record (AntDesk *self)
{
  return !self->layers && ant_analysis_get_record_path (self->analysis) != NULL;
}

GListModel *
ant_desk_get_items (AntDesk *self)
{
  return G_LIST_MODEL (self->items);
}

const AntSettings *
ant_desk_get_settings (AntDesk *self)
{
  return &ant_analysis_get_treatment (self->analysis)->settings;
}

AntDipItem *
ant_desk_get_selected (AntDesk *self)
{
  return self->selected;
}

void
ant_desk_select (AntDesk *self, AntDipItem *item)
{
  if (item == self->selected)
    return;
  g_set_object (&self->selected, item);
  if (item)
    ant_desk_bring_into_view (self, ant_dip_item_get_dip (item));
  ant_desk_tell (self, ANT_DESK_SELECTION | ANT_DESK_VIEW);
}

void
ant_desk_select_next (AntDesk *self, int step)
{
  gsize n = self->mark_items->len, at = ant_desk_get_selected_mark (self);
  if (n == 0)
    return;
  if (at == ANT_NO_DIP)
    at = step > 0 ? 0 : n - 1;
  else
    at = step > 0 ? MIN (at + 1, n - 1) : at - (at > 0);
  ant_desk_select_mark (self, at);
}

static int
by_time (gconstpointer a, gconstpointer b)
{
  const AntDip *one = ant_dip_item_get_dip (*(AntDipItem *const *) a);
  const AntDip *other = ant_dip_item_get_dip (*(AntDipItem *const *) b);
  return (one->mid_d > other->mid_d) - (one->mid_d < other->mid_d);
}

void
ant_desk_make_marks (AntDesk *self)
{
  g_ptr_array_set_size (self->mark_items, 0);
  g_array_set_size (self->marks, 0);
  guint n = g_list_model_get_n_items (G_LIST_MODEL (self->items));
  for (guint i = 0; i < n; i++)
    {
      g_autoptr (AntDipItem) item = g_list_model_get_item (G_LIST_MODEL (self->items), i);
      if (ant_desk_keeps (self, item))
        g_ptr_array_add (self->mark_items, item);
    }
  g_ptr_array_sort (self->mark_items, by_time);
  for (guint i = 0; i < self->mark_items->len; i++)
    {
      AntDipItem *item = g_ptr_array_index (self->mark_items, i);
      const AntDip *dip = ant_dip_item_get_dip (item);
      AntDipMark mark = { dip->mid_d, dip->duration_d, dip->depth_ppm, ant_dip_item_get_number (item),
                          ant_dip_item_look (item), ant_dip_item_sign (item) };
      g_array_append_val (self->marks, mark);
    }
}

gsize
ant_desk_get_marks (AntDesk *self, const AntDipMark **marks)
{
  *marks = &g_array_index (self->marks, AntDipMark, 0);
  return self->marks->len;
}

gsize
ant_desk_get_selected_mark (AntDesk *self)
{
  guint index;
  return self->selected && g_ptr_array_find (self->mark_items, self->selected, &index) ? index : ANT_NO_DIP;
}

void
ant_desk_select_mark (AntDesk *self, gsize index)
{
  ant_desk_select (self, index < self->mark_items->len ? g_ptr_array_index (self->mark_items, index) : NULL);
}

AntDepthUnit
ant_desk_get_unit (AntDesk *self)
{
  return self->unit;
}

void
ant_desk_set_unit (AntDesk *self, AntDepthUnit unit)
{
  self->unit = unit;
  ant_desk_tell (self, ANT_DESK_LOOK);
}

int
ant_desk_get_average (AntDesk *self)
{
  return self->average;
}

void
ant_desk_set_average (AntDesk *self, int average)
{
  self->average = CLAMP (average, -1, ANT_N_AVERAGES - 1);
  ant_desk_tell (self, ANT_DESK_LOOK);
}

static void
ant_desk_dispose (GObject *object)
{
  AntDesk *self = ANT_DESK (object);
  ant_desk_abandon (self);
  ant_desk_drop_snr (self);
  ant_desk_drop_fold (self);
  ant_desk_drop_sky (self);
  g_ptr_array_set_size (self->witnesses, 0);
  g_ptr_array_set_size (self->shown_columns, 0);
  ant_desk_stop_keeping (self);
  g_clear_object (&self->selected);
  g_ptr_array_set_size (self->mark_items, 0);
  g_list_store_remove_all (self->items);
  G_OBJECT_CLASS (ant_desk_parent_class)->dispose (object);
}

static void
ant_desk_finalize (GObject *object)
{
  AntDesk *self = ANT_DESK (object);
  g_clear_object (&self->stop);
  g_object_unref (self->items);
  g_array_unref (self->marks);
  g_array_unref (self->ticks);
  g_ptr_array_unref (self->witnesses);
  g_ptr_array_unref (self->shown_columns);
  g_free (self->filter);
  ant_observer_choice_unref (self->observer);
  g_ptr_array_unref (self->mark_items);
  g_array_unref (self->mask_spans);
  ant_layers_unref (self->layers);
  ant_analysis_free (self->analysis);
  ant_analysis_free (self->incoming);
  ant_treatment_free (self->read_with);
  ant_treatment_free (self->opening_with);
  ant_treatment_free (self->scanning_with);
  g_free (self->left_behind);
  g_free (self->left_behind_of);
  g_free (self->recovering);
  g_free (self->opening);
  g_free (self->refused);
  G_OBJECT_CLASS (ant_desk_parent_class)->finalize (object);
}

static void
ant_desk_class_init (AntDeskClass *klass)
{
  GObjectClass *object_class = G_OBJECT_CLASS (klass);
  object_class->dispose = ant_desk_dispose;
  object_class->finalize = ant_desk_finalize;
  signals[CHANGED] =
      g_signal_new ("changed", ANT_TYPE_DESK, G_SIGNAL_RUN_LAST, 0, NULL, NULL, NULL, G_TYPE_NONE, 1, G_TYPE_UINT);
  signals[FAILED] =
      g_signal_new ("failed", ANT_TYPE_DESK, G_SIGNAL_RUN_LAST, 0, NULL, NULL, NULL, G_TYPE_NONE, 1, G_TYPE_STRING);
}

static void
ant_desk_init (AntDesk *self)
{
  self->repeat = ANT_NO_DIP;
  self->items = g_list_store_new (ANT_TYPE_DIP_ITEM);
  self->marks = g_array_new (FALSE, TRUE, sizeof (AntDipMark));
  self->mark_items = g_ptr_array_new ();
  self->ticks = g_array_new (FALSE, TRUE, sizeof (double));
  self->witnesses = g_ptr_array_new_with_free_func (ant_desk_held_witness_free);
  self->shown_columns = g_ptr_array_new_with_free_func (ant_desk_shown_column_free);
  self->observer = ant_observer_choice_new_earth ();
  self->sky_selected = ANT_NO_EVENT;
  self->mask_spans = g_array_new (FALSE, FALSE, sizeof (AntSpan));
  static guint number; /* each desk of the program keeps its unsaved work under a number of its own */
  self->number = ++number;
  self->analysis = ant_analysis_new ();
  self->shown = ANT_KIND_DIP | ANT_KIND_ASKED;
  self->filter = g_strdup ("");
  self->pointer_d = NAN;
  self->snr_wanted_d = ANT_USUAL_SNR_D;
  self->witness_look = ANT_WITNESS_RATIO;
  self->span = (AntSpan) { NAN, NAN };
  self->progress.stage_left_s = NAN;
}
