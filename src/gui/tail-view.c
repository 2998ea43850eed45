/* tail-view.c - the tail chart. */
#include "gui/tail-view.h"

#include <glib/gi18n.h>

#include "jobs/tail-data.h"

struct _AntTailView
{
  AntPlotView parent_instance;
  AntTailData *data; /* of the present results, or NULL */
};

G_DEFINE_FINAL_TYPE (AntTailView, ant_tail_view, ANT_TYPE_PLOT_VIEW)

static void
ant_tail_view_desk_changed (AntPlotView *plot, AntDeskChange what)
{
  AntTailView *self = ANT_TAIL_VIEW (plot);
  const AntScanResults *results = ant_desk_get_results (ant_plot_view_get_desk (plot));
  if (!(what & (ANT_DESK_RECORD | ANT_DESK_RESULTS)))
    return;
  g_clear_pointer (&self->data, ant_tail_data_free);
  if (results)
    self->data = ant_tail_data_new (results);
}

static void
ant_tail_view_paint (AntPlotView *plot, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale)
{
  AntTailView *self = ANT_TAIL_VIEW (plot);
  if (!self->data)
    return;
  AntView view;
  ant_tail_chart_view (&self->data->chart, &view);
  ant_tail_chart_paint (cr, box, &self->data->chart, &view, theme, scale);
}

static char *
ant_tail_view_describe (AntPlotView *plot)
{
  const AntScanResults *results = ant_desk_get_results (ant_plot_view_get_desk (plot));
  if (!results)
    return g_strdup (_("Nothing to show before a scan"));
  g_autofree char *chance = ant_chance_words (results->expected_at_threshold);
  return g_strdup_printf (_("How many reach an SNR, durations of 9 h and less: at the threshold of %.1f, %zu dips, %zu "
                            "brightenings, %s of each expected from noise alone"),
                          results->threshold_snr, results->n_mirror_dips, results->n_mirrored, chance);
}

static void
ant_tail_view_finalize (GObject *object)
{
  ant_tail_data_free (ANT_TAIL_VIEW (object)->data);
  G_OBJECT_CLASS (ant_tail_view_parent_class)->finalize (object);
}

static void
ant_tail_view_class_init (AntTailViewClass *klass)
{
  AntPlotViewClass *plot_class = ANT_PLOT_VIEW_CLASS (klass);
  G_OBJECT_CLASS (klass)->finalize = ant_tail_view_finalize;
  plot_class->watches = ANT_DESK_RECORD | ANT_DESK_RESULTS;
  plot_class->paint = ant_tail_view_paint;
  plot_class->describe = ant_tail_view_describe;
  plot_class->desk_changed = ant_tail_view_desk_changed;
}

static void
ant_tail_view_init (AntTailView *self)
{
  ant_plot_view_set_title (ANT_PLOT_VIEW (self), _("Counts of dip SNR"));
}
