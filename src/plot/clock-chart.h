/* clock-chart.h - values by a clock of the instrument's own: the mean and its error at every phase of an orbit, or so many minutes
 * after a gap. */
#pragma once

#include "data/fold.h"
#include "plot/pen.h"

typedef struct
{
  const char *title;      /* what was folded, "Residual, ppm" */
  AntFoldClock clock;
  size_t n;
  const AntFoldBin *bin;  /* [n] */
} AntClockChart;

/* x: phase or minutes; y: units of the values; both linear. */
void ant_clock_chart_view (const AntClockChart *chart, AntView *view);
void ant_clock_chart_paint (cairo_t *cr, const AntBox *box, const AntClockChart *chart, const AntView *view, const AntTheme *theme,
                            double scale);
