/* tail-chart.h - how many dips reach an SNR: those of the record, those of its mirror (brightenings), and what noise
 * alone is expected to give. */
#pragma once

#include "plot/pen.h"

typedef struct
{
  size_t n_dips, n_mirror;
  const double *dip_snr, *mirror_snr; /* any order; mirrored SNRs as positive numbers */
  size_t n_expected;
  const double *snr, *expected;       /* [n_expected] SNR ascending, and noise-only dips expected to reach it */
  double threshold_snr;               /* 0: none */
} AntTailChart;

/* x: SNR, y: count; both log. */
void ant_tail_chart_view (const AntTailChart *chart, AntView *view);
void ant_tail_chart_paint (cairo_t *cr, const AntBox *box, const AntTailChart *chart, const AntView *view,
                           const AntTheme *theme, double scale);
