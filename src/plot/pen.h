/* pen.h - a cairo context with a theme in hand: colours by role, crisp lines, text, the shapes of dips.
 *
 * A painter begins a pen on its stack and ends it before it returns; between, the pen owns one text layout. Boxes given
 * to painters lie on whole pixels. Font hinting is off, so that a figure has the same layout on screen and on paper. */
#pragma once

#include <cairo.h>
#include <pango/pango.h>
#include "plot/theme.h"
#include "plot/ticks.h"
#include "plot/view.h"

typedef struct
{
  cairo_t *cr;
  const AntTheme *theme;
  double scale;        /* pixels of the device per unit: 2 on a doubled display, 4 or so for paper */
  PangoLayout *layout;
  struct _AntCoverage *added; /* boxes and dots on their way; NULL: none, or they are a path of cr */
} AntPen;

typedef enum
{
  ANT_TEXT_LABEL,
  ANT_TEXT_SMALL,
  ANT_TEXT_STRONG,
} AntTextStyle;

typedef struct
{
  double width, height;
} AntTextSize;

void ant_pen_begin (AntPen *pen, cairo_t *cr, const AntTheme *theme, double scale);
void ant_pen_end (AntPen *pen);

void ant_pen_colour (AntPen *pen, AntRole role);
void ant_pen_set (AntPen *pen, AntColour colour);

AntTextSize ant_pen_measure (AntPen *pen, const char *text, AntTextStyle style);
/* Text in the present colour; (x, y) is the point of its box that align_x, align_y (0 left or top .. 1) name. */
void ant_pen_text (AntPen *pen, const char *text, AntTextStyle style, double x, double y, double align_x,
                   double align_y);
/* Where that text stands. */
AntBox ant_pen_text_box (AntPen *pen, const char *text, AntTextStyle style, double x, double y, double align_x,
                         double align_y);

/* A quiet sentence in the middle of a box where there is nothing to paint; needs no pen. */
void ant_pen_remark (cairo_t *cr, const AntBox *box, const char *text, const AntTheme *theme, double scale);

/* Nearest edge between pixels. */
double ant_pen_snap (const AntPen *pen, double v);
/* Lines one pixel wide (two on a doubled display and on paper: half a unit), in the present colour. */
double ant_pen_hair (const AntPen *pen);
void ant_pen_across (AntPen *pen, double x0, double x1, double y);
void ant_pen_down (AntPen *pen, double x, double y0, double y1);
void ant_pen_fill_box (AntPen *pen, const AntBox *box);
void ant_pen_frame_box (AntPen *pen, const AntBox *box);
/* Many boxes on whole pixels, or dots, in the present colour, cheaply: add each, fill at the end. */
void ant_pen_add_box (AntPen *pen, double left, double top, double right, double foot);
void ant_pen_add_dot (AntPen *pen, double x, double y, double r);
void ant_pen_fill_added (AntPen *pen);
void ant_pen_clip (AntPen *pen, const AntBox *box); /* cairo_restore ends it: cairo_save is done here */

/* A polyline of n points in the present colour, broken at NaN in y. With x ascending cheap for thousands of points. */
void ant_pen_polyline (AntPen *pen, size_t n, const double *x, const double *y, double width);

/* A dip's shape of radius r, in its colour; a second, open outline around it if selected. */
void ant_pen_dip (AntPen *pen, AntDipLook look, double x, double y, double r, int selected);
