/* strip.h - one strip of the time stack: a column of the record against time, with what was made of it.
 *
 * The same painter draws the irradiance (with its rotation curve), the residual (dips bracketed and numbered), the dip
 * SNR of one duration (with the threshold) and any other column. Above one sample a column of pixels it draws the
 * extent of each column, below it the samples themselves; gaps of more than one sample are shaded; the averages lie
 * over both.
 *
 * Painters are pure: they keep nothing between calls and change none of their data. */
#pragma once

#include <math.h>
#include "core/span.h"
#include "data/time-reference.h"
#include "plot/averages.h"
#include "plot/dip-mark.h"
#include "plot/pen.h"

typedef struct
{
  const char *title;             /* "Irradiance, W/m²"; may be NULL */
  const char *caption;           /* quiet words after it; may be NULL */
  const AntTimeReference *time;  /* NULL: days */
  const AntPyramid *pyramid;     /* of the values; place 0 at start_d, places step_d apart */
  double start_d, step_d;
  const AntAverages *averages;   /* of the same values, or NULL */
  const float *curve;            /* [samples of the pyramid] drawn over them, or NULL; NaN where there is none */
  size_t n_masks;
  const AntSpan *mask;           /* spans that are left out: hatched */
  double line;                   /* a level to draw dashed; NaN: none */
  double label_zero, label_per;  /* labels show label_zero + label_per * value; label_per 0 counts as 0 and 1 */
  size_t n_dips;
  const AntDipMark *dip;
  size_t selected;               /* index, or ANT_NO_DIP */
  size_t n_ticks;
  const double *tick_d;          /* times to mark at the edges: predicted contacts */
  int brackets;                  /* nonzero: bracket and number the dips; else only the selected one's wash */
  int time_axis;                 /* nonzero: this strip carries the labels of time */
} AntStrip;
#define ANT_STRIP_INIT { .line = NAN, .selected = ANT_NO_DIP }

/* view: x in days from the record's origin, y in units of the values; linear. */
void ant_strip_paint (cairo_t *cr, const AntBox *box, const AntStrip *strip, const AntView *view, const AntTheme *theme,
                      double scale);

/* Where in the box the data are: for pointers, for lining strips up, for an overlaid cursor. */
AntBox ant_strip_area (const AntBox *box, const AntTheme *theme, int time_axis);
/* Height that a strip adds to its data. */
double ant_strip_extra_height (const AntTheme *theme, int time_axis);
/* The dip whose span (and a few pixels) holds x, nearest middle first; ANT_NO_DIP if none. */
size_t ant_strip_dip_at (const AntBox *box, const AntStrip *strip, const AntView *view, const AntTheme *theme, double x,
                         double y);
