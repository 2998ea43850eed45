/* clock-view.h - the chart of a fold by a clock of the instrument's own. */
#pragma once

#include "gui/plot-view.h"
#include "jobs/clock-fold.h"

#define ANT_TYPE_CLOCK_VIEW (ant_clock_view_get_type ())
G_DECLARE_FINAL_TYPE (AntClockView, ant_clock_view, ANT, CLOCK_VIEW, AntPlotView)

/* Takes the fold over; NULL: nothing is folded. what: "Residual, ppm". */
void ant_clock_view_set_fold (AntClockView *self, AntClockFold *fold, const char *what);
