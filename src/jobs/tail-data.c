/* tail-data.c - collect SNRs and the curve of chance. */
#include "jobs/tail-data.h"

#include <math.h>

#include "core/units.h"

#define CURVE_POINTS 60
#define LEAST_EXPECTED 1e-3 /* where the curve ends */

static gsize
collect (gsize n, const AntDip *dip, double *snr)
{
  gsize kept = 0;
  for (gsize i = 0; i < n; i++)
    if (dip[i].duration_d * ANT_HOURS_PER_DAY <= ANT_MIRROR_LONGEST_H)
      snr[kept++] = fabs (dip[i].snr);
  return kept;
}

/* From a little below the threshold to where hardly anything is expected. */
static gsize
draw_chance (const AntScanResults *results, double *snr, double *expected)
{
  if (!(results->chance.field.crossings > 0))
    return 0;
  double from = fmax (results->threshold_snr - 1.5, 3);
  double to = fmax (ant_chance_law_threshold (&results->chance, LEAST_EXPECTED), from + 1);
  for (gsize i = 0; i < CURVE_POINTS; i++)
    {
      snr[i] = from + (to - from) * (double) i / (CURVE_POINTS - 1);
      expected[i] = ant_chance_law_expected (&results->chance, snr[i]);
    }
  return CURVE_POINTS;
}

AntTailData *
ant_tail_data_new (const AntScanResults *results)
{
  AntTailData *data = g_new0 (AntTailData, 1);
  data->snr = g_new (double, results->n_dips + results->n_brightenings + 2 * CURVE_POINTS);
  double *mirror = data->snr + results->n_dips, *snr = mirror + results->n_brightenings, *expected = snr + CURVE_POINTS;
  data->chart = (AntTailChart) { .n_dips = collect (results->n_dips, results->dip, data->snr),
                                 .n_mirror = collect (results->n_brightenings, results->brightening, mirror),
                                 .dip_snr = data->snr, .mirror_snr = mirror,
                                 .n_expected = draw_chance (results, snr, expected), .snr = snr, .expected = expected,
                                 .threshold_snr = results->threshold_snr };
  return data;
}

void
ant_tail_data_free (AntTailData *data)
{
  if (!data)
    return;
  g_free (data->snr);
  g_free (data);
}
