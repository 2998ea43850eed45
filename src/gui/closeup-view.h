/* closeup-view.h - the selected dip from near, its fitted shape drawn on it. */
#pragma once

#include "gui/plot-view.h"

#define ANT_TYPE_CLOSEUP_VIEW (ant_closeup_view_get_type ())
G_DECLARE_FINAL_TYPE (AntCloseupView, ant_closeup_view, ANT, CLOSEUP_VIEW, AntPlotView)
