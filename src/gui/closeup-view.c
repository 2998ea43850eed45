/* closeup-view.c - the close-up of the selected dip. */
#include "gui/closeup-view.h"

#include <glib/gi18n.h>

#include "jobs/closeup-data.h"

struct _AntCloseupView
{
  AntPlotView parent_instance;
  AntCloseupData *data; /* of the selected dip, or NULL */
};

G_DEFINE_FINAL_TYPE (AntCloseupView, ant_closeup_view, ANT_TYPE_PLOT_VIEW)

static void
ant_closeup_view_desk_changed (AntPlotView *plot, AntDeskChange what)
{
  AntCloseupView *self = ANT_CLOSEUP_VIEW (plot);
  AntDesk *desk = ant_plot_view_get_desk (plot);
  AntDipItem *item = ant_desk_get_selected (desk);
  if (!(what & (ANT_DESK_SELECTION | ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_WITNESS)))
    return;
  g_clear_pointer (&self->data, ant_closeup_data_free);
  if (!item || !ant_desk_get_layers (desk))
    return;
  if (ant_dip_item_get_kind (item) == ANT_KIND_PASSAGE)
    self->data = ant_closeup_data_new_passage (ant_desk_get_results (desk), ant_dip_item_get_dip (item));
  else
    {
      const AntWitnessStrips *witness = ant_desk_get_witness_strips (desk, 0);
      self->data = ant_closeup_data_new (ant_desk_get_layers (desk), ant_desk_get_settings (desk), ant_dip_item_get_dip (item),
                                         ant_dip_item_get_verdict (item));
      if (witness)
        ant_closeup_data_add_witness (self->data, witness->comparison, ant_dip_item_get_dip (item));
    }
  g_autofree char *title = ant_dip_item_title (item);
  ant_plot_view_set_title (plot, title);
}

static void
ant_closeup_view_paint (AntPlotView *plot, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale)
{
  AntCloseupView *self = ANT_CLOSEUP_VIEW (plot);
  if (!self->data || self->data->closeup.n == 0)
    return;
  AntView view;
  ant_dip_closeup_view (&self->data->closeup, &view);
  ant_dip_closeup_paint (cr, box, &self->data->closeup, &view, theme, scale);
}

static char *
ant_closeup_view_describe (AntPlotView *plot)
{
  AntDesk *desk = ant_plot_view_get_desk (plot);
  AntDipItem *item = ant_desk_get_selected (desk);
  if (!item)
    return g_strdup (_("No dip is selected"));
  g_autofree char *depth = ant_depth_words (ant_desk_get_record (desk), ant_dip_item_get_dip (item), ANT_DEPTH_PPM);
  g_autofree char *length = ant_length_words (ant_dip_item_get_dip (item)->duration_d);
  if (ant_dip_item_get_kind (item) == ANT_KIND_PASSAGE)
    return g_strdup_printf (_("The passage's values with the slow part over them: %s, %s long at half depth"), depth,
                            length);
  return g_strdup_printf (ant_desk_get_witness_strips (desk, 0)
                              ? _("The dip's samples with the fitted crossing and its rivals over them, what each leaves, and the witness: %s, %s long")
                              : _("The dip's samples with the fitted crossing and its rivals over them, and what each leaves: %s, %s long"),
                          depth, length);
}

static void
ant_closeup_view_finalize (GObject *object)
{
  ant_closeup_data_free (ANT_CLOSEUP_VIEW (object)->data);
  G_OBJECT_CLASS (ant_closeup_view_parent_class)->finalize (object);
}

static void
ant_closeup_view_class_init (AntCloseupViewClass *klass)
{
  AntPlotViewClass *plot_class = ANT_PLOT_VIEW_CLASS (klass);
  G_OBJECT_CLASS (klass)->finalize = ant_closeup_view_finalize;
  plot_class->watches = ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_SELECTION | ANT_DESK_WITNESS;
  plot_class->paint = ant_closeup_view_paint;
  plot_class->describe = ant_closeup_view_describe;
  plot_class->desk_changed = ant_closeup_view_desk_changed;
}

static void
ant_closeup_view_init (AntCloseupView *self)
{
  ant_plot_view_set_title (ANT_PLOT_VIEW (self), _("Close-up"));
}
