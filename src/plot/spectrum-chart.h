/* spectrum-chart.h - the power spectrum of a record: what was measured, what was fitted, and of what the fit is made.
 */
#pragma once

#include "noise/noise-model.h"
#include "plot/pen.h"

typedef struct
{
  size_t n;
  const double *frequency_cd; /* [n] cycles/day, ascending, > 0 */
  const double *power;        /* [n] ppm^2 per (cycle/day), mask's effect removed; NaN: not shown */
  const double *ordinates;    /* [n] independent ordinates in each, for error bars of 1/sqrt; or NULL */
  const AntNoiseModel *model; /* or NULL: no fit yet */
  double white_psd;           /* of the measurements, ppm^2 per (cycle/day) (ant_noise_white_psd) */
} AntSpectrumChart;

/* x: cycles/day, y: ppm^2 per (cycle/day), both log. */
void ant_spectrum_chart_view (const AntSpectrumChart *chart, AntView *view);
void ant_spectrum_chart_paint (cairo_t *cr, const AntBox *box, const AntSpectrumChart *chart, const AntView *view,
                               const AntTheme *theme, double scale);
/* What a part of the model is called, translated; static. */
const char *ant_part_title (const AntNoisePart *part);
