/* sun-view.h - the Sun's disc with the way of the selected event across it. */
#pragma once

#include "gui/plot-view.h"

#define ANT_TYPE_SUN_VIEW (ant_sun_view_get_type ())
G_DECLARE_FINAL_TYPE (AntSunView, ant_sun_view, ANT, SUN_VIEW, AntPlotView)
