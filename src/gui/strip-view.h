/* strip-view.h - a strip of the time stack as a widget.
 *
 * Wheel: zoom at the pointer, sideways or with Shift: pan. Drag: pan; with Shift, or when measuring: draw a span, and
 * measure the dip in it. Click: select a dip, twice: see it from near. Keys: + - zoom, Left Right pan, Home whole, with
 * Shift Left Right a span, Return measures it, Escape forgets it. */
#pragma once

#include "gui/plot-view.h"
#include "gui/strip-content.h"

#define ANT_TYPE_STRIP_VIEW (ant_strip_view_get_type ())
G_DECLARE_FINAL_TYPE (AntStripView, ant_strip_view, ANT, STRIP_VIEW, AntPlotView)

/* A new one shows irradiance. */
void ant_strip_view_set_kind (AntStripView *self, AntStripKind kind);
/* Whether it carries the labels of time: the lowest does. */
void ant_strip_view_set_axis (AntStripView *self, gboolean axis);
