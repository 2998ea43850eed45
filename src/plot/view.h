/* view.h - which part of a plot's two axes is seen, and where on the paper a number falls.
 *
 * x is time in days from the record's origin on strips; each chart states its own units. y grows upwards. */
#pragma once

#include <stddef.h>
#include "plot/pyramid.h"

typedef struct
{
  double x, y, width, height; /* y downwards, as cairo has it */
} AntBox;

typedef struct
{
  double from, to;  /* x axis; from < to */
  double low, high; /* y axis; low < high */
  int log_x, log_y; /* nonzero: logarithmic, ends > 0 */
} AntView;

double ant_view_x (const AntView *view, const AntBox *box, double x);
double ant_view_y (const AntView *view, const AntBox *box, double y); /* far outside: clipped to 1e5 from the box */
/* And back, from a place on the paper. */
double ant_view_at_x (const AntView *view, const AntBox *box, double x);
double ant_view_at_y (const AntView *view, const AntBox *box, double y);

/* Show 1/factor of the present x range (factor > 1: closer), what stands at `at` staying where it is. The range keeps
 * within [whole_from, whole_to] and above `least`. Linear axes only. */
void ant_view_zoom (AntView *view, double factor, double at, double whole_from, double whole_to, double least);
/* Move by a fraction of the present range, stopping at the ends of the whole. */
void ant_view_pan (AntView *view, double fraction, double whole_from, double whole_to);
/* Fit the y range to what a series (place 0 at start_d) shows within the x range, with some air. Unchanged, and 0
 * returned, if nothing is observed there. */
int ant_view_fit_y (AntView *view, const AntPyramid *pyramid, double start_d, double step_d);

/* Widen the y range, with some air, so that it holds a value; NaN: unchanged. Linear axes only. */
void ant_view_hold_y (AntView *view, double y);

int ant_box_holds (const AntBox *box, double x, double y);
int ant_boxes_meet (const AntBox *a, const AntBox *b);
