/* ribbon.h - the whole record on one thin band, with the part in view boxed: shows where one is and moves it. */
#pragma once

#include "core/span.h"
#include "plot/dip-mark.h"
#include "plot/pen.h"

typedef struct
{
  const AntPyramid *pyramid; /* of the whole record; place 0 at start_d */
  double start_d, step_d;
  size_t n_dips;
  const AntDipMark *dip;
  size_t selected;           /* or ANT_NO_DIP */
  size_t n_masks;
  const AntSpan *mask;       /* spans that are left out: hatched */
} AntRibbon;

typedef enum
{
  ANT_RIBBON_OUTSIDE,   /* a press here brings the view here */
  ANT_RIBBON_FROM_EDGE, /* drag moves the start of the view */
  ANT_RIBBON_TO_EDGE,
  ANT_RIBBON_INSIDE,    /* drag moves the view */
} AntRibbonPart;

/* view: the part in view, x in days from the record's origin; its y is not used. */
void ant_ribbon_paint (cairo_t *cr, const AntBox *box, const AntRibbon *ribbon, const AntView *view,
                       const AntTheme *theme, double scale);

/* The band lines up with the areas of strips in a box of the same width. */
AntBox ant_ribbon_area (const AntBox *box, const AntTheme *theme);
double ant_ribbon_time_at (const AntBox *box, const AntRibbon *ribbon, const AntTheme *theme, double x);
AntRibbonPart ant_ribbon_part_at (const AntBox *box, const AntRibbon *ribbon, const AntView *view,
                                  const AntTheme *theme, double x);
