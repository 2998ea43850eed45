/* key.h - what the lines of a chart are called: names at the right above its area, each behind a piece of its line. */
#pragma once

#include "plot/pen.h"

typedef struct
{
  const char *name;  /* NULL: left out of the key */
  AntRole role;
  double width;
  double dash[2];    /* 0: solid */
} AntLineStyle;

/* Make the style the pen's: colour and dash. Width goes to ant_pen_polyline. */
void ant_line_style_set (AntPen *pen, const AntLineStyle *style);
/* Names side by side up to the right end, the first leftmost; where they would come nearer than `keep_px` to the left
 * end the last are left out. */
void ant_key_paint (AntPen *pen, const AntBox *area, size_t n, const AntLineStyle *style, double keep_px);
