/* fold-events.h - the events of the fold one by one; a click, or Return, shows one in the time stack. */
#pragma once

#include "gui/plot-view.h"

#define ANT_TYPE_FOLD_EVENTS (ant_fold_events_get_type ())
G_DECLARE_FINAL_TYPE (AntFoldEvents, ant_fold_events, ANT, FOLD_EVENTS, AntPlotView)
