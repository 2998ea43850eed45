/* tail-data.h - how many dips of a scan reach an SNR, beside its brightenings and what noise alone would give, ready for
 * the tail painter. */
#pragma once

#include "data/scan-results.h"
#include "plot/tail-chart.h"

typedef struct
{
  AntTailChart chart; /* its arrays belong to this struct */
  double *snr;
} AntTailData;

/* Dips and brightenings of ANT_MIRROR_LONGEST_H and less: longer ones are no mirror of each other. Without a chance law
 * nothing is expected. */
AntTailData *ant_tail_data_new (const AntScanResults *results);
void ant_tail_data_free (AntTailData *data); /* NULL is fine */
