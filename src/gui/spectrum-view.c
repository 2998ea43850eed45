/* spectrum-view.c - the spectrum chart. */
#include "gui/spectrum-view.h"

#include <glib/gi18n.h>

#include "plot/spectrum-chart.h"

struct _AntSpectrumView
{
  AntPlotView parent_instance;
  guint chunk;
};

G_DEFINE_FINAL_TYPE (AntSpectrumView, ant_spectrum_view, ANT_TYPE_PLOT_VIEW)

static const AntChunk *
chunk_of (AntSpectrumView *self)
{
  const AntScanResults *results = ant_desk_get_results (ant_plot_view_get_desk (ANT_PLOT_VIEW (self)));
  return results && self->chunk < results->n_chunks ? &results->chunk[self->chunk] : NULL;
}

static void
ant_spectrum_view_paint (AntPlotView *plot, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale)
{
  const AntChunk *chunk = chunk_of (ANT_SPECTRUM_VIEW (plot));
  if (!chunk)
    return;
  const AntRecord *record = ant_desk_get_record (ant_plot_view_get_desk (plot));
  AntSpectrumChart chart = { .n = chunk->n_bins,
                             .frequency_cd = chunk->frequency_cd,
                             .power = chunk->power_unmasked,
                             .model = &chunk->model,
                             .white_psd = ant_noise_white_psd (chunk->model.white_ppm * chunk->model.white_ppm,
                                                               record->series.step_d) };
  AntView view;
  ant_spectrum_chart_view (&chart, &view);
  ant_spectrum_chart_paint (cr, box, &chart, &view, theme, scale);
}

static char *
ant_spectrum_view_describe (AntPlotView *plot)
{
  const AntChunk *chunk = chunk_of (ANT_SPECTRUM_VIEW (plot));
  if (!chunk)
    return g_strdup (_("Nothing to show before a scan"));
  return g_strdup_printf (
      _("Power against frequency, %zu measured points, fitted by %zu parts and white noise of %.1f ppm"),
      chunk->n_bins, chunk->model.n_parts, chunk->model.white_ppm);
}

void
ant_spectrum_view_set_chunk (AntSpectrumView *self, guint chunk)
{
  self->chunk = chunk;
  ant_plot_view_redraw (ANT_PLOT_VIEW (self));
}

static void
ant_spectrum_view_class_init (AntSpectrumViewClass *klass)
{
  AntPlotViewClass *plot_class = ANT_PLOT_VIEW_CLASS (klass);
  plot_class->watches = ANT_DESK_RECORD | ANT_DESK_RESULTS;
  plot_class->paint = ant_spectrum_view_paint;
  plot_class->describe = ant_spectrum_view_describe;
}

static void
ant_spectrum_view_init (AntSpectrumView *self)
{
  ant_plot_view_set_title (ANT_PLOT_VIEW (self), _("Power spectrum"));
}
