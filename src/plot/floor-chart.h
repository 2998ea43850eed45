/* floor-chart.h - depth against duration, both logarithmic: every dip over the noise floor and the threshold, beside
 * what Mercury, Venus and an Earth seen from afar would do. */
#pragma once

#include "plot/dip-mark.h"
#include "plot/pen.h"
#include "search/dip-map.h"

/* Depths of crossings, ppm, from apparent radii and the limb darkening 0.40, 0.19, which deepens the middle of the
 * disc 1.20 times. Seen from the Earth: Mercury 47 in May, when it is near to us, 31 in November, and 26 there by areas
 * alone; Venus about 1000. The Earth before the Sun as seen from afar: 84 by areas alone, 101 at the middle of the
 * disc. */
#define ANT_MERCURY_LOW_PPM 26.0
#define ANT_MERCURY_NOVEMBER_PPM 31.0
#define ANT_MERCURY_MAY_PPM 47.0
#define ANT_VENUS_PPM 1000.0
#define ANT_EARTH_AFAR_LOW_PPM 84.0
#define ANT_EARTH_AFAR_HIGH_PPM 101.0

typedef struct
{
  size_t n_floor;
  const AntFloorPoint *floor; /* by duration, ascending; sigma NaN: left out */
  double threshold_snr;       /* 0: none drawn */
  size_t n_dips;
  const AntDipMark *dip;      /* depths of either sign */
  size_t selected;            /* or ANT_NO_DIP */
} AntFloorChart;

/* x: hours, y: ppm, both log; holds floor, dips and references. */
void ant_floor_chart_view (const AntFloorChart *chart, AntView *view);
void ant_floor_chart_paint (cairo_t *cr, const AntBox *box, const AntFloorChart *chart, const AntView *view,
                            const AntTheme *theme, double scale);
/* The dip whose shape is nearest to a point, within a few pixels; ANT_NO_DIP if none. */
size_t ant_floor_chart_dip_at (const AntBox *box, const AntFloorChart *chart, const AntView *view,
                               const AntTheme *theme, double x, double y);
