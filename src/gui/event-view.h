/* event-view.h - the selected event of the sky in the record: samples, predicted curve, and what it leaves. */
#pragma once

#include "gui/plot-view.h"

#define ANT_TYPE_EVENT_VIEW (ant_event_view_get_type ())
G_DECLARE_FINAL_TYPE (AntEventView, ant_event_view, ANT, EVENT_VIEW, AntPlotView)
