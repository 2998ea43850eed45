/* event-strips.h - the events of a repeat one below the other, each from near with the common shape. */
#pragma once

#include "plot/pen.h"

typedef struct
{
  const char *label;             /* when it was */
  size_t n;
  const double *hours, *ppm;     /* [n] about the middle of the event */
} AntEventStrip;

typedef struct
{
  size_t n;
  const AntEventStrip *strip;
  size_t n_shape;
  const double *shape_hours, *shape_ppm; /* [n_shape] common to all */
  double low_ppm, high_ppm;              /* range of every strip */
  size_t selected;                       /* or n */
} AntEventStrips;

/* Height that one strip wants. */
double ant_event_strips_row (const AntTheme *theme);
void ant_event_strips_paint (cairo_t *cr, const AntBox *box, const AntEventStrips *strips, const AntTheme *theme, double scale);
/* Which strip a place lies on; n if none. */
size_t ant_event_strips_at (const AntBox *box, const AntEventStrips *strips, const AntTheme *theme, double y);
