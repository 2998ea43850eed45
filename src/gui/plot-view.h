/* plot-view.h - a widget that shows what a painter of plot/ draws: theme, caching, accessibility and saving are done
 * here once, so that each plot only says what to paint and what to call it.
 *
 * Actions of every plot: plot.save (asks where), plot.copy (as a picture), plot.menu. */
#pragma once

#include <gtk/gtk.h>
#include "gui/desk.h"
#include "plot/theme.h"
#include "plot/view.h"

#define ANT_TYPE_PLOT_VIEW (ant_plot_view_get_type ())
G_DECLARE_DERIVABLE_TYPE (AntPlotView, ant_plot_view, ANT, PLOT_VIEW, GtkWidget)

struct _AntPlotViewClass
{
  GtkWidgetClass parent_class;
  AntDeskChange watches; /* changes of the desk after which the plot looks different */

  /* Paint into the box; pure but for what the widget holds. Called with a desk and a record only. */
  void (*paint) (AntPlotView *self, cairo_t *cr, const AntBox *box, const AntTheme *theme, double scale);
  /* Over the cached picture: cursor, span. May be NULL. */
  void (*overlay) (AntPlotView *self, GtkSnapshot *snapshot, const AntBox *box, const AntTheme *theme);
  /* What is to be seen, in words, for those who do not see it. Caller frees. */
  char *(*describe) (AntPlotView *self);
  /* The desk has changed; before the redraw. May be NULL. */
  void (*desk_changed) (AntPlotView *self, AntDeskChange what);
};

void ant_plot_view_set_desk (AntPlotView *self, AntDesk *desk);
AntDesk *ant_plot_view_get_desk (AntPlotView *self);
/* "Irradiance": accessible label and name of saved figures. */
void ant_plot_view_set_title (AntPlotView *self, const char *title);
const char *ant_plot_view_get_title (AntPlotView *self);

/* The picture is out of date. */
void ant_plot_view_redraw (AntPlotView *self);
AntBox ant_plot_view_box (AntPlotView *self);
const AntTheme *ant_plot_view_theme (AntPlotView *self);
/* Write the figure as it is now, on light paper; the ending of the path decides the format. */
gboolean ant_plot_view_save (AntPlotView *self, const char *path, GError **error);
