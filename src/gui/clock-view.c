/* clock-view.c - the chart of a fold by a clock of the instrument's own. */
#include "gui/clock-view.h"

#include <glib/gi18n.h>

#include "plot/clock-chart.h"

struct _AntClockView
{
  AntPlotView parent_instance;
  AntClockFold *fold; /* owned; NULL: nothing is folded */
  char *what;         /* owned */
};

G_DEFINE_FINAL_TYPE (AntClockView, ant_clock_view, ANT_TYPE_PLOT_VIEW)

void
ant_clock_view_set_fold (AntClockView *self, AntClockFold *fold, const char *what)
{
  g_free (self->fold);
  g_free (self->what);
  self->fold = fold;
  self->what = g_strdup (what);
  ant_plot_view_redraw (ANT_PLOT_VIEW (self));
}

static void
ant_clock_view_paint (AntPlotView *plot, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale)
{
  AntClockView *self = ANT_CLOCK_VIEW (plot);
  AntView view;
  if (!self->fold)
    {
      ant_pen_remark (cr, box, _("Nothing is folded"), theme, scale);
      return;
    }
  AntClockChart chart = { self->what, self->fold->options.clock, self->fold->options.n_bins, self->fold->bin };
  ant_clock_chart_view (&chart, &view);
  ant_clock_chart_paint (cr, box, &chart, &view, theme, scale);
}

static char *
ant_clock_view_describe (AntPlotView *plot)
{
  const AntClockView *self = ANT_CLOCK_VIEW (plot);
  if (!self->fold)
    return g_strdup (_("Nothing is folded"));
  return g_strdup_printf (_("%s by %s in %u bins; the greatest difference of two is %.4g, %.3g times its error"), self->what,
                          self->fold->options.clock == ANT_FOLD_ORBIT ? _("phase of the orbit") : _("minutes since a gap"),
                          self->fold->options.n_bins, self->fold->swing, self->fold->significance);
}

static void
ant_clock_view_finalize (GObject *object)
{
  g_free (ANT_CLOCK_VIEW (object)->fold);
  g_free (ANT_CLOCK_VIEW (object)->what);
  G_OBJECT_CLASS (ant_clock_view_parent_class)->finalize (object);
}

static void
ant_clock_view_class_init (AntClockViewClass *klass)
{
  AntPlotViewClass *plot_class = ANT_PLOT_VIEW_CLASS (klass);
  G_OBJECT_CLASS (klass)->finalize = ant_clock_view_finalize;
  plot_class->watches = ANT_DESK_RECORD;
  plot_class->paint = ant_clock_view_paint;
  plot_class->describe = ant_clock_view_describe;
}

static void
ant_clock_view_init (AntClockView *self)
{
  ant_plot_view_set_title (ANT_PLOT_VIEW (self), _("Fold by the instrument's clock"));
}
