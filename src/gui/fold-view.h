/* fold-view.h - the record folded on the chosen period. */
#pragma once

#include "gui/plot-view.h"

#define ANT_TYPE_FOLD_VIEW (ant_fold_view_get_type ())
G_DECLARE_FINAL_TYPE (AntFoldView, ant_fold_view, ANT, FOLD_VIEW, AntPlotView)
