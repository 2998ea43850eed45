/* period-chart.h - the best SNR at every period, the threshold, and the repeats that stand in it. */
#pragma once

#include "plot/pen.h"

typedef struct
{
  size_t n;
  const double *period_d, *snr; /* [n] periods rising */
  double from_d, to_d;          /* periods that were searched */
  double threshold_snr;         /* 0: none drawn */
  size_t n_repeats;
  const double *repeat_d, *repeat_snr; /* [n_repeats] */
  double chosen_d;              /* period that is folded; NaN: none */
  size_t n_aliases;
  const double *alias_d;        /* of the chosen one */
} AntPeriodChart;

/* x: days, logarithmic; y: SNR, linear. */
void ant_period_chart_view (const AntPeriodChart *chart, AntView *view);
void ant_period_chart_paint (cairo_t *cr, const AntBox *box, const AntPeriodChart *chart, const AntView *view,
                             const AntTheme *theme, double scale);
/* The highest period within a few pixels of a place across; NaN outside the area. */
double ant_period_chart_at (const AntBox *box, const AntPeriodChart *chart, const AntView *view, const AntTheme *theme, double x,
                            double y);
