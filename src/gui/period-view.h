/* period-view.h - the best SNR at every period; a click or the arrow keys choose what is folded. */
#pragma once

#include "gui/plot-view.h"

#define ANT_TYPE_PERIOD_VIEW (ant_period_view_get_type ())
G_DECLARE_FINAL_TYPE (AntPeriodView, ant_period_view, ANT, PERIOD_VIEW, AntPlotView)
