/* ribbon-view.h - the whole record on one band, with the part in view as a box that can be moved and stretched. */
#pragma once

#include "gui/plot-view.h"

#define ANT_TYPE_RIBBON_VIEW (ant_ribbon_view_get_type ())
G_DECLARE_FINAL_TYPE (AntRibbonView, ant_ribbon_view, ANT, RIBBON_VIEW, AntPlotView)
