/* axes.h - tick marks, labels, grid and title around a plot's area. */
#pragma once

#include "plot/pen.h"

/* Rulers that measure by the pen's font; before and after: room beyond the ends of the area, px. */
AntRuler ant_axes_ruler_x (AntPen *pen, const AntBox *area, double before, double after);
AntRuler ant_axes_ruler_y (AntPen *pen, const AntBox *area);

/* Faint lines through the labelled ticks; below everything else. */
void ant_axes_grid (AntPen *pen, const AntBox *area, const AntView *view, const AntTicks *x, const AntTicks *y);
/* The line under the area, ticks hanging from it, and with `labelled` their text and the context at its left. */
void ant_axes_bottom (AntPen *pen, const AntBox *area, const AntView *view, const AntTicks *ticks, int labelled);
/* Labels at the left; the grid carries the eye. Labelled ticks only. */
void ant_axes_left (AntPen *pen, const AntBox *area, const AntView *view, const AntTicks *ticks);
/* What the axes are: above the area at its left, and below the labels in the middle. Either may be NULL. */
void ant_axes_titles (AntPen *pen, const AntBox *area, const char *above, const char *below);

/* The area that axes leave of a box: titles above, labels left and below, and `title_below` nonzero a title there too.
 */
AntBox ant_axes_area (const AntBox *box, const AntTheme *theme, int title_below);

/* The frame of a chart with two logarithmic axes: what lies under the data, and what stands around them. */
typedef struct
{
  AntBox area;
  AntTicks x, y;
} AntFrame;

/* Paper and grid; with `grid_across` zero only the vertical lines. The pen has begun. */
void ant_frame_begin (AntFrame *frame, AntPen *pen, const AntBox *box, const AntView *view, int grid_across);
void ant_frame_axes (const AntFrame *frame, AntPen *pen, const AntView *view);
