/* fold-view.c - averages of the fold with their errors, the common shape, what it leaves. */
#include "gui/fold-view.h"

#include <glib/gi18n.h>

#include "plot/pen.h"

struct _AntFoldView
{
  AntPlotView parent_instance;
};

G_DEFINE_FINAL_TYPE (AntFoldView, ant_fold_view, ANT_TYPE_PLOT_VIEW)

static void
ant_fold_view_paint (AntPlotView *plot, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale)
{
  const AntFoldData *data = ant_desk_get_fold_data (ant_plot_view_get_desk (plot));
  AntView view;
  if (!data)
    {
      ant_pen_remark (cr, box, _("A repeat, or a period that is typed, is folded here"), theme, scale);
      return;
    }
  ant_dip_closeup_view (&data->closeup, &view);
  ant_dip_closeup_paint (cr, box, &data->closeup, &view, theme, scale);
}

static char *
ant_fold_view_describe (AntPlotView *plot)
{
  AntDesk *desk = ant_plot_view_get_desk (plot);
  const AntFold *fold = desk ? ant_desk_get_fold (desk) : NULL;
  const AntFoldData *data = fold ? ant_desk_get_fold_data (desk) : NULL;
  if (!data)
    return g_strdup (_("Nothing is folded"));
  return g_strdup_printf (_("Residual folded on %.6g days, %zu points from %zu events"), fold->period_d, data->closeup.n,
                          data->strips.n);
}

static void
ant_fold_view_class_init (AntFoldViewClass *klass)
{
  AntPlotViewClass *plot_class = ANT_PLOT_VIEW_CLASS (klass);
  plot_class->watches = ANT_DESK_RECORD | ANT_DESK_RESULTS | ANT_DESK_FOLD;
  plot_class->paint = ant_fold_view_paint;
  plot_class->describe = ant_fold_view_describe;
}

static void
ant_fold_view_init (AntFoldView *self)
{
  ant_plot_view_set_title (ANT_PLOT_VIEW (self), _("Fold"));
}
