/* tail-view.h - counts of dip SNR: the dips, their mirror, and what noise alone would give. */
#pragma once

#include "gui/plot-view.h"

#define ANT_TYPE_TAIL_VIEW (ant_tail_view_get_type ())
G_DECLARE_FINAL_TYPE (AntTailView, ant_tail_view, ANT, TAIL_VIEW, AntPlotView)
