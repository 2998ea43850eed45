/* floor-view.h - the floor chart as a widget: depth against duration over the noise floor; a click or Left and Right
 * select dips. On the page Noise it shows the floor alone. */
#pragma once

#include "gui/plot-view.h"

#define ANT_TYPE_FLOOR_VIEW (ant_floor_view_get_type ())
G_DECLARE_FINAL_TYPE (AntFloorView, ant_floor_view, ANT, FLOOR_VIEW, AntPlotView)

/* With dips unless told otherwise. chunk: whose floor to show; -1 the median of all. */
void ant_floor_view_set_bare (AntFloorView *self, gboolean bare);
void ant_floor_view_set_chunk (AntFloorView *self, int chunk);
