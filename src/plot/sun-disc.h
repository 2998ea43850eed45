/* sun-disc.h - the Sun's disc and the way of a body across it, north up and east to the left as the sky shows it. */
#pragma once

#include "plot/pen.h"

#define ANT_SUN_DISC_MARKS 5 /* contacts I to IV, and the greatest phase */

typedef struct
{
  size_t n;                   /* >= 2 */
  const double *east, *north; /* [n] the body's centre from the Sun's, in solar radii, at even times */
  double radius_ratio;        /* of the body */
  double mark[ANT_SUN_DISC_MARKS]; /* when, as a part of the way's time; NaN: does not occur */
  int uncertain;              /* the way is only about this one: drawn dashed */
} AntSunDisc;

void ant_sun_disc_paint (cairo_t *cr, const AntBox *box, const AntSunDisc *disc, const AntTheme *theme, double scale);
